package pointperf

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A Climb is steady flight on an inclined path.
type Climb struct {
	TAS          float64 // true airspeed in m/s
	Angle        float64 // of the path above the horizontal in rad, -π/2 to π/2
	Rate         float64 // geometric rate of climb in m/s
	PressureRate float64 // rate of change of pressure altitude in m/s
	Drag         float64 // in N
}

// Gradient is the tangent of the path angle, dimensionless.
func (c Climb) Gradient() float64 { return math.Tan(c.Angle) }

var (
	climbAngle = formula.Must(formula.Formula{
		ID: "climb.angle", Out: formula.Sym("gamma", "climb angle", units.Angle),
		In: []formula.Symbol{formula.Sym("T", "thrust", units.Force), formula.Sym("D", "drag with the lift L = W cos γ", units.Force),
			formula.Sym("W", "weight", units.Force), formula.Sym("f", "acceleration factor (V/g) dV/dh", units.Coefficient)},
		Expr: "asin((T - D)/(W*(1 + f)))", Source: formula.Anderson, Where: "section 5.10 with the acceleration term of section 6.6, without the small-angle step",
	})
	climbRate = formula.Must(formula.Formula{
		ID: "climb.rate", Out: formula.Sym("RC", "rate of climb", units.ClimbRate),
		In:   []formula.Symbol{formula.Sym("V", "true airspeed", units.Speed), formula.Sym("gamma", "climb angle", units.Angle)},
		Expr: "V*sin(gamma)", Source: formula.Anderson, Where: "section 5.10",
	})
)

// ClimbAt solves L = W cos γ and T − D = W sin γ (1 + f) for the path angle at
// the true airspeed tas in m/s, > 0, with the thrust in N and the acceleration
// factor f = (V/g) dV/dh, 0 for constant true airspeed. A thrust above weight and
// drag climbs vertically; one below the drag descends.
func ClimbAt(a *aircraft.Aircraft, p *Point, tas, thrust, f float64, w *formula.Working) Climb {
	weight := p.Weight()
	inertia := weight * (1 + f)
	sin, cos, drag := 0.0, 1.0, 0.0
	settled := false
	for range 40 {
		drag = Drag(a, p, tas, weight*cos, 1, nil)
		next := math.Max(-1, math.Min(1, (thrust-drag)/inertia))
		settled = math.Abs(next-sin) <= 1e-13
		sin, cos = next, math.Sqrt(1-next*next)
		if settled {
			break
		}
	}
	if !settled {
		sin, cos, drag = steep(a, p, tas, thrust, inertia)
	}
	c := Climb{TAS: tas, Angle: math.Asin(sin), Drag: drag}
	if w != nil {
		drag = Drag(a, p, tas, weight*cos, 1, w)
		if math.Abs(sin) < 1 {
			w.Note("Angle and drag are solved together: the lift is W cos γ.")
			c.Angle = w.Step(climbAngle, math.Asin((thrust-drag)/inertia), thrust, drag, weight, f)
		}
	}
	c.Rate = w.Step(climbRate, tas*math.Sin(c.Angle), tas, c.Angle)
	c.PressureRate = c.Rate / p.Air.HeightRatio
	return c
}

// steep solves the path angle by bracketing, for paths so steep that the plain iteration oscillates.
func steep(a *aircraft.Aircraft, p *Point, tas, thrust, inertia float64) (sin, cos, drag float64) {
	weight := p.Weight()
	excess := func(angle float64) float64 {
		return thrust - Drag(a, p, tas, weight*math.Cos(angle), 1, nil) - inertia*math.Sin(angle)
	}
	angle := math.Copysign(math.Pi/2, thrust-Drag(a, p, tas, 0, 1, nil))
	if r, err := numeric.Root(excess, -math.Pi/2, math.Pi/2, 1e-13); err == nil {
		angle = r.X
	}
	sin, cos = math.Sincos(angle)
	return sin, cos, Drag(a, p, tas, weight*cos, 1, nil)
}

// FullClimb is the climb at full setting at the true airspeed tas in m/s, > 0, unaccelerated.
func FullClimb(a *aircraft.Aircraft, p *Point, tas float64, w *formula.Working) (Climb, error) {
	out, err := ThrustAvailable(a, p, tas, w)
	if err != nil {
		return Climb{}, err
	}
	return ClimbAt(a, p, tas, out.Thrust, 0, w), nil
}

// AccelerationFactor is f = (V/g) dV/dh at the pressure altitude hp in m when
// the true airspeed follows the schedule tas(hp) in m/s: the share of excess
// thrust that goes into speed. The derivative is a central difference over 20 m.
func AccelerationFactor(day atmos.Day, hp float64, tas func(hp float64) float64) (float64, error) {
	air, err := day.At(hp, nil)
	if err != nil {
		return 0, err
	}
	const step = 10.0
	slope := (tas(hp+step) - tas(hp-step)) / (2 * step) / air.HeightRatio
	return tas(hp) / atmos.Gravity * slope, nil
}
