package views

import (
	"bytes"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func climbPage(t *testing.T, sys units.System, change func(*study.View)) (ClimbPage, string) {
	t.Helper()
	spec := project.Demo()
	spec.Display = string(sys)
	p, err := spec.Build()
	if err != nil {
		t.Fatal(err)
	}
	v := study.DefaultView(p, 0)
	if change != nil {
		change(&v)
	}
	s := study.Run(p, 0, v)
	page := NewClimbPage(s, s.Envelope(), s.Structure(), NewFrame(s, 1, "/climb", "", nil))
	var b bytes.Buffer
	if err := ClimbAndEnvelope(page).Render(t.Context(), &b); err != nil {
		t.Fatal(err)
	}
	return page, b.String()
}

func TestClimbPageInEverySystem(t *testing.T) {
	for sys, want := range map[units.System][]string{
		units.Metric:   {"5.0\u00a0m/s of head wind", "Service ceiling, m", "50.6\u00a0kg/m²"},
		units.Aviation: {"10.0\u00a0kt of head wind", "Service ceiling, ft", "100\u00a0ft/min left", "10.4\u00a0lb/ft²"},
		units.Small:    {"5.0\u00a0m/s of head wind"},
	} {
		page, html := climbPage(t, sys, nil)
		for _, w := range want {
			if !strings.Contains(html, w) {
				t.Errorf("%s: does not say %q", sys, w)
			}
		}
		if len(page.Turns.Rows) != 5 || page.Turns.Rows[4][0] != "60°" || page.Turns.Rows[4][1] != "2.00" || page.Turns.Rows[0][7] != "–" {
			t.Errorf("%s: turns %v", sys, page.Turns.Rows)
		}
		if len(page.Glides) != 2 || len(page.Glides[0].Rows) != 3 || page.Ceilings.Reason != "" {
			t.Errorf("%s: glides %v, ceilings %q", sys, page.Glides, page.Ceilings.Reason)
		}
		if rows := page.Structure.Speeds.Rows; len(rows) != 7 || rows[2][3] != "4.80" || rows[4][9] != "both manoeuvre" {
			t.Errorf("%s: design speeds %v", sys, rows)
		}
		for _, g := range append(page.Glides, page.Turns, page.Ceilings, page.Structure.Speeds, page.Structure.Masses) {
			for _, r := range g.Rows {
				if len(r) != len(g.Head) {
					t.Errorf("%s: %d cells under %d heads in %q", sys, len(r), len(g.Head), g.Caption)
				}
			}
		}
	}
}

// The turn that thrust does not hold says so beside its number, and what has no answer gives its reason.
func TestClimbPageSaysNo(t *testing.T) {
	page, _ := climbPage(t, units.Metric, nil)
	if got := []string{page.Turns.Rows[3][2], page.Turns.Rows[4][2]}; got[0] != "yes" || got[1] != "no" {
		t.Errorf("turns of 45° and 60° keep their height: %v", got)
	}
	for name, c := range map[string]struct {
		change func(*study.View)
		lead   string
	}{
		"above the ceiling": {func(v *study.View) { v.Altitude = 6000 }, "Does not hold 6000\u00a0m"},
		"too heavy":         {func(v *study.View) { v.Mass = 1500 }, "Does not reach"},
		"no flight":         {func(v *study.View) { v.Mass = 9000 }, "lies above the never-exceed speed"},
	} {
		page, html := climbPage(t, units.Metric, c.change)
		if !strings.Contains(page.Lead, c.lead) {
			t.Errorf("%s: %q", name, page.Lead)
		}
		if strings.Contains(html, "NaN") || strings.Contains(html, "Inf") {
			t.Errorf("%s: a number that is none", name)
		}
		if page.Facts[0].Value != "none" || page.Facts[0].Remark == "" {
			t.Errorf("%s: sustains %+v", name, page.Facts[0])
		}
	}
}
