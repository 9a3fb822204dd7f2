package charts

import (
	"math"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// An affine maps x to a·x + c·y + e and y to b·x + d·y + f.
type affine struct{ a, b, c, d, e, f float64 }

// after returns the map that applies n first and then m.
func (m affine) after(n affine) affine {
	return affine{
		m.a*n.a + m.c*n.b, m.b*n.a + m.d*n.b,
		m.a*n.c + m.c*n.d, m.b*n.c + m.d*n.d,
		m.a*n.e + m.c*n.f + m.e, m.b*n.e + m.d*n.f + m.f,
	}
}

func (m affine) apply(x, y float64) (float64, float64) {
	return m.a*x + m.c*y + m.e, m.b*x + m.d*y + m.f
}

// pathWriter turns a vg.Path into SVG path data in final coordinates.
type pathWriter struct {
	m    affine
	out  []byte
	x, y float64 // current point before the map
}

func (w *pathWriter) command(letter byte, xy ...float64) {
	w.out = append(w.out, letter)
	for i := 0; i+1 < len(xy); i += 2 {
		if i > 0 {
			w.out = append(w.out, ' ')
		}
		x, y := w.m.apply(xy[i], xy[i+1])
		w.out = appendCoord(w.out, x)
		w.out = append(w.out, ' ')
		w.out = appendCoord(w.out, y)
	}
	if n := len(xy); n >= 2 {
		w.x, w.y = xy[n-2], xy[n-1]
	}
}

func (w *pathWriter) path(p vg.Path) {
	for i, c := range p {
		x, y := float64(c.Pos.X), float64(c.Pos.Y)
		switch c.Type {
		case vg.MoveComp:
			w.command('M', x, y)
		case vg.LineComp:
			w.command('L', x, y)
		case vg.ArcComp:
			w.arc(c, i == 0)
		case vg.CurveComp:
			w.curve(c)
		case vg.CloseComp:
			w.command('Z')
		}
	}
}

func (w *pathWriter) curve(c vg.PathComp) {
	x, y := float64(c.Pos.X), float64(c.Pos.Y)
	switch len(c.Control) {
	case 1:
		w.command('Q', float64(c.Control[0].X), float64(c.Control[0].Y), x, y)
	case 2:
		w.command('C', float64(c.Control[0].X), float64(c.Control[0].Y),
			float64(c.Control[1].X), float64(c.Control[1].Y), x, y)
	default:
		w.command('L', x, y)
	}
}

// arc writes a circular arc as cubic pieces of at most a quarter turn.
func (w *pathWriter) arc(c vg.PathComp, first bool) {
	n := int(math.Ceil(math.Abs(c.Angle) / (math.Pi / 2)))
	r, cx, cy := float64(c.Radius), float64(c.Pos.X), float64(c.Pos.Y)
	sin, cos := math.Sincos(c.Start)
	if first {
		w.command('M', cx+r*cos, cy+r*sin)
	} else {
		w.command('L', cx+r*cos, cy+r*sin)
	}
	if n == 0 {
		return
	}
	step := c.Angle / float64(n)
	k := 4.0 / 3 * math.Tan(step/4) * r
	for i := 1; i <= n; i++ {
		s0, c0 := sin, cos
		sin, cos = math.Sincos(c.Start + float64(i)*step)
		w.command('C', cx+r*c0-k*s0, cy+r*s0+k*c0, cx+r*cos+k*sin, cy+r*sin-k*cos, cx+r*cos, cy+r*sin)
	}
}

// appendCoord appends v with at most two decimals and never as "-0".
func appendCoord(b []byte, v float64) []byte {
	r := math.Round(v*100) / 100
	if r == 0 {
		r = 0 // drops the sign of a negative zero
	}
	return strconv.AppendFloat(b, r, 'f', -1, 64)
}

func coord(v float64) string { return string(appendCoord(nil, v)) }
