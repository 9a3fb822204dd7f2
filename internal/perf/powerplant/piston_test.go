package powerplant_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/powerplant"
)

// available is the installed power in W at full throttle, worked out here from
// the inputs: rated power, constant torque below the rated speed, the lapse with
// dry-air density, and losses.
func available(m *powerplant.PistonPropeller, a *atmos.Air, setting, propSpeed float64) float64 {
	e := &m.Engine
	lapse := func(sigma float64) float64 { return sigma - (1-sigma)/7.55 }
	phi := lapse(a.DryDensity / 1.225)
	if e.CriticalAltitude > 0 {
		t := 288.15 - 0.0065*e.CriticalAltitude
		phi = math.Min(1, phi/lapse(math.Pow(t/288.15, 9.80665/(287.05287*0.0065)-1)))
	}
	rated := e.RatedPower * math.Min(1, propSpeed*e.GearRatio/e.RatedSpeed)
	return math.Max(0, setting*rated*math.Max(0, phi)*(1-e.InstallationLoss)-e.AccessoryPower)
}

// TestBalance: what the engine gives is what the propeller takes, short of the redline.
func TestBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawPiston(t)
		p, err := m.Build()
		if err != nil {
			t.Fatal(err)
		}
		c := drawCondition(t, m)
		setting := rapid.Float64Range(0.02, 1).Draw(t, "setting")
		out, err := p.Run(c, setting, nil)
		if err != nil {
			t.Fatal(err)
		}
		e, s := &m.Engine, out.Shaft
		if s.EngineSpeed > e.Redline*(1+1e-12) || math.Abs(s.EngineSpeed-s.Speed*e.GearRatio) > 1e-9*s.EngineSpeed {
			t.Fatalf("engine at %v rev/s above %v, propeller at %v", s.EngineSpeed, e.Redline, s.Speed)
		}
		given := available(m, &c.Air, setting, s.Speed)
		switch {
		case out.Limits&powerplant.Idling != 0:
			if out.FuelFlow != e.IdleFlow || out.Thrust > 0 {
				t.Fatalf("idling with %v N and %v kg/s", out.Thrust, out.FuelFlow)
			}
			return
		case out.Limits&powerplant.SpeedLimited != 0:
			if math.Abs(s.EngineSpeed/e.Redline-1) > 1e-12 || s.Power > given*(1+1e-9) {
				t.Fatalf("limited at %v rev/s of %v, taking %v W of %v", s.EngineSpeed, e.Redline, s.Power, given)
			}
		// 1.225 stands for 1.22499..., one part in a million of density.
		case math.Abs(s.Power-given) > 2e-5*e.RatedPower:
			t.Fatalf("propeller takes %v W, engine gives %v W", s.Power, given)
		}
		brake := (math.Max(0, s.Power) + e.AccessoryPower) / (1 - e.InstallationLoss)
		if want := math.Max(e.IdleFlow, e.Consumption*brake); math.Abs(out.FuelFlow-want) > 1e-9*want || math.Abs(out.Fraction-brake/e.RatedPower) > 1e-9 {
			t.Fatalf("fuel flow %v kg/s, want %v; fraction %v", out.FuelFlow, want, out.Fraction)
		}
	})
}

// TestMatchInvertsRun: the setting comes back where neither idle nor the redline holds the thrust.
func TestMatchInvertsRun(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawPiston(t)
		p, err := m.Build()
		if err != nil {
			t.Fatal(err)
		}
		c := drawCondition(t, m)
		setting := rapid.Float64Range(0.02, 1).Draw(t, "setting")
		out, err := p.Run(c, setting, nil)
		if err != nil {
			t.Fatal(err)
		}
		found, matched, err := p.Match(c, out.Thrust, nil)
		if err != nil {
			t.Fatalf("%v N of setting %v: %v", out.Thrust, setting, err)
		}
		if out.Limits&(powerplant.Idling|powerplant.SpeedLimited) == 0 && math.Abs(found-setting) > 1e-6 {
			t.Fatalf("setting %v gives %v N, which Match finds at %v", setting, out.Thrust, found)
		}
		if found > setting+1e-6 || math.Abs(matched.FuelFlow-out.FuelFlow) > 1e-6*out.FuelFlow {
			t.Fatalf("setting %v burns %v, Match: %v burns %v", setting, out.FuelFlow, found, matched.FuelFlow)
		}
	})
}

// TestThrustFallsWithSpeed at full throttle, for both propellers.
func TestThrustFallsWithSpeed(t *testing.T) {
	for name, m := range map[string]*powerplant.PistonPropeller{"fixed pitch": piston(nil), "constant speed": piston(constantSpeed)} {
		p := build(t, m)
		last := math.Inf(1)
		for v := 0.0; v <= 70; v++ {
			out, err := p.Run(condition(t, atmos.Day{}, 1000, v), 1, nil)
			if err != nil {
				t.Fatal(err)
			}
			if out.Thrust >= last {
				t.Errorf("%s: thrust %v N at %v m/s, %v N a metre slower", name, out.Thrust, v, last)
			}
			last = out.Thrust
		}
	}
}

// TestWeather: heat, height and humidity each take thrust at full throttle.
func TestWeather(t *testing.T) {
	for name, m := range map[string]*powerplant.PistonPropeller{"fixed pitch": piston(nil), "constant speed": piston(constantSpeed)} {
		p := build(t, m)
		thrust := func(d atmos.Day, hp float64) float64 {
			out, err := p.Run(condition(t, d, hp, 25), 1, nil)
			if err != nil {
				t.Fatal(err)
			}
			return out.Thrust
		}
		base := thrust(atmos.Day{Deviation: 10}, 1000)
		for what, worse := range map[string]float64{"heat": thrust(atmos.Day{Deviation: 25}, 1000), "height": thrust(atmos.Day{Deviation: 10}, 2000), "humidity": thrust(atmos.Day{Deviation: 10, Humidity: 1}, 1000)} {
			if worse >= base {
				t.Errorf("%s: %s leaves %v N of %v", name, what, worse, base)
			}
		}
	}
}

// TestThinAir: where the lapse reaches zero there is no power, and no thrust.
func TestThinAir(t *testing.T) {
	for name, m := range map[string]*powerplant.PistonPropeller{"fixed pitch": piston(nil), "constant speed": piston(constantSpeed)} {
		p := build(t, m)
		c := condition(t, atmos.Day{}, 20000, 40)
		out, err := p.Run(c, 1, nil)
		if err != nil || out.Thrust > 0 || out.Limits&powerplant.Idling == 0 {
			t.Errorf("%s: %+v, %v", name, out, err)
		}
		var short *powerplant.ThrustError
		if _, _, err := p.Match(c, 10, nil); !errors.As(err, &short) || short.Want != 10 || short.Available > 0 {
			t.Errorf("%s: Match for 10 N: %v", name, err)
		}
	}
}

func TestConsumptionTable(t *testing.T) {
	m := piston(both(tables, constantSpeed))
	m.Propeller.Speed = 46
	m.Engine.InstallationLoss, m.Engine.AccessoryPower = 0, 0
	out, err := build(t, m).Run(condition(t, atmos.Day{}, 0, 40), 0.6, nil)
	if err != nil {
		t.Fatal(err)
	}
	// 60 % of the table's 76 kW at 46 rev/s, where the table gives 8.2e-8 kg/J.
	if math.Abs(out.Fraction-0.6) > 1e-9 || math.Abs(out.FuelFlow-0.6*76e3*8.2e-8) > 1e-12 {
		t.Errorf("fraction %v, fuel flow %v", out.Fraction, out.FuelFlow)
	}
	m.Propeller.Speed = 25
	out, err = build(t, m).Run(condition(t, atmos.Day{}, 0, 40), 1, nil)
	if err != nil {
		t.Fatal(err)
	}
	// Below the table's 30 rev/s torque is that of its first row.
	if math.Abs(out.Shaft.Power-50e3*25/30) > 1e-6 || out.Limits&powerplant.Extrapolated == 0 {
		t.Errorf("below the table: %v W, limits %b", out.Shaft.Power, out.Limits)
	}
}

func TestWorking(t *testing.T) {
	record := formulatest.Record{}
	rapid.Check(t, func(t *rapid.T) {
		m := drawPiston(t)
		p, err := m.Build()
		if err != nil {
			t.Fatal(err)
		}
		c := drawCondition(t, m)
		var w formula.Working
		out, err := p.Run(c, rapid.Float64Range(0, 1).Draw(t, "setting"), &w)
		if err != nil {
			t.Fatal(err)
		}
		silent, err := p.Run(c, 1, nil)
		if err != nil {
			t.Fatal(err)
		}
		loud, err := p.Run(c, 1, &w)
		if err != nil || loud != silent {
			t.Fatalf("with a working %+v, without %+v, %v", loud, silent, err)
		}
		if _, _, err := p.Match(c, out.Thrust, &w); err != nil {
			t.Fatal(err)
		}
		record.Check(t, w)
	})
	record.Complete(t)
}

func TestNoAllocation(t *testing.T) {
	for name, m := range map[string]*powerplant.PistonPropeller{"fixed pitch": piston(nil), "constant speed": piston(constantSpeed)} {
		p, c := build(t, m), condition(t, atmos.Day{}, 1000, 40)
		if n := testing.AllocsPerRun(100, func() {
			out, _ := p.Run(c, 0.8, nil)
			_, _, _ = p.Match(c, out.Thrust, nil)
		}); n != 0 {
			t.Errorf("%s: %v allocations without a working", name, n)
		}
	}
}
