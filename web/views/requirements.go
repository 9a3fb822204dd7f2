package views

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// Requirements is the page of what is wanted: each wanted number beside the one
// computed under its conditions, the form to change them, and the presets.
type Requirements struct {
	Frame
	Editing
	Headline string
	Tone     string // good, caution or bad
	Rows     []RequirementRow
	Figures  []Option // that can be added, by action
	Classes  []PresetClass
}

// A RequirementRow is one requirement held against its figure.
type RequirementRow struct {
	Number     string
	Label      string
	Conditions string // that it sets for itself; empty when it holds for the study as it is
	Clause     string
	Note       string
	Wanted     string
	Got        string // empty when it was not evaluated
	Where      string // whole condition that the figure holds for
	Word, Tone string
	Margin     string // signed, + on the wanted side
	Share      string // the same in percent of the limit; empty where that says nothing
	Bar        Bar
	Reason     string // why it was not evaluated
	Weak       string // which placeholders it rests on; empty when on none
	URL        string // of its working
	EditID     string // of its form on this page; the browser opens the group around it
}

// A Bar draws a margin from its middle, in the units of a box 100 wide.
type Bar struct {
	X, Width string
	Tone     string // empty when there is nothing to draw
}

// fullBar is the share of the limit at which the bar of a margin is full.
const fullBar = 0.5

// A PresetClass is the presets for one class of aircraft.
type PresetClass struct {
	Title   string
	Presets []PresetView
}

// A PresetView is one preset as shown.
type PresetView struct {
	Title, Clause, Status, Note string
	Wants                       []string // its requirements in words
	Action                      string   // empty when the project has all of it
	Partly                      string   // says that some of it is there
}

// NewRequirements makes the page of a study.
func NewRequirements(s *study.Study, st State) Requirements {
	spec, sys := s.Project.Spec, s.Project.Spec.System()
	here := fmt.Sprintf("/projects/%d/variants/%s", st.ProjectID, s.Variant().ID)
	p := Requirements{Frame: NewFrame(s, st.ProjectID, "/requirements", st.Query, st.View), Editing: newEditing(s, st)}
	p.Headline, p.Tone = requirementsHeadline(s)
	for i := range s.Requirements {
		p.Rows = append(p.Rows, requirementRow(s, i, sys, here+"/working"))
	}
	p.form(newForm(spec, s.Index, st.Refusals).requirementGroups(p.Rows), st.Refusals)
	for _, k := range project.FigureKinds() {
		p.Figures = append(p.Figures, Option{Value: "add-requirement " + k.ID, Label: k.Label})
	}
	p.Classes = presetClasses(spec, sys)
	return p
}

func requirementsHeadline(s *study.Study) (text, tone string) {
	met, missed, open := 0, 0, 0
	for i := range s.Requirements {
		switch r := &s.Requirements[i]; {
		case !r.Judged():
			open++
		case r.Met:
			met++
		default:
			missed++
		}
	}
	all := len(s.Requirements)
	if all == 0 {
		return "Nothing is required yet.", "caution"
	}
	parts := []string{fmt.Sprintf("%d of %d requirements met", met, all)}
	tone = "good"
	if open > 0 {
		parts, tone = append(parts, fmt.Sprintf("%d not evaluated", open)), "caution"
	}
	if missed > 0 {
		parts, tone = append(parts, fmt.Sprintf("%d missed", missed)), "bad"
	}
	return sentence(strings.Join(parts, ", ")), tone
}

// stated joins the conditions that a requirement sets for itself.
func stated(r *project.Requirement, sys units.System) string {
	var list []string
	for _, m := range r.Stated() {
		list = append(list, m.In(sys))
	}
	return strings.Join(list, ", ")
}

// wanted is the limit with its sign.
func wanted(r *project.Requirement, sys units.System) string {
	sign := "≤"
	if r.Bound == project.AtLeast {
		sign = "≥"
	}
	return sign + "\u00a0" + sys.Format(r.Kind().Quantity, r.Limit)
}

func requirementRow(s *study.Study, i int, sys units.System, working string) RequirementRow {
	v := &s.Requirements[i]
	r := &v.Requirement
	row := RequirementRow{Number: strconv.Itoa(i + 1), Label: r.Kind().Label, Conditions: stated(r, sys), Clause: r.Clause, Note: r.Note,
		Wanted: wanted(r, sys), EditID: "form-requirement-" + strconv.Itoa(i), URL: working + "#" + anchor(v.WorkingPart())}
	if v.Figure == nil {
		row.Word, row.Tone, row.Reason = "not evaluated", "caution", sentence(v.Reason.In(sys))
		return row
	}
	row.Where, row.Weak = v.Figure.Where.In(sys), weakInputs(s, v.Figure)
	if !v.Judged() {
		row.Word, row.Tone, row.Reason = "not evaluated", "caution", sentence(v.Reason.In(sys))
		return row
	}
	q := v.Figure.Quantity
	row.Got, row.Word, row.Tone = sys.Format(q, v.Figure.Value), "met", "good"
	if !v.Met {
		row.Word, row.Tone = "missed", "bad"
	}
	row.Margin = signed(sys, q, v.Margin())
	if share, ok := v.Share(); ok {
		row.Share = signed(sys, units.Fraction, share)
		row.Bar = newBar(share, row.Tone)
		if q == units.Fraction {
			row.Margin = signedPoints(sys, v.Margin())
		}
	}
	return row
}

// signedPoints writes a difference of two percentages, which is no percentage itself.
func signedPoints(sys units.System, si float64) string {
	return strings.TrimSuffix(signed(sys, units.Fraction, si), "%") + "points"
}

// newBar draws the share of the limit to the right of the middle when it is on the wanted side.
func newBar(share float64, tone string) Bar {
	length := math.Min(math.Abs(share)/fullBar, 1) * 50
	x := 50.0
	if share < 0 {
		x -= length
	}
	return Bar{X: strconv.FormatFloat(x, 'f', 1, 64), Width: strconv.FormatFloat(math.Max(length, 0.8), 'f', 1, 64), Tone: tone}
}

// weakInputs names the placeholders that a figure rests on, the first few.
func weakInputs(s *study.Study, f *study.Figure) string {
	paths := s.Unsure(f)
	if len(paths) == 0 {
		return ""
	}
	const most = 3
	var names []string
	for _, path := range paths[:min(most, len(paths))] {
		if e, ok := s.Input(path); ok {
			names = append(names, lowerFirst(e.Label()))
		}
	}
	text := weaknessOf(s, f) + ": " + strings.Join(names, ", ")
	if n := len(paths) - len(names); n > 0 {
		text += fmt.Sprintf(" and %d more", n)
	}
	return text
}

// requirementGroups makes one group of inputs for each requirement; each is known by its row.
func (f *form) requirementGroups(rows []RequirementRow) []Group {
	list := make([]Group, len(rows))
	for i, r := range rows {
		n := strconv.Itoa(i)
		list[i] = Group{ID: "requirement-" + n, Title: r.Number + " · " + r.Label, Summary: r.Wanted + ", " + r.Word,
			Blocks: []Block{{Fields: f.under(fmt.Sprintf("requirements[%d]", i))}},
			Adds:   []Button{{Action: "remove-requirement " + n, Label: "Remove", Title: "Remove requirement " + r.Number}}}
		list[i].Open = list[i].refused()
	}
	return list
}

func presetClasses(spec *project.Spec, sys units.System) []PresetClass {
	var list []PresetClass
	for _, p := range project.Presets() {
		if len(list) == 0 || list[len(list)-1].Title != p.Class {
			list = append(list, PresetClass{Title: p.Class})
		}
		v := PresetView{Title: p.Title, Clause: p.Clause, Status: p.Status, Note: p.Note, Action: "add-preset " + p.Code}
		for i := range p.Requirements {
			r := &p.Requirements[i]
			text := r.Kind().Label + " " + wanted(r, sys)
			if under := stated(r, sys); under != "" {
				text += ", " + under
			}
			v.Wants = append(v.Wants, text)
		}
		switch n := len(p.Lacking(spec)); n {
		case 0:
			v.Action = ""
		case len(p.Requirements):
		default:
			v.Partly = fmt.Sprintf("%d of %d already in the list", len(p.Requirements)-n, len(p.Requirements))
		}
		c := &list[len(list)-1]
		c.Presets = append(c.Presets, v)
	}
	return list
}
