package charts

import "math"

// A frame is a chart with everything placed on the canvas, in points with the y axis up.
type frame struct {
	chart    Chart
	size     float64 // of tick labels in points
	x        scale
	area     box // from the left to the right end of the data, over all panels
	panels   []panelFrame
	marks    []placedMark
	markBase float64 // baseline of mark row 0 in points
	rowPitch float64 // between rows of labels in points
	spans    []placedSpan
}

// panelFrame is one panel on the canvas.
type panelFrame struct {
	spec    Panel
	area    box
	y       scale
	heading words
	data    []curve // in display units, one for each series
	drawn   []curve // on the canvas, empty for a series that is not drawn
}

// Distances in points.
const (
	edge        = 4.0  // free space around the drawing
	rightSpace  = 12.0 // from the data area to the right edge, so that end labels hang over it
	tickGap     = 6.0  // between a tick label and the data area
	panelGap    = 10.0
	headingLift = 9.0  // from the data area to the baseline of what stands on it
	yTickSpace  = 20.0 // least distance between y ticks
	mostYTicks  = 5.0
)

func newFrame(c Chart) *frame {
	f := &frame{chart: c, size: textSize(c.Width)}
	f.rowPitch = math.Round(f.size * 1.3)
	f.readCurves()
	f.chooseScales()
	top := f.placeTop()
	f.placePanels(top)
	f.placeHeadings()
	return f
}

func (f *frame) readCurves() {
	for _, p := range f.chart.Panels {
		pf := panelFrame{spec: p}
		for _, s := range p.Series {
			pf.data = append(pf.data, newCurve(s.X, s.Y))
		}
		f.panels = append(f.panels, pf)
	}
}

// chooseScales sets the scales before the panels have their final heights, since the width
// of the tick labels decides where the data begins.
func (f *frame) chooseScales() {
	var xs extent
	shares := 0.0
	for _, p := range f.panels {
		shares += share(p.spec)
		xs.addPanelX(p)
	}
	labelWidth := 0.0
	for i := range f.panels {
		p := &f.panels[i]
		free := f.chart.Height - 4*f.size - float64(len(f.panels))*(headingLift+f.size+panelGap)
		height := max(free, 0) * share(p.spec) / shares
		p.y = newScale(p.spec.Y, p.extentY(), min(math.Floor(height/yTickSpace), mostYTicks), 0.5)
		for _, v := range p.y.ticks() {
			labelWidth = max(labelWidth, textWidth(p.y.label(v), f.size, false))
		}
	}
	f.area.x0 = edge + min(math.Ceil(labelWidth), f.chart.Width/3) + tickGap
	f.area.x1 = f.chart.Width - rightSpace
	f.x = f.xScale(xs)
}

// xScale takes as many ticks as fit. Times and spans end where the data does, since a
// mission is not longer than it is; other axes end at whole steps.
func (f *frame) xScale(data extent) scale {
	round := 1.0
	if f.chart.X.Format == "hm" || len(f.chart.Spans) > 0 {
		round = 0
	}
	var s scale
	for n := 10.0; n >= 1; n-- {
		s = newScale(f.chart.X, data, n, round)
		widest := 0.0
		for _, v := range s.ticks() {
			widest = max(widest, textWidth(s.label(v), f.size, false))
		}
		if (f.area.x1-f.area.x0)*s.step/(s.max-s.min) >= max(widest+2*f.size, 46) {
			break
		}
	}
	s.from, s.to = f.area.x0, f.area.x1
	return s
}

func share(p Panel) float64 {
	if !usable(p.Height) || p.Height <= 0 {
		return 1
	}
	return p.Height
}

func (e *extent) addPanelX(p panelFrame) {
	for _, c := range p.data {
		for _, run := range c {
			for _, q := range run {
				e.add(q.x)
			}
		}
	}
	for _, b := range p.spec.Bands {
		for _, r := range bandRuns(b) {
			x0, x1, _ := r.measure()
			e.add(x0)
			e.add(x1)
		}
	}
}

// extentY is the extent of everything drawn in the panel.
func (p panelFrame) extentY() extent {
	var e extent
	for i, c := range p.data {
		if p.spec.Series[i].Class == "none" {
			continue
		}
		for _, run := range c {
			for _, q := range run {
				e.add(q.y)
			}
		}
	}
	if !e.some {
		return e
	}
	for _, l := range p.spec.Lines {
		e.add(l.Y)
	}
	return p.withHeadroom(e)
}

// withHeadroom leaves space for the callout over a flag near the top of the data.
func (p panelFrame) withHeadroom(e extent) extent {
	const near, room = 0.1, 0.16 // shares of the height of the data
	for _, fl := range p.spec.Flags {
		e.add(fl.Y)
	}
	height := e.hi - e.lo
	for _, fl := range p.spec.Flags {
		if usable(fl.Y) && fl.Y > e.hi-near*height {
			e.add(fl.Y + room*height)
		}
	}
	return e
}

// placeTop places span names and marks and returns the top of the first data area.
func (f *frame) placeTop() float64 {
	top := f.chart.Height - edge
	if len(f.chart.Spans) > 0 {
		top -= f.rowPitch
		f.spans = placeSpans(f.chart.Spans, f.x, f.chart.Width, top+descent*f.size, f.size)
		top -= 2
	}
	var rows int
	f.marks, rows = placeMarks(f.chart.Marks, f.x, f.chart.Width-edge, f.size)
	p := &f.panels[0]
	p.heading = f.headingOf(p.spec.Y)
	row := f.headingRow(p.heading)
	if p.heading.text != "" {
		rows = max(rows, row+1)
	}
	top -= headingLift + f.rowPitch*float64(rows)
	if rows == 0 {
		top -= f.size / 2
	}
	f.markBase = top + headingLift
	p.heading.y = f.markBase + f.rowPitch*float64(row)
	return top
}

func (f *frame) headingOf(a Axis) words {
	return words{
		text: shortened(heading(a.Label, a.Unit), f.chart.Width-2*edge, f.size, false),
		x:    edge, size: f.size, class: "ink-2",
	}
}

// headingRow returns the lowest row where the heading meets no mark.
func (f *frame) headingRow(h words) int {
	row := 0
	b := h.box().grown(5)
	for _, m := range f.marks {
		x0, x1 := m.span()
		label := b.x0 < x1 && x0 < b.x1
		line := b.x0 < m.x && m.x < b.x1
		if label || line {
			row = max(row, m.row+1)
		}
	}
	return row
}

// placePanels shares the height between top and the x axis among the panels.
func (f *frame) placePanels(top float64) {
	bottom := edge + f.rowPitch + 4
	if heading(f.chart.X.Label, f.xUnit()) != "" {
		bottom += f.rowPitch
	}
	between := panelGap + headingLift + f.size
	free := top - bottom - between*float64(len(f.panels)-1)
	shares := 0.0
	for _, p := range f.panels {
		shares += share(p.spec)
	}
	f.area.y1 = top
	for i := range f.panels {
		p := &f.panels[i]
		h := max(free*share(p.spec)/shares, 10)
		p.area = box{f.area.x0, top - h, f.area.x1, top}
		p.y.from, p.y.to = p.area.y0, p.area.y1
		top -= h + between
		for j, c := range p.data {
			if p.spec.Series[j].Class == "none" {
				c = nil
			}
			p.drawn = append(p.drawn, c.on(f.x, p.y))
		}
	}
	f.area.y0 = f.panels[len(f.panels)-1].area.y0
}

func (f *frame) placeHeadings() {
	for i := 1; i < len(f.panels); i++ {
		p := &f.panels[i]
		p.heading = f.headingOf(p.spec.Y)
		p.heading.y = p.area.y1 + headingLift
	}
}

// xUnit is the unit at the end of the x axis.
func (f *frame) xUnit() string {
	if f.chart.X.Unit == "" && f.chart.X.Format == "hm" {
		return "h:min"
	}
	return f.chart.X.Unit
}

// empty reports whether no panel has a curve or a band to draw.
func (p panelFrame) empty() bool {
	for _, c := range p.drawn {
		if len(c) > 0 {
			return false
		}
	}
	for _, b := range p.spec.Bands {
		if len(bandRuns(b)) > 0 {
			return false
		}
	}
	return true
}
