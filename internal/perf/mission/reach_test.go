package mission_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/reference"
)

// The reach of the book's aeroplanes is Breguet's: Anderson 1999, sections 5.13 and 5.14.
// Tolerance: the optimum is found to 1e-7 in speed and the quadrature is good to 1e-7.
func TestReachIsBreguet(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_performance") {
		b := aircrafttest.Read(t, row.Text("name"))
		a := b.Build(t)
		for _, hp := range []float64{0, aircrafttest.Feet(22000)} {
			air := aircrafttest.Air(t, hp)
			far, err := mission.LevelReach(a, air, b.Mass, 0, false)
			if err != nil {
				t.Fatal(err)
			}
			long, err := mission.LevelReach(a, air, b.Mass, 0, true)
			if err != nil {
				t.Fatal(err)
			}
			wantRange, wantTime := breguet(b, air.Density)
			near(t, row.Text("name")+": range", far.Distance, wantRange, 1e-6)
			near(t, row.Text("name")+": endurance", long.Time, wantTime, 1e-6)
			if far.Used != b.Model.Aboard.Fuel || far.First <= far.Last || long.Distance >= far.Distance || far.Time >= long.Time {
				t.Errorf("%s: far %+v, long %+v", row, far, long)
			}
		}
	}
}

// A deep fuel fraction, which no aeroplane of the books has, is still Breguet's.
func TestReachOfAFlyingTank(t *testing.T) {
	b := aircrafttest.Read(t, "light single")
	b.Model.Aboard.Fuel = 0.7 * b.Mass
	b.Spec.Weights.Empty = 0.3 * b.Mass
	a := b.Build(t)
	air := aircrafttest.Air(t, 0)
	far, err := mission.LevelReach(a, air, b.Mass, 0, false)
	if err != nil {
		t.Fatal(err)
	}
	want, _ := breguet(b, air.Density)
	near(t, "range", far.Distance, want, 1e-6)
	// What is kept is not used: with half kept the range is that of the heavier half.
	half, err := mission.LevelReach(a, air, b.Mass, 0.5, false)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "range on half of the fuel", half.Distance, want*math.Log(1/0.65)/math.Log(1/0.3), 1e-6)
}

// cell is a powerplant that draws electrical power alone, at a constant efficiency.
type cell struct{ efficiency, most float64 }

func (c cell) Run(at powerplant.Condition, setting float64, _ *formula.Working) (powerplant.Output, error) {
	power := setting * c.most
	return powerplant.Output{Thrust: c.efficiency * power / math.Max(1, at.TAS), BusPower: power, Fraction: setting}, nil
}

func (c cell) Match(at powerplant.Condition, want float64, w *formula.Working) (float64, powerplant.Output, error) {
	setting := want * math.Max(1, at.TAS) / c.efficiency / c.most
	out, err := c.Run(at, setting, w)
	if setting > 1 {
		return 1, out, &powerplant.ThrustError{Want: want, Available: out.Thrust, TAS: at.TAS}
	}
	return setting, out, err
}

// Electric flight at constant mass: the range is efficiency × energy × best lift-to-drag
// ratio over weight, and the endurance energy × efficiency over the least power required
// (from the definitions; no fuel is burnt).
func TestReachOfACharge(t *testing.T) {
	b := aircrafttest.Read(t, "light single")
	b.Model.Aboard = powerplant.Stores{Charge: 200e6}
	b.Model.Plant = cell{0.7, 200e3}
	b.Spec.Weights.Empty = b.Mass
	a := b.Build(t)
	air := aircrafttest.Air(t, 0)
	f := &b.Spec.Airframe
	k := f.WingArea / (math.Pi * f.Span * f.Span * f.Efficiency)
	weight := b.Mass * atmos.Gravity
	far, err := mission.LevelReach(a, air, b.Mass, 0.2, false)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "range", far.Distance, 0.8*200e6*0.7/weight/(2*math.Sqrt(k*f.CDMin)), 1e-9)
	long, err := mission.LevelReach(a, air, b.Mass, 0.2, true)
	if err != nil {
		t.Fatal(err)
	}
	cl := math.Sqrt(3 * f.CDMin / k)
	v := math.Sqrt(2 * weight / (air.Density * f.WingArea * cl))
	near(t, "endurance", long.Time, 0.8*200e6*0.7/(weight*4*f.CDMin/cl*v), 1e-9)
	if far.Used != 0 || far.Drawn != 0.8*200e6 {
		t.Errorf("used %g kg, drew %g J", far.Used, far.Drawn)
	}
}

// What cannot be reckoned says why.
func TestReachRefuses(t *testing.T) {
	b := aircrafttest.Read(t, "light single")
	air := aircrafttest.Air(t, 0)
	a := b.Build(t)
	refused := func(what string, mass float64) {
		t.Helper()
		if r, err := mission.LevelReach(b.Build(t), air, mass, 0, false); err == nil || err.Error() == "" || r.Distance != 0 {
			t.Errorf("%s: %+v, %v", what, r, err)
		}
	}
	refused("lighter than empty with fuel", a.EmptyMass()+b.Model.Aboard.Fuel-1)
	refused("too heavy to fly level", 20*b.Mass)
	b.Model.Aboard.Charge = 1e6
	refused("fuel and charge", b.Mass)
	b.Model.Aboard = powerplant.Stores{}
	refused("nothing aboard", b.Mass)
}

// Heavier never goes farther or longer, and keeping more never helps.
func TestReachTrends(t *testing.T) {
	a := aircrafttest.Build(t, aircrafttest.Homebuilt(powerplant.FixedPitch))
	rapid.Check(t, func(t *rapid.T) {
		hp := rapid.Float64Range(0, 2500).Draw(t, "altitude")
		mass := rapid.Float64Range(a.StartMass(), a.StartMass()+60).Draw(t, "mass")
		kept := rapid.Float64Range(0, 0.8).Draw(t, "kept")
		lasting := rapid.Bool().Draw(t, "lasting")
		air, err := atmos.Day{}.At(hp, nil)
		if err != nil {
			t.Fatal(err)
		}
		base, err := mission.LevelReach(a, air, mass, kept, lasting)
		if err != nil {
			t.Fatal(err)
		}
		heavy, err := mission.LevelReach(a, air, mass*1.02, kept, lasting)
		if err != nil {
			t.Fatal(err)
		}
		saving, err := mission.LevelReach(a, air, mass, kept+0.05, lasting)
		if err != nil {
			t.Fatal(err)
		}
		merit := func(r mission.Reach) float64 {
			if lasting {
				return r.Time
			}
			return r.Distance
		}
		if merit(heavy) >= merit(base) || merit(saving) >= merit(base) {
			t.Errorf("from %g to %g heavier and %g with more kept", merit(base), merit(heavy), merit(saving))
		}
	})
}
