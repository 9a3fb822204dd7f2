package study

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/propeller"
)

// StaticThrust is the thrust at rest on the departure strip held against the
// greatest that momentum theory allows for the same shaft power, density and disc.
type StaticThrust struct {
	Has    bool    // there is a propeller at rest whose diameter is known
	Thrust float64 // in N
	Power  float64 // shaft power in W
	Bound  float64 // in N
}

// Share is the thrust over its bound, dimensionless.
func (t StaticThrust) Share() float64 { return t.Thrust / t.Bound }

func (s *Study) staticThrust(c powerplant.Curves) StaticThrust {
	if c == nil || s.staticErr != nil || s.Static.Shaft.Power <= 0 {
		return StaticThrust{}
	}
	t := StaticThrust{Has: true, Thrust: s.Static.Thrust, Power: s.Static.Shaft.Power}
	t.Bound = propeller.StaticBound(s.Project.Departure.Air.Density, c.Propeller().Diameter, t.Power, nil)
	return t
}

// Burn is the range of what the engine drinks over the airborne legs of the mission.
type Burn struct {
	Has                 bool
	Low, High           float64 // fuel per brake work in kg/J
	LowShare, HighShare float64 // share of the rated power, dimensionless
	FlowLow, FlowHigh   float64 // fuel flow in kg/s
}

// burn looks at the airborne samples whose engine pulls. The brake power is the
// fraction of the rated power that the powerplant reports.
func (s *Study) burn(c powerplant.Curves) Burn {
	var b Burn
	if c == nil {
		return b
	}
	rated := c.Engine().RatedPower
	for i := range s.Flight.Trace {
		t := &s.Flight.Trace[i]
		o := &t.Output
		if l := &s.Project.Spec.Legs[t.Leg]; !l.Airborne() || l.Kind == mission.Descent {
			continue
		}
		if o.Limits&powerplant.Idling != 0 || o.Fraction <= 0 || o.FuelFlow <= 0 {
			continue
		}
		b.take(o.FuelFlow/(o.Fraction*rated), o.Fraction, o.FuelFlow)
	}
	return b
}

func (b *Burn) take(perWork, share, flow float64) {
	if !b.Has {
		*b = Burn{Has: true, Low: perWork, High: perWork, LowShare: share, HighShare: share, FlowLow: flow, FlowHigh: flow}
		return
	}
	b.Low, b.High = math.Min(b.Low, perWork), math.Max(b.High, perWork)
	b.LowShare, b.HighShare = math.Min(b.LowShare, share), math.Max(b.HighShare, share)
	b.FlowLow, b.FlowHigh = math.Min(b.FlowLow, flow), math.Max(b.FlowHigh, flow)
}

// A LapseCurve is full-throttle power at the propeller at the rated speed over pressure altitude.
type LapseCurve struct {
	Deviation float64   // of temperature from standard in K
	Altitude  []float64 // pressure altitude in m, rising
	Power     []float64 // in W, >= 0
}

const (
	lapsePoints = 61
	leastLapse  = 4500 // greatest pressure altitude shown at least, in m
)

// lapseCurves are the lapse on the standard day and, where it differs, on the view's.
func (s *Study) lapseCurves(c powerplant.Curves) []LapseCurve {
	if c == nil {
		return nil
	}
	top := math.Max(leastLapse, 1.2*c.Engine().CriticalAltitude)
	top = math.Max(top, 1.05*s.View.Altitude)
	if s.Absolute.Err == nil {
		top = math.Max(top, s.Absolute.Value)
	}
	deviations := []float64{0}
	if s.View.Deviation != 0 {
		deviations = append(deviations, s.View.Deviation)
	}
	var list []LapseCurve
	for _, d := range deviations {
		l := LapseCurve{Deviation: d}
		for i := range lapsePoints {
			hp := top * float64(i) / (lapsePoints - 1)
			air, err := atmos.Day{Deviation: d, Humidity: s.Project.Plan.Day.Humidity}.At(hp, nil)
			if err != nil {
				break
			}
			l.Altitude, l.Power = append(l.Altitude, hp), append(l.Power, c.FullPower(&air, c.Engine().RatedSpeed))
		}
		list = append(list, l)
	}
	return list
}

// A PropellerLoad is the power that a fixed-pitch propeller takes over engine
// speed at one true airspeed in the view's air. Where it meets the engine's full
// power the engine turns.
type PropellerLoad struct {
	Name   string    // of the operating point
	TAS    float64   // true airspeed in m/s
	Speeds []float64 // engine speed in rev/s, rising
	Power  []float64 // absorbed in W
}

// propellerLoads are the loads at the marked points of the view.
func (s *Study) propellerLoads(p *Plant) []PropellerLoad {
	if p.Curves == nil || p.Curves.Propeller().High == 0 {
		return nil
	}
	e, prop := p.Curves.Engine(), p.Curves.Propeller()
	rho := p.Runs[p.View].Air.Density
	low, high := p.SpeedRange()
	var list []PropellerLoad
	for _, m := range p.Marked {
		if m.Err != nil {
			continue
		}
		l := PropellerLoad{Name: m.Name, TAS: m.TAS}
		for i := range lapsePoints {
			speed := low + (high-low)*float64(i)/(lapsePoints-1)
			n := speed / e.GearRatio
			_, cp, known := p.Curves.Coefficients(m.TAS / (n * prop.Diameter))
			if known {
				l.Speeds = append(l.Speeds, speed)
				l.Power = append(l.Power, cp*rho*math.Pow(n, 3)*math.Pow(prop.Diameter, 5))
			}
		}
		list = append(list, l)
	}
	return list
}

// SpeedRange are the engine speeds in rev/s between which power is worth
// showing: from below the power table, or the slowest marked point, to the greatest speed.
func (p *Plant) SpeedRange() (low, high float64) {
	e := p.Curves.Engine()
	low, high = 0.55*e.Greatest, e.Greatest
	if e.Lowest > 0 {
		low = math.Min(low, 0.95*e.Lowest)
	}
	for _, m := range p.Marked {
		if n := m.Out.Shaft.EngineSpeed; m.Err == nil && n > 0 {
			low = math.Min(low, 0.9*n)
		}
	}
	return low, high
}

// A PropellerRow is one advance ratio of a propeller table.
type PropellerRow struct {
	J          float64 // advance ratio, dimensionless
	CT         float64 // thrust coefficient, dimensionless
	CP         float64 // power coefficient, dimensionless
	Efficiency float64 // J CT/CP, dimensionless, >= 0; meaningless unless Pulls
	Pulls      bool    // thrust is not negative and power is absorbed
}

const sweepPoints = 81

// propellerRows are the rows as entered and a fine sweep between the ends of the table.
func propellerRows(c powerplant.Curves) (given, sweep []PropellerRow) {
	if c == nil || c.Propeller().High == 0 {
		return nil, nil
	}
	f := c.Propeller()
	for _, j := range f.Given {
		given = append(given, propellerRow(c, j))
	}
	for i := range sweepPoints {
		sweep = append(sweep, propellerRow(c, math.Min(f.High, f.Low+(f.High-f.Low)*float64(i)/(sweepPoints-1))))
	}
	return given, sweep
}

func propellerRow(c powerplant.Curves, j float64) PropellerRow {
	ct, cp, _ := c.Coefficients(j)
	r := PropellerRow{J: j, CT: ct, CP: cp, Pulls: ct >= 0 && cp > 0}
	if r.Pulls {
		r.Efficiency = propeller.Efficiency(ct, j, cp, nil)
	}
	return r
}

// bounds fills the lossless thrust of every point of a run whose propeller is known.
func (r *PlantRun) bounds(c powerplant.Curves) {
	if c == nil {
		return
	}
	ideal := propeller.Disc{Diameter: c.Propeller().Diameter, Loss: 1}
	for i := range r.Points {
		pt := &r.Points[i]
		pt.Bound = ideal.Thrust(r.Air.Density, pt.TAS, pt.Out.Shaft.Power, nil)
	}
}
