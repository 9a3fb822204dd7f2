package pointperf_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
)

// demoPoint draws a variant of the demo project and a point at which it flies.
func demoPoint(t *rapid.T, p *project.Project) (int, *pointperf.Point, float64) {
	i := rapid.IntRange(0, len(p.Aircraft)-1).Draw(t, "variant")
	a := p.Aircraft[i]
	point := &pointperf.Point{Air: drawAir(t, 5000), Mass: rapid.Float64Range(a.DryMass(), a.MaxTakeOff()).Draw(t, "mass")}
	v := rapid.Float64Range(pointperf.Stall(a, point, nil), 60).Draw(t, "speed")
	return i, point, v
}

// What the demo project shows is what is computed: every step of every working
// gives its number again from its own expression, and a working changes no result.
func TestShownWorkingIsTrue(t *testing.T) {
	p, err := project.Demo().Build()
	if err != nil {
		t.Fatal(err)
	}
	seen := formulatest.Record{}
	t.Run("demo", rapid.MakeCheck(func(t *rapid.T) {
		i, point, v := demoPoint(t, p)
		a := p.Aircraft[i]
		var w formula.Working
		with, err := pointperf.At(a, point, v, &w)
		without, bare := pointperf.At(a, point, v, nil)
		if (err == nil) != (bare == nil) || with != without {
			t.Errorf("At gives %+v, %v with a working and %+v, %v without", with, err, without, bare)
		}
		if got, want := pointperf.Stall(a, point, &w), pointperf.Stall(a, point, nil); got != want {
			t.Errorf("stalls at %g m/s with a working, %g without", got, want)
		}
		factor := rapid.Float64Range(-0.1, 0.1).Draw(t, "factor")
		if got, want := pointperf.ClimbAt(a, point, v, with.Available, factor, &w), pointperf.ClimbAt(a, point, v, with.Available, factor, nil); !sameClimb(got, want) {
			t.Errorf("climbs %+v with a working, %+v without", got, want)
		}
		load := pointperf.LoadFactor(rapid.Float64Range(0.1, 1.4).Draw(t, "bank"), &w)
		if got, want := pointperf.TurnRadius(v, load, &w)*pointperf.TurnRate(v, load, &w), v; math.Abs(got-want) > 1e-9*want {
			t.Errorf("radius times rate is %g m/s at %g m/s", got, want)
		}
		pointperf.LiftLoad(a, point, v, &w)
		turning, err := pointperf.AtLoad(a, point, v, load, &w)
		level, short := pointperf.LevelAtLoad(a, point, v, load)
		if err == nil && turning.Required != level.Required || (short == nil) != (err == nil && turning.InHand() >= 0) {
			t.Errorf("a turn at load factor %g asks for %g N with a working, %g N without (%v)", load, turning.Required, level.Required, short)
		}
		if c, err := pointperf.FullClimb(a, point, v, &w); err == nil && c.TAS != v {
			t.Errorf("climbs at %g m/s, asked for %g", c.TAS, v)
		}
		if len(w.Steps) < 10 {
			t.Errorf("a working of %d steps", len(w.Steps))
		}
		seen.Check(t, w)
	}))
	seen.Complete(t)
}

// sameClimb allows the angle the accuracy of the iteration that ends one step later under a working.
func sameClimb(a, b pointperf.Climb) bool {
	near := func(x, y float64) bool { return x-y < 1e-9 && y-x < 1e-9 }
	return a.TAS == b.TAS && near(a.Angle, b.Angle) && near(a.Rate, b.Rate) && near(a.Drag/1e3, b.Drag/1e3)
}

// The forces of a sweep or a root allocate nothing, with either propeller.
func TestForcesAllocateNothing(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 1500), Mass: 600}
		n := testing.AllocsPerRun(100, func() {
			sink = pointperf.ThrustRequired(a, p, 45, nil)
			out, err := pointperf.ThrustAvailable(a, p, 45, nil)
			if err != nil {
				t.Fatal(err)
			}
			sink += out.Thrust + pointperf.Stall(a, p, nil) + pointperf.ClimbAt(a, p, 45, out.Thrust, 0, nil).Rate
		})
		if n != 0 {
			t.Errorf("%s: %g allocations", kind, n)
		}
		if n := testing.AllocsPerRun(100, func() {
			l, err := pointperf.LevelAt(a, p, 40)
			if err != nil {
				t.Fatal(err)
			}
			sink = l.Setting
		}); n != 0 {
			t.Errorf("%s: a match makes %g allocations", kind, n)
		}
	}
}

var sink float64

func BenchmarkForces(b *testing.B) {
	for _, kind := range []string{powerplant.FixedPitch, powerplant.ConstantSpeed} {
		a := both(b)[kind]
		p := &pointperf.Point{Air: aircrafttest.Air(b, 1500), Mass: 600}
		b.Run(kind, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				sink = pointperf.ThrustRequired(a, p, 45, nil)
				out, err := pointperf.ThrustAvailable(a, p, 45, nil)
				if err != nil {
					b.Fatal(err)
				}
				sink += out.Thrust
			}
		})
	}
}

func BenchmarkAllSpeeds(b *testing.B) {
	for _, kind := range []string{powerplant.FixedPitch, powerplant.ConstantSpeed} {
		a := both(b)[kind]
		p := &pointperf.Point{Air: aircrafttest.Air(b, 1500), Mass: 600}
		b.Run(kind, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				sink = pointperf.AllSpeeds(a, p).BestRate.Value
			}
		})
	}
}
