package mission_test

import (
	"regexp"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// carrying is the homebuilt with fuel for use of the mass in kg.
func carrying(t testing.TB, fuel float64) *aircraft.Aircraft {
	s := aircrafttest.Homebuilt(powerplant.FixedPitch)
	tank := &s.Powerplant.Model.(*powerplant.PistonPropeller).Fuel
	tank.Volume = tank.Unusable + fuel/tank.Density
	return aircrafttest.Build(t, s)
}

// unladen is carrying without payload.
func unladen(t testing.TB, fuel float64) *aircraft.Aircraft {
	s := aircrafttest.Homebuilt(powerplant.FixedPitch)
	tank := &s.Powerplant.Model.(*powerplant.PistonPropeller).Fuel
	tank.Volume = tank.Unusable + fuel/tank.Density
	s.Weights.Items = nil
	return aircrafttest.Build(t, s)
}

// flimsy is the homebuilt with a low never-exceed speed.
func flimsy(t testing.TB) *aircraft.Aircraft {
	s := aircrafttest.Homebuilt(powerplant.FixedPitch)
	s.Airframe.NeverExceed = 50
	return aircrafttest.Build(t, s)
}

// powered is the homebuilt with an engine of the rated power in W.
func powered(t testing.TB, rated float64) *aircraft.Aircraft {
	s := aircrafttest.Homebuilt(powerplant.FixedPitch)
	s.Powerplant.Model.(*powerplant.PistonPropeller).Engine.RatedPower = rated
	return aircrafttest.Build(t, s)
}

// a leg of the kind, changed.
func leg(kind string, change func(*mission.Leg)) mission.Leg {
	l := mission.NewLeg(kind, "the "+kind)
	if change != nil {
		change(&l)
	}
	return l
}

// on is a plan from a level asphalt strip with a slope, at the pressure altitude hp in m.
func on(t testing.TB, slope, hp float64, surface string, legs ...mission.Leg) *mission.Plan {
	t.Helper()
	s := runway.Strip{Name: "Strip", Length: 600, Slope: slope, Elevation: hp, Surface: surface, Obstacle: 15.24}
	place, err := s.On(atmos.Spec{Given: atmos.ByDeviation, QNH: atmos.SeaLevelPressure})
	if err != nil {
		t.Fatal(err)
	}
	return &mission.Plan{Legs: legs, Places: []runway.Place{place}, Technique: runway.StandardTechnique()}
}

const (
	number  = `[0-9.]+ ?`
	usedUp  = `^the energy aboard is used up at ` + number + `m and ` + number + `kg$`
	runsDry = `^the fuel is used up after ` + number + `min of it, ` + number + `km on$`
)

type failing struct {
	a    *aircraft.Aircraft
	plan *mission.Plan
	want string
}

// fuelRunsOut ends a leg of each kind with the tanks empty.
func fuelRunsOut(t testing.TB) map[string]failing {
	long := func(l *mission.Leg) { l.Distance, l.Time, l.Altitude = 2e6, 1e5, 4000 }
	down := func(l *mission.Leg) { l.Altitude, l.Speed, l.Rate = 0, 40, 1 }
	return map[string]failing{
		"taxi":     {carrying(t, 0.1), on(t, 0, 0, "dry-asphalt", leg(mission.Taxi, long)), usedUp},
		"take-off": {carrying(t, 0.03), on(t, 0, 0, "dry-asphalt", leg(mission.TakeOff, nil)), usedUp},
		"climb":    {carrying(t, 1), on(t, 0, 0, "dry-asphalt", leg(mission.Climb, long)), runsDry},
		"cruise":   {carrying(t, 5), on(t, 0, 0, "dry-asphalt", leg(mission.Cruise, long)), runsDry},
		"by time":  {carrying(t, 5), on(t, 0, 0, "dry-asphalt", leg(mission.Cruise, func(l *mission.Leg) { long(l); l.Extent = mission.ByTime })), runsDry},
		"loiter":   {carrying(t, 5), on(t, 0, 0, "dry-asphalt", leg(mission.Loiter, long)), runsDry},
		"descent":  {carrying(t, 0.5), on(t, 0, 3000, "dry-asphalt", leg(mission.Descent, down)), runsDry},
		"landing":  {carrying(t, 0.01), on(t, 0, 0, "dry-asphalt", leg(mission.Landing, nil)), usedUp},
		"none":     {carrying(t, 0), on(t, 0, 0, "dry-asphalt", leg(mission.Cruise, nil)), usedUp},
	}
}

// speedsThatCannotBe end a leg because of its speed, wind, height or power.
func speedsThatCannotBe(t testing.TB) map[string]failing {
	a := carrying(t, 60)
	cruise := func(rule string, speed float64, hp float64) *mission.Plan {
		return on(t, 0, hp, "dry-asphalt", leg(mission.Cruise, func(l *mission.Leg) { l.SpeedRule, l.Speed = rule, speed }))
	}
	power := func(share, hp float64) *mission.Plan {
		return on(t, 0, hp, "dry-asphalt", leg(mission.Cruise, func(l *mission.Leg) { l.SpeedRule, l.Power = mission.PercentPower, share }))
	}
	wind := func(rule string) *mission.Plan {
		return on(t, 0, 1000, "dry-asphalt", leg(mission.Cruise, func(l *mission.Leg) { l.SpeedRule, l.Speed, l.HeadWind = rule, 45, 74 }))
	}
	inclined := func(kind string, hp float64, change func(*mission.Leg)) *mission.Plan {
		return on(t, 0, hp, "dry-asphalt", leg(kind, change))
	}
	return map[string]failing{
		"ceiling": {a, inclined(mission.Climb, 0, func(l *mission.Leg) { l.Altitude = 9000 }),
			`^it climbs no further than ` + number + `m at ` + number + `kg: at ` + number + `m/s the thrust available is ` + number + `N against ` + number + `N required$`},
		"above its ceiling to begin with": {a, inclined(mission.Climb, 8500, func(l *mission.Leg) { l.Altitude = 9000 }), `^it climbs no further than 8500.m`},
		"rate that is not there":          {a, inclined(mission.Climb, 0, func(l *mission.Leg) { l.Path, l.Rate = mission.ByRate, 9 }), `^thrust required, ` + number + `N, exceeds thrust available, ` + number + `N, at ` + number + `m/s$`},
		"rate that fades":                 {a, inclined(mission.Climb, 0, func(l *mission.Leg) { l.Path, l.Rate, l.Altitude = mission.ByRate, 2.5, 8000 }), `^thrust required, `},
		"below the stall":                 {a, cruise(mission.ByTAS, 20, 0), `^its speed of 20\.0.m/s is below the stall at ` + number + `m/s$`},
		"at the stall on the way":         {a, inclined(mission.Climb, 0, func(l *mission.Leg) { l.SpeedRule, l.Speed, l.Altitude = mission.ByTAS, 26.5, 5000 }), `^its speed of 26\.5.m/s is below the stall at 26\.5.m/s$`},
		"above the never-exceed speed":    {a, cruise(mission.ByCAS, 80, 0), `^its speed of 80\.0.m/s is above the never-exceed speed, here 72\.0.m/s$`},
		"never-exceed speed on the way":   {a, inclined(mission.Descent, 3000, func(l *mission.Leg) { l.SpeedRule, l.Mach, l.Altitude, l.Path = mission.ByMach, 0.225, 0, mission.Idle }), `^its speed of ` + number + `m/s is above the never-exceed speed, here ` + number + `m/s$`},
		"faster than it flies":            {a, cruise(mission.ByTAS, 71, 0), `^thrust required, ` + number + `N, exceeds`},
		"head wind at a given speed":      {a, wind(mission.ByTAS), `^the head wind of 74\.0.m/s leaves no way over the ground at 45\.0.m/s$`},
		"head wind at best range":         {a, wind(mission.BestRange), `^the head wind of 74\.0.m/s leaves no way over the ground: the fastest level flight is ` + number + `m/s$`},
		"power that is not there":         {a, power(0.95, 3000), `makes only ` + number + `% of the rating at 3000.m, so 95\.0.% cannot be set$`},
		"power that does not fly":         {a, power(0.1, 0), `^no speed flies level on 10\.0.% of the rating at 0.m: the least that flies is more$`},
		"power above the ceiling":         {a, power(0.5, 9000), `^no level flight at 9000.m and ` + number + `kg: thrust in hand is −` + number + `N at its best speed, ` + number + `m/s$`},
		"loiter above the ceiling":        {a, on(t, 0, 9000, "dry-asphalt", leg(mission.Loiter, nil)), `^no level flight at 9000.m`},
		"far above its ceiling":           {a, inclined(mission.Climb, 0, func(l *mission.Leg) { l.Altitude = 25000 }), `^it climbs no further than 7[34][0-9]{2} m at `},
	}
}

func onTheStrip(t testing.TB) map[string]failing {
	a := carrying(t, 60)
	elsewhere := leg(mission.TakeOff, func(l *mission.Leg) { l.Strip = "Elsewhere" })
	nowhere := leg(mission.Landing, func(l *mission.Leg) { l.Strip = "Nowhere" })
	return map[string]failing{
		"unknown strip to leave":   {a, on(t, 0, 0, "dry-asphalt", elsewhere), `^there is no strip named “Elsewhere”$`},
		"unknown strip to land on": {a, on(t, 0, 0, "dry-asphalt", nowhere), `^there is no strip named “Nowhere”$`},
		"does not roll":            {powered(t, 12e3), on(t, 0.2, 0, "dry-asphalt", leg(mission.TakeOff, nil)), `^the aircraft does not start to roll: static thrust is ` + number + `N short`},
		"does not lift off":        {powered(t, 30e3), on(t, 0, 0, "soft-ground", leg(mission.TakeOff, nil)), `^the aircraft does not reach its lift-off speed of ` + number + `m/s: it stops gaining at ` + number + `m/s$`},
		"does not climb away":      {powered(t, 26e3), on(t, 0, 0, "dry-asphalt", leg(mission.TakeOff, nil)), `^it leaves the ground but does not climb away: at ` + number + `m/s`},
		"does not stop":            {a, on(t, -0.2, 0, "ice", leg(mission.Landing, nil)), `^the aircraft does not stop: friction does not hold it on the slope at ` + number + `m/s$`},
	}
}

// otherKinds end a dash, turns or a load because of what they ask for.
func otherKinds(t testing.TB) map[string]failing {
	a := carrying(t, 60)
	turns := func(change func(*mission.Leg)) *mission.Plan {
		return on(t, 0, 500, "dry-asphalt", leg(mission.Turns, change))
	}
	dash := func(fuel float64, change func(*mission.Leg)) failing {
		return failing{carrying(t, fuel), on(t, 0, 500, "dry-asphalt", leg(mission.Dash, change)), runsDry}
	}
	const turning = `^in a turn at a load factor of ` + number + `: `
	return map[string]failing{
		"turn beyond the lift":       {a, turns(func(l *mission.Leg) { l.SpeedRule, l.Speed, l.Bank = mission.ByTAS, 35, 1.1 }), turning + `its speed of 35\.0.m/s is below the stall at ` + number + `m/s$`},
		"turn beyond the thrust":     {a, turns(func(l *mission.Leg) { l.SpeedRule, l.Speed, l.Bank = mission.ByTAS, 60, 1.05 }), turning + `thrust required, ` + number + `N, exceeds thrust available, ` + number + `N, at 60\.0.m/s$`},
		"turn beyond it at its best": {a, turns(func(l *mission.Leg) { l.Bank = 1.2 }), turning + `thrust required, `},
		"turn beyond any speed":      {flimsy(t), turns(func(l *mission.Leg) { l.Path, l.Load = mission.ByLoad, 6 }), turning + `the stall at this load factor, ` + number + `m/s, lies above the never-exceed speed, ` + number + `m/s$`},
		"turns until dry":            {carrying(t, 2), turns(func(l *mission.Leg) { l.Turns = 1000 }), turning + `the fuel is used up after `},
		"dash until dry":             dash(3, func(l *mission.Leg) { l.Distance = 2e6 }),
		"dash for too long":          dash(3, func(l *mission.Leg) { l.Extent, l.Time = mission.ByTime, 1e5 }),
		"dash above the ceiling":     {a, on(t, 0, 9000, "dry-asphalt", leg(mission.Dash, nil)), `^no level flight at 9000.m`},
		"drop of more than there is": {a, on(t, 0, 0, "dry-asphalt", leg(mission.Drop, func(l *mission.Leg) { l.Payload = 900 })), `^it drops 900\.0.kg where ` + number + `kg of payload is aboard$`},
	}
}

// plain is the message in metric units with plain blanks.
func plain(m units.Message) string {
	return strings.NewReplacer("\u00a0", " ", "\u202f", "").Replace(m.In(units.Metric))
}

// Every way in which a leg can fail ends the mission there and says why in one sentence with its numbers.
func TestFailures(t *testing.T) {
	for _, list := range []map[string]failing{fuelRunsOut(t), speedsThatCannotBe(t), onTheStrip(t), otherKinds(t)} {
		for what, c := range list {
			c.plan.Legs = append(c.plan.Legs, mission.NewLeg(mission.Taxi, "never"))
			c.check(t, what)
		}
	}
}

// check flies a plan whose first leg fails.
func (c failing) check(t *testing.T, what string) {
	t.Helper()
	f := mission.Fly(c.a, c.plan)
	if f.Flown() || f.Failure.Leg != 0 || f.Failure.Err == nil || len(f.Legs) != 1 || f.Failure.Name != c.plan.Legs[0].Title() {
		t.Errorf("%s: %+v after %d legs", what, f.Failure, len(f.Legs))
		return
	}
	for _, sys := range units.Systems {
		if said := f.Failure.Reason.In(sys); said == "" || regexp.MustCompile(`NaN|Inf|%!|\{\}`).MatchString(said) {
			t.Errorf("%s: says %q", what, said)
		}
	}
	if said := plain(f.Failure.Reason); !regexp.MustCompile(c.want).MatchString(said) {
		t.Errorf("%s: says %q", what, said)
	}
	healthy(t, &f)
}

// The never-exceed speed is met on the way where the Mach number becomes that airspeed.
func TestNeverExceedIsMetWhereItIs(t *testing.T) {
	c := speedsThatCannotBe(t)["never-exceed speed on the way"]
	f := mission.Fly(c.a, c.plan)
	at := f.Failure.At
	if at.Altitude < 500 || at.Altitude > 2900 {
		t.Fatalf("met at %g m", at.Altitude)
	}
	air := aircrafttest.Air(t, at.Altitude)
	near(t, "calibrated airspeed", float64(air.CAS(at.TAS)), c.a.NeverExceed(), 1e-6)
}

// A reserve that is not met is a result of its own and no failure of the mission.
func TestReserve(t *testing.T) {
	reserve := leg(mission.Reserve, func(l *mission.Leg) { l.Altitude, l.Time = 500, 7200 })
	cruise := leg(mission.Cruise, func(l *mission.Leg) { l.Distance = 100e3 })
	met := mission.Fly(carrying(t, 40), on(t, 0, 500, "dry-asphalt", cruise, reserve))
	if !met.Flown() || !met.Reserve.Asked || !met.Reserve.Met || met.Reserve.Flown != 7200 || met.Reserve.Wanted != 7200 {
		t.Errorf("met: %+v, %+v", met.Failure, met.Reserve)
	}
	near(t, "fuel left", met.Reserve.Left, 40-met.Fuel-met.Reserve.Fuel, 1e-12)
	if met.Legs[1].Distance != 0 || met.Distance != met.Legs[0].Distance || met.Fuel != met.Legs[0].Fuel {
		t.Errorf("the reserve counts in the totals: %+v", met)
	}
	missed := mission.Fly(carrying(t, 8), on(t, 0, 500, "dry-asphalt", cruise, reserve))
	if !missed.Flown() || !missed.Reserve.Asked || missed.Reserve.Met || missed.Reserve.Left > 1e-9 || missed.Reserve.Flown >= 7200 ||
		!regexp.MustCompile(runsDry).MatchString(plain(missed.Reserve.Reason)) {
		t.Errorf("missed: %+v, %+v", missed.Failure, missed.Reserve)
	}
	ended := mission.Fly(carrying(t, 1), on(t, 0, 500, "dry-asphalt", cruise, reserve))
	if ended.Flown() || !ended.Reserve.Asked || ended.Reserve.Met || ended.Reserve.Reason.Empty() {
		t.Errorf("ended before: %+v, %+v", ended.Failure, ended.Reserve)
	}
}
