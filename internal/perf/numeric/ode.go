package numeric

import (
	"fmt"
	"math"
)

// Derivs writes the derivatives of y at t into dydt, t in the unit of the
// independent variable and y component by component in the caller's units. It
// must not change or keep y, nor keep dydt. An error means that y has no
// derivative there; Integrate then tries a smaller step.
//
// Trial states lie ahead of the solution, so a Derivs that refuses everything
// beyond an event (fuel below zero, say) keeps the event from being crossed:
// it should go on smoothly a little past the surface where an Event stops it.
type Derivs func(t float64, y, dydt []float64) error

// Options steer Integrate; the zero value is a usable default.
type Options struct {
	RelTol      float64   // allowed error of a step relative to y, dimensionless, >= 0; 0 means 1e-8, and less than 1e-13 is taken as 1e-13
	AbsTol      []float64 // allowed error of a step per component, in its unit, > 0; nil means 1e-10 for all
	InitialStep float64   // first step tried, in the unit of t, >= 0; 0 means automatic
	MaxStep     float64   // longest step, in the unit of t, >= 0; 0 means the whole span
	MaxSteps    int       // steps tried before ErrNoConvergence; 0 means 10000
	Events      []Event
}

// A StepError says where an integration ended early and why.
type StepError struct {
	T   float64 // end of the last accepted step, in the unit of t, from T0 to T1
	T0  float64 // start of the span, in the unit of t, any value
	T1  float64 // end of the span, in the unit of t, any value
	Err error   // from Derivs, or ErrNotFinite, ErrNoConvergence, ErrInterval
}

func (e *StepError) Error() string {
	return fmt.Sprintf("integration from %.6g to %.6g ended at %.6g: %v", e.T0, e.T1, e.T, e.Err)
}

// Unwrap returns the cause.
func (e *StepError) Unwrap() error { return e.Err }

const (
	// minStepFraction of the span is the shortest step before giving up.
	minStepFraction = 1e-12

	defaultRelTol   = 1e-8
	defaultAbsTol   = 1e-10
	defaultMaxSteps = 10000
	leastRelTol     = 1e-13
)

// Integrate solves y' = f(t, y) from y0 at t0 to t1 >= t0, both in the unit of
// the independent variable, or to the first terminal event. It always returns
// a solution: when the error, a *StepError, is not nil, the solution reaches
// as far as the last accepted step.
//
// When f returns an error, or a derivative or state that is not finite, the
// step is halved and tried again; the integration ends with that error when
// the step has come below 1e-12 of the span.
//
// Method: the pair 5(4) of J. R. Dormand and P. J. Prince, "A family of
// embedded Runge-Kutta formulae", Journal of Computational and Applied
// Mathematics 6 (1980) 19-26 (RK5(4)7M, table 2), advancing the fifth-order
// result, with the step control and dense output that E. Hairer, S. P. Nørsett
// and G. Wanner give for it in Solving Ordinary Differential Equations I, 2nd
// edition, Springer 1993, sections II.4 and II.6. The error of a step is the
// largest over the components, not their mean.
func Integrate(f Derivs, t0 float64, y0 []float64, t1 float64, opt Options) (*Solution, error) {
	checkOptions(y0, opt)
	s := newSolution(t0, y0)
	fail := func(err error) (*Solution, error) {
		return s, &StepError{T: s.times[len(s.times)-1], T0: t0, T1: t1, Err: err}
	}
	if !finite(t1-t0) || !allFinite(y0) {
		return fail(ErrNotFinite)
	}
	if t1 < t0 {
		return fail(ErrInterval)
	}
	if t1 == t0 {
		return s, nil
	}
	w := newStepper(f, t0, y0, t1, opt, s)
	if err := w.start(opt.InitialStep); err != nil {
		return fail(err)
	}
	for w.t < t1 {
		if s.Accepted+s.Rejected >= w.maxSteps {
			return fail(ErrNoConvergence)
		}
		accepted, err := w.advance()
		if err == nil && accepted {
			err = w.locateEvents()
		}
		if err != nil {
			return fail(err)
		}
		if s.Stopped != nil {
			return s, nil
		}
	}
	return s, nil
}

func checkOptions(y0 []float64, opt Options) {
	if len(y0) == 0 {
		panic("numeric: empty state")
	}
	if !(opt.RelTol >= 0 && opt.InitialStep >= 0 && opt.MaxStep >= 0) || opt.MaxSteps < 0 {
		panic("numeric: option is negative or NaN")
	}
	if opt.AbsTol != nil && len(opt.AbsTol) != len(y0) {
		panic("numeric: AbsTol and state differ in length")
	}
	for _, a := range opt.AbsTol {
		if !(a > 0) {
			panic("numeric: AbsTol must be above zero")
		}
	}
	for _, e := range opt.Events {
		if e.G == nil || e.Direction < -1 || e.Direction > 1 {
			panic("numeric: event needs a function and a direction of -1, 0 or 1")
		}
	}
}

func allFinite(v []float64) bool {
	for _, x := range v {
		if !finite(x) {
			return false
		}
	}
	return true
}

// newStepper takes all the memory that stepping needs.
func newStepper(f Derivs, t0 float64, y0 []float64, t1 float64, opt Options, s *Solution) *stepper {
	n := len(y0)
	store := make([]float64, 11*n+len(opt.Events))
	row := func(size int) []float64 {
		r := store[:size:size]
		store = store[size:]
		return r
	}
	w := &stepper{f: f, sol: s, events: opt.Events, t: t0, t0: t0, t1: t1,
		relTol: opt.RelTol, maxStep: opt.MaxStep, maxSteps: opt.MaxSteps,
		y: row(n), next: row(n), trial: row(n), absTol: row(n), g: row(len(opt.Events))}
	for i := range w.k {
		w.k[i] = row(n)
	}
	copy(w.y, y0)
	for i := range w.absTol {
		w.absTol[i] = defaultAbsTol
	}
	copy(w.absTol, opt.AbsTol)
	if w.relTol == 0 {
		w.relTol = defaultRelTol
	}
	w.relTol = math.Max(w.relTol, leastRelTol)
	if w.maxStep == 0 || w.maxStep > t1-t0 {
		w.maxStep = t1 - t0
	}
	if w.maxSteps == 0 {
		w.maxSteps = defaultMaxSteps
	}
	return w
}
