package study

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// A Structure is the envelope of manoeuvre and gust at the mass and the altitude of the
// view, flaps and gear up. It is computed apart from the study, for the page that shows it.
type Structure struct {
	Given       bool // structural limits are entered; without them everything else is empty
	Air         atmos.Air
	Design      loads.Design
	Diagram     *loads.Diagram // nil where Err says why
	Err         error
	Masses      []LoadCase
	Relief      float64 // 0.9 of the level maximum at sea level, which a rule lets VC come down to, in m/s; 0 where that is not below its least VC
	NeverExceed float64 // never-exceed speed as equivalent airspeed in m/s in the air of the view
	Cautions    []Warning
}

// A LoadCase is the envelope at one mass.
type LoadCase struct {
	Label   string
	Mass    float64        // in kg
	Diagram *loads.Diagram // nil where Err says why
	Err     error
}

// Shares of 14 CFR 23.335(a)(3) and 23.1505(a)(1)(i) (1996), as CS-VLA 335(a)(2) and 1505(a).
const (
	reliefShare = 0.9 // of the level maximum at sea level: VC need not be more
	neverShare  = 0.9 // of VD: the never-exceed speed is not more
)

// Structure computes the envelope of manoeuvre and gust.
func (s *Study) Structure() *Structure {
	t := s.structure()
	if !t.Given || t.Err != nil {
		return t
	}
	t.Relief = relief(s.Aircraft(), &t.Design)
	for _, m := range gathered(s.around(s.named())) {
		if m.mass > s.Masses.MaxTakeOff*(1+1e-9) && m.mass != s.View.Mass {
			continue // the limits do not hold there
		}
		c := LoadCase{Label: m.label, Mass: m.mass}
		c.Diagram, c.Err = t.Design.At(t.Air, m.mass, nil)
		t.Masses = append(t.Masses, c)
	}
	return t
}

// structure is Structure without the other masses.
func (s *Study) structure() *Structure {
	a, v := s.Aircraft(), s.View
	t := &Structure{}
	if t.Design, t.Given = a.Structure(nil); !t.Given {
		return t
	}
	t.cautionDesign(a)
	if t.Air, t.Err = (atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}).At(v.Altitude, nil); t.Err != nil {
		return t
	}
	t.NeverExceed = float64(t.Air.EAS(t.Air.FromCAS(atmos.CAS(a.NeverExceed()))))
	if t.Diagram, t.Err = t.Design.At(t.Air, v.Mass, nil); t.Err != nil {
		t.caution("no-load-envelope", Caution, "Less mass, more lift, or a higher VC.", units.Say("no manoeuvre and gust envelope: {}", units.Nest(units.Explain(t.Err))))
		return t
	}
	t.cautionDiagram()
	return t
}

// loadsAt is the envelope of manoeuvre and gust at a point.
func (s *Study) loadsAt(p *pointperf.Point, w *formula.Working) (*loads.Diagram, error) {
	d, ok := s.Aircraft().Structure(w)
	if !ok {
		return nil, units.Errorf(nil, "no structural limits are entered")
	}
	return d.At(p.Air, p.Mass, w)
}

// relief is 0.9 of the level maximum in m/s at sea level in standard air and the greatest
// take-off mass, where that is below the least VC of the rule, and else 0.
func relief(a *aircraft.Aircraft, d *loads.Design) float64 {
	air, err := atmos.Day{}.At(0, nil)
	if err != nil || d.Least.Cruise == 0 {
		return 0
	}
	fastest := pointperf.LevelMax(a, &pointperf.Point{Air: air, Mass: a.MaxTakeOff()})
	if fastest.Err != nil || fastest.Bound != "" || reliefShare*fastest.TAS >= d.Least.Cruise {
		return 0
	}
	return reliefShare * fastest.TAS
}

func (t *Structure) caution(code string, level Level, clear string, text units.Message) {
	t.Cautions = append(t.Cautions, Warning{code, level, "limits", text, clear})
}

// hundredth is a load factor with the digits that a sentence wants.
func hundredth(n float64) units.Arg {
	return units.Of(units.Coefficient, math.Round(n*100)/100)
}

// cautionDesign holds what is entered against the rule.
func (t *Structure) cautionDesign(a *aircraft.Aircraft) {
	d := &t.Design
	// At sea level calibrated and equivalent airspeed are the same, and there the limit is nearest to VD.
	if never := a.NeverExceed(); never > neverShare*d.Dive*(1+1e-9) {
		level := Caution
		if never > d.Dive {
			level = Stop
		}
		t.caution("never-exceed-too-fast", level, "A lower never-exceed speed, or a structure shown for a higher VD.",
			units.Say("the never-exceed speed, {}, is more than 0.9 of the design dive speed, {} of {} (14 CFR 23.1505, 1996)",
				units.Of(units.Speed, never), units.Of(units.Speed, neverShare*d.Dive), units.Of(units.Speed, d.Dive)))
	}
	l := &d.Least
	if l.Mass > 0 && a.MaxTakeOff() > l.Mass {
		t.caution("limits-outside-rule", Caution, "Choose the rule that covers the mass.",
			units.Say("{} covers aeroplanes up to {}; the greatest take-off mass is {}", units.Text(d.Rule), units.Of(units.Mass, l.Mass), units.Of(units.Mass, a.MaxTakeOff())))
	}
	if d.Positive < l.Positive-1e-9 || d.Negative > l.Negative+1e-9 {
		t.caution("limit-factor-low", Caution, "Stronger, or another rule.",
			units.Say("the limit load factors {} and {} are less than {} asks for, {} and {}", hundredth(d.Positive), hundredth(d.Negative), units.Text(d.Rule), hundredth(l.Positive), hundredth(l.Negative)))
	}
	if d.Cruise >= l.Cruise*(1-1e-9) && d.Dive >= l.Dive*(1-1e-9) {
		return
	}
	least := l.Cruise
	if lower := relief(a, d); lower > 0 {
		least = lower
	}
	if d.Cruise < least*(1-1e-9) {
		t.caution("design-cruise-slow", Caution, "A higher VC.",
			units.Say("the design cruising speed, {}, is less than {} asks for, {}", units.Of(units.Speed, d.Cruise), units.Text(d.Rule), units.Of(units.Speed, least)))
	}
	if d.Dive < d.LeastDive(least)*(1-1e-9) {
		t.caution("design-dive-slow", Caution, "A higher VD.",
			units.Say("the design dive speed, {}, is less than {} asks for, {}", units.Of(units.Speed, d.Dive), units.Text(d.Rule), units.Of(units.Speed, d.LeastDive(least))))
	}
}

// cautionDiagram looks at the envelope.
func (t *Structure) cautionDiagram() {
	d, g := &t.Design, t.Diagram
	if most := d.Airframe.MaxTakeOff; g.Mass > most*(1+1e-9) {
		t.caution("limits-overweight", Caution, "Less mass, or a structure shown for more.",
			units.Say("the limit load factors hold up to the greatest take-off mass, {}; at {} the same structure bears less, and the speeds shown are no leave to fly them", units.Of(units.Mass, most), units.Of(units.Mass, g.Mass)))
	}
	if g.Maneuver > d.Cruise*(1+1e-9) {
		t.caution("maneuver-above-cruise", Info, "Check the mass, the greatest lift coefficient and VC.",
			units.Say("the design manoeuvring speed, {}, lies above the design cruising speed, {}: up to there the wing stalls before it reaches the limit load factor", units.Of(units.Speed, g.Maneuver), units.Of(units.Speed, d.Cruise)))
	}
	up, down := g.Greatest, g.Smallest
	where := func(x loads.Extreme) units.Arg {
		return units.Nest(units.Say("{} at {}", hundredth(x.Load), units.Of(units.Speed, x.EAS)))
	}
	const clear = "A structure for what the gust asks, or a lower VC; less speed in rough air."
	mass := units.Of(units.Mass, g.Mass)
	switch {
	case up.Gust && down.Gust:
		t.caution("gust-above-limit", Caution, clear, units.Say("at {} the gusts of the envelope give load factors of {} and of {}, beyond the limits of {} and {} that were given", mass, where(up), where(down), hundredth(d.Positive), hundredth(d.Negative)))
	case up.Gust:
		t.caution("gust-above-limit", Caution, clear, units.Say("at {} an upward gust of the envelope gives a load factor of {}, beyond the limit of {} that was given", mass, where(up), hundredth(d.Positive)))
	case down.Gust:
		t.caution("gust-above-limit", Caution, clear, units.Say("at {} a downward gust of the envelope gives a load factor of {}, beyond the limit of {} that was given", mass, where(down), hundredth(d.Negative)))
	}
}

// TurnCaution is the caution that a turn of the envelope asks more than the positive limit load factor, nil where none does.
func (t *Structure) TurnCaution(e *Envelope) *Warning {
	if !t.Given {
		return nil
	}
	most := LoadAt{}
	for _, l := range e.Loads {
		if l.Sustained > most.Sustained {
			most = l
		}
	}
	if most.Sustained <= t.Design.Positive {
		return nil
	}
	return &Warning{"turn-above-limit", Caution, "limits", units.Say("full thrust sustains a load factor of {} at {}, beyond the limit of {} that was given",
		hundredth(most.Sustained), units.Of(units.Speed, most.TAS), hundredth(t.Design.Positive)), "Less bank: the thrust allows more than the structure."}
}

// warnStructure repeats the cautions in the list of all warnings.
func (s *Study) warnStructure() { s.Warnings = append(s.Warnings, s.structure().Cautions...) }
