package units

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestFixed(t *testing.T) {
	for _, c := range []struct {
		v        float64
		decimals int
		want     string
	}{
		{0, 0, "0"}, {-0.04, 1, "0.0"}, {-0.05001, 1, "−0.1"}, {1234, 0, "1234"}, {12345, 0, "12\u202f345"},
		{-1234567.8, 1, "−1\u202f234\u202f567.8"}, {999.96, 1, "1000.0"}, {99999.96, 1, "100\u202f000.0"},
	} {
		if got := Fixed(c.v, c.decimals); got != c.want {
			t.Errorf("Fixed(%v, %d) = %q, want %q", c.v, c.decimals, got, c.want)
		}
	}
}

func TestPlain(t *testing.T) {
	for _, c := range []struct {
		v    float64
		want string
	}{
		{0, "0"}, {math.Copysign(0, -1), "0"}, {72, "72"}, {0.1 + 0.2, "0.3"}, {1234567.8, "1234568"}, {-9.80665, "-9.80665"},
		{8.1e-8, "8.1e-08"}, {2e-6, "0.000002"}, {3e13, "3e+13"}, {262.467191601, "262.4672"},
	} {
		if got := Plain(c.v); got != c.want {
			t.Errorf("Plain(%v) = %q, want %q", c.v, got, c.want)
		}
	}
}

// TestPlainKeepsSevenDigits: what Plain writes is read back to half a unit of the seventh digit.
func TestPlainKeepsSevenDigits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(-1e15, 1e15).Draw(t, "v")
		back, err := strconv.ParseFloat(Plain(v), 64)
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(back-v) > 5.0001e-7*math.Abs(v) {
			t.Fatalf("%v came back as %v", v, back)
		}
	})
}

func TestFormat(t *testing.T) {
	for _, c := range []struct {
		s    System
		q    Quantity
		si   float64
		want string
	}{
		{Aviation, Altitude, 3048, "10\u202f000\u00a0ft"}, {Small, Power, 350, "350\u00a0W"}, {Metric, Fraction, 0.755, "75.5\u00a0%"},
		{Aviation, Temperature, 288.15, "15.0\u00a0°C"}, {Aviation, TemperatureStep, 10, "10.0\u00a0°C"}, {Metric, Angle, math.Pi / 6, "30.0°"},
		{Metric, Coefficient, 1.5, "1.5"}, {Metric, Coefficient, 2, "2"}, {Metric, Coefficient, 0, "0"}, {Aviation, Pressure, 101325, "29.92\u00a0inHg"},
		{Aviation, Consumption, 0.45 * pound / (horsepower * hour), "0.450\u00a0lb/hp·h"}, {Metric, Duration, 5400, "90.0\u00a0min"},
	} {
		if got := c.s.Format(c.q, c.si); got != c.want {
			t.Errorf("%s %s %v: %q, want %q", c.s, c.q.Name(), c.si, got, c.want)
		}
	}
}

// TestNumberRounds: the number shown differs from the value by at most half of its last digit.
func TestNumberRounds(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := rapid.SampledFrom(Quantities()).Draw(t, "quantity")
		s := rapid.SampledFrom(Systems).Draw(t, "system")
		shown := rapid.Float64Range(-1e6, 1e6).Draw(t, "shown")
		text := s.Number(q, s.Unit(q).ToSI(shown))
		back, err := strconv.ParseFloat(strings.NewReplacer("\u202f", "", "−", "-").Replace(text), 64)
		if err != nil {
			t.Fatal(err)
		}
		if half := 0.5 * math.Pow(10, -float64(s.Decimals(q))); math.Abs(back-shown) > half+1e-9 {
			t.Fatalf("%s: %v shown as %q", q.Name(), shown, text)
		}
	})
}

func TestSystems(t *testing.T) {
	labels := map[string]bool{}
	for _, s := range Systems {
		if !s.Valid() {
			t.Errorf("%s is not valid", s)
		}
		labels[s.Label()] = true
	}
	if len(labels) != len(Systems) {
		t.Errorf("labels %v for %d systems", labels, len(Systems))
	}
	if System("imperial").Valid() {
		t.Error("an unknown system is valid")
	}
}
