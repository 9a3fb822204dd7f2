package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// FieldAltitudeChart draws the distances of a take-off or landing across density altitude.
func FieldAltitudeChart(f *study.Field, sys units.System) Chart {
	return fieldChart(f, sys, fieldAxis{"altitude", "density altitude", units.Altitude,
		func(p *study.FieldPoint) float64 { return p.Density }, f.ByAltitude, f.Present.Place.Air.DensityAltitude})
}

// FieldMassChart draws the distances of a take-off or landing across mass; limit is
// the greatest take-off mass in kg.
func FieldMassChart(f *study.Field, sys units.System, limit float64) Chart {
	c := fieldChart(f, sys, fieldAxis{"mass", "mass", units.Mass,
		func(p *study.FieldPoint) float64 { return p.Mass }, f.ByMass, func() float64 { return f.Present.Mass }})
	m := measureOf(sys, units.Mass, limit)
	c.Marks = []Mark{{m.of(limit), "max take-off " + m.label(limit)}}
	return c
}

// A fieldAxis is what a distance is drawn across.
type fieldAxis struct {
	id, noun string
	quantity units.Quantity
	at       func(*study.FieldPoint) float64
	points   []study.FieldPoint
	present  func() float64
}

// fieldChart draws distance over the obstacle, ground roll and factored distance.
func fieldChart(f *study.Field, sys units.System, a fieldAxis) Chart {
	present := &f.Present
	top, lined := fieldTop(f, a)
	m := measureOf(sys, units.FieldLength, 0)
	across := measureOf(sys, a.quantity, span(a))
	p := Panel{Y: Axis{Label: "distance", Unit: m.unit.Symbol, Min: 0, Max: cover(1.04 * m.of(top))}}
	var x, total, roll, factored []float64
	for i := range a.points {
		if q := &a.points[i]; q.Has() {
			x = append(x, steady(across.of(a.at(q))))
			total, roll, factored = append(total, q.Run.Total), append(roll, q.Run.Ground), append(factored, q.Run.Factored)
		}
	}
	if len(x) == 0 {
		p.Y.Max = 0
		p.Blank = "no " + verb(f) + " at any of them"
		if len(a.points) > 0 {
			p.Blank = "no " + verb(f) + ": " + reason(sys, a.points[0].Err)
		}
	} else {
		over := "over " + measureOf(sys, units.Height, 0).label(present.Place.Strip.Obstacle)
		p.Series = []Series{m.series("ground roll", x, roll, "neutral"), m.series(over, x, total, "available"),
			m.series("with safety factor", x, factored, "required")}
		p.Series[0].LabelAt, p.Series[1].LabelAt, p.Series[2].LabelAt = 0.8, 0.5, 0.2
		p.Series[2].Dash = true
		if lined {
			p.Lines = []HLine{{m.of(present.Place.Strip.Length), "strip " + m.label(present.Place.Strip.Length)}}
		}
		if present.Err == nil {
			p.Flags = []Flag{{X: steady(across.of(a.present())), Y: m.of(present.Run.Total), Label: "here " + m.label(present.Run.Total), Class: "available"}}
		}
	}
	return Chart{ID: "field-" + verb(f) + "-" + a.id, Title: fieldTitle(f, sys, a, m), Desc: fieldDesc(f, sys, a, m),
		X: Axis{Label: a.noun, Unit: across.unit.Symbol}, Panels: []Panel{p}}
}

// steady rounds off what an iteration leaves, so that sea level is not below 0.
func steady(v float64) float64 { return math.Round(v*1e6)/1e6 + 0 }

func span(a fieldAxis) float64 {
	if len(a.points) == 0 {
		return 0
	}
	return a.at(&a.points[len(a.points)-1])
}

// fieldTop is the end of the distance axis in m, and whether the strip's length is on it.
// Close to where there is no take-off any more distances grow without bound; a strip far
// longer than every distance would press them together.
func fieldTop(f *study.Field, a fieldAxis) (top float64, lined bool) {
	const most, far = 2.2, 2.5
	length := f.Present.Place.Strip.Length
	bound := most * length
	if f.Present.Err == nil {
		bound = max(bound, most*f.Present.Run.Factored)
	}
	least := 0.0
	for i := range a.points {
		if q := &a.points[i]; q.Has() {
			top = max(top, q.Run.Factored)
			if least == 0 || q.Run.Total < least {
				least = q.Run.Total
			}
		}
	}
	top = max(min(top, bound), 1.5*least)
	if lined = length <= far*top; lined {
		top = max(top, length)
	}
	return top, lined
}

func fieldTitle(f *study.Field, sys units.System, a fieldAxis, m measure) string {
	head := sentenceCase(verb(f)) + " distance across " + a.noun
	if f.Present.Err != nil {
		return head + ": no " + verb(f) + " at the present condition."
	}
	return fmt.Sprintf("%s: %s at %s, and the strip has %s.", head, m.prose(f.Present.Run.Total), measureOf(sys, a.quantity, span(a)).prose(a.present()), m.prose(f.Present.Place.Strip.Length))
}

// fieldDesc says where the distance begins and ends and why it ends early.
func fieldDesc(f *study.Field, sys units.System, a fieldAxis, m measure) string {
	across := measureOf(sys, a.quantity, span(a))
	var first, last, gone *study.FieldPoint
	for i := range a.points {
		switch q := &a.points[i]; {
		case q.Has() && first == nil:
			first, last = q, q
		case q.Has():
			last = q
		case gone == nil:
			gone = q
		}
	}
	text := ""
	if first != nil {
		text = fmt.Sprintf("Unfactored it grows from %s at %s to %s at %s.", m.prose(first.Run.Total), across.prose(a.at(first)), m.prose(last.Run.Total), across.prose(a.at(last)))
	}
	switch {
	case gone != nil && first == nil:
		text = fmt.Sprintf("There is no %s: %s.", verb(f), reason(sys, gone.Err))
	case gone != nil && a.at(gone) > 0:
		text += fmt.Sprintf(" At %s there is none: %s.", across.prose(a.at(gone)), reason(sys, gone.Err))
	}
	return text
}
