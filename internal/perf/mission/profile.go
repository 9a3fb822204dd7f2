package mission

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
)

// A ClimbRow is one altitude of a climb from the first row's altitude at best rate.
type ClimbRow struct {
	Altitude float64 // pressure altitude in m
	Rate     float64 // geometric rate of climb in m/s, of the mass reached there, with the speed changing as the schedule asks
	TAS      float64 // true airspeed in m/s
	Time     float64 // since the first row in s
	Distance float64 // still-air distance since the first row in m
	Fuel     float64 // burnt since the first row in kg
	Energy   float64 // drawn since the first row in J
	Mass     float64 // in kg
}

// ClimbProfile integrates a climb at best rate and full setting from the mass in
// kg at the first altitude in m through the others, which rise, with the mass
// falling. It stops short at the altitude where the rate has fallen below leastClimb.
func ClimbProfile(a *aircraft.Aircraft, day atmos.Day, mass float64, altitudes []float64) ([]ClimbRow, error) {
	if len(altitudes) < 2 {
		return nil, nil
	}
	top := altitudes[len(altitudes)-1]
	plan := &Plan{Day: day}
	f := &flier{a: a, plan: plan, now: Sample{Mass: mass, Altitude: altitudes[0], Fuel: math.Inf(1), Charge: math.Inf(1)}}
	l := &Leg{Kind: Climb, Altitude: top, SpeedRule: BestRate, Path: FullPower, DayGiven: ProjectDay}
	speed, err := f.climbSchedule(l, day)
	if err != nil {
		return nil, err
	}
	r := &rider{f: f, l: l, day: day, speed: speed, base: f.now}
	// Altitude is the independent variable: y is time, distance, fuel, energy.
	at := func(hp float64, y []float64) (moment, error) {
		return r.moment([]float64{y[1], hp, y[2], y[3]})
	}
	rates := func(hp float64, y, dydt []float64) error {
		m, err := at(hp, y)
		if err != nil {
			return err
		}
		if m.climb.PressureRate < leastClimb {
			return pointperf.ErrNoCeiling
		}
		p := m.climb.PressureRate
		dydt[0], dydt[1], dydt[2], dydt[3] = 1/p, m.tas*math.Cos(m.climb.Angle)/p, m.out.FuelFlow/p, m.out.BusPower/p
		return nil
	}
	sol, err := numeric.Integrate(rates, altitudes[0], make([]float64, 4), top, numeric.Options{RelTol: 1e-7, AbsTol: []float64{1e-3, 1e-1, 1e-6, 10}})
	reached, _ := sol.End()
	var rows []ClimbRow
	y := make([]float64, 4)
	for _, hp := range altitudes {
		if hp > reached {
			break
		}
		y = sol.At(hp, y)
		m, err := at(hp, y)
		if err != nil {
			return rows, err
		}
		rows = append(rows, ClimbRow{Altitude: hp, Rate: m.climb.Rate, TAS: m.tas, Time: y[0], Distance: y[1], Fuel: y[2], Energy: y[3], Mass: m.point.Mass})
	}
	if len(rows) > 1 {
		return rows, nil
	}
	return rows, cause(err)
}
