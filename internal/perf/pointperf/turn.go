package pointperf

import (
	"errors"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

var (
	turnLoad = formula.Must(formula.Formula{
		ID: "turn.load-factor", Out: formula.Sym("n", "load factor of a level turn", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("phi", "bank angle", units.Angle)},
		Expr: "1/cos(phi)", Source: formula.Anderson, Where: "section 6.5",
	})
	turnRadius = formula.Must(formula.Formula{
		ID: "turn.radius", Out: formula.Sym("R", "radius of a level turn", units.FieldLength),
		In: []formula.Symbol{formula.Sym("V", "true airspeed", units.Speed), formula.Sym("g", "standard gravity", units.Acceleration),
			formula.Sym("n", "load factor", units.Coefficient)},
		Expr: "V*V/(g*sqrt(n*n - 1))", Source: formula.Anderson, Where: "section 6.5",
	})
	turnRate = formula.Must(formula.Formula{
		ID: "turn.rate", Out: formula.Sym("omega", "rate of turn in radians per second", units.Coefficient),
		In: []formula.Symbol{formula.Sym("g", "standard gravity", units.Acceleration), formula.Sym("n", "load factor", units.Coefficient),
			formula.Sym("V", "true airspeed", units.Speed)},
		Expr: "g*sqrt(n*n - 1)/V", Source: formula.Anderson, Where: "section 6.5",
	})
	turnLift = formula.Must(formula.Formula{
		ID: "turn.lift", Out: formula.Sym("L", "lift in a level turn", units.Force),
		In:   []formula.Symbol{formula.Sym("n", "load factor", units.Coefficient), formula.Sym("W", "weight", units.Force)},
		Expr: "n*W", Source: formula.Anderson, Where: "section 6.5",
	})
	liftLoad = formula.Must(formula.Formula{
		ID: "turn.lift-limit", Out: formula.Sym("n", "load factor at maximum lift", units.Coefficient),
		In: []formula.Symbol{formula.Sym("q", "dynamic pressure", units.Pressure), formula.Sym("S", "wing area", units.Area),
			formula.Sym("CLmax", "maximum lift coefficient", units.Coefficient), formula.Sym("W", "weight", units.Force)},
		Expr: "q*S*CLmax/W", Source: formula.Anderson, Where: "section 6.5",
	})
)

// LoadFactor is the load factor, >= 1, of a level turn at the bank angle in rad, 0 to below π/2.
func LoadFactor(bank float64, w *formula.Working) float64 {
	return w.Step(turnLoad, 1/math.Cos(bank), bank)
}

// TurnRadius is the radius in m of a level turn at the true airspeed tas in m/s, > 0, and the load factor n, > 1.
func TurnRadius(tas, n float64, w *formula.Working) float64 {
	return w.Step(turnRadius, tas*tas/(atmos.Gravity*math.Sqrt(n*n-1)), tas, atmos.Gravity, n)
}

// TurnRate is the rate of turn in rad/s of a level turn at the true airspeed tas in m/s, > 0, and the load factor n, >= 1.
func TurnRate(tas, n float64, w *formula.Working) float64 {
	return w.Step(turnRate, atmos.Gravity*math.Sqrt(n*n-1)/tas, atmos.Gravity, n, tas)
}

// AtLoad is At in a level turn at the load factor, dimensionless, >= 1.
func AtLoad(a *aircraft.Aircraft, p *Point, tas, load float64, w *formula.Working) (Balance, error) {
	w.Heading("Thrust required")
	weight := w.Step(weightForce, p.Weight(), p.Mass, atmos.Gravity)
	lift := w.Step(turnLift, load*weight, load, weight)
	return balance(a, p, Balance{TAS: tas, Required: Drag(a, p, tas, lift, 1, w)}, w)
}

// LiftLoad is the load factor at maximum lift at the true airspeed tas in m/s, >= 0: the limit of an instantaneous turn.
func LiftLoad(a *aircraft.Aircraft, p *Point, tas float64, w *formula.Working) float64 {
	weight := w.Step(weightForce, p.Weight(), p.Mass, atmos.Gravity)
	q := w.Step(dynamicPressure, 0.5*p.Air.Density*tas*tas, p.Air.Density, tas)
	s, cl := a.WingArea(), a.CLMax(p.Config)
	return w.Step(liftLoad, q*s*cl/weight, q, s, cl, weight)
}

// loadCells separate the roots in load factor of a polar whose least drag is not at zero lift.
const loadCells = 16

// SustainedLoad is the greatest load factor, >= 1, that full thrust holds in level
// flight at the true airspeed tas in m/s, > 0: the root of T_A = T_R(n), or
// the limit of lift where thrust is not what ends the turn. Anderson 1999, section 6.5.
func SustainedLoad(a *aircraft.Aircraft, p *Point, tas float64) (n float64, lifted bool, err error) {
	out, err := ThrustAvailable(a, p, tas, nil)
	if err != nil {
		return 0, false, err
	}
	weight, most := p.Weight(), LiftLoad(a, p, tas, nil)
	if most < 1 {
		return 0, false, units.Errorf(nil, "{} is below the stall, {}", units.Of(units.Speed, tas), units.Of(units.Speed, Stall(a, p, nil)))
	}
	surplus := func(n float64) float64 { return out.Thrust - Drag(a, p, tas, n*weight, 1, nil) }
	if surplus(most) >= 0 {
		return most, true, nil
	}
	r, err := numeric.LastRoot(surplus, 1, most, loadCells, 1e-10)
	if errors.Is(err, numeric.ErrNoBracket) {
		return 0, false, &DeficitError{p.Air.PressureAltitude, p.Mass, surplus(1), tas}
	}
	return r.X, false, err
}

// A Turn is a level turn at one bank angle, at the speed that leaves most thrust in hand.
type Turn struct {
	Bank      float64 // in rad, 0 to below π/2
	Load      float64 // load factor, dimensionless, >= 1
	Stall     float64 // true airspeed of the stall at this load factor in m/s
	TAS       float64 // true airspeed of most thrust in hand in m/s
	Required  float64 // thrust required there in N
	Available float64 // thrust available there in N
	Radius    float64 // in m; 0 without bank, when there is none
	Rate      float64 // of turn in rad/s, >= 0
	Err       error   // why there is no such turn; then only Bank, Load and Stall hold
}

// Sustained reports whether the turn keeps its height and speed.
func (t *Turn) Sustained() bool { return t.Err == nil && t.Available >= t.Required }

// TurnAt finds the level turn at the bank angle in rad, 0 to below π/2.
func TurnAt(a *aircraft.Aircraft, p *Point, bank float64) Turn {
	return turnAt(a, p, Turn{Bank: bank, Load: LoadFactor(bank, nil)})
}

// TurnAtLoad finds the level turn at the load factor, dimensionless, >= 1.
func TurnAtLoad(a *aircraft.Aircraft, p *Point, load float64) Turn {
	return turnAt(a, p, Turn{Bank: math.Acos(1 / load), Load: load})
}

// turnAt finds the speed of a turn whose bank and load factor are known.
func turnAt(a *aircraft.Aircraft, p *Point, t Turn) Turn {
	t.Stall = Stall(a, p, nil) * math.Sqrt(t.Load)
	top := topSpeed(a, p)
	if top <= t.Stall {
		t.Err = units.Errorf(nil, "the stall at this load factor, {}, lies above the never-exceed speed, {}", units.Of(units.Speed, t.Stall), units.Of(units.Speed, top))
		return t
	}
	lift := t.Load * p.Weight()
	var last error
	best, err := numeric.GlobalMaximum(func(v float64) float64 {
		out, err := ThrustAvailable(a, p, v, nil)
		if err != nil {
			last = err
			return math.Inf(-1)
		}
		return out.Thrust - Drag(a, p, v, lift, 1, nil)
	}, t.Stall, top, 12, 1e-8)
	if err != nil {
		t.Err = err
		if last != nil {
			t.Err = last
		}
		return t
	}
	t.TAS, t.Required = best.X, Drag(a, p, best.X, lift, 1, nil)
	t.Available, t.Rate = best.F+t.Required, TurnRate(best.X, t.Load, nil)
	if t.Load > 1 {
		t.Radius = TurnRadius(best.X, t.Load, nil)
	}
	return t
}
