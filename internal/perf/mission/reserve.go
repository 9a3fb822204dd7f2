package mission

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// A ReserveResult is what the reserve asked for and got: reserve legs and alternates
// are flown, a contingency is energy that must be left after all of them.
type ReserveResult struct {
	Asked      bool
	Met        bool
	Fuel       float64 // that reserve and alternate legs take in kg
	Energy     float64 // that reserve and alternate legs take in J
	Wanted     float64 // time asked for by reserve legs in s
	Flown      float64 // time flown in reserve legs in s
	Kept       float64 // fuel that contingencies keep in kg
	KeptEnergy float64 // electrical energy that contingencies keep in J
	Left       float64 // usable fuel left after all legs in kg, with what contingencies keep
	LeftEnergy float64 // usable electrical energy left after all legs in J, with what contingencies keep
	Reason     units.Message
	Parts      []ReservePart
}

// A ReservePart is what one leg of the reserve asked for and got.
type ReservePart struct {
	Leg      int // index of the leg
	Kind     string
	Met      bool
	Fuel     float64       // that it takes, or of a contingency keeps, in kg
	Energy   float64       // that it takes, or of a contingency keeps, in J
	Time     float64       // flown in s
	Distance float64       // over the ground in m
	Reason   units.Message // why it is not met
	Rule     units.Message // of a contingency: what decides how much it keeps
}

// Has reports whether a leg of the kind is part of the reserve.
func (r *ReserveResult) Has(kind string) bool {
	for i := range r.Parts {
		if r.Parts[i].Kind == kind {
			return true
		}
	}
	return false
}

// divert flies to an alternate: from where the aircraft is, the strip after an
// attempt to land, up at best rate and full power, clean, and level for the rest of
// the distance. From above, it begins at its altitude.
func (f *flier) divert(l *Leg, r *LegResult) error {
	level := *l
	switch down := f.now.Altitude - l.Altitude; {
	case down > 0:
		r.Notes = append(r.Notes, units.Say("begins at {}; the descent of {} to it is not flown", units.Of(units.Altitude, l.Altitude), units.Of(units.Altitude, down)))
	case down < 0:
		up := *l
		up.Kind, up.SpeedRule, up.Path = Climb, BestRate, FullPower
		from := f.now.Distance
		if err := f.path(&up, r); err != nil {
			return err
		}
		if level.Distance -= f.now.Distance - from; level.Distance < 0 {
			return units.Errorf(nil, "the climb to {} alone covers {} of its {}: the altitude is too high for so short a way",
				units.Of(units.Altitude, l.Altitude), units.Of(units.Distance, f.now.Distance-from), units.Of(units.Distance, l.Distance))
		}
	}
	f.now.Altitude = l.Altitude
	return f.path(&level, r)
}

// hold finds what holding for a contingency's least time draws, at the mass reached.
func (f *flier) hold(l *Leg) error {
	air, err := f.plan.Day.At(l.Altitude, nil)
	if err != nil {
		return err
	}
	level, err := pointperf.BestEndurance(f.a, &pointperf.Point{Air: air, Mass: f.now.Mass, Config: aircraft.Clean})
	if err == nil {
		f.holding = append(f.holding, level.Output)
	}
	return err
}

// trip is the fuel in kg and the electrical energy in J that the legs flown took, without taxi and reserve.
func (f *flier) trip() (fuel, energy float64) {
	for i := range f.out.Legs {
		if r := &f.out.Legs[i]; r.Leg.Kind != Taxi && !r.Leg.Spare() {
			fuel += r.Fuel
			energy += r.Energy
		}
	}
	return fuel, energy
}

// account adds up the reserve, once the mission is over.
func (f *flier) account() {
	res := &f.out.Reserve
	held := 0
	for i := range f.plan.Legs {
		l := &f.plan.Legs[i]
		if !l.Spare() {
			continue
		}
		res.Asked = true
		part := ReservePart{Leg: i, Kind: l.Kind}
		if l.Kind == Reserve && l.byTime() {
			res.Wanted += l.Time
		}
		switch {
		case i >= len(f.out.Legs):
			part.Reason = units.Say("the mission ended before the {}", units.Text(l.Kind))
		case f.out.Legs[i].err != nil:
			f.flown(&part)
			part.Reason = units.Explain(f.out.Legs[i].err)
		case l.Kind == Contingency:
			f.keepBack(&part, l, held)
			held++
		default:
			f.flown(&part)
			part.Met = true
		}
		res.Parts = append(res.Parts, part)
	}
	if res.Asked && f.out.Failure == nil {
		res.Left, res.LeftEnergy = f.now.Fuel, f.now.Charge
	}
	f.judge()
}

// flown notes what a leg of the reserve took.
func (f *flier) flown(part *ReservePart) {
	r, res := &f.out.Legs[part.Leg], &f.out.Reserve
	part.Fuel, part.Energy, part.Time, part.Distance = r.Fuel, r.Energy, r.Time, r.Distance
	res.Fuel += r.Fuel
	res.Energy += r.Energy
	if part.Kind == Reserve {
		res.Flown += r.Time
	}
}

// keepBack finds what a contingency keeps: a share of the trip's energy, or what
// holding for its least time draws, whichever is more.
func (f *flier) keepBack(part *ReservePart, l *Leg, held int) {
	res, hold := &f.out.Reserve, f.holding[held]
	fuel, energy := f.trip()
	part.Fuel, part.Energy = math.Max(l.Share*fuel, hold.FuelFlow*l.Time), math.Max(l.Share*energy, hold.BusPower*l.Time)
	taken, q := fuel, units.Mass
	longer := hold.FuelFlow*l.Time > l.Share*fuel
	if fuel == 0 && hold.FuelFlow == 0 {
		taken, q, longer = energy, units.Energy, hold.BusPower*l.Time > l.Share*energy
	}
	if longer {
		part.Rule = units.Say("{} of holding, more than {} of the trip's {}", units.Of(units.Duration, l.Time), units.Of(units.Fraction, l.Share), units.Of(q, taken))
	} else {
		part.Rule = units.Say("{} of the trip's {}", units.Of(units.Fraction, l.Share), units.Of(q, taken))
	}
	part.Met = true
	res.Kept += part.Fuel
	res.KeptEnergy += part.Energy
}

// judge decides whether the reserve is met: each leg flown, and enough left for the contingencies.
func (f *flier) judge() {
	res := &f.out.Reserve
	res.Met = res.Asked
	contingent := false // the reason is a contingency's
	for i := range res.Parts {
		part := &res.Parts[i]
		if part.Kind == Contingency && part.Met {
			f.enough(part)
		}
		// What ended the flight says more than what is then missing.
		if !part.Met && (res.Met || contingent && part.Kind != Contingency) {
			res.Met, res.Reason, contingent = false, part.Reason, part.Kind == Contingency
		}
	}
	if res.Asked && f.out.Failure != nil {
		res.Reason = units.Say("the mission ended before the reserve")
	}
}

// enough holds what is left against what the contingencies keep.
func (f *flier) enough(part *ReservePart) {
	res := &f.out.Reserve
	switch {
	case f.now.Fuel < res.Kept:
		part.Met, part.Reason = false, units.Say("{} of fuel is left of the {} that must be kept", units.Of(units.Mass, f.now.Fuel), units.Of(units.Mass, res.Kept))
	case f.now.Charge < res.KeptEnergy:
		part.Met, part.Reason = false, units.Say("{} is left of the {} that must be kept", units.Of(units.Energy, f.now.Charge), units.Of(units.Energy, res.KeptEnergy))
	}
}
