package project

import (
	"reflect"
	"slices"
	"testing"

	"legwright/internal/perf/mission"
)

// The conditions found for a leg say of every combination of its choices what its Inputs method says.
func TestConditionsOfALeg(t *testing.T) {
	n := document().field("legs").item
	rules := n.rules()
	l := &mission.Leg{}
	o := object{"", n, reflect.ValueOf(l).Elem()}
	try := func() {
		for _, e := range l.Inputs() {
			_, needed := rules.always[e.Path]
			var options []string
			for _, c := range rules.when {
				for _, ce := range c.entries {
					if ce.Path == e.Path && c.holds(o) {
						needed = true
						if ce.Choice != nil {
							options = values(ce.Choice.Options)
						}
					}
				}
			}
			if needed == e.Idle {
				t.Fatalf("%+v: %s idle %v, by the conditions needed %v", *l, e.Path, e.Idle, needed)
			}
			if e.Choice != nil && options != nil && !slices.Equal(options, values(e.Choice.Options)) {
				t.Fatalf("%+v: %s offers %v, by the conditions %v", *l, e.Path, values(e.Choice.Options), options)
			}
		}
	}
	for _, l.Kind = range []string{mission.Taxi, mission.TakeOff, mission.Climb, mission.Cruise, mission.Loiter, mission.Descent, mission.Landing, mission.Reserve,
		mission.Dash, mission.Turns, mission.Drop, mission.PickUp, mission.Alternate, mission.Contingency} {
		for _, l.SpeedRule = range []string{mission.BestRate, mission.BestAngle, mission.BestRange, mission.BestEndurance, mission.CarsonSpeed,
			mission.Maximum, mission.PercentPower, mission.ByTAS, mission.ByCAS, mission.ByMach, mission.MostInHand} {
			for _, l.Path = range []string{mission.FullPower, mission.ByRate, mission.ByAngle, mission.Idle, mission.ByBank, mission.ByLoad} {
				for _, l.Extent = range []string{mission.ByDistance, mission.ByTime, mission.ForTheRest, mission.ByTurns, mission.ByHeading} {
					for _, l.DayGiven = range []string{mission.ProjectDay, mission.OwnDay} {
						try()
					}
				}
			}
		}
	}
}
