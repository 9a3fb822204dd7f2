package study

import (
	"cmp"
	"math"
	"slices"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/envelope"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// An Envelope is what the aircraft does over speed and altitude, at the mass, the day and in the configuration of
// the view. It is computed apart from the study, for the page that shows it.
type Envelope struct {
	Day      atmos.Day
	Curves   []RateCurve // at rising altitudes, the first that of the view
	Service  Altitude    // service ceiling
	Absolute Altitude    // absolute ceiling
	Grid     envelope.Grid
	GridErr  error              // why the grid is empty
	Steps    []float64          // round specific excess powers in m/s, from 0 up
	Contours []envelope.Contour // of Steps, rising
	Ridge    []RateAt           // the best rate against altitude up to the absolute ceiling
	Ceilings []CeilingRow
	Glides   []GlideRow
	HeadWind float64 // of the glides over the ground in m/s
	Turns    []pointperf.Turn
	Loads    []LoadAt
	Tightest LoadAt // of the smallest radius that is sustained; zero where none is
	LoadsErr error  // why there are no loads
}

// A RateCurve is the rate of climb against speed at one altitude.
type RateCurve struct {
	Altitude float64 // pressure altitude in m
	Air      atmos.Air
	Points   []RateAt // from the stall to the never-exceed speed, in rising speed; what has no answer is left out
	Rate     pointperf.Best
	Angle    pointperf.Best
}

// A CeilingRow is the ceilings at one mass.
type CeilingRow struct {
	Label    string
	Mass     float64 // in kg
	Absolute Altitude
	Service  Altitude
	Rate     pointperf.Best // best rate of climb at the altitude of the view
}

// A GlideRow is the glide at one mass and altitude.
type GlideRow struct {
	Label    string
	Mass     float64 // in kg
	Altitude float64 // pressure altitude in m
	Air      atmos.Air
	Glide    pointperf.Glide
	Against  pointperf.GroundGlide // in the head wind
	Err      error                 // why there is no glide
	WindErr  error                 // why there is none against the wind
}

// A LoadAt is the load factors at one speed.
type LoadAt struct {
	TAS       float64 // true airspeed in m/s
	Lift      float64 // at maximum lift, dimensionless
	Sustained float64 // held by full thrust, dimensionless; 0 where level flight is not held at all
	Thrust    bool    // thrust, and not lift, ends the sustained turn
	Radius    float64 // of the sustained turn in m; 0 where there is none
}

const (
	gridSpeeds, gridAltitudes = 81, 49
	curveSpeeds               = 61
	ridgePoints               = 31
	loadSpeeds                = 61
)

// Envelope computes the climb, the flight envelope, the glide and the turns of the view.
func (s *Study) Envelope() *Envelope {
	v := s.View
	e := &Envelope{Day: atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}}
	a := s.Aircraft()
	e.Absolute, e.Service = e.ceilings(a, v.Mass, v.Config)
	e.curves(s, a)
	e.excess(s, a)
	e.masses(s, a)
	e.glides(s, a)
	e.turns(s, a)
	return e
}

// ceilings finds both ceilings at the mass in kg.
func (e *Envelope) ceilings(a *aircraft.Aircraft, mass float64, config aircraft.Config) (absolute, service Altitude) {
	absolute.Value, absolute.Err = pointperf.Ceiling(a, e.Day, mass, config, pointperf.AbsoluteRate)
	service.Value, service.Err = pointperf.Ceiling(a, e.Day, mass, config, pointperf.ServiceRate)
	return absolute, service
}

// roof is the altitude in m that the envelope is shown to: the absolute ceiling, or
// a height above the view where there is none.
func (e *Envelope) roof(v View) float64 {
	const without = 2000.0
	if e.Absolute.Err != nil {
		return math.Min(math.Max(v.Altitude, 0)+without, atmos.MaxAltitude)
	}
	return e.Absolute.Value
}

// curves computes the rate of climb against speed from the altitude of the view
// to near the ceiling.
func (e *Envelope) curves(s *Study, a *aircraft.Aircraft) {
	v := s.View
	list := []float64{v.Altitude}
	if e.Absolute.Err == nil && e.Absolute.Value > v.Altitude {
		span := e.Absolute.Value - v.Altitude
		step := roundStep(span/5, s.Project.Spec.System())
		for _, part := range []float64{0.25, 0.5, 0.75, 0.93} {
			hp := math.Round((v.Altitude+part*span)/step) * step
			if hp > list[len(list)-1]+step/2 && hp < e.Absolute.Value {
				list = append(list, hp)
			}
		}
	}
	for _, hp := range list {
		air, err := e.Day.At(hp, nil)
		if err != nil {
			continue
		}
		p := &pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config}
		c := RateCurve{Altitude: hp, Air: air, Rate: pointperf.BestRate(a, p), Angle: pointperf.BestAngle(a, p)}
		slow, fast := pointperf.Stall(a, p, nil), air.FromCAS(atmos.CAS(a.NeverExceed()))
		for i := range curveSpeeds {
			tas := slow + (fast-slow)*float64(i)/(curveSpeeds-1)
			if climb, err := pointperf.FullClimb(a, p, tas, nil); err == nil && fast > slow {
				c.Points = append(c.Points, RateAt{Altitude: hp, TAS: tas, Rate: climb.Rate})
			}
		}
		e.Curves = append(e.Curves, c)
	}
}

// excess computes the specific excess power, its contours and the ridge of best rates.
func (e *Envelope) excess(s *Study, a *aircraft.Aircraft) {
	const above = 1.06 // of the ceiling, so that the thrust limit closes below the top
	v := s.View
	low := math.Min(0, v.Altitude)
	// Rounded up, the top holds still while an edit moves the ceiling by a little.
	step := roundStep(e.roof(v)-low, s.Project.Spec.System())
	high := math.Min(math.Ceil((low+above*(e.roof(v)-low))/step)*step, atmos.MaxAltitude)
	e.Grid, e.GridErr = envelope.NewGrid(envelope.Case{Aircraft: a, Day: e.Day, Mass: v.Mass, Config: v.Config, Load: 1}, low, high, gridSpeeds, gridAltitudes)
	best, _, ok := e.Grid.Most()
	if e.GridErr == nil && !ok {
		e.GridErr = units.Errorf(nil, "the powerplant has no answer at any speed and altitude")
	}
	if e.GridErr != nil {
		return
	}
	e.Steps = roundSteps(best.Excess, s.Project.Spec.System())
	for _, level := range e.Steps {
		e.Contours = append(e.Contours, e.Grid.Contours(level)...)
	}
	if e.Absolute.Err != nil {
		return
	}
	for i := range ridgePoints {
		hp := low + (e.Absolute.Value-low)*float64(i)/(ridgePoints-1)
		air, err := e.Day.At(hp, nil)
		if err != nil {
			continue
		}
		if b := pointperf.BestRate(a, &pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config}); b.Err == nil {
			e.Ridge = append(e.Ridge, RateAt{Altitude: hp, Rate: b.Value, TAS: b.TAS})
		}
	}
}

// roundSteps are 0 and round values in the system's unit of a rate of climb below the greatest in m/s.
func roundSteps(most float64, sys units.System) []float64 {
	list := []float64{0}
	unit := sys.Step(units.ClimbRate, 1)
	if !(most > 0) {
		return list
	}
	base := math.Pow(10, math.Floor(math.Log10(most/unit)))
	step := 10 * base
	for _, f := range []float64{0.1, 0.2, 0.5, 1, 2, 5} {
		if most/unit <= 6*f*base { // at most five lines beside that of 0
			step = f * base
			break
		}
	}
	for i := 1.0; i*step < 0.97*most/unit; i++ {
		list = append(list, i*step*unit)
	}
	return list
}

// namedMass is a mass that a table names.
type namedMass struct {
	label string
	mass  float64 // in kg
}

// gathered orders masses and joins the names of those that are the same to a thousandth.
func gathered(list []namedMass) []namedMass {
	var kept []namedMass
	for _, m := range list {
		at := slices.IndexFunc(kept, func(o namedMass) bool { return math.Abs(o.mass-m.mass) < 1e-3*m.mass })
		switch {
		case at >= 0:
			kept[at].label += ", " + m.label
		case m.mass > 0:
			kept = append(kept, m)
		}
	}
	slices.SortStableFunc(kept, func(x, y namedMass) int { return cmp.Compare(x.mass, y.mass) })
	return kept
}

// named are the masses of note.
func (s *Study) named() []namedMass {
	return []namedMass{{"as set", s.View.Mass}, {"at the start", s.Masses.Start}, {"greatest take-off", s.Masses.MaxTakeOff}, {"fuel used up", s.Aircraft().DryMass()}}
}

// around adds a tenth less and a tenth more than the view's mass where nothing stands within a fiftieth of it.
func (s *Study) around(list []namedMass) []namedMass {
	const apart = 0.02
	for _, m := range []namedMass{{"10 % lighter than set", 0.9 * s.View.Mass}, {"10 % heavier than set", 1.1 * s.View.Mass}} {
		near := func(o namedMass) bool { return math.Abs(o.mass-m.mass) < apart*m.mass }
		if m.mass >= s.Masses.Empty+s.Masses.Growth && !slices.ContainsFunc(list, near) {
			list = append(list, m)
		}
	}
	return list
}

// masses computes the ceilings at each mass of note.
func (e *Envelope) masses(s *Study, a *aircraft.Aircraft) {
	v := s.View
	air, airErr := e.Day.At(v.Altitude, nil)
	for _, m := range gathered(s.around(s.named())) {
		r := CeilingRow{Label: m.label, Mass: m.mass, Rate: pointperf.Best{Err: airErr}}
		r.Absolute, r.Service = e.Absolute, e.Service
		if m.mass != v.Mass {
			r.Absolute, r.Service = e.ceilings(a, m.mass, v.Config)
		}
		if airErr == nil {
			r.Rate = pointperf.BestRate(a, &pointperf.Point{Air: air, Mass: m.mass, Config: v.Config})
		}
		e.Ceilings = append(e.Ceilings, r)
	}
}

// glides computes the glide at three masses and two altitudes.
func (e *Envelope) glides(s *Study, a *aircraft.Aircraft) {
	v, sys := s.View, s.Project.Spec.System()
	e.HeadWind = sys.Step(units.Speed, 10)
	if sys != units.Aviation {
		e.HeadWind = 5
	}
	upper := v.Altitude + 1500
	if e.Absolute.Err == nil && e.Absolute.Value > v.Altitude {
		step := roundStep(e.Absolute.Value-v.Altitude, sys)
		upper = math.Ceil((v.Altitude+0.4*(e.Absolute.Value-v.Altitude))/step) * step
	}
	for _, hp := range []float64{v.Altitude, upper} {
		air, err := e.Day.At(hp, nil)
		for _, m := range gathered([]namedMass{{"as set", v.Mass}, {"greatest take-off", s.Masses.MaxTakeOff}, {"fuel used up", a.DryMass()}}) {
			r := GlideRow{Label: m.label, Mass: m.mass, Altitude: hp, Air: air, Err: err, WindErr: err}
			if err == nil {
				p := &pointperf.Point{Air: air, Mass: m.mass, Config: v.Config}
				r.Glide, r.Err = pointperf.BestGlide(a, p)
				r.Against, r.WindErr = pointperf.GlideInWind(a, p, e.HeadWind)
			}
			e.Glides = append(e.Glides, r)
		}
	}
}

// banks of the turn table in degrees.
var banks = []float64{0, 15, 30, 45, 60}

// turns computes the turns at the altitude of the view.
func (e *Envelope) turns(s *Study, a *aircraft.Aircraft) {
	v := s.View
	air, err := e.Day.At(v.Altitude, nil)
	if err != nil {
		e.LoadsErr = err
		return
	}
	p := &pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config}
	for _, b := range banks {
		e.Turns = append(e.Turns, pointperf.TurnAt(a, p, b*math.Pi/180))
	}
	slow, fast := pointperf.Stall(a, p, nil), air.FromCAS(atmos.CAS(a.NeverExceed()))
	if fast <= slow {
		e.LoadsErr = e.Turns[0].Err
		return
	}
	for _, tas := range s.loadSpeeds(slow, fast) {
		l := LoadAt{TAS: tas}
		l.Lift = math.Max(1, pointperf.LiftLoad(a, p, l.TAS, nil))
		if n, lifted, err := pointperf.SustainedLoad(a, p, tas*(1+1e-12)); err == nil {
			l.Sustained, l.Thrust = n, !lifted
		} else if tas == s.Speeds.LevelMin.TAS || tas == s.Speeds.LevelMax.TAS {
			l.Sustained, l.Thrust = 1, true // by definition, which the root may miss by its last digit
		}
		if l.Sustained > 1 {
			l.Radius = pointperf.TurnRadius(l.TAS, l.Sustained, nil)
			if e.Tightest.Radius == 0 || l.Radius < e.Tightest.Radius {
				e.Tightest = l
			}
		}
		e.Loads = append(e.Loads, l)
	}
}

// loadSpeeds are equal steps from slow to fast in m/s, and the ends of level flight.
func (s *Study) loadSpeeds(slow, fast float64) []float64 {
	var list []float64
	for i := range loadSpeeds {
		list = append(list, slow+(fast-slow)*float64(i)/(loadSpeeds-1))
	}
	for _, b := range []pointperf.Best{s.Speeds.LevelMin, s.Speeds.LevelMax} {
		if b.Err == nil && b.Bound == "" {
			list = append(list, b.TAS)
		}
	}
	slices.Sort(list)
	return list
}
