// Package input describes each thing that a user can give: its name, label,
// quantity and accepted range, once. The same description drives the form
// field, the parse, the check, the JSON schema and the report's table of inputs.
package input

import (
	"fmt"
	"math"
	"strings"

	"legwright/internal/perf/units"
)

// A Spec describes one numeric input.
type Spec struct {
	Name     string         // JSON key
	Label    string         // as the form shows it
	Quantity units.Quantity // what it measures
	Min      float64        // smallest accepted, in the quantity's SI unit, inclusive
	Max      float64        // largest accepted, in the quantity's SI unit, inclusive
	Note     string         // what it is, or why the range is what it is
	Typical  *Typical       // nil when the class of aircraft decides
	Also     []string       // what the heads of a sheet may call it beside Name and Label
	Decided  bool           // the designer decides it: it is not known from anywhere, so it has no basis
}

// Typical is the range that a reader would expect, shown beside the field; values outside it are accepted.
type Typical struct {
	Low    float64 // in the quantity's SI unit
	High   float64 // in the quantity's SI unit
	Source string  // where the range comes from
}

// CommonPractice marks a typical range that has no published source.
const CommonPractice = "common practice, no source"

// Check returns nil or an *Error wrapping ErrRange. NaN is never accepted.
func (s *Spec) Check(si float64) error {
	if si >= s.Min && si <= s.Max {
		return nil
	}
	return &Error{Path: s.Name, Spec: s, Value: si, Err: ErrRange}
}

// Bounds returns Min and Max in u to four significant digits, rounded inward
// so that the numbers shown to a user are themselves accepted.
func (s *Spec) Bounds(u units.Unit) (lo, hi float64) {
	return inward(u.FromSI(s.Min), math.Ceil), inward(u.FromSI(s.Max), math.Floor)
}

func inward(x float64, round func(float64) float64) float64 {
	if x == 0 {
		return 0
	}
	scale := math.Pow(10, 3-math.Floor(math.Log10(math.Abs(x))))
	// A bound that already has four digits must not be pushed to the next one by the last bit of a conversion.
	if near := math.Round(x * scale); math.Abs(near-x*scale) < 1e-9*math.Abs(x*scale) {
		return near / scale
	}
	return round(x*scale) / scale
}

// Accepted says in words what s accepts, in the unit u.
func (s *Spec) Accepted(u units.Unit) string {
	lo, hi := s.Bounds(u)
	sym := u.Symbol
	if sym != "" && sym != "°" {
		sym = " " + sym
	}
	return fmt.Sprintf("%s to %s%s", units.Plain(lo), units.Plain(hi), sym)
}

// Unusual says in words that si lies outside the typical range, or "" when it does not.
func (s *Spec) Unusual(si float64, u units.Unit) string {
	t := s.Typical
	if t == nil || (si >= t.Low && si <= t.High) {
		return ""
	}
	return s.Usual(u)
}

// Usual says in words the range that a reader would expect and where it comes from, or "" when none is known.
func (s *Spec) Usual(u units.Unit) string {
	t := s.Typical
	if t == nil {
		return ""
	}
	number := strings.TrimSpace(short(u.FromSI(t.High)) + " " + u.Symbol)
	return fmt.Sprintf("Typical %s to %s (%s).", short(u.FromSI(t.Low)), number, t.Source)
}

// Unusually says in words that a number of that name which is not typed but follows,
// in the SI unit, lies outside the typical range of s, or "" when it does not. It is for quantities without a unit.
func (s *Spec) Unusually(name string, si float64) string {
	t := s.Typical
	if t == nil || (si >= t.Low && si <= t.High) {
		return ""
	}
	return fmt.Sprintf("%s follows as %s; typical %s to %s (%s).", name, short(si), short(t.Low), short(t.High), t.Source)
}

func short(v float64) string { return units.Plain(round(v, 3)) }

func round(v float64, digits int) float64 {
	if v == 0 {
		return 0
	}
	scale := math.Pow(10, float64(digits-1)-math.Floor(math.Log10(math.Abs(v))))
	return math.Round(v*scale) / scale
}
