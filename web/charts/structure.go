package charts

import (
	"fmt"
	"math"
	"slices"

	"legwright/internal/perf/loads"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// StructureChart draws the envelope of manoeuvre and gust over equivalent airspeed: what is
// inside, and what lift could reach beyond it.
func StructureChart(s *study.Study, e *study.Structure, sys units.System) Chart {
	speed, load := measureOf(sys, units.Speed, 0), measure{sys.Unit(units.Coefficient), 2}
	c := Chart{ID: "structure", X: Axis{Label: "equivalent airspeed", Unit: speed.unit.Symbol}, XFirst: "equivalent airspeed"}
	c.Title, c.Desc = structureWords(s, e, sys)
	p := Panel{Y: Axis{Label: "load factor"}}
	if e.Diagram == nil {
		p.Blank = structureReason(e, sys)
		c.Panels = []Panel{p}
		return c
	}
	d, g := &e.Design, e.Diagram
	c.X.Max = cover(speed.of(1.04 * d.Dive))
	p.Y.Min, p.Y.Max = structureReach(g)
	r := newLoadCurves(g, speed)
	p.Series = r.series(g, load)
	p.Bands = r.bands(p.Y, c.X.Max)
	end := load.series(diveLine, []float64{speed.of(d.Dive), speed.of(d.Dive)}, []float64{g.Points[len(g.Points)-1].Envelope.Down, g.Points[len(g.Points)-1].Envelope.Up}, "available")
	p.Series = append(p.Series, end)
	p.Lines = []HLine{{1, "level flight"}}
	p.Flags = structureFlags(g, speed)
	c.Marks = structureMarks(e, speed)
	c.Panels = []Panel{p}
	return c
}

// diveLine closes the envelope at VD; it is drawn and not tabulated.
const diveLine = "design dive speed"

// StructureTable is the load factors behind the chart.
func StructureTable(c Chart) Table {
	panels := slices.Clone(c.Panels)
	for i := range panels {
		panels[i].Series = slices.DeleteFunc(slices.Clone(panels[i].Series), func(s Series) bool { return s.Name == diveLine })
	}
	c.Panels = panels
	return c.Table()
}

// structureReach is the ends of the axis of load factors.
func structureReach(g *loads.Diagram) (low, high float64) {
	const room = 1.12
	low, high = min(g.Smallest.Load, g.Design.Negative, -1), max(g.Greatest.Load, g.Design.Positive, 2)
	return math.Floor(room * low), math.Ceil(room * high)
}

// loadCurves are the points of a diagram by what bounds them, in display units.
type loadCurves struct {
	x                        []float64
	up, down                 []float64 // of the envelope
	liftUp, liftDown         []float64
	maneuverUp, maneuverDown []float64 // where lift reaches them
	gustUp, gustDown         []float64
}

func newLoadCurves(g *loads.Diagram, speed measure) loadCurves {
	var r loadCurves
	for _, q := range g.Points {
		r.x = append(r.x, speed.of(q.EAS))
		r.up, r.down = append(r.up, q.Envelope.Up), append(r.down, q.Envelope.Down)
		r.liftUp, r.liftDown = append(r.liftUp, q.Lift.Up), append(r.liftDown, q.Lift.Down)
		r.gustUp, r.gustDown = append(r.gustUp, q.Gust.Up), append(r.gustDown, q.Gust.Down)
		r.maneuverUp, r.maneuverDown = append(r.maneuverUp, q.Maneuver.Up), append(r.maneuverDown, q.Maneuver.Down)
	}
	return r
}

func (r loadCurves) series(g *loads.Diagram, load measure) []Series {
	draw := func(name, label string, y []float64, class string, dash bool, at float64) Series {
		s := load.series(name, r.x, y, class)
		s.Label, s.Dash, s.LabelAt = label, dash, at
		return s
	}
	list := []Series{
		draw("positive stall", "stall", r.liftUp, "neutral", true, 0.3),
		draw("negative stall", "", r.liftDown, "neutral", true, -1),
	}
	if g.CruiseGust.Velocity > 0 || g.DiveGust.Velocity > 0 {
		list = append(list, draw("gust up", "gust up", r.gustUp, "rate", true, 0.55), draw("gust down", "gust down", r.gustDown, "rate", true, 0.55))
	}
	return append(list,
		draw("manoeuvre up", "", r.maneuverUp, "none", false, -1), draw("manoeuvre down", "", r.maneuverDown, "none", false, -1),
		draw("envelope, upper", "", r.up, "available", false, -1), draw("envelope, lower", "", r.down, "available", false, -1))
}

// bands shade the envelope and hatch what lift reaches beyond it, from where the stall is no longer its end, and what lies beyond VD.
func (r loadCurves) bands(y Axis, fastest float64) []Band {
	top, bottom := slices.Clone(r.liftUp), slices.Clone(r.liftDown)
	for i := range top {
		top[i], bottom[i] = min(top[i], y.Max), max(bottom[i], y.Min)
		if top[i] <= r.up[i] && i+1 < len(top) && r.liftUp[i+1] <= r.up[i+1] {
			top[i] = math.NaN()
		}
		if bottom[i] >= r.down[i] && i+1 < len(top) && r.liftDown[i+1] >= r.down[i+1] {
			bottom[i] = math.NaN()
		}
	}
	last := r.x[len(r.x)-1]
	return []Band{
		{X: r.x, Lower: r.down, Upper: r.up, Class: "hand", Label: "inside the limits"},
		{X: r.x, Lower: r.up, Upper: top, Class: "short"},
		{X: r.x, Lower: bottom, Upper: r.down, Class: "short"},
		{X: []float64{last, fastest}, Lower: []float64{y.Min, y.Min}, Upper: []float64{y.Max, y.Max}, Class: "short", Label: "beyond VD"},
	}
}

// structureMarks are the design speeds.
func structureMarks(e *study.Structure, speed measure) []Mark {
	d, g := &e.Design, e.Diagram
	mark := func(name string, v float64) Mark {
		return Mark{speed.of(v), name + " " + readNumber(speed.of(v), speed.decimals)}
	}
	return []Mark{mark("VS", g.Stall), mark("VA", g.Maneuver), mark("VC", d.Cruise), mark("VNE", e.NeverExceed), mark("VD", d.Dive)}
}

// structureFlags are the extremes of the envelope.
func structureFlags(g *loads.Diagram, speed measure) []Flag {
	flag := func(x loads.Extreme) Flag {
		return Flag{X: speed.of(x.EAS), Y: x.Load, Class: "available", Label: fmt.Sprintf("%s, %s", readNumber(x.Load, 2), governs(x))}
	}
	return []Flag{flag(g.Greatest), flag(g.Smallest)}
}

func governs(x loads.Extreme) string {
	if x.Gust {
		return "gust"
	}
	return "manoeuvre"
}

// structureReason says why there is no envelope.
func structureReason(e *study.Structure, sys units.System) string {
	if !e.Given {
		return "structural limits are not entered"
	}
	return reason(sys, e.Err)
}

func structureWords(s *study.Study, e *study.Structure, sys units.System) (title, desc string) {
	v := s.View
	head := fmt.Sprintf("Load factor against equivalent airspeed, %s, %s, flaps and gear up", massWords(sys, v.Mass), sys.Format(units.Altitude, v.Altitude))
	if e.Diagram == nil {
		why := structureReason(e, sys)
		return head + ": " + why + ".", "There is no envelope of manoeuvre and gust to draw: " + why + "."
	}
	d, g := &e.Design, e.Diagram
	up, down := g.Greatest, g.Smallest
	title = fmt.Sprintf("%s: from %s to %s.", head, readNumber(down.Load, 2), readNumber(up.Load, 2))
	desc = fmt.Sprintf("The limits of manoeuvre are %s and %s; gusts of %s at VC and %s at VD give %s and %s at VC. The greatest load factor, %s, comes of a %s at %s; the smallest, %s, of a %s at %s. Hatched is what lift reaches beyond the limits, and what lies beyond VD.",
		readNumber(d.Positive, 2), readNumber(d.Negative, 2), sys.Format(units.Speed, g.CruiseGust.Velocity), sys.Format(units.Speed, g.DiveGust.Velocity), readNumber(g.CruiseGust.Up, 2), readNumber(g.CruiseGust.Down, 2),
		readNumber(up.Load, 2), governs(up), sys.Format(units.Speed, up.EAS), readNumber(down.Load, 2), governs(down), sys.Format(units.Speed, down.EAS))
	return title, desc
}
