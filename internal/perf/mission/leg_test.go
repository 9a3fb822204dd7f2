package mission_test

import (
	"math"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
)

func flown(t *testing.T, a *aircraft.Aircraft, p *mission.Plan) mission.Flight {
	t.Helper()
	f := mission.Fly(a, p)
	if !f.Flown() {
		t.Fatal(f.Failure.Err)
	}
	healthy(t, &f)
	return f
}

// A leg with a day of its own flies as a mission on that day.
func TestLegOnItsOwnDay(t *testing.T) {
	a := carrying(t, 50)
	own, project := mission.NewLeg(mission.Climb, ""), mission.NewLeg(mission.Climb, "")
	own.Altitude, project.Altitude = 2000, 2000
	own.DayGiven, own.Deviation = mission.OwnDay, 22
	hot := from(t, 0, project)
	hot.Day.Deviation = 22
	got, want, cold := flown(t, a, from(t, 0, own)), flown(t, a, hot), flown(t, a, from(t, 0, project))
	if got.Time != want.Time || got.Fuel != want.Fuel || got.Time <= cold.Time*1.05 {
		t.Errorf("%g s and %g kg on its own day, %g s and %g kg on such a day, %g s on a standard day", got.Time, got.Fuel, want.Time, want.Fuel, cold.Time)
	}
}

// The path of a climb or descent is the one asked for, at the speed asked for.
func TestPathsAreHeld(t *testing.T) {
	a := carrying(t, 50)
	for what, c := range map[string]struct {
		leg  mission.Leg
		from float64
		held func(s *mission.Sample) float64
		want float64
	}{
		"climb at a rate":     {leg(mission.Climb, func(l *mission.Leg) { l.Path, l.Rate, l.Altitude = mission.ByRate, 1.5, 1500 }), 0, func(s *mission.Sample) float64 { return s.Rate }, 1.5},
		"descent at a rate":   {leg(mission.Descent, func(l *mission.Leg) { l.Rate, l.Speed, l.Altitude = 1.2, 42, 200 }), 2000, func(s *mission.Sample) float64 { return s.Rate }, -1.2},
		"descent at an angle": {leg(mission.Descent, func(l *mission.Leg) { l.Path, l.Angle, l.Altitude = mission.ByAngle, 0.03, 200 }), 2000, func(s *mission.Sample) float64 { return math.Asin(s.Rate / s.TAS) }, -0.03},
		"calibrated airspeed": {leg(mission.Climb, func(l *mission.Leg) { l.SpeedRule, l.Speed, l.Altitude = mission.ByCAS, 38, 1500 }), 0, func(s *mission.Sample) float64 { return float64(air(t, s).CAS(s.TAS)) }, 38},
		"Mach number":         {leg(mission.Descent, func(l *mission.Leg) { l.SpeedRule, l.Mach, l.Rate, l.Altitude = mission.ByMach, 0.15, 1, 500 }), 1500, func(s *mission.Sample) float64 { return float64(air(t, s).Mach(s.TAS)) }, 0.15},
	} {
		f := flown(t, a, from(t, c.from, c.leg))
		for i := range f.Trace {
			near(t, what, c.held(&f.Trace[i]), c.want, 1e-9)
		}
		if len(f.Legs[0].Notes) > 0 {
			t.Errorf("%s: %v", what, f.Legs[0].Notes)
		}
		near(t, what+": last altitude", f.Legs[0].End.Altitude, c.leg.Altitude, 1e-5)
	}
}

func air(t *testing.T, s *mission.Sample) atmos.Air { return aircrafttest.Air(t, s.Altitude) }

// A descent steeper than idle gives idles all the way, holds its speed, sinks as a glide does, and says so.
func TestSteepDescentGivesWay(t *testing.T) {
	a := carrying(t, 50)
	l := leg(mission.Descent, func(l *mission.Leg) { l.Rate, l.SpeedRule, l.Speed, l.Altitude = 8, mission.ByTAS, 40, 500 })
	f := flown(t, a, from(t, 2000, l))
	if notes := f.Legs[0].Notes; len(notes) != 1 || !strings.Contains(plain(notes[0]), "the engine idles and the rate gives way") {
		t.Fatalf("notes %v", notes)
	}
	for i := range f.Trace {
		s := &f.Trace[i]
		p := &pointperf.Point{Air: air(t, s), Mass: s.Mass}
		idle, err := a.Plant().Run(p.Condition(40), 0, nil)
		if err != nil {
			t.Fatal(err)
		}
		glide := pointperf.ClimbAt(a, p, 40, idle.Thrust, 0, nil)
		near(t, "rate", s.Rate, glide.Rate, 1e-9)
		if s.TAS != 40 || s.Setting != 0 || s.Rate < -8 {
			t.Errorf("%+v", s)
		}
	}
	// Flown at idle from the start it is the same descent.
	l.Path = mission.Idle
	idle := flown(t, a, from(t, 2000, l))
	near(t, "time at idle", idle.Time, f.Time, 1e-9)
	near(t, "fuel at idle", idle.Fuel, f.Fuel, 1e-9)
}

// Legs with nothing to fly say so and cost nothing.
func TestNothingToFly(t *testing.T) {
	a := carrying(t, 50)
	climb, down, cruise := mission.NewLeg(mission.Climb, ""), mission.NewLeg(mission.Descent, ""), mission.NewLeg(mission.Cruise, "")
	climb.Altitude, down.Altitude, cruise.Distance = 500, 1500, 0
	hold := mission.NewLeg(mission.Loiter, "")
	hold.Time = 0
	f := flown(t, a, from(t, 1000, climb, down, cruise, hold))
	if f.Time != 0 || f.Fuel != 0 || f.Distance != 0 {
		t.Errorf("%g s, %g kg, %g m", f.Time, f.Fuel, f.Distance)
	}
	for i, want := range []int{1, 1, 0, 0} {
		if len(f.Legs[i].Notes) != want {
			t.Errorf("leg %d notes %v", i, f.Legs[i].Notes)
		}
	}
}

// A landing far from the height of its strip is noted: nothing is flown between.
func TestLandingFromAfar(t *testing.T) {
	a := carrying(t, 50)
	p := on(t, 0, 300, "dry-asphalt", leg(mission.Climb, func(l *mission.Leg) { l.Altitude = 1500 }), leg(mission.Landing, nil))
	f := flown(t, a, p)
	if notes := f.Legs[1].Notes; len(notes) != 1 || !strings.Contains(plain(notes[0]), "begins 1200 m from the height of the strip") {
		t.Errorf("notes %v", notes)
	}
}
