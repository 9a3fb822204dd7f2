package numeric

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestMaximum(t *testing.T) {
	inf := math.Inf(1)
	// cliff rises to 3 and is infeasible beyond.
	cliff := func(x float64) float64 {
		if x > 3 {
			return -inf
		}
		return x
	}
	for _, c := range []struct {
		name   string
		f      func(float64) float64
		a, b   float64
		want   float64
		within float64 // in x; near a smooth top f is flat to rounding within about 1e-8
		most   int
	}{
		{"parabola", func(x float64) float64 { return -(x - 1.25) * (x - 1.25) }, -3, 4, 1.25, 5e-8, 10},
		{"sine", math.Sin, 0, 3, math.Pi / 2, 5e-8, 13},
		{"x exp(-x)", func(x float64) float64 { return x * math.Exp(-x) }, 0, 30, 1, 5e-8, 22},
		// (x-2)⁴ is below rounding of 1 within 1e-4.
		{"flat top", func(x float64) float64 { return 1 - math.Pow(x-2, 4) }, 0, 5, 2, 2e-4, 46},
		{"corner", func(x float64) float64 { return -math.Abs(x - 0.3) }, -1, 1, 0.3, 1e-8, 34},
		{"low end", func(x float64) float64 { return -x }, 1, 4, 1, 0, 46},
		{"high end", func(x float64) float64 { return x }, 1, 4, 4, 0, 46},
		{"ends beat the middle", func(x float64) float64 { return x * x }, -1, 2, 2, 0, 46},
		{"cliff", cliff, 0, 10, 3, 1e-7, 46},
		{"feasible only near a", func(x float64) float64 { return cliff(x + 2.9) }, 0, 1, 0.1, 1e-8, 60},
		{"feasible only near b", func(x float64) float64 { return cliff(3.9 - x) }, 0, 1, 0.9, 1e-7, 60},
		{"one point", math.Sin, 1, 1, 1, 0, 4},
	} {
		calls := 0
		m, err := Maximum(func(x float64) float64 { calls++; return c.f(x) }, c.a, c.b, 0)
		if err != nil || !(math.Abs(m.X-c.want) <= c.within) || m.F != c.f(m.X) {
			t.Errorf("%s: %+v, %v, want %g within %g", c.name, m, err, c.want, c.within)
		}
		if m.Evaluations != calls || calls > c.most {
			t.Errorf("%s: %d evaluations reported, %d made, want at most %d", c.name, m.Evaluations, calls, c.most)
		}
	}
}

func TestGlobalMaximum(t *testing.T) {
	wavy := func(x float64) float64 { return math.Sin(x) + x/50 } // peaks at acos(-1/50) + 2πk
	want := math.Acos(-1./50) + 4*math.Pi
	m, err := GlobalMaximum(wavy, 0, 17, 40, 0)
	if err != nil || math.Abs(m.X-want) > 3e-7 || m.F != wavy(m.X) || m.Evaluations > 41+10 {
		t.Errorf("wavy: %+v, %v, want %.9g in 51 evaluations", m, err, want)
	}
	// A lone feasible stretch that the golden cuts of the whole interval miss.
	island := func(x float64) float64 {
		if x < 71 || x > 73 {
			return math.Inf(-1)
		}
		return -(x - 72.3) * (x - 72.3)
	}
	if m, err = GlobalMaximum(island, 0, 100, 100, 0); err != nil || math.Abs(m.X-72.3) > 2e-6 {
		t.Errorf("island: %+v, %v", m, err)
	}
	for _, end := range []float64{2, 9} {
		m, err = GlobalMaximum(func(x float64) float64 { return -math.Abs(x - end) }, 2, 9, 7, 0)
		if err != nil || m.X != end {
			t.Errorf("end %g: %+v, %v", end, m, err)
		}
	}
	if m, err = GlobalMaximum(func(float64) float64 { return 5 }, 2, 9, 7, 0); err != nil || m.X != 2 || m.F != 5 {
		t.Errorf("constant: %+v, %v, want the lowest x", m, err)
	}
}

func TestMaximumErrors(t *testing.T) {
	type finder = func(func(float64) float64, float64, float64) (Extremum, error)
	for name, find := range map[string]finder{
		"Maximum":       func(f func(float64) float64, a, b float64) (Extremum, error) { return Maximum(f, a, b, 0) },
		"GlobalMaximum": func(f func(float64) float64, a, b float64) (Extremum, error) { return GlobalMaximum(f, a, b, 5, 0) },
	} {
		constant := func(v float64) func(float64) float64 { return func(float64) float64 { return v } }
		if _, err := find(constant(math.Inf(-1)), 1, 2); !errors.Is(err, ErrInfeasible) || !errors.Is(err, ErrNotFinite) {
			t.Errorf("%s, all infeasible: %v", name, err)
		}
		for _, bad := range []float64{math.NaN(), math.Inf(1)} {
			_, err := find(constant(bad), 1, 2)
			if !errors.Is(err, ErrNotFinite) || errors.Is(err, ErrInfeasible) {
				t.Errorf("%s of %g: %v", name, bad, err)
			}
			inside := func(x float64) float64 {
				if x > 1 && x < 2 {
					return bad
				}
				return x
			}
			if _, err := find(inside, 1, 2); !errors.Is(err, ErrNotFinite) {
				t.Errorf("%s with %g inside: %v", name, bad, err)
			}
		}
		if _, err := find(math.Sin, 2, 1); !errors.Is(err, ErrInterval) {
			t.Errorf("%s, empty interval: %v", name, err)
		}
		if _, err := find(math.Sin, 2, math.NaN()); !errors.Is(err, ErrNotFinite) {
			t.Errorf("%s, NaN bound: %v", name, err)
		}
	}
}

// TestMaximumProperty: on unimodal functions with the top anywhere, inside or
// outside the interval, the result is the top held to the interval.
func TestMaximumProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		top := rapid.Float64Range(-50, 50).Draw(t, "top")
		a := rapid.Float64Range(-50, 50).Draw(t, "a")
		b := a + rapid.Float64Range(0, 100).Draw(t, "width")
		skew := rapid.Float64Range(0.1, 10).Draw(t, "skew")
		f := func(x float64) float64 {
			if x > top {
				return -skew * (x - top) * (x - top)
			}
			return -(x - top) * (x - top)
		}
		want := math.Min(math.Max(top, a), b)
		m, err := Maximum(f, a, b, 0)
		if err != nil {
			t.Fatal(err)
		}
		if m.X < a || m.X > b {
			t.Fatalf("%g outside %g to %g", m.X, a, b)
		}
		// Equal values by rounding are as good.
		if m.F < f(want) && math.Abs(m.X-want) > 3e-8*math.Max(math.Abs(want), 1e-6*math.Max(math.Abs(a), math.Abs(b))) {
			t.Fatalf("x = %.12g, want %.12g", m.X, want)
		}
		g, err := GlobalMaximum(f, a, b, 10, 0)
		if err != nil || math.Abs(g.X-m.X) > 1e-6 {
			t.Fatalf("GlobalMaximum %+v, %v, Maximum %+v", g, err, m)
		}
	})
}

func ExampleMaximum() {
	m, err := Maximum(func(x float64) float64 { return x * math.Exp(-x) }, 0, 5, 0)
	fmt.Printf("%.6f at %.6f, %v\n", m.F, m.X, err)
	// Output: 0.367879 at 1.000000, <nil>
}

func BenchmarkMaximum(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Maximum(math.Sin, 0, 3, 0); err != nil {
			b.Fatal(err)
		}
	}
}
