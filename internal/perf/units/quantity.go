package units

import "strings"

// A Quantity names what a number measures and so which units it may be written in.
// Quantities of one dimension that people read in different units (an altitude
// and a wing span, a speed and a rate of climb) are told apart.
type Quantity uint8

// The quantities that Legwright reads or shows.
const (
	Coefficient     Quantity = iota // pure number
	Fraction                        // pure number shown in percent
	Length                          // of a part of the aircraft, m
	Altitude                        // m
	Height                          // of an obstacle or screen, m
	FieldLength                     // along a strip, m
	Distance                        // flown, m
	Area                            // m²
	DragArea                        // drag per dynamic pressure, m²
	Volume                          // m³
	Speed                           // m/s
	ClimbRate                       // m/s
	Acceleration                    // m/s²
	Mass                            // kg
	Force                           // N
	Power                           // W
	Energy                          // J
	Torque                          // N·m
	Rotation                        // rotational speed, rev/s
	Pressure                        // Pa
	Temperature                     // K
	TemperatureStep                 // K
	Density                         // kg/m³
	Viscosity                       // Pa·s
	Duration                        // long times, s
	ShortTime                       // s
	Angle                           // rad
	Consumption                     // fuel per shaft work, kg/J
	FuelFlow                        // kg/s
	SpecificRange                   // distance per fuel, m/kg
	GasConstant                     // J/(kg·K)
	WingLoading                     // mass per wing area, kg/m²
	PowerLoading                    // mass per shaft power, kg/W
	quantities                      // count
)

// A shown is how a quantity is written in one unit.
type shown struct {
	unit     Unit
	decimals int // digits after the point in results
}

// A quantity's row: its SI unit, how each unit system shows it (aviation,
// metric, small), and the further units that may be typed.
type row struct {
	name     string
	si       string
	aviation shown
	metric   shown
	small    shown
	typed    []Unit
}

var (
	kilowatt   = Unit{Symbol: "kW", Scale: 1e3}
	watt       = Unit{Symbol: "W", Scale: 1, Aliases: []string{"watt", "watts"}}
	hp         = Unit{Symbol: "hp", Scale: horsepower, Aliases: []string{"bhp", "HP"}}
	hpMetric   = Unit{Symbol: "PS", Scale: metricHorse, Aliases: []string{"ch", "CV"}}
	newton     = Unit{Symbol: "N", Scale: 1}
	kilonewton = Unit{Symbol: "kN", Scale: 1e3}
	lbf        = Unit{Symbol: "lbf", Scale: poundForce}
	kgf        = Unit{Symbol: "kgf", Scale: gravity}
	rpm        = Unit{Symbol: "rpm", Scale: 1.0 / 60, Aliases: []string{"1/min", "rev/min", "r/min", "U/min", "min-1", "min^-1", "min⁻¹"}}
	revSec     = Unit{Symbol: "rev/s", Scale: 1}
	pascal     = Unit{Symbol: "Pa", Scale: 1}
	hectopasc  = Unit{Symbol: "hPa", Scale: 100, Aliases: []string{"mbar", "mb"}}
	inHg       = Unit{Symbol: "inHg", Scale: inchMercury}
	celsius    = Unit{Symbol: "°C", Scale: 1, Offset: 273.15, Aliases: []string{"C", "degC"}}
	fahrenheit = Unit{Symbol: "°F", Scale: 5.0 / 9, Offset: 459.67 * 5 / 9, Aliases: []string{"F", "degF"}}
	kelvin     = Unit{Symbol: "K", Scale: 1}
	stepC      = Unit{Symbol: "°C", Scale: 1, Aliases: []string{"C", "degC"}}
	stepF      = Unit{Symbol: "°F", Scale: 5.0 / 9, Aliases: []string{"F", "degF"}}
	sqMetre    = Unit{Symbol: "m²", Scale: 1, Aliases: []string{"m2", "sq m", "m^2"}}
	sqFoot     = Unit{Symbol: "ft²", Scale: foot * foot, Aliases: []string{"ft2", "sq ft", "sqft", "ft^2"}}
	sqDecim    = Unit{Symbol: "dm²", Scale: 1e-2, Aliases: []string{"dm2"}}
	litre      = Unit{Symbol: "L", Scale: 1e-3, Aliases: []string{"l", "litre", "litres", "liter", "liters"}}
	millilitre = Unit{Symbol: "mL", Scale: 1e-6, Aliases: []string{"ml"}}
	gallonUS   = Unit{Symbol: "US gal", Scale: usGallon, Aliases: []string{"gal", "USG", "gallon", "gallons"}}
	gallonImp  = Unit{Symbol: "imp gal", Scale: impGallon, Aliases: []string{"UK gal"}}
	kgCubic    = Unit{Symbol: "kg/m³", Scale: 1, Aliases: []string{"kg/m3"}}
	kgLitre    = Unit{Symbol: "kg/L", Scale: 1e3, Aliases: []string{"kg/l"}}
	lbGallon   = Unit{Symbol: "lb/US gal", Scale: pound / usGallon, Aliases: []string{"lb/gal"}}
	deg        = Unit{Symbol: "°", Scale: degree, Aliases: []string{"deg"}}
	radian     = Unit{Symbol: "rad", Scale: 1}
	gramKWh    = Unit{Symbol: "g/kWh", Scale: 1e-3 / (1e3 * hour), Aliases: []string{"g/(kW h)", "g/kW/h", "g/kW h", "g/kW·h", "g/(kW·h)", "g/kW-h"}}
	lbHpHour   = Unit{Symbol: "lb/hp·h", Scale: pound / (horsepower * hour), Aliases: []string{"lb/(hp h)", "lb/hp/h", "lb/hph", "lb/hp h", "lb/(hp·h)", "lb/hp-h", "lb/hp/hr", "lb/hp hr", "lb/hp·hr", "lb/(hp·hr)", "lb/hp-hr"}}
	kgHour     = Unit{Symbol: "kg/h", Scale: 1 / hour}
	lbHour     = Unit{Symbol: "lb/h", Scale: pound / hour, Aliases: []string{"lb/hr", "pph"}}
	gramMin    = Unit{Symbol: "g/min", Scale: 1e-3 / 60}
	kgSec      = Unit{Symbol: "kg/s", Scale: 1}
	kmPerKg    = Unit{Symbol: "km/kg", Scale: 1e3}
	nmPerLb    = Unit{Symbol: "NM/lb", Scale: nautical / pound}
	kilojoule  = Unit{Symbol: "kJ", Scale: 1e3}
	wattHour   = Unit{Symbol: "Wh", Scale: hour}
	kWattHour  = Unit{Symbol: "kWh", Scale: 1e3 * hour}
	newtonM    = Unit{Symbol: "N·m", Scale: 1, Aliases: []string{"Nm", "N m"}}
	lbfFoot    = Unit{Symbol: "lbf·ft", Scale: poundForce * foot, Aliases: []string{"lbf ft", "lb ft"}}
	metreSec2  = Unit{Symbol: "m/s²", Scale: 1, Aliases: []string{"m/s2"}}
	pascalSec  = Unit{Symbol: "Pa·s", Scale: 1}
	kgSqMetre  = Unit{Symbol: "kg/m²", Scale: 1, Aliases: []string{"kg/m2", "kg/m^2"}}
	lbSqFoot   = Unit{Symbol: "lb/ft²", Scale: pound / (foot * foot), Aliases: []string{"lb/ft2", "lb/sq ft", "psf"}}
	gramSqDec  = Unit{Symbol: "g/dm²", Scale: 0.1, Aliases: []string{"g/dm2"}}
	kgKilowatt = Unit{Symbol: "kg/kW", Scale: 1e-3}
	lbHorse    = Unit{Symbol: "lb/hp", Scale: pound / horsepower}
	gramWatt   = Unit{Symbol: "g/W", Scale: 1e-3}
	joulePer   = Unit{Symbol: "J/(kg·K)", Scale: 1}
)

var table = [quantities]row{
	Coefficient:     {"number", "", shown{one, 4}, shown{one, 4}, shown{one, 4}, nil},
	Fraction:        {"fraction", "", shown{percent, 1}, shown{percent, 1}, shown{percent, 1}, []Unit{ofOne}},
	Length:          {"length", "m", shown{feet, 2}, shown{metre, 2}, shown{metre, 3}, []Unit{inches, millimetre, centimetre}},
	Altitude:        {"altitude", "m", shown{feet, 0}, shown{metre, 0}, shown{metre, 0}, []Unit{kilometre}},
	Height:          {"height", "m", shown{feet, 0}, shown{metre, 1}, shown{metre, 1}, nil},
	FieldLength:     {"field length", "m", shown{feet, 0}, shown{metre, 0}, shown{metre, 0}, []Unit{kilometre}},
	Distance:        {"distance", "m", shown{nautMile, 1}, shown{kilometre, 1}, shown{kilometre, 2}, []Unit{metre, statMile, feet}},
	Area:            {"area", "m²", shown{sqFoot, 1}, shown{sqMetre, 2}, shown{sqMetre, 3}, []Unit{sqDecim}},
	DragArea:        {"drag area", "m²", shown{sqFoot, 2}, shown{sqMetre, 3}, shown{sqMetre, 4}, []Unit{sqDecim}},
	Volume:          {"volume", "m³", shown{gallonUS, 1}, shown{litre, 1}, shown{litre, 3}, []Unit{gallonImp, millilitre, {Symbol: "m³", Scale: 1, Aliases: []string{"m3"}}}},
	Speed:           {"speed", "m/s", shown{knot, 1}, shown{metreSec, 1}, shown{metreSec, 1}, []Unit{kilometreH, milesHour, feetSec}},
	ClimbRate:       {"rate of climb", "m/s", shown{feetMinute, 0}, shown{metreSec, 2}, shown{metreSec, 2}, []Unit{feetSec, knot, kilometreH}},
	Acceleration:    {"acceleration", "m/s²", shown{metreSec2, 2}, shown{metreSec2, 2}, shown{metreSec2, 2}, nil},
	Mass:            {"mass", "kg", shown{pounds, 0}, shown{kilogram, 1}, shown{kilogram, 3}, []Unit{gram, ounces, tonne}},
	Force:           {"force", "N", shown{lbf, 0}, shown{newton, 0}, shown{newton, 2}, []Unit{kilonewton, kgf}},
	Power:           {"power", "W", shown{hp, 1}, shown{kilowatt, 1}, shown{watt, 0}, []Unit{hpMetric}},
	Energy:          {"energy", "J", shown{kWattHour, 2}, shown{kWattHour, 2}, shown{wattHour, 1}, []Unit{{Symbol: "J", Scale: 1}, kilojoule}},
	Torque:          {"torque", "N·m", shown{lbfFoot, 1}, shown{newtonM, 1}, shown{newtonM, 3}, nil},
	Rotation:        {"rotational speed", "rev/s", shown{rpm, 0}, shown{rpm, 0}, shown{rpm, 0}, []Unit{revSec}},
	Pressure:        {"pressure", "Pa", shown{inHg, 2}, shown{hectopasc, 1}, shown{hectopasc, 1}, []Unit{pascal}},
	Temperature:     {"temperature", "K", shown{celsius, 1}, shown{celsius, 1}, shown{celsius, 1}, []Unit{fahrenheit, kelvin}},
	TemperatureStep: {"temperature difference", "K", shown{stepC, 1}, shown{stepC, 1}, shown{stepC, 1}, []Unit{stepF, kelvin}},
	Density:         {"density", "kg/m³", shown{kgCubic, 4}, shown{kgCubic, 4}, shown{kgCubic, 4}, []Unit{kgLitre, lbGallon}},
	Viscosity:       {"viscosity", "Pa·s", shown{pascalSec, 8}, shown{pascalSec, 8}, shown{pascalSec, 8}, nil},
	Duration:        {"time", "s", shown{minute, 1}, shown{minute, 1}, shown{minute, 1}, []Unit{hours, second}},
	ShortTime:       {"time", "s", shown{second, 1}, shown{second, 1}, shown{second, 1}, []Unit{minute}},
	Angle:           {"angle", "rad", shown{deg, 1}, shown{deg, 1}, shown{deg, 1}, []Unit{radian}},
	Consumption:     {"specific fuel consumption", "kg/J", shown{lbHpHour, 3}, shown{gramKWh, 0}, shown{gramKWh, 0}, []Unit{{Symbol: "kg/J", Scale: 1}}},
	FuelFlow:        {"fuel flow", "kg/s", shown{lbHour, 1}, shown{kgHour, 2}, shown{gramMin, 2}, []Unit{kgSec}},
	SpecificRange:   {"specific range", "m/kg", shown{nmPerLb, 2}, shown{kmPerKg, 2}, shown{kmPerKg, 1}, []Unit{{Symbol: "m/kg", Scale: 1}}},
	GasConstant:     {"gas constant", "J/(kg·K)", shown{joulePer, 3}, shown{joulePer, 3}, shown{joulePer, 3}, nil},
	WingLoading:     {"wing loading", "kg/m²", shown{lbSqFoot, 1}, shown{kgSqMetre, 1}, shown{kgSqMetre, 2}, []Unit{gramSqDec}},
	PowerLoading:    {"power loading", "kg/W", shown{lbHorse, 1}, shown{kgKilowatt, 2}, shown{gramWatt, 2}, []Unit{{Symbol: "kg/W", Scale: 1}}},
}

// Quantities lists every quantity.
func Quantities() []Quantity {
	list := make([]Quantity, quantities)
	for i := range list {
		list[i] = Quantity(i)
	}
	return list
}

// Name says in words what q measures.
func (q Quantity) Name() string { return table[q].name }

// SI is the symbol of the SI unit that values of q are held in.
func (q Quantity) SI() string { return table[q].si }

// Units lists the units in which q may be typed: those of the three unit systems first.
func (q Quantity) Units() []Unit {
	r := table[q]
	list := make([]Unit, 0, 3+len(r.typed))
	for _, u := range append([]Unit{r.metric.unit, r.aviation.unit, r.small.unit}, r.typed...) {
		if !contains(list, u) {
			list = append(list, u)
		}
	}
	return list
}

func contains(list []Unit, u Unit) bool {
	for _, have := range list {
		if have.Symbol == u.Symbol {
			return true
		}
	}
	return false
}

// Find looks a unit up among those of q by its symbol or another way of writing
// it, exactly first, then without regard to case.
func (q Quantity) Find(symbol string) (Unit, bool) {
	list := q.Units()
	for _, equal := range []func(a, b string) bool{func(a, b string) bool { return a == b }, strings.EqualFold} {
		for _, u := range list {
			if equal(u.Symbol, symbol) {
				return u, true
			}
			for _, a := range u.Aliases {
				if equal(a, symbol) {
					return u, true
				}
			}
		}
	}
	return Unit{}, false
}
