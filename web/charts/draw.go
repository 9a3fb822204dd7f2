package charts

import (
	"cmp"
	"math"

	"gonum.org/v1/plot"
	"gonum.org/v1/plot/plotter"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// Line widths in points.
const (
	hairline   = 0.5 // at most one device pixel on common screens, so that a grid stays even
	curveWidth = 2.0
	ghostWidth = 1.3
)

// draw draws the frame from back to front.
func (f *frame) draw(c vg.Canvas) {
	group(c, "spans", func() { f.drawSpans(c) })
	group(c, "bands", func() {
		for i := range f.panels {
			f.drawBands(c, &f.panels[i])
		}
	})
	group(c, "axes", func() { f.drawAxes(c) })
	group(c, "marks", func() { f.drawMarks(c) })
	group(c, "curves", func() {
		for i := range f.panels {
			f.drawCurves(c, &f.panels[i])
		}
	})
	group(c, "labels", func() {
		for i := range f.panels {
			f.drawLabels(c, &f.panels[i])
		}
	})
	c.SetLineDash(nil, 0)
}

func group(c vg.Canvas, class string, body func()) {
	if g, ok := c.(grouper); ok {
		g.begin(class)
		defer g.end()
	}
	body()
}

// plot returns the panel as gonum sees it: its ranges and its data area.
func (f *frame) plot(c vg.Canvas, p *panelFrame) (draw.Canvas, *plot.Plot) {
	plt := plot.New()
	plt.X.Min, plt.X.Max = f.x.min, f.x.max
	plt.Y.Min, plt.Y.Max = p.y.min, p.y.max
	return draw.Canvas{Canvas: c, Rectangle: vg.Rectangle{
		Min: vgPoint(point{p.area.x0, p.area.y0}), Max: vgPoint(point{p.area.x1, p.area.y1}),
	}}, plt
}

func (f *frame) drawSpans(c vg.Canvas) {
	for _, s := range f.spans {
		if s.shaded {
			for _, p := range f.panels {
				fillBox(c, box{s.x0, p.area.y0, s.x1, p.area.y1}, paintToken("shade", ""))
			}
		}
		s.name.draw(c)
	}
}

func (f *frame) drawBands(c vg.Canvas, p *panelFrame) {
	area, plt := f.plot(c, p)
	for _, b := range p.spec.Bands {
		for _, r := range bandRuns(b) {
			if b.Class == "short" {
				f.drawHatch(area, p, r)
				continue
			}
			fill := &plotter.Polygon{XYs: []plotter.XYs{xys(r.outline())}, Color: paintToken("hand", "")}
			fill.Plot(area, plt)
		}
	}
}

func (f *frame) drawHatch(area draw.Canvas, p *panelFrame, r bandRun) {
	const apart = 6
	var outline []point
	for _, q := range area.ClipPolygonXY(vgPoints(r.on(f.x, p.y).outline())) {
		outline = append(outline, point{float64(q.X), float64(q.Y)})
	}
	var path vg.Path
	for _, s := range hatch(outline, apart) {
		path.Move(vgPoint(s[0]))
		path.Line(vgPoint(s[1]))
	}
	strokePath(area, path, paintToken("short", ""), 0.9)
}

func (f *frame) drawAxes(c vg.Canvas) {
	last := len(f.panels) - 1
	for i := range f.panels {
		f.drawGrid(c, &f.panels[i], i == last)
	}
	base := f.panels[last].area.y0 - 4 - f.rowPitch + descent*f.size
	for _, v := range f.x.ticks() {
		words{text: f.x.label(v), x: f.x.at(v), y: base, anchor: 0.5, size: f.size, class: "ink-3"}.keptIn(0, f.chart.Width).draw(c)
	}
	label := shortened(heading(f.chart.X.Label, f.xUnit()), f.chart.Width-edge-rightSpace, f.size, false)
	words{text: label, x: f.area.x1, y: base - f.rowPitch, anchor: 1, size: f.size, class: "ink-2"}.draw(c)
}

// drawGrid draws the grid, the tick labels of y and the heading of one panel.
func (f *frame) drawGrid(c vg.Canvas, p *panelFrame, last bool) {
	light, base := paintToken("line-2", "crisp"), paintToken("line", "crisp")
	for _, v := range f.x.ticks() {
		x := f.x.at(v)
		strokeLine(c, point{x, p.area.y0}, point{x, p.area.y1}, light, hairline)
		if last {
			strokeLine(c, point{x, p.area.y0}, point{x, p.area.y0 - 3}, base, hairline)
		}
	}
	for _, v := range p.y.ticks() {
		y := p.y.at(v)
		colour := light
		if v == 0 {
			colour = base
		}
		strokeLine(c, point{p.area.x0, y}, point{p.area.x1, y}, colour, hairline)
		words{text: p.y.label(v), x: p.area.x0 - tickGap, y: y - middle*f.size, anchor: 1, size: f.size, class: "ink-3"}.draw(c)
	}
	strokeLine(c, point{p.area.x0, p.area.y0}, point{p.area.x1, p.area.y0}, base, hairline)
	p.heading.draw(c)
	if p.empty() {
		f.drawBlank(c, p)
	}
}

// drawBlank says in the middle of an empty panel why it is empty.
func (f *frame) drawBlank(c vg.Canvas, p *panelFrame) {
	text := p.spec.Blank
	if text == "" {
		text = "no data"
	}
	lines := wrapped(text, p.area.x1-p.area.x0-2*f.size, f.size+1)
	y := (p.area.y0+p.area.y1)/2 - middle*f.size + f.rowPitch*float64(len(lines)-1)/2
	for i, line := range lines {
		words{text: line, x: (p.area.x0 + p.area.x1) / 2, y: y - f.rowPitch*float64(i),
			anchor: 0.5, size: f.size + 1, class: "ink-3", extra: "halo"}.draw(c)
	}
}

func (f *frame) drawMarks(c vg.Canvas) {
	if len(f.marks) == 0 {
		return
	}
	dots := []vg.Length{1.2, 2.6}
	for _, m := range f.marks {
		for i, p := range f.panels {
			top := p.area.y1
			if i == 0 {
				top = f.markBase + f.rowPitch*float64(m.row) + ascent*f.size
			}
			c.SetLineDash(dots, 0)
			strokeLine(c, point{m.x, p.area.y0}, point{m.x, top}, paintToken("ink-3", ""), 0.9)
		}
		c.SetLineDash(nil, 0)
		x0, _ := m.span()
		w := words{text: m.label, x: x0, y: f.markBase + f.rowPitch*float64(m.row), size: f.size, class: "ink-2"}
		if m.left {
			w.x, w.anchor = x0+m.width, 1
		}
		w.draw(c)
	}
}

func (f *frame) drawCurves(c vg.Canvas, p *panelFrame) {
	area, plt := f.plot(c, p)
	for _, l := range p.spec.Lines {
		if p.y.has(l.Y) {
			y := p.y.at(l.Y)
			c.SetLineDash([]vg.Length{5, 3}, 0)
			strokeLine(c, point{p.area.x0, y}, point{p.area.x1, y}, paintToken("ink-3", ""), 1)
		}
	}
	for i, s := range p.spec.Series {
		if s.Class == "none" {
			continue
		}
		style := draw.LineStyle{Color: paintToken(s.Class, "curve"), Width: curveWidth}
		if s.Class == "ghost" {
			style.Width = ghostWidth
		}
		if s.Dash {
			style.Dashes = []vg.Length{6, 3.5}
		}
		for _, run := range p.data[i] {
			if len(run) == 1 {
				f.drawLonePoint(c, p, run[0], s.Class)
				continue
			}
			line := &plotter.Line{XYs: xys(run), LineStyle: style}
			line.Plot(area, plt)
		}
	}
	c.SetLineDash(nil, 0)
}

// drawLonePoint shows a point between two gaps, which no line would show.
func (f *frame) drawLonePoint(c vg.Canvas, p *panelFrame, q point, class string) {
	if f.x.has(q.x) && p.y.has(q.y) {
		fillDot(c, point{f.x.at(q.x), p.y.at(q.y)}, 2, paintToken(class, ""))
	}
}

// drawLabels finds a place for every label of the panel, the most important first,
// and draws them over everything else.
func (f *frame) drawLabels(c vg.Canvas, p *panelFrame) {
	s := &site{area: p.area}
	for _, d := range p.drawn {
		if len(d) > 0 {
			s.curves = append(s.curves, d)
		}
	}
	for _, m := range f.marks {
		s.lines = append(s.lines, m.x)
	}
	for _, l := range p.spec.Lines {
		if p.y.has(l.Y) {
			s.levels = append(s.levels, p.y.at(l.Y))
		}
	}
	for _, b := range p.spec.Bands {
		for _, r := range bandRuns(b) {
			s.bands = append(s.bands, r.on(f.x, p.y))
		}
	}
	var flags []Flag
	for _, fl := range p.spec.Flags {
		if f.x.has(fl.X) && p.y.has(fl.Y) {
			flags = append(flags, fl)
			at := point{f.x.at(fl.X), p.y.at(fl.Y)}
			s.taken = append(s.taken, box{at.x, at.y, at.x, at.y}.grown(5))
		}
	}
	for _, fl := range flags {
		f.drawFlag(c, p, s, fl)
	}
	for _, l := range p.spec.Lines {
		if !p.y.has(l.Y) {
			continue
		}
		w := words{text: l.Label, size: f.size, class: "ink-2", extra: "halo"}
		if w, ok := s.along(p.y.at(l.Y), w); ok {
			w.draw(c)
		}
	}
	for i, sr := range p.spec.Series {
		text := cmp.Or(sr.Label, sr.Name)
		if sr.LabelAt < 0 || math.IsNaN(sr.LabelAt) || text == "" || len(p.drawn[i]) == 0 {
			continue
		}
		w := words{text: text, size: f.size + 0.5, bold: true, class: textClass(sr.Class), extra: "halo"}
		if w, ok := s.alongCurve(p.drawn[i], w, sr.LabelAt); ok {
			w.draw(c)
		}
	}
	f.drawBandLabels(c, p, s)
}

// drawBandLabels labels the largest piece of each band.
func (f *frame) drawBandLabels(c vg.Canvas, p *panelFrame, s *site) {
	for _, b := range p.spec.Bands {
		var largest bandRun
		most := 0.0
		for _, r := range bandRuns(b) {
			if _, _, area := r.measure(); area > most {
				largest, most = r, area
			}
		}
		if most == 0 || b.Label == "" {
			continue
		}
		w := words{text: b.Label, size: f.size + 0.5, class: "available", extra: "halo-hand"}
		if b.Class == "short" {
			w.class, w.extra = "required", "halo"
		}
		if w, ok := s.within(largest.on(f.x, p.y).clamped(p.area), w); ok {
			w.draw(c)
		}
	}
}

func (f *frame) drawFlag(c vg.Canvas, p *panelFrame, s *site, fl Flag) {
	at := point{f.x.at(fl.X), p.y.at(fl.Y)}
	if fl.Label != "" {
		w := words{text: shortened(fl.Label, p.area.x1-p.area.x0-20, f.size, true), size: f.size, bold: true, class: "panel"}
		call := s.around(at, w)
		strokeLine(c, at, call.tip, paintToken("ink", ""), 1)
		fillBox(c, call.plate, paintToken("ink", ""))
		call.words.draw(c)
	}
	fillDot(c, at, 5, paintToken("panel", ""))
	fillDot(c, at, 3.6, paintToken(fl.Class, ""))
}

func strokeLine(c vg.Canvas, a, b point, t token, width float64) {
	var p vg.Path
	p.Move(vgPoint(a))
	p.Line(vgPoint(b))
	strokePath(c, p, t, width)
}

func strokePath(c vg.Canvas, p vg.Path, t token, width float64) {
	c.SetColor(t)
	c.SetLineWidth(vg.Length(width))
	c.Stroke(p)
}

func fillBox(c vg.Canvas, b box, t token) {
	var p vg.Path
	p.Move(vgPoint(point{b.x0, b.y0}))
	p.Line(vgPoint(point{b.x1, b.y0}))
	p.Line(vgPoint(point{b.x1, b.y1}))
	p.Line(vgPoint(point{b.x0, b.y1}))
	p.Close()
	c.SetColor(t)
	c.Fill(p)
}

func fillDot(c vg.Canvas, at point, radius float64, t token) {
	var p vg.Path
	p.Arc(vgPoint(at), vg.Length(radius), 0, 2*math.Pi)
	p.Close()
	c.SetColor(t)
	c.Fill(p)
}

func vgPoint(p point) vg.Point { return vg.Point{X: vg.Length(p.x), Y: vg.Length(p.y)} }

func vgPoints(ps []point) []vg.Point {
	out := make([]vg.Point, len(ps))
	for i, p := range ps {
		out[i] = vgPoint(p)
	}
	return out
}

func xys(ps []point) plotter.XYs {
	out := make(plotter.XYs, len(ps))
	for i, p := range ps {
		out[i] = plotter.XY{X: p.x, Y: p.y}
	}
	return out
}
