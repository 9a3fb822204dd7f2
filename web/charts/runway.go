package charts

import (
	"cmp"
	"io"
	"math"
	"strings"

	"gonum.org/v1/plot/vg"
)

// A Piece is one part of a run along the strip.
type Piece struct {
	From, To float64 // ends along the strip in the drawing's unit, From <= To
	Name     string
	Label    string // the name with its length
	Class    string // roll, pause or air
}

// A Drawing is a strip seen from the side, to scale, with a take-off or landing on it.
type Drawing struct {
	ID       string // unique on the page
	Title    string
	Desc     string
	Note     string // stands over the drawing; the scale of height is added
	Unit     string
	Decimals int     // digits after the point in the table
	Length   float64 // of the strip in display units, > 0
	Pieces   []Piece
	// Along and Heights are the flown path in display units, >= 0, both in the same unit.
	Along, Heights []float64
	Marks          []Mark
	Screen         float64 // where the obstacle stands in display units; NaN draws none
	End            string  // label of the end of the strip
	GoesOn         string  // said instead where the strip is far longer than the run
	Past           string  // label of the part past the end; empty when there is none
	Factored       float64 // the run with its safety factor in display units; 0 draws none
	FactoredLabel  string
	Said           string  // why there is no run; empty when there is one
	Width          float64 // in points, > 0; 0 means 1080
}

// Narrow returns the drawing laid out for a small screen.
func (d Drawing) Narrow() Drawing {
	d.ID += "-narrow"
	d.Width = narrowWidth
	return d
}

// SVG writes the drawing as an inline svg element, as [Chart.SVG] does.
func (d Drawing) SVG(w io.Writer) error {
	f := newSide(d)
	s := newSVGCanvas(f.width, f.height)
	f.draw(s)
	return s.writeTo(w, svgHead{id: d.ID, title: d.Title, desc: d.Desc, textSize: f.size})
}

// Table is the flown path.
func (d Drawing) Table() Table {
	t := Table{Caption: d.Title, Header: []string{heading("along the strip", d.Unit), heading("height", d.Unit)}}
	for i := range min(len(d.Along), len(d.Heights)) {
		t.Rows = append(t.Rows, []string{plainNumber(d.Along[i], d.Decimals), plainNumber(d.Heights[i], d.Decimals+1)})
	}
	return t
}

// Sizes of the drawing in points.
const (
	sideWidth   = 1080.0
	pathHeight  = 72.0 // the most that the flown path takes
	barHeight   = 21.0
	stripMargin = 3.0 // between the bar of the run and the edge of the strip
	thinBar     = 7.0 // of the factored run
	sideGap     = 9.0
)

// A side is a drawing with everything placed, in points with the y axis up.
type side struct {
	Drawing
	width, height float64
	size, pitch   float64 // of text and of its rows
	x             scale
	rise          float64 // points of height for one display unit
	top           float64 // of the path
	marks         []placedMark
	note          []string
	below         []placedMark
	belowRows     int
	markBase      float64
	ground        float64 // where the wheels roll
	barTop        float64
	belowTop      float64
	thinTop       float64
	axis          float64
	open          bool // the strip goes on past the drawing
}

func newSide(d Drawing) *side {
	f := &side{Drawing: d, width: d.Width}
	if !usable(f.width) || f.width <= 0 {
		f.width = sideWidth
	}
	f.size = textSize(f.width)
	f.pitch = math.Round(f.size * 1.35)
	f.chooseX()
	times := f.chooseHeight()
	note := d.Note
	if times != "" {
		note += " " + times
	}
	f.note = wrapped(note, f.width-2*edge, f.size)
	marks := d.Marks
	if !f.open && d.End != "" {
		marks = append(marks[:len(marks):len(marks)], Mark{d.Length, d.End})
	}
	var rows int
	f.marks, rows = placeMarks(marks, f.x, f.width-edge, f.size)
	f.hang()
	f.stackUp(rows)
	return f
}

// chooseX shows the whole strip, or twice the run where the strip is far longer.
func (f *side) chooseX() {
	const far, shown, room = 3.2, 2.0, 1.02
	reach := f.Factored
	for _, p := range f.Pieces {
		reach = max(reach, p.To)
	}
	span := max(f.Length, reach) * room
	if reach > 0 && f.Length > far*reach {
		span, f.open = shown*reach, true
	}
	ticks := max(math.Floor(f.width/90), 3)
	f.x = newScale(Axis{Min: 0, Max: span}, extent{}, ticks, 0)
	f.x.from, f.x.to = edge+6, f.width-edge-6
}

// exaggerations are the factors at which heights are drawn.
var exaggerations = []float64{50, 40, 30, 25, 20, 15, 12, 10, 8, 6, 5, 4, 3, 2, 1, 0.5, 0.2, 0.1, 0.05, 0.02, 0.01}

// chooseHeight takes the greatest factor that keeps the path low enough and says it.
func (f *side) chooseHeight() string {
	highest := 0.0
	for _, h := range f.Heights {
		highest = max(highest, h)
	}
	if highest <= 0 {
		return ""
	}
	along := (f.x.to - f.x.from) / (f.x.max - f.x.min)
	k := exaggerations[len(exaggerations)-1]
	for _, e := range exaggerations {
		if highest*along*e <= pathHeight {
			k = e
			break
		}
	}
	f.rise, f.top = along*k, highest*along*k
	if k == 1 {
		return "Height and length to one scale."
	}
	return "Height drawn " + plainNumber(k, decimalsFor(min(k, 1))) + " times the length."
}

// hang gives every label that does not fit into its bar a place under it, on a
// mast like those of the marks over it.
func (f *side) hang() {
	var list []Mark
	middleOf := func(from, to float64) float64 { return (min(from, f.x.max) + min(to, f.x.max)) / 2 }
	if f.Past != "" {
		list = append(list, Mark{middleOf(f.Length, f.reach()), f.Past})
	}
	for i, p := range f.Pieces {
		if _, fits := f.inside(i); !fits {
			list = append(list, Mark{middleOf(p.From, p.To), p.Label})
		}
	}
	if f.open && f.GoesOn != "" {
		list = append(list, Mark{f.x.max, f.GoesOn})
	}
	f.below, f.belowRows = placeMarks(list, f.x, f.width-edge, f.size)
}

// reach is the end of the last piece.
func (f *side) reach() float64 {
	to := 0.0
	for _, p := range f.Pieces {
		to = max(to, p.To)
	}
	return to
}

// inside is the label of a piece as it stands in the bar, if it fits there.
func (f *side) inside(i int) (words, bool) {
	p := f.Pieces[i]
	x0, x1 := f.x.at(p.From), f.x.at(min(p.To, max(f.Length, p.From)))
	w := words{text: p.Label, x: (x0 + x1) / 2, anchor: 0.5, size: f.size, bold: true, class: "panel"}
	if p.Class == "air" {
		w.class = "available"
	}
	return w, p.Class != "pause" && w.width()+10 <= x1-x0
}

// stackUp places the rows from the top down; rows is that of the marks' labels.
func (f *side) stackUp(rows int) {
	path := max(f.top, 6)
	if f.Said != "" {
		path = max(path, f.pitch*float64(len(f.said()))+6)
	}
	above := edge + f.pitch*float64(len(f.note)+rows) + 10
	under := stripMargin + f.pitch*float64(f.belowRows) + sideGap
	if f.Factored > 0 {
		under += thinBar + f.pitch + sideGap
	}
	f.height = math.Ceil(above + path + 5 + stripMargin + barHeight + under + 4 + f.pitch + edge)
	f.markBase = f.height - above + 10 - 2
	f.ground = f.height - above - path
	f.barTop = f.ground - 5 - stripMargin
	f.belowTop = f.barTop - barHeight - stripMargin
	f.thinTop = f.belowTop - f.pitch*float64(f.belowRows) - sideGap
	f.axis = f.thinTop
	if f.Factored > 0 {
		f.axis -= thinBar + f.pitch + sideGap
	}
}

func (f *side) said() []string { return wrapped(f.Said, f.width-6*f.size, f.size+1) }

func (f *side) draw(c vg.Canvas) {
	group(c, "spans", func() { f.drawStrip(c) })
	group(c, "axes", func() { f.drawRuler(c) })
	group(c, "marks", func() { f.drawMarks(c) })
	group(c, "curves", func() { f.drawPath(c) })
	group(c, "labels", func() { f.drawLabels(c) })
	c.SetLineDash(nil, 0)
}

// drawStrip draws the strip, the run on it and the factored run under it.
func (f *side) drawStrip(c vg.Canvas) {
	end := f.x.at(min(f.Length, f.x.max))
	strip := box{f.x.at(0), f.belowTop, end, f.barTop + stripMargin}
	fillBox(c, strip, paintToken("shade", ""))
	fills := map[string]string{"roll": "available", "pause": "alt-3", "air": "hand"}
	for _, p := range f.Pieces {
		f.drawBar(c, p.From, p.To, f.barTop-barHeight, f.barTop, cmp.Or(fills[p.Class], "hand"))
	}
	var edges vg.Path
	edges.Move(vgPoint(point{strip.x1, strip.y1}))
	edges.Line(vgPoint(point{strip.x0, strip.y1}))
	edges.Line(vgPoint(point{strip.x0, strip.y0}))
	edges.Line(vgPoint(point{strip.x1, strip.y0}))
	if !f.open {
		edges.Close()
	}
	strokePath(c, edges, paintToken("ink-2", ""), 1.2)
	if f.Factored > 0 {
		f.drawBar(c, 0, f.Factored, f.thinTop-thinBar, f.thinTop, "ink-3")
	}
}

// drawBar fills a bar up to the end of the strip and hatches what is past it.
func (f *side) drawBar(c vg.Canvas, from, to, y0, y1 float64, class string) {
	if on := min(to, f.Length); on > from {
		fillBox(c, box{f.x.at(from), y0, f.x.at(on), y1}, paintToken(class, ""))
	}
	if to <= f.Length {
		return
	}
	b := box{f.x.at(max(from, f.Length)), y0, f.x.at(to), y1}
	corners := []point{{b.x0, b.y0}, {b.x1, b.y0}, {b.x1, b.y1}, {b.x0, b.y1}}
	var lines vg.Path
	for _, s := range hatch(corners, 5) {
		lines.Move(vgPoint(s[0]))
		lines.Line(vgPoint(s[1]))
	}
	strokePath(c, lines, paintToken("short", ""), 1.1)
	var outline vg.Path
	for i, p := range corners {
		if i == 0 {
			outline.Move(vgPoint(p))
			continue
		}
		outline.Line(vgPoint(p))
	}
	outline.Close()
	strokePath(c, outline, paintToken("required", ""), 1)
}

func (f *side) drawRuler(c vg.Canvas) {
	line := paintToken("line", "crisp")
	strokeLine(c, point{f.x.from, f.axis}, point{f.x.to, f.axis}, line, hairline)
	for _, v := range f.x.ticks() {
		at := f.x.at(v)
		strokeLine(c, point{at, f.axis}, point{at, f.axis - 4}, line, hairline)
		text := f.x.label(v)
		if v == 0 {
			text += "\u00a0" + f.Unit
		}
		words{text: text, x: at, y: f.axis - 4 - ascent*f.size - 1, anchor: 0.5, size: f.size, class: "ink-3"}.keptIn(edge, f.width-edge).draw(c)
	}
}

func (f *side) drawMarks(c vg.Canvas) {
	for _, m := range f.marks {
		base := f.markBase + f.pitch*float64(m.row)
		foot := f.ground
		if !f.open && m.x == f.x.at(f.Length) {
			foot = f.belowTop
		}
		c.SetLineDash([]vg.Length{1.2, 2.6}, 0)
		strokeLine(c, point{m.x, foot}, point{m.x, base + ascent*f.size}, paintToken("ink-3", ""), 0.9)
		c.SetLineDash(nil, 0)
		m.words(f.size, base).draw(c)
	}
	if at := f.x.at(f.Screen); usable(f.Screen) && f.top > 0 {
		fillBox(c, box{at - 1.6, f.ground, at + 1.6, f.ground + f.top}, paintToken("ink-3", ""))
	}
}

// words is the label of a mark with its baseline at y in points.
func (m placedMark) words(size, y float64) words {
	x0, x1 := m.span()
	w := words{text: m.label, x: x0, y: y, size: size, class: "ink-2"}
	if m.left {
		w.x, w.anchor = x1, 1
	}
	return w
}

func (f *side) drawPath(c vg.Canvas) {
	strokeLine(c, point{f.x.from, f.ground}, point{f.x.to, f.ground}, paintToken("line", "crisp"), hairline)
	var path vg.Path
	for i := range min(len(f.Along), len(f.Heights)) {
		p := point{f.x.at(f.Along[i]), f.ground + f.rise*f.Heights[i]}
		if i == 0 {
			path.Move(vgPoint(p))
			continue
		}
		path.Line(vgPoint(p))
	}
	if len(path) > 1 {
		strokePath(c, path, paintToken("available", "curve"), curveWidth)
	}
	for _, m := range f.Marks {
		if h, ok := newCurve(f.Along, f.Heights).at(m.X); ok {
			fillDot(c, point{f.x.at(m.X), f.ground + f.rise*h}, 3.4, paintToken("available", ""))
		}
	}
}

func (f *side) drawLabels(c vg.Canvas) {
	for i, line := range f.note {
		words{text: line, x: edge, y: f.height - edge - ascent*f.size - f.pitch*float64(i), size: f.size, class: "ink-2"}.draw(c)
	}
	for i := range f.Pieces {
		if w, ok := f.inside(i); ok {
			w.y = f.barTop - barHeight/2 - middle*f.size
			w.draw(c)
		}
	}
	for _, m := range f.below {
		y := f.belowTop - f.pitch*float64(m.row) - 3 - ascent*f.size
		w := m.words(f.size, y)
		if f.Past != "" && strings.HasPrefix(f.Past, strings.TrimSuffix(m.label, "…")) {
			w.class = "required"
		}
		strokeLine(c, point{m.x, f.belowTop}, point{m.x, y - 1}, paintToken("ink-3", ""), hairline)
		w.draw(c)
	}
	if f.Factored > 0 {
		w := words{text: f.FactoredLabel, x: f.x.from, y: f.thinTop - thinBar - 2 - ascent*f.size, size: f.size, class: "ink-2"}
		if f.Factored > f.Length {
			w.class, w.bold = "required", true
		}
		w.text = shortened(w.text, f.width-2*edge-6, f.size, w.bold)
		w.draw(c)
	}
	if f.Said != "" {
		lines := f.said()
		for i, line := range lines {
			words{text: line, x: f.width / 2, y: f.ground + 6 + f.pitch*float64(len(lines)-1-i), anchor: 0.5, size: f.size + 1, class: "ink-2", extra: "halo"}.draw(c)
		}
	}
}
