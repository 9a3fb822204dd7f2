package study_test

import (
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// withLegs studies the demo with more legs before its descent, and others after its reserve.
func withLegs(t testing.TB, before, after []mission.Leg) *study.Study {
	t.Helper()
	s := project.Demo()
	s.Legs = append(slices.Insert(s.Legs, 6, before...), after...)
	p := built(t, s)
	return study.Run(p, 0, study.DefaultView(p, 0))
}

func changed(kind string, change func(*mission.Leg)) mission.Leg {
	l := mission.NewLeg(kind, "The "+kind)
	if change != nil {
		change(&l)
	}
	return l
}

// codes are the codes of the warnings about the mission, with their texts.
func codes(s *study.Study) map[string]string {
	all := map[string]string{}
	for _, w := range s.Warnings {
		if w.About == "mission" {
			all[w.Code] += w.Text.In(units.Metric) + "\n"
		}
	}
	return all
}

// Where the tightest point is in a turn, its working is that of the turn: it ends with the thrust in hand of the flight.
func TestTightestWorkingOfATurn(t *testing.T) {
	s := withLegs(t, []mission.Leg{changed(mission.Turns, func(l *mission.Leg) { l.Bank = 0.85 })}, nil)
	tight := s.Flight.Tightest
	if s.Project.Spec.Legs[tight.Leg].Kind != mission.Turns {
		t.Fatalf("tightest in leg %d", tight.Leg)
	}
	w := s.Working()
	formulatest.Record{}.Check(t, *w)
	turning, hand := false, math.NaN()
	for _, step := range w.Steps {
		turning = turning || step.Formula != nil && step.Formula.ID == "turn.lift"
		if step.Formula != nil && step.Formula.ID == "thrust.in-hand" {
			hand = step.Out
		}
	}
	if !turning || math.Abs(hand-(tight.Available-tight.Required)) > 1e-9*math.Abs(hand) {
		t.Errorf("turn in the working %v, thrust in hand %g N, flown with %g N", turning, hand, tight.Available-tight.Required)
	}
}

// The load factor of turns is held against the structural limits, and where there are none that is said.
func TestTurnsAgainstTheStructure(t *testing.T) {
	turn := func(load float64, change func(*project.Spec)) string {
		s := project.Demo()
		s.Legs = slices.Insert(s.Legs, 6, changed(mission.Turns, func(l *mission.Leg) { l.Path, l.Load, l.Turns = mission.ByLoad, load, 0 }))
		change(s)
		p := built(t, s)
		return codes(study.Run(p, 0, study.DefaultView(p, 0)))["turn-load"]
	}
	asIs := func(*project.Spec) {}
	without := func(s *project.Spec) { s.Variants[0].Aircraft.Limits.Rule = loads.NoRule }
	a, _ := built(t, project.Demo()).Aircraft[0].Structure(nil)
	if text := turn(a.Positive-0.01, asIs); text != "" {
		t.Errorf("within the limit: %q", text)
	}
	if text := turn(a.Positive+0.01, asIs); !strings.Contains(text, "beyond the limit of") {
		t.Errorf("beyond the limit: %q", text)
	}
	if text := turn(1.5, without); !strings.Contains(text, "load factor of 1.5, and no structural limits are entered") {
		t.Errorf("without limits: %q", text)
	}
}

// A pick-up above the greatest take-off mass is a warning that stops, once for the leg that makes it.
func TestPickUpAboveTheGreatestMass(t *testing.T) {
	limit := project.Demo().Variants[0].Aircraft.Weights.MaxTakeOff
	load := func(mass float64) *study.Study {
		return withLegs(t, []mission.Leg{changed(mission.PickUp, func(l *mission.Leg) { l.Payload = mass })}, nil)
	}
	light, heavy := load(10), load(150)
	if light.Flight.Legs[6].End.Mass > limit || heavy.Flight.Legs[6].End.Mass <= limit {
		t.Fatalf("%g kg and %g kg after the pick-up", light.Flight.Legs[6].End.Mass, heavy.Flight.Legs[6].End.Mass)
	}
	if text := codes(light)["overweight"]; text != "" {
		t.Errorf("light: %s", text)
	}
	if text := codes(heavy)["overweight"]; strings.Count(text, "\n") != 1 || !strings.Contains(text, "after “The pick-up” it is") {
		t.Errorf("heavy: %q", text)
	}
}

// An alternate and a contingency are no reserve of time, and each way of missing the reserve is worded as it is.
func TestReserveWarnings(t *testing.T) {
	s := project.Demo()
	s.Legs[8] = changed(mission.Contingency, nil)
	p := built(t, s)
	none := study.Run(p, 0, study.DefaultView(p, 0))
	if f := none.Figure("reserve_time"); f.Has() || !strings.Contains(codes(none)["no-reserve"], "no reserve of time") || codes(none)["reserve-short"] != "" {
		t.Errorf("figure %+v, warnings %q", f, codes(none))
	}
	if f := none.Figure("fuel_left"); !f.Has() || f.Value != none.Flight.Reserve.Left {
		t.Errorf("fuel left %+v", f)
	}
	short := withLegs(t, nil, []mission.Leg{changed(mission.Contingency, func(l *mission.Leg) { l.Share, l.Time = 1, 36000 })})
	if text := codes(short)["reserve-short"]; !strings.Contains(text, "kg that must be kept") || strings.Contains(text, "flown") {
		t.Errorf("kept: %q", text)
	}
	long := withLegs(t, nil, []mission.Leg{changed(mission.Reserve, func(l *mission.Leg) { l.Time = 20 * 3600 })})
	if text := codes(long)["reserve-short"]; !strings.Contains(text, "min flown; the fuel is used up") {
		t.Errorf("flown: %q", text)
	}
	a := short.Answer().Reserve
	if len(a.Parts) != 2 || a.Parts[0].Kind != mission.Reserve || !a.Parts[0].Met || a.Parts[1].Met || a.Kept <= a.Left || a.Parts[1].Rule == "" || a.Parts[1].Reason == "" {
		t.Errorf("the interface says %+v", a)
	}
}

// In turns the wind is met from behind at some moment, whatever its sign.
func TestGroundSpeedInTurns(t *testing.T) {
	for _, wind := range []float64{12, -12} {
		s := withLegs(t, []mission.Leg{changed(mission.Turns, func(l *mission.Leg) { l.SpeedRule, l.Speed, l.HeadWind = mission.ByTAS, 48, wind })}, nil)
		if got := s.Figure("ground_speed").Value; math.Abs(got-60) > 1e-9 {
			t.Errorf("wind %g m/s: %g m/s over the ground, want 60", wind, got)
		}
	}
}
