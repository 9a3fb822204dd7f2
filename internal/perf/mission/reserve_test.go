package mission_test

import (
	"math"
	"regexp"
	"testing"

	"legwright/internal/perf/mission"
)

// What is dropped or picked up changes the mass at once and by nothing else, and a lighter aircraft then burns less.
func TestPayload(t *testing.T) {
	a := carrying(t, 40)
	cruise := leg(mission.Cruise, nil)
	drop, lift := leg(mission.Drop, func(l *mission.Leg) { l.Payload = 55.5 }), leg(mission.PickUp, func(l *mission.Leg) { l.Payload = 20.25 })
	f := flown(t, a, from(t, 500, cruise, drop, cruise, lift, cruise))
	for i, want := range map[int]float64{1: -55.5, 3: 20.25} {
		l := &f.Legs[i]
		near(t, "change of mass", l.End.Mass-l.Start.Mass, want, 1e-12)
		if l.Payload != want || l.Time != 0 || l.Fuel != 0 || l.Distance != 0 || l.End.Fuel != l.Start.Fuel {
			t.Errorf("%+v", l)
		}
	}
	near(t, "mass at the end", f.Legs[4].End.Mass, a.StartMass()-f.Fuel-55.5+20.25, 1e-12)
	if f.Legs[2].Fuel >= f.Legs[0].Fuel || f.Legs[4].Fuel <= f.Legs[2].Fuel {
		t.Errorf("%g kg, lighter %g kg, heavier again %g kg", f.Legs[0].Fuel, f.Legs[2].Fuel, f.Legs[4].Fuel)
	}
	// Everything aboard may be dropped, and then no more, unless something was picked up.
	drop.Payload = a.Payload()
	if f := mission.Fly(a, from(t, 500, drop, lift, leg(mission.Drop, func(l *mission.Leg) { l.Payload = 20.25 }))); !f.Flown() {
		t.Error(f.Failure.Err)
	}
	if f := mission.Fly(a, from(t, 500, drop, leg(mission.Drop, func(l *mission.Leg) { l.Payload = 0.01 }))); f.Flown() {
		t.Error("more is dropped than is aboard")
	}
	// A lighter aircraft flies to its own dry mass: the long cruise after a drop is that of an aircraft that never carried the load.
	drop.Payload = a.Payload()
	long := leg(mission.Cruise, func(l *mission.Leg) { l.Distance = 1e9 })
	dropped := mission.Fly(a, from(t, 500, drop, long))
	bare := mission.Fly(unladen(t, 40), from(t, 500, long))
	near(t, "range without the load", dropped.Legs[1].Distance, bare.Legs[0].Distance, 1e-9)
}

// An alternate climbs from the strip at best rate and flies on level: two legs in one.
func TestAlternateIsAClimbAndACruise(t *testing.T) {
	a := carrying(t, 40)
	own := func(l *mission.Leg) { l.DayGiven, l.Deviation, l.HeadWind = mission.OwnDay, 12, 4 }
	alternate := leg(mission.Alternate, func(l *mission.Leg) { own(l); l.Altitude, l.Distance = 1800, 80e3 })
	got := flown(t, a, from(t, 300, alternate))
	climb := leg(mission.Climb, func(l *mission.Leg) { own(l); l.Altitude = 1800 })
	up := flown(t, a, from(t, 300, climb))
	level := leg(mission.Cruise, func(l *mission.Leg) { own(l); l.Distance = 80e3 - up.Distance })
	want := flown(t, a, from(t, 300, climb, level))
	near(t, "fuel", got.Legs[0].Fuel, want.Fuel, 1e-9)
	near(t, "time", got.Legs[0].Time, want.Time, 1e-9)
	near(t, "distance", got.Legs[0].Distance, 80e3, 1e-9)
	if !got.Reserve.Met || got.Fuel != 0 || got.Time != 0 || got.Distance != 0 {
		t.Errorf("an alternate counts in the trip: %+v", got)
	}
	near(t, "fuel of the reserve", got.Reserve.Fuel, want.Fuel, 1e-9)
	// From above it begins at its altitude and says so.
	alternate.Altitude = 1000
	low := flown(t, a, from(t, 1500, alternate))
	if n := low.Legs[0].Notes; len(n) != 1 || !regexp.MustCompile(`begins at 1000.m; the descent of 500.m to it is not flown`).MatchString(plain(n[0])) || low.Legs[0].End.Altitude != 1000 {
		t.Errorf("%v", n)
	}
	// A climb longer than the way is refused.
	alternate.Altitude, alternate.Distance = 3000, 10e3
	short := mission.Fly(a, from(t, 300, alternate))
	if short.Reserve.Met || !regexp.MustCompile(`^the climb to 3000.m alone covers [0-9.]+.km of its 10\.0.km: `).MatchString(plain(short.Reserve.Reason)) {
		t.Errorf("%+v: %s", short.Reserve, plain(short.Reserve.Reason))
	}
	healthy(t, &short)
}

// A contingency keeps a share of the trip, taxi and reserve left out, or the fuel of its least time, whichever is more.
func TestContingency(t *testing.T) {
	taxi, cruise := leg(mission.Taxi, nil), leg(mission.Cruise, nil)
	keep := func(share, time float64) mission.Leg {
		return leg(mission.Contingency, func(l *mission.Leg) { l.Share, l.Time, l.Altitude = share, time, 500 })
	}
	reserve := leg(mission.Reserve, func(l *mission.Leg) { l.Altitude, l.Time = 500, 900 })
	a := carrying(t, 40)
	f := flown(t, a, on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0.1, 0), reserve))
	near(t, "a tenth of the trip", f.Reserve.Kept, 0.1*f.Legs[1].Fuel, 1e-12)
	if !f.Reserve.Met || len(f.Reserve.Parts) != 2 || f.Reserve.Wanted != 900 || f.Reserve.Flown != 900 || !f.Reserve.Has(mission.Contingency) || f.Reserve.Has(mission.Alternate) {
		t.Errorf("%+v", f.Reserve)
	}
	near(t, "fuel left", f.Reserve.Left, 40-f.Fuel-f.Reserve.Fuel, 1e-12)
	// Holding a little longer burns what the least time keeps: the flow at best endurance where the mass is that.
	held := flown(t, a, on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0, 60)))
	hold := leg(mission.Loiter, func(l *mission.Leg) { l.Time = 60 })
	loiter := flown(t, a, on(t, 0, 500, "dry-asphalt", taxi, cruise, hold))
	near(t, "a minute's holding", held.Reserve.Kept, loiter.Legs[2].Fuel, 2e-4) // the mass falls by 0.01 % in a minute
	more := flown(t, a, on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0.1, 3600)))
	if more.Reserve.Kept <= f.Reserve.Kept {
		t.Errorf("%g kg for an hour, %g kg for a tenth", more.Reserve.Kept, f.Reserve.Kept)
	}
	// Short by a little it is not met, and says by how much; the reserve leg itself is.
	enough := 40.0
	for range 6 {
		f := flown(t, carrying(t, enough), on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0.1, 0), reserve))
		enough -= f.Reserve.Left - f.Reserve.Kept
	}
	short := mission.Fly(carrying(t, enough-0.02), on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0.1, 0), reserve))
	if !short.Flown() || short.Reserve.Met || short.Reserve.Parts[0].Met || !short.Reserve.Parts[1].Met ||
		!regexp.MustCompile(`^[0-9.]+.kg of fuel is left of the [0-9.]+.kg that must be kept$`).MatchString(plain(short.Reserve.Reason)) {
		t.Errorf("%+v: %s", short.Reserve, plain(short.Reserve.Reason))
	}
	if ok := mission.Fly(carrying(t, enough+0.02), on(t, 0, 500, "dry-asphalt", taxi, cruise, keep(0.1, 0), reserve)); !ok.Reserve.Met {
		t.Errorf("%+v", ok.Reserve)
	}
	// Where no level flight is possible, holding is none either.
	high := keep(0, 60)
	high.Altitude = 9000
	if none := mission.Fly(a, on(t, 0, 500, "dry-asphalt", high)); none.Reserve.Met || none.Reserve.Reason.Empty() || !none.Flown() {
		t.Errorf("%+v", none.Reserve)
	}
}

// Each part of the reserve is accounted for, also where the mission or the reserve ends early.
func TestReserveParts(t *testing.T) {
	cruise := leg(mission.Cruise, func(l *mission.Leg) { l.Distance = 100e3 })
	alternate := leg(mission.Alternate, func(l *mission.Leg) { l.Altitude, l.Distance = 500, 60e3 })
	keep, reserve := leg(mission.Contingency, nil), leg(mission.Reserve, func(l *mission.Leg) { l.Altitude = 500 })
	legs := []mission.Leg{cruise, alternate, keep, reserve}
	for fuel, want := range map[float64][3]bool{40: {true, true, true}, 9.1: {true, false, true}, 8: {true, false, false}, 5.5: {false, false, false}, 2: {false, false, false}} {
		f := mission.Fly(carrying(t, fuel), on(t, 0, 500, "dry-asphalt", legs...))
		healthy(t, &f)
		if len(f.Reserve.Parts) != 3 {
			t.Fatalf("%g kg: %+v", fuel, f.Reserve)
		}
		for i, p := range f.Reserve.Parts {
			if p.Leg != i+1 || p.Kind != legs[i+1].Kind || p.Met != want[i] || p.Met != p.Reason.Empty() {
				t.Errorf("%g kg: part %d is %+v, want met %v", fuel, i, p, want[i])
			}
		}
		if f.Reserve.Met != (want == [3]bool{true, true, true}) || f.Reserve.Met != f.Reserve.Reason.Empty() {
			t.Errorf("%g kg: met %v, %s", fuel, f.Reserve.Met, plain(f.Reserve.Reason))
		}
		if fuel == 8 && !regexp.MustCompile(runsDry).MatchString(plain(f.Reserve.Reason)) {
			t.Errorf("%g kg: %s", fuel, plain(f.Reserve.Reason))
		}
		if math.Abs(f.Reserve.Left) > 0 && f.Flown() {
			near(t, "left", f.Reserve.Left, fuel-f.Fuel-f.Reserve.Fuel, 1e-9)
		}
	}
}
