package pointperf

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/numeric"
)

// A Glide is the best gliding of an idling aircraft.
type Glide struct {
	Ratio     float64 // distance over the ground per height in still air, dimensionless
	RatioTAS  float64 // true airspeed of the best ratio in m/s
	Sink      float64 // least rate of sink in m/s, positive
	SinkTAS   float64 // true airspeed of the least sink in m/s
	Windmills bool    // drag of an idling powerplant is included
}

// BestGlide finds the flattest glide and the least sink with the powerplant at
// idle: without thrust, or with the drag that its data give for idle.
func BestGlide(a *aircraft.Aircraft, p *Point) (Glide, error) {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Glide{}, stallAboveLimit(vs, top)
	}
	var g Glide
	descent := func(v float64) Climb {
		out, err := a.Plant().Run(p.Condition(v), 0, nil)
		if err != nil {
			return Climb{Angle: math.Inf(-1), Rate: math.Inf(-1)}
		}
		g.Windmills = g.Windmills || out.Thrust < 0
		return ClimbAt(a, p, v, out.Thrust, 0, nil)
	}
	flat, err := numeric.GlobalMaximum(func(v float64) float64 { return descent(v).Angle }, vs, top, 12, 1e-8)
	if err != nil {
		return Glide{}, err
	}
	slow, err := numeric.GlobalMaximum(func(v float64) float64 { return descent(v).Rate }, vs, top, 12, 1e-8)
	if err != nil {
		return Glide{}, err
	}
	g.Ratio, g.RatioTAS = 1/math.Tan(-flat.F), flat.X
	g.Sink, g.SinkTAS = -slow.F, slow.X
	return g, nil
}
