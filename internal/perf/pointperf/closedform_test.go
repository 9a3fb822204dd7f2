package pointperf_test

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/reference"
)

func near(t *testing.T, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s is %.9g, want %.9g within %g of it", what, got, want, relative)
	}
}

// levelClimb is the greatest excess power over weight in m/s with the lift
// equal to the weight, as the book takes it, and its true airspeed in m/s.
func levelClimb(t *testing.T, a *aircraft.Aircraft, p *pointperf.Point) (rate, tas float64) {
	t.Helper()
	m, err := numeric.GlobalMaximum(func(v float64) float64 {
		b, err := pointperf.At(a, p, v, nil)
		if err != nil {
			return math.Inf(-1)
		}
		return b.InHand() * v / p.Weight()
	}, pointperf.Stall(a, p, nil), 320, 40, 1e-9)
	if err != nil {
		t.Fatal(err)
	}
	return m.F, m.X
}

// Speeds of a parabolic polar through CL = 0 have closed forms: Anderson 1999, section 5.4.
func TestSpeedsInClosedForm(t *testing.T) {
	for _, name := range []string{"light single", "executive jet"} {
		b := aircrafttest.Read(t, name)
		a := b.Build(t)
		for _, hp := range []float64{0, 3000} {
			p := &pointperf.Point{Air: aircrafttest.Air(t, hp), Mass: b.Mass}
			k := 1 / (math.Pi * a.Span() * a.Span() / a.WingArea() * b.Spec.Airframe.Efficiency)
			cd0, w := b.Spec.Airframe.CDMin, p.Weight()
			v := math.Sqrt(2 * w / (p.Air.Density * a.WingArea()) * math.Sqrt(k/cd0))
			s := pointperf.AllSpeeds(a, p)
			// A minimum is flat: its speed is known to about the root of its own accuracy.
			near(t, "speed of least thrust", s.LeastThrust.TAS, v, 2e-7)
			near(t, "least thrust", s.LeastThrust.Value, 2*w*math.Sqrt(k*cd0), 1e-12)
			near(t, "speed of least power", s.LeastPower.TAS, v/math.Pow(3, 0.25), 2e-7)
			near(t, "least power", s.LeastPower.Value, w*v/math.Pow(3, 0.25)*4*math.Sqrt(k*cd0/3), 1e-12)
			near(t, "Carson's speed", s.Carson.TAS, v*math.Pow(3, 0.25), 2e-7)
			near(t, "thrust at Carson's speed", s.Carson.Value, w*math.Sqrt(k*cd0)*4/math.Sqrt(3), 1e-7)
			near(t, "stall", s.Stall.TAS, math.Sqrt(2*w/(p.Air.Density*a.WingArea()*a.CLMax(aircraft.Clean))), 1e-14)
			if s.LevelMin.Bound != pointperf.AtStall || s.LevelMin.TAS != s.Stall.TAS {
				t.Errorf("%s flies level from %+v, stalls at %g m/s", name, s.LevelMin, s.Stall.TAS)
			}
		}
	}
}

// The top speed of a constant thrust is the larger root of the quadratic in the dynamic pressure: Anderson 1999, eq. 5.50.
func TestTopSpeedOfAJetInClosedForm(t *testing.T) {
	b := aircrafttest.Read(t, "executive jet")
	a := b.Build(t)
	p := &pointperf.Point{Air: aircrafttest.Air(t, 9000), Mass: b.Mass}
	k := 1 / (math.Pi * a.Span() * a.Span() / a.WingArea() * b.Spec.Airframe.Efficiency)
	cd0, load := b.Spec.Airframe.CDMin, p.Weight()/a.WingArea()
	ratio := b.Model.Plant.(aircrafttest.Jet).Thrust * p.Air.Density / aircrafttest.SeaLevelDensity / p.Weight()
	q := load * (ratio + math.Sqrt(ratio*ratio-4*cd0*k)) / (2 * cd0)
	near(t, "top speed", pointperf.AllSpeeds(a, p).LevelMax.TAS, math.Sqrt(2*q/p.Air.Density), 1e-9)
}

func TestBookPerformance(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_performance") {
		b := aircrafttest.Read(t, row.Text("name"))
		a := b.Build(t)
		ground := &pointperf.Point{Air: aircrafttest.AirOf(t, 0, aircrafttest.SeaLevelDensity), Mass: b.Mass}
		rate, tas := levelClimb(t, a, ground)
		row.Near("computed_climb", rate)
		row.Near("computed_climb_speed", tas)
		checkCeilings(t, row, a, b.Mass)
		checkTimeToClimb(t, row, a, b.Mass)
		checkGlide(t, row, a, ground)
		cruise := &pointperf.Point{Air: aircrafttest.AirOf(t, aircrafttest.Feet(22000), row.SI("cruise_density")), Mass: b.Mass}
		row.Near("computed_top_speed", pointperf.AllSpeeds(a, cruise).LevelMax.TAS)
	}
}

// Near a ceiling the path is flat, so the book's level lift makes no difference.
func checkCeilings(t *testing.T, row reference.Row, a *aircraft.Aircraft, mass float64) {
	t.Helper()
	for suffix, rate := range map[string]float64{"absolute": pointperf.AbsoluteRate, "service": pointperf.ServiceRate} {
		hp, err := pointperf.Ceiling(a, atmos.Day{}, mass, aircraft.Clean, rate)
		if err != nil {
			t.Fatal(err)
		}
		row.Near(suffix, hp)
		row.Near("computed_"+suffix, hp)
	}
}

func checkTimeToClimb(t *testing.T, row reference.Row, a *aircraft.Aircraft, mass float64) {
	t.Helper()
	slowness := func(hp float64, _, dydt []float64) error {
		rate, _ := levelClimb(t, a, &pointperf.Point{Air: aircrafttest.Air(t, hp), Mass: mass})
		dydt[0] = 1 / rate
		return nil
	}
	sol, err := numeric.Integrate(slowness, 0, []float64{0}, aircrafttest.Feet(20000), numeric.Options{RelTol: 1e-7})
	if err != nil {
		t.Fatal(err)
	}
	_, y := sol.End()
	row.Near("time_to_climb", y[0])
	row.Near("computed_time_to_climb", y[0])
}

func checkGlide(t *testing.T, row reference.Row, a *aircraft.Aircraft, p *pointperf.Point) {
	t.Helper()
	g, err := pointperf.BestGlide(a, p)
	if err != nil {
		t.Fatal(err)
	}
	angle := math.Atan(1 / g.Ratio)
	if row.Has("glide_angle") {
		row.Near("glide_angle", angle)
	}
	row.Near("computed_glide_angle", angle)
	row.Near("computed_glide_range", aircrafttest.Feet(10000)*g.Ratio)
	// On the glide path the lift is W cos γ, so the speed is lower by the root of the cosine.
	near(t, "glide speed", g.RatioTAS, pointperf.AllSpeeds(a, p).LeastThrust.TAS*math.Sqrt(math.Cos(angle)), 1e-6)
	if g.Windmills {
		t.Errorf("%s glides with a windmilling powerplant", row)
	}
}
