package numeric

import (
	"errors"
	"fmt"
	"math"
)

// Causes that callers tell apart with errors.Is.
var (
	// ErrNoBracket: no sign change where one was needed, or an empty interval.
	ErrNoBracket = errors.New("no sign change")
	// ErrNotFinite: a function value, derivative or bound is NaN or infinite.
	ErrNotFinite = errors.New("value is not finite")
	// ErrInfeasible: every probed point of a maximum search was −Inf. It also
	// matches ErrNotFinite.
	ErrInfeasible = fmt.Errorf("no feasible point: %w", ErrNotFinite)
	// ErrNoConvergence: the limit on evaluations, steps or step size was met.
	ErrNoConvergence = errors.New("no convergence")
	// ErrInterval: the upper end of the interval lies below the lower end.
	ErrInterval = errors.New("interval is empty")
)

// An Error says which search had no solution, why, and where it looked. For
// ErrNotFinite met at one point, A and B are both that point.
type Error struct {
	Op  string  // "root", "first root", "last root", "maximum" or "global maximum"
	A   float64 // start of the interval searched, in the unit of x, any value
	B   float64 // end of the interval searched, in the unit of x, any value
	FA  float64 // function at A, in the unit of f, any value; NaN when not evaluated
	FB  float64 // function at B, in the unit of f, any value; NaN when not evaluated
	Err error   // one of the sentinels of this package
}

func (e *Error) Error() string {
	if e.A == e.B {
		return fmt.Sprintf("%s: %v at %.6g (function %.6g)", e.Op, e.Err, e.A, e.FA)
	}
	return fmt.Sprintf("%s: %v from %.6g to %.6g (function %.6g and %.6g)", e.Op, e.Err, e.A, e.B, e.FA, e.FB)
}

// Unwrap returns the sentinel.
func (e *Error) Unwrap() error { return e.Err }

func notFinite(op string, x, fx float64) error {
	return &Error{Op: op, A: x, B: x, FA: fx, FB: fx, Err: ErrNotFinite}
}

func unevaluated(op string, a, b float64, err error) error {
	return &Error{Op: op, A: a, B: b, FA: math.NaN(), FB: math.NaN(), Err: err}
}

func finite(x float64) bool { return x-x == 0 }
