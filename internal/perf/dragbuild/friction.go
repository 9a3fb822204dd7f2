package dragbuild

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

var (
	reynolds = formula.Must(formula.Formula{
		ID: "drag.reynolds", Out: formula.Sym("Re", "Reynolds number", units.Coefficient),
		In: []formula.Symbol{formula.Sym("rho", "air density where friction is taken", units.Density), formula.Sym("V", "true airspeed where friction is taken", units.Speed),
			formula.Sym("l", "length along the flow", units.Length), formula.Sym("mu", "viscosity where friction is taken", units.Viscosity)},
		Expr: "rho*V*l/mu", Source: formula.Schlichting, Where: "chapter I",
	})
	laminarFriction = formula.Must(formula.Formula{
		ID: "drag.friction-laminar", Out: formula.Sym("Cfl", "laminar friction coefficient", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("Re", "Reynolds number of the laminar run", units.Coefficient)},
		Expr: "1.328/sqrt(Re)", Source: formula.Schlichting, Where: "chapter VII, flat plate at zero incidence after Blasius, one side",
	})
	turbulentFriction = formula.Must(formula.Formula{
		ID: "drag.friction-turbulent", Out: formula.Sym("Cft", "turbulent friction coefficient", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("Re", "Reynolds number", units.Coefficient)},
		Expr: "0.455/pow(log10(Re), 2.58)", Source: formula.Schlichting, Where: "chapter XXI, Prandtl–Schlichting formula for the smooth flat plate, from memory",
	})
	mixedFriction = formula.Must(formula.Formula{
		ID: "drag.friction", Out: formula.Sym("Cf", "friction coefficient", units.Coefficient),
		In: []formula.Symbol{formula.Sym("Cft", "turbulent friction coefficient of the whole length", units.Coefficient), formula.Sym("x", "laminar share of the length", units.Fraction),
			formula.Sym("Ctx", "turbulent friction coefficient of the laminar run", units.Coefficient), formula.Sym("Clx", "laminar friction coefficient of the laminar run", units.Coefficient)},
		Expr: "Cft - x*max(0, Ctx - Clx)", Source: formula.Schlichting, Where: "chapter XXI, Prandtl's correction for the laminar run, A = Re·x·(Ct − Cl), from memory; a laminar run is not taken to add friction",
	})
)

// leastReynolds is the length Reynolds number below which the turbulent formula
// falls under the laminar one (near 11 000) and friction of a plate says little.
const leastReynolds = 2e4

// Laminar is the friction coefficient of one side of a flat plate in laminar flow
// at the length Reynolds number re > 0, dimensionless.
func Laminar(re float64, w *formula.Working) float64 {
	return w.Step(laminarFriction, 1.328/math.Sqrt(re), re)
}

// Turbulent is the friction coefficient of one side of a smooth flat plate with
// turbulent flow from its leading edge, at the length Reynolds number re > 1, dimensionless.
func Turbulent(re float64, w *formula.Working) float64 {
	return w.Step(turbulentFriction, 0.455/math.Pow(math.Log10(re), 2.58), re)
}

// Friction is the friction coefficient of one side of a smooth flat plate that is
// laminar over the share x of its length, 0 to 1, at the length Reynolds number re
// of leastReynolds or more, dimensionless.
func Friction(re, x float64, w *formula.Working) float64 {
	whole := Turbulent(re, w)
	run := x * re
	if run < shortestRun {
		return whole
	}
	t, l := Turbulent(run, w), Laminar(run, w)
	return w.Step(mixedFriction, whole-x*math.Max(0, t-l), whole, x, t, l)
}

// shortestRun is the Reynolds number of a laminar run too short to count.
const shortestRun = 100
