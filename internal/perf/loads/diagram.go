package loads

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// A Diagram is the envelope at one mass and in one air. Speeds are equivalent airspeeds in
// m/s; load factors are along the lift, flaps and gear up.
type Diagram struct {
	Design        Design
	Mass          float64 // in kg
	Loading       float64 // mass over wing area, in the unit kg/m²
	Stall         float64 // stall at load factor 1 in m/s
	NegativeStall float64 // stall at load factor -1 in m/s
	Maneuver      float64 // VA, where lift reaches the positive limit load factor, in m/s
	NegativeReach float64 // where lift reaches the negative limit load factor, in m/s
	MassRatio     float64 // aeroplane mass ratio, dimensionless
	Alleviation   float64 // gust alleviation factor, dimensionless, 0 to 0.88
	CruiseGust    Gust    // at VC
	DiveGust      Gust    // at VD
	Points        []Point // from 0 to VD at rising speeds, with every corner of the envelope
	Greatest      Extreme // of the envelope
	Smallest      Extreme // of the envelope
}

// A Gust is the load factors of a gust up and down in level flight.
type Gust struct {
	Velocity float64 // derived gust velocity, equivalent, in m/s
	Up       float64 // load factor, dimensionless
	Down     float64 // load factor, dimensionless
}

// A Pair is the load factor upwards and downwards at one speed.
type Pair struct {
	Up   float64 // load factor, dimensionless
	Down float64 // load factor, dimensionless, <= Up
}

// A Point is what holds at one speed.
type Point struct {
	EAS      float64 // equivalent airspeed in m/s
	Lift     Pair    // at the positive and the negative stall
	Maneuver Pair    // limits of manoeuvre
	Gust     Pair    // of the gusts, in a straight line between the design speeds
	Envelope Pair    // the stronger of manoeuvre and gust, within what lift reaches
}

// An Extreme is the greatest or the smallest load factor of the envelope.
type Extreme struct {
	EAS  float64 // equivalent airspeed in m/s
	Load float64 // load factor, dimensionless
	Gust bool    // a gust, and not the limit of manoeuvre, makes it
}

var (
	stall = formula.Must(formula.Formula{
		ID: "loads.stall", Out: formula.Sym("VS", "stall speed, equivalent, of upward or downward lift", units.Speed),
		In: []formula.Symbol{formula.Sym("w", "wing loading", units.WingLoading), formula.Sym("rho0", "standard air density at sea level", units.Density),
			formula.Sym("CLmax", "greatest lift coefficient, upwards or downwards", units.Coefficient), formula.Sym("g", "standard gravity", units.Acceleration)},
		Expr: "sqrt(2*w*g/(rho0*CLmax))", Source: formula.Anderson, Where: "section 5.9",
	})
	maneuver = formula.Must(formula.Formula{
		ID: "loads.maneuvering-speed", Out: formula.Sym("VA", "design manoeuvring speed, equivalent; downwards, where lift reaches the negative limit", units.Speed),
		In:   []formula.Symbol{formula.Sym("VS", "stall speed", units.Speed), formula.Sym("n", "limit load factor", units.Coefficient)},
		Expr: "VS*sqrt(n)", Source: formula.FAR23, Where: "23.335(c), as CS-VLA 335(c)",
	})
	massRatio = formula.Must(formula.Formula{
		ID: "loads.mass-ratio", Out: formula.Sym("mu", "aeroplane mass ratio", units.Coefficient),
		In: []formula.Symbol{formula.Sym("w", "wing loading", units.WingLoading), formula.Sym("rho", "air density", units.Density), formula.Sym("C", "mean geometric chord", units.Length),
			formula.Sym("a", "lift-curve slope per radian", units.Coefficient)},
		Expr: "2*w/(rho*C*a)", Source: formula.FAR23, Where: "23.341(c) with mass for weight, as CS-VLA 341",
	})
	alleviation = formula.Must(formula.Formula{
		ID: "loads.gust-alleviation", Out: formula.Sym("Kg", "gust alleviation factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("mu", "aeroplane mass ratio", units.Coefficient)},
		Expr: "0.88*mu/(5.3 + mu)", Source: formula.FAR23, Where: "23.341(c), as CS-VLA 341",
	})
	gustFactor = formula.Must(formula.Formula{
		ID: "loads.gust-factor", Out: formula.Sym("n", "load factor in a gust, down with U below 0", units.Coefficient),
		In: []formula.Symbol{formula.Sym("Kg", "gust alleviation factor", units.Coefficient), formula.Sym("rho0", "standard air density at sea level", units.Density), formula.Sym("U", "derived gust velocity", units.Speed),
			formula.Sym("V", "equivalent airspeed", units.Speed), formula.Sym("a", "lift-curve slope per radian", units.Coefficient), formula.Sym("w", "wing loading", units.WingLoading), formula.Sym("g", "standard gravity", units.Acceleration)},
		Expr: "1 + Kg*rho0*U*V*a/(2*w*g)", Source: formula.FAR23, Where: "23.341(c) in SI units: its 498 is 2/ρ0 in knots, feet and pounds; as CS-VLA 341",
	})
)

// At draws the envelope at the mass in kg, > 0, in the air. It fails where the stall leaves no level flight below VC.
func (d *Design) At(air atmos.Air, mass float64, w *formula.Working) (*Diagram, error) {
	const rho0 = atmos.SeaLevelDensity
	g := &Diagram{Design: *d, Mass: mass}
	w.Note("At the mass and in the air of the envelope.")
	g.Loading = w.Step(wingLoading, mass/d.Airframe.Area, mass, d.Airframe.Area)
	g.Stall = w.Step(stall, math.Sqrt(2*g.Loading*atmos.Gravity/(rho0*d.Airframe.CLMax)), g.Loading, rho0, d.Airframe.CLMax, atmos.Gravity)
	if g.Stall >= d.Cruise {
		return nil, units.Errorf(nil, "the stall at {}, {}, is not below the design cruising speed, {}",
			units.Of(units.Mass, mass), units.Of(units.Speed, g.Stall), units.Of(units.Speed, d.Cruise))
	}
	g.NegativeStall = w.Step(stall, math.Sqrt(2*g.Loading*atmos.Gravity/(rho0*-d.NegativeCL)), g.Loading, rho0, -d.NegativeCL, atmos.Gravity)
	g.Maneuver = w.Step(maneuver, g.Stall*math.Sqrt(d.Positive), g.Stall, d.Positive)
	g.NegativeReach = w.Step(maneuver, g.NegativeStall*math.Sqrt(-d.Negative), g.NegativeStall, -d.Negative)
	g.MassRatio = w.Step(massRatio, 2*g.Loading/(air.Density*d.Chord*d.Slope), g.Loading, air.Density, d.Chord, d.Slope)
	g.Alleviation = w.Step(alleviation, 0.88*g.MassRatio/(5.3+g.MassRatio), g.MassRatio)
	g.CruiseGust = g.gust(d.rule.gust(d.gustC, air.PressureAltitude, w), d.Cruise, w)
	g.DiveGust = g.gust(d.rule.gust(d.gustD, air.PressureAltitude, w), d.Dive, w)
	g.draw()
	return g, nil
}

// gust is the load factors of the gust velocity u at the speed v, both equivalent in m/s.
func (g *Diagram) gust(u, v float64, w *formula.Working) Gust {
	const rho0 = atmos.SeaLevelDensity
	n := func(u float64) float64 {
		a := g.Design.Slope
		return w.Step(gustFactor, 1+g.Alleviation*rho0*u*v*a/(2*g.Loading*atmos.Gravity), g.Alleviation, rho0, u, v, a, g.Loading, atmos.Gravity)
	}
	return Gust{Velocity: u, Up: n(u), Down: n(-u)}
}

// lift is the load factors at the stalls at the equivalent airspeed v in m/s.
func (g *Diagram) lift(v float64) Pair {
	q := 0.5 * atmos.SeaLevelDensity * v * v / (g.Loading * atmos.Gravity)
	return Pair{q * g.Design.Airframe.CLMax, q * g.Design.NegativeCL}
}

// A span is a straight line of load factor over a range of speed.
type span struct {
	v0, n0, v1, n1 float64 // speeds in m/s, v0 <= v1, and load factors
}

func (s span) at(v float64) float64 {
	if s.v1 == s.v0 {
		return s.n1
	}
	return s.n0 + (s.n1-s.n0)*(v-s.v0)/(s.v1-s.v0)
}

// spans are the limits of manoeuvre and gust, upwards and downwards, up to VC and on to VD.
func (g *Diagram) spans() (maneuverUp, maneuverDown, gustUp, gustDown [2]span) {
	d, c, e := &g.Design, g.CruiseGust, g.DiveGust
	line := func(start, atCruise, atDive float64) [2]span {
		return [2]span{{0, start, d.Cruise, atCruise}, {d.Cruise, atCruise, d.Dive, atDive}}
	}
	return line(d.Positive, d.Positive, d.Positive), line(d.Negative, d.Negative, d.NegativeDive), line(1, c.Up, e.Up), line(1, c.Down, e.Down)
}

// at evaluates everything at the equivalent airspeed v in m/s, 0 to VD.
func (g *Diagram) at(v float64) Point {
	mu, md, gu, gd := g.spans()
	part := 0
	if v > g.Design.Cruise {
		part = 1
	}
	p := Point{EAS: v, Lift: g.lift(v), Maneuver: Pair{mu[part].at(v), md[part].at(v)}, Gust: Pair{gu[part].at(v), gd[part].at(v)}}
	p.Envelope.Up = math.Min(p.Lift.Up, math.Max(p.Maneuver.Up, p.Gust.Up))
	p.Envelope.Down = math.Max(p.Lift.Down, math.Min(p.Maneuver.Down, p.Gust.Down))
	return p
}

// Load evaluates everything at the equivalent airspeed v in m/s; ok is false outside 0 to VD.
func (g *Diagram) Load(v float64) (p Point, ok bool) {
	if !(v >= 0 && v <= g.Design.Dive) {
		return Point{}, false
	}
	return g.at(v), true
}
