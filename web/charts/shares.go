package charts

import (
	"io"
	"math"

	"gonum.org/v1/plot/vg"
)

// A Shares is one or two wholes cut into the same parts, such as the time and fuel of
// a mission cut into its legs. Each part has a row; its bars begin where those of the
// part before ended, so that the rows together are the bar of the whole, drawn above them.
type Shares struct {
	ID      string // unique on the page
	Title   string
	Desc    string
	Columns []Whole
	Parts   []Part
	Note    string  // explains the fillings
	Blank   string  // said where there is nothing to draw
	Width   float64 // in points, > 0; 0 means 860
}

// A Whole is what a column of bars adds up to.
type Whole struct {
	Name     string
	Unit     string
	Label    string // of the whole, with its unit
	Class    string // colour token, as for [Series]
	Decimals int    // digits after the point in the table
}

// A Part is one row.
type Part struct {
	Name   string
	Fill   string    // solid, hatched or open
	Values []float64 // one for each column in its display unit, >= 0
	Labels []string  // one for each column, with unit and percent; empty where the part has nothing of it
}

// Narrow returns the drawing laid out for a small screen.
func (s Shares) Narrow() Shares {
	s.ID += "-narrow"
	s.Width = narrowWidth
	return s
}

// SVG writes the drawing as an inline svg element, as [Chart.SVG] does.
func (s Shares) SVG(w io.Writer) error {
	f := newCascade(s)
	c := newSVGCanvas(f.width, f.height)
	f.draw(c)
	return c.writeTo(w, svgHead{id: s.ID, title: s.Title, desc: s.Desc, textSize: f.size})
}

// Table is every part with its value and its share of the whole.
func (s Shares) Table() Table {
	t := Table{Caption: s.Title, Header: []string{"part"}}
	totals := s.totals()
	for _, c := range s.Columns {
		t.Header = append(t.Header, heading(c.Name, c.Unit), heading("share of "+c.Name, "%"))
	}
	for _, p := range s.Parts {
		row := []string{p.Name}
		for i, v := range p.Values {
			if p.Labels[i] == "" {
				row = append(row, noValue, noValue)
				continue
			}
			row = append(row, plainNumber(v, s.Columns[i].Decimals), plainNumber(100*v/totals[i], 1))
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

func (s Shares) totals() []float64 {
	sums := make([]float64, len(s.Columns))
	for _, p := range s.Parts {
		for i, v := range p.Values {
			sums[i] += v
		}
	}
	return sums
}

// Sizes of the drawing in points.
const (
	sharesWidth = 860.0
	mostName    = 190.0 // the most that names take beside the bars
	columnGap   = 26.0
	bar         = 13.0
	wholeBar    = 15.0
	barPad      = 5.0 // between a bar and its label
)

// A cascade is a Shares with everything placed, in points with the y axis up.
type cascade struct {
	Shares
	width, height float64
	size, pitch   float64 // of text and of its rows
	left          []float64
	span          float64 // of a column
	names         float64 // width of the names beside the bars; 0 where they stand above them
	row           float64 // height of a part's row
	top           float64 // of the first row
	note          []string
	totals        []float64
}

func newCascade(s Shares) *cascade {
	f := &cascade{Shares: s, width: s.Width, totals: s.totals()}
	if !usable(f.width) || f.width <= 0 {
		f.width = sharesWidth
	}
	f.size = textSize(f.width)
	f.pitch = math.Round(f.size * 1.3)
	narrow := f.width < 500
	if !narrow {
		for _, p := range f.Parts {
			f.names = max(f.names, textWidth(p.Name, f.size, false))
		}
		f.names = min(f.names, mostName) + 12
	}
	n := float64(max(len(f.Columns), 1))
	gap := columnGap
	f.row = max(bar, f.pitch) + 6
	if narrow {
		gap, f.row = 14, 2*f.pitch+bar+9
	}
	f.span = (f.width - 2*edge - f.names - gap*(n-1)) / n
	for i := range f.Columns {
		f.left = append(f.left, edge+f.names+float64(i)*(f.span+gap))
	}
	f.note = wrapped(f.Note, f.width-2*edge, f.size)
	head := edge + f.pitch + 4 + wholeBar + 8
	rows := f.row * float64(len(f.Parts))
	if f.Blank != "" {
		f.Parts, rows = nil, 3*f.pitch
	}
	f.height = math.Ceil(head + rows + 4 + f.pitch*float64(len(f.note)) + edge)
	f.top = f.height - head
	return f
}

func (f *cascade) draw(c vg.Canvas) {
	if f.Blank != "" {
		lines := wrapped(f.Blank, f.width-6*f.size, f.size+1)
		for i, line := range lines {
			words{text: line, x: f.width / 2, y: f.top - f.pitch*float64(i+1), anchor: 0.5, size: f.size + 1, class: "ink-2"}.draw(c)
		}
		return
	}
	group(c, "spans", func() { f.drawRows(c) })
	group(c, "curves", func() { f.drawBars(c) })
	group(c, "labels", func() { f.drawWords(c) })
	c.SetLineDash(nil, 0)
}

// base is the y of the top of a part's row.
func (f *cascade) base(row int) float64 { return f.top - f.row*float64(row) }

// barTop is the top of the bars of a row.
func (f *cascade) barTop(row int) float64 {
	if f.names == 0 {
		return f.base(row) - f.pitch - 2
	}
	return f.base(row) - (f.row-bar)/2
}

func (f *cascade) drawRows(c vg.Canvas) {
	for i := range f.Parts {
		if i%2 == 0 {
			fillBox(c, box{0, f.base(i + 1), f.width, f.base(i)}, paintToken("shade", ""))
		}
	}
}

// ends are the left and right ends in points of a part's bar in a column.
func (f *cascade) ends(column, part int) (x0, x1 float64) {
	before := 0.0
	for _, p := range f.Parts[:part] {
		before += p.Values[column]
	}
	if f.totals[column] <= 0 {
		return f.left[column], f.left[column]
	}
	scale := f.span / f.totals[column]
	return f.left[column] + scale*before, f.left[column] + scale*(before+f.Parts[part].Values[column])
}

// leastBar is the width in points below which a bar would not be seen.
const leastBar = 1.0

func (f *cascade) drawBars(c vg.Canvas) {
	for column, w := range f.Columns {
		top := f.top + 8 + wholeBar
		for i, p := range f.Parts {
			x0, x1 := f.ends(column, i)
			if p.Labels[column] == "" {
				continue
			}
			f.fill(c, box{x0, top - wholeBar, x1, top}, p.Fill, w.Class)
			f.fill(c, box{x0, f.barTop(i) - bar, max(x1, x0+leastBar), f.barTop(i)}, p.Fill, w.Class)
		}
		for i, p := range f.Parts {
			if x0, _ := f.ends(column, i); p.Labels[column] != "" && x0 > f.left[column] {
				strokeLine(c, point{x0, top - wholeBar}, point{x0, top}, paintToken("panel", ""), 1)
			}
		}
		edges := box{f.left[column], top - wholeBar, f.left[column] + f.span, top}
		outline(c, edges, paintToken(w.Class, ""), 1)
	}
}

// fill paints a bar: full, hatched, or as its outline alone.
func (f *cascade) fill(c vg.Canvas, b box, how, class string) {
	switch how {
	case "hatched":
		corners := []point{{b.x0, b.y0}, {b.x1, b.y0}, {b.x1, b.y1}, {b.x0, b.y1}}
		var lines vg.Path
		for _, s := range hatch(corners, 4) {
			lines.Move(vgPoint(s[0]))
			lines.Line(vgPoint(s[1]))
		}
		strokePath(c, lines, paintToken(class, ""), 1.1)
		outline(c, b, paintToken(class, ""), 0.9)
	case "open":
		outline(c, b, paintToken(class, ""), 0.9)
	default:
		fillBox(c, b, paintToken(class, ""))
	}
}

func outline(c vg.Canvas, b box, t token, width float64) {
	var p vg.Path
	p.Move(vgPoint(point{b.x0, b.y0}))
	for _, q := range []point{{b.x1, b.y0}, {b.x1, b.y1}, {b.x0, b.y1}} {
		p.Line(vgPoint(q))
	}
	p.Close()
	strokePath(c, p, t, width)
}

func (f *cascade) drawWords(c vg.Canvas) {
	for i, w := range f.Columns {
		text := shortened(w.Name+": "+w.Label, f.span, f.size, true)
		words{text: text, x: f.left[i], y: f.height - edge - ascent*f.size, size: f.size, bold: true, class: textClass(w.Class)}.draw(c)
	}
	for i, p := range f.Parts {
		f.drawName(c, i, p)
		for column := range f.Columns {
			if p.Labels[column] != "" {
				f.label(column, i).draw(c)
			}
		}
	}
	for i, line := range f.note {
		words{text: line, x: edge, y: edge + f.pitch*float64(len(f.note)-1-i) + descent*f.size, size: f.size, class: "ink-3"}.draw(c)
	}
}

func (f *cascade) drawName(c vg.Canvas, row int, p Part) {
	w := words{text: shortened(p.Name, f.width-2*edge, f.size, false), x: edge, y: f.base(row) - 1 - ascent*f.size, size: f.size, class: "ink"}
	if f.names > 0 {
		w.text = shortened(p.Name, f.names-12, f.size, false)
		w.y = f.base(row) - f.row/2 - middle*f.size
	}
	w.draw(c)
}

// label is the words of a bar: beside it on the roomier side, or in it where it is long;
// on a small screen under it.
func (f *cascade) label(column, row int) words {
	x0, x1 := f.ends(column, row)
	x1 = max(x1, x0+leastBar)
	p := &f.Parts[row]
	w := words{text: p.Labels[column], y: f.barTop(row) - bar/2 - middle*f.size, size: f.size, class: "ink-2"}.measured()
	end := f.left[column] + f.span
	switch {
	case f.names == 0:
		w.x, w.y = f.left[column], f.barTop(row)-bar-2-ascent*f.size
		w = words{text: shortened(w.text, f.span, f.size, false), x: w.x, y: w.y, size: w.size, class: w.class}
	case x1+barPad+w.width() <= end:
		w.x = x1 + barPad
	case x0-barPad-w.width() >= f.left[column]:
		w.x, w.anchor = x0-barPad, 1
	default:
		w.x, w.anchor = (x0+x1)/2, 0.5
		switch p.Fill {
		case "solid":
			w.class = "panel"
		case "hatched":
			w.extra = "halo"
		}
	}
	return w
}
