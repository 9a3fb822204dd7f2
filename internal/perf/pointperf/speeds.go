package pointperf

import (
	"cmp"
	"errors"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A Best is a speed of note and what is best there.
type Best struct {
	TAS   float64 // true airspeed in m/s
	Value float64 // in SI: N of thrust, W of power, m/s of climb, or rad of angle
	Bound string  // what held the speed back from its free optimum, "" when nothing did
	Err   error   // why there is no such speed; then the numbers are zero
}

// Speeds are the speeds of note at one point.
type Speeds struct {
	Stall       Best // Value unused
	LeastThrust Best // Value: thrust required in N; best lift-to-drag ratio
	LeastPower  Best // Value: power required in W
	Carson      Best // Value: thrust required in N
	BestAngle   Best // Value: climb angle in rad
	BestRate    Best // Value: rate of climb in m/s
	LevelMax    Best // Value: thrust in N
	LevelMin    Best // Value: thrust in N; the stall where thrust suffices there
}

// Bounds that hold a speed back.
const (
	AtStall       = "held at the stall"
	AtNeverExceed = "held at the never-exceed speed"
)

var stallSpeed = formula.Must(formula.Formula{
	ID: "stall.speed", Out: formula.Sym("VS", "stall speed", units.Speed),
	In: []formula.Symbol{formula.Sym("W", "weight", units.Force), formula.Sym("rho", "air density", units.Density),
		formula.Sym("S", "wing area", units.Area), formula.Sym("CLmax", "maximum lift coefficient", units.Coefficient)},
	Expr: "sqrt(2*W/(rho*S*CLmax))", Source: formula.Anderson, Where: "section 5.9",
})

// Stall is the true airspeed of the stall in m/s at load factor 1.
func Stall(a *aircraft.Aircraft, p *Point, w *formula.Working) float64 {
	weight := w.Step(weightForce, p.Weight(), p.Mass, atmos.Gravity)
	s, cl := a.WingArea(), a.CLMax(p.Config)
	return w.Step(stallSpeed, math.Sqrt(2*weight/(p.Air.Density*s*cl)), weight, p.Air.Density, s, cl)
}

// topSpeed is the true airspeed in m/s of the never-exceed speed.
func topSpeed(a *aircraft.Aircraft, p *Point) float64 {
	return p.Air.FromCAS(atmos.CAS(a.NeverExceed()))
}

// ErrNoThrust says that no speed gives thrust enough for level flight.
var ErrNoThrust = errors.New("no level flight")

// A DeficitError reports that thrust available stays below thrust required at every speed.
type DeficitError struct {
	Altitude float64 // pressure altitude in m
	Mass     float64 // in kg
	InHand   float64 // greatest thrust in hand in N, negative
	TAS      float64 // where it is, in m/s
}

func (e *DeficitError) Error() string { return e.Message().In(units.Metric) }

// Message says by how much level flight is missed.
func (e *DeficitError) Message() units.Message {
	return units.Say("no level flight at {} and {}: thrust in hand is {} at its best speed, {}",
		units.Of(units.Altitude, e.Altitude), units.Of(units.Mass, e.Mass), units.Of(units.Force, e.InHand), units.Of(units.Speed, e.TAS))
}

func (e *DeficitError) Unwrap() error { return ErrNoThrust }

// AllSpeeds finds every speed of note.
func AllSpeeds(a *aircraft.Aircraft, p *Point) Speeds {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		err := stallAboveLimit(vs, top)
		none := Best{Err: err}
		return Speeds{Stall: Best{TAS: vs}, LeastThrust: none, LeastPower: none, Carson: none, BestAngle: none, BestRate: none, LevelMax: none, LevelMin: none}
	}
	s := Speeds{Stall: Best{TAS: vs}}
	s.LeastThrust = least(vs, top, func(v float64) float64 { return ThrustRequired(a, p, v, nil) })
	s.LeastPower = least(vs, top, func(v float64) float64 { return ThrustRequired(a, p, v, nil) * v })
	s.Carson = carson(a, p, s.LeastThrust.TAS, vs, top)
	s.LevelMin, s.LevelMax = levelBounds(a, p, vs, top)
	s.BestRate = BestRate(a, p)
	s.BestAngle = BestAngle(a, p)
	return s
}

func stallAboveLimit(vs, top float64) error {
	return units.Errorf(nil, "the stall, {}, lies above the never-exceed speed, {}", units.Of(units.Speed, vs), units.Of(units.Speed, top))
}

// least minimises f over [lo, hi] and says where a bound held it.
func least(lo, hi float64, f func(v float64) float64) Best {
	m, err := numeric.GlobalMaximum(func(v float64) float64 { return -f(v) }, lo, hi, 12, 1e-9)
	if err != nil {
		return Best{Err: err}
	}
	return Best{TAS: m.X, Value: -m.F, Bound: boundAt(m.X, lo, hi)}
}

func boundAt(v, lo, hi float64) string {
	switch {
	case v-lo < 1e-6*(hi-lo):
		return AtStall
	case hi-v < 1e-6*(hi-lo):
		return AtNeverExceed
	}
	return ""
}

// carson is 3^(1/4) times the speed of least thrust: the least fuel per speed
// gained. B. H. Carson, Fuel Efficiency of Small Aircraft, Journal of Aircraft 19(6), 1982.
func carson(a *aircraft.Aircraft, p *Point, leastThrust, vs, top float64) Best {
	v := math.Pow(3, 0.25) * leastThrust
	b := Best{TAS: v}
	if v < vs {
		b.TAS, b.Bound = vs, AtStall
	}
	if v > top {
		b.TAS, b.Bound = top, AtNeverExceed
	}
	b.Value = ThrustRequired(a, p, b.TAS, nil)
	return b
}

// hand is the thrust in hand in N; where the powerplant has no answer it is
// the thrust required with a minus sign, as if it gave none.
func hand(a *aircraft.Aircraft, p *Point, v float64) float64 {
	required := ThrustRequired(a, p, v, nil)
	out, err := ThrustAvailable(a, p, v, nil)
	if err != nil {
		return -required
	}
	return out.Thrust - required
}

const speedCells = 24

// levelBounds finds the slowest and fastest level flight.
func levelBounds(a *aircraft.Aircraft, p *Point, vs, top float64) (slow, fast Best) {
	in := func(v float64) float64 { return hand(a, p, v) }
	best, err := numeric.GlobalMaximum(in, vs, top, speedCells, 1e-6)
	if err != nil {
		return Best{Err: err}, Best{Err: err}
	}
	if best.F < 0 {
		e := &DeficitError{p.Air.PressureAltitude, p.Mass, best.F, best.X}
		return Best{Err: e}, Best{Err: e}
	}
	slow = Best{TAS: vs, Bound: AtStall}
	if in(vs) < 0 {
		slow = crossing(in, vs, best.X)
	}
	fast = Best{TAS: top, Bound: AtNeverExceed}
	if in(top) < 0 {
		fast = crossing(in, best.X, top)
	}
	for _, b := range []*Best{&slow, &fast} {
		if b.Err != nil {
			continue
		}
		if _, err := ThrustAvailable(a, p, b.TAS*(1-1e-9), nil); err != nil {
			*b = Best{Err: err}
			continue
		}
		b.Value = ThrustRequired(a, p, b.TAS, nil)
		// A jump instead of a crossing is the end of the powerplant's data.
		if math.Abs(in(b.TAS)) > 1e-3*b.Value && b.Bound == "" {
			_, err := ThrustAvailable(a, p, b.TAS*(1+1e-6), nil)
			*b = Best{Err: units.Errorf(err, "level flight reaches the end of the powerplant's data at {}", units.Of(units.Speed, b.TAS))}
		}
	}
	return slow, fast
}

// LevelMax is the speed of the fastest level flight and the thrust there.
func LevelMax(a *aircraft.Aircraft, p *Point) Best {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Best{Err: stallAboveLimit(vs, top)}
	}
	_, fast := levelBounds(a, p, vs, top)
	return fast
}

func crossing(f func(float64) float64, a, b float64) Best {
	r, err := numeric.Root(f, a, b, 1e-11)
	if err != nil {
		return Best{Err: err}
	}
	return Best{TAS: r.X}
}

// BestRate is the speed of the best rate of climb at full setting, unaccelerated.
// The rate may be negative; it is an error only when the powerplant has no answer at any speed.
func BestRate(a *aircraft.Aircraft, p *Point) Best {
	return bestClimb(a, p, func(c Climb) float64 { return c.Rate })
}

// BestAngle is the speed of the steepest climb at full setting, unaccelerated.
func BestAngle(a *aircraft.Aircraft, p *Point) Best {
	return bestClimb(a, p, func(c Climb) float64 { return c.Angle })
}

func bestClimb(a *aircraft.Aircraft, p *Point, of func(Climb) float64) Best {
	vs, top := Stall(a, p, nil), topSpeed(a, p)
	if top <= vs {
		return Best{Err: stallAboveLimit(vs, top)}
	}
	var last error
	m, err := numeric.GlobalMaximum(func(v float64) float64 {
		c, err := FullClimb(a, p, v, nil)
		if err != nil {
			last = err
			return math.Inf(-1)
		}
		return of(c)
	}, vs, top, 12, 1e-7)
	if err != nil {
		return Best{Err: cmp.Or(last, err)}
	}
	return Best{TAS: m.X, Value: m.F, Bound: boundAt(m.X, vs, top)}
}
