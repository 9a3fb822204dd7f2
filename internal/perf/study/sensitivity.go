package study

import (
	"cmp"
	"math"
	"slices"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A Driver is one input of the aircraft that is moved alone, down and up by a half width.
type Driver struct {
	Path     string // within the aircraft
	Label    string
	Column   int // of the table that is scaled, from 1; 0 for a number
	Quantity units.Quantity
	Value    float64 // in the SI unit of Quantity; 0 for a table
	Half     float64 // half width in the SI unit of Quantity, > 0; for a table a share, dimensionless
	Basis    string  // kind
	Stated   bool    // the half width is the user's own, and not that of the basis
}

// assumedShare is the half width, as a share of the value, of an input whose basis is
// rough and that states none; the other bases have none. Common practice, no source.
var assumedShare = map[string]float64{project.Estimated: 0.1, project.Placeholder: 0.2}

// AssumedShare is the half width assumed for an input of the basis without a stated one,
// as a share of the value, dimensionless; 0 for a basis that is taken at its word.
func AssumedShare(basis string) float64 { return assumedShare[basis] }

// Drivers lists the aircraft's inputs to be moved: those with a stated half width, and the
// estimated and placeholder ones by the share of their basis. A zero without a half width
// stays. Of a table each column but the first is scaled alone.
func (s *Study) Drivers() []Driver {
	var list []Driver
	v := s.Variant()
	for _, e := range inputsOf(&v.Aircraft) {
		b := v.BasisOf(e.Path)
		d := Driver{Path: e.Path, Label: e.Label(), Basis: b.Kind, Half: assumedShare[b.Kind]}
		if e.Table != nil {
			for i := 1; i < len(e.Table.Columns) && d.Half > 0; i++ {
				d.Column, d.Quantity = i, units.Fraction
				d.Label = e.Label()
				if c := e.Table.Columns[i].Label; c != d.Label {
					d.Label += ", column " + c
				}
				list = append(list, d)
			}
			continue
		}
		d.Quantity, d.Value = e.Number.Quantity, *e.Number.Value
		d.Half *= math.Abs(d.Value)
		if b.PlusMinus > 0 {
			d.Half, d.Stated = b.PlusMinus, true
		}
		if d.Half > 0 {
			list = append(list, d)
		}
	}
	return list
}

// An Outcome is what the study says with one input moved.
type Outcome struct {
	Input    float64 // as moved, within what is accepted, in the SI unit of the driver; for a table the factor
	Hand     float64 // thrust in hand at the tightest point over the thrust required, dimensionless
	HasHand  bool
	Value    float64 // of the figure watched, in its SI unit
	HasValue bool
	Flown    bool  // the whole mission with its reserve
	Err      error // why the document with the moved input is refused; then nothing else counts
}

// A Swing is a driver with what its two ends do.
type Swing struct {
	Driver
	Low, High Outcome
	Hand      float64 // greatest change of the thrust in hand, dimensionless, >= 0
	Share     float64 // greatest change of the figure watched over its limit, dimensionless, >= 0
	Breaks    bool    // an end keeps the mission from being flown that is flown now
}

// Watched is the requirement that is missed by the greatest share of its limit or, when none
// is missed, met by the smallest; nil when none can be judged.
func (s *Study) Watched() *Verdict {
	var worst *Verdict
	least := 0.0
	for i := range s.Requirements {
		v := &s.Requirements[i]
		if !v.Judged() {
			continue
		}
		if margin := v.Margin() / scaleOf(v); worst == nil || margin < least {
			worst, least = v, margin
		}
	}
	return worst
}

// scaleOf is what changes of the requirement's figure are measured by, in its SI unit, > 0.
func scaleOf(v *Verdict) float64 {
	if _, ok := v.Share(); ok {
		return math.Abs(v.Requirement.Limit)
	}
	return cmp.Or(math.Abs(v.Figure.Value), 1)
}

// Swing studies the variant twice, with the driver at its low and its high end and
// everything else as it is. It costs two studies.
func (s *Study) Swing(d Driver) Swing {
	w := Swing{Driver: d, Low: s.moved(d, -1), High: s.moved(d, 1)}
	now := s.outcome()
	watched := s.Watched()
	for _, o := range []*Outcome{&w.Low, &w.High} {
		if o.Err != nil {
			continue
		}
		if o.HasHand && now.HasHand {
			w.Hand = math.Max(w.Hand, math.Abs(o.Hand-now.Hand))
		}
		if o.HasValue && now.HasValue {
			w.Share = math.Max(w.Share, math.Abs(o.Value-now.Value)/scaleOf(watched))
		}
		w.Breaks = w.Breaks || (now.Flown && !o.Flown)
	}
	return w
}

// moved studies the variant with the driver moved by its half width in the direction, −1 or 1.
func (s *Study) moved(d Driver, direction float64) Outcome {
	spec := s.Project.Spec.Clone()
	e, ok := input.Find(&spec.Variants[s.Index].Aircraft, d.Path)
	if !ok {
		return Outcome{Err: units.Errorf(nil, "there is no input {}", units.Text(d.Path))}
	}
	moved := d.Value + direction*d.Half
	if d.Column > 0 {
		moved = 1 + direction*d.Half
		for _, row := range *e.Table.Value {
			row[d.Column] *= moved
		}
	} else {
		moved = math.Min(math.Max(moved, e.Number.Min), e.Number.Max)
		*e.Number.Value = moved
	}
	p, err := spec.Build()
	if err != nil {
		return Outcome{Input: moved, Err: err}
	}
	o := Run(p, s.Index, DefaultView(p, s.Index)).outcomeOf(s.Watched())
	o.Input = moved
	return o
}

func (s *Study) outcome() Outcome { return s.outcomeOf(s.Watched()) }

// outcomeOf is what the study says of the thrust in hand and of the figure that the verdict watches.
func (s *Study) outcomeOf(watched *Verdict) Outcome {
	hand := s.Figure("thrust_in_hand")
	o := Outcome{Hand: hand.Value, HasHand: hand.Has(), Flown: s.Flight.Flown() && (!s.Flight.Reserve.Asked || s.Flight.Reserve.Met)}
	if watched != nil { // the same place in the list has the same conditions
		v := &s.Requirements[watched.Number-1]
		o.HasValue = v.Judged()
		if o.HasValue {
			o.Value = v.Figure.Value
		}
	}
	return o
}

// score is what swings are ranked by: the greater of the two changes.
func (w *Swing) score() float64 { return math.Max(w.Hand, w.Share) }

// Rank orders swings by how much they move the answer: first those that break the
// mission, then by the greater of the change of thrust in hand and that of the figure watched.
func Rank(list []Swing) {
	slices.SortStableFunc(list, func(a, b Swing) int {
		if a.Breaks != b.Breaks {
			if a.Breaks {
				return -1
			}
			return 1
		}
		return cmp.Or(cmp.Compare(b.score(), a.score()), cmp.Compare(a.Path, b.Path), cmp.Compare(a.Column, b.Column))
	})
}
