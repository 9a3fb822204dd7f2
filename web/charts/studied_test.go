package charts

import (
	"bytes"
	"math"
	"slices"
	"strconv"
	"strings"
	"sync"
	"testing"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// studied is a study whose charts the tests look at.
type studied struct {
	name string
	*study.Study
}

func studyOf(s *project.Spec, variant int, change func(*study.View)) *study.Study {
	p, err := s.Build()
	if err != nil {
		panic(err) // the specifications below are fixed
	}
	view := study.DefaultView(p, variant)
	if change != nil {
		change(&view)
	}
	return study.Run(p, variant, view)
}

// model is an unmanned aircraft of 3 kg and 200 W.
func model() *project.Spec {
	s := project.New("Model")
	a := &s.Variants[0].Aircraft
	f := &a.Airframe
	f.WingArea, f.Span, f.WingHeight, f.NeverExceed = 0.5, 2.2, 0.2, 35
	a.Weights.Empty, a.Weights.Items, a.Weights.MaxTakeOff = 2.2, nil, 3.2
	p := a.Powerplant.Model.(*powerplant.PistonPropeller)
	p.Mass = 0.5
	e := &p.Engine
	e.RatedPower, e.RatedSpeed, e.Redline, e.AccessoryPower, e.IdleFlow = 200, 120, 125, 1, 5e-6
	p.Propeller.Diameter = 0.28
	p.Fuel.Volume, p.Fuel.Capacity, p.Fuel.Unusable = 4e-4, 5e-4, 1e-5
	for i := range s.Legs {
		l := &s.Legs[i]
		l.Altitude, l.Distance, l.Time, l.Speed = min(l.Altitude, 300), 8e3, min(l.Time, 600), 16
	}
	s.Legs[6].Altitude = 100
	return s
}

// charged is the demo as if it flew on a battery: the engine has no such kind
// yet, so the energy of its flight is written over.
func charged() *study.Study {
	s := studyOf(project.Demo(), 0, nil)
	const full = 60e6
	draw := func(fuel float64) float64 { return full * fuel / 100 }
	for i := range s.Flight.Trace {
		p := &s.Flight.Trace[i]
		p.Fuel, p.Charge, p.Output.Shaft.EngineSpeed = 0, draw(p.Fuel), 0
	}
	for i := range s.Flight.Legs {
		l := &s.Flight.Legs[i]
		l.Start.Fuel, l.Start.Charge = 0, draw(l.Start.Fuel)
		l.End.Fuel, l.End.Charge = 0, draw(l.End.Fuel)
	}
	s.Flight.Fuel, s.Flight.Energy = 0, 17e6
	return s
}

// everyKind is the demo with a mission of every kind of leg, among them a cruise for the rest of the range.
func everyKind() *project.Spec {
	s := project.Demo()
	add := func(kind, name string, change func(*mission.Leg)) {
		l := mission.NewLeg(kind, name)
		if change != nil {
			change(&l)
		}
		s.Legs = append(s.Legs, l)
	}
	rest := s.Legs[3]
	rest.Name, rest.Extent = "The rest", mission.ForTheRest
	s.Legs = s.Legs[:3:3]
	add(mission.Dash, "Dash", func(l *mission.Leg) { l.Distance = 15e3 })
	add(mission.Turns, "Turns", func(l *mission.Leg) { l.Turns = 3 })
	add(mission.Loiter, "Loiter", nil)
	add(mission.Drop, "Drop", func(l *mission.Leg) { l.Payload = 30 })
	add(mission.PickUp, "Pick up", nil)
	s.Legs = append(s.Legs, rest)
	add(mission.Descent, "Descend", func(l *mission.Leg) { l.Altitude, l.Speed = 720, 45 })
	add(mission.Landing, "Land", nil)
	add(mission.Alternate, "Alternate", func(l *mission.Leg) { l.Distance = 60e3 })
	add(mission.Contingency, "Contingency", nil)
	add(mission.Reserve, "Reserve", nil)
	return s
}

// fortyLegs is the demo with many legs whose names are as long as they may be.
func fortyLegs() *project.Spec {
	s := project.Demo()
	short := s.Legs[3]
	short.Distance = 5e3
	for i := range 31 {
		short.Name = strings.Repeat("Long leg name ", 5)[:56] + strconv.Itoa(100+i)
		s.Legs = slices.Insert(s.Legs, 4, short)
	}
	return s
}

// cases are the demo, aircraft of other sizes, and studies with parts that have no answer.
var cases = sync.OnceValue(func() []studied {
	high := project.Demo()
	high.Legs[2].Altitude = 6000
	heavy := project.Demo()
	heavy.Variants[0].Aircraft.Weights.Empty = 900
	flimsy := project.Demo()
	flimsy.Variants[0].Aircraft.Airframe.NeverExceed = 12
	grounded := project.Demo()
	grounded.Legs = grounded.Legs[1:]
	grounded.Variants[0].Aircraft.Weights.Empty = 2500
	thirsty := project.Demo()
	thirsty.Legs[8].Time = 8 * 3600
	return []studied{
		{"demo", studyOf(project.Demo(), 0, nil)},
		{"other variant", studyOf(project.Demo(), 1, nil)},
		{"new", studyOf(project.New("New"), 0, nil)},
		{"model", studyOf(model(), 0, nil)},
		{"impossible climb", studyOf(high, 0, nil)},
		{"overweight", studyOf(heavy, 0, nil)},
		{"never flies", studyOf(grounded, 0, nil)},
		{"stall above never exceed", studyOf(flimsy, 0, nil)},
		{"above the ceiling", studyOf(project.Demo(), 0, func(v *study.View) { v.Altitude = 6000 })},
		{"near the ceiling", studyOf(project.Demo(), 0, func(v *study.View) { v.Altitude = 5300 })},
		{"outside the air", studyOf(project.Demo(), 0, func(v *study.View) { v.Altitude = 1e6 })},
		{"reserve not met", studyOf(thirsty, 0, nil)},
		{"charged", charged()},
		{"every kind", studyOf(everyKind(), 0, nil)},
		{"forty legs", studyOf(fortyLegs(), 0, nil)},
	}
})

func named(t testing.TB, name string) *study.Study {
	t.Helper()
	for _, c := range cases() {
		if c.name == name {
			return c.Study
		}
	}
	t.Fatalf("no case %q", name)
	return nil
}

func allOf(s *study.Study, sys units.System) []Chart {
	return []Chart{ThrustChart(s, sys), PowerChart(s, sys), ClimbChart(s, sys), MissionChart(s, sys)}
}

// studyCharts are the charts of every case, of two in every unit system; the tests of
// the drawing take them as further samples.
func studyCharts() []Chart {
	var all []Chart
	for _, c := range cases() {
		for _, sys := range units.Systems {
			if sys != units.Metric && c.name != "demo" && c.name != "model" {
				continue
			}
			for _, ch := range allOf(c.Study, sys) {
				ch.ID += "-" + strings.ReplaceAll(c.name, " ", "-") + "-" + string(sys)
				all = append(all, ch)
			}
		}
	}
	return all
}

func TestTablesHoldNumbers(t *testing.T) {
	for _, c := range studyCharts() {
		table := c.Table()
		if c.Panels[0].Blank == "" && len(table.Rows) == 0 {
			t.Errorf("%s: no rows", c.ID)
		}
		for _, row := range table.Rows {
			if len(row) != len(table.Header) {
				t.Fatalf("%s: %d cells under %d headers", c.ID, len(row), len(table.Header))
			}
			for i, cell := range row {
				if i == 0 && c.X.Format == "hm" || cell == noValue {
					continue
				}
				if v, err := strconv.ParseFloat(cell, 64); err != nil || !usable(v) {
					t.Errorf("%s: cell %q under %q", c.ID, cell, table.Header[i])
				}
			}
		}
	}
}

func TestTitlesAreSentences(t *testing.T) {
	for _, c := range studyCharts() {
		for _, text := range []string{c.Title, c.Desc} {
			first := text[0]
			if first < 'A' || first > 'Z' || !strings.HasSuffix(text, ".") || strings.HasSuffix(text, "..") {
				t.Errorf("%s: %q is not a sentence", c.ID, text)
			}
			for _, bad := range []string{"NaN", "Inf", "%!", "  ", ": .", ", ,"} {
				if strings.Contains(text, bad) {
					t.Errorf("%s: %q in %q", c.ID, bad, text)
				}
			}
		}
	}
}

// The same study gives the same bytes, and so does the same project studied again.
func TestStudyChartsAreDeterministic(t *testing.T) {
	again := studyOf(project.Demo(), 0, nil)
	first := allOf(named(t, "demo"), units.Metric)
	for i, c := range allOf(again, units.Metric) {
		a, _ := render(t, first[i])
		b, _ := render(t, c)
		if a != b {
			t.Errorf("%s differs", c.ID)
		}
	}
}

func TestCover(t *testing.T) {
	for _, c := range [][2]float64{
		{1160, 1500}, {1500, 1500}, {43, 50}, {0.3, 0.3}, {5600, 6000}, {2001, 2500}, {3001, 4000}, {62, 80}, {-3, 1}, {0, 1}, {math.NaN(), 1}, {math.Inf(1), 1},
	} {
		if got := cover(c[0]); math.Abs(got-c[1]) > 1e-9 {
			t.Errorf("cover(%v) = %v, want %v", c[0], got, c[1])
		}
	}
	if got := coverBelow(-36); got != -40 {
		t.Errorf("coverBelow(-36) = %v", got)
	}
	if got := coverBelow(7); got != 0 {
		t.Errorf("coverBelow(7) = %v", got)
	}
}

func TestDayWords(t *testing.T) {
	for _, c := range []struct {
		deviation float64
		want      string
	}{{0, "ISA"}, {0.01, "ISA"}, {15, "ISA +15\u00a0°C"}, {-7.5, "ISA \u22127.5\u00a0°C"}} {
		if got := dayWords(units.Metric, c.deviation); got != c.want {
			t.Errorf("%v: %q, want %q", c.deviation, got, c.want)
		}
	}
}

// Every chart's axis holds still while the mass is nudged.
func TestAxesHoldStill(t *testing.T) {
	s := project.Demo()
	w := &s.Variants[0].Aircraft.Weights
	w.Items[0].Mass += 0.7
	nudged := allOf(studyOf(s, 0, nil), units.Metric)
	for i, c := range allOf(named(t, "demo"), units.Metric) {
		if c.X != nudged[i].X {
			t.Errorf("%s: x axis %+v became %+v", c.ID, c.X, nudged[i].X)
		}
		for k := range c.Panels {
			if c.Panels[k].Y != nudged[i].Panels[k].Y {
				t.Errorf("%s: y axis %+v became %+v", c.ID, c.Panels[k].Y, nudged[i].Panels[k].Y)
			}
		}
	}
}

func seriesNamed(t *testing.T, c Chart, name, unit string) Series {
	t.Helper()
	for _, p := range c.Panels {
		for _, s := range p.Series {
			if s.Name == name && s.Unit == unit {
				return s
			}
		}
	}
	t.Fatalf("%s has no series %q in %q", c.ID, name, unit)
	return Series{}
}

func near(a, b float64) bool {
	return math.Abs(a-b) <= 1e-9*max(1, math.Abs(a), math.Abs(b)) || math.IsNaN(a) && math.IsNaN(b)
}

// The factors are those of the 1959 foot and pound, the nautical mile and standard
// gravity, written here again so that a slip in the choice of a unit shows.
const (
	knotSI = 1852.0 / 3600
	footSI = 0.3048
	lbfSI  = 0.45359237 * 9.80665
	hpSI   = 550 * footSI * lbfSI
	lbSI   = 0.45359237
)

func BenchmarkStudyCharts(b *testing.B) {
	s := named(b, "demo")
	var out bytes.Buffer
	for b.Loop() {
		out.Reset()
		for _, c := range allOf(s, units.Metric) {
			if err := c.SVG(&out); err != nil {
				b.Fatal(err)
			}
			if err := c.Narrow().SVG(&out); err != nil {
				b.Fatal(err)
			}
		}
	}
}

// A thrust of a few pounds needs more digits than that of a light aeroplane.
func TestDigitsFollowTheAxis(t *testing.T) {
	for name, want := range map[string]int{"demo": 0, "model": 2} {
		c := ThrustChart(named(t, name), units.Aviation)
		if got := seriesNamed(t, c, "thrust available", "lbf").Decimals; got != want {
			t.Errorf("%s: %d digits, want %d", name, got, want)
		}
	}
	if got := measureOf(units.Metric, units.Mass, 500).decimals; got != units.Metric.Decimals(units.Mass) {
		t.Errorf("%d digits, fewer or more than the system's", got)
	}
}

// A number in a sentence does not break across lines, up to 9999 as on the page.
func TestProse(t *testing.T) {
	m := measureOf(units.Metric, units.Mass, 0)
	if got := m.prose(1214.4); got != "1214.4\u00a0kg" {
		t.Errorf("prose %q", got)
	}
	if got := m.label(1214.4); got != "1"+thinSpace+"214.4\u00a0kg" {
		t.Errorf("label %q", got)
	}
	for _, c := range allOf(named(t, "overweight"), units.Metric) {
		if strings.Contains(c.Title+c.Desc, thinSpace) {
			t.Errorf("%s: a thin space in %q or %q", c.ID, c.Title, c.Desc)
		}
	}
}
