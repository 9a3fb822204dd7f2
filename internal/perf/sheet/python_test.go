package sheet_test

import (
	"encoding/json"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"legwright/internal/perf/sheet"
)

// TestAsPython: the sheets of testdata have the cells that Python's csv module finds
// in them, which testdata/cells.py wrote down.
func TestAsPython(t *testing.T) {
	text, err := os.ReadFile("testdata/cells.json")
	if err != nil {
		t.Fatal(err)
	}
	var known map[string]struct {
		Delimiter, Decimal string
		Cells              [][]string
	}
	if err := json.Unmarshal(text, &known); err != nil {
		t.Fatal(err)
	}
	files, err := filepath.Glob("testdata/*.csv")
	if err != nil || len(files) != len(known) {
		t.Fatalf("%d sheets, %d known, %v", len(files), len(known), err)
	}
	names := map[string]string{",": sheet.Comma, ";": sheet.Semicolon, "\t": sheet.Tab}
	for _, file := range files {
		b, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		want := known[filepath.Base(file)]
		decoded, _, err := sheet.Decode(b)
		if err != nil {
			t.Fatal(file, err)
		}
		s := read(t, decoded, sheet.Settings{})
		if s.Delimiter != names[want.Delimiter] || (s.Decimal == sheet.CommaSign) != (want.Decimal == ",") || len(s.Doubt) > 0 {
			t.Errorf("%s: %+v, doubt %q", file, s.Settings, s.Doubt)
		}
		s = read(t, decoded, sheet.Settings{Heads: sheet.NoHeads})
		var got [][]string
		for _, r := range s.Blocks[0].Rows {
			got = append(got, r.Cells)
		}
		if !slices.EqualFunc(got, want.Cells, slices.Equal) {
			t.Errorf("%s:\ngot  %q\nwant %q", file, got, want.Cells)
		}
	}
}
