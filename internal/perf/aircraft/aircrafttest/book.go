// Package aircrafttest gives tests aircraft whose performance is published or
// has a closed form. Its powerplants have neither piston nor propeller: a test
// that flies them also shows that what it tests assumes neither. It is test
// support, and no package of the program may import it.
package aircrafttest

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/reference"
	"legwright/internal/perf/units"
)

// Model lets a Spec carry any powerplant.
type Model struct {
	powerplant.Model // nil; supplies what only the powerplant package can
	Plant            powerplant.Powerplant
	Aboard           powerplant.Stores
}

// Build returns the powerplant given.
func (m *Model) Build() (powerplant.Powerplant, error) { return m.Plant, nil }

// Stores is the energy given.
func (m *Model) Stores() powerplant.Stores { return m.Aboard }

// InstalledMass is counted in the empty mass.
func (m *Model) InstalledMass() float64 { return 0 }

// Weighs lists nothing.
func (m *Model) Weighs() []string { return nil }

// A Book is a published aeroplane.
type Book struct {
	Spec  aircraft.Spec
	Model *Model
	Mass  float64 // gross, in kg
	Row   reference.Row
}

// Read returns an aeroplane of anderson_aircraft.csv by its name.
func Read(t testing.TB, name string) *Book {
	t.Helper()
	for _, row := range reference.Read(t, "anderson_aircraft") {
		if row.Text("name") == name {
			return newBook(row)
		}
	}
	t.Fatalf("no aeroplane named %s", name)
	return nil
}

func newBook(r reference.Row) *Book {
	b := &Book{Row: r, Mass: r.SI("weight") / atmos.Gravity, Model: &Model{}}
	span, area := r.SI("span"), r.SI("area")
	aspect := span * span / area
	f := &b.Spec.Airframe
	if r.Has("e") {
		f.Efficiency = r.Num("e")
	} else {
		f.Efficiency = 1 / (math.Pi * aspect * r.Num("k"))
	}
	f.WingArea, f.Span, f.WingHeight, f.DragGiven, f.CDMin, f.NeverExceed = area, span, 1.8, aircraft.ByParabola, r.Num("cd0"), 250
	for _, c := range []struct {
		column string
		into   *aircraft.Configuration
	}{{"cl_max", &f.Clean}, {"cl_max_take_off", &f.TakeOff}, {"cl_max_landing", &f.Landing}} {
		c.into.LiftGiven, c.into.CLMax = aircraft.ByCLMax, r.Num("cl_max")
		if r.Has(c.column) {
			c.into.CLMax = r.Num(c.column)
		}
	}
	fuel := r.SI("fuel") / atmos.Gravity
	b.Model.Aboard = powerplant.Stores{Fuel: fuel, Capacity: fuel}
	if r.Has("power") {
		b.Model.Plant = Propulsive{r.SI("power"), r.Num("efficiency"), r.SI("consumption")}
	} else {
		b.Model.Plant = Jet{r.SI("thrust"), r.Num("hourly") / 3600 / atmos.Gravity}
	}
	b.Spec.Weights = aircraft.Weights{Empty: b.Mass - fuel, MaxTakeOff: b.Mass, ZeroFuelGiven: aircraft.NoZeroFuel}
	b.Spec.Limits = loads.Unentered()
	b.Spec.Powerplant = powerplant.Spec{Kind: "test", Model: b.Model}
	return b
}

// Build assembles the aeroplane.
func (b *Book) Build(t testing.TB) *aircraft.Aircraft {
	t.Helper()
	a, err := b.Spec.Build()
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// Air is standard air at the pressure altitude hp in m.
func Air(t testing.TB, hp float64) atmos.Air {
	t.Helper()
	a, err := atmos.Day{}.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// AirOf is standard air at hp in m with a book's density in kg/m³ instead of ours.
func AirOf(t testing.TB, hp, density float64) atmos.Air {
	t.Helper()
	a := Air(t, hp)
	a.Density, a.DryDensity = density, density
	return a
}

// Feet is an altitude or a length given in feet, in m.
func Feet(n float64) float64 { return units.Aviation.Unit(units.Altitude).ToSI(n) }
