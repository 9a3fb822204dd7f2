package mission

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// A schedule gives the true airspeed in m/s of a leg at a pressure altitude in m and a mass in kg.
type schedule func(hp, mass float64) (float64, error)

// schedule builds the speed of a leg. Speeds that are optima are found exactly
// at a few altitudes or masses and interpolated between: an optimum is flat, so
// the merit lost by the interpolation is of second order (a test bounds it).
func (f *flier) schedule(l *Leg, day atmos.Day) (schedule, error) {
	switch l.SpeedRule {
	case ByTAS:
		return func(_, _ float64) (float64, error) { return l.Speed, nil }, nil
	case ByCAS, ByMach:
		return func(hp, _ float64) (float64, error) {
			air, err := day.At(hp, nil)
			if err != nil {
				return 0, err
			}
			if l.SpeedRule == ByMach {
				return air.FromMach(atmos.Mach(l.Mach)), nil
			}
			return air.FromCAS(atmos.CAS(l.Speed)), nil
		}, nil
	case BestRate, BestAngle:
		return f.climbSchedule(l, day)
	}
	return f.levelSchedule(l, day)
}

const climbNodes = 5

// climbSchedule finds the best climb speed at a few altitudes between here and
// the top, with the mass that a first estimate of the climb's fuel leaves. Where
// there is no climb speed at the top, the altitudes end at the absolute ceiling.
func (f *flier) climbSchedule(l *Leg, day atmos.Day) (schedule, error) {
	t, err := f.climbSpeeds(l, day, l.Altitude)
	if err != nil {
		ceiling, above := pointperf.Ceiling(f.a, day, f.now.Mass, aircraft.Clean, pointperf.AbsoluteRate)
		if above != nil || ceiling >= l.Altitude {
			return nil, err
		}
		if t, err = f.climbSpeeds(l, day, ceiling); err != nil {
			return nil, err
		}
	}
	return func(hp, _ float64) (float64, error) { v, _ := t.At(hp); return v, nil }, nil
}

// climbSpeeds tabulates the best climb speed from here to the altitude top in m.
func (f *flier) climbSpeeds(l *Leg, day atmos.Day, top float64) (*numeric.Table, error) {
	from, to := f.now.Altitude, math.Max(top, f.now.Altitude+1)
	x, y := make([]float64, climbNodes), make([]float64, climbNodes)
	mass := f.now.Mass
	for i := range x {
		x[i] = from + (to-from)*float64(i)/(climbNodes-1)
		air, err := day.At(x[i], nil)
		if err != nil {
			return nil, err
		}
		p := &pointperf.Point{Air: air, Mass: mass}
		best := pointperf.BestRate(f.a, p)
		rate := best.Value
		if l.SpeedRule == BestAngle {
			best = pointperf.BestAngle(f.a, p)
			rate = best.TAS * math.Sin(best.Value)
		}
		if best.Err != nil {
			return nil, best.Err
		}
		y[i] = best.TAS
		if out, err := pointperf.ThrustAvailable(f.a, p, best.TAS, nil); err == nil {
			seconds := (to - from) / (climbNodes - 1) * air.HeightRatio / math.Max(0.3, rate)
			mass = math.Max(f.dryMass(), mass-out.FuelFlow*seconds)
		}
	}
	return numeric.NewTable(x, y)
}

const (
	levelNodes = 3
	// turnStallRatio keeps turns at most thrust in hand from the stall at their load factor; common practice, no source.
	turnStallRatio = 1.2
)

// levelSchedule finds the level speed at masses between now and the leg's end.
func (f *flier) levelSchedule(l *Leg, day atmos.Day) (schedule, error) {
	hp, load := f.now.Altitude, l.LoadFactor()
	air, err := day.At(hp, nil)
	if err != nil {
		return nil, err
	}
	find := func(mass float64) (pointperf.Level, error) {
		p := &pointperf.Point{Air: air, Mass: mass}
		switch l.SpeedRule {
		case BestRange:
			return pointperf.BestRange(f.a, p, l.HeadWind)
		case BestEndurance:
			return pointperf.BestEndurance(f.a, p)
		case PercentPower:
			return pointperf.AtFraction(f.a, p, l.Power)
		case MostInHand:
			t := pointperf.TurnAtLoad(f.a, p, load)
			top := air.FromCAS(atmos.CAS(f.a.NeverExceed()))
			return pointperf.Level{TAS: math.Min(top, math.Max(t.TAS, turnStallRatio*t.Stall))}, t.Err
		}
		s := pointperf.AllSpeeds(f.a, p)
		best := s.Carson
		if l.SpeedRule == Maximum {
			best = s.LevelMax
			best.TAS *= 1 - 1e-9
		}
		return pointperf.Level{TAS: best.TAS}, best.Err
	}
	first, err := find(f.now.Mass)
	if err != nil {
		return nil, err
	}
	here, err := pointperf.LevelAtLoad(f.a, &pointperf.Point{Air: air, Mass: f.now.Mass}, first.TAS, load)
	if err != nil {
		return nil, err
	}
	seconds := l.Time
	switch {
	case l.byDistance():
		seconds = l.Distance / math.Max(1, first.TAS-l.HeadWind)
	case l.Kind == Turns:
		seconds = l.sweep() / pointperf.TurnRate(first.TAS, load, nil)
	}
	last := math.Max(f.dryMass(), f.now.Mass-1.05*here.Output.FuelFlow*seconds)
	if f.now.Mass-last < 1e-6*f.now.Mass {
		return func(_, _ float64) (float64, error) { return first.TAS, nil }, nil
	}
	x, y := make([]float64, levelNodes), make([]float64, levelNodes)
	for i := range x {
		x[i] = last + (f.now.Mass-last)*float64(i)/(levelNodes-1)
		level, err := find(x[i])
		if err != nil {
			return nil, err
		}
		y[i] = level.TAS
	}
	t, err := numeric.NewTable(x, y)
	if err != nil {
		return nil, err
	}
	return func(_, mass float64) (float64, error) { v, _ := t.At(mass); return v, nil }, nil
}

// belowStall says that a commanded speed cannot be flown.
func belowStall(tas, stall float64) error {
	return units.Errorf(nil, "its speed of {} is below the stall at {}", units.Of(units.Speed, tas), units.Of(units.Speed, stall))
}

// aboveNeverExceed says that a commanded speed must not be flown.
func aboveNeverExceed(tas, top float64) error {
	return units.Errorf(nil, "its speed of {} is above the never-exceed speed, here {}", units.Of(units.Speed, tas), units.Of(units.Speed, top))
}
