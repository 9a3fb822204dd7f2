package pointperf_test

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/pointperf"
)

func TestGlideInWind(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 1000), Mass: 600}
		calm, err := pointperf.BestGlide(a, p)
		if err != nil {
			t.Fatal(err)
		}
		still, err := pointperf.GlideInWind(a, p, 0)
		if err != nil {
			t.Fatal(err)
		}
		near(t, kind+": ratio in still air", still.Ratio, calm.Ratio, 1e-9)
		near(t, kind+": speed in still air", still.TAS, calm.RatioTAS, 1e-4)
		before := still
		for _, wind := range []float64{3, 6, 12} {
			g, err := pointperf.GlideInWind(a, p, wind)
			if err != nil {
				t.Fatal(err)
			}
			if g.Ratio >= before.Ratio || g.TAS <= before.TAS {
				t.Errorf("%s: %+v against %g m/s after %+v", kind, g, wind, before)
			}
			before = g
		}
		if tail, err := pointperf.GlideInWind(a, p, -6); err != nil || tail.Ratio <= still.Ratio || tail.TAS >= still.TAS {
			t.Errorf("%s: %+v with a tail wind, %+v without, %v", kind, tail, still, err)
		}
		if _, err := pointperf.GlideInWind(a, p, 200); err == nil {
			t.Errorf("%s: makes way against 200 m/s", kind)
		}
	}
}

// The drag alone gives the glide over the ground of a parabolic polar without thrust:
// the least D/(1 − wind/V), by a scan of the small-angle form.
func TestGlideInWindAgainstScan(t *testing.T) {
	b := aircrafttest.Read(t, "light single")
	a := b.Build(t)
	p := &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: b.Mass}
	const wind = 8.0
	best, at := 0.0, 0.0
	for v := pointperf.Stall(a, p, nil); v < 80; v += 0.01 {
		if r := p.Weight() / pointperf.ThrustRequired(a, p, v, nil) * (1 - wind/v); r > best {
			best, at = r, v
		}
	}
	g, err := pointperf.GlideInWind(a, p, wind)
	if err != nil {
		t.Fatal(err)
	}
	// The exact lift W cos γ lowers drag by about γ² of its lift-dependent part; γ is 1 : 14 here.
	near(t, "ratio over the ground", g.Ratio, best, 0.006)
	if math.Abs(g.TAS-at) > 0.5 {
		t.Errorf("flown at %g m/s, want %g", g.TAS, at)
	}
}
