package mission

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A Plan is what an aircraft is asked to fly, resolved and ready.
type Plan struct {
	Legs      []Leg
	Day       atmos.Day      // of every leg that has no day of its own
	Places    []runway.Place // strips on their day, by the names that legs use
	Technique runway.Technique
}

// A Sample is the state of the aircraft at one moment.
type Sample struct {
	Leg       int     // index of the leg
	Time      float64 // since the start in s
	Distance  float64 // over the ground since the start in m
	Altitude  float64 // pressure altitude in m
	TAS       float64 // true airspeed in m/s
	Rate      float64 // geometric rate of climb in m/s
	Mass      float64 // in kg
	Fuel      float64 // usable fuel left in kg
	Charge    float64 // usable electrical energy left in J
	Available float64 // thrust available at full setting in N
	Required  float64 // thrust that the leg asks for in N: level flight in climb, cruise and loiter, the path in a descent
	Setting   float64 // of the power lever, 0 to 1
	Output    powerplant.Output
}

// Airborne legs count for the tightest point.
func (s *Sample) inHand() float64 { return s.Available - s.Required }

// Ratio is the thrust in hand over the thrust required, dimensionless; +Inf where none is required.
func (s *Sample) Ratio() float64 {
	if s.Required <= 0 {
		return math.Inf(1)
	}
	return s.inHand() / s.Required
}

// A LegResult is one leg as flown.
type LegResult struct {
	Leg      Leg
	Start    Sample
	End      Sample
	Fuel     float64 // burnt in kg
	Energy   float64 // drawn electrically in J
	Time     float64 // in s
	Distance float64 // over the ground in m
	Payload  float64 // taken aboard in kg, negative when dropped
	Run      *runway.Run
	Notes    []units.Message

	err error // why it was not flown to its end
}

// A Failure is where and why the mission ended.
type Failure struct {
	Leg    int // index of the leg
	Name   string
	Reason units.Message
	Err    error
	At     Sample
}

// A Flight is a mission as flown.
type Flight struct {
	Legs     []LegResult
	Trace    []Sample
	Tightest *Sample // nil when no leg was flown
	Failure  *Failure
	Reserve  ReserveResult
	Time     float64 // without reserve in s
	Distance float64 // over the ground, without reserve, in m
	Fuel     float64 // burnt, without reserve, in kg
	Energy   float64 // drawn, without reserve, in J
}

// Flown reports whether every leg was flown.
func (f *Flight) Flown() bool { return f.Failure == nil }

// flier carries the state from leg to leg.
type flier struct {
	a    *aircraft.Aircraft
	plan *Plan
	now  Sample
	out  Flight

	carried float64             // payload taken aboard since the start in kg, negative when dropped
	holding []powerplant.Output // of each contingency leg, at best endurance
	trial   bool                // flown only to see what is left: keeps no samples
}

// Fly flies the plan. A leg that cannot be flown ends the mission there with a
// Failure that says why; what was flown is kept.
func Fly(a *aircraft.Aircraft, plan *Plan) Flight {
	stores := a.Stores()
	f := &flier{a: a, plan: plan, now: Sample{Mass: a.StartMass(), Fuel: stores.Fuel, Charge: stores.Charge}}
	if len(plan.Places) > 0 {
		f.now.Altitude = plan.Places[0].Air.PressureAltitude
	}
	f.onward(0)
	f.totals()
	f.tightest()
	return f.out
}

// onward flies the legs from the index first to the end of the mission, or until one cannot be flown.
func (f *flier) onward(first int) {
	for i := first; i < len(f.plan.Legs); i++ {
		f.now.Leg = i
		if !f.fly(&f.plan.Legs[i]) {
			break
		}
	}
	f.account()
}

// fly flies one leg and reports whether the mission goes on.
func (f *flier) fly(l *Leg) bool {
	r := LegResult{Leg: *l, Start: f.now}
	var err error
	switch l.Kind {
	case Taxi:
		err = f.taxi(l)
	case TakeOff:
		r.Run, err = f.takeOff(l)
	case Landing:
		r.Run, err = f.land(l, &r)
	case Drop, PickUp:
		r.Payload, err = f.reload(l)
	case Contingency:
		err = f.hold(l)
	case Alternate:
		err = f.divert(l, &r)
	case Turns:
		err = f.turn(l, &r)
	default:
		if l.Rests() {
			err = f.settleRest(&r.Leg)
		}
		if err == nil {
			err = f.path(&r.Leg, &r)
		}
	}
	r.End = f.now
	r.Fuel, r.Energy = r.Start.Fuel-r.End.Fuel, r.Start.Charge-r.End.Charge
	r.Time, r.Distance = r.End.Time-r.Start.Time, r.End.Distance-r.Start.Distance
	r.err = err
	f.out.Legs = append(f.out.Legs, r)
	if err != nil && !l.Spare() {
		f.out.Failure = &Failure{Leg: f.now.Leg, Name: l.Title(), Reason: units.Explain(err), Err: err, At: f.now}
	}
	return err == nil
}

func (f *flier) totals() {
	for i := range f.out.Legs {
		r := &f.out.Legs[i]
		if r.Leg.Spare() {
			continue
		}
		f.out.Time += r.Time
		f.out.Distance += r.Distance
		f.out.Fuel += r.Fuel
		f.out.Energy += r.Energy
	}
}

// tightest finds the airborne sample with the smallest ratio of thrust in hand
// to thrust required. Legs that use all the thrust by choice (level maximum) do not count.
func (f *flier) tightest() {
	for i := range f.out.Trace {
		s := &f.out.Trace[i]
		l := &f.plan.Legs[s.Leg]
		if !l.Airborne() || l.SpeedRule == Maximum || s.Required <= 0 {
			continue
		}
		if f.out.Tightest == nil || s.Ratio() < f.out.Tightest.Ratio() {
			f.out.Tightest = s
		}
	}
}

// burn takes fuel in kg and electrical energy in J out of the stores.
func (f *flier) burn(fuel, energy float64) error {
	if fuel > f.now.Fuel || energy > f.now.Charge {
		return emptied(f.now.Mass, f.now.Altitude)
	}
	f.now.Fuel -= fuel
	f.now.Charge -= energy
	f.now.Mass -= fuel
	return nil
}

func emptied(mass, hp float64) error {
	return units.Errorf(nil, "the energy aboard is used up at {} and {}", units.Of(units.Altitude, hp), units.Of(units.Mass, mass))
}

// place finds the strip of a leg; an empty name is the first.
func (f *flier) place(strip string) (runway.Place, error) {
	for _, p := range f.plan.Places {
		if strip == "" || p.Strip.Name == strip {
			return p, nil
		}
	}
	return runway.Place{}, units.Errorf(nil, "there is no strip named {}", units.Text("“"+strip+"”"))
}

func (f *flier) taxi(l *Leg) error {
	air, err := f.plan.Day.At(f.now.Altitude, nil)
	if err != nil {
		return err
	}
	c := powerplant.Condition{Air: air}
	out, err := f.a.Plant().Run(c, l.Setting, nil)
	if err != nil {
		return err
	}
	full, err := f.a.Plant().Run(c, 1, nil)
	if err != nil {
		return err
	}
	f.now.Output, f.now.Setting, f.now.Available, f.now.Required, f.now.TAS = out, l.Setting, full.Thrust, out.Thrust, 0
	f.keep()
	if err := f.burn(out.FuelFlow*l.Time, out.BusPower*l.Time); err != nil {
		return err
	}
	f.now.Time += l.Time
	f.keep()
	return nil
}

func (f *flier) takeOff(l *Leg) (*runway.Run, error) {
	at, err := f.place(l.Strip)
	if err != nil {
		return nil, err
	}
	f.now.Altitude = at.Air.PressureAltitude
	run, err := runway.TakeOff(f.a, f.now.Mass, at, f.plan.Technique)
	run.Factor(f.plan.Technique.TakeOffFactor)
	if err == nil {
		err = onStrip(&run, at)
	}
	if err != nil {
		return &run, err
	}
	f.ground(&run, at, 0)
	fuel, energy := run.Drawn()
	if err := f.burn(fuel, energy); err != nil {
		return &run, err
	}
	f.now.Time += run.Time()
	f.now.Altitude += at.Strip.Obstacle / at.Air.HeightRatio
	f.ground(&run, at, run.Screen)
	return &run, nil
}

// ground notes the thrust on the strip at a true airspeed in m/s: required is friction and drag.
func (f *flier) ground(run *runway.Run, at runway.Place, tas float64) {
	full, err := f.a.Plant().Run(powerplant.Condition{Air: at.Air, TAS: tas}, 1, nil)
	if err != nil {
		return
	}
	f.now.TAS, f.now.Available, f.now.Output, f.now.Setting = tas, full.Thrust, full, 1
	f.now.Required = runway.Resistance(f.a, f.now.Mass, at, tas)
	f.keep()
}

func (f *flier) land(l *Leg, r *LegResult) (*runway.Run, error) {
	at, err := f.place(l.Strip)
	if err != nil {
		return nil, err
	}
	if gap := f.now.Altitude - at.Air.PressureAltitude; math.Abs(gap) > 150 {
		r.Notes = append(r.Notes, units.Say("the landing begins {} from the height of the strip; the way between is not flown", units.Of(units.Altitude, math.Abs(gap))))
	}
	f.now.Altitude = at.Air.PressureAltitude
	run, err := runway.Landing(f.a, f.now.Mass, at, f.plan.Technique)
	run.Factor(f.plan.Technique.LandingFactor)
	if err == nil {
		err = onStrip(&run, at)
	}
	if err != nil {
		return &run, err
	}
	fuel, energy := run.Drawn()
	if err := f.burn(fuel, energy); err != nil {
		return &run, err
	}
	f.now.Time += run.Time()
	return &run, nil
}

// onStrip refuses a ground roll that leaves the strip. A distance over the
// obstacle that does is flown, and is a warning of the study.
func onStrip(run *runway.Run, at runway.Place) error {
	if run.Ground <= at.Strip.Length {
		return nil
	}
	return units.Errorf(runway.ErrNoRun, "its ground roll of {} is longer than the strip, {}", units.Of(units.FieldLength, run.Ground), units.Of(units.FieldLength, at.Strip.Length))
}

func (f *flier) keep() {
	if !f.trial {
		f.out.Trace = append(f.out.Trace, f.now)
	}
}

// dryMass is the mass without usable fuel, with the payload now aboard, in kg.
func (f *flier) dryMass() float64 { return f.a.DryMass() + f.carried }

// reload drops or picks up payload and returns the change in kg.
func (f *flier) reload(l *Leg) (float64, error) {
	change := l.Payload
	if l.Kind == Drop {
		change = -change
		if aboard := f.a.Payload() + f.carried; l.Payload > aboard*(1+1e-12) {
			return 0, units.Errorf(nil, "it drops {} where {} of payload is aboard", units.Of(units.Mass, l.Payload), units.Of(units.Mass, aboard))
		}
	}
	f.carried += change
	f.now.Mass += change
	return change, nil
}
