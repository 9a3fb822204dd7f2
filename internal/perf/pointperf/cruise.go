package pointperf

import (
	"cmp"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// Level is steady level flight at part setting.
type Level struct {
	TAS      float64 // true airspeed in m/s
	Required float64 // thrust required in N
	Setting  float64 // of the power lever, 0 to 1
	Output   powerplant.Output
}

// LevelAt matches the powerplant to level flight at the true airspeed tas in
// m/s, > 0. It fails with *powerplant.ThrustError when the thrust does not suffice.
func LevelAt(a *aircraft.Aircraft, p *Point, tas float64) (Level, error) {
	return LevelAtLoad(a, p, tas, 1)
}

// LevelAtLoad is LevelAt in a level turn of the load factor, dimensionless, >= 1: the lift is that many times the weight.
func LevelAtLoad(a *aircraft.Aircraft, p *Point, tas, load float64) (Level, error) {
	required := Drag(a, p, tas, load*p.Weight(), 1, nil)
	setting, out, err := a.Plant().Match(p.Condition(tas), required, nil)
	return Level{tas, required, setting, out}, err
}

// BestRange is the level flight that goes farthest over the ground for the
// energy drawn, against the head wind in m/s (negative: tail wind).
func BestRange(a *aircraft.Aircraft, p *Point, headWind float64) (Level, error) {
	best, err := bestLevel(a, p, func(l Level) float64 {
		if l.TAS <= headWind {
			return math.Inf(-1)
		}
		return (l.TAS - headWind) / l.Output.Drain()
	})
	if err != nil && headWind > 0 {
		if _, fast := levelBounds(a, p, Stall(a, p, nil), topSpeed(a, p)); fast.Err == nil && fast.TAS <= headWind {
			return Level{}, units.Errorf(err, "the head wind of {} leaves no way over the ground: the fastest level flight is {}",
				units.Of(units.Speed, headWind), units.Of(units.Speed, fast.TAS))
		}
	}
	return best, err
}

// BestEndurance is the level flight that draws least energy for the time.
func BestEndurance(a *aircraft.Aircraft, p *Point) (Level, error) {
	return bestLevel(a, p, func(l Level) float64 { return 1 / l.Output.Drain() })
}

func bestLevel(a *aircraft.Aircraft, p *Point, merit func(Level) float64) (Level, error) {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Level{}, stallAboveLimit(vs, top)
	}
	var last error
	m, err := numeric.GlobalMaximum(func(v float64) float64 {
		l, err := LevelAt(a, p, v)
		if err != nil {
			last = err
			return math.Inf(-1)
		}
		return merit(l)
	}, vs, top, speedCells, 1e-7)
	if err != nil {
		if _, fast := levelBounds(a, p, vs, top); fast.Err != nil {
			return Level{}, fast.Err
		}
		return Level{}, cmp.Or(last, err)
	}
	return LevelAt(a, p, m.X)
}

// AtFraction is the fastest level flight that makes the fraction of rated power
// or thrust, 0 to 1.
func AtFraction(a *aircraft.Aircraft, p *Point, fraction float64) (Level, error) {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Level{}, stallAboveLimit(vs, top)
	}
	_, fast := levelBounds(a, p, vs, top)
	if fast.Err != nil {
		return Level{}, fast.Err
	}
	made := func(v float64) float64 {
		l, err := LevelAt(a, p, v)
		if err != nil {
			return math.NaN()
		}
		return l.Output.Fraction - fraction
	}
	limit := fast.TAS * (1 - 1e-9)
	full := made(limit)
	if full < 0 {
		return Level{}, units.Errorf(nil, "level flight at full power makes only {} of the rating at {}, so {} cannot be set",
			units.Of(units.Fraction, full+fraction), units.Of(units.Altitude, p.Air.PressureAltitude), units.Of(units.Fraction, fraction))
	}
	r, err := numeric.LastRoot(made, vs, limit, speedCells, 1e-9)
	if err != nil {
		return Level{}, units.Errorf(err, "no speed flies level on {} of the rating at {}: the least that flies is more",
			units.Of(units.Fraction, fraction), units.Of(units.Altitude, p.Air.PressureAltitude))
	}
	return LevelAt(a, p, r.X)
}
