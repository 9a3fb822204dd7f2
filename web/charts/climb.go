package charts

import (
	"fmt"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// ClimbChart draws the best rate of climb at start mass on the project's day across
// pressure altitude, up to the absolute ceiling. The rate and the altitude axis run
// from 0 to coarsely rounded ends, so that they hold still while inputs are edited.
func ClimbChart(s *study.Study, sys units.System) Chart {
	const least = 0.5 // shown of the rate axis in m/s, so that a poor climb looks poor
	top, best := s.Absolute.Value, 0.0
	for _, r := range s.Rates {
		best = max(best, r.Rate)
	}
	strip := s.Project.Departure.Air.PressureAltitude
	rate, height := measureOf(sys, units.ClimbRate, best), measureOf(sys, units.Altitude, 0)
	p := Panel{
		Y:     Axis{Label: "pressure altitude", Unit: height.unit.Symbol, Min: coverBelow(height.of(strip)), Max: cover(1.03 * height.of(max(top, strip)))},
		Lines: []HLine{{height.of(strip), "strip " + height.label(strip)}},
	}
	switch {
	case s.Absolute.Err != nil:
		p.Blank = reason(sys, s.Absolute.Err)
	case len(s.Rates) == 0:
		p.Blank = "no altitude has a best rate of climb"
	default:
		fillClimb(&p, s, sys, rate, height)
	}
	return Chart{
		ID: "climb", Title: climbTitle(s, sys), Desc: climbWords(s, sys),
		X:      Axis{Label: "best rate of climb", Unit: rate.unit.Symbol, Min: 0, Max: cover(1.04 * rate.of(max(best, least)))},
		Panels: []Panel{p},
	}
}

func fillClimb(p *Panel, s *study.Study, sys units.System, rate, height measure) {
	var x, y, tas []float64
	for _, r := range s.Rates {
		x, y, tas = append(x, rate.of(r.Rate)), append(y, r.Altitude), append(tas, r.TAS)
	}
	p.Series = []Series{
		height.series("pressure altitude", x, y, "rate"),
		measureOf(sys, units.Speed, 0).series("flown at (true)", x, tas, "none"),
	}
	if s.Service.Err == nil {
		p.Lines = append(p.Lines, HLine{height.of(s.Service.Value), "service ceiling " + height.label(s.Service.Value)})
	}
	p.Lines = append(p.Lines, HLine{height.of(s.Absolute.Value), "absolute ceiling " + height.label(s.Absolute.Value)})
	if f := s.Figure("climb_rate"); f != nil && f.Has() && f.Value > 0 {
		at := s.Project.Departure.Air.PressureAltitude
		p.Flags = []Flag{{X: rate.of(f.Value), Y: height.of(at), Label: rate.label(f.Value) + " at the strip", Class: "rate"}}
	}
}

func climbTitle(s *study.Study, sys units.System) string {
	head := fmt.Sprintf("Best rate of climb across altitude, %s, %s", dayWords(sys, s.Project.Plan.Day.Deviation), massWords(sys, s.Masses.Start))
	switch {
	case s.Absolute.Err != nil:
		return head + ": " + reason(sys, s.Absolute.Err) + "."
	case s.Service.Err != nil:
		return head + ": no service ceiling, " + reason(sys, s.Service.Err) + "."
	}
	return fmt.Sprintf("%s: service ceiling %s.", head, sys.Format(units.Altitude, s.Service.Value))
}

func climbWords(s *study.Study, sys units.System) string {
	if s.Absolute.Err != nil || len(s.Rates) == 0 {
		return fmt.Sprintf("There is no climb to draw at %s: %s.", massWords(sys, s.Masses.Start), reason(sys, s.Absolute.Err))
	}
	low := s.Rates[0]
	text := fmt.Sprintf("At %s, clean and at full power, the best rate of climb is %s at %s", massWords(sys, s.Masses.Start),
		sys.Format(units.ClimbRate, low.Rate), sys.Format(units.Altitude, low.Altitude))
	if f := s.Figure("climb_rate"); f != nil && f.Has() {
		text += fmt.Sprintf(", %s at the strip, %s,", sys.Format(units.ClimbRate, f.Value), sys.Format(units.Altitude, s.Project.Departure.Air.PressureAltitude))
	}
	text += fmt.Sprintf(" and nothing at the absolute ceiling, %s.", sys.Format(units.Altitude, s.Absolute.Value))
	if s.Service.Err != nil {
		return text + fmt.Sprintf(" There is no service ceiling: %s.", reason(sys, s.Service.Err))
	}
	return text + fmt.Sprintf(" The service ceiling is %s.", sys.Format(units.Altitude, s.Service.Value))
}
