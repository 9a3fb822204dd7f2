// Package atmos gives the air at an altitude on a day, and converts between
// pressure, density and aerodrome altitudes and between airspeeds.
package atmos

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// Constants of the U.S. Standard Atmosphere, 1976, table 2, identical to ICAO Doc 7488 up to 32 km.
const (
	Gravity             = 9.80665   // standard acceleration of free fall in m/s², exact
	GasConstant         = 287.05287 // specific gas constant of dry air in J/(kg·K)
	HeatRatio           = 1.4       // ratio of specific heats, dimensionless
	SeaLevelTemperature = 288.15    // in K
	SeaLevelPressure    = 101325.0  // in Pa
	SeaLevelDensity     = SeaLevelPressure / (GasConstant * SeaLevelTemperature)

	// MinAltitude and MaxAltitude bound the pressure altitudes served, in m.
	MinAltitude = -600.0
	MaxAltitude = 32000.0
)

// SeaLevelSoundSpeed is the standard speed of sound at sea level in m/s.
var SeaLevelSoundSpeed = math.Sqrt(HeatRatio * GasConstant * SeaLevelTemperature)

// A layer of the standard atmosphere: temperature is linear in geopotential altitude.
type layer struct {
	base        float64 // geopotential altitude in m
	lapse       float64 // dT/dh in K/m
	temperature float64 // at the base in K
	pressure    float64 // at the base in Pa
}

var layers = buildLayers()

func buildLayers() [3]layer {
	ls := [3]layer{
		{base: 0, lapse: -0.0065, temperature: SeaLevelTemperature, pressure: SeaLevelPressure},
		{base: 11000, lapse: 0},
		{base: 20000, lapse: 0.001},
	}
	for i := 1; i < len(ls); i++ {
		below := ls[i-1]
		ls[i].temperature, ls[i].pressure = below.at(ls[i].base)
	}
	return ls
}

// at gives temperature in K and pressure in Pa at the geopotential altitude h in m.
func (l layer) at(h float64) (t, p float64) {
	t = l.temperature + l.lapse*(h-l.base)
	if l.lapse == 0 {
		return t, l.pressure * math.Exp(-Gravity*(h-l.base)/(GasConstant*l.temperature))
	}
	return t, l.pressure * math.Pow(t/l.temperature, -Gravity/(GasConstant*l.lapse))
}

// Standard gives the standard-day temperature in K and pressure in Pa at the
// pressure altitude hp in m. Source: U.S. Standard Atmosphere, 1976, eqs. 23 and 33a, 33b.
func Standard(hp float64) (temperature, pressure float64, err error) {
	if !(hp >= MinAltitude && hp <= MaxAltitude) {
		return 0, 0, &AltitudeError{hp}
	}
	temperature, pressure = layerOf(hp).at(hp)
	return temperature, pressure, nil
}

func layerOf(hp float64) layer {
	switch {
	case hp <= layers[1].base:
		return layers[0]
	case hp <= layers[2].base:
		return layers[1]
	}
	return layers[2]
}

// An AltitudeError reports a pressure altitude outside the standard atmosphere's range.
type AltitudeError struct {
	Altitude float64 // pressure altitude in m
}

func (e *AltitudeError) Error() string { return e.Message().In(units.Metric) }

// Message says what was asked for and what is served.
func (e *AltitudeError) Message() units.Message {
	return units.Say("a pressure altitude of {} lies outside the atmosphere model, {} to {}", units.Of(units.Altitude, e.Altitude), units.Of(units.Altitude, MinAltitude), units.Of(units.Altitude, MaxAltitude))
}

// Air is the local atmosphere.
type Air struct {
	PressureAltitude float64 // in m
	Pressure         float64 // static pressure in Pa
	Temperature      float64 // static temperature in K
	Density          float64 // of the moist air in kg/m³
	DryDensity       float64 // partial density of the dry air in kg/m³; what an engine breathes
	SoundSpeed       float64 // in m/s
	Viscosity        float64 // dynamic viscosity in Pa·s
	HeightRatio      float64 // geometric height gained per pressure altitude gained, dimensionless
}

// A Day is the air of one day at every altitude.
type Day struct {
	Deviation float64 // of temperature from standard at every altitude, in K
	Humidity  float64 // relative humidity, 0 to 1
}

var (
	moistDensity = formula.Must(formula.Formula{
		ID: "air.density", Out: formula.Sym("rho", "air density", units.Density),
		In: []formula.Symbol{formula.Sym("p", "static pressure", units.Pressure), formula.Sym("e", "vapour pressure", units.Pressure),
			formula.Sym("R", "gas constant of dry air", units.GasConstant), formula.Sym("T", "static temperature", units.Temperature)},
		Expr: "(p - 0.378*e)/(R*T)", Source: formula.WMO, Where: "equation of state with the virtual-temperature factor 0.378",
	})
	vapourPressure = formula.Must(formula.Formula{
		ID: "air.vapour-pressure", Out: formula.Sym("e", "vapour pressure", units.Pressure),
		In: []formula.Symbol{formula.Sym("RH", "relative humidity", units.Fraction), formula.Sym("t", "temperature in degrees Celsius", units.Coefficient),
			formula.Sym("p", "static pressure", units.Pressure)},
		Expr: "min(p, RH*611.2*exp(17.62*t/(243.12 + t)))", Source: formula.WMO, Where: "saturation vapour pressure over water, never above the whole pressure",
	})
	troposphere = formula.Must(formula.Formula{
		ID: "air.pressure-troposphere", Out: formula.Sym("p", "static pressure", units.Pressure),
		In: []formula.Symbol{formula.Sym("p0", "sea-level pressure", units.Pressure), formula.Sym("hp", "pressure altitude", units.Altitude),
			formula.Sym("T0", "sea-level temperature", units.Temperature), formula.Sym("g", "standard gravity", units.Acceleration), formula.Sym("R", "gas constant of dry air", units.GasConstant)},
		Expr: "p0*pow((T0 - 0.0065*hp)/T0, g/(R*0.0065))", Source: formula.StandardAtmosphere, Where: "eq. 33a",
	})
	airTemperature = formula.Must(formula.Formula{
		ID: "air.temperature", Out: formula.Sym("T", "static temperature", units.Temperature),
		In:   []formula.Symbol{formula.Sym("Tstd", "standard temperature at this pressure altitude", units.Temperature), formula.Sym("dT", "deviation from standard", units.TemperatureStep)},
		Expr: "Tstd + dT", Source: formula.StandardAtmosphere, Where: "table 2, with an offset at every altitude",
	})
)

// At gives the air at the pressure altitude hp in m, -600 to 32 000. It fails
// with *AltitudeError outside that range.
func (d Day) At(hp float64, w *formula.Working) (Air, error) {
	t, p, err := Standard(hp)
	if err != nil {
		return Air{}, err
	}
	a := Air{PressureAltitude: hp, Pressure: p}
	if w != nil && hp <= layers[1].base {
		w.Step(troposphere, p, SeaLevelPressure, hp, SeaLevelTemperature, Gravity, GasConstant)
	}
	a.Temperature = w.Step(airTemperature, t+d.Deviation, t, d.Deviation)
	if a.Temperature < 150 {
		return Air{}, units.Errorf(nil, "a temperature of {} at {} is outside the air model", units.Of(units.Temperature, a.Temperature), units.Of(units.Altitude, hp))
	}
	a.HeightRatio = a.Temperature / t
	e := 0.0
	if d.Humidity > 0 {
		c := a.Temperature - 273.15
		e = w.Step(vapourPressure, math.Min(p, d.Humidity*611.2*math.Exp(17.62*c/(243.12+c))), d.Humidity, c, p)
	}
	a.Density = w.Step(moistDensity, (p-0.378*e)/(GasConstant*a.Temperature), p, e, GasConstant, a.Temperature)
	a.DryDensity = (p - e) / (GasConstant * a.Temperature)
	a.SoundSpeed = math.Sqrt(HeatRatio * GasConstant * a.Temperature)
	a.Viscosity = viscosity(a.Temperature)
	return a, nil
}

// viscosity is Sutherland's law with the constants of the U.S. Standard
// Atmosphere, 1976, eq. 51; t in K, result in Pa·s.
func viscosity(t float64) float64 { return 1.458e-6 * t * math.Sqrt(t) / (t + 110.4) }

// DensityAltitude is the pressure altitude in m at which dry standard air has
// the density of a. It is held at the ends of the atmosphere's range.
func (a Air) DensityAltitude() float64 {
	lo, hi := MinAltitude, MaxAltitude
	for range 60 {
		mid := (lo + hi) / 2
		t, p, _ := Standard(mid)
		if p/(GasConstant*t) > a.Density {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

// PressureAltitude is the pressure altitude in m of a place at elevation in m
// when the altimeter setting QNH is in Pa: the elevation plus the standard
// altitude of the pressure QNH, which is how QNH is defined (ICAO Doc 7488).
func PressureAltitude(elevation, qnh float64) float64 {
	const lapse = 0.0065
	return elevation + SeaLevelTemperature/lapse*(1-math.Pow(qnh/SeaLevelPressure, GasConstant*lapse/Gravity))
}
