package loads

import (
	"math"
	"slices"

	"legwright/internal/perf/atmos"
)

// drawn is how many evenly spaced speeds the envelope is drawn at, beside its corners.
const drawn = 121

// draw fills the points and the extremes. Between two corners the envelope is a straight
// line or the parabola of a stall, so that its extremes lie at corners.
func (g *Diagram) draw() {
	speeds := g.corners()
	for i := range drawn - 1 { // VD itself is a corner
		speeds = append(speeds, g.Design.Dive*float64(i)/(drawn-1))
	}
	slices.Sort(speeds)
	speeds = slices.Compact(speeds)
	for _, v := range speeds {
		p := g.at(v)
		g.Points = append(g.Points, p)
		if e := p.Envelope; e.Up > g.Greatest.Load+tie {
			g.Greatest = Extreme{v, e.Up, p.Gust.Up > p.Maneuver.Up+tie}
		}
		if e := p.Envelope; e.Down < g.Smallest.Load-tie {
			g.Smallest = Extreme{v, e.Down, p.Gust.Down < p.Maneuver.Down-tie}
		}
	}
}

// tie is the difference of load factor below which two are the same.
const tie = 1e-9

// corners are the speeds in m/s, 0 to VD, at which a limit of the envelope gives way to another.
func (g *Diagram) corners() []float64 {
	d := &g.Design
	list := []float64{0, d.Cruise, d.Dive, g.Stall, g.NegativeStall}
	mu, md, gu, gd := g.spans()
	q := 0.5 * atmos.SeaLevelDensity / (g.Loading * atmos.Gravity)
	for i := range 2 {
		list = append(list, mu[i].crosses(gu[i])...)
		list = append(list, md[i].crosses(gd[i])...)
		for _, s := range []span{mu[i], gu[i]} {
			list = append(list, s.crossesParabola(q*d.Airframe.CLMax)...)
		}
		for _, s := range []span{md[i], gd[i]} {
			list = append(list, s.crossesParabola(q*d.NegativeCL)...)
		}
	}
	return slices.DeleteFunc(list, func(v float64) bool { return !(v >= 0 && v <= d.Dive) })
}

// crosses is the speed, if any, at which two lines over the same range meet.
func (s span) crosses(o span) []float64 {
	a, b := s.n0-o.n0, s.n1-o.n1
	if a*b >= 0 {
		return nil
	}
	return []float64{s.v0 + (s.v1-s.v0)*a/(a-b)}
}

// crossesParabola is the speeds within the range at which n = k·v² meets the line.
func (s span) crossesParabola(k float64) []float64 {
	if s.v1 == s.v0 || k == 0 {
		return nil
	}
	// k·v² = slope·v + base
	slope := (s.n1 - s.n0) / (s.v1 - s.v0)
	base := s.n0 - slope*s.v0
	root := slope*slope + 4*k*base
	if root < 0 {
		return nil
	}
	// Both roots without the difference of two near numbers: W. H. Press et al., Numerical Recipes, 2nd edition, 1992, section 5.6.
	half := (slope + math.Copysign(math.Sqrt(root), slope)) / 2
	var list []float64
	for _, v := range []float64{half / k, -base / half} {
		if v >= s.v0 && v <= s.v1 {
			list = append(list, v)
		}
	}
	return list
}
