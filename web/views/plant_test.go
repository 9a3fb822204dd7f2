package views

import (
	"context"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// plantStudy studies the first variant of the demo, changed, in the view, changed.
func plantStudy(t *testing.T, change func(*project.Spec, *powerplant.PistonPropeller), look func(*study.View)) *study.Study {
	t.Helper()
	s := project.Demo()
	if change != nil {
		change(s, s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller))
	}
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	view := study.DefaultView(p, 0)
	if look != nil {
		look(&view)
	}
	return study.Run(p, 0, view)
}

func plantText(t *testing.T, p Plant) string {
	t.Helper()
	var b strings.Builder
	if err := PlantPage(p).Render(context.Background(), &b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// TestPlantPage: every case is a whole page that holds no missing number.
func TestPlantPage(t *testing.T) {
	type prop = powerplant.PistonPropeller
	governed := func(_ *project.Spec, p *prop) {
		p.Propeller.Kind, p.Propeller.Speed, p.Engine.CriticalAltitude = powerplant.ConstantSpeed, 44, 3000
	}
	for name, c := range map[string]struct {
		change func(*project.Spec, *prop)
		look   func(*study.View)
		want   []string
	}{
		"demo": {nil, nil, []string{`id="plant-given"`, "of what momentum theory allows", "rated 2800", "throttled to hold the greatest speed", "Glauert 1935", "maker&#39;s data",
			`id="plant-speed"`, `id="plant-efficiency"`, `id="plant-power"`, `id="plant-lapse"`, `id="plant-propeller"`}},
		"governed":     {governed, nil, []string{"Constant-speed propeller", "Power is held to the critical altitude", "loaded disc"}},
		"overweight":   {func(s *project.Spec, _ *prop) { s.Variants[0].Aircraft.Weights.Empty = 900 }, nil, []string{"none, see below", "Level maximum: no level flight", "There is no level maximum there"}},
		"mission ends": {func(s *project.Spec, _ *prop) { s.Legs[2].Altitude = 6000 }, nil, []string{"Cruise out, cruise back: the mission ends in “Climb”"}},
		"aviation":     {func(s *project.Spec, _ *prop) { s.Display = string(units.Aviation) }, nil, []string{"lbf", "lb/hp·h"}},
		"thin air":     {governed, func(v *study.View) { v.Altitude = 20000 }, []string{"the engine makes no power", "air is too thin"}},
		"no air":       {nil, func(v *study.View) { v.Altitude = 1e6 }, []string{"note reason", "What it rests on"}},
		"placeholder":  {func(s *project.Spec, _ *prop) { s.Variants[0].Basis = nil }, nil, []string{"Placeholders among these inputs: 1", "(placeholder)"}},
		"short table":  {func(_ *project.Spec, p *prop) { p.Propeller.Coefficients = p.Propeller.Coefficients[:7] }, nil, []string{"Add rows to the propeller table"}},
	} {
		s := plantStudy(t, c.change, c.look)
		text := plantText(t, NewPlant(s, NewFrame(s, 1, "/powerplant", "", nil)))
		for _, w := range c.want {
			if !strings.Contains(text, w) {
				t.Errorf("%s: the page does not hold %q", name, w)
			}
		}
		for _, bad := range []string{"NaN", "+Inf", "%!", " style=", "<no value>", "{}"} {
			if strings.Contains(text, bad) {
				t.Errorf("%s: the page holds %q", name, bad)
			}
		}
	}
}

// TestPlantRows: the table says what the powerplant gives, with a dash for what does not exist.
func TestPlantRows(t *testing.T) {
	s := plantStudy(t, nil, nil)
	p := s.Plant()
	g, remarks := pointGrid(p, units.Metric)
	for i, row := range g.Rows {
		if len(row) != len(g.Head) || slices.Contains(row, "") {
			t.Errorf("row %d: %q under %d heads", i, row, len(g.Head))
		}
	}
	rest := g.Rows[0]
	if want := units.Metric.Number(units.Force, s.Static.Thrust); rest[0] != "At rest" || rest[6] != want || rest[8] != "–" || rest[9] != "0.00" {
		t.Errorf("at rest: %q, thrust %s", rest, want)
	}
	if want := units.Fixed(100*p.Table[3].Out.Shaft.Efficiency, 1); g.Rows[3][8] != want {
		t.Errorf("best rate: %q, efficiency %s", g.Rows[3], want)
	}
	if want := []string{"Level maximum: throttled to hold the greatest speed of rotation."}; !slices.Equal(remarks, want) {
		t.Errorf("remarks %q", remarks)
	}
	given := givenGrid(p)
	rows := s.Variant().Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Propeller.Coefficients
	for i, r := range rows {
		if want := []string{units.Fixed(r[0], 3), units.Fixed(r[1], 4), units.Fixed(r[2], 4)}; !slices.Equal(given.Rows[i][:3], want) {
			t.Errorf("row %d: %q, entered %q", i, given.Rows[i], want)
		}
	}
	if last := given.Rows[len(given.Rows)-1]; last[3] != "–" {
		t.Errorf("without thrust there is an efficiency: %q", last)
	}
}

// TestPlantWithoutCurves: a powerplant that shows none still has its page.
func TestPlantWithoutCurves(t *testing.T) {
	s := plantStudy(t, nil, nil)
	p := s.Plant()
	p.Curves, p.Given, p.Static, p.Burn = nil, nil, study.StaticThrust{}, study.Burn{}
	text := plantText(t, newPlant(s, p, NewFrame(s, 1, "/powerplant", "", nil)))
	for _, w := range []string{"shows no curves", "no propeller of known diameter", "No consumption to show", "Operating points"} {
		if !strings.Contains(text, w) {
			t.Errorf("the page does not hold %q", w)
		}
	}
	if strings.Contains(text, `id="plant-power"`) || strings.Contains(text, "plant-given") {
		t.Error("it has a chart or a table of its own")
	}
}

// TestPlantViewForm: the form comes back to this page, and keeps the view.
func TestPlantViewForm(t *testing.T) {
	s := plantStudy(t, nil, func(v *study.View) { v.Altitude = 1234 })
	text := plantText(t, NewPlant(s, NewFrame(s, 7, "/powerplant", "?altitude=1234", nil)))
	for _, w := range []string{`action="/projects/7/variants/a/powerplant"`, `value="1234"`, `href="/projects/7/variants/a/powerplant?altitude=1234"`} {
		if !strings.Contains(text, w) {
			t.Errorf("the page does not hold %q", w)
		}
	}
}
