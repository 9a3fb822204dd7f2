package input

import (
	"errors"
	"fmt"
	"strings"

	"legwright/internal/perf/units"
)

// What can be wrong with an input.
var (
	ErrSyntax    = errors.New("not understood as a number")
	ErrUnit      = errors.New("unit not known here")
	ErrAmbiguous = errors.New("not clear, for it could mean two numbers")
	ErrRange     = errors.New("outside what is accepted")
	ErrRequired  = errors.New("required")
	ErrChoice    = errors.New("not one of the choices")
	ErrOrder     = errors.New("out of order")
	ErrUnknown   = errors.New("not a field of this document")
	ErrType      = errors.New("of the wrong type")
	ErrConflict  = errors.New("in conflict with another input")
	ErrMalformed = errors.New("not well-formed JSON")
	ErrDuplicate = errors.New("given more than once")
)

// An Error reports one unacceptable input.
type Error struct {
	Path    string  // where it stands in the document, "mission.legs[2].altitude"
	Spec    *Spec   // nil where the input is not a number
	Value   float64 // in the SI unit of Spec.Quantity; of a number that is out of range, or in conflict when Text is empty
	Text    string  // what was given, when it is not a number in range terms
	Accepts string  // what is accepted, when Spec does not say it
	Err     error   // one of the sentinels above
}

func (e *Error) Error() string {
	if e.Path == "" {
		return e.Sentence(units.Metric)
	}
	return e.Path + ": " + e.Sentence(units.Metric)
}

func (e *Error) Unwrap() error { return e.Err }

// Sentence words the error for the person who reads in sys: what was wrong and what is accepted.
func (e *Error) Sentence(sys units.System) string {
	if e.Spec == nil {
		return e.plain()
	}
	u := sys.Unit(e.Spec.Quantity)
	accepted := lower(e.Spec.Label) + " must be " + e.Spec.Accepted(u)
	if e.Err == ErrRange {
		return fmt.Sprintf("%s; got %s", accepted, withUnit(e.Value, u))
	}
	given := clip(e.Text)
	if given == "" && e.Err == ErrConflict {
		given = withUnit(e.Value, u)
	}
	text := fmt.Sprintf("“%s” is %v", given, e.Err)
	if e.Err == ErrRequired {
		text = "a value is required"
	}
	if e.Accepts != "" {
		return text + "; " + e.Accepts
	}
	return text + "; " + accepted
}

// withUnit writes a number as it is told back to the person who typed it.
func withUnit(si float64, u units.Unit) string {
	return strings.TrimSpace(units.Plain(round(u.FromSI(si), 6)) + " " + u.Symbol)
}

func (e *Error) plain() string {
	text := e.Err.Error()
	if e.Text != "" {
		text = fmt.Sprintf("“%s” is %v", clip(e.Text), e.Err)
	}
	if e.Accepts != "" {
		text += "; accepted: " + e.Accepts
	}
	return text
}

func clip(s string) string {
	if r := []rune(s); len(r) > 60 {
		return string(r[:60]) + "…"
	}
	return s
}

// lower makes a label fit inside a sentence, leaving symbols such as CLmax alone.
func lower(label string) string {
	if len(label) > 1 && label[1] >= 'a' && label[1] <= 'z' {
		return strings.ToLower(label[:1]) + label[1:]
	}
	return label
}

// Within prefixes the path of every *Error in err; other errors stay in the list as they are.
func Within(prefix string, err error) error {
	var out []error
	for _, e := range leaves(err) {
		in, ok := e.(*Error)
		if !ok {
			out = append(out, e)
			continue
		}
		c := *in
		switch {
		case c.Path == "":
			c.Path = prefix
		case strings.HasPrefix(c.Path, "["):
			c.Path = prefix + c.Path
		default:
			c.Path = prefix + "." + c.Path
		}
		out = append(out, &c)
	}
	return errors.Join(out...)
}

// leaves flattens err into its input errors and, whole, what contains none.
func leaves(err error) []error {
	switch e := err.(type) {
	case nil:
		return nil
	case interface{ Unwrap() []error }:
		var all []error
		for _, sub := range e.Unwrap() {
			all = append(all, leaves(sub)...)
		}
		return all
	}
	if found := Errors(err); len(found) > 0 {
		all := make([]error, len(found))
		for i, e := range found {
			all[i] = e
		}
		return all
	}
	return []error{err}
}

// Errors flattens a tree of joined and wrapped errors into the input errors in it.
func Errors(err error) []*Error {
	switch e := err.(type) {
	case nil:
		return nil
	case *Error:
		return []*Error{e}
	case interface{ Unwrap() []error }:
		var all []*Error
		for _, sub := range e.Unwrap() {
			all = append(all, Errors(sub)...)
		}
		return all
	case interface{ Unwrap() error }:
		return Errors(e.Unwrap())
	}
	return nil
}
