package envelope_test

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/envelope"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/pointperf"
)

func near(t *testing.T, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s is %.9g, want %.9g within %g of it", what, got, want, relative)
	}
}

// With a constant thrust and a parabolic polar the specific excess power has a closed form:
// V (T/W − q CD0/(W/S) − n² K (W/S)/q), Anderson 1999, section 6.6, from memory.
func TestExcessInClosedForm(t *testing.T) {
	b := aircrafttest.Read(t, "executive jet")
	a := b.Build(t)
	p := &pointperf.Point{Air: aircrafttest.Air(t, 4000), Mass: b.Mass}
	k := 1 / (math.Pi * a.Span() * a.Span() / a.WingArea() * b.Spec.Airframe.Efficiency)
	seen := formulatest.Record{}
	for _, v := range []float64{120, 170, 220} {
		for _, n := range []float64{1, 2, 3} {
			var w formula.Working
			got, err := envelope.Excess(a, p, v, n, &w)
			if err != nil {
				t.Fatal(err)
			}
			seen.Check(t, w)
			out, _ := pointperf.ThrustAvailable(a, p, v, nil)
			q, loading := 0.5*p.Air.Density*v*v, p.Weight()/a.WingArea()
			near(t, "excess power", got, v*(out.Thrust/p.Weight()-q*b.Spec.Airframe.CDMin/loading-n*n*k*loading/q), 1e-9)
			if bare, _ := envelope.Excess(a, p, v, n, nil); bare != got {
				t.Errorf("%g with a working, %g without", got, bare)
			}
		}
	}
	seen.Complete(t)
}

// The grid is bounded by stall and never-exceed speed, and its line of no excess power tops out at the
// absolute ceiling: there the climb is level, so that the two ways of computing it agree.
func TestGridAgreesWithTheCeiling(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		a := aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
		day := atmos.Day{Deviation: 10}
		const mass = 600
		ceiling, err := pointperf.Ceiling(a, day, mass, aircraft.Clean, pointperf.AbsoluteRate)
		if err != nil {
			t.Fatal(err)
		}
		g, err := envelope.NewGrid(envelope.Case{Aircraft: a, Day: day, Mass: mass, Load: 1}, 0, 1.05*ceiling, 81, 81)
		if err != nil {
			t.Fatal(err)
		}
		top := 0.0
		for _, l := range g.Contours(0) {
			for _, p := range l.Points {
				top = math.Max(top, p.Altitude)
			}
		}
		near(t, kind+": top of the thrust limit", top, ceiling, 2e-3)
		flown := 0.0
		for _, c := range g.Columns(101) {
			if c.Flown.Some() {
				flown = math.Max(flown, c.Flown.High)
			}
			if c.Flown.Some() && c.Short.Some() && c.Short.Low < c.Flown.High-1e-6 && c.Short.High > c.Flown.High+1e-6 && c.Short.Low > c.Flown.Low {
				t.Errorf("%s: at %g m/s flown %+v and short %+v", kind, c.TAS, c.Flown, c.Short)
			}
		}
		near(t, kind+": highest altitude flown", flown, ceiling, 2e-3)
		for _, l := range g.Levels {
			p := &pointperf.Point{Air: mustAir(t, day, l.Altitude), Mass: mass}
			near(t, "stall", l.Nodes[0].TAS, pointperf.Stall(a, p, nil), 1e-12)
			near(t, "never exceed", float64(p.Air.CAS(l.Nodes[len(l.Nodes)-1].TAS)), a.NeverExceed(), 1e-9)
		}
	}
}

func mustAir(t *testing.T, day atmos.Day, hp float64) atmos.Air {
	t.Helper()
	air, err := day.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}

func TestLoadShrinksTheGrid(t *testing.T) {
	a := aircrafttest.Build(t, aircrafttest.Homebuilt(aircrafttest.Propellers[0]))
	c := envelope.Case{Aircraft: a, Mass: 600, Load: 1}
	level, err := envelope.NewGrid(c, 0, 2000, 21, 5)
	if err != nil {
		t.Fatal(err)
	}
	c.Load = 2
	turning, err := envelope.NewGrid(c, 0, 2000, 21, 5)
	if err != nil {
		t.Fatal(err)
	}
	one, _, _ := level.Most()
	two, _, _ := turning.Most()
	if two.Excess >= one.Excess {
		t.Errorf("most excess power %g m/s at load factor 2, %g at 1", two.Excess, one.Excess)
	}
	near(t, "stall at load factor 2", turning.Levels[0].Stall, level.Levels[0].Stall*math.Sqrt2, 1e-12)
	if v, ok := level.Levels[2].At(level.Levels[2].Nodes[7].TAS); !ok || math.Abs(v-level.Levels[2].Nodes[7].Excess) > 1e-9 {
		t.Errorf("interpolates %g at a node of %g", v, level.Levels[2].Nodes[7].Excess)
	}
	for _, v := range []float64{level.Levels[2].Stall - 0.01, level.Levels[2].Top + 0.01, math.NaN()} {
		if _, ok := level.Levels[2].At(v); ok {
			t.Errorf("answers at %g m/s", v)
		}
	}
}

func TestGridOfWhatCannotFly(t *testing.T) {
	a := aircrafttest.Build(t, aircrafttest.Homebuilt(aircrafttest.Propellers[0]))
	if g, err := envelope.NewGrid(envelope.Case{Aircraft: a, Mass: 50000, Load: 1}, 0, 2000, 21, 5); err == nil || len(g.Levels) != 0 {
		t.Errorf("50 t fly: %v", err)
	}
	// Towards the top the stall meets the never-exceed speed, and the grid ends there.
	g, err := envelope.NewGrid(envelope.Case{Aircraft: a, Mass: 600, Load: 1}, 0, 30000, 21, 31)
	if err != nil || len(g.Levels) < 2 || len(g.Levels) > 31 {
		t.Fatalf("%d levels, %v", len(g.Levels), err)
	}
	for _, l := range g.Levels {
		if !(l.Stall < l.Top) {
			t.Errorf("a level with its stall at %g m/s and its end at %g", l.Stall, l.Top)
		}
	}
}

// Where thrust suffices below a level and lift only above a slanted stall, each column is cut exactly.
func TestColumnsAreCutExactly(t *testing.T) {
	g := field(21, 11, func(v, h float64) float64 { return 5.5 - h })
	for j := range g.Levels {
		l := &g.Levels[j]
		l.Stall = l.Altitude / 2 // so that at the speed v the stall stands at an altitude of 2 v
		for i := range l.Nodes {
			l.Nodes[i].TAS = l.Stall + (l.Top-l.Stall)*float64(i)/20
		}
	}
	for _, c := range g.Columns(41) {
		roof := math.Min(10, 2*c.TAS)
		flown, short := envelope.Range{High: math.Min(roof, 5.5)}, envelope.Range{Low: 5.5, High: roof}
		if math.Abs(c.Flown.Low-flown.Low) > 1e-9 || math.Abs(c.Flown.High-flown.High) > 1e-9 {
			t.Errorf("at %g m/s flown from %g to %g, want %+v", c.TAS, c.Flown.Low, c.Flown.High, flown)
		}
		if c.Short.Some() != (roof >= 5.5) || (c.Short.Some() && (math.Abs(c.Short.Low-5.5) > 1e-9 || math.Abs(c.Short.High-roof) > 1e-9)) {
			t.Errorf("at %g m/s short from %g to %g, want %+v", c.TAS, c.Short.Low, c.Short.High, short)
		}
	}
}
