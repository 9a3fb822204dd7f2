package study_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

// sayOtherwise gives the drag and the lift of every variant in other ways, as the page does.
func sayOtherwise(s *project.Spec, way, lift string) {
	for i := range s.Variants {
		f := &s.Variants[i].Aircraft.Airframe
		at := fmt.Sprintf("variants[%d].aircraft.airframe.", i)
		from := f.DragGiven
		f.DragGiven = way
		input.Convert(s, at+"drag_given", from)
		for path, c := range map[string]*aircraft.Configuration{"clean": &f.Clean, "take_off": &f.TakeOff, "landing": &f.Landing} {
			from := c.LiftGiven
			c.LiftGiven = lift
			input.Convert(s, at+path+".lift_given", from)
		}
	}
}

// said is the demo with its drag and lift given in other ways.
func said(t *testing.T, way, lift string) *project.Spec {
	t.Helper()
	s := project.Demo()
	sayOtherwise(s, way, lift)
	return s
}

func run(t *testing.T, s *project.Spec) *study.Study {
	t.Helper()
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	return study.Run(p, 0, study.DefaultView(p, 0))
}

// However the polar and the lift are said, every figure of the study stays.
func TestSaidOtherwise(t *testing.T) {
	want := run(t, project.Demo())
	for _, o := range aircraft.DragWays {
		got := run(t, said(t, o.Value, aircraft.ByStall))
		tol := 1e-8 // roots and integrals are found to 1e-10 and better
		if o.Value == aircraft.ByTable {
			tol = 2e-3 // the cubic between the rows
		}
		for i := range want.Figures {
			a, b := &got.Figures[i], &want.Figures[i]
			if a.Has() != b.Has() || math.Abs(a.Value-b.Value) > tol*math.Abs(b.Value) {
				t.Errorf("%s: %s is %v, was %v", o.Value, a.ID, a.Value, b.Value)
			}
		}
		if n := len(got.Placeholders()); o.Value != aircraft.ByBuildUp && n != len(want.Placeholders()) {
			t.Errorf("%s: placeholders %v", o.Value, got.Placeholders())
		}
	}
}

func TestBuildUpIsRestedOn(t *testing.T) {
	s := said(t, aircraft.ByBuildUp, aircraft.ByCLMax)
	f := &s.Variants[0].Aircraft.Airframe
	f.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "Wing")}
	const length = "airframe.components[0].length"
	st := run(t, s)
	if !slices.Contains(st.Placeholders(), length) || !slices.Contains(st.Unsure(st.Figure("climb_rate")), length) || slices.Contains(st.Unsure(st.Figure("static_thrust")), length) {
		t.Errorf("placeholders %v", st.Placeholders())
	}
	f.DragGiven = aircraft.ByParabola
	if st = run(t, s); slices.Contains(st.Placeholders(), length) {
		t.Error("a list of no consequence counts as a placeholder")
	}
}

func TestStallRestsOnTheSpeedGiven(t *testing.T) {
	s := said(t, aircraft.ByParabola, aircraft.ByStall)
	s.Variants[0].Basis["airframe.landing.stall_speed"] = project.Basis{Kind: project.Placeholder}
	st := run(t, s)
	if got := st.Unsure(st.Figure("stall_landing")); !slices.Contains(got, "airframe.landing.stall_speed") {
		t.Errorf("the landing stall rests on %v", got)
	}
	s.Variants[0].Basis["airframe.clean.stall_speed"] = project.Basis{Kind: project.Placeholder}
	s.Requirements = []project.Requirement{project.Require("maneuvering_speed", project.AtLeast, 0)}
	loaded := run(t, s)
	if got := loaded.Unsure(loaded.Requirements[0].Figure); !slices.Contains(got, "airframe.clean.stall_speed") {
		t.Errorf("the manoeuvring speed rests on %v", got)
	}
	if got := st.Unsure(st.Figure("stall_clean")); slices.Contains(got, "airframe.landing.stall_speed") {
		t.Errorf("the clean stall rests on %v", got)
	}
}

func warned(s *study.Study, code string) bool {
	return slices.ContainsFunc(s.Warnings, func(w study.Warning) bool { return w.Code == code })
}

func TestSkinOnly(t *testing.T) {
	s := said(t, aircraft.ByBuildUp, aircraft.ByCLMax)
	f := &s.Variants[0].Aircraft.Airframe
	wing := dragbuild.New(dragbuild.Surface, "Wing")
	wing.WettedArea = 60
	f.Components, f.Unlisted = []dragbuild.Component{wing}, 0
	if !warned(run(t, s), "skin-only") {
		t.Error("clean skin alone is not warned of")
	}
	gear := dragbuild.New(dragbuild.ByDragArea, "Gear")
	f.Components = append(f.Components, gear)
	if warned(run(t, s), "skin-only") || warned(run(t, project.Demo()), "skin-only") {
		t.Error("warned of what is no clean skin")
	}
}

// The working begins with how the polar follows from what is given.
func TestDragIsWorkedOut(t *testing.T) {
	for way, ids := range map[string][]string{
		aircraft.ByParabola:  {"polar.induced-factor"},
		aircraft.ByDragArea:  {"polar.drag-area", "polar.induced-factor"},
		aircraft.ByBestGlide: {"polar.glide-lift", "polar.best-glide-factor", "polar.best-glide-minimum", "aircraft.span-efficiency"},
		aircraft.ByBuildUp:   {"drag.whole", "polar.drag-area", "polar.induced-factor"},
		aircraft.ByTable:     {},
	} {
		w := run(t, said(t, way, aircraft.ByStall)).Working()
		var got []string
		for _, step := range w.Steps[1:] {
			if step.Heading {
				break
			}
			if step.Formula != nil {
				got = append(got, step.Formula.ID)
			}
		}
		if want := ids; !strings.HasPrefix(w.Steps[0].Note, "The clean drag polar") || !slices.Equal(got, want) {
			t.Errorf("%s: %q, %v, want %v", way, w.Steps[0].Note, got, want)
		}
		part, lifts := "", ""
		for _, step := range w.Steps {
			if step.Heading {
				part = step.Note
			}
			if step.Formula != nil && step.Formula.ID == "polar.stall-lift" {
				lifts += part + ", "
			}
		}
		if lifts != "Stall, Take-off, Landing, " {
			t.Errorf("%s: CLmax is worked out in %s", way, lifts)
		}
	}
}

// The polar drawn is the one flown, and its best ratio the closed form's.
func TestPolars(t *testing.T) {
	s := run(t, project.Demo())
	e, err := s.Variant().Aircraft.Equivalent()
	if err != nil {
		t.Fatal(err)
	}
	list := s.Polars()
	if len(list) != 3 {
		t.Fatalf("%d polars", len(list))
	}
	k := list[0]
	if math.Abs(k.Best.Ratio()-e.GlideRatio) > 1e-9*e.GlideRatio || math.Abs(k.Best.EAS-e.GlideSpeed) > 1e-5*e.GlideSpeed {
		t.Errorf("best %v at %v, want %v at %v", k.Best.Ratio(), k.Best.EAS, e.GlideRatio, e.GlideSpeed)
	}
	for _, k := range list {
		for i, q := range k.Points {
			if want := s.Aircraft().Polar(k.Config).CD(q.CL, 1, nil); q.CD != want || i > 0 && q.CL <= k.Points[i-1].CL || q.Ratio() > k.Best.Ratio()*(1+1e-12) {
				t.Fatalf("%s: %+v", k.Config, q)
			}
		}
		if last := k.Points[len(k.Points)-1]; math.Abs(last.CL-k.CLMax) > 1e-12 || math.Abs(last.EAS-k.Stall) > 1e-9 {
			t.Errorf("%s ends at %+v", k.Config, last)
		}
	}
}
