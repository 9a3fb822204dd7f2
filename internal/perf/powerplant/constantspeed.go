package powerplant

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/propeller"
)

// constantSpeed is a piston engine turning a constant-speed propeller held at
// one speed by its governor; the propeller is a loaded disc.
type constantSpeed struct {
	engine *engine
	disc   propeller.Disc
	speed  float64 // governed propeller speed in rev/s
}

var _ Powerplant = (*constantSpeed)(nil)

// Run gives the thrust of the installed power at the governed speed.
func (p *constantSpeed) Run(c Condition, setting float64, w *formula.Working) (Output, error) {
	phi := p.engine.lapse(&c.Air, w)
	power := p.engine.power(setting, phi, p.speed, w)
	if power <= 0 {
		return p.idle(), nil
	}
	return p.at(c, power, p.disc.Thrust(c.Air.Density, c.TAS, power, w), w), nil
}

// idle is a closed throttle: no thrust is assumed, which is neither drag nor help.
func (p *constantSpeed) idle() Output {
	return Output{Limits: Idling, FuelFlow: p.engine.spec.IdleFlow}
}

func (p *constantSpeed) at(c Condition, power, thrust float64, w *formula.Working) Output {
	out := Output{Thrust: thrust}
	p.engine.burn(&out, power, w)
	if p.speed*p.engine.spec.GearRatio < p.engine.lowest {
		out.Limits |= Extrapolated
	}
	d := p.disc.Diameter
	out.Shaft = Shaft{Speed: p.speed, EngineSpeed: p.speed * p.engine.spec.GearRatio, Power: power, AdvanceRatio: c.TAS / (p.speed * d),
		Efficiency: propeller.Efficiency(thrust, c.TAS, power, w), TipMach: propeller.TipMach(c.TAS, p.speed, d, c.Air.SoundSpeed, w)}
	return out
}

// Match inverts the momentum relation in closed form.
func (p *constantSpeed) Match(c Condition, want float64, w *formula.Working) (float64, Output, error) {
	if want <= 0 {
		return 0, p.idle(), nil
	}
	e := p.engine
	power := p.disc.Power(c.Air.Density, c.TAS, want, w)
	full := e.seaLevel(p.speed*e.spec.GearRatio) * e.lapse(&c.Air, nil) * (1 - e.spec.InstallationLoss)
	setting := math.Inf(1)
	if full > 0 {
		setting = (power + e.spec.AccessoryPower) / full
	}
	if setting > 1+1e-9 {
		top, err := p.Run(c, 1, nil)
		if err != nil {
			return 1, Output{}, err
		}
		return 1, Output{}, &ThrustError{Want: want, Available: top.Thrust, TAS: c.TAS}
	}
	return math.Min(1, setting), p.at(c, power, want, w), nil
}
