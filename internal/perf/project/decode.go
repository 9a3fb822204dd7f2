package project

import (
	"cmp"
	"errors"
	"fmt"
	"reflect"
	"regexp"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
)

// maxErrors is how many errors Decode reports.
const maxErrors = 200

// Decode reads a project document and builds it once to prove it sound. Unlike
// encoding/json it refuses unknown, duplicate, missing and null fields, and
// matches keys exactly. Only notes, bases and inputs that the document's own choices
// make idle may be missing; they become zero, empty or, for a choice, its first option. A document of an
// older format may also lack what came later (format.go). The error
// joins *input.Error values, up to 200 of them, in the order of the text.
func Decode(text []byte) (*Spec, error) {
	d := &decoder{text: text, places: map[string]int{}, failed: map[string]bool{}}
	if err := d.text.check(); err != nil {
		return nil, err
	}
	s := &Spec{}
	d.format = d.text.formatOf()
	d.value(document(), reflect.ValueOf(s).Elem(), "", d.text.whole())
	if d.format > 0 && s.Format == d.format {
		s.Format = Format
	}
	d.complete(s)
	rest := errors.Join(s.head(), input.Check(s), s.references())
	if len(d.errs) == 0 {
		if _, rest = s.Build(); rest == nil {
			return s, nil
		}
	}
	for _, e := range input.Errors(rest) {
		if !d.explained(e.Path) {
			d.errs = append(d.errs, e)
		}
	}
	if len(d.errs) == 0 {
		return nil, rest
	}
	return nil, d.report()
}

// A decoder reads one document.
type decoder struct {
	text    jsonText
	format  int // that the document states; 0 when it is none that is read
	errs    []*input.Error
	failed  map[string]bool // paths at which errs stand, also those that were one too many
	places  map[string]int  // where each value begins, by path
	objects []object
	missing []missing
	open    map[string]bool // inputs of which nobody can say whether they matter, by path
}

// An object is a struct that was read.
type object struct {
	path  string
	node  *node
	value reflect.Value
}

// A missing field may yet turn out to be idle.
type missing struct {
	path string
	node *node
}

// fail records that what stands at e.Path could not be read; what else is wrong there follows from it.
func (d *decoder) fail(e *input.Error) {
	d.failed[e.Path] = true
	d.note(e)
}

// note records an error in spite of which what stands at e.Path was read.
func (d *decoder) note(e *input.Error) {
	if len(d.errs) < maxErrors {
		d.errs = append(d.errs, e)
	}
}

// complete gives missing idle choices their first option and reports what is missing and needed.
func (d *decoder) complete(s *Spec) {
	entries := byPath(s)
	for _, m := range d.missing {
		if e, ok := entries[m.path]; ok && e.Idle && e.Choice != nil {
			*e.Choice.Value = e.Choice.Options[0].Value
		}
	}
	fill(reflect.ValueOf(s).Elem())
	entries = byPath(s)
	d.open = d.undecided(entries)
	for _, m := range d.missing {
		e := entries[m.path]
		switch {
		case e.Idle, d.open[m.path]:
		case e.Number != nil:
			d.fail(&input.Error{Path: m.path, Spec: e.Number.Spec, Err: input.ErrRequired})
		default:
			d.fail(&input.Error{Path: m.path, Accepts: m.node.accepts(), Err: input.ErrRequired})
		}
	}
}

// undecided lists the inputs that matter or not by a choice that is itself wrong:
// what is missing or out of range there is not reported before the choice is right.
func (d *decoder) undecided(entries map[string]input.Entry) map[string]bool {
	open := map[string]bool{}
	for _, o := range d.objects {
		wrong := func(f *node) bool {
			path := under(o.path, f.name)
			return f.entry.Choice != nil && (d.failed[path] || entries[path].Check() != nil)
		}
		if !slices.ContainsFunc(o.node.fields, wrong) {
			continue
		}
		rules := o.node.rules()
		for _, f := range o.node.fields {
			needs := func(c condition) bool { return c.concerns(f.name) && c.holds(o) }
			if rules.idle[f.name] && !slices.ContainsFunc(rules.when, needs) {
				open[under(o.path, f.name)] = true
			}
		}
	}
	return open
}

func byPath(s *Spec) map[string]input.Entry {
	entries := map[string]input.Entry{}
	for _, e := range input.Walk(s) {
		entries[e.Path] = e
	}
	return entries
}

// explained reports whether an error at path follows from what was already found
// there, in a part of the document that holds it, or in the choice that governs it.
func (d *decoder) explained(path string) bool {
	for p := range prefixes(path) {
		if d.failed[p] || d.open[p] {
			return true
		}
	}
	return false
}

// prefixes yields path, then the paths of what holds it, the innermost first.
func prefixes(path string) func(yield func(string) bool) {
	return func(yield func(string) bool) {
		for yield(path) && path != "" {
			path = path[:max(0, strings.LastIndexAny(path, ".["))]
		}
	}
}

// report joins the errors in the order in which a reader meets their places.
func (d *decoder) report() error {
	place := func(e *input.Error) int {
		for p := range prefixes(e.Path) {
			if at, ok := d.places[p]; ok {
				return at
			}
		}
		return 0
	}
	slices.SortStableFunc(d.errs, func(a, b *input.Error) int { return cmp.Compare(place(a), place(b)) })
	var errs []error
	for _, e := range d.errs[:min(len(d.errs), maxErrors)] {
		errs = append(errs, e)
	}
	return errors.Join(errs...)
}

// plain matches keys that a path can carry as they are.
var plain = regexp.MustCompile(`^[A-Za-z0-9_-]{1,60}$`)

// under extends path by an object's key.
func under(path, key string) string {
	if !plain.MatchString(key) {
		if r := []rune(key); len(r) > 60 {
			key = string(r[:60]) + "…"
		}
		return path + "[" + strconv.Quote(key) + "]"
	}
	if path == "" {
		return key
	}
	return path + "." + key
}

func at(path string, i int) string { return fmt.Sprintf("%s[%d]", path, i) }

// nearest is the known name that key was probably meant to be, or every name.
func nearest(key string, names []string) string {
	key = strings.ToLower(key)
	best, least := "", 2+len(key)/4
	for _, n := range names {
		if k := distance(key, n); k < least {
			best, least = n, k
		}
	}
	if best == "" {
		return strings.Join(names, ", ")
	}
	return best
}

// distance is how many letters must be put in, left out or changed to turn a into b.
func distance(a, b string) int {
	if len(a) > 2*len(b)+4 {
		return len(a)
	}
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range len(a) {
		diagonal := row[0]
		row[0] = i + 1
		for j := range len(b) {
			change := diagonal
			if a[i] != b[j] {
				change++
			}
			diagonal = row[j+1]
			row[j+1] = min(change, row[j]+1, diagonal+1)
		}
	}
	return row[len(b)]
}
