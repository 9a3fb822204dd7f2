package pointperf_test

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/pointperf"
)

// The greatest sustained load factor of an aeroplane of constant thrust is thrust over weight
// times its best lift-to-drag ratio, at the speed where its drag at that lift equals the
// thrust: Anderson 1999, section 6.5.
func TestBestTurnInClosedForm(t *testing.T) {
	b := aircrafttest.Read(t, "executive jet")
	b.Spec.Airframe.Clean.CLMax = 5 // so that lift ends no turn
	a := b.Build(t)
	p := &pointperf.Point{Air: aircrafttest.Air(t, 3000), Mass: b.Mass}
	k := 1 / (math.Pi * a.Span() * a.Span() / a.WingArea() * b.Spec.Airframe.Efficiency)
	cd0 := b.Spec.Airframe.CDMin
	out, err := pointperf.ThrustAvailable(a, p, 200, nil)
	if err != nil {
		t.Fatal(err)
	}
	best, lifted := pointperf.BestTurn(a, p)
	if best.Err != nil || lifted {
		t.Fatalf("ended by lift %v, %v", lifted, best.Err)
	}
	near(t, "load factor", best.Value, out.Thrust/p.Weight()/(2*math.Sqrt(k*cd0)), 1e-9)
	near(t, "speed", best.TAS, math.Sqrt(out.Thrust/(p.Air.Density*a.WingArea()*cd0)), 1e-4)
}

// No speed sustains more than the best, and what cannot fly level cannot turn.
func TestBestTurnIsBest(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 800), Mass: 600}
		best, _ := pointperf.BestTurn(a, p)
		if best.Err != nil {
			t.Fatal(kind, best.Err)
		}
		for v := pointperf.Stall(a, p, nil) * 1.001; v < 70; v += 0.5 {
			if n, _, err := pointperf.SustainedLoad(a, p, v); err == nil && n > best.Value*(1+1e-9) {
				t.Errorf("%s: %g at %g m/s, best %g at %g", kind, n, v, best.Value, best.TAS)
			}
		}
		if fast := pointperf.LevelMax(a, p); fast != pointperf.AllSpeeds(a, p).LevelMax {
			t.Errorf("%s: level maximum %+v", kind, fast)
		}
		if b, _ := pointperf.BestTurn(a, &pointperf.Point{Air: p.Air, Mass: 4000}); b.Err == nil {
			t.Errorf("%s: turns at 4000 kg", kind)
		}
	}
}
