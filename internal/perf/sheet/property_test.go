package sheet_test

import (
	"encoding/csv"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/sheet"
)

// A dialect is a way of writing sheets.
type dialect struct {
	delimiter, decimal, end string
	quoted                  bool
}

var dialects = rapid.Custom(func(t *rapid.T) dialect {
	return dialect{
		delimiter: rapid.SampledFrom([]string{",", ";", "\t"}).Draw(t, "delimiter"), decimal: rapid.SampledFrom([]string{".", ","}).Draw(t, "decimal"),
		end: rapid.SampledFrom([]string{"\n", "\r\n", "\r"}).Draw(t, "end"), quoted: rapid.Bool().Draw(t, "quoted"),
	}
})

// settings tell the reader what d is.
func (d dialect) settings() sheet.Settings {
	s := sheet.Settings{Delimiter: map[string]string{",": sheet.Comma, ";": sheet.Semicolon, "\t": sheet.Tab}[d.delimiter], Decimal: sheet.Point}
	if d.decimal == "," {
		s.Decimal = sheet.CommaSign
	}
	return s
}

func (d dialect) write(rows [][]string) string {
	var b strings.Builder
	for _, row := range rows {
		for i, c := range row {
			if i > 0 {
				b.WriteString(d.delimiter)
			}
			if d.quoted || strings.ContainsAny(c, d.delimiter+"\"\r\n") {
				c = `"` + strings.ReplaceAll(c, `"`, `""`) + `"`
			}
			b.WriteString(c)
		}
		b.WriteString(d.end)
	}
	return b.String()
}

// TestSameBits: rows written in any dialect come back to the last bit.
func TestSameBits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := powers()
		row := rapid.Custom(func(t *rapid.T) []float64 {
			return []float64{rapid.Float64Range(60, 30000).Draw(t, "rpm"), rapid.Float64Range(0.001, 3000).Draw(t, "kW")}
		})
		rows := rapid.SliceOfNDistinct(row, 2, 20, func(r []float64) float64 { return r[0] }).Draw(t, "rows")
		format := rapid.SampledFrom([]byte{'f', 'g', 'e'}).Draw(t, "format")
		d := dialects.Draw(t, "dialect")
		cells := [][]string{{"rpm [1/min]", "P [kW]"}}
		want := map[float64]float64{}
		for _, r := range rows {
			line := make([]string, len(r))
			si := make([]float64, len(r))
			for i, v := range r {
				line[i] = strings.Replace(strconv.FormatFloat(v, format, -1, 64), ".", d.decimal, 1)
				u := table.Columns[i].Quantity.Units()[0] // rpm, kW
				var err error
				if si[i], err = table.Columns[i].Take(v, u); err != nil {
					t.Fatal(err)
				}
			}
			cells, want[si[0]] = append(cells, line), si[1]
		}
		s, err := sheet.Read(d.write(cells), d.settings())
		if err != nil {
			t.Fatal(err)
		}
		m := s.Blocks[0].Guess(table, sheet.Mapping{Settings: s.Settings, Sort: true})
		f := s.Blocks[0].Fill(table, m)
		if len(f.Open)+len(f.Errors) > 0 || len(f.Rows) != len(want) {
			t.Fatalf("%+v from %q", f, d.write(cells))
		}
		for _, r := range f.Rows {
			if p, ok := want[r[0]]; !ok || math.Float64bits(p) != math.Float64bits(r[1]) {
				t.Fatalf("row %v is not among %v", r, want)
			}
		}
	})
}

// TestFoundDialect: with a number that shows its decimal sign the dialect is found, and never another one.
func TestFoundDialect(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := dialects.Draw(t, "dialect")
		if d.delimiter == "," && d.decimal == "," {
			d.quoted = true
		}
		n := rapid.IntRange(2, 5).Draw(t, "columns")
		rows := [][]string{slices.Repeat([]string{"0.25"}, n)}
		for range rapid.IntRange(1, 10).Draw(t, "rows") {
			row := make([]string, n)
			for i := range row {
				row[i] = strconv.FormatFloat(rapid.Float64Range(-1e4, 1e4).Draw(t, "v"), 'f', rapid.IntRange(0, 6).Draw(t, "decimals"), 64)
			}
			rows = append(rows, row)
		}
		for _, row := range rows {
			for i := range row {
				row[i] = strings.Replace(row[i], ".", d.decimal, 1)
			}
		}
		s, err := sheet.Read(d.write(rows), sheet.Settings{})
		if err != nil {
			t.Fatal(err)
		}
		if want := d.settings(); len(s.Doubt) > 0 || s.Delimiter != want.Delimiter || s.Decimal != want.Decimal {
			t.Fatalf("%q read as %+v, doubt %q", d.write(rows), s.Settings, s.Doubt)
		}
	})
}

// TestQuotesAsTheStandardLibrary: what encoding/csv reads strictly has the same cells here.
func TestQuotesAsTheStandardLibrary(t *testing.T) {
	compared := 0
	rapid.Check(t, func(t *rapid.T) {
		cell := rapid.StringOfN(rapid.RuneFrom([]rune(`ab1 ,;"`+"\n")), 0, 6, -1)
		rows := rapid.SliceOfN(rapid.SliceOfN(cell, 2, 4), 1, 5).Draw(t, "rows")
		d := dialect{delimiter: rapid.SampledFrom([]string{",", ";"}).Draw(t, "delimiter"), end: "\n", quoted: rapid.Bool().Draw(t, "quoted")}
		text := d.write(append(rows, []string{"1", "2"}))
		r := csv.NewReader(strings.NewReader(text))
		r.Comma, r.FieldsPerRecord, r.TrimLeadingSpace = rune(d.delimiter[0]), -1, true
		theirs, err := r.ReadAll()
		if err != nil {
			t.Skip(err)
		}
		s, err := sheet.Read(text, sheet.Settings{Delimiter: d.settings().Delimiter, Decimal: sheet.Point, Heads: sheet.NoHeads})
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		var want, got [][]string
		for _, row := range theirs {
			for i := range row {
				row[i] = strings.TrimSpace(row[i])
			}
			if strings.Join(row, "") != "" {
				want = append(want, row)
			}
		}
		for _, row := range s.Blocks[0].Rows {
			got = append(got, row.Cells)
		}
		if !slices.EqualFunc(got, want, slices.Equal) {
			t.Fatalf("%q: %q, the standard library has %q", text, got, want)
		}
		compared++
	})
	if compared < 50 {
		t.Errorf("only %d texts compared", compared)
	}
}

func FuzzSheet(f *testing.F) {
	for _, s := range []string{"J,CT,CP\n0,.1,.05\n.3,.08,.04\n", "\"a\"\"b\";1\r\n2;3", "\xef\xbb\xbf1\t2\n", "\xff\xfe1\x00", "# c\n\n1 2\n\n0 1\n", "a,\"b\n1,2", "1,234;5\n", "rpm [1/min];P [kW]\n1e3;5\n",
		"x@1,x@2\n1,2\n", "PK\x03\x04", "1;2\n3\n;;;;\n", "−1’000;2", "1e999;1\n", "\u00a01\u202f000;1\n", "é;1\n", "\xe9;1\n", "1,2\r3,4\r", "a\nb\nc\n1\n"} {
		f.Add([]byte(s), "", "", "")
	}
	f.Add([]byte("1,2;3\n"), sheet.Semicolon, sheet.CommaSign, sheet.NoHeads)
	f.Add([]byte("1,2;3\n4 5"), sheet.Blanks, sheet.Point, sheet.TwoHeads)
	f.Fuzz(func(t *testing.T, data []byte, delimiter, decimal, heads string) {
		text, _, err := sheet.Decode(data)
		if err != nil {
			return
		}
		s, err := sheet.Read(text, sheet.Settings{Delimiter: delimiter, Decimal: decimal, Heads: heads})
		if err != nil {
			return
		}
		line := 0
		for i := range s.Blocks {
			b := &s.Blocks[i]
			for _, r := range b.Rows {
				if r.Line <= line || len(r.Cells) > len(b.Columns) {
					t.Fatalf("line %d after %d, %d cells under %d heads", r.Line, line, len(r.Cells), len(b.Columns))
				}
				line = r.Line
			}
			for _, fam := range append(b.Families(), sheet.Families{List: []sheet.Family{{}}}) {
				for _, one := range fam.List {
					checkFilling(t, b, s.Settings, one.Value)
				}
			}
		}
	})
}

// checkFilling demands of a filling what the document relies on.
func checkFilling(t *testing.T, b *sheet.Block, as sheet.Settings, family string) {
	for _, table := range []*input.Table{powers(), coefficients()} {
		m := b.Guess(table, sheet.Mapping{Settings: as, Family: family, Sort: true})
		for i := range m.Columns {
			if m.Columns[i].Unit == "" {
				m.Columns[i].Unit = sheet.UnitName(table.Columns[i].Quantity.Units()[0])
			}
		}
		f := b.Fill(table, m)
		if len(f.Rows) != len(f.Lines) {
			t.Fatalf("%d rows of %d lines", len(f.Rows), len(f.Lines))
		}
		for i, row := range f.Rows {
			for j, v := range row {
				if table.Columns[j].Check(v) != nil {
					t.Fatalf("row %v is out of range", row)
				}
			}
			if len(f.Errors) == 0 && i > 0 && row[0] <= f.Rows[i-1][0] {
				t.Fatalf("rows %v do not rise", f.Rows)
			}
		}
	}
}
