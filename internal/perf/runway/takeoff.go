package runway

import (
	"errors"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/units"
)

// A Segment is one part of a take-off or landing.
type Segment struct {
	Name     string
	Distance float64 // over the ground in m
	Time     float64 // in s
	Fuel     float64 // burnt in kg
	Energy   float64 // drawn electrically in J
	Speed    float64 // true airspeed at its end in m/s
	Height   float64 // above the ground at its end in m
}

// A Run is a take-off or landing in segments.
type Run struct {
	Segments []Segment
	Ground   float64 // length of the ground roll in m
	Total    float64 // over the obstacle in m
	Factored float64 // total times the safety factor in m
	Speed    float64 // lift-off or touchdown true airspeed in m/s
	Screen   float64 // true airspeed at the obstacle in m/s
	Stall    float64 // true airspeed of the stall in m/s
	Angle    float64 // of the climb or approach path in rad
	Path     []PathPoint
}

// A PathPoint is a place on the flown path.
type PathPoint struct {
	X      float64 // along the strip in m
	Height float64 // above the ground in m
}

func (r *Run) add(s Segment) {
	r.Segments = append(r.Segments, s)
	r.Total += s.Distance
}

// Time is the time of the whole run in s.
func (r *Run) Time() float64 {
	sum := 0.0
	for _, s := range r.Segments {
		sum += s.Time
	}
	return sum
}

// Drawn is the fuel burnt in kg and the electrical energy drawn in J.
func (r *Run) Drawn() (fuel, energy float64) {
	for _, s := range r.Segments {
		fuel += s.Fuel
		energy += s.Energy
	}
	return fuel, energy
}

// ErrNoRun says that a take-off or landing cannot be done; the error that wraps it says why.
var ErrNoRun = errors.New("no take-off or landing")

// loadFactor of the transition and flare arcs: D. P. Raymer, Aircraft Design: A
// Conceptual Approach, 2nd edition, AIAA, 1992, section 17.8.
const loadFactor = 1.2

// TakeOff integrates the take-off of an aircraft of the given mass in kg: ground
// roll to the lift-off speed, rotation at that speed, transition arc at load
// factor 1.2, and climb at the climb-out speed to the obstacle height. The obstacle
// may be cleared inside the arc. Construction of the arc: Raymer 1992, section 17.8.
func TakeOff(a *aircraft.Aircraft, mass float64, at Place, how Technique) (Run, error) {
	p := &pointperf.Point{Air: at.Air, Mass: mass, Config: aircraft.TakeOff}
	vs := pointperf.Stall(a, p, nil)
	r := Run{Stall: vs, Speed: how.LiftOffFactor * vs, Screen: how.ClimbOutFactor * vs}
	roll, err := groundRoll(a, p, at, r.Speed)
	if err != nil {
		return r, err
	}
	r.add(roll)
	out, err := pointperf.ThrustAvailable(a, p, r.Speed, nil)
	if err != nil {
		return r, err
	}
	over := func(tas float64) float64 { return tas - at.HeadWind }
	r.add(Segment{Name: "rotation", Distance: math.Max(0, over(r.Speed)) * how.RotationTime, Time: how.RotationTime,
		Fuel: out.FuelFlow * how.RotationTime, Energy: out.BusPower * how.RotationTime, Speed: r.Speed})
	r.Ground = r.Total
	r.Path = append(r.Path, PathPoint{0, 0}, PathPoint{r.Total, 0})
	return r, r.airborne(a, p, at, over)
}

// airborne adds the transition arc and the climb to the obstacle.
func (r *Run) airborne(a *aircraft.Aircraft, p *pointperf.Point, at Place, over func(float64) float64) error {
	arcSpeed := (r.Speed + r.Screen) / 2
	climb, err := pointperf.FullClimb(a, p, r.Screen, nil)
	if err != nil {
		return err
	}
	r.Angle = climb.Angle
	if climb.Angle <= 1e-4 {
		return units.Errorf(ErrNoRun, "it leaves the ground but does not climb away: at {} the path is {} with full power at {} and {}",
			units.Of(units.Speed, r.Screen), units.Of(units.Angle, climb.Angle), units.Of(units.Altitude, at.Air.PressureAltitude), units.Of(units.Mass, p.Mass))
	}
	out, err := pointperf.ThrustAvailable(a, p, r.Screen, nil)
	if err != nil {
		return err
	}
	screen := at.Strip.Obstacle
	radius := arcSpeed * arcSpeed / (atmos.Gravity * (loadFactor - 1))
	angle, top := climb.Angle, radius*(1-math.Cos(climb.Angle))
	if top > screen {
		angle = math.Acos(1 - screen/radius)
		top = screen
	}
	seconds := radius * angle / arcSpeed
	start := r.Total
	r.add(Segment{Name: "transition", Distance: math.Max(0, radius*math.Sin(angle)-at.HeadWind*seconds), Time: seconds,
		Fuel: out.FuelFlow * seconds, Energy: out.BusPower * seconds, Speed: arcSpeed, Height: top})
	for i := 1; i <= 8; i++ {
		f := float64(i) / 8
		r.Path = append(r.Path, PathPoint{start + f*(r.Total-start), radius * (1 - math.Cos(f*angle))})
	}
	if top < screen {
		seconds = (screen - top) / (r.Screen * math.Sin(climb.Angle))
		ground := r.Screen*math.Cos(climb.Angle) - at.HeadWind
		if ground <= 0 {
			ground = 0
		}
		r.add(Segment{Name: "climb", Distance: ground * seconds, Time: seconds, Fuel: out.FuelFlow * seconds, Energy: out.BusPower * seconds,
			Speed: r.Screen, Height: screen})
		r.Path = append(r.Path, PathPoint{r.Total, screen})
	}
	return nil
}

// groundRoll integrates m dV/dt = T − D − μ (W cos φ − L) − W sin φ from rest to the
// lift-off true airspeed in m/s. Thrust is taken at the airspeed, ground speed plus head wind.
func groundRoll(a *aircraft.Aircraft, p *pointperf.Point, at Place, liftOff float64) (Segment, error) {
	phi := polar.GroundEffect(a.WingHeight(), a.Span(), nil)
	tilt := math.Atan(at.Strip.Slope)
	weight, q := p.Weight(), 0.5*p.Air.Density*a.WingArea()
	cd := a.Polar(p.Config).CD(a.GroundCL(), phi, nil)
	end := liftOff - at.HeadWind
	if end <= 0 {
		return Segment{Name: "ground roll", Speed: liftOff}, nil
	}
	// y: ground speed, distance, fuel, energy against time.
	forces := func(_ float64, y, dydt []float64) error {
		air := math.Max(0, y[0]+at.HeadWind)
		out, err := pointperf.ThrustAvailable(a, p, air, nil)
		if err != nil {
			return err
		}
		load := math.Max(0, weight*math.Cos(tilt)-q*air*air*a.GroundCL())
		net := out.Thrust - q*air*air*cd - at.Surface.Rolling*load - weight*math.Sin(tilt)
		dydt[0], dydt[1], dydt[2], dydt[3] = net/p.Mass, y[0], out.FuelFlow, out.BusPower
		return nil
	}
	var start [4]float64
	if err := forces(0, start[:], start[:]); err != nil {
		return Segment{}, err
	}
	if start[0] <= 0 {
		return Segment{}, units.Errorf(ErrNoRun, "the aircraft does not start to roll: static thrust is {} short of friction and slope", units.Of(units.Force, -start[0]*p.Mass))
	}
	const longest = 600.0
	sol, err := numeric.Integrate(forces, 0, make([]float64, 4), longest, numeric.Options{RelTol: 1e-8, AbsTol: []float64{1e-6, 1e-4, 1e-8, 1},
		InitialStep: 0.5, Events: []numeric.Event{
			{Name: "lift-off", Direction: 1, Terminal: true, G: func(_ float64, y []float64) float64 { return y[0] - end }},
		}})
	if err != nil {
		return Segment{}, err
	}
	t, y := sol.End()
	if sol.Stopped == nil {
		return Segment{}, units.Errorf(ErrNoRun, "the aircraft does not reach its lift-off speed of {}: it stops gaining at {}", units.Of(units.Speed, liftOff), units.Of(units.Speed, y[0]+at.HeadWind))
	}
	return Segment{Name: "ground roll", Distance: y[1], Time: t, Fuel: y[2], Energy: y[3], Speed: liftOff}, nil
}

// Resistance is drag, rolling friction and slope in N at the true airspeed tas in m/s, >= 0, in the take-off run.
func Resistance(a *aircraft.Aircraft, mass float64, at Place, tas float64) float64 {
	q := 0.5 * at.Air.Density * a.WingArea() * tas * tas
	tilt := math.Atan(at.Strip.Slope)
	weight := mass * atmos.Gravity
	cd := a.Polar(aircraft.TakeOff).CD(a.GroundCL(), polar.GroundEffect(a.WingHeight(), a.Span(), nil), nil)
	return q*cd + at.Surface.Rolling*math.Max(0, weight*math.Cos(tilt)-q*a.GroundCL()) + weight*math.Sin(tilt)
}
