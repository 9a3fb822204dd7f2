package pointperf

import (
	"errors"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// Rates of climb in m/s that define ceilings: 14 CFR 23 practice, 100 ft/min for
// the service ceiling of a propeller aeroplane.
const (
	AbsoluteRate = 0.0
	ServiceRate  = 0.508
)

// ErrNoCeiling says that even the lowest altitude is above the ceiling.
var ErrNoCeiling = errors.New("does not climb at sea level")

// Ceiling is the pressure altitude in m at which the best rate of climb has
// fallen to rate in m/s, at constant mass in kg.
func Ceiling(a *aircraft.Aircraft, day atmos.Day, mass float64, config aircraft.Config, rate float64) (float64, error) {
	best := func(hp float64) Best {
		air, err := day.At(hp, nil)
		if err != nil {
			return Best{Err: err}
		}
		return BestRate(a, &Point{Air: air, Mass: mass, Config: config})
	}
	surplus := func(hp float64) float64 {
		b := best(hp)
		if b.Err != nil {
			return -1
		}
		return b.Value - rate
	}
	if b := best(0); b.Err != nil {
		return 0, b.Err
	}
	low := surplus(0)
	if low < 0 {
		return 0, units.Errorf(ErrNoCeiling, "does not reach {} of climb at sea level and {}: the best rate is {}",
			units.Of(units.ClimbRate, rate), units.Of(units.Mass, mass), units.Of(units.ClimbRate, low+rate))
	}
	const step = 2000.0
	for hp := 0.0; hp < atmos.MaxAltitude; hp += step {
		if surplus(hp+step) < 0 {
			r, err := numeric.Root(surplus, hp, hp+step, 1e-7)
			return r.X, err
		}
	}
	return 0, units.Errorf(nil, "still climbs at {}, the end of the atmosphere model", units.Of(units.Altitude, atmos.MaxAltitude))
}
