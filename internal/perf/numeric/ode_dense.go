package numeric

import "slices"

// A Solution is the solution of an initial value problem, continuous from its
// first time to its end.
type Solution struct {
	Crossings   []Crossing // events met, by time; the one that ended it is last
	Stopped     *Crossing  // the terminal event that ended it, else nil
	Evaluations int        // calls of Derivs
	Accepted    int        // steps taken
	Rejected    int        // steps tried in vain

	times   []float64 // ends of the accepted steps after times[0] = t0
	lengths []float64 // of the steps; a terminal event cuts times, not lengths
	dense   []float64 // per step 5 rows of the state's length
	first   []float64 // state at times[0]
	last    []float64 // state at the end
}

// Coefficients of the dense output of order 4 for RK5(4)7M: Hairer, Nørsett
// and Wanner 1993, section II.6, in the form of their program DOPRI5; after
// L. F. Shampine, "Some practical Runge-Kutta formulas", Mathematics of
// Computation 46 (1986) 135-150. Values from memory, checked by the test of
// the order of convergence.
var denseWeights = [7]float64{
	-12715105075. / 11282082432, 0, 87487479700. / 32700410799, -10690763975. / 1880347072,
	701980252875. / 199316789632, -1453857185. / 822651844, 69997945. / 29380423,
}

func newSolution(t0 float64, y0 []float64) *Solution {
	const steps = 24 // room before the first regrowth
	n := len(y0)
	store := make([]float64, 0, 2*n)
	store = append(append(store, y0...), y0...)
	s := &Solution{
		times:   make([]float64, 1, steps+1),
		lengths: make([]float64, 0, steps),
		dense:   make([]float64, 0, 5*n*steps),
		first:   store[:n:n],
		last:    store[n:],
	}
	s.times[0] = t0
	return s
}

// appendStep keeps the interpolant of the accepted trial step of w.
func (s *Solution) appendStep(w *stepper, h, end float64) {
	n := len(w.y)
	s.Accepted++
	if len(s.lengths) == cap(s.lengths) {
		s.times, s.lengths, s.dense = doubled(s.times), doubled(s.lengths), doubled(s.dense)
	}
	s.times = append(s.times, end)
	s.lengths = append(s.lengths, h)
	copy(s.last, w.next)
	from := len(s.dense)
	s.dense = s.dense[:from+5*n]
	d := s.dense[from:]
	for i := range n {
		rise := w.next[i] - w.y[i]
		bend := h*w.k[0][i] - rise
		var sum float64
		for j, c := range denseWeights {
			sum += c * w.k[j][i]
		}
		d[i] = w.y[i]
		d[n+i] = rise
		d[2*n+i] = bend
		d[3*n+i] = rise - h*w.k[6][i] - bend
		d[4*n+i] = h * sum
	}
}

// doubled moves v to twice the room; append alone grows long slices by only a
// quarter.
func doubled(v []float64) []float64 {
	return append(make([]float64, 0, 2*cap(v)), v...)
}

// inStep writes the state at a fraction theta, 0 to 1, of a step into y.
func (s *Solution) inStep(step int, theta float64, y []float64) {
	n := len(s.first)
	d := s.dense[5*n*step : 5*n*(step+1)]
	rest := 1 - theta
	for i := range n {
		y[i] = d[i] + theta*(d[n+i]+rest*(d[2*n+i]+theta*(d[3*n+i]+rest*d[4*n+i])))
	}
}

// cutAt ends the solution at c, which lies in its last step.
func (s *Solution) cutAt(c *Crossing) {
	s.Stopped = c
	s.times[len(s.times)-1] = c.T
	copy(s.last, c.Y)
}

// At writes the state at t, in the unit of the independent variable, into y
// and returns it; y is allocated when nil. Between steps it is interpolated to
// fourth order. Before the start and after the end it is the state there.
func (s *Solution) At(t float64, y []float64) []float64 {
	if y == nil {
		y = make([]float64, len(s.first))
	}
	if len(y) != len(s.first) {
		panic("numeric: At needs room for the whole state and no more")
	}
	end := len(s.times) - 1
	switch {
	case t <= s.times[0]:
		copy(y, s.first)
	case t >= s.times[end]:
		copy(y, s.last)
	default:
		i, _ := slices.BinarySearch(s.times, t) // times[i-1] < t <= times[i]
		i = max(i-1, 0)                         // NaN sorts first and comes out as NaN
		s.inStep(i, (t-s.times[i])/s.lengths[i], y)
	}
	return y
}

// End returns the last time reached, in the unit of the independent variable,
// and a copy of the state there.
func (s *Solution) End() (t float64, y []float64) {
	return s.times[len(s.times)-1], slices.Clone(s.last)
}

// Times returns a copy of the ends of the accepted steps, in the unit of the
// independent variable; the first is the start, the last the end.
func (s *Solution) Times() []float64 { return slices.Clone(s.times) }
