package envelope

import "slices"

// A Point is a place on the grid.
type Point struct {
	TAS      float64 // true airspeed in m/s
	Altitude float64 // pressure altitude in m
}

// A Contour is one unbroken line of equal specific excess power.
type Contour struct {
	Excess float64 // in m/s
	Points []Point
	Closed bool // the last point is the first again
}

// Contours traces the lines of the specific excess power excess in m/s by marching
// squares, with linear interpolation along the edges of the grid. A saddle
// is parted by the mean of its four corners. Cells with an unknown corner hold
// no line. Open lines come before closed ones, both in the order of the grid,
// so that the same grid always gives the same lines.
func (g *Grid) Contours(excess float64) []Contour {
	t := newTracer(g, excess)
	if t == nil {
		return nil
	}
	for j := range t.rows - 1 {
		for i := range t.columns - 1 {
			t.cell(i, j)
		}
	}
	return t.lines()
}

// A tracer numbers the edges of the grid: even numbers run along a level from
// node k/2 to the next, odd ones from node k/2 to the level above.
type tracer struct {
	g             *Grid
	level         float64 // in m/s
	columns, rows int
	next          [][]int // the edges that each edge is joined to, at most two
}

func newTracer(g *Grid, level float64) *tracer {
	t := &tracer{g: g, level: level, rows: len(g.Levels)}
	if t.rows < 2 {
		return nil
	}
	t.columns = len(g.Levels[0].Nodes)
	t.next = make([][]int, 2*t.columns*t.rows)
	return t
}

func (t *tracer) node(i, j int) Node     { return t.g.Levels[j].Nodes[i] }
func (t *tracer) above(i, j int) bool    { return t.node(i, j).Excess >= t.level }
func (t *tracer) along(i, j int) int     { return 2 * (j*t.columns + i) }
func (t *tracer) upward(i, j int) int    { return 2*(j*t.columns+i) + 1 }
func (t *tracer) join(a, b int)          { t.next[a], t.next[b] = append(t.next[a], b), append(t.next[b], a) }
func (t *tracer) place(k int) (i, j int) { return k / 2 % t.columns, k / 2 / t.columns }

// cell joins the edges of one cell that the line crosses.
func (t *tracer) cell(i, j int) {
	corners := [4]Node{t.node(i, j), t.node(i+1, j), t.node(i+1, j+1), t.node(i, j+1)}
	sum := 0.0
	for _, n := range corners {
		if !n.Known {
			return
		}
		sum += n.Excess / 4
	}
	edges := [4]int{t.along(i, j), t.upward(i+1, j), t.along(i, j+1), t.upward(i, j)} // below, right, above, left
	var crossed []int
	for k := range corners {
		if (corners[k].Excess >= t.level) != (corners[(k+1)%4].Excess >= t.level) {
			crossed = append(crossed, edges[k])
		}
	}
	switch {
	case len(crossed) == 2:
		t.join(crossed[0], crossed[1])
	case len(crossed) == 4 && (sum >= t.level) == t.above(i, j): // the corners at lower left and upper right are joined
		t.join(edges[0], edges[1])
		t.join(edges[2], edges[3])
	case len(crossed) == 4:
		t.join(edges[0], edges[3])
		t.join(edges[1], edges[2])
	}
}

// lines walks the joined edges, those with one neighbour first.
func (t *tracer) lines() []Contour {
	var list []Contour
	done := make([]bool, len(t.next))
	for _, ends := range []int{1, 2} {
		for k := range t.next {
			if len(t.next[k]) == ends && !done[k] {
				list = append(list, t.walk(k, done))
			}
		}
	}
	return list
}

func (t *tracer) walk(k int, done []bool) Contour {
	c := Contour{Excess: t.level, Closed: len(t.next[k]) == 2}
	start := k
	for k >= 0 {
		done[k] = true
		c.Points = append(c.Points, t.crossing(k))
		at := slices.IndexFunc(t.next[k], func(n int) bool { return !done[n] })
		if at < 0 {
			break
		}
		k = t.next[k][at]
	}
	if c.Closed {
		c.Points = append(c.Points, t.crossing(start))
	}
	return c
}

// crossing is where the line crosses an edge.
func (t *tracer) crossing(k int) Point {
	i, j := t.place(k)
	a, hp := t.node(i, j), t.g.Levels[j].Altitude
	b, high := Node{}, hp
	if k%2 == 0 {
		b = t.node(i+1, j)
	} else {
		b, high = t.node(i, j+1), t.g.Levels[j+1].Altitude
	}
	s := (t.level - a.Excess) / (b.Excess - a.Excess)
	return Point{a.TAS + s*(b.TAS-a.TAS), hp + s*(high-hp)}
}
