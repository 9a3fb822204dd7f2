package input_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

var wing = input.Spec{Name: "wing", Label: "Wing area", Quantity: units.Area, Min: 0.02, Max: 500}

func TestBand(t *testing.T) {
	n := &input.Number{Spec: &wing, Value: new(12.0)}
	for _, test := range []struct {
		text string
		sys  units.System
		want float64
		err  error
	}{
		{"0.5", units.Metric, 0.5, nil},
		{"0,5 m²", units.Aviation, 0.5, nil},
		{"5 %", units.Metric, 0.6, nil},
		{"5%", units.Aviation, 0.6, nil},
		{"10 ft²", units.Metric, 10 * 0.3048 * 0.3048, nil},
		{"0", units.Metric, 0, nil},
		{"", units.Metric, 0, input.ErrRequired},
		{"-1", units.Metric, 0, input.ErrRange},
		{"1000", units.Metric, 0, input.ErrRange},
		{"5 kg", units.Metric, 0, input.ErrUnit},
		{"-5 %", units.Metric, 0, input.ErrRange},
		{"little", units.Metric, 0, input.ErrSyntax},
	} {
		got, err := n.ParseBand(test.text, 12, test.sys)
		if !errors.Is(err, test.err) || err == nil && math.Abs(got-test.want) > 1e-12 {
			t.Errorf("%q in %s: %v, %v; want %v, %v", test.text, test.sys, got, err, test.want, test.err)
		}
	}
	share := input.Spec{Name: "loss", Label: "Loss", Quantity: units.Fraction, Min: 0, Max: 0.5}
	if got, err := (&input.Number{Spec: &share, Value: new(0.03)}).ParseBand("1 %", 0.03, units.Metric); err != nil || got != 0.01 {
		t.Errorf("1 %% of a share is %v, %v; want one hundredth", got, err)
	}
}

func TestCutBand(t *testing.T) {
	for text, want := range map[string][2]string{
		"12 ± 0.5": {"12", "0.5"}, "12±5%": {"12", "5%"}, "12 +/- 0.5 m²": {"12", "0.5 m²"}, "12 +- 1": {"12", "1"}, "12": {"12", ""}, "−3 ± 1": {"−3", "1"}, "12 ±": {"12", ""},
	} {
		value, band, stated := input.CutBand(text)
		if value != want[0] || band != want[1] || stated != (len(text) > 3) {
			t.Errorf("%q: %q, %q, %v", text, value, band, stated)
		}
	}
}

// What a field shows can be sent back and means the same, to the seven digits shown.
func TestBandRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		sys := rapid.SampledFrom(units.Systems).Draw(t, "system")
		value, band := rapid.Float64Range(0.02, 500).Draw(t, "value"), rapid.Float64Range(1e-4, 100).Draw(t, "band")
		n := &input.Number{Spec: &wing, Value: &value}
		shown, width, stated := input.CutBand(n.WithBand(sys, value, band))
		v, err := n.Parse(shown, sys)
		if err != nil || !stated || math.Abs(v-value) > 1e-6*value {
			t.Fatalf("%v %v %v", v, err, stated)
		}
		b, err := n.ParseBand(width, v, sys)
		if err != nil || math.Abs(b-band) > 1e-6*band {
			t.Fatalf("%v %v, want %v", b, err, band)
		}
	})
}
