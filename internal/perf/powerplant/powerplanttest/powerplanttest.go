// Package powerplanttest is the contract of powerplant.Powerplant as checks
// that run. Every kind must pass it; its tests show what it refuses.
package powerplanttest

import (
	"errors"
	"fmt"
	"math"
	"sync"

	"legwright/internal/perf/powerplant"
)

const (
	// settings is how many steps of the power lever are run at each condition.
	settings = 20
	// slack is the share of the greatest thrust at the condition by which
	// thrust may fall from step to step: the tolerance of the torque balance.
	slack = 1e-9
	// matching is the share of the greatest thrust by which Match may miss:
	// two converged iterations, one each way.
	matching = 1e-7
	// callers run the powerplant at the same time.
	callers = 4
)

// Test returns an error for each way in which p breaks the contract at the
// conditions, which must be ones that p's model covers and have at least one
// at rest. The lower heating value of its fuel is heat in J/kg, 0 when it burns none.
func Test(p powerplant.Powerplant, conditions []powerplant.Condition, heat float64) error {
	s := suite{p: p, heat: heat}
	static := false
	for _, c := range conditions {
		static = static || c.TAS == 0
		s.lever(c)
	}
	if !static {
		s.fail("no condition at rest was given")
	}
	s.together(conditions)
	return errors.Join(s.errs...)
}

type suite struct {
	p    powerplant.Powerplant
	heat float64 // in J/kg
	errs []error
}

func (s *suite) fail(format string, a ...any) { s.errs = append(s.errs, fmt.Errorf(format, a...)) }

func place(c powerplant.Condition, setting float64) string {
	return fmt.Sprintf("at %.0f m, %.1f K, %.3g m/s, setting %.3g", c.Air.PressureAltitude, c.Air.Temperature, c.TAS, setting)
}

// lever moves the power lever from idle to full and back through Match.
func (s *suite) lever(c powerplant.Condition) {
	var outs [settings + 1]powerplant.Output
	greatest := 0.0
	for i := range outs {
		setting := float64(i) / settings
		out, err := s.p.Run(c, setting, nil)
		if err != nil {
			s.fail("%s: no answer: %w", place(c, setting), err)
			return
		}
		s.sane(c, setting, out)
		outs[i], greatest = out, math.Max(greatest, math.Abs(out.Thrust))
	}
	for i, out := range outs {
		setting := float64(i) / settings
		if i > 0 && out.Thrust < outs[i-1].Thrust-slack*greatest {
			s.fail("%s: thrust falls from %g to %g N as the setting rises", place(c, setting), outs[i-1].Thrust, out.Thrust)
		}
		s.match(c, setting, out, greatest)
	}
	s.ends(c, outs[0], outs[settings])
}

// sane checks one output on its own.
func (s *suite) sane(c powerplant.Condition, setting float64, out powerplant.Output) {
	sh := out.Shaft
	for _, v := range []struct {
		name     string
		value    float64
		negative bool
	}{
		{"thrust", out.Thrust, true}, {"fuel flow", out.FuelFlow, false}, {"electrical power", out.BusPower, false}, {"fraction of the rating", out.Fraction, false},
		{"shaft power", sh.Power, true}, {"propeller speed", sh.Speed, false}, {"engine speed", sh.EngineSpeed, false}, {"propeller efficiency", sh.Efficiency, true},
		{"advance ratio", sh.AdvanceRatio, false}, {"tip Mach number", sh.TipMach, false},
	} {
		switch {
		case math.IsNaN(v.value) || math.IsInf(v.value, 0):
			s.fail("%s: %s is %g", place(c, setting), v.name, v.value)
		case v.value < 0 && !v.negative:
			s.fail("%s: negative %s %g", place(c, setting), v.name, v.value)
		}
	}
	if drawn := out.FuelFlow*s.heat + out.BusPower; out.Thrust*c.TAS > drawn {
		s.fail("%s: %g W of thrust power from %g W of stored energy", place(c, setting), out.Thrust*c.TAS, drawn)
	}
}

// match checks that Match finds a setting that gives the thrust of out, and says so.
func (s *suite) match(c powerplant.Condition, setting float64, out powerplant.Output, greatest float64) {
	found, matched, err := s.p.Match(c, out.Thrust, nil)
	if err != nil {
		s.fail("%s: Match does not find its thrust of %g N: %w", place(c, setting), out.Thrust, err)
		return
	}
	if !(found >= 0 && found <= 1) {
		s.fail("%s: Match gives the setting %g", place(c, setting), found)
		return
	}
	again, err := s.p.Run(c, found, nil)
	if err != nil {
		s.fail("%s: Match gives the setting %g, which does not run: %w", place(c, setting), found, err)
		return
	}
	if tol := matching * greatest; !(math.Abs(again.Thrust-out.Thrust) <= tol) || !(math.Abs(matched.Thrust-out.Thrust) <= tol) {
		s.fail("%s: Match for %g N gives setting %g with %g N, which runs at %g N", place(c, setting), out.Thrust, found, matched.Thrust, again.Thrust)
	}
	for name, pair := range map[string][2]float64{"fuel flow": {matched.FuelFlow, again.FuelFlow}, "electrical power": {matched.BusPower, again.BusPower}} {
		if math.Abs(pair[0]-pair[1]) > 1e-5*math.Max(pair[0], pair[1]) {
			s.fail("%s: Match gives a %s of %g, Run at its setting %g", place(c, setting), name, pair[0], pair[1])
		}
	}
}

// ends checks Match beyond what the powerplant can do.
func (s *suite) ends(c powerplant.Condition, idle, full powerplant.Output) {
	above := full.Thrust + 0.01*math.Abs(full.Thrust) + 1
	var short *powerplant.ThrustError
	if _, out, err := s.p.Match(c, above, nil); !errors.As(err, &short) {
		s.fail("%s: Match for %g N, more than full thrust, gives %g N and %v", place(c, 1), above, out.Thrust, err)
	} else if math.Abs(short.Available-full.Thrust) > matching*math.Abs(full.Thrust) {
		s.fail("%s: Match says that %g N are available, Run gives %g", place(c, 1), short.Available, full.Thrust)
	}
	below := idle.Thrust - 1
	setting, out, err := s.p.Match(c, below, nil)
	if err != nil || setting != 0 || out.Limits&powerplant.Idling == 0 || out.Thrust != idle.Thrust {
		s.fail("%s: Match for %g N, less than idle gives, is not idle: setting %g, %g N, %v", place(c, 0), below, setting, out.Thrust, err)
	}
}

// answer is what one call of Run said.
type answer struct {
	out powerplant.Output
	err string
}

func (s *suite) ask(conditions []powerplant.Condition) []answer {
	var list []answer
	for _, c := range conditions {
		for i := range settings + 1 {
			out, err := s.p.Run(c, float64(i)/settings, nil)
			list = append(list, answer{out, fmt.Sprint(err)})
		}
	}
	return list
}

// together asks the same from several callers at once: the answers must be the same bits.
func (s *suite) together(conditions []powerplant.Condition) {
	alone := s.ask(conditions)
	answers := make([][]answer, callers)
	var wait sync.WaitGroup
	for i := range answers {
		wait.Go(func() { answers[i] = s.ask(conditions) })
	}
	wait.Wait()
	for _, list := range answers {
		for i, a := range list {
			if a != alone[i] && !(math.IsNaN(a.out.Thrust) && math.IsNaN(alone[i].out.Thrust)) {
				c := conditions[i/(settings+1)]
				s.fail("%s: concurrent calls give %+v, alone %+v", place(c, float64(i%(settings+1))/settings), a, alone[i])
				return
			}
		}
	}
}
