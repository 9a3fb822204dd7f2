package units_test

import (
	"math"
	"strings"
	"testing"

	"legwright/internal/perf/reference"
	"legwright/internal/perf/units"
)

// unit finds a unit by the quantity's name and the symbol.
func unit(t *testing.T, name, symbol string) units.Unit {
	t.Helper()
	for _, q := range units.Quantities() {
		for _, u := range q.Units() {
			if q.Name() == name && u.Symbol == symbol {
				return u
			}
		}
	}
	t.Fatalf("no unit %s of %s", symbol, name)
	return units.Unit{}
}

func TestPublishedFactors(t *testing.T) {
	for _, row := range reference.Read(t, "units") {
		row.Near("si", unit(t, row.Text("quantity"), row.Text("unit")).ToSI(1))
	}
}

func TestUnitsOfTheTrade(t *testing.T) {
	for _, row := range reference.Read(t, "units_consumption") {
		q := row.Text("quantity")
		si := unit(t, q, row.Text("customary_unit")).ToSI(row.Num("customary"))
		row.Near("metric", unit(t, q, row.Text("metric_unit")).FromSI(si))
	}
}

// TestTemperatures has the fixed points of the scales, exact by definition.
func TestTemperatures(t *testing.T) {
	for _, c := range []struct {
		symbol           string
		written, degrees float64 // in the unit, in K
	}{
		{"°C", 0, 273.15}, {"°C", 15, 288.15}, {"°F", 32, 273.15}, {"°F", 212, 373.15}, {"°F", -40, 233.15}, {"K", 288.15, 288.15},
	} {
		u := unit(t, "temperature", c.symbol)
		if got := u.ToSI(c.written); math.Abs(got-c.degrees) > 1e-9 {
			t.Errorf("%g %s = %.9g K, want %g", c.written, c.symbol, got, c.degrees)
		}
		if got := u.FromSI(c.degrees); math.Abs(got-c.written) > 1e-9 {
			t.Errorf("%g K = %.9g %s, want %g", c.degrees, got, c.symbol, c.written)
		}
	}
	if got := unit(t, "temperature difference", "°F").ToSI(18); math.Abs(got-10) > 1e-12 {
		t.Errorf("a step of 18 °F = %g K, want 10", got)
	}
}

// TestNamesAreUnambiguous: within one quantity no symbol or alias, in either
// case, means two units of different size.
func TestNamesAreUnambiguous(t *testing.T) {
	for _, q := range units.Quantities() {
		seen := map[string]units.Unit{}
		for _, u := range q.Units() {
			for _, name := range append([]string{u.Symbol}, u.Aliases...) {
				key := strings.ToLower(name)
				if first, twice := seen[key]; twice && first.Symbol != u.Symbol {
					t.Errorf("%s: %q means %s and %s", q.Name(), name, first.Symbol, u.Symbol)
				}
				seen[key] = u
			}
		}
	}
}

// TestEverySystemUnitIsOffered: what a field shows can be typed back.
func TestEverySystemUnitIsOffered(t *testing.T) {
	for _, q := range units.Quantities() {
		for _, s := range units.Systems {
			if u := unit(t, q.Name(), s.Unit(q).Symbol); u.Scale != s.Unit(q).Scale {
				t.Errorf("%s: %s shows a unit that cannot be typed", q.Name(), s)
			}
		}
	}
}
