package project

import (
	"math"
	"slices"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
)

// Convert fills the inputs of the way of giving that was just chosen for a part of
// the aircraft, with their bases: calculated, with a note, the band carried over
// where one number follows from one. What follows from a placeholder is one still.
func (v *Variant) Convert(choice, from string) {
	path, ours := strings.CutPrefix(choice, "aircraft.")
	if !ours {
		return
	}
	weak := v.weakBefore(path, from)
	for _, d := range v.Aircraft.Switch(path, from) {
		b := Basis{Kind: Calculated, Note: d.Note}
		if slices.ContainsFunc(d.From, func(p string) bool { return slices.ContainsFunc(weak, func(w string) bool { return within(w, p) }) }) {
			b.Kind = Placeholder
		}
		if d.Rate != 0 {
			b.PlusMinus = twoDigits(math.Abs(d.Rate) * v.BasisOf(d.From[0]).PlusMinus)
		}
		v.SetBasis(d.Path, b)
	}
}

// twoDigits rounds a band >= 0 to two significant digits.
func twoDigits(band float64) float64 {
	if band < 1e-300 {
		return band
	}
	scale := math.Pow(10, 1-math.Floor(math.Log10(band)))
	return math.Round(band*scale) / scale
}

// Typed tells that the input at the path within the aircraft was given by itself:
// a note of how Convert filled it holds no more.
func (v *Variant) Typed(path string) {
	if b, ok := v.Basis[path]; ok && aircraft.DerivedNote(b.Note) {
		b.Note = ""
		v.Basis[path] = b
	}
}

// weakBefore lists the placeholders among the inputs that counted while the choice was from.
func (v *Variant) weakBefore(choice, from string) []string {
	e, ok := input.Find(&v.Aircraft, choice)
	if !ok || e.Choice == nil {
		return nil
	}
	now := *e.Choice.Value
	*e.Choice.Value = from
	defer func() { *e.Choice.Value = now }()
	var list []string
	for _, e := range input.Walk(&v.Aircraft) {
		if !e.Idle && (e.Number != nil || e.Table != nil) && v.BasisOf(e.Path).Kind == Placeholder {
			list = append(list, e.Path)
		}
	}
	return list
}

// within reports whether path is prefix or stands below it.
func within(path, prefix string) bool {
	rest, ok := strings.CutPrefix(path, prefix)
	return ok && (rest == "" || rest[0] == '.' || rest[0] == '[')
}
