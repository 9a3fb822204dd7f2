package views

import (
	"fmt"
	"math"
	"strings"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A Revision is an earlier state of a project, held against the present one.
type Revision struct {
	Title       string
	Project     string
	ProjectURL  string
	HistoryURL  string
	Item        RevisionItem
	Lead        string
	Program     string // says that another version of the program saved it
	Variant     string
	Variants    []Link
	Headline    string
	Tone        string
	Tightest    string
	Missed, Met string
	Worst       []string
	Figures     []FigurePair
	NowMissing  string // says that the variant is not there any more
	Differences []DifferenceRow
}

// A FigurePair is a figure then and now.
type FigurePair struct {
	Label, Then, Now, Change string
	Has, HasNow              bool // numbers, not words
}

// NewRevision makes the page of a revision: then is the study of one of its
// variants, now that of the same variant at present, nil when there is none.
// Everything is shown in the units of the present document.
func NewRevision(id int64, r Saved, program string, then, now *study.Study, present *project.Spec) Revision {
	sys := present.System()
	base := projectURL(id)
	p := Revision{Project: present.Name, ProjectURL: base, HistoryURL: base + "/history", Item: newRevisionItem(base, r, 0, "name-"),
		Variant: then.Variant().Name, Differences: differences(then.Project.Spec, present, sys)}
	p.Item.Naming.Whole = true
	p.Title = fmt.Sprintf("Revision %d", r.Number)
	if r.Name != "" {
		p.Title = r.Name
	}
	p.Lead = fmt.Sprintf("Revision %d, %s", r.Number, p.Item.Saved)
	if p.Item.After != "" {
		p.Lead += ", " + p.Item.After
	}
	p.Lead += ": " + sentence(r.Summary)
	if r.Engine != program {
		p.Program = fmt.Sprintf("It was saved by version %s of the program; the results below are computed by the present one, %s.", r.Engine, program)
	}
	for i := range then.Project.Spec.Variants {
		v := &then.Project.Spec.Variants[i]
		p.Variants = append(p.Variants, Link{v.Name, p.Item.URL + "?variant=" + v.ID, i == then.Index})
	}
	v := newVerdict(then, sys)
	p.Headline, p.Tone, p.Tightest, p.Missed, p.Met, p.Worst = v.Headline, v.Tone, v.Tightest, v.Missed, v.Met, v.Worst
	if now == nil {
		p.NowMissing = "This variant is not in the project any more."
	}
	for i := range then.Figures {
		p.Figures = append(p.Figures, figurePair(&then.Figures[i], now, sys))
	}
	return p
}

func figurePair(then *study.Figure, present *study.Study, sys units.System) FigurePair {
	pair := FigurePair{Label: then.Label, Then: figureWords(then, sys), Now: absent, Change: absent, Has: then.Has()}
	if present == nil {
		return pair
	}
	now := present.Figure(then.ID)
	if now == nil {
		return pair
	}
	pair.Now, pair.HasNow = figureWords(now, sys), now.Has()
	switch {
	case pair.Then == pair.Now:
		pair.Change = "same"
	case then.Has() && now.Has():
		pair.Change = changeWords(sys, then.Quantity, then.Value, now.Value)
	}
	return pair
}

func figureWords(f *study.Figure, sys units.System) string {
	if !f.Has() {
		return "none: " + f.Reason.In(sys)
	}
	return sys.Format(f.Quantity, f.Value)
}

// changeWords is a difference with its sign, and in per cent of what it was unless the quantity is in per cent itself.
func changeWords(sys units.System, q units.Quantity, then, now float64) string {
	text := signed(sys, q, now-then)
	if q == units.Fraction {
		return strings.Replace(text, "%", "points", 1)
	}
	share := 100 * (now - then) / math.Abs(then)
	if then == 0 || math.Abs(share) > 999 {
		return text
	}
	sign := ""
	if share > 0 {
		sign = "+"
	}
	return fmt.Sprintf("%s (%s%s\u00a0%%)", text, sign, units.Fixed(share, 1))
}
