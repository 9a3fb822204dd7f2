package study

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/runway"
)

// An Origin says where the value of a symbol in a step of the working comes from.
type Origin struct {
	Inputs []string // paths in the document of the inputs that it is, or is made of
	Step   int      // index of the earlier step whose result it is or is made of; -1 when there is none
	Words  string   // how it is made, a constant's name, or what was chosen; may be empty beside an input or a step
}

// Known reports whether anything is said.
func (o Origin) Known() bool { return len(o.Inputs) > 0 || o.Step >= 0 || o.Words != "" }

// A claim is one possible origin of a symbol. It is shown only where it holds:
// the inputs or the step named must give the very number that the step used.
type claim struct {
	paths []string                  // of inputs; an element of places may stand first, {config} is the configuration of the part, {component} that of the drag build-up
	steps []string                  // identifiers of formulas
	of    func(v []float64) float64 // of the inputs' or the step's values; nil for the value itself
	read  bool                      // from the inputs by interpolation or search, which is not done again here
	only  []float64                 // the values for which the words hold; nil for any
	words string
}

// given is the value of an input.
func given(path string) claim { return claim{paths: []string{path}} }

// made is a function of inputs.
func made(words string, of func(v []float64) float64, paths ...string) claim {
	return claim{paths: paths, of: of, words: words}
}

// read is read or searched from inputs; those that do not matter are left out.
func read(words string, paths ...string) claim { return claim{paths: paths, read: true, words: words} }

// result is what the nearest earlier step with one of the formulas gave.
func result(formulas ...string) claim { return claim{steps: formulas} }

// after is a function of the result of an earlier step.
func after(words string, of func(v []float64) float64, formulas ...string) claim {
	return claim{steps: formulas, of: of, words: words}
}

// exactly is said of one value only.
func exactly(value float64, words string) claim { return claim{only: []float64{value}, words: words} }

// said holds always: a constant, or what the remarks of the part explain.
func said(words string) claim { return claim{words: words} }

// Origins says where each value in the steps of w comes from, by step and symbol.
// A symbol is known by what it means, so the same words stand for the same thing in every formula.
func (s *Study) Origins(w *formula.Working) [][]Origin {
	t := &tracer{working: w, numbers: map[string]float64{}, tables: map[string]bool{}, places: map[string]string{
		"aircraft":  fmt.Sprintf("variants[%d].aircraft", s.Index),
		"departure": s.strip(s.Project.Departure.Strip), "arrival": s.strip(s.Project.Arrival.Strip)}}
	for _, e := range input.Walk(s.Project.Spec) {
		switch {
		case e.Idle:
		case e.Number != nil:
			t.numbers[e.Path] = *e.Number.Value
		case e.Table != nil:
			t.tables[e.Path] = true
		}
	}
	list := make([][]Origin, len(w.Steps))
	for i, step := range w.Steps {
		if step.Heading && IsPart(step.Note) {
			t.config, t.component = s.partConfig(step.Note), -1
		}
		if step.Formula == nil {
			if !step.Heading {
				t.component++ // in a build-up each begins with its name
			}
			continue
		}
		for j, sym := range step.Formula.In {
			list[i] = append(list[i], t.origin(i, sym.Meaning, step.In[j]))
		}
	}
	return list
}

// strip is where a strip stands in the document.
func (s *Study) strip(r runway.Strip) string {
	return fmt.Sprintf("strips[%d]", slices.Index(s.Project.Spec.Strips, r))
}

// partConfig is the configuration in which a part of the working is flown, as the document names it.
func (s *Study) partConfig(part string) string {
	c := aircraft.Clean
	switch part {
	case partAir, partStall, partRate, partMaximum:
		c = s.View.Config
	case partTakeOff:
		c = aircraft.TakeOff
	case partLanding:
		c = aircraft.Landing
	}
	for i := range s.Requirements {
		if v := &s.Requirements[i]; v.ownTerms() && v.WorkingPart() == part {
			c = configOf(v.Figure.FigureKind, &v.Requirement)
		}
	}
	return map[aircraft.Config]string{aircraft.Clean: "clean", aircraft.TakeOff: "take_off", aircraft.Landing: "landing"}[c]
}

// A tracer follows values back through a working.
type tracer struct {
	working *formula.Working
	numbers map[string]float64 // inputs that matter, by path
	tables  map[string]bool
	places  map[string]string // parts of the document that claims name, with their paths
	config  string            // of the part

	component int // of the drag build-up that is being worked out; -1 before the first
}

// origin is the first claim about the meaning that holds for the value in step i.
func (t *tracer) origin(i int, meaning string, value float64) Origin {
	for _, c := range claims[meaning] {
		if o, ok := t.holds(c, i, value); ok {
			return o
		}
	}
	return Origin{Step: -1}
}

func (t *tracer) holds(c claim, i int, value float64) (Origin, bool) {
	o := Origin{Step: -1, Words: c.words}
	if len(c.steps) > 0 {
		o.Step = t.step(c, i, value)
		return o, o.Step >= 0
	}
	if c.only != nil {
		return o, slices.Contains(c.only, value)
	}
	values := make([]float64, 0, len(c.paths))
	for _, path := range c.paths {
		path = t.path(path)
		v, number := t.numbers[path]
		switch {
		case number:
			values = append(values, v)
		case !c.read:
			return o, false
		case !t.tables[path]:
			continue
		}
		o.Inputs = append(o.Inputs, path)
	}
	if c.read || len(c.paths) == 0 {
		return o, len(c.paths) == 0 || len(o.Inputs) > 0
	}
	return o, alike(c.value(values), value)
}

// path completes the path of a claim.
func (t *tracer) path(path string) string {
	path = strings.NewReplacer("{config}", t.config, "{component}", strconv.Itoa(t.component)).Replace(path)
	if first, rest, ok := strings.Cut(path, "."); ok && t.places[first] != "" {
		return t.places[first] + "." + rest
	}
	return path
}

// value is what the claim makes of the inputs or results.
func (c claim) value(v []float64) float64 {
	if c.of == nil {
		return v[0]
	}
	return c.of(v)
}

// alike allows only for the order of a few operations.
func alike(a, b float64) bool { return a == b || math.Abs(a-b) <= 1e-12*math.Abs(b) }

// step finds the nearest step before i that the claim is true of, -1 when there is none.
func (t *tracer) step(c claim, i int, value float64) int {
	for k := i - 1; k >= 0; k-- {
		if s := &t.working.Steps[k]; s.Formula != nil && slices.Contains(c.steps, s.Formula.ID) && alike(c.value([]float64{s.Out}), value) {
			return k
		}
	}
	return -1
}
