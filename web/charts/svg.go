package charts

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"image"
	"image/color"
	"io"
	"math"
	"strings"

	xfont "golang.org/x/image/font"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// pen is the drawing state that Push saves.
type pen struct {
	m      affine
	color  color.Color
	width  vg.Length
	dashes []vg.Length
}

// svgCanvas is a vg.Canvas that writes SVG elements with classes in final coordinates.
type svgCanvas struct {
	w, h     float64
	textSize float64
	pens     []pen
	body     bytes.Buffer
}

var (
	_ vg.Canvas   = (*svgCanvas)(nil)
	_ grouper     = (*svgCanvas)(nil)
	_ anchoredPen = (*svgCanvas)(nil)
)

// A grouper is a canvas that can group what is drawn.
type grouper interface {
	begin(class string)
	end()
}

// An anchoredPen can align text by itself, so that the reader's font, whose widths
// this program does not know, stays centred or right-aligned.
type anchoredPen interface {
	anchoredText(f font.Face, x, y, anchor float64, text string)
}

func newSVGCanvas(w, h float64) *svgCanvas {
	s := &svgCanvas{w: w, h: h, textSize: textSize(w)}
	s.pens = []pen{{m: affine{1, 0, 0, -1, 0, h}}} // vg has its origin at the bottom left
	vg.Initialize(s)
	return s
}

func (s *svgCanvas) top() *pen                              { return &s.pens[len(s.pens)-1] }
func (s *svgCanvas) SetLineWidth(w vg.Length)               { s.top().width = w }
func (s *svgCanvas) SetLineDash(d []vg.Length, _ vg.Length) { s.top().dashes = d }
func (s *svgCanvas) SetColor(c color.Color)                 { s.top().color = c }
func (s *svgCanvas) Push()                                  { s.pens = append(s.pens, *s.top()) }
func (s *svgCanvas) Pop()                                   { s.pens = s.pens[:len(s.pens)-1] }
func (s *svgCanvas) transform(n affine)                     { s.top().m = s.top().m.after(n) }
func (s *svgCanvas) Translate(p vg.Point) {
	s.transform(affine{1, 0, 0, 1, float64(p.X), float64(p.Y)})
}
func (s *svgCanvas) Scale(x, y float64) { s.transform(affine{x, 0, 0, y, 0, 0}) }
func (s *svgCanvas) begin(class string) { fmt.Fprintf(&s.body, "<g class=\"%s\">\n", class) }
func (s *svgCanvas) end()               { s.body.WriteString("</g>\n") }

func (s *svgCanvas) Rotate(rad float64) {
	sin, cos := math.Sincos(rad)
	s.transform(affine{cos, sin, -sin, cos, 0, 0})
}

func (s *svgCanvas) Stroke(p vg.Path) {
	t := s.top()
	if t.width <= 0 || len(p) == 0 {
		return
	}
	fmt.Fprintf(&s.body, `<path%s fill="none" stroke-width="%s"`, s.paint("stroke"), coord(float64(t.width)))
	if len(t.dashes) > 0 {
		parts := make([]string, len(t.dashes))
		for i, d := range t.dashes {
			parts[i] = coord(float64(d))
		}
		fmt.Fprintf(&s.body, ` stroke-dasharray="%s"`, strings.Join(parts, " "))
	}
	s.pathData(p)
}

func (s *svgCanvas) Fill(p vg.Path) {
	if len(p) == 0 {
		return
	}
	fmt.Fprintf(&s.body, `<path%s`, s.paint("fill"))
	s.pathData(p)
}

func (s *svgCanvas) pathData(p vg.Path) {
	w := pathWriter{m: s.top().m}
	w.path(p)
	fmt.Fprintf(&s.body, " d=\"%s\"/>\n", w.out)
}

// paint returns the class attribute of the current colour and, for a drawing that is
// read without its style sheet, the same colour as a presentation attribute.
func (s *svgCanvas) paint(kind string) string {
	attr := kind
	if kind == "text" {
		attr = "fill"
	}
	class := kind
	if t, ok := s.top().color.(token); ok {
		class += " " + t.class
	}
	n := color.NRGBAModel.Convert(s.top().color).(color.NRGBA)
	return fmt.Sprintf(` class="%s" %s="#%02x%02x%02x"`, class, attr, n.R, n.G, n.B)
}

func (s *svgCanvas) FillString(f font.Face, pt vg.Point, text string) {
	s.anchoredText(f, float64(pt.X), float64(pt.Y), 0, text)
}

func (s *svgCanvas) anchoredText(f font.Face, x, y, anchor float64, text string) {
	if f.Font.Size == 0 || text == "" {
		return
	}
	m := s.top().m
	px, py := m.apply(x, y)
	fmt.Fprintf(&s.body, `<text%s x="%s" y="%s"`, s.paint("text"), coord(px), coord(py))
	if size := float64(f.Font.Size); size != s.textSize {
		fmt.Fprintf(&s.body, ` font-size="%s"`, coord(size))
	}
	if f.Font.Weight >= xfont.WeightSemiBold {
		s.body.WriteString(` font-weight="600"`)
	}
	switch anchor {
	case 0.5:
		s.body.WriteString(` text-anchor="middle"`)
	case 1:
		s.body.WriteString(` text-anchor="end"`)
	}
	// The y axis of vg points up, so a turn is seen the other way round.
	if turn := math.Atan2(m.b, m.a) * 180 / math.Pi; math.Abs(turn) > 1e-6 {
		fmt.Fprintf(&s.body, ` transform="rotate(%s %s %s)"`, coord(turn), coord(px), coord(py))
	}
	fmt.Fprintf(&s.body, ">%s</text>\n", escaped(text))
}

// DrawImage does nothing: charts hold no images.
func (s *svgCanvas) DrawImage(vg.Rectangle, image.Image) {}

// svgHead is what the root element says about the drawing.
type svgHead struct {
	id, title, desc string
	textSize        float64 // in points, > 0
	data            string  // JSON for the script, empty for none
}

func (s *svgCanvas) writeTo(w io.Writer, h svgHead) error {
	id := safeID(h.id)
	var b bytes.Buffer
	fmt.Fprintf(&b, `<svg xmlns="http://www.w3.org/2000/svg" class="chart" id="%s" viewBox="0 0 %s %s" role="img" aria-labelledby="%s-title %s-desc"`,
		id, coord(s.w), coord(s.h), id, id)
	fmt.Fprintf(&b, ` font-family="sans-serif" font-size="%s"`, coord(h.textSize))
	if h.data != "" {
		fmt.Fprintf(&b, ` tabindex="0" data-plot="%s"`, escaped(h.data))
	}
	fmt.Fprintf(&b, ">\n<title id=\"%s-title\">%s</title>\n<desc id=\"%s-desc\">%s</desc>\n",
		id, escaped(h.title), id, escaped(h.desc))
	b.Write(s.body.Bytes())
	b.WriteString("</svg>\n")
	_, err := w.Write(b.Bytes())
	return err
}

// escaped makes text safe in element content and in a quoted attribute; characters
// that XML cannot hold become U+FFFD.
func escaped(text string) string {
	var b strings.Builder
	_ = xml.EscapeText(&b, []byte(text)) // a strings.Builder cannot fail
	return b.String()
}

// safeID keeps letters, digits, hyphen and underscore, so that an ID can stand in a
// list of IDs and in a selector.
func safeID(id string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r >= 'a' && r <= 'z', r >= 'A' && r <= 'Z', r >= '0' && r <= '9', r == '-', r == '_':
			return r
		}
		return '-'
	}, id)
}
