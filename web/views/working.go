package views

import (
	"fmt"
	"strings"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/mathml"
)

// A Working is the derivation of a study's numbers as shown.
type Working struct {
	Frame
	Lead    string
	Parts   []Part
	Sources []formula.Source
	Text    string // the whole as plain text
}

// A Part is a run of steps under a heading.
type Part struct {
	ID    string
	Title string
	Lines []Line
	Text  string // the part as plain text
}

// A Line is one step, a remark or a heading within a part.
type Line struct {
	Heading string
	Remark  string
	Step    *WorkedStep // nil for a heading or remark
}

// A WorkedStep is one use of a formula. Its mathematics is markup.
type WorkedStep struct {
	ID, Number string // to refer to it: "step-7", "7"
	Equation   string // as mathematics
	Symbol     string // the result's, as mathematics
	Name       string // the result's symbol, as it stands in the text
	Means      string
	Result     string // in SI
	Shown      string // in the project's unit; empty when that is the SI unit
	Expr       string
	Values     []WorkedValue
	Source     string // author, title, year and place
}

// A WorkedValue is what a symbol of a step stands for.
type WorkedValue struct {
	Symbol, Name string // as mathematics, and as it stands in the text
	Value        string // in SI
	Means        string
	From         []Given // what it comes from, with links
	Stepped      bool    // from an earlier step, not from inputs
	Words        string
}

// A Given is an input or an earlier step that a value comes from.
type Given struct {
	Label, URL string
	Basis      string // of an input; empty for a step
}

// NewWorking makes the page of the working.
func NewWorking(s *study.Study, frame Frame) Working {
	sys := s.Project.Spec.System()
	p := Working{Frame: frame,
		Lead: fmt.Sprintf("%s, ISA %s, %s, %s. Each formula is evaluated as it stands, with the SI values under it; results stand in %s units beside them where those differ.",
			sys.Format(units.Altitude, s.View.Altitude), signed(sys, units.TemperatureStep, s.View.Deviation), sys.Format(units.Mass, s.View.Mass), s.View.Config, sys.Label())}
	if s.View.Setting < 1 {
		p.Lead += " The thrust available of the speeds of note is that with the power lever at " + sys.Format(units.Fraction, s.View.Setting) + "."
	}
	w := s.Working()
	t := &teller{study: s, sys: sys, bench: frame.Tabs[0].URL, origins: s.Origins(w), working: w, numbers: map[int]string{}, entries: map[string]input.Entry{}}
	for _, e := range input.Walk(s.Project.Spec) {
		t.entries[e.Path] = e
	}
	cited := map[string]bool{}
	for i, step := range w.Steps {
		if step.Heading && study.IsPart(step.Note) || len(p.Parts) == 0 {
			p.Parts = append(p.Parts, Part{ID: anchor(step.Note), Title: step.Note})
			continue
		}
		part := &p.Parts[len(p.Parts)-1]
		part.Lines = append(part.Lines, t.line(i))
		if f := step.Formula; f != nil && !cited[f.Source.Key] {
			cited[f.Source.Key] = true
			p.Sources = append(p.Sources, f.Source)
		}
	}
	texts := []string{frame.Title + "\n" + p.Lead}
	for i := range p.Parts {
		p.Parts[i].Text = p.Parts[i].plain()
		texts = append(texts, p.Parts[i].Text)
	}
	p.Text = strings.Join(texts, "\n")
	return p
}

// anchor is the id of a part of the working, by its heading; that of a requirement goes by its number.
func anchor(heading string) string {
	if number, _, ok := strings.Cut(heading, ": "); ok {
		heading = number
	}
	return "working-" + strings.NewReplacer(" ", "-", ",", "").Replace(strings.ToLower(heading))
}

// workingURL is the address of the working of a figure on the working page.
func workingURL(page, figure string) string { return page + "#" + anchor(study.WorkingPart(figure)) }

// A teller words the steps of a working.
type teller struct {
	study   *study.Study
	sys     units.System
	bench   string // address of the bench
	working *formula.Working
	origins [][]study.Origin
	numbers map[int]string // of the steps told, by index
	entries map[string]input.Entry
}

// line words the step with the given index in SI units.
func (t *teller) line(i int) Line {
	step := t.working.Steps[i]
	f := step.Formula
	switch {
	case step.Heading:
		return Line{Heading: step.Note}
	case f == nil:
		return Line{Remark: step.Note}
	}
	number := fmt.Sprint(len(t.numbers) + 1)
	t.numbers[i] = number
	l := &WorkedStep{ID: "step-" + number, Number: number, Equation: mathml.Equation(f.Out.Name, f.Tree()), Symbol: mathml.Symbol(f.Out.Name), Name: f.Out.Name,
		Means: f.Out.Meaning, Result: quantity(f.Out.Quantity, step.Out), Expr: f.Expr, Source: f.Source.Citation}
	if u := t.sys.Unit(f.Out.Quantity); u.Symbol != f.Out.Quantity.SI() {
		l.Shown = t.sys.Format(f.Out.Quantity, step.Out)
	}
	if f.Where != "" {
		l.Source += "; " + f.Where
	}
	for j, in := range f.In {
		l.Values = append(l.Values, t.value(in, step.In[j], t.origins[i][j]))
	}
	return Line{Step: l}
}

// value words one symbol and where its value comes from.
func (t *teller) value(sym formula.Symbol, si float64, o study.Origin) WorkedValue {
	v := WorkedValue{Symbol: mathml.Symbol(sym.Name), Name: sym.Name, Value: quantity(sym.Quantity, si), Means: sym.Meaning, Words: o.Words}
	for _, path := range o.Inputs {
		v.From = append(v.From, t.given(path))
	}
	if o.Step >= 0 {
		n := t.numbers[o.Step]
		v.From, v.Stepped = append(v.From, Given{Label: "step " + n, URL: "#step-" + n}), true
	}
	return v
}

// given words an input: its label, with what stands in its field where that is not
// the SI number beside it, and its basis.
func (t *teller) given(path string) Given {
	e := t.entries[path]
	g := Given{Label: e.Label(), URL: t.bench + "#" + elementID(path) + "-field"}
	if e.Number != nil {
		if u := t.sys.Unit(e.Number.Quantity); u.Symbol != e.Number.Quantity.SI() {
			g.Label += " " + t.sys.Entry(e.Number.Quantity, *e.Number.Value) + "\u00a0" + u.Symbol
		}
	}
	e.Path = path
	if b, ok := t.study.Project.Spec.BasisAt(e); ok {
		g.Basis = basisWords(e, b, t.sys)
		if b.Kind == project.Placeholder {
			g.Basis = "placeholder: check it"
		}
	}
	return g
}

// quantity writes an SI value with six significant digits and its SI unit.
func quantity(q units.Quantity, si float64) string {
	text := fmt.Sprintf("%.6g", si)
	if mantissa, exponent, scaled := strings.Cut(text, "e"); scaled {
		text = mantissa + "\u00a0×\u00a010" + raised.Replace(exponent[:1]+strings.TrimLeft(exponent[1:], "0"))
	}
	text = strings.Replace(text, "-", "−", 1)
	if sym := q.SI(); sym != "" {
		return text + "\u00a0" + sym
	}
	return text
}

var raised = strings.NewReplacer("+", "", "-", "⁻", "0", "⁰", "1", "¹", "2", "²", "3", "³", "4", "⁴", "5", "⁵", "6", "⁶", "7", "⁷", "8", "⁸", "9", "⁹")
