package views

import (
	"cmp"
	"fmt"
	"math"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A ClimbPage is what an aircraft does over speed and altitude.
type ClimbPage struct {
	Frame
	Lead     string
	View     ViewForm
	Rates    ChartView
	RateRows Speeds
	Envelope ChartView
	Bounds   []Row
	Ceilings Grid
	ToClimb  Grid
	Glides   []Grid // one for each altitude
	Wind     string // what over the ground means
	Glide    string // caution about the propeller
	Loads    ChartView
	Facts    []Row // of the sustained turn
	Turns    Grid
	Limit    string // caution about load factors in turns
	Structure
}

// NewClimbPage makes the page of a study's envelope.
func NewClimbPage(s *study.Study, e *study.Envelope, t *study.Structure, f Frame) ClimbPage {
	sys := s.Project.Spec.System()
	sized := func(c charts.Chart, width, height float64) ChartView {
		c.Width, c.Height = width, height
		return chartView(c)
	}
	p := ClimbPage{Frame: f, View: newViewForm(s, sys, f), Lead: climbLead(s, e, sys),
		Rates: sized(charts.RateCurvesChart(s, e, sys), 800, 360), Loads: sized(charts.LoadChart(s, e, t, sys), 800, 340)}
	envelope := charts.EnvelopeChart(s, e, sys)
	p.Envelope = sized(envelope, 800, 460)
	p.Envelope.Table = charts.EnvelopeTable(envelope, e, sys)
	p.RateRows, p.Bounds = rateRows(e, sys), bounds(s, e, sys)
	p.Ceilings, p.ToClimb = ceilingGrid(s, e, sys), climbGrid(s, sys)
	p.Glides, p.Glide = glideGrids(e, sys), glideCaution(e)
	p.Wind = fmt.Sprintf("In calm air, and over the ground against %s of head wind. %s.", sys.Format(units.Speed, e.HeadWind), sentenceHead(s.View.Config.String()))
	p.Facts, p.Turns, p.Limit = turnFacts(s, e, t, sys), turnGrid(s, e, sys), turnLimit(t)
	p.Structure = newStructure(s, e, t, sys, &f)
	structure := charts.StructureChart(s, t, sys)
	p.Structure.Chart = sized(structure, 800, 420)
	p.Structure.Chart.Table = charts.StructureTable(structure)
	return p
}

// climbLead answers in a sentence how well it climbs and how high.
func climbLead(s *study.Study, e *study.Envelope, sys units.System) string {
	if e.Absolute.Err != nil {
		return sentence(units.Explain(e.Absolute.Err).In(sys))
	}
	tail := fmt.Sprintf("no service ceiling, absolute ceiling %s.", sys.Format(units.Altitude, e.Absolute.Value))
	if e.Service.Err == nil {
		tail = fmt.Sprintf("service ceiling %s, absolute ceiling %s.", sys.Format(units.Altitude, e.Service.Value), sys.Format(units.Altitude, e.Absolute.Value))
	}
	if len(e.Curves) > 0 && e.Curves[0].Rate.Err == nil {
		c := e.Curves[0]
		if c.Rate.Value < 0 {
			return fmt.Sprintf("Does not hold %s: it sinks at %s at best. %s", sys.Format(units.Altitude, c.Altitude), sys.Format(units.ClimbRate, -c.Rate.Value), sentence(tail))
		}
		return fmt.Sprintf("Climbs at %s at best, at %s; %s", sys.Format(units.ClimbRate, c.Rate.Value), sys.Format(units.Altitude, c.Altitude), tail)
	}
	return sentence(tail)
}

// rateRows lists the speeds of best rate and best angle at each altitude.
func rateRows(e *study.Envelope, sys units.System) Speeds {
	t := Speeds{Unit: sys.Unit(units.Speed).Symbol}
	for i := range e.Curves {
		c := &e.Curves[i]
		r := SpeedRow{Label: sys.Format(units.Altitude, c.Altitude), TAS: "none"}
		if c.Rate.Err != nil {
			r.Remark = sentence(units.Explain(c.Rate.Err).In(sys))
			t.Rows = append(t.Rows, r)
			continue
		}
		r.TAS, r.CAS = sys.Number(units.Speed, c.Rate.TAS), sys.Number(units.Speed, float64(c.Air.CAS(c.Rate.TAS)))
		r.There = sys.Format(units.ClimbRate, c.Rate.Value)
		if c.Angle.Err == nil {
			r.Remark = fmt.Sprintf("best angle %s, at %s CAS", sys.Format(units.Angle, c.Angle.Value), sys.Format(units.Speed, float64(c.Air.CAS(c.Angle.TAS))))
			if c.Angle.Bound != "" {
				r.Remark += ", " + c.Angle.Bound
			}
		}
		t.Rows = append(t.Rows, r)
	}
	return t
}

// bounds are the ends of the envelope in words.
func bounds(s *study.Study, e *study.Envelope, sys units.System) []Row {
	height := func(label string, at study.Altitude) Row {
		if at.Err != nil {
			return Row{Label: label, Value: "none", Remark: sentence(units.Explain(at.Err).In(sys))}
		}
		return Row{Label: label, Value: sys.Format(units.Altitude, at.Value)}
	}
	service := height("Service ceiling", e.Service)
	if e.Service.Err == nil {
		service.Remark = "best rate " + sys.Format(units.ClimbRate, pointperf.ServiceRate) + " left"
	}
	absolute := height("Absolute ceiling", e.Absolute)
	if e.Absolute.Err == nil {
		absolute.Remark = "no climb left"
	}
	rows := []Row{service, absolute}
	if best, hp, ok := e.Grid.Most(); ok {
		rows = append(rows, Row{Label: "Most excess power", Value: sys.Format(units.ClimbRate, best.Excess), Remark: sys.Format(units.Altitude, hp) + ", " + sys.Format(units.Speed, best.TAS)})
	}
	if low, high := s.Speeds.LevelMin, s.Speeds.LevelMax; low.Err != nil && low.Err == high.Err {
		rows = append(rows, speedBound("Level flight", s, low, sys))
	} else {
		rows = append(rows, speedBound("Slowest level flight", s, low, sys), speedBound("Fastest level flight", s, high, sys))
	}
	return append(rows, Row{Label: "Never exceed", Value: sys.Format(units.Speed, s.Aircraft().NeverExceed()), Remark: "CAS, as entered"})
}

func speedBound(label string, s *study.Study, b pointperf.Best, sys units.System) Row {
	if b.Err != nil {
		return Row{Label: label, Value: "none", Remark: sentence(units.Explain(b.Err).In(sys))}
	}
	remark := "TAS at " + sys.Format(units.Altitude, s.View.Altitude)
	if b.Bound != "" {
		remark += ", " + b.Bound
	}
	return Row{Label: label, Value: sys.Format(units.Speed, b.TAS), Remark: remark}
}

// altitudeCell is a ceiling in a table; an en dash stands for one that does not exist.
func altitudeCell(sys units.System, at study.Altitude) string {
	if at.Err != nil {
		return "–"
	}
	return sys.Number(units.Altitude, at.Value)
}

// ceilingGrid is the ceilings against mass.
func ceilingGrid(s *study.Study, e *study.Envelope, sys units.System) Grid {
	g := Grid{Caption: "Ceiling against mass", Note: fmt.Sprintf("ISA %s, %s; best rate at %s.", signed(sys, units.TemperatureStep, s.View.Deviation), s.View.Config, sys.Format(units.Altitude, s.View.Altitude)),
		Head: []string{"Mass", unitHead(sys, units.Mass), "Service ceiling" + unitOf(sys, units.Altitude), "Absolute ceiling" + unitOf(sys, units.Altitude), "Best rate" + unitOf(sys, units.ClimbRate)}}
	for i := range e.Ceilings {
		r := &e.Ceilings[i]
		rate := "–"
		if r.Rate.Err == nil {
			rate = sys.Number(units.ClimbRate, r.Rate.Value)
		}
		g.Rows = append(g.Rows, []string{sentenceHead(r.Label), sys.Number(units.Mass, r.Mass), altitudeCell(sys, r.Service), altitudeCell(sys, r.Absolute), rate})
		if err := cmp.Or(r.Absolute.Err, r.Service.Err); err != nil && g.Reason == "" {
			g.Reason = fmt.Sprintf("%s, %s: %s.", sentenceHead(r.Label), sys.Format(units.Mass, r.Mass), units.Explain(err).In(sys))
		}
	}
	return g
}

// unitHead is a column that holds numbers of a quantity which another column names.
func unitHead(sys units.System, q units.Quantity) string { return sys.Unit(q).Symbol }

// sentenceHead starts a label with a capital.
func sentenceHead(text string) string {
	whole := sentence(text)
	return whole[:len(whole)-1]
}

// glideGrids are the glides, one table for each altitude.
func glideGrids(e *study.Envelope, sys units.System) []Grid {
	var list []Grid
	for i := range e.Glides {
		r := &e.Glides[i]
		if i == 0 || r.Altitude != e.Glides[i-1].Altitude {
			list = append(list, Grid{Caption: "At " + sys.Format(units.Altitude, r.Altitude), Head: []string{"Mass", unitHead(sys, units.Mass), "Best glide ratio", "at CAS" + unitOf(sys, units.Speed),
				"Least sink" + unitOf(sys, units.ClimbRate), "at CAS" + unitOf(sys, units.Speed), "Against wind", "at CAS" + unitOf(sys, units.Speed)}})
		}
		g := &list[len(list)-1]
		row := []string{sentenceHead(r.Label), sys.Number(units.Mass, r.Mass), "–", "–", "–", "–", "–", "–"}
		if r.Err == nil {
			row[2], row[3] = units.Fixed(r.Glide.Ratio, 1), casNumber(r, r.Glide.RatioTAS, sys)
			row[4], row[5] = sys.Number(units.ClimbRate, r.Glide.Sink), casNumber(r, r.Glide.SinkTAS, sys)
		} else {
			g.Reason = fmt.Sprintf("%s, %s: %s.", sentenceHead(r.Label), sys.Format(units.Mass, r.Mass), units.Explain(r.Err).In(sys))
		}
		if r.WindErr == nil {
			row[6], row[7] = units.Fixed(r.Against.Ratio, 1), casNumber(r, r.Against.TAS, sys)
		} else if r.Err == nil {
			g.Reason = sentence(units.Explain(r.WindErr).In(sys))
		}
		g.Rows = append(g.Rows, row)
	}
	return list
}

func casNumber(r *study.GlideRow, tas float64, sys units.System) string {
	return sys.Number(units.Speed, float64(r.Air.CAS(tas)))
}

// glideCaution says what the propeller is taken to do.
func glideCaution(e *study.Envelope) string {
	const advice = " Do not plan a glide to reach the last metre: wind, sink and the turn towards the field come off it."
	for i := range e.Glides {
		if e.Glides[i].Glide.Windmills {
			return "The propeller is taken to windmill at idle, with the drag that its table gives; a stopped propeller glides differently." + advice
		}
	}
	return "The propeller is taken to give neither thrust nor drag at idle. A windmilling or stopped propeller has drag, so the real glide is steeper than this." + advice
}

func bankWords(t *pointperf.Turn) string { return units.Fixed(t.Bank*180/math.Pi, 0) + "°" }

// turnFacts are the ends of the sustained turn.
func turnFacts(s *study.Study, e *study.Envelope, t *study.Structure, sys units.System) []Row {
	best := study.LoadAt{}
	for _, l := range e.Loads {
		if l.Sustained > best.Sustained {
			best = l
		}
	}
	if best.Sustained <= 1 {
		why := "No level turn is sustained at " + sys.Format(units.Altitude, s.View.Altitude) + "."
		if e.LoadsErr != nil {
			why = sentence(units.Explain(e.LoadsErr).In(sys))
		}
		return []Row{{Label: "Sustained turn", Value: "none", Remark: why}}
	}
	at := func(l study.LoadAt) string {
		return fmt.Sprintf("%.0f° bank, %s, ended by %s", math.Acos(1/l.Sustained)*180/math.Pi, sys.Format(units.Speed, l.TAS), map[bool]string{true: "thrust", false: "lift"}[l.Thrust])
	}
	tight := e.Tightest
	rows := []Row{{Label: "Most load factor sustained", Value: units.Fixed(best.Sustained, 2), Remark: at(best)},
		{Label: "Tightest sustained turn", Value: sys.Format(units.FieldLength, tight.Radius), Remark: at(tight)},
		{Label: "Full circle of it", Value: sys.Format(units.ShortTime, 2*math.Pi*tight.Radius/tight.TAS), Remark: fmt.Sprintf("%.1f°/s", tight.TAS/tight.Radius*180/math.Pi)}}
	if !tight.Thrust {
		rows[1].Remark += ": at the very edge of the stall"
	}
	return append(rows, limitRow(t))
}

// turnGrid is level turns at each bank angle.
func turnGrid(s *study.Study, e *study.Envelope, sys units.System) Grid {
	g := Grid{Caption: "Level turns at " + sys.Format(units.Altitude, s.View.Altitude), Note: "Each at the true airspeed that leaves most thrust in hand.",
		Head: []string{"Bank", "Load factor", "Keeps height", "Stall, CAS" + unitOf(sys, units.Speed), "TAS" + unitOf(sys, units.Speed), "Thrust required" + unitOf(sys, units.Force),
			"available" + unitOf(sys, units.Force), "Radius" + unitOf(sys, units.FieldLength), "Rate, °/s"}}
	for i := range e.Turns {
		t := &e.Turns[i]
		row := []string{bankWords(t), units.Fixed(t.Load, 2), "no", sys.Number(units.Speed, float64(s.Point.Air.CAS(t.Stall))), "–", "–", "–", "–", "–"}
		if t.Err != nil {
			if g.Reason == "" {
				g.Reason = fmt.Sprintf("No turn at %s of bank: %s.", bankWords(t), units.Explain(t.Err).In(sys))
			}
			g.Rows = append(g.Rows, row)
			continue
		}
		row[4], row[5], row[6] = sys.Number(units.Speed, t.TAS), sys.Number(units.Force, t.Required), sys.Number(units.Force, t.Available)
		if t.Sustained() {
			row[2] = "yes"
		}
		if t.Radius > 0 {
			row[7], row[8] = sys.Number(units.FieldLength, t.Radius), units.Fixed(t.Rate*180/math.Pi, 1)
		}
		g.Rows = append(g.Rows, row)
	}
	if e.LoadsErr != nil && len(e.Turns) == 0 {
		g.Reason = sentence(units.Explain(e.LoadsErr).In(sys))
	}
	return g
}
