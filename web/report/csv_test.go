package report_test

import (
	"archive/zip"
	"bytes"
	"encoding/csv"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"

	"pgregory.net/rapid"

	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/web/report"
)

const mark = "\ufeff"

// read is the file as another program reads it.
func read(t testing.TB, file []byte) [][]string {
	text, ok := strings.CutPrefix(string(file), mark)
	if !ok {
		t.Fatal("no byte order mark")
	}
	if !utf8.ValidString(text) {
		t.Fatal("not UTF-8")
	}
	lone := strings.ReplaceAll(text, "\r\n", "")
	inside := 0 // a line break within quotes is the writer's own
	for i, r := range lone {
		switch {
		case r == '"':
			inside++
		case r == '\n' && inside%2 == 0:
			t.Fatalf("a line ends without CR near %q", lone[max(0, i-20):i])
		}
	}
	rows, err := csv.NewReader(strings.NewReader(text)).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return rows
}

func number(t testing.TB, text string) float64 {
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.Fatalf("%q is no number", text)
	}
	return v
}

// column finds a column by its head.
func column(t testing.TB, rows [][]string, head string) int {
	for i, h := range rows[0] {
		if h == head {
			return i
		}
	}
	t.Fatalf("no column %q in %q", head, rows[0])
	return 0
}

// TestCSVHasTheNumbers: those of the study, in full, in the units of the head.
func TestCSVHasTheNumbers(t *testing.T) {
	r := of(t, project.Demo(), 0, units.Aviation)
	trace, _ := r.Table("mission-trace")
	for _, c := range []struct {
		units           report.Units
		time, mass      string
		perTime, perKg  float64
		lever, rotation string
	}{
		{report.SI, "Time [s]", "Mass [kg]", 1, 1, "Lever [1]", "Engine speed [rev/s]"},
		{"aviation", "Time [min]", "Mass [lb]", 60, 0.45359237, "Lever [%]", "Engine speed [rpm]"},
	} {
		rows := read(t, trace.CSV(c.units))
		if len(rows) != len(r.Study.Flight.Trace)+1 {
			t.Fatalf("%d rows of %d moments", len(rows)-1, len(r.Study.Flight.Trace))
		}
		time, mass := column(t, rows, c.time), column(t, rows, c.mass)
		column(t, rows, c.lever)
		column(t, rows, c.rotation)
		for i, row := range rows[1:] {
			m := &r.Study.Flight.Trace[i]
			if a, b := number(t, row[time])*c.perTime, number(t, row[mass])*c.perKg; math.Abs(a-m.Time) > 1e-9*(1+m.Time) || math.Abs(b-m.Mass) > 1e-9*m.Mass {
				t.Fatalf("row %d: %v s and %v kg, want %v and %v", i, a, b, m.Time, m.Mass)
			}
		}
	}
	answers, _ := r.Table("figures")
	rows := read(t, answers.CSV(report.SI))
	for i, row := range rows[1:] {
		f := &r.Study.Figures[i]
		if got := number(t, row[1]); got != f.Value { // in SI nothing is rounded
			t.Errorf("%s is %v, want %v", f.ID, got, f.Value)
		}
		if row[2] != f.Quantity.SI() && !(row[2] == "1" && f.Quantity.SI() == "") {
			t.Errorf("%s is in %q", f.ID, row[2])
		}
	}
	requirements, _ := r.Table("requirements")
	rows = read(t, requirements.CSV("metric"))
	if m := rows[1][column(t, rows, "Margin")]; !strings.HasPrefix(m, "-5") {
		t.Errorf("a margin that is missing is %q", m) // negative numbers stay numbers
	}
}

// TestCSVHasReasons: a number that does not exist has a word in its place and its reason beside it.
func TestCSVHasReasons(t *testing.T) {
	r := of(t, impossible(), 0, units.Metric)
	for _, l := range report.Listing() {
		table, _ := r.Table(l.Name)
		rows := read(t, table.CSV("metric"))
		for i, row := range rows {
			if len(row) != len(rows[0]) {
				t.Fatalf("%s: row %d has %d cells of %d", l.Name, i, len(row), len(rows[0]))
			}
		}
	}
	cruise, _ := r.Table("range")
	rows := read(t, cruise.CSV("metric"))
	remark := column(t, rows, "Remark")
	found := false
	for _, row := range rows[1:] {
		if row[2] == "none" {
			found = true
			if row[remark] == "" {
				t.Errorf("%q has no reason", row)
			}
		}
	}
	if !found {
		t.Error("the case has a range everywhere")
	}
}

// hostile are texts that a spreadsheet would run, or that break a line.
var hostile = []string{"=1+1", "+1", "-1", "@SUM(A1)", "\t=1", "\r=1", "=cmd|' /C calc'!A0", "a,b", `a"b`, "a\nb", "a;=1+1", " a", "", "'", "＝1", "\xff", "日本", "a\r\nb"}

// named is a demo whose weights, legs and notes have the name.
func named(name string) *project.Spec {
	s := project.Demo()
	s.Legs[0].Name = name
	s.Variants[0].Aircraft.Weights.Items[0].Name = name
	b := s.Variants[0].Basis["airframe.cd_min"]
	b.Note = name
	s.Variants[0].SetBasis("airframe.cd_min", b)
	return s
}

// guarded is what must come back of a text that was written.
func guarded(t testing.TB, wrote, got string) {
	t.Helper()
	want := strings.ToValidUTF8(strings.ReplaceAll(wrote, "\r\n", "\n"), "\ufffd")
	if got == want {
		if want != "" && strings.ContainsRune("=+-@\t\r\n＝＋－＠", []rune(want)[0]) {
			t.Fatalf("%q would be a formula", got)
		}
		return
	}
	if got != "'"+want || !strings.ContainsRune("=+-@\t\r\n＝＋－＠", []rune(want)[0]) {
		t.Fatalf("%q came back as %q", wrote, got)
	}
}

func checkNamed(t testing.TB, name string) {
	p, err := named(name).Build()
	if err != nil {
		return // too long, or not text
	}
	st, err := report.InUnits(p.Spec, 0, units.Metric)
	if err != nil {
		t.Fatal(err)
	}
	r := &report.Report{Study: st, Saved: saved, Revision: 1, Paper: report.Papers[0]}
	for _, c := range []struct {
		table string
		row   int
		head  string
	}{{"weights", 2, "Mass"}, {"inputs", 0, "Note"}} {
		table, _ := r.Table(c.table)
		rows := read(t, table.CSV("metric"))
		at := column(t, rows, c.head)
		row := c.row
		for i := range rows {
			if c.table == "inputs" && rows[i][1] == "Minimum drag coefficient" {
				row = i
			}
		}
		if got := rows[row][at]; name != "" || c.table == "inputs" {
			guarded(t, name, got)
		}
	}
}

func TestCSVIsNoProgram(t *testing.T) {
	for _, name := range hostile {
		checkNamed(t, name)
	}
	rapid.Check(t, func(rt *rapid.T) {
		checkNamed(t, rapid.StringOfN(rapid.RuneFrom([]rune("=+-@\t\r\n\",; a1'é−＝")), 0, 12, -1).Draw(rt, "name"))
	})
}

func FuzzCSV(f *testing.F) {
	for _, h := range hostile {
		f.Add(h)
	}
	f.Fuzz(func(t *testing.T, name string) { checkNamed(t, name) })
}

// TestZip: every table is in it, with a text that names what it is of and the cautions.
func TestZip(t *testing.T) {
	spec := named("=1\r\nUnits: pounds")
	spec.Name = "A\r\nRevision: 99"
	r := of(t, spec, 0, units.Metric)
	b, err := r.Zip(report.SI)
	if err != nil {
		t.Fatal(err)
	}
	z, err := zip.NewReader(bytes.NewReader(b), int64(len(b)))
	if err != nil {
		t.Fatal(err)
	}
	files := map[string]string{}
	for _, f := range z.File {
		open, err := f.Open()
		if err != nil {
			t.Fatal(err)
		}
		text, err := io.ReadAll(open)
		if err != nil {
			t.Fatal(err)
		}
		files[f.Name] = string(text)
		if !f.Modified.UTC().Equal(saved) {
			t.Errorf("%s is of %v", f.Name, f.Modified)
		}
	}
	if len(files) != len(report.Listing())+1 {
		t.Errorf("%d files", len(files))
	}
	readme := files["README.txt"]
	for _, want := range []string{"A Revision: 99", r.Study.Variant().Name, "Revision: 12, saved 2026-11-30 16:40 UTC", "Units: SI base units"} {
		if !strings.Contains(readme, want) {
			t.Errorf("no %q in\n%s", want, readme)
		}
	}
	if strings.Contains(readme, "\nRevision: 99") {
		t.Error("a name makes a line of its own")
	}
	for _, c := range r.Cautions() {
		if !strings.Contains(readme, c) {
			t.Errorf("no caution %q", c)
		}
	}
	for _, l := range report.Listing() {
		table, _ := r.Table(l.Name)
		if files[l.Name+".csv"] != string(table.CSV(report.SI)) {
			t.Errorf("%s differs", l.Name)
		}
		if !strings.Contains(readme, l.Name+".csv: "+l.Title) {
			t.Errorf("%s is not named", l.Name)
		}
	}
}

// TestWeightsAddUp: the parts of the table make the start mass.
func TestWeightsAddUp(t *testing.T) {
	for name, r := range cases(t) {
		table, _ := r.Table("weights")
		at := map[string]float64{}
		for _, row := range read(t, table.CSV(report.SI))[1:] {
			at[row[0]] = number(t, row[1])
		}
		sum := at["Empty, with powerplant"] + at["Allowance for growth"] + at["Payload"] + at["Fuel aboard"]
		if start := at["Start of the mission"]; math.Abs(sum-start) > 1e-9*start || math.Abs(start-r.Study.Masses.Start) > 1e-9*start {
			t.Errorf("%s: parts make %v kg, the start mass is %v", name, sum, start)
		}
	}
}
