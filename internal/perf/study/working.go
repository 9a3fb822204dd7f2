package study

import (
	"fmt"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// The parts of the working, by their headings.
const (
	partDrag     = "The clean drag polar"
	partAir      = "Air"
	partStall    = "Stall"
	partRate     = "Best rate of climb"
	partMaximum  = "Level maximum"
	partRest     = "At rest"
	partTakeOff  = "Take-off"
	partLanding  = "Landing"
	partCeiling  = "Ceilings"
	partTightest = "Tightest point of the mission"
	partMission  = "Mission, leg by leg"
	partLoading  = "Loading"
	partAsked    = "Requirements under conditions of their own"
	requirement  = "Requirement " // begins the heading of the part of one of them
)

// StructurePart is the heading of the part of the working that derives the envelope of manoeuvre and gust.
const StructurePart = "Manoeuvre and gust envelope"

// parts says in which part of the working each figure is derived.
var parts = map[string]string{
	"take_off_distance": partTakeOff, "take_off_roll": partTakeOff, "climb_gradient": partTakeOff,
	"landing_distance": partLanding, "landing_roll": partLanding, "stall_landing": partLanding,
	"climb_rate": partRate, "level_max": partMaximum, "stall_clean": partStall,
	"service_ceiling": partCeiling, "absolute_ceiling": partCeiling,
	"static_thrust": partRest, "static_speed": partRest, "tip_mach": partTightest,
	"thrust_in_hand": partTightest, "mission_time": partMission, "mission_distance": partMission, "mission_fuel": partMission,
	"reserve_time": partMission, "fuel_left": partMission, "energy_left": partMission, "ground_speed": partMission,
	"stall_take_off": partTakeOff, "static_thrust_ratio": partLoading, "wing_loading": partLoading, "power_loading": partLoading,
	"steepest_gradient": partAsked, "balked_gradient": partAsked, "time_to_climb": partAsked, "cruise_speed": partAsked, "range": partAsked, "endurance": partAsked,
	"glide_ratio": partAsked, "turn_load": partAsked, "maneuvering_speed": partAsked, "gust_load": partAsked,
}

// IsPart reports whether a heading of the working begins one of its parts; other headings stand within a part.
func IsPart(heading string) bool {
	switch heading {
	case partDrag, partAir, partStall, partRate, partMaximum, partRest, partTakeOff, partLanding, partCeiling, partTightest, partMission, partLoading, partAsked, StructurePart:
		return true
	}
	return strings.HasPrefix(heading, requirement)
}

// WorkingPart is the heading of the part of the working that derives a figure, empty for an unknown one.
func WorkingPart(figure string) string { return parts[figure] }

// WorkingPart is the heading of the part of the working that derives the figure of the verdict.
func (v *Verdict) WorkingPart() string {
	if v.ownTerms() {
		return fmt.Sprintf("%s%d: %s", requirement, v.Number, v.Figure.Label)
	}
	return WorkingPart(v.Requirement.Figure)
}

// Working derives the numbers of the view, then those of the strip, the ceilings
// and the mission, step by step from the inputs, as an engineer would on paper.
// Speeds of note are those of the view; everything else is that of the figures.
// Where a part has no answer, the reason stands in its place.
func (s *Study) Working() *formula.Working {
	w := &formula.Working{}
	for _, part := range []func(*formula.Working) error{s.dragWorking, s.viewWorking, s.restWorking, s.takeOffWorking, s.landingWorking, s.ceilingWorking, s.structureWorking, s.tightestWorking, s.missionWorking, s.loadingWorking, s.askedWorking} {
		if err := part(w); err != nil {
			w.Note("No answer: %s.", units.Explain(err).In(s.Project.Spec.System()))
		}
	}
	return w
}

// in writes a number of a remark as the project shows it; formulas stand in SI.
func (s *Study) in(q units.Quantity, si float64) string { return s.Project.Spec.System().Format(q, si) }

// dragWorking derives the clean polar from what it is given by.
func (s *Study) dragWorking(w *formula.Working) error {
	w.Heading(partDrag)
	s.Variant().Aircraft.Airframe.DragWorking(w)
	return nil
}

// liftWorking derives the greatest lift in a configuration where it is given by a stall speed.
func (s *Study) liftWorking(c aircraft.Config, w *formula.Working) {
	s.Variant().Aircraft.Airframe.LiftWorking(c, w)
}

// viewWorking derives the speeds of note under the view.
func (s *Study) viewWorking(w *formula.Working) error {
	a, v := s.Aircraft(), s.View
	w.Heading(partAir)
	air, err := atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}.At(v.Altitude, w)
	if err != nil {
		return err
	}
	p := &pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config, Lever: 1 - v.Setting}
	w.Heading(partStall)
	s.liftWorking(v.Config, w)
	pointperf.Stall(a, p, w)
	w.Heading(partRate)
	b := s.Speeds.BestRate
	if b.Err != nil {
		return b.Err
	}
	w.Note("The speed %s is the one that makes the rate of climb greatest; it is found by a bracketed search.", s.in(units.Speed, b.TAS))
	if _, err := pointperf.FullClimb(a, p, b.TAS, w); err != nil {
		return err
	}
	w.Heading(partMaximum)
	if b = s.Speeds.LevelMax; b.Err != nil {
		return b.Err
	}
	w.Note("The speed %s is the fastest at which thrust available is not below thrust required; it is found by a bracketed root.", s.in(units.Speed, b.TAS))
	_, err = pointperf.At(a, p, b.TAS*(1-1e-9), w)
	return err
}

// air derives the air of the project's day at the pressure altitude of air.
func (s *Study) air(air atmos.Air, w *formula.Working) error {
	_, err := s.Project.Plan.Day.At(air.PressureAltitude, w)
	return err
}

// restWorking derives the static thrust on the departure strip.
func (s *Study) restWorking(w *formula.Working) error {
	w.Heading(partRest)
	air := s.Project.Departure.Air
	w.Note("On the strip at a pressure altitude of %s, full setting.", s.in(units.Altitude, air.PressureAltitude))
	if err := s.air(air, w); err != nil {
		return err
	}
	_, err := s.Aircraft().Plant().Run(powerplant.Condition{Air: air}, 1, w)
	return err
}

// segments notes what the integration gave.
func (s *Study) segments(w *formula.Working, r *runway.Run, factor float64) {
	for _, seg := range r.Segments {
		w.Note("%s: %s in %s.", capital(seg.Name), s.in(units.FieldLength, seg.Distance), s.in(units.ShortTime, seg.Time))
	}
	w.Note("Together %s; with the safety factor of %s it is %s.", s.in(units.FieldLength, r.Total), units.Plain(factor), s.in(units.FieldLength, r.Factored))
}

func capital(s string) string { return string(s[0]-'a'+'A') + s[1:] }

// takeOffWorking derives the speeds and the forces at lift-off; the roll itself is an integral.
func (s *Study) takeOffWorking(w *formula.Working) error {
	w.Heading(partTakeOff)
	a, t, how := s.Aircraft(), &s.TakeOff, s.Project.Plan.Technique
	p := &pointperf.Point{Air: t.Place.Air, Mass: t.Mass, Config: aircraft.TakeOff}
	w.Note("The stall of the figures is that at the departure strip and start mass, %s; the take-off itself begins with what the taxi leaves.", s.in(units.Mass, a.StartMass()))
	if err := s.air(t.Place.Air, w); err != nil {
		return err
	}
	s.liftWorking(aircraft.TakeOff, w)
	pointperf.Stall(a, &pointperf.Point{Air: s.Project.Departure.Air, Mass: a.StartMass(), Config: aircraft.TakeOff}, w)
	w.Note("%s, %s.", t.Place.Strip.Name, s.in(units.Mass, t.Mass))
	stall := pointperf.Stall(a, p, w)
	v := how.LiftOffFactor * stall
	w.Note("Lift-off at %s times the stall, %s; over the obstacle at %s times, %s.", units.Plain(how.LiftOffFactor), s.in(units.Speed, v), units.Plain(how.ClimbOutFactor), s.in(units.Speed, how.ClimbOutFactor*stall))
	phi := polar.GroundEffect(a.WingHeight(), a.Span(), w)
	lift := 0.5 * p.Air.Density * v * v * a.WingArea() * a.GroundCL()
	pointperf.Drag(a, p, v, lift, phi, w)
	if _, err := pointperf.ThrustAvailable(a, p, v, w); err != nil {
		return err
	}
	w.Note("The roll integrates m dV/dt = T − D − μ (W cos φ − L) − W sin φ from rest, with μ %s on %s, a slope of %s and %s of head wind; these are the forces at its end.",
		units.Plain(t.Place.Surface.Rolling), t.Place.Surface.Label, s.in(units.Fraction, t.Place.Strip.Slope), s.in(units.Speed, t.Place.HeadWind))
	if t.Err != nil {
		return t.Err
	}
	s.segments(w, &t.Run, how.TakeOffFactor)
	_, err := pointperf.FullClimb(a, p, t.Run.Screen, w)
	return err
}

// landingWorking derives the stall in the landing configuration and lists what the integration gave.
func (s *Study) landingWorking(w *formula.Working) error {
	w.Heading(partLanding)
	a, how := s.Aircraft(), s.Project.Plan.Technique
	start := &pointperf.Point{Air: s.Project.Departure.Air, Mass: a.StartMass(), Config: aircraft.Landing}
	w.Note("The stall of the figures is that at the departure strip and start mass, %s; the landing itself is flown with what the mission leaves.", s.in(units.Mass, start.Mass))
	if err := s.air(start.Air, w); err != nil {
		return err
	}
	s.liftWorking(aircraft.Landing, w)
	pointperf.Stall(a, start, w)
	l := &s.Landing
	w.Note("%s, %s.", l.Place.Strip.Name, s.in(units.Mass, l.Mass))
	if err := s.air(l.Place.Air, w); err != nil {
		return err
	}
	stall := pointperf.Stall(a, &pointperf.Point{Air: l.Place.Air, Mass: l.Mass, Config: aircraft.Landing}, w)
	w.Note("Approach at %s times the stall, %s, on a path of %s; touchdown at %s.", units.Plain(how.ApproachFactor), s.in(units.Speed, how.ApproachFactor*stall), s.in(units.Angle, how.ApproachAngle), s.in(units.Speed, l.Run.Speed))
	if l.Err != nil {
		return l.Err
	}
	s.segments(w, &l.Run, how.LandingFactor)
	return nil
}

// ceilingWorking derives the climb that is left at the service ceiling.
func (s *Study) ceilingWorking(w *formula.Working) error {
	w.Heading(partCeiling)
	if s.Service.Err != nil {
		return s.Service.Err
	}
	a := s.Aircraft()
	w.Note("The service ceiling %s is the pressure altitude at which the best rate of climb has fallen to %s, at start mass on the project's day; it is found by a bracketed root.",
		s.in(units.Altitude, s.Service.Value), s.in(units.ClimbRate, pointperf.ServiceRate))
	air, err := s.Project.Plan.Day.At(s.Service.Value, w)
	if err != nil {
		return err
	}
	p := &pointperf.Point{Air: air, Mass: a.StartMass()}
	best := pointperf.BestRate(a, p)
	if best.Err != nil {
		return best.Err
	}
	if _, err := pointperf.FullClimb(a, p, best.TAS, w); err != nil {
		return err
	}
	if s.Absolute.Err != nil {
		return s.Absolute.Err
	}
	w.Note("At the absolute ceiling, %s, no rate of climb is left.", s.in(units.Altitude, s.Absolute.Value))
	return nil
}

// structureWorking derives the corners of the envelope of manoeuvre and gust under the view.
func (s *Study) structureWorking(w *formula.Working) error {
	w.Heading(StructurePart)
	v := s.View
	air, err := atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}.At(v.Altitude, nil)
	if err != nil {
		return err
	}
	w.Note("At %s and a pressure altitude of %s, flaps and gear up; speeds are equivalent airspeeds.", s.in(units.Mass, v.Mass), s.in(units.Altitude, v.Altitude))
	_, err = s.loadsAt(&pointperf.Point{Air: air, Mass: v.Mass}, w)
	return err
}

// tightestWorking derives the thrust in hand at the tightest point of the mission.
func (s *Study) tightestWorking(w *formula.Working) error {
	w.Heading(partTightest)
	t := s.Flight.Tightest
	if t == nil {
		return units.Errorf(nil, "no leg was flown")
	}
	w.Note("In “%s”: pressure altitude %s, mass %s, true airspeed %s.", s.legName(t.Leg), s.in(units.Altitude, t.Altitude), s.in(units.Mass, t.Mass), s.in(units.Speed, t.TAS))
	air, err := s.airOf(t, w)
	if err != nil {
		return err
	}
	p := &pointperf.Point{Air: air, Mass: t.Mass}
	if load := s.Project.Spec.Legs[t.Leg].LoadFactor(); load > 1 {
		_, err = pointperf.AtLoad(s.Aircraft(), p, t.TAS, load, w)
		return err
	}
	_, err = pointperf.At(s.Aircraft(), p, t.TAS, w)
	return err
}

// missionWorking lists what the integration of each leg gave, and the sums.
func (s *Study) missionWorking(w *formula.Working) error {
	w.Heading(partMission)
	f := &s.Flight
	for i := range f.Legs {
		l := &f.Legs[i]
		w.Note("%s: %s, %s over the ground, %s of fuel; %s at its end.", s.legName(i), s.in(units.Duration, l.Time), s.in(units.Distance, l.Distance), s.in(units.Mass, l.Fuel), s.in(units.Mass, l.End.Mass))
	}
	w.Note("Together, without reserve: %s, %s, %s of fuel. Distance, altitude and energy of each leg are integrated in time, the mass falling with the fuel.",
		s.in(units.Duration, f.Time), s.in(units.Distance, f.Distance), s.in(units.Mass, f.Fuel))
	if left := s.Figure("energy_left"); left.Has() {
		w.Note("Of the fuel or charge aboard at the start that leaves %s, before any reserve.", s.in(units.Fraction, left.Value))
	}
	if g := s.Figure("ground_speed"); g.Has() {
		w.Note("The greatest ground speed is the true airspeed along the ground less the head wind of the leg, %s %s; where a leg circles, its wind is met from behind.", s.in(units.Speed, g.Value), g.Where.In(s.Project.Spec.System()))
	}
	for i := range f.Reserve.Parts {
		if p := &f.Reserve.Parts[i]; !p.Rule.Empty() {
			w.Note("%s: %s of fuel to be left, %s.", s.legName(p.Leg), s.in(units.Mass, p.Fuel), p.Rule.In(s.Project.Spec.System()))
		}
	}
	if f.Failure != nil {
		return f.Failure.Err
	}
	return nil
}
