package study

import (
	"math"
	"slices"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A Verdict is a requirement held against its figure.
type Verdict struct {
	Number      int // its place in the list, from 1
	Requirement project.Requirement
	Figure      *Figure // under the requirement's conditions; nil when the study has no figure of that name
	Met         bool
	Reason      units.Message // why it could not be judged; empty when it was
}

// Judged reports whether the requirement could be evaluated.
func (v *Verdict) Judged() bool { return v.Reason.Empty() }

// Margin is by how much the figure is on the wanted side of the limit, in the SI unit of
// the figure, negative when it misses; 0 where nothing was judged.
func (v *Verdict) Margin() float64 {
	switch {
	case !v.Judged():
		return 0
	case v.Requirement.Bound == project.AtMost:
		return v.Requirement.Limit - v.Figure.Value
	}
	return v.Figure.Value - v.Requirement.Limit
}

// Share is the margin over the size of the limit, dimensionless; ok is false for a limit of 0.
func (v *Verdict) Share() (share float64, ok bool) {
	size := math.Abs(v.Requirement.Limit)
	share = v.Margin() / size
	return share, v.Judged() && size > 0 && math.Abs(share) < math.MaxFloat64
}

// judge holds every requirement against its figure.
func (s *Study) judge() {
	for i, r := range s.Project.Spec.Requirements {
		v := Verdict{Number: i + 1, Requirement: r}
		if kind, ok := project.LookupFigure(r.Figure); ok {
			v.Figure = s.asked(kind, &r)
		}
		switch {
		case v.Figure == nil:
			v.Reason = units.Say("no figure is named {}", units.Text("“"+r.Figure+"”"))
		case !v.Figure.Has():
			v.Reason = v.Figure.Reason
		case r.Bound == project.AtMost:
			v.Met = v.Figure.Value <= r.Limit
		default:
			v.Met = v.Figure.Value >= r.Limit
		}
		s.Requirements = append(s.Requirements, v)
	}
}

// asked is the figure under the requirement's conditions: that of the study itself where it states none.
func (s *Study) asked(kind project.FigureKind, r *project.Requirement) *Figure {
	if !kind.Asked && len(r.Stated()) == 0 {
		return s.Figure(kind.ID)
	}
	f := s.blank(kind)
	c, err := s.under(kind, r)
	if r.MassGiven == project.AtGreatest {
		f.Rests = append(slices.Clone(f.Rests), "weights.max_take_off")
	}
	if kind.Takes&project.Load != 0 && r.MassGiven == project.AtLanding {
		f.Rests = slices.Concat(f.Rests, flown)
	}
	value := 0.0
	if err == nil {
		value, err = s.measure(kind.ID, r, &c)
	}
	f.take(value, c.where, err)
	return &f
}

// inputsOf lists the aircraft's numbers and tables that have a basis and count with its present choices.
func inputsOf(a *aircraft.Spec) []input.Entry {
	var list []input.Entry
	for _, e := range input.Walk(a) {
		if !e.Idle && !a.Unused(e.Path) && (e.Number != nil && !e.Number.Decided || e.Table != nil) {
			list = append(list, e)
		}
	}
	return list
}
