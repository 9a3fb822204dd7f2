package charts

import "math"

type point struct{ x, y float64 }

// A curve is a series without its gaps: runs of consecutive usable points.
type curve [][]point

// newCurve splits points at values that cannot be drawn.
func newCurve(x, y []float64) curve {
	var c curve
	var run []point
	for i := range min(len(x), len(y)) {
		if usable(x[i]) && usable(y[i]) {
			run = append(run, point{x[i], y[i]})
			continue
		}
		if len(run) > 0 {
			c, run = append(c, run), nil
		}
	}
	if len(run) > 0 {
		c = append(c, run)
	}
	return c
}

// at interpolates at x. At a step it gives the later value; where the curve passes x more
// than once, the last.
func (c curve) at(x float64) (float64, bool) {
	for i := len(c) - 1; i >= 0; i-- {
		run := c[i]
		if last := run[len(run)-1]; last.x == x {
			return last.y, true
		}
		for j := len(run) - 1; j > 0; j-- {
			a, b := run[j-1], run[j]
			if (a.x-x)*(b.x-x) > 0 || a.x == b.x {
				continue
			}
			return a.y + (b.y-a.y)*((x-a.x)/(b.x-a.x)), true
		}
		if run[0].x == x {
			return run[0].y, true
		}
	}
	return 0, false
}

// on maps the curve to the canvas.
func (c curve) on(x, y scale) curve {
	out := make(curve, len(c))
	for i, run := range c {
		out[i] = make([]point, len(run))
		for j, p := range run {
			out[i][j] = point{x.at(p.x), y.at(p.y)}
		}
	}
	return out
}

// yWithin returns the extent of y over an interval of x.
func (c curve) yWithin(x0, x1 float64) extent {
	var e extent
	for _, run := range c {
		for j := 1; j < len(run); j++ {
			a, b := run[j-1], run[j]
			if a.x > b.x {
				a, b = b, a
			}
			if b.x < x0 || a.x > x1 {
				continue
			}
			if b.x == a.x {
				e.add(a.y)
				e.add(b.y)
				continue
			}
			slope := (b.y - a.y) / (b.x - a.x)
			e.add(a.y + slope*(max(a.x, x0)-a.x))
			e.add(a.y + slope*(min(b.x, x1)-a.x))
		}
	}
	return e
}

// turned swaps the axes.
func (c curve) turned() curve {
	out := make(curve, len(c))
	for i, run := range c {
		out[i] = make([]point, len(run))
		for j, p := range run {
			out[i][j] = point{p.y, p.x}
		}
	}
	return out
}

// distance returns how far a box is from the curve, 0 when they meet; distances above
// far may be returned as far.
func (c curve) distance(b box, far float64) float64 {
	best := far
	for _, run := range c {
		for j, p := range run {
			if j == 0 {
				if len(run) == 1 {
					best = min(best, pointDistance(b, p))
				}
				continue
			}
			q := run[j-1]
			if max(p.x, q.x) < b.x0-best || min(p.x, q.x) > b.x1+best ||
				max(p.y, q.y) < b.y0-best || min(p.y, q.y) > b.y1+best {
				continue
			}
			best = min(best, segmentDistance(b, q, p))
		}
	}
	return best
}

// hiddenBy returns the length of the curve under a box.
func (c curve) hiddenBy(b box) float64 {
	sum := 0.0
	for _, run := range c {
		for j := 1; j < len(run); j++ {
			p, q := run[j-1], run[j]
			if max(p.x, q.x) < b.x0 || min(p.x, q.x) > b.x1 || max(p.y, q.y) < b.y0 || min(p.y, q.y) > b.y1 {
				continue
			}
			// Liang and Barsky, A new concept and method for line clipping, 1984.
			t0, t1 := 0.0, 1.0
			for _, side := range [4][2]float64{
				{p.x - q.x, p.x - b.x0}, {q.x - p.x, b.x1 - p.x}, {p.y - q.y, p.y - b.y0}, {q.y - p.y, b.y1 - p.y},
			} {
				switch {
				case side[0] < 0:
					t0 = max(t0, side[1]/side[0])
				case side[0] > 0:
					t1 = min(t1, side[1]/side[0])
				case side[1] < 0:
					t1 = -1
				}
			}
			if t1 > t0 {
				sum += (t1 - t0) * math.Hypot(q.x-p.x, q.y-p.y)
			}
		}
	}
	return sum
}

func pointDistance(b box, p point) float64 {
	dx := max(b.x0-p.x, 0, p.x-b.x1)
	dy := max(b.y0-p.y, 0, p.y-b.y1)
	return math.Hypot(dx, dy)
}

// segmentDistance samples a segment as finely as a label is high; that is near enough
// for choosing between places.
func segmentDistance(b box, p, q point) float64 {
	n := int(math.Hypot(q.x-p.x, q.y-p.y)/3) + 1
	n = min(n, 400)
	best := math.Inf(1)
	for i := 0; i <= n; i++ {
		t := float64(i) / float64(n)
		best = min(best, pointDistance(b, point{p.x + t*(q.x-p.x), p.y + t*(q.y-p.y)}))
	}
	return best
}
