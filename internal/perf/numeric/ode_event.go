package numeric

import (
	"cmp"
	"fmt"
	"slices"
)

// An Event is a function of the state whose zero is looked for during an
// integration. It happens where G changes sign, or comes to zero, in its
// Direction; a G that is exactly zero to begin with is not a crossing.
type Event struct {
	Name      string
	G         func(t float64, y []float64) float64 // must not change or keep y
	Direction int                                  // -1 falling, +1 rising, 0 either
	Terminal  bool                                 // ends the integration
}

// A Crossing is a place where an event happened. G there is zero only within
// the accuracy of T and may have either sign.
type Crossing struct {
	Event int // index in Options.Events
	Name  string
	T     float64   // in the unit of the independent variable, to 1e-10 of the span
	Y     []float64 // state at T, component by component in the caller's units
}

const (
	// eventProbes is the number of parts of a step whose ends are searched
	// for sign changes: four points inside and the end.
	eventProbes = 5

	eventTolerance = 1e-10 // of the span
)

func (e *Event) happens(g0, g1 float64) bool {
	falling, rising := g0 > 0 && g1 <= 0, g0 < 0 && g1 >= 0
	return falling && e.Direction <= 0 || rising && e.Direction >= 0
}

func eventError(e Event) error { return fmt.Errorf("event %s: %w", e.Name, ErrNotFinite) }

// locateEvents searches the step just accepted, part by part in order of time,
// and cuts the solution at the earliest terminal event.
func (w *stepper) locateEvents() error {
	if len(w.events) == 0 {
		return nil
	}
	s := w.sol
	step := s.Accepted - 1
	start, length := s.times[step], s.lengths[step]
	for part := range eventProbes {
		from, to := float64(part)/eventProbes, float64(part+1)/eventProbes
		found := len(s.Crossings)
		for i := range w.events {
			e := &w.events[i]
			s.inStep(step, to, w.trial)
			g := e.G(w.probeTime(start, to*length, to), w.trial)
			if !finite(g) {
				return eventError(*e)
			}
			if e.happens(w.g[i], g) {
				theta, err := w.cross(e, step, from, w.g[i], to, g)
				if err != nil {
					return err
				}
				y := make([]float64, len(w.y))
				s.inStep(step, theta, y)
				t := w.probeTime(start, theta*length, theta)
				s.Crossings = append(s.Crossings, Crossing{Event: i, Name: e.Name, T: t, Y: y})
			}
			w.g[i] = g
		}
		if w.settle(found) {
			return nil
		}
	}
	return nil
}

// probeTime avoids the rounding that would put the end of a step beside t.
func (w *stepper) probeTime(start, after, theta float64) float64 {
	if theta == 1 {
		return w.t
	}
	return start + after
}

// cross returns the fraction of the step at which e happens, between the
// fractions a and b where its function is ga and gb.
func (w *stepper) cross(e *Event, step int, a, ga, b, gb float64) (float64, error) {
	start, length := w.sol.times[step], w.sol.lengths[step]
	g := func(theta float64) float64 {
		w.sol.inStep(step, theta, w.trial)
		return e.G(w.probeTime(start, theta*length, theta), w.trial)
	}
	tol := tolerance{relative: 4 * epsilon, absolute: eventTolerance * (w.t1 - w.t0) / length}
	r, err := refine("event "+e.Name, g, a, ga, b, gb, tol)
	return r.X, err
}

// settle puts the crossings from index found on in order of time and, when one
// is terminal, drops the later ones and ends the solution there.
func (w *stepper) settle(found int) (stop bool) {
	s := w.sol
	fresh := s.Crossings[found:]
	if len(fresh) == 0 {
		return false
	}
	slices.SortStableFunc(fresh, func(a, b Crossing) int { return cmp.Compare(a.T, b.T) })
	for i := range fresh {
		if w.events[fresh[i].Event].Terminal {
			s.Crossings = s.Crossings[:found+i+1]
			s.cutAt(&s.Crossings[found+i])
			return true
		}
	}
	return false
}
