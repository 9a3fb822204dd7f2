// Package powerplant models what turns stored energy into thrust. The rest of
// the engine knows a powerplant only by the interface here: it may assume
// neither fuel nor a piston nor a propeller.
package powerplant

import (
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// A Condition is the flight condition a powerplant works in.
type Condition struct {
	Air atmos.Air
	TAS float64 // true airspeed in m/s, >= 0
}

// An Output is steady operation at one condition and setting.
type Output struct {
	Thrust   float64 // net thrust along the flight path in N
	FuelFlow float64 // in kg/s, >= 0
	BusPower float64 // electrical power drawn in W, >= 0
	Fraction float64 // of the rated power or thrust that is being made, dimensionless, >= 0
	Shaft    Shaft   // zero where the powerplant has no propeller or it is idling unknown
	Limits   Limit   // what held the output back, if anything
}

// Shaft is the state of a propeller. Its zero value says that there is nothing to report.
type Shaft struct {
	Speed        float64 // propeller speed in rev/s, >= 0
	EngineSpeed  float64 // engine or motor speed in rev/s, >= 0
	Power        float64 // absorbed by the propeller in W
	Efficiency   float64 // T V / P, dimensionless; 0 at rest
	AdvanceRatio float64 // V/(n D), dimensionless
	TipMach      float64 // helical tip Mach number, dimensionless
}

// Limit is a set of reasons why an output is not what the setting alone would give.
type Limit uint

// The limits.
const (
	SpeedLimited Limit = 1 << iota // throttled to hold the greatest allowed rotational speed
	Idling                         // the setting asks for less than idle gives
	Extrapolated                   // outside the rows of the power curve
)

// A Powerplant delivers thrust.
type Powerplant interface {
	// Run returns the output at c with the power lever at setting, from 0 (idle)
	// to 1 (maximum continuous). Thrust does not decrease as setting increases.
	// Run is safe for concurrent use. It fails where the model has no answer,
	// with an error that carries the numbers.
	Run(c Condition, setting float64, w *formula.Working) (Output, error)

	// Match returns the setting whose thrust is want, in N, and the output
	// there. A want below what idle gives returns idle with the limit Idling
	// set. It fails with *ThrustError when want exceeds the thrust available.
	Match(c Condition, want float64, w *formula.Working) (setting float64, out Output, err error)
}

// Stores is the energy aboard at the start.
type Stores struct {
	Fuel     float64 // usable fuel in kg, >= 0
	Trapped  float64 // unusable fuel in kg, >= 0
	Charge   float64 // usable electrical energy in J, >= 0
	Capacity float64 // greatest usable fuel in kg, >= 0
}

// energyOfFuel weighs fuel against electricity when a powerplant draws on both:
// lower heating value of aviation gasoline in J/kg, ASTM D910 minimum, from memory.
// Only the ratio of the two matters, so for a single store it cancels.
const energyOfFuel = 43.5e6

// Drain is the rate at which stored energy is drawn in W, the quantity that the
// speeds of best range and best endurance make small.
func (o Output) Drain() float64 { return o.FuelFlow*energyOfFuel + o.BusPower }

// A ThrustError reports a demand above the thrust available.
type ThrustError struct {
	Want      float64 // in N
	Available float64 // in N
	TAS       float64 // true airspeed in m/s
}

func (e *ThrustError) Error() string { return e.Message().In(units.Metric) }

// Message says what was asked of what there is.
func (e *ThrustError) Message() units.Message {
	return units.Say("thrust required, {}, exceeds thrust available, {}, at {}", units.Of(units.Force, e.Want), units.Of(units.Force, e.Available), units.Of(units.Speed, e.TAS))
}

// Words lists the limits in words.
func (l Limit) Words() []string {
	var list []string
	for _, w := range []struct {
		bit  Limit
		text string
	}{{SpeedLimited, "throttled to hold the greatest speed of rotation"}, {Idling, "idling"}, {Extrapolated, "below the rows of the power table"}} {
		if l&w.bit != 0 {
			list = append(list, w.text)
		}
	}
	return list
}
