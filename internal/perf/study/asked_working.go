package study

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// loadingWorking divides the start mass by what carries it.
func (s *Study) loadingWorking(w *formula.Working) error {
	w.Heading(partLoading)
	mass, area := s.Masses.Start, s.Aircraft().WingArea()
	w.Note("Wing loading: %s over %s is %s.", s.in(units.Mass, mass), s.in(units.Area, area), s.in(units.WingLoading, mass/area))
	if s.staticErr != nil {
		return s.staticErr
	}
	weight := (&pointperf.Point{Mass: mass}).Weight()
	w.Note("Static thrust over weight: %s over %s is %s; both on the departure strip at start mass.", s.in(units.Force, s.Static.Thrust), s.in(units.Force, weight), s.in(units.Fraction, s.Static.Thrust/weight))
	if err := s.shaftErr(); err != nil {
		return err
	}
	w.Note("Mass per shaft power: %s over %s is %s. The power is what the propeller absorbs at rest, which for a fixed pitch is less than the rating.",
		s.in(units.Mass, mass), s.in(units.Power, s.Static.Shaft.Power), s.in(units.PowerLoading, mass/s.Static.Shaft.Power))
	return nil
}

// ownTerms reports whether the requirement is held against a figure of its own and not one of the study's.
func (v *Verdict) ownTerms() bool {
	return v.Figure != nil && (v.Figure.Asked || len(v.Requirement.Stated()) > 0)
}

// askedWorking derives the figure of every requirement that sets conditions of its own.
func (s *Study) askedWorking(w *formula.Working) error {
	w.Heading(partAsked)
	w.Note("A requirement that sets no conditions is held against the figures derived above; each of the others follows here.")
	for i := range s.Requirements {
		v := &s.Requirements[i]
		if !v.ownTerms() {
			continue
		}
		r := &v.Requirement
		w.Heading(v.WorkingPart())
		w.Note("Condition: %s.", v.Figure.Where.In(s.Project.Spec.System()))
		c, err := s.under(v.Figure.FigureKind, r)
		if air, wrong := c.day.At(c.point.Air.PressureAltitude, nil); wrong == nil && air == c.point.Air {
			c.day.At(air.PressureAltitude, w)
		}
		if err == nil {
			err = s.derive(v.Figure.ID, r, &c, w)
		}
		if err != nil {
			w.Note("No answer: %s.", units.Explain(err).In(s.Project.Spec.System()))
			continue
		}
		if v.Figure.Has() {
			w.Note("%s is %s.", v.Figure.Label, s.in(v.Figure.Quantity, v.Figure.Value))
		}
	}
	return nil
}

// derive writes down how the figure of that identifier comes about under the condition.
func (s *Study) derive(id string, r *project.Requirement, c *circumstance, w *formula.Working) error {
	a, p, how := s.Aircraft(), &c.point, s.Project.Plan.Technique
	climbs := func(tas float64, err error) error {
		if err != nil {
			return err
		}
		climb, err := pointperf.FullClimb(a, p, tas, w)
		w.Note("At %s; the gradient is the tangent of the angle, %s.", s.in(units.Speed, tas), s.in(units.Fraction, climb.Gradient()))
		return err
	}
	switch id {
	case "take_off_distance", "take_off_roll":
		run, err := runway.TakeOff(a, p.Mass, c.place, how)
		run.Factor(how.TakeOffFactor)
		pointperf.Stall(a, p, w)
		s.segments(w, &run, how.TakeOffFactor)
		return err
	case "landing_distance", "landing_roll":
		run, err := runway.Landing(a, p.Mass, c.place, how)
		run.Factor(how.LandingFactor)
		pointperf.Stall(a, p, w)
		s.segments(w, &run, how.LandingFactor)
		return err
	case "climb_rate":
		best := pointperf.BestRate(a, p)
		return climbs(best.TAS, best.Err)
	case "steepest_gradient":
		best := pointperf.BestAngle(a, p)
		return climbs(best.TAS, best.Err)
	case "climb_gradient":
		return climbs(how.ClimbOutFactor*pointperf.Stall(a, p, w), nil)
	case "balked_gradient":
		return climbs(how.ApproachFactor*pointperf.Stall(a, p, w), nil)
	case "time_to_climb":
		w.Note("Integrated over altitude at best rate and full power, clean, the mass falling with the fuel burnt.")
	case "service_ceiling", "absolute_ceiling":
		w.Note("The pressure altitude at which the best rate of climb has fallen to the rate that defines it, %s or none; found by a bracketed root.", s.in(units.ClimbRate, pointperf.ServiceRate))
	case "stall_clean", "stall_take_off", "stall_landing":
		tas := pointperf.Stall(a, p, w)
		w.Note("True %s, calibrated %s.", s.in(units.Speed, tas), s.in(units.Speed, float64(p.Air.CAS(tas))))
	case "level_max":
		best := pointperf.LevelMax(a, p)
		return s.deriveLevel(p, best.TAS*(1-1e-9), best.Err, w)
	case "cruise_speed":
		l, err := pointperf.AtFraction(a, p, r.Power)
		w.Note("The fastest level speed at which the powerplant makes %s of its rating; found by a bracketed root.", s.in(units.Fraction, r.Power))
		return s.deriveLevel(p, l.TAS, err, w)
	case "range", "endurance":
		return s.deriveReach(id == "endurance", r, p, w)
	case "glide_ratio":
		g, err := pointperf.BestGlide(a, p)
		if err != nil {
			return err
		}
		out, err := a.Plant().Run(p.Condition(g.RatioTAS), 0, w)
		if err != nil {
			return err
		}
		pointperf.ClimbAt(a, p, g.RatioTAS, out.Thrust, 0, w)
		w.Note("The glide ratio is 1 over the tangent of the angle below the horizontal.")
	case "turn_load":
		return s.deriveTurn(r, p, w)
	case "maneuvering_speed", "gust_load":
		g, err := s.loadsAt(p, w)
		if err != nil {
			return err
		}
		w.Note("The greatest load factor of the envelope is %s at %s.", units.Plain(roundTo(g.Greatest.Load, 1000)), s.in(units.Speed, g.Greatest.EAS))
	case "wing_loading":
		w.Note("%s over %s.", s.in(units.Mass, p.Mass), s.in(units.Area, a.WingArea()))
	default:
		out, err := a.Plant().Run(powerplant.Condition{Air: p.Air}, 1, w)
		if err != nil {
			return err
		}
		w.Note("At rest: thrust %s, shaft power %s; weight %s.", s.in(units.Force, out.Thrust), s.in(units.Power, out.Shaft.Power), s.in(units.Force, p.Weight()))
	}
	return nil
}

// deriveLevel derives level flight at the true airspeed in m/s.
func (s *Study) deriveLevel(p *pointperf.Point, tas float64, err error, w *formula.Working) error {
	if err != nil {
		return err
	}
	w.Note("Level at %s true, %s calibrated.", s.in(units.Speed, tas), s.in(units.Speed, float64(p.Air.CAS(tas))))
	required := pointperf.ThrustRequired(s.Aircraft(), p, tas, w)
	_, _, err = s.Aircraft().Plant().Match(p.Condition(tas), required, w)
	return err
}

func (s *Study) deriveReach(lasting bool, r *project.Requirement, p *pointperf.Point, w *formula.Working) error {
	reach, err := mission.LevelReach(s.Aircraft(), p.Air, p.Mass, r.Kept, lasting)
	if err != nil {
		return err
	}
	w.Note("Level in still air at the best speed for each mass, from %s at the start to %s at the end; start, climb and descent are not in it. It uses %s of fuel and %s of charge.",
		s.in(units.Speed, reach.First), s.in(units.Speed, reach.Last), s.in(units.Mass, reach.Used), s.in(units.Energy, reach.Drawn))
	w.Note("Time is the integral of dm over the fuel flow, distance that of V dm over the fuel flow. At its start:")
	if err := s.deriveLevel(p, reach.First, nil, w); err != nil {
		return err
	}
	w.Note("Together %s and %s.", s.in(units.Distance, reach.Distance), s.in(units.Duration, reach.Time))
	return nil
}

func (s *Study) deriveTurn(r *project.Requirement, p *pointperf.Point, w *formula.Working) error {
	tas := r.TurnSpeed
	if r.TurnGiven != project.TurnSpeed {
		best, _ := pointperf.BestTurn(s.Aircraft(), p)
		if best.Err != nil {
			return best.Err
		}
		tas = best.TAS
	}
	n, err := s.turnLoad(r, p)
	if err != nil {
		return err
	}
	out, err := pointperf.ThrustAvailable(s.Aircraft(), p, tas, w)
	if err != nil {
		return err
	}
	most := pointperf.LiftLoad(s.Aircraft(), p, tas, w)
	drag := pointperf.Drag(s.Aircraft(), p, tas, n*p.Weight(), 1, w)
	end := "thrust"
	if math.Abs(n-most) < 1e-9*most {
		end = "maximum lift"
	}
	w.Note("At %s the load factor rises until %s ends it: thrust available %s, drag %s.", s.in(units.Speed, tas), end, s.in(units.Force, out.Thrust), s.in(units.Force, drag))
	return nil
}
