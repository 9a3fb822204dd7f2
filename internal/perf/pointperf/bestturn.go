package pointperf

import (
	"cmp"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/numeric"
)

// BestTurn is the speed at which full thrust sustains the greatest load factor in level
// flight, its value; lifted says that maximum lift and not thrust ends it there.
func BestTurn(a *aircraft.Aircraft, p *Point) (best Best, lifted bool) {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Best{Err: stallAboveLimit(vs, top)}, false
	}
	var last error
	// At the stall itself the load factor is 1 by definition; rounding must not put it below.
	m, err := numeric.GlobalMaximum(func(v float64) float64 {
		n, _, err := SustainedLoad(a, p, v)
		if err != nil {
			last = err
			return math.Inf(-1)
		}
		return n
	}, vs*(1+1e-9), top, speedCells, 1e-7)
	if err != nil {
		if _, fast := levelBounds(a, p, vs, top); fast.Err != nil {
			return Best{Err: fast.Err}, false
		}
		return Best{Err: cmp.Or(last, err)}, false
	}
	n, lifted, err := SustainedLoad(a, p, m.X)
	return Best{TAS: m.X, Value: n, Bound: boundAt(m.X, vs, top), Err: err}, lifted
}
