package reference

import (
	"encoding/csv"
	"errors"
	"fmt"
	"regexp"
	"strconv"
	"strings"

	"legwright/internal/perf/units"
)

type column struct {
	name string
	unit units.Unit // of scale 1 where the column names none
}

type tolerance struct {
	value    float64 // in the column's unit, or a fraction when relative; > 0
	relative bool
}

// A table is one reference file.
type table struct {
	name                  string
	title, source, status string
	tolerance             map[string]tolerance
	columns               []column
	rows                  [][]string
	lines                 []int // line number of each row
}

var toleranceLine = regexp.MustCompile(`^(\w+): ([0-9.e+-]+)( relative)?; (.+)$`)

func parse(text string) (*table, error) {
	f := &table{tolerance: map[string]tolerance{}}
	number := 0
	for line := range strings.Lines(text) {
		number++
		line = strings.TrimRight(line, "\r\n")
		switch {
		case line == "":
		case strings.HasPrefix(line, "#"):
			if err := f.header(strings.TrimSpace(line[1:])); err != nil {
				return nil, fmt.Errorf("line %d: %w", number, err)
			}
		default:
			if err := f.row(line, number); err != nil {
				return nil, fmt.Errorf("line %d: %w", number, err)
			}
		}
	}
	return f, f.complete()
}

func (f *table) header(line string) error {
	if f.columns != nil {
		return errors.New("header after the column names")
	}
	key, value, _ := strings.Cut(line, ": ")
	switch {
	case key == "title":
		f.title = value
	case key == "source":
		f.source = value
	case key == "status":
		f.status = value
	case strings.HasPrefix(key, "tolerance "):
		m := toleranceLine.FindStringSubmatch(strings.TrimPrefix(line, "tolerance "))
		if m == nil {
			return errors.New("a tolerance is written “# tolerance COLUMN: NUMBER [relative]; reason”")
		}
		v, err := strconv.ParseFloat(m[2], 64)
		if err != nil || v <= 0 {
			return fmt.Errorf("tolerance %q is not a positive number", m[2])
		}
		f.tolerance[m[1]] = tolerance{v, m[3] != ""}
	default:
		return fmt.Errorf("unknown header %q", key)
	}
	return nil
}

func (f *table) row(line string, number int) error {
	cells, err := csv.NewReader(strings.NewReader(line)).Read()
	if err != nil {
		return err
	}
	if f.columns != nil {
		if len(cells) != len(f.columns) {
			return fmt.Errorf("%d cells for %d columns", len(cells), len(f.columns))
		}
		f.rows, f.lines = append(f.rows, cells), append(f.lines, number)
		return nil
	}
	for _, head := range cells {
		name, symbol, named := strings.Cut(head, ":")
		c := column{name, units.Unit{Scale: 1}}
		if named {
			if c.unit, err = unitOf(symbol); err != nil {
				return err
			}
		}
		f.columns = append(f.columns, c)
	}
	return nil
}

var status = regexp.MustCompile(`looked up|from memory|computed`)

func (f *table) complete() error {
	switch {
	case f.title == "" || f.source == "":
		return errors.New("title and source are required")
	case !status.MatchString(f.status):
		return errors.New("status must say looked up, from memory or computed")
	case len(f.rows) == 0:
		return errors.New("no rows")
	case len(f.tolerance) == 0:
		return errors.New("no tolerance")
	}
	for name := range f.tolerance {
		known := false
		for _, c := range f.columns {
			known = known || c.name == name
		}
		if !known {
			return fmt.Errorf("tolerance for the unknown column %q", name)
		}
	}
	return nil
}
