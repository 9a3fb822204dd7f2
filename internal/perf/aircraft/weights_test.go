package aircraft_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
)

// Growth is a share of all that is empty, the powerplant included, and of nothing else.
func TestGrowth(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := sample()
		s.Weights.Growth = rapid.Float64Range(0, 0.5).Draw(t, "growth")
		a, err := s.Build()
		if err != nil {
			t.Fatal(err)
		}
		s.Weights.Growth = 0
		bare, err := s.Build()
		if err != nil {
			t.Fatal(err)
		}
		want := (290 + s.Powerplant.Model.InstalledMass()) * (a.Growth() / bare.EmptyMass())
		if a.EmptyMass() != bare.EmptyMass() || math.Abs(a.Growth()-want) > 1e-9 || bare.Growth() != 0 {
			t.Fatalf("empty %v, growth %v, want %v", a.EmptyMass(), a.Growth(), want)
		}
		for name, d := range map[string]float64{"without fuel": a.DryMass() - bare.DryMass(), "at the start": a.StartMass() - bare.StartMass()} {
			if math.Abs(d-a.Growth()) > 1e-9 {
				t.Errorf("%s it is %v heavier, want %v", name, d, a.Growth())
			}
		}
	})
	s := sample()
	s.Weights.Growth = 0.04
	if a, err := s.Build(); err != nil || math.Abs(a.Growth()-0.04*385) > 1e-9 {
		t.Errorf("4 %% of 290 + 95 kg is %v, %v", a.Growth(), err)
	}
	for _, g := range []float64{-0.01, 0.51, math.NaN()} {
		s.Weights.Growth = g
		if _, err := s.Build(); !errors.Is(err, input.ErrRange) {
			t.Errorf("a growth of %v: %v", g, err)
		}
	}
}

func TestZeroFuelLimit(t *testing.T) {
	s := sample()
	if a, err := s.Build(); err != nil {
		t.Fatal(err)
	} else if _, limited := a.MaxZeroFuel(); limited {
		t.Error("limited without a limit")
	}
	// A limit that was never given begins at the greatest take-off mass.
	s.Weights.ZeroFuelGiven = aircraft.ByZeroFuel
	if _, err := s.Build(); !errors.Is(err, input.ErrRange) {
		t.Errorf("a limit of 0 kg: %v", err)
	}
	input.Convert(s, "weights.zero_fuel_given", aircraft.NoZeroFuel)
	a, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	if m, limited := a.MaxZeroFuel(); !limited || m != 650 {
		t.Errorf("%v, %v", m, limited)
	}
	// One that was given before comes back.
	s.Weights.MaxZeroFuel = 600
	input.Convert(s, "weights.zero_fuel_given", aircraft.NoZeroFuel)
	if s.Weights.MaxZeroFuel != 600 {
		t.Errorf("became %v", s.Weights.MaxZeroFuel)
	}
}
