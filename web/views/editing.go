package views

import (
	"fmt"
	"strconv"
	"time"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A State is what a page shows beside the study itself: where the project stands in
// its history, what the view is, and what became of the edit just made.
type State struct {
	ProjectID int64
	Page      string // name of the page on which the project is edited, empty for the bench
	Revision  int64
	Saved     time.Time
	CanUndo   bool
	CanRedo   bool
	Query     string // of the view, with its question mark, or empty
	Refusals  []Refusal
	Message   string
	Elsewhere string    // what was changed by another window that this one has not seen
	View      []Refusal // conditions of the view that were not understood
}

// An Editing is what a page on which the project can be edited has: forms, undo, and what became of the last edit.
type Editing struct {
	Page        string // its name, carried by each form so that the same page answers
	Action      string // where edits are posted, with the view's query
	UndoURL     string
	RedoURL     string
	SystemURL   string
	Systems     []Option
	System      string
	Revision    string
	Saved       string
	CanUndo     bool
	CanRedo     bool
	Message     string // about the edit just made
	Elsewhere   string // what was changed by another window that this one has not seen
	Refused     int
	RefusedText string
	Loose       []string // what was refused and has no field on the page to stand beside
	Groups      []Group
	here        string // address of the variant
}

// newEditing makes the editing of a page that shows no inputs yet.
func newEditing(s *study.Study, st State) Editing {
	sys := s.Project.Spec.System()
	here := fmt.Sprintf("/projects/%d/variants/%s", st.ProjectID, s.Variant().ID)
	e := Editing{
		here: here, Page: st.Page, Action: here + st.Query, UndoURL: here + "/undo" + st.Query, RedoURL: here + "/redo" + st.Query, SystemURL: here + "/units" + st.Query,
		System: string(sys), Revision: strconv.FormatInt(st.Revision, 10), Saved: Clock(st.Saved),
		CanUndo: st.CanUndo, CanRedo: st.CanRedo, Message: st.Message, Elsewhere: st.Elsewhere, Refused: len(st.Refusals),
	}
	for _, o := range units.Systems {
		e.Systems = append(e.Systems, Option{string(o), o.Label(), o == sys})
	}
	return e
}

// Clock is the time of day as pages show it.
func Clock(t time.Time) string { return t.Local().Format("15:04:05") }

// form shows groups of inputs and what was refused in them.
func (e *Editing) form(groups []Group, refusals []Refusal) {
	offerImports(groups, e.here)
	e.Groups = groups
	e.Loose = loose(refusals, groups)
	e.RefusedText = refusedText(len(refusals), len(e.Loose))
}
