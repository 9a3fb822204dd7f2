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
}

// figures are in the order shown.
var figures = []FigureKind{
	{"take_off_distance", "Take-off over the obstacle", units.FieldLength},
	{"take_off_roll", "Take-off ground roll", units.FieldLength},
	{"landing_distance", "Landing over the obstacle", units.FieldLength},
	{"landing_roll", "Landing ground roll", units.FieldLength},
	{"climb_rate", "Best rate of climb", units.ClimbRate},
	{"climb_gradient", "Climb gradient after take-off", units.Fraction},
	{"service_ceiling", "Service ceiling", units.Altitude},
	{"absolute_ceiling", "Absolute ceiling", units.Altitude},
	{"stall_clean", "Stall, clean", units.Speed},
	{"stall_landing", "Stall, landing", units.Speed},
	{"level_max", "Level maximum", units.Speed},
	{"static_thrust", "Static thrust", units.Force},
	{"static_speed", "Static engine speed", units.Rotation},
	{"tip_mach", "Greatest tip Mach number", units.Coefficient},
	{"thrust_in_hand", "Thrust in hand at the tightest", units.Fraction},
	{"mission_time", "Mission time", units.Duration},
	{"mission_distance", "Mission distance", units.Distance},
	{"mission_fuel", "Fuel for the mission", units.Mass},
	{"reserve_time", "Reserve flown", units.Duration},
	{"fuel_left", "Fuel left after the reserve", units.Mass},
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

// Inputs describes the requirement; its limit is in the unit of its figure.
func (r *Requirement) Inputs() []input.Entry {
	options := make([]input.Option, len(figures))
	for i, k := range figures {
		options[i] = input.Option{Value: k.ID, Label: k.Label}
	}
	kind, _ := LookupFigure(r.Figure)
	limit := &input.Spec{Name: "limit", Label: "Limit", Quantity: kind.Quantity, Min: -1e9, Max: 1e9}
	return []input.Entry{
		input.Pick("figure", "Figure", &r.Figure, options...),
		input.Pick("bound", "Bound", &r.Bound, input.Option{Value: AtMost, Label: "at most"}, input.Option{Value: AtLeast, Label: "at least"}),
		input.Num(limit, &r.Limit),
	}
}
