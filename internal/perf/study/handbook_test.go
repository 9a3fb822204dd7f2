package study_test

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance*math.Abs(want)) {
		t.Errorf("%s is %.10g, want %.10g", what, got, want)
	}
}

// TestHandbookRun: a cell of the tables is the take-off or landing on the level strip in
// calm air, and on a strip like that it is the study's own.
func TestHandbookRun(t *testing.T) {
	spec := project.Demo()
	spec.Strips[0].Slope = 0
	s := study.All(built(t, spec))[0]
	for _, landing := range []bool{false, true} {
		of := s.TakeOff
		if landing {
			of = s.Landing
		}
		p := s.HandbookRun(landing, of.Mass, of.Place.Air.PressureAltitude, of.Place.Air.Temperature)
		near(t, "over the obstacle", p.Run.Total, of.Run.Total, 1e-9)
		near(t, "with the factor", p.Run.Factored, of.Run.Factored, 1e-9)
	}
	sloped := study.All(built(t, project.Demo()))[0]
	at := sloped.HandbookPlace(false)
	if at.Strip.Slope != 0 || at.HeadWind != 0 || at.Surface.Name != "dry-grass" {
		t.Errorf("the tables' place is %+v", at)
	}
	how := sloped.Project.Plan.Technique
	run, err := runway.TakeOff(sloped.Aircraft(), 600, at, how)
	if err != nil {
		t.Fatal(err)
	}
	p := sloped.HandbookRun(false, 600, at.Air.PressureAltitude, at.Air.Temperature)
	near(t, "take-off of 600 kg", p.Run.Total, run.Total, 1e-9)
}

// TestHandbookTrends: more mass, height or heat is never better.
func TestHandbookTrends(t *testing.T) {
	s := study.All(built(t, project.Demo()))[1]
	rapid.Check(t, func(t *rapid.T) {
		mass, hp, warm := rapid.Float64Range(450, 620).Draw(t, "mass"), rapid.Float64Range(0, 2000).Draw(t, "height"), rapid.Float64Range(260, 300).Draw(t, "temperature")
		for _, landing := range []bool{false, true} {
			base := s.HandbookRun(landing, mass, hp, warm)
			for name, p := range map[string]study.FieldPoint{"heavier": s.HandbookRun(landing, mass*1.05, hp, warm), "higher": s.HandbookRun(landing, mass, hp+300, warm), "warmer": s.HandbookRun(landing, mass, hp, warm+8)} {
				if base.Has() && p.Has() && p.Run.Total <= base.Run.Total {
					t.Fatalf("landing %v, %s: %v m against %v m", landing, name, p.Run.Total, base.Run.Total)
				}
			}
		}
		base := s.HandbookClimb(mass, hp, 0)
		for name, c := range map[string]study.HandbookClimb{"heavier": s.HandbookClimb(mass*1.05, hp, 0), "higher": s.HandbookClimb(mass, hp+300, 0), "warmer": s.HandbookClimb(mass, hp, 10)} {
			if base.Err == nil && c.Err == nil && c.Rate >= base.Rate {
				t.Fatalf("%s climbs at %v against %v", name, c.Rate, base.Rate)
			}
		}
	})
}

// TestHandbookStall: the calibrated stall grows with the root of mass and of load factor.
// At these speeds calibrated and equivalent airspeed differ by less than a thousandth.
func TestHandbookStall(t *testing.T) {
	spec := project.Demo()
	spec.Day.Humidity = 0
	s := study.All(built(t, spec))[0]
	flat := s.HandbookStall(aircraft.Clean, 600, 0)
	near(t, "four times the mass", s.HandbookStall(aircraft.Clean, 2400, 0), 2*flat, 1e-3)
	near(t, "60 degrees of bank", s.HandbookStall(aircraft.Clean, 600, math.Pi/3), math.Sqrt2*flat, 1e-3)
	// sqrt(2 W/(rho0 S CLmax)) with W = 600 kg, S = 12.1 m², CLmax = 1.45.
	near(t, "stall", flat, math.Sqrt(2*600*9.80665/(1.225*12.1*1.45)), 1e-3)
	if len(s.Handbook().Banks) != 4 || math.Abs(s.Handbook().Banks[3]-math.Pi/3) > 1e-12 {
		t.Errorf("banks %v", s.Handbook().Banks)
	}
}

// TestHandbookRange holds the range at one share of the rating against a fine sum over the
// mass by the trapezium rule, and the endurance against the fuel over the flow, which the share
// alone decides.
func TestHandbookRange(t *testing.T) {
	s := study.All(built(t, project.Demo()))[0]
	const hp, share = 2000, 0.55
	c := s.HandbookCruise(600, hp, share)
	if c.Err != nil || c.RangeErr != nil {
		t.Fatal(c.Err, c.RangeErr)
	}
	flow := c.Level.Output.FuelFlow
	burn := s.Aircraft().Stores().Fuel - flow*1800
	near(t, "endurance", c.Time, burn/flow, 1e-6)
	const n = 200
	sum := 0.0
	for i := range n + 1 {
		l := s.HandbookCruise(s.Masses.Start-burn*float64(i)/n, hp, share).Level
		w := burn / n
		if i == 0 || i == n {
			w /= 2
		}
		sum += w * l.TAS / l.Output.FuelFlow
	}
	near(t, "range", c.Distance, sum, 1e-6)
	if !(c.Distance > c.Time*c.Level.TAS*0.98 && c.Distance < c.Time*c.Level.TAS*1.02) {
		t.Errorf("%v m in %v s at %v m/s", c.Distance, c.Time, c.Level.TAS)
	}
}

// TestHandbookReserveTakesAll: where the reserve takes all the fuel there is no range, and it is said.
func TestHandbookReserveTakesAll(t *testing.T) {
	spec := project.Demo()
	for i := range spec.Legs {
		if spec.Legs[i].Kind == mission.Reserve {
			spec.Legs[i].Time = 24 * 3600
		}
	}
	s := study.All(built(t, spec))[0]
	c := s.HandbookCruise(600, 1000, 0.55)
	if c.Err != nil || c.RangeErr == nil || c.Distance != 0 {
		t.Errorf("%v, %v, %v m", c.Err, c.RangeErr, c.Distance)
	}
}

// TestHandbookAxes: round in the unit shown, and around the strip.
func TestHandbookAxes(t *testing.T) {
	for _, sys := range units.Systems {
		spec := project.Demo()
		spec.Display = string(sys)
		for _, elevation := range []float64{-300, 0, 610, 3500} {
			spec.Strips[0].Elevation = elevation
			s := study.All(built(t, spec))[0]
			h := s.Handbook()
			hp := s.Project.Departure.Air.PressureAltitude
			if n := len(h.Ground); h.Ground[0] > math.Max(0, hp) || h.Ground[n-1] < hp || n > 10 {
				t.Errorf("%s, strip at %.0f m: %v", sys, hp, h.Ground)
			}
			for _, list := range [][]float64{h.Ground, h.Aloft, h.Cruise} {
				for i, v := range list {
					if shown := sys.Unit(units.Altitude).FromSI(v); math.Abs(shown-math.Round(shown/50)*50) > 1e-6 || (i > 0 && v <= list[i-1]) {
						t.Errorf("%s: %v is not round or does not rise in %v", sys, shown, list)
					}
				}
			}
		}
	}
}

// TestHandbookOfWhatDoesNotFly: every cell has a number or a reason.
func TestHandbookOfWhatDoesNotFly(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Aircraft.Weights.Items[2].Mass = 1500
	spec.Variants[1].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Engine.InstallationLoss = 0.5
	for _, s := range study.All(built(t, spec)) {
		h := s.Handbook()
		for _, m := range h.Masses {
			p := s.HandbookRun(false, m.Mass, 0, 288.15)
			if !p.Has() && p.Err == nil {
				t.Errorf("%s: no run and no reason at %v kg", s.Variant().Name, m.Mass)
			}
			c := s.HandbookClimb(m.Mass, 0, 0)
			if c.Err == nil && !(c.Rate > 0 && c.CAS > 0) {
				t.Errorf("%s: climb %+v at %v kg", s.Variant().Name, c, m.Mass)
			}
		}
		if c := s.HandbookCruise(h.CruiseMass, 0, study.Full); c.Err == nil && !(c.Level.TAS > 0) {
			t.Errorf("cruise %+v", c)
		}
	}
}

// TestHandbookShares: round, rising, and the greatest of them below full can be flown at the
// lowest altitude, also where the never-exceed speed leaves little use for the power.
func TestHandbookShares(t *testing.T) {
	least := 1.0
	for _, never := range []float64{75, 55, 48, 42, 38, 36} {
		spec := project.Demo()
		spec.Variants[0].Aircraft.Airframe.NeverExceed = never
		s := study.All(built(t, spec))[0]
		h := s.Handbook()
		if n := len(h.Shares); n < 2 || h.Shares[n-1] != study.Full {
			t.Fatalf("shares %v", h.Shares)
		}
		for i, share := range h.Shares {
			if shown := share * 100; math.Abs(shown-math.Round(shown)) > 1e-9 || (i > 0 && share <= h.Shares[i-1]) {
				t.Errorf("shares %v", h.Shares)
			}
		}
		greatest := h.Shares[len(h.Shares)-2]
		least = math.Min(least, greatest)
		if c := s.HandbookCruise(h.CruiseMass, h.Cruise[0], greatest); c.Err != nil {
			t.Errorf("never above %v m/s, shares %v: %v", never, h.Shares, c.Err)
		}
	}
	if least > 0.5 {
		t.Errorf("the cases leave use for %v of the rating", least)
	}
}

// TestHandbookAboveTheLimit: where the stall lies above the never-exceed speed the reason says that, in words.
func TestHandbookAboveTheLimit(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Aircraft.Airframe.NeverExceed = 20
	s := study.All(built(t, spec))[0]
	for _, share := range []float64{0.55, study.Full} {
		c := s.HandbookCruise(600, 0, share)
		if c.Err == nil || !strings.Contains(units.Explain(c.Err).In(units.Metric), "never-exceed") {
			t.Errorf("share %v: %v", share, c.Err)
		}
	}
}
