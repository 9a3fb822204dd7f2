package study

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/numeric"
)

// A PolarCurve is the drag polar in one configuration at the mass of the view, out of ground effect.
type PolarCurve struct {
	Config aircraft.Config
	Points []PolarPoint // at rising lift coefficients up to CLmax
	Best   PolarPoint   // where the ratio of lift to drag is greatest
	CLMax  float64      // dimensionless
	Least  float64      // least drag coefficient, dimensionless
	Stall  float64      // equivalent airspeed of the stall in m/s
}

// A PolarPoint is one lift coefficient.
type PolarPoint struct {
	CL  float64 // dimensionless
	CD  float64 // dimensionless
	EAS float64 // equivalent airspeed of level flight in m/s
}

// Ratio is lift over drag, dimensionless.
func (p PolarPoint) Ratio() float64 { return p.CL / p.CD }

const (
	polarPoints = 80
	fastest     = 3.2 // speed, over the stall, up to which polars are drawn: a tenth of CLmax
)

// Polars are the drag polars of the three configurations.
func (s *Study) Polars() []PolarCurve {
	a := s.Aircraft()
	var list []PolarCurve
	for _, c := range []aircraft.Config{aircraft.Clean, aircraft.TakeOff, aircraft.Landing} {
		p := a.Polar(c)
		at := func(cl float64) PolarPoint {
			return PolarPoint{CL: cl, CD: p.CD(cl, 1, nil), EAS: math.Sqrt(2 * s.View.Mass * atmos.Gravity / (atmos.SeaLevelDensity * a.WingArea() * cl))}
		}
		k := PolarCurve{Config: c, CLMax: a.CLMax(c), Least: p.Minimum(), Stall: at(a.CLMax(c)).EAS}
		slow, fast := k.CLMax, k.CLMax/(fastest*fastest)
		for i := range polarPoints {
			k.Points = append(k.Points, at(fast+(slow-fast)*float64(i)/(polarPoints-1)))
		}
		k.Best = k.Points[0]
		for _, q := range k.Points {
			if q.Ratio() > k.Best.Ratio() {
				k.Best = q
			}
		}
		if m, err := numeric.GlobalMaximum(func(cl float64) float64 { return at(cl).Ratio() }, fast, slow, polarPoints, 1e-9); err == nil {
			k.Best = at(m.X)
		}
		list = append(list, k)
	}
	return list
}

// BuildUp is what the list of components adds up to, whatever the drag is given by.
// It fails when the list is not whole enough to add up.
func (s *Study) BuildUp() (dragbuild.Sum, error) { return s.Variant().Aircraft.Airframe.BuildUp(nil) }
