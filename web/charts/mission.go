package charts

import (
	"fmt"
	"math"
	"slices"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// MissionChart draws the mission on one time axis: pressure altitude, thrust required
// and available, and what is left of the fuel or, where no fuel is burnt, of the
// charge. The tightest point is flagged, and where a mission fails its end.
//
// The time axis ends with what was flown, rounded up a little, and shows at least ten
// minutes; the y axes have coarsely rounded ends.
func MissionChart(s *study.Study, sys units.System) Chart {
	t := newTrace(&s.Flight)
	_, most := t.thrustReach()
	force := measureOf(sys, units.Force, most)
	c := Chart{
		ID: "mission", Title: missionTitle(s, sys, force), Desc: missionWords(s, sys, force),
		X: Axis{Label: "time", Format: "hm", Min: 0, Max: t.end()}, Spans: legSpans(&s.Flight), Width: 820, Height: 470,
	}
	c.Panels = []Panel{t.profile(s, sys), t.thrust(s, sys, force), t.store(s, sys)}
	return c
}

// trace is what was flown, sample by sample.
type trace struct {
	samples []mission.Sample
	time    []float64 // of the samples in s
}

// newTrace closes the gaps that legs without samples leave in time (a landing):
// altitude and stores are known at their ends, thrust and speed are not.
func newTrace(f *mission.Flight) *trace {
	t := &trace{}
	next := 0
	for i := range f.Legs {
		leg := &f.Legs[i]
		from := next
		for next < len(f.Trace) && f.Trace[next].Leg <= i {
			next++
		}
		switch {
		case next > from:
			t.samples = append(t.samples, f.Trace[from:next]...)
		case leg.Time > 0:
			t.samples = append(t.samples, blank(leg.Start), blank(leg.End))
		}
	}
	if len(t.samples) == 0 && f.Failure != nil {
		t.samples = append(t.samples, blank(f.Failure.At))
	}
	for i := range t.samples {
		t.time = append(t.time, t.samples[i].Time)
	}
	return t
}

// blank is the sample without what is not known on a strip.
func blank(s mission.Sample) mission.Sample {
	nan := math.NaN()
	s.TAS, s.Available, s.Required, s.Setting = nan, nan, nan, nan
	s.Output.Shaft.EngineSpeed = 0
	return s
}

func (t *trace) values(of func(*mission.Sample) float64) []float64 {
	v := make([]float64, len(t.samples))
	for i := range t.samples {
		v[i] = of(&t.samples[i])
	}
	return v
}

// end is the end of the time axis in s.
func (t *trace) end() float64 {
	const least = 600.0
	end := least
	for _, v := range t.time {
		end = max(end, v)
	}
	step := tickStep(end/100, "hm")
	return math.Ceil(end/step-1e-9) * step
}

// reach is the extent of values in SI, with 0.
func reach(lists ...[]float64) (lo, hi float64) {
	for _, list := range lists {
		for _, v := range list {
			if usable(v) {
				lo, hi = min(lo, v), max(hi, v)
			}
		}
	}
	return lo, hi
}

func (t *trace) profile(s *study.Study, sys units.System) Panel {
	m := measureOf(sys, units.Altitude, 0)
	y := t.values(func(p *mission.Sample) float64 { return p.Altitude })
	lo, hi := reach(y)
	p := Panel{
		Y:      Axis{Label: "pressure altitude", Unit: m.unit.Symbol, Min: coverBelow(m.of(lo)), Max: cover(1.05 * m.of(hi))},
		Height: 0.9,
		Series: []Series{m.series("pressure altitude", t.time, y, "altitude")},
	}
	if at := s.Flight.Tightest; at != nil {
		p.Flags = append(p.Flags, Flag{X: at.Time, Y: m.of(at.Altitude), Class: "available"})
	}
	if f := s.Flight.Failure; f != nil {
		p.Flags = append(p.Flags, Flag{X: f.At.Time, Y: m.of(f.At.Altitude), Label: "ends here", Class: "required"})
	}
	return p
}

// thrustReach is the extent of the thrusts in N. What is asked of a leg beyond its
// means may be many times what there is and leaves the panel.
func (t *trace) thrustReach() (lo, hi float64) {
	_, most := reach(t.values(func(p *mission.Sample) float64 { return p.Available }))
	lo, hi = reach(t.values(func(p *mission.Sample) float64 { return p.Required }))
	if most > 0 {
		return max(lo, -most), max(most, min(hi, 2*most))
	}
	return lo, hi
}

func (t *trace) thrust(s *study.Study, sys units.System, m measure) Panel {
	available := t.values(func(p *mission.Sample) float64 { return p.Available })
	required := t.values(func(p *mission.Sample) float64 { return p.Required })
	hand := t.values(func(p *mission.Sample) float64 { return p.Available - p.Required })
	ratio := t.values((*mission.Sample).Ratio)
	lo, hi := t.thrustReach()
	share := measureOf(sys, units.Fraction, 0)
	a := m.series("thrust available", t.time, available, "available")
	r := m.series("thrust required", t.time, required, "required")
	a.Label, a.LabelAt = "available", 0.4
	r.Label, r.LabelAt = "required", 0.4
	p := Panel{
		Y:      Axis{Label: "thrust", Unit: m.unit.Symbol, Min: coverBelow(m.of(lo)), Max: cover(1.05 * m.of(hi))},
		Height: 1.3, Blank: "no thrust to show: no leg was flown",
		Series: []Series{a, r, m.series("thrust in hand", t.time, hand, "none"), share.series("thrust in hand", t.time, ratio, "none")},
		Bands: []Band{
			{X: t.time, Lower: r.Y, Upper: a.Y, Class: "hand"},
			{X: t.time, Lower: a.Y, Upper: r.Y, Class: "short", Label: "short"},
		},
	}
	if at := s.Flight.Tightest; at != nil {
		p.Flags = []Flag{{X: at.Time, Y: m.of(at.Available), Label: "tightest: " + handWords(at, m), Class: "available"}}
	}
	return p
}

// handWords says the thrust in hand of a sample: "92 N in hand, 16 %".
func handWords(at *mission.Sample, m measure) string {
	hand, what := at.Available-at.Required, "in hand"
	if hand < 0 {
		hand, what = -hand, "short"
	}
	return fmt.Sprintf("%s %s, %s\u00a0%%", m.prose(hand), what, readNumber(100*math.Abs(at.Ratio()), 0))
}

// store is the panel of what falls: fuel, or charge where no fuel is burnt. It
// also carries the values that are only read out.
func (t *trace) store(s *study.Study, sys units.System) Panel {
	fuel := t.values(func(p *mission.Sample) float64 { return p.Fuel })
	charge := t.values(func(p *mission.Sample) float64 { return p.Charge })
	_, full := reach(fuel)
	_, loaded := reach(charge)
	kilos, joules := measureOf(sys, units.Mass, full), measureOf(sys, units.Energy, loaded)
	m, name, y := kilos, "fuel left", fuel
	if full == 0 && loaded > 0 {
		m, name, y, full = joules, "charge left", charge, loaded
	}
	p := Panel{
		Y:      Axis{Label: name, Unit: m.unit.Symbol, Min: 0, Max: cover(1.02 * m.of(full))},
		Height: 0.8,
		Series: []Series{m.series(name, t.time, y, "energy")},
	}
	if name == "fuel left" && loaded > 0 {
		p.Series = append(p.Series, joules.series("charge left", t.time, charge, "none"))
	}
	read := func(name string, q units.Quantity, of func(*mission.Sample) float64) {
		y := t.values(of)
		if slices.ContainsFunc(y, usable) {
			p.Series = append(p.Series, measureOf(sys, q, 0).series(name, t.time, y, "none"))
		}
	}
	read("true airspeed", units.Speed, func(p *mission.Sample) float64 { return p.TAS })
	read("mass", units.Mass, func(p *mission.Sample) float64 { return p.Mass })
	read("power lever", units.Fraction, func(p *mission.Sample) float64 { return p.Setting })
	read("engine speed", units.Rotation, func(p *mission.Sample) float64 {
		if p.Output.Shaft.EngineSpeed == 0 {
			return math.NaN()
		}
		return p.Output.Shaft.EngineSpeed
	})
	if r := s.Flight.Reserve; s.Flight.Flown() && r.Asked && !r.Met && len(y) > 0 {
		last := len(y) - 1
		label := "reserve ends here"
		if r.Flown >= r.Wanted {
			label = "reserve not met"
		}
		p.Flags = []Flag{{X: t.time[last], Y: m.of(y[last]), Label: label, Class: "required"}}
	}
	return p
}

// shortKinds name a leg where its own name does not fit.
var shortKinds = map[string]string{
	mission.Taxi: "taxi", mission.TakeOff: "t/o", mission.Climb: "climb", mission.Cruise: "cruise",
	mission.Loiter: "loiter", mission.Descent: "desc.", mission.Landing: "land", mission.Reserve: "res.",
	mission.Dash: "dash", mission.Turns: "turns", mission.Drop: "drop", mission.PickUp: "p/up", mission.Alternate: "alt.", mission.Contingency: "cont.",
}

// legSpans are the legs that took time.
func legSpans(f *mission.Flight) []Span {
	var spans []Span
	for i := range f.Legs {
		l := &f.Legs[i]
		if l.Time > 0 {
			spans = append(spans, Span{From: l.Start.Time, To: l.End.Time, Label: l.Leg.Title(), Short: shortKinds[l.Leg.Kind]})
		}
	}
	return spans
}

// hours says a time in s in words for a sentence.
func hours(seconds float64) string {
	m := int64(math.Round(seconds / 60))
	if m < 60 {
		return fmt.Sprintf("%d\u00a0min", m)
	}
	return fmt.Sprintf("%d\u00a0h %d\u00a0min", m/60, m%60)
}

func missionTitle(s *study.Study, sys units.System, force measure) string {
	f := &s.Flight
	head := fmt.Sprintf("Mission, %s, %s at the start", dayWords(sys, s.Project.Plan.Day.Deviation), massWords(sys, s.Masses.Start))
	switch {
	case f.Failure != nil:
		return fmt.Sprintf("%s: it ends in “%s” after %s.", head, f.Failure.Name, hours(f.Failure.At.Time))
	case f.Tightest == nil:
		return head + ": no leg is flown."
	}
	return fmt.Sprintf("%s: flown, with %s at its tightest.", head, handWords(f.Tightest, force))
}

func missionWords(s *study.Study, sys units.System, force measure) string {
	f := &s.Flight
	text := fmt.Sprintf("In %s without reserve the mission covers %s", hours(f.Time), sys.Format(units.Distance, f.Distance))
	if f.Fuel > 0 {
		text += fmt.Sprintf(" and burns %s of fuel", massWords(sys, f.Fuel))
	}
	if f.Energy > 0 {
		text += fmt.Sprintf(" and draws %s", sys.Format(units.Energy, f.Energy))
	}
	text += "."
	if fail := f.Failure; fail != nil {
		text += fmt.Sprintf(" It ends in “%s”: %s.", fail.Name, fail.Reason.In(sys))
	}
	if at := f.Tightest; at != nil {
		text += fmt.Sprintf(" It is tightest in “%s” after %s, at %s and %s: %s.", f.Legs[at.Leg].Leg.Title(), hours(at.Time),
			sys.Format(units.Altitude, at.Altitude), massWords(sys, at.Mass), handWords(at, force))
	}
	switch r := f.Reserve; {
	case !r.Asked:
		text += " It keeps no reserve."
	case !r.Met:
		text += fmt.Sprintf(" The reserve is not met: %s.", r.Reason.In(sys))
	case r.Has(mission.Reserve):
		text += fmt.Sprintf(" The reserve is flown in full, %s.", hours(r.Flown))
	default:
		text += " It has no reserve leg."
	}
	if r := f.Reserve; r.Kept > 0 {
		text += fmt.Sprintf(" Contingencies ask for %s to be left.", massWords(sys, r.Kept))
	}
	return text
}
