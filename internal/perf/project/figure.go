package project

import (
	"slices"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A FigureKind is a number that a study computes and a requirement can name.
type FigureKind struct {
	ID       string // stored; never reused
	Label    string
	Quantity units.Quantity
	Bound    string  // AtLeast or AtMost, as one usually wants it
	Usual    float64 // limit that a new requirement begins with, in the SI unit of Quantity
	Asked    bool    // computed only where a requirement asks for it
	Takes    Terms   // the conditions that it depends on
}

// Terms is a set of conditions under which a figure can be asked for.
type Terms uint

// The conditions.
const (
	Height   Terms = 1 << iota // pressure altitude
	Heat                       // deviation of temperature from standard
	Load                       // mass
	Flaps                      // configuration
	Ground                     // strip
	Margin                     // with the safety factor or without
	Airspeed                   // true or calibrated
	Turning                    // speed of a turn
	Lever                      // share of rated power
	Top                        // altitude to climb to
	Kept                       // share of the stored energy that is kept
)

const (
	air   = Height | Heat
	point = air | Load
)

// figures are in the order shown.
var figures = []FigureKind{
	{"take_off_distance", "Take-off over the obstacle", units.FieldLength, AtMost, 500, false, point | Ground | Margin},
	{"take_off_roll", "Take-off ground roll", units.FieldLength, AtMost, 300, false, point | Ground},
	{"landing_distance", "Landing over the obstacle", units.FieldLength, AtMost, 500, false, point | Ground | Margin},
	{"landing_roll", "Landing ground roll", units.FieldLength, AtMost, 300, false, point | Ground},
	{"climb_rate", "Best rate of climb", units.ClimbRate, AtLeast, 2.5, false, point | Flaps},
	{"climb_gradient", "Climb gradient after take-off", units.Fraction, AtLeast, 0.083, false, point},
	{"steepest_gradient", "Steepest climb gradient", units.Fraction, AtLeast, 0.083, true, point | Flaps},
	{"balked_gradient", "Balked-landing climb gradient", units.Fraction, AtLeast, 0.033, true, point},
	{"time_to_climb", "Time to climb", units.Duration, AtMost, 900, true, point | Top},
	{"service_ceiling", "Service ceiling", units.Altitude, AtLeast, 3000, false, Heat | Load},
	{"absolute_ceiling", "Absolute ceiling", units.Altitude, AtLeast, 3500, false, Heat | Load},
	{"stall_clean", "Stall, clean", units.Speed, AtMost, 27, false, point | Airspeed},
	{"stall_take_off", "Stall, take-off", units.Speed, AtMost, 25, false, point | Airspeed},
	{"stall_landing", "Stall, landing", units.Speed, AtMost, 23, false, point | Airspeed},
	{"level_max", "Level maximum", units.Speed, AtLeast, 50, false, point | Airspeed},
	{"cruise_speed", "Cruise speed", units.Speed, AtLeast, 45, true, point | Airspeed | Lever},
	{"range", "Still-air range", units.Distance, AtLeast, 500e3, true, point | Kept},
	{"endurance", "Endurance", units.Duration, AtLeast, 4 * 3600, true, point | Kept},
	{"glide_ratio", "Best glide ratio", units.Coefficient, AtLeast, 10, true, point | Flaps},
	{"turn_load", "Sustained load factor in a turn", units.Coefficient, AtLeast, 1.5, true, point | Flaps | Turning},
	{"maneuvering_speed", "Manoeuvring speed VA, equivalent", units.Speed, AtLeast, 45, true, Load},
	{"gust_load", "Greatest load factor of manoeuvre and gust", units.Coefficient, AtMost, 4.4, true, point},
	{"static_thrust", "Static thrust", units.Force, AtLeast, 1500, false, air},
	{"static_thrust_ratio", "Static thrust over weight", units.Fraction, AtLeast, 0.2, false, point},
	{"static_speed", "Static engine speed", units.Rotation, AtLeast, 2000.0 / 60, false, air},
	{"wing_loading", "Wing loading", units.WingLoading, AtMost, 60, false, Load},
	{"power_loading", "Mass per shaft power at rest", units.PowerLoading, AtMost, 0.015, false, point},
	{"tip_mach", "Greatest tip Mach number", units.Coefficient, AtMost, 0.82, false, 0},
	{"thrust_in_hand", "Thrust in hand at the tightest", units.Fraction, AtLeast, 0.1, false, 0},
	{"ground_speed", "Greatest ground speed of the mission", units.Speed, AtMost, 45, false, 0},
	{"mission_time", "Mission time", units.Duration, AtMost, 3 * 3600, false, 0},
	{"mission_distance", "Mission distance", units.Distance, AtLeast, 200e3, false, 0},
	{"mission_fuel", "Fuel for the mission", units.Mass, AtMost, 60, false, 0},
	{"reserve_time", "Reserve flown", units.Duration, AtLeast, 1800, false, 0},
	{"fuel_left", "Fuel left after the reserve", units.Mass, AtLeast, 5, false, 0},
	{"energy_left", "Energy left before any reserve", units.Fraction, AtLeast, 0.2, false, 0},
}

// usual are the ranges that a reader would expect of a conventional aeroplane's figures, where there is one.
var usual = map[string]*input.Typical{
	"static_thrust_ratio": {Low: 0.2, High: 0.4, Source: input.CommonPractice},
	"tip_mach":            {Low: 0, High: 0.82, Source: "efficiency falls beyond; " + input.CommonPractice},
}

// Unusual says in words that a value in SI lies outside what a reader would expect, "" where it does not.
func (k FigureKind) Unusual(value float64, u units.Unit) string {
	s := input.Spec{Name: k.ID, Label: k.Label, Quantity: k.Quantity, Typical: usual[k.ID]}
	return s.Unusual(value, u)
}

// FigureKinds lists every figure in the order shown.
func FigureKinds() []FigureKind { return slices.Clone(figures) }

// LookupFigure finds a figure kind by its stored identifier.
func LookupFigure(id string) (FigureKind, bool) {
	for _, k := range figures {
		if k.ID == id {
			return k, true
		}
	}
	return FigureKind{}, false
}
