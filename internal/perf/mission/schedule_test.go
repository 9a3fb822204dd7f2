package mission

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/reference"
)

// samples are the aircraft of mission_scipy.json: one with a fixed-pitch
// propeller and one with a constant-speed propeller.
func samples(t testing.TB) []*aircraft.Aircraft {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(reference.Folder(t), "mission_scipy.json"))
	if err != nil {
		t.Fatal(err)
	}
	var doc struct {
		Variants []struct{ Aircraft aircraft.Spec }
	}
	if err := json.Unmarshal(text, &doc); err != nil {
		t.Fatal(err)
	}
	var list []*aircraft.Aircraft
	for i := range doc.Variants {
		// The document is of format 1, and package project, which reads that, imports this one.
		f := &doc.Variants[i].Aircraft.Airframe
		f.Clean.LiftGiven, f.TakeOff.LiftGiven, f.Landing.LiftGiven = aircraft.ByCLMax, aircraft.ByCLMax, aircraft.ByCLMax
		doc.Variants[i].Aircraft.Limits = loads.Unentered()
		doc.Variants[i].Aircraft.Weights.ZeroFuelGiven = aircraft.NoZeroFuel
		doc.Variants[i].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Fuel.Kind = powerplant.OwnFuel
		a, err := doc.Variants[i].Aircraft.Build()
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, a)
	}
	if len(list) < 2 {
		t.Fatal("too few aircraft")
	}
	return list
}

// climbing is a flier at the altitude hp in m that is about to fly the leg.
func climbing(a *aircraft.Aircraft, l Leg, hp float64) *flier {
	plan := &Plan{Legs: []Leg{l}}
	return &flier{a: a, plan: plan, now: Sample{Mass: a.StartMass(), Fuel: a.Stores().Fuel, Altitude: hp}}
}

// exact is the best speed found anew at many altitudes, with the mass that the
// aircraft had there in the flight flown.
func exact(t *testing.T, f *flier, rule string, day atmos.Day) schedule {
	t.Helper()
	var hp, mass []float64
	for _, s := range f.out.Trace {
		hp, mass = append(hp, s.Altitude), append(mass, s.Mass)
	}
	at, err := numeric.NewTable(hp, mass)
	if err != nil {
		t.Fatal(err)
	}
	const nodes = 120
	var x, y []float64
	for i := range nodes + 3 {
		h := hp[0] + (hp[len(hp)-1]-hp[0])*float64(i-1)/nodes
		air, err := day.At(h, nil)
		if err != nil {
			t.Fatal(err)
		}
		m, _ := at.At(h)
		p := &pointperf.Point{Air: air, Mass: m}
		best := pointperf.BestRate(f.a, p)
		if rule == BestAngle {
			best = pointperf.BestAngle(f.a, p)
		}
		if best.Err != nil {
			t.Fatal(best.Err)
		}
		x, y = append(x, h), append(y, best.TAS)
	}
	v, err := numeric.NewTable(x, y)
	if err != nil {
		t.Fatal(err)
	}
	return func(h, _ float64) (float64, error) { s, _ := v.At(h); return s, nil }
}

// The five nodes of a climb's speed schedule cost next to nothing. At the best
// rate time and fuel are near their least, so they change by less than the
// speed does; at the best angle the rate still rises with the speed, and an
// error of speed is one of time.
func TestClimbScheduleIsNearExact(t *testing.T) {
	allowed := map[string]float64{BestRate: 1e-4, BestAngle: 5e-4}
	for i, a := range samples(t) {
		for rule, tol := range allowed {
			for _, day := range []atmos.Day{{}, {Deviation: 20, Humidity: 0.6}} {
				l := NewLeg(Climb, "")
				l.Altitude, l.SpeedRule = 2600, rule
				flown := climbing(a, l, 100)
				flown.plan.Day = day
				var r LegResult
				if err := flown.path(&l, &r); err != nil {
					t.Fatal(err)
				}
				anew := climbing(a, l, 100)
				ride := &rider{f: anew, l: &l, day: day, speed: exact(t, flown, rule, day), base: anew.now}
				if err := ride.run(); err != nil {
					t.Fatal(err)
				}
				fuel := a.Stores().Fuel
				time := flown.now.Time/anew.now.Time - 1
				burnt := (fuel-flown.now.Fuel)/(fuel-anew.now.Fuel) - 1
				if math.Abs(time) > tol || math.Abs(burnt) > tol {
					t.Errorf("aircraft %d, %s, %+v: time differs by %.2g, fuel by %.2g", i, rule, day, time, burnt)
				}
			}
		}
	}
}
