package project

import (
	"cmp"
	"strings"
	"sync"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A Requirement is a wanted number, and under which conditions it is wanted. A
// condition that does not concern the figure is kept and ignored.
type Requirement struct {
	Figure        string  `json:"figure"`         // identifier of a figure of the study
	Bound         string  `json:"bound"`          // AtLeast or AtMost
	Limit         float64 `json:"limit"`          // in the SI unit of the figure
	AltitudeGiven string  `json:"altitude_given"` // AtStrip or AtAltitude
	Altitude      float64 `json:"altitude"`       // pressure altitude in m
	DayGiven      string  `json:"day_given"`      // mission.ProjectDay or mission.OwnDay
	Deviation     float64 `json:"isa_deviation"`  // of temperature from standard, in dry air, in K
	MassGiven     string  `json:"mass_given"`     // AsFlown, AtStart, AtGreatest, AtLanding or GivenMass
	Mass          float64 `json:"mass"`           // in kg
	Config        string  `json:"configuration"`  // "clean", "take-off" or "landing"
	StripGiven    string  `json:"strip_given"`    // OfMission, NamedStrip, LevelHard or LevelGrass
	Strip         string  `json:"strip"`          // name of one of the project's strips
	Distance      string  `json:"distance"`       // Unfactored or Factored
	Airspeed      string  `json:"airspeed"`       // TrueAirspeed or Calibrated
	TurnGiven     string  `json:"turn_given"`     // BestTurn or TurnSpeed
	TurnSpeed     float64 `json:"turn_speed"`     // true airspeed in m/s
	Power         float64 `json:"power"`          // share of rated power, dimensionless
	ClimbTo       float64 `json:"climb_to"`       // pressure altitude in m
	Kept          float64 `json:"kept"`           // share of the usable fuel or charge that is not used, dimensionless
	Clause        string  `json:"clause"`         // of the rule that it comes from
	Note          string  `json:"note"`
}

// Bounds of a requirement.
const (
	AtLeast = "at-least"
	AtMost  = "at-most"
)

// Where the altitude of a requirement comes from.
const (
	AtStrip    = "strip"    // that of the strip
	AtAltitude = "altitude" // its own
)

// Where the mass of a requirement comes from.
const (
	AsFlown    = "as-flown" // as the mission brings it: at its take-off, at its landing, or at its start
	AtStart    = "start"    // with everything aboard
	AtGreatest = "greatest" // the designer's greatest take-off mass
	AtLanding  = "landing"  // at the landing of the mission
	GivenMass  = "given"    // its own
)

// Which strip a distance holds for.
const (
	OfMission  = "mission"     // the mission's strip of departure, or of arrival for a landing
	NamedStrip = "named"       // one of the project's strips
	LevelHard  = "level-hard"  // level dry asphalt in still air, up to the 50 ft screen of the rules
	LevelGrass = "level-grass" // level dry short grass in still air, up to the 50 ft screen of the rules
)

// How a distance, an airspeed and the speed of a turn are understood.
const (
	Unfactored   = "unfactored"
	Factored     = "factored" // with the safety factor of the project's technique
	TrueAirspeed = "true"
	Calibrated   = "calibrated"
	BestTurn     = "best" // the speed at which the load factor is greatest
	TurnSpeed    = "given"
)

// Require is a requirement under the conditions of the study itself.
func Require(figure, bound string, limit float64) Requirement {
	return Requirement{Figure: figure, Bound: bound, Limit: limit, AltitudeGiven: AtStrip, DayGiven: mission.ProjectDay, MassGiven: AsFlown, Mass: 600,
		Config: aircraft.Clean.String(), StripGiven: OfMission, Distance: Unfactored, Airspeed: TrueAirspeed, TurnGiven: BestTurn, TurnSpeed: 35,
		Power: 0.75, ClimbTo: 3000}
}

var (
	altitude = input.Spec{Name: "altitude", Label: "Pressure altitude", Quantity: units.Altitude, Min: -400, Max: 25000}
	heat     = input.Spec{Name: "isa_deviation", Label: "Deviation from standard", Quantity: units.TemperatureStep, Min: -60, Max: 60, Note: "In dry air."}
	load     = input.Spec{Name: "mass", Label: "Mass", Quantity: units.Mass, Min: 0.05, Max: 100000}
	turning  = input.Spec{Name: "turn_speed", Label: "Speed of the turn, TAS", Quantity: units.Speed, Min: 3, Max: 300}
	lever    = input.Spec{Name: "power", Label: "Share of rated power", Quantity: units.Fraction, Min: 0.05, Max: 1,
		Typical: &input.Typical{Low: 0.5, High: 0.8, Source: input.CommonPractice}}
	climbTo = input.Spec{Name: "climb_to", Label: "Climb to pressure altitude", Quantity: units.Altitude, Min: -400, Max: 25000}
	kept    = input.Spec{Name: "kept", Label: "Fuel or charge kept", Quantity: units.Fraction, Min: 0, Max: 0.95,
		Note: "Share of what is usable at the start that stays for the reserve."}
)

var (
	boundOptions    = []input.Option{{Value: AtMost, Label: "at most"}, {Value: AtLeast, Label: "at least"}}
	altitudeOptions = []input.Option{{Value: AtStrip, Label: "of the strip"}, {Value: AtAltitude, Label: "its own"}}
	dayOptions      = []input.Option{{Value: mission.ProjectDay, Label: "the project's"}, {Value: mission.OwnDay, Label: "its own"}}
	massOptions     = []input.Option{{Value: AsFlown, Label: "as flown"}, {Value: AtStart, Label: "start mass"}, {Value: AtGreatest, Label: "greatest take-off mass"},
		{Value: AtLanding, Label: "landing mass"}, {Value: GivenMass, Label: "its own"}}
	configOptions = []input.Option{{Value: aircraft.Clean.String(), Label: "clean"}, {Value: aircraft.TakeOff.String(), Label: "take-off"}, {Value: aircraft.Landing.String(), Label: "landing"}}
	stripOptions  = []input.Option{{Value: OfMission, Label: "the mission's"}, {Value: NamedStrip, Label: "a strip by name"},
		{Value: LevelHard, Label: "level dry asphalt, still air"}, {Value: LevelGrass, Label: "level dry grass, still air"}}
	distanceOptions = []input.Option{{Value: Unfactored, Label: "without safety factor"}, {Value: Factored, Label: "with safety factor"}}
	airspeedOptions = []input.Option{{Value: TrueAirspeed, Label: "true"}, {Value: Calibrated, Label: "calibrated"}}
	turnOptions     = []input.Option{{Value: BestTurn, Label: "best speed"}, {Value: TurnSpeed, Label: "its own speed"}}
)

// limitSpecs describe the limit, by figure: a limit is in the unit of its figure.
var limitSpecs = sync.OnceValue(func() map[string]*input.Spec {
	m := map[string]*input.Spec{"": {Name: "limit", Label: "Limit", Min: -1e9, Max: 1e9}}
	for _, k := range figures {
		m[k.ID] = &input.Spec{Name: "limit", Label: "Limit", Quantity: k.Quantity, Min: -1e9, Max: 1e9}
	}
	return m
})

var figureOptions = sync.OnceValue(func() []input.Option {
	list := make([]input.Option, len(figures))
	for i, k := range figures {
		list[i] = input.Option{Value: k.ID, Label: k.Label}
	}
	return list
})

// Inputs describes the requirement; its limit is in the unit of its figure.
func (r *Requirement) Inputs() []input.Entry {
	kind := r.Kind()
	limit := limitSpecs()[kind.ID]
	takes := func(t Terms) bool { return kind.Takes&t != 0 }
	return []input.Entry{
		input.Pick("figure", "Figure", &r.Figure, figureOptions()...),
		input.Pick("bound", "Bound", &r.Bound, boundOptions...).Alone(),
		input.Num(limit, &r.Limit),
		input.Num(&climbTo, &r.ClimbTo).If(takes(Top)),
		input.Num(&lever, &r.Power).If(takes(Lever)),
		input.Num(&kept, &r.Kept).If(takes(Kept)),
		input.Pick("altitude_given", "Altitude", &r.AltitudeGiven, altitudeOptions...).If(takes(Height)),
		input.Num(&altitude, &r.Altitude).If(takes(Height) && r.AltitudeGiven == AtAltitude),
		input.Pick("day_given", "Day", &r.DayGiven, dayOptions...).If(takes(Heat)),
		input.Num(&heat, &r.Deviation).If(takes(Heat) && r.DayGiven == mission.OwnDay),
		input.Pick("mass_given", "Mass", &r.MassGiven, massOptions...).If(takes(Load)),
		input.Num(&load, &r.Mass).If(takes(Load) && r.MassGiven == GivenMass),
		input.Pick("configuration", "Configuration", &r.Config, configOptions...).If(takes(Flaps)).Alone(),
		input.Pick("strip_given", "Strip", &r.StripGiven, stripOptions...).If(takes(Ground)),
		input.Line("strip", "Name of the strip", 80, &r.Strip).If(takes(Ground) && r.StripGiven == NamedStrip),
		input.Pick("distance", "Distance", &r.Distance, distanceOptions...).If(takes(Margin)).Alone(),
		input.Pick("airspeed", "Airspeed", &r.Airspeed, airspeedOptions...).If(takes(Airspeed)).Alone(),
		input.Pick("turn_given", "Turn at", &r.TurnGiven, turnOptions...).If(takes(Turning)),
		input.Num(&turning, &r.TurnSpeed).If(takes(Turning) && r.TurnGiven == TurnSpeed),
		input.Line("clause", "Clause", 120, &r.Clause),
		input.Line("note", "Note", 500, &r.Note),
	}
}

// Convert gives the requirement a usual limit when its figure has become one of another
// quantity; the clause that it came from then says nothing of it any more.
func (r *Requirement) Convert(choice, from string) {
	if choice != "figure" {
		return
	}
	before, _ := LookupFigure(from)
	if kind, ok := LookupFigure(r.Figure); ok && kind.Quantity != before.Quantity {
		r.Bound, r.Limit, r.Clause = kind.Bound, kind.Usual, ""
	}
}

// Convert gives a requirement with a mass of its own the mass that it had before,
// as far as the entered weights of the first variant tell, and one with a strip of its own the first strip.
func (s *Spec) Convert(choice, from string) {
	for i := range s.Requirements {
		r, path := &s.Requirements[i], at("requirements", i)
		if choice == path+".strip_given" && r.Strip == "" && len(s.Strips) > 0 {
			r.Strip = s.Strips[0].Name
		}
		if choice != path+".mass_given" || r.MassGiven != GivenMass || len(s.Variants) == 0 {
			continue
		}
		a := &s.Variants[0].Aircraft
		r.Mass = a.Weights.MaxTakeOff
		if from != AtGreatest && a.Powerplant.Model != nil {
			stores := a.Powerplant.Model.Stores()
			r.Mass = a.Weights.Empty + a.Powerplant.Model.InstalledMass() + a.Weights.PayloadMass() + stores.Fuel + stores.Trapped
		}
	}
}

// Kind is the requirement's figure; its ID is empty when there is no such figure.
func (r *Requirement) Kind() FigureKind {
	k, _ := LookupFigure(r.Figure)
	return k
}

// Stated lists in words the conditions that the requirement sets for itself, those of the
// study left out: none when it is held against the study as it is.
func (r *Requirement) Stated() []units.Message {
	takes := r.Kind().Takes
	var list []units.Message
	say := func(when bool, format string, args ...units.Arg) {
		if when {
			list = append(list, units.Say(format, args...))
		}
	}
	say(takes&Top != 0, "to {}", units.Of(units.Altitude, r.ClimbTo))
	say(takes&Lever != 0, "at {} power", units.Of(units.Fraction, r.Power))
	say(takes&Kept != 0 && r.Kept > 0, "{} of the fuel or charge kept", units.Of(units.Fraction, r.Kept))
	say(takes&Margin != 0 && r.Distance == Factored, "with the safety factor")
	say(takes&Airspeed != 0 && r.Airspeed == Calibrated, "calibrated")
	say(takes&Turning != 0 && r.TurnGiven == TurnSpeed, "at {}", units.Of(units.Speed, r.TurnSpeed))
	say(takes&Flaps != 0 && r.Config != aircraft.Clean.String(), "{} configuration", units.Text(r.Config))
	if takes&Ground != 0 {
		say(r.StripGiven == NamedStrip, "on {}", units.Text(cmp.Or(r.Strip, "the first strip")))
		if level, ok := r.LevelStrip(); ok {
			surface, _ := runway.LookupSurface(level.Surface)
			say(true, "level {}, still air", units.Text(surface.Label))
		}
	}
	say(takes&Height != 0 && r.AltitudeGiven == AtAltitude, "{}", units.Of(units.Altitude, r.Altitude))
	if takes&Heat != 0 && r.DayGiven == mission.OwnDay {
		list = append(list, Standard(r.Deviation))
	}
	if takes&Load != 0 {
		switch r.MassGiven {
		case AtStart:
			say(true, "start mass")
		case AtGreatest:
			say(true, "greatest take-off mass")
		case AtLanding:
			say(true, "landing mass")
		case GivenMass:
			say(true, "{}", units.Of(units.Mass, r.Mass))
		}
	}
	return list
}

// Standard says a deviation of temperature from standard, in K, in words.
func Standard(deviation float64) units.Message {
	switch {
	case deviation == 0:
		return units.Say("standard day")
	case deviation > 0:
		return units.Say("ISA +{}", units.Of(units.TemperatureStep, deviation))
	}
	return units.Say("ISA {}", units.Of(units.TemperatureStep, deviation))
}

// LevelStrip is the strip that a requirement of a rule holds for, level and in still air,
// up to the screen; ok is false when it holds for a strip of the project.
func (r *Requirement) LevelStrip() (strip runway.Strip, ok bool) {
	surface := map[string]string{LevelHard: "dry-asphalt", LevelGrass: "dry-grass"}[r.StripGiven]
	return runway.Strip{Name: "level " + strings.ReplaceAll(surface, "-", " "), Surface: surface, Obstacle: runway.Screen}, surface != ""
}
