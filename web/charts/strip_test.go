package charts

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"math"
	"os"
	"regexp"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// drawnXML draws a strip and reads it back.
func drawnXML(t interface{ Fatalf(string, ...any) }, d Drawing) (string, element) {
	var b bytes.Buffer
	if err := d.SVG(&b); err != nil {
		t.Fatalf("SVG: %v", err)
	}
	var root element
	if err := xml.Unmarshal(b.Bytes(), &root); err != nil {
		t.Fatalf("not XML: %v\n%s", err, b.String())
	}
	return b.String(), root
}

// tidy reports what lies on another text or leaves the drawing.
func tidy(d Drawing, root element) (bad []string) {
	f := newSide(d)
	canvas := box{-0.5, -0.5, f.width + 0.5, f.height + 0.5}
	boxes, texts := textBoxes(root)
	for i, b := range boxes {
		if !b.within(canvas) {
			bad = append(bad, fmt.Sprintf("%q leaves the drawing: %+v", texts[i], b))
		}
		for j := range i {
			if b.overlaps(boxes[j]) {
				bad = append(bad, fmt.Sprintf("%q lies on %q", texts[i], texts[j]))
			}
		}
	}
	return bad
}

// stripCases are the cases of the other charts and strips that are hard to draw.
func stripCases() map[string]*study.Study {
	all := map[string]*study.Study{}
	for _, c := range cases() {
		all[c.name] = c.Study
	}
	for name, change := range map[string]func(*project.Spec){
		"short": func(s *project.Spec) { s.Strips[0].Length, s.Strips[0].HeadWind = 120, -4 },
		"long":  func(s *project.Spec) { s.Strips[0].Length = 6000 },
		"tall":  func(s *project.Spec) { s.Strips[0].Obstacle, s.Strips[0].Length, s.Strips[0].HeadWind = 60, 100, 14 },
		"flat":  func(s *project.Spec) { s.Strips[0].Obstacle = 0 },
		"ice":   func(s *project.Spec) { s.Strips[0].Slope, s.Strips[0].Surface = -0.2, "ice" },
		"no out": func(s *project.Spec) {
			s.Strips[0].Elevation, s.Day.Deviation = 4950, 20
			s.Variants[0].Aircraft.Weights.Items[0].Mass += 38
		},
		"factors": func(s *project.Spec) { s.Technique.TakeOffFactor, s.Technique.LandingFactor = 1, 3 },
	} {
		s := project.Demo()
		change(s)
		all[name] = studyOf(s, 0, nil)
	}
	return all
}

// systemsFor are all unit systems for the usual aircraft, and metric for the others.
func systemsFor(name string) []units.System {
	if name == "demo" || name == "model" || name == "short" {
		return units.Systems
	}
	return []units.System{units.Metric}
}

func TestStripDrawing(t *testing.T) {
	css, err := os.ReadFile("../static/charts.css")
	if err != nil {
		t.Fatal(err)
	}
	for name, s := range stripCases() {
		off, on := s.Fields()
		for _, f := range []*study.Field{&off, &on} {
			for _, sys := range systemsFor(name) {
				d := StripDrawing(f, sys)
				for _, form := range []Drawing{d, d.Narrow()} {
					text, root := drawnXML(t, form)
					for _, bad := range tidy(form, root) {
						t.Errorf("%s, %s, %s: %s", name, sys, form.ID, bad)
					}
					if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") || strings.Contains(text, "style=") {
						t.Errorf("%s, %s: a wreck in the drawing", name, form.ID)
					}
					root.walk(func(e element) {
						for _, class := range strings.Fields(e.attr("class")) {
							if strings.HasPrefix(class, "c-") && !regexp.MustCompile(`\.`+class+`[\s,.:{]`).Match(css) {
								t.Errorf("charts.css has no rule for .%s", class)
							}
						}
					})
				}
				toScale(t, name+", "+d.ID, d, f, sys)
			}
		}
	}
}

// toScale checks what the drawing claims: lengths to one scale, heights to the stated one,
// pieces that add up to the run, and a part past the end exactly where there is one.
func toScale(t *testing.T, name string, d Drawing, f *study.Field, sys units.System) {
	t.Helper()
	if f.Present.Err != nil {
		if !strings.HasPrefix(d.Said, "No ") || d.Factored != 0 {
			t.Errorf("%s: says %q", name, d.Said)
		}
		return
	}
	run, length := &f.Present.Run, f.Present.Place.Strip.Length
	unit := sys.Unit(units.FieldLength)
	if got := unit.ToSI(d.Pieces[len(d.Pieces)-1].To); math.Abs(got-run.Total) > 1e-6 || d.Pieces[0].From != 0 {
		t.Errorf("%s: pieces end at %g m, the run at %g m", name, got, run.Total)
	}
	if (d.Past != "") != (run.Total > length) {
		t.Errorf("%s: says %q of %g m on %g m", name, d.Past, run.Total, length)
	}
	s := newSide(d)
	perMetre := (s.x.at(unit.FromSI(run.Total)) - s.x.at(0)) / run.Total
	if run.Total > 0 && math.Abs(perMetre*length-(s.x.at(d.Length)-s.x.at(0))) > 1e-6*s.width {
		t.Errorf("%s: the strip and the run are not to one scale", name)
	}
	times := 1.0
	if h := f.Present.Place.Strip.Obstacle; h > 0 {
		note := strings.Join(s.note, " ")
		if !strings.Contains(note, "one scale") {
			if _, err := fmt.Sscanf(note[strings.Index(note, "drawn ")+6:], "%g times", &times); err != nil {
				t.Errorf("%s: %q", name, note)
			}
		}
		if got := s.top / h / perMetre; math.Abs(got-times) > 1e-6*times || s.top > pathHeight+1e-9 {
			t.Errorf("%s: heights are drawn %g times the length, said %g", name, got, times)
		}
	}
}

// TestAnyStripIsTidy: whatever the lengths, no label of a drawing lies on another.
func TestAnyStripIsTidy(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		at := func(name string, lo, hi float64) float64 {
			return math.Exp(rapid.Float64Range(math.Log(lo), math.Log(hi)).Draw(r, name))
		}
		roll, pause, air := at("roll", 0.5, 5000), at("pause", 0.5, 500), at("air", 1, 5000)
		d := Drawing{ID: "any", Title: "Any.", Desc: "Any.", Note: "Two people, ISA, dry short grass, calm, level.", Unit: "m", Length: at("length", 1, 6000), End: "end of strip 1000 m", GoesOn: "strip goes on to 6000 m",
			Pieces: []Piece{{0, roll, "ground roll", "ground roll 1000 m", "roll"}, {roll, roll + pause, "rotation", "rotation 100 m", "pause"}, {roll + pause, roll + pause + air, "airborne", "airborne 1000 m", "air"}},
			Along:  []float64{0, roll, roll + pause + air}, Heights: []float64{0, 0, at("height", 0.1, 60)}, Screen: roll + pause + air,
			Marks:    []Mark{{roll + pause, "lift-off 25.8 m/s"}, {roll + pause + air, "over 15.2 m at 28.1 m/s"}},
			Factored: 1.33 * (roll + pause + air), FactoredLabel: "with safety factor × 1.33: 1000 m, 1000 m past the end"}
		if roll+pause+air > d.Length {
			d.Past = "1000 m past the end"
		}
		for _, form := range []Drawing{d, d.Narrow()} {
			_, root := drawnXML(r, form)
			if bad := tidy(form, root); len(bad) > 0 {
				r.Fatalf("%s: %s", form.ID, strings.Join(bad, "; "))
			}
		}
	})
}

func TestFieldCharts(t *testing.T) {
	for name, s := range stripCases() {
		off, on := s.Fields()
		for _, f := range []*study.Field{&off, &on} {
			for _, sys := range systemsFor(name) {
				for _, c := range []Chart{FieldAltitudeChart(f, sys), FieldMassChart(f, sys, s.Masses.MaxTakeOff)} {
					checkFieldChart(t, name, c)
				}
			}
		}
	}
	demo := named(t, "demo")
	off, _ := demo.Fields()
	c := FieldAltitudeChart(&off, units.Aviation)
	flag := c.Panels[0].Flags[0]
	if !near(flag.Y, off.Present.Run.Total/footSI) || len(c.Panels[0].Lines) != 1 || !near(c.Panels[0].Lines[0].Y, 600/footSI) {
		t.Errorf("flag %+v, lines %+v", flag, c.Panels[0].Lines)
	}
	total := seriesNamed(t, c, "over 50\u00a0ft", "ft")
	if y, ok := newCurve(total.X, total.Y).at(flag.X); !ok || math.Abs(y-flag.Y) > 0.01*flag.Y {
		t.Errorf("the flag stands at %g, the curve at %g", flag.Y, y)
	}
}

func checkFieldChart(t *testing.T, name string, c Chart) {
	t.Helper()
	for _, text := range []string{c.Title, c.Desc} {
		if !strings.HasSuffix(text, ".") || strings.Contains(text, "NaN") || strings.Contains(text, "  ") || strings.Contains(text, "..") {
			t.Errorf("%s, %s: %q is not a sentence", name, c.ID, text)
		}
	}
	if (c.Panels[0].Blank == "") != (len(c.Table().Rows) > 0) {
		t.Errorf("%s, %s: blank %q over %d rows", name, c.ID, c.Panels[0].Blank, len(c.Table().Rows))
	}
	for _, form := range []Chart{c, c.Narrow()} {
		text, root := render(t, form)
		if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
			t.Errorf("%s, %s: a wreck in the drawing", name, form.ID)
		}
		boxes, texts := textBoxes(root)
		for i, b := range boxes {
			for j := range i {
				if b.overlaps(boxes[j]) {
					t.Errorf("%s, %s: %q lies on %q", name, form.ID, texts[i], texts[j])
				}
			}
		}
	}
}
