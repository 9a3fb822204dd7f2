package numeric

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func component(i int, level float64) func(float64, []float64) float64 {
	return func(_ float64, y []float64) float64 { return y[i] - level }
}

func fall(_ float64, y, dydt []float64) error {
	dydt[0], dydt[1] = y[1], -9.80665
	return nil
}

// TestProjectileEvents compares the apex and the return with closed form; the
// motion is a parabola, so the whole flight is one or two steps.
func TestProjectileEvents(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(1, 200).Draw(t, "speed")
		height := rapid.Float64Range(0, 500).Draw(t, "height")
		t0 := rapid.Float64Range(-100, 100).Draw(t, "t0")
		const g, span = 9.80665, 100.0
		s, err := Integrate(fall, t0, []float64{height, v}, t0+span, Options{Events: []Event{
			{Name: "ground", G: component(0, 0), Direction: -1, Terminal: true},
			{Name: "apex", G: component(1, 0)},
		}})
		if err != nil {
			t.Fatal(err)
		}
		apex, ground := v/g, (v+math.Sqrt(v*v+2*g*height))/g
		if len(s.Crossings) != 2 || s.Crossings[0].Name != "apex" || s.Stopped != &s.Crossings[1] || s.Stopped.Event != 0 {
			t.Fatalf("crossings %+v, stopped %+v", s.Crossings, s.Stopped)
		}
		if e := s.Crossings[0].T - t0 - apex; math.Abs(e) > 1e-10*span {
			t.Fatalf("apex off by %g", e)
		}
		if e := s.Stopped.T - t0 - ground; math.Abs(e) > 1e-10*span {
			t.Fatalf("ground off by %g", e)
		}
		end, y := s.End()
		if end != s.Stopped.T || y[0] != s.Stopped.Y[0] || math.Abs(y[0]) > 1e-10*span*250 {
			t.Fatalf("end %g %v, stopped %+v", end, y, s.Stopped)
		}
		if at := s.At(s.Crossings[0].T, nil); math.Abs(at[0]-height-v*v/2/g) > 1e-8 {
			t.Fatalf("apex height %g", at[0])
		}
		if at := s.At(end+5, nil); at[0] != y[0] {
			t.Fatalf("state %v after the end, want %v", at, y)
		}
		if times := s.Times(); times[len(times)-1] != end {
			t.Fatalf("times %v, end %g", times, end)
		}
	})
}

func TestEventDirections(t *testing.T) {
	for _, c := range []struct {
		direction int
		want      []float64
	}{
		{0, []float64{0.5, 1.5, 2.5, 3.5}},
		{-1, []float64{0.5, 2.5}},
		{1, []float64{1.5, 3.5}},
	} {
		s := mustIntegrate(t, oscillator, 0, []float64{1, 0}, 4*math.Pi, Options{
			RelTol: 1e-11,
			Events: []Event{{Name: "zero", G: component(0, 0), Direction: c.direction}},
		})
		if len(s.Crossings) != len(c.want) || s.Stopped != nil {
			t.Fatalf("direction %d: %d crossings, want %d", c.direction, len(s.Crossings), len(c.want))
		}
		for i, x := range s.Crossings {
			if math.Abs(x.T-c.want[i]*math.Pi) > 2e-9 || math.Abs(x.Y[0]) > 3e-9 {
				t.Errorf("direction %d: crossing %+v, want at %g", c.direction, x, c.want[i]*math.Pi)
			}
		}
	}
}

// TestTwoCrossingsInOneStep: y = t over one step of length 1; the function is
// positive at both ends and negative between 0.3 and 0.5.
func TestTwoCrossingsInOneStep(t *testing.T) {
	ramp := func(_ float64, _, dydt []float64) error { dydt[0] = 1; return nil }
	dip := func(_ float64, y []float64) float64 { return (y[0] - 0.3) * (y[0] - 0.5) }
	opt := Options{InitialStep: 1, Events: []Event{{Name: "dip", G: dip}}}
	s := mustIntegrate(t, ramp, 0, []float64{0}, 1, opt)
	if s.Accepted != 1 || len(s.Crossings) != 2 {
		t.Fatalf("%d steps, crossings %+v", s.Accepted, s.Crossings)
	}
	for i, want := range []float64{0.3, 0.5} {
		if math.Abs(s.Crossings[i].T-want) > 1e-10 {
			t.Errorf("crossing %d at %.12g, want %g", i, s.Crossings[i].T, want)
		}
	}
}

// TestEarliestTerminalWins, also when a later one is listed first and when two
// fall between the same probes of a step; events after it are not reported.
func TestEarliestTerminalWins(t *testing.T) {
	ramp := func(_ float64, _, dydt []float64) error { dydt[0] = 1; return nil }
	for _, c := range []struct{ first, second float64 }{{0.9, 0.1}, {0.35, 0.25}, {0.25, 0.35}, {0.1, 0.9}} {
		opt := Options{InitialStep: 1, Events: []Event{
			{Name: "first", G: component(0, c.first), Terminal: true},
			{Name: "early", G: component(0, 0.05)},
			{Name: "second", G: component(0, c.second), Terminal: true},
			{Name: "late", G: component(0, 0.95)},
			{Name: "just late", G: component(0, 0.36)},
		}}
		s := mustIntegrate(t, ramp, 0, []float64{0}, 1, opt)
		want := math.Min(c.first, c.second)
		if s.Stopped == nil || math.Abs(s.Stopped.T-want) > 1e-10 {
			t.Fatalf("%+v: stopped by %+v, want at %g", c, s.Stopped, want)
		}
		var names []string
		for _, x := range s.Crossings {
			names = append(names, x.Name)
			if x.T > want+1e-10 {
				t.Errorf("%+v: crossing %+v after the end", c, x)
			}
		}
		if names[0] != "early" || names[len(names)-1] != s.Stopped.Name {
			t.Errorf("%+v: crossings %v", c, names)
		}
	}
}

// TestEventZeroAtStart: exactly zero at the start is no crossing, whichever
// way it leaves; coming back to it is one.
func TestEventZeroAtStart(t *testing.T) {
	for _, up := range []float64{1, -1} {
		s := mustIntegrate(t, oscillator, 0, []float64{0, up}, 4, Options{RelTol: 1e-11, Events: []Event{
			{Name: "zero", G: component(0, 0)},
		}})
		if len(s.Crossings) != 1 || math.Abs(s.Crossings[0].T-math.Pi) > 2e-9 {
			t.Errorf("crossings %+v, want one at pi", s.Crossings)
		}
	}
}

// TestEventReachesZero: a function that comes to exactly zero at a probe and
// stays there happens once.
func TestEventReachesZero(t *testing.T) {
	ramp := func(_ float64, _, dydt []float64) error { dydt[0] = 1; return nil }
	left := func(_ float64, y []float64) float64 { return math.Max(0, 0.5-y[0]) }
	s := mustIntegrate(t, ramp, 0, []float64{0}, 2, Options{Events: []Event{{Name: "empty", G: left, Direction: -1}}})
	if len(s.Crossings) != 1 || math.Abs(s.Crossings[0].T-0.5) > 0.4 || left(0, s.Crossings[0].Y) > 1e-9 {
		t.Errorf("crossings %+v", s.Crossings)
	}
	stay := func(x float64, _ []float64) float64 { return x - 1 }
	for i := range 100 { // 1 is the exact end, whatever rounding t0 + (1 - t0) meets
		t0 := -float64(i) * 0.37
		s = mustIntegrate(t, ramp, t0, []float64{0}, 1, Options{InitialStep: 100, Events: []Event{{Name: "end", G: stay, Terminal: true}}})
		if s.Stopped == nil || s.Stopped.T != 1 {
			t.Errorf("an event on the very end, from %g: stopped %+v", t0, s.Stopped)
		}
	}
}
