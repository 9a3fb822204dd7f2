package aircraft

import (
	"legwright/internal/perf/input"
	"legwright/internal/perf/polar"
)

// An Equivalent is the clean polar said in every way at once.
type Equivalent struct {
	polar.Parabola
	DragArea   float64 // minimum drag per dynamic pressure, in m²
	Efficiency float64 // span efficiency, dimensionless
	GlideRatio float64 // best ratio of lift to drag, dimensionless
	GlideCL    float64 // lift coefficient of the best ratio, dimensionless
	GlideSpeed float64 // equivalent airspeed of the best ratio at the mass, in m/s
	Mass       float64 // in kg
	Fitted     bool    // a parabola fitted to a table
	RMS        float64 // root mean square of what the fit leaves of CD, dimensionless
	Worst      float64 // greatest difference in CD that the fit leaves, dimensionless
	Unusual    string  // which of the numbers that follow lie outside their typical range, in words; empty when none does
}

// Equivalent says the polar of an aircraft that builds in every way, at the mass
// of the best glide where that is given, else at the start. It fails for a table through which there is no parabola with drag.
func (s *Spec) Equivalent() (Equivalent, error) {
	f := &s.Airframe
	p, err := f.parabola(nil)
	if err != nil {
		return Equivalent{}, err
	}
	e := Equivalent{Parabola: p, DragArea: p.CDMin * f.WingArea, Efficiency: f.efficiencyOf(p), Mass: s.StartMass()}
	if f.DragGiven == ByBestGlide {
		e.Mass = f.GlideMass
	}
	if f.DragGiven == ByTable {
		fit, _ := f.fit()
		e.Fitted, e.RMS, e.Worst = true, fit.RMS, fit.Worst
	}
	if !(p.CDMin > 0 && p.K > 0) {
		return e, &input.Error{Path: "polar", Text: "the table", Accepts: "rows near a parabola with CDmin and K above 0", Err: input.ErrConflict}
	}
	e.GlideRatio, e.GlideCL = p.BestGlide()
	e.GlideSpeed = s.eas(e.GlideCL, e.Mass)
	for _, follows := range []struct {
		name string
		spec *input.Spec
		at   float64
		told bool // given by itself, so that its field says it
	}{{"CDmin", &cdMin, p.CDMin, f.DragGiven == ByParabola}, {"e", &efficiency, e.Efficiency, f.DragGiven != ByBestGlide && f.DragGiven != ByTable}, {"Best L/D", &glideRatio, e.GlideRatio, f.DragGiven == ByBestGlide}} {
		if !follows.told {
			e.Unusual = joined(e.Unusual, follows.spec.Unusually(follows.name, follows.at))
		}
	}
	return e, nil
}

func joined(a, b string) string {
	if a == "" || b == "" {
		return a + b
	}
	return a + " " + b
}

// A StallPoint is the greatest lift of a configuration said both ways.
type StallPoint struct {
	CLMax   float64 // dimensionless
	Speed   float64 // calibrated stall speed at sea level at the mass, in m/s
	Mass    float64 // in kg
	Unusual string  // says that a CLmax that follows lies outside its typical range; empty when it does not
}

// Stall says the greatest lift of a configuration both ways, at the mass of the
// stall speed where that is given, else at the start.
func (s *Spec) Stall(c Config) StallPoint {
	cfg := s.Airframe.configurations()[c]
	p := StallPoint{CLMax: cfg.lift(s.Airframe.WingArea, nil), Mass: s.StartMass()}
	if cfg.LiftGiven == ByStall {
		p.Mass, p.Unusual = cfg.StallMass, clMax.Unusually("CLmax", p.CLMax)
	}
	p.Speed = cfg.stallAt(p.Mass, s.Airframe.WingArea)
	return p
}
