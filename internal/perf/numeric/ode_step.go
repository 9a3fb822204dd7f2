package numeric

import "math"

// Coefficients of RK5(4)7M, Dormand and Prince 1980, table 2. The last row of
// stageWeights is also the fifth-order result, so its derivative serves as the
// first stage of the next step.
var (
	stageTimes = [7]float64{0, 1. / 5, 3. / 10, 4. / 5, 8. / 9, 1, 1}

	stageWeights = [7][6]float64{
		{},
		{1. / 5},
		{3. / 40, 9. / 40},
		{44. / 45, -56. / 15, 32. / 9},
		{19372. / 6561, -25360. / 2187, 64448. / 6561, -212. / 729},
		{9017. / 3168, -355. / 33, 46732. / 5247, 49. / 176, -5103. / 18656},
		{35. / 384, 0, 500. / 1113, 125. / 192, -2187. / 6784, 11. / 84},
	}

	// errorWeights is the fifth-order less the fourth-order result.
	errorWeights = [7]float64{71. / 57600, 0, -71. / 16695, 71. / 1920, -17253. / 339200, 22. / 525, -1. / 40}
)

// Step control of Hairer, Nørsett and Wanner 1993, section II.4: the PI
// controller of K. Gustafsson, "Control theoretic techniques for stepsize
// selection in explicit Runge-Kutta methods", ACM Transactions on Mathematical
// Software 17 (1991) 533-554, with the constants of their program DOPRI5
// (values from memory).
const (
	controlBeta   = 0.04
	controlAlpha  = 0.2 - 0.75*controlBeta
	controlSafety = 0.9
	leastShrink   = 0.2  // smallest factor on a step
	mostGrowth    = 10.0 // largest factor on a step
	leastError    = 1e-4 // floor of the remembered error
)

// A stepper is the state of one integration.
type stepper struct {
	f      Derivs
	sol    *Solution
	events []Event
	g      []float64 // event functions at the end of the last accepted step

	t, t0, t1 float64
	h         float64      // step to try next
	y         []float64    // state at t
	next      []float64    // state at the end of the step on trial
	trial     []float64    // state handed to f at the stages between, and to events
	k         [7][]float64 // stage derivatives; k[0] belongs to (t, y)

	absTol    []float64
	relTol    float64
	maxStep   float64
	maxSteps  int
	lastError float64 // of the last accepted step, in tolerances
	rejected  bool    // the last trial failed: the next step must not grow
}

// eval calls f and refuses derivatives that are not finite.
func (w *stepper) eval(t float64, y, dydt []float64) error {
	w.sol.Evaluations++
	if err := w.f(t, y, dydt); err != nil {
		return err
	}
	if !allFinite(dydt) {
		return ErrNotFinite
	}
	return nil
}

// start evaluates the first derivative and the events, and sets the first step.
func (w *stepper) start(h float64) error {
	w.lastError = leastError
	if err := w.eval(w.t, w.y, w.k[0]); err != nil {
		return err
	}
	for i, e := range w.events {
		w.g[i] = e.G(w.t, w.y)
		if !finite(w.g[i]) {
			return eventError(e)
		}
	}
	if h == 0 {
		h = w.firstStep()
	}
	w.h = math.Min(h, w.maxStep)
	return nil
}

// firstStep guesses a step from the sizes of y and its first two derivatives
// (Hairer, Nørsett and Wanner 1993, section II.4, "starting step size"); their
// absolute fallbacks are taken here as parts of the span, as t has any unit.
func (w *stepper) firstStep() float64 {
	const small = 1e-6
	span := w.t1 - w.t0
	var size, slope float64
	for i, y := range w.y {
		scale := w.absTol[i] + w.relTol*math.Abs(y)
		size = math.Max(size, math.Abs(y)/scale)
		slope = math.Max(slope, math.Abs(w.k[0][i])/scale)
	}
	h := small * span
	if size >= 1e-5 && slope >= 1e-5 {
		h = 0.01 * size / slope
	}
	h = math.Min(h, w.maxStep)
	for i, y := range w.y {
		w.trial[i] = y + h*w.k[0][i]
	}
	if !allFinite(w.trial) || w.eval(w.t+h, w.trial, w.k[1]) != nil {
		return h
	}
	var bend float64
	for i, y := range w.y {
		scale := w.absTol[i] + w.relTol*math.Abs(y)
		bend = math.Max(bend, math.Abs(w.k[1][i]-w.k[0][i])/scale/h)
	}
	second := math.Max(small*span, h*1e-3)
	if most := math.Max(slope, bend); most > 1e-15 {
		second = math.Pow(0.01/most, 0.2)
	}
	return math.Max(math.Min(100*h, second), w.minStep())
}

// minStep is the step below which the integration gives up: a fixed part of
// the span, or where t can hardly resolve it.
func (w *stepper) minStep() float64 {
	return math.Max(minStepFraction*(w.t1-w.t0), 16*epsilon*math.Abs(w.t))
}

// advance tries one step. An error means that no smaller step is left.
func (w *stepper) advance() (accepted bool, err error) {
	h, end := w.h, w.t+w.h
	// Reach t1 without a sliver of a last step: stretch by rounding only, and
	// share what is left between the last two steps.
	if left := w.t1 - w.t; left <= h*(1+1e-9) {
		h, end = left, w.t1
	} else if left < 2*h*(1-1e-9) {
		h = left / 2
		end = w.t + h
	}
	if err := w.stages(h, end); err != nil {
		return false, w.reject(h, h/2, err)
	}
	e := w.stepError(h)
	divisor := math.Pow(e, controlAlpha)
	if !(e <= 1) {
		shrink := controlSafety / divisor
		if !(shrink >= leastShrink) { // also when e overflowed
			shrink = leastShrink
		}
		return false, w.reject(h, h*shrink, ErrNoConvergence)
	}
	w.sol.appendStep(w, h, end)
	grow := math.Min(mostGrowth, math.Max(leastShrink, controlSafety*math.Pow(w.lastError, controlBeta)/divisor))
	if w.rejected {
		grow = math.Min(grow, 1)
	}
	w.h = math.Min(h*grow, w.maxStep)
	w.lastError = math.Max(e, leastError)
	w.rejected = false
	w.t = end
	w.y, w.next = w.next, w.y
	w.k[0], w.k[6] = w.k[6], w.k[0]
	return true, nil
}

// reject notes a failed trial of length h and sets the next; it returns cause
// when that would be too short.
func (w *stepper) reject(h, next float64, cause error) error {
	w.sol.Rejected++
	w.rejected = true
	w.h = next
	if h <= w.minStep() {
		return cause
	}
	return nil
}

// stages fills k[1..6] and next for a step of length h that ends at end.
func (w *stepper) stages(h, end float64) error {
	for s := 1; s < 7; s++ {
		y := w.trial
		if s == 6 {
			y = w.next
		}
		for i := range y {
			var sum float64
			for j, a := range stageWeights[s][:s] {
				sum += a * w.k[j][i]
			}
			y[i] = w.y[i] + h*sum
		}
		t := end
		if c := stageTimes[s]; c < 1 {
			t = w.t + c*h
		}
		if !allFinite(y) {
			return ErrNotFinite
		}
		if err := w.eval(t, y, w.k[s]); err != nil {
			return err
		}
	}
	return nil
}

// stepError returns the estimated error of the trial step in tolerances.
func (w *stepper) stepError(h float64) float64 {
	var worst float64
	for i := range w.y {
		var sum float64
		for j, e := range errorWeights {
			sum += e * w.k[j][i]
		}
		scale := w.absTol[i] + w.relTol*math.Max(math.Abs(w.y[i]), math.Abs(w.next[i]))
		worst = math.Max(worst, math.Abs(h*sum)/scale)
	}
	return worst
}
