package study

import (
	"math"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// measure is the figure of that identifier, which depends on conditions, under those of a requirement, in SI.
func (s *Study) measure(id string, r *project.Requirement, c *circumstance) (float64, error) {
	a, p := s.Aircraft(), &c.point
	switch id {
	case "take_off_distance", "take_off_roll", "landing_distance", "landing_roll":
		return s.distance(id, r, c)
	case "climb_rate":
		best := pointperf.BestRate(a, p)
		return best.Value, best.Err
	case "climb_gradient":
		return s.gradientAt(p, s.Project.Plan.Technique.ClimbOutFactor)
	case "balked_gradient":
		return s.gradientAt(p, s.Project.Plan.Technique.ApproachFactor)
	case "steepest_gradient":
		best := pointperf.BestAngle(a, p)
		return math.Tan(best.Value), best.Err
	case "time_to_climb":
		return s.timeToClimb(r, c)
	case "service_ceiling":
		return pointperf.Ceiling(a, c.day, p.Mass, p.Config, pointperf.ServiceRate)
	case "absolute_ceiling":
		return pointperf.Ceiling(a, c.day, p.Mass, p.Config, pointperf.AbsoluteRate)
	case "stall_clean", "stall_take_off", "stall_landing":
		return airspeed(r, p, pointperf.Stall(a, p, nil)), nil
	case "level_max":
		best := pointperf.LevelMax(a, p)
		return airspeed(r, p, best.TAS), best.Err
	case "cruise_speed":
		l, err := pointperf.AtFraction(a, p, r.Power)
		return airspeed(r, p, l.TAS), err
	case "range", "endurance":
		reach, err := mission.LevelReach(a, p.Air, p.Mass, r.Kept, id == "endurance")
		if id == "endurance" {
			return reach.Time, err
		}
		return reach.Distance, err
	case "glide_ratio":
		g, err := pointperf.BestGlide(a, p)
		return g.Ratio, err
	case "turn_load":
		return s.turnLoad(r, p)
	case "maneuvering_speed", "gust_load":
		g, err := s.loadsAt(p, nil)
		switch {
		case err != nil:
			return 0, err
		case id == "gust_load":
			return g.Greatest.Load, nil
		}
		return g.Maneuver, nil
	case "wing_loading":
		return p.Mass / a.WingArea(), nil
	}
	out, err := a.Plant().Run(powerplant.Condition{Air: p.Air}, 1, nil)
	if err != nil {
		return 0, err
	}
	switch id {
	case "static_thrust":
		return out.Thrust, nil
	case "static_thrust_ratio":
		return out.Thrust / p.Weight(), nil
	case "static_speed":
		return out.Shaft.EngineSpeed, turns(out)
	case "power_loading":
		return p.Mass / out.Shaft.Power, turns(out)
	}
	return 0, units.Errorf(nil, "this figure takes no conditions")
}

// turns reports a powerplant that turns no propeller.
func turns(out powerplant.Output) error {
	if out.Shaft.Speed == 0 {
		return units.Errorf(nil, "this powerplant turns no propeller")
	}
	return nil
}

// airspeed reads the true airspeed in m/s as the requirement does.
func airspeed(r *project.Requirement, p *pointperf.Point, tas float64) float64 {
	if r.Airspeed == project.Calibrated {
		return float64(p.Air.CAS(tas))
	}
	return tas
}

func (s *Study) distance(id string, r *project.Requirement, c *circumstance) (float64, error) {
	how, fly := s.Project.Plan.Technique, runway.TakeOff
	factor := how.TakeOffFactor
	if id == "landing_distance" || id == "landing_roll" {
		fly, factor = runway.Landing, how.LandingFactor
	}
	run, err := fly(s.Aircraft(), c.point.Mass, c.place, how)
	if err == nil && run.Total <= 0 {
		err = units.Errorf(runway.ErrNoRun, "the wind alone carries the aircraft: there is no run over the ground")
	}
	switch {
	case id == "take_off_roll" || id == "landing_roll":
		return run.Ground, err
	case r.Distance == project.Factored:
		return factor * run.Total, err
	}
	return run.Total, err
}

// gradientAt is the climb gradient with full power at factor times the stall.
func (s *Study) gradientAt(p *pointperf.Point, factor float64) (float64, error) {
	a := s.Aircraft()
	climb, err := pointperf.FullClimb(a, p, factor*pointperf.Stall(a, p, nil), nil)
	return climb.Gradient(), err
}

// timeToClimb is the time in s of a climb at best rate, clean, the mass falling with the fuel.
func (s *Study) timeToClimb(r *project.Requirement, c *circumstance) (float64, error) {
	from := c.point.Air.PressureAltitude
	if r.ClimbTo <= from {
		return 0, units.Errorf(nil, "the altitude to climb to, {}, is not above {}", units.Of(units.Altitude, r.ClimbTo), units.Of(units.Altitude, from))
	}
	rows, err := mission.ClimbProfile(s.Aircraft(), c.day, c.point.Mass, []float64{from, r.ClimbTo})
	if err == nil && len(rows) < 2 {
		err = units.Errorf(nil, "it does not climb to {}", units.Of(units.Altitude, r.ClimbTo))
	}
	if err != nil {
		return 0, err
	}
	return rows[1].Time, nil
}

func (s *Study) turnLoad(r *project.Requirement, p *pointperf.Point) (float64, error) {
	a := s.Aircraft()
	if r.TurnGiven != project.TurnSpeed {
		best, _ := pointperf.BestTurn(a, p)
		return best.Value, best.Err
	}
	if limit := p.Air.CAS(r.TurnSpeed); float64(limit) > a.NeverExceed() {
		return 0, units.Errorf(nil, "{} true is above the never-exceed speed, {} calibrated", units.Of(units.Speed, r.TurnSpeed), units.Of(units.Speed, a.NeverExceed()))
	}
	n, _, err := pointperf.SustainedLoad(a, p, r.TurnSpeed)
	return n, err
}
