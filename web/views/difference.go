package views

import (
	"fmt"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A DifferenceRow is one thing in which an earlier state of a project differs from the present one.
type DifferenceRow struct {
	Part, Label string // what it belongs to, and what it is
	Then, Now   string
}

// differences words what differs between two documents, each number in sys.
func differences(then, now *project.Spec, sys units.System) []DifferenceRow {
	list, was := input.Compare(then, now)
	d := differing{then: newSide(then, sys), now: newSide(now, sys)}
	d.several = len(then.Variants) > 1 || len(now.Variants) > 1
	var rows []DifferenceRow
	for i := range list {
		if row := d.row(&list[i]); row.Then != row.Now {
			rows = append(rows, row)
		}
	}
	return append(rows, d.bases(was)...)
}

// A side is one of two documents that are compared.
type side struct {
	spec    *project.Spec
	sys     units.System
	entries []input.Entry
	byPath  map[string]*input.Entry
}

func newSide(spec *project.Spec, sys units.System) side {
	s := side{spec: spec, sys: sys, entries: input.Walk(spec), byPath: map[string]*input.Entry{}}
	for i := range s.entries {
		s.byPath[s.entries[i].Path] = &s.entries[i]
	}
	return s
}

type differing struct {
	then, now side
	several   bool // variants
}

const absent = "–"

func (d *differing) row(x *input.Difference) DifferenceRow {
	switch x.Kind {
	case input.Added:
		part, label := d.where(&d.now, x.Now)
		return DifferenceRow{part, label, absent, "added" + d.now.gist(x.Now)}
	case input.Removed:
		part, label := d.where(&d.then, x.Then)
		return DifferenceRow{part, label, "there" + d.then.gist(x.Then), "removed"}
	case input.Moved:
		part, label := d.where(&d.now, x.Now)
		return DifferenceRow{part, label, "place " + place(x.Then), "place " + place(x.Now)}
	}
	s, e, path := &d.now, x.After, x.Now
	if e == nil {
		s, e, path = &d.then, x.Before, x.Then
	}
	part, _ := d.where(s, path)
	row := DifferenceRow{Part: part, Label: e.Label(), Then: absent, Now: absent}
	switch {
	case x.Before != nil && x.After != nil && x.Before.Table != nil && x.After.Table != nil:
		row.Then, row.Now = rowsApart(x.Before.Table, x.After.Table, d.now.sys)
	default:
		if x.Before != nil {
			row.Then = d.then.words(x.Before)
		}
		if x.After != nil {
			row.Now = d.now.words(x.After)
		}
	}
	return row
}

// bases lists the inputs of aircraft whose basis differs; was has their paths then by those now.
func (d *differing) bases(was map[string]string) []DifferenceRow {
	var rows []DifferenceRow
	for i := range d.now.entries {
		e := &d.now.entries[i]
		old := *e
		path, known := was[e.Path]
		old.Path = path
		b, has := d.now.spec.BasisAt(*e)
		a, had := d.then.spec.BasisAt(old)
		if !known || !has || !had || e.Idle || a == b {
			continue
		}
		part, _ := d.where(&d.now, e.Path)
		rows = append(rows, DifferenceRow{part, "Basis of " + lowerFirst(e.Label()), basisState(a, e, d.now.sys), basisState(b, e, d.now.sys)})
	}
	return rows
}

func basisState(b project.Basis, e *input.Entry, sys units.System) string {
	text := project.BasisLabel(b.Kind)
	if b.PlusMinus > 0 && e.Number != nil {
		text += " ± " + strings.TrimSpace(units.Plain(b.PlusMinus/sys.Step(e.Number.Quantity, 1))+" "+sys.Unit(e.Number.Quantity).Symbol)
	}
	if b.Note != "" {
		text += ", “" + clipped(b.Note, 120) + "”"
	}
	return text
}

// words is what an input holds, with its unit.
func (s *side) words(e *input.Entry) string {
	switch {
	case e.Number != nil:
		return numberWords(e.Number, s.sys)
	case e.Table != nil:
		return fmt.Sprintf("%d rows", len(*e.Table.Value))
	case e.Choice != nil:
		for _, o := range e.Choice.Options {
			if o.Value == *e.Choice.Value {
				return o.Label
			}
		}
		return *e.Choice.Value
	case *e.Text.Value == "":
		return "nothing"
	}
	return "“" + clipped(*e.Text.Value, 200) + "”"
}

func numberWords(n *input.Number, sys units.System) string {
	sym := sys.Unit(n.Quantity).Symbol
	if sym == "°" {
		return sys.Entry(n.Quantity, *n.Value) + sym
	}
	return strings.TrimSpace(sys.Entry(n.Quantity, *n.Value) + " " + sym)
}

// gist tells the numbers and choices of an element, as far as they fit.
func (s *side) gist(path string) string {
	const most = 4
	var parts []string
	for i := range s.entries {
		e := &s.entries[i]
		rest, ok := strings.CutPrefix(e.Path, path+".")
		if !ok || e.Idle || strings.ContainsAny(rest, ".[") || e.Table != nil || e.Text != nil {
			continue
		}
		if len(parts) == most {
			parts = append(parts, "…")
			break
		}
		parts = append(parts, lowerFirst(e.Label())+" "+s.words(e))
	}
	if len(parts) == 0 {
		return ""
	}
	return ": " + strings.Join(parts, ", ")
}

// rowsApart tells the rows of a table that are not in the other, by their place.
func rowsApart(then, now *input.Table, sys units.System) (string, string) {
	one := func(t, other *input.Table) string {
		const most = 5
		lines := strings.Split(t.Text(sys), "\n")
		var list []string
		for i, row := range *t.Value {
			if i < len(*other.Value) && slices.Equal(row, (*other.Value)[i]) || i >= len(lines) {
				continue
			}
			if len(list) == most {
				list = append(list, "…")
				break
			}
			list = append(list, fmt.Sprintf("row %d: %s", i+1, strings.Join(strings.Fields(lines[i]), " · ")))
		}
		return strings.Join(append([]string{fmt.Sprintf("%d rows", len(*t.Value))}, list...), "; ")
	}
	return one(then, now), one(now, then)
}

// partWords words the parts of a document whose JSON names do not read as they stand; empty ones are not named.
var partWords = map[string]string{"aircraft": "", "values": "", "take_off": "take-off", "clean": "clean", "technique": "technique and factors"}

// elementWords names one element of a list.
var elementWords = map[string]string{"legs": "leg", "strips": "strip", "items": "item", "requirements": "requirement", "variants": "variant"}

// where names what holds the input or element at path, and the last of its parts: "weights", "item “Baggage”".
func (d *differing) where(s *side, path string) (holder, last string) {
	var names []string
	steps := strings.Split(path, ".")
	for i, step := range steps {
		list, index, indexed := strings.Cut(strings.TrimSuffix(step, "]"), "[")
		name, known := partWords[list]
		switch {
		case indexed:
			name = s.element(strings.Join(steps[:i+1], "."), list, index)
			if list == "variants" && i+1 < len(steps) {
				name = strings.TrimPrefix(name, "variant ")
				if !d.several {
					name = ""
				}
			}
		case !known:
			name = strings.ReplaceAll(list, "_", " ")
		}
		names = append(names, name)
	}
	if len(names) == 0 {
		return "", ""
	}
	holders := slices.DeleteFunc(names[:len(names)-1:len(names)-1], func(n string) bool { return n == "" })
	return capital(strings.Join(holders, ", ")), capital(names[len(names)-1])
}

// element names an element of a list by what it is called, else by its place.
func (s *side) element(path, list, index string) string {
	word, ok := elementWords[list]
	if !ok {
		word = strings.ReplaceAll(strings.TrimSuffix(list, "s"), "_", " ")
	}
	for _, name := range []string{"name", "figure"} {
		e := s.byPath[path+"."+name]
		if e == nil {
			continue
		}
		text := EntryText(*e, s.sys)
		if kind, ok := project.LookupFigure(text); ok {
			text = kind.Label
		}
		if text != "" {
			return word + " “" + clipped(text, 60) + "”"
		}
	}
	n, _ := strconv.Atoi(index)
	return fmt.Sprintf("%s %d", word, n+1)
}

// place is the place of an element in its list, counted from one.
func place(path string) string {
	n, _ := strconv.Atoi(strings.TrimSuffix(path[strings.LastIndexByte(path, '[')+1:], "]"))
	return strconv.Itoa(n + 1)
}

// clipped shortens a text to so many characters.
func clipped(text string, most int) string {
	if r := []rune(text); len(r) > most {
		return string(r[:most]) + "…"
	}
	return text
}

func capital(text string) string {
	if text == "" {
		return ""
	}
	r := []rune(text)
	return strings.ToUpper(string(r[0])) + string(r[1:])
}
