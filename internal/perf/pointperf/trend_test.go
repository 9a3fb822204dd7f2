package pointperf_test

import (
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
)

// A light two-seater of 75 kW performs as its like are known to: common practice, no source.
func TestTwoSeaterFliesLikeOne(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: a.StartMass()}
		s := pointperf.AllSpeeds(a, p)
		g, err := pointperf.BestGlide(a, p)
		if err != nil {
			t.Fatal(err)
		}
		ceiling, err := pointperf.Ceiling(a, atmos.Day{}, p.Mass, aircraft.Clean, pointperf.ServiceRate)
		if err != nil {
			t.Fatal(err)
		}
		for what, c := range map[string]struct{ got, low, high float64 }{
			"mass in kg":            {p.Mass, 550, 650},
			"stall in m/s":          {s.Stall.TAS, 20, 28},
			"rate of climb in m/s":  {s.BestRate.Value, 3, 7},
			"its speed in m/s":      {s.BestRate.TAS, 30, 42},
			"steepest climb in rad": {s.BestAngle.Value, 0.1, 0.25},
			"top speed in m/s":      {s.LevelMax.TAS, 50, 70},
			"glide ratio":           {g.Ratio, 8, 15},
			"sink in m/s":           {g.Sink, 1.8, 4},
			// A loaded disc keeps its best efficiency in thin air, which a real propeller does not.
			"service ceiling in m": {ceiling, 3500, 7500},
		} {
			if !(c.got > c.low && c.got < c.high) {
				t.Errorf("%s: %s is %g, expected %g to %g", kind, what, c.got, c.low, c.high)
			}
		}
		if g.Windmills && g.RatioTAS > s.LeastThrust.TAS {
			t.Errorf("%s: a windmilling propeller's drag asks for a slower glide than %g m/s, not %g", kind, s.LeastThrust.TAS, g.RatioTAS)
		}
	}
}

func TestThrustFallsWithSpeedAndPowerWithAltitude(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			air := drawAir(t, 5000)
			v := rapid.Float64Range(0, 60).Draw(t, "speed")
			p := &pointperf.Point{Air: air, Mass: 600}
			here, err := pointperf.ThrustAvailable(a, p, v, nil)
			if err != nil {
				t.Fatal(err)
			}
			if faster, err := pointperf.ThrustAvailable(a, p, v+rapid.Float64Range(0.1, 8).Draw(t, "gain"), nil); err != nil || faster.Thrust >= here.Thrust {
				t.Errorf("thrust is %g N at %g m/s and %g N (%v) faster", here.Thrust, v, faster.Thrust, err)
			}
			day := atmos.Day{}
			low, high := rapid.Float64Range(-300, 4000).Draw(t, "low"), rapid.Float64Range(100, 2000).Draw(t, "height")
			under, err := day.At(low, nil)
			if err != nil {
				t.Fatal(err)
			}
			over, err := day.At(low+high, nil)
			if err != nil {
				t.Fatal(err)
			}
			below, err := pointperf.ThrustAvailable(a, &pointperf.Point{Air: under, Mass: 600}, 40, nil)
			if err != nil {
				t.Fatal(err)
			}
			above, err := pointperf.ThrustAvailable(a, &pointperf.Point{Air: over, Mass: 600}, 40, nil)
			if err != nil {
				t.Fatal(err)
			}
			if above.Thrust >= below.Thrust || above.Shaft.Power >= below.Shaft.Power || above.FuelFlow >= below.FuelFlow {
				t.Errorf("%g m higher than %g m: %+v against %+v", high, low, above, below)
			}
		}))
	}
}

// The share of excess thrust that goes into speed has closed forms in the
// troposphere on a standard day: constant equivalent airspeed and constant Mach number.
func TestAccelerationFactorInClosedForm(t *testing.T) {
	for _, hp := range []float64{500, 4000, 9000} {
		air := aircrafttest.Air(t, hp)
		at := func(h float64) atmos.Air { return aircrafttest.Air(t, h) }
		const eas, mach = 80.0, 0.4
		f, err := pointperf.AccelerationFactor(atmos.Day{}, hp, func(h float64) float64 { return at(h).FromEAS(eas) })
		if err != nil {
			t.Fatal(err)
		}
		v := air.FromEAS(eas)
		// -dσ/dh over σ is (g/R − 0.0065)/T.
		near(t, "factor at constant EAS", f, v*v/(2*atmos.Gravity)*(atmos.Gravity/atmos.GasConstant-0.0065)/air.Temperature, 1e-6)
		f, err = pointperf.AccelerationFactor(atmos.Day{}, hp, func(h float64) float64 { return at(h).FromMach(mach) })
		if err != nil {
			t.Fatal(err)
		}
		near(t, "factor at constant Mach number", f, -mach*mach*atmos.HeatRatio*atmos.GasConstant*0.0065/(2*atmos.Gravity), 1e-6)
	}
	if _, err := pointperf.AccelerationFactor(atmos.Day{}, 40000, func(float64) float64 { return 50 }); err == nil {
		t.Error("a factor above the atmosphere")
	}
	warm := atmos.Day{Deviation: 20}
	slope := func(h float64) float64 { return 50 + 0.01*h }
	f, err := pointperf.AccelerationFactor(warm, 2000, slope)
	if err != nil {
		t.Fatal(err)
	}
	air, err := warm.At(2000, nil)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "factor on a warm day", f, slope(2000)/atmos.Gravity*0.01/air.HeightRatio, 1e-9)
}
