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
// changed elsewhere stays; where both changed the same thing, the reader sees both
// values and decides. Until then the field carries, under standing and its name,
// what was refused in it: sent again as it is, it is refused again.
const (
	standing  = "clash:"
	keepMine  = "keep " // action, before the name of the field: save it over what the other window saved
	takeTheir = "take " // action, before the name of the field: leave what the other window saved
)

var (
	errGone  = errors.New("another window has removed this meanwhile")
	errMoved = errors.New("another window has changed this list meanwhile, and something else now stands in this place; nothing was changed here")
)

// A clashError says that another window has set the same thing to something else.
type clashError struct {
	theirs string // what it saved, with its unit
	whole  string // the same at full length
}

func (e *clashError) Error() string { return "another window has set it to " + e.theirs + " meanwhile" }

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
	stands := e.stands(shown.Path, text)
	if e.base == e.head && !stands {
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
	if after == before && !stands || after == text {
		return nil
	}
	switch {
	case now.Number != nil:
		after = strings.TrimSpace(after + " " + e.sys.Unit(now.Number.Quantity).Symbol)
	case now.Choice != nil:
		after = optionLabel(now.Choice, after)
	case now.Table != nil:
		return &clashError{theirs: fmt.Sprintf("a table of %d rows", len(*now.Table.Value)), whole: after}
	case after == "":
		after = "nothing"
	}
	return &clashError{theirs: clipText(after), whole: after}
}

// stands reports whether the text of a field is still the one that was refused
// for what another window saved, and nobody has decided since.
func (e *edit) stands(name, text string) bool {
	return e.form.Has(standing+name) && tidy(e.form.Get(standing+name)) == text && e.form.Get("action") != keepMine+name
}

// undecided reports whether the form carries anything that was refused for what another window saved.
func (e *edit) undecided() bool {
	for name := range e.form {
		if strings.HasPrefix(name, standing) {
			return true
		}
	}
	return false
}

// decided reports whether the action only settles what stands in a field.
func decided(action string) bool {
	return strings.HasPrefix(action, keepMine) || strings.HasPrefix(action, takeTheir)
}

// left notes in words that a field stays as the other window saved it.
func (e *edit) left(entry input.Entry) {
	e.said = append(e.said, entry.Label()+" stays as the other window saved it")
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
