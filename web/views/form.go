package views

import (
	"fmt"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A Field is one labelled input as the page shows it.
type Field struct {
	Path    string // name of the form field: the path in the document
	ID      string
	Label   string
	Kind    string // number, text, choice or table
	Value   string // as it stands in the field: what was typed, when that was refused
	Unit    string
	Options []Option
	Rows    int    // of a table's text area
	Head    string // column heads of a table
	Note    string
	Accepts string // the accepted range, for the hint
	Typical string // the range that a reader would expect, with its source
	Unusual string // the value lies outside the typical range
	Error   string
	Clashes []Clash
	Says    string   // what is given comes to in other terms, or a choice of how to give it in the other ways
	Basis   []Option // nil when the input has no basis
	Weak    bool     // placeholder
	Remark  string   // note of the basis
	Import  string   // address of the page that fills a table from a file
}

// long reports whether what stands in the entry of a number needs more room than its column has.
func (f Field) long() bool {
	const room = 14 // characters
	return f.Kind == "number" && utf8.RuneCountInString(f.Value)+utf8.RuneCountInString(f.Unit) > room
}

// An Option is one choice of a select.
type Option struct {
	Value, Label string
	Selected     bool
}

// A Group is one subject of inputs, one form.
type Group struct {
	ID      string
	Title   string
	Summary string
	Open    bool
	Blocks  []Block
	Totals  *Totals  // what the inputs add up to; nil when they add up to nothing
	Adds    []Button // actions that add to a list
	More    string   // where the rest of the subject is entered; empty when all of it is here

	Warnings []WarningView // about what the group holds
}

// A Block is a run of fields under an optional heading.
type Block struct {
	Title   string
	Compact bool // fields share one line
	Fields  []Field
	Buttons []Button
}

// A Button posts an action with the form.
type Button struct {
	Action string
	Label  string
	Title  string
}

// A Refusal is an edit that was not taken: what was typed and why.
type Refusal struct {
	Path, Text, Why string
	Theirs          *Theirs // nil unless another window has saved the same thing meanwhile
}

// Theirs is what another window saved in the place of what was typed here.
type Theirs struct {
	Text  string // with its unit, short
	Whole string
	When  string // revision and time; empty when nobody knows
}

// A Clash is the choice between what was typed and what another window saved.
type Clash struct {
	Name         string // of the form field
	ID           string
	Of           string // what it is the value of
	Typed        string // what was refused
	Mine, Theirs string // on the buttons
	Whole        string // what the other window saved, where Theirs does not tell it all
}

// A form makes fields of the inputs of a document.
type form struct {
	sys      units.System
	spec     *project.Spec
	variant  int
	entries  []input.Entry
	refusals map[string]Refusal
}

func newForm(spec *project.Spec, variant int, refusals []Refusal) *form {
	f := &form{sys: spec.System(), spec: spec, variant: variant, entries: input.Walk(spec), refusals: map[string]Refusal{}}
	for _, r := range refusals {
		f.refusals[r.Path] = r
	}
	return f
}

// EntryText is how an input stands in its form field.
func EntryText(e input.Entry, sys units.System) string {
	switch {
	case e.Number != nil:
		return sys.Entry(e.Number.Quantity, *e.Number.Value)
	case e.Table != nil:
		return e.Table.Text(sys)
	case e.Choice != nil:
		return *e.Choice.Value
	}
	return *e.Text.Value
}

// FieldText is EntryText, with the stated band of a number that has a basis.
func FieldText(spec *project.Spec, e input.Entry, sys units.System) string {
	if b, ok := spec.BasisAt(e); ok && e.Number != nil {
		return e.Number.WithBand(sys, *e.Number.Value, b.PlusMinus)
	}
	return EntryText(e, sys)
}

// field makes the field of one entry.
func (f *form) field(e input.Entry) Field {
	fd := Field{Path: e.Path, ID: elementID(e.Path), Label: e.Label(), Value: FieldText(f.spec, e, f.sys), Says: e.Means.In(f.sys)}
	switch {
	case e.Number != nil:
		u := f.sys.Unit(e.Number.Quantity)
		fd.Kind, fd.Unit, fd.Note = "number", u.Symbol, e.Number.Note
		fd.Accepts, fd.Typical, fd.Unusual = e.Number.Accepted(u), e.Number.Usual(u), e.Number.Unusual(*e.Number.Value, u)
	case e.Table != nil:
		fd.Kind, fd.Note, fd.Rows, fd.Head = "table", e.Table.Note, max(4, min(14, len(*e.Table.Value)+1)), tableHead(e.Table, f.sys)
	case e.Choice != nil:
		fd.Kind = "choice"
		for _, o := range e.Choice.Options {
			fd.Options = append(fd.Options, Option{o.Value, o.Label, o.Value == *e.Choice.Value})
		}
	default:
		fd.Kind = "text"
	}
	if r, ok := f.refusals[e.Path]; ok {
		fd.Value, fd.Error = r.Text, r.Why
		selectOption(fd.Options, r.Text)
		fd.clash(e.Label(), r, fd.Options)
	}
	f.basis(e, &fd)
	return fd
}

func tableHead(t *input.Table, sys units.System) string {
	heads := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		heads[i] = c.Label + unitOf(sys, c.Quantity)
	}
	return strings.Join(heads, " · ")
}

// basis adds the basis of a number or table that has one.
func (f *form) basis(e input.Entry, fd *Field) {
	b, ok := f.spec.BasisAt(e)
	if !ok {
		return
	}
	fd.Weak, fd.Remark = b.Kind == project.Placeholder, b.Note
	for _, o := range project.BasisKinds {
		fd.Basis = append(fd.Basis, Option{o.Value, o.Label, o.Value == b.Kind})
	}
	for _, part := range []struct{ prefix, word string }{{"basis:", "Basis"}, {"note:", "Note"}} {
		if r, ok := f.refusals[part.prefix+e.Path]; ok {
			fd.Error = strings.TrimSpace(fd.Error + " " + part.word + ": " + lowerFirst(r.Why))
			if part.prefix == "note:" {
				fd.Remark = r.Text
				fd.clash("the note on "+lowerFirst(e.Label()), r, nil)
			} else {
				selectOption(fd.Basis, r.Text)
				fd.clash("the basis of "+lowerFirst(e.Label()), r, fd.Basis)
			}
		}
	}
}

// selectOption makes the option of that value the one that is shown, if there is one.
func selectOption(options []Option, value string) {
	if !slices.ContainsFunc(options, func(o Option) bool { return o.Value == value }) {
		return
	}
	for i := range options {
		options[i].Selected = options[i].Value == value
	}
}

// clash offers the choice between what was typed and what another window saved.
func (fd *Field) clash(of string, r Refusal, options []Option) {
	if r.Theirs == nil {
		return
	}
	fd.Error = strings.TrimSuffix(fd.Error, ".")
	if r.Theirs.When != "" {
		fd.Error += " (" + r.Theirs.When + ")"
	}
	fd.Error += ". Yours is not saved yet."
	c := Clash{Name: r.Path, ID: elementID(r.Path) + "-clash", Of: of, Typed: r.Text, Mine: "Keep mine: " + clipped(r.Text, 24), Theirs: "Take theirs: " + clipped(r.Theirs.Text, 24)}
	for _, o := range options {
		if o.Value == r.Text {
			c.Mine = "Keep mine: " + o.Label
		}
	}
	if strings.Contains(r.Text, "\n") || r.Text == "" {
		c.Mine = "Keep mine"
	}
	if r.Theirs.Whole != r.Theirs.Text {
		c.Whole = r.Theirs.Whole
	}
	fd.Clashes = append(fd.Clashes, c)
}

// under lists the fields directly below a path: "a.b" takes "a.b.c" and not "a.b.c.d".
func (f *form) under(prefix string) []Field {
	var list []Field
	for _, e := range f.entries {
		rest, ok := strings.CutPrefix(e.Path, prefix+".")
		if ok && !e.Idle && !strings.ContainsAny(rest, ".[") {
			list = append(list, f.field(e))
		}
	}
	return list
}

// groups makes every subject of the bench's inputs.
func (f *form) groups() []Group {
	a := fmt.Sprintf("variants[%d].aircraft", f.variant)
	v := &f.spec.Variants[f.variant].Aircraft
	list := []Group{
		f.airframe(a + ".airframe"),
		{ID: "configurations", Title: "Flaps and gear", Blocks: []Block{
			{Title: "Clean", Fields: f.lift(a+".airframe.clean", aircraft.Clean)},
			{Title: "Take-off", Fields: f.lift(a+".airframe.take_off", aircraft.TakeOff)},
			{Title: "Landing", Fields: f.lift(a+".airframe.landing", aircraft.Landing)}}},
		f.weights(a, len(v.Weights.Items)),
		{ID: "limits", Title: "Structural limits", Blocks: []Block{{Fields: f.under(a + ".limits")}}},
	}
	list = append(list, f.plant(a+".powerplant.values")...)
	list = append(list,
		Group{ID: "strip", Title: "Strip and day", Blocks: append(f.strips(), Block{Title: "Day", Fields: f.under("day")}, Block{Title: "Technique and factors", Fields: f.under("technique")})},
		f.legs(), f.requirements(),
		Group{ID: "names", Title: "Names and units", Blocks: []Block{{Title: "Project", Fields: f.own("name", "note", "display")},
			{Title: "Variant", Fields: f.own(fmt.Sprintf("variants[%d].name", f.variant), fmt.Sprintf("variants[%d].note", f.variant))}},
			Adds: []Button{{Action: "copy-variant", Label: "Copy this variant", Title: "Begin another variant from this one"}}})
	for i := range list {
		list[i].Open = list[i].Open || list[i].refused()
	}
	return list
}

func (g *Group) refused() bool {
	for _, b := range g.Blocks {
		for _, f := range b.Fields {
			if f.Error != "" {
				return true
			}
		}
	}
	return false
}

// own lists the fields at the given paths.
func (f *form) own(paths ...string) []Field {
	var list []Field
	for _, p := range paths {
		for _, e := range f.entries {
			if e.Path == p {
				list = append(list, f.field(e))
			}
		}
	}
	return list
}

func (f *form) weights(a string, items int) Group {
	g := Group{ID: "weights", Title: "Weights", Open: true, Blocks: []Block{{Fields: f.under(a + ".weights")}}, Adds: []Button{{Action: "add-item", Label: "Add an item"}}}
	for i := range items {
		g.Blocks = append(g.Blocks, Block{Compact: true, Fields: f.under(fmt.Sprintf("%s.weights.items[%d]", a, i)),
			Buttons: []Button{{Action: "remove-item " + strconv.Itoa(i), Label: "Remove", Title: "Remove this item"}}})
	}
	return g
}

// plantTitles words the parts of a powerplant model; an unknown part keeps its own name.
var plantTitles = map[string]string{"": "Powerplant", "engine": "Engine", "propeller": "Propeller", "fuel": "Fuel"}

// plant makes one group for each part of the powerplant, whatever its kind.
func (f *form) plant(prefix string) []Group {
	var list []Group
	seen := map[string]bool{}
	first := f.under(prefix)
	for _, e := range f.entries {
		rest, ok := strings.CutPrefix(e.Path, prefix+".")
		part, _, nested := strings.Cut(rest, ".")
		if !ok || !nested || seen[part] {
			continue
		}
		seen[part] = true
		title, known := plantTitles[part]
		if !known {
			title = strings.ToUpper(part[:1]) + part[1:]
		}
		g := Group{ID: "powerplant-" + part, Title: title, Blocks: []Block{{Fields: f.under(prefix + "." + part)}}}
		if len(list) == 0 {
			g.Blocks[0].Fields = append(first, g.Blocks[0].Fields...)
		}
		list = append(list, g)
	}
	return list
}

func (f *form) strips() []Block {
	list := make([]Block, len(f.spec.Strips))
	for i := range list {
		list[i].Fields = f.under(fmt.Sprintf("strips[%d]", i))
	}
	return list
}

func (f *form) legs() Group {
	g := Group{ID: "mission", Title: "Mission", More: "Copies, every kind of leg, and what each leg takes stand on the page Mission."}
	for i := range f.spec.Legs {
		b := Block{Title: fmt.Sprintf("%d · %s", i+1, f.spec.Legs[i].Name), Fields: f.under(fmt.Sprintf("legs[%d]", i))}
		n := strconv.Itoa(i)
		if i > 0 {
			b.Buttons = append(b.Buttons, Button{"move-leg-up " + n, "Earlier", "Move this leg one place earlier"})
		}
		b.Buttons = append(b.Buttons, Button{"insert-leg " + n, "Add a leg after", "Add a leg after this one"}, Button{"remove-leg " + n, "Remove", "Remove this leg"})
		g.Blocks = append(g.Blocks, b)
	}
	g.Adds = []Button{{Action: "add-leg", Label: "Add a leg"}}
	return g
}

func (f *form) requirements() Group {
	g := Group{ID: "requirements", Title: "Requirements", More: "Conditions, margins and published rules stand on the page Requirements.",
		Adds: []Button{{Action: "add-requirement", Label: "Add a requirement"}}}
	for i := range f.spec.Requirements {
		path := fmt.Sprintf("requirements[%d]", i)
		g.Blocks = append(g.Blocks, Block{Compact: true, Title: stated(&f.spec.Requirements[i], f.sys), Fields: f.own(path+".figure", path+".bound", path+".limit"),
			Buttons: []Button{{Action: "remove-requirement " + strconv.Itoa(i), Label: "Remove", Title: "Remove this requirement"}}})
	}
	return g
}
