package charts

import (
	"bytes"
	"encoding/xml"
	"errors"
	"fmt"
	"io"
	"math"
	"os"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/recorder"
	"pgregory.net/rapid"
)

// element is a parsed SVG element.
type element struct {
	XMLName  xml.Name
	Attrs    []xml.Attr `xml:",any,attr"`
	Children []element  `xml:",any"`
	Text     string     `xml:",chardata"`
}

func (e element) attr(name string) string {
	for _, a := range e.Attrs {
		if a.Name.Local == name {
			return a.Value
		}
	}
	return ""
}

func (e element) walk(visit func(element)) {
	visit(e)
	for _, c := range e.Children {
		c.walk(visit)
	}
}

func render(t interface{ Fatalf(string, ...any) }, c Chart) (string, element) {
	var b bytes.Buffer
	if err := c.SVG(&b); err != nil {
		t.Fatalf("SVG: %v", err)
	}
	var root element
	if err := xml.Unmarshal(b.Bytes(), &root); err != nil {
		t.Fatalf("not XML: %v\n%s", err, b.String())
	}
	return b.String(), root
}

func bothForms() []Chart {
	var all []Chart
	for _, c := range append(sampleCharts(), studyCharts()...) {
		all = append(all, c, c.Narrow())
	}
	return all
}

func TestSVGStructure(t *testing.T) {
	for _, c := range bothForms() {
		t.Run(c.ID, func(t *testing.T) {
			text, root := render(t, c)
			if root.XMLName.Local != "svg" || root.attr("viewBox") == "" || root.attr("role") != "img" {
				t.Errorf("root lacks viewBox or role: %v", root.Attrs)
			}
			if root.attr("width") != "" || root.attr("height") != "" {
				t.Error("root has a fixed size")
			}
			if strings.Contains(text, "style=") {
				t.Error("a style attribute, which the content policy blocks")
			}
			ids := map[string]string{}
			root.walk(func(e element) {
				if id := e.attr("id"); id != "" {
					if _, twice := ids[id]; twice {
						t.Errorf("id %q twice", id)
					}
					ids[id] = strings.TrimSpace(e.Text)
				}
			})
			if ids[c.ID+"-title"] != c.Title || ids[c.ID+"-desc"] != c.Desc {
				t.Errorf("title or description missing: %v", ids)
			}
			if got, want := root.attr("aria-labelledby"), c.ID+"-title "+c.ID+"-desc"; got != want {
				t.Errorf("aria-labelledby = %q, want %q", got, want)
			}
			if strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
				t.Error("a number that is none")
			}
		})
	}
}

// A class without a rule would be drawn in the fallback colour in every theme.
func TestClassesHaveRules(t *testing.T) {
	css, err := os.ReadFile("../static/charts.css")
	if err != nil {
		t.Fatal(err)
	}
	structural := map[string]bool{"spans": true, "bands": true, "axes": true, "marks": true, "curves": true, "labels": true}
	seen := map[string]bool{}
	for name := range lightPalette {
		seen["c-"+name] = true
	}
	for _, c := range bothForms() {
		_, root := render(t, c)
		root.walk(func(e element) {
			for _, class := range strings.Fields(e.attr("class")) {
				seen[class] = true
			}
		})
	}
	for class := range seen {
		rule := regexp.MustCompile(`\.` + regexp.QuoteMeta(class) + `[\s,.:{\[]`)
		if !structural[class] && !rule.Match(css) {
			t.Errorf("charts.css has no rule for .%s", class)
		}
	}
}

// textBoxes estimates the boxes of all texts, with the y axis down.
func textBoxes(root element) (boxes []box, texts []string) {
	rootSize, _ := strconv.ParseFloat(root.attr("font-size"), 64)
	root.walk(func(e element) {
		if e.XMLName.Local != "text" {
			return
		}
		size := rootSize
		if s, err := strconv.ParseFloat(e.attr("font-size"), 64); err == nil {
			size = s
		}
		x, _ := strconv.ParseFloat(e.attr("x"), 64)
		y, _ := strconv.ParseFloat(e.attr("y"), 64)
		n := textWidth(e.Text, size, e.attr("font-weight") != "")
		x -= n * map[string]float64{"": 0, "middle": 0.5, "end": 1}[e.attr("text-anchor")]
		boxes = append(boxes, box{x, y - 0.72*size, x + n, y + 0.1*size})
		texts = append(texts, e.Text)
	})
	return boxes, texts
}

func TestTextNeitherOverlapsNorLeaves(t *testing.T) {
	for _, c := range bothForms() {
		_, root := render(t, c)
		full := c.withDefaults()
		canvas := box{-0.5, -0.5, full.Width + 0.5, full.Height + 0.5}
		boxes, texts := textBoxes(root)
		if len(boxes) < 3 && c.ID != "empty" && c.ID != "empty-narrow" {
			t.Errorf("%s: only %d texts", c.ID, len(boxes))
		}
		for i, b := range boxes {
			if !b.within(canvas) {
				t.Errorf("%s: %q leaves the drawing: %+v", c.ID, texts[i], b)
			}
			for j := range i {
				if b.overlaps(boxes[j]) {
					t.Errorf("%s: %q lies on %q", c.ID, texts[i], texts[j])
				}
			}
		}
	}
}

func TestDrawsWhatItIsGiven(t *testing.T) {
	_, root := render(t, thrustChart())
	have := map[string]int{}
	root.walk(func(e element) {
		have[e.attr("class")]++
		if e.XMLName.Local == "text" {
			have["text:"+e.Text]++
		}
	})
	for _, want := range []string{
		"stroke c-available curve", "stroke c-required curve", "fill c-hand", "stroke c-short",
		"text:thrust, N", "text:true airspeed, m/s", "text:thrust available", "text:thrust required",
		"text:in hand", "text:short", "text:stall 26.6", "text:level max 60.1", "text:1" + thinSpace + "000",
	} {
		if have[want] == 0 {
			t.Errorf("%q is missing", want)
		}
	}
	if have["stroke c-ink-2 curve"] != 0 {
		t.Error("a series of class none is drawn")
	}
	if _, root := render(t, emptyChart()); !strings.Contains(fmt.Sprint(textsOf(root)), "no data") {
		t.Error("an empty chart does not say so")
	}
}

func textsOf(root element) []string { _, t := textBoxes(root); return t }

func TestNarrow(t *testing.T) {
	c := thrustChart()
	_, wide := render(t, c)
	_, narrow := render(t, c.Narrow())
	if narrow.attr("id") != "thrust-narrow" || !strings.HasPrefix(narrow.attr("viewBox"), "0 0 360 ") {
		t.Errorf("id %q, viewBox %q", narrow.attr("id"), narrow.attr("viewBox"))
	}
	if len(textsOf(narrow)) >= len(textsOf(wide)) {
		t.Errorf("narrow has %d texts, wide %d", len(textsOf(narrow)), len(textsOf(wide)))
	}
	if narrow.attr("font-size") <= wide.attr("font-size") {
		t.Error("the narrow form's text is not larger")
	}
}

func TestSameBytes(t *testing.T) {
	for _, c := range bothForms() {
		first, _ := render(t, c)
		for range 5 {
			if again, _ := render(t, c); again != first {
				t.Fatalf("%s: bytes differ", c.ID)
			}
		}
	}
}

func TestTextIsEscaped(t *testing.T) {
	c := thrustChart()
	nasty := `a<b>&"c'` + "\x00\xff"
	c.ID, c.Title, c.Desc, c.X.Label = `x" onload="y z`, nasty, nasty, nasty
	c.Panels[0].Series[0].Name, c.Marks[0].Label = nasty, nasty
	_, root := render(t, c)
	want := "a<b>&\"c'\uFFFD\uFFFD"
	if got := root.Children[0].Text; got != want {
		t.Errorf("title = %q, want %q", got, want)
	}
	if root.attr("onload") != "" || root.attr("id") != "x--onload--y-z" {
		t.Errorf("id = %q", root.attr("id"))
	}
}

type brokenWriter struct{}

func (brokenWriter) Write([]byte) (int, error) { return 0, io.ErrClosedPipe }

func TestWriteErrorIsReturned(t *testing.T) {
	if err := thrustChart().SVG(brokenWriter{}); !errors.Is(err, io.ErrClosedPipe) {
		t.Errorf("err = %v", err)
	}
}

// Other canvases get plain colours and text whose start is computed.
func TestDrawOnAnotherCanvas(t *testing.T) {
	var rec recorder.Canvas
	thrustChart().Draw(&rec)
	strings, strokes := 0, 0
	for _, a := range rec.Actions {
		switch a := a.(type) {
		case *recorder.FillString:
			strings++
			if a.String == "true airspeed, m/s" {
				want := 560 - rightSpace - textWidth(a.String, 11, false)
				if math.Abs(float64(a.Point.X)-want) > 0.01 {
					t.Errorf("axis heading starts at %v, want %v", a.Point.X, want)
				}
			}
		case *recorder.Stroke:
			strokes++
		}
	}
	if strings < 20 || strokes < 10 {
		t.Errorf("%d texts and %d strokes", strings, strokes)
	}
}

func TestCanvasTransforms(t *testing.T) {
	s := newSVGCanvas(200, 100)
	s.Push()
	s.Translate(vg.Point{X: 50, Y: 20})
	s.Rotate(math.Pi / 2)
	s.Scale(2, 1)
	var p vg.Path
	p.Move(vg.Point{X: 0, Y: 0})
	p.Line(vg.Point{X: 10, Y: 0})
	s.Stroke(p)
	s.FillString(face(11, true), vg.Point{}, "up")
	s.Pop()
	var dot vg.Path
	dot.Arc(vg.Point{X: 10, Y: 10}, 5, 0, 2*math.Pi)
	s.Fill(dot)
	got := s.body.String()
	for _, want := range []string{`d="M50 80L50 60"`, `rotate(-90 50 80)`, `font-weight="600"`, `M15 90C15 87.24 12.76 85 10 85C`} {
		if !strings.Contains(got, want) {
			t.Errorf("%s is missing in\n%s", want, got)
		}
	}
}

func anyFloat() *rapid.Generator[float64] {
	return rapid.OneOf(rapid.Float64Range(-100, 5000), rapid.Float64(),
		rapid.SampledFrom([]float64{math.NaN(), math.Inf(1), math.Inf(-1), 0, 1e30, -1e30, 1e308, 5e-324}))
}

func anyChart(t *rapid.T) Chart {
	text := rapid.OneOf(rapid.String(), rapid.SampledFrom([]string{"", "stall 26.6", "a rather long label that cannot fit"}))
	floats := rapid.SliceOfN(anyFloat(), 0, 12)
	class := rapid.SampledFrom([]string{"available", "alt-4", "ghost", "none", "short", "hand", "", "unknown"})
	axis := func(name string) Axis {
		return Axis{
			Label: text.Draw(t, name), Unit: text.Draw(t, name+" unit"), Min: anyFloat().Draw(t, name+" min"),
			Max: anyFloat().Draw(t, name+" max"), Format: rapid.SampledFrom([]string{"", "hm"}).Draw(t, "format"), Zero: rapid.Bool().Draw(t, "zero"),
		}
	}
	c := Chart{ID: text.Draw(t, "id"), Title: text.Draw(t, "title"), X: axis("x"),
		Width: anyFloat().Draw(t, "width"), Height: anyFloat().Draw(t, "height")}
	c.Width, c.Height = math.Min(c.Width, 3000), math.Min(c.Height, 3000)
	for range rapid.IntRange(0, 3).Draw(t, "panels") {
		p := Panel{Y: axis("y"), Height: anyFloat().Draw(t, "share")}
		for range rapid.IntRange(0, 3).Draw(t, "series") {
			p.Series = append(p.Series, Series{Name: text.Draw(t, "name"), X: floats.Draw(t, "xs"), Y: floats.Draw(t, "ys"),
				Class: class.Draw(t, "class"), Dash: rapid.Bool().Draw(t, "dash"), LabelAt: anyFloat().Draw(t, "at"), Decimals: rapid.IntRange(-3, 400).Draw(t, "decimals")})
		}
		p.Bands = append(p.Bands, Band{X: floats.Draw(t, "bx"), Lower: floats.Draw(t, "bl"), Upper: floats.Draw(t, "bu"), Class: class.Draw(t, "bc"), Label: text.Draw(t, "b")})
		p.Flags = append(p.Flags, Flag{X: anyFloat().Draw(t, "fx"), Y: anyFloat().Draw(t, "fy"), Label: text.Draw(t, "f"), Class: class.Draw(t, "fc")})
		p.Lines = append(p.Lines, HLine{Y: anyFloat().Draw(t, "ly"), Label: text.Draw(t, "l")})
		c.Panels = append(c.Panels, p)
	}
	for range rapid.IntRange(0, 4).Draw(t, "marks") {
		c.Marks = append(c.Marks, Mark{anyFloat().Draw(t, "m"), text.Draw(t, "ml")})
		c.Spans = append(c.Spans, Span{anyFloat().Draw(t, "s0"), anyFloat().Draw(t, "s1"), text.Draw(t, "sl"), text.Draw(t, "ss")})
	}
	return c
}

func TestAnyDataDraws(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := anyChart(t)
		for _, form := range []Chart{c, c.Narrow()} {
			_, root := render(t, form)
			root.walk(func(e element) {
				for _, name := range []string{"d", "x", "y", "viewBox"} {
					if v := e.attr(name); strings.Contains(v, "N") || strings.Contains(v, "I") {
						t.Fatalf("%s = %q", name, v)
					}
				}
			})
			form.Table()
		}
	})
}

func BenchmarkThreePanels(b *testing.B) {
	c := missionChart()
	for b.Loop() {
		if err := c.SVG(io.Discard); err != nil {
			b.Fatal(err)
		}
	}
}
