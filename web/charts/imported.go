package charts

import (
	"fmt"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// importClasses colour the columns of a table in their order.
var importClasses = []string{"available", "required", "altitude", "energy", "mass", "rate"}

// ImportChart draws the columns of a table against its first: the rows that come,
// and dashed those that the table holds now. Columns of one quantity share a panel.
// Rows are in SI and as long as the table has columns.
func ImportChart(t *input.Table, title string, coming, now [][]float64, sys units.System) Chart {
	first := t.Columns[0]
	x := importMeasure(sys, first, coming, now, 0)
	c := Chart{ID: "import-chart", Title: title, X: Axis{Label: lowered(first.Label), Unit: x.unit.Symbol}, XFirst: lowered(first.Label)}
	panels := map[units.Quantity]int{}
	for i, column := range t.Columns[1:] {
		at, ok := panels[column.Quantity]
		if !ok {
			at = len(c.Panels)
			panels[column.Quantity] = at
			c.Panels = append(c.Panels, Panel{Y: Axis{Unit: sys.Unit(column.Quantity).Symbol, Zero: true}, Blank: "no row can be drawn"})
		}
		p := &c.Panels[at]
		if p.Y.Label != "" {
			p.Y.Label += ", "
		}
		p.Y.Label += lowered(column.Label)
		m := importMeasure(sys, column, coming, now, i+1)
		class := importClasses[i%len(importClasses)]
		there := importSeries(column.Label+" now", now, i+1, x, m, class)
		there.Dash, there.LabelAt = true, 0.75
		p.Series = append(p.Series, there)
		comes := importSeries(column.Label, coming, i+1, x, m, class)
		comes.LabelAt = 0.3
		p.Series = append(p.Series, comes)
		for j := range comes.X {
			p.Flags = append(p.Flags, Flag{X: comes.X[j], Y: comes.Y[j], Class: class})
		}
	}
	c.Desc = fmt.Sprintf("Full lines and dots are the %d rows that come; dashed lines are the %d rows that the table holds now.", len(coming), len(now))
	return c
}

// importMeasure has the digits that tell the rows of a column apart.
func importMeasure(sys units.System, column *input.Spec, coming, now [][]float64, i int) measure {
	var all []float64
	for _, r := range append(coming[:len(coming):len(coming)], now...) {
		all = append(all, r[i])
	}
	lo, hi := reach(all)
	return measureOf(sys, column.Quantity, hi-lo)
}

func importSeries(name string, rows [][]float64, i int, x, m measure, class string) Series {
	xs, ys := make([]float64, len(rows)), make([]float64, len(rows))
	for j, r := range rows {
		xs[j], ys[j] = x.of(r[0]), r[i]
	}
	return m.series(name, xs, ys, class)
}

// lowered makes a label fit after another word, leaving symbols such as CT alone.
func lowered(label string) string {
	if len(label) > 1 && label[1] >= 'a' && label[1] <= 'z' {
		return string(label[0]|0x20) + label[1:]
	}
	return label
}
