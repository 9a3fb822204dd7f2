package views

import (
	"fmt"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A Plant is the page of a variant's powerplant and propeller.
type Plant struct {
	Frame
	Lead       string
	Reason     string // why there is nothing to show
	View       ViewForm
	Tiles      []Tile
	Cautions   []WarningView
	Speed      ChartView
	Efficiency ChartView
	Engine     []ChartView
	Propeller  []ChartView
	NoCurves   string // why engine and propeller have no charts of their own
	Given      Grid
	Points     Grid
	Remarks    []string // on points of the table
	Static     string
	Burn       string
	Basis      []Row
	BasisNote  string
}

// NewPlant makes the page of a study's powerplant.
func NewPlant(s *study.Study, frame Frame) Plant { return newPlant(s, s.Plant(), frame) }

func newPlant(s *study.Study, p *study.Plant, frame Frame) Plant {
	sys := s.Project.Spec.System()
	v := Plant{Frame: frame, View: newViewForm(s, sys, frame)}
	v.Basis, v.BasisNote = plantBasis(s, sys)
	if p.Err != nil {
		v.Reason = sentence(units.Explain(p.Err).In(sys))
		return v
	}
	v.Lead = plantLead(s, p, sys)
	v.Tiles = plantTiles(s, p, sys)
	v.Cautions = warnings(p.Cautions, sys)
	v.Given = givenGrid(p)
	v.charts(charts.NewPlantCharts(s, p, sys))
	if p.Curves == nil {
		v.NoCurves = "This kind of powerplant shows no curves of an engine or a propeller of its own; what it gives over speed stands above."
	}
	v.Points, v.Remarks = pointGrid(p, sys)
	v.Static, v.Burn = staticWords(s, p, sys), burnWords(p, sys)
	return v
}

// charts draws at about the width that the page gives, so that text keeps its size.
func (v *Plant) charts(c charts.PlantCharts) {
	sized := func(c charts.Chart, width, height float64) ChartView {
		c.Width, c.Height = width, height
		return chartView(c)
	}
	v.Speed, v.Efficiency = sized(c.Speed, 560, 430), sized(c.Efficiency, 560, 430)
	for _, e := range c.Engine {
		v.Engine = append(v.Engine, sized(e, 560, 330))
	}
	for _, e := range c.Propeller {
		width, height := 860.0, 500.0
		if len(v.Given.Rows) == 0 {
			width, height = 1160, 440
		}
		v.Propeller = append(v.Propeller, sized(e, width, height))
	}
}

// plantLead says in a sentence or two what the powerplant does where it matters.
func plantLead(s *study.Study, p *study.Plant, sys units.System) string {
	rest, fast := &p.Table[0], &p.Table[len(p.Table)-1]
	if rest.Err != nil {
		return "No thrust at rest on the strip: " + sentence(units.Explain(rest.Err).In(sys))
	}
	text := "At rest on " + s.TakeOff.Place.Strip.Name + " it pulls with " + sys.Format(units.Force, rest.Out.Thrust)
	if n := rest.Out.Shaft.EngineSpeed; n > 0 {
		text += " at " + sys.Format(units.Rotation, n)
	}
	text += fmt.Sprintf(", making %s of its rating.", sys.Format(units.Fraction, rest.Out.Fraction))
	if fast.Err != nil {
		return text + " There is no level maximum there: " + lowerFirst(sentence(units.Explain(fast.Err).In(sys)))
	}
	text += fmt.Sprintf(" At the level maximum there, %s, it pulls with %s", sys.Format(units.Speed, fast.TAS), sys.Format(units.Force, fast.Out.Thrust))
	if n := fast.Out.Shaft.EngineSpeed; n > 0 {
		text += " at " + sys.Format(units.Rotation, n)
	}
	return text + "."
}

// plantTiles are the few numbers that a builder asks for first.
func plantTiles(s *study.Study, p *study.Plant, sys units.System) []Tile {
	var list []Tile
	rest := &p.Table[0]
	if rest.Err == nil {
		list = append(list, Tile{Value: sys.Format(units.Force, rest.Out.Thrust), Caption: "static thrust on the strip"})
	}
	if p.Static.Has {
		list = append(list, Tile{Value: sys.Format(units.Fraction, p.Static.Share()), Caption: "of what momentum theory allows at rest"})
	}
	if rest.Err == nil && rest.Out.Shaft.EngineSpeed > 0 {
		t := Tile{Value: sys.Format(units.Rotation, rest.Out.Shaft.EngineSpeed), Caption: "at rest", Tone: toneOf(p.Cautions, "static-power")}
		if p.Curves != nil {
			t.Caption += ", rated " + sys.Format(units.Rotation, p.Curves.Engine().RatedSpeed)
		}
		list = append(list, t)
	}
	if f := s.Figure("tip_mach"); f.Has() {
		list = append(list, Tile{Value: units.Fixed(f.Value, 2), Caption: "greatest tip Mach at rest and on the mission", Tone: toneOf(s.Warnings, "tip-mach")})
	}
	for i := range list {
		if list[i].Tone != "" {
			list[i].Word = "see below"
		}
	}
	return list
}

// toneOf is the tone of the gravest warning with the code.
func toneOf(list []study.Warning, code string) string {
	tone := ""
	for _, w := range list {
		switch {
		case w.Code == code && w.Level == study.Stop:
			return "bad"
		case w.Code == code && w.Level == study.Caution:
			tone = "caution"
		}
	}
	return tone
}

// givenGrid is the propeller table as entered, with the efficiency that it means.
func givenGrid(p *study.Plant) Grid {
	g := Grid{Caption: "The table as entered", Note: "As far as the propeller absorbs power; the efficiency follows from it.", Head: []string{"J", "CT", "CP", "Efficiency, %"}}
	for _, r := range p.Given {
		row := []string{units.Fixed(r.J, 3), units.Fixed(r.CT, 4), units.Fixed(r.CP, 4), "–"}
		if r.Pulls {
			row[3] = units.Fixed(100*r.Efficiency, 1)
		}
		g.Rows = append(g.Rows, row)
	}
	return g
}

// pointGrid is the table of operating points, with remarks on those that do not exist or are held back.
func pointGrid(p *study.Plant, sys units.System) (Grid, []string) {
	g := Grid{Caption: "Operating points", Head: []string{"Point", "Where", "TAS" + unitOf(sys, units.Speed), "Lever, %", "Engine speed" + unitOf(sys, units.Rotation), "Share of rating, %",
		"Thrust" + unitOf(sys, units.Force), "Shaft power" + unitOf(sys, units.Power), "Efficiency, %", "J", "Tip Mach", "Fuel flow" + unitOf(sys, units.FuelFlow)}}
	said := map[string]int{}
	var about, remarks []string
	remark := func(name, text string) {
		if i, ok := said[text]; ok {
			about[i] += ", " + lowerFirst(name)
			return
		}
		said[text] = len(about)
		about, remarks = append(about, name), append(remarks, text)
	}
	for i := range p.Table {
		o := &p.Table[i]
		if o.Err == nil {
			g.Rows = append(g.Rows, pointRow(o, sys))
			if words := o.Out.Limits.Words(); len(words) > 0 {
				remark(o.Name, strings.Join(words, ", ")+".")
			}
			continue
		}
		row := []string{o.Name, "none, see below"}
		for range len(g.Head) - len(row) {
			row = append(row, "–")
		}
		g.Rows = append(g.Rows, row)
		remark(o.Name, sentence(units.Explain(o.Err).In(sys)))
	}
	for i := range remarks {
		remarks[i] = about[i] + ": " + lowerFirst(remarks[i])
	}
	return g, remarks
}

func pointRow(o *study.OperatingPoint, sys units.System) []string {
	row := []string{o.Name, o.Where.In(sys), sys.Number(units.Speed, o.TAS), units.Fixed(100*o.Setting, 0), "–", units.Fixed(100*o.Out.Fraction, 0),
		sys.Number(units.Force, o.Out.Thrust), "–", "–", "–", "–", sys.Number(units.FuelFlow, o.Out.FuelFlow)}
	if sh := &o.Out.Shaft; sh.Speed > 0 {
		row[4], row[7] = sys.Number(units.Rotation, sh.EngineSpeed), sys.Number(units.Power, sh.Power)
		row[9], row[10] = units.Fixed(sh.AdvanceRatio, 2), units.Fixed(sh.TipMach, 2)
		if o.TAS > 0 && sh.Efficiency > 0 {
			row[8] = units.Fixed(100*sh.Efficiency, 1)
		}
	}
	return row
}

// staticWords holds the static thrust against its bound.
func staticWords(s *study.Study, p *study.Plant, sys units.System) string {
	t := &p.Static
	if !t.Has {
		return "Nothing to hold the static thrust against: no propeller of known diameter turns at rest."
	}
	air := s.Project.Departure.Air
	return fmt.Sprintf("Static thrust %s is %s of the %s that momentum theory allows a disc of %s with %s of shaft power in air of %s (Glauert 1935, chapter II, without losses). A good propeller reaches 70 to 85 %% (common practice, no source); more than 90 %% asks for a look at the table.",
		sys.Format(units.Force, t.Thrust), sys.Format(units.Fraction, t.Share()), sys.Format(units.Force, t.Bound), sys.Format(units.Length, p.Curves.Propeller().Diameter),
		sys.Format(units.Power, t.Power), sys.Format(units.Density, air.Density))
}

// burnWords says which part of the consumption the mission uses.
func burnWords(p *study.Plant, sys units.System) string {
	b := &p.Burn
	if !b.Has {
		return "No consumption to show: no climb, cruise, loiter or reserve was flown on fuel."
	}
	span := func(q units.Quantity, low, high float64) string {
		if a, z := sys.Number(q, low), sys.Number(q, high); a != z {
			return a + " to " + sys.Format(q, high)
		}
		return sys.Format(q, high)
	}
	return fmt.Sprintf("In climb, cruise, loiter and reserve the mission runs the engine at %s of its rating and uses a consumption of %s per brake work, %s of fuel flow.",
		span(units.Fraction, b.LowShare, b.HighShare), span(units.Consumption, b.Low, b.High), span(units.FuelFlow, b.FlowLow, b.FlowHigh))
}

// plantBasis lists what the powerplant's numbers rest on, as entered.
func plantBasis(s *study.Study, sys units.System) ([]Row, string) {
	const prefix = "powerplant.values."
	var rows []Row
	tables, weak := []string{}, 0
	v := s.Variant()
	for _, e := range input.Walk(&v.Aircraft) {
		if e.Idle || (e.Number == nil && e.Table == nil) || !strings.HasPrefix(e.Path, prefix) || strings.HasPrefix(e.Path, prefix+"fuel.") {
			continue
		}
		b := v.BasisOf(e.Path)
		r := Row{Label: e.Label(), Remark: basisWords(e, b, sys)}
		if b.Kind == project.Placeholder {
			r.Remark, r.Why, weak = "", "placeholder", weak+1
		}
		if e.Number != nil {
			r.Value = sys.Format(e.Number.Quantity, *e.Number.Value)
		} else {
			part, _, _ := strings.Cut(strings.TrimPrefix(e.Path, prefix), ".")
			r.Label, r.Value = plantTitles[part]+" "+lowerFirst(e.Label()), tableWords(e.Table, sys)
			tables = append(tables, lowerFirst(r.Label)+" ("+project.BasisLabel(b.Kind)+")")
		}
		rows = append(rows, r)
	}
	note := "No tables were entered: the curves follow from single numbers."
	if len(tables) > 0 {
		note = "Read from tables as entered: " + strings.Join(tables, ", ") + "."
	}
	if weak > 0 {
		note += fmt.Sprintf(" Placeholders among these inputs: %d.", weak)
	}
	return rows, note
}

func basisWords(e input.Entry, b project.Basis, sys units.System) string {
	text := project.BasisLabel(b.Kind)
	if b.PlusMinus > 0 && e.Number != nil {
		text += ", ± " + sys.Entry(e.Number.Quantity, b.PlusMinus) + " " + sys.Unit(e.Number.Quantity).Symbol
	}
	if b.Note != "" {
		text += ", " + b.Note
	}
	return text
}

// tableWords says how long a table is and over what it runs.
func tableWords(t *input.Table, sys units.System) string {
	rows, q := *t.Value, t.Columns[0].Quantity
	text := fmt.Sprintf("%d rows", len(rows))
	if n := len(rows); n > 0 {
		text += ", " + sys.Number(q, rows[0][0]) + " to " + sys.Format(q, rows[n-1][0])
	}
	return text
}
