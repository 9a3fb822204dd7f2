package charts

import (
	"strings"

	xfont "golang.org/x/image/font"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// A box is a rectangle in points with the y axis up.
type box struct{ x0, y0, x1, y1 float64 }

func (b box) overlaps(o box) bool {
	return b.x0 < o.x1 && o.x0 < b.x1 && b.y0 < o.y1 && o.y0 < b.y1
}

func (b box) grown(d float64) box { return box{b.x0 - d, b.y0 - d, b.x1 + d, b.y1 + d} }

func (b box) within(o box) bool {
	return b.x0 >= o.x0 && b.y0 >= o.y0 && b.x1 <= o.x1 && b.y1 <= o.y1
}

// words is one line of text.
type words struct {
	text   string
	x, y   float64 // anchor point on the baseline in points
	anchor float64 // 0 starts at x, 0.5 is centred on it, 1 ends there
	size   float64 // in points, > 0
	bold   bool
	class  string
	extra  string  // further CSS classes, such as a halo
	wide   float64 // the width in points once measured, else 0
}

// Shares of the text size that a line takes above and below its baseline.
const (
	ascent  = 0.76
	descent = 0.24
	middle  = 0.34 // from the baseline to the middle of a figure
)

func (w words) width() float64 {
	if w.wide > 0 {
		return w.wide
	}
	return textWidth(w.text, w.size, w.bold)
}

// measured keeps the width for those who try many places for the same words.
func (w words) measured() words {
	w.wide = w.width()
	return w
}

func (w words) box() box {
	n := w.width()
	return box{w.x - w.anchor*n, w.y - descent*w.size, w.x + (1-w.anchor)*n, w.y + ascent*w.size}
}

// keptIn shifts the words sideways so that they stand between x0 and x1.
func (w words) keptIn(x0, x1 float64) words {
	b := w.box()
	switch {
	case b.x1 > x1:
		w.x -= b.x1 - x1
	case b.x0 < x0:
		w.x += x0 - b.x0
	}
	return w
}

func (w words) draw(c vg.Canvas) {
	if w.text == "" {
		return
	}
	c.SetColor(paintToken(w.class, w.extra))
	f := face(w.size, w.bold)
	if a, ok := c.(anchoredPen); ok {
		a.anchoredText(f, w.x, w.y, w.anchor, w.text)
		return
	}
	if strings.HasPrefix(w.extra, "halo") { // a style sheet outlines the words; here a plate is drawn under them
		plate := "panel"
		if w.extra == "halo-hand" {
			plate = "hand"
		}
		fillBox(c, w.box(), paintToken(plate, ""))
		c.SetColor(paintToken(w.class, ""))
	}
	c.FillString(f, vg.Point{X: vg.Length(w.x - w.anchor*w.width()), Y: vg.Length(w.y)}, w.text)
}

// textSize is the size of tick labels in points for a chart of a width in points: a
// narrow chart is shown about as wide as its viewBox, a wide one larger.
func textSize(width float64) float64 {
	if width < 420 {
		return 12
	}
	return 11
}

// face returns the face that measures text. Liberation Sans is wider than the
// page's font, so that what is found to fit here fits there. Package plot, which this
// package draws with, puts it into the cache.
func face(size float64, bold bool) font.Face {
	f := font.Font{Typeface: "Liberation", Variant: "Sans"}
	if bold {
		f.Weight = xfont.WeightBold
	}
	return font.DefaultCache.Lookup(f, vg.Length(size))
}

func textWidth(text string, size float64, bold bool) float64 {
	f := face(size, bold)
	return float64(f.Width(text))
}

// shortened cuts text to a width in points with an ellipsis.
func shortened(text string, width, size float64, bold bool) string {
	if textWidth(text, size, bold) <= width {
		return text
	}
	r := []rune(text)
	for n := len(r) - 1; n > 0; n-- {
		if t := strings.TrimRight(string(r[:n]), " ,.") + "…"; textWidth(t, size, bold) <= width {
			return t
		}
	}
	return ""
}

// wrapped breaks text between words into lines of at most a width in points.
func wrapped(text string, width, size float64) []string {
	var lines []string
	for _, word := range strings.Split(text, " ") {
		if n := len(lines); n > 0 && textWidth(lines[n-1]+" "+word, size, false) <= width {
			lines[n-1] += " " + word
			continue
		}
		lines = append(lines, word)
	}
	return lines
}

// heading joins an axis label and its unit.
func heading(label, unit string) string {
	switch {
	case unit == "":
		return label
	case label == "":
		return unit
	}
	return label + ", " + unit
}
