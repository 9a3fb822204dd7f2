package input

import (
	"errors"
	"fmt"
	"slices"
	"unicode/utf8"

	"legwright/internal/perf/units"
)

// An Entry binds the description of one input to the variable that holds it, as
// package flag does. Exactly one of Number, Table, Choice and Text is set.
type Entry struct {
	Number *Number
	Table  *Table
	Choice *Choice
	Text   *Text

	// Path is where the entry stands in the document, "airframe.wing_area";
	// a struct's own Inputs give the last element and Walk completes it.
	Path string
	// Lone marks a choice on which no other input depends, so that whoever asks what depends on what need not try it.
	Lone bool
	// Means says what the value comes to in other terms, shown beside the field; empty where there is nothing to say.
	Means units.Message
	// Idle marks an input that the current choices make irrelevant: it is kept, not shown and not checked.
	Idle bool
}

// A Number is one numeric input.
type Number struct {
	*Spec
	Value *float64 // in the SI unit of Spec.Quantity
}

// A Table is a list of rows of numbers, one column per Spec.
type Table struct {
	Name    string // JSON key
	Label   string
	Note    string
	Columns []*Spec
	MinRows int
	Derived []Derived    // what sheets often state beside the columns
	Value   *[][]float64 // rows; each as long as Columns, in SI
}

// A Derived is a number that follows from a row of a table. A sheet that states it too
// shows whether its columns are read in the units and definitions that they are written in.
type Derived struct {
	*Spec
	Of func(row []float64) float64 // from a row in SI to the SI unit of Spec.Quantity; NaN where it has no meaning
}

// A Choice is one of a few named options.
type Choice struct {
	Name    string // JSON key
	Label   string
	Options []Option
	Value   *string
	Ways    bool // the options are ways of giving the same thing, which its owner converts
}

// An Option is one value that a Choice accepts.
type Option struct{ Value, Label string }

// A Text is a line of free text.
type Text struct {
	Name  string // JSON key
	Label string
	Max   int // longest accepted, in characters
	Value *string
}

// Num describes a number held in v.
func Num(s *Spec, v *float64) Entry { return Entry{Number: &Number{s, v}, Path: s.Name} }

// If marks e idle unless relevant.
func (e Entry) If(relevant bool) Entry {
	e.Idle = !relevant
	return e
}

// Alone marks e as a choice on which no other input depends.
func (e Entry) Alone() Entry {
	e.Lone = true
	return e
}

// Meaning adds what the value comes to in other terms.
func (e Entry) Meaning(m units.Message) Entry {
	e.Means = m
	return e
}

// Rows describes a table held in v.
func Rows(t Table, v *[][]float64) Entry {
	t.Value = v
	return Entry{Table: &t, Path: t.Name}
}

// Pick describes a choice held in v.
func Pick(name, label string, v *string, options ...Option) Entry {
	return Entry{Choice: &Choice{Name: name, Label: label, Options: options, Value: v}, Path: name}
}

// Ways describes a choice held in v of how to give what its owner, a Converter, keeps the same.
func Ways(name, label string, v *string, options ...Option) Entry {
	e := Pick(name, label, v, options...)
	e.Choice.Ways = true
	return e
}

// Line describes a line of text held in v.
func Line(name, label string, limit int, v *string) Entry {
	return Entry{Text: &Text{name, label, limit, v}, Path: name}
}

// Label is the entry's label as the form shows it.
func (e Entry) Label() string {
	switch {
	case e.Number != nil:
		return e.Number.Label
	case e.Table != nil:
		return e.Table.Label
	case e.Choice != nil:
		return e.Choice.Label
	}
	return e.Text.Label
}

// Check reports what is unacceptable about the value that e holds.
func (e Entry) Check() error {
	switch {
	case e.Idle:
		return nil
	case e.Number != nil:
		return at(e.Path, e.Number.Check(*e.Number.Value))
	case e.Table != nil:
		return e.Table.check(e.Path)
	case e.Choice != nil:
		if !slices.ContainsFunc(e.Choice.Options, func(o Option) bool { return o.Value == *e.Choice.Value }) {
			return &Error{Path: e.Path, Text: *e.Choice.Value, Accepts: e.Choice.accepted(), Err: ErrChoice}
		}
	case e.Text != nil:
		if utf8.RuneCountInString(*e.Text.Value) > e.Text.Max {
			return &Error{Path: e.Path, Text: *e.Text.Value, Accepts: fmt.Sprintf("up to %d characters", e.Text.Max), Err: ErrRange}
		}
	}
	return nil
}

func (c *Choice) accepted() string {
	text := ""
	for i, o := range c.Options {
		if i > 0 {
			text += ", "
		}
		text += o.Value
	}
	return text
}

// check also requires the first column to rise strictly, which every table of the engine needs.
func (t *Table) check(path string) error {
	rows := *t.Value
	var errs []error
	if len(rows) < t.MinRows {
		errs = append(errs, &Error{Path: path, Text: fmt.Sprintf("%d rows", len(rows)), Accepts: fmt.Sprintf("at least %d rows", t.MinRows), Err: ErrRange})
	}
	for i, row := range rows {
		where := fmt.Sprintf("%s[%d]", path, i)
		if len(row) != len(t.Columns) {
			errs = append(errs, &Error{Path: where, Text: fmt.Sprintf("%d numbers", len(row)), Accepts: fmt.Sprintf("%d numbers a row", len(t.Columns)), Err: ErrRange})
			continue
		}
		for j, c := range t.Columns {
			errs = append(errs, at(where+"."+c.Name, c.Check(row[j])))
		}
		if i > 0 && len(rows[i-1]) == len(row) && row[0] <= rows[i-1][0] {
			errs = append(errs, &Error{Path: where + "." + t.Columns[0].Name, Text: units.Plain(row[0]),
				Accepts: "values that rise from row to row", Err: ErrOrder})
		}
	}
	return errors.Join(errs...)
}

func at(path string, err error) error {
	if e, ok := err.(*Error); ok {
		c := *e
		c.Path = path
		return &c
	}
	return err
}
