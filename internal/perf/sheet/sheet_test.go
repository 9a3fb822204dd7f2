package sheet_test

import (
	"errors"
	"fmt"
	"slices"
	"strings"
	"testing"
	"unicode/utf16"

	"legwright/internal/perf/input"
	"legwright/internal/perf/sheet"
	"legwright/internal/perf/units"
)

// Tables of the kinds that the document has.
func coefficients() *input.Table {
	pure := func(name, label string, lo, hi float64, also ...string) *input.Spec {
		return &input.Spec{Name: name, Label: label, Quantity: units.Coefficient, Min: lo, Max: hi, Also: also}
	}
	return &input.Table{Name: "coefficients", MinRows: 3, Columns: []*input.Spec{pure("j", "Advance ratio", 0, 10, "V/nD"), pure("ct", "CT", -1, 1, "thrust coefficient"), pure("cp", "CP", -1, 1, "power coefficient")}}
}

func powers() *input.Table {
	return &input.Table{Name: "power_curve", MinRows: 2, Columns: []*input.Spec{
		{Name: "speed", Label: "Engine speed", Quantity: units.Rotation, Min: 1, Max: 500, Also: []string{"rpm"}},
		{Name: "power", Label: "Full-throttle power", Quantity: units.Power, Min: 1, Max: 3e6, Also: []string{"P"}},
	}}
}

func read(t testing.TB, text string, as sheet.Settings) *sheet.Sheet {
	t.Helper()
	s, err := sheet.Read(text, as)
	if err != nil {
		t.Fatalf("%q: %v", text, err)
	}
	return s
}

// encodings writes text in each encoding that is read.
var encodings = map[string]func(string) []byte{
	"UTF-8":                   func(s string) []byte { return []byte(s) },
	"UTF-8 with a mark":       func(s string) []byte { return []byte("\ufeff" + s) },
	"UTF-16, low byte first":  func(s string) []byte { return utf16Bytes(s, 0, 1) },
	"UTF-16, high byte first": func(s string) []byte { return utf16Bytes(s, 1, 0) },
	"not UTF-8, so read as Latin-1 (Windows-1252)": func(s string) []byte {
		b := []byte{}
		for _, r := range s {
			b = append(b, byte(r))
		}
		return b
	},
}

func utf16Bytes(s string, low, high int) []byte {
	var b []byte
	for _, u := range append([]uint16{0xfeff}, utf16.Encode([]rune(s))...) {
		pair := [2]byte{}
		pair[low], pair[high] = byte(u), byte(u>>8)
		b = append(b, pair[:]...)
	}
	return b
}

// TestDialects reads one table as every delimiter, decimal sign, line end and encoding writes it.
func TestDialects(t *testing.T) {
	table := [][]string{{"Drehzahl für 1 Stück [1/min]", "P [kW]"}, {"1800.5", "50.25"}, {"2400", "-0.5"}, {"2760", "76.5"}}
	signs := map[string]string{sheet.Comma: ",", sheet.Semicolon: ";", sheet.Tab: "\t"}
	for delimiter, sign := range signs {
		for _, decimal := range []string{sheet.Point, sheet.CommaSign} {
			for _, end := range []string{"\n", "\r\n", "\r"} {
				for encoding, encode := range encodings {
					var b strings.Builder
					for _, row := range table {
						for i, c := range row {
							if decimal == sheet.CommaSign {
								c = strings.ReplaceAll(c, ".", ",")
							}
							if strings.Contains(c, sign) {
								c = `"` + c + `"`
							}
							if i > 0 {
								b.WriteString(sign)
							}
							b.WriteString(c)
						}
						b.WriteString(end)
					}
					text, found, err := sheet.Decode(encode(b.String()))
					if err != nil || found != encoding || text != b.String() {
						t.Fatalf("%s: decoded as %s: %q, %v", encoding, found, text, err)
					}
					s := read(t, text, sheet.Settings{})
					if s.Delimiter != delimiter || s.Decimal != decimal || len(s.Doubt) > 0 || len(s.Blocks) != 1 {
						t.Errorf("%s, %s, %q: read as %s, %s with doubt %q and %d blocks", delimiter, decimal, end, s.Delimiter, s.Decimal, s.Doubt, len(s.Blocks))
						continue
					}
					block := &s.Blocks[0]
					m := block.Guess(powers(), sheet.Mapping{Settings: s.Settings, Columns: []sheet.Source{{Column: 1}}})
					f := block.Fill(powers(), m)
					if len(f.Open) > 0 || len(f.Errors) != 1 || f.Errors[0].Line != 3 || !slices.Equal(f.Lines, []int{2, 4}) ||
						!slices.EqualFunc(f.Rows, [][]float64{{1800.5 / 60, 50250}, {46, 76500}}, slices.Equal) {
						t.Errorf("%s, %s, %q: %+v from %+v", delimiter, decimal, end, f, m)
					}
				}
			}
		}
	}
}

// TestReads reads whole sheets and says what is found of them.
func TestReads(t *testing.T) {
	for name, c := range map[string]struct {
		text, found string
		heads       []string // name|unit of the first block
		blocks      []int    // rows of each
	}{
		"units in brackets":    {"rpm [1/min];P [kW]\n1;2\n", "semicolons between the columns; whole numbers only; heads above the columns; 1 row", []string{"rpm|1/min", "P|kW"}, []int{1}},
		"units in parentheses": {"rpm (1/min),P (hp)\n1,2.5\n", "commas between the columns; decimal point; heads above the columns; 1 row", []string{"rpm|1/min", "P|hp"}, []int{1}},
		"units after a comma":  {"\"Engine speed, rpm\",\"Power, kW\"\n1,2\n", "commas between the columns; whole numbers only; heads above the columns; 1 row", []string{"Engine speed|rpm", "Power|kW"}, []int{1}},
		"units in a row":       {"n\tP\n1/min\tkW\n1\t2\n", "tabs between the columns; whole numbers only; heads above the columns; 1 row", []string{"n|1/min", "P|kW"}, []int{1}},
		"bracketed units row":  {"J,P\n[-],[kW]\n1,2\n3,4\n", "commas between the columns; whole numbers only; heads above the columns; 2 rows", []string{"J|-", "P|kW"}, []int{2}},
		"no heads":             {"0.1 0.2\n0.3 0.4\n", "blanks between the columns; decimal point; no heads above the columns; 2 rows", []string{"|", "|"}, []int{2}},
		"blanks and heads":     {"J  CT   CP\n0.1 0.2 0.3\n", "blanks between the columns; decimal point; heads above the columns; 1 row", []string{"J|", "CT|", "CP|"}, []int{1}},
		"remarks and titles": {"# tuft\n\nPropeller 12x6;;\nJ;CT;CP\n0,1;0,2;0,3\n# pause\n0,2;0,2;0,3\n;;\nend;;\n",
			"semicolons between the columns; decimal comma; heads above the columns; 2 rows; 2 comment lines left out; line 3, “Propeller 12x6”, is taken as a title; line 9, “end”, has no numbers below it", []string{"J|", "CT|", "CP|"}, []int{2}},
		"two blocks":            {"J,CT\n0,1\n1,2\nJ,CT\n0,3\n1,4\n2,5\n", "commas between the columns; whole numbers only; heads above the columns; 5 rows; 2 blocks", []string{"J|", "CT|"}, []int{2, 3}},
		"blocks under titles":   {"J,CT\n3000 rpm,\n0,1\n1,2\n4000 rpm,\n0,3\n", "commas between the columns; whole numbers only; heads above the columns; 3 rows; 2 blocks; line 2, “3000 rpm”, is taken as a title; line 5, “4000 rpm”, is taken as a title", []string{"J|", "CT|"}, []int{2, 1}},
		"blocks parted by gaps": {"0 1\n1 2\n2 2\n\n0 3\n1 4\n", "blanks between the columns; whole numbers only; no heads above the columns; 5 rows; 2 blocks", []string{"|", "|"}, []int{3, 2}},
		"inch marks":            {"prop;J\n12\" x 6;1\n", "semicolons between the columns; whole numbers only; heads above the columns; 1 row", []string{"prop|", "J|"}, []int{1}},
		"quoted ends of lines":  {"\"a\nb\",c\n1,2\n", "commas between the columns; whole numbers only; heads above the columns; 1 row", []string{"a\nb|", "c|"}, []int{1}},
	} {
		s := read(t, c.text, sheet.Settings{})
		var heads []string
		for _, col := range s.Blocks[0].Columns {
			heads = append(heads, col.Name+"|"+col.Unit)
		}
		var rows []int
		for _, b := range s.Blocks {
			rows = append(rows, len(b.Rows))
		}
		if got := strings.Join(s.Found, "; "); got != c.found || !slices.Equal(heads, c.heads) || !slices.Equal(rows, c.blocks) || len(s.Doubt) > 0 {
			t.Errorf("%s: found %q\nheads %q rows %v doubt %q", name, got, heads, rows, s.Doubt)
		}
	}
}

// TestDoubt: what could be read in two ways is asked, and read as told.
func TestDoubt(t *testing.T) {
	for _, c := range []struct {
		text, says string
		told       sheet.Settings
		cells      string
	}{
		{"1;x,2\n3;y,4\n", "Both semicolons and commas", sheet.Settings{Delimiter: sheet.Comma}, "1;x|2"},
		{"1,234;5,678\n2,345;6,789\n", "“1,234” could mean two numbers", sheet.Settings{Decimal: sheet.CommaSign}, "1,234|5,678"},
		{"1.234\t5\n2.345\t6\n", "“1.234” could mean two numbers", sheet.Settings{Decimal: sheet.Point}, "1.234|5"},
		{"0.5;1\n0,7;2\n", "“0.5” in line 1 has a decimal point and “0,7” in line 2 a decimal comma", sheet.Settings{Decimal: sheet.Point}, "0.5|1"},
	} {
		s := read(t, c.text, sheet.Settings{})
		if len(s.Doubt) != 1 || !strings.Contains(s.Doubt[0], c.says) {
			t.Errorf("%q: doubt %q, want %q", c.text, s.Doubt, c.says)
		}
		s = read(t, c.text, c.told)
		if got := strings.Join(s.Blocks[0].Rows[0].Cells, "|"); len(s.Doubt) > 0 || got != c.cells {
			t.Errorf("%q as told: doubt %q, cells %q", c.text, s.Doubt, got)
		}
	}
	// The decimal point of a sheet parted by commas is beyond doubt, and so is a zero before the sign.
	for text, decimal := range map[string]string{"1.234,5.678\n": sheet.Point, "0,234;1\n": sheet.CommaSign, "1,234,567;8\n": sheet.Point, "1.234,5;8\n": sheet.CommaSign} {
		if s := read(t, text, sheet.Settings{}); s.Decimal != decimal || len(s.Doubt) > 0 {
			t.Errorf("%q: decimal %q, doubt %q", text, s.Decimal, s.Doubt)
		}
	}
}

// TestTold: heads are as many as the reader says.
func TestTold(t *testing.T) {
	const text = "rpm,3000\nkW,4\n1,2\n3,4\n"
	for heads, rows := range map[string]int{sheet.NoHeads: 4, sheet.OneHead: 3, sheet.TwoHeads: 2} {
		s := read(t, text, sheet.Settings{Heads: heads})
		if len(s.Blocks) != 1 || len(s.Blocks[0].Rows) != rows {
			t.Errorf("%s: %+v", heads, s.Blocks)
		}
	}
}

func TestDecodeRefuses(t *testing.T) {
	for name, c := range map[string]struct {
		b    []byte
		err  error
		says string
	}{
		"nothing":               {nil, sheet.ErrEmpty, ""},
		"blanks":                {[]byte(" \r\n\t"), sheet.ErrEmpty, ""},
		"only a mark":           {[]byte("\ufeff"), sheet.ErrEmpty, ""},
		"workbook":              {[]byte("PK\x03\x04rest"), sheet.ErrNotText, "save the sheet as CSV"},
		"old workbook":          {[]byte{0xd0, 0xcf, 0x11, 0xe0, 1}, sheet.ErrNotText, "save the sheet as CSV"},
		"zero bytes":            {[]byte("a,b\n\x00,1\n"), sheet.ErrNotText, "zero bytes"},
		"UTF-16 without a mark": {[]byte("1\x00,\x002\x00"), sheet.ErrNotText, "zero bytes"},
		"false mark":            {[]byte("\xef\xbb\xbf\xff"), sheet.ErrNotText, "marked as UTF-8"},
		"too large":             {make([]byte, sheet.MaxBytes+1), sheet.ErrTooLarge, "1048577 bytes"},
	} {
		text, _, err := sheet.Decode(c.b)
		if !errors.Is(err, c.err) || text != "" || !strings.Contains(fmt.Sprint(err), c.says) {
			t.Errorf("%s: %q, %v", name, text, err)
		}
	}
	if text, _, err := sheet.Decode([]byte{'1', 0x96, 0xb0, 0x81}); err != nil || text != "1–°\ufffd" {
		t.Errorf("Windows-1252: %q, %v", text, err)
	}
}

func TestReadRefuses(t *testing.T) {
	for name, c := range map[string]struct {
		text string
		err  error
		says string
	}{
		"open quote":   {"a,b\n1,\"2\n3,4\n", sheet.ErrQuote, "line 2"},
		"many columns": {strings.Repeat("1,", 101) + "\n", sheet.ErrTooLarge, "line 1 has 101 columns, and at most 100"},
		"many lines":   {strings.Repeat("1,2\n", 10001), sheet.ErrTooLarge, "more than 10000 lines"},
		"no numbers":   {"J,CT\na,b\n", sheet.ErrEmpty, "no line of it holds a number"},
		"only remarks": {"# 1,2\n", sheet.ErrEmpty, ""},
	} {
		if _, err := sheet.Read(c.text, sheet.Settings{}); !errors.Is(err, c.err) || !strings.Contains(fmt.Sprint(err), c.says) {
			t.Errorf("%s: %v", name, err)
		}
	}
}
