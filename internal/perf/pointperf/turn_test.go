package pointperf_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
)

// The geometry of a level turn, computed apart from this program to the digits shown.
func TestTurnGeometry(t *testing.T) {
	const knot = 1852.0 / 3600
	for _, c := range []struct{ tas, n, radius, degrees float64 }{{100 * knot, 2, 155.81, 18.918}, {60, 3.8, 100.13, 34.331}, {20, 1.5, 36.48, 31.410}} {
		if got := pointperf.TurnRadius(c.tas, c.n, nil); math.Abs(got-c.radius) > 0.005 {
			t.Errorf("radius %.4f m at %g m/s and n = %g, want %g", got, c.tas, c.n, c.radius)
		}
		if got := pointperf.TurnRate(c.tas, c.n, nil) * 180 / math.Pi; math.Abs(got-c.degrees) > 0.0005 {
			t.Errorf("rate %.5f°/s at %g m/s and n = %g, want %g", got, c.tas, c.n, c.degrees)
		}
	}
	near(t, "load factor at 60° of bank", pointperf.LoadFactor(math.Pi/3, nil), 2, 1e-15)
	if pointperf.LoadFactor(0, nil) != 1 || pointperf.TurnRate(40, 1, nil) != 0 {
		t.Error("wings level turns")
	}
}

// With a constant thrust and a parabolic polar the sustained load factor has a closed form, and its
// greatest value is thrust over weight times the best lift-to-drag ratio: Anderson 1999, section 6.5.
func TestSustainedLoadInClosedForm(t *testing.T) {
	b := aircrafttest.Read(t, "executive jet")
	a := b.Build(t)
	p := &pointperf.Point{Air: aircrafttest.Air(t, 3000), Mass: b.Mass}
	k := 1 / (math.Pi * a.Span() * a.Span() / a.WingArea() * b.Spec.Airframe.Efficiency)
	cd0, s, w := b.Spec.Airframe.CDMin, a.WingArea(), p.Weight()
	out, err := pointperf.ThrustAvailable(a, p, 200, nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, v := range []float64{180, 200, 230} {
		q := 0.5 * p.Air.Density * v * v
		n, lifted, err := pointperf.SustainedLoad(a, p, v)
		if err != nil || lifted {
			t.Fatalf("at %g m/s: ended by lift %v, %v", v, lifted, err)
		}
		near(t, "sustained load factor", n, q*s/w*math.Sqrt((out.Thrust/(q*s)-cd0)/k), 1e-9)
	}
	v := math.Sqrt(2 * out.Thrust / (2 * s * cd0) / p.Air.Density)
	n, _, err := pointperf.SustainedLoad(a, p, v)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "greatest sustained load factor", n, out.Thrust/w/(2*math.Sqrt(k*cd0)), 1e-9)
}

// At any speed and mass the sustained turn uses exactly the thrust there is, or is at the limit of lift.
func TestSustainedTurnUsesAllThrust(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			p := &pointperf.Point{Air: drawAir(t, 5000), Mass: rapid.Float64Range(350, 900).Draw(t, "mass")}
			v := rapid.Float64Range(pointperf.Stall(a, p, nil)*1.0001, 65).Draw(t, "speed")
			most := pointperf.LiftLoad(a, p, v, nil)
			balance, err := pointperf.At(a, p, v, nil)
			if err != nil {
				return
			}
			n, lifted, err := pointperf.SustainedLoad(a, p, v)
			drag := pointperf.Drag(a, p, v, n*p.Weight(), 1, nil)
			switch {
			case err != nil:
				if !errors.Is(err, pointperf.ErrNoThrust) || balance.InHand() > 0 {
					t.Errorf("no turn at %g m/s with %g N in hand: %v", v, balance.InHand(), err)
				}
			case lifted:
				if n != most || drag > balance.Available {
					t.Errorf("lift ends n = %g of %g with %g N of %g", n, most, drag, balance.Available)
				}
			case n < 1 || n > most || math.Abs(drag-balance.Available) > 1e-7*drag:
				t.Errorf("n = %g of %g needs %g N of %g", n, most, drag, balance.Available)
			}
		}))
	}
}

func TestTurnAt(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 500), Mass: 600}
		stall := pointperf.Stall(a, p, nil)
		near(t, "load factor of the stall", pointperf.LiftLoad(a, p, stall, nil), 1, 1e-12)
		before := pointperf.Turn{}
		for i, degrees := range []float64{0, 15, 30, 45, 60} {
			turn := pointperf.TurnAt(a, p, degrees*math.Pi/180)
			if turn.Err != nil {
				t.Fatal(kind, turn.Err)
			}
			near(t, "stall in the turn", turn.Stall, stall*math.Sqrt(turn.Load), 1e-14)
			hand := turn.Available - turn.Required
			for _, v := range []float64{turn.TAS * 0.98, turn.TAS * 1.02} {
				out, err := pointperf.ThrustAvailable(a, p, v, nil)
				if err == nil && v >= turn.Stall && out.Thrust-pointperf.Drag(a, p, v, turn.Load*p.Weight(), 1, nil) > hand {
					t.Errorf("%s, %g°: more in hand at %g m/s than at %g", kind, degrees, v, turn.TAS)
				}
			}
			if i == 0 && (turn.Radius != 0 || turn.Rate != 0 || !turn.Sustained()) {
				t.Errorf("%s: level %+v", kind, turn)
			}
			if i > 0 && (turn.Required <= before.Required || turn.Rate <= before.Rate || turn.TAS < turn.Stall) {
				t.Errorf("%s: %g° of bank %+v after %+v", kind, degrees, turn, before)
			}
			before = turn
		}
	}
}

func TestTurnBeyondTheNeverExceedSpeed(t *testing.T) {
	a := both(t)[aircrafttest.Propellers[0]]
	turn := pointperf.TurnAt(a, &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: 600}, 87*math.Pi/180)
	if turn.Err == nil || turn.Sustained() || turn.TAS != 0 {
		t.Fatalf("turns with 87° of bank: %+v", turn)
	}
	if _, _, err := pointperf.SustainedLoad(a, &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: 600}, 10); err == nil {
		t.Error("turns below the stall")
	}
}

// A ceiling that no speed leads to says so, and not a rate of climb that nobody computed.
func TestCeilingOfWhatCannotFly(t *testing.T) {
	a := both(t)[aircrafttest.Propellers[0]]
	_, err := pointperf.Ceiling(a, atmos.Day{}, 30000, aircraft.Clean, pointperf.AbsoluteRate)
	want := pointperf.BestRate(a, &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: 30000}).Err
	if err == nil || want == nil || err.Error() != want.Error() {
		t.Errorf("says %v, want %v", err, want)
	}
}
