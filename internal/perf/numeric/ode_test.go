package numeric

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

func decay(_ float64, y, dydt []float64) error {
	dydt[0] = -y[0]
	return nil
}

func oscillator(_ float64, y, dydt []float64) error {
	dydt[0], dydt[1] = y[1], -y[0]
	return nil
}

// fixedSteps makes Integrate take n equal steps: the tolerance never binds.
func fixedSteps(span float64, n int) Options {
	h := span / float64(n)
	return Options{RelTol: 1e9, InitialStep: h, MaxStep: h}
}

func mustIntegrate(t testing.TB, f Derivs, t0 float64, y0 []float64, t1 float64, opt Options) *Solution {
	t.Helper()
	s, err := Integrate(f, t0, y0, t1, opt)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// orderProblems have closed-form solutions from y(0) = 1 and a leading error
// term that dominates at 40 steps; the margin is what is left of the next term.
var orderProblems = []struct {
	name   string
	f      Derivs
	exact  func(float64) float64
	span   float64
	margin float64
}{
	{"logistic", func(_ float64, y, dydt []float64) error {
		dydt[0] = -y[0] * (2 - y[0])
		return nil
	}, func(t float64) float64 { return 2 / (1 + math.Exp(2*t)) }, 4, 0.15},
	{"forced", func(t float64, y, dydt []float64) error {
		dydt[0] = y[0] * math.Cos(t)
		return nil
	}, func(t float64) float64 { return math.Exp(math.Sin(t)) }, 6, 0.25},
}

// TestOrder: halving the step divides the largest error at the ends of the
// steps by 2⁵, and that of the dense output between them as well (order 4 plus
// one).
func TestOrder(t *testing.T) {
	for _, c := range orderProblems {
		errorsOf := func(n int) (end, between float64) {
			s := mustIntegrate(t, c.f, 0, []float64{1}, c.span, fixedSteps(c.span, n))
			if s.Accepted != n || s.Rejected != 0 {
				t.Fatalf("%s: %d steps and %d rejected, want %d", c.name, s.Accepted, s.Rejected, n)
			}
			y := make([]float64, 1)
			for _, at := range s.Times() {
				end = math.Max(end, math.Abs(s.At(at, y)[0]-c.exact(at)))
			}
			for i := range 1000 {
				at := c.span * float64(i) / 1000
				between = math.Max(between, math.Abs(s.At(at, y)[0]-c.exact(at)))
			}
			return end, between
		}
		for _, n := range []int{40, 80, 160} {
			end, between := errorsOf(n)
			end2, between2 := errorsOf(2 * n)
			p, q := math.Log2(end/end2), math.Log2(between/between2)
			if math.Abs(p-5) > c.margin {
				t.Errorf("%s, %d steps: observed order %.3f, want 5", c.name, n, p)
			}
			if math.Abs(q-5) > c.margin {
				t.Errorf("%s, %d steps: observed order of the dense output %.3f, want 5", c.name, n, q)
			}
		}
	}
}

// TestTableau checks the coefficients by the order conditions: the embedded
// result is of order 4, so the error weights kill every tree up to order 4.
func TestTableau(t *testing.T) {
	for s, row := range stageWeights {
		var sum float64
		for _, a := range row {
			sum += a
		}
		if math.Abs(sum-stageTimes[s]) > 1e-14 {
			t.Errorf("stage %d: weights sum to %.17g, want %.17g", s, sum, stageTimes[s])
		}
	}
	for p := 0; p <= 4; p++ {
		var high, diff float64
		for i := range 7 {
			c := math.Pow(stageTimes[i], float64(p))
			diff += errorWeights[i] * c
			if i < 6 {
				high += stageWeights[6][i] * c
			}
		}
		if want := 1 / float64(p+1); math.Abs(high-want) > 1e-14 {
			t.Errorf("sum b c^%d = %.17g, want %.17g", p, high, want)
		}
		if p < 4 && math.Abs(diff) > 1e-15 {
			t.Errorf("sum e c^%d = %g, want 0", p, diff)
		}
		if p == 4 && math.Abs(diff) < 1e-4 {
			t.Errorf("sum e c^4 = %g: the estimate is blind to the leading error", diff)
		}
	}
}

func TestDecay(t *testing.T) {
	for _, tol := range []float64{1e-4, 1e-6, 1e-8, 1e-10} {
		opt := Options{RelTol: tol, AbsTol: []float64{1e-14}}
		s := mustIntegrate(t, decay, 0, []float64{3}, 5, opt)
		end, y := s.End()
		want := 3 * math.Exp(-5)
		if e := math.Abs(y[0]/want - 1); end != 5 || e > 10*tol {
			t.Errorf("tolerance %g: relative error %g at %g", tol, e, end)
		}
		if most := int(40 + 15*math.Pow(tol, -0.2)); s.Evaluations > most {
			t.Errorf("tolerance %g: %d evaluations, want at most %d", tol, s.Evaluations, most)
		}
	}
}

// TestAbsTolPerComponent: only the component with the wide tolerance is coarse.
func TestAbsTolPerComponent(t *testing.T) {
	both := func(x float64, y, dydt []float64) error {
		dydt[0], dydt[1] = y[1], -y[0]
		dydt[2], dydt[3] = 30*y[3], -30*y[2]
		return nil
	}
	y0 := []float64{1, 0, 1, 0}
	fine := mustIntegrate(t, both, 0, y0, 6, Options{})
	coarse := mustIntegrate(t, both, 0, y0, 6, Options{AbsTol: []float64{1e-10, 1e-10, 10, 10}})
	if 4*coarse.Accepted > fine.Accepted {
		t.Errorf("%d steps with a wide tolerance on the fast part, %d without", coarse.Accepted, fine.Accepted)
	}
	if _, y := coarse.End(); math.Abs(y[0]-math.Cos(6)) > 1e-7 || math.Abs(y[2]-math.Cos(180)) < 1e-7 {
		t.Errorf("state %v, want only the first two near %g, %g", y, math.Cos(6), -math.Sin(6))
	}
}

func TestOscillatorEnergy(t *testing.T) {
	s := mustIntegrate(t, oscillator, 0, []float64{1, 0}, 20*math.Pi, Options{RelTol: 1e-10})
	_, y := s.End()
	if e := math.Hypot(y[0], y[1]) - 1; math.Abs(e) > 1e-8 {
		t.Errorf("radius off by %g after ten turns", e)
	}
	if math.Abs(y[0]-1) > 1e-8 || math.Abs(y[1]) > 1e-7 {
		t.Errorf("state %v after ten turns, want 1, 0", y)
	}
	at := make([]float64, 2)
	for i := range 1000 {
		x := 20 * math.Pi * float64(i) / 999
		s.At(x, at)
		if math.Abs(at[0]-math.Cos(x)) > 1e-7 || math.Abs(at[1]+math.Sin(x)) > 1e-7 {
			t.Fatalf("dense state %v at %g, want %g, %g", at, x, math.Cos(x), -math.Sin(x))
		}
	}
}

func TestSolutionAccess(t *testing.T) {
	y0 := []float64{1, 0}
	s := mustIntegrate(t, oscillator, 2, y0, 5, Options{})
	times := s.Times()
	if times[0] != 2 || times[len(times)-1] != 5 || len(times) != s.Accepted+1 || !slices.IsSorted(times) {
		t.Errorf("times %v after %d steps", times, s.Accepted)
	}
	end, last := s.End()
	if end != 5 || !slices.Equal(s.At(5, nil), last) || !slices.Equal(s.At(99, nil), last) {
		t.Errorf("end %g %v, At(5) %v, At(99) %v", end, last, s.At(5, nil), s.At(99, nil))
	}
	if !slices.Equal(s.At(2, nil), y0) || !slices.Equal(s.At(-7, nil), y0) {
		t.Errorf("At(2) %v, At(-7) %v, want %v", s.At(2, nil), s.At(-7, nil), y0)
	}
	for i, at := range times[1:] {
		before, after := s.At(at-1e-9, nil), s.At(at+1e-9, nil)
		if math.Abs(before[0]-after[0]) > 1e-8 || math.Abs(before[1]-after[1]) > 1e-8 {
			t.Errorf("jump at the end of step %d: %v to %v", i, before, after)
		}
	}
	if got := s.At(math.NaN(), nil); got[0] == got[0] {
		t.Errorf("At(NaN) = %v", got)
	}
	times[0], last[0], y0[0] = 77, 77, 77
	if s.Times()[0] != 2 || s.At(9, nil)[0] == 77 || s.At(0, nil)[0] != 1 {
		t.Error("the solution shares memory with its caller")
	}
	wantPanic(t, "At with a short slice", func() { s.At(3, make([]float64, 1)) })
}

func TestEvaluationsCounted(t *testing.T) {
	calls := 0
	f := func(x float64, y, dydt []float64) error { calls++; return decay(x, y, dydt) }
	s := mustIntegrate(t, f, 0, []float64{1}, 3, Options{})
	if s.Evaluations != calls || calls != 2+6*(s.Accepted+s.Rejected) {
		t.Errorf("%d evaluations reported, %d made in %d + %d steps", s.Evaluations, calls, s.Accepted, s.Rejected)
	}
}

func TestTrivialSpan(t *testing.T) {
	s := mustIntegrate(t, decay, 4, []float64{3}, 4, Options{})
	end, y := s.End()
	if end != 4 || y[0] != 3 || s.At(4, nil)[0] != 3 || len(s.Times()) != 1 || s.Evaluations != 0 {
		t.Errorf("end %g %v, %+v", end, y, s)
	}
}

// TestStepRejected: a narrow pulse after a quiet stretch must be noticed.
func TestStepRejected(t *testing.T) {
	f := func(x float64, _, dydt []float64) error {
		dydt[0] = math.Exp(-(x - 5) * (x - 5) * 50)
		return nil
	}
	s := mustIntegrate(t, f, 0, []float64{0}, 10, Options{MaxStep: 0.5})
	_, y := s.End()
	if want := math.Sqrt(math.Pi / 50); math.Abs(y[0]-want) > 1e-7 || s.Rejected == 0 {
		t.Errorf("integral %.12g, want %.12g, %d rejected", y[0], want, s.Rejected)
	}
	for i, x := range s.times[1:] {
		if x-s.times[i] > 0.5*(1+1e-9) {
			t.Errorf("step of %g is longer than MaxStep", x-s.times[i])
		}
	}
}

// TestLinearProperty: y' = a y + b has a closed form; random coefficients,
// spans and start times must meet the tolerance.
func TestLinearProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Float64Range(-5, 1).Draw(t, "a")
		b := rapid.Float64Range(-10, 10).Draw(t, "b")
		y0 := rapid.Float64Range(-10, 10).Draw(t, "y0")
		t0 := rapid.Float64Range(-1e3, 1e3).Draw(t, "t0")
		span := rapid.Float64Range(1e-3, 5).Draw(t, "span")
		f := func(_ float64, y, dydt []float64) error { dydt[0] = a*y[0] + b; return nil }
		s, err := Integrate(f, t0, []float64{y0}, t0+span, Options{})
		if err != nil {
			t.Fatal(err)
		}
		exact := func(x float64) float64 {
			if a == 0 {
				return y0 + b*x
			}
			return y0*math.Exp(a*x) + b*math.Expm1(a*x)/a
		}
		// The tolerance of a step, summed over the steps, grown by at most exp(a·span).
		allowed := 1e-8 * float64(10+s.Accepted) * (1 + math.Abs(y0) + math.Abs(b)*span) * math.Exp(math.Max(a, 0)*span)
		for i := range 20 {
			x := span * float64(i) / 19
			if got := s.At(t0+x, nil)[0]; math.Abs(got-exact(t0+x-t0)) > allowed {
				t.Fatalf("y(%g) = %.12g, want %.12g", x, got, exact(x))
			}
		}
	})
}

func TestIntegrateAllocations(t *testing.T) {
	y0 := []float64{1, 0}
	few := testing.AllocsPerRun(20, func() { mustIntegrate(t, oscillator, 0, y0, 1, Options{}) })
	many := testing.AllocsPerRun(20, func() { mustIntegrate(t, oscillator, 0, y0, 300, Options{}) })
	// Three slices double from 24 steps to some thousands.
	if few > 8 || many > few+3*10 {
		t.Errorf("%g allocations for a short and %g for a long integration", few, many)
	}
}

func ExampleIntegrate() {
	// A ball thrown up at 20 m/s: height, speed of rise.
	ball := func(_ float64, y, dydt []float64) error {
		dydt[0], dydt[1] = y[1], -9.80665
		return nil
	}
	s, err := Integrate(ball, 0, []float64{0, 20}, 10, Options{Events: []Event{
		{Name: "apex", G: func(_ float64, y []float64) float64 { return y[1] }, Direction: -1},
		{Name: "ground", G: func(_ float64, y []float64) float64 { return y[0] }, Direction: -1, Terminal: true},
	}})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, c := range s.Crossings {
		fmt.Printf("%s at %.4f s, %.3f m\n", c.Name, c.T, s.At(c.T, nil)[0]+0) // +0: no minus sign
	}
	fmt.Println("stopped by", s.Stopped.Name)
	// Output:
	// apex at 2.0394 s, 20.394 m
	// ground at 4.0789 s, 0.000 m
	// stopped by ground
}

func BenchmarkIntegrate(b *testing.B) {
	b.ReportAllocs()
	y0 := []float64{1, 0}
	for b.Loop() {
		if _, err := Integrate(oscillator, 0, y0, 10, Options{}); err != nil {
			b.Fatal(err)
		}
	}
}
