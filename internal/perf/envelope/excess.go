// Package envelope maps where an aircraft can fly over speed and altitude: the
// specific excess power there, its contours, and the bounds by lift, thrust and
// never-exceed speed.
package envelope

import (
	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

var (
	liftAtLoad = formula.Must(formula.Formula{
		ID: "excess.lift", Out: formula.Sym("L", "lift", units.Force),
		In:   []formula.Symbol{formula.Sym("n", "load factor", units.Coefficient), formula.Sym("W", "weight", units.Force)},
		Expr: "n*W", Source: formula.Definition,
	})
	excessPower = formula.Must(formula.Formula{
		ID: "excess.power", Out: formula.Sym("Ps", "specific excess power: the rate of change of energy height", units.ClimbRate),
		In: []formula.Symbol{formula.Sym("T", "thrust available", units.Force), formula.Sym("D", "drag", units.Force),
			formula.Sym("V", "true airspeed", units.Speed), formula.Sym("W", "weight", units.Force)},
		Expr: "(T - D)*V/W", Source: formula.Anderson, Where: "section 6.6, after E. S. Rutowski, Energy Approach to the General Aircraft Performance Problem, Journal of the Aeronautical Sciences 21(3), 1954; both from memory",
	})
)

// Excess is the specific excess power in m/s at full setting, at the true airspeed
// tas in m/s, > 0, and the load factor n, dimensionless: the rate at which the
// sum of height and V²/2g can grow.
func Excess(a *aircraft.Aircraft, p *pointperf.Point, tas, n float64, w *formula.Working) (float64, error) {
	weight := p.Weight()
	lift := w.Step(liftAtLoad, n*weight, n, weight)
	drag := pointperf.Drag(a, p, tas, lift, 1, w)
	out, err := pointperf.ThrustAvailable(a, p, tas, w)
	if err != nil {
		return 0, err
	}
	return w.Step(excessPower, (out.Thrust-drag)*tas/weight, out.Thrust, drag, tas, weight), nil
}
