// Package formula holds published relations with their sources and records how
// a number was obtained from them.
package formula

import (
	"fmt"
	"math"
	"slices"

	"legwright/internal/perf/units"
)

// A Symbol is one letter of a formula.
type Symbol struct {
	Name     string // as it stands in the expression
	Meaning  string
	Quantity units.Quantity // gives the SI unit of the values
}

// Sym returns a Symbol.
func Sym(name, meaning string, q units.Quantity) Symbol { return Symbol{name, meaning, q} }

// A Formula is one published relation.
type Formula struct {
	ID     string
	Out    Symbol
	In     []Symbol
	Expr   string // right-hand side, Go expression syntax over the names in In, pi, and the functions in funcs
	Source Source
	Where  string // equation, table or page in Source
	tree   *Node
}

// Must parses f.Expr. It panics if f has no source, does not parse, or names an unknown symbol or function.
func Must(f Formula) *Formula {
	if f.Source.Key == "" {
		panic(fmt.Sprintf("formula %s: no source", f.ID))
	}
	tree, err := Parse(f.Expr)
	if err != nil {
		panic(fmt.Sprintf("formula %s: %v", f.ID, err))
	}
	for name := range tree.symbols() {
		if name != "pi" && !slices.ContainsFunc(f.In, func(s Symbol) bool { return s.Name == name }) {
			panic(fmt.Sprintf("formula %s: unknown symbol %s", f.ID, name))
		}
	}
	f.tree = tree
	return &f
}

// A Step is one use of a formula, or a remark between two uses when Formula is nil.
type Step struct {
	Formula *Formula
	In      []float64 // in SI, same order as Formula.In
	Out     float64   // in SI
	Note    string    // heading or remark, such as how an iteration ended
	Heading bool      // the note starts a new part of the working
}

// A Working collects steps. A nil *Working discards them at no cost.
type Working struct{ Steps []Step }

// Step records that f gave out from in, and returns out.
func (w *Working) Step(f *Formula, out float64, in ...float64) float64 {
	if w != nil {
		w.Steps = append(w.Steps, Step{Formula: f, In: slices.Clone(in), Out: out})
	}
	return out
}

// Heading starts a new part of the working.
func (w *Working) Heading(text string) {
	if w != nil {
		w.Steps = append(w.Steps, Step{Note: text, Heading: true})
	}
}

// Note records a remark.
func (w *Working) Note(format string, a ...any) {
	if w != nil {
		w.Steps = append(w.Steps, Step{Note: fmt.Sprintf(format, a...)})
	}
}

// Check re-evaluates the shown expression and compares it with the recorded
// value to the relative tolerance tol.
func (s Step) Check(tol float64) error {
	if s.Formula == nil {
		return nil
	}
	got, err := s.Formula.Eval(s.In...)
	if err != nil {
		return err
	}
	scale := math.Max(math.Abs(got), math.Abs(s.Out))
	if !(math.Abs(got-s.Out) <= tol*scale) && scale != 0 {
		return fmt.Errorf("formula %s: shown %s = %g, computed %g", s.Formula.ID, s.Formula.Expr, got, s.Out)
	}
	return nil
}

// Eval evaluates the expression for values in SI, in the order of f.In.
func (f *Formula) Eval(in ...float64) (float64, error) {
	if len(in) != len(f.In) {
		return 0, fmt.Errorf("formula %s: %d values for %d symbols", f.ID, len(in), len(f.In))
	}
	env := map[string]float64{"pi": math.Pi}
	for i, s := range f.In {
		env[s.Name] = in[i]
	}
	return f.tree.eval(env), nil
}

// Tree is the expression that Eval evaluates. It must not be changed.
func (f *Formula) Tree() *Node { return f.tree }
