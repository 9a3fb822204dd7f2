package project

import (
	"errors"
	"strings"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/units"
)

// One cruise of a mission may fly the rest of the range, a second is refused at its own field.
func TestOnlyOneLegFliesTheRest(t *testing.T) {
	s := Demo()
	s.Legs[5].Extent = mission.ForTheRest
	if _, err := s.Build(); err != nil {
		t.Fatal(err)
	}
	s.Legs[3].Extent = mission.ForTheRest
	_, err := s.Build()
	list := input.Errors(err)
	if len(list) != 1 || list[0].Path != "legs[5].extent" || !errors.Is(list[0], input.ErrConflict) || !strings.Contains(list[0].Sentence(units.Metric), "leg 4 already flies the rest") {
		t.Errorf("%v", err)
	}
	// A leg of another kind that was once such a cruise does not count.
	s.Legs[3].Kind, s.Legs[3].SpeedRule = mission.Loiter, mission.BestEndurance
	if _, err := s.Build(); err != nil {
		t.Error(err)
	}
}
