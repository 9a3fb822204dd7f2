package envelope

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// A Node is one speed at one altitude.
type Node struct {
	TAS    float64 // true airspeed in m/s
	Excess float64 // specific excess power in m/s; meaningless unless Known
	Known  bool    // false where the powerplant has no answer
}

// A Level is one altitude from the stall to the never-exceed speed.
type Level struct {
	Altitude float64 // pressure altitude in m
	Stall    float64 // true airspeed in m/s
	Top      float64 // true airspeed of the never-exceed speed in m/s
	Nodes    []Node  // at equal steps from Stall to Top
}

// A Grid holds levels at rising altitudes. Its columns follow the stall and the
// never-exceed speed, so that both bounds are edges of the grid and not steps across it.
type Grid struct {
	Load   float64 // load factor, dimensionless, >= 1
	Levels []Level
}

// A Case is what is flown.
type Case struct {
	Aircraft *aircraft.Aircraft
	Day      atmos.Day
	Mass     float64 // in kg, > 0
	Config   aircraft.Config
	Load     float64 // load factor, dimensionless, >= 1
}

// NewGrid computes the specific excess power at n >= 2 speeds on each of m >= 2
// altitudes from low to high in m. It ends early at the altitude where the
// stall reaches the never-exceed speed.
func NewGrid(c Case, low, high float64, n, m int) (Grid, error) {
	g := Grid{Load: c.Load}
	for j := range m {
		hp := low + (high-low)*float64(j)/float64(m-1)
		l, err := c.level(hp, n)
		if err != nil {
			if j == 0 {
				return g, err
			}
			break
		}
		g.Levels = append(g.Levels, l)
	}
	return g, nil
}

// level computes n nodes at the pressure altitude hp in m.
func (c Case) level(hp float64, n int) (Level, error) {
	air, err := c.Day.At(hp, nil)
	if err != nil {
		return Level{}, err
	}
	p := &pointperf.Point{Air: air, Mass: c.Mass, Config: c.Config}
	l := Level{Altitude: hp, Stall: pointperf.Stall(c.Aircraft, p, nil) * math.Sqrt(c.Load), Top: air.FromCAS(atmos.CAS(c.Aircraft.NeverExceed()))}
	if !(l.Stall < l.Top) {
		return l, units.Errorf(nil, "at {} the stall, {}, lies above the never-exceed speed, {}", units.Of(units.Altitude, hp), units.Of(units.Speed, l.Stall), units.Of(units.Speed, l.Top))
	}
	for i := range n {
		node := Node{TAS: l.Stall + (l.Top-l.Stall)*float64(i)/float64(n-1)}
		if v, err := Excess(c.Aircraft, p, node.TAS, c.Load, nil); err == nil {
			node.Excess, node.Known = v, true
		}
		l.Nodes = append(l.Nodes, node)
	}
	return l, nil
}

// Most is the greatest specific excess power of the grid in m/s and where it is; ok is false when none is known.
func (g *Grid) Most() (best Node, altitude float64, ok bool) {
	for _, l := range g.Levels {
		for _, n := range l.Nodes {
			if n.Known && (!ok || n.Excess > best.Excess) {
				best, altitude, ok = n, l.Altitude, true
			}
		}
	}
	return best, altitude, ok
}

// Whole reports whether the powerplant has an answer at every node.
func (g *Grid) Whole() bool {
	for _, l := range g.Levels {
		for _, n := range l.Nodes {
			if !n.Known {
				return false
			}
		}
	}
	return true
}

// At interpolates the specific excess power in m/s at the true airspeed tas in
// m/s; ok is false outside the speeds of the level and where it is not known.
func (l *Level) At(tas float64) (excess float64, ok bool) {
	last := len(l.Nodes) - 1
	if last < 1 || !(tas >= l.Stall && tas <= l.Top) {
		return 0, false
	}
	s := (tas - l.Stall) / (l.Top - l.Stall) * float64(last)
	i := min(int(s), last-1)
	a, b := l.Nodes[i], l.Nodes[i+1]
	if !a.Known || !b.Known {
		return 0, false
	}
	t := s - float64(i)
	return a.Excess + t*(b.Excess-a.Excess), true
}

// A Column is the altitudes at one speed at which full thrust holds level flight, and those at
// which only thrust is missing.
type Column struct {
	TAS   float64 // true airspeed in m/s
	Flown Range   // thrust suffices
	Short Range   // it does not
}

// A Range is an interval of pressure altitude; empty when Low is above High.
type Range struct {
	Low  float64 // pressure altitude in m
	High float64 // pressure altitude in m
}

// Some reports whether the range holds an altitude, if only one.
func (r Range) Some() bool { return r.Low <= r.High }

// Columns cuts the grid at n >= 2 speeds from its slowest to its fastest.
func (g *Grid) Columns(n int) []Column {
	if len(g.Levels) < 2 {
		return nil
	}
	slow, fast := math.Inf(1), 0.0
	for _, l := range g.Levels {
		slow, fast = math.Min(slow, l.Stall), math.Max(fast, l.Top)
	}
	list := make([]Column, n)
	for i := range n {
		list[i] = g.column(slow + (fast-slow)*float64(i)/float64(n-1))
	}
	return list
}

func (g *Grid) column(tas float64) Column {
	none := Range{math.Inf(1), math.Inf(-1)}
	c := Column{TAS: tas, Flown: none, Short: none}
	for j := 1; j < len(g.Levels); j++ {
		a, b := &g.Levels[j-1], &g.Levels[j]
		ea, okA := a.At(math.Min(math.Max(tas, a.Stall), a.Top))
		eb, okB := b.At(math.Min(math.Max(tas, b.Stall), b.Top))
		if !okA || !okB {
			continue
		}
		within := share{0, 1}.cut(tas-a.Stall, tas-b.Stall).cut(a.Top-tas, b.Top-tas)
		c.Flown.widen(a.Altitude, b.Altitude, within.cut(ea, eb))
		c.Short.widen(a.Altitude, b.Altitude, within.cut(-ea, -eb))
	}
	return c
}

// A share is a part of the way from one level to the next.
type share struct{ from, to float64 }

// cut keeps the part in which a value that runs evenly from a to b is not negative.
func (s share) cut(a, b float64) share {
	switch {
	case a >= 0 && b >= 0:
		return s
	case a < 0 && b < 0:
		return share{1, 0}
	}
	at := a / (a - b)
	if a < 0 {
		return share{math.Max(s.from, at), s.to}
	}
	return share{s.from, math.Min(s.to, at)}
}

func (r *Range) widen(low, high float64, s share) {
	if s.from <= s.to {
		r.Low = math.Min(r.Low, low+s.from*(high-low))
		r.High = math.Max(r.High, low+s.to*(high-low))
	}
}
