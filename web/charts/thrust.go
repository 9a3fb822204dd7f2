package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// ThrustChart draws thrust required and available against true airspeed under
// the study's view, with the thrust in hand shaded and a shortfall hatched.
//
// The limits hold still while inputs are edited: x runs from 0.8 of the stall to the
// never-exceed speed, outwards to steps of 5 of the unit; y runs from 0 to a cover of
// the greatest thrust available and of the thrust required at the level maximum.
// Thrust required beyond that, near the never-exceed speed, leaves the chart.
func ThrustChart(s *study.Study, sys units.System) Chart {
	return balance{"thrust", "thrust", units.Force, func(b *pointperf.Balance, n float64) float64 { return n }}.chart(s, sys)
}

// PowerChart draws the power required and available, thrust times true airspeed,
// with the axes and marks of [ThrustChart].
func PowerChart(s *study.Study, sys units.System) Chart {
	return balance{"power", "power", units.Power, func(b *pointperf.Balance, n float64) float64 { return n * b.TAS }}.chart(s, sys)
}

// A balance is what is drawn of thrust available against thrust required.
type balance struct {
	id, noun string
	q        units.Quantity
	of       func(b *pointperf.Balance, thrust float64) float64 // in the SI unit of q, for a thrust in N
}

func (k balance) chart(s *study.Study, sys units.System) Chart {
	speed := measureOf(sys, units.Speed, 0)
	c := Chart{
		ID: k.id, Title: k.title(s, sys), Desc: k.words(s, sys),
		X: speedAxis(s, speed), XFirst: "true airspeed",
	}
	top := k.top(s)
	m := measureOf(sys, k.q, top)
	p := Panel{Y: Axis{Label: k.noun, Unit: m.unit.Symbol}}
	if curve := flyable(s); len(curve) > 0 {
		p.Y.Max = cover(m.of(top))
		c.Marks = speedMarks(s, speed)
		k.fill(&p, s, curve, sys, m)
	} else {
		p.Blank = reason(sys, s.Speeds.LeastThrust.Err)
	}
	c.Panels = []Panel{p}
	return c
}

// flyable is the study's curve, or nothing where the stall lies above the never-exceed speed.
func flyable(s *study.Study) []pointperf.Balance {
	if s.Speeds.LeastThrust.Err != nil {
		return nil
	}
	return s.Curve
}

func (k balance) fill(p *Panel, s *study.Study, curve []pointperf.Balance, sys units.System, m measure) {
	speed, share := measureOf(sys, units.Speed, 0), measureOf(sys, units.Fraction, 0)
	n := len(curve)
	x, cas, available, required := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	hand, ratio := make([]float64, n), make([]float64, n)
	for i := range curve {
		b := &curve[i]
		x[i], cas[i] = speed.of(b.TAS), float64(s.Point.Air.CAS(b.TAS))
		available[i], required[i] = k.of(b, b.Available), k.of(b, b.Required)
		hand[i], ratio[i] = k.of(b, b.InHand()), b.InHand()/b.Required
	}
	a := m.series(k.noun+" available", x, available, "available")
	r := m.series(k.noun+" required", x, required, "required")
	a.Label, a.LabelAt = "available", 0.2
	r.Label, r.LabelAt = "required", 0.3
	p.Series = []Series{
		speed.series("calibrated airspeed", x, cas, "none"), a, r,
		m.series(k.noun+" in hand", x, hand, "none"), share.series(k.noun+" in hand", x, ratio, "none"),
	}
	p.Bands = []Band{
		{X: x, Lower: r.Y, Upper: a.Y, Class: "hand", Label: "in hand"},
		{X: x, Lower: a.Y, Upper: r.Y, Class: "short", Label: "short"},
	}
}

// top is the end of the y axis before rounding, in SI. Where level flight is not
// possible it shows at least the bottom of the curve required.
func (k balance) top(s *study.Study) float64 {
	available, least := 0.0, math.Inf(1)
	curve := flyable(s)
	for i := range curve {
		b := &curve[i]
		if v := k.of(b, b.Available); v > available {
			available = v
		}
		least = min(least, k.of(b, b.Required))
	}
	if len(curve) == 0 {
		return 0
	}
	top := 1.08 * available // room for a label
	top = max(top, min(1.05*k.of(&curve[0], curve[0].Required), 1.35*available))
	if fast := s.Speeds.LevelMax; fast.Err == nil {
		return max(top, 1.15*k.of(&pointperf.Balance{TAS: fast.TAS}, fast.Value))
	}
	return max(top, 1.35*least)
}

// speedAxis runs from 0.8 of the stall to the never-exceed speed, outwards to steps of 5.
func speedAxis(s *study.Study, m measure) Axis {
	const step, below = 5.0, 0.8
	a := Axis{Label: "true airspeed", Unit: m.unit.Symbol}
	if s.Speeds.Stall.Err != nil {
		return a
	}
	slow := s.Speeds.Stall.TAS
	fast := slow
	for i := range s.Curve {
		fast = max(fast, s.Curve[i].TAS)
	}
	a.Min = math.Floor(below*m.of(slow)/step) * step
	a.Max = math.Ceil(m.of(fast)/step-1e-9) * step
	if a.Max <= a.Min {
		a.Max = a.Min + step
	}
	return a
}

// speedMarks marks the speeds of note that exist; speeds that read the same share a mark.
func speedMarks(s *study.Study, m measure) []Mark {
	v := &s.Speeds
	var marks []Mark
	last := ""
	add := func(name string, b pointperf.Best, shown bool) {
		if b.Err != nil || !shown {
			return
		}
		text := readNumber(m.of(b.TAS), m.decimals)
		if n := len(marks); n > 0 && last == text {
			before := marks[n-1].Label[:len(marks[n-1].Label)-len(text)-1]
			marks[n-1].Label = before + ", " + name + " " + text
			return
		}
		last = text
		marks = append(marks, Mark{X: m.of(b.TAS), Label: name + " " + text})
	}
	add("stall", v.Stall, true)
	add("best angle", v.BestAngle, v.BestAngle.Value > 0)
	add("best rate", v.BestRate, v.BestRate.Value > 0)
	add("least thrust", v.LeastThrust, true)
	if v.LevelMax.Bound == pointperf.AtNeverExceed {
		add("never exceed", v.LevelMax, true)
	} else {
		add("level max", v.LevelMax, true)
	}
	return marks
}

// conditionWords says the view: "570 m, ISA +15 °C, 586.0 kg, clean".
func conditionWords(s *study.Study, sys units.System) string {
	v := s.View
	text := fmt.Sprintf("%s, %s, %s, %s", sys.Format(units.Altitude, v.Altitude), dayWords(sys, v.Deviation), massWords(sys, v.Mass), v.Config)
	if v.Setting < 1 {
		text += ", power lever at " + sys.Format(units.Fraction, v.Setting)
	}
	return text
}

func (k balance) title(s *study.Study, sys units.System) string {
	head := fmt.Sprintf("%s%s required and available at %s", string(k.noun[0]-'a'+'A'), k.noun[1:], conditionWords(s, sys))
	v := &s.Speeds
	if v.LevelMax.Err != nil || v.LevelMin.Err != nil {
		return head + ": " + reason(sys, v.LevelMax.Err) + "."
	}
	m := measureOf(sys, units.Speed, 0)
	return fmt.Sprintf("%s: level flight from %s to %s.", head, m.prose(v.LevelMin.TAS), m.prose(v.LevelMax.TAS))
}

// words says in sentences what the curves show.
func (k balance) words(s *study.Study, sys units.System) string {
	curve := flyable(s)
	if len(curve) == 0 {
		return fmt.Sprintf("There is nothing to draw at %s: %s.", conditionWords(s, sys), reason(sys, s.Speeds.LeastThrust.Err))
	}
	m, speed := measureOf(sys, k.q, k.top(s)), measureOf(sys, units.Speed, 0)
	least, most := -1, -1
	for i := range curve {
		b := &curve[i]
		if least < 0 || k.of(b, b.Required) < k.of(&curve[least], curve[least].Required) {
			least = i
		}
		if usable(b.Available) && (most < 0 || k.of(b, b.InHand()) > k.of(&curve[most], curve[most].InHand())) {
			most = i
		}
	}
	l := &curve[least]
	text := fmt.Sprintf("At %s, the %s required is least near %s, %s.", conditionWords(s, sys), k.noun, speed.prose(l.TAS), m.prose(k.of(l, l.Required)))
	if most < 0 {
		return text + " The powerplant gives no answer at any speed."
	}
	b := &curve[most]
	lever := "At full power"
	if s.View.Setting < 1 {
		lever = "With the lever there"
	}
	text += fmt.Sprintf(" %s most %s is in hand near %s: %s available less %s required leaves %s.", lever, k.noun, speed.prose(b.TAS),
		m.prose(k.of(b, b.Available)), m.prose(k.of(b, b.Required)), m.prose(k.of(b, b.InHand())))
	switch fast := s.Speeds.LevelMax; {
	case fast.Err != nil:
		text += fmt.Sprintf(" There is no level maximum: %s.", reason(sys, fast.Err))
	case fast.Bound == pointperf.AtNeverExceed:
		text += fmt.Sprintf(" Level flight reaches the never-exceed speed, %s.", speed.prose(fast.TAS))
	default:
		text += fmt.Sprintf(" The two meet at the level maximum, %s.", speed.prose(fast.TAS))
	}
	return text
}
