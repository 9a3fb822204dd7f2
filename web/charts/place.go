package charts

import "math"

// A site is the free space of one panel in which labels look for a place.
type site struct {
	area   box
	curves []curve
	lines  []float64 // x of vertical lines in points
	levels []float64 // y of horizontal lines in points
	bands  []bandRun
	taken  []box
}

// Penalties, in the same arbitrary measure as a distance in points.
const (
	outside   = 1e6
	covers    = 1e4 // another label
	onCurve   = 1e3
	perHidden = 20.0 // for each point of a curve's length under the label
	onLine    = 45.0
	inBand    = 30.0 // for the label of a curve
	nearness  = 14.0 // a curve nearer than this disturbs, in points
)

// cost rates a place for a label; lower is better.
func (s *site) cost(b box) float64 {
	sum := 0.0
	if !b.within(s.area) {
		sum += outside
	}
	for _, t := range s.taken {
		if b.grown(2).overlaps(t) {
			sum += covers
		}
	}
	for _, c := range s.curves {
		d := c.distance(b, nearness)
		if d < 1 {
			sum += onCurve + perHidden*c.hiddenBy(b)
		}
		sum += 2 * (nearness - d)
	}
	for _, x := range s.lines {
		if x > b.x0-2 && x < b.x1+2 {
			sum += onLine
		}
	}
	for _, y := range s.levels {
		if y > b.y0 && y < b.y1 {
			sum += onLine
		}
	}
	return sum
}

// bandCost rates the middle of a box lying in a band, whose ground is not a curve's own.
func (s *site) bandCost(b box) float64 {
	x, y := (b.x0+b.x1)/2, (b.y0+b.y1)/2
	for _, r := range s.bands {
		lower, below := curve{r.lower}.at(x)
		upper, above := curve{r.upper}.at(x)
		if below && above && y > lower && y < upper {
			return inBand
		}
	}
	return 0
}

// choice keeps the best of the places tried.
type choice struct {
	w    words
	cost float64
	some bool
}

func (c *choice) try(w words, cost float64) {
	if !c.some || cost < c.cost {
		*c = choice{w, cost, true}
	}
}

// take reserves the chosen place; a label that would lie outside or on another label is
// dropped unless it must be shown.
func (s *site) take(c choice, must bool) (words, bool) {
	if !c.some || (!must && c.cost >= covers) {
		return words{}, false
	}
	s.taken = append(s.taken, c.w.box())
	return c.w, true
}

// alongCurve places the label of a curve: above, below or beside it, near a wanted share
// of its visible x range.
func (s *site) alongCurve(c curve, w words, wanted float64) (words, bool) {
	const steps, off = 24, 5.0
	w = w.measured()
	var x extent
	for _, run := range c {
		for _, p := range run {
			if p.x >= s.area.x0-0.5 && p.x <= s.area.x1+0.5 {
				x.add(p.x)
			}
		}
	}
	if !x.some {
		return words{}, false
	}
	sideways := c.turned()
	var best choice
	w.anchor = 0.5
	for i := range steps + 1 {
		share := float64(i) / steps
		px := x.lo + share*(x.hi-x.lo)
		py, ok := c.at(px)
		if !ok || py < s.area.y0-1 || py > s.area.y1+1 {
			continue
		}
		far := 90 * math.Abs(share-wanted)
		for _, place := range besides(c, sideways, w, point{px, py}, off, s.area) {
			gap := pointDistance(place.box(), point{px, py})
			best.try(place, far+2*max(gap-off, 0)+s.cost(place.box())+s.bandCost(place.box()))
		}
	}
	return s.take(best, false)
}

// besides returns the places on the four sides of a curve at a point of it, each just
// clear of the curve.
func besides(c, sideways curve, w words, at point, off float64, area box) []words {
	up := w
	up.x, up.y = at.x, at.y
	up = up.keptIn(area.x0+2, area.x1-2)
	b := up.box()
	over, under := up, up
	if e := c.yWithin(b.x0-2, b.x1+2); e.some {
		over.y = e.hi + off + descent*w.size
		under.y = e.lo - off - ascent*w.size
	}
	right, left := w, w
	right.y = at.y - middle*w.size
	left.y = right.y
	b = right.box()
	if e := sideways.yWithin(b.y0, b.y1); e.some {
		right.x, right.anchor = e.hi+off+1, 0
		left.x, left.anchor = e.lo-off-1, 1
	}
	return []words{over, under, right, left}
}

// within places the label of a band inside it, or next to it where it is too thin.
func (s *site) within(r bandRun, w words) (words, bool) {
	const steps = 16
	w = w.measured()
	x0, x1 := r.lower[0].x, r.lower[len(r.lower)-1].x
	lower, upper := curve{r.lower}, curve{r.upper}
	var best choice
	w.anchor = 0.5
	half := w.width()/2 + 3
	for i := range steps + 1 {
		w.x = x0 + float64(i)/steps*(x1-x0)
		lo, hi := lower.yWithin(w.x-half, w.x+half), upper.yWithin(w.x-half, w.x+half)
		if !lo.some || !hi.some {
			continue
		}
		aside := 40 * math.Abs(float64(i)/steps-0.5)
		room := hi.lo - lo.hi
		if w.x-half >= x0 && w.x+half <= x1 && room > 1.3*w.size {
			w.y = (hi.lo+lo.hi)/2 - middle*w.size
			best.try(w, aside+s.cost(w.box())-room/4)
		}
		out := w.keptIn(s.area.x0+2, s.area.x1-2)
		out.y = hi.hi + 6 + descent*w.size
		best.try(out, 100+aside+s.cost(out.box()))
		out.y = lo.lo - 6 - ascent*w.size
		best.try(out, 100+aside+s.cost(out.box()))
	}
	return s.take(best, false)
}

// along places the label of a horizontal line near its right end, or where there is room.
func (s *site) along(y float64, w words) (words, bool) {
	const steps = 12
	w = w.measured()
	var best choice
	for i := range steps + 1 {
		share := float64(i) / steps
		w.x, w.anchor = s.area.x1-2-w.width()/2-share*(s.area.x1-s.area.x0-4-w.width()), 0.5
		for _, base := range []float64{y + 3.5 + descent*w.size*0.6, y - 3 - ascent*w.size} {
			w.y = base
			best.try(w, 60*share+s.cost(w.box()))
		}
	}
	return s.take(best, false)
}

// A callout is the label of a flag: words on a plate that a line joins to the point.
type callout struct {
	plate box
	words words
	tip   point // end of the line on the plate in points
}

// around places the callout of a flag inside the data area.
func (s *site) around(at point, w words) callout {
	const padX, padY = 6, 3.5
	w = w.measured()
	width, height := w.width()+2*padX, (ascent+descent)*w.size+2*padY
	var best box
	lowest := math.Inf(1)
	for _, reach := range []float64{14, 26, 40, 58, 80} {
		for k := range 16 {
			sin, cos := math.Sincos(float64(k) * math.Pi / 8)
			cx := at.x + cos*(reach+width/2)
			cy := at.y + sin*(reach+height/2)
			b := box{cx - width/2, cy - height/2, cx + width/2, cy + height/2}
			b = b.movedInto(s.area.grown(-2))
			c := s.cost(b) + s.cost(b.grown(3))/10 + 0.8*reach
			if pointDistance(b, at) < 6 {
				c += covers
			}
			if c < lowest {
				best, lowest = b, c
			}
		}
	}
	s.taken = append(s.taken, best)
	w.x, w.y, w.anchor = (best.x0+best.x1)/2, best.y0+padY+descent*w.size, 0.5
	tip := point{min(max(at.x, best.x0+8), best.x1-8), min(max(at.y, best.y0), best.y1)}
	const beads = 8 // boxes along the line, which keep other labels off it
	for i := range beads {
		t := float64(i) / beads
		p := point{at.x + t*(tip.x-at.x), at.y + t*(tip.y-at.y)}
		s.taken = append(s.taken, box{p.x, p.y, p.x, p.y}.grown(2))
	}
	return callout{best, w, tip}
}

// movedInto shifts the box into another, towards the lower left where it is too large.
func (b box) movedInto(o box) box {
	dx := max(min(0, o.x1-b.x1), o.x0-b.x0)
	dy := max(min(0, o.y1-b.y1), o.y0-b.y0)
	return box{b.x0 + dx, b.y0 + dy, b.x1 + dx, b.y1 + dy}
}
