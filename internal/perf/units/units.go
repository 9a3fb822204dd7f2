// Package units converts between the SI values that the engine computes in and
// the units that people type and read. It is the only package that contains
// conversion factors.
package units

// A Unit is a way to write a quantity: SI value = Scale*written + Offset.
type Unit struct {
	Symbol  string
	Scale   float64  // SI value of one written unit, SI units of the quantity; > 0
	Offset  float64  // SI value of a written zero, SI units of the quantity; 0 except for temperatures
	Aliases []string // other ways in which people type the symbol
}

// ToSI returns the SI value of a number written in u.
func (u Unit) ToSI(written float64) float64 { return u.Scale*written + u.Offset }

// FromSI returns the number to write in u for an SI value.
func (u Unit) FromSI(si float64) float64 { return (si - u.Offset) / u.Scale }

// Base factors. Each is exact by definition: the international yard and pound
// agreement of 1959 (foot, pound), the international nautical mile (1929), the
// US gallon of 231 cubic inches, and standard gravity (3rd CGPM, 1901).
const (
	foot        = 0.3048
	inch        = foot / 12
	pound       = 0.45359237
	nautical    = 1852.0
	gravity     = 9.80665
	poundForce  = pound * gravity
	horsepower  = 550 * foot * poundForce // 550 ft·lbf/s
	metricHorse = 75 * gravity            // 75 kgf·m/s
	usGallon    = 231 * inch * inch * inch
	impGallon   = 4.54609e-3 // exact, UK Weights and Measures Act 1985
	inchMercury = 3386.389   // Pa, conventional inch of mercury at 0 °C (NIST SP 811, table B.8)
	hour        = 3600.0
	degree      = 3.14159265358979323846 / 180
)

// Units that more than one quantity uses.
var (
	metre      = Unit{Symbol: "m", Scale: 1, Aliases: []string{"metre", "metres", "meter", "meters"}}
	feet       = Unit{Symbol: "ft", Scale: foot, Aliases: []string{"foot", "feet", "'"}}
	inches     = Unit{Symbol: "in", Scale: inch, Aliases: []string{"inch", "inches", "\"", "″"}}
	millimetre = Unit{Symbol: "mm", Scale: 1e-3}
	centimetre = Unit{Symbol: "cm", Scale: 1e-2}
	kilometre  = Unit{Symbol: "km", Scale: 1e3}
	nautMile   = Unit{Symbol: "NM", Scale: nautical, Aliases: []string{"nm", "nmi"}}
	statMile   = Unit{Symbol: "mi", Scale: 5280 * foot, Aliases: []string{"sm", "mile", "miles"}}
	metreSec   = Unit{Symbol: "m/s", Scale: 1, Aliases: []string{"mps"}}
	kilometreH = Unit{Symbol: "km/h", Scale: 1000 / hour, Aliases: []string{"kph", "kmh"}}
	knot       = Unit{Symbol: "kt", Scale: nautical / hour, Aliases: []string{"kts", "kn", "knot", "knots"}}
	milesHour  = Unit{Symbol: "mph", Scale: 5280 * foot / hour}
	feetSec    = Unit{Symbol: "ft/s", Scale: foot, Aliases: []string{"fps"}}
	feetMinute = Unit{Symbol: "ft/min", Scale: foot / 60, Aliases: []string{"fpm"}}
	kilogram   = Unit{Symbol: "kg", Scale: 1}
	gram       = Unit{Symbol: "g", Scale: 1e-3}
	tonne      = Unit{Symbol: "t", Scale: 1e3}
	pounds     = Unit{Symbol: "lb", Scale: pound, Aliases: []string{"lbs", "pound", "pounds"}}
	ounces     = Unit{Symbol: "oz", Scale: pound / 16}
	second     = Unit{Symbol: "s", Scale: 1, Aliases: []string{"sec", "seconds"}}
	minute     = Unit{Symbol: "min", Scale: 60, Aliases: []string{"minutes"}}
	hours      = Unit{Symbol: "h", Scale: hour, Aliases: []string{"hr", "hour", "hours"}}
	one        = Unit{Symbol: "", Scale: 1}
	percent    = Unit{Symbol: "%", Scale: 1e-2}
	ofOne      = Unit{Symbol: "fraction", Scale: 1}
)
