package charts

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"math"
	"os"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/units"
)

// drawnShares draws shares and reads them back, with what lies on another text or leaves the drawing.
func drawnShares(t interface{ Fatalf(string, ...any) }, s Shares) (text string, root element, bad []string) {
	var b bytes.Buffer
	if err := s.SVG(&b); err != nil {
		t.Fatalf("SVG: %v", err)
	}
	if err := xml.Unmarshal(b.Bytes(), &root); err != nil {
		t.Fatalf("not XML: %v", err)
	}
	f := newCascade(s)
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
	return b.String(), root, bad
}

func TestMissionShares(t *testing.T) {
	css, err := os.ReadFile("../static/charts.css")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range cases() {
		for _, sys := range units.Systems {
			d := MissionShares(c.Study, sys)
			name := c.name + ", " + string(sys)
			for _, form := range []Shares{d, d.Narrow()} {
				text, root, bad := drawnShares(t, form)
				for _, b := range bad {
					t.Errorf("%s, %s: %s", name, form.ID, b)
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
			for _, text := range []string{d.Title, d.Desc} {
				if !strings.HasSuffix(text, ".") || strings.HasSuffix(text, "..") || strings.Contains(text, "NaN") {
					t.Errorf("%s: %q is not a sentence", name, text)
				}
			}
			addsUp(t, name, d, c, sys)
		}
	}
}

// addsUp holds the rows against the flight: they make up all of its time and all that was aboard.
func addsUp(t *testing.T, name string, d Shares, c studied, sys units.System) {
	t.Helper()
	f := &c.Flight
	if d.Blank != "" {
		if len(d.Parts) > 0 || len(f.Legs) > 0 && f.Legs[len(f.Legs)-1].End.Time > 0 {
			t.Errorf("%s: blank %q over %d parts", name, d.Blank, len(d.Parts))
		}
		return
	}
	totals := d.totals()
	if end := f.Legs[len(f.Legs)-1].End.Time; !near(60*totals[0], end) {
		t.Errorf("%s: %v min in the rows, %v s flown", name, totals[0], end)
	}
	start := f.Legs[0].Start
	aboard := sys.Unit(units.Mass).FromSI(start.Fuel)
	if start.Fuel == 0 {
		aboard = sys.Unit(units.Energy).FromSI(start.Charge)
	}
	if !near(totals[1], aboard) {
		t.Errorf("%s: %v in the rows, %v at the start", name, totals[1], aboard)
	}
	table := d.Table()
	for i, row := range table.Rows {
		if len(row) != len(table.Header) || row[0] != d.Parts[i].Name {
			t.Fatalf("%s: row %q under %q", name, row, table.Header)
		}
		for column, v := range d.Parts[i].Values {
			if got, err := strconv.ParseFloat(row[2+2*column], 64); err == nil && math.Abs(got-100*v/totals[column]) > 0.0501 {
				t.Errorf("%s: %q of column %d, want %v %%", name, row, column, 100*v/totals[column])
			}
		}
	}
	// Each bar begins where the one before it ends, and the last ends with the column.
	k := newCascade(d)
	for column := range d.Columns {
		at := k.left[column]
		for i := range d.Parts {
			x0, x1 := k.ends(column, i)
			if math.Abs(x0-at) > 1e-6 || x1 < x0 {
				t.Errorf("%s: part %d of column %d from %v to %v, the one before ended at %v", name, i, column, x0, x1, at)
			}
			at = x1
		}
		if math.Abs(at-k.left[column]-k.span) > 1e-6 {
			t.Errorf("%s: column %d ends at %v", name, column, at)
		}
	}
}

func TestSharesOfEveryKind(t *testing.T) {
	s := named(t, "every kind")
	if !s.Flight.Flown() || !s.Flight.Reserve.Met {
		t.Fatalf("%+v, %+v", s.Flight.Failure, s.Flight.Reserve)
	}
	fills := map[string]string{}
	for _, p := range MissionShares(s, units.Metric).Parts {
		_, name, ok := strings.Cut(p.Name, "\u2009·\u2009")
		if !ok {
			name = p.Name
		}
		fills[name] = p.Fill
	}
	for name, want := range map[string]string{"Dash": "solid", "Turns": "solid", "The rest": "solid", "Alternate": "hatched", "Reserve": "hatched", "Kept by contingencies": "open", "Left over": "open", "Drop": "", "Contingency": ""} {
		if fills[name] != want {
			t.Errorf("%s is %q, want %q", name, fills[name], want)
		}
	}
}

// TestAnySharesAreTidy: whatever the parts, no label lies on another or leaves the drawing.
func TestAnySharesAreTidy(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		s := Shares{ID: "any", Title: "Any.", Desc: "Any.", Note: "Filled: the trip. Hatched: the reserve as flown.", Columns: []Whole{
			{Name: "Time", Unit: "min", Label: "2 h 57 min", Class: "available"}, {Name: "Fuel", Unit: "kg", Label: "61.9 kg at the start", Class: "energy"}}}
		for range rapid.IntRange(1, 30).Draw(r, "parts") {
			v := math.Exp(rapid.Float64Range(-12, 12).Draw(r, "value"))
			s.Parts = append(s.Parts, Part{Name: rapid.StringMatching(`[A-Za-z ]{1,60}`).Draw(r, "name"), Fill: rapid.SampledFrom([]string{"solid", "hatched", "open"}).Draw(r, "fill"),
				Values: []float64{v, v * v}, Labels: []string{"1 h 57 min, 57 %", "1234.5 kg, <1 %"}})
		}
		for _, form := range []Shares{s, s.Narrow()} {
			if _, _, bad := drawnShares(r, form); len(bad) > 0 {
				r.Fatalf("%s: %s", form.ID, strings.Join(bad, "; "))
			}
		}
	})
}
