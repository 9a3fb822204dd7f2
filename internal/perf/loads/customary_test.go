package loads

import (
	"fmt"
	"math"
	"testing"

	"legwright/internal/perf/atmos"
)

// customary evaluates 14 CFR 23.341(c) as it is printed, in slugs, feet, pounds and knots, with
// the air of the U.S. Standard Atmosphere by its own closed form in feet.
type customary struct {
	pounds, area, chord, slope float64 // lb, ft², ft, per radian
	feet                       float64 // altitude
}

func (c customary) factor(ude, knots float64) float64 {
	const g = 32.174
	rho := 0.0023769 * math.Pow(1-6.8756e-6*c.feet, 4.2559)
	loading := c.pounds / c.area
	mu := 2 * loading / (rho * c.chord * c.slope * g)
	kg := 0.88 * mu / (5.3 + mu)
	return 1 + kg*ude*knots*c.slope/(498*loading)
}

// The SI form gives the load factor of the printed form. Its 498 is 2/ρ0 rounded from 498.5, so that the increments differ by
// one part in a thousand, and the factors by less.
func TestGustFactorInCustomaryUnits(t *testing.T) {
	for _, c := range []struct {
		customary
		vc, vd float64 // kt
	}{
		{customary{1433, 130, 4.2, 4.7, 0}, 110, 154},
		{customary{1433, 130, 4.2, 4.7, 10000}, 110, 154},
		{customary{2400, 174, 4.9, 4.6, 5000}, 125, 175},
		{customary{3600, 180, 5.2, 4.9, 20000}, 160, 220},
		{customary{66, 12, 1.1, 5.3, 1000}, 60, 84},
	} {
		t.Run(fmt.Sprintf("%g lb at %g ft", c.pounds, c.feet), func(t *testing.T) {
			area, span := c.area*0.3048*0.3048, c.area/c.chord*0.3048
			l := Limits{Rule: "normal", FactorsGiven: ByRule, SpeedsGiven: ByValue, Cruise: c.vc * knot, Dive: c.vd * knot, NegativeCL: -0.8, ChordGiven: ByArea, SlopeGiven: ByValue, Slope: c.slope}
			d, ok := l.Design(Airframe{Area: area, Span: span, CLMax: 1.6, MaxTakeOff: c.pounds * 0.45359237}, nil)
			air, err := atmos.Day{}.At(c.feet*0.3048, nil)
			if !ok || err != nil {
				t.Fatal(ok, err)
			}
			g, err := d.At(air, c.pounds*0.45359237, nil)
			if err != nil {
				t.Fatal(err)
			}
			for _, p := range []struct{ got, want float64 }{
				{g.CruiseGust.Up, c.factor(50, c.vc)}, {g.CruiseGust.Down, c.factor(-50, c.vc)},
				{g.DiveGust.Up, c.factor(25, c.vd)}, {g.DiveGust.Down, c.factor(-25, c.vd)},
			} {
				if math.Abs((p.got-1)-(p.want-1)) > 1.5e-3*math.Abs(p.want-1) {
					t.Errorf("load factor %.5f, the printed form gives %.5f", p.got, p.want)
				}
			}
		})
	}
}

// The least speeds and factors of the rules, worked in their own units on paper.
func TestRules(t *testing.T) {
	const lb = 0.45359237
	for _, c := range []struct {
		rule               string
		pounds, loading    float64 // lb, lb/ft²
		n1, n2, dive       float64
		cruise, diveFactor float64 // kt, VD over VC
	}{
		{"normal", 1600, 16, 3.8, -1.52, 0, 33 * 4, 1.4},
		{"normal", 6000, 25, 2.1 + 24000.0/16000, -0.4 * 3.6, 0, (33 - 4.4/80*5) * 5, 1.4 - 0.05/80*5},
		{"normal", 4100, 36, 3.8, -1.52, 0, (33 - 4.4/80*16) * 6, 1.4 - 0.05/80*16},
		{"normal", 12000, 100, 2.1 + 24000.0/22000, -0.4 * (2.1 + 24000.0/22000), 0, 28.6 * 10, 1.35},
		{"normal", 12000, 144, 2.1 + 24000.0/22000, -0.4 * (2.1 + 24000.0/22000), 0, 28.6 * 12, 1.35},
		{"utility", 1600, 16, 4.4, -1.76, -1, 33 * 4, 1.5},
		{"aerobatic", 1600, 16, 6, -3, -1, 36 * 4, 1.55},
		{"aerobatic", 1600, 100, 6, -3, -1, 28.6 * 10, 1.35},
	} {
		area := c.pounds / c.loading * 0.3048 * 0.3048
		l := Limits{Rule: c.rule, FactorsGiven: ByRule, SpeedsGiven: ByRule, NegativeCL: -0.8, ChordGiven: ByArea, SlopeGiven: ByEstimate}
		d, ok := l.Design(Airframe{Area: area, Span: 9, CLMax: 1.5, MaxTakeOff: c.pounds * lb}, nil)
		near := func(what string, got, want float64) {
			if !ok || math.Abs(got-want) > 1e-6*math.Max(1, math.Abs(want)) {
				t.Errorf("%s, %g lb at %g lb/ft²: %s is %g, want %g", c.rule, c.pounds, c.loading, what, got, want)
			}
		}
		near("n1", d.Positive, c.n1)
		near("n2", d.Negative, c.n2)
		near("n at VD", d.NegativeDive, c.dive)
		near("VC in kt", d.Cruise/knot, c.cruise)
		near("VD over VC", d.Dive/d.Cruise, c.diveFactor)
	}
	// CS-VLA 335 states its formula in m/s and, rounded, in knots: 2.4 and 4.7 times the root of N/m².
	area := 600 * 9.80665 / 400
	l := Limits{Rule: "vla", FactorsGiven: ByRule, SpeedsGiven: ByRule, NegativeCL: -0.8}
	d, _ := l.Design(Airframe{Area: area, Span: 9, CLMax: 1.5, MaxTakeOff: 600}, nil)
	if math.Abs(d.Cruise-48) > 1e-9 || math.Abs(d.Dive-67.2) > 1e-9 || d.Positive != 3.8 || d.Negative != -1.5 || d.NegativeDive != 0 || math.Abs(d.Cruise/knot-4.7*20) > 1 {
		t.Errorf("CS-VLA at 400 N/m²: %+v", d)
	}
	// The wing loading of the FAR formula in SI is near that of CS-VLA, which rounds it.
	if k := rules[1].leastCruise(400/9.80665, nil) / d.Cruise; k < 1 || k > 1.03 {
		t.Errorf("14 CFR 23 asks for %g times the VC of CS-VLA", k)
	}
	// Dive speed follows the cruise speed once that is chosen faster than the least.
	l.SpeedsGiven, l.Cruise, l.Dive = ByValue, 60, 80
	if d, _ = l.Design(d.Airframe, nil); d.Least.Dive != 75 || d.Least.Cruise != 48 && math.Abs(d.Least.Cruise-48) > 1e-9 || d.Dive != 80 {
		t.Errorf("VC 60 m/s asks for VD %g, least VC %g", d.Least.Dive, d.Least.Cruise)
	}
}
