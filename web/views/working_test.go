package views

import (
	"bytes"
	"regexp"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// workingOf makes the page of the demo's variant with the given index after a change.
func workingOf(t testing.TB, variant int, change func(*project.Spec)) (*study.Study, Working, string) {
	t.Helper()
	s := project.Demo()
	if change != nil {
		change(s)
	}
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	st := study.Run(p, variant, study.DefaultView(p, variant))
	page := NewWorking(st, NewFrame(st, 1, "/working", "", nil))
	var b bytes.Buffer
	if err := WorkingPage(page).Render(t.Context(), &b); err != nil {
		t.Fatal(err)
	}
	return st, page, b.String()
}

var (
	idIn   = regexp.MustCompile(`\sid="([^"]*)"`)
	hrefIn = regexp.MustCompile(`href="([^"]*)"`)
)

func idsOf(t testing.TB, page string) map[string]bool {
	t.Helper()
	ids := map[string]bool{}
	for _, m := range idIn.FindAllStringSubmatch(page, -1) {
		if ids[m[1]] {
			t.Errorf("the id %s stands twice", m[1])
		}
		ids[m[1]] = true
	}
	return ids
}

// TestWorkingLinks: every figure's link, every link to a step and every link to an input has its end.
func TestWorkingLinks(t *testing.T) {
	for variant := range project.Demo().Variants {
		st, _, page := workingOf(t, variant, nil)
		ids := idsOf(t, page)
		for _, k := range project.FigureKinds() {
			_, id, _ := strings.Cut(workingURL("/working", k.ID), "#")
			if !ids[id] {
				t.Errorf("%s: there is no part %s", k.ID, id)
			}
		}
		var b bytes.Buffer
		if err := BenchPage(NewBench(st, State{ProjectID: 1})).Render(t.Context(), &b); err != nil {
			t.Fatal(err)
		}
		fields := idsOf(t, b.String())
		inputs, steps := 0, 0
		for _, m := range hrefIn.FindAllStringSubmatch(page, -1) {
			path, id, linked := strings.Cut(m[1], "#")
			switch {
			case !linked:
			case path == "":
				steps++
				if !ids[id] {
					t.Errorf("there is no %s on the page", id)
				}
			default:
				inputs++
				if path != "/projects/1/variants/"+st.Variant().ID || !fields[id] {
					t.Errorf("the bench has no %s#%s", path, id)
				}
			}
		}
		if inputs < 60 || steps < 60 {
			t.Errorf("%d links to inputs, %d to steps", inputs, steps)
		}
	}
}

// TestWorkingSteps: each step has its mathematics, its source and what its symbols are, on the page and as text.
func TestWorkingSteps(t *testing.T) {
	st, p, page := workingOf(t, 0, nil)
	n := 0
	for _, part := range p.Parts {
		if part.ID == "" || !strings.Contains(p.Text, part.Text) {
			t.Errorf("part %q: id %q, or not in the whole text", part.Title, part.ID)
		}
		for _, l := range part.Lines {
			if l.Step == nil {
				continue
			}
			n++
			s := l.Step
			for _, want := range []string{"(" + s.Number + ") ", s.Name + " = " + s.Expr, s.Result, s.Source} {
				if want == "" || !strings.Contains(part.Text, want) {
					t.Errorf("step %s: %q is not in the text", s.Number, want)
				}
			}
			if !strings.Contains(page, s.Equation) || !strings.Contains(s.Equation, `alttext="`+s.Name+" = ") {
				t.Errorf("step %s: no mathematics", s.Number)
			}
			for _, v := range s.Values {
				if v.Means == "" || v.Value == "" || len(v.From) == 0 && v.Words == "" {
					t.Errorf("step %s, %s: %+v", s.Number, v.Name, v)
				}
			}
		}
	}
	formulas := 0
	for _, step := range st.Working().Steps {
		if step.Formula != nil {
			formulas++
		}
	}
	if n != formulas {
		t.Errorf("%d steps shown of %d", n, formulas)
	}
}

// TestWorkingUnits: formulas in SI, the result beside it in the project's unit, inputs as they stand on the bench.
func TestWorkingUnits(t *testing.T) {
	find := func(p Working, id string) *WorkedStep {
		for _, part := range p.Parts {
			for _, l := range part.Lines {
				if l.Step != nil && l.Step.Means == id {
					return l.Step
				}
			}
		}
		t.Fatalf("no step gives the %s", id)
		return nil
	}
	_, metric, _ := workingOf(t, 0, nil)
	_, aviation, page := workingOf(t, 0, func(s *project.Spec) { s.Display = string(units.Aviation) })
	if s := find(metric, "stall speed"); s.Result != "25.0006\u00a0m/s" || s.Shown != "" {
		t.Errorf("metric: %q, %q", s.Result, s.Shown)
	}
	s := find(aviation, "stall speed")
	if s.Result != "25.0006\u00a0m/s" || s.Shown != "48.6\u00a0kt" { // 25.0006 × 3600/1852 = 48.597
		t.Errorf("aviation: %q, %q", s.Result, s.Shown)
	}
	area := s.Values[2]
	// 12.1 / 0.3048²
	if area.Value != "12.1\u00a0m²" || area.From[0].Label != "Wing area 130.2433\u00a0ft²" || area.From[0].Basis != "measured" {
		t.Errorf("%+v", area)
	}
	if want := "results stand in " + units.Aviation.Label() + " units beside them"; !strings.Contains(page, want) {
		t.Errorf("the page does not say %q", want)
	}
}

// TestWorkingNamesPlaceholders: a number that rests on a placeholder says so where it is used.
func TestWorkingNamesPlaceholders(t *testing.T) {
	if _, _, page := workingOf(t, 0, nil); strings.Contains(page, "placeholder: check it") {
		t.Error("the demo has no placeholders")
	}
	_, _, page := workingOf(t, 0, func(s *project.Spec) {
		s.Variants[0].SetBasis("airframe.wing_area", project.Basis{Kind: project.Placeholder})
		s.Variants[0].SetBasis("airframe.span", project.Basis{Kind: project.Measured, PlusMinus: 0.02, Note: "tape"})
	})
	for _, want := range []string{"placeholder: check it", "measured, ± 0.02 m, tape"} {
		if !strings.Contains(page, want) {
			t.Errorf("the page does not say %q", want)
		}
	}
}

func TestQuantity(t *testing.T) {
	for _, c := range []struct {
		q    units.Quantity
		si   float64
		want string
	}{
		{units.Speed, 25.000639, "25.0006\u00a0m/s"}, {units.Coefficient, -0.5, "−0.5"}, {units.Consumption, 8.21e-8, "8.21\u00a0×\u00a010⁻⁸\u00a0kg/J"},
		{units.Power, 1.25e6, "1.25\u00a0×\u00a010⁶\u00a0W"}, {units.Force, -3.07e-10, "−3.07\u00a0×\u00a010⁻¹⁰\u00a0N"}, {units.Pressure, 101325, "101325\u00a0Pa"}, {units.Force, 0, "0\u00a0N"},
	} {
		if got := quantity(c.q, c.si); got != c.want {
			t.Errorf("%v is written %q, want %q", c.si, got, c.want)
		}
	}
}

// TestWorkingEscapes: names of the user's are text in the page.
func TestWorkingEscapes(t *testing.T) {
	_, _, page := workingOf(t, 0, func(s *project.Spec) {
		s.Strips[0].Name = `<b id="x">`
		for i := range s.Legs {
			if s.Legs[i].Strip != "" {
				s.Legs[i].Strip = s.Strips[0].Name
			}
		}
	})
	if strings.Contains(page, `<b id="x">`) || !strings.Contains(page, "&lt;b id=") {
		t.Error("a strip's name is markup")
	}
}
