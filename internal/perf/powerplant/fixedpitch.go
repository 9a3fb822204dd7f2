package powerplant

import (
	"errors"
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/propeller"
)

// fixedPitch is a piston engine turning a fixed-pitch propeller: the speed of
// rotation is the one at which the engine's power is what the propeller absorbs.
type fixedPitch struct {
	engine *engine
	prop   *propeller.Fixed
}

var _ Powerplant = (*fixedPitch)(nil)

// A SpeedError reports an airspeed at which even the greatest rotational speed leaves the propeller beyond its table.
type SpeedError struct {
	TAS   float64 // true airspeed in m/s
	Range *propeller.RangeError
}

func (e *SpeedError) Error() string { return e.Range.Error() }
func (e *SpeedError) Unwrap() error { return e.Range }

// floor is the least propeller speed in rev/s that keeps J inside the table at
// the true airspeed v in m/s. At rest it is a small fraction of the greatest speed.
func (p *fixedPitch) floor(v float64) float64 {
	_, high := p.prop.Range()
	return math.Max(v/(high*p.prop.Diameter), standstill*p.engine.top())
}

// standstill is the share of the greatest speed below which the propeller does not turn.
const standstill = 1e-3

// balanceCells is how finely the search for the torque balance scans the
// rotational speeds, from the top.
const balanceCells = 16

// Run finds the rotational speed by torque balance.
func (p *fixedPitch) Run(c Condition, setting float64, w *formula.Working) (Output, error) {
	e := p.engine
	rho, v := c.Air.Density, c.TAS
	low, top := p.floor(v), e.top()
	if err := p.inside(v, low, top); err != nil {
		if setting <= 0 {
			return p.idle(c, w)
		}
		return Output{}, err
	}
	phi := e.lapse(&c.Air, nil)
	surplus := func(n float64) float64 { return e.power(setting, phi, n, nil) - p.prop.Power(rho, v, n, nil) }
	if setting <= 0 {
		return p.idle(c, w)
	}
	var limits Limit
	n := top
	if surplus(top) > 0 {
		limits |= SpeedLimited
	} else {
		// The highest balance is the stable one: below the lowest, accessories eat all the power.
		r, err := numeric.LastRoot(surplus, low, top, balanceCells, 1e-12)
		// No power and none absorbed, at the end of the table, balance too: that is idling.
		if errors.Is(err, numeric.ErrNoBracket) || (err == nil && e.power(setting, phi, r.X, nil) <= 0) {
			return p.lowest(c, setting, w)
		}
		if err != nil {
			return Output{}, err
		}
		n = r.X
	}
	if w != nil {
		e.lapse(&c.Air, w)
		e.power(setting, phi, n, w)
		if limits&SpeedLimited != 0 {
			w.Note("At the greatest speed of rotation, %.1f rpm of the propeller, full throttle would give more than the propeller absorbs: the throttle is reduced to hold it.", n*60)
		} else {
			w.Note("Torque balance: at %.1f rpm of the propeller the power available equals the power absorbed.", n*60)
		}
	}
	return p.at(c, n, limits, w), nil
}

// inside reports a J that no allowed rotational speed brings into the table.
func (p *fixedPitch) inside(v, low, top float64) error {
	jLow, jHigh := p.prop.Range()
	if low > top {
		return &SpeedError{v, &propeller.RangeError{J: v / (top * p.prop.Diameter), Low: jLow, High: jHigh}}
	}
	if j := v / (top * p.prop.Diameter); j < jLow {
		return &SpeedError{v, &propeller.RangeError{J: j, Low: jLow, High: jHigh}}
	}
	return nil
}

// at is steady operation with the propeller at n rev/s.
func (p *fixedPitch) at(c Condition, n float64, limits Limit, w *formula.Working) Output {
	rho, v := c.Air.Density, c.TAS
	out := Output{Limits: limits, Thrust: p.prop.Thrust(rho, v, n, w)}
	absorbed := p.prop.Power(rho, v, n, w)
	if n*p.engine.spec.GearRatio < p.engine.lowest {
		out.Limits |= Extrapolated
	}
	p.engine.burn(&out, math.Max(0, absorbed), w)
	d := p.prop.Diameter
	out.Shaft = Shaft{Speed: n, EngineSpeed: n * p.engine.spec.GearRatio, Power: absorbed, AdvanceRatio: v / (n * d),
		Efficiency: propeller.Efficiency(out.Thrust, v, absorbed, w), TipMach: propeller.TipMach(v, n, d, c.Air.SoundSpeed, w)}
	return out
}

// lowest is the output when the setting gives no more power than the propeller
// absorbs at the end of its table.
func (p *fixedPitch) lowest(c Condition, setting float64, w *formula.Working) (Output, error) {
	if setting > 0 && c.TAS > 0 && !p.prop.Windmills() {
		jLow, jHigh := p.prop.Range()
		if end := p.prop.CT(jHigh); end > 1e-6 {
			return Output{}, &SpeedError{c.TAS, &propeller.RangeError{Low: jLow, High: jHigh, Beyond: true}}
		}
	}
	return p.idle(c, w)
}

// idle is the output with the throttle closed: no thrust, or the drag of the
// windmilling propeller where the table reaches negative thrust.
func (p *fixedPitch) idle(c Condition, w *formula.Working) (Output, error) {
	out := Output{Limits: Idling}
	_, high := p.prop.Range()
	// Slower than the slowest turning considered, the propeller stands still.
	if n := c.TAS / (high * p.prop.Diameter); n >= standstill*p.engine.top() && n <= p.engine.top() && p.prop.Windmills() {
		out = p.at(c, n, Idling, w)
	}
	out.FuelFlow = p.engine.spec.IdleFlow
	return out, nil
}

// Match inverts the thrust of the propeller: one root in rotational speed.
func (p *fixedPitch) Match(c Condition, want float64, w *formula.Working) (float64, Output, error) {
	e := p.engine
	rho, v := c.Air.Density, c.TAS
	low, top := p.floor(v), e.top()
	idle, err := p.idle(c, nil)
	if err != nil {
		return 0, Output{}, err
	}
	if want <= idle.Thrust {
		idle, err = p.idle(c, w)
		return 0, idle, err
	}
	if err := p.inside(v, low, top); err != nil {
		return 0, Output{}, err
	}
	if p.prop.Thrust(rho, v, low, nil) > want {
		_, err := p.lowest(c, 1, nil)
		return 0, idle, err
	}
	if p.prop.Thrust(rho, v, top, nil) < want {
		return 1, Output{}, p.short(c, want)
	}
	r, err := numeric.Root(func(n float64) float64 { return p.prop.Thrust(rho, v, n, nil) - want }, low, top, 1e-12)
	if err != nil {
		return 0, Output{}, err
	}
	phi := e.lapse(&c.Air, nil)
	absorbed := math.Max(0, p.prop.Power(rho, v, r.X, nil))
	full := e.seaLevel(r.X*e.spec.GearRatio) * phi * (1 - e.spec.InstallationLoss)
	setting := math.Inf(1)
	if full > 0 {
		setting = (absorbed + e.spec.AccessoryPower) / full
	}
	if setting > 1+1e-9 {
		return 1, Output{}, p.short(c, want)
	}
	if w != nil {
		w.Note("Thrust match: at %.1f rpm the propeller gives the thrust required.", r.X*60)
	}
	return math.Min(1, setting), p.at(c, r.X, 0, w), nil
}

func (p *fixedPitch) short(c Condition, want float64) error {
	full, err := p.Run(c, 1, nil)
	if err != nil {
		return err
	}
	return &ThrustError{Want: want, Available: full.Thrust, TAS: c.TAS}
}
