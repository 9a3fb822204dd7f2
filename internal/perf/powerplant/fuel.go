package powerplant

import (
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// How the fuel aboard is given. The names are stored.
const (
	ByVolume = "volume"
	ByMass   = "mass"
)

// OwnFuel is the kind of fuel whose density the user gives; the others are in fuels. The names are stored.
const OwnFuel = "own"

// A FuelTank is the fuel aboard.
type FuelTank struct {
	Kind      string  `json:"kind"`       // one of fuels, or OwnFuel
	FuelGiven string  `json:"fuel_given"` // ByVolume or ByMass
	Volume    float64 `json:"volume"`     // aboard at the start, in m³
	Mass      float64 `json:"mass"`       // aboard at the start, in kg
	Capacity  float64 `json:"capacity"`   // of the tanks, in m³
	Unusable  float64 `json:"unusable"`   // of the volume aboard, in m³
	Density   float64 `json:"density"`    // of OwnFuel, in kg/m³
}

// A fuel is a kind of fuel on offer. Its density is at 15 °C: where a standard
// sets limits the middle of them, and what is bought may differ by some per cent.
type fuel struct {
	name    string
	label   string
	density float64 // in kg/m³
	source  string  // of the density
}

// fuels lists the kinds of fuel with a density of their own.
//
// Sources, all from memory: ASTM D910 (aviation gasoline) limits no density;
// EN 228 (motor gasoline) 720 to 775 kg/m³; ASTM D1655 (Jet A-1) 775 to 840
// kg/m³; EN 590 (diesel fuel) 820 to 845 kg/m³; each at 15 °C. Two-stroke mix:
// fifty parts of that motor gasoline and one of oil of 870 kg/m³, common practice, no source.
var fuels = []fuel{
	{"avgas-100ll", "aviation gasoline 100LL", 720, "common practice, no source; ASTM D910 limits none"},
	{"mogas-en228", "motor gasoline, EN 228", 747.5, "the middle of EN 228, 720 to 775 kg/m³, from memory"},
	{"jet-a1", "Jet A-1", 807.5, "the middle of ASTM D1655, 775 to 840 kg/m³, from memory"},
	{"diesel-en590", "diesel fuel, EN 590", 832.5, "the middle of EN 590, 820 to 845 kg/m³, from memory"},
	{"two-stroke-mix", "two-stroke mix, 50 : 1", 749.9, "50 parts of EN 228's middle and one of oil of 870 kg/m³; common practice, no source"},
}

var (
	fuelVolume   = input.Spec{Name: "volume", Label: "Fuel aboard", Quantity: units.Volume, Min: 0, Max: 20}
	fuelMass     = input.Spec{Name: "mass", Label: "Fuel aboard", Quantity: units.Mass, Min: 0, Max: 18000}
	tankCapacity = input.Spec{Name: "capacity", Label: "Tank capacity", Quantity: units.Volume, Min: 1e-5, Max: 20}
	unusable     = input.Spec{Name: "unusable", Label: "Unusable fuel", Quantity: units.Volume, Min: 0, Max: 2}
	fuelDensity  = input.Spec{Name: "density", Label: "Fuel density", Quantity: units.Density, Min: 600, Max: 900, Note: "At the temperature at which it is filled in.",
		Typical: &input.Typical{Low: 710, High: 845, Source: "aviation gasoline from 710, diesel fuel (EN 590) to 845 kg/m³, from memory"}}
)

// Inputs describes the fuel.
func (t *FuelTank) Inputs() []input.Entry {
	kinds := make([]input.Option, 0, len(fuels)+1)
	for _, f := range fuels {
		kinds = append(kinds, input.Option{Value: f.name, Label: f.label})
	}
	kinds = append(kinds, input.Option{Value: OwnFuel, Label: "density given"})
	own, byMass := t.Kind == OwnFuel, t.FuelGiven == ByMass
	return []input.Entry{
		input.Pick("kind", "Fuel", &t.Kind, kinds...).Meaning(t.densityWords()),
		input.Num(&fuelDensity, &t.Density).If(own),
		input.Ways("fuel_given", "Fuel aboard given as", &t.FuelGiven, input.Option{Value: ByVolume, Label: "volume"}, input.Option{Value: ByMass, Label: "mass"}),
		input.Num(&fuelVolume, &t.Volume).If(!byMass).Meaning(t.aboardWords()),
		input.Num(&fuelMass, &t.Mass).If(byMass).Meaning(t.aboardWords()),
		input.Num(&tankCapacity, &t.Capacity).Meaning(t.sameMass(t.Capacity)),
		input.Num(&unusable, &t.Unusable).Meaning(t.sameMass(t.Unusable)),
	}
}

// fuelOf finds a kind of fuel by its stored name.
func fuelOf(name string) (fuel, bool) {
	for _, f := range fuels {
		if f.name == name {
			return f, true
		}
	}
	return fuel{}, false
}

// density of the fuel in kg/m³; 0 while the kind is none that is known.
func (t *FuelTank) density() float64 {
	if t.Kind == OwnFuel {
		return t.Density
	}
	f, _ := fuelOf(t.Kind)
	return f.density
}

// aboard is the volume aboard in m³.
func (t *FuelTank) aboard() float64 {
	if t.FuelGiven == ByMass {
		return t.Mass / t.density()
	}
	return t.Volume
}

// stores is the fuel as mass.
func (t *FuelTank) stores() Stores {
	volume, density := t.aboard(), t.density()
	return Stores{
		Fuel:     max(0, volume-t.Unusable) * density,
		Trapped:  min(volume, t.Unusable) * density,
		Capacity: max(0, t.Capacity-t.Unusable) * density,
	}
}

// check reports more fuel than the tanks hold, beyond what a change from mass to volume rounds.
func (t *FuelTank) check() error {
	const rounding = 1e-9
	switch {
	case t.FuelGiven == ByMass && t.Mass > t.Capacity*t.density()*(1+rounding):
		return &input.Error{Path: "mass", Spec: &fuelMass, Text: units.Metric.Format(units.Mass, t.Mass),
			Accepts: "the tanks hold " + units.Metric.Format(units.Mass, t.Capacity*t.density()) + ", which is " + units.Metric.Format(units.Volume, t.Capacity), Err: input.ErrConflict}
	case t.FuelGiven != ByMass && t.Volume > t.Capacity*(1+rounding):
		return &input.Error{Path: "volume", Spec: &fuelVolume, Text: units.Metric.Format(units.Volume, t.Volume),
			Accepts: "the tanks hold " + units.Metric.Format(units.Volume, t.Capacity), Err: input.ErrConflict}
	}
	return nil
}

// Convert keeps the fuel aboard the same when it is given in the other way, and
// the density when it is now given.
func (t *FuelTank) Convert(choice, from string) {
	switch density := t.density(); {
	case choice == "kind" && t.Kind == OwnFuel:
		if f, ok := fuelOf(from); ok {
			t.Density = f.density
		}
	case choice != "fuel_given" || from == t.FuelGiven || density <= 0:
	case t.FuelGiven == ByMass:
		t.Mass = t.Volume * density
	default:
		t.Volume = t.Mass / density
	}
}

// A Follow is an input that a Model has filled from another, because a choice now asks for it in place of that one.
type Follow struct {
	Path, From string  // relative to the model
	Rate       float64 // change of Path per change of From, in their SI units
	Note       string  // how it came about
}

// A Follower is a Model in which a choice may ask for the same thing in another way.
type Follower interface {
	// Follows tells what the choice at the path, relative to the model, has filled.
	Follows(choice string) (Follow, bool)
}

// What the notes of Follows say.
const (
	NoteFuelMass   = "from its volume and density"
	NoteFuelVolume = "from its mass and density"
)

// Follows tells that the fuel aboard was converted between volume and mass.
func (p *PistonPropeller) Follows(choice string) (Follow, bool) {
	density := p.Fuel.density()
	switch {
	case choice != "fuel.fuel_given" || density <= 0:
		return Follow{}, false
	case p.Fuel.FuelGiven == ByMass:
		return Follow{"fuel.mass", "fuel.volume", density, NoteFuelMass}, true
	}
	return Follow{"fuel.volume", "fuel.mass", 1 / density, NoteFuelVolume}, true
}

// densityWords says the density that the kind of fuel stands for and where it is from.
func (t *FuelTank) densityWords() units.Message {
	f, ok := fuelOf(t.Kind)
	if !ok {
		return units.Message{}
	}
	// A density of air has four decimals; this one needs none that it does not have.
	return units.Say("{} kg/m³ at 15 °C: {}", units.Text(units.Plain(f.density)), units.Text(f.source))
}

// aboardWords says the fuel aboard as volume and as mass.
func (t *FuelTank) aboardWords() units.Message {
	if t.FuelGiven != ByMass {
		return t.sameMass(t.Volume)
	}
	if !(t.density() > 0) || fuelMass.Check(t.Mass) != nil {
		return units.Message{}
	}
	return units.Say("{} = {}", units.Of(units.Mass, t.Mass), units.Of(units.Volume, t.aboard()))
}

// sameMass says what a volume of fuel in m³ weighs.
func (t *FuelTank) sameMass(volume float64) units.Message {
	if !(t.density() > 0) || tankCapacity.Check(volume) != nil {
		return units.Message{}
	}
	return units.Say("{} = {}", units.Of(units.Volume, volume), units.Of(units.Mass, volume*t.density()))
}
