package charts

import (
	"strings"
	"testing"

	"legwright/internal/perf/units"
)

func TestClimbAgainstTheStudy(t *testing.T) {
	s := named(t, "demo")
	metric, aviation := ClimbChart(s, units.Metric), ClimbChart(s, units.Aviation)
	m, a := metric.Panels[0].Series[0], aviation.Panels[0].Series[0]
	v := seriesNamed(t, aviation, "flown at (true)", "kt")
	if len(m.X) != len(s.Rates) || len(s.Rates) < 20 {
		t.Fatalf("%d points of %d", len(m.X), len(s.Rates))
	}
	for i, r := range s.Rates {
		if m.X[i] != r.Rate || m.Y[i] != r.Altitude {
			t.Fatalf("point %d: %v, %v, want %+v", i, m.X[i], m.Y[i], r)
		}
		if !near(a.X[i], r.Rate*60/footSI) || !near(a.Y[i], r.Altitude/footSI) || !near(v.Y[i], r.TAS/knotSI) {
			t.Fatalf("point %d: %v ft/min, %v ft, %v kt, want %+v", i, a.X[i], a.Y[i], v.Y[i], r)
		}
	}
	strip := s.Project.Departure.Air.PressureAltitude
	want := []HLine{
		{strip, "strip 571\u00a0m"},
		{s.Service.Value, "service ceiling " + readNumber(s.Service.Value, 0) + "\u00a0m"},
		{s.Absolute.Value, "absolute ceiling " + readNumber(s.Absolute.Value, 0) + "\u00a0m"},
	}
	for i, l := range metric.Panels[0].Lines {
		if l != want[i] {
			t.Errorf("line %+v, want %+v", l, want[i])
		}
	}
	f := metric.Panels[0].Flags
	if len(f) != 1 || f[0].X != s.Figure("climb_rate").Value || f[0].Y != strip {
		t.Errorf("flags %+v", f)
	}
	// The flag is computed apart from the curve and must lie on it.
	if rate, ok := newCurve(m.Y, m.X).at(strip); !ok || rate < 0.998*f[0].X || rate > 1.002*f[0].X {
		t.Errorf("the curve has %v at the strip, the flag %v", rate, f[0].X)
	}
	x, y := metric.X, metric.Panels[0].Y
	if x.Min != 0 || x.Max < m.X[0] || y.Min != 0 || y.Max < s.Absolute.Value {
		t.Errorf("axes %+v and %+v", x, y)
	}
}

func TestClimbWithoutAnAnswer(t *testing.T) {
	s := named(t, "stall above never exceed")
	c := ClimbChart(s, units.Metric)
	p := c.Panels[0]
	if len(p.Series) != 0 || len(p.Lines) != 1 || !strings.Contains(p.Blank, "lies above the never-exceed speed") || !strings.Contains(c.Title, p.Blank) {
		t.Errorf("blank %q, title %q, lines %v", p.Blank, c.Title, p.Lines)
	}
	_, root := render(t, c)
	if text := strings.Join(textsOf(root), " "); !strings.Contains(text, p.Blank) {
		t.Errorf("the drawing does not say why: %q", text)
	}
	// Above its absolute ceiling the strip has no climb to flag.
	s = named(t, "overweight")
	c = ClimbChart(s, units.Metric)
	p = c.Panels[0]
	if len(p.Flags) != 0 || len(p.Lines) != 2 || p.Y.Max < p.Lines[0].Y || !strings.Contains(c.Desc, "no service ceiling") || c.X.Max < 0.5 {
		t.Errorf("flags %v, lines %v, axes %+v and %+v, %q", p.Flags, p.Lines, c.X, p.Y, c.Desc)
	}
}
