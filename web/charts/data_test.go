package charts

import (
	"encoding/json"
	"math"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

var nan = math.NaN()

func TestCurve(t *testing.T) {
	c := newCurve([]float64{0, 1, 2, 2, 3, nan, 5, 6, 7}, []float64{0, 10, 20, 50, 60, 1, 5, math.Inf(1), 7, 99})
	if len(c) != 3 {
		t.Fatalf("%d runs, want 3", len(c))
	}
	cases := []struct {
		x, y float64
		ok   bool
	}{
		{0, 0, true}, {0.5, 5, true}, {1, 10, true}, {2, 50, true}, {2.5, 55, true}, {3, 60, true},
		{4, 0, false}, {5, 5, true}, {6, 0, false}, {7, 7, true}, {-1, 0, false}, {8, 0, false},
	}
	for _, k := range cases {
		if y, ok := c.at(k.x); y != k.y || ok != k.ok {
			t.Errorf("at(%v) = %v, %v; want %v, %v", k.x, y, ok, k.y, k.ok)
		}
	}
	if y, ok := newCurve([]float64{0, 1, 1}, []float64{0, 5, 9}).at(1); !ok || y != 9 {
		t.Errorf("a step at the end: at(1) = %v, %v; want the later value", y, ok)
	}
	falling := newCurve([]float64{4, 2, 0}, []float64{0, 1, 2})
	if y, ok := falling.at(3); !ok || y != 0.5 {
		t.Errorf("falling x: at(3) = %v, %v", y, ok)
	}
	if e := c.yWithin(0.5, 2); e.lo != 5 || e.hi != 50 {
		t.Errorf("yWithin = %+v", e)
	}
}

func TestHiddenLength(t *testing.T) {
	b := box{0, 0, 10, 4}
	cases := []struct {
		run  []point
		want float64
	}{
		{[]point{{-5, 2}, {15, 2}}, 10},
		{[]point{{3, -5}, {3, 9}}, 4},
		{[]point{{1, 1}, {4, 1}, {4, 3}}, 5},
		{[]point{{0, 5}, {10, 5}}, 0},
		{[]point{{-2, -2}, {20, 20}}, 4 * math.Sqrt2},
		{[]point{{-3, 2}, {-1, 2}}, 0},
		{[]point{{5, 2}}, 0},
	}
	for _, c := range cases {
		if got := (curve{c.run}).hiddenBy(b); math.Abs(got-c.want) > 1e-9 {
			t.Errorf("%v: %v, want %v", c.run, got, c.want)
		}
	}
}

func TestBandEndsAtTheCrossing(t *testing.T) {
	b := Band{X: []float64{0, 1, 2, 3, 4}, Lower: []float64{0, 0, 4, nan, 0}, Upper: []float64{2, 2, 2, 2, 2}}
	runs := bandRuns(b)
	if len(runs) != 1 {
		t.Fatalf("%d runs, want 1: %+v", len(runs), runs)
	}
	last := runs[0].upper[len(runs[0].upper)-1]
	if last != (point{1.5, 2}) || runs[0].lower[2] != last {
		t.Errorf("ends at %+v and %+v, want 1.5, 2", last, runs[0].lower[2])
	}
	b.Lower, b.Upper = b.Upper, b.Lower
	if runs := bandRuns(b); len(runs) != 1 || runs[0].lower[0] != (point{1.5, 2}) {
		t.Errorf("the reversed band begins elsewhere: %+v", runs)
	}
}

// The total length of the strokes times their distance is the area of the outline.
func TestHatchFillsTheOutline(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		w, h := rapid.Float64Range(20, 300).Draw(t, "w"), rapid.Float64Range(20, 300).Draw(t, "h")
		x, y := rapid.Float64Range(-50, 50).Draw(t, "x"), rapid.Float64Range(-50, 50).Draw(t, "y")
		length := 0.0
		for _, s := range hatch([]point{{x, y}, {x + w, y}, {x + w, y + h}, {x, y + h}}, 0.5) {
			length += math.Hypot(s[1].x-s[0].x, s[1].y-s[0].y)
			for _, p := range s {
				if pointDistance(box{x, y, x + w, y + h}, p) > 1e-6 {
					t.Fatalf("a stroke leaves the outline at %+v", p)
				}
			}
		}
		// 2 %: the sum is a midpoint-like rule over strokes 0.35 apart on pieces of at least 20.
		if area := length * 0.5 / math.Sqrt2; math.Abs(area-w*h) > 0.02*w*h {
			t.Fatalf("strokes stand for %v, area is %v", area, w*h)
		}
	})
}

func TestNumbers(t *testing.T) {
	cases := []struct {
		v           float64
		d           int
		plain, read string
	}{
		{0, 0, "0", "0"}, {-0.04, 1, "0.0", "0.0"}, {-1234.56, 1, "-1234.6", "\u22121\u2009234.6"},
		{999.6, 0, "1000", "1\u2009000"}, {1234567, 0, "1234567", "1\u2009234\u2009567"},
		{2.5e12, 0, "2.5e12", "2.5e12"}, {12, -3, "12", "12"}, {-100, 0, "-100", "\u2212100"},
	}
	for _, c := range cases {
		if got := plainNumber(c.v, c.d); got != c.plain {
			t.Errorf("plainNumber(%v, %d) = %q, want %q", c.v, c.d, got, c.plain)
		}
		if got := readNumber(c.v, c.d); got != c.read {
			t.Errorf("readNumber(%v, %d) = %q, want %q", c.v, c.d, got, c.read)
		}
	}
	for s, want := range map[float64]string{0: "0:00", 3599: "1:00", 5400: "1:30", -61: "\u22120:01", -10: "0:00", 360000: "100:00"} {
		if got := clock(s); got != want {
			t.Errorf("clock(%v) = %q, want %q", s, got, want)
		}
	}
}

func TestTable(t *testing.T) {
	tab := thrustChart().Table()
	if want := []string{"true airspeed, m/s", "thrust available, N", "thrust required, N", "in hand, N"}; !slices.Equal(tab.Header, want) {
		t.Errorf("header %q", tab.Header)
	}
	if n := len(tab.Rows); n < 15 || n > maxRows {
		t.Errorf("%d rows", n)
	}
	if got, want := tab.Rows[0], []string{"20", "1322", "–", "–"}; !slices.Equal(got, want) {
		t.Errorf("first row %q, want %q", got, want)
	}
	if got, want := tab.Rows[10], []string{"40", "1052", "505", "547"}; !slices.Equal(got, want) {
		t.Errorf("row 10 %q, want %q", got, want)
	}
	if last := tab.Rows[len(tab.Rows)-1][0]; last != "70" {
		t.Errorf("last x %q", last)
	}

	few := Chart{Panels: []Panel{{Series: []Series{{Name: "a", X: []float64{0, 0.25, 10}, Y: []float64{-1, 0, 1}, Decimals: 1}, {Name: "b", X: []float64{0.25, 10}, Y: []float64{5, 6}}}}}}
	if got, want := few.Table().Rows, [][]string{{"0.00", "-1.0", "–"}, {"0.25", "0.0", "5"}, {"10.00", "1.0", "6"}}; !slices.EqualFunc(got, want, slices.Equal) {
		t.Errorf("few points: %q", got)
	}
	mission := missionChart().Table()
	if mission.Header[0] != "time, h:min" || mission.Rows[1][0] != "0:10" || len(mission.Rows) > maxRows {
		t.Errorf("mission: %q %q, %d rows", mission.Header[0], mission.Rows[1][0], len(mission.Rows))
	}
	if n := len(emptyChart().Table().Rows); n != 0 {
		t.Errorf("empty chart has %d rows", n)
	}
}

func TestReadout(t *testing.T) {
	_, root := render(t, missionChart())
	var got struct {
		X struct {
			A, B, P, Q float64
			F          string
		}
		K []struct{ A, B, P, Q float64 }
		V [][]*float64
		S []struct {
			N, U, C string
			K, V, D int
			Y       []*float64
		}
		W []struct {
			A, B float64
			N    string
		}
	}
	if err := json.Unmarshal([]byte(root.attr("data-plot")), &got); err != nil {
		t.Fatal(err)
	}
	if len(got.K) != 3 || len(got.S) != 4 || len(got.W) != 9 || len(got.V) != 1 {
		t.Fatalf("%d panels, %d series, %d spans, %d distinct x", len(got.K), len(got.S), len(got.W), len(got.V))
	}
	if s := got.S[1]; s.N != "available" || s.U != "N" || s.C != "c-available" || s.K != 1 || *s.Y[0] != 1220 {
		t.Errorf("series 1: %+v", s)
	}
	if got.X.F != "hm" || got.X.B != 13860 || got.X.P >= got.X.Q || got.K[0].P <= got.K[0].Q {
		t.Errorf("axes %+v %+v", got.X, got.K[0])
	}
	if root.attr("tabindex") != "0" {
		t.Error("not focusable")
	}

	_, root = render(t, thrustChart())
	if err := json.Unmarshal([]byte(root.attr("data-plot")), &got); err != nil {
		t.Fatal(err)
	}
	if n := len(got.V); n != 2 { // the gap shortens the x of two series alike
		t.Errorf("%d distinct x, want 2", n)
	}
	if _, root := render(t, emptyChart()); root.attr("data-plot") != "" || root.attr("tabindex") != "" {
		t.Error("an empty chart can be focused")
	}
}

// A gap stays a gap in what the script reads.
func TestReadoutKeepsGaps(t *testing.T) {
	xs, ys := sigs(newCurve([]float64{1, 2, 3, 4}, []float64{1, nan, 3, 4}))
	b, err := json.Marshal([][]sig{xs, ys})
	if err != nil || string(b) != "[[1,3,3,4],[1,null,3,4]]" {
		t.Errorf("%s, %v", b, err)
	}
	if b, _ := json.Marshal(sig(123456.7)); strings.TrimSpace(string(b)) != "1.2346e+05" {
		t.Errorf("%s", b)
	}
}
