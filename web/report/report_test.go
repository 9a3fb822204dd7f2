package report_test

import (
	"math"
	"strings"
	"sync"
	"testing"
	"time"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/web/report"
)

var saved = time.Date(2026, 11, 30, 16, 40, 12, 0, time.UTC)

// of is a report of a variant of the project in the unit system.
func of(t testing.TB, s *project.Spec, variant int, sys units.System) *report.Report {
	t.Helper()
	st, err := report.InUnits(s, variant, sys)
	if err != nil {
		t.Fatal(err)
	}
	return &report.Report{Study: st, Revision: 12, Saved: saved, Paper: report.Papers[0]}
}

// small is an invented unmanned aircraft of about 2 kg with a piston engine.
func small() *project.Spec {
	s := project.Demo()
	s.Name, s.Display = "Heron survey", "small"
	for i := range s.Variants {
		s.Variants[i].Name = "H" + s.Variants[i].ID
		a := &s.Variants[i].Aircraft
		a.Airframe.WingArea, a.Airframe.Span, a.Airframe.WingHeight, a.Airframe.NeverExceed = 0.6, 2.4, 0.2, 32
		a.Weights.Empty, a.Weights.MaxTakeOff = 1.1, 2.4
		a.Weights.Items = a.Weights.Items[:1]
		a.Weights.Items[0].Name, a.Weights.Items[0].Mass = "Camera", 0.25
		p := a.Powerplant.Model.(*powerplant.PistonPropeller)
		p.Mass, p.Propeller.Diameter = 0.45, 0.4
		p.Fuel.Volume, p.Fuel.Capacity, p.Fuel.Unusable = 0.0003, 0.0004, 0.00001
		p.Engine.AccessoryPower, p.Engine.IdleFlow, p.Engine.Redline = 2, 5e-6, 140
		for _, row := range p.Engine.PowerCurve {
			row[0] *= 3
			row[1] /= 250
		}
	}
	for i := range s.Legs {
		l := &s.Legs[i]
		l.Time = min(l.Time, 300)
		l.Distance = min(l.Distance, 15e3)
		l.Speed = min(l.Speed, 15)
		l.Altitude = min(l.Altitude, 900)
		l.HeadWind = 0
	}
	s.Requirements = []project.Requirement{project.Require("take_off_distance", project.AtMost, 60), project.Require("climb_rate", project.AtLeast, 1)}
	return s
}

// impossible is a mission that ends early, with a strip that does not do.
func impossible() *project.Spec {
	s := project.Demo()
	s.Variants[0].Aircraft.Weights.Items[2].Mass = 300
	s.Legs[3].Distance = 5e6
	return s
}

// long has names as long as they are accepted, without a place to break, and signs that the fonts lack.
func long() *project.Spec {
	whole := func(word string, n int) string { return strings.Repeat(word, n)[:n] }
	s := project.Demo()
	s.Name, s.Note = whole("Projectname", 120), whole("Note ", 2000)
	for i := range s.Variants {
		v := &s.Variants[i]
		v.Name = whole("Variantname", 120)
		b := v.Basis["airframe.cd_min"]
		b.Note = "=cmd|' /C calc'!A0, from 高度 and \U0001f6e9 " + whole("remark", 900)
		v.SetBasis("airframe.cd_min", b)
		for j := range v.Aircraft.Weights.Items {
			v.Aircraft.Weights.Items[j].Name = whole("Itemname", 80)
		}
	}
	s.Strips[0].Name = whole("Stripname", 80)
	for i := range s.Legs {
		s.Legs[i].Name = whole("Legname", 60)
	}
	return s
}

// cases are reports that differ in what can go wrong, made once for all tests.
func cases(t testing.TB) map[string]*report.Report {
	made.Do(func() { kept = makeCases(t) })
	if kept == nil {
		t.Fatal("the cases cannot be made")
	}
	return kept
}

var (
	made sync.Once
	kept map[string]*report.Report
)

func makeCases(t testing.TB) map[string]*report.Report {
	letter := of(t, project.Demo(), 0, units.Aviation)
	letter.Paper = report.PaperOf("letter")
	return map[string]*report.Report{
		"demo a": of(t, project.Demo(), 0, units.Metric), "demo b": of(t, project.Demo(), 1, units.Metric), "letter, aviation": letter,
		"impossible": of(t, impossible(), 0, units.Metric), "long": of(t, long(), 0, units.Aviation), "small": of(t, small(), 0, units.Small),
		"placeholders": of(t, project.New("New"), 0, units.Metric),
	}
}

// TestTables: every table of every case has numbers or says why it has none, and no cell is a wreck.
func TestTables(t *testing.T) {
	for name, r := range cases(t) {
		for _, table := range r.Tables() {
			if len(table.Rows) == 0 && table.Reason == "" {
				t.Errorf("%s: %s is empty and does not say why", name, table.Name)
			}
			for i, row := range table.Rows {
				if len(row) != len(table.Columns) {
					t.Errorf("%s: row %d of %s has %d cells under %d heads", name, i, table.Name, len(row), len(table.Columns))
				}
			}
			text := string(table.CSV(report.SI)) + table.Note + table.Reason
			for _, wreck := range []string{"NaN", "Inf", "%!", "<nil>", "{}"} {
				if strings.Contains(text, wreck) {
					t.Errorf("%s: %s holds %s", name, table.Name, wreck)
				}
			}
		}
	}
}

// TestListing: the names are those of files, each once, and each section but the working has a table.
func TestListing(t *testing.T) {
	seen, has := map[string]bool{}, map[string]bool{"working": true}
	for _, l := range report.Listing() {
		if seen[l.Name] || l.Name != strings.ToLower(l.Name) || strings.ContainsAny(l.Name, "/. ") || l.Title == "" {
			t.Errorf("%+v", l)
		}
		seen[l.Name], has[l.Section] = true, true
	}
	for _, s := range report.Sections {
		if !has[s.ID] {
			t.Errorf("section %s has no table", s.ID)
		}
	}
	if _, ok := of(t, project.Demo(), 0, units.Metric).Table("nothing"); ok {
		t.Error("a table that is not listed")
	}
}

// TestSections: what is not known is left out, nothing chosen is everything, the order is the report's.
func TestSections(t *testing.T) {
	if got := report.SectionsOf([]string{"working", "x", "weights"}); strings.Join(got, " ") != "weights working" {
		t.Errorf("%v", got)
	}
	if report.SectionsOf(nil) != nil || report.SectionsOf([]string{"x"}) != nil {
		t.Error("nothing known must stand for all")
	}
	if report.PaperOf("letter").ID != "letter" || report.PaperOf("a0").ID != "a4" {
		t.Error("paper")
	}
}

// TestUnitsOfAStudy: the same physics whatever it is shown in.
func TestUnitsOfAStudy(t *testing.T) {
	a, b := of(t, project.Demo(), 0, units.Metric), of(t, project.Demo(), 0, units.Aviation)
	for i := range a.Study.Figures {
		if x, y := a.Study.Figures[i].Value, b.Study.Figures[i].Value; math.Abs(x-y) > 1e-12*math.Abs(x) {
			t.Errorf("%s: %v and %v", a.Study.Figures[i].ID, x, y)
		}
	}
}

func BenchmarkPDF(b *testing.B) {
	spec := project.Demo()
	for b.Loop() {
		if _, err := of(b, spec, 0, units.Metric).PDF(); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkZip(b *testing.B) {
	spec := project.Demo()
	for b.Loop() {
		if _, err := of(b, spec, 0, units.Metric).Zip("metric"); err != nil {
			b.Fatal(err)
		}
	}
}
