package mission_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
)

// A level turn at V and the bank φ goes round in 2π V/(g tan φ), and its drag is that
// of the weight over cos φ: Anderson 1999, section 6.5. The same turn is flown
// whether it is given by its bank or its load factor, in turns or as a heading.
func TestTurnInClosedForm(t *testing.T) {
	a := carrying(t, 40)
	rapid.Check(t, func(t *rapid.T) {
		bank, v, hp := rapid.Float64Range(0.06, 0.9).Draw(t, "bank"), rapid.Float64Range(42, 55).Draw(t, "speed"), rapid.Float64Range(0, 1500).Draw(t, "altitude")
		count := rapid.Float64Range(0.01, 1).Draw(t, "turns")
		l := mission.NewLeg(mission.Turns, "")
		l.SpeedRule, l.Speed, l.Bank, l.Turns = mission.ByTAS, v, bank, count
		f := mission.Fly(a, flat(t, hp, l))
		if !f.Flown() {
			t.Skip(f.Failure.Err)
		}
		healthy(t, &f)
		got := f.Legs[0]
		if want := 2 * math.Pi * count * v / (atmos.Gravity * math.Tan(bank)); math.Abs(got.Time-want) > 1e-7*want {
			t.Errorf("%g turns take %g s, want %g s", count, got.Time, want)
		}
		if got.Distance != 0 || got.End.Altitude != hp {
			t.Errorf("goes %g m and ends at %g m", got.Distance, got.End.Altitude)
		}
		for i := range f.Trace {
			s := &f.Trace[i]
			q := 0.5 * airAt(t, hp).Density * v * v * a.WingArea()
			if want := q * a.Polar(0).CD(s.Mass*atmos.Gravity/math.Cos(bank)/q, 1, nil); math.Abs(s.Required-want) > 1e-9*want {
				t.Errorf("thrust required is %g N, want %g N", s.Required, want)
			}
		}
		l.Path, l.Load, l.Extent, l.Heading = mission.ByLoad, 1/math.Cos(bank), mission.ByHeading, 2*math.Pi*count
		again := mission.Fly(a, flat(t, hp, l))
		if !again.Flown() || math.Abs(again.Fuel-f.Fuel) > 1e-9*f.Fuel || math.Abs(again.Time-f.Time) > 1e-9*f.Time {
			t.Errorf("given otherwise it takes %g s and %g kg, not %g s and %g kg", again.Time, again.Fuel, f.Time, f.Fuel)
		}
	})
}

// The speed of most thrust in hand is that of the turn alone, and no other that keeps its distance from the stall leaves more.
func TestTurnAtMostInHand(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		a := aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
		for _, bank := range []float64{0.2, 0.6, 1.05} {
			l := mission.NewLeg(mission.Turns, "")
			l.Bank, l.Turns = bank, 10
			f := flown(t, a, from(t, 600, l))
			for _, s := range f.Trace {
				p := &pointperf.Point{Air: aircrafttest.Air(t, 600), Mass: s.Mass}
				stall := pointperf.Stall(a, p, nil) * math.Sqrt(1/math.Cos(bank))
				if s.TAS < 1.2*stall*(1-1e-9) {
					t.Errorf("bank %g: flown at %g m/s, the stall is at %g m/s", bank, s.TAS, stall)
				}
				for _, v := range []float64{s.TAS * 0.97, s.TAS * 1.03} {
					if v < 1.2*stall {
						continue
					}
					if b, err := pointperf.AtLoad(a, p, v, 1/math.Cos(bank), nil); err == nil && b.InHand() > s.Available-s.Required {
						t.Errorf("bank %g: %g N in hand at %g m/s, %g N at %g m/s", bank, s.Available-s.Required, s.TAS, b.InHand(), v)
					}
				}
			}
		}
	}
}

// The tightest point counts a turn, and a dash at its maximum by choice does not.
func TestTightestOfTurnAndDash(t *testing.T) {
	a := carrying(t, 40)
	cruise, turn, dash := mission.NewLeg(mission.Cruise, ""), mission.NewLeg(mission.Turns, ""), mission.NewLeg(mission.Dash, "")
	turn.Bank, dash.Distance = 0.9, 10e3
	f := flown(t, a, from(t, 500, dash, cruise, turn))
	if f.Tightest == nil || f.Tightest.Leg != 2 {
		t.Errorf("tightest %+v", f.Tightest)
	}
	if hand := f.Trace[0].Ratio(); math.Abs(hand) > 1e-4 {
		t.Errorf("a dash at the maximum has %g in hand", hand)
	}
	dash.SpeedRule, dash.Speed = mission.ByTAS, f.Trace[0].TAS*0.995
	slower := flown(t, a, from(t, 500, dash, cruise, turn))
	if slower.Tightest.Leg != 0 {
		t.Errorf("a dash at a given speed is not the tightest: %+v", slower.Tightest)
	}
}

// Choosing another way of giving a turn keeps the turn.
func TestTurnConverts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := mission.NewLeg(mission.Turns, "")
		l.Bank, l.Turns = rapid.Float64Range(0.2, 1.4).Draw(t, "bank"), rapid.Float64Range(0, 1).Draw(t, "turns")
		before, count := l.Bank, l.Turns
		l.Path, l.Extent = mission.ByLoad, mission.ByHeading
		l.Convert("path", mission.ByBank)
		l.Convert("extent", mission.ByTurns)
		if math.Abs(l.LoadFactor()-1/math.Cos(before)) > 1e-12*l.LoadFactor() || math.Abs(l.Heading-2*math.Pi*count) > 1e-12 {
			t.Errorf("bank %g became the load factor %g, %g turns the heading %g", before, l.Load, count, l.Heading)
		}
		l.Path, l.Extent, l.Bank, l.Turns = mission.ByBank, mission.ByTurns, 0.1, 9
		l.Convert("path", mission.ByLoad)
		l.Convert("extent", mission.ByHeading)
		if math.Abs(l.Bank-before) > 1e-9 || math.Abs(l.Turns-count) > 1e-12 {
			t.Errorf("back to bank %g and %g turns, from %g and %g", l.Bank, l.Turns, before, count)
		}
	})
}

// A heavier aircraft burns more in the same turns.
func TestHeavierTurnsDearer(t *testing.T) {
	l := mission.NewLeg(mission.Turns, "")
	l.Bank, l.SpeedRule, l.Speed = 0.7, mission.ByTAS, 45
	last := 0.0
	for _, fuel := range []float64{10, 30, 50} {
		f := flown(t, carrying(t, fuel), from(t, 500, l))
		if f.Fuel <= last {
			t.Errorf("%g kg burnt with %g kg aboard, %g kg with less", f.Fuel, fuel, last)
		}
		last = f.Fuel
	}
}
