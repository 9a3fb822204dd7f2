package mission_test

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/reference"
	"legwright/internal/perf/runway"
)

// airAt is standard air for tests under rapid.
func airAt(t interface{ Fatal(...any) }, hp float64) atmos.Air {
	air, err := atmos.Day{}.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}

// flat is from for tests under rapid.
func flat(t interface{ Fatal(...any) }, hp float64, legs ...mission.Leg) *mission.Plan {
	return &mission.Plan{Legs: legs, Places: []runway.Place{{Air: airAt(t, hp)}}, Technique: runway.StandardTechnique()}
}

// rest is a cruise for the rest of the range.
func rest(rule string) mission.Leg {
	l := mission.NewLeg(mission.Cruise, "the rest")
	l.Extent, l.SpeedRule, l.Speed = mission.ForTheRest, rule, 45
	return l
}

// With nothing after it, the rest of the range at best range is Breguet's: Anderson
// 1999, section 5.13. With a reserve of the same flight for a time, what is left of the
// range is Breguet's between the start mass and the mass at which, by the same
// formula, just the reserve is left. Tolerance: as in the test of ranges, and 1e-7 of
// the fuel that is left over.
func TestRestOfRangeInClosedForm(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_performance") {
		b := aircrafttest.Read(t, row.Text("name"))
		if _, ok := b.Model.Plant.(aircrafttest.Propulsive); !ok {
			continue
		}
		a := b.Build(t)
		f := flown(t, a, from(t, 0, rest(mission.BestRange)))
		whole, _ := breguet(b, aircrafttest.Air(t, 0).Density)
		near(t, "whole range", f.Distance, whole, 3e-6)

		reserve := mission.NewLeg(mission.Reserve, "")
		reserve.Extent, reserve.SpeedRule, reserve.Altitude, reserve.Distance = mission.ByDistance, mission.BestRange, 0, 0.3*whole
		f = flown(t, a, from(t, 0, rest(mission.BestRange), reserve))
		near(t, "range before a reserve of three tenths", f.Distance, 0.7*whole, 5e-6)
		if !f.Reserve.Met {
			t.Errorf("the reserve is not met: %s", plain(f.Reserve.Reason))
		}
	}
}

// drawAfter draws legs that follow a cruise for the rest of the range.
func drawAfter(t *rapid.T) []mission.Leg {
	var legs []mission.Leg
	pick := func(what string) bool { return rapid.Bool().Draw(t, what) }
	number := func(what string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, what) }
	add := func(kind string, change func(*mission.Leg)) { legs = append(legs, leg(kind, change)) }
	if pick("descends") {
		add(mission.Descent, func(l *mission.Leg) { l.Altitude, l.Speed, l.Rate = number("to", 200, 900), 42, number("rate", 1, 3) })
	}
	if pick("turns") {
		add(mission.Turns, func(l *mission.Leg) { l.Turns, l.Bank = number("count", 0, 5), number("bank", 0.1, 0.7) })
	}
	if pick("drops") {
		add(mission.Drop, func(l *mission.Leg) { l.Payload = number("dropped", 0, 40) })
	}
	if pick("cruises") {
		add(mission.Cruise, func(l *mission.Leg) { l.Distance = number("distance", 0, 60e3) })
	}
	if pick("diverts") {
		add(mission.Alternate, func(l *mission.Leg) {
			l.Altitude, l.Distance = number("alternate at", 200, 1500), number("alternate", 40e3, 90e3)
		})
	}
	if pick("keeps") {
		add(mission.Contingency, func(l *mission.Leg) { l.Share, l.Time = number("share", 0, 0.15), number("held", 0, 900) })
	}
	if pick("reserves") {
		add(mission.Reserve, func(l *mission.Leg) { l.Altitude, l.Time = number("reserve at", 200, 1500), number("reserve", 0, 2700) })
	}
	return legs
}

// A cruise for the rest of the range leaves what the legs after it need, and next to nothing more.
func TestRestLeavesJustTheReserve(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		s := aircrafttest.Homebuilt(kind)
		s.Weights.Items = []aircraft.Item{{Name: "Load", Mass: 60}}
		a := aircrafttest.Build(t, s)
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			rule := rapid.SampledFrom([]string{mission.BestRange, mission.ByTAS, mission.CarsonSpeed}).Draw(t, "rule")
			f := mission.Fly(a, flat(t, 1000, append([]mission.Leg{rest(rule)}, drawAfter(t)...)...))
			healthy(t, &f)
			if !f.Flown() {
				t.Fatal(f.Failure.Err)
			}
			if f.Reserve.Asked && !f.Reserve.Met {
				t.Errorf("the reserve is not met: %s", plain(f.Reserve.Reason))
			}
			left := f.Legs[len(f.Legs)-1].End.Fuel
			// 1e-7 of the tank is left by intent, and the steps of the integration are accurate to 1e-8 each, so that the root lies that close.
			if over := left - f.Reserve.Kept; over < 0 || over > 1.5e-7*a.Stores().Fuel {
				t.Errorf("%g kg is left and %g kg to be kept", left, f.Reserve.Kept)
			}
		}))
	}
}

// More payload never flies farther on the same fuel.
func TestHeavierNeverFliesFarther(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		rule := rapid.SampledFrom([]string{mission.BestRange, mission.ByTAS, mission.CarsonSpeed}).Draw(t, "rule")
		after := drawAfter(t)
		fly := func(load float64) mission.Flight {
			s := aircrafttest.Homebuilt(powerplant.ConstantSpeed)
			s.Weights.Items = []aircraft.Item{{Name: "Load", Mass: load}}
			a, err := s.Build()
			if err != nil {
				t.Fatal(err)
			}
			return mission.Fly(a, flat(t, 1000, append([]mission.Leg{rest(rule)}, after...)...))
		}
		load := rapid.Float64Range(40, 120).Draw(t, "load")
		light, heavy := fly(load), fly(load+rapid.Float64Range(0.5, 60).Draw(t, "more"))
		if !light.Flown() || !heavy.Flown() {
			t.Skip("not flown")
		}
		if light.Legs[0].Distance <= heavy.Legs[0].Distance {
			t.Errorf("%g m with %g kg, %g m with more", light.Legs[0].Distance, load, heavy.Legs[0].Distance)
		}
	})
}

// Flown over the distance found, the mission is the same as with the rest of the range.
func TestRestIsADistance(t *testing.T) {
	p := kindsProject(t)
	for _, a := range p.Aircraft {
		first := flown(t, a, &p.Plan)
		again := p.Plan
		again.Legs = append([]mission.Leg(nil), p.Plan.Legs...)
		for i := range again.Legs {
			if l := &again.Legs[i]; l.Rests() {
				l.Extent, l.Distance = mission.ByDistance, first.Legs[i].Distance
				near(t, "the leg's own distance", first.Legs[i].Leg.Distance, first.Legs[i].Distance, 1e-9)
			}
		}
		f := flown(t, a, &again)
		near(t, "fuel left", f.Reserve.Left, first.Reserve.Left, 1e-6)
		near(t, "time", f.Time, first.Time, 1e-9)
	}
}

// A leg after the cruise that cannot be flown ends the mission there, and not in the cruise.
func TestRestBeforeWhatCannotBeFlown(t *testing.T) {
	a := carrying(t, 40)
	high := leg(mission.Climb, func(l *mission.Leg) { l.Altitude = 9000 })
	f := mission.Fly(a, from(t, 1000, rest(mission.BestRange), high, leg(mission.Reserve, nil)))
	if f.Flown() || f.Failure.Leg != 1 || !strings.Contains(plain(f.Failure.Reason), "climbs no further") {
		t.Errorf("%+v", f.Failure)
	}
	healthy(t, &f)
}

// A flight on no fuel, a cruise against too much wind, and needs beyond the tanks each say so.
func TestRestThatCannotBe(t *testing.T) {
	windy := rest(mission.ByTAS)
	windy.HeadWind = 50
	long := leg(mission.Reserve, func(l *mission.Leg) { l.Time = 6 * 3600 })
	for what, c := range map[string]failing{
		"no fuel": {carrying(t, 0), from(t, 1000, rest(mission.BestRange)), usedUp},
		"wind":    {carrying(t, 40), from(t, 1000, windy), `^the head wind of 50\.0.m/s leaves no way over the ground`},
		"needs":   {carrying(t, 20), from(t, 1000, rest(mission.BestRange), long), `^nothing is left for it: what comes after it needs ` + number + `kg and 20\.0.kg is left$`},
		"stall": {carrying(t, 20), from(t, 1000, func() mission.Leg { l := rest(mission.ByTAS); l.Speed = 20; return l }()),
			`^its speed of 20\.0.m/s is below the stall`},
	} {
		c.check(t, what)
	}
	f := mission.Fly(carrying(t, 20), from(t, 1000, rest(mission.BestRange), long))
	if math.Abs(f.Distance) > 0 || f.Reserve.Met || f.Reserve.Reason.Empty() {
		t.Errorf("flies %g m, reserve %+v", f.Distance, f.Reserve)
	}
}
