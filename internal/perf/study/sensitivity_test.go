package study_test

import (
	"math"
	"slices"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

func swingOf(t *testing.T, s *study.Study, path string) study.Swing {
	t.Helper()
	i := slices.IndexFunc(s.Drivers(), func(d study.Driver) bool { return d.Path == path })
	if i < 0 {
		t.Fatalf("%s is no driver", path)
	}
	return s.Swing(s.Drivers()[i])
}

// TestSwingOfLift: the stall goes with one over the root of CLmax, so a stated ± of it says
// what the swing of the requirement must be.
func TestSwingOfLift(t *testing.T) {
	spec := project.Demo()
	spec.Requirements = []project.Requirement{project.Require("stall_landing", project.AtMost, 20)}
	const path = "airframe.landing.cl_max"
	spec.Variants[0].Basis[path] = project.Basis{Kind: project.Calculated, PlusMinus: 0.39} // a fifth of 1.95
	s := study.All(built(t, spec))[0]
	w := swingOf(t, s, path)
	now := s.Figure("stall_landing").Value
	near(t, "with less lift", w.Low.Value, now/math.Sqrt(0.8), 1e-9)
	near(t, "with more lift", w.High.Value, now/math.Sqrt(1.2), 1e-9)
	near(t, "share", w.Share, (w.Low.Value-now)/20, 1e-9)
	if !w.Stated || w.Low.Input >= w.High.Input || w.Low.Err != nil || w.High.Err != nil {
		t.Errorf("%+v", w)
	}
	// Less drag of the landing flaps moves the stall not at all.
	if w := swingOf(t, s, "airframe.landing.delta_cd"); w.Share != 0 {
		t.Errorf("drag moves the stall by %v", w.Share)
	}
}

// TestDrivers: what is taken at its word is left alone, a stated ± counts whatever the basis.
func TestDrivers(t *testing.T) {
	spec := project.Demo()
	v := &spec.Variants[0]
	v.Basis["airframe.span"] = project.Basis{Kind: project.Measured, PlusMinus: 0.01}
	delete(v.Basis, "airframe.wing_area")
	s := study.All(built(t, spec))[0]
	found := map[string]study.Driver{}
	for _, d := range s.Drivers() {
		found[d.Path] = d
		if d.Half <= 0 || (d.Column == 0 && !d.Stated && math.Abs(d.Half-study.AssumedShare(d.Basis)*math.Abs(d.Value)) > 1e-12) {
			t.Errorf("%+v", d)
		}
	}
	for path, half := range map[string]float64{"airframe.span": 0.01, "airframe.wing_area": 0.2 * 12.1, "airframe.cd_min": 0.003, "airframe.efficiency": 0.077, "powerplant.values.propeller.coefficients": 0.1} {
		near(t, path, found[path].Half, half, 1e-9)
	}
	for _, path := range []string{"weights.empty", "airframe.clean.cl_max", "powerplant.values.engine.power_curve", "airframe.clean.delta_cd"} {
		if _, ok := found[path]; ok {
			t.Errorf("%s is moved: it is taken at its word, or zero", path)
		}
	}
}

// TestRank: what breaks the mission stands first, then the greatest effect.
func TestRank(t *testing.T) {
	list := []study.Swing{{Driver: study.Driver{Path: "b"}, Hand: 0.1}, {Driver: study.Driver{Path: "c"}, Breaks: true}, {Driver: study.Driver{Path: "a"}, Share: 0.1}, {Driver: study.Driver{Path: "d"}, Share: 0.3, Hand: 0.01}}
	study.Rank(list)
	got := ""
	for _, w := range list {
		got += w.Path
	}
	if got != "cdab" {
		t.Errorf("order %s", got)
	}
}

// TestSwingThatBreaks: a driver whose one end ends the mission says so, and the study itself is left as it was.
func TestSwingThatBreaks(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Basis["airframe.cd_min"] = project.Basis{Kind: project.Estimated, PlusMinus: 0.02}
	s := study.All(built(t, spec))[0]
	before := s.Variant().Aircraft.Airframe.CDMin
	w := swingOf(t, s, "airframe.cd_min")
	if !w.Breaks || w.High.Flown || !w.Low.Flown {
		t.Errorf("%+v", w)
	}
	if s.Variant().Aircraft.Airframe.CDMin != before {
		t.Error("the study's own document was changed")
	}
	// The same ends by hand.
	spec.Variants[0].Aircraft.Airframe.CDMin = before - 0.02
	near(t, "low end", w.Low.Hand, study.All(built(t, spec))[0].Figure("thrust_in_hand").Value, 1e-12)
}

// TestSwingRefused: an end that the document does not take is said, and moves nothing.
func TestSwingRefused(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Basis["powerplant.values.fuel.volume"] = project.Basis{Kind: project.Measured, PlusMinus: 0.05}
	s := study.All(built(t, spec))[0]
	w := swingOf(t, s, "powerplant.values.fuel.volume")
	if w.High.Err == nil { // 138 litres in a tank of 100
		t.Errorf("%+v", w.High)
	}
	if w.Low.Err != nil {
		t.Errorf("%v", w.Low.Err)
	}
}

// TestWatched: the requirement missed by most, or the one met by least.
func TestWatched(t *testing.T) {
	spec := project.Demo()
	s := study.All(built(t, spec))
	if got := s[0].Watched().Requirement.Figure; got != "take_off_distance" {
		t.Errorf("watched %s", got)
	}
	if got := s[1].Watched().Requirement.Figure; got != "reserve_time" { // met exactly
		t.Errorf("watched %s", got)
	}
	spec.Requirements = nil
	if s := study.All(built(t, spec))[0]; s.Watched() != nil || s.Swing(s.Drivers()[0]).Share != 0 {
		t.Error("something is watched without requirements")
	}
}

// TestSwingUnderConditions: a requirement with conditions of its own is watched under them.
func TestSwingUnderConditions(t *testing.T) {
	spec := project.Demo()
	r := project.Require("stall_landing", project.AtMost, 20)
	r.MassGiven, r.Mass, r.Airspeed = project.GivenMass, 500, project.Calibrated
	spec.Requirements = []project.Requirement{r}
	const path = "airframe.landing.cl_max"
	spec.Variants[0].Basis[path] = project.Basis{Kind: project.Calculated, PlusMinus: 0.39}
	s := study.All(built(t, spec))[0]
	now := s.Requirements[0].Figure.Value
	if plain := s.Figure("stall_landing").Value; now >= plain {
		t.Fatalf("%v at 500 kg and %v as flown", now, plain)
	}
	near(t, "with less lift", swingOf(t, s, path).Low.Value, now/math.Sqrt(0.8), 1e-3)
}

func BenchmarkSwings(b *testing.B) {
	s := study.All(built(b, project.Demo()))[0]
	for b.Loop() {
		for _, d := range s.Drivers() {
			s.Swing(d)
		}
	}
}
