// Package charts draws results as line charts for the page and for print.
//
// A [Chart] holds values already in display units; it knows no physics. [Chart.SVG]
// writes inline SVG whose colours are CSS classes, so that one drawing serves light,
// dark and print under a content policy that forbids style attributes. [Chart.Draw]
// draws the same picture on any other vector canvas. [Chart.Table] is the data behind it.
package charts

import (
	"io"

	"gonum.org/v1/plot/vg"
)

// A Series is one curve. The float64 slices hold display units of any finite range.
type Series struct {
	Name string
	// Label stands on the curve; empty means Name.
	Label string
	Unit  string
	// X and Y are the points in display units; NaN, infinities and magnitudes
	// above 1e30 split the curve.
	X, Y []float64
	// Class is the colour token: available, required, altitude, energy, mass, rate,
	// neutral, alt-1 to alt-4 or ghost. The class none keeps a series out of the drawing:
	// it is only read out and tabulated.
	Class string
	Dash  bool
	// LabelAt is where the direct label wants to sit, without unit, 0 to 1 along the
	// visible x range; a negative value asks for no label.
	LabelAt float64
	// Decimals is the number of digits after the point in the read-out and the table.
	Decimals int
}

// A Band fills the space between two curves wherever Upper is above Lower.
type Band struct {
	// X, Lower and Upper are points in display units of any finite range; NaN splits the band.
	X, Lower, Upper []float64
	// Class is hand (shaded) or short (hatched).
	Class string
	Label string
}

// A Mark is a dotted vertical line whose label stands above the data area.
type Mark struct {
	X     float64 // position in the unit of the x axis, any finite value
	Label string
}

// A Flag is a point worth pointing at.
type Flag struct {
	X, Y  float64 // position in the units of the axes, any finite value
	Label string
	Class string // colour token of the dot, as for [Series]
}

// A Span is a named interval of x with an alternating background, such as a mission leg.
type Span struct {
	From, To float64 // ends in the unit of the x axis, From < To
	Label    string
	Short    string // used when Label does not fit
}

// An Axis describes one axis. Equal limits ask for limits from the data.
type Axis struct {
	Label string
	Unit  string
	Min   float64 // lower limit in display units, any finite value
	Max   float64 // upper limit in display units, >= Min
	// Format is empty for plain numbers or "hm" for hours and minutes of an x in seconds.
	Format string
	Zero   bool // keep 0 within limits that come from the data
}

// An HLine is a horizontal reference line.
type HLine struct {
	Y     float64 // height in the unit of the y axis, any finite value
	Label string
}

// A Panel is one data area; the panels of a chart stand above each other.
type Panel struct {
	Y      Axis
	Height float64 // share of the chart's height without unit, > 0; 0 means 1
	Series []Series
	Bands  []Band
	Flags  []Flag
	Lines  []HLine
	Blank  string // said where there is nothing to draw; empty says "no data"
}

// A Chart is one drawing: panels over one x axis.
type Chart struct {
	ID    string // unique on the page
	Title string
	Desc  string
	X     Axis
	// XFirst names x in the read-out and in the first column of the table,
	// such as "true airspeed"; empty means the label of the x axis.
	XFirst string
	Panels []Panel
	Marks  []Mark
	Spans  []Span
	Width  float64 // in points, > 0; 0 means 560
	Height float64 // in points, > 0; 0 means 300 for one panel and more for several
}

const (
	defaultWidth  = 560.0
	defaultHeight = 300.0
	panelHeight   = 130.0 // each panel after the first, in points
	narrowWidth   = 360.0
	minWidth      = 160.0
	minHeight     = 90.0
)

// SVG writes the chart as an inline svg element: only a viewBox, real text, classes
// instead of styles. The bytes are the same for the same chart. The only
// error is that of w.
func (c Chart) SVG(w io.Writer) error {
	c = c.withDefaults()
	s := newSVGCanvas(c.Width, c.Height)
	f := newFrame(c)
	f.draw(s)
	return s.writeTo(w, svgHead{
		id: c.ID, title: c.Title, desc: c.Desc, textSize: f.size, data: f.readout(),
	})
}

// Draw draws the chart on any vector canvas, from its lower left corner and in points,
// with the light palette. Scale the canvas first to fit another size.
func (c Chart) Draw(dst vg.Canvas) {
	newFrame(c.withDefaults()).draw(dst)
}

// Narrow returns the chart laid out for a small screen: about 360 points wide with
// relatively larger text and fewer ticks. Its ID ends in "-narrow".
func (c Chart) Narrow() Chart {
	c = c.withDefaults()
	c.ID += "-narrow"
	c.Width = narrowWidth
	c.Height = max(0.92*c.Height, 270)
	return c
}

func (c Chart) withDefaults() Chart {
	if c.ID == "" {
		c.ID = "chart"
	}
	if len(c.Panels) == 0 {
		c.Panels = []Panel{{}}
	}
	if !usable(c.Width) || c.Width <= 0 {
		c.Width = defaultWidth
	}
	if !usable(c.Height) || c.Height <= 0 {
		c.Height = defaultHeight + panelHeight*float64(len(c.Panels)-1)
	}
	c.Width, c.Height = max(c.Width, minWidth), max(c.Height, minHeight)
	return c
}
