package numeric

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

func mustTable(t testing.TB, x, y []float64) *Table {
	t.Helper()
	table, err := NewTable(x, y)
	if err != nil {
		t.Fatal(err)
	}
	return table
}

func TestTablePoints(t *testing.T) {
	x, y := []float64{-1, 0, 0.5, 4, 9}, []float64{2, 2, -1, 7, 6}
	table := mustTable(t, x, y)
	for i := range x {
		if got, inside := table.At(x[i]); got != y[i] || !inside {
			t.Errorf("At(%g) = %g, %v, want %g", x[i], got, inside, y[i])
		}
	}
	for _, c := range []struct{ x, y float64 }{{-1.0001, 2}, {9.0001, 6}, {math.Inf(-1), 2}, {math.Inf(1), 6}} {
		if got, inside := table.At(c.x); got != c.y || inside {
			t.Errorf("At(%g) = %g, %v, want %g held", c.x, got, inside, c.y)
		}
		if s := table.Slope(c.x); s != 0 {
			t.Errorf("Slope(%g) = %g outside", c.x, s)
		}
	}
	if got, inside := table.At(math.NaN()); got == got || inside {
		t.Errorf("At(NaN) = %g, %v", got, inside)
	}
	if lo, hi := table.Bounds(); lo != -1 || hi != 9 {
		t.Errorf("Bounds = %g, %g", lo, hi)
	}
	if lo, hi := table.Range(); lo != -1 || hi != 7 {
		t.Errorf("Range = %g, %g", lo, hi)
	}
	x[2], y[2] = 100, 100
	if got, _ := table.At(0.5); got != -1 {
		t.Errorf("the table changed with the caller's slices: At(0.5) = %g", got)
	}
}

func TestTableErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		name  string
		x, y  []float64
		index int
		want  error
	}{
		{"empty", nil, nil, 0, ErrTooFew},
		{"one point", []float64{1}, []float64{2}, 1, ErrTooFew},
		{"short y", []float64{1, 2, 3}, []float64{4, 5}, 2, ErrUnpaired},
		{"short x", []float64{1}, []float64{4, 5}, 1, ErrUnpaired},
		{"equal x", []float64{1, 2, 2, 3}, []float64{0, 0, 0, 0}, 2, ErrOrder},
		{"falling x", []float64{1, 2, 3, 2.5}, []float64{0, 0, 0, 0}, 3, ErrOrder},
		{"NaN x", []float64{nan, 2}, []float64{0, 0}, 0, ErrNotFinite},
		{"infinite x", []float64{1, inf}, []float64{0, 0}, 1, ErrNotFinite},
		{"NaN y", []float64{1, 2, 3}, []float64{0, nan, 0}, 1, ErrNotFinite},
		{"infinite y", []float64{1, 2, 3}, []float64{0, 0, -inf}, 2, ErrNotFinite},
		{"steep", []float64{0, 1e-300}, []float64{0, 1e10}, 1, ErrTooSteep},
		{"wide", []float64{-1e308, 0, 1e308}, []float64{0, 1, 2}, 1, ErrTooSteep},
	} {
		table, err := NewTable(c.x, c.y)
		var e *TableError
		if table != nil || !errors.As(err, &e) || e.Index != c.index || !errors.Is(err, c.want) {
			t.Errorf("%s: %v, want %v at %d", c.name, err, c.want, c.index)
		}
	}
	_, err := NewTable([]float64{1, 2, 2}, []float64{5, 6, 7})
	if want := "table point 3 (x 2, y 7): x must increase from point to point"; err.Error() != want {
		t.Errorf("message %q, want %q", err, want)
	}
}

// TestTableStraight: the method reproduces a straight line, with two points or
// many at uneven distances.
func TestTableStraight(t *testing.T) {
	for _, x := range [][]float64{{-2, 5}, {-2, -1.9, 0, 3, 5}} {
		y := make([]float64, len(x))
		for i := range x {
			y[i] = 4 - 3*x[i]
		}
		table := mustTable(t, x, y)
		for i := range 71 {
			at := -2 + float64(i)/10
			if got, _ := table.At(at); math.Abs(got-(4-3*at)) > 1e-14*20 {
				t.Errorf("%d points: At(%g) = %.17g, want %g", len(x), at, got, 4-3*at)
			}
			if at <= 5 && math.Abs(table.Slope(at)+3) > 1e-13 {
				t.Errorf("%d points: Slope(%g) = %.17g", len(x), at, table.Slope(at))
			}
		}
	}
}

// TestTableSlopes checks node slopes worked out by hand from the two papers.
func TestTableSlopes(t *testing.T) {
	// Cells of width 1 and 2 with secants 2 and 1: alpha = (1+4)/9,
	// slope = 2·1/(alpha·1 + (1-alpha)·2) = 18/13. Ends: (4·2-1)/3 = 7/3 and
	// (5·1-2·2)/3 = 1/3.
	table := mustTable(t, []float64{0, 1, 3}, []float64{0, 2, 4})
	for i, want := range []float64{7. / 3, 18. / 13, 1. / 3} {
		if got := table.Slope(table.x[i]); math.Abs(got-want) > 1e-14 {
			t.Errorf("slope at point %d = %.17g, want %.17g", i, got, want)
		}
	}
	// End: (3·1-4)/2 < 0 would turn back and is held to 0.
	table = mustTable(t, []float64{0, 1, 2}, []float64{0, 1, 5})
	if got := table.Slope(0); got != 0 {
		t.Errorf("end slope %g, want 0", got)
	}
	// An extremum is flat. End: (3·1+9)/2 = 6 is held to three times the secant.
	table = mustTable(t, []float64{0, 1, 2}, []float64{0, 1, -8})
	for i, want := range []float64{3, 0, -14} {
		if got := table.Slope(table.x[i]); math.Abs(got-want) > 1e-13 {
			t.Errorf("slope at point %d = %.17g, want %.17g", i, got, want)
		}
	}
}

// TestTableOrder: on a smooth monotone curve halving the cells divides the
// error by about 2³ for a harmonic mean (second-order slopes).
func TestTableOrder(t *testing.T) {
	worst := func(n int) float64 {
		x, y := make([]float64, n+1), make([]float64, n+1)
		for i := range x {
			x[i] = 2 * float64(i) / float64(n)
			y[i] = math.Exp(x[i])
		}
		table := mustTable(t, x, y)
		var e float64
		for i := range 2001 {
			at := float64(i) / 1000
			got, _ := table.At(at)
			e = math.Max(e, math.Abs(got-math.Exp(at)))
		}
		return e
	}
	for _, n := range []int{40, 80} {
		if p := math.Log2(worst(n) / worst(2*n)); p < 2.8 {
			t.Errorf("%d cells: observed order %.2f, want about 3", n, p)
		}
	}
}

func drawTable(t *rapid.T, rise *rapid.Generator[float64]) *Table {
	n := rapid.IntRange(2, 12).Draw(t, "points")
	x, y := make([]float64, n), make([]float64, n)
	x[0], y[0] = rapid.Float64Range(-100, 100).Draw(t, "x0"), rapid.Float64Range(-100, 100).Draw(t, "y0")
	for i := 1; i < n; i++ {
		x[i] = x[i-1] + rapid.Float64Range(1e-3, 50).Draw(t, "dx")
		y[i] = y[i-1] + rise.Draw(t, "dy")
	}
	table, err := NewTable(x, y)
	if err != nil {
		t.Fatal(err)
	}
	return table
}

func TestTableMonotoneProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t, rapid.OneOf(rapid.Just(0.0), rapid.Float64Range(0, 100), rapid.Float64Range(0, 1e-6)))
		lo, hi := table.Bounds()
		before, _ := table.At(lo)
		for i := 1; i <= 400; i++ {
			x := node(lo, hi, i, 400)
			y, inside := table.At(x)
			// Rounding in the cubic may step back by a few units in the last place.
			if !inside || y < before-1e-14*(math.Abs(before)+math.Abs(table.high-table.low)) {
				t.Fatalf("At(%g) = %.17g, %v falls below %.17g", x, y, inside, before)
			}
			if s := table.Slope(x); s < -1e-10 {
				t.Fatalf("Slope(%g) = %g", x, s)
			}
			before = y
		}
	})
}

func TestTableOvershootProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t, rapid.Float64Range(-100, 100))
		i := rapid.IntRange(0, len(table.x)-2).Draw(t, "cell")
		x := table.x[i] + rapid.Float64Range(0, 1).Draw(t, "part")*(table.x[i+1]-table.x[i])
		y, inside := table.At(x)
		lo, hi := min(table.y[i], table.y[i+1]), max(table.y[i], table.y[i+1])
		if !inside && x <= table.x[len(table.x)-1] || y < lo || y > hi {
			t.Fatalf("At(%g) = %.17g, %v outside %g to %g", x, y, inside, lo, hi)
		}
		if low, high := table.Range(); low != slices.Min(table.y) || high != slices.Max(table.y) {
			t.Fatalf("Range = %g, %g", low, high)
		}
	})
}

// TestTableNoClampNeeded: the cubic itself, without the guard against
// rounding in At, stays within its cell. A wrong slope formula fails here.
func TestTableNoClampNeeded(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t, rapid.Float64Range(-100, 100))
		for i := range len(table.x) - 1 {
			h, delta := table.secant(i)
			for _, s := range table.slope[i : i+2] {
				if s*delta < 0 || math.Abs(s) > 3*math.Abs(delta)*(1+1e-14) {
					t.Fatalf("cell %d of width %g: slope %g for secant %g", i, h, s, delta)
				}
			}
		}
	})
}

func TestTableSlopeProperty(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := drawTable(t, rapid.Float64Range(-100, 100))
		i := rapid.IntRange(0, len(table.x)-2).Draw(t, "cell")
		h, delta := table.secant(i)
		x := table.x[i] + rapid.Float64Range(0.01, 0.99).Draw(t, "part")*h
		d := 1e-4 * h
		right, _ := table.At(x + d)
		left, _ := table.At(x - d)
		// Third derivative of the cubic, at most 24 secants per h², times d²/6;
		// the rest is rounding of y.
		allowed := 24*math.Abs(delta)*1e-8/6 + 4e-16*(math.Abs(table.y[i])+math.Abs(delta*h))/d + 1e-12*math.Abs(x)/h*math.Abs(delta)
		if got, want := table.Slope(x), (right-left)/(2*d); math.Abs(got-want) > allowed {
			t.Fatalf("Slope(%g) = %.12g, difference %.12g, off by %g, allowed %g", x, got, want, got-want, allowed)
		}
	})
}

func TestTableAllocatesNothing(t *testing.T) {
	table := mustTable(t, []float64{0, 1, 3, 4}, []float64{0, 2, 4, 4})
	if n := testing.AllocsPerRun(100, func() { table.At(2.2); table.Slope(2.2); table.At(9) }); n != 0 {
		t.Errorf("%g allocations", n)
	}
}

func ExampleTable() {
	table, err := NewTable([]float64{0, 10, 20, 30}, []float64{0, 8, 9, 9})
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, x := range []float64{5, 25, 40} {
		y, inside := table.At(x)
		fmt.Printf("%g: %.4f %v\n", x, y, inside)
	}
	_, err = NewTable([]float64{0, 10, 10}, []float64{0, 8, 9})
	fmt.Println(err)
	// Output:
	// 5: 5.2153 true
	// 25: 9.0000 true
	// 40: 9.0000 false
	// table point 3 (x 10, y 9): x must increase from point to point
}

func BenchmarkTableAt(b *testing.B) {
	x, y := make([]float64, 30), make([]float64, 30)
	for i := range x {
		x[i], y[i] = float64(i), math.Sqrt(float64(i))
	}
	table := mustTable(b, x, y)
	b.ReportAllocs()
	for b.Loop() {
		table.At(17.3)
	}
}
