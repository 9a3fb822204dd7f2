package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/envelope"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

const bandColumns = 161

// EnvelopeChart draws where level flight is held over true airspeed and pressure
// altitude, bounded by the stall, the never-exceed speed and the thrust, with lines of
// equal specific excess power.
func EnvelopeChart(s *study.Study, e *study.Envelope, sys units.System) Chart {
	speed, height, rate := measureOf(sys, units.Speed, 0), measureOf(sys, units.Altitude, 0), stepMeasure(e, sys)
	p := Panel{Y: Axis{Label: "pressure altitude", Unit: height.unit.Symbol}}
	c := Chart{ID: "envelope", Title: envelopeTitle(s, e, sys), Desc: envelopeDesc(e, sys), X: Axis{Label: "true airspeed", Unit: speed.unit.Symbol}, XFirst: "true airspeed"}
	if e.GridErr != nil || len(e.Grid.Levels) < 2 {
		p.Blank = "no level flight to show"
		if e.GridErr != nil {
			p.Blank = reason(sys, e.GridErr)
		}
		c.Panels = []Panel{p}
		return c
	}
	levels := e.Grid.Levels
	p.Y.Min, p.Y.Max = height.of(levels[0].Altitude), height.of(levels[len(levels)-1].Altitude)
	p.Series = append(contourSeries(e, speed, height, rate), boundSeries(e, speed, height)...)
	p.Bands = flightBands(e, speed, height)
	p.Flags = ceilingFlags(e, speed, height)
	c.X.Min, c.X.Max = envelopeReach(e, speed)
	c.Panels = []Panel{p}
	return c
}

// envelopeReach is the ends of the speed axis: beyond the never-exceed speed at the lowest
// altitude and the fastest level flight, outwards to steps of 5. The never-exceed speed
// higher up leaves the chart.
func envelopeReach(e *study.Envelope, speed measure) (low, high float64) {
	const step, beyond = 5.0, 1.08
	levels := e.Grid.Levels
	slow, fast, flown := math.Inf(1), 0.0, levels[0].Top
	for i := range levels {
		slow, fast = min(slow, levels[i].Stall), max(fast, levels[i].Top)
	}
	for _, c := range e.Grid.Columns(bandColumns) {
		if c.Flown.Some() {
			flown = max(flown, c.TAS)
		}
	}
	return math.Floor(0.96*speed.of(slow)/step) * step, math.Ceil(speed.of(min(fast, beyond*flown))/step) * step
}

// stepMeasure has the digits that the round steps need.
func stepMeasure(e *study.Envelope, sys units.System) measure {
	m := measureOf(sys, units.ClimbRate, 0)
	if len(e.Steps) > 1 {
		m.decimals = decimalsFor(m.of(e.Steps[1]) * (1 + 1e-9))
	}
	return m
}

// contourSeries are the lines of equal excess power; the longest of each step is labelled.
func contourSeries(e *study.Envelope, speed, height, rate measure) []Series {
	longest := map[float64]int{}
	for i, c := range e.Contours {
		if at, ok := longest[c.Excess]; !ok || len(c.Points) > len(e.Contours[at].Points) {
			longest[c.Excess] = i
		}
	}
	var list []Series
	for i, c := range e.Contours {
		x, y := make([]float64, len(c.Points)), make([]float64, len(c.Points))
		for k, q := range c.Points {
			x[k], y[k] = speed.of(q.TAS), q.Altitude
		}
		l := height.series("excess power "+rate.label(c.Excess), x, y, "ghost")
		l.Label = rate.label(c.Excess)
		if c.Excess == 0 {
			l.Class, l.Label = "required", "limit of thrust, 0"
		}
		if longest[c.Excess] == i {
			l.LabelAt = 0.55
			if c.Excess == 0 {
				l.LabelAt = 0.75
			}
		}
		list = append(list, l)
	}
	return list
}

// boundSeries are the stall, the never-exceed speed and the best rate.
func boundSeries(e *study.Envelope, speed, height measure) []Series {
	var stall, top, ridge, hp, hr []float64
	for _, l := range e.Grid.Levels {
		stall, top, hp = append(stall, speed.of(l.Stall)), append(top, speed.of(l.Top)), append(hp, l.Altitude)
	}
	for _, r := range e.Ridge {
		ridge, hr = append(ridge, speed.of(r.TAS)), append(hr, r.Altitude)
	}
	s, n := height.series("stall", stall, hp, "neutral"), height.series("never exceed", top, hp, "neutral")
	s.LabelAt, n.LabelAt, n.Dash = 0.5, 0.5, true
	list := []Series{s, n}
	if len(ridge) > 1 {
		r := height.series("best rate", ridge, hr, "rate")
		r.LabelAt, r.Dash = 0.3, true
		list = append(list, r)
	}
	return list
}

// flightBands shade where level flight is held and hatch where only thrust is missing.
func flightBands(e *study.Envelope, speed, height measure) []Band {
	hand, short := Band{Class: "hand", Label: "level flight"}, Band{Class: "short", Label: "thrust too weak"}
	add := func(b *Band, tas float64, r envelope.Range) {
		low, high := math.NaN(), math.NaN()
		if r.Some() {
			low, high = height.of(r.Low), height.of(r.High)
		}
		b.X, b.Lower, b.Upper = append(b.X, speed.of(tas)), append(b.Lower, low), append(b.Upper, high)
	}
	for _, c := range e.Grid.Columns(bandColumns) {
		add(&hand, c.TAS, c.Flown)
		add(&short, c.TAS, c.Short)
	}
	return []Band{hand, short}
}

// ceilingFlags stand on the line of best rate.
func ceilingFlags(e *study.Envelope, speed, height measure) []Flag {
	var flags []Flag
	add := func(name string, at study.Altitude) {
		if at.Err == nil && len(e.Ridge) > 1 {
			flags = append(flags, Flag{X: speed.of(ridgeAt(e.Ridge, at.Value)), Y: height.of(at.Value), Label: name + " " + height.label(at.Value), Class: "rate"})
		}
	}
	add("absolute ceiling", e.Absolute)
	add("service ceiling", e.Service)
	return flags
}

// ridgeAt interpolates the speed in m/s of best rate at an altitude in m.
func ridgeAt(ridge []study.RateAt, hp float64) float64 {
	for i := 1; i < len(ridge); i++ {
		a, b := ridge[i-1], ridge[i]
		if hp <= b.Altitude && b.Altitude > a.Altitude {
			return a.TAS + (b.TAS-a.TAS)*(hp-a.Altitude)/(b.Altitude-a.Altitude)
		}
	}
	return ridge[len(ridge)-1].TAS
}

func envelopeTitle(s *study.Study, e *study.Envelope, sys units.System) string {
	head := "Specific excess power over speed and altitude, " + envelopeWords(s, sys)
	switch {
	case e.GridErr != nil:
		return head + ": " + reason(sys, e.GridErr) + "."
	case e.Absolute.Err != nil:
		return head + ": " + reason(sys, e.Absolute.Err) + "."
	}
	return fmt.Sprintf("%s: absolute ceiling %s.", head, sys.Format(units.Altitude, e.Absolute.Value))
}

func envelopeDesc(e *study.Envelope, sys units.System) string {
	if e.GridErr != nil {
		return "There is no envelope to draw: " + reason(sys, e.GridErr) + "."
	}
	best, hp, _ := e.Grid.Most()
	unknown := ""
	if !e.Grid.Whole() {
		unknown = " Where nothing is shaded between stall and never-exceed speed the powerplant's data give no answer."
	}
	if best.Excess < 0 {
		return fmt.Sprintf("Thrust is weaker than drag at every speed and altitude shown. It comes nearest at %s and %s, where height is lost at %s.%s",
			sys.Format(units.Altitude, hp), sys.Format(units.Speed, best.TAS), sys.Format(units.ClimbRate, -best.Excess), unknown)
	}
	text := fmt.Sprintf("Level flight lies between the stall at the left, the never-exceed speed at the right and the limit of thrust above. Specific excess power, the rate at which height or speed can be gained, is greatest at %s and %s: %s.",
		sys.Format(units.Altitude, hp), sys.Format(units.Speed, best.TAS), sys.Format(units.ClimbRate, best.Excess))
	if e.Absolute.Err != nil {
		return text + " There is no ceiling to flag: " + reason(sys, e.Absolute.Err) + "." + unknown
	}
	text += fmt.Sprintf(" It has fallen to nothing at the absolute ceiling, %s", sys.Format(units.Altitude, e.Absolute.Value))
	if e.Service.Err == nil {
		text += fmt.Sprintf("; at the service ceiling, %s, the best rate of climb is %s", sys.Format(units.Altitude, e.Service.Value), sys.Format(units.ClimbRate, pointperf.ServiceRate))
	}
	return text + "." + unknown
}

// EnvelopeTable is the specific excess power at round speeds on every fourth level, with
// the stall and the never-exceed speed of each.
func EnvelopeTable(c Chart, e *study.Envelope, sys units.System) Table {
	const every, columns = 4, 9.0
	speed, height, rate := measureOf(sys, units.Speed, 0), measureOf(sys, units.Altitude, 0), measureOf(sys, units.ClimbRate, 0)
	t := Table{Caption: c.Title, Header: []string{heading("pressure altitude", height.unit.Symbol), heading("stall", speed.unit.Symbol)}}
	if len(e.Grid.Levels) == 0 {
		return t
	}
	step := tickStep((c.X.Max-c.X.Min)/columns, "")
	var at []float64
	for v := math.Ceil(c.X.Min/step+1e-9) * step; v < c.X.Max; v += step {
		at = append(at, v)
		t.Header = append(t.Header, heading("at "+plainNumber(v, 0)+" "+speed.unit.Symbol, rate.unit.Symbol))
	}
	t.Header = append(t.Header, heading("never exceed", speed.unit.Symbol))
	for j := 0; j < len(e.Grid.Levels); j += every {
		l := &e.Grid.Levels[j]
		row := []string{plainNumber(height.of(l.Altitude), height.decimals), plainNumber(speed.of(l.Stall), speed.decimals)}
		for _, v := range at {
			cell := noValue
			if ps, ok := l.At(speed.unit.ToSI(v)); ok {
				cell = plainNumber(rate.of(ps), rate.decimals)
			}
			row = append(row, cell)
		}
		t.Rows = append(t.Rows, append(row, plainNumber(speed.of(l.Top), speed.decimals)))
	}
	return t
}
