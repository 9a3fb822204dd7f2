package propeller

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// A Disc is a constant-speed propeller as a loaded disc: momentum theory with
// one loss factor, k P = T (V + v) with T = 2 ρ A (V + v) v.
// Source: H. Glauert, Airplane Propellers, 1935, chapter II; the loss factor stands
// for profile, swirl and tip losses, its default is common practice.
type Disc struct {
	Diameter float64 // in m
	Loss     float64 // loss factor k, 0 to 1
}

var (
	discPower = formula.Must(formula.Formula{
		ID: "disc.power", Out: formula.Sym("P", "power absorbed by the propeller", units.Power),
		In: []formula.Symbol{formula.Sym("T", "propeller thrust", units.Force), formula.Sym("V", "true airspeed", units.Speed),
			formula.Sym("v", "induced speed at the disc", units.Speed), formula.Sym("k", "loss factor", units.Coefficient)},
		Expr: "T*(V + v)/k", Source: formula.Glauert, Where: "chapter II",
	})
	discThrust = formula.Must(formula.Formula{
		ID: "disc.thrust", Out: formula.Sym("T", "propeller thrust", units.Force),
		In: []formula.Symbol{formula.Sym("rho", "air density", units.Density), formula.Sym("A", "disc area", units.Area),
			formula.Sym("V", "true airspeed", units.Speed), formula.Sym("v", "induced speed at the disc", units.Speed)},
		Expr: "2*rho*A*(V + v)*v", Source: formula.Glauert, Where: "chapter II",
	})
	inducedSpeed = formula.Must(formula.Formula{
		ID: "disc.induced-speed", Out: formula.Sym("v", "induced speed at the disc", units.Speed),
		In: []formula.Symbol{formula.Sym("T", "propeller thrust", units.Force), formula.Sym("rho", "air density", units.Density),
			formula.Sym("A", "disc area", units.Area), formula.Sym("V", "true airspeed", units.Speed)},
		Expr: "-V/2 + sqrt(V*V/4 + T/(2*rho*A))", Source: formula.Glauert, Where: "chapter II, solved for v",
	})
	staticBound = formula.Must(formula.Formula{
		ID: "disc.static-bound", Out: formula.Sym("T", "greatest static thrust by momentum theory", units.Force),
		In:   []formula.Symbol{formula.Sym("rho", "air density", units.Density), formula.Sym("A", "disc area", units.Area), formula.Sym("P", "shaft power", units.Power)},
		Expr: "pow(2*rho*A*P*P, 0.3333333333333333)", Source: formula.Glauert, Where: "chapter II, at rest without losses",
	})
)

// Area is the disc area in m² of a propeller of diameter d in m.
func Area(d float64) float64 { return math.Pi * d * d / 4 }

// Thrust is the thrust in N of the shaft power p in W at the true airspeed v in
// m/s and density rho in kg/m³. The cubic 2 ρ A (V+v)² v = k P has one
// positive root, found by Newton's method from above, where it converges monotonely.
func (d Disc) Thrust(rho, v, p float64, w *formula.Working) float64 {
	if p <= 0 {
		return 0
	}
	area := Area(d.Diameter)
	c := d.Loss * p / (2 * rho * area)
	x := math.Cbrt(c)
	if v > 0 {
		x = math.Min(x, c/(v*v))
	}
	for range 60 {
		s := v + x
		next := x - (s*s*x-c)/(s*s+2*s*x)
		if math.Abs(next-x) <= 1e-14*next {
			x = next
			break
		}
		x = next
	}
	t := w.Step(discThrust, 2*rho*area*(v+x)*x, rho, area, v, x)
	if w != nil {
		w.Note("The induced speed %.4g m/s is the one at which k P = T (V + v).", x)
	}
	return t
}

// Power is the shaft power in W that gives the thrust t in N, >= 0, at the true airspeed v in m/s.
func (d Disc) Power(rho, v, t float64, w *formula.Working) float64 {
	area := Area(d.Diameter)
	x := w.Step(inducedSpeed, -v/2+math.Sqrt(v*v/4+t/(2*rho*area)), t, rho, area, v)
	return w.Step(discPower, t*(v+x)/d.Loss, t, v, x, d.Loss)
}

// StaticBound is the thrust in N that no propeller of diameter d in m exceeds
// at rest with the shaft power p in W: (2 ρ A P²)^(1/3).
func StaticBound(rho, d, p float64, w *formula.Working) float64 {
	area := Area(d)
	return w.Step(staticBound, math.Pow(2*rho*area*p*p, 0.3333333333333333), rho, area, p)
}
