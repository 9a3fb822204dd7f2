package mission

import (
	"legwright/internal/perf/units"
)

// turn flies level turns over one place: the drag is that of the lift at the load
// factor, and the time follows from the rate of turn.
func (f *flier) turn(l *Leg, r *LegResult) error {
	load := l.LoadFactor()
	if err := f.path(l, r); err != nil {
		return units.Errorf(err, "in a turn at a load factor of {}: {}", units.Of(units.Coefficient, load), units.Nest(units.Explain(err)))
	}
	return nil
}
