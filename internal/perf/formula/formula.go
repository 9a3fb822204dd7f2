// Package formula holds published relations with their sources and records how
// a number was obtained from them.
package formula

import (
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"math"
	"slices"
	"strconv"

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
	tree   ast.Expr
}

// Must parses f.Expr. It panics if f has no source, does not parse, or names an unknown symbol or function.
func Must(f Formula) *Formula {
	if f.Source.Key == "" {
		panic(fmt.Sprintf("formula %s: no source", f.ID))
	}
	tree, err := parser.ParseExpr(f.Expr)
	if err != nil {
		panic(fmt.Sprintf("formula %s: %v", f.ID, err))
	}
	f.tree = tree
	trial := make([]float64, len(f.In))
	for i := range trial {
		trial[i] = 1
	}
	if _, err := f.Eval(trial...); err != nil {
		panic(err)
	}
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
	return f.eval(f.tree, env)
}

// A function of the expression language; arity 0 takes one value or more.
type function struct {
	arity int
	of    func(a []float64) float64
}

var funcs = map[string]function{
	"sqrt":  {1, func(a []float64) float64 { return math.Sqrt(a[0]) }},
	"pow":   {2, func(a []float64) float64 { return math.Pow(a[0], a[1]) }},
	"exp":   {1, func(a []float64) float64 { return math.Exp(a[0]) }},
	"log10": {1, func(a []float64) float64 { return math.Log10(a[0]) }},
	"sin":   {1, func(a []float64) float64 { return math.Sin(a[0]) }},
	"cos":   {1, func(a []float64) float64 { return math.Cos(a[0]) }},
	"tan":   {1, func(a []float64) float64 { return math.Tan(a[0]) }},
	"asin":  {1, func(a []float64) float64 { return math.Asin(a[0]) }},
	"min":   {0, func(a []float64) float64 { return slices.Min(a) }},
	"max":   {0, func(a []float64) float64 { return slices.Max(a) }},
}

func (f *Formula) eval(e ast.Expr, env map[string]float64) (float64, error) {
	switch e := e.(type) {
	case *ast.BasicLit:
		v, err := strconv.ParseFloat(e.Value, 64)
		if err != nil {
			return 0, fmt.Errorf("formula %s: %w", f.ID, err)
		}
		return v, nil
	case *ast.Ident:
		v, ok := env[e.Name]
		if !ok {
			return 0, fmt.Errorf("formula %s: unknown symbol %s", f.ID, e.Name)
		}
		return v, nil
	case *ast.ParenExpr:
		return f.eval(e.X, env)
	case *ast.UnaryExpr:
		if e.Op != token.SUB {
			return 0, fmt.Errorf("formula %s: unsupported operator %s", f.ID, e.Op)
		}
		x, err := f.eval(e.X, env)
		return -x, err
	case *ast.BinaryExpr:
		return f.binary(e, env)
	case *ast.CallExpr:
		return f.call(e, env)
	}
	return 0, fmt.Errorf("formula %s: unsupported expression", f.ID)
}

func (f *Formula) binary(e *ast.BinaryExpr, env map[string]float64) (float64, error) {
	x, err := f.eval(e.X, env)
	if err != nil {
		return 0, err
	}
	y, err := f.eval(e.Y, env)
	if err != nil {
		return 0, err
	}
	switch e.Op {
	case token.ADD:
		return x + y, nil
	case token.SUB:
		return x - y, nil
	case token.MUL:
		return x * y, nil
	case token.QUO:
		return x / y, nil
	}
	return 0, fmt.Errorf("formula %s: unsupported operator %s", f.ID, e.Op)
}

func (f *Formula) call(e *ast.CallExpr, env map[string]float64) (float64, error) {
	name, _ := e.Fun.(*ast.Ident)
	if name == nil || funcs[name.Name].of == nil {
		return 0, fmt.Errorf("formula %s: unknown function", f.ID)
	}
	fn := funcs[name.Name]
	if n := len(e.Args); n == 0 || (fn.arity != 0 && n != fn.arity) {
		return 0, fmt.Errorf("formula %s: %s takes %d values, not %d", f.ID, name.Name, max(1, fn.arity), n)
	}
	args := make([]float64, len(e.Args))
	for i, a := range e.Args {
		v, err := f.eval(a, env)
		if err != nil {
			return 0, err
		}
		args[i] = v
	}
	return fn.of(args), nil
}
