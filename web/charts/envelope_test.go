package charts

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"

	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func envelopeCharts(s *study.Study, e *study.Envelope, sys units.System) []Chart {
	return []Chart{RateCurvesChart(s, e, sys), EnvelopeChart(s, e, sys), LoadChart(s, e, s.Structure(), sys), StructureChart(s, s.Structure(), sys)}
}

// Every chart of every case is whole: well-formed, named, without a number that is none, and
// with words where there is nothing to draw.
func TestEnvelopeChartsOfEveryCase(t *testing.T) {
	for _, c := range cases() {
		e := c.Envelope()
		for _, sys := range units.Systems {
			for _, chart := range envelopeCharts(c.Study, e, sys) {
				for _, form := range []Chart{chart, chart.Narrow()} {
					var b bytes.Buffer
					if err := form.SVG(&b); err != nil {
						t.Fatal(err)
					}
					for d := xml.NewDecoder(&b); ; {
						if _, err := d.Token(); errors.Is(err, io.EOF) {
							break
						} else if err != nil {
							t.Fatalf("%s, %s: %v", c.name, form.ID, err)
						}
					}
				}
				table := chart.Table()
				text := chart.Title + chart.Desc + strings.Join(table.Header, "")
				for _, r := range append(table.Rows, EnvelopeTable(chart, e, sys).Rows...) {
					text += strings.Join(r, " ")
				}
				if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") || strings.Contains(text, "{}") || !strings.HasSuffix(chart.Desc, ".") {
					t.Errorf("%s, %s: %s", c.name, chart.ID, text)
				}
				if p := chart.Panels[0]; len(p.Series) == 0 && p.Blank == "" {
					t.Errorf("%s, %s: neither a curve nor a reason", c.name, chart.ID)
				}
			}
		}
	}
}

func TestRateCurvesOfTheDemo(t *testing.T) {
	s := named(t, "demo")
	e := s.Envelope()
	c := RateCurvesChart(s, e, units.Aviation)
	p := c.Panels[0]
	if len(p.Series) != len(e.Curves) || len(p.Flags) != len(e.Curves) || p.Flags[0].Label == "" || p.Flags[1].Label != "" {
		t.Fatalf("%d curves, %d flags", len(p.Series), len(p.Flags))
	}
	seen := map[string]bool{}
	for i, sr := range p.Series {
		if seen[sr.Class] {
			t.Errorf("two curves are %s", sr.Class)
		}
		seen[sr.Class] = true
		if got, want := p.Flags[i].Y, e.Curves[i].Rate.Value/(0.3048/60); math.Abs(got-want) > 1e-9*want {
			t.Errorf("flag %d at %g ft/min, want %g", i, got, want)
		}
		if p.Flags[i].X < c.X.Min || p.Flags[i].X > c.X.Max || p.Flags[i].Y > p.Y.Max {
			t.Errorf("flag %d lies outside the axes", i)
		}
	}
	if p.Lines[0].Y < 99.9 || p.Lines[0].Y > 100.1 || pointperf.ServiceRate != 0.508 {
		t.Errorf("the service rate is drawn at %g ft/min", p.Lines[0].Y)
	}
	// Above the ceiling the axis goes below zero, so that the curve is seen.
	high := named(t, "above the ceiling")
	if c := RateCurvesChart(high, high.Envelope(), units.Metric); c.Panels[0].Y.Min >= 0 || c.Panels[0].Flags[0].Y < c.Panels[0].Y.Min {
		t.Errorf("a sink of %g on an axis from %g", c.Panels[0].Flags[0].Y, c.Panels[0].Y.Min)
	}
}

func TestEnvelopeChartOfTheDemo(t *testing.T) {
	s := named(t, "demo")
	e := s.Envelope()
	c := EnvelopeChart(s, e, units.Metric)
	labels := map[string]int{}
	for _, sr := range c.Panels[0].Series {
		if sr.LabelAt >= 0 {
			labels[sr.Label+sr.Name]++
		}
	}
	for _, want := range []string{"limit of thrust, 0excess power 0\u00a0m/s", "1\u00a0m/sexcess power 1\u00a0m/s", "3\u00a0m/sexcess power 3\u00a0m/s", "stall", "never exceed", "best rate"} {
		if labels[want] != 1 {
			t.Errorf("%q stands %d times among %v", want, labels[want], labels)
		}
	}
	flags := c.Panels[0].Flags
	if len(flags) != 2 || flags[0].Y != e.Absolute.Value || flags[1].Y != e.Service.Value {
		t.Fatalf("flags %+v", flags)
	}
	for _, f := range flags {
		if f.X < c.X.Min || f.X > c.X.Max || f.Y > c.Panels[0].Y.Max {
			t.Errorf("flag %+v lies outside the axes", f)
		}
	}
	hand := c.Panels[0].Bands[0]
	top := 0.0
	for _, y := range hand.Upper {
		if !math.IsNaN(y) {
			top = max(top, y)
		}
	}
	if math.Abs(top-e.Absolute.Value) > 0.005*e.Absolute.Value {
		t.Errorf("shaded up to %g m, ceiling %g", top, e.Absolute.Value)
	}
}

// The table says at round speeds what the excess power is, by the forces and not by the grid.
func TestEnvelopeTableIsTrue(t *testing.T) {
	s := named(t, "demo")
	e := s.Envelope()
	table := EnvelopeTable(EnvelopeChart(s, e, units.Metric), e, units.Metric)
	checked := 0
	for j, r := range table.Rows {
		hp, _ := strconv.ParseFloat(r[0], 64)
		air, err := e.Day.At(e.Grid.Levels[4*j].Altitude, nil)
		if err != nil || math.Abs(hp-air.PressureAltitude) > 0.5 {
			t.Fatal(hp, err)
		}
		p := &pointperf.Point{Air: air, Mass: s.View.Mass}
		for i, cell := range r[2 : len(r)-1] {
			v, _ := strconv.ParseFloat(strings.TrimSuffix(strings.TrimPrefix(table.Header[i+2], "at "), " m/s, m/s"), 64)
			got, err := strconv.ParseFloat(cell, 64)
			if err != nil {
				continue
			}
			b, err := pointperf.At(s.Aircraft(), p, v, nil)
			if err != nil {
				t.Fatal(err)
			}
			checked++
			// Half a digit, and the chord of a step of the grid where the propeller meets its redline.
			if want := b.InHand() * v / p.Weight(); math.Abs(got-want) > 0.03 {
				t.Errorf("at %g m and %g m/s the table says %g, want %.3f", hp, v, got, want)
			}
		}
	}
	if checked < 40 {
		t.Errorf("%d cells have a number", checked)
	}
}

func TestLoadChartOfTheDemo(t *testing.T) {
	s := named(t, "demo")
	e := s.Envelope()
	c := LoadChart(s, e, s.Structure(), units.Metric)
	p := c.Panels[0]
	if len(p.Series) != 2 || len(p.Lines) != 4 || len(p.Flags) != 1 {
		t.Fatalf("%d curves, %d lines, %d flags", len(p.Series), len(p.Lines), len(p.Flags))
	}
	if math.Abs(p.Lines[0].Y-2/math.Sqrt(3)) > 1e-12 || math.Abs(p.Lines[2].Y-2) > 1e-12 {
		t.Errorf("bank lines %+v", p.Lines)
	}
	if !strings.Contains(c.Desc, "thrust ends it") || !strings.Contains(c.Title, readNumber(p.Flags[0].Y, 2)) {
		t.Errorf("says %q, %q", c.Title, c.Desc)
	}
	if grounded := named(t, "above the ceiling"); !strings.Contains(LoadChart(grounded, grounded.Envelope(), grounded.Structure(), units.Metric).Desc, "no level flight") {
		t.Error("a turn above the ceiling")
	}
}
