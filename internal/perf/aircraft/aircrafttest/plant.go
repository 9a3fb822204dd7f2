package aircrafttest

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/powerplant"
)

// SeaLevelDensity is the sea-level density of the books in kg/m³: 0.002377 slug/ft³.
const SeaLevelDensity = 0.002377 * 515.378818

// leastTAS in m/s keeps the thrust of a constant power finite at rest.
const leastTAS = 1.0

// Propulsive is a powerplant whose propulsive power T V is the same at every
// speed and follows the air density: the textbook propeller aeroplane.
type Propulsive struct {
	Power       float64 // shaft power at sea level in W, > 0
	Efficiency  float64 // of the propeller, dimensionless, 0 to 1
	Consumption float64 // fuel per shaft work in kg/J, >= 0
}

// Jet is a powerplant whose thrust is the same at every speed and follows the
// air density: the textbook turbojet aeroplane.
type Jet struct {
	Thrust      float64 // at sea level in N, > 0
	Consumption float64 // fuel flow per thrust in kg/(N·s), >= 0
}

var (
	_ powerplant.Powerplant = Propulsive{}
	_ powerplant.Powerplant = Jet{}
)

func (p Propulsive) at(c powerplant.Condition, setting float64) powerplant.Output {
	shaft := setting * p.Power * c.Air.Density / SeaLevelDensity
	return powerplant.Output{Thrust: p.Efficiency * shaft / math.Max(c.TAS, leastTAS), FuelFlow: p.Consumption * shaft, Fraction: shaft / p.Power}
}

// Run gives the thrust of the setting's share of the power.
func (p Propulsive) Run(c powerplant.Condition, setting float64, _ *formula.Working) (powerplant.Output, error) {
	return p.at(c, setting), nil
}

// Match inverts Run.
func (p Propulsive) Match(c powerplant.Condition, want float64, _ *formula.Working) (float64, powerplant.Output, error) {
	return match(func(s float64) powerplant.Output { return p.at(c, s) }, c, want)
}

func (j Jet) at(air *atmos.Air, setting float64) powerplant.Output {
	t := setting * j.Thrust * air.Density / SeaLevelDensity
	return powerplant.Output{Thrust: t, FuelFlow: j.Consumption * t, Fraction: t / j.Thrust}
}

// Run gives the setting's share of the thrust.
func (j Jet) Run(c powerplant.Condition, setting float64, _ *formula.Working) (powerplant.Output, error) {
	return j.at(&c.Air, setting), nil
}

// Match inverts Run.
func (j Jet) Match(c powerplant.Condition, want float64, _ *formula.Working) (float64, powerplant.Output, error) {
	return match(func(s float64) powerplant.Output { return j.at(&c.Air, s) }, c, want)
}

// match uses that thrust is proportional to the setting.
func match(at func(setting float64) powerplant.Output, c powerplant.Condition, want float64) (float64, powerplant.Output, error) {
	if want <= 0 {
		return 0, powerplant.Output{Limits: powerplant.Idling}, nil
	}
	full := at(1).Thrust
	if want > full*(1+1e-12) {
		return 1, powerplant.Output{}, &powerplant.ThrustError{Want: want, Available: full, TAS: c.TAS}
	}
	s := math.Min(1, want/full)
	return s, at(s), nil
}
