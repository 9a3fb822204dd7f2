package study

import (
	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A Verdict is a requirement held against its figure.
type Verdict struct {
	Requirement project.Requirement
	Figure      *Figure // nil when the study has no figure of that name
	Met         bool
	Reason      units.Message // why it could not be judged; empty when it was
}

// Judged reports whether the requirement could be evaluated.
func (v *Verdict) Judged() bool { return v.Reason.Empty() }

// judge holds every requirement against its figure.
func (s *Study) judge() {
	for _, r := range s.Project.Spec.Requirements {
		v := Verdict{Requirement: r, Figure: s.Figure(r.Figure)}
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

// inputsOf lists the aircraft's numbers and tables that count with its present choices.
func inputsOf(a *aircraft.Spec) []input.Entry {
	var list []input.Entry
	for _, e := range input.Walk(a) {
		if !e.Idle && (e.Number != nil || e.Table != nil) {
			list = append(list, e)
		}
	}
	return list
}
