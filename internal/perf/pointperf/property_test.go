package pointperf_test

import (
	"errors"
	"math"
	"regexp"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
)

// both are the homebuilt with either propeller.
func both(t testing.TB) map[string]*aircraft.Aircraft {
	all := map[string]*aircraft.Aircraft{}
	for _, kind := range aircrafttest.Propellers {
		all[kind] = aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
	}
	return all
}

// drawAir draws the air of some day at an altitude up to top, in m.
func drawAir(t *rapid.T, top float64) atmos.Air {
	day := atmos.Day{Deviation: rapid.Float64Range(-30, 30).Draw(t, "deviation"), Humidity: rapid.Float64Range(0, 1).Draw(t, "humidity")}
	air, err := day.At(rapid.Float64Range(-300, top).Draw(t, "altitude"), nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}

func TestHeavierIsNeverBetter(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			light := &pointperf.Point{Air: drawAir(t, 4500), Mass: rapid.Float64Range(400, 640).Draw(t, "mass")}
			heavy := &pointperf.Point{Air: light.Air, Mass: light.Mass * rapid.Float64Range(1.001, 1.2).Draw(t, "factor")}
			l, h := pointperf.AllSpeeds(a, light), pointperf.AllSpeeds(a, heavy)
			if l.BestRate.Err != nil || h.BestRate.Err != nil {
				t.Fatalf("%v, %v", l.BestRate.Err, h.BestRate.Err)
			}
			if h.BestRate.Value >= l.BestRate.Value || h.BestAngle.Value >= l.BestAngle.Value {
				t.Errorf("climbs at %g m/s and %g rad at %g kg, %g m/s and %g rad at %g kg", l.BestRate.Value, l.BestAngle.Value, light.Mass, h.BestRate.Value, h.BestAngle.Value, heavy.Mass)
			}
			if h.LeastThrust.Value <= l.LeastThrust.Value || h.LeastPower.Value <= l.LeastPower.Value || h.Stall.TAS <= l.Stall.TAS {
				t.Errorf("needs less when heavier: %+v, %+v", l, h)
			}
			if l.LevelMax.Err == nil && h.LevelMax.Err == nil && h.LevelMax.TAS > l.LevelMax.TAS*(1+1e-9) {
				t.Errorf("flies faster when heavier: %g, %g m/s", l.LevelMax.TAS, h.LevelMax.TAS)
			}
		}))
	}
}

// Speeds come in the order in which theory has them, and each optimum beats its surroundings.
func TestSpeedsOfNote(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			p := &pointperf.Point{Air: drawAir(t, 3000), Mass: rapid.Float64Range(450, 650).Draw(t, "mass")}
			s := pointperf.AllSpeeds(a, p)
			for _, b := range []pointperf.Best{s.LeastThrust, s.LeastPower, s.Carson, s.BestAngle, s.BestRate, s.LevelMax, s.LevelMin} {
				if b.Err != nil {
					t.Fatal(b.Err)
				}
			}
			if !(s.Stall.TAS <= s.LeastPower.TAS && s.LeastPower.TAS < s.LeastThrust.TAS && s.LeastThrust.TAS < s.Carson.TAS) {
				t.Errorf("stall, least power, least thrust and Carson's speed are %g, %g, %g, %g m/s", s.Stall.TAS, s.LeastPower.TAS, s.LeastThrust.TAS, s.Carson.TAS)
			}
			if !(s.LevelMin.TAS <= s.BestAngle.TAS && s.BestAngle.TAS <= s.BestRate.TAS*(1+1e-6) && s.BestRate.TAS < s.LevelMax.TAS) {
				t.Errorf("level minimum, best angle, best rate, level maximum are %g, %g, %g, %g m/s", s.LevelMin.TAS, s.BestAngle.TAS, s.BestRate.TAS, s.LevelMax.TAS)
			}
			if got, _ := pointperf.At(a, p, s.LevelMax.TAS, nil); s.LevelMax.Bound == "" && math.Abs(got.InHand()) > 1e-6*got.Required {
				t.Errorf("thrust in hand is %g N at the level maximum", got.InHand())
			}
			v := rapid.Float64Range(s.Stall.TAS, s.LevelMax.TAS*(1-1e-9)).Draw(t, "speed")
			c, err := pointperf.FullClimb(a, p, v, nil)
			if err != nil {
				t.Fatal(err)
			}
			if c.Rate > s.BestRate.Value+1e-9 || c.Angle > s.BestAngle.Value+1e-11 {
				t.Errorf("climbs at %g m/s and %g rad at %g m/s, best %g m/s, %g rad", c.Rate, c.Angle, v, s.BestRate.Value, s.BestAngle.Value)
			}
			if b, _ := pointperf.At(a, p, v, nil); b.InHand() < -1e-6*b.Required && v > s.LevelMin.TAS {
				t.Errorf("thrust in hand is %g N at %g m/s, between the level limits", b.InHand(), v)
			}
		}))
	}
}

// ClimbAt satisfies both force equations, also where the path is steep.
func TestClimbBalancesForces(t *testing.T) {
	a := both(t)[powerplant.FixedPitch]
	rapid.Check(t, func(t *rapid.T) {
		p := &pointperf.Point{Air: drawAir(t, 4000), Mass: rapid.Float64Range(300, 700).Draw(t, "mass")}
		v := rapid.Float64Range(12, 80).Draw(t, "speed")
		f := rapid.Float64Range(-0.3, 0.5).Draw(t, "factor")
		thrust := rapid.Float64Range(-6000, 12000).Draw(t, "thrust")
		c := pointperf.ClimbAt(a, p, v, thrust, f, nil)
		w := p.Weight()
		if got := pointperf.Drag(a, p, v, w*math.Cos(c.Angle), 1, nil); math.Abs(got-c.Drag) > 1e-9*got {
			t.Errorf("drag is %g N, %g N at the path angle %g", c.Drag, got, c.Angle)
		}
		rest := thrust - c.Drag - w*(1+f)*math.Sin(c.Angle)
		switch {
		case c.Angle == math.Pi/2 && rest >= 0, c.Angle == -math.Pi/2 && rest <= 0:
		case math.Abs(rest) > 1e-8*w:
			t.Errorf("%g N are left over at %g rad", rest, c.Angle)
		}
		if math.Abs(c.Rate-v*math.Sin(c.Angle)) > 1e-12*v || math.Abs(c.PressureRate*p.Air.HeightRatio-c.Rate) > 1e-12*v {
			t.Errorf("rates %g and %g do not follow the angle %g", c.Rate, c.PressureRate, c.Angle)
		}
	})
}

// LevelAt gives the thrust required at the setting that it names.
func TestLevelFlightMatches(t *testing.T) {
	for kind, a := range both(t) {
		t.Run(kind, rapid.MakeCheck(func(t *rapid.T) {
			p := &pointperf.Point{Air: drawAir(t, 3500), Mass: rapid.Float64Range(450, 650).Draw(t, "mass")}
			v := rapid.Float64Range(pointperf.Stall(a, p, nil), 70).Draw(t, "speed")
			l, err := pointperf.LevelAt(a, p, v)
			full, runErr := pointperf.At(a, p, v, nil)
			if runErr != nil {
				t.Skip("beyond the propeller's table")
			}
			var short *powerplant.ThrustError
			if full.InHand() < -1e-6*full.Required {
				if !errors.As(err, &short) || short.Want != full.Required {
					t.Errorf("thrust in hand is %g N, yet level flight is %v", full.InHand(), err)
				}
				return
			}
			if full.InHand() < 1e-6*full.Required {
				return
			}
			if err != nil {
				t.Fatal(err)
			}
			out, err := a.Plant().Run(p.Condition(v), l.Setting, nil)
			if err != nil {
				t.Fatal(err)
			}
			if math.Abs(out.Thrust-l.Required) > 1e-6*l.Required || math.Abs(out.FuelFlow-l.Output.FuelFlow) > 1e-6*out.FuelFlow {
				t.Errorf("setting %g gives %g N and %g kg/s, the match said %g N and %g kg/s", l.Setting, out.Thrust, out.FuelFlow, l.Required, l.Output.FuelFlow)
			}
		}))
	}
}

// A share of power that two speeds make is flown at the faster.
func TestShareOfPowerIsFlownFast(t *testing.T) {
	for kind, a := range both(t) {
		p := &pointperf.Point{Air: aircrafttest.Air(t, 1000), Mass: a.StartMass()}
		slow, err := pointperf.LevelAt(a, p, pointperf.Stall(a, p, nil)*1.001)
		if err != nil {
			t.Fatal(err)
		}
		for _, share := range []float64{slow.Output.Fraction, 0.6, 0.75} {
			l, err := pointperf.AtFraction(a, p, share)
			if err != nil {
				t.Fatal(err)
			}
			near(t, kind+": share", l.Output.Fraction, share, 1e-7)
			if l.TAS < pointperf.AllSpeeds(a, p).LeastThrust.TAS*0.95 {
				t.Errorf("%s: flies at %g m/s on a share of %g, which also a faster speed makes", kind, l.TAS, share)
			}
		}
	}
}

func TestWhatIsAskedAndCannotBe(t *testing.T) {
	a := both(t)[powerplant.FixedPitch]
	point := func(hp, mass float64) *pointperf.Point {
		return &pointperf.Point{Air: aircrafttest.Air(t, hp), Mass: mass}
	}
	slow := aircrafttest.Homebuilt(powerplant.FixedPitch)
	slow.Airframe.NeverExceed = 20
	limited := aircrafttest.Build(t, slow)
	_, ceiling := pointperf.Ceiling(a, atmos.Day{}, 2500, aircraft.Clean, pointperf.ServiceRate)
	_, high := pointperf.AtFraction(a, point(0, 600), 1.2)
	_, low := pointperf.AtFraction(a, point(0, 600), 0.06)
	_, wind := pointperf.BestRange(a, point(2000, 600), 74)
	_, glide := pointperf.BestGlide(limited, point(0, 600))
	_, endurance := pointperf.BestEndurance(a, point(7000, 650))
	_, bounded := pointperf.BestEndurance(limited, point(0, 600))
	_, fraction := pointperf.AtFraction(a, point(7000, 650), 0.5)
	for what, c := range map[string]struct {
		err  error
		want string
	}{
		"ceiling of a boulder":        {ceiling, `does not reach 0\.51.m/s of climb at sea level and 2500`},
		"more than full power":        {high, `makes only [0-9.]+.% of the rating at 0.m, so 120\.0.%`},
		"less than flies":             {low, `no speed flies level on 6\.0.% of the rating at 0.m`},
		"best range in a gale":        {wind, `head wind of 74\.0.m/s leaves no way over the ground: the fastest level flight is [0-9.]+.m/s`},
		"glide below the stall":       {glide, `the stall, [0-9.]+.m/s, lies above the never-exceed speed, 20\.0.m/s`},
		"endurance below the stall":   {bounded, `the stall, [0-9.]+.m/s, lies above`},
		"endurance above the ceiling": {endurance, `no level flight at 7000.m and 650\.0.kg: thrust in hand is −[0-9]+.N at its best speed, [0-9.]+.m/s`},
		"power above the ceiling":     {fraction, `no level flight at 7000.m`},
		"speeds below the stall":      {pointperf.AllSpeeds(limited, point(0, 600)).BestRate.Err, `the stall, [0-9.]+.m/s, lies above`},
		"top speed above the ceiling": {pointperf.AllSpeeds(a, point(7000, 650)).LevelMax.Err, `no level flight at 7000.m`},
	} {
		if c.err == nil || !regexp.MustCompile(c.want).MatchString(c.err.Error()) {
			t.Errorf("%s: %v", what, c.err)
		}
	}
	if !errors.Is(ceiling, pointperf.ErrNoCeiling) || !errors.Is(endurance, pointperf.ErrNoThrust) {
		t.Errorf("%v and %v are not of their kind", ceiling, endurance)
	}
}

// Near the ceiling the thrust fails before the wing does: level flight begins above the stall.
func TestSlowestLevelFlightNearTheCeiling(t *testing.T) {
	for kind, a := range both(t) {
		ceiling, err := pointperf.Ceiling(a, atmos.Day{}, a.StartMass(), aircraft.Clean, 0.1)
		if err != nil {
			t.Fatal(err)
		}
		p := &pointperf.Point{Air: aircrafttest.Air(t, ceiling), Mass: a.StartMass()}
		s := pointperf.AllSpeeds(a, p)
		if s.LevelMin.Err != nil || s.LevelMin.Bound != "" || s.LevelMin.TAS <= s.Stall.TAS || s.LevelMin.TAS >= s.BestRate.TAS || s.LevelMax.TAS <= s.BestRate.TAS {
			t.Fatalf("%s: stall, level minimum, best rate, level maximum %+v %+v %+v %+v", kind, s.Stall, s.LevelMin, s.BestRate, s.LevelMax)
		}
		for _, v := range []float64{s.LevelMin.TAS, s.LevelMax.TAS} {
			if b := balance(t, a, p, v); math.Abs(b.InHand()) > 1e-6*b.Required {
				t.Errorf("%s: thrust in hand is %g N at %g m/s", kind, b.InHand(), v)
			}
		}
	}
}

// Beyond the propeller's table there is no thrust to balance.
func TestBeyondThePropellersTable(t *testing.T) {
	a := both(t)[powerplant.FixedPitch]
	p := &pointperf.Point{Air: aircrafttest.Air(t, 0), Mass: 600}
	var beyond *powerplant.SpeedError
	if _, err := pointperf.At(a, p, 200, nil); !errors.As(err, &beyond) {
		t.Errorf("At: %v", err)
	}
	if _, err := pointperf.FullClimb(a, p, 200, nil); !errors.As(err, &beyond) {
		t.Errorf("FullClimb: %v", err)
	}
}
