package numeric

import (
	"errors"
	"fmt"
	"math"
)

// Causes for which NewTable refuses its points, beside ErrNotFinite.
var (
	ErrTooFew   = errors.New("a table needs at least two points")
	ErrUnpaired = errors.New("x and y differ in number")
	ErrOrder    = errors.New("x must increase from point to point")
	ErrTooSteep = errors.New("slope between neighbouring points is beyond floating-point range")
)

// A TableError says which point of a table is wrong.
type TableError struct {
	Index int     // of the point at fault, from 0
	X     float64 // its x, in the unit of x, any value; NaN when it has none
	Y     float64 // its y, in the unit of y, any value; NaN when it has none
	Err   error   // ErrTooFew, ErrUnpaired, ErrOrder, ErrTooSteep or ErrNotFinite
}

func (e *TableError) Error() string {
	return fmt.Sprintf("table point %d (x %.6g, y %.6g): %v", e.Index+1, e.X, e.Y, e.Err)
}

// Unwrap returns the cause.
func (e *TableError) Unwrap() error { return e.Err }

// A Table is a curve through given points: a piecewise cubic with continuous
// slope that is monotone wherever the points are, so it never leaves the range
// of the two points around x. It is immutable and safe for concurrent use; the
// zero Table is not usable.
//
// Method: F. N. Fritsch and J. Butland, "A method for constructing local
// monotone piecewise cubic interpolants", SIAM Journal on Scientific and
// Statistical Computing 5 (1984) 300-304, for the inner slopes; the slopes at
// both ends are the three-point difference limited to keep monotonicity after
// F. N. Fritsch and R. E. Carlson, "Monotone piecewise cubic interpolation",
// SIAM Journal on Numerical Analysis 17 (1980) 238-246.
type Table struct {
	x, y, slope []float64
	low, high   float64 // least and greatest y
}

// NewTable returns the curve through the points (x[i], y[i]), which it copies.
// All values must be finite and x strictly increasing; units are the caller's.
// Two points give a straight line. The error is a *TableError.
func NewTable(x, y []float64) (*Table, error) {
	if err := checkPoints(x, y); err != nil {
		return nil, err
	}
	n := len(x)
	store := make([]float64, 3*n)
	t := &Table{x: store[:n:n], y: store[n : 2*n : 2*n], slope: store[2*n:], low: y[0], high: y[0]}
	copy(t.x, x)
	copy(t.y, y)
	for i := range n {
		t.low, t.high = math.Min(t.low, y[i]), math.Max(t.high, y[i])
		t.slope[i] = t.nodeSlope(i)
	}
	return t, nil
}

func checkPoints(x, y []float64) error {
	at := func(v []float64, i int) float64 {
		if i < len(v) {
			return v[i]
		}
		return math.NaN()
	}
	fault := func(i int, err error) error {
		return &TableError{Index: i, X: at(x, i), Y: at(y, i), Err: err}
	}
	if len(x) != len(y) {
		return fault(min(len(x), len(y)), ErrUnpaired)
	}
	if len(x) < 2 {
		return fault(len(x), ErrTooFew)
	}
	for i := range x {
		switch {
		case !finite(x[i]) || !finite(y[i]):
			return fault(i, ErrNotFinite)
		case i > 0 && x[i] <= x[i-1]:
			return fault(i, ErrOrder)
		// The factor leaves room for the end slope, at most three times this.
		case i > 0 && !finite(4*(y[i]-y[i-1])/(x[i]-x[i-1])), i > 0 && !finite(4*(x[i]-x[0])):
			return fault(i, ErrTooSteep)
		}
	}
	return nil
}

// secant returns the width and the mean slope of cell i.
func (t *Table) secant(i int) (h, delta float64) {
	h = t.x[i+1] - t.x[i]
	return h, (t.y[i+1] - t.y[i]) / h
}

func (t *Table) nodeSlope(i int) float64 {
	last := len(t.x) - 1
	switch {
	case last == 1:
		_, d := t.secant(0)
		return d
	case i == 0:
		h0, d0 := t.secant(0)
		h1, d1 := t.secant(1)
		return endSlope(h0, d0, h1, d1)
	case i == last:
		h0, d0 := t.secant(last - 1)
		h1, d1 := t.secant(last - 2)
		return endSlope(h0, d0, h1, d1)
	}
	h0, d0 := t.secant(i - 1)
	h1, d1 := t.secant(i)
	return innerSlope(h0, d0, h1, d1)
}

// innerSlope is the weighted harmonic mean of the secants on both sides
// (Fritsch and Butland 1984, the formula that they credit to Brodlie), and 0
// where they differ in sign: the point is then an extremum.
func innerSlope(h0, d0, h1, d1 float64) float64 {
	if d0 == 0 || d1 == 0 || (d0 < 0) != (d1 < 0) {
		return 0
	}
	alpha := (h0 + 2*h1) / (3 * (h0 + h1))
	// Divided by the greater secant before multiplying, against overflow.
	small, great, weight := d0, d1, alpha
	if math.Abs(d0) > math.Abs(d1) {
		small, great, weight = d1, d0, 1-alpha
	}
	return small / (weight + (1-weight)*(small/great))
}

// endSlope is the three-point difference at the outer end of the first cell
// (width h0, secant d0), held between 0 and three times d0.
func endSlope(h0, d0, h1, d1 float64) float64 {
	w := h0 / (h0 + h1)
	s := d0 + w*d0 - w*d1
	if d0 == 0 || (s < 0) != (d0 < 0) {
		return 0
	}
	if math.Abs(s) > 3*math.Abs(d0) {
		return 3 * d0
	}
	return s
}

// At returns y at x. Outside the table it holds the end value and inside is
// false: whether that is an error or a flag is the caller's decision. A NaN x
// gives NaN, false.
func (t *Table) At(x float64) (y float64, inside bool) {
	last := len(t.x) - 1
	switch {
	case x != x:
		return x, false
	case x < t.x[0]:
		return t.y[0], false
	case x >= t.x[last]:
		return t.y[last], x == t.x[last]
	}
	i := t.cell(x)
	h, delta := t.secant(i)
	u := x - t.x[i]
	theta := u / h
	y0, y1, s0, s1 := t.y[i], t.y[i+1], t.slope[i], t.slope[i+1]
	// Hermite cubic by divided differences at x0, x0, x1, x1.
	y = y0 + u*(s0+theta*((delta-s0)+(theta-1)*(s0+s1-2*delta)))
	// The cubic is monotone in the cell; only rounding could leave its range.
	return math.Min(math.Max(y, math.Min(y0, y1)), math.Max(y0, y1)), true
}

// Slope returns dy/dx at x, in the unit of y per unit of x: one-sided at both
// ends, and 0 outside, where At holds the end value.
func (t *Table) Slope(x float64) float64 {
	last := len(t.x) - 1
	if !(x >= t.x[0] && x <= t.x[last]) {
		return 0
	}
	if x == t.x[last] {
		return t.slope[last]
	}
	i := t.cell(x)
	h, delta := t.secant(i)
	theta := (x - t.x[i]) / h
	s0, s1 := t.slope[i], t.slope[i+1]
	return s0 + theta*(2*(delta-s0)+(3*theta-2)*(s0+s1-2*delta))
}

// Bounds returns the first and the last x, in the unit of x.
func (t *Table) Bounds() (lo, hi float64) { return t.x[0], t.x[len(t.x)-1] }

// Range returns the least and the greatest value that the curve takes, in the
// unit of y; both are given points, because the curve does not overshoot.
func (t *Table) Range() (min, max float64) { return t.low, t.high }

// cell returns the i with x[i] <= x < x[i+1], for x inside and before the end.
func (t *Table) cell(x float64) int {
	lo, hi := 0, len(t.x)-1
	for hi-lo > 1 {
		if mid := (lo + hi) / 2; t.x[mid] <= x {
			lo = mid
		} else {
			hi = mid
		}
	}
	return lo
}
