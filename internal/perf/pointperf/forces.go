// Package pointperf balances the forces on an aircraft at one altitude, mass and
// configuration: thrust required and available, the speeds of note, climb,
// ceilings and glide. In level flight lift equals weight; the inclination of the
// thrust line is ignored.
package pointperf

import (
	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// A Point is where and how the aircraft flies.
type Point struct {
	Air    atmos.Air
	Mass   float64 // in kg, > 0
	Config aircraft.Config
	Lever  float64 // how far the power lever is pulled back from full, as a share of its way, 0 to 1
}

// Weight is the weight in N.
func (p *Point) Weight() float64 { return p.Mass * atmos.Gravity }

// Condition is the powerplant's condition at the true airspeed tas in m/s.
func (p *Point) Condition(tas float64) powerplant.Condition {
	return powerplant.Condition{Air: p.Air, TAS: tas}
}

var (
	dynamicPressure = formula.Must(formula.Formula{
		ID: "air.dynamic-pressure", Out: formula.Sym("q", "dynamic pressure", units.Pressure),
		In:   []formula.Symbol{formula.Sym("rho", "air density", units.Density), formula.Sym("V", "true airspeed", units.Speed)},
		Expr: "0.5*rho*V*V", Source: formula.Definition,
	})
	liftCoefficient = formula.Must(formula.Formula{
		ID: "lift.coefficient", Out: formula.Sym("CL", "lift coefficient", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("L", "lift", units.Force), formula.Sym("q", "dynamic pressure", units.Pressure), formula.Sym("S", "wing area", units.Area)},
		Expr: "L/(q*S)", Source: formula.Definition,
	})
	dragForce = formula.Must(formula.Formula{
		ID: "drag.force", Out: formula.Sym("D", "drag, in level flight the thrust required", units.Force),
		In:   []formula.Symbol{formula.Sym("q", "dynamic pressure", units.Pressure), formula.Sym("S", "wing area", units.Area), formula.Sym("CD", "drag coefficient", units.Coefficient)},
		Expr: "q*S*CD", Source: formula.Definition,
	})
	weightForce = formula.Must(formula.Formula{
		ID: "weight", Out: formula.Sym("W", "weight", units.Force),
		In:   []formula.Symbol{formula.Sym("m", "mass", units.Mass), formula.Sym("g", "standard gravity", units.Acceleration)},
		Expr: "m*g", Source: formula.Definition,
	})
	thrustInHand = formula.Must(formula.Formula{
		ID: "thrust.in-hand", Out: formula.Sym("dT", "thrust in hand", units.Force),
		In:   []formula.Symbol{formula.Sym("TA", "thrust available", units.Force), formula.Sym("TR", "thrust required", units.Force)},
		Expr: "TA - TR", Source: formula.Definition,
	})
)

// Drag is the drag in N at the true airspeed tas in m/s, > 0, with the lift in N
// and the ground-effect factor phi, 1 away from the ground.
func Drag(a *aircraft.Aircraft, p *Point, tas, lift, phi float64, w *formula.Working) float64 {
	s := a.WingArea()
	q := w.Step(dynamicPressure, 0.5*p.Air.Density*tas*tas, p.Air.Density, tas)
	cl := w.Step(liftCoefficient, lift/(q*s), lift, q, s)
	cd := a.Polar(p.Config).CD(cl, phi, w)
	return w.Step(dragForce, q*s*cd, q, s, cd)
}

// ThrustRequired is the drag in level flight in N at the true airspeed tas in m/s, > 0.
func ThrustRequired(a *aircraft.Aircraft, p *Point, tas float64, w *formula.Working) float64 {
	weight := w.Step(weightForce, p.Weight(), p.Mass, atmos.Gravity)
	return Drag(a, p, tas, weight, 1, w)
}

// ThrustAvailable is the powerplant's output at full setting, less what the lever is pulled back, at the true airspeed tas in m/s, >= 0.
func ThrustAvailable(a *aircraft.Aircraft, p *Point, tas float64, w *formula.Working) (powerplant.Output, error) {
	return a.Plant().Run(p.Condition(tas), 1-p.Lever, w)
}

// A Balance is thrust available against thrust required at one speed.
type Balance struct {
	TAS       float64 // true airspeed in m/s
	Required  float64 // thrust required in N
	Available float64 // thrust available in N
	Output    powerplant.Output
}

// InHand is the thrust in hand in N.
func (b Balance) InHand() float64 { return b.Available - b.Required }

// At balances thrust at the true airspeed tas in m/s, > 0.
func At(a *aircraft.Aircraft, p *Point, tas float64, w *formula.Working) (Balance, error) {
	w.Heading("Thrust required")
	return balance(a, p, Balance{TAS: tas, Required: ThrustRequired(a, p, tas, w)}, w)
}

// balance holds a thrust required against the thrust available at its speed.
func balance(a *aircraft.Aircraft, p *Point, b Balance, w *formula.Working) (Balance, error) {
	w.Heading("Thrust available")
	out, err := ThrustAvailable(a, p, b.TAS, w)
	if err != nil {
		return b, err
	}
	b.Output, b.Available = out, out.Thrust
	w.Heading("Thrust in hand")
	w.Step(thrustInHand, b.Available-b.Required, b.Available, b.Required)
	return b, nil
}
