package charts

import (
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/loads"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func TestStructureChartOfTheDemo(t *testing.T) {
	s := named(t, "demo")
	e := s.Structure()
	for _, sys := range units.Systems {
		c := StructureChart(s, e, sys)
		p := c.Panels[0]
		knots := sys.Unit(units.Speed)
		marks := map[string]float64{}
		for _, m := range c.Marks {
			name, _, _ := strings.Cut(m.Label, " ")
			marks[name] = knots.ToSI(m.X)
			if m.X <= c.X.Min || m.X >= c.X.Max {
				t.Errorf("%s: %s lies outside the axis", sys, m.Label)
			}
		}
		for name, want := range map[string]float64{"VS": e.Diagram.Stall, "VA": e.Diagram.Maneuver, "VC": 60, "VD": 84} {
			if math.Abs(marks[name]-want) > 1e-9 {
				t.Errorf("%s: %s at %g m/s, want %g", sys, name, marks[name], want)
			}
		}
		upper, lower := seriesNamed(t, c, "envelope, upper", ""), seriesNamed(t, c, "envelope, lower", "")
		if math.Abs(slices.Max(upper.Y)-4.8) > 1e-9 || math.Abs(slices.Min(lower.Y)+2.8) > 1e-9 || upper.Y[0] != 0 || lower.Y[0] != 0 {
			t.Errorf("%s: from %g to %g", sys, slices.Min(lower.Y), slices.Max(upper.Y))
		}
		end := seriesNamed(t, c, diveLine, "")
		if n := len(upper.Y) - 1; end.Y[0] != lower.Y[n] || end.Y[1] != upper.Y[n] {
			t.Errorf("%s: closed by %v between %g and %g", sys, end.Y, lower.Y[n], upper.Y[n])
		}
		if slices.Max(upper.Y) >= p.Y.Max || slices.Min(lower.Y) <= p.Y.Min {
			t.Errorf("%s: the envelope leaves the axis %g to %g", sys, p.Y.Min, p.Y.Max)
		}
		// The hatch begins where the stall stops to be the limit, and never inside.
		hatch := p.Bands[1]
		first := slices.IndexFunc(hatch.Upper, func(v float64) bool { return !math.IsNaN(v) })
		if first < 0 || knots.ToSI(hatch.X[first]) > e.Diagram.Maneuver+1e-6 || knots.ToSI(hatch.X[first+1]) < e.Diagram.Maneuver {
			t.Errorf("%s: hatched from %g, VA at %g m/s", sys, knots.ToSI(hatch.X[first]), e.Diagram.Maneuver)
		}
		if table := StructureTable(c); slices.ContainsFunc(table.Header, func(h string) bool { return strings.Contains(h, diveLine) }) || len(table.Rows) < 12 {
			t.Errorf("%s: %d rows under %q", sys, len(table.Rows), table.Header)
		}
	}
}

func TestStructureChartSaysWhyNot(t *testing.T) {
	bare := project.Demo()
	bare.Variants[0].Aircraft.Limits = loads.Unentered()
	for name, c := range map[string]struct {
		s    *study.Study
		says string
	}{
		"not entered": {studyOf(bare, 0, nil), "not entered"},
		"too heavy":   {studyOf(project.Demo(), 0, func(v *study.View) { v.Mass = 6000 }), "is not below the design cruising speed"},
		"outside air": {studyOf(project.Demo(), 0, func(v *study.View) { v.Altitude = 1e6 }), "altitude"},
	} {
		chart := StructureChart(c.s, c.s.Structure(), units.Metric)
		if p := chart.Panels[0]; !strings.Contains(p.Blank, c.says) || len(p.Series) != 0 || !strings.Contains(chart.Desc, c.says) {
			t.Errorf("%s: %q, %q", name, p.Blank, chart.Desc)
		}
	}
	gusty := studyOf(project.Demo(), 0, func(v *study.View) { v.Mass = 420 })
	if c := StructureChart(gusty, gusty.Structure(), units.Metric); !strings.HasSuffix(c.Panels[0].Flags[0].Label, "gust") || !strings.Contains(c.Desc, "comes of a gust") {
		t.Errorf("at 420 kg: %q, %q", c.Panels[0].Flags[0].Label, c.Desc)
	}
}
