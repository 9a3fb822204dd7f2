package charts

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"legwright/internal/perf/units"
)

func TestPolarChartsOfEveryCase(t *testing.T) {
	for _, c := range cases() {
		for _, sys := range units.Systems {
			for _, chart := range []Chart{PolarChart(c.Study, c.Polars(), sys), RatioChart(c.Study, c.Polars(), sys)} {
				for _, form := range []Chart{chart, chart.Narrow()} {
					var b bytes.Buffer
					if err := form.SVG(&b); err != nil || strings.Contains(b.String(), "NaN") {
						t.Fatalf("%s, %s: %v", c.name, form.ID, err)
					}
				}
				for _, row := range chart.Table().Rows {
					if text := strings.Join(row, " "); strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
						t.Errorf("%s, %s: %s", c.name, chart.ID, text)
					}
				}
				if !strings.HasSuffix(chart.Title, ".") || !strings.HasSuffix(chart.Desc, ".") || strings.Contains(chart.Desc, "NaN") {
					t.Errorf("%s: %q, %q", c.name, chart.Title, chart.Desc)
				}
			}
		}
	}
}

// What the demo's charts flag is the closed form: CL = sqrt(CDmin/K + CLmd²), E = 1/(2K(CL − CLmd)).
func TestPolarOfTheDemo(t *testing.T) {
	s := named(t, "demo")
	k := 12.1 / (math.Pi * 9.4 * 9.4 * 0.77)
	cl := math.Sqrt(0.0335/k + 0.01)
	f := PolarChart(s, s.Polars(), units.Metric).Panels[0].Flags[0]
	if math.Abs(f.X-cl) > 1e-6 || math.Abs(f.X/f.Y-1/(2*k*(cl-0.1))) > 1e-6 {
		t.Errorf("best at CL %v, CD %v; want CL %v", f.X, f.Y, cl)
	}
	r := RatioChart(s, s.Polars(), units.Aviation).Panels[0].Flags[0]
	v := math.Sqrt(2*s.View.Mass*9.80665/(1.225*12.1*cl)) / 0.514444
	if math.Abs(r.X-v) > 1e-3 || math.Abs(r.Y-1/(2*k*(cl-0.1))) > 1e-6 {
		t.Errorf("best at %v kt, %v; want %v kt", r.X, r.Y, v)
	}
}
