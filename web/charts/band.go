package charts

import (
	"cmp"
	"math"
	"slices"
)

// A bandRun is one connected piece of a band.
type bandRun struct{ lower, upper []point }

// bandRuns cuts a band to the pieces where Upper is above Lower, up to the exact crossing
// between two samples.
func bandRuns(b Band) []bandRun {
	var runs []bandRun
	var run bandRun
	flush := func() {
		if len(run.lower) > 1 {
			runs = append(runs, run)
		}
		run = bandRun{}
	}
	add := func(x, lower, upper float64) {
		run.lower = append(run.lower, point{x, lower})
		run.upper = append(run.upper, point{x, upper})
	}
	n := min(len(b.X), len(b.Lower), len(b.Upper))
	previous := -1 // the last usable sample without a gap since
	for i := range n {
		if !usable(b.X[i]) || !usable(b.Lower[i]) || !usable(b.Upper[i]) {
			flush()
			previous = -1
			continue
		}
		d := b.Upper[i] - b.Lower[i]
		if previous >= 0 {
			before := b.Upper[previous] - b.Lower[previous]
			if before*d < 0 {
				t := before / (before - d)
				y := b.Lower[previous] + t*(b.Lower[i]-b.Lower[previous])
				add(b.X[previous]+t*(b.X[i]-b.X[previous]), y, y)
			}
		}
		if d >= 0 {
			add(b.X[i], b.Lower[i], b.Upper[i])
		} else {
			flush()
		}
		previous = i
	}
	flush()
	return runs
}

// outline returns the closed outline of the run.
func (r bandRun) outline() []point {
	out := slices.Clone(r.lower)
	for i := len(r.upper) - 1; i >= 0; i-- {
		out = append(out, r.upper[i])
	}
	return out
}

// on maps the run to the canvas.
func (r bandRun) on(x, y scale) bandRun {
	return bandRun{curve{r.lower}.on(x, y)[0], curve{r.upper}.on(x, y)[0]}
}

// clamped moves what lies above or below the box to its edge.
func (r bandRun) clamped(b box) bandRun {
	for _, side := range [][]point{r.lower, r.upper} {
		for i := range side {
			side[i].y = min(max(side[i].y, b.y0), b.y1)
		}
	}
	return r
}

// measure returns the ends in x of the run and its area, to choose the run to label.
func (r bandRun) measure() (x0, x1, area float64) {
	x0, x1 = r.lower[0].x, r.lower[len(r.lower)-1].x
	for i := 1; i < len(r.lower); i++ {
		h := (r.upper[i].y - r.lower[i].y + r.upper[i-1].y - r.lower[i-1].y) / 2
		area += h * math.Abs(r.lower[i].x-r.lower[i-1].x)
	}
	return x0, x1, area
}

// hatch returns the strokes of 45° lines within a closed outline, a distance apart
// measured along x in points. The lines sit on a fixed grid so that neighbouring pieces match.
func hatch(outline []point, distance float64) [][2]point {
	if len(outline) < 3 {
		return nil
	}
	var e extent // of x − y, constant along one line
	for _, p := range outline {
		e.add(p.x - p.y)
	}
	var strokes [][2]point
	for k := math.Ceil(e.lo / distance); k*distance <= e.hi; k++ {
		offset := k * distance
		var cuts []point
		for i, q := range outline {
			p := outline[(i+len(outline)-1)%len(outline)]
			a, b := p.x-p.y-offset, q.x-q.y-offset
			if (a < 0) == (b < 0) {
				continue
			}
			t := a / (a - b)
			cuts = append(cuts, point{p.x + t*(q.x-p.x), p.y + t*(q.y-p.y)})
		}
		slices.SortFunc(cuts, func(a, b point) int { return cmp.Compare(a.x, b.x) })
		for i := 0; i+1 < len(cuts); i += 2 {
			strokes = append(strokes, [2]point{cuts[i], cuts[i+1]})
		}
	}
	return strokes
}
