package mission

import (
	"math"

	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A cruise for the rest of the range is flown so far that the legs after it, flown
// from where it ends, leave just what contingencies keep.

const (
	// restSpare is the share of the energy at the start that is left beyond what is
	// needed, so that rounding fails no reserve.
	restSpare = 1e-7
	// credit is how many times the energy at the start a trial may overdraw, so that
	// what is missing can be measured.
	credit = 100
	// farthest is longer than any range in m.
	farthest = 1e9
)

// settleRest sets the distance of a cruise for the rest of the range.
func (f *flier) settleRest(l *Leg) error {
	l.Distance = farthest
	out := f.trialAt()
	err := out.path(l, &LegResult{})
	far := math.Max(0, out.now.Distance-f.now.Distance)
	if err == nil {
		return units.Errorf(nil, "it has no end: it draws no energy")
	}
	least, _ := f.over(l, far)
	if least > 0 {
		return err // it ends before the energy does
	}
	most, after := f.over(l, 0)
	if most < 0 {
		return f.tooLittle(after)
	}
	root, err := numeric.Root(func(d float64) float64 {
		switch d {
		case 0:
			return most
		case far:
			return least
		}
		over, _ := f.over(l, d)
		return over
	}, 0, far, 1e-10)
	l.Distance = root.X
	return err
}

// trialAt is a flier that goes on from here and leaves no trace.
func (f *flier) trialAt() *flier {
	t := *f
	t.trial = true
	t.out = Flight{Legs: append([]LegResult(nil), f.out.Legs...)}
	t.holding = append(t.holding[:0:0], f.holding...)
	return &t
}

// over flies the cruise over the distance in m and every leg after it on credit.
// It returns by how much more energy is left than must be, as a share of that at
// the start, and the flier where the mission ends, its credit paid back.
func (f *flier) over(l *Leg, distance float64) (float64, *flier) {
	t, full := f.trialAt(), f.a.Stores()
	t.now.Fuel += credit * full.Fuel
	t.now.Charge += credit * full.Charge
	leg := *l
	leg.Distance, leg.Extent = distance, ByDistance
	if t.fly(&leg) {
		t.onward(f.now.Leg + 1)
	} else {
		t.account()
	}
	t.now.Fuel -= credit * full.Fuel
	t.now.Charge -= credit * full.Charge
	over := math.Inf(1)
	if full.Fuel > 0 {
		over = (t.now.Fuel - t.out.Reserve.Kept) / full.Fuel
	}
	if full.Charge > 0 {
		over = math.Min(over, (t.now.Charge-t.out.Reserve.KeptEnergy)/full.Charge)
	}
	return over - restSpare, t
}

// tooLittle says what the legs after a cruise of no distance would need.
func (f *flier) tooLittle(after *flier) error {
	need, there, q := f.now.Fuel-after.now.Fuel+after.out.Reserve.Kept, f.now.Fuel, units.Mass
	if need <= there {
		need, there, q = f.now.Charge-after.now.Charge+after.out.Reserve.KeptEnergy, f.now.Charge, units.Energy
	}
	return units.Errorf(nil, "nothing is left for it: what comes after it needs {} and {} is left", units.Of(q, need), units.Of(q, there))
}
