package mission

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// A Reach is how far or how long an aircraft flies level on what it has aboard.
type Reach struct {
	Distance float64 // through still air in m
	Time     float64 // in s
	Used     float64 // fuel in kg
	Drawn    float64 // electrical energy in J
	First    float64 // true airspeed at its start in m/s
	Last     float64 // true airspeed at its end in m/s
}

// Nodes and weights of the three-point Gauss–Legendre rule on −1 to 1: M. Abramowitz
// and I. A. Stegun, Handbook of Mathematical Functions, 1964, table 25.4.
var gauss = [3][2]float64{{-0.774596669241483, 5.0 / 9}, {0, 8.0 / 9}, {0.774596669241483, 5.0 / 9}}

// LevelReach flies level in the air, starting with the mass in kg, until only the share
// kept of the usable fuel or charge is left, 0 to below 1. The speed is at each mass that of
// best range, or of best endurance where lasting is set. In still air the distance is the
// integral of V / (dm/dt) over the mass burnt, which for constant efficiency and
// consumption is Breguet's: Anderson 1999, sections 5.13 and 5.14.
func LevelReach(a *aircraft.Aircraft, air atmos.Air, mass, kept float64, lasting bool) (Reach, error) {
	stores := a.Stores()
	fuel, charge := stores.Fuel*(1-kept), stores.Charge*(1-kept)
	switch {
	case stores.Fuel > 0 && stores.Charge > 0:
		return Reach{}, units.Errorf(nil, "with fuel and charge aboard together there is no single speed to reckon with; fly it as a mission")
	case stores.Fuel <= 0 && stores.Charge <= 0:
		return Reach{}, units.Errorf(nil, "there is no fuel or charge aboard")
	case mass-stores.Fuel < a.EmptyMass()*(1-1e-9):
		return Reach{}, units.Errorf(nil, "{} is less than the empty aircraft with its fuel, {}", units.Of(units.Mass, mass), units.Of(units.Mass, a.EmptyMass()+stores.Fuel))
	}
	level := func(mass float64) (pointperf.Level, error) {
		p := &pointperf.Point{Air: air, Mass: mass}
		if lasting {
			return pointperf.BestEndurance(a, p)
		}
		return pointperf.BestRange(a, p, 0)
	}
	first, err := level(mass)
	if err != nil {
		return Reach{}, err
	}
	r := Reach{Used: fuel, Drawn: charge, First: first.TAS, Last: first.TAS}
	if stores.Fuel <= 0 {
		r.Time = charge / first.Output.BusPower
		r.Distance = first.TAS * r.Time
		return r.checked()
	}
	// The integrand goes as a power of the mass near −1, so panels of a sixth of the mass
	// leave an error of some parts in a million (TestReachIsBreguet).
	panels := math.Ceil(math.Log(mass/(mass-fuel)) / 0.18)
	for i := range int(panels) {
		half := fuel / panels / 2
		middle := mass - half*float64(2*i+1)
		for _, g := range gauss {
			l, err := level(middle + g[0]*half)
			if err != nil {
				return Reach{}, err
			}
			seconds := g[1] * half / l.Output.FuelFlow
			r.Time += seconds
			r.Distance += seconds * l.TAS
		}
	}
	last, err := level(mass - fuel)
	if err != nil {
		return Reach{}, err
	}
	r.Last = last.TAS
	return r.checked()
}

// checked refuses what a powerplant that draws nothing would make of the integral.
func (r Reach) checked() (Reach, error) {
	if !(r.Time < math.MaxFloat64 && r.Distance < math.MaxFloat64) {
		return Reach{}, units.Errorf(nil, "the powerplant draws nothing at its best speed, so there is no end to it")
	}
	return r, nil
}
