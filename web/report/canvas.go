package report

import (
	"image"
	"image/color"
	"math"

	"codeberg.org/go-pdf/fpdf"
	xfont "golang.org/x/image/font"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
)

// A canvas is a vg.Canvas on the current page of a document in points. Its origin is at
// the lower left, as vg has it; the page's is at the upper left.
type canvas struct {
	doc  *fpdf.Fpdf
	pens []pen
}

// pen is the drawing state that Push saves.
type pen struct {
	a, b, c, d, e, f float64 // x' = a·x + c·y + e and y' = b·x + d·y + f, in points
	color            color.NRGBA
	width            float64 // in points
	dashes           []float64
}

var _ vg.Canvas = (*canvas)(nil)

// newCanvas is a canvas with its lower left corner at x and bottom on the page.
func newCanvas(doc *fpdf.Fpdf, x, bottom float64) *canvas {
	c := &canvas{doc: doc, pens: []pen{{a: 1, d: -1, e: x, f: bottom}}}
	vg.Initialize(c)
	return c
}

func (c *canvas) top() *pen                { return &c.pens[len(c.pens)-1] }
func (c *canvas) SetLineWidth(w vg.Length) { c.top().width = float64(w) }
func (c *canvas) SetColor(k color.Color) {
	c.top().color = color.NRGBA{A: 255}
	if k != nil {
		c.top().color = color.NRGBAModel.Convert(k).(color.NRGBA)
	}
}
func (c *canvas) SetLineDash(d []vg.Length, _ vg.Length) {
	c.top().dashes = nil
	for _, v := range d {
		c.top().dashes = append(c.top().dashes, float64(v))
	}
}
func (c *canvas) Push() { c.pens = append(c.pens, *c.top()) }
func (c *canvas) Pop()  { c.pens = c.pens[:len(c.pens)-1] }

// then composes the pen's map with another that is applied first.
func (c *canvas) then(a, b, cc, d, e, f float64) {
	p := c.top()
	p.a, p.b, p.c, p.d, p.e, p.f = p.a*a+p.c*b, p.b*a+p.d*b, p.a*cc+p.c*d, p.b*cc+p.d*d, p.a*e+p.c*f+p.e, p.b*e+p.d*f+p.f
}

func (c *canvas) Translate(p vg.Point) { c.then(1, 0, 0, 1, float64(p.X), float64(p.Y)) }
func (c *canvas) Scale(x, y float64)   { c.then(x, 0, 0, y, 0, 0) }
func (c *canvas) Rotate(rad float64) {
	sin, cos := math.Sincos(rad)
	c.then(cos, sin, -sin, cos, 0, 0)
}

func (c *canvas) at(x, y float64) (float64, float64) {
	p := c.top()
	return p.a*x + p.c*y + p.e, p.b*x + p.d*y + p.f
}

func (c *canvas) Stroke(p vg.Path) {
	t := c.top()
	if t.width <= 0 || len(p) == 0 {
		return
	}
	c.doc.SetDrawColor(int(t.color.R), int(t.color.G), int(t.color.B))
	scale := math.Hypot(t.a, t.b) // of lengths; charts are shrunk alike both ways
	c.doc.SetLineWidth(t.width * scale)
	c.doc.SetLineJoinStyle("round")
	if len(t.dashes) > 0 {
		dashes := make([]float64, len(t.dashes))
		for i, d := range t.dashes {
			dashes[i] = d * scale
		}
		c.doc.SetDashPattern(dashes, 0)
		defer c.doc.SetDashPattern(nil, 0)
	}
	c.path(p)
	c.doc.DrawPath("D")
}

func (c *canvas) Fill(p vg.Path) {
	if len(p) == 0 {
		return
	}
	t := c.top()
	c.doc.SetFillColor(int(t.color.R), int(t.color.G), int(t.color.B))
	c.path(p)
	c.doc.DrawPath("F")
}

// path puts p on the page, arcs as cubic pieces of at most a quarter turn.
func (c *canvas) path(p vg.Path) {
	var x, y float64 // where the path is, before the map
	move := func(px, py float64) { x, y = px, py; px, py = c.at(px, py); c.doc.MoveTo(px, py) }
	line := func(px, py float64) { x, y = px, py; px, py = c.at(px, py); c.doc.LineTo(px, py) }
	cubic := func(ax, ay, bx, by, px, py float64) {
		x, y = px, py
		ax, ay = c.at(ax, ay)
		bx, by = c.at(bx, by)
		px, py = c.at(px, py)
		c.doc.CurveBezierCubicTo(ax, ay, bx, by, px, py)
	}
	for i, s := range p {
		px, py := float64(s.Pos.X), float64(s.Pos.Y)
		switch s.Type {
		case vg.MoveComp:
			move(px, py)
		case vg.LineComp:
			line(px, py)
		case vg.CurveComp:
			switch len(s.Control) {
			case 1: // a quadratic piece, raised
				qx, qy := float64(s.Control[0].X), float64(s.Control[0].Y)
				cubic(x+2*(qx-x)/3, y+2*(qy-y)/3, px+2*(qx-px)/3, py+2*(qy-py)/3, px, py)
			case 2:
				cubic(float64(s.Control[0].X), float64(s.Control[0].Y), float64(s.Control[1].X), float64(s.Control[1].Y), px, py)
			default:
				line(px, py)
			}
		case vg.ArcComp:
			r := float64(s.Radius)
			sin, cos := math.Sincos(s.Start)
			if i == 0 {
				move(px+r*cos, py+r*sin)
			} else {
				line(px+r*cos, py+r*sin)
			}
			n := int(math.Ceil(math.Abs(s.Angle) / (math.Pi / 2)))
			for j := 1; j <= n; j++ {
				step := s.Angle / float64(n)
				k := 4.0 / 3 * math.Tan(step/4) * r
				s0, c0 := sin, cos
				sin, cos = math.Sincos(s.Start + float64(j)*step)
				cubic(px+r*c0-k*s0, py+r*s0+k*c0, px+r*cos+k*sin, py+r*sin-k*cos, px+r*cos, py+r*sin)
			}
		case vg.CloseComp:
			c.doc.ClosePath()
		}
	}
}

func (c *canvas) FillString(f font.Face, pt vg.Point, text string) {
	if f.Font.Size == 0 || text == "" {
		return
	}
	style := ""
	if f.Font.Weight >= xfont.WeightSemiBold {
		style = "B"
	}
	t := c.top()
	c.doc.SetTextColor(int(t.color.R), int(t.color.G), int(t.color.B))
	c.doc.SetFont(family, style, float64(f.Font.Size)*math.Hypot(t.a, t.b))
	x, y := c.at(float64(pt.X), float64(pt.Y))
	turn := -math.Atan2(t.b, t.a) * 180 / math.Pi
	if math.Abs(turn) < 1e-6 {
		c.doc.Text(x, y, set(text))
		return
	}
	c.doc.TransformBegin()
	c.doc.TransformRotate(turn, x, y)
	c.doc.Text(x, y, set(text))
	c.doc.TransformEnd()
}

// DrawImage does nothing: charts hold no images.
func (c *canvas) DrawImage(vg.Rectangle, image.Image) {}
