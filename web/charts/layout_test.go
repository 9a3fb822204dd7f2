package charts

import (
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

func TestTicksLieWithinTheArea(t *testing.T) {
	for _, c := range bothForms() {
		f := newFrame(c.withDefaults())
		for i, p := range f.panels {
			if p.area.y1-p.area.y0 < 20 {
				t.Errorf("%s: panel %d is only %.0f points high", c.ID, i, p.area.y1-p.area.y0)
			}
			for _, v := range p.y.ticks() {
				if y := p.y.at(v); y < p.area.y0-0.01 || y > p.area.y1+0.01 {
					t.Errorf("%s: tick %v of panel %d at %v is outside %+v", c.ID, v, i, y, p.area)
				}
			}
			if i > 0 && p.area.y1 > f.panels[i-1].area.y0-f.size {
				t.Errorf("%s: no space between panels %d and %d", c.ID, i-1, i)
			}
		}
		for _, v := range f.x.ticks() {
			if x := f.x.at(v); x < f.area.x0-0.01 || x > f.area.x1+0.01 {
				t.Errorf("%s: tick %v at %v is outside %+v", c.ID, v, x, f.area)
			}
		}
	}
}

func TestScale(t *testing.T) {
	some := func(lo, hi float64) extent { return extent{lo, hi, true} }
	cases := []struct {
		name             string
		axis             Axis
		data             extent
		n, share         float64
		min, max, step   float64
		ticks            int
		firstLabel, last string
	}{
		{"whole steps", Axis{}, some(20.3, 68), 5, 1, 20, 70, 10, 6, "20", "70"},
		{"half steps", Axis{}, some(0, 6200), 5, 0.5, 0, 7000, 2000, 4, "0", "6\u2009000"},
		{"with zero", Axis{Zero: true}, some(310, 1700), 5, 0.5, 0, 1750, 500, 4, "0", "1\u2009500"},
		{"given limits win", Axis{Min: -1, Max: 2}, some(0, 100), 3, 1, -1, 2, 1, 4, "\u22121", "2"},
		{"one value", Axis{}, some(50, 50), 5, 0, 47.5, 52.5, 1, 5, "48", "52"},
		{"all zero", Axis{}, some(0, 0), 5, 0, -0.5, 0.5, 0.2, 5, "\u22120.4", "0.4"},
		{"hours", Axis{Format: "hm"}, some(0, 13500), 8, 0, 0, 13500, 1800, 8, "0:00", "3:30"},
		{"no data", Axis{}, extent{}, 5, 1, 0, 1, 0.2, 0, "", ""},
	}
	for _, c := range cases {
		s := newScale(c.axis, c.data, c.n, c.share)
		if math.Abs(s.min-c.min) > 1e-9 || math.Abs(s.max-c.max) > 1e-9 || math.Abs(s.step-c.step) > 1e-9 {
			t.Errorf("%s: %v to %v by %v, want %v to %v by %v", c.name, s.min, s.max, s.step, c.min, c.max, c.step)
		}
		ticks := s.ticks()
		if len(ticks) != c.ticks {
			t.Errorf("%s: ticks %v, want %d", c.name, ticks, c.ticks)
			continue
		}
		if len(ticks) > 0 && (s.label(ticks[0]) != c.firstLabel || s.label(ticks[len(ticks)-1]) != c.last) {
			t.Errorf("%s: labels %q to %q, want %q to %q", c.name, s.label(ticks[0]), s.label(ticks[len(ticks)-1]), c.firstLabel, c.last)
		}
	}
}

func TestStepsAreOneTwoFive(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		raw := math.Pow(10, rapid.Float64Range(-20, 20).Draw(t, "exponent"))
		step := tickStep(raw, "")
		if step < raw*(1-1e-6) || step > 2.5*raw*(1+1e-6) {
			t.Fatalf("step %v for %v", step, raw)
		}
		lead := step / math.Pow(10, math.Floor(math.Log10(step)+1e-9))
		if math.Abs(lead-1) > 1e-6 && math.Abs(lead-2) > 1e-6 && math.Abs(lead-5) > 1e-6 {
			t.Fatalf("step %v leads with %v", step, lead)
		}
	})
}

func TestMarkLabelsNeverMeet(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		const width, size = 548.0, 11.0
		x := scale{min: 0, max: 100, from: 40, to: 548}
		var marks []Mark
		for range rapid.IntRange(0, 9).Draw(t, "n") {
			marks = append(marks, Mark{rapid.Float64Range(-5, 105).Draw(t, "x"), rapid.StringMatching(`[a-z ]{1,30}`).Draw(t, "label")})
		}
		placed, rows := placeMarks(marks, x, width, size)
		for i, a := range placed {
			a0, a1 := a.span()
			if a0 < -0.01 || a1 > width+0.01 {
				t.Fatalf("%q from %v to %v leaves the drawing", a.label, a0, a1)
			}
			if a.row >= rows {
				t.Fatalf("row %d of %d", a.row, rows)
			}
			for _, b := range placed[:i] {
				b0, b1 := b.span()
				if a.row == b.row && a0 < b1 && b0 < a1 {
					t.Fatalf("%q and %q overlap in row %d", a.label, b.label, a.row)
				}
			}
		}
	})
}

// The usual marks of a speed chart stand clear of each other's lines too.
func TestMarkLinesPassLabels(t *testing.T) {
	for _, c := range []Chart{thrustChart(), thrustChart().Narrow()} {
		f := newFrame(c.withDefaults())
		if len(f.marks) != len(c.Marks) {
			t.Fatalf("%d of %d marks placed", len(f.marks), len(c.Marks))
		}
		for _, a := range f.marks {
			a0, a1 := a.span()
			for _, b := range f.marks {
				if b.x > a0 && b.x < a1 && b.row >= a.row {
					t.Errorf("%s: the line of %q crosses %q", c.ID, b.label, a.label)
				}
			}
		}
	}
}

func TestSpanNames(t *testing.T) {
	x := scale{min: 0, max: 100, from: 0, to: 500}
	spans := []Span{{0, 4, "taxi out", "t"}, {4, 20, "climb", ""}, {20, 24, "descend steeply", "desc."}, {24, 90, "cruise", ""}, {95, 90, "backwards", ""}, {90, 200, "reserve", ""}}
	placed := placeSpans(spans, x, 500, 10, 11)
	var names []string
	for _, p := range placed {
		names = append(names, p.name.text)
	}
	if want := []string{"t", "climb", "desc.", "cruise", "reserve"}; !slices.Equal(names, want) {
		t.Errorf("names %q, want %q", names, want)
	}
	if last := placed[len(placed)-1]; last.x1 != 500 {
		t.Errorf("the last span ends at %v, beyond the axis", last.x1)
	}
	rapid.Check(t, func(t *rapid.T) {
		var spans []Span
		at := 0.0
		for range rapid.IntRange(1, 15).Draw(t, "n") {
			next := at + rapid.Float64Range(0.1, 20).Draw(t, "length")
			spans = append(spans, Span{at, next, rapid.StringMatching(`[a-z]{1,15}`).Draw(t, "label"), "x"})
			at = next
		}
		placed := placeSpans(spans, x, 500, 10, 11)
		for i, a := range placed {
			for _, b := range placed[:i] {
				if a.name.text != "" && b.name.text != "" && a.name.box().overlaps(b.name.box()) {
					t.Fatalf("%q lies on %q", a.name.text, b.name.text)
				}
			}
		}
	})
}

func TestWordsAreKeptIn(t *testing.T) {
	for _, anchor := range []float64{0, 0.5, 1} {
		for _, x := range []float64{-20, 50, 120} {
			w := words{text: "3:30", size: 11, x: x, anchor: anchor}
			if b := w.keptIn(0, 100).box(); b.x0 < -1e-9 || b.x1 > 100+1e-9 {
				t.Errorf("anchor %v at %v: %+v", anchor, x, b)
			}
			if x == 50 && w.keptIn(0, 100) != w {
				t.Errorf("anchor %v: moved without need", anchor)
			}
		}
	}
}

func TestCallout(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		width := rapid.Float64Range(157, 500).Draw(t, "width") // the plate is about 148 wide
		s := &site{area: box{40, 40, 40 + width, 240}, curves: []curve{{{{40, 100}, {300, 200}, {540, 90}}}}}
		at := point{rapid.Float64Range(40, 40+width).Draw(t, "x"), rapid.Float64Range(40, 240).Draw(t, "y")}
		call := s.around(at, words{text: "tightest: 242 N in hand", size: 11, bold: true})
		if !call.plate.within(s.area) {
			t.Fatalf("plate %+v leaves the area", call.plate)
		}
		if pointDistance(call.plate, at) < 5 {
			t.Fatalf("plate %+v covers its point %+v", call.plate, at)
		}
		if !call.words.box().within(call.plate) {
			t.Fatalf("words %+v leave the plate %+v", call.words.box(), call.plate)
		}
	})
}

// A band that runs out of its panel is labelled in the part that shows.
func TestLabelOfACutBand(t *testing.T) {
	x := []float64{0, 1}
	c := Chart{Panels: []Panel{{Y: Axis{Min: 0, Max: 1}, Bands: []Band{{X: x, Lower: []float64{0, 0}, Upper: []float64{40, 40}, Class: "short", Label: "short"}}}}}
	if _, root := render(t, c); !slices.Contains(textsOf(root), "short") {
		t.Errorf("no label among %q", textsOf(root))
	}
}

// The label of a curve stands outside the band that the curve bounds.
func TestCurveLabelsAvoidBands(t *testing.T) {
	level := func(y float64) []point { return []point{{0, y}, {200, y}} }
	for _, above := range []bool{true, false} {
		s := &site{area: box{0, 0, 200, 200}, curves: []curve{{level(100)}}, bands: []bandRun{{level(0), level(100)}}}
		if above {
			s.bands = []bandRun{{level(100), level(200)}}
		}
		w, ok := s.alongCurve(curve{level(100)}, words{text: "available", size: 11}, 0.5)
		if !ok || (w.y < 100) != above {
			t.Errorf("the band above %v: label at %v, %v", above, w.y, ok)
		}
	}
}
