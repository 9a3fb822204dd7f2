package powerplant_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

func tank(change func(*powerplant.FuelTank)) *powerplant.PistonPropeller {
	return piston(func(p *powerplant.PistonPropeller) { change(&p.Fuel) })
}

// Limits of the density at 15 °C in kg/m³, from memory: EN 228, ASTM D1655, EN 590.
// ASTM D910 has none; 0.72 kg/L for aviation gasoline is common practice.
func TestFuelKinds(t *testing.T) {
	for _, c := range []struct {
		kind      string
		low, high float64
	}{{"avgas-100ll", 715, 725}, {"mogas-en228", 720, 775}, {"jet-a1", 775, 840}, {"diesel-en590", 820, 845}, {"two-stroke-mix", 740, 760}} {
		m := tank(func(f *powerplant.FuelTank) { f.Kind, f.Unusable, f.Density = c.kind, 0, 650 })
		if _, err := m.Build(); err != nil {
			t.Errorf("%s: %v", c.kind, err)
		}
		if d := m.Stores().Fuel / m.Fuel.Volume; d < c.low || d > c.high {
			t.Errorf("%s: %v kg/m³, want %v to %v", c.kind, d, c.low, c.high)
		}
	}
	own := tank(func(f *powerplant.FuelTank) { f.Kind, f.Unusable, f.Density = powerplant.OwnFuel, 0, 650 })
	if d := own.Stores().Fuel / own.Fuel.Volume; math.Abs(d-650) > 1e-9 {
		t.Errorf("own density: %v", d)
	}
	for _, e := range input.Walk(tank(func(f *powerplant.FuelTank) { f.Kind = "rum" })) {
		if e.Path == "fuel.kind" && !errors.Is(e.Check(), input.ErrChoice) {
			t.Errorf("rum is accepted: %v", e.Check())
		}
	}
}

func TestFuelByMass(t *testing.T) {
	// 60 kg of 720 kg/m³ are 83.33 L; 2 L of it, 1.44 kg, are unusable, and the tank holds 98 L that can be used.
	m := tank(func(f *powerplant.FuelTank) { f.FuelGiven, f.Mass = powerplant.ByMass, 60 })
	s := m.Stores()
	if math.Abs(s.Fuel-58.56) > 1e-9 || math.Abs(s.Trapped-1.44) > 1e-9 || math.Abs(s.Capacity-70.56) > 1e-9 {
		t.Errorf("%+v", s)
	}
	m.Fuel.Mass = 72.1
	_, err := m.Build()
	list := input.Errors(err)
	if len(list) != 1 || list[0].Path != "fuel.mass" || !errors.Is(err, input.ErrConflict) || !strings.Contains(spaced(err), "72.0 kg, which is 100.0 L") {
		t.Errorf("72.1 kg in 100 L of 720 kg/m³: %v", err)
	}
	// The same mass of a denser fuel fits.
	m.Fuel.Kind = "jet-a1"
	if _, err := m.Build(); err != nil {
		t.Errorf("of jet fuel: %v", err)
	}
}

// Giving the fuel in the other way changes nothing aboard, however full the tank is, and there and back is where it was.
func TestFuelConverts(t *testing.T) {
	kinds := []string{"avgas-100ll", "mogas-en228", "jet-a1", "diesel-en590", "two-stroke-mix", powerplant.OwnFuel}
	rapid.Check(t, func(t *rapid.T) {
		capacity := rapid.Float64Range(1e-5, 20).Draw(t, "capacity")
		m := tank(func(f *powerplant.FuelTank) {
			*f = powerplant.FuelTank{Kind: rapid.SampledFrom(kinds).Draw(t, "kind"), FuelGiven: powerplant.ByVolume, Capacity: capacity,
				Volume: capacity * rapid.SampledFrom([]float64{0, 1e-6, 0.3, 1}).Draw(t, "share"), Unusable: 0.02 * capacity, Density: rapid.Float64Range(600, 900).Draw(t, "density")}
		})
		before := m.Stores()
		for _, way := range [2][2]string{{powerplant.ByVolume, powerplant.ByMass}, {powerplant.ByMass, powerplant.ByVolume}} {
			m.Fuel.FuelGiven = way[1]
			input.Convert(m, "fuel.fuel_given", way[0])
			if _, err := m.Build(); err != nil {
				t.Fatalf("by %s: %v", way[1], err)
			}
			if after := m.Stores(); math.Abs(after.Fuel-before.Fuel) > 1e-12*(1+before.Fuel) || math.Abs(after.Trapped-before.Trapped) > 1e-12*(1+before.Trapped) {
				t.Fatalf("by %s: %+v, before %+v", way[1], after, before)
			}
		}
		if m.Fuel.Kind == powerplant.OwnFuel {
			return
		}
		from := m.Fuel.Kind
		m.Fuel.Kind = powerplant.OwnFuel
		input.Convert(m, "fuel.kind", from)
		if after := m.Stores(); math.Abs(after.Fuel-before.Fuel) > 1e-12*(1+before.Fuel) {
			t.Fatalf("density of %s taken over: %+v, before %+v", from, after, before)
		}
	})
}

// What is said beside a field is the same number in the other measure.
func TestFuelWords(t *testing.T) {
	words := func(m *powerplant.PistonPropeller, path string) string {
		e, ok := input.Find(m, path)
		if !ok {
			t.Fatalf("no input %s", path)
		}
		return strings.NewReplacer("\u00a0", " ").Replace(e.Means.In(units.Metric))
	}
	m := tank(func(f *powerplant.FuelTank) { f.Volume = 0.088 })
	for path, want := range map[string]string{"fuel.volume": "88.0 L = 63.4 kg", "fuel.capacity": "100.0 L = 72.0 kg", "fuel.unusable": "2.0 L = 1.4 kg"} {
		if got := words(m, path); got != want {
			t.Errorf("%s says %q, want %q", path, got, want)
		}
	}
	if got := words(m, "fuel.kind"); !strings.HasPrefix(got, "720 kg/m³ at 15 °C") {
		t.Errorf("the kind says %q", got)
	}
	m.Fuel.FuelGiven, m.Fuel.Mass = powerplant.ByMass, 36
	if got := words(m, "fuel.mass"); got != "36.0 kg = 50.0 L" {
		t.Errorf("the mass says %q", got)
	}
	for _, density := range []float64{0, math.NaN()} {
		m.Fuel.Kind, m.Fuel.Density = powerplant.OwnFuel, density
		for _, path := range []string{"fuel.mass", "fuel.capacity", "fuel.kind"} {
			if got := words(m, path); got != "" {
				t.Errorf("with the density %v %s says %q", density, path, got)
			}
		}
	}
}
