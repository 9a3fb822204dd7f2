package aircraft

import (
	"strings"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/loads"
)

// Structure is the structural limits of the aircraft, complete; ok is false where none are entered.
func (a *Aircraft) Structure(w *formula.Working) (d loads.Design, ok bool) {
	return a.limits.Design(loads.Airframe{Area: a.area, Span: a.span, CLMax: a.clMax[Clean], MaxTakeOff: a.maxTakeOff}, w)
}

// Convert keeps what the structural limits mean when a choice among them changes.
func (s *Spec) Convert(choice, from string) {
	if name, ok := strings.CutPrefix(choice, "limits."); ok {
		f := &s.Airframe
		s.Limits.Convert(name, from, loads.Airframe{Area: f.WingArea, Span: f.Span, MaxTakeOff: s.Weights.MaxTakeOff})
	}
}
