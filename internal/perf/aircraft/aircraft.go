package aircraft

import (
	"errors"
	"fmt"
	"math"

	"legwright/internal/perf/input"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// A Config names a setting of flaps and gear.
type Config int

// The configurations.
const (
	Clean Config = iota
	TakeOff
	Landing
	configs
)

// String is the configuration in words.
func (c Config) String() string { return [configs]string{"clean", "take-off", "landing"}[c] }

// An Aircraft is a Spec checked and assembled. It is immutable and safe for concurrent use.
type Aircraft struct {
	area, span, height float64
	polars             [configs]polar.Polar
	clMax              [configs]float64
	groundCL           float64
	neverExceed        float64
	empty, growth      float64
	payload            float64
	maxTakeOff         float64
	limits             loads.Limits
	maxZeroFuel        float64 // in kg, +Inf when there is no such limit
	plant              powerplant.Powerplant
	stores             powerplant.Stores
}

// Build returns the aircraft, or every input error joined, with paths relative to s.
func (s *Spec) Build() (*Aircraft, error) {
	if s.Powerplant.Model == nil {
		return nil, errors.Join(input.Check(s), &input.Error{Path: "powerplant.kind", Accepts: "a powerplant", Err: input.ErrRequired})
	}
	if err := input.Check(s); err != nil {
		return nil, err
	}
	base, err := s.Airframe.polar(nil)
	plant, plantErr := s.Powerplant.Model.Build()
	if err := errors.Join(input.Within("airframe", errors.Join(s.Airframe.checkLift(), err)), input.Within("limits", s.Limits.Check()), input.Within("powerplant.values", plantErr)); err != nil {
		return nil, err
	}
	f, w := &s.Airframe, &s.Weights
	empty := w.Empty + s.Powerplant.Model.InstalledMass()
	a := &Aircraft{area: f.WingArea, span: f.Span, height: f.WingHeight, groundCL: f.GroundCL, neverExceed: f.NeverExceed,
		empty: empty, growth: w.Growth * empty, payload: w.PayloadMass(), maxTakeOff: w.MaxTakeOff, maxZeroFuel: math.Inf(1),
		plant: plant, stores: s.Powerplant.Model.Stores()}
	if w.ZeroFuelGiven == ByZeroFuel {
		a.maxZeroFuel = w.MaxZeroFuel
	}
	for c, cfg := range f.configurations() {
		a.polars[c] = base.Configured(cfg.DeltaCD, cfg.DeltaCLM)
		a.clMax[c] = cfg.lift(f.WingArea, nil)
	}
	a.limits = s.Limits
	return a, nil
}

// reach checks that a tabulated polar covers every lift coefficient that is flown.
func (f *Airframe) reach(low, high float64) error {
	var errs []error
	for _, c := range [...]Configuration{f.TakeOff, f.Landing} {
		if cl := f.GroundCL - c.DeltaCLM; cl < low-1e-9 || cl > high+1e-9 {
			errs = append(errs, &input.Error{Path: "ground_cl", Spec: &groundCL, Text: units.Plain(f.GroundCL), Err: input.ErrConflict,
				Accepts: fmt.Sprintf("the drag polar runs from CL %s to %s and must reach it, less the shift of flaps and gear", units.Plain(low), units.Plain(high))})
			break
		}
	}
	for i, c := range f.configurations() {
		if most := c.lift(f.WingArea, nil); most-c.DeltaCLM > high+1e-9 || -c.DeltaCLM < low-1e-9 {
			path, spec := c.liftPath()
			errs = append(errs, &input.Error{Path: configPaths[i] + "." + path, Spec: spec, Text: units.Plain(most), Err: input.ErrConflict,
				Accepts: fmt.Sprintf("the drag polar runs from CL %s to %s and must reach from 0 to CLmax, less the shift", units.Plain(low), units.Plain(high))})
		}
	}
	return errors.Join(errs...)
}

// configPaths are the JSON names of the configurations.
var configPaths = [configs]string{"clean", "take_off", "landing"}

func (f *Airframe) configurations() [configs]*Configuration {
	return [configs]*Configuration{&f.Clean, &f.TakeOff, &f.Landing}
}

// checkLift checks what the stall speeds given mean.
func (f *Airframe) checkLift() error {
	var errs []error
	for i, c := range f.configurations() {
		errs = append(errs, input.Within(configPaths[i], c.checkLift(f.WingArea)))
	}
	return errors.Join(errs...)
}

// WingArea is the reference area in m².
func (a *Aircraft) WingArea() float64 { return a.area }

// Span is the wing span in m.
func (a *Aircraft) Span() float64 { return a.span }

// WingHeight is the height of the wing above the ground on its wheels in m.
func (a *Aircraft) WingHeight() float64 { return a.height }

// Polar is the drag polar in a configuration.
func (a *Aircraft) Polar(c Config) *polar.Polar { return &a.polars[c] }

// CLMax is the maximum lift coefficient in a configuration, dimensionless.
func (a *Aircraft) CLMax(c Config) float64 { return a.clMax[c] }

// GroundCL is the lift coefficient held in the take-off run, dimensionless.
func (a *Aircraft) GroundCL() float64 { return a.groundCL }

// NeverExceed is the never-exceed calibrated airspeed in m/s.
func (a *Aircraft) NeverExceed() float64 { return a.neverExceed }

// EmptyMass is the mass with the powerplant as stated, without growth, payload and fuel, in kg.
func (a *Aircraft) EmptyMass() float64 { return a.empty }

// Growth is the allowance for what building adds to the empty mass, in kg.
func (a *Aircraft) Growth() float64 { return a.growth }

// Payload is the mass of the items in kg.
func (a *Aircraft) Payload() float64 { return a.payload }

// DryMass is the mass with growth, payload and unusable fuel, without usable fuel, in kg.
func (a *Aircraft) DryMass() float64 { return a.empty + a.growth + a.payload + a.stores.Trapped }

// StartMass is the mass with everything aboard in kg.
func (a *Aircraft) StartMass() float64 { return a.DryMass() + a.stores.Fuel }

// MaxTakeOff is the designer's greatest take-off mass in kg.
func (a *Aircraft) MaxTakeOff() float64 { return a.maxTakeOff }

// MaxZeroFuel is the designer's greatest mass without usable fuel in kg; limited is false when there is none.
func (a *Aircraft) MaxZeroFuel() (mass float64, limited bool) {
	return a.maxZeroFuel, !math.IsInf(a.maxZeroFuel, 1)
}

// Plant is the powerplant.
func (a *Aircraft) Plant() powerplant.Powerplant { return a.plant }

// Stores is the energy aboard at the start.
func (a *Aircraft) Stores() powerplant.Stores { return a.stores }
