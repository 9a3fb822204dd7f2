package pointperf

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A GroundGlide is the flattest glide over the ground in a head wind.
type GroundGlide struct {
	Ratio float64 // distance over the ground per height, dimensionless, > 0
	TAS   float64 // true airspeed in m/s
}

// GlideInWind finds the idling glide that goes farthest over the ground against
// the head wind in m/s, negative for a tail wind: the greatest
// (V cos γ − wind) / sink, which is what the tangent from the wind speed to the
// speed polar finds (own derivation from the definition of the two speeds).
func GlideInWind(a *aircraft.Aircraft, p *Point, wind float64) (GroundGlide, error) {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return GroundGlide{}, stallAboveLimit(vs, top)
	}
	best, err := numeric.GlobalMaximum(func(v float64) float64 {
		out, err := a.Plant().Run(p.Condition(v), 0, nil)
		if err != nil {
			return math.Inf(-1)
		}
		c := ClimbAt(a, p, v, out.Thrust, 0, nil)
		if c.Rate >= 0 { // an idle that still pulls: no glide
			return math.Inf(-1)
		}
		return (v*math.Cos(c.Angle) - wind) / -c.Rate
	}, vs, top, 24, 1e-8)
	if err != nil {
		return GroundGlide{}, err
	}
	if best.F <= 0 {
		return GroundGlide{}, units.Errorf(nil, "no glide speed makes way against {}", units.Of(units.Speed, wind))
	}
	return GroundGlide{Ratio: best.F, TAS: best.X}, nil
}
