package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// coefficientChart is a propeller's table over advance ratio, with the rows as
// entered dotted and the operating points marked.
func (k *plantCharts) coefficientChart() Chart {
	prop := k.p.Curves.Propeller()
	number, share := measure{k.sys.Unit(units.Coefficient), 4}, measureOf(k.sys, units.Fraction, 0)
	var x, ct, cp, eta []float64
	for _, r := range k.p.Sweep {
		x, ct, cp, eta = append(x, r.J), append(ct, r.CT), append(cp, r.CP), append(eta, rowEfficiency(r))
	}
	thrust, power := number.series("CT", x, ct, "available"), number.series("CP", x, cp, "required")
	thrust.LabelAt, power.LabelAt = 0.2, 0.3
	efficiency := share.series("efficiency", x, eta, "altitude")
	efficiency.LabelAt = 0.35
	lo, hi := reach(ct, cp)
	upper := Panel{Y: Axis{Label: "CT, CP", Min: coverBelow(lo), Max: cover(1.05 * hi)}, Series: []Series{thrust, power}}
	lower := Panel{Y: Axis{Label: "propeller efficiency", Unit: share.unit.Symbol, Min: 0, Max: share.of(1)}, Height: 0.9, Series: []Series{efficiency}}
	for _, r := range k.p.Given {
		upper.Flags = append(upper.Flags, Flag{X: r.J, Y: r.CT, Class: "available"}, Flag{X: r.J, Y: r.CP, Class: "required"})
		if r.Pulls {
			lower.Flags = append(lower.Flags, Flag{X: r.J, Y: share.of(r.Efficiency), Class: "altitude"})
		}
	}
	c := Chart{ID: "plant-propeller", Title: fmt.Sprintf("Propeller coefficients against advance ratio, table from J %s to %s.", units.Fixed(prop.Low, 2), units.Fixed(prop.High, 2)),
		Desc: k.coefficientWords(), X: Axis{Label: "advance ratio J", Min: 0, Max: math.Ceil(20*prop.High+1e-9) / 20}, XFirst: "advance ratio", Panels: []Panel{upper, lower}}
	for _, m := range k.p.Marked {
		if m.Err == nil && m.Out.Shaft.Speed > 0 && m.TAS > 0 {
			c.Marks = append(c.Marks, Mark{m.Out.Shaft.AdvanceRatio, m.Name + " " + readNumber(m.Out.Shaft.AdvanceRatio, 2)})
		}
	}
	return c
}

// rowEfficiency is NaN where the propeller does not pull.
func rowEfficiency(r study.PropellerRow) float64 {
	if !r.Pulls {
		return math.NaN()
	}
	return r.Efficiency
}

func (k *plantCharts) coefficientWords() string {
	var best study.PropellerRow
	for _, r := range k.p.Sweep {
		if r.Pulls && r.Efficiency > best.Efficiency {
			best = r
		}
	}
	share := measureOf(k.sys, units.Fraction, 0)
	text := fmt.Sprintf("The table's best efficiency is %s near J %s; dots are its rows as entered, the curve between them is monotone.", share.prose(best.Efficiency), units.Fixed(best.J, 2))
	for _, m := range k.p.Marked {
		if m.Err == nil && m.Out.Shaft.Speed > 0 && m.TAS > 0 {
			text += fmt.Sprintf(" At %s it works at J %s with %s.", m.Name, units.Fixed(m.Out.Shaft.AdvanceRatio, 2), share.prose(m.Out.Shaft.Efficiency))
		}
	}
	return text
}

// discChart is a constant-speed propeller as the loaded disc that stands for
// it, beside the same disc without losses.
func (k *plantCharts) discChart() Chart {
	prop := k.p.Curves.Propeller()
	r := &k.p.Runs[k.p.View]
	n := len(r.Points)
	x, eta, thrust, bestEta, bestThrust := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
	for i := range r.Points {
		pt := &r.Points[i]
		x[i], eta[i], thrust[i], bestEta[i], bestThrust[i] = k.speed.of(pt.TAS), math.NaN(), math.NaN(), math.NaN(), math.NaN()
		if pt.Err == nil && pt.Out.Shaft.Power > 0 {
			eta[i], thrust[i] = pt.Out.Shaft.Efficiency, pt.Out.Thrust
			bestThrust[i] = pt.Bound
			bestEta[i] = pt.Bound * pt.TAS / pt.Out.Shaft.Power
		}
	}
	_, most := reach(bestThrust)
	share, force := measureOf(k.sys, units.Fraction, 0), measureOf(k.sys, units.Force, most)
	named := func(s Series, label string, at float64) Series {
		s.Label, s.LabelAt = label, at
		return s
	}
	upper := Panel{Y: Axis{Label: "propeller efficiency", Unit: share.unit.Symbol, Min: 0, Max: share.of(1)}, Blank: k.blankOf(), Series: []Series{
		named(share.series("efficiency without losses", x, bestEta, "ghost"), "without losses", 0.7), named(share.series("efficiency", x, eta, "altitude"), "efficiency", 0.4)}}
	lower := Panel{Y: Axis{Label: "thrust", Unit: force.unit.Symbol, Min: 0, Max: cover(1.05 * force.of(most))}, Blank: k.blankOf(), Series: []Series{
		named(force.series("thrust without losses", x, bestThrust, "ghost"), "without losses", 0.15), named(force.series("thrust", x, thrust, "available"), "thrust", 0.4)}}
	c := k.acrossSpeed("plant-propeller", "Constant-speed propeller as a loaded disc", k.discWords(prop.Loss), upper, lower)
	c.X.Max = math.Ceil(k.speed.of(r.Points[n-1].TAS)/5-1e-9) * 5
	return c
}

func (k *plantCharts) discWords(loss float64) string {
	return fmt.Sprintf("%s, a disc with the loss factor %s turns the shaft power into thrust; the grey curves are the same disc and power without losses, which no propeller exceeds.",
		k.viewWords(), units.Plain(loss))
}
