package units

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// TestFactors compares with NIST Special Publication 811 (2008), appendix B.8,
// values from memory, rounded there to seven digits.
func TestFactors(t *testing.T) {
	for _, c := range []struct {
		unit Unit
		want float64
	}{
		{hp, 745.6999}, {lbf, 4.448222}, {knot, 0.5144444}, {gallonUS, 3.785412e-3},
		{lbHpHour, 1.689659e-7}, {feetMinute, 5.08e-3}, {hpMetric, 735.4988}, {lbGallon, 119.8264},
		{milesHour, 0.44704}, {kWattHour, 3.6e6}, {sqFoot, 9.290304e-2}, {lbfFoot, 1.355818},
	} {
		if got := c.unit.ToSI(1); math.Abs(got/c.want-1) > 5e-7 {
			t.Errorf("1 %s = %.8g SI, want %.7g", c.unit.Symbol, got, c.want)
		}
	}
	if k := fahrenheit.ToSI(59); math.Abs(k-288.15) > 1e-9 {
		t.Errorf("59 °F = %v K, want 288.15", k)
	}
}

func TestRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := Quantity(rapid.IntRange(0, int(quantities)-1).Draw(t, "quantity"))
		u := rapid.SampledFrom(q.Units()).Draw(t, "unit")
		v := rapid.Float64Range(-1e6, 1e6).Draw(t, "value")
		if got := u.ToSI(u.FromSI(v)); math.Abs(got-v) > 1e-9*math.Max(math.Abs(v), math.Abs(u.Offset)+1e-9) {
			t.Fatalf("%s %s: %v came back as %v", q.Name(), u.Symbol, v, got)
		}
	})
}

func TestEveryQuantityIsDescribed(t *testing.T) {
	for q := range quantities {
		if table[q].name == "" || len(q.Units()) == 0 {
			t.Errorf("quantity %d has no row", q)
		}
		for _, s := range Systems {
			if s.Unit(q).Scale <= 0 {
				t.Errorf("%s in %s: scale %v", q.Name(), s, s.Unit(q).Scale)
			}
		}
	}
}

func ExampleSystem_Format() {
	show := func(s string) { fmt.Println(strings.NewReplacer("\u00a0", "_", "\u202f", "'").Replace(s)) }
	show(Metric.Format(Speed, 51.44))
	show(Aviation.Format(Speed, 51.44))
	show(Metric.Format(Altitude, 12345.6))
	show(Metric.Format(Force, -31.4))
	show(Metric.Format(Force, -0.2))
	show(Metric.Format(Force, -0.0002))
	show(Aviation.Format(Mass, 2.64))
	fmt.Println(Metric.Number(Coefficient, 0.0335), Metric.Entry(Power, 72e3))
	// Output:
	// 51.4_m/s
	// 100.0_kt
	// 12'346_m
	// −31_N
	// −0.20_N
	// 0_N
	// 5.8_lb
	// 0.0335 72
}

// TestFind: the exact sign wins over one that differs in case, and a sign of another quantity is none.
func TestFind(t *testing.T) {
	for _, c := range []struct {
		q            Quantity
		text, symbol string
		ok           bool
	}{
		{Rotation, "1/min", "rpm", true}, {Rotation, "U/min", "rpm", true}, {Rotation, "RPM", "rpm", true}, {Power, "KW", "kW", true}, {Power, "w", "W", true},
		{Fraction, "%", "%", true}, {Fraction, "fraction", "fraction", true}, {Coefficient, "", "", true}, {Speed, "rpm", "", false}, {Power, "", "", false},
		{Consumption, "lb/hp/hr", "lb/hp·h", true}, {Consumption, "g/kW·h", "g/kWh", true},
	} {
		u, ok := c.q.Find(c.text)
		if ok != c.ok || u.Symbol != c.symbol {
			t.Errorf("%s %q: %q, %v", c.q.Name(), c.text, u.Symbol, ok)
		}
	}
}
