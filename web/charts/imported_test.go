package charts

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// TestImportChart: the rows that come and those that are there, in the reader's units, one panel a quantity.
func TestImportChart(t *testing.T) {
	table := &input.Table{Columns: []*input.Spec{
		{Label: "Engine speed", Quantity: units.Rotation}, {Label: "Power", Quantity: units.Power}, {Label: "Consumption", Quantity: units.Consumption}, {Label: "Loss", Quantity: units.Power},
	}}
	now := [][]float64{{30, 40e3, 8e-8, 1e3}, {46, 60e3, 8e-8, 2e3}}
	coming := [][]float64{{20, 30e3, 9e-8, 1e3}, {40, 50e3, 8e-8, 1e3}, {48, 65e3, 7e-8, 1e3}}
	c := ImportChart(table, "Title.", coming, now, units.Aviation)
	var got []string
	for _, p := range c.Panels {
		got = append(got, p.Y.Label+" in "+p.Y.Unit)
		for _, s := range p.Series {
			got = append(got, fmt.Sprintf("%s %v %s %d", s.Name, s.Dash, s.Class, len(s.X)))
		}
	}
	want := []string{"power, loss in hp", "Power now true available 2", "Power false available 3", "Loss now true altitude 2", "Loss false altitude 3",
		"consumption in lb/hp·h", "Consumption now true required 2", "Consumption false required 3"}
	if !slices.Equal(got, want) {
		t.Errorf("got %q", got)
	}
	// 50 kW are 67.05 hp; 40 rev/s are 2400 rpm.
	s := c.Panels[0].Series[1]
	if math.Abs(s.X[1]-2400) > 1e-9 || math.Abs(s.Y[1]-67.0511) > 1e-4 || c.X.Unit != "rpm" {
		t.Errorf("second row at %v, %v %s", s.X[1], s.Y[1], c.X.Unit)
	}
	for _, rows := range [][][]float64{nil, {}, {{30, 40e3, 8e-8, 0}}} {
		for _, form := range []Chart{ImportChart(table, "Title.", rows, nil, units.Metric), ImportChart(table, "Title.", rows, now, units.Small).Narrow()} {
			if text, _ := render(t, form); strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
				t.Errorf("%d rows: %s", len(rows), text)
			}
		}
	}
}
