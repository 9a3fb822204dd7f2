package handlers

import (
	"errors"
	"fmt"
	"net/url"
	"slices"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/web/views"
)

// A change sets one thing in a document.
type change struct {
	path string // of the form field
	text string // as typed
	last bool   // it converts what was typed beside it, which belongs to the way that the form showed
	set  func(*project.Spec) (string, error)
}

// apply takes every field of the form that differs from what the form showed.
// All changes are tried together first, so that two that only fit together are
// taken; when the document then does not build, they are tried one by one.
func (e *edit) apply(form url.Values) {
	e.form = form
	if e.base != e.head || e.undecided() {
		e.shown, e.now = byPath(e.base), byPath(e.head)
	}
	changes := e.differences(form)
	if action := form.Get("action"); action != "" && !decided(action) {
		changes = append(changes, e.action(action))
	}
	if e.together(changes) {
		return
	}
	for _, c := range changes {
		e.alone(c)
	}
}

// together applies all changes to a copy and keeps it when it builds.
func (e *edit) together(changes []change) bool {
	trial := e.spec.Clone()
	var said []string
	for _, c := range changes {
		text, err := c.set(trial)
		if err != nil {
			return false
		}
		if text != "" {
			said = append(said, text)
		}
	}
	if err := e.take(trial); err != nil {
		return false
	}
	e.changes = append(e.changes, said...)
	return true
}

// take makes trial the document of the edit if it builds and can be stored.
func (e *edit) take(trial *project.Spec) error {
	built, err := trial.Build()
	if err != nil {
		return err
	}
	doc, err := trial.Encode()
	if err != nil {
		return err
	}
	e.spec, e.built, e.doc = trial, built, doc
	return nil
}

// alone applies one change, or says why it is refused.
func (e *edit) alone(c change) {
	trial := e.spec.Clone()
	said, err := c.set(trial)
	if err == nil {
		err = e.take(trial)
	}
	if err != nil {
		e.refused = append(e.refused, e.refusal(c, err))
		return
	}
	if said != "" {
		e.changes = append(e.changes, said)
	}
}

// refusal says why a change is not taken and, where another window stands against it, what that one saved.
func (e *edit) refusal(c change, err error) views.Refusal {
	r := views.Refusal{Path: c.path, Text: c.text, Why: e.why(err)}
	var clash *clashError
	if errors.As(err, &clash) {
		r.Theirs = &views.Theirs{Text: clash.theirs, Whole: clash.whole}
		if e.since != nil {
			r.Theirs.When = e.since(c.path)
		}
	}
	return r
}

func (e *edit) why(err error) string {
	var list []string
	for _, one := range input.Errors(err) {
		list = append(list, capital(one.Sentence(e.sys))+".")
	}
	if len(list) == 0 {
		return capital(err.Error()) + "."
	}
	return strings.Join(slices.Compact(list), " ")
}

func capital(s string) string {
	if s == "" {
		return s
	}
	r := []rune(s)
	return strings.ToUpper(string(r[:1])) + string(r[1:])
}

// differences lists the fields whose text is not what the form showed.
func (e *edit) differences(form url.Values) []change {
	var list []change
	for _, entry := range input.Walk(e.base) {
		switch {
		case !form.Has(entry.Path) || isIdentifier(entry.Path):
		case form.Get("action") == takeTheir+entry.Path:
			e.left(entry)
		default:
			text := tidy(form.Get(entry.Path))
			if text != tidy(views.FieldText(e.base, entry, e.sys)) {
				list = append(list, e.value(entry, text))
			}
		}
		list = append(list, e.basisChanges(entry, form)...)
	}
	slices.SortStableFunc(list, func(a, b change) int {
		switch {
		case a.last == b.last:
			return 0
		case a.last:
			return 1
		}
		return -1
	})
	return list
}

// isIdentifier reports whether the path is that of a variant's identifier, which addresses hold and which therefore never changes.
func isIdentifier(path string) bool {
	return strings.HasPrefix(path, "variants[") && strings.HasSuffix(path, "].id")
}

// action is the change that a button of the form asks for.
func (e *edit) action(action string) change {
	clash := e.actionClash(action)
	return change{path: "action", text: action, set: func(s *project.Spec) (string, error) {
		if clash != nil {
			return "", clash
		}
		return act(s, e.variant, action)
	}}
}

// tidy makes the line ends of a text area comparable.
func tidy(text string) string { return strings.TrimSpace(strings.ReplaceAll(text, "\r\n", "\n")) }

// value is the change of one input to what was typed.
func (e *edit) value(shown input.Entry, text string) change {
	sys := e.sys
	clash := e.clash(shown, text)
	return change{path: shown.Path, text: text, last: shown.Choice != nil && shown.Choice.Ways, set: func(s *project.Spec) (string, error) {
		if clash != nil {
			return "", clash
		}
		entry, ok := input.Find(s, shown.Path)
		if !ok {
			return "", errGone
		}
		whose, before := owner(s, shown.Path), views.EntryText(entry, sys)
		said, err := setIn(s, entry, text, sys)
		if said != "" {
			said = whose + said
		}
		if err == nil && said != "" && entry.Choice != nil {
			input.Convert(s, shown.Path, before)
			input.Settle(s) // what other choices offer may have changed
			if views.EntryText(entry, sys) == before {
				return "", errNoWay
			}
		}
		if v, path, ours := s.InAircraft(shown.Path); ours && err == nil && said != "" {
			v.Typed(path)
		}
		return said, err
	}}
}

// owner names the part of the document that an input belongs to, where its label alone does not say it.
func owner(s *project.Spec, path string) string {
	dot := strings.LastIndexByte(path, '.')
	if dot < 0 {
		return ""
	}
	parent, last := path[:dot], path[dot+1:]
	switch config := parent[strings.LastIndexByte(parent, '.')+1:]; config {
	case "clean", "take_off", "landing":
		return capital(strings.ReplaceAll(config, "_", "-")) + ": "
	}
	for _, sibling := range []string{"name", "figure"} {
		e, ok := input.Find(s, parent+"."+sibling)
		if !ok || last == sibling {
			continue
		}
		text := views.EntryText(e, s.System())
		if kind, ok := project.LookupFigure(text); ok {
			text = kind.Label
		}
		return clipText(text) + ": "
	}
	return ""
}

// set puts the typed text into the input and says what changed; nothing when the value is the same.
func set(entry input.Entry, text string, sys units.System) (string, error) {
	switch {
	case entry.Number != nil:
		v, err := entry.Number.Parse(text, sys)
		if err != nil {
			return "", err
		}
		old := *entry.Number.Value
		if v == old {
			return "", nil
		}
		*entry.Number.Value = v
		q := entry.Number.Quantity
		return fmt.Sprintf("%s %s → %s", entry.Label(), withUnit(sys, q, old), withUnit(sys, q, v)), nil
	case entry.Table != nil:
		rows, err := entry.Table.ParseRows(text, sys)
		if err != nil {
			return "", err
		}
		if slices.EqualFunc(rows, *entry.Table.Value, slices.Equal) {
			return "", nil
		}
		*entry.Table.Value = rows
		return fmt.Sprintf("%s: %d rows", entry.Label(), len(rows)), nil
	case views.EntryText(entry, sys) == text:
		return "", nil
	case entry.Choice != nil:
		*entry.Choice.Value = text
		if err := entry.Check(); err != nil {
			return "", err
		}
		text = optionLabel(entry.Choice, text)
	case text == "" && needsName(entry.Path):
		return "", errNoName
	default:
		*entry.Text.Value = text
	}
	return fmt.Sprintf("%s: %s", entry.Label(), clipText(text)), nil
}

// optionLabel is how the page words an option.
func optionLabel(c *input.Choice, value string) string {
	for _, o := range c.Options {
		if o.Value == value && o.Label != "" {
			return o.Label
		}
	}
	return value
}

// errNoWay is why a Converter has set its choice back.
var errNoWay = errors.New("what is given now cannot be said in that way: it stands for no parabola with drag and lift-dependent drag above 0")

var errNoName = errors.New("a name is required")

// needsName reports whether links are made of the text at the path: the name of the project or of a variant.
func needsName(path string) bool {
	of, ok := strings.CutSuffix(path, ".name")
	return path == "name" || ok && strings.HasPrefix(of, "variants[") && strings.IndexByte(of, ']') == len(of)-1
}

func withUnit(sys units.System, q units.Quantity, si float64) string {
	return strings.TrimSpace(sys.Entry(q, si) + " " + sys.Unit(q).Symbol)
}

func clipText(s string) string {
	if r := []rune(s); len(r) > 40 {
		return string(r[:40]) + "…"
	}
	return s
}
