package mission_test

import (
	"fmt"
	"math"
	"reflect"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
)

// reporter is what both testing.TB and rapid.T can do.
type reporter interface {
	Helper()
	Errorf(string, ...any)
}

// healthy checks what holds for every flight, flown to its end or not.
func healthy(t reporter, f *mission.Flight) {
	t.Helper()
	finite(t, "flight", reflect.ValueOf(*f))
	for i, l := range f.Legs {
		if burnt := l.Start.Mass - l.End.Mass + l.Payload; math.Abs(burnt-l.Fuel) > 1e-9 || l.Fuel < 0 || l.End.Fuel < 0 {
			t.Errorf("leg %d loses %g kg and burns %g kg", i, burnt, l.Fuel)
		}
		if l.Time < 0 || l.Leg.HeadWind <= 0 && l.Distance < 0 {
			t.Errorf("leg %d takes %g s over %g m", i, l.Time, l.Distance)
		}
		if i > 0 && (l.Start.Mass != f.Legs[i-1].End.Mass || l.Start.Time != f.Legs[i-1].End.Time) {
			t.Errorf("leg %d does not begin where the one before it ended", i)
		}
	}
	gained := func(from, to int) (mass float64) {
		for _, l := range f.Legs[from:to] {
			mass += l.Payload
		}
		return mass
	}
	for i := 1; i < len(f.Trace); i++ {
		if f.Trace[i].Time < f.Trace[i-1].Time || f.Trace[i].Leg < f.Trace[i-1].Leg || f.Trace[i].Mass > f.Trace[i-1].Mass+gained(f.Trace[i-1].Leg, f.Trace[i].Leg)+1e-9 {
			t.Errorf("the trace goes from %+v to %+v", f.Trace[i-1], f.Trace[i])
		}
	}
	tightest(t, f)
}

// tightest checks the tightest point against every sample in the air.
func tightest(t reporter, f *mission.Flight) {
	t.Helper()
	least := math.Inf(1)
	for i := range f.Trace {
		s := &f.Trace[i]
		switch l := f.Legs[s.Leg].Leg; {
		case !l.Airborne(), l.SpeedRule == mission.Maximum, s.Required <= 0:
		default:
			least = math.Min(least, (s.Available-s.Required)/s.Required)
		}
	}
	if f.Tightest == nil && !math.IsInf(least, 1) || f.Tightest != nil && f.Tightest.Ratio() != least {
		t.Errorf("the tightest point is %+v, the least ratio of the trace %g", f.Tightest, least)
	}
}

// finite reports every number below v that is not.
func finite(t reporter, path string, v reflect.Value) {
	t.Helper()
	switch v.Kind() {
	case reflect.Float64:
		if x := v.Float(); math.IsNaN(x) || math.IsInf(x, 0) {
			t.Errorf("%s is %g", path, x)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			if v.Type().Field(i).Name != "Err" {
				finite(t, path+"."+v.Type().Field(i).Name, v.Field(i))
			}
		}
	case reflect.Slice, reflect.Array:
		for i := range v.Len() {
			finite(t, fmt.Sprintf("%s[%d]", path, i), v.Index(i))
		}
	case reflect.Pointer:
		if !v.IsNil() {
			finite(t, path, v.Elem())
		}
	}
}

// drawLeg draws a leg of any kind and rule, also ones that cannot be flown.
func drawLeg(t *rapid.T, i int) mission.Leg {
	number := func(name string, low, high float64) float64 {
		return rapid.Float64Range(low, high).Draw(t, fmt.Sprintf("%s %d", name, i))
	}
	pick := func(name string, from ...string) string {
		return rapid.SampledFrom(from).Draw(t, fmt.Sprintf("%s %d", name, i))
	}
	l := mission.NewLeg(pick("kind", mission.Taxi, mission.TakeOff, mission.Climb, mission.Cruise, mission.Loiter, mission.Descent, mission.Landing, mission.Reserve,
		mission.Dash, mission.Turns, mission.Drop, mission.PickUp, mission.Alternate, mission.Contingency), "")
	l.Altitude, l.Distance, l.Time = number("altitude", -200, 6000), number("distance", 0, 300e3), number("time", 0, 5000)
	l.Speed, l.Mach, l.Power, l.Setting = number("speed", 20, 80), number("mach", 0.08, 0.25), number("power", 0.05, 1), number("setting", 0, 1)
	l.Rate, l.Angle, l.HeadWind = number("rate", 0.1, 10), number("angle", 0.005, 0.3), number("wind", -30, 40)
	l.Extent = pick("extent", mission.ByDistance, mission.ByTime)
	l.Payload, l.Share = number("payload", 0, 150), number("share", 0, 0.3)
	switch l.Kind {
	case mission.Turns:
		l.Turns, l.Heading, l.Bank, l.Load = number("turns", 0, 20), number("heading", 0, 6.28), number("bank", 0.05, 1.4), number("load", 1.01, 5)
		l.Extent, l.Path = pick("turns or heading", mission.ByTurns, mission.ByHeading), pick("bank or load", mission.ByBank, mission.ByLoad)
		l.SpeedRule = pick("rule", mission.MostInHand, mission.ByCAS, mission.ByTAS, mission.ByMach)
	case mission.Cruise:
		if i == 2 {
			l.Extent = mission.ForTheRest
		}
		l.SpeedRule = pick("rule", mission.BestRange, mission.CarsonSpeed, mission.PercentPower, mission.ByTAS, mission.ByCAS, mission.ByMach, mission.Maximum, mission.BestEndurance)
	case mission.Climb:
		l.SpeedRule = pick("rule", mission.BestRate, mission.BestAngle, mission.ByCAS, mission.ByTAS, mission.ByMach)
		l.Path = pick("path", mission.FullPower, mission.ByRate)
	case mission.Descent:
		l.SpeedRule = pick("rule", mission.ByCAS, mission.ByTAS, mission.ByMach)
		l.Path = pick("path", mission.ByRate, mission.ByAngle, mission.Idle)
	default:
		l.SpeedRule = pick("rule", mission.BestRange, mission.CarsonSpeed, mission.PercentPower, mission.ByTAS, mission.ByCAS, mission.ByMach, mission.Maximum, mission.BestEndurance)
	}
	return l
}

func drawPlan(t *rapid.T) *mission.Plan {
	s := runway.Strip{Name: "Strip", Length: 600, Slope: rapid.Float64Range(-0.05, 0.05).Draw(t, "slope"), Elevation: rapid.Float64Range(-100, 2500).Draw(t, "elevation"),
		Surface: rapid.SampledFrom(runway.Surfaces).Draw(t, "surface").Name, HeadWind: rapid.Float64Range(-10, 20).Draw(t, "wind"), Obstacle: rapid.Float64Range(0, 30).Draw(t, "obstacle")}
	day := atmos.Spec{Given: atmos.ByDeviation, QNH: atmos.SeaLevelPressure, Deviation: rapid.Float64Range(-30, 30).Draw(t, "deviation"), Humidity: rapid.Float64Range(0, 1).Draw(t, "humidity")}
	place, err := s.On(day)
	if err != nil {
		t.Fatal(err)
	}
	d, err := day.Day(place.Air.PressureAltitude)
	if err != nil {
		t.Fatal(err)
	}
	plan := &mission.Plan{Day: d, Places: []runway.Place{place}, Technique: runway.StandardTechnique()}
	for i := range rapid.IntRange(1, 6).Draw(t, "legs") {
		plan.Legs = append(plan.Legs, drawLeg(t, i))
	}
	return plan
}

func TestEveryFlightIsHealthy(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		a := aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			f := mission.Fly(a, drawPlan(t))
			healthy(t, &f)
			if f.Flown() != (f.Failure == nil) || f.Failure != nil && f.Failure.Reason.Empty() {
				t.Errorf("%+v", f.Failure)
			}
		}))
	}
}

// Excess thrust times speed over weight is the growth of height plus V²/2g, all along a climb.
func TestClimbBalancesEnergy(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		a := aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			l := mission.NewLeg(mission.Climb, "")
			l.SpeedRule = rapid.SampledFrom([]string{mission.BestRate, mission.ByCAS, mission.ByMach}).Draw(t, "rule")
			l.Altitude, l.Speed, l.Mach = rapid.Float64Range(1000, 3000).Draw(t, "top"), 40, 0.12
			day := atmos.Day{Deviation: rapid.Float64Range(-20, 20).Draw(t, "deviation")}
			air, err := day.At(0, nil)
			if err != nil {
				t.Fatal(err)
			}
			f := mission.Fly(a, &mission.Plan{Legs: []mission.Leg{l}, Day: day, Places: []runway.Place{{Air: air}}})
			if !f.Flown() {
				t.Fatal(f.Failure.Err)
			}
			n := len(f.Trace)
			gained := (f.Trace[n-1].TAS*f.Trace[n-1].TAS - f.Trace[0].TAS*f.Trace[0].TAS) / (2 * atmos.Gravity)
			height, work := 0.0, 0.0
			// Simpson's rule over the samples, which are even in time.
			for i := range f.Trace {
				s := &f.Trace[i]
				weight := 2.0
				switch {
				case i == 0 || i == n-1:
					weight = 1
				case i%2 == 1:
					weight = 4
				}
				weight *= f.Legs[0].Time / float64(n-1) / 3
				air, err := day.At(s.Altitude, nil)
				if err != nil {
					t.Fatal(err)
				}
				p := &pointperf.Point{Air: air, Mass: s.Mass}
				drag := pointperf.Drag(a, p, s.TAS, p.Weight()*math.Sqrt(1-s.Rate*s.Rate/(s.TAS*s.TAS)), 1, nil)
				height += weight * s.Rate
				work += weight * (s.Output.Thrust - drag) * s.TAS / p.Weight()
			}
			// Five altitudes carry the speed of a best-rate climb, and its slope has corners there that Simpson's rule rounds.
			if off := work - height - gained; math.Abs(off) > 2e-4*work {
				t.Errorf("%g m of energy height for %g m of height and %g m of speed", work, height, gained)
			}
		}))
	}
}

// More fuel never flies less far or less long, where the aircraft can carry it.
func TestMoreFuelIsNeverShorter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l := mission.NewLeg(rapid.SampledFrom([]string{mission.Cruise, mission.Loiter}).Draw(t, "kind"), "")
		l.SpeedRule = rapid.SampledFrom([]string{mission.BestRange, mission.BestEndurance, mission.CarsonSpeed, mission.ByTAS}).Draw(t, "rule")
		l.Distance, l.Time, l.Speed = 1e8, 6e5, 42
		hp := rapid.Float64Range(0, 3000).Draw(t, "altitude")
		fly := func(fuel float64) mission.Flight {
			s := aircrafttest.Homebuilt(powerplant.ConstantSpeed)
			tank := &s.Powerplant.Model.(*powerplant.PistonPropeller).Fuel
			tank.Volume = tank.Unusable + fuel/tank.Density
			a, err := s.Build()
			if err != nil {
				t.Fatal(err)
			}
			air, err := atmos.Day{}.At(hp, nil)
			if err != nil {
				t.Fatal(err)
			}
			return mission.Fly(a, &mission.Plan{Legs: []mission.Leg{l}, Places: []runway.Place{{Air: air}}})
		}
		fuel := rapid.Float64Range(1, 60).Draw(t, "fuel")
		less, more := fly(fuel), fly(fuel+rapid.Float64Range(0.1, 8).Draw(t, "more"))
		if more.Distance < less.Distance || more.Time <= less.Time {
			t.Errorf("%g m and %g s on %g kg, %g m and %g s on more", less.Distance, less.Time, fuel, more.Distance, more.Time)
		}
	})
}

// A heavier aircraft takes longer and more fuel to climb.
func TestHeavierClimbsSlower(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			l := mission.NewLeg(mission.Climb, "")
			l.Altitude = rapid.Float64Range(500, 3000).Draw(t, "top")
			fly := func(item float64) mission.LegResult {
				s := aircrafttest.Homebuilt(kind)
				s.Weights.Items = []aircraft.Item{{Name: "Load", Mass: item}}
				a, err := s.Build()
				if err != nil {
					t.Fatal(err)
				}
				air, err := atmos.Day{}.At(0, nil)
				if err != nil {
					t.Fatal(err)
				}
				f := mission.Fly(a, &mission.Plan{Legs: []mission.Leg{l}, Places: []runway.Place{{Air: air}}})
				if !f.Flown() {
					t.Fatal(f.Failure.Err)
				}
				return f.Legs[0]
			}
			load := rapid.Float64Range(60, 200).Draw(t, "load")
			light, heavy := fly(load), fly(load+rapid.Float64Range(1, 40).Draw(t, "more"))
			if heavy.Time <= light.Time || heavy.Fuel <= light.Fuel {
				t.Errorf("%g s and %g kg with %g kg, %g s and %g kg with more", light.Time, light.Fuel, load, heavy.Time, heavy.Fuel)
			}
		}))
	}
}
