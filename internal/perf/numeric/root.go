package numeric

import "math"

// A RootResult is a root and what it took to find it.
type RootResult struct {
	X           float64 // the root, in the unit of x, within the interval
	Residual    float64 // f(X), in the unit of f; far from zero where f jumps or has a pole
	Evaluations int     // calls of f
}

const defaultRootTolerance = 1e-10

// Root finds x in [a,b] with f(x) = 0; f(a) and f(b) must differ in sign, or
// one be zero. The tolerance tol is dimensionless, >= 0, relative to x; 0
// means 1e-10. An |x| below one millionth of the larger bound counts as that
// millionth, so that a root at zero ends too.
//
// A sign change without a zero (a jump, a pole) is also located: the caller
// that cannot rule it out looks at Residual. NaN or infinite values of f are
// ErrNotFinite, a > b is ErrNoBracket.
//
// Method: T. R. Chandrupatla, "A new hybrid quadratic/bisection algorithm for
// finding the zero of a nonlinear function without using derivatives",
// Advances in Engineering Software 28 (1997) 145-149.
func Root(f func(float64) float64, a, b, tol float64) (RootResult, error) {
	const op = "root"
	t := relativeTolerance(tol, defaultRootTolerance, a, b)
	if err := checkBounds(op, a, b, ErrNoBracket); err != nil {
		return RootResult{}, err
	}
	fa := f(a)
	if !finite(fa) {
		return RootResult{Evaluations: 1}, notFinite(op, a, fa)
	}
	fb := f(b)
	if !finite(fb) {
		return RootResult{Evaluations: 2}, notFinite(op, b, fb)
	}
	if !straddles(fa, fb) {
		return RootResult{Evaluations: 2}, &Error{Op: op, A: a, B: b, FA: fa, FB: fb, Err: ErrNoBracket}
	}
	r, err := refine(op, f, a, fa, b, fb, t)
	r.Evaluations += 2
	return r, err
}

// FirstRoot scans n >= 1 equal cells of [a,b] from the low end for the first
// sign change of f, or node where f is zero, and refines it as Root does. The
// tolerance tol is dimensionless, >= 0, relative to x; 0 means 1e-10. Two
// roots inside one cell cancel and are not seen. When no cell has a sign
// change the error is ErrNoBracket.
func FirstRoot(f func(float64) float64, a, b float64, n int, tol float64) (RootResult, error) {
	return scanRoot("first root", f, a, b, n, tol, false)
}

// LastRoot is FirstRoot scanning from the high end. The tolerance tol is
// dimensionless, >= 0, relative to x; 0 means 1e-10.
func LastRoot(f func(float64) float64, a, b float64, n int, tol float64) (RootResult, error) {
	return scanRoot("last root", f, a, b, n, tol, true)
}

func scanRoot(op string, f func(float64) float64, a, b float64, n int, tol float64, fromHigh bool) (RootResult, error) {
	if n < 1 {
		panic("numeric: scan needs at least one cell")
	}
	t := relativeTolerance(tol, defaultRootTolerance, a, b)
	if err := checkBounds(op, a, b, ErrNoBracket); err != nil {
		return RootResult{}, err
	}
	var x0, f0, start float64
	for i := range n + 1 {
		k := i
		if fromHigh {
			k = n - i
		}
		x1 := node(a, b, k, n)
		f1 := f(x1)
		if !finite(f1) {
			return RootResult{Evaluations: i + 1}, notFinite(op, x1, f1)
		}
		if i == 0 {
			start = f1
		} else if straddles(f0, f1) {
			r, err := refine(op, f, x0, f0, x1, f1, t)
			r.Evaluations += i + 1
			return r, err
		}
		x0, f0 = x1, f1
	}
	e := &Error{Op: op, A: a, B: b, FA: start, FB: f0, Err: ErrNoBracket}
	if fromHigh {
		e.FA, e.FB = f0, start
	}
	return RootResult{Evaluations: n + 1}, e
}

func straddles(fa, fb float64) bool {
	return fa == 0 || fb == 0 || (fa < 0) != (fb < 0)
}

// checkBounds refuses bounds that are not finite or too far apart to subtract,
// and returns the given cause when b < a.
func checkBounds(op string, a, b float64, empty error) error {
	if !finite(b - a) {
		return unevaluated(op, a, b, ErrNotFinite)
	}
	if b < a {
		return unevaluated(op, a, b, empty)
	}
	return nil
}

// refine is Chandrupatla's iteration on a bracket whose end values are known.
// The ends may come in either order. In the paper's terms a is the newest
// point, b the other end of the bracket, and c the point dropped last.
func refine(op string, f func(float64) float64, a, fa, b, fb float64, tol tolerance) (RootResult, error) {
	if fa == 0 {
		return RootResult{X: a}, nil
	}
	if fb == 0 {
		return RootResult{X: b}, nil
	}
	c, fc := a, fa
	t := 0.5 // next point as a fraction of the way from a to b
	for n := 1; n <= maxEvaluations; n++ {
		x := a + t*(b-a)
		fx := f(x)
		if !finite(fx) {
			return RootResult{Evaluations: n}, notFinite(op, x, fx)
		}
		if (fx < 0) == (fa < 0) {
			c, fc = a, fa
		} else {
			c, fc, b, fb = b, fb, a, fa
		}
		a, fa = x, fx
		best, residual := a, fa
		if math.Abs(fb) < math.Abs(fa) {
			best, residual = b, fb
		}
		width := math.Abs(b - a)
		limit := tol.at(best) / 2 / width // least t: with steps of half the tolerance the bracket ends within it
		if fa == 0 {
			return RootResult{X: a, Evaluations: n}, nil
		}
		if limit > 0.5 || width == 0 {
			return RootResult{X: best, Residual: residual, Evaluations: n}, nil
		}
		t = math.Min(math.Max(interpolate(a, fa, b, fb, c, fc), limit), 1-limit)
	}
	return RootResult{Evaluations: maxEvaluations}, &Error{Op: op, A: a, B: b, FA: fa, FB: fb, Err: ErrNoConvergence}
}

// interpolate returns the next point as a fraction from a to b: by inverse
// quadratic interpolation where that is monotone between a and b
// (Chandrupatla 1997, the criterion φ² < ξ and (1−φ)² < 1−ξ), else the middle.
func interpolate(a, fa, b, fb, c, fc float64) float64 {
	xi := (a - b) / (c - b)
	phi := (fa - fb) / (fc - fb)
	if phi*phi < xi && (1-phi)*(1-phi) < 1-xi {
		return fa/(fb-fa)*(fc/(fb-fc)) + (c-a)/(b-a)*(fa/(fc-fa))*(fb/(fc-fb))
	}
	return 0.5
}
