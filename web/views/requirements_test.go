package views

import (
	"bytes"
	"fmt"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// wants makes the page and the bench of the demo's first variant with other requirements.
func wants(t testing.TB, change func(*project.Spec)) (Requirements, Bench, string) {
	t.Helper()
	s := project.Demo()
	change(s)
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	st := study.Run(p, 0, study.DefaultView(p, 0))
	state := State{ProjectID: 1, Page: "requirements"}
	page := NewRequirements(st, state)
	var b bytes.Buffer
	if err := RequirementsPage(page).Render(t.Context(), &b); err != nil {
		t.Fatal(err)
	}
	return page, NewBench(st, State{ProjectID: 1}), b.String()
}

// everything requires each figure, under conditions where it takes any.
func everything(s *project.Spec) {
	s.Requirements = nil
	for _, k := range project.FigureKinds() {
		r := project.Require(k.ID, k.Bound, k.Usual)
		r.MassGiven = project.AtGreatest
		s.Requirements = append(s.Requirements, r)
	}
}

func TestRequirementRows(t *testing.T) {
	p, _, page := wants(t, everything)
	if len(p.Rows) != len(project.FigureKinds()) || len(p.Groups) != len(p.Rows) {
		t.Fatalf("%d rows, %d forms", len(p.Rows), len(p.Groups))
	}
	for i, r := range p.Rows {
		if r.Got == "" && r.Reason == "" || r.Wanted == "" || r.Word == "" || r.URL == "" || !strings.Contains(page, `id="`+r.EditID+`"`) {
			t.Errorf("%+v", r)
		}
		kind := project.FigureKinds()[i]
		if kind.Takes&project.Load != 0 && (r.Conditions == "" || !strings.Contains(r.Where, "650.0\u00a0kg")) {
			t.Errorf("%s: conditions %q, where %q", r.Label, r.Conditions, r.Where)
		}
		if r.Got != "" && (r.Margin == "" || strings.HasPrefix(r.Margin, "−") != (r.Word == "missed")) {
			t.Errorf("%s: %s by %s", r.Label, r.Word, r.Margin)
		}
	}
	for _, bad := range []string{"NaN", "Inf", "{}", "%!"} {
		if strings.Contains(page, bad) {
			t.Errorf("the page has %s", bad)
		}
	}
}

func TestMarginBar(t *testing.T) {
	for _, c := range []struct {
		share    float64
		x, width string
	}{{0.25, "50.0", "25.0"}, {-0.25, "25.0", "25.0"}, {0.5, "50.0", "50.0"}, {7, "50.0", "50.0"}, {-7, "0.0", "50.0"}, {0, "50.0", "0.8"}} {
		if b := newBar(c.share, "good"); b.X != c.x || b.Width != c.width {
			t.Errorf("%g: from %s, %s wide", c.share, b.X, b.Width)
		}
	}
	// The difference of two percentages is no percentage.
	p, _, _ := wants(t, func(s *project.Spec) {
		s.Requirements = []project.Requirement{project.Require("thrust_in_hand", project.AtLeast, 0.2), project.Require("climb_rate", project.AtLeast, 0)}
	})
	if got := p.Rows[0].Margin; !strings.HasPrefix(got, "−3.") || !strings.HasSuffix(got, "points") {
		t.Errorf("margin %q", got)
	}
	if r := p.Rows[1]; r.Share != "" || r.Bar.Tone != "" || !strings.HasPrefix(r.Margin, "+2.98") {
		t.Errorf("over a limit of 0: %+v", r)
	}
}

func TestRequirementsHeadline(t *testing.T) {
	for _, c := range []struct {
		change func(*project.Spec)
		says   string
		tone   string
	}{
		{func(s *project.Spec) {}, "4 of 5 requirements met, 1 missed.", "bad"},
		{func(s *project.Spec) { s.Requirements = s.Requirements[1:] }, "4 of 4 requirements met.", "good"},
		{func(s *project.Spec) { s.Requirements = nil }, "Nothing is required yet.", "caution"},
		{func(s *project.Spec) {
			s.Requirements = s.Requirements[1:2]
			s.Requirements[0].MassGiven, s.Requirements[0].Mass = project.GivenMass, 1
		}, "0 of 1 requirements met, 1 not evaluated.", "caution"},
	} {
		if p, _, _ := wants(t, c.change); p.Headline != c.says || p.Tone != c.tone {
			t.Errorf("%q, %s; want %q, %s", p.Headline, p.Tone, c.says, c.tone)
		}
	}
}

// The verdict of the bench stays short: what is missed comes first, and the rest is a link.
func TestManyTiles(t *testing.T) {
	p, b, _ := wants(t, func(s *project.Spec) {
		for range 20 {
			s.Requirements = append(s.Requirements, project.Require("wing_loading", project.AtMost, 10))
		}
		r := project.Require("service_ceiling", project.AtLeast, 1000)
		r.MassGiven, r.Mass = project.GivenMass, 1
		s.Requirements = append(s.Requirements[:4:4], append([]project.Requirement{r}, s.Requirements[4:]...)...)
	})
	if len(b.Tiles) != mostTiles || b.More != fmt.Sprintf("and %d more", len(p.Rows)-mostTiles) || b.MoreURL != "/projects/1/variants/a/requirements" {
		t.Errorf("%d tiles, %q to %s", len(b.Tiles), b.More, b.MoreURL)
	}
	for _, tile := range b.Tiles {
		if tile.Tone != "bad" {
			t.Errorf("%+v before what is missed", tile)
		}
	}
	if !strings.Contains(b.Verdict.Missed, "18 more") || len(b.Verdict.Missed) > 200 {
		t.Errorf("%q", b.Verdict.Missed)
	}
	if _, few, _ := wants(t, func(s *project.Spec) {}); len(few.Tiles) != 5 || few.More != "" || few.Tiles[0].Caption != "take-off over the obstacle, ≤\u00a0450\u00a0m" {
		t.Errorf("%+v", few.Tiles)
	}
}

// A figure names the placeholders that it rests on.
func TestRequirementSaysPlaceholders(t *testing.T) {
	p, _, page := wants(t, func(s *project.Spec) {
		everything(s)
		for _, path := range []string{"airframe.wing_area", "airframe.landing.cl_max", "weights.max_take_off", "airframe.span", "airframe.cd_min"} {
			delete(s.Variants[0].Basis, path)
		}
	})
	for i, k := range project.FigureKinds() {
		weak := p.Rows[i].Weak
		switch k.ID {
		case "stall_landing":
			if weak != "rests on 3 placeholders: wing area, CLmax, greatest take-off mass" {
				t.Errorf("stall: %q", weak)
			}
		case "range":
			if !strings.HasSuffix(weak, "and 1 more") {
				t.Errorf("range: %q", weak)
			}
		case "static_thrust":
			if weak != "" {
				t.Errorf("static thrust: %q", weak)
			}
		}
	}
	if !strings.Contains(page, "Rests on 3 placeholders") {
		t.Error("the page does not say it")
	}
}

// Each preset is on the page with its clause, how its number got here, and a button until the project has it.
func TestPresetsShown(t *testing.T) {
	p, _, page := wants(t, func(s *project.Spec) {
		vla, _ := project.LookupPreset("vla")
		s.Requirements = append(s.Requirements, vla.Requirements[:2]...)
		night, _ := project.LookupPreset("vfr-night")
		s.Requirements = append(s.Requirements, night.Requirements...)
	})
	shown := 0
	for _, c := range p.Classes {
		for _, v := range c.Presets {
			shown++
			if v.Clause == "" || v.Status == "" || len(v.Wants) == 0 {
				t.Errorf("%+v", v)
			}
			switch v.Clause {
			case "CS-VLA 49, 51, 65 and 77":
				if v.Action != "add-preset vla" || v.Partly != "2 of 4 already in the list" {
					t.Errorf("%+v", v)
				}
			case "14 CFR 91.151(a)(2)":
				if v.Action != "" {
					t.Errorf("%+v", v)
				}
			}
		}
	}
	if shown != len(project.Presets()) || !strings.Contains(page, "The current text of the rule decides") {
		t.Errorf("%d presets", shown)
	}
	if got := units.Metric.Format(units.Speed, 23.15); !strings.Contains(page, got) {
		t.Errorf("no %s", got)
	}
}
