package handlers

import (
	"errors"
	"fmt"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/web/views"
)

// Another window may have changed the project since the form was shown. What it
// changed elsewhere stays; where both changed the same thing, the reader is told.

var (
	errGone  = errors.New("another window has removed this meanwhile")
	errMoved = errors.New("another window has changed this list meanwhile, and something else now stands in this place; nothing was changed here")
)

func errElsewhere(now string) error {
	return fmt.Errorf("another window has set it to %s meanwhile; send it again to overrule", now)
}

// byPath finds inputs by their path.
func byPath(s *project.Spec) map[string]input.Entry {
	entries := input.Walk(s)
	m := make(map[string]input.Entry, len(entries))
	for _, e := range entries {
		m[e.Path] = e
	}
	return m
}

// clash says why text cannot be put where the form showed an input; nil when nothing stands against it.
func (e *edit) clash(shown input.Entry, text string) error {
	if e.base == e.head {
		return nil
	}
	now, ok := e.now[shown.Path]
	if !ok {
		return errGone
	}
	if e.moved(shown.Path) {
		return errMoved
	}
	before, after := tidy(views.FieldText(e.base, shown, e.sys)), tidy(views.FieldText(e.head, now, e.sys))
	if after == before || after == text {
		return nil
	}
	if now.Number != nil {
		after = strings.TrimSpace(after + " " + e.sys.Unit(now.Number.Quantity).Symbol)
	}
	return errElsewhere(clipText(after))
}

// actionClash keeps an action from another element than the one that its button stood beside.
func (e *edit) actionClash(action string) error {
	verb, arg, _ := strings.Cut(action, " ")
	ours := fmt.Sprintf("variants[%d].aircraft.", e.variant)
	list := map[string]string{"remove-item": ours + "weights.items", "copy-component": ours + componentList, "remove-component": ours + componentList, "remove-leg": "legs", "move-leg-up": "legs", "move-leg-down": "legs", "insert-leg": "legs", "duplicate-leg": "legs",
		"remove-requirement": "requirements"}[verb]
	if _, err := strconv.Atoi(arg); err != nil || list == "" || e.base == e.head {
		return nil
	}
	if e.moved(list + "[" + arg + "].") {
		return errMoved
	}
	return nil
}

// moved reports whether an element of a list on the path is another one now than
// in the form, by what identifies it: a path counts places, and places shift.
func (e *edit) moved(path string) bool {
	for i, c := range path {
		if c != ']' {
			continue
		}
		// Several requirements may name one figure; what they come from tells them apart as well.
		for _, name := range []string{"id", "name", "figure", "clause"} {
			key := path[:i+1] + "." + name
			shown, ok := e.shown[key]
			if !ok {
				continue
			}
			now, ok := e.now[key]
			if key != path && (!ok || views.EntryText(now, e.sys) != views.EntryText(shown, e.sys)) {
				return true
			}
			if name != "figure" {
				break
			}
		}
	}
	return false
}
