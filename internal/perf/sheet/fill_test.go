package sheet_test

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/sheet"
	"legwright/internal/perf/units"
)

// filled reads text and fills the table as far as the heads say how.
func filled(t testing.TB, text string, table *input.Table, m sheet.Mapping) (sheet.Mapping, sheet.Filling) {
	t.Helper()
	s := read(t, text, m.Settings)
	m.Settings = s.Settings
	b := s.Pick(m)
	if b == nil || len(s.Doubt) > 0 {
		t.Fatalf("%q: block %q is not decided: %q", text, m.Block, s.Doubt)
	}
	m = b.Guess(table, m)
	return m, b.Fill(table, m)
}

// TestGuess: a column is filled in from its name alone when no other could be meant,
// and a unit only when the head states it.
func TestGuess(t *testing.T) {
	for _, c := range []struct {
		table *input.Table
		heads string
		want  string // column and unit of each
	}{
		{coefficients(), "J,CT,CP", "1 none, 2 none, 3 none"},
		{coefficients(), "eta,C_P,Thrust coefficient,Advance ratio", "4 none, 3 none, 2 none"},
		{coefficients(), "V/(n D),ct [-],cp (1)", "1 none, 2 none, 3 none"},
		{coefficients(), "J,CT,CT", "1 none, 0 , 0 "},
		{coefficients(), "J,CT@3000,CT@4000,CP@3000,CP@4000", "1 none, 0 , 0 "},
		{coefficients(), "J,CT [counts],CP", "1 none, 2 , 3 none"},
		{powers(), "rpm,Power [kW]", "1 rpm, 2 kW"},
		{powers(), "Engine speed (U/min),P [PS]", "1 rpm, 2 PS"},
		{powers(), "Engine speed,Power", "1 , 2 "},
		{powers(), "Engine speed [Hz],P [mph]", "1 , 2 "},
		{powers(), "P [hp],P [kW],n", "0 , 0 "},
	} {
		width := strings.Count(c.heads, ",") + 1
		s := read(t, c.heads+"\n"+strings.TrimSuffix(strings.Repeat("1,", width), ",")+"\n", sheet.Settings{})
		var got []string
		for _, src := range s.Blocks[0].Guess(c.table, sheet.Mapping{}).Columns {
			got = append(got, fmt.Sprintf("%d %s", src.Column, src.Unit))
		}
		if strings.Join(got, ", ") != c.want {
			t.Errorf("%s: %q, want %q", c.heads, got, c.want)
		}
	}
	// Without heads the columns come in their order, and units that differ are asked.
	m, _ := filled(t, "1800\t50\n2700\t70\n", powers(), sheet.Mapping{})
	if !slices.Equal(m.Columns, []sheet.Source{{Column: 1}, {Column: 2}}) {
		t.Errorf("without heads: %+v", m.Columns)
	}
}

// TestLongForm: of several families one goes in, and none silently.
func TestLongForm(t *testing.T) {
	const text = "rpm;J;CT;CP\n3000;0,0;0,10;0,05\n3000;0,3;0,08;0,045\n3000;0,6;0,03;0,03\n4000;0,0;0,11;0,052\n4000;0,3;0,085;0,046\n4000;0,6;0,032;0,031\n"
	_, f := filled(t, text, coefficients(), sheet.Mapping{})
	if !f.Repeats || len(f.Errors) < 3 {
		t.Errorf("two families at once: %+v", f)
	}
	s := read(t, text, sheet.Settings{})
	families := s.Blocks[0].Families()
	if len(families) != 2 || families[0].Label != "rpm" || fmt.Sprint(families[0].List) != "[{1=3000 rpm 3000 (3 rows)} {1=4000 rpm 4000 (3 rows)}]" {
		t.Errorf("families %+v", families)
	}
	_, f = filled(t, text, coefficients(), sheet.Mapping{Family: "1=4000"})
	if len(f.Errors) > 0 || f.Repeats || !slices.Equal(f.Lines, []int{5, 6, 7}) || f.Rows[0][1] != 0.11 {
		t.Errorf("the second family: %+v", f)
	}
	for value, ok := range map[string]bool{"": true, "1=3000": true, "1=5000": false, "9=1": false, "at 1": false, "=": false} {
		if s.Blocks[0].Has(value) != ok {
			t.Errorf("Has(%q) is %v", value, !ok)
		}
	}
}

// TestWideForm: the columns of one speed are taken together.
func TestWideForm(t *testing.T) {
	const text = "J,CT@3000,CP@3000,CT@4000,CP@4000\n0,.10,.05,.11,.052\n.3,.08,.045,.085,.046\n.6,.03,.03,.032,.031\n.7,,,.01,.02\n"
	m, f := filled(t, text, coefficients(), sheet.Mapping{})
	if len(f.Open) != 2 || !errors.Is(f.Open[0].Err, sheet.ErrNoColumn) || f.Rows != nil {
		t.Errorf("two families at once: %+v from %+v", f, m)
	}
	m, f = filled(t, text, coefficients(), sheet.Mapping{Family: "at 4000"})
	if len(f.Open)+len(f.Errors) > 0 || len(f.Rows) != 4 || f.Rows[3][2] != 0.02 {
		t.Errorf("columns at 4000: %+v from %+v", f, m)
	}
	// In the columns at 3000 the last row is empty but for J, which is an error in two cells.
	_, f = filled(t, text, coefficients(), sheet.Mapping{Family: "at 3000"})
	if len(f.Errors) != 2 || f.Errors[0].Line != 5 || f.Errors[1].Column != "CP@3000" || !errors.Is(f.Errors[0].Err, input.ErrRequired) {
		t.Errorf("columns at 3000: %+v", f)
	}
}

func TestBlocksArePicked(t *testing.T) {
	const text = "J,CT,CP\n# 3000 rpm\n0,.1,.05\n.3,.08,.04\n.6,.03,.03\n# 4000 rpm\nJ,CT,CP\n0,.2,.06\n.4,.1,.05\n.8,.02,.02\n"
	s := read(t, text, sheet.Settings{})
	if len(s.Blocks) != 2 || s.Pick(sheet.Mapping{}) != nil || s.Blocks[0].Title != "3000 rpm" || s.Blocks[1].Title != "4000 rpm" || s.Blocks[1].Line != 8 {
		t.Fatalf("%+v", s.Blocks)
	}
	_, f := filled(t, text, coefficients(), sheet.Mapping{Block: "2"})
	if len(f.Errors) > 0 || f.Rows[0][1] != 0.2 {
		t.Errorf("the second block: %+v", f)
	}
	_, f = filled(t, text, coefficients(), sheet.Mapping{Block: sheet.All})
	if !f.Repeats {
		t.Errorf("both blocks as one: %+v", f)
	}
	for _, no := range []string{"0", "3", "x", "-1"} {
		if s.Pick(sheet.Mapping{Block: no}) != nil {
			t.Errorf("block %q was picked", no)
		}
	}
}

// TestRowErrors names line, column and cell of each thing wrong, and what is accepted.
func TestRowErrors(t *testing.T) {
	const text = "rpm;P [kW]\n1800;50\n2000;fifty\n2200;\n2400;5.000.000\n2600;1.234\n2800;70,5 hp\n3000;72 kW\n2100;60\n3000;73\n;\n"
	_, f := filled(t, text, powers(), sheet.Mapping{Settings: sheet.Settings{Decimal: sheet.CommaSign}})
	var got []string
	for _, e := range f.Errors {
		why := e.Err.Error()
		if in, ok := e.Err.(*input.Error); ok {
			why = in.Sentence(units.Metric)
		}
		got = append(got, fmt.Sprintf("%d %s “%s”: %s", e.Line, e.Column, e.Text, why))
	}
	want := []string{
		"3 P [kW] “fifty”: “fifty” is not understood as a number; full-throttle power must be 0.001 to 3000 kW",
		"4 P [kW] “”: a value is required; full-throttle power must be 0.001 to 3000 kW",
		"5 P [kW] “5.000.000”: full-throttle power must be 0.001 to 3000 kW; got 5000000 kW",
		"6 P [kW] “1.234”: “1.234” is not clear, for it could mean two numbers; write 1234 or 1,234",
		"7 P [kW] “70,5 hp”: “70,5 hp” is not understood as a number; full-throttle power must be 0.001 to 3000 kW",
		"9 rpm “2100”: out of order; it is below the row before it, and 1 row would have to move",
		"10 rpm “3000”: given more than once; line 8 has the same value, and a table here holds each once",
	}
	if !slices.Equal(got, want) {
		t.Errorf("got\n%s\nwant\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"))
	}
	if f.Skipped != 0 || f.Moved != 1 {
		t.Errorf("%d skipped, %d moved", f.Skipped, f.Moved)
	}
}

// TestSort counts the rows that move by the longest run that stays; the lengths for
// 3 1 4 1 5 9 2 6 (1 4 5 9, or 1 1 5 6 …) are counted by hand.
func TestSort(t *testing.T) {
	for text, moved := range map[string]int{"1 2 3": 0, "3 2 1": 2, "2 3 1": 1, "1 3 2 4": 1, "3 1 4 1.5 5 9 2 6": 4} {
		var b strings.Builder
		for _, v := range strings.Fields(text) {
			fmt.Fprintf(&b, "%s;7\n", v)
		}
		m := sheet.Mapping{Settings: sheet.Settings{Decimal: sheet.Point}, Columns: []sheet.Source{{Column: 1, Unit: "rev/s"}, {Column: 2, Unit: "W"}}}
		_, f := filled(t, b.String(), powers(), m)
		if f.Moved != moved || (len(f.Errors) > 0) != (moved > 0) {
			t.Errorf("%s: %d would move, errors %v", text, f.Moved, f.Errors)
		}
		m.Sort = true
		_, f = filled(t, b.String(), powers(), m)
		if f.Moved != moved || len(f.Errors) > 0 || !slices.IsSortedFunc(f.Rows, func(a, b []float64) int { return int(math.Copysign(1, a[0]-b[0])) }) {
			t.Errorf("%s sorted: %+v", text, f)
		}
	}
}

// TestEqualRowsStay: sorting leaves rows of the same value as they stand.
func TestEqualRowsStay(t *testing.T) {
	m := sheet.Mapping{Sort: true, Columns: []sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 2, Unit: "W"}}}
	_, f := filled(t, "1800;50\n1800;40\n1800;60\n2000;70\n", powers(), m)
	if f.Moved != 0 || !f.Repeats || len(f.Errors) != 2 || !slices.Equal(f.Lines, []int{1, 2, 3, 4}) {
		t.Errorf("%+v", f)
	}
}

func TestSizesOfTables(t *testing.T) {
	m := sheet.Mapping{Columns: []sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 2, Unit: "W"}}}
	_, f := filled(t, "1800;50\n", powers(), m)
	if len(f.Errors) != 1 || !errors.Is(f.Errors[0].Err, sheet.ErrTooFew) || f.Errors[0].Line != 0 {
		t.Errorf("one row: %+v", f.Errors)
	}
	var b strings.Builder
	for i := range sheet.MaxRows + 1 {
		fmt.Fprintf(&b, "%d;50\n", 100+i)
	}
	_, f = filled(t, b.String(), powers(), m)
	if len(f.Errors) != 1 || !errors.Is(f.Errors[0].Err, sheet.ErrTooLarge) {
		t.Errorf("too many rows: %+v", f.Errors)
	}
}

// TestOpen: a mapping that a form can send and that means nothing leaves the column open.
func TestOpen(t *testing.T) {
	for _, c := range []struct {
		columns []sheet.Source
		err     error
	}{
		{[]sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 3, Unit: "kW"}}, sheet.ErrNoColumn},
		{[]sheet.Source{{Column: 1, Unit: "rpm"}, {Column: -1, Unit: "kW"}}, sheet.ErrNoColumn},
		{[]sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 1, Unit: "kW"}}, sheet.ErrTwice},
		{[]sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 2, Unit: "kt"}}, sheet.ErrNoUnit},
		{[]sheet.Source{{Column: 1, Unit: "rpm"}, {Column: 2, Unit: "none"}}, sheet.ErrNoUnit},
		{[]sheet.Source{{Column: 1, Unit: "rpm"}}, sheet.ErrNoColumn},
	} {
		s := read(t, "1800;50\n1900;60\n", sheet.Settings{})
		f := s.Blocks[0].Fill(powers(), sheet.Mapping{Settings: s.Settings, Columns: c.columns})
		if len(f.Open) != 1 || f.Open[0].Column != 1 || !errors.Is(f.Open[0].Err, c.err) || f.Rows != nil {
			t.Errorf("%+v: %+v", c.columns, f)
		}
	}
}
