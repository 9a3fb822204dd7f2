package charts

import (
	"bytes"
	"math"
	"slices"
	"strconv"
	"strings"
	"testing"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func governed(s *project.Spec) *project.Spec {
	p := s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller)
	p.Propeller.Kind, p.Propeller.Speed, p.Engine.CriticalAltitude = powerplant.ConstantSpeed, 44, 3000
	return s
}

// plantCases are the studies of the other charts and some where the powerplant differs.
func plantCases() []studied {
	return append(slices.Clone(cases()),
		studied{"governed", studyOf(governed(project.Demo()), 0, nil)},
		studied{"governed, no air to burn", studyOf(governed(project.Demo()), 0, func(v *study.View) { v.Altitude = 20000 })},
		studied{"no air to burn", studyOf(project.Demo(), 0, func(v *study.View) { v.Altitude = 20000 })})
}

func listed(c PlantCharts) []Chart {
	return slices.Concat([]Chart{c.Speed, c.Efficiency}, c.Engine, c.Propeller)
}

// TestPlantChartsHold: every chart of every case draws, says what it shows, and holds numbers only.
func TestPlantChartsHold(t *testing.T) {
	for _, c := range plantCases() {
		for _, sys := range units.Systems {
			list := listed(NewPlantCharts(c.Study, c.Plant(), sys))
			if want := map[bool]int{true: 2, false: 5}[c.Plant().Err != nil]; len(list) != want {
				t.Errorf("%s: %d charts, want %d", c.name, len(list), want)
			}
			for _, ch := range list {
				var wide, narrow bytes.Buffer
				if ch.SVG(&wide) != nil || ch.Narrow().SVG(&narrow) != nil {
					t.Fatal("a buffer refuses")
				}
				for _, text := range []string{ch.Title, ch.Desc} {
					if !strings.HasSuffix(text, ".") || strings.HasSuffix(text, "..") || text[0] < 'A' || text[0] > 'Z' {
						t.Errorf("%s, %s: %q is not a sentence", c.name, ch.ID, text)
					}
				}
				for _, bad := range []string{"NaN", "Inf", "%!", ": .", ", ,"} {
					if strings.Contains(wide.String()+narrow.String(), bad) {
						t.Errorf("%s, %s: holds %q", c.name, ch.ID, bad)
					}
				}
				for _, row := range ch.Table().Rows {
					for _, cell := range row {
						if v, err := strconv.ParseFloat(cell, 64); cell != noValue && (err != nil || !usable(v)) {
							t.Errorf("%s, %s: cell %q", c.name, ch.ID, cell)
						}
					}
				}
			}
		}
	}
}

// TestPlantSpeedAgainstThePowerplant: what is drawn is what the powerplant gives, in the units of the page.
func TestPlantSpeedAgainstThePowerplant(t *testing.T) {
	s := named(t, "demo")
	p := s.Plant()
	for _, sys := range units.Systems {
		c := NewPlantCharts(s, p, sys)
		for i, q := range []units.Quantity{units.Rotation, units.Force} {
			drawn := c.Speed.Panels[i].Series[p.View]
			if drawn.Dash || len(drawn.X) != len(p.Runs[p.View].Points) {
				t.Fatalf("%s: the view's curve is dashed or has %d points", sys, len(drawn.X))
			}
			for k, pt := range p.Runs[p.View].Points {
				want := []float64{pt.Out.Shaft.EngineSpeed, pt.Out.Thrust}[i]
				if pt.Err != nil {
					if usable(drawn.Y[k]) {
						t.Errorf("%s: %v is drawn where there is no answer", sys, drawn.Y[k])
					}
					continue
				}
				if math.Abs(sys.Unit(q).ToSI(drawn.Y[k])-want) > 1e-9*math.Abs(want) || math.Abs(sys.Unit(units.Speed).ToSI(drawn.X[k])-pt.TAS) > 1e-9 {
					t.Errorf("%s: at %v it draws %v, the powerplant gives %v at %v", sys, drawn.X[k], drawn.Y[k], want, pt.TAS)
				}
			}
		}
	}
}

// TestPlantFlagsLieOnCurves: a point that is not held back lies on the curve of
// the power offered in the view.
func TestPlantFlagsLieOnCurves(t *testing.T) {
	s := named(t, "demo")
	p := s.Plant()
	power := NewPlantCharts(s, p, units.Metric).Engine[0].Panels[0]
	offered := newCurve(power.Series[p.View].X, power.Series[p.View].Y)
	if len(power.Flags) != 3 {
		t.Fatalf("flags %+v", power.Flags)
	}
	for i, f := range power.Flags {
		y, ok := offered.at(f.X)
		held := p.Marked[i].Out.Limits&powerplant.SpeedLimited != 0
		// Straight between points: a thousandth.
		if on := math.Abs(y-f.Y) < 1e-3*y; !ok || on == held || (held && f.Y > y) {
			t.Errorf("%s at %v, %v; the curve offers %v", f.Label, f.X, f.Y, y)
		}
	}
	g := NewPlantCharts(named(t, "demo"), p, units.Metric).Engine[1].Panels[0]
	lapse := newCurve(g.Series[1].X, g.Series[1].Y)
	if y, ok := lapse.at(g.Flags[0].X); !ok || math.Abs(y-g.Flags[0].Y) > 1e-3*y {
		t.Errorf("lapse flag %+v, the curve has %v", g.Flags[0], y)
	}
	one := studyOf(governed(project.Demo()), 0, nil)
	if flags := NewPlantCharts(one, one.Plant(), units.Metric).Engine[0].Panels[0].Flags; len(flags) != 1 || !strings.Contains(flags[0].Label, "at rest, best rate, level max 2") {
		t.Errorf("governed: %+v", flags)
	}
}

// TestPropellerChart: dots stand at the rows as entered, marks at the advance ratios of the operating points.
func TestPropellerChart(t *testing.T) {
	s := named(t, "demo")
	p := s.Plant()
	c := NewPlantCharts(s, p, units.Metric).Propeller[0]
	rows := s.Variant().Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Propeller.Coefficients
	dots := c.Panels[0].Flags
	if len(dots) != 2*len(rows) {
		t.Fatalf("%d dots of %d rows", len(dots), len(rows))
	}
	for i, r := range rows {
		if dots[2*i].X != r[0] || math.Abs(dots[2*i].Y-r[1]) > 1e-15 || math.Abs(dots[2*i+1].Y-r[2]) > 1e-15 {
			t.Errorf("row %v is dotted at %+v and %+v", r, dots[2*i], dots[2*i+1])
		}
	}
	for i, m := range c.Marks {
		if want := p.Marked[i+1].Out.Shaft.AdvanceRatio; m.X != want {
			t.Errorf("%s at %v, want %v", m.Label, m.X, want)
		}
	}
	for i, x := range c.Panels[1].Series[0].X {
		ct, cp := c.Panels[0].Series[0].Y[i], c.Panels[0].Series[1].Y[i]
		if y := c.Panels[1].Series[0].Y[i]; usable(y) && math.Abs(y-100*x*ct/cp) > 1e-9 {
			t.Errorf("efficiency %v at J %v", y, x)
		}
	}
	if len(c.Marks) != 2 {
		t.Errorf("marks %+v", c.Marks)
	}
}

// TestPlantWithoutPropeller: a powerplant that turns none says so and still shows its thrust.
func TestPlantWithoutPropeller(t *testing.T) {
	s := named(t, "demo")
	p := *s.Plant()
	p.Curves = nil
	p.Runs = slices.Clone(p.Runs)
	for i := range p.Runs {
		r := &p.Runs[i]
		r.Turns, r.Points = false, slices.Clone(r.Points)
		for k := range r.Points {
			r.Points[k].Out.Shaft = powerplant.Shaft{}
		}
	}
	c := NewPlantCharts(s, &p, units.Metric)
	if len(c.Engine)+len(c.Propeller) != 0 {
		t.Error("it has charts of an engine or a propeller")
	}
	var b bytes.Buffer
	_ = c.Speed.SVG(&b)
	if !strings.Contains(b.String(), "turns no propeller") || strings.Contains(b.String(), "NaN") {
		t.Error("it does not say that no propeller turns")
	}
	if y := c.Speed.Panels[1].Series[0].Y[0]; !usable(y) || y <= 0 {
		t.Errorf("thrust at rest %v", y)
	}
}
