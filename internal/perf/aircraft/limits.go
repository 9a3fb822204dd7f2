package aircraft

import (
	"legwright/internal/perf/formula"
	"legwright/internal/perf/loads"
)

// Structure is the structural limits of the aircraft, complete; ok is false where none are entered.
func (a *Aircraft) Structure(w *formula.Working) (d loads.Design, ok bool) {
	return a.limits.Design(loads.Airframe{Area: a.area, Span: a.span, CLMax: a.clMax[Clean], MaxTakeOff: a.maxTakeOff}, w)
}

// switchLimits keeps what the structural limits mean when the choice of that name among them changes.
func (s *Spec) switchLimits(choice, from string) []Derived {
	f, l, was := &s.Airframe, &s.Limits, s.Limits
	l.Convert(choice, from, loads.Airframe{Area: f.WingArea, Span: f.Span, MaxTakeOff: s.Weights.MaxTakeOff})
	mass := []string{"weights.max_take_off"}
	loading, wing := append(mass, "airframe.wing_area"), []string{"airframe.wing_area", "airframe.span"}
	var list []Derived
	for _, c := range []struct {
		name, note string
		before     float64
		after      float64
		from       []string
	}{
		{"positive", noteRule, was.Positive, l.Positive, mass}, {"negative", noteRule, was.Negative, l.Negative, mass}, {"negative_dive", noteRule, was.NegativeDive, l.NegativeDive, nil},
		{"cruise", noteRule, was.Cruise, l.Cruise, loading}, {"dive", noteRule, was.Dive, l.Dive, loading},
		{"gust_cruise", noteRule, was.GustCruise, l.GustCruise, nil}, {"gust_dive", noteRule, was.GustDive, l.GustDive, nil},
		{"chord", noteWing, was.Chord, l.Chord, wing}, {"slope", noteWing, was.Slope, l.Slope, wing},
	} {
		if c.before != c.after {
			list = append(list, Derived{Path: "limits." + c.name, From: c.from, Note: c.note})
		}
	}
	return list
}
