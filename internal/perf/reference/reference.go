// Package reference reads the published values under testdata/reference and
// compares results with them. It is test support: it imports testing and reads
// files, and no package of the program may import it.
package reference

import (
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"legwright/internal/perf/units"
)

// A Row is one case of a file. Its methods report to the test that read it.
type Row struct {
	t    testing.TB
	file *table
	line int
	cell []string
}

// Read returns the rows of testdata/reference/name.csv. It ends the test when
// the file is missing, empty or incomplete.
func Read(t testing.TB, name string) []Row {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(Folder(t), name+".csv"))
	if err != nil {
		t.Fatal(err)
	}
	f, err := parse(string(text))
	if err != nil {
		t.Fatalf("%s.csv: %v", name, err)
	}
	f.name = name
	rows := make([]Row, len(f.rows))
	for i, c := range f.rows {
		rows[i] = Row{t, f, f.lines[i], c}
	}
	return rows
}

// Folder is the folder of the reference files, found from the module's root.
func Folder(t testing.TB) string {
	t.Helper()
	dir, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	for {
		if _, err := os.Stat(filepath.Join(dir, "go.mod")); err == nil {
			return filepath.Join(dir, "testdata", "reference")
		}
		up := filepath.Dir(dir)
		if up == dir {
			t.Fatal("no go.mod above the working directory")
		}
		dir = up
	}
}

func (r Row) fatal(format string, a ...any) {
	r.t.Helper()
	r.t.Fatalf("%s.csv:%d: %s", r.file.name, r.line, fmt.Sprintf(format, a...))
}

func (r Row) at(name string) (column, string) {
	r.t.Helper()
	for i, c := range r.file.columns {
		if c.name == name {
			return c, r.cell[i]
		}
	}
	r.fatal("no column %s", name)
	return column{}, ""
}

// String is the row's place and cells, for messages.
func (r Row) String() string {
	return fmt.Sprintf("%s.csv:%d (%s)", r.file.name, r.line, strings.Join(r.cell, ", "))
}

// Text is the cell as written.
func (r Row) Text(name string) string {
	r.t.Helper()
	_, text := r.at(name)
	return text
}

// Has reports whether the source gives a value in that column.
func (r Row) Has(name string) bool { r.t.Helper(); return r.Text(name) != "" }

// Num is the cell's number as printed, in the column's own unit.
func (r Row) Num(name string) float64 {
	r.t.Helper()
	text, _, _ := strings.Cut(r.Text(name), "±")
	v, err := strconv.ParseFloat(text, 64)
	if err != nil {
		r.fatal("column %s: %v", name, err)
	}
	return v
}

// SI is the cell's number in the SI unit of its quantity.
func (r Row) SI(name string) float64 {
	r.t.Helper()
	c, _ := r.at(name)
	return c.unit.ToSI(r.Num(name))
}

// Near reports an error when got, in SI, differs from the cell by more than its tolerance.
func (r Row) Near(name string, got float64) {
	r.t.Helper()
	c, text := r.at(name)
	want, shown := r.Num(name), c.unit.FromSI(got)
	if tol := r.tolerance(c, text, want); !(math.Abs(shown-want) <= tol) {
		r.t.Errorf("%s: %s = %.9g %s, want %s within %.3g", r, name, shown, c.unit.Symbol, text, tol)
	}
}

func (r Row) tolerance(c column, text string, want float64) float64 {
	r.t.Helper()
	if _, own, ok := strings.Cut(text, "±"); ok {
		v, err := strconv.ParseFloat(own, 64)
		if err != nil {
			r.fatal("column %s: %v", c.name, err)
		}
		return v
	}
	tol, ok := r.file.tolerance[c.name]
	if !ok {
		r.fatal("column %s has no tolerance", c.name)
	}
	if tol.relative {
		return tol.value * math.Abs(want)
	}
	return tol.value
}

// unitOf finds the unit of a column among those of all quantities; a symbol
// alone is enough because the first quantity that has it gives the scale, and
// temperatures come before temperature differences.
func unitOf(symbol string) (units.Unit, error) {
	for _, q := range units.Quantities() {
		for _, u := range q.Units() {
			if u.Symbol == symbol {
				return u, nil
			}
		}
	}
	return units.Unit{}, fmt.Errorf("unknown unit %q", symbol)
}
