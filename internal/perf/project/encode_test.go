package project

import (
	"bytes"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"pgregory.net/rapid"
)

func TestDecodeReturnsWhatWasEncoded(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := shuffled(t)
		text := encoded(t, s)
		back, err := Decode(text)
		if err != nil {
			t.Fatalf("Decode: %v", err)
		}
		if !reflect.DeepEqual(s, back) || !slices.Equal(bits(s), bits(back)) {
			t.Fatalf("document changed on its way:\n%s", text)
		}
		if again := encoded(t, back); !bytes.Equal(text, again) {
			t.Fatalf("encoded differently:\n%s\n%s", text, again)
		}
	})
}

func TestEncodeKeepsTheSmallestDifferences(t *testing.T) {
	s := Demo()
	s.Name = "A & B <é>"
	s.Legs[0].HeadWind = math.Copysign(0, -1) // idle, but kept
	s.Legs[1].HeadWind = math.SmallestNonzeroFloat64
	s.Day.QNH = math.Nextafter(101325, 0)
	s.Legs[2].Time = math.MaxFloat64
	text := encoded(t, s)
	if !bytes.Contains(text, []byte(s.Name)) {
		t.Errorf("name is not readable in the text")
	}
	back, err := Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(s, back) || !slices.Equal(bits(s), bits(back)) {
		t.Errorf("document changed on its way")
	}
}

func TestEncodeWritesNoNull(t *testing.T) {
	s := New("x")
	s.Legs, s.Requirements, s.Variants[0].Basis, s.Variants[0].Aircraft.Weights.Items = nil, nil, nil, nil
	s.Variants[0].Aircraft.Airframe.Polar = nil
	s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Engine.PowerCurve = nil
	text := encoded(t, s)
	if bytes.Contains(text, []byte("null")) {
		t.Errorf("null in\n%s", text)
	}
	if s.Legs != nil {
		t.Errorf("Encode changed its document")
	}
	if _, err := Decode(text); err != nil {
		t.Error(err)
	}
}

// Encode must not write what nobody could read back.
func TestEncodeRefusesWhatDecodeCannotRead(t *testing.T) {
	for name, test := range map[string]struct {
		change func(s *Spec)
		path   string
	}{
		"NaN":         {func(s *Spec) { s.Day.QNH = math.NaN() }, "day.qnh"},
		"infinity":    {func(s *Spec) { s.Variants[0].Aircraft.Airframe.Polar[1][1] = math.Inf(1) }, "variants[0].aircraft.airframe.polar"},
		"basis":       {func(s *Spec) { s.Variants[0].Basis["x"] = Basis{PlusMinus: math.NaN()} }, "variants[0].basis.x.plus_minus"},
		"deep NaN":    {func(s *Spec) { piston(s).Fuel.Density = math.NaN() }, "variants[0].aircraft.powerplant.values.fuel.density"},
		"not UTF-8":   {func(s *Spec) { s.Legs[0].Name = "a\xffb" }, "legs[0].name"},
		"no model":    {func(s *Spec) { s.Variants[0].Aircraft.Powerplant = powerplant.Spec{} }, "variants[0].aircraft.powerplant.kind"},
		"many legs":   {func(s *Spec) { s.Legs = make([]mission.Leg, 201) }, "legs"},
		"other kind":  {func(s *Spec) { s.Variants[0].Aircraft.Powerplant.Kind = "rubber" }, "variants[0].aircraft.powerplant.kind"},
		"huge a text": {func(s *Spec) { s.Note = strings.Repeat("x", MaxBytes) }, ""},
	} {
		s := Demo()
		test.change(s)
		text, err := s.Encode()
		if got := paths(err); len(got) != 1 || got[0] != test.path || text != nil {
			t.Errorf("%s: got %v, want an error at %q", name, err, test.path)
		}
		if len(input.Errors(err)) == 0 {
			t.Errorf("%s: not an input error", name)
		}
	}
}

func piston(s *Spec) *powerplant.PistonPropeller {
	return s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller)
}
