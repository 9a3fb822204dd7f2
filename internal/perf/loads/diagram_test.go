package loads

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/units"
)

func airAt(t interface{ Fatal(...any) }, hp float64) atmos.Air {
	air, err := atmos.Day{}.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}

// light is an invented aeroplane of 600 kg with limits of its own.
func light() (Limits, Airframe) {
	l := Unentered()
	l.Rule, l.Positive, l.Negative, l.NegativeDive, l.Cruise, l.Dive = Own, 4, -2, -1, 55, 75
	return l, Airframe{Area: 12, Span: 9.6, CLMax: 1.5, MaxTakeOff: 600}
}

func drawnOf(t interface{ Fatal(...any) }, l Limits, a Airframe, hp, mass float64) *Diagram {
	d, ok := l.Design(a, nil)
	if !ok {
		t.Fatal("no limits")
	}
	g, err := d.At(airAt(t, hp), mass, nil)
	if err != nil {
		t.Fatal(err)
	}
	return g
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance*math.Max(1, math.Abs(want))) {
		t.Errorf("%s is %g, want %g", what, got, want)
	}
}

// The numbers of one aeroplane, followed on paper: W/S = 600·9.80665/12 = 490.3325 Pa, VS = √(2·490.3325/(1.225·1.5)) = 23.102 m/s,
// VA = 2·VS; A = 7.68, a = 2π·7.68/(2 + √(4 + 58.982)) = 4.8564; C = 1.25 m, μ = 2·490.3325/(1.225·1.25·4.8564·9.80665) = 13.4474,
// Kg = 0.88·13.4474/18.7474 = 0.63122; n − 1 at 55 m/s = 0.63122·1.225·15.24·55·4.8564/980.665 = 3.2097.
func TestOnPaper(t *testing.T) {
	l, a := light()
	g := drawnOf(t, l, a, 0, 600)
	near(t, "wing loading", g.Loading, 50, 1e-9)
	near(t, "VS", g.Stall, 23.102, 1e-4)
	near(t, "VA", g.Maneuver, 46.204, 1e-4)
	near(t, "negative stall", g.NegativeStall, 23.102*math.Sqrt(1.5/0.8), 1e-4)
	near(t, "reach of the negative limit", g.NegativeReach, g.NegativeStall*math.Sqrt2, 1e-9)
	near(t, "slope", g.Design.Slope, 4.8564, 2e-4)
	near(t, "mass ratio", g.MassRatio, 13.4474, 3e-4)
	near(t, "alleviation", g.Alleviation, 0.63122, 2e-4)
	near(t, "gust at VC", g.CruiseGust.Up, 4.2097, 3e-4)
	near(t, "gust at VC down", g.CruiseGust.Down, 2-4.2097, 3e-4)
	near(t, "gust at VD", g.DiveGust.Up, 1+3.2097/2*75/55, 3e-4)
	if !g.Greatest.Gust || g.Greatest.EAS != 55 || math.Abs(g.Greatest.Load-g.CruiseGust.Up) > 1e-12 {
		t.Errorf("the greatest is %+v", g.Greatest)
	}
	if !g.Smallest.Gust || g.Smallest.EAS != 55 {
		t.Errorf("the smallest is %+v", g.Smallest)
	}
}

// Closed forms of the lift-curve slope: 2π for an endless wing, πA/2 for a slender one (R. T. Jones, NACA Report 835, 1946).
func TestLiftSlope(t *testing.T) {
	near(t, "endless", LiftSlope(1e7, nil), 2*math.Pi, 1e-6)
	near(t, "slender", LiftSlope(1e-4, nil)/1e-4, math.Pi/2, 1e-4)
}

func TestLimitingCases(t *testing.T) {
	l, a := light()
	calm := l
	calm.GustCruise, calm.GustDive = 0, 0
	g := drawnOf(t, calm, a, 0, 600)
	if g.Greatest.Gust || g.Smallest.Gust || math.Abs(g.Greatest.Load-4) > 1e-9 || math.Abs(g.Smallest.Load+2) > 1e-9 || math.Abs(g.Greatest.EAS-g.Maneuver) > 1e-6 {
		t.Errorf("without gusts: %+v, %+v", g.Greatest, g.Smallest)
	}
	if g.CruiseGust.Up != 1 || g.DiveGust.Down != 1 {
		t.Errorf("a gust of nothing gives %+v", g.CruiseGust)
	}
	// An endlessly heavy aeroplane is alleviated to 0.88 and not moved.
	heavy := drawnOf(t, l, Airframe{Area: 1, Span: 10, CLMax: 40000, MaxTakeOff: 1e6}, 0, 1e6)
	near(t, "alleviation when heavy", heavy.Alleviation, 0.88, 1e-4)
	near(t, "gust when heavy", heavy.CruiseGust.Up, 1, 1e-2)
	// μ = 5.3 halves the factor.
	tuned := l
	tuned.SlopeGiven, tuned.Slope, tuned.ChordGiven = ByValue, 5, ByValue
	tuned.Chord = 2 * 600 * 9.80665 / 12 / (atmos.SeaLevelDensity * 5 * 9.80665 * 5.3)
	near(t, "alleviation at a mass ratio of 5.3", drawnOf(t, tuned, a, 0, 600).Alleviation, 0.44, 1e-12)
	// Where the wing stalls before the limit, the envelope never reaches it.
	weak := a
	weak.CLMax = 0.6
	if g := drawnOf(t, calm, weak, 0, 600); g.Maneuver < 55 || math.Abs(g.Greatest.Load-math.Min(4, g.lift(75).Up)) > 1e-9 {
		t.Errorf("VA %g m/s above VC, greatest %+v", g.Maneuver, g.Greatest)
	}
	// Gusts of part 23 weaken above 20 000 ft to half at 50 000 ft; those of CS-VLA do not.
	normal := l
	normal.Rule, normal.FactorsGiven, normal.SpeedsGiven = "normal", ByValue, ByValue
	for hp, want := range map[float64]float64{0: 15.24, 6096: 15.24, 6096 + 4572: 0.75 * 15.24, 15240: 7.62, 20000: 7.62} {
		near(t, "gust at VC aloft", drawnOf(t, normal, a, hp, 600).CruiseGust.Velocity, want, 1e-12)
	}
	normal.Rule = "vla"
	near(t, "gust at VC aloft", drawnOf(t, normal, a, 15240, 600).CruiseGust.Velocity, 15.24, 0)
}

func TestNoEnvelope(t *testing.T) {
	l, a := light()
	d, _ := l.Design(a, nil)
	_, err := d.At(airAt(t, 0), 6000, nil)
	var e units.Explained
	if !errors.As(err, &e) || e.Message().Empty() {
		t.Errorf("ten times the mass: %v", err)
	}
	none := Unentered()
	if _, ok := none.Design(a, nil); ok || none.Given() {
		t.Error("limits that are not entered have a design")
	}
}

// draw draws limits and an aeroplane that flies below VC.
func draw(t *rapid.T) (Limits, Airframe, float64, float64) {
	f := func(name string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, name) }
	l := Unentered()
	l.Rule = rapid.SampledFrom([]string{"vla", "normal", "utility", "aerobatic", Own}).Draw(t, "rule")
	l.FactorsGiven = rapid.SampledFrom([]string{ByRule, ByValue}).Draw(t, "factors")
	l.SpeedsGiven = rapid.SampledFrom([]string{ByRule, ByValue}).Draw(t, "speeds")
	l.Positive, l.Negative, l.NegativeDive = f("n1", 1, 9), f("n2", -6, 0), f("n at VD", -6, 0)
	l.GustCruise, l.GustDive, l.NegativeCL = f("gust at VC", 0, 30), f("gust at VD", 0, 30), f("negative CL", -2, -0.1)
	a := Airframe{Area: f("area", 0.3, 40), CLMax: f("CLmax", 0.8, 2.5)}
	a.Span = math.Sqrt(f("aspect ratio", 3, 25) * a.Area)
	a.MaxTakeOff = f("loading", 5, 150) * a.Area
	mass := a.MaxTakeOff * f("share", 0.4, 1)
	slow := math.Sqrt(2 * mass * 9.80665 / (a.Area * 1.225 * a.CLMax))
	l.Cruise = slow * f("VC over VS", 1.01, 5)
	l.Dive = l.Cruise * f("VD over VC", 1, 1.6)
	return l, a, f("altitude", 0, 12000), mass
}

func TestProperties(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l, a, hp, mass := draw(t)
		d, ok := l.Design(a, nil)
		if !ok {
			t.Fatal("no limits")
		}
		g, err := d.At(airAt(t, hp), mass, nil)
		if err != nil {
			t.Skip("the rule's VC lies below the stall")
		}
		if g.Points[0].EAS != 0 || g.Points[0].Envelope != (Pair{}) || g.Points[len(g.Points)-1].EAS != d.Dive {
			t.Fatalf("the envelope is not closed: %+v to %+v", g.Points[0], g.Points[len(g.Points)-1])
		}
		wing := a
		above, below := 0.0, 0.0
		for i, p := range g.Points {
			if i > 0 && p.EAS <= g.Points[i-1].EAS {
				t.Fatalf("speeds %g, %g", g.Points[i-1].EAS, p.EAS)
			}
			e := p.Envelope
			if e.Up < e.Down || e.Up > p.Lift.Up+tie || e.Down < p.Lift.Down-tie {
				t.Fatalf("envelope %+v", p)
			}
			// What lift reaches of the limits of manoeuvre and gust is inside.
			if e.Up+tie < math.Min(p.Lift.Up, p.Maneuver.Up) || e.Up+tie < math.Min(p.Lift.Up, p.Gust.Up) || e.Down-tie > math.Max(p.Lift.Down, p.Maneuver.Down) {
				t.Fatalf("envelope leaves out %+v", p)
			}
			above, below = math.Max(above, e.Up), math.Min(below, e.Down)
		}
		if math.Abs(above-g.Greatest.Load) > 2*tie || math.Abs(below-g.Smallest.Load) > 2*tie {
			t.Fatalf("greatest %+v of %g, smallest %+v of %g", g.Greatest, above, g.Smallest, below)
		}
		// Between two points the envelope is a straight line or the parabola of a stall: no corner is missed.
		q := 0.5 * atmos.SeaLevelDensity / (g.Loading * 9.80665)
		for i := 1; i < len(g.Points); i++ {
			a, b := g.Points[i-1], g.Points[i]
			h := b.EAS - a.EAS
			m, _ := g.Load((a.EAS + b.EAS) / 2)
			for _, bow := range []struct{ got, parabola float64 }{
				{(a.Envelope.Up+b.Envelope.Up)/2 - m.Envelope.Up, q * wing.CLMax * h * h / 4},
				{(a.Envelope.Down+b.Envelope.Down)/2 - m.Envelope.Down, q * d.NegativeCL * h * h / 4},
			} {
				if math.Abs(bow.got) > 1e-9 && math.Abs(bow.got-bow.parabola) > 1e-9 {
					t.Fatalf("a corner between %g and %g m/s: %g, a parabola bows %g", a.EAS, b.EAS, bow.got, bow.parabola)
				}
			}
		}
		// No speed between the points goes beyond the extremes.
		v := rapid.Float64Range(0, d.Dive).Draw(t, "speed")
		if p, ok := g.Load(v); !ok || p.Envelope.Up > g.Greatest.Load+1e-6 || p.Envelope.Down < g.Smallest.Load-1e-6 {
			t.Fatalf("%+v beyond %+v, %+v", p, g.Greatest, g.Smallest)
		}
		// The corner of manoeuvre: (VA, n1) is on the stall, and on the envelope unless a gust is stronger.
		if g.Maneuver < d.Dive {
			p, _ := g.Load(g.Maneuver)
			if math.Abs(p.Lift.Up-d.Positive) > 1e-9 || math.Abs(p.Envelope.Up-d.Positive) > 1e-9 {
				t.Fatalf("at VA %+v, limit %g", p, d.Positive)
			}
		}
		// The gusts up and down lie about level flight, and the stall at load factor 1.
		if c := g.CruiseGust; math.Abs(c.Up+c.Down-2) > 1e-9 || g.Alleviation <= 0 || g.Alleviation >= 0.88 {
			t.Fatalf("gust %+v, alleviation %g", c, g.Alleviation)
		}
		// A lighter aeroplane is moved more.
		if lighter, err := d.At(airAt(t, hp), 0.9*mass, nil); err == nil && g.CruiseGust.Velocity > 0.1 && lighter.CruiseGust.Up <= g.CruiseGust.Up {
			t.Fatalf("lighter: %g, heavier: %g", lighter.CruiseGust.Up, g.CruiseGust.Up)
		}
	})
}

// Choosing another way to give the limits keeps the envelope; to and from every way.
func TestConvertKeepsTheEnvelope(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		l, a, hp, mass := draw(t)
		before, _ := l.Design(a, nil)
		if _, err := before.At(airAt(t, hp), mass, nil); err != nil {
			t.Skip("no envelope")
		}
		changed := l
		choice := rapid.SampledFrom([]string{"rule", "factors_given", "speeds_given", "chord_given", "slope_given"}).Draw(t, "choice")
		switch choice {
		case "rule":
			changed.Rule = Own
			changed.Convert(choice, l.Rule, a)
		case "factors_given":
			changed.FactorsGiven = ByValue
			changed.Convert(choice, l.FactorsGiven, a)
		case "speeds_given":
			changed.SpeedsGiven = ByValue
			changed.Convert(choice, l.SpeedsGiven, a)
		case "chord_given":
			changed.ChordGiven = ByValue
			changed.Convert(choice, l.ChordGiven, a)
		case "slope_given":
			changed.SlopeGiven = ByValue
			changed.Convert(choice, l.SlopeGiven, a)
		}
		after, ok := changed.Design(a, nil)
		if !ok {
			t.Fatal("no limits")
		}
		h, err := after.At(airAt(t, min(hp, 6000)), mass, nil)
		if err != nil {
			t.Fatal(err)
		}
		g, err := before.At(airAt(t, min(hp, 6000)), mass, nil)
		if err != nil {
			t.Fatal(err)
		}
		for i := range g.Points {
			if p, q := g.Points[i], h.Points[i]; p.Envelope != q.Envelope {
				t.Fatalf("%s: %+v became %+v", choice, p, q)
			}
		}
	})
	// Back from own values, they stay the designer's.
	l, a := light()
	l.Rule = "normal"
	l.Convert("rule", Own, a)
	if l.FactorsGiven != ByValue || l.SpeedsGiven != ByValue || l.Positive != 4 || l.Cruise != 55 {
		t.Errorf("from own values: %+v", l)
	}
	untouched := Unentered()
	untouched.Rule = "vla"
	untouched.Convert("rule", NoRule, a)
	if untouched.FactorsGiven != ByRule || untouched.Positive != Unentered().Positive {
		t.Errorf("from nothing: %+v", untouched)
	}
}

func TestShownWorkingIsTrue(t *testing.T) {
	seen := formulatest.Record{}
	t.Run("drawn", rapid.MakeCheck(func(t *rapid.T) {
		l, a, hp, mass := draw(t)
		var w formula.Working
		d, _ := l.Design(a, &w)
		bare, _ := l.Design(a, nil)
		g, err := d.At(airAt(t, hp), mass, &w)
		h, _ := bare.At(airAt(t, hp), mass, nil)
		if err == nil && (g.Greatest != h.Greatest || g.CruiseGust != h.CruiseGust) {
			t.Errorf("%+v with a working, %+v without", g.Greatest, h.Greatest)
		}
		seen.Check(t, w)
	}))
	seen.Complete(t)
}

func TestCheck(t *testing.T) {
	l, _ := light()
	l.Dive = 50
	if err := l.Check(); err == nil {
		t.Error("VD below VC is taken")
	}
	l.Rule, l.SpeedsGiven = "vla", ByRule
	if err := l.Check(); err != nil {
		t.Errorf("speeds that do not count: %v", err)
	}
}
