package charts

import (
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func TestThrustAndPowerAgainstTheStudy(t *testing.T) {
	for _, sys := range []struct {
		units.System
		speed, force, power string
		v, f, p             float64
	}{
		{units.Metric, "m/s", "N", "kW", 1, 1, 1e3},
		{units.Aviation, "kt", "lbf", "hp", knotSI, lbfSI, hpSI},
	} {
		s := named(t, "demo")
		thrust, power := ThrustChart(s, sys.System), PowerChart(s, sys.System)
		a, r := seriesNamed(t, thrust, "thrust available", sys.force), seriesNamed(t, thrust, "thrust required", sys.force)
		hand, ratio := seriesNamed(t, thrust, "thrust in hand", sys.force), seriesNamed(t, thrust, "thrust in hand", "%")
		cas := seriesNamed(t, thrust, "calibrated airspeed", sys.speed)
		pa, pr := seriesNamed(t, power, "power available", sys.power), seriesNamed(t, power, "power required", sys.power)
		if len(a.X) != len(s.Curve) || len(s.Curve) < 100 {
			t.Fatalf("%d points of %d", len(a.X), len(s.Curve))
		}
		gaps := 0
		for i, b := range s.Curve {
			if math.IsNaN(b.Available) {
				gaps++
			}
			sigma := s.Point.Air.Density / 1.225
			for _, c := range []struct {
				what      string
				got, want float64
			}{
				{"speed", a.X[i], b.TAS / sys.v}, {"available", a.Y[i], b.Available / sys.f}, {"required", r.Y[i], b.Required / sys.f},
				{"in hand", hand.Y[i], (b.Available - b.Required) / sys.f}, {"in hand, %", ratio.Y[i], 100 * (b.Available/b.Required - 1)},
				{"power available", pa.Y[i], b.Available * b.TAS / sys.p}, {"power required", pr.Y[i], b.Required * b.TAS / sys.p},
			} {
				if !near(c.got, c.want) {
					t.Fatalf("%s at point %d: %v, want %v", c.what, i, c.got, c.want)
				}
			}
			// Below Mach 0.25 calibrated and equivalent airspeed differ by less than 0.5 %.
			if want := b.TAS * math.Sqrt(sigma) / sys.v; math.Abs(cas.Y[i]/want-1) > 0.005 {
				t.Fatalf("CAS at point %d: %v, want about %v", i, cas.Y[i], want)
			}
		}
		if gaps == 0 || gaps > 20 {
			t.Errorf("%d speeds beyond the propeller's table, want a few", gaps)
		}
	}
}

func TestSpeedMarks(t *testing.T) {
	s := named(t, "demo")
	v := s.Speeds
	want := []float64{v.Stall.TAS, v.BestAngle.TAS, v.BestRate.TAS, v.LeastThrust.TAS, v.LevelMax.TAS}
	for _, c := range []Chart{ThrustChart(s, units.Metric), PowerChart(s, units.Metric)} {
		if len(c.Marks) != len(want) {
			t.Fatalf("marks %v", c.Marks)
		}
		for i, m := range c.Marks {
			text := readNumber(want[i], 1)
			if m.X != want[i] || !strings.HasSuffix(m.Label, " "+text) {
				t.Errorf("mark %+v, want %v", m, want[i])
			}
		}
	}
	same := *s
	same.Speeds.BestAngle.TAS = v.Stall.TAS
	if c := ThrustChart(&same, units.Metric); len(c.Marks) != 4 || c.Marks[0].Label != "stall, best angle "+readNumber(v.Stall.TAS, 1) {
		t.Errorf("marks of one speed: %+v", c.Marks)
	}
	labels := func(s *study.Study) (names []string) {
		for _, m := range ThrustChart(s, units.Metric).Marks {
			names = append(names, strings.TrimRight(m.Label, " 0123456789."))
		}
		return names
	}
	if got := labels(named(t, "above the ceiling")); !slices.Equal(got, []string{"stall", "least thrust"}) {
		t.Errorf("marks without level flight: %q", got)
	}
	if got := labels(named(t, "stall above never exceed")); len(got) != 0 {
		t.Errorf("marks of an empty chart: %q", got)
	}
}

// What must be seen lies within the axes: all thrust available, thrust required up to the
// level maximum, every mark.
func TestThrustLimits(t *testing.T) {
	for _, c := range cases() {
		curve := flyable(c.Study)
		if len(curve) == 0 {
			continue
		}
		for _, ch := range []Chart{ThrustChart(c.Study, units.Metric), PowerChart(c.Study, units.Metric)} {
			x, y, p := ch.X, ch.Panels[0].Y, ch.Panels[0]
			a, r := p.Series[1], p.Series[2]
			if math.Mod(x.Min, 5) != 0 || math.Mod(x.Max, 5) != 0 || x.Min > 0.8*c.Speeds.Stall.TAS || x.Min <= 0.8*c.Speeds.Stall.TAS-5 ||
				x.Max < a.X[len(a.X)-1] || x.Max >= a.X[len(a.X)-1]+5 {
				t.Errorf("%s, %s: x from %v to %v", c.name, ch.ID, x.Min, x.Max)
			}
			most, least := 0.0, math.Inf(1)
			for i := range a.X {
				if usable(a.Y[i]) {
					most = max(most, a.Y[i])
				}
				least = min(least, r.Y[i])
				if c.Speeds.LevelMax.Err == nil && a.X[i] >= c.Speeds.LevelMin.TAS && a.X[i] <= c.Speeds.LevelMax.TAS && r.Y[i] > y.Max {
					t.Errorf("%s, %s: required %v at %v leaves the chart", c.name, ch.ID, r.Y[i], a.X[i])
				}
			}
			if y.Min != 0 || y.Max < 1.05*most || y.Max < least || y.Max > 2.2*max(most, least) {
				t.Errorf("%s, %s: y from %v to %v for %v available and %v required", c.name, ch.ID, y.Min, y.Max, most, least)
			}
		}
	}
}

func TestThrustWithoutAnAnswer(t *testing.T) {
	for name, want := range map[string]string{
		"stall above never exceed": "never-exceed speed",
		"outside the air":          "",
		"above the ceiling":        "no level flight at 6000",
	} {
		s := named(t, name)
		c := ThrustChart(s, units.Metric)
		drawn := len(c.Panels[0].Series) > 0
		if drawn != (name == "above the ceiling") {
			t.Errorf("%s: curves %v", name, drawn)
		}
		why := units.Explain(s.Speeds.LevelMax.Err).In(units.Metric)
		if why == "" || !strings.Contains(why, want) || !strings.Contains(c.Title, why) || !strings.Contains(c.Desc, why) || !drawn && c.Panels[0].Blank != why {
			t.Errorf("%s: the reason %q is missing in %q, %q or %q", name, why, c.Title, c.Desc, c.Panels[0].Blank)
		}
	}
}

func TestThrustWords(t *testing.T) {
	c := ThrustChart(named(t, "other variant"), units.Aviation)
	for _, want := range []string{"1872\u00a0ft", "ISA +15\u00a0°C", "\u00a0lb,", "clean", "\u00a0kt"} {
		if !strings.Contains(c.Title, want) {
			t.Errorf("%q is missing in %q", want, c.Title)
		}
	}
	if _, root := render(t, c); !slices.Contains(textsOf(root), "available") || !slices.Contains(textsOf(root), "required") {
		t.Errorf("the curves' short labels are missing in %q", textsOf(root))
	}
	for _, want := range []string{"least near", "in hand near", "level maximum"} {
		if !strings.Contains(c.Desc, want) {
			t.Errorf("%q is missing in %q", want, c.Desc)
		}
	}
}

// Thrust required that soars at the stall does not flatten the rest of the chart.
func TestSteepThrustRequiredIsCut(t *testing.T) {
	s := &study.Study{Curve: []pointperf.Balance{{TAS: 20, Required: 1000, Available: 100}, {TAS: 30, Required: 50, Available: 90}}}
	s.Speeds.LevelMax = pointperf.Best{TAS: 30, Value: 50}
	k := balance{of: func(_ *pointperf.Balance, n float64) float64 { return n }}
	if top := k.top(s); !near(top, 135) {
		t.Errorf("top %v, want 1.35 of 100", top)
	}
	s.Curve[0].Required = 120
	if top := k.top(s); !near(top, 126) {
		t.Errorf("top %v, want 1.05 of 120", top)
	}
}
