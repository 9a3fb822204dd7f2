package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// rateClasses colour the curves of rising altitudes, the first is that of the view.
var rateClasses = []string{"available", "alt-1", "alt-2", "alt-3", "alt-4"}

// RateCurvesChart draws the rate of climb against true airspeed at the altitudes of the
// envelope, with the best rate of each dotted. What is below 0 leaves the chart
// unless nothing climbs.
func RateCurvesChart(s *study.Study, e *study.Envelope, sys units.System) Chart {
	most, least := 0.0, 0.0
	for i, c := range e.Curves {
		if c.Rate.Err == nil {
			most = max(most, c.Rate.Value)
			if i == 0 {
				least = c.Rate.Value
			}
		}
	}
	rate, speed, height := measureOf(sys, units.ClimbRate, max(most, 2*pointperf.ServiceRate)), measureOf(sys, units.Speed, 0), measureOf(sys, units.Altitude, 0)
	shown := 2.5 * min(least, 0)
	p := Panel{Y: Axis{Label: "rate of climb", Unit: rate.unit.Symbol, Min: coverBelow(rate.of(shown)), Max: cover(rate.of(max(1.18*most, 1.3*pointperf.ServiceRate)))}}
	for i, c := range e.Curves {
		var x, y []float64
		for _, q := range c.Points {
			x, y = append(x, speed.of(q.TAS)), append(y, q.Rate)
		}
		curve := rate.series(height.label(c.Altitude), x, y, rateClasses[i%len(rateClasses)])
		curve.LabelAt = 0.62
		p.Series = append(p.Series, curve)
		if c.Rate.Err != nil {
			continue
		}
		f := Flag{X: speed.of(c.Rate.TAS), Y: rate.of(c.Rate.Value), Class: curve.Class}
		if i == 0 {
			f.Label = fmt.Sprintf("best rate %s at %s", rate.label(c.Rate.Value), speed.label(c.Rate.TAS))
		}
		p.Flags = append(p.Flags, f)
	}
	p.Lines = []HLine{{rate.of(pointperf.ServiceRate), "service ceiling: " + rate.label(pointperf.ServiceRate)}}
	if len(e.Curves) == 0 || len(e.Curves[0].Points) == 0 {
		p.Blank, p.Lines = rateReason(s, e, sys), nil
	}
	return Chart{ID: "rate-curves", Title: ratesTitle(s, e, sys), Desc: ratesWords(s, e, sys), X: rateAxis(e, speed, shown), XFirst: "true airspeed", Panels: []Panel{p}}
}

// rateReason says why there is no rate of climb at the view.
func rateReason(s *study.Study, e *study.Envelope, sys units.System) string {
	if len(e.Curves) == 0 || e.Curves[0].Rate.Err == nil {
		return reason(sys, s.Speeds.BestRate.Err)
	}
	return reason(sys, e.Curves[0].Rate.Err)
}

// rateAxis runs from below the slowest stall to the fastest speed with a rate in m/s above the least that
// is shown, outwards to steps of 5.
func rateAxis(e *study.Envelope, m measure, shown float64) Axis {
	const step = 5.0
	a := Axis{Label: "true airspeed", Unit: m.unit.Symbol}
	slow, fast, top := math.Inf(1), 0.0, 0.0
	for _, c := range e.Curves {
		for _, q := range c.Points {
			slow, top = min(slow, q.TAS), max(top, q.TAS)
			if q.Rate > shown {
				fast = max(fast, q.TAS)
			}
		}
	}
	if top == 0 {
		return a
	}
	if fast == 0 {
		fast = top
	}
	a.Min, a.Max = math.Floor(0.95*m.of(slow)/step)*step, math.Ceil(m.of(fast)/step+0.1)*step
	return a
}

// envelopeWords says the condition without its altitude: "ISA +15 °C, 586.0 kg, clean".
func envelopeWords(s *study.Study, sys units.System) string {
	v := s.View
	return fmt.Sprintf("%s, %s, %s", dayWords(sys, v.Deviation), massWords(sys, v.Mass), v.Config)
}

func ratesTitle(s *study.Study, e *study.Envelope, sys units.System) string {
	head := "Rate of climb against speed, " + envelopeWords(s, sys)
	if len(e.Curves) == 0 || e.Curves[0].Rate.Err != nil {
		return head + ": " + rateReason(s, e, sys) + "."
	}
	c := e.Curves[0]
	return fmt.Sprintf("%s: at best %s at %s.", head, sys.Format(units.ClimbRate, c.Rate.Value), sys.Format(units.Altitude, c.Altitude))
}

func ratesWords(s *study.Study, e *study.Envelope, sys units.System) string {
	if len(e.Curves) == 0 || e.Curves[0].Rate.Err != nil {
		return "There is no climb to draw: " + rateReason(s, e, sys) + "."
	}
	c := e.Curves[0]
	text := fmt.Sprintf("At %s and full power the best rate of climb is %s, flown at %s", sys.Format(units.Altitude, c.Altitude), sys.Format(units.ClimbRate, c.Rate.Value), sys.Format(units.Speed, c.Rate.TAS))
	if n := len(e.Curves); n > 1 && e.Curves[n-1].Rate.Err == nil {
		last := e.Curves[n-1]
		text += fmt.Sprintf("; at %s it has fallen to %s, flown at %s", sys.Format(units.Altitude, last.Altitude), sys.Format(units.ClimbRate, last.Rate.Value), sys.Format(units.Speed, last.Rate.TAS))
	}
	return text + "."
}
