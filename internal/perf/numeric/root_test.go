package numeric

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// hardRoots are functions on which bracketing methods have been known to
// crawl, with closed-form roots.
var hardRoots = []struct {
	name     string
	f        func(float64) float64
	a, b     float64
	root     float64
	within   float64 // allowed error in x
	residual float64 // allowed |f|
	most     int     // evaluations, ends included
}{
	{"linear", func(x float64) float64 { return 3*x - 6 }, -10, 10, 2, 2e-10, 1e-9, 8},
	{"cosine", math.Cos, 0, 3, math.Pi / 2, 2e-10, 1e-10, 12},
	{"wallis cubic", func(x float64) float64 { return x*x*x - 2*x - 5 }, 2, 3, 2.0945514815423265, 2.1e-10, 1e-8, 12},
	{"simple root at zero", math.Sin, -1, 1.5, 0, 1e-15, 1e-15, 15},
	// (x-1)³ stays below 1e-30 within 1e-10 of the root: x, not f, decides.
	{"triple root", func(x float64) float64 { return math.Pow(x-1, 3) }, -4, 7, 1, 1e-10, 1e-28, 60},
	{"ninth power", func(x float64) float64 { return math.Pow(x, 9) }, -1, 1.7, 0, 1e-15, 1e-100, 110},
	// Every derivative vanishes at 0; below 1/27 the function underflows to 0.
	{"flat", func(x float64) float64 { return x * math.Exp(-1/(x*x)) }, -0.5, 0.8, 0, 0.04, 0, 60},
	{"steep exponential", func(x float64) float64 { return math.Expm1(50 * (x - 0.9)) }, 0, 1, 0.9, 1e-10, 1e-8, 20},
	{"one-sided curve", func(x float64) float64 { return 1/x - 1e-3 }, 1, 1e6, 1000, 1e-7, 1e-12, 40},
	{"cube root", func(x float64) float64 { return math.Cbrt(x - 0.3) }, -1, 5, 0.3, 1e-10, 1e-3, 60},
	{"jump", func(x float64) float64 {
		if x < 0.7 {
			return -1
		}
		return 2
	}, 0, 1, 0.7, 1e-10, 2, 45},
	{"pole", func(x float64) float64 { return 1 / (x - math.Pi) }, 0, 5, math.Pi, 3.2e-10, math.Inf(1), 60},
}

func TestRootHard(t *testing.T) {
	for _, c := range hardRoots {
		for _, flip := range []float64{1, -1} {
			calls := 0
			r, err := Root(func(x float64) float64 { calls++; return flip * c.f(x) }, c.a, c.b, 0)
			if err != nil {
				t.Errorf("%s: %v", c.name, err)
				continue
			}
			if !(math.Abs(r.X-c.root) <= c.within) {
				t.Errorf("%s: x = %.17g, want %.17g within %g", c.name, r.X, c.root, c.within)
			}
			if got := flip * c.f(r.X); r.Residual != got || math.Abs(got) > c.residual {
				t.Errorf("%s: residual %g, f(x) %g, want below %g", c.name, r.Residual, got, c.residual)
			}
			if r.Evaluations != calls || calls > c.most {
				t.Errorf("%s: %d evaluations reported, %d made, want at most %d", c.name, r.Evaluations, calls, c.most)
			}
		}
	}
}

func TestRootEnds(t *testing.T) {
	for _, c := range []struct{ a, b, want float64 }{{2, 5, 2}, {-5, 2, 2}, {2, 2, 2}} {
		r, err := Root(func(x float64) float64 { return x - 2 }, c.a, c.b, 0)
		if err != nil || r.X != c.want || r.Residual != 0 || r.Evaluations != 2 {
			t.Errorf("Root on %v, %v = %+v, %v", c.a, c.b, r, err)
		}
	}
}

func TestRootErrors(t *testing.T) {
	nan := math.NaN()
	square := func(x float64) float64 { return x*x + 1 }
	hole := func(x float64) float64 {
		if math.Abs(x) < 0.9 {
			return nan
		}
		return x
	}
	for _, c := range []struct {
		name string
		f    func(float64) float64
		a, b float64
		want error
		text string
	}{
		{"same sign", square, 1, 3, ErrNoBracket, "root: no sign change from 1 to 3 (function 2 and 10)"},
		{"one point", square, 1, 1, ErrNoBracket, "root: no sign change at 1 (function 2)"},
		{"reversed", math.Sin, 1, -1, ErrNoBracket, "from 1 to -1"},
		{"NaN inside", hole, -1, 1, ErrNotFinite, "root: value is not finite at 0 (function NaN)"},
		{"infinite at a", func(x float64) float64 { return 1 / x }, 0, 1, ErrNotFinite, "at 0 (function +Inf)"},
		{"infinite at b", func(x float64) float64 { return -1 / x }, -1, 0, ErrNotFinite, "at 0"},
		{"NaN bound", math.Sin, nan, 1, ErrNotFinite, "from NaN to 1"},
		{"infinite bound", math.Sin, 0, math.Inf(1), ErrNotFinite, "to +Inf"},
		{"width overflows", math.Sin, -1.7e308, 1.7e308, ErrNotFinite, "not finite"},
	} {
		_, err := Root(c.f, c.a, c.b, 0)
		var e *Error
		if !errors.Is(err, c.want) || !errors.As(err, &e) || !strings.Contains(err.Error(), c.text) {
			t.Errorf("%s: %v, want %v with %q", c.name, err, c.want, c.text)
		}
	}
}

func TestNegativeTolerancePanics(t *testing.T) {
	for name, call := range map[string]func(){
		"Root":          func() { Root(math.Sin, -1, 1, -1e-3) },
		"FirstRoot":     func() { FirstRoot(math.Sin, -1, 1, 4, math.NaN()) },
		"cells":         func() { LastRoot(math.Sin, -1, 1, 0, 0) },
		"Maximum":       func() { Maximum(math.Sin, -1, 1, -1) },
		"GlobalMaximum": func() { GlobalMaximum(math.Sin, -1, 1, 0, 0) },
	} {
		wantPanic(t, name, call)
	}
}

func wantPanic(t *testing.T, name string, call func()) {
	t.Helper()
	defer func() {
		t.Helper()
		if s, ok := recover().(string); !ok || !strings.HasPrefix(s, "numeric: ") {
			t.Errorf("%s: no panic with the package prefix", name)
		}
	}()
	call()
}

func TestScanRoots(t *testing.T) {
	two := func(x float64) float64 { return (x - 1) * (x - 4) } // both of f's roots, sign + - +
	first, err := FirstRoot(two, -2, 7, 9, 0)
	if err != nil || math.Abs(first.X-1) > 1e-9 {
		t.Errorf("FirstRoot = %+v, %v, want 1", first, err)
	}
	last, err := LastRoot(two, -2.05, 7, 9, 0)
	if err != nil || math.Abs(last.X-4) > 1e-9 {
		t.Errorf("LastRoot = %+v, %v, want 4", last, err)
	}
	calls := 0
	r, err := FirstRoot(func(x float64) float64 { calls++; return math.Cos(x) }, 0, 20, 40, 1e-12)
	if err != nil || math.Abs(r.X-math.Pi/2) > 4e-12 || r.Evaluations != calls {
		t.Errorf("FirstRoot of cos = %+v, %v after %d calls", r, err, calls)
	}
	r, err = LastRoot(math.Cos, 0, 20, 40, 1e-12)
	if err != nil || math.Abs(r.X-5.5*math.Pi) > 4e-11 {
		t.Errorf("LastRoot of cos = %+v, %v, want %g", r, err, 5.5*math.Pi)
	}
}

func TestScanRootErrors(t *testing.T) {
	line := func(x float64) float64 { return x + 1 }
	for _, scan := range []func(func(float64) float64, float64, float64, int, float64) (RootResult, error){FirstRoot, LastRoot} {
		_, err := scan(line, 1, 3, 5, 0)
		var e *Error
		if !errors.As(err, &e) || e.Err != ErrNoBracket || e.A != 1 || e.B != 3 || e.FA != 2 || e.FB != 4 {
			t.Errorf("no sign change: %+v", err)
		}
		_, err = scan(func(x float64) float64 { return math.Sqrt(x) - 2 }, -4, -1, 3, 0)
		if !errors.Is(err, ErrNotFinite) {
			t.Errorf("square root of a negative number: %v", err)
		}
		if _, err = scan(line, 3, 1, 5, 0); !errors.Is(err, ErrNoBracket) {
			t.Errorf("empty interval: %v", err)
		}
	}
}

// TestRootProperty: for random monotone cubics on random brackets the root is
// inside, and f changes sign within the tolerance around it.
func TestRootProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := rapid.Float64Range(0, 1e3).Draw(t, "cubic")
		q := rapid.Float64Range(1e-3, 1e3).Draw(t, "linear")
		root := rapid.Float64Range(-1e4, 1e4).Draw(t, "root")
		a := root - rapid.Float64Range(0, 1e4).Draw(t, "below")
		b := root + rapid.Float64Range(0, 1e4).Draw(t, "above")
		f := func(x float64) float64 { u := x - root; return u * (p*u*u + q) }
		r, err := Root(f, a, b, 0)
		if err != nil {
			t.Fatal(err)
		}
		if r.X < a || r.X > b {
			t.Fatalf("root %g outside %g to %g", r.X, a, b)
		}
		allowed := 1e-10 * math.Max(math.Abs(r.X), 1e-6*math.Max(math.Abs(a), math.Abs(b)))
		if math.Abs(r.X-root) > allowed {
			t.Fatalf("root %.17g, want %.17g, off by %g, allowed %g", r.X, root, r.X-root, allowed)
		}
		if r.Residual != f(r.X) {
			t.Fatalf("residual %g, f %g", r.Residual, f(r.X))
		}
		if r.Evaluations > 200 {
			t.Fatalf("%d evaluations", r.Evaluations)
		}
	})
}

// TestScanProperty: first <= last, and between a and the first root the sign
// of f at the cell boundaries does not change.
func TestScanProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w := rapid.Float64Range(0.1, 20).Draw(t, "frequency")
		phase := rapid.Float64Range(0, 7).Draw(t, "phase")
		n := rapid.IntRange(1, 60).Draw(t, "cells")
		f := func(x float64) float64 { return math.Sin(w*x + phase) }
		first, err1 := FirstRoot(f, 0, 5, n, 0)
		last, err2 := LastRoot(f, 0, 5, n, 0)
		if (err1 == nil) != (err2 == nil) {
			t.Fatalf("first %v, last %v", err1, err2)
		}
		if err1 != nil {
			for i := range n + 1 {
				if (f(node(0, 5, i, n)) < 0) != (f(0) < 0) {
					t.Fatalf("sign change at node %d missed", i)
				}
			}
			return
		}
		if first.X > last.X*(1+1e-9) {
			t.Fatalf("first %g after last %g", first.X, last.X)
		}
		for i := range n + 1 {
			x := node(0, 5, i, n)
			if x < first.X-1e-8 && (f(x) < 0) != (f(0) < 0) || x > last.X+1e-8 && (f(x) < 0) != (f(5) < 0) {
				t.Fatalf("sign change at %g is outside %g to %g", x, first.X, last.X)
			}
		}
	})
}

func ExampleRoot() {
	// The ratio x at which x³ = 2.
	r, err := Root(func(x float64) float64 { return x*x*x - 2 }, 1, 2, 0)
	fmt.Printf("%.6f %v\n", r.X, err)
	_, err = Root(func(x float64) float64 { return x*x*x - 2 }, 2, 3, 0)
	fmt.Println(err)
	// Output:
	// 1.259921 <nil>
	// root: no sign change from 2 to 3 (function 6 and 25)
}

func BenchmarkRoot(b *testing.B) {
	b.ReportAllocs()
	f := func(x float64) float64 { return x*x*x - 2*x - 5 }
	for b.Loop() {
		if _, err := Root(f, 2, 3, 0); err != nil {
			b.Fatal(err)
		}
	}
}
