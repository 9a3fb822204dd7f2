package runway

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/units"
)

// Speeds of the flare and of touchdown over the stall speed: D. P. Raymer,
// Aircraft Design: A Conceptual Approach, 2nd edition, AIAA, 1992, section 17.9, for an
// approach at 1.3; another approach speed is faded to the same touchdown speed.
const touchdownFactor = 1.15

// Landing integrates the landing of an aircraft of the given mass in kg: approach
// from the obstacle height, flare arc at load factor 1.2, free roll and braked roll
// with the powerplant at idle. Construction of the flare: Raymer 1992, section 17.9.
func Landing(a *aircraft.Aircraft, mass float64, at Place, how Technique) (Run, error) {
	p := &pointperf.Point{Air: at.Air, Mass: mass, Config: aircraft.Landing}
	vs := pointperf.Stall(a, p, nil)
	r := Run{Stall: vs, Screen: how.ApproachFactor * vs, Speed: math.Min(touchdownFactor, how.ApproachFactor) * vs, Angle: how.ApproachAngle}
	screen := at.Strip.Obstacle
	flareSpeed := (r.Screen + r.Speed) / 2
	radius := flareSpeed * flareSpeed / (atmos.Gravity * (loadFactor - 1))
	angle, begin := how.ApproachAngle, radius*(1-math.Cos(how.ApproachAngle))
	if begin > screen {
		angle = math.Acos(1 - screen/radius)
		begin = screen
	}
	r.Path = append(r.Path, PathPoint{0, screen})
	if begin < screen {
		seconds := (screen - begin) / (r.Screen * math.Sin(how.ApproachAngle))
		r.add(Segment{Name: "approach", Distance: math.Max(0, r.Screen*math.Cos(how.ApproachAngle)-at.HeadWind) * seconds, Time: seconds, Speed: r.Screen, Height: begin})
		r.Path = append(r.Path, PathPoint{r.Total, begin})
	}
	seconds := radius * angle / flareSpeed
	start := r.Total
	r.add(Segment{Name: "flare", Distance: math.Max(0, radius*math.Sin(angle)-at.HeadWind*seconds), Time: seconds, Speed: r.Speed})
	for i := 1; i <= 8; i++ {
		f := 1 - float64(i)/8
		r.Path = append(r.Path, PathPoint{start + (1-f)*(r.Total-start), radius * (1 - math.Cos(f*angle))})
	}
	before := r.Total
	if ground := r.Speed - at.HeadWind; ground > 0 {
		r.add(Segment{Name: "free roll", Distance: ground * how.FreeRollTime, Time: how.FreeRollTime, Speed: r.Speed})
	}
	roll, err := brakedRoll(a, p, at, how, r.Speed)
	if err != nil {
		return r, err
	}
	r.add(roll)
	r.Ground = r.Total - before
	r.Path = append(r.Path, PathPoint{r.Total, 0})
	r.idleFlow(a, p)
	return r, nil
}

// idleFlow charges every segment with what the idling powerplant draws.
func (r *Run) idleFlow(a *aircraft.Aircraft, p *pointperf.Point) {
	out, err := a.Plant().Run(p.Condition(0), 0, nil)
	if err != nil {
		return
	}
	for i := range r.Segments {
		s := &r.Segments[i]
		s.Fuel, s.Energy = out.FuelFlow*s.Time, out.BusPower*s.Time
	}
}

// brakedRoll integrates from the touchdown true airspeed in m/s to a stop, with
// the wing in ground effect at the lift coefficient of the take-off run.
func brakedRoll(a *aircraft.Aircraft, p *pointperf.Point, at Place, how Technique, touchdown float64) (Segment, error) {
	phi := polar.GroundEffect(a.WingHeight(), a.Span(), nil)
	tilt := math.Atan(at.Strip.Slope)
	weight, q := p.Weight(), 0.5*p.Air.Density*a.WingArea()
	cl := a.GroundCL()
	cd := a.Polar(p.Config).CD(cl, phi, nil)
	mu := math.Max(at.Surface.Rolling, how.BrakingFraction*at.Surface.Braking)
	begin := touchdown - at.HeadWind
	if begin <= 0 {
		return Segment{Name: "braked roll"}, nil
	}
	// x: distance, time against the ground speed lost, so that the stop is the end of the span.
	retard := func(v float64) (float64, error) {
		air := math.Max(0, v+at.HeadWind)
		idle, err := a.Plant().Run(p.Condition(air), 0, nil)
		if err != nil {
			return 0, err
		}
		load := math.Max(0, weight*math.Cos(tilt)-q*air*air*cl)
		return (q*air*air*cd + mu*load + weight*math.Sin(tilt) - idle.Thrust) / p.Mass, nil
	}
	rates := func(lost float64, _, dydt []float64) error {
		v := begin - lost
		d, err := retard(v)
		if err != nil {
			return err
		}
		if d <= 0 {
			return units.Errorf(ErrNoRun, "the aircraft does not stop: friction does not hold it on the slope at {}", units.Of(units.Speed, v))
		}
		dydt[0], dydt[1] = v/d, 1/d
		return nil
	}
	sol, err := numeric.Integrate(rates, 0, make([]float64, 2), begin, numeric.Options{RelTol: 1e-8, AbsTol: []float64{1e-5, 1e-6}})
	if err != nil {
		return Segment{}, err
	}
	_, y := sol.End()
	return Segment{Name: "braked roll", Distance: y[0], Time: y[1]}, nil
}

// Factor sets the factored distance.
func (r *Run) Factor(f float64) { r.Factored = f * r.Total }
