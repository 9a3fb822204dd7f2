package input_test

import (
	"errors"
	"math"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

func curve(rows *[][]float64) *input.Table {
	return input.Rows(input.Table{Name: "curve", Label: "Power", MinRows: 2, Columns: []*input.Spec{
		{Name: "speed", Label: "Engine speed", Quantity: units.Rotation, Min: 1, Max: 500},
		{Name: "power", Label: "Power", Quantity: units.Power, Min: 1, Max: 3e6},
	}}, rows).Table
}

func TestParseRows(t *testing.T) {
	want := [][]float64{{30, 50e3}, {46, 76.5e3}}
	for _, text := range []string{
		"1800 50\n2760 76.5", "1800\t50\n2760\t76.5\n", "1800; 50\n\n# a remark\n2760; 76,5\n", "  1800   50 \r\n2760 76.5\r\n", "1800 rpm; 50 kW\n46 rev/s; 76500 W", "1800, 50\n2760, 76.5", "1 800\t50\n2 760\t76.5",
		"1800\t50\t\t\n2760\t76.5\t\n\t\n", "\ufeff1800;50;\n2760;76,5;;\n",
	} {
		got, err := curve(&[][]float64{}).ParseRows(text, units.Metric)
		if err != nil || len(got) != 2 {
			t.Errorf("%q: %v, %v", text, got, err)
			continue
		}
		for i := range want {
			for j := range want[i] {
				if math.Abs(got[i][j]-want[i][j]) > 1e-9*want[i][j] {
					t.Errorf("%q: row %d is %v, want %v", text, i, got[i], want[i])
				}
			}
		}
	}
	if got, err := curve(&[][]float64{}).ParseRows("", units.Metric); err != nil || got == nil || len(got) != 0 {
		t.Errorf("an empty text: %v, %v", got, err)
	}
}

func TestParseRowsRefuses(t *testing.T) {
	for _, c := range []struct{ text, says string }{
		{"1800 50\n2760", "row 2, 2760"}, {"1800 50 3", "row 1, 1800 50 3"}, {"1800 fifty", "row 1"}, {"1800;1,234", "row 1"}, {"1800;", "row 1"}, {"# nothing\n\nx y", "row 1, x y"}, {"1800; 50 m", "row 1"}, {"1800\t\t50", "row 1"}, {"rpm\tkW\n1800\t50", "heads and their units are read by an import, not here"},
	} {
		rows, err := curve(&[][]float64{}).ParseRows(c.text, units.Aviation)
		var e *input.Error
		if rows != nil || !errors.As(err, &e) || e.Path != "curve" || !strings.Contains(err.Error(), c.says) || !strings.Contains(err.Error(), "a row has engine speed in rpm, then power in hp") {
			t.Errorf("%q: %v, %v; want %q", c.text, rows, err, c.says)
		}
	}
}

// TestTextIsReadBack: a table as shown, read back, is the table to seven digits.
func TestTextIsReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		row := rapid.Custom(func(t *rapid.T) []float64 {
			return []float64{rapid.Float64Range(1, 500).Draw(t, "speed"), rapid.Float64Range(1, 3e6).Draw(t, "power")}
		})
		rows := rapid.SliceOfN(row, 0, 8).Draw(t, "rows")
		sys := rapid.SampledFrom(units.Systems).Draw(t, "system")
		table := curve(&rows)
		back, err := table.ParseRows(table.Text(sys), sys)
		if err != nil || len(back) != len(rows) {
			t.Fatalf("%q: %v, %v", table.Text(sys), back, err)
		}
		for i := range rows {
			for j := range rows[i] {
				if math.Abs(back[i][j]-rows[i][j]) > 6e-7*rows[i][j] {
					t.Fatalf("row %d: %v came back as %v", i, rows[i], back[i])
				}
			}
		}
	})
}

func TestTableCheck(t *testing.T) {
	for _, c := range []struct {
		rows  [][]float64
		paths []string
	}{
		{[][]float64{{30, 5e4}, {40, 6e4}}, nil},
		{nil, []string{"curve"}},
		{[][]float64{{30, 5e4}}, []string{"curve"}},
		{[][]float64{{30, 5e4}, {30, 6e4}}, []string{"curve[1].speed"}},
		{[][]float64{{30, 5e4}, {20, -6e4}}, []string{"curve[1].power", "curve[1].speed"}},
		{[][]float64{{30, 5e4}, {40}}, []string{"curve[1]"}},
		{[][]float64{{math.NaN(), 5e4}, {40, math.Inf(1)}}, []string{"curve[0].speed", "curve[1].power"}},
	} {
		e := input.Entry{Table: curve(&c.rows), Path: "curve"}
		var paths []string
		for _, e := range input.Errors(e.Check()) {
			paths = append(paths, e.Path)
		}
		if !reflect.DeepEqual(paths, c.paths) {
			t.Errorf("%v: errors at %v, want %v", c.rows, paths, c.paths)
		}
		if e.If(false).Check() != nil {
			t.Errorf("%v: checked although idle", c.rows)
		}
	}
}

func FuzzParseRows(f *testing.F) {
	for _, s := range []string{"1800 50\n2760 76.5", "1800;50\n;", "a\tb", "1e308 1e308", "# x", "1, 2\n3, 4", "−1 −2", "1'000 2", "\x00 1"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, text string) {
		rows, err := curve(&[][]float64{}).ParseRows(text, units.Metric)
		if (err == nil) != (rows != nil) {
			t.Errorf("%q: %v, %v", text, rows, err)
		}
		for _, row := range rows {
			if len(row) != 2 || math.IsNaN(row[0]+row[1]) || math.IsInf(row[0], 0) || math.IsInf(row[1], 0) {
				t.Errorf("%q: row %v", text, row)
			}
		}
	})
}
