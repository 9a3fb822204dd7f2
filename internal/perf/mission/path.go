package mission

import (
	"errors"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// leastClimb is the rate of climb in m/s at which a climb counts as having
// reached its ceiling: a tenth of the service ceiling's.
const leastClimb = 0.05

// A rider integrates one airborne leg.
type rider struct {
	f     *flier
	l     *Leg
	day   atmos.Day
	speed schedule
	load  float64 // load factor, dimensionless, >= 1: 1 but in turns
	base  Sample  // at the start of the leg
	gave  string  // what gave way in a descent at idle
}

// The state of the integration: distance, pressure altitude, fuel burnt, energy
// drawn, and, in turns only, the angle turned through.
const (
	atDistance = iota
	atAltitude
	atFuel
	atEnergy
	atAngle
)

var tolerances = [...]float64{atDistance: 1e-2, atAltitude: 1e-3, atFuel: 1e-7, atEnergy: 1, atAngle: 1e-6}

// moment is everything about one moment of a leg.
type moment struct {
	point    pointperf.Point
	tas      float64
	climb    pointperf.Climb
	required float64
	setting  float64
	out      powerplant.Output
}

func (f *flier) path(l *Leg, r *LegResult) error {
	day := f.plan.Day
	if l.DayGiven == OwnDay {
		day.Deviation = l.Deviation
	}
	if l.Kind == Reserve {
		f.now.Altitude = l.Altitude
	}
	if l.Kind == Climb && l.Altitude <= f.now.Altitude || l.Kind == Descent && l.Altitude >= f.now.Altitude {
		r.Notes = append(r.Notes, units.Say("already at {}; nothing to fly", units.Of(units.Altitude, f.now.Altitude)))
		return nil
	}
	speed, err := f.schedule(l, day)
	if err != nil {
		return err
	}
	ride := &rider{f: f, l: l, day: day, speed: speed, load: l.LoadFactor(), base: f.now}
	err = ride.run()
	if ride.gave != "" {
		r.Notes = append(r.Notes, units.Say("the engine idles and the {} gives way: less than idle would be needed", units.Text(ride.gave)))
	}
	return err
}

// start is the state at the start of the leg.
func (r *rider) start() []float64 {
	y := make([]float64, atAngle, atAngle+1)
	y[atDistance], y[atAltitude] = r.base.Distance, r.base.Altitude
	if r.l.Kind == Turns {
		y = append(y, 0)
	}
	return y
}

// run integrates the leg, keeps its samples and leaves the flier at its end.
func (r *rider) run() error {
	start := r.start()
	first, err := r.moment(start)
	if limit := r.limits(start); limit != nil {
		// A speed out of bounds says more than the thrust that it lacks there.
		if err == nil {
			r.keep(0, start, &first)
		}
		return limit
	}
	if err != nil {
		return err
	}
	if err := r.flyable(&first); err != nil {
		r.keep(0, start, &first)
		return err
	}
	limit, events := r.ending()
	sol, err := numeric.Integrate(r.rates, 0, start, limit, numeric.Options{RelTol: 1e-8,
		AbsTol: tolerances[:len(start)], InitialStep: math.Max(1, limit/2000), Events: events})
	r.sample(sol)
	if err != nil {
		return cause(err)
	}
	return r.outcome(sol)
}

// cause strips the integrator's own wrapping, which means nothing to the reader.
func cause(err error) error {
	var step *numeric.StepError
	if errors.As(err, &step) && step.Err != nil {
		return step.Err
	}
	return err
}

// limits checks the scheduled speed of a state against the stall and the never-exceed speed.
func (r *rider) limits(y []float64) error {
	p, tas, err := r.where(y)
	if err != nil {
		return err
	}
	if stall := r.stall(&p); tas < stall*(1-1e-9) {
		return belowStall(tas, stall)
	}
	if top := r.top(&p); tas > top*(1+1e-9) {
		return aboveNeverExceed(tas, top)
	}
	return nil
}

// stall is the true airspeed of the stall at the leg's load factor in m/s.
func (r *rider) stall(p *pointperf.Point) float64 {
	return pointperf.Stall(r.f.a, p, nil) * math.Sqrt(r.load)
}

// top is the never-exceed speed as a true airspeed in m/s.
func (r *rider) top(p *pointperf.Point) float64 { return p.Air.FromCAS(atmos.CAS(r.f.a.NeverExceed())) }

// flyable checks what else can be known before flying.
func (r *rider) flyable(m *moment) error {
	if r.base.Fuel <= 0 && m.out.FuelFlow > 0 || r.base.Charge <= 0 && m.out.BusPower > 0 {
		return emptied(m.point.Mass, m.point.Air.PressureAltitude)
	}
	if r.l.byDistance() && m.tas*math.Cos(m.climb.Angle) <= r.l.HeadWind {
		return units.Errorf(nil, "the head wind of {} leaves no way over the ground at {}", units.Of(units.Speed, r.l.HeadWind), units.Of(units.Speed, m.tas))
	}
	if r.l.Kind == Climb && m.climb.PressureRate < leastClimb {
		return r.noClimb(m)
	}
	return nil
}

func (r *rider) noClimb(m *moment) error {
	return units.Errorf(nil, "it climbs no further than {} at {}: at {} the thrust available is {} against {} required",
		units.Of(units.Altitude, m.point.Air.PressureAltitude), units.Of(units.Mass, m.point.Mass), units.Of(units.Speed, m.tas),
		units.Of(units.Force, m.out.Thrust), units.Of(units.Force, m.climb.Drag))
}

const (
	eventEnd = iota
	eventFuel
	eventCharge
	eventCeiling
	eventStall
	eventNeverExceed
)

// ending gives the longest time of the leg in s and the events that end it.
func (r *rider) ending() (float64, []numeric.Event) {
	longest := 10 * 24 * 3600.0
	target := func(_ float64, _ []float64) float64 { return 1 }
	direction := 0
	switch l := r.l; {
	case l.Kind == Climb:
		target, direction = func(_ float64, y []float64) float64 { return y[atAltitude] - l.Altitude }, 1
	case l.Kind == Descent:
		target, direction = func(_ float64, y []float64) float64 { return y[atAltitude] - l.Altitude }, -1
	case l.byDistance():
		target, direction = func(_ float64, y []float64) float64 { return y[atDistance] - r.base.Distance - l.Distance }, 1
		if l.Distance == 0 {
			longest = 0
		}
	case l.Kind == Turns:
		target, direction = func(_ float64, y []float64) float64 { return y[atAngle] - l.sweep() }, 1
		if l.sweep() == 0 {
			longest = 0
		}
	default:
		longest = l.Time
	}
	return longest, []numeric.Event{
		eventEnd:         {Name: "end", Terminal: true, Direction: direction, G: target},
		eventFuel:        {Name: "fuel used", Terminal: true, Direction: -1, G: func(_ float64, y []float64) float64 { return r.base.Fuel - y[atFuel] }},
		eventCharge:      {Name: "charge used", Terminal: true, Direction: -1, G: func(_ float64, y []float64) float64 { return r.base.Charge - y[atEnergy] }},
		eventCeiling:     {Name: "ceiling", Terminal: true, Direction: -1, G: r.climbMargin},
		eventStall:       {Name: "stall", Terminal: true, Direction: -1, G: r.stallMargin},
		eventNeverExceed: {Name: "never-exceed speed", Terminal: true, Direction: -1, G: r.topMargin},
	}
}

// climbMargin is the rate of climb above leastClimb in m/s; positive on legs that do not climb.
func (r *rider) climbMargin(_ float64, y []float64) float64 {
	if r.l.Kind != Climb {
		return 1
	}
	m, err := r.moment(y)
	if err != nil {
		return 1
	}
	return m.climb.PressureRate - leastClimb
}

// stallMargin is the speed above the stall in m/s, for speeds that do not follow the stall themselves.
func (r *rider) stallMargin(_ float64, y []float64) float64 {
	if r.l.SpeedRule != ByTAS && r.l.SpeedRule != ByMach && r.l.SpeedRule != ByCAS {
		return 1
	}
	p, tas, err := r.where(y)
	if err != nil {
		return 1
	}
	return tas - r.stall(&p)*(1-1e-9)
}

// topMargin is the speed below the never-exceed speed in m/s, for a descent on
// which the true airspeed does not follow it by itself.
func (r *rider) topMargin(_ float64, y []float64) float64 {
	if r.l.Kind != Descent || r.l.SpeedRule == ByCAS {
		return 1
	}
	p, tas, err := r.where(y)
	if err != nil {
		return 1
	}
	return r.top(&p)*(1+1e-9) - tas
}

// outcome says whether the leg ended as asked.
func (r *rider) outcome(sol *numeric.Solution) error {
	s := sol.Stopped
	if s == nil {
		if end, _ := sol.End(); end == 0 || r.l.byTime() {
			return nil
		}
		return units.Errorf(nil, "it is not over after ten days")
	}
	switch s.Event {
	case eventEnd:
		return nil
	case eventFuel:
		return units.Errorf(nil, "the fuel is used up after {} of it, {} on", units.Of(units.Duration, s.T), units.Of(units.Distance, s.Y[atDistance]-r.base.Distance))
	case eventCharge:
		return units.Errorf(nil, "the battery is empty after {} of it, {} on", units.Of(units.Duration, s.T), units.Of(units.Distance, s.Y[atDistance]-r.base.Distance))
	}
	m, err := r.moment(s.Y)
	if err != nil {
		return err
	}
	if s.Event == eventCeiling {
		return r.noClimb(&m)
	}
	if s.Event == eventNeverExceed {
		return aboveNeverExceed(m.tas, r.top(&m.point))
	}
	return belowStall(m.tas, r.stall(&m.point))
}

func (r *rider) rates(_ float64, y, dydt []float64) error {
	m, err := r.moment(y)
	if err != nil {
		return err
	}
	dydt[atDistance] = m.tas*math.Cos(m.climb.Angle) - r.l.HeadWind
	if r.l.stays() {
		dydt[atDistance] = 0
	}
	dydt[atAltitude] = m.climb.PressureRate
	dydt[atFuel], dydt[atEnergy] = m.out.FuelFlow, m.out.BusPower
	if r.l.Kind == Turns {
		dydt[atAngle] = pointperf.TurnRate(m.tas, r.load, nil)
	}
	return nil
}

// where gives the point and the scheduled true airspeed in m/s of a state.
func (r *rider) where(y []float64) (pointperf.Point, float64, error) {
	mass := r.base.Mass - y[atFuel]
	air, err := r.day.At(y[atAltitude], nil)
	if err != nil {
		return pointperf.Point{}, 0, err
	}
	tas, err := r.speed(y[atAltitude], mass)
	return pointperf.Point{Air: air, Mass: mass, Config: aircraft.Clean}, tas, err
}

// moment balances the forces in a state.
func (r *rider) moment(y []float64) (moment, error) {
	p, tas, err := r.where(y)
	if err != nil {
		return moment{}, err
	}
	m := moment{point: p, tas: tas}
	switch r.l.Kind {
	case Climb, Descent:
		err = r.inclined(&m, y[atAltitude])
	default:
		err = r.level(&m)
	}
	return m, err
}

// inclined balances a climb or descent, with the acceleration that the speed schedule asks for.
func (r *rider) inclined(m *moment, hp float64) error {
	a := r.f.a
	f, err := pointperf.AccelerationFactor(r.day, hp, func(h float64) float64 { v, _ := r.speed(h, m.point.Mass); return v })
	if err != nil {
		return err
	}
	c := m.point.Condition(m.tas)
	switch r.l.Path {
	case FullPower, Idle:
		m.setting = 1
		if r.l.Path == Idle {
			m.setting = 0
		}
		if m.out, err = a.Plant().Run(c, m.setting, nil); err != nil {
			return err
		}
		m.climb = pointperf.ClimbAt(a, &m.point, m.tas, m.out.Thrust, f, nil)
	default:
		if err := r.held(m, f); err != nil {
			return err
		}
	}
	m.required = pointperf.ThrustRequired(a, &m.point, m.tas, nil)
	if r.l.Kind == Descent {
		m.required = r.pathThrust(m, m.climb.Angle, f)
	}
	return nil
}

// pathThrust is the thrust in N that holds a path angle in rad with acceleration factor f.
func (r *rider) pathThrust(m *moment, angle, f float64) float64 {
	weight := m.point.Weight()
	return pointperf.Drag(r.f.a, &m.point, m.tas, weight*math.Cos(angle), 1, nil) + weight*math.Sin(angle)*(1+f)
}

// held finds the setting that holds a given rate or angle. Where the path asks
// for less than idle gives, the engine idles, the speed is held and the path gives way.
func (r *rider) held(m *moment, f float64) error {
	angle := r.l.Angle
	if r.l.Path == ByRate {
		angle = math.Asin(math.Min(1, r.l.Rate/m.tas))
	}
	if r.l.Kind == Descent {
		angle = -angle
	}
	want := r.pathThrust(m, angle, f)
	setting, out, err := r.f.a.Plant().Match(m.point.Condition(m.tas), want, nil)
	if err != nil {
		return err
	}
	m.setting, m.out = setting, out
	if out.Limits&powerplant.Idling != 0 && want < out.Thrust {
		r.gave = r.l.Path
		m.climb = pointperf.ClimbAt(r.f.a, &m.point, m.tas, out.Thrust, f, nil)
		return nil
	}
	m.climb = pointperf.Climb{TAS: m.tas, Angle: angle, Rate: m.tas * math.Sin(angle), PressureRate: m.tas * math.Sin(angle) / m.point.Air.HeightRatio,
		Drag: want - m.point.Weight()*math.Sin(angle)*(1+f)}
	return nil
}

const samplesPerLeg = 16

// sample keeps moments along the solution and leaves the flier at its end.
func (r *rider) sample(sol *numeric.Solution) {
	end, last := sol.End()
	if r.f.trial {
		r.place(end, last)
		return
	}
	y := r.start()
	for i := range samplesPerLeg + 1 {
		t := end * float64(i) / samplesPerLeg
		y = sol.At(t, y)
		if m, err := r.moment(y); err == nil {
			r.keep(t, y, &m)
		}
		if end == 0 {
			break
		}
	}
	r.place(end, last)
}

// place sets the flier to a state of the leg, t seconds into it.
func (r *rider) place(t float64, y []float64) {
	n := &r.f.now
	n.Time, n.Distance, n.Altitude = r.base.Time+t, y[atDistance], y[atAltitude]
	n.Fuel, n.Charge = math.Max(0, r.base.Fuel-y[atFuel]), math.Max(0, r.base.Charge-y[atEnergy])
	n.Mass = r.base.Mass - (r.base.Fuel - n.Fuel)
}

func (r *rider) keep(t float64, y []float64, m *moment) {
	r.place(t, y)
	n := &r.f.now
	n.TAS, n.Rate, n.Required, n.Setting, n.Output = m.tas, m.climb.Rate, m.required, m.setting, m.out
	n.Available = m.out.Thrust
	if m.setting < 1 || m.out.Limits&powerplant.Idling != 0 {
		if full, err := r.f.a.Plant().Run(m.point.Condition(m.tas), 1, nil); err == nil {
			n.Available = full.Thrust
		}
	}
	r.f.keep()
}
