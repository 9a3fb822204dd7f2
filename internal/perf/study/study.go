// Package study computes everything that a page, a report or the JSON interface
// needs of one variant on its project's mission, day and strips, in one pure call
// that is safe to run concurrently.
package study

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A View is the condition of the thrust and power chart and the table of speeds.
type View struct {
	Altitude  float64 // pressure altitude in m
	Mass      float64 // in kg
	Deviation float64 // of temperature from standard in K
	Config    aircraft.Config
	Setting   float64 // of the power lever for the thrust available, 0 to 1
}

// A Study is everything computed of one variant.
type Study struct {
	Project *project.Project
	Index   int // of the variant
	Masses  Masses
	View    View
	Point   pointperf.Point // of the view
	Speeds  pointperf.Speeds
	Curve   []pointperf.Balance // thrust and power from stall to the limit of the view, at rising speeds
	Static  powerplant.Output   // at rest on the departure strip, full setting
	Glide   pointperf.Glide

	Service  Altitude // service ceiling
	Absolute Altitude // absolute ceiling
	Rates    []RateAt // best rate of climb against altitude at start mass
	Climb    []mission.ClimbRow

	TakeOff Strip
	Landing Strip
	Flight  mission.Flight

	Figures      []Figure
	Requirements []Verdict
	Warnings     []Warning

	staticErr, glideErr, climbErr error
}

// Masses are the masses of the variant in kg.
type Masses struct {
	Empty       float64 // with powerplant, as stated, in kg
	Growth      float64 // allowance for what building adds, in kg
	Payload     float64 // in kg
	Trapped     float64 // unusable fuel aboard, in kg
	ZeroFuel    float64 // with everything but usable fuel, in kg
	Fuel        float64 // all fuel aboard, in kg
	Start       float64 // with everything aboard, in kg
	MaxTakeOff  float64 // the designer's limit, in kg
	MaxZeroFuel float64 // the designer's limit without usable fuel, in kg; +Inf when there is none
	Landing     float64 // at the landing of the mission, or at its start when it is not reached, in kg
}

// An Altitude is an altitude or the reason why there is none.
type Altitude struct {
	Value float64 // pressure altitude in m
	Err   error
}

// A RateAt is the best rate of climb at one altitude.
type RateAt struct {
	Altitude float64 // pressure altitude in m
	Rate     float64 // geometric, in m/s
	TAS      float64 // true airspeed in m/s
}

// A Strip is a take-off or landing or the reason why there is none.
type Strip struct {
	Place runway.Place
	Mass  float64 // in kg
	Run   runway.Run
	Err   error
}

// DefaultView is the departure strip on the project's day at start mass, clean.
func DefaultView(p *project.Project, variant int) View {
	return View{Altitude: p.Departure.Air.PressureAltitude, Mass: p.Aircraft[variant].StartMass(), Deviation: p.Plan.Day.Deviation, Config: aircraft.Clean, Setting: 1}
}

// Run studies the variant with the given index under the view. Everything that
// has no answer carries the reason.
func Run(p *project.Project, variant int, view View) *Study {
	a := p.Aircraft[variant]
	stores := a.Stores()
	s := &Study{Project: p, Index: variant, View: view, Masses: Masses{Empty: a.EmptyMass(), Growth: a.Growth(), Payload: a.Payload(),
		Trapped: stores.Trapped, ZeroFuel: a.DryMass(), Fuel: stores.Fuel + stores.Trapped, Start: a.StartMass(), MaxTakeOff: a.MaxTakeOff()}}
	s.Masses.MaxZeroFuel, _ = a.MaxZeroFuel()
	s.Flight = mission.Fly(a, &p.Plan)
	s.Masses.Landing = s.landingMass()
	s.point(a)
	s.strips(a)
	s.climbs(a)
	s.figures(a)
	s.judge()
	s.warn(a)
	return s
}

// Aircraft is the aircraft studied.
func (s *Study) Aircraft() *aircraft.Aircraft { return s.Project.Aircraft[s.Index] }

// Variant is the variant studied, as entered.
func (s *Study) Variant() *project.Variant { return &s.Project.Spec.Variants[s.Index] }

// landingMass is the mass at the start of the last landing flown.
func (s *Study) landingMass() float64 {
	mass := s.Masses.Start
	for i := range s.Flight.Legs {
		if l := &s.Flight.Legs[i]; l.Leg.Kind == mission.Landing {
			mass = l.Start.Mass
		}
	}
	return mass
}

const curvePoints = 121

// point computes what the view shows.
func (s *Study) point(a *aircraft.Aircraft) {
	v := s.View
	air, err := atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}.At(v.Altitude, nil)
	if err != nil {
		none := pointperf.Best{Err: err}
		s.Speeds = pointperf.Speeds{Stall: none, LeastThrust: none, LeastPower: none, Carson: none, BestAngle: none, BestRate: none, LevelMax: none, LevelMin: none}
		s.glideErr = err
		return
	}
	s.Point = pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config, Lever: 1 - v.Setting}
	s.Speeds = pointperf.AllSpeeds(a, &s.Point)
	s.Glide, s.glideErr = pointperf.BestGlide(a, &s.Point)
	vs := s.Speeds.Stall.TAS
	top := air.FromCAS(atmos.CAS(a.NeverExceed()))
	for i := range curvePoints {
		tas := vs + (top-vs)*float64(i)/(curvePoints-1)
		b, err := pointperf.At(a, &s.Point, tas, nil)
		if err != nil {
			b.Available = math.NaN()
		}
		s.Curve = append(s.Curve, b)
	}
	s.Static, s.staticErr = a.Plant().Run(powerplant.Condition{Air: s.Project.Departure.Air}, 1, nil)
}

func (s *Study) strips(a *aircraft.Aircraft) {
	how := s.Project.Plan.Technique
	s.TakeOff = Strip{Place: s.Project.Departure, Mass: a.StartMass()}
	s.TakeOff.Run, s.TakeOff.Err = runway.TakeOff(a, s.TakeOff.Mass, s.TakeOff.Place, how)
	s.TakeOff.Run.Factor(how.TakeOffFactor)
	for i := range s.Flight.Legs {
		if l := &s.Flight.Legs[i]; l.Leg.Kind == mission.TakeOff {
			s.TakeOff.Mass = l.Start.Mass
			s.TakeOff.Run, s.TakeOff.Err = runway.TakeOff(a, s.TakeOff.Mass, s.TakeOff.Place, how)
			s.TakeOff.Run.Factor(how.TakeOffFactor)
			break
		}
	}
	s.Landing = Strip{Place: s.Project.Arrival, Mass: s.Masses.Landing}
	s.Landing.Run, s.Landing.Err = runway.Landing(a, s.Landing.Mass, s.Landing.Place, how)
	s.Landing.Run.Factor(how.LandingFactor)
}

const ratePoints = 25

// climbs computes the ceilings and the climb against altitude, at start mass on the project's day.
func (s *Study) climbs(a *aircraft.Aircraft) {
	day, mass := s.Project.Plan.Day, a.StartMass()
	s.Absolute.Value, s.Absolute.Err = pointperf.Ceiling(a, day, mass, aircraft.Clean, pointperf.AbsoluteRate)
	s.Service.Value, s.Service.Err = pointperf.Ceiling(a, day, mass, aircraft.Clean, pointperf.ServiceRate)
	if s.Absolute.Err != nil {
		s.climbErr = s.Absolute.Err
		return
	}
	for i := range ratePoints {
		hp := s.Absolute.Value * float64(i) / (ratePoints - 1)
		air, err := day.At(hp, nil)
		if err != nil {
			continue
		}
		if best := pointperf.BestRate(a, &pointperf.Point{Air: air, Mass: mass}); best.Err == nil {
			s.Rates = append(s.Rates, RateAt{Altitude: hp, Rate: best.Value, TAS: best.TAS})
		}
	}
	if s.Service.Err != nil {
		s.climbErr = s.Service.Err
		return
	}
	s.Climb, s.climbErr = mission.ClimbProfile(a, day, mass, s.climbAltitudes())
}

// climbAltitudes are round altitudes, in the project's unit, from the departure to the service ceiling.
func (s *Study) climbAltitudes() []float64 {
	from, to := s.Project.Departure.Air.PressureAltitude, s.Service.Value
	step := roundStep(to-from, s.Project.Spec.System())
	list := []float64{from}
	for hp := math.Ceil((from+0.05*step)/step) * step; hp < to && len(list) < 40; hp += step {
		list = append(list, hp)
	}
	if to > list[len(list)-1] {
		list = append(list, to)
	}
	return list
}

// roundStep is a step of 1, 2 or 5 times a power of ten of the system's altitude
// unit that divides the span in m into about ten.
func roundStep(span float64, sys units.System) float64 {
	unit := sys.Step(units.Altitude, 1)
	raw := math.Max(span, 10) / unit / 10
	base := math.Pow(10, math.Floor(math.Log10(raw)))
	for _, f := range []float64{1, 2, 5, 10} {
		if raw <= f*base*(1+1e-9) {
			return f * base * unit
		}
	}
	return 10 * base * unit
}

// ClimbErr is why the climb table is missing or stops short, nil when it is whole.
func (s *Study) ClimbErr() error { return s.climbErr }
