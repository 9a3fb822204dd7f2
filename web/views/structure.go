package views

import (
	"fmt"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A Structure is the envelope of manoeuvre and gust as shown.
type Structure struct {
	Lead     string
	Chart    ChartView
	Speeds   Grid
	Facts    []Row
	Masses   Grid
	Warnings []WarningView
	Enter    string // address of the group of inputs, where nothing is entered
	Working  string // address of the working
}

func newStructure(s *study.Study, e *study.Envelope, t *study.Structure, sys units.System, f *Frame) Structure {
	p := Structure{Lead: structureLead(t, sys)}
	if !t.Given {
		p.Enter = f.tab("") + "#" + elementID(fmt.Sprintf("variants[%d].aircraft.limits.rule", s.Index)) + "-field"
		return p
	}
	p.Working = f.tab("/working") + "#" + anchor(study.StructurePart)
	list := t.Cautions
	if w := t.TurnCaution(e); w != nil {
		list = append(list[:len(list):len(list)], *w)
	}
	p.Warnings = warnings(list, sys)
	if t.Diagram == nil {
		return p
	}
	p.Speeds, p.Facts, p.Masses = speedGrid(t, sys), structureFacts(t, sys), loadGrid(t, sys)
	return p
}

// structureLead answers in a sentence what the structure has to bear.
func structureLead(t *study.Structure, sys units.System) string {
	switch {
	case !t.Given:
		return "Structural limits are not entered, so that nothing is drawn: no load factor on this page says that the wing holds it."
	case t.Err != nil:
		return sentence(units.Explain(t.Err).In(sys))
	}
	return fmt.Sprintf("At %s the structure has to bear %s upwards and %s downwards. Designed to %s, as entered.", sys.Format(units.Mass, t.Diagram.Mass),
		extremeWords(t.Diagram.Greatest, sys), extremeWords(t.Diagram.Smallest, sys), t.Design.Rule)
}

func extremeWords(x loads.Extreme, sys units.System) string {
	by := "a manoeuvre"
	if x.Gust {
		by = "a gust"
	}
	return fmt.Sprintf("%s (%s at %s)", factor(x.Load), by, sys.Format(units.Speed, x.EAS))
}

// factor is a load factor as read.
func factor(n float64) string { return units.Fixed(n, 2) }

// speedGrid is the load factors at each design speed.
func speedGrid(t *study.Structure, sys units.System) Grid {
	d, g := &t.Design, t.Diagram
	p := Grid{Caption: "Design speeds", Note: "Equivalent airspeed, and true airspeed at the altitude set. Load factors within what lift reaches.",
		Head: []string{"Speed", "EAS" + unitOf(sys, units.Speed), "TAS" + unitOf(sys, units.Speed), "Manoeuvre up", "down", "Gust up", "down", "Envelope up", "down", "Governs up, down"}}
	for _, r := range []struct {
		label string
		v     float64
	}{
		{"VS, stall", g.Stall}, {"Stall, negative", g.NegativeStall}, {"VA, lift for the positive limit", g.Maneuver}, {"Lift for the negative limit", g.NegativeReach},
		{"VC, design cruising", d.Cruise}, {"VNE, never exceed", t.NeverExceed}, {"VD, design dive", d.Dive},
	} {
		row := []string{r.label, sys.Number(units.Speed, r.v), sys.Number(units.Speed, t.Air.FromEAS(atmos.EAS(r.v))), "–", "–", "–", "–", "–", "–", "beyond VD"}
		if q, ok := g.Load(r.v); ok {
			for i, n := range []float64{min(q.Maneuver.Up, q.Lift.Up), max(q.Maneuver.Down, q.Lift.Down), min(q.Gust.Up, q.Lift.Up), max(q.Gust.Down, q.Lift.Down), q.Envelope.Up, q.Envelope.Down} {
				row[3+i] = factor(n)
			}
			row[9] = governing(q)
		}
		p.Rows = append(p.Rows, row)
	}
	return p
}

// governing says what bounds the envelope upwards and downwards.
func governing(q loads.Point) string {
	up, down := bound(q.Lift.Up, q.Maneuver.Up, q.Gust.Up), bound(-q.Lift.Down, -q.Maneuver.Down, -q.Gust.Down)
	if up == down {
		return "both " + up
	}
	return up + ", " + down
}

// bound names which of lift and the stronger of manoeuvre and gust ends the envelope.
func bound(lift, maneuver, gust float64) string {
	const same = 1e-9
	switch {
	case lift < max(maneuver, gust)-same:
		return "stall"
	case gust > maneuver+same:
		return "gust"
	}
	return "manoeuvre"
}

// structureFacts are what the gusts rest on.
func structureFacts(t *study.Structure, sys units.System) []Row {
	d, g := &t.Design, t.Diagram
	rows := []Row{
		{Label: "Limit load factors", Value: factor(d.Positive) + " / " + factor(d.Negative), Remark: "up to VC; downwards " + factor(d.NegativeDive) + " at VD"},
		{Label: "Gusts", Value: sys.Format(units.Speed, g.CruiseGust.Velocity), Remark: "at VC, up and down; " + sys.Format(units.Speed, g.DiveGust.Velocity) + " at VD"},
		{Label: "Wing loading", Value: sys.Format(units.WingLoading, g.Loading), Remark: "at the mass set"},
		{Label: "Mean chord", Value: sys.Format(units.Length, d.Chord)},
		{Label: "Lift-curve slope", Value: factor(d.Slope), Remark: "per radian"},
		{Label: "Gust alleviation", Value: factor(g.Alleviation), Remark: "mass ratio " + units.Fixed(g.MassRatio, 1)},
	}
	if l := &d.Least; l.Cruise > 0 {
		remark := "VC; " + sys.Format(units.Speed, l.Dive) + " for VD, at the greatest take-off mass"
		if t.Relief > 0 {
			remark += "; VC need not be above 0.9 of the level maximum at sea level, " + sys.Format(units.Speed, t.Relief)
		}
		rows = append(rows, Row{Label: "Least by the rule", Value: sys.Format(units.Speed, l.Cruise), Remark: remark})
	}
	return rows
}

// loadGrid is the envelope against mass: a lighter aeroplane is moved more by a gust.
func loadGrid(t *study.Structure, sys units.System) Grid {
	g := Grid{Caption: "Against mass", Note: "A lighter aeroplane is moved more by the same gust, and reaches its limit at a lower speed: look at the lightest mass flown too.",
		Head: []string{"Mass", unitHead(sys, units.Mass), "VS" + unitOf(sys, units.Speed), "VA" + unitOf(sys, units.Speed), "Gust at VC up", "down", "Envelope up", "down"}}
	for i := range t.Masses {
		c := &t.Masses[i]
		row := []string{sentenceHead(c.Label), sys.Number(units.Mass, c.Mass), "–", "–", "–", "–", "–", "–"}
		if c.Err != nil {
			if g.Reason == "" {
				g.Reason = sentence(units.Explain(c.Err).In(sys))
			}
			g.Rows = append(g.Rows, row)
			continue
		}
		q := c.Diagram
		row[2], row[3] = sys.Number(units.Speed, q.Stall), sys.Number(units.Speed, q.Maneuver)
		for k, n := range []float64{q.CruiseGust.Up, q.CruiseGust.Down, q.Greatest.Load, q.Smallest.Load} {
			row[4+k] = factor(n)
		}
		g.Rows = append(g.Rows, row)
	}
	return g
}

// limitRow is the structural limit beside the turns.
func limitRow(t *study.Structure) Row {
	if !t.Given {
		return Row{Label: "Structural limit", Value: "not entered", Remark: "no load factor here says that the wing holds it"}
	}
	return Row{Label: "Structural limit", Value: factor(t.Design.Positive), Remark: t.Design.Rule + ", as entered"}
}

// turnLimit is the caution about load factors in turns.
func turnLimit(t *study.Structure) string {
	if !t.Given {
		return "The structural limit is not entered, so none is drawn: a load factor shown here is no leave to pull it."
	}
	return "The structural limit is the one that was entered: nothing here has checked that the wing holds it."
}

// limitSummary is the structural limits in a line.
func limitSummary(a *aircraft.Aircraft, sys units.System) string {
	d, ok := a.Structure(nil)
	if !ok {
		return "not entered"
	}
	return fmt.Sprintf("%s / %s · VC %s · VD %s", factor(d.Positive), factor(d.Negative), sys.Number(units.Speed, d.Cruise), sys.Format(units.Speed, d.Dive))
}
