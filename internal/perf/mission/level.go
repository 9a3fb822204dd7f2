package mission

import (
	"errors"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
)

// shortOfSpeed is the share of the thrust by which a speed that is interpolated
// between masses may ask for more than there is: the error of the interpolation
// where the leg flies at the most that the powerplant gives.
const shortOfSpeed = 1e-4

// level balances level flight at the scheduled speed.
func (r *rider) level(m *moment) error {
	l, err := pointperf.LevelAtLoad(r.f.a, &m.point, m.tas, r.load)
	m.required, m.setting, m.out = l.Required, l.Setting, l.Output
	var short *powerplant.ThrustError
	if !errors.As(err, &short) || short.Want > short.Available*(1+shortOfSpeed) {
		return err
	}
	switch r.l.SpeedRule {
	case ByTAS, ByCAS, ByMach:
		return err
	}
	m.setting = 1
	m.out, err = r.f.a.Plant().Run(m.point.Condition(m.tas), 1, nil)
	return err
}
