package study

import (
	"cmp"
	"math"
	"slices"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// A Plant is the powerplant and its propeller looked at on their own: at full
// setting over speed, altitude and rotational speed, and where the aircraft uses them.
type Plant struct {
	Err    error      // why the view has no air to look in; then there is nothing else
	Runs   []PlantRun // by rising altitude, the view's among them
	View   int        // index of the view's run
	Marked []OperatingPoint
	Table  []OperatingPoint
	Static StaticThrust
	Burn   Burn

	Curves   powerplant.Curves // nil where the powerplant shows none
	Lapse    []LapseCurve
	Loads    []PropellerLoad
	Given    []PropellerRow // of a propeller table, as entered
	Sweep    []PropellerRow // of a propeller table, finely from end to end
	Cautions []Warning
}

// A PlantRun is the powerplant at full setting in one air over true airspeed.
type PlantRun struct {
	Air       atmos.Air
	Points    []PlantPoint // at rising speeds, from rest to the never-exceed speed
	Throttled Onset        // from where the throttle is held back to keep the greatest rotational speed
	Ends      Onset        // from where there is no answer
	Tips      Onset        // from where the tips pass the Mach number of the caution
	FastTips  Onset        // from where they pass that beyond which no model here holds
	Turns     bool         // some point reports a propeller
}

// A PlantPoint is one speed of a run.
type PlantPoint struct {
	TAS   float64 // true airspeed in m/s, >= 0
	Out   powerplant.Output
	Bound float64 // thrust in N that a disc without losses makes of the same shaft power, >= 0; 0 where that is not known
	Err   error   // why there is no output
}

// An Onset is the true airspeed from which something holds.
type Onset struct {
	Found bool
	TAS   float64 // true airspeed in m/s, >= 0
}

// TurnsPropeller reports whether there is a propeller to speak of.
func (p *Plant) TurnsPropeller() bool {
	return slices.ContainsFunc(p.Runs, func(r PlantRun) bool { return r.Turns })
}

const (
	plantPoints = 81
	// apartAltitudes is how far in m two altitudes must lie apart for both to be worth a curve.
	apartAltitudes = 500
	mostAltitudes  = 3
)

// Plant looks at the powerplant under the study's view. It is computed only when asked for.
func (s *Study) Plant() *Plant {
	p := &Plant{}
	if _, err := s.viewAir(s.View.Altitude); err != nil {
		p.Err = err
		return p
	}
	p.Curves, _ = s.Aircraft().Plant().(powerplant.Curves)
	for _, hp := range s.plantAltitudes() {
		if air, err := s.viewAir(hp); err == nil {
			p.Runs = append(p.Runs, s.plantRun(air))
		}
	}
	slices.SortStableFunc(p.Runs, func(a, b PlantRun) int { return cmp.Compare(a.Air.PressureAltitude, b.Air.PressureAltitude) })
	p.View = slices.IndexFunc(p.Runs, func(r PlantRun) bool { return r.Air.PressureAltitude == s.View.Altitude })
	p.Runs[p.View].bounds(p.Curves)
	p.Given, p.Sweep = propellerRows(p.Curves)
	p.Marked, p.Table = s.marked(), s.operating()
	p.Static = s.staticThrust(p.Curves)
	p.Burn = s.burn(p.Curves)
	p.Lapse = s.lapseCurves(p.Curves)
	p.Loads = s.propellerLoads(p)
	p.Cautions = s.plantCautions(p)
	return p
}

// viewAir is the air of the view at another pressure altitude hp in m.
func (s *Study) viewAir(hp float64) (atmos.Air, error) {
	return atmos.Day{Deviation: s.View.Deviation, Humidity: s.Project.Plan.Day.Humidity}.At(hp, nil)
}

// plantAltitudes are the view's altitude and up to two further ones that matter:
// the highest of the mission, the strip, the service ceiling; first the view's.
func (s *Study) plantAltitudes() []float64 {
	highest := s.View.Altitude
	for i := range s.Flight.Trace {
		highest = math.Max(highest, s.Flight.Trace[i].Altitude)
	}
	further := []float64{highest, s.Project.Departure.Air.PressureAltitude}
	if s.Service.Err == nil {
		further = append(further, s.Service.Value)
	}
	list := []float64{s.View.Altitude}
	for _, hp := range append(further, 4000, 2000, 0) {
		near := slices.ContainsFunc(list, func(have float64) bool { return math.Abs(have-hp) < apartAltitudes })
		if !near && len(list) < mostAltitudes {
			list = append(list, hp)
		}
	}
	return list
}

// plantRun runs the powerplant at full setting from rest to the never-exceed speed.
func (s *Study) plantRun(air atmos.Air) PlantRun {
	r := PlantRun{Air: air}
	top := air.FromCAS(atmos.CAS(s.Aircraft().NeverExceed()))
	for i := range plantPoints {
		pt := s.fullAt(air, top*float64(i)/(plantPoints-1))
		r.Turns = r.Turns || pt.Out.Shaft.Speed > 0
		r.Points = append(r.Points, pt)
	}
	r.Throttled = s.onset(&r, func(p PlantPoint) bool { return p.Err == nil && p.Out.Limits&powerplant.SpeedLimited != 0 })
	r.Ends = s.onset(&r, func(p PlantPoint) bool { return p.Err != nil })
	r.Tips = s.onset(&r, func(p PlantPoint) bool { return p.Err == nil && p.Out.Shaft.TipMach >= tipMachCaution })
	r.FastTips = s.onset(&r, func(p PlantPoint) bool { return p.Err == nil && p.Out.Shaft.TipMach >= tipMachStop })
	return r
}

// fullAt is the powerplant at full setting at the true airspeed tas in m/s.
func (s *Study) fullAt(air atmos.Air, tas float64) PlantPoint {
	out, err := s.Aircraft().Plant().Run(powerplant.Condition{Air: air, TAS: tas}, 1, nil)
	if err != nil {
		out = powerplant.Output{}
	}
	return PlantPoint{TAS: tas, Out: out, Err: err}
}

// onset finds the lowest speed of the run where holds is true, by bisection between its points.
func (s *Study) onset(r *PlantRun, holds func(PlantPoint) bool) Onset {
	i := slices.IndexFunc(r.Points, holds)
	if i <= 0 {
		return Onset{Found: i == 0}
	}
	low, high := r.Points[i-1].TAS, r.Points[i].TAS
	for range 30 {
		mid := (low + high) / 2
		if holds(s.fullAt(r.Air, mid)) {
			high = mid
		} else {
			low = mid
		}
	}
	return Onset{Found: true, TAS: high}
}

// An OperatingPoint is where the aircraft uses its powerplant.
type OperatingPoint struct {
	Name     string
	Where    units.Message
	TAS      float64 // true airspeed in m/s, >= 0
	Altitude float64 // pressure altitude in m
	Setting  float64 // of the power lever, 0 to 1
	Out      powerplant.Output
	Err      error // why there is no such point
}

// marked are the points of the view that the curves flag.
func (s *Study) marked() []OperatingPoint {
	air := s.Point.Air
	list := []OperatingPoint{s.full("at rest", air, 0, nil)}
	for _, b := range []struct {
		name string
		best pointperf.Best
	}{{"best rate", s.Speeds.BestRate}, {"level max", s.Speeds.LevelMax}} {
		list = append(list, s.full(b.name, air, b.best.TAS, b.best.Err))
	}
	return list
}

func (s *Study) full(name string, air atmos.Air, tas float64, err error) OperatingPoint {
	p := OperatingPoint{Name: name, TAS: tas, Altitude: air.PressureAltitude, Setting: 1, Err: err}
	if err == nil {
		pt := s.fullAt(air, tas)
		p.Out, p.Err = pt.Out, pt.Err
	}
	return p
}

// operating lists the points of the table: the strip at full setting, then the cruise legs.
func (s *Study) operating() []OperatingPoint {
	place := s.TakeOff.Place
	air, mass := s.Project.Departure.Air, s.Masses.Start
	rest := s.full("At rest", air, 0, s.staticErr)
	off := s.full("Lift-off", place.Air, s.TakeOff.Run.Speed, s.TakeOff.Err)
	p := &pointperf.Point{Air: air, Mass: mass}
	speeds := pointperf.AllSpeeds(s.Aircraft(), p)
	list := []OperatingPoint{rest, off, s.full("Best angle", air, speeds.BestAngle.TAS, speeds.BestAngle.Err), s.full("Best rate", air, speeds.BestRate.TAS, speeds.BestRate.Err)}
	for i := range list {
		list[i].Where = units.Say("strip, full setting")
	}
	for i, l := range s.Project.Spec.Legs {
		if l.Kind == mission.Cruise || l.Kind == mission.Dash {
			list = append(list, s.cruised(i))
		}
	}
	fast := s.full("Level maximum", air, speeds.LevelMax.TAS, speeds.LevelMax.Err)
	fast.Where = units.Say("strip, full setting")
	return append(list, fast)
}

// cruised is the end of the cruise or dash with index i.
func (s *Study) cruised(i int) OperatingPoint {
	p := OperatingPoint{Name: s.legName(i)}
	f := s.Flight.Failure
	if i >= len(s.Flight.Legs) || (f != nil && f.Leg == i) {
		p.Err = units.Errorf(nil, "not flown to its end")
		if f != nil {
			p.Err = units.Errorf(f.Err, "the mission ends in “{}”", units.Text(f.Name))
		}
		return p
	}
	end := &s.Flight.Legs[i].End
	p.TAS, p.Altitude, p.Setting, p.Out = end.TAS, end.Altitude, end.Setting, end.Output
	p.Where = units.Say("end of leg, {}", units.Of(units.Altitude, end.Altitude))
	return p
}
