package sheet

import (
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A Mapping says which part of a sheet becomes the rows of a table.
type Mapping struct {
	Settings
	Block   string   `json:"block"`   // number of the block from 1, or All; empty takes the only one
	Family  string   `json:"family"`  // Value of one of the block's families; empty takes every row
	Sort    bool     `json:"sort"`    // whether rows are put in rising order of the first column
	Columns []Source `json:"columns"` // one for each column of the table
}

// All takes the blocks of a sheet one after the other.
const All = "all"

// A Source is the column of the sheet that fills a column of the table.
type Source struct {
	Column int    `json:"column"` // from 1; 0 when none is chosen
	Unit   string `json:"unit"`   // symbol of a unit, or NoUnit; empty when none is chosen
}

// NoUnit is the unit of pure numbers in a Source.
const NoUnit = "none"

// UnitName is the name of a unit in a Source.
func UnitName(u units.Unit) string {
	if u.Symbol == "" {
		return NoUnit
	}
	return u.Symbol
}

func unitNamed(q units.Quantity, name string) (units.Unit, bool) {
	for _, u := range q.Units() {
		if UnitName(u) == name {
			return u, true
		}
	}
	return units.Unit{}, false
}

// Pick is the block that m takes of s; nil when it is not decided.
func (s *Sheet) Pick(m Mapping) *Block {
	if m.Block == "" && len(s.Blocks) == 1 {
		return &s.Blocks[0]
	}
	if m.Block == All && s.Alike() {
		b := s.Blocks[0]
		b.Rows = nil
		for _, one := range s.Blocks {
			b.Rows = append(b.Rows, one.Rows...)
		}
		return &b
	}
	for i := range s.Blocks {
		if m.Block == BlockName(i) {
			return &s.Blocks[i]
		}
	}
	return nil
}

// BlockName is the name of block i in a Mapping.
func BlockName(i int) string { return strconv.Itoa(i + 1) }

// Alike reports whether all blocks have the same columns.
func (s *Sheet) Alike() bool {
	for _, b := range s.Blocks[1:] {
		if len(b.Columns) != len(s.Blocks[0].Columns) {
			return false
		}
		for i, c := range b.Columns {
			if c != s.Blocks[0].Columns[i] {
				return false
			}
		}
	}
	return true
}

// Matches lists the columns of b, from 1, that by their name hold what spec
// describes, but for those of another family than the one chosen.
func (b *Block) Matches(spec *input.Spec, family string) []int {
	var list []int
	for i, c := range b.Columns {
		name, of := cutFamily(c.Name)
		if of != "" && family != "" && family != OfColumns+of {
			continue
		}
		for _, known := range append([]string{spec.Name, spec.Label}, spec.Also...) {
			if name != "" && (folded(name) == folded(known) || folded(c.Head) == folded(known)) {
				list = append(list, i+1)
				break
			}
		}
	}
	return list
}

// UnitOf is the unit that the head of a column, from 1, states for a quantity, as in a Source;
// empty when it states none that the quantity has. A head that is itself a unit states it.
func (b *Block) UnitOf(column int, q units.Quantity) string {
	if column < 1 || column > len(b.Columns) {
		return ""
	}
	c := b.Columns[column-1]
	for _, said := range []string{c.Unit, c.Name} {
		if u, ok := q.Find(said); ok && said != "" {
			return UnitName(u)
		}
	}
	if _, none := unitNamed(q, NoUnit); none && isPure(c.Unit) {
		return NoUnit
	}
	return ""
}

func isPure(unit string) bool {
	for _, p := range pure {
		if strings.EqualFold(p, unit) {
			return true
		}
	}
	return false
}

// Guess fills what m leaves open for the table's columns from the heads of b: a
// column whose name matches alone, and the unit that its head states. Without
// heads the columns are taken in their order. What is not certain stays open.
func (b *Block) Guess(t *input.Table, m Mapping) Mapping {
	columns := make([]Source, len(t.Columns))
	copy(columns, m.Columns)
	headed := false
	for _, c := range b.Columns {
		headed = headed || c.Head != ""
	}
	for i, spec := range t.Columns {
		src := &columns[i]
		if src.Column == 0 {
			if found := b.Matches(spec, m.Family); len(found) == 1 {
				src.Column = found[0]
			} else if !headed && i < len(b.Columns) {
				src.Column = i + 1
			}
		}
		if src.Unit == "" {
			src.Unit = b.UnitOf(src.Column, spec.Quantity)
		}
	}
	m.Columns = columns
	return m
}

// folded makes names comparable: lower case, only letters, digits and percent.
func folded(name string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(name) {
		if strings.ContainsRune(" _-./()^·*", r) {
			continue
		}
		b.WriteRune(r)
	}
	return b.String()
}
