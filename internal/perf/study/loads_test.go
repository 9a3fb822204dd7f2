package study_test

import (
	"math"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func structured(t *testing.T, change func(*loads.Limits, *project.Spec, *study.View)) (*study.Study, *study.Structure) {
	t.Helper()
	s, v := project.Demo(), study.View{}
	change(&s.Variants[0].Aircraft.Limits, s, &v)
	p := built(t, s)
	view := study.DefaultView(p, 0)
	if v.Mass > 0 {
		view.Mass = v.Mass
	}
	if v.Altitude > 0 {
		view.Altitude = v.Altitude
	}
	st := study.Run(p, 0, view)
	return st, st.Structure()
}

func TestStructureOfTheDemo(t *testing.T) {
	s, e := structured(t, func(*loads.Limits, *project.Spec, *study.View) {})
	if !e.Given || e.Err != nil || len(e.Cautions) != 0 {
		t.Fatalf("given %t, %v, cautions %+v", e.Given, e.Err, e.Cautions)
	}
	finiteIn(t, "structure", reflect.ValueOf(*e.Diagram))
	// The stall of the envelope is that of the speeds of note, as equivalent airspeed.
	if want := float64(e.Air.EAS(s.Speeds.Stall.TAS)); math.Abs(e.Diagram.Stall-want) > 1e-9 {
		t.Errorf("stalls at %g m/s EAS, the speeds of note say %g", e.Diagram.Stall, want)
	}
	// VA is where the load factor at maximum lift is the limit.
	p := s.Point
	if n := pointperf.LiftLoad(s.Aircraft(), &p, e.Air.FromEAS(atmos.EAS(e.Diagram.Maneuver)), nil); math.Abs(n-4.8) > 1e-9 {
		t.Errorf("at VA lift gives %g", n)
	}
	for i, c := range e.Masses {
		if c.Mass > 650 {
			t.Errorf("limits at %g kg, more than the greatest take-off mass", c.Mass)
		}
		if c.Err != nil || i > 0 && c.Diagram.CruiseGust.Up >= e.Masses[i-1].Diagram.CruiseGust.Up {
			t.Errorf("%s: %v, gust %+v", c.Label, c.Err, c.Diagram.CruiseGust)
		}
	}
	// The rule's VC lies above 0.9 of this aeroplane's level maximum at sea level, so that it may be lower.
	if e.Relief <= 40 || e.Relief >= e.Design.Least.Cruise {
		t.Errorf("VC may be %g, least %g", e.Relief, e.Design.Least.Cruise)
	}
}

func TestStructureCautions(t *testing.T) {
	for code, c := range map[string]struct {
		change func(*loads.Limits, *project.Spec, *study.View)
		level  study.Level
		says   string
	}{
		"never-exceed-too-fast": {func(l *loads.Limits, s *project.Spec, _ *study.View) { l.Dive = 83 }, study.Caution, "75.0\u00a0m/s, is more than 0.9 of the design dive speed, 74.7\u00a0m/s of 83.0"},
		"limits-outside-rule":   {func(l *loads.Limits, s *project.Spec, _ *study.View) { s.Variants[0].Aircraft.Weights.MaxTakeOff = 760 }, study.Caution, "up to 750.0\u00a0kg"},
		"limit-factor-low":      {func(l *loads.Limits, s *project.Spec, _ *study.View) { l.Positive = 3.5 }, study.Caution, "3.8"},
		"design-cruise-slow":    {func(l *loads.Limits, s *project.Spec, _ *study.View) { l.Cruise = 40 }, study.Caution, "40.0\u00a0m/s"},
		"design-dive-slow":      {func(l *loads.Limits, s *project.Spec, _ *study.View) { l.Dive = 66 }, study.Caution, "asks for, 75.0\u00a0m/s"},
		"maneuver-above-cruise": {func(l *loads.Limits, s *project.Spec, _ *study.View) { l.Cruise = 50 }, study.Info, "lies above"},
		"gust-above-limit":      {func(l *loads.Limits, s *project.Spec, v *study.View) { v.Mass = 420 }, study.Caution, "at 420.0\u00a0kg the gusts"},
		"limits-overweight":     {func(l *loads.Limits, s *project.Spec, v *study.View) { v.Mass = 660 }, study.Caution, "up to the greatest take-off mass, 650.0\u00a0kg; at 660.0"},
		"no-load-envelope":      {func(l *loads.Limits, s *project.Spec, v *study.View) { v.Mass = 6000 }, study.Caution, "is not below the design cruising speed"},
	} {
		s, e := structured(t, c.change)
		found := false
		for _, w := range e.Cautions {
			if w.Code == code {
				found = true
				if w.Level != c.level || w.About != "limits" || w.Clear == "" || !strings.Contains(w.Text.In(units.Metric), c.says) || strings.Contains(w.Text.In(units.Metric), "{}") {
					t.Errorf("%s: %s %q", code, w.Level, w.Text.In(units.Metric))
				}
			}
		}
		if !found {
			t.Errorf("%s is not raised among %+v", code, e.Cautions)
		}
		among := 0
		for _, w := range s.Warnings {
			if w.About == "limits" {
				among++
			}
		}
		if among != len(e.Cautions) {
			t.Errorf("%s: %d of %d cautions stand among the warnings", code, among, len(e.Cautions))
		}
	}
	if _, e := structured(t, func(l *loads.Limits, _ *project.Spec, _ *study.View) { l.Dive = 70 }); e.Cautions[0].Level != study.Stop {
		t.Errorf("a never-exceed speed above VD: %+v", e.Cautions)
	}
}

// A rule lets VC come down to 0.9 of the level maximum at sea level, and VD with it.
func TestRelief(t *testing.T) {
	_, e := structured(t, func(*loads.Limits, *project.Spec, *study.View) {})
	_, at := structured(t, func(l *loads.Limits, s *project.Spec, _ *study.View) {
		l.Cruise, l.Dive, s.Variants[0].Aircraft.Airframe.NeverExceed = e.Relief, 1.4*e.Relief, 1.2*e.Relief
	})
	_, under := structured(t, func(l *loads.Limits, s *project.Spec, _ *study.View) {
		l.Cruise, l.Dive, s.Variants[0].Aircraft.Airframe.NeverExceed = 0.99*e.Relief, 1.38*e.Relief, 1.2*e.Relief
	})
	raised := func(e *study.Structure) (list []string) {
		for _, w := range e.Cautions {
			if strings.HasPrefix(w.Code, "design-") {
				list = append(list, w.Code)
			}
		}
		return list
	}
	if got := raised(at); got != nil {
		t.Errorf("at 0.9 of the level maximum: %v", got)
	}
	if got := raised(under); !reflect.DeepEqual(got, []string{"design-cruise-slow", "design-dive-slow"}) {
		t.Errorf("below 0.9 of the level maximum: %v", got)
	}
}

func TestNothingEntered(t *testing.T) {
	s, e := structured(t, func(l *loads.Limits, _ *project.Spec, _ *study.View) { *l = loads.Unentered() })
	if e.Given || e.Diagram != nil || len(e.Cautions) != 0 || e.TurnCaution(s.Envelope()) != nil {
		t.Errorf("%+v", e)
	}
	said := false
	for _, step := range s.Working().Steps {
		said = said || strings.Contains(step.Note, "no structural limits are entered")
	}
	if !said {
		t.Error("the working does not say that nothing is entered")
	}
}

// A turn that thrust holds beyond the limit is named.
func TestTurnCaution(t *testing.T) {
	s, e := structured(t, func(l *loads.Limits, s *project.Spec, _ *study.View) {
		l.Positive = 1.5
		s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Mass = 20
	})
	w := e.TurnCaution(s.Envelope())
	if w == nil || !strings.Contains(w.Text.In(units.Metric), "beyond the limit of 1.5") {
		t.Fatalf("%+v", w)
	}
	_, calm := structured(t, func(*loads.Limits, *project.Spec, *study.View) {})
	if w := calm.TurnCaution(s.Envelope()); w != nil {
		t.Errorf("4.8 is enough: %s", w.Text.In(units.Metric))
	}
}

// Requirements can name VA and the greatest load factor, under a mass and an altitude of their own.
func TestLoadRequirements(t *testing.T) {
	light := project.Require("gust_load", project.AtMost, 4.8)
	light.MassGiven, light.Mass = project.GivenMass, 420
	maneuver := project.Require("maneuvering_speed", project.AtLeast, 45)
	ask := func(change func(*loads.Limits)) []study.Verdict {
		s, _ := structured(t, func(l *loads.Limits, s *project.Spec, _ *study.View) {
			change(l)
			s.Requirements = []project.Requirement{project.Require("gust_load", project.AtMost, 4.8), light, maneuver}
		})
		return s.Requirements
	}
	_, at := structured(t, func(_ *loads.Limits, _ *project.Spec, v *study.View) { v.Mass = 420 })
	_, start := structured(t, func(*loads.Limits, *project.Spec, *study.View) {})
	got := ask(func(*loads.Limits) {})
	if !got[0].Met || got[1].Met || got[1].Figure.Value != at.Diagram.Greatest.Load || !got[2].Met || got[2].Figure.Value != start.Diagram.Maneuver {
		t.Errorf("%+v, %+v, %+v", got[0].Figure, got[1].Figure, got[2].Figure)
	}
	for _, v := range ask(func(l *loads.Limits) { *l = loads.Unentered() }) {
		if v.Judged() || v.Met || !strings.Contains(v.Reason.In(units.Metric), "no structural limits are entered") {
			t.Errorf("without limits: %t, %q", v.Met, v.Reason.In(units.Metric))
		}
	}
}
