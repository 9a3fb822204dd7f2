package handlers

import (
	"fmt"
	"net/url"
	"strings"
	"unicode/utf8"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// setIn puts the typed text into the input. What is typed into a number that has
// a basis may also state its band, "0.034 ± 0.003"; a text without one states none.
func setIn(s *project.Spec, entry input.Entry, text string, sys units.System) (string, error) {
	basis, ours := s.BasisAt(entry)
	if entry.Number == nil || !ours {
		return set(entry, text, sys)
	}
	n := entry.Number
	before := n.WithBand(sys, *n.Value, basis.PlusMinus)
	typed, band, stated := input.CutBand(text)
	said, err := set(entry, typed, sys)
	if err != nil {
		return "", err
	}
	width := 0.0
	if stated {
		if width, err = n.ParseBand(band, *n.Value, sys); err != nil {
			return "", err
		}
	}
	if width == basis.PlusMinus {
		return said, nil
	}
	basis.PlusMinus = width
	s.SetBasisAt(entry.Path, basis)
	return strings.TrimSpace(fmt.Sprintf("%s %s → %s %s", entry.Label(), before, n.WithBand(sys, *n.Value, width), sys.Unit(n.Quantity).Symbol)), nil
}

// A facet is one thing that a basis says beside the band, and how the form carries it.
type facet struct {
	prefix string // of the name of its form field, before the input's path
	get    func(project.Basis) string
	set    func(*project.Basis, string) error
	said   func(label, text string) string
}

var facets = []facet{
	{"basis:", func(b project.Basis) string { return b.Kind },
		func(b *project.Basis, text string) error { b.Kind = text; return nil },
		func(label, text string) string { return fmt.Sprintf("%s is now %s", label, project.BasisLabel(text)) }},
	{"note:", func(b project.Basis) string { return b.Note },
		func(b *project.Basis, text string) error {
			if utf8.RuneCountInString(text) > longestNote {
				return fmt.Errorf("a note has up to %d characters", longestNote)
			}
			b.Note = text
			return nil
		},
		func(label, text string) string {
			if text == "" {
				return label + ": note removed"
			}
			return label + ": note “" + clipText(text) + "”"
		}},
}

// longestNote is how many characters a note of a basis may have.
const longestNote = 500

// basisChanges are the changes of where an input comes from.
func (e *edit) basisChanges(shown input.Entry, form url.Values) []change {
	was, ok := e.base.BasisAt(shown)
	if v, _, ofAircraft := e.base.InAircraft(shown.Path); !ok || ofAircraft && v.ID != e.base.Variants[e.variant].ID {
		return nil
	}
	var list []change
	for _, f := range facets {
		name := f.prefix + shown.Path
		text := tidy(form.Get(name))
		if form.Has(name) && form.Get("action") == takeTheir+name {
			e.left(shown)
			continue
		}
		if !form.Has(name) || text == f.get(was) || f.prefix == "basis:" && text == "" {
			continue
		}
		clash := e.basisClash(shown, f, text)
		list = append(list, change{path: name, text: text, set: func(s *project.Spec) (string, error) {
			if clash != nil {
				return "", clash
			}
			b, _ := s.BasisAt(shown)
			if err := f.set(&b, text); err != nil {
				return "", err
			}
			s.SetBasisAt(shown.Path, b)
			return f.said(shown.Label(), text), nil
		}})
	}
	return list
}

// basisClash is clash for what a basis says.
func (e *edit) basisClash(shown input.Entry, f facet, text string) error {
	stands := e.stands(f.prefix+shown.Path, text)
	if e.base == e.head && !stands {
		return nil
	}
	if _, ok := e.now[shown.Path]; !ok {
		return errGone
	}
	if e.moved(shown.Path) {
		return errMoved
	}
	was, _ := e.base.BasisAt(shown)
	is, _ := e.head.BasisAt(shown)
	before, after := f.get(was), f.get(is)
	if after == before && !stands || after == text {
		return nil
	}
	if after == "" {
		return &clashError{theirs: "nothing", whole: "nothing"}
	}
	return &clashError{theirs: clipText(project.BasisLabel(after)), whole: project.BasisLabel(after)}
}
