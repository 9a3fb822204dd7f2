package sheet

import (
	"cmp"
	"errors"
	"fmt"
	"slices"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A Filling is what a mapping makes of a sheet for one table.
type Filling struct {
	Rows    [][]float64 // without those that have errors; in the SI units of the table's columns
	Lines   []int       // of the rows in the text
	Errors  []RowError
	Open    []OpenError // what the mapping leaves undecided
	Moved   int         // how many rows the sorting moves, or would
	Skipped int         // rows of the sheet that are empty in every chosen column
	Repeats bool        // the first column holds a value more than once

	Checks []Check // of the rows against what else the sheet states

	from []Row // of the sheet
}

// A RowError is a cell that cannot be taken.
type RowError struct {
	Line   int    // in the text, from 1; 0 when it is about no line
	Column string // as the sheet heads it
	Text   string // of the cell
	Err    error
}

// An OpenError is a column of the table without a source or a unit.
type OpenError struct {
	Column int // of the table, from 0
	Err    error
}

// What a mapping can leave open.
var (
	ErrNoColumn = errors.New("choose the column of the sheet")
	ErrNoUnit   = errors.New("choose the unit; the sheet does not say one that is known here")
	ErrTwice    = errors.New("the same column of the sheet is already taken")
	ErrTooFew   = errors.New("there are too few rows")
)

// A source resolved: the column of the sheet and how its numbers are read.
type reading struct {
	spec   *input.Spec
	column int // from 0
	unit   units.Unit
}

// Fill makes rows for the table from the block by a mapping that Guess has completed.
func (b *Block) Fill(t *input.Table, m Mapping) Filling {
	var f Filling
	readings := f.resolve(b, t, m)
	if len(f.Open) > 0 {
		return f
	}
	for _, r := range b.chosen(m.Family) {
		f.take(b, r, readings, m.Decimal)
	}
	f.order(m.Sort)
	f.check(t, b.Label(readings[0].column), readings[0].column)
	f.compare(b, t, m)
	return f
}

// resolve finds the source of each column of the table.
func (f *Filling) resolve(b *Block, t *input.Table, m Mapping) []reading {
	var list []reading
	taken := map[int]bool{}
	for i, spec := range t.Columns {
		var src Source
		if i < len(m.Columns) {
			src = m.Columns[i]
		}
		u, ok := unitNamed(spec.Quantity, src.Unit)
		switch {
		case src.Column < 1 || src.Column > len(b.Columns):
			f.Open = append(f.Open, OpenError{i, ErrNoColumn})
		case taken[src.Column]:
			f.Open = append(f.Open, OpenError{i, ErrTwice})
		case !ok:
			f.Open = append(f.Open, OpenError{i, ErrNoUnit})
		}
		taken[src.Column] = true
		list = append(list, reading{spec, src.Column - 1, u})
	}
	return list
}

// take reads one row of the sheet.
func (f *Filling) take(b *Block, r Row, readings []reading, decimal string) {
	if !slices.ContainsFunc(readings, func(rd reading) bool { return r.Cell(rd.column) != "" }) {
		f.Skipped++
		return
	}
	row, good := make([]float64, len(readings)), true
	for i, rd := range readings {
		v, err := rd.value(r.Cell(rd.column), decimal)
		if err != nil {
			good = false
			f.Errors = append(f.Errors, RowError{r.Line, b.Label(rd.column), r.Cell(rd.column), err})
		}
		row[i] = v
	}
	if good {
		f.Rows = append(f.Rows, row)
		f.Lines = append(f.Lines, r.Line)
		f.from = append(f.from, r)
	}
}

// value reads a cell. A unit may stand behind the number when it is the one in which the column is read.
func (rd reading) value(cell, decimal string) (float64, error) {
	if cell == "" {
		return 0, &input.Error{Spec: rd.spec, Err: input.ErrRequired}
	}
	written := cell
	if end := strings.LastIndexAny(cell, "0123456789.,"); end >= 0 && end+1 < len(cell) {
		if u, ok := rd.spec.Quantity.Find(strings.TrimSpace(cell[end+1:])); ok && u.Symbol == rd.unit.Symbol {
			written = cell[:end+1]
		}
	}
	v, err := number(strings.TrimSpace(written), decimal)
	if err != nil {
		e := &input.Error{Spec: rd.spec, Text: cell, Err: err}
		var c *cellError
		if errors.As(err, &c) {
			e.Accepts, e.Err = c.accepts, c.err
		}
		return 0, e
	}
	return rd.spec.Take(v, rd.unit)
}

// order sorts the rows if wanted, and counts those that do not stand where sorting puts them.
func (f *Filling) order(sorted bool) {
	f.Moved = len(f.Rows) - rising(f.Rows)
	if !sorted {
		return
	}
	index := make([]int, len(f.Rows))
	for i := range index {
		index[i] = i
	}
	slices.SortStableFunc(index, func(i, j int) int { return cmp.Compare(f.Rows[i][0], f.Rows[j][0]) })
	rows, lines, sources := make([][]float64, len(index)), make([]int, len(index)), make([]Row, len(index))
	for to, from := range index {
		rows[to], lines[to], sources[to] = f.Rows[from], f.Lines[from], f.from[from]
	}
	f.Rows, f.Lines, f.from = rows, lines, sources
}

// check demands of the rows what every table of the document demands.
func (f *Filling) check(t *input.Table, head string, column int) {
	refuse := func(i int, format string, args ...any) {
		f.Errors = append(f.Errors, RowError{f.Lines[i], head, f.from[i].Cell(column), fmt.Errorf(format, args...)})
	}
	seen, falls := map[float64]int{}, false
	for i, row := range f.Rows {
		if line, ok := seen[row[0]]; ok {
			f.Repeats = true
			refuse(i, "%w; line %d has the same value, and a table here holds each once", input.ErrDuplicate, line)
		} else if i > 0 && row[0] < f.Rows[i-1][0] && !falls {
			falls = true
			refuse(i, "%w; it is below the row before it, and %s would have to move", input.ErrOrder, counted(f.Moved, "row"))
		}
		seen[row[0]] = f.Lines[i]
	}
	switch n := len(f.Rows); {
	case n > MaxRows:
		refuse(MaxRows, "%w; a table takes at most %d rows, and these are %d", ErrTooLarge, MaxRows, n)
	case n < t.MinRows && len(f.Errors) == 0:
		f.Errors = append(f.Errors, RowError{Column: head, Err: fmt.Errorf("%w; the table needs at least %d rows, and these are %d", ErrTooFew, t.MinRows, n)})
	}
}

// rising is the length of the longest run of rows, not all neighbours, in which the first
// column does not fall: the rows that sorting leaves where they are (C. Schensted,
// Longest increasing and decreasing subsequences, 1961; the patience form, from memory).
func rising(rows [][]float64) int {
	var ends []float64 // the smallest end of a run of each length
	for _, r := range rows {
		i, _ := slices.BinarySearchFunc(ends, r[0], func(end, v float64) int {
			if end <= v {
				return -1
			}
			return 1
		})
		if i == len(ends) {
			ends = append(ends, r[0])
		} else {
			ends[i] = r[0]
		}
	}
	return len(ends)
}
