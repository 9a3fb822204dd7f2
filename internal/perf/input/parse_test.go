package input_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// wide accepts nearly anything of the quantity q.
func wide(q units.Quantity) *input.Spec {
	return &input.Spec{Name: "x", Label: "Thing", Quantity: q, Min: -1e9, Max: 1e9}
}

func TestParse(t *testing.T) {
	const lb, hp, foot, inch = 0.45359237, 745.69987158227022, 0.3048, 0.0254
	for _, c := range []struct {
		q    units.Quantity
		sys  units.System
		text string
		want float64
	}{
		{units.Power, units.Metric, "180 hp", 180 * hp}, {units.Power, units.Metric, "72", 72e3}, {units.Power, units.Aviation, "180", 180 * hp},
		{units.Power, units.Aviation, "72kW", 72e3}, {units.Power, units.Aviation, "100 PS", 73549.875}, {units.Power, units.Small, "350", 350}, {units.Power, units.Metric, "100 HP", 100 * hp},
		{units.Mass, units.Metric, "13 lb 11 oz", 13.6875 * lb}, {units.Mass, units.Aviation, "13lb 11oz", 13.6875 * lb}, {units.Length, units.Metric, "5 ft 10 in", 70 * inch},
		{units.Length, units.Metric, "5 feet 10.5 inches", 70.5 * inch}, {units.Length, units.Metric, "-5 ft 10 in", -70 * inch}, {units.Length, units.Metric, "−0 ft 6 in", -6 * inch},
		{units.Volume, units.Metric, "6,5 L", 6.5e-3}, {units.Volume, units.Aviation, "24", 24 * 231 * inch * inch * inch}, {units.Volume, units.Metric, "24 us gal", 24 * 231 * inch * inch * inch},
		{units.Altitude, units.Metric, "1 200", 1200}, {units.Altitude, units.Metric, "1\u2009200 m", 1200}, {units.Altitude, units.Aviation, "12'500 ft", 12500 * foot},
		{units.Altitude, units.Metric, "12\u00a0500\u00a0ft", 12500 * foot}, {units.Altitude, units.Metric, "1,234.5", 1234.5}, {units.Altitude, units.Metric, "1,234,567", 1234567},
		{units.Altitude, units.Metric, "−3", -3}, {units.Altitude, units.Metric, "–3", -3}, {units.Altitude, units.Metric, "+3", 3}, {units.Altitude, units.Metric, "  3  ", 3},
		{units.Coefficient, units.Metric, "0,034", 0.034}, {units.Coefficient, units.Metric, ".034", 0.034}, {units.Coefficient, units.Metric, ",5", 0.5}, {units.Coefficient, units.Metric, "3.4e-2", 0.034},
		{units.Coefficient, units.Metric, "-0,125", -0.125}, {units.Coefficient, units.Metric, "1.", 1}, {units.Coefficient, units.Metric, "1,23", 1.23}, {units.Coefficient, units.Metric, "1,2345", 1.2345},
		{units.Fraction, units.Metric, "75", 0.75}, {units.Fraction, units.Metric, "75 %", 0.75}, {units.Fraction, units.Metric, "75%", 0.75},
		{units.Temperature, units.Metric, "15", 288.15}, {units.Temperature, units.Aviation, "59 °F", 288.15}, {units.Temperature, units.Metric, "-40 F", 233.15}, {units.Temperature, units.Metric, "288.15 K", 288.15},
		{units.TemperatureStep, units.Metric, "18 °F", 10}, {units.Pressure, units.Metric, "29.92126 inHg", 101325.03}, {units.Pressure, units.Aviation, "1013.25 hPa", 101325},
		{units.Rotation, units.Metric, "2700", 45}, {units.Rotation, units.Metric, "2700 1/min", 45}, {units.Area, units.Aviation, "12 m2", 12}, {units.Consumption, units.Metric, "0.45 lb/hp/h", 0.45 * lb / (hp * 3600)},
		{units.Speed, units.Metric, "100 kts", 100 * 1852 / 3600.0}, {units.Speed, units.Metric, "100 Knots", 100 * 1852 / 3600.0}, {units.Duration, units.Metric, "1 h 30 min", 5400}, {units.Angle, units.Metric, "30°", math.Pi / 6},
	} {
		got, err := wide(c.q).Parse(c.text, c.sys)
		if err != nil || math.Abs(got-c.want) > 1e-7*math.Abs(c.want) {
			t.Errorf("%s in %s, %q: %v, %v; want %v", c.q.Name(), c.sys, c.text, got, err, c.want)
		}
	}
}

func TestParseRefuses(t *testing.T) {
	for _, c := range []struct {
		q    units.Quantity
		text string
		kind error
		says string
	}{
		{units.Altitude, "", input.ErrRequired, "a value is required"}, {units.Altitude, " \u00a0 ", input.ErrRequired, "a value is required"},
		{units.Altitude, "1,234", input.ErrAmbiguous, "write 1.234 or 1234"}, {units.Altitude, "-1,234 ft", input.ErrAmbiguous, "write -1.234 or -1234"},
		{units.Altitude, "1e400", input.ErrSyntax, "“1e400” is not understood"}, {units.Altitude, "NaN", input.ErrSyntax, "“NaN” is not understood"}, {units.Altitude, "Inf", input.ErrSyntax, "not understood"},
		{units.Altitude, "1e308 km", input.ErrSyntax, "not understood"}, {units.Altitude, "-1e308 km", input.ErrSyntax, "not understood"}, {units.Altitude, "high", input.ErrSyntax, "“high”"},
		{units.Altitude, "1.2.3", input.ErrSyntax, ""}, {units.Altitude, "1.234,5", input.ErrSyntax, ""}, {units.Altitude, "1,2,3", input.ErrSyntax, ""}, {units.Altitude, "--3", input.ErrSyntax, ""},
		{units.Altitude, "3 furlongs", input.ErrUnit, "units accepted: m, ft, km"}, {units.Altitude, "3 kg", input.ErrUnit, "units accepted: m, ft, km"}, {units.Power, "180 lbf", input.ErrUnit, "hp"},
		{units.Altitude, "0x10", input.ErrUnit, ""}, {units.Altitude, "12 34", input.ErrUnit, ""}, {units.Coefficient, "3 m", input.ErrUnit, "none"}, {units.Altitude, "1_000", input.ErrUnit, ""},
		{units.Length, "5 ft 10", input.ErrSyntax, ""}, {units.Length, "5 ft -10 in", input.ErrUnit, ""}, {units.Temperature, "10 °C 5 °F", input.ErrSyntax, ""},
	} {
		got, err := wide(c.q).Parse(c.text, units.Metric)
		var e *input.Error
		if !errors.As(err, &e) || !errors.Is(err, c.kind) || got != 0 || e.Path != "x" {
			t.Errorf("%s, %q: %v, %v; want %v", c.q.Name(), c.text, got, err, c.kind)
			continue
		}
		if says := e.Sentence(units.Metric); !strings.Contains(says, c.says) || strings.Contains(says, "%!") {
			t.Errorf("%q: %q does not say %q", c.text, says, c.says)
		}
	}
}

// TestNumberParse also checks the range, and leaves the bound variable alone.
func TestNumberParse(t *testing.T) {
	v := 7.0
	n := input.Number{Spec: &input.Spec{Name: "tas", Label: "True airspeed", Quantity: units.Speed, Min: 5, Max: 340}, Value: &v}
	if got, err := n.Parse("100 kt", units.Metric); err != nil || math.Abs(got-51.4444) > 1e-3 || v != 7 {
		t.Errorf("%v, %v; the variable became %v", got, err, v)
	}
	_, err := n.Parse("400", units.Metric)
	var e *input.Error
	if !errors.As(err, &e) || !errors.Is(err, input.ErrRange) || e.Value != 400 {
		t.Fatalf("%v", err)
	}
	for sys, want := range map[units.System]string{units.Metric: "true airspeed must be 5 to 340 m/s; got 400 m/s", units.Aviation: "true airspeed must be 9.72 to 660.9 kt; got 777.538 kt"} {
		if got := e.Sentence(sys); got != want {
			t.Errorf("in %s: %q, want %q", sys, got, want)
		}
	}
}

// TestEntryIsReadBack: what a field shows, typed back, is the value to seven digits.
func TestEntryIsReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		q := rapid.SampledFrom(units.Quantities()).Draw(t, "quantity")
		sys := rapid.SampledFrom(units.Systems).Draw(t, "system")
		shown := rapid.Float64Range(-1e9, 1e9).Draw(t, "shown")
		text := sys.Entry(q, sys.Unit(q).ToSI(shown))
		got, err := wide(q).Parse(text, sys)
		if err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		// Through the zero of a temperature scale the seven digits are of the written number.
		if back := sys.Unit(q).FromSI(got); math.Abs(back-shown) > 6e-7*math.Abs(shown)+1e-9 {
			t.Fatalf("%v shown as %q, read as %v", shown, text, back)
		}
	})
}

func FuzzParse(f *testing.F) {
	for _, s := range []string{"180 hp", "13 lb 11 oz", "5 ft 10 in", "6,5 L", "1,234", "1 200", "−3", "1e400", "NaN", "", "3 m", "1e308 km", "5'10\"", "１２", "1 ,", "+.e5", "0,", "1'234'567.8e-3 ft", "9223372036854775808 1 1 1"} {
		for q := range units.Quantities() {
			f.Add(s, byte(q), byte(q))
		}
	}
	quantities := units.Quantities()
	f.Fuzz(func(t *testing.T, text string, q, system byte) {
		sys := units.Systems[int(system)%len(units.Systems)]
		spec := &input.Spec{Name: "x", Label: "Thing", Quantity: quantities[int(q)%len(quantities)], Min: -1e6, Max: 1e6}
		var held float64
		v, err := input.Num(spec, &held).Number.Parse(text, sys)
		var e *input.Error
		switch {
		case err == nil && !(v >= spec.Min && v <= spec.Max):
			t.Errorf("%q accepted as %v", text, v)
		case err != nil && !errors.As(err, &e):
			t.Errorf("%q: %T", text, err)
		case err != nil && e.Sentence(sys) == "":
			t.Errorf("%q: no sentence", text)
		}
		if math.IsNaN(v) || held != 0 {
			t.Errorf("%q: %v, variable %v", text, v, held)
		}
	})
}

// TestTake: a number written in a unit is converted to the last bit, unless only rounding puts it outside a bound.
func TestTake(t *testing.T) {
	s := &input.Spec{Name: "power", Label: "Power", Quantity: units.Power, Min: 100, Max: 3e6}
	hp, _ := units.Power.Find("hp")
	kW, _ := units.Power.Find("kW")
	for _, c := range []struct {
		written float64
		u       units.Unit
		want    float64
		ok      bool
	}{
		{80, hp, 80 * 745.69987158227022, true}, // 550 ft·lbf/s
		{3000, kW, 3e6, true}, {3000.0001, kW, 3e6, true}, {3000.01, kW, 3000010, false}, {0.1, kW, 100, true}, {-1, kW, -1000, false},
		{math.NaN(), kW, 0, false}, {math.Inf(1), kW, 0, false},
	} {
		got, err := s.Take(c.written, c.u)
		if (err == nil) != c.ok || c.ok && math.Abs(got-c.want) > 1e-15*c.want {
			t.Errorf("%v %s: %v, %v", c.written, c.u.Symbol, got, err)
		}
	}
	if got, err := s.Take(2999.9999, kW); err != nil || got != 2999999.9 {
		t.Errorf("a value inside is moved to the bound: %v, %v", got, err)
	}
}
