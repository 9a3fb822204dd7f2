package charts

import (
	"fmt"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// polarClasses colour the configurations.
var polarClasses = []string{"available", "altitude", "required"}

// coefficient writes a lift or drag coefficient with the given digits after the point.
func coefficient(sys units.System, decimals int) measure {
	return measure{sys.Unit(units.Coefficient), decimals}
}

// PolarChart draws the drag coefficient against the lift coefficient in every configuration, up to CLmax.
func PolarChart(s *study.Study, curves []study.PolarCurve, sys units.System) Chart {
	cd := coefficient(sys, 4)
	most, reach := 0.0, 0.0
	p := Panel{Y: Axis{Label: "drag coefficient CD"}}
	for i, k := range curves {
		var x, y []float64
		for _, q := range k.Points {
			x, y = append(x, q.CL), append(y, q.CD)
			most = max(most, q.CD)
		}
		reach = max(reach, k.CLMax)
		c := cd.series(k.Config.String(), x, y, polarClasses[i%len(polarClasses)])
		c.LabelAt = 0.8
		p.Series = append(p.Series, c)
		if i == 0 {
			p.Flags = append(p.Flags, Flag{X: k.Best.CL, Y: k.Best.CD, Label: fmt.Sprintf("best L/D %.1f", k.Best.Ratio()), Class: c.Class})
		}
	}
	p.Y.Max = cover(most)
	b := curves[0]
	return Chart{ID: "polar", X: Axis{Label: "lift coefficient CL", Min: 0, Max: cover(1.02 * reach)}, Panels: []Panel{p},
		Title: fmt.Sprintf("Drag polar: least CD %.4f clean.", b.Least),
		Desc: fmt.Sprintf("Clean, the drag coefficient is at least %.4f; lift over drag is best at CL %.2f, where CD is %.4f. With flaps and gear for landing it is at least %.4f and CLmax is %.2f.",
			b.Least, b.Best.CL, b.Best.CD, curves[len(curves)-1].Least, curves[len(curves)-1].CLMax)}
}

// RatioChart draws lift over drag against equivalent airspeed in every configuration, at the mass of the view.
func RatioChart(s *study.Study, curves []study.PolarCurve, sys units.System) Chart {
	speed, ratio := measureOf(sys, units.Speed, 0), coefficient(sys, 2)
	most, slow, fast := 0.0, curves[0].Stall, 0.0
	p := Panel{Y: Axis{Label: "lift over drag"}}
	for i, k := range curves {
		var x, y []float64
		for j := len(k.Points) - 1; j >= 0; j-- {
			q := k.Points[j]
			x, y = append(x, speed.of(q.EAS)), append(y, q.Ratio())
		}
		most, slow, fast = max(most, k.Best.Ratio()), min(slow, k.Stall), max(fast, 2.4*k.Stall)
		c := ratio.series(k.Config.String(), x, y, polarClasses[i%len(polarClasses)])
		c.LabelAt = 0.65
		p.Series = append(p.Series, c)
		p.Flags = append(p.Flags, Flag{X: speed.of(k.Best.EAS), Y: k.Best.Ratio(), Label: fmt.Sprintf("%.1f at %s", k.Best.Ratio(), speed.label(k.Best.EAS)), Class: c.Class})
	}
	p.Y.Max = cover(1.08 * most)
	b := curves[0].Best
	return Chart{ID: "ratio", X: Axis{Label: "equivalent airspeed", Unit: speed.unit.Symbol, Min: speed.of(0.9 * slow), Max: speed.of(fast)}, Panels: []Panel{p},
		Title: fmt.Sprintf("Lift over drag against speed, %s: at best %.1f clean.", massWords(sys, s.View.Mass), b.Ratio()),
		Desc:  fmt.Sprintf("At %s lift over drag is at best %.1f, clean, at %s equivalent airspeed.", massWords(sys, s.View.Mass), b.Ratio(), sys.Format(units.Speed, b.EAS))}
}
