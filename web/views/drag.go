package views

import (
	"fmt"
	"math"
	"strconv"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/input"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A DragPage is the drag polar and the greatest lift of a variant, said in every way.
type DragPage struct {
	Frame
	Lead    string
	Mass    string // at which the speeds hold
	Polar   ChartView
	Ratio   ChartView
	Ways    []Row
	Fit     string // how well a parabola stands for a table, or why none does; empty where there is no table
	Unusual string // which of the numbers that follow lie outside their typical range; empty when none does
	Lift    Grid
	Build   Grid
	Method  string        // of the build-up; empty when there is no list
	Warn    []WarningView // about what the drag rests on
}

// NewDrag makes the page.
func NewDrag(s *study.Study, f Frame) DragPage {
	sys := s.Project.Spec.System()
	spec := &s.Variant().Aircraft
	sized := func(c charts.Chart, width, height float64) ChartView {
		c.Width, c.Height = width, height
		return chartView(c)
	}
	curves := s.Polars()
	p := DragPage{Frame: f, Polar: sized(charts.PolarChart(s, curves, sys), 560, 340), Ratio: sized(charts.RatioChart(s, curves, sys), 560, 340)}
	p.Mass = fmt.Sprintf("At %s, the mass of the bench's charts; out of ground effect, without the propeller.", sys.Format(units.Mass, s.View.Mass))
	p.ways(spec, sys)
	p.Lift = liftGrid(spec, curves, sys)
	p.Build = buildGrid(s, sys)
	if len(spec.Airframe.Components) > 0 {
		p.Method = fmt.Sprintf("Friction of a smooth flat plate at %s TAS, %s, standard day: laminar after Blasius, turbulent after Prandtl and Schlichting, with Prandtl's correction for the laminar run. Form factors: Raymer 1992, Hoerner 1965. The working has each step.",
			sys.Format(units.Speed, spec.Airframe.FrictionTAS), sys.Format(units.Altitude, spec.Airframe.FrictionAlt))
	}
	p.Warn = concerning(warnings(s.Warnings, sys), "airframe")
	return p
}

// ways says the clean polar in each way in which it can be given, the present one first named in the lead.
func (p *DragPage) ways(spec *aircraft.Spec, sys units.System) {
	given := ""
	for _, o := range aircraft.DragWays {
		if o.Value == spec.Airframe.DragGiven {
			given = o.Label
		}
	}
	p.Lead = fmt.Sprintf("Given as %s. Choosing another way on the bench fills it with what stands here.", given)
	e, err := spec.Equivalent()
	if err != nil {
		p.Fit, _ = polarSays(spec, sys)
		return
	}
	p.Ways = []Row{
		{Label: "CDmin and e", Value: figures3(e.CDMin) + " and " + figures3(e.Efficiency), Remark: "K " + figures3(e.K) + ", CL at minimum drag " + figures3(e.CLMinDrag)},
		{Label: "Flat-plate area f", Value: sys.Format(units.DragArea, e.DragArea), Remark: "CDmin times the wing area; it compares aircraft of different sizes"},
		{Label: "Best L/D", Value: figures3(e.GlideRatio) + " at " + sys.Format(units.Speed, e.GlideSpeed) + " EAS", Remark: fmt.Sprintf("at %s, CL %s, without propeller drag", sys.Format(units.Mass, e.Mass), figures3(e.GlideCL))},
	}
	p.Unusual = e.Unusual
	if e.Fitted {
		p.Fit = fmt.Sprintf("These are of the parabola that comes nearest to the table: its CD is within %s of every row, %s in the root mean square. The table itself is flown.", figures3(residual(e.Worst)), figures3(residual(e.RMS)))
	}
}

// liftGrid is the greatest lift in each configuration.
func liftGrid(spec *aircraft.Spec, curves []study.PolarCurve, sys units.System) Grid {
	g := Grid{Caption: "Greatest lift", Note: "Stall speeds are calibrated, at sea level, with the wings level and no help from power.",
		Head: []string{"Configuration", "Given as", "CLmax", "Stall, CAS" + unitOf(sys, units.Speed), "at" + unitOf(sys, units.Mass), "Least CD", "Best L/D"}}
	for i, c := range []*aircraft.Configuration{&spec.Airframe.Clean, &spec.Airframe.TakeOff, &spec.Airframe.Landing} {
		k, given := &curves[i], "CLmax"
		if c.LiftGiven == aircraft.ByStall {
			given = "stall speed"
		}
		at := spec.Stall(k.Config)
		g.Rows = append(g.Rows, []string{sentenceHead(k.Config.String()), given, figures3(at.CLMax), sys.Number(units.Speed, at.Speed), sys.Number(units.Mass, at.Mass), figures3(k.Least), figures3(k.Best.Ratio())})
	}
	return g
}

// componentWords are the kinds of component as the table names them.
func componentWords(kind string) string {
	for _, o := range dragbuild.Kinds {
		if o.Value == kind {
			return o.Label
		}
	}
	return kind
}

// buildGrid is the build-up by component.
func buildGrid(s *study.Study, sys units.System) Grid {
	f := &s.Variant().Aircraft.Airframe
	g := Grid{Caption: "Build-up by component", Head: []string{"Component", "Kind", "Re, millions", "Friction Cf", "Form", "Interference", "Drag area" + unitOf(sys, units.DragArea), "CD", "Share, %"}}
	used := f.DragGiven == aircraft.ByBuildUp
	if !used && len(f.Components) == 0 {
		g.Note = "No component is listed. Choose the component build-up on the bench, and add wing, tail, fuselage and what sticks out."
		return g
	}
	sum, err := s.BuildUp()
	if err != nil {
		for _, e := range input.Errors(err) {
			g.Reason = joined(g.Reason, sentence(e.Sentence(sys)))
		}
		return g
	}
	if !used {
		sum.DragArea -= sum.Unlisted
		sum.Unlisted = 0
		g.Note = "The drag is given in another way; the list is kept, and is a check on it."
	}
	line := func(name, kind string, area float64) []string {
		share := "–"
		if sum.DragArea > 0 {
			share = units.Fixed(100*area/sum.DragArea, 1)
		}
		return []string{name, kind, "–", "–", "–", "–", sys.Number(units.DragArea, area), fixed5(area / f.WingArea), share}
	}
	for _, p := range sum.Parts {
		row := line(p.Name, componentWords(p.Kind), p.DragArea)
		if p.Reynolds > 0 {
			row[2], row[3], row[4], row[5] = significant3(p.Reynolds/1e6), fixed5(p.Friction), units.Fixed(p.Form, 3), units.Fixed(p.Interference, 2)
		}
		g.Rows = append(g.Rows, row)
	}
	g.Rows = append(g.Rows, line("Leakage and protuberances", units.Fixed(100*f.Leakage, 0)+" % of the above", sum.Leakage))
	if sum.Unlisted != 0 {
		g.Rows = append(g.Rows, line("Not in the list", "as given", sum.Unlisted))
	}
	g.Rows = append(g.Rows, line("Together", "CDmin", sum.DragArea))
	return g
}

func fixed5(v float64) string { return units.Fixed(v, 5) }

// significant3 writes a positive number with three significant digits, trailing zeros kept.
func significant3(v float64) string {
	if !(v > 0) {
		return "0"
	}
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', 3, 64), 64)
	if err != nil {
		r = v
	}
	return units.Fixed(r, max(0, 2-int(math.Floor(math.Log10(r)))))
}
