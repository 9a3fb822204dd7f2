package charts

import (
	"math"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/units"
)

func TestMissionAgainstTheStudy(t *testing.T) {
	s := named(t, "demo")
	c := MissionChart(s, units.Aviation)
	series := map[string]Series{}
	for _, k := range [][2]string{
		{"pressure altitude", "ft"}, {"thrust available", "lbf"}, {"thrust required", "lbf"}, {"thrust in hand", "lbf"}, {"thrust in hand", "%"},
		{"fuel left", "lb"}, {"true airspeed", "kt"}, {"mass", "lb"}, {"power lever", "%"}, {"engine speed", "rpm"},
	} {
		series[k[0]+k[1]] = seriesNamed(t, c, k[0], k[1])
	}
	at := 0
	for _, p := range s.Flight.Trace {
		x := series["pressure altitudeft"].X
		for at < len(x) && (x[at] != p.Time || math.IsNaN(series["true airspeedkt"].Y[at])) {
			at++
		}
		if at == len(x) {
			t.Fatalf("the sample at %v s is missing", p.Time)
		}
		for name, want := range map[string]float64{
			"pressure altitudeft": p.Altitude / footSI, "thrust availablelbf": p.Available / lbfSI, "thrust requiredlbf": p.Required / lbfSI,
			"thrust in handlbf": (p.Available - p.Required) / lbfSI, "thrust in hand%": 100 * (p.Available - p.Required) / p.Required,
			"fuel leftlb": p.Fuel / lbSI, "true airspeedkt": p.TAS / knotSI, "masslb": p.Mass / lbSI,
			"power lever%": 100 * p.Setting, "engine speedrpm": 60 * p.Output.Shaft.EngineSpeed,
		} {
			if got := series[name].Y[at]; !near(got, want) {
				t.Fatalf("%s at %v s: %v, want %v", name, p.Time, got, want)
			}
		}
		at++
	}
	if n := len(series["masslb"].X); n != len(s.Flight.Trace)+2 {
		t.Errorf("%d points for %d samples and a landing", n, len(s.Flight.Trace))
	}
	for i, p := range c.Panels {
		for _, y := range p.Series {
			if y.Class == "none" {
				continue
			}
			for _, v := range y.Y {
				if usable(v) && (v < p.Y.Min || v > p.Y.Max) {
					t.Errorf("panel %d: %v of %q lies outside %v to %v", i, v, y.Name, p.Y.Min, p.Y.Max)
				}
			}
		}
	}
}

// A landing has no samples: altitude and fuel join its ends, thrust has a gap.
func TestMissionLanding(t *testing.T) {
	s := named(t, "demo")
	c := MissionChart(s, units.Metric)
	i := slices.IndexFunc(s.Flight.Legs, func(l mission.LegResult) bool { return l.Leg.Kind == mission.Landing })
	l := s.Flight.Legs[i]
	middle := (l.Start.Time + l.End.Time) / 2
	read := func(name, unit string) (float64, bool) {
		y := seriesNamed(t, c, name, unit)
		return newCurve(y.X, y.Y).at(middle)
	}
	if v, ok := read("pressure altitude", "m"); !ok || !near(v, (l.Start.Altitude+l.End.Altitude)/2) {
		t.Errorf("altitude %v, %v", v, ok)
	}
	if v, ok := read("fuel left", "kg"); !ok || !near(v, (l.Start.Fuel+l.End.Fuel)/2) {
		t.Errorf("fuel %v, %v", v, ok)
	}
	if v, ok := read("thrust available", "N"); ok {
		t.Errorf("thrust %v in a landing", v)
	}
}

func TestMissionSpansAndFlags(t *testing.T) {
	s := named(t, "demo")
	c := MissionChart(s, units.Metric)
	if len(c.Spans) != len(s.Flight.Legs) || len(c.Spans) != 9 {
		t.Fatalf("%d spans", len(c.Spans))
	}
	for i, sp := range c.Spans {
		l := s.Flight.Legs[i]
		if sp.From != l.Start.Time || sp.To != l.End.Time || sp.Label != l.Leg.Name || sp.Short == "" {
			t.Errorf("span %+v of leg %+v", sp, l.Leg)
		}
		if i > 0 && sp.From != c.Spans[i-1].To {
			t.Errorf("span %d begins at %v, the one before ends at %v", i, sp.From, c.Spans[i-1].To)
		}
	}
	if last := c.Spans[8].To; c.X.Max < last || c.X.Max > 1.05*last {
		t.Errorf("time axis to %v for %v", c.X.Max, last)
	}
	at := s.Flight.Tightest
	words := "tightest: " + readNumber(at.Available-at.Required, 0) + "\u00a0N in hand, " + readNumber(100*(at.Available/at.Required-1), 0) + "\u00a0%"
	if f := c.Panels[1].Flags; len(f) != 1 || f[0].X != at.Time || f[0].Y != at.Available || f[0].Label != words {
		t.Errorf("flags %+v, want %q", f, words)
	}
	if f := c.Panels[0].Flags; len(f) != 1 || f[0].X != at.Time || f[0].Y != at.Altitude || f[0].Label != "" {
		t.Errorf("flags of the profile %+v", f)
	}
	short := *at
	short.Available = short.Required - 40
	if got := handWords(&short, measureOf(units.Metric, units.Force, 1000)); !strings.HasPrefix(got, "40\u00a0N short, ") || strings.Contains(got, minusSign) {
		t.Errorf("a shortfall reads %q", got)
	}
}

func TestMissionThatFails(t *testing.T) {
	for _, name := range []string{"impossible climb", "overweight", "never flies"} {
		s := named(t, name)
		fail := s.Flight.Failure
		if fail == nil {
			t.Fatalf("%s: flown", name)
		}
		c := MissionChart(s, units.Metric)
		f := c.Panels[0].Flags[len(c.Panels[0].Flags)-1]
		if f.Label != "ends here" || f.X != fail.At.Time || f.Y != fail.At.Altitude {
			t.Errorf("%s: flag %+v", name, f)
		}
		if c.X.Max < max(600, fail.At.Time) || c.X.Max > max(600, 1.05*fail.At.Time) {
			t.Errorf("%s: time axis to %v, failed at %v", name, c.X.Max, fail.At.Time)
		}
		why := fail.Reason.In(units.Metric)
		if !strings.Contains(c.Title, "ends in “"+fail.Name+"”") || !strings.Contains(c.Desc, why) {
			t.Errorf("%s: %q, %q", name, c.Title, c.Desc)
		}
		if len(c.Panels[0].Series[0].Y) == 0 {
			t.Errorf("%s: no altitude where it ends", name)
		}
	}
	s := named(t, "never flies")
	if s.Flight.Tightest != nil || len(s.Flight.Trace) != 0 {
		t.Fatalf("it flew: %+v", s.Flight.Tightest)
	}
	_, root := render(t, MissionChart(s, units.Metric))
	if text := strings.Join(textsOf(root), " "); !strings.Contains(text, "no leg was flown") || !strings.Contains(text, "ends here") {
		t.Errorf("the drawing says %q", text)
	}
}

// A demand many times what there is does not flatten the panel.
func TestMissionThrustReach(t *testing.T) {
	tr := &trace{samples: []mission.Sample{{Available: 500, Required: -20}, {Available: 400, Required: 9000}}}
	if lo, hi := tr.thrustReach(); lo != -20 || hi != 1000 {
		t.Errorf("from %v to %v, want -20 to 1000", lo, hi)
	}
	tr.samples[1].Required = 300
	if lo, hi := tr.thrustReach(); lo != -20 || hi != 500 {
		t.Errorf("from %v to %v, want -20 to 500", lo, hi)
	}
}

func TestMissionReserveNotMet(t *testing.T) {
	s := named(t, "reserve not met")
	c := MissionChart(s, units.Metric)
	f := c.Panels[2].Flags
	if len(f) != 1 || f[0].Label != "reserve ends here" || f[0].Y > 1e-6 || !strings.Contains(c.Desc, "reserve is not met") {
		t.Errorf("flags %+v, %q", f, c.Desc)
	}
	if f := MissionChart(named(t, "demo"), units.Metric).Panels[2].Flags; len(f) != 0 {
		t.Errorf("a met reserve is flagged: %+v", f)
	}
}

func TestMissionOnCharge(t *testing.T) {
	s := named(t, "charged")
	c := MissionChart(s, units.Metric)
	y := c.Panels[2].Series[0]
	if c.Panels[2].Y.Label != "charge left" || y.Unit != "kWh" || !near(y.Y[0], s.Flight.Trace[0].Charge/3.6e6) {
		t.Errorf("panel %+v begins with %v %s", c.Panels[2].Y, y.Y[0], y.Unit)
	}
	for _, p := range c.Panels[2].Series {
		if p.Name == "engine speed" || p.Name == "fuel left" {
			t.Errorf("a read-out of %q, which has no values", p.Name)
		}
	}
	if !strings.Contains(c.Desc, "draws") || strings.Contains(c.Desc, "burns") {
		t.Errorf("%q", c.Desc)
	}
}
