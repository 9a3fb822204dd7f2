package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

const powerPoints = 61

// fullPowerChart is the power that the engine offers at full throttle over its
// speed, what a fixed-pitch propeller takes at the marked speeds, and where the two meet.
func (k *plantCharts) fullPowerChart() Chart {
	e := k.p.Curves.Engine()
	low, high := k.p.SpeedRange()
	rotation, power := measureOf(k.sys, units.Rotation, 0), measureOf(k.sys, units.Power, e.RatedPower)
	height := measureOf(k.sys, units.Altitude, 0)
	p := Panel{Y: Axis{Label: "power at the propeller", Unit: power.unit.Symbol}}
	most := 0.0
	for i := range k.p.Runs {
		r := &k.p.Runs[i]
		var x, y []float64
		for j := range powerPoints {
			n := low + (high-low)*float64(j)/(powerPoints-1)
			x, y = append(x, rotation.of(n)), append(y, k.p.Curves.FullPower(&r.Air, n))
			most = max(most, y[j])
		}
		at := height.label(r.Air.PressureAltitude)
		s := power.series("offered at "+at, x, y, altitudeClass(i))
		s.Label, s.LabelAt, s.Dash = at, 0.14, i != k.p.View
		p.Series = append(p.Series, s)
	}
	for i, l := range k.p.Loads {
		x := make([]float64, len(l.Speeds))
		for j, n := range l.Speeds {
			x[j] = rotation.of(n)
		}
		s := power.series("taken "+k.loadWords(l), x, l.Power, "ghost")
		s.Label, s.LabelAt = k.loadWords(l), 0.2+0.12*float64(i)
		p.Series = append(p.Series, s)
	}
	p.Flags = k.powerFlags(rotation, power)
	p.Y.Max = cover(1.12 * power.of(most))
	c := Chart{ID: "plant-power", Title: k.fullPowerTitle(rotation, power), Desc: k.fullPowerWords(rotation, power),
		X: Axis{Label: "engine speed", Unit: rotation.unit.Symbol, Min: floorTo(rotation.of(low)), Max: rotation.of(high) + 0.06*rotation.of(high-low)}, XFirst: "engine speed",
		Panels: []Panel{p}, Marks: []Mark{{rotation.of(e.Greatest), "greatest " + readNumber(rotation.of(e.Greatest), rotation.decimals)}}}
	if e.Lowest > low {
		c.Marks = append(c.Marks, Mark{rotation.of(e.Lowest), "table begins " + readNumber(rotation.of(e.Lowest), rotation.decimals)})
	}
	return c
}

// loadWords names a propeller load: "at rest", "at 36.1 m/s".
func (k *plantCharts) loadWords(l study.PropellerLoad) string {
	if l.TAS == 0 {
		return "at rest"
	}
	return "at " + k.speed.label(l.TAS)
}

// powerFlags are the marked points; those that stand together share a flag.
func (k *plantCharts) powerFlags(rotation, power measure) []Flag {
	const near = 0.004 // of the greatest, in both directions
	var flags []Flag
	top := k.p.Curves.Engine()
	for _, m := range k.p.Marked {
		n := m.Out.Shaft.EngineSpeed
		if m.Err != nil || n <= 0 {
			continue
		}
		f := Flag{X: rotation.of(n), Y: power.of(m.Out.Shaft.Power), Label: m.Name, Class: "available"}
		if last := len(flags) - 1; last >= 0 && math.Abs(flags[last].X-f.X) < near*rotation.of(top.Greatest) && math.Abs(flags[last].Y-f.Y) < near*power.of(top.RatedPower) {
			flags[last].Label += ", " + m.Name
			continue
		}
		flags = append(flags, f)
	}
	for i := range flags {
		flags[i].Label += " " + readNumber(flags[i].X, rotation.decimals)
	}
	return flags
}

func (k *plantCharts) fullPowerTitle(rotation, power measure) string {
	e := k.p.Curves.Engine()
	return fmt.Sprintf("Full-throttle power at the propeller against engine speed, %s; rated %s at %s.", dayWords(k.sys, k.s.View.Deviation), power.prose(e.RatedPower), rotation.prose(e.RatedSpeed))
}

func (k *plantCharts) fullPowerWords(rotation, power measure) string {
	text := ""
	for _, m := range k.p.Marked {
		if m.Err != nil || m.Out.Shaft.EngineSpeed <= 0 {
			continue
		}
		if text != "" {
			text += "; "
		}
		where := "at " + m.Name
		if m.TAS == 0 {
			where = m.Name
		}
		text += fmt.Sprintf("%s the engine turns %s and the propeller takes %s", where, rotation.prose(m.Out.Shaft.EngineSpeed), power.prose(m.Out.Shaft.Power))
	}
	if text == "" {
		return k.viewWords() + ", the engine turns at no marked point."
	}
	text = k.viewWords() + ": " + text + "."
	if len(k.p.Loads) > 0 {
		text += " The grey curves are what the propeller takes; where one meets what the engine offers, the engine turns."
	}
	return text
}

// lapseChart is full-throttle power at the rated speed over pressure altitude.
func (k *plantCharts) lapseChart() Chart {
	e := k.p.Curves.Engine()
	rotation, power, height := measureOf(k.sys, units.Rotation, 0), measureOf(k.sys, units.Power, e.RatedPower), measureOf(k.sys, units.Altitude, 0)
	p := Panel{Y: Axis{Label: "power at the propeller", Unit: power.unit.Symbol}}
	most := 0.0
	for i, l := range k.p.Lapse {
		x := make([]float64, len(l.Altitude))
		for j, hp := range l.Altitude {
			x[j] = height.of(hp)
			most = max(most, l.Power[j])
		}
		s := power.series("power, "+dayWords(k.sys, l.Deviation), x, l.Power, "available")
		s.Label, s.LabelAt, s.Dash = dayWords(k.sys, l.Deviation), 0.7, l.Deviation != k.s.View.Deviation
		if i > 0 {
			s.LabelAt = 0.35
		}
		p.Series = append(p.Series, s)
	}
	p.Y.Max = cover(1.05 * power.of(most))
	view := k.p.Runs[k.p.View].Air
	p.Flags = []Flag{{X: height.of(view.PressureAltitude), Y: power.of(k.p.Curves.FullPower(&view, e.RatedSpeed)), Label: power.label(k.p.Curves.FullPower(&view, e.RatedSpeed)) + " at " + height.label(view.PressureAltitude), Class: "available"}}
	c := Chart{ID: "plant-lapse", Title: fmt.Sprintf("Full-throttle power against pressure altitude at %s.", rotation.prose(e.RatedSpeed)), Desc: k.lapseWords(power, rotation),
		X: Axis{Label: "pressure altitude", Unit: height.unit.Symbol}, XFirst: "pressure altitude", Panels: []Panel{p}}
	if len(k.p.Lapse) > 0 {
		l := k.p.Lapse[0].Altitude
		c.X.Max = height.of(l[len(l)-1])
		if view.PressureAltitude < 0 {
			c.X.Min = height.of(view.PressureAltitude)
		}
	}
	if e.CriticalAltitude > 0 {
		c.Marks = append(c.Marks, Mark{height.of(e.CriticalAltitude), "critical altitude " + height.label(e.CriticalAltitude)})
	}
	return c
}

func (k *plantCharts) lapseWords(power, rotation measure) string {
	e := k.p.Curves.Engine()
	view := k.p.Runs[k.p.View].Air
	text := fmt.Sprintf("At its rated speed, %s, the engine offers the propeller %s at %s, %s", rotation.prose(e.RatedSpeed), power.prose(k.p.Curves.FullPower(&view, e.RatedSpeed)),
		k.sys.Format(units.Altitude, view.PressureAltitude), dayWords(k.sys, k.s.View.Deviation))
	if len(k.p.Lapse) > 0 && len(k.p.Lapse[0].Power) > 0 {
		text += fmt.Sprintf(", against %s at sea level on the standard day", power.prose(k.p.Lapse[0].Power[0]))
	}
	text += "; installation loss and accessories are taken off."
	if e.CriticalAltitude > 0 {
		return text + fmt.Sprintf(" Power is held to the critical altitude, %s.", k.sys.Format(units.Altitude, e.CriticalAltitude))
	}
	return text + " There is no supercharger: power falls from sea level up."
}
