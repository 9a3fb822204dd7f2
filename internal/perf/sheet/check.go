package sheet

import (
	"math"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A Check compares a column that the sheet has beside those of the table with what
// follows from the rows: a unit or a definition that was mistaken shows there.
type Check struct {
	*input.Spec
	Head  string  // of the sheet's column
	Worst float64 // the greatest difference over the greatest value that follows, dimensionless
	Line  int     // where it is
	Text  string  // what the sheet states there, as written
	Given float64 // the same in the SI unit of Spec.Quantity
	Found float64 // what follows from the row there, in the SI unit of Spec.Quantity
}

// compare makes the checks for which the block has a column with a known unit.
func (f *Filling) compare(b *Block, t *input.Table, m Mapping) {
	for _, d := range t.Derived {
		columns := b.Matches(d.Spec, m.Family)
		if len(columns) != 1 {
			continue
		}
		column := columns[0]
		if u, ok := unitNamed(d.Quantity, b.UnitOf(column, d.Quantity)); ok {
			f.keep(f.against(d, b, column, u, m.Decimal))
			continue
		}
		if d.Quantity != units.Fraction || !isPure(b.Columns[column-1].Unit) {
			continue
		}
		// A share without a unit is written as a fraction or in percent: the nearer of the two is meant.
		var best *Check
		for _, u := range d.Quantity.Units() {
			if c := f.against(d, b, column, u, m.Decimal); c != nil && (best == nil || c.Worst < best.Worst) {
				best = c
			}
		}
		f.keep(best)
	}
}

func (f *Filling) keep(c *Check) {
	if c != nil {
		f.Checks = append(f.Checks, *c)
	}
}

// against compares the cells of a column, read in u, with what follows from the rows; nil when nothing can be compared.
func (f *Filling) against(d input.Derived, b *Block, column int, u units.Unit, decimal string) *Check {
	c := Check{Spec: d.Spec, Head: b.Label(column - 1)}
	rd := reading{d.Spec, column - 1, u}
	greatest, apart := 0.0, -1.0
	for i, row := range f.Rows {
		found := d.Of(row)
		given, err := rd.value(f.from[i].Cell(column-1), decimal)
		if err != nil || math.IsNaN(found) || math.IsInf(found, 0) {
			continue
		}
		greatest = max(greatest, math.Abs(found))
		if diff := math.Abs(given - found); diff > apart {
			apart, c.Line, c.Text, c.Given, c.Found = diff, f.Lines[i], f.from[i].Cell(column-1), given, found
		}
	}
	if apart < 0 || greatest == 0 {
		return nil
	}
	c.Worst = apart / greatest
	return &c
}
