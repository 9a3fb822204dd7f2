package study

import (
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A circumstance is the condition of a requirement, resolved.
type circumstance struct {
	place runway.Place // strip, with the air of the condition on it
	day   atmos.Day
	point pointperf.Point
	where units.Message
}

// under resolves the conditions of a requirement. The words say the whole condition,
// also what the study gives, as far as the figure depends on it.
func (s *Study) under(kind project.FigureKind, r *project.Requirement) (circumstance, error) {
	takes := kind.Takes
	c := circumstance{place: s.Project.Departure, day: s.Project.Plan.Day}
	landing := kind.ID == "landing_distance" || kind.ID == "landing_roll" || kind.ID == "balked_gradient"
	if landing {
		c.place = s.Project.Arrival
	}
	if takes&project.Ground != 0 {
		c.place = s.ground(r, c.place)
	}
	if r.DayGiven == mission.OwnDay && takes&project.Heat != 0 {
		c.day = atmos.Day{Deviation: r.Deviation}
	}
	own := takes&project.Height != 0 && r.AltitudeGiven == project.AtAltitude
	if own || r.DayGiven == mission.OwnDay {
		hp := c.place.Air.PressureAltitude
		if own {
			hp = r.Altitude
		}
		air, err := c.day.At(hp, nil)
		if err != nil {
			return c, err
		}
		c.place.Air = air
	}
	mass, err := s.massOf(r, takes, landing, kind.ID)
	c.point = pointperf.Point{Air: c.place.Air, Mass: mass, Config: configOf(kind, r)}
	c.where = c.words(takes, r)
	return c, err
}

// ground is the strip that the requirement holds for; usual is the mission's.
func (s *Study) ground(r *project.Requirement, usual runway.Place) runway.Place {
	if level, ok := r.LevelStrip(); ok {
		surface, _ := runway.LookupSurface(level.Surface)
		return runway.Place{Strip: level, Surface: surface, Air: usual.Air}
	}
	if r.StripGiven == project.NamedStrip {
		if place, ok := s.Project.Place(r.Strip); ok {
			return place
		}
	}
	return usual
}

// massOf is the mass of the requirement in kg.
func (s *Study) massOf(r *project.Requirement, takes project.Terms, landing bool, id string) (float64, error) {
	mass := s.Masses.Start
	switch {
	case landing:
		mass = s.Masses.Landing
	case takes&project.Ground != 0 || id == "climb_gradient":
		mass = s.TakeOff.Mass
	}
	if takes&project.Load == 0 {
		return mass, nil
	}
	switch r.MassGiven {
	case project.AtStart:
		mass = s.Masses.Start
	case project.AtGreatest:
		mass = s.Masses.MaxTakeOff
	case project.AtLanding:
		mass = s.Masses.Landing
		if !s.lands() {
			return mass, units.Errorf(nil, "the mission does not come to a landing, so it has no landing mass")
		}
	case project.GivenMass:
		mass = r.Mass
	}
	if mass < s.Masses.Empty {
		return mass, units.Errorf(nil, "a mass of {} is below that of the empty aircraft, {}", units.Of(units.Mass, mass), units.Of(units.Mass, s.Masses.Empty))
	}
	return mass, nil
}

// lands reports whether a landing of the mission was reached.
func (s *Study) lands() bool {
	for i := range s.Flight.Legs {
		if s.Flight.Legs[i].Leg.Kind == mission.Landing {
			return true
		}
	}
	return false
}

// configOf is the configuration in which a figure is flown.
func configOf(kind project.FigureKind, r *project.Requirement) aircraft.Config {
	switch kind.ID {
	case "climb_gradient", "stall_take_off", "take_off_distance", "take_off_roll":
		return aircraft.TakeOff
	case "balked_gradient", "stall_landing", "landing_distance", "landing_roll":
		return aircraft.Landing
	}
	for _, c := range []aircraft.Config{aircraft.TakeOff, aircraft.Landing} {
		if kind.Takes&project.Flaps != 0 && c.String() == r.Config {
			return c
		}
	}
	return aircraft.Clean
}

// words says the condition as far as the figure depends on it.
func (c *circumstance) words(takes project.Terms, r *project.Requirement) units.Message {
	var list []units.Arg
	say := func(when bool, m units.Message) {
		if when {
			list = append(list, units.Nest(m))
		}
	}
	say(takes&project.Ground != 0, units.Message{Format: c.place.Strip.Name})
	say(takes&project.Height != 0, units.Say("{}", units.Of(units.Altitude, c.point.Air.PressureAltitude)))
	say(takes&project.Heat != 0 && r.DayGiven == mission.OwnDay, project.Standard(r.Deviation))
	say(takes&project.Load != 0, units.Say("{}", units.Of(units.Mass, c.point.Mass)))
	say(takes&project.Flaps != 0, units.Message{Format: c.point.Config.String()})
	say(takes&project.Lever != 0, units.Say("{} of rated power", units.Of(units.Fraction, r.Power)))
	say(takes&project.Top != 0, units.Say("to {}", units.Of(units.Altitude, r.ClimbTo)))
	say(takes&project.Kept != 0, units.Say("{} of the fuel or charge kept", units.Of(units.Fraction, r.Kept)))
	say(takes&project.Airspeed != 0 && r.Airspeed == project.Calibrated, units.Message{Format: "calibrated"})
	say(takes&project.Margin != 0 && r.Distance == project.Factored, units.Message{Format: "with the safety factor"})
	if len(list) == 0 {
		return units.Message{}
	}
	return units.Message{Format: strings.TrimSuffix(strings.Repeat("{}, ", len(list)), ", "), Args: list}
}
