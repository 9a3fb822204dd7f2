package aircraft

import (
	"fmt"
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/units"
)

// How the maximum lift is given; stored in documents.
const (
	ByCLMax = "cl-max"
	ByStall = "stall-speed"
)

var (
	clMax = input.Spec{Name: "cl_max", Label: "CLmax", Quantity: units.Coefficient, Min: 0.3, Max: 5,
		Typical: &input.Typical{Low: 1.1, High: 2.4, Source: "1.2 to 1.5 clean, 1.6 to 2.2 with flaps; common practice, no source"}}
	stallSpeed = input.Spec{Name: "stall_speed", Label: "Stall speed, CAS", Quantity: units.Speed, Min: 1, Max: 150, Note: "Calibrated airspeed at sea level, power off, wings level."}
	stallMass  = input.Spec{Name: "stall_mass", Label: "Mass at that speed", Quantity: units.Mass, Min: 0.05, Max: 100000}
	deltaCD    = input.Spec{Name: "delta_cd", Label: "Drag added", Quantity: units.Coefficient, Min: 0, Max: 0.5}
	deltaCLM   = input.Spec{Name: "delta_clm", Label: "Shift of CL at minimum drag", Quantity: units.Coefficient, Min: -0.5, Max: 1.5}
)

// Inputs describes one configuration.
func (c *Configuration) Inputs() []input.Entry {
	stall := c.LiftGiven == ByStall
	return []input.Entry{
		input.Ways("lift_given", "Greatest lift given as", &c.LiftGiven, input.Option{Value: ByCLMax, Label: "CLmax"}, input.Option{Value: ByStall, Label: "stall speed at a mass"}),
		input.Num(&clMax, &c.CLMax).If(!stall),
		input.Num(&stallSpeed, &c.StallSpeed).If(stall),
		input.Num(&stallMass, &c.StallMass).If(stall),
		input.Num(&deltaCD, &c.DeltaCD),
		input.Num(&deltaCLM, &c.DeltaCLM),
	}
}

// lift is CLmax on a wing of the area s in m², dimensionless.
func (c *Configuration) lift(s float64, w *formula.Working) float64 {
	if c.LiftGiven == ByStall {
		return snapped(&clMax, polar.StallLift(c.StallMass, atmos.Gravity, atmos.SeaLevelDensity, c.StallSpeed, s, w))
	}
	return c.CLMax
}

// LiftWorking shows how CLmax in a configuration follows from a stall speed, where that is what is given.
func (f *Airframe) LiftWorking(c Config, w *formula.Working) {
	if cfg := f.configurations()[c]; cfg.LiftGiven == ByStall {
		cfg.lift(f.WingArea, w)
	}
}

// checkLift reports a stall speed that no wing of the area s in m² has.
func (c *Configuration) checkLift(s float64) error {
	cl := c.lift(s, nil)
	if c.LiftGiven != ByStall || clMax.Check(cl) == nil {
		return nil
	}
	return &input.Error{Path: "stall_speed", Spec: &stallSpeed, Value: c.StallSpeed, Err: input.ErrConflict,
		Accepts: fmt.Sprintf("CLmax would be %s, and %s is accepted", short(cl), clMax.Accepted(units.Unit{Scale: 1}))}
}

// liftPath is the input that decides CLmax.
func (c *Configuration) liftPath() (string, *input.Spec) {
	if c.LiftGiven == ByStall {
		return "stall_speed", &stallSpeed
	}
	return "cl_max", &clMax
}

// stallAt is the calibrated stall speed at sea level in m/s at the mass m in kg on a wing of the area s in m².
func (c *Configuration) stallAt(m, s float64) float64 {
	return math.Sqrt(2 * m * atmos.Gravity / (atmos.SeaLevelDensity * s * c.lift(s, nil)))
}
