package views

import (
	"fmt"
	"strings"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A Working is the derivation of a study's numbers as shown.
type Working struct {
	Frame
	Lead    string
	Parts   []Part
	Sources []formula.Source
}

// A Part is a run of steps under a heading.
type Part struct {
	ID    string // empty for a part that no figure points to
	Title string
	Lines []Line
}

// A Line is one step, or a remark when it has no formula.
type Line struct {
	Remark string
	Result string // name and value
	Means  string
	Expr   string
	Inputs []string
	Source string
}

// NewWorking makes the page of the working.
func NewWorking(s *study.Study, frame Frame) Working {
	sys := s.Project.Spec.System()
	p := Working{Frame: frame,
		Lead: fmt.Sprintf("%s, ISA %s, %s, %s. Formulas stand in SI units; symbols are explained where they are used.", sys.Format(units.Altitude, s.View.Altitude),
			signed(sys, units.TemperatureStep, s.View.Deviation), sys.Format(units.Mass, s.View.Mass), s.View.Config)}
	if s.View.Setting < 1 {
		p.Lead += " The thrust available of the speeds of note is that with the power lever at " + sys.Format(units.Fraction, s.View.Setting) + "."
	}
	w := s.Working()
	seen := map[string]bool{}
	for _, step := range w.Steps {
		if step.Heading || len(p.Parts) == 0 {
			p.Parts = append(p.Parts, Part{ID: anchor(step.Note), Title: step.Note})
			continue
		}
		part := &p.Parts[len(p.Parts)-1]
		part.Lines = append(part.Lines, line(step))
		if f := step.Formula; f != nil && !seen[f.Source.Key] {
			seen[f.Source.Key] = true
			p.Sources = append(p.Sources, f.Source)
		}
	}
	return p
}

// anchors are the ids of the parts of the working that figures and pages point to, by heading.
var anchors = func() map[string]string {
	m := map[string]string{}
	headings := []string{study.StructurePart}
	for _, k := range project.FigureKinds() {
		headings = append(headings, study.WorkingPart(k.ID))
	}
	for _, heading := range headings {
		m[heading] = "working-" + strings.NewReplacer(" ", "-", ",", "").Replace(strings.ToLower(heading))
	}
	return m
}()

// anchor is the id of the part of the working with that heading, empty for one that nothing points to.
func anchor(heading string) string {
	if number, _, ok := strings.Cut(heading, ": "); ok && strings.HasPrefix(number, "Requirement ") {
		return "working-requirement-" + strings.TrimPrefix(number, "Requirement ")
	}
	return anchors[heading]
}

// workingURL is the address of the working of a figure on the working page.
func workingURL(page, figure string) string { return page + "#" + anchors[study.WorkingPart(figure)] }

// line words a step in SI units.
func line(step formula.Step) Line {
	f := step.Formula
	if f == nil {
		return Line{Remark: step.Note}
	}
	l := Line{Result: f.Out.Name + " = " + quantity(f.Out.Quantity, step.Out), Means: f.Out.Meaning, Expr: f.Out.Name + " = " + strings.ReplaceAll(f.Expr, "*", " · "), Source: f.Source.Key}
	if f.Where != "" {
		l.Source += ", " + f.Where
	}
	for i, in := range f.In {
		l.Inputs = append(l.Inputs, fmt.Sprintf("%s = %s, %s", in.Name, quantity(in.Quantity, step.In[i]), in.Meaning))
	}
	return l
}

// quantity writes an SI value with six significant digits and its SI unit.
func quantity(q units.Quantity, si float64) string {
	text := strings.Replace(fmt.Sprintf("%.6g", si), "-", "−", 1)
	if sym := q.SI(); sym != "" {
		return text + "\u00a0" + sym
	}
	return text
}
