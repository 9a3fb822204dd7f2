package numeric

import "math"

// An Extremum is a maximum and what it took to find it.
type Extremum struct {
	X           float64 // where the maximum is, in the unit of x, within the interval
	F           float64 // f(X), in the unit of f, finite
	Evaluations int     // calls of f
}

const defaultMaximumTolerance = 1e-8

// golden is (3 − √5)/2, the fraction at which golden-section search cuts.
const golden = 0.38196601125010515

// Maximum finds a local maximum of f in [a,b]; the end points are compared too
// and win where they are higher. The tolerance tol is dimensionless, >= 0,
// relative to x; 0 means 1e-8. Much smaller values buy nothing, because f is
// flat to rounding within about the square root of the machine precision.
//
// A value of −Inf marks an infeasible point and is legal while some probed
// point is finite, else the error is ErrInfeasible. NaN and +Inf are
// ErrNotFinite, a > b is ErrInterval.
//
// Method: R. P. Brent, Algorithms for Minimization without Derivatives,
// Prentice-Hall 1973, chapter 5 (localmin), turned over.
func Maximum(f func(float64) float64, a, b, tol float64) (Extremum, error) {
	const op = "maximum"
	t := relativeTolerance(tol, defaultMaximumTolerance, a, b)
	if err := checkBounds(op, a, b, ErrInterval); err != nil {
		return Extremum{}, err
	}
	s := search{op: op, f: f, best: Extremum{X: a, F: math.Inf(-1)}}
	s.probe(a)
	fa := s.value
	s.probe(b)
	fb := s.value
	s.preferHigh = fb > fa
	s.climb(a, b, a+golden*(b-a), t)
	return s.finish(a, b, fa, fb)
}

// GlobalMaximum compares f at the boundaries of n >= 1 equal cells of [a,b]
// and refines the highest between its neighbours as Maximum does. It finds the
// highest maximum when the cells are small enough to separate the peaks. The
// tolerance tol is dimensionless, >= 0, relative to x; 0 means 1e-8. Of equal
// nodes the lowest x is taken.
func GlobalMaximum(f func(float64) float64, a, b float64, n int, tol float64) (Extremum, error) {
	const op = "global maximum"
	if n < 1 {
		panic("numeric: scan needs at least one cell")
	}
	t := relativeTolerance(tol, defaultMaximumTolerance, a, b)
	if err := checkBounds(op, a, b, ErrInterval); err != nil {
		return Extremum{}, err
	}
	s := search{op: op, f: f, best: Extremum{X: a, F: math.Inf(-1)}}
	var fa float64
	top, feasible := 0, false
	for i := range n + 1 {
		if s.probe(node(a, b, i, n)) {
			top, feasible = i, true
		}
		if i == 0 {
			fa = s.value
		}
	}
	fb := s.value
	if feasible {
		s.preferHigh = top == n
		lo, hi := node(a, b, max(top-1, 0), n), node(a, b, min(top+1, n), n)
		s.climb(lo, hi, node(a, b, top, n), t)
	}
	return s.finish(a, b, fa, fb)
}

// A search counts evaluations, keeps the best point and the first error.
type search struct {
	op         string
	f          func(float64) float64
	value      float64 // f at the last probe
	best       Extremum
	preferHigh bool // of two equal points take the one with the larger x
	err        error
}

// probe evaluates f at x and reports whether x is the best point so far.
func (s *search) probe(x float64) bool {
	s.best.Evaluations++
	s.value = s.f(x)
	if s.err == nil && (math.IsNaN(s.value) || math.IsInf(s.value, 1)) {
		s.err = notFinite(s.op, x, s.value)
	}
	if s.value > s.best.F {
		s.best.X, s.best.F = x, s.value
		return true
	}
	return false
}

func (s *search) finish(a, b, fa, fb float64) (Extremum, error) {
	if s.err == nil && math.IsInf(s.best.F, -1) {
		s.err = &Error{Op: s.op, A: a, B: b, FA: fa, FB: fb, Err: ErrInfeasible}
	}
	if s.err != nil {
		return Extremum{Evaluations: s.best.Evaluations}, s.err
	}
	return s.best, nil
}

// climb runs Brent's iteration on [a,b] from x. In his terms x is the best
// point of the iteration, w the second best, v the previous w.
func (s *search) climb(a, b, x float64, tol tolerance) {
	s.probe(x)
	fx := s.value
	w, fw, v, fv := x, fx, x, fx
	var step, before float64 // the last step and the one before
	for range maxEvaluations {
		middle, t := (a+b)/2, tol.at(x)
		if s.err != nil || b <= a || math.Abs(x-middle) <= 2*t-(b-a)/2 {
			return
		}
		if p, ok := vertex(x, fx, w, fw, v, fv); ok && math.Abs(before) > t &&
			math.Abs(p) < math.Abs(before)/2 && a < x+p && x+p < b {
			before, step = step, p
			if x+p-a < 2*t || b-x-p < 2*t {
				step = math.Copysign(t, middle-x)
			}
		} else {
			before = b - x
			if x >= middle {
				before = a - x
			}
			step = golden * before
		}
		u := x + math.Copysign(math.Max(math.Abs(step), t), step)
		s.probe(u)
		fu := s.value
		if fu > fx || fu == fx && (u > x) == s.preferHigh {
			if u < x {
				b = x
			} else {
				a = x
			}
			v, fv, w, fw, x, fx = w, fw, x, fx, u, fu
			continue
		}
		if u < x {
			a = u
		} else {
			b = u
		}
		if fu >= fw || w == x {
			v, fv, w, fw = w, fw, u, fu
		} else if fu >= fv || v == x || v == w {
			v, fv = u, fu
		}
	}
	s.err = &Error{Op: s.op, A: a, B: b, FA: math.NaN(), FB: math.NaN(), Err: ErrNoConvergence}
}

// vertex returns the step from x to the vertex of the parabola through three
// points; not ok when they coincide, lie on a line or one is infeasible.
func vertex(x, fx, w, fw, v, fv float64) (step float64, ok bool) {
	r := (x - w) * (fx - fv)
	q := (x - v) * (fx - fw)
	p := (x-v)*q - (x-w)*r
	step = -p / (2 * (q - r))
	return step, finite(step)
}
