package envelope_test

import (
	"math"
	"reflect"
	"testing"

	"legwright/internal/perf/envelope"
)

// field samples a function on n speeds of 0 to 10 m/s and m altitudes of 0 to 10 m.
func field(n, m int, f func(v, h float64) float64) *envelope.Grid {
	g := &envelope.Grid{Load: 1}
	for j := range m {
		l := envelope.Level{Altitude: 10 * float64(j) / float64(m-1), Stall: 0, Top: 10}
		for i := range n {
			v := 10 * float64(i) / float64(n-1)
			l.Nodes = append(l.Nodes, envelope.Node{TAS: v, Excess: f(v, l.Altitude), Known: true})
		}
		g.Levels = append(g.Levels, l)
	}
	return g
}

func TestContourOfACone(t *testing.T) {
	g := field(41, 41, func(v, h float64) float64 { return -math.Hypot(v-5, h-5) })
	lines := g.Contours(-3)
	if len(lines) != 1 || !lines[0].Closed || lines[0].Points[0] != lines[0].Points[len(lines[0].Points)-1] {
		t.Fatalf("a circle of %d lines, %+v", len(lines), lines)
	}
	length := 0.0
	for i, p := range lines[0].Points {
		// Linear interpolation on cells of 0.25 errs by at most about the square of half a diagonal over twice the radius.
		if r := math.Hypot(p.TAS-5, p.Altitude-5); math.Abs(r-3) > 0.01 {
			t.Errorf("point %+v lies %g from the middle, want 3", p, r)
		}
		if i > 0 {
			q := lines[0].Points[i-1]
			step := math.Hypot(p.TAS-q.TAS, p.Altitude-q.Altitude)
			if step > 0.36 {
				t.Errorf("a jump of %g to point %d", step, i)
			}
			length += step
		}
	}
	if math.Abs(length-6*math.Pi) > 0.05 {
		t.Errorf("circumference %g, want %g", length, 6*math.Pi)
	}
	if again := g.Contours(-3); !reflect.DeepEqual(again, lines) {
		t.Error("the same grid gives other lines")
	}
	if far := g.Contours(1); len(far) != 0 {
		t.Errorf("lines above the top: %+v", far)
	}
}

// A plane gives one straight open line from border to border; where two hills meet, two lines do not cross.
func TestContourOfAPlaneAndASaddle(t *testing.T) {
	plane := field(11, 7, func(v, h float64) float64 { return v + 2*h }).Contours(8.5)
	if len(plane) != 1 || plane[0].Closed {
		t.Fatalf("a plane gives %+v", plane)
	}
	for _, p := range plane[0].Points {
		if math.Abs(p.TAS+2*p.Altitude-8.5) > 1e-12 {
			t.Errorf("%+v is not on the line", p)
		}
	}
	ends := []envelope.Point{plane[0].Points[0], plane[0].Points[len(plane[0].Points)-1]}
	for _, e := range ends {
		if e.TAS > 1e-12 && e.Altitude > 1e-12 {
			t.Errorf("ends at %+v, inside the grid", e)
		}
	}
	for _, c := range []struct{ level, side float64 }{{0.1, 1}, {-0.1, -1}} {
		saddle := field(10, 10, func(v, h float64) float64 { return (v - 5) * (h - 5) }).Contours(c.level)
		if len(saddle) != 2 {
			t.Fatalf("a saddle gives %d lines at %g", len(saddle), c.level)
		}
		for _, l := range saddle {
			side := math.Copysign(1, l.Points[0].TAS-5)
			for _, p := range l.Points {
				if (p.TAS-5)*side < 0 || (p.TAS-5)*(p.Altitude-5)*c.side < 0 {
					t.Errorf("a line at %g crosses the saddle at %+v", c.level, p)
				}
			}
		}
	}
}

func TestContourStopsAtTheUnknown(t *testing.T) {
	g := field(11, 11, func(v, h float64) float64 { return h })
	g.Levels[4].Nodes[5].Known = false
	lines := g.Contours(4.5)
	if len(lines) != 2 {
		t.Fatalf("%d lines beside a hole, want 2", len(lines))
	}
	for _, l := range lines {
		for _, p := range l.Points {
			if p.TAS > 4+1e-9 && p.TAS < 6-1e-9 {
				t.Errorf("a line through the hole at %+v", p)
			}
		}
	}
	if g.Whole() || !field(3, 3, func(v, h float64) float64 { return 0 }).Whole() {
		t.Error("a hole is not noticed, or one is that is not there")
	}
	if lines := (&envelope.Grid{}).Contours(0); lines != nil {
		t.Errorf("an empty grid has %+v", lines)
	}
}
