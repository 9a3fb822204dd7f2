package project

import (
	"math"
	"strings"
	"testing"

	"legwright/internal/perf/reference"
	"legwright/internal/perf/units"
)

// The limits of the presets are those of the rules, in the rules' own units.
func TestPresetLimits(t *testing.T) {
	checked := map[string]int{}
	for _, row := range reference.Read(t, "rule_limits") {
		p, ok := LookupPreset(row.Text("preset"))
		if !ok {
			t.Errorf("no preset %s", row.Text("preset"))
			continue
		}
		found := false
		for i := range p.Requirements {
			r := &p.Requirements[i]
			if r.Figure != row.Text("figure") || r.Clause != row.Text("clause") {
				continue
			}
			found = true
			checked[p.Code]++
			if q := r.Kind().Quantity; q.Name() != row.Text("quantity") {
				t.Errorf("%s: %s is a %s", row, r.Figure, q.Name())
			} else {
				row.Near("limit", in(t, q, row.Text("unit"), r.Limit))
			}
		}
		if !found {
			t.Errorf("%s: no such requirement", row)
		}
	}
	for _, p := range Presets() {
		if checked[p.Code] != len(p.Requirements) && p.Status != NoSource {
			t.Errorf("%s: %d of %d limits have a row", p.Code, checked[p.Code], len(p.Requirements))
		}
	}
}

// in is the number to write for si in the unit of that symbol.
func in(t *testing.T, q units.Quantity, symbol string, si float64) float64 {
	t.Helper()
	for _, u := range q.Units() {
		if u.Symbol == symbol {
			return u.FromSI(si)
		}
	}
	t.Fatalf("%s has no unit %s", q.Name(), symbol)
	return math.NaN()
}

func TestPresets(t *testing.T) {
	seen, last := map[string]bool{}, ""
	classes := map[string]bool{}
	for _, p := range Presets() {
		if seen[p.Code] || p.Code == "" || strings.ContainsAny(p.Code, " /") || p.Title == "" || p.Clause == "" || len(p.Requirements) == 0 {
			t.Errorf("%+v", p)
		}
		seen[p.Code] = true
		if p.Class != last && classes[p.Class] {
			t.Errorf("%s stands apart from its class", p.Code)
		}
		last, classes[p.Class] = p.Class, true
		if p.Status != ReadInExcerpt && p.Status != FromMemory && p.Status != NoSource {
			t.Errorf("%s: status %q", p.Code, p.Status)
		}
		s := Demo()
		if n := len(p.Lacking(s)); n != len(p.Requirements) {
			t.Errorf("%s: the demo lacks %d", p.Code, n)
		}
		s.Requirements = append(s.Requirements, p.Lacking(s)...)
		if _, err := s.Build(); err != nil {
			t.Errorf("%s: %v", p.Code, err)
		}
		// What is there is left alone, also when its limit has been changed.
		s.Requirements[len(s.Requirements)-1].Limit *= 2
		if n := len(p.Lacking(s)); n != 0 {
			t.Errorf("%s: still lacks %d", p.Code, n)
		}
		for _, r := range p.Requirements {
			if r.Clause == "" || r.Bound != r.Kind().Bound {
				t.Errorf("%s: %+v", p.Code, r)
			}
		}
	}
	if _, ok := LookupPreset("none"); ok {
		t.Error("finds a preset that is not there")
	}
}
