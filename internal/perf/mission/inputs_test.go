package mission_test

import (
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
)

// A new leg of every kind is acceptable as it is; one that is flown along a path has a day and a wind of its own.
func TestEveryKindHasItsInputs(t *testing.T) {
	for _, kind := range mission.KindOptions() {
		l := mission.NewLeg(kind.Value, "")
		l.DayGiven = mission.OwnDay
		if err := input.Check(&l); err != nil {
			t.Errorf("a new %s: %v", kind.Value, err)
		}
		matters := map[string]bool{}
		for _, e := range l.Inputs() {
			matters[e.Path] = !e.Idle
		}
		if matters["day_given"] != l.Airborne() || matters["isa_deviation"] != l.Airborne() || matters["speed_rule"] != l.Airborne() || matters["head_wind"] != l.Airborne() {
			t.Errorf("%s: %v", kind.Value, matters)
		}
		if l.Title() == "" {
			t.Errorf("a new %s has no title", kind.Value)
		}
	}
	if n := len(mission.KindOptions()); n != 14 {
		t.Errorf("%d kinds", n)
	}
}
