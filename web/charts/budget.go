package charts

import (
	"fmt"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// MissionShares shows where time and fuel go: one row for each leg that takes any, those
// of the reserve hatched, then what contingencies keep and what is left over. Where no
// fuel is aboard it shows the charge. The whole of the fuel is what is usable at the start.
func MissionShares(s *study.Study, sys units.System) Shares {
	b := newBudget(s, sys)
	d := Shares{ID: "mission-shares", Columns: []Whole{
		{Name: "Time", Unit: "min", Label: hours(b.time), Class: "available", Decimals: 1},
		{Name: b.name, Unit: b.m.unit.Symbol, Label: b.m.label(b.full) + " at the start", Class: "energy", Decimals: b.m.decimals},
	}, Note: "Filled: the trip. Hatched: the reserve as flown. Outlined: kept by contingencies or left over at the end."}
	if b.time <= 0 {
		d.Title, d.Blank = "Where time and "+lowerName(b.name)+" go: no leg is flown.", "No leg is flown, so none takes time or "+lowerName(b.name)+"."
		d.Desc = d.Blank
		return d
	}
	for i := range s.Flight.Legs {
		b.leg(&d, i)
	}
	b.rest(&d)
	d.Title = fmt.Sprintf("Where time and %s go: %s and %s.", lowerName(b.name), hours(b.time), b.m.prose(b.full))
	d.Desc = b.words(&d)
	return d
}

// A budget is the wholes of a mission: its time in s and its fuel in kg, or charge in J.
type budget struct {
	*study.Study
	m          measure
	name       string
	start, end mission.Sample
	of         func(*mission.Sample) float64 // what is left in a sample
	time, full float64
	left, kept float64
}

func newBudget(s *study.Study, sys units.System) *budget {
	f := &s.Flight
	b := &budget{Study: s, name: "Fuel"}
	if n := len(f.Legs); n > 0 {
		b.start, b.end = f.Legs[0].Start, f.Legs[n-1].End
	}
	q := units.Mass
	b.of, b.kept = func(t *mission.Sample) float64 { return t.Fuel }, f.Reserve.Kept
	if b.start.Fuel == 0 && b.start.Charge > 0 {
		q, b.name, b.of, b.kept = units.Energy, "Charge", func(t *mission.Sample) float64 { return t.Charge }, f.Reserve.KeptEnergy
	}
	b.time, b.full, b.left = b.end.Time, b.of(&b.start), b.of(&b.end)
	b.m = measureOf(sys, q, b.full)
	return b
}

func lowerName(name string) string { return string(name[0]|0x20) + name[1:] }

// shareOf writes a share in percent.
func shareOf(part, whole float64) string {
	switch p := 100 * part / whole; {
	case whole <= 0:
		return "0\u00a0%"
	case p > 0 && p < 0.5:
		return "<\u20091\u00a0%"
	default:
		return readNumber(p, 0) + "\u00a0%"
	}
}

// leg adds the row of a leg that takes time or fuel.
func (b *budget) leg(d *Shares, i int) {
	l := &b.Flight.Legs[i]
	taken := b.of(&l.Start) - b.of(&l.End)
	if l.Time <= 0 && taken <= 0 {
		return
	}
	p := Part{Name: fmt.Sprintf("%d\u2009·\u2009%s", i+1, l.Leg.Title()), Fill: "solid"}
	if l.Leg.Spare() {
		p.Fill = "hatched"
	}
	p.Values = []float64{l.Time / 60, b.m.of(taken)}
	p.Labels = []string{minutes(l.Time) + ", " + shareOf(l.Time, b.time), b.m.label(taken) + ", " + shareOf(taken, b.full)}
	d.Parts = append(d.Parts, p)
}

// minutes is hours, with short times to the tenth of a minute.
func minutes(seconds float64) string {
	if seconds < 600 {
		return readNumber(seconds/60, 1) + "\u00a0min"
	}
	return hours(seconds)
}

// rest adds what is aboard at the end: what contingencies keep of it, and what is over.
func (b *budget) rest(d *Shares) {
	kept := min(b.kept, b.left)
	add := func(name string, v float64) {
		if v <= 0 {
			return
		}
		d.Parts = append(d.Parts, Part{Name: name, Fill: "open", Values: []float64{0, b.m.of(v)}, Labels: []string{"", b.m.label(v) + ", " + shareOf(v, b.full)}})
	}
	add("Kept by contingencies", kept)
	name := "Left over"
	if b.Flight.Failure != nil {
		name = "Left where it ends"
	}
	add(name, b.left-kept)
}

// words says the greatest parts for those who do not see the drawing.
func (b *budget) words(d *Shares) string {
	most := func(column int) *Part {
		best := &d.Parts[0]
		for i := range d.Parts {
			if d.Parts[i].Values[column] > best.Values[column] {
				best = &d.Parts[i]
			}
		}
		return best
	}
	time, fuel := most(0), most(1)
	text := fmt.Sprintf("Most time goes into %s: %s. The largest part of the %s is %s: %s.", time.Name, time.Labels[0], lowerName(b.name), fuel.Name, fuel.Labels[1])
	if f := b.Flight.Failure; f != nil {
		text += fmt.Sprintf(" The mission ends in “%s”; what comes after it is not in here.", f.Name)
	}
	return text
}
