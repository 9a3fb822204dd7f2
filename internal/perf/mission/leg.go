// Package mission flies a list of legs: it integrates distance, altitude and
// energy along each, with the mass falling as fuel burns, and finds where the
// thrust in hand is smallest.
package mission

import (
	"math"
	"slices"

	"legwright/internal/perf/input"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// Kinds of leg. The names are stored.
const (
	Taxi        = "taxi"
	TakeOff     = "take-off"
	Climb       = "climb"
	Cruise      = "cruise"
	Loiter      = "loiter"
	Descent     = "descent"
	Landing     = "landing"
	Reserve     = "reserve"
	Dash        = "dash"
	Turns       = "turns"
	Drop        = "drop"
	PickUp      = "pick-up"
	Alternate   = "alternate"
	Contingency = "contingency"
)

// Rules for the speed of a leg. The names are stored.
const (
	BestRate      = "best-rate"
	BestAngle     = "best-angle"
	BestRange     = "best-range"
	BestEndurance = "best-endurance"
	CarsonSpeed   = "carson"
	Maximum       = "maximum"
	PercentPower  = "percent-power"
	ByTAS         = "tas"
	ByCAS         = "cas"
	ByMach        = "mach"
	MostInHand    = "most-in-hand"
)

// Rules for the path of a climb, descent or turn, and for how far a leg goes.
const (
	FullPower  = "full-power"
	ByRate     = "rate"
	ByAngle    = "angle"
	Idle       = "idle"
	ByBank     = "bank"
	ByLoad     = "load-factor"
	ByDistance = "distance"
	ByTime     = "time"
	ForTheRest = "rest"
	ByTurns    = "turns"
	ByHeading  = "heading"
	ProjectDay = "project"
	OwnDay     = "own"
)

// A Leg is one part of a mission as entered. Which of its fields count depends on its kind.
type Leg struct {
	Name      string  `json:"name"`
	Kind      string  `json:"kind"`
	Strip     string  `json:"strip"`         // name of the strip of a take-off or landing; empty for the first
	Altitude  float64 `json:"altitude"`      // pressure altitude at the end of a climb or descent, or of a reserve, alternate or contingency, in m
	Extent    string  `json:"extent"`        // ByDistance, ByTime or ForTheRest, or of turns ByTurns or ByHeading
	Distance  float64 `json:"distance"`      // over the ground in m
	Time      float64 `json:"time"`          // in s
	Turns     float64 `json:"turns"`         // number of full turns, dimensionless
	Heading   float64 `json:"heading"`       // change of heading in rad
	SpeedRule string  `json:"speed_rule"`    // one of the rules for speed
	Speed     float64 `json:"speed"`         // true or calibrated, as the rule says, in m/s
	Mach      float64 `json:"mach"`          // dimensionless
	Power     float64 `json:"power"`         // fraction of rated power, 0 to 1
	Setting   float64 `json:"setting"`       // of the power lever while taxiing, 0 to 1
	Path      string  `json:"path"`          // FullPower, ByRate, ByAngle or Idle, or of turns ByBank or ByLoad
	Rate      float64 `json:"rate"`          // of climb or descent, geometric, positive, in m/s
	Angle     float64 `json:"angle"`         // of descent, positive, in rad
	Bank      float64 `json:"bank"`          // of turns in rad, 0 to below π/2
	Load      float64 `json:"load_factor"`   // of turns, dimensionless, > 1
	Payload   float64 `json:"payload"`       // dropped or picked up in kg, >= 0
	Share     float64 `json:"share"`         // of the trip's energy that a contingency keeps, 0 to 1
	DayGiven  string  `json:"day_given"`     // ProjectDay or OwnDay
	Deviation float64 `json:"isa_deviation"` // of temperature from standard, in K
	HeadWind  float64 `json:"head_wind"`     // in m/s, negative from behind
}

var (
	altitude = input.Spec{Name: "altitude", Label: "Pressure altitude", Quantity: units.Altitude, Min: -400, Max: 25000}
	distance = input.Spec{Name: "distance", Label: "Distance", Quantity: units.Distance, Min: 0, Max: 2e7}
	duration = input.Spec{Name: "time", Label: "Time", Quantity: units.Duration, Min: 0, Max: 7 * 24 * 3600}
	holding  = input.Spec{Name: "time", Label: "At least, holding", Quantity: units.Duration, Min: 0, Max: 7 * 24 * 3600,
		Note: "At best endurance, at the altitude here and the mass reached. 5 minutes is common practice, no source."}
	turns   = input.Spec{Name: "turns", Label: "Full turns", Quantity: units.Coefficient, Min: 0, Max: 1000}
	heading = input.Spec{Name: "heading", Label: "Change of heading", Quantity: units.Angle, Min: 0, Max: 2 * math.Pi}
	bank    = input.Spec{Name: "bank", Label: "Bank", Quantity: units.Angle, Min: 0.05, Max: 1.4}
	load    = input.Spec{Name: "load_factor", Label: "Load factor", Quantity: units.Coefficient, Min: 1.01, Max: 9, Note: "Held against the structural limits, where they are entered."}
	payload = input.Spec{Name: "payload", Label: "Mass", Quantity: units.Mass, Min: 0, Max: 20000}
	share   = input.Spec{Name: "share", Label: "Share of the trip's fuel or energy", Quantity: units.Fraction, Min: 0, Max: 1, Note: "Without taxi and reserves.",
		Typical: &input.Typical{Low: 0.05, High: 0.1, Source: input.CommonPractice}}
	speed = input.Spec{Name: "speed", Label: "Speed", Quantity: units.Speed, Min: 3, Max: 300}
	mach  = input.Spec{Name: "mach", Label: "Mach number", Quantity: units.Coefficient, Min: 0.05, Max: 0.95}
	power = input.Spec{Name: "power", Label: "Share of rated power", Quantity: units.Fraction, Min: 0.05, Max: 1,
		Typical: &input.Typical{Low: 0.5, High: 0.8, Source: input.CommonPractice}}
	setting = input.Spec{Name: "setting", Label: "Power lever", Quantity: units.Fraction, Min: 0, Max: 1,
		Typical: &input.Typical{Low: 0.05, High: 0.3, Source: input.CommonPractice}}
	rate      = input.Spec{Name: "rate", Label: "Rate", Quantity: units.ClimbRate, Min: 0.1, Max: 60}
	angle     = input.Spec{Name: "angle", Label: "Angle", Quantity: units.Angle, Min: 0.005, Max: 1.2}
	deviation = input.Spec{Name: "isa_deviation", Label: "Deviation from standard", Quantity: units.TemperatureStep, Min: -60, Max: 60}
	headWind  = input.Spec{Name: "head_wind", Label: "Head wind", Quantity: units.Speed, Min: -60, Max: 60, Note: "Negative from behind."}
)

var kindOptions = []input.Option{
	{Value: Taxi, Label: "start and taxi"}, {Value: TakeOff, Label: "take-off"}, {Value: Climb, Label: "climb"}, {Value: Cruise, Label: "cruise"},
	{Value: Loiter, Label: "loiter"}, {Value: Descent, Label: "descent"}, {Value: Landing, Label: "landing"}, {Value: Reserve, Label: "reserve"},
	{Value: Dash, Label: "dash"}, {Value: Turns, Label: "turns"}, {Value: Drop, Label: "payload drop"}, {Value: PickUp, Label: "payload pick-up"},
	{Value: Alternate, Label: "alternate"}, {Value: Contingency, Label: "contingency"},
}

// KindOptions lists the kinds of leg with their words.
func KindOptions() []input.Option { return slices.Clone(kindOptions) }

var ruleLabels = map[string]string{
	BestRate: "best rate of climb", BestAngle: "best angle of climb", BestRange: "best range", BestEndurance: "best endurance", CarsonSpeed: "Carson",
	Maximum: "level maximum", PercentPower: "share of rated power", ByTAS: "true airspeed", ByCAS: "calibrated airspeed", ByMach: "Mach number",
	MostInHand: "most thrust in hand, 1.2 times the stall or more",
}

// rules lists the speed rules that a kind of leg accepts; the first is its default.
func rules(kind string) []string {
	switch kind {
	case Climb:
		return []string{BestRate, BestAngle, ByCAS, ByTAS, ByMach}
	case Descent:
		return []string{ByCAS, ByTAS, ByMach}
	case Loiter, Reserve:
		return []string{BestEndurance, BestRange, ByCAS, ByTAS, PercentPower}
	case Dash:
		return []string{Maximum, PercentPower, ByTAS, ByCAS, ByMach}
	case Turns:
		return []string{MostInHand, ByTAS, ByCAS, ByMach}
	}
	return []string{BestRange, CarsonSpeed, PercentPower, ByTAS, ByCAS, ByMach, Maximum, BestEndurance}
}

// paths lists the rules for the path that a kind of leg accepts; the first is its default.
func paths(kind string) []string {
	switch kind {
	case Descent:
		return []string{ByRate, ByAngle, Idle}
	case Turns:
		return []string{ByBank, ByLoad}
	}
	return []string{FullPower, ByRate}
}

// extents lists the ways in which the length of a kind of leg is given; the first is its default, but a reserve's is time.
func extents(kind string) []string {
	switch kind {
	case Cruise:
		return []string{ByDistance, ByTime, ForTheRest}
	case Turns:
		return []string{ByTurns, ByHeading}
	}
	return []string{ByDistance, ByTime}
}

func options(values []string, label map[string]string) []input.Option {
	list := make([]input.Option, len(values))
	for i, v := range values {
		list[i] = input.Option{Value: v, Label: label[v]}
	}
	return list
}

var (
	pathLabels   = map[string]string{FullPower: "full power", ByRate: "rate", ByAngle: "angle", Idle: "idle", ByBank: "bank", ByLoad: "load factor"}
	extentLabels = map[string]string{ByDistance: "distance", ByTime: "time", ForTheRest: "the rest of the range", ByTurns: "turns", ByHeading: "heading"}
)

// Title is the leg's name, or its kind when it has none.
func (l *Leg) Title() string {
	if l.Name != "" {
		return l.Name
	}
	return l.Kind
}

// Airborne reports whether the leg is flown along a path.
func (l *Leg) Airborne() bool {
	switch l.Kind {
	case Climb, Cruise, Loiter, Descent, Reserve, Dash, Turns, Alternate:
		return true
	}
	return false
}

// Spare reports whether the leg belongs to the reserve and not to the trip.
func (l *Leg) Spare() bool { return l.Kind == Reserve || l.Kind == Alternate || l.Kind == Contingency }

// Rests reports whether the leg flies as far as the energy goes that nothing after it needs.
func (l *Leg) Rests() bool { return l.Kind == Cruise && l.Extent == ForTheRest }

// stretches reports whether the leg is as long as a distance or a time says, by choice.
func (l *Leg) stretches() bool { return l.Kind == Cruise || l.Kind == Reserve || l.Kind == Dash }

// byTime reports whether the leg ends after a time.
func (l *Leg) byTime() bool {
	return l.Kind == Taxi || l.Kind == Loiter || l.stretches() && l.Extent == ByTime
}

// stays reports whether the leg circles over one place and so covers no ground.
func (l *Leg) stays() bool {
	return l.Kind == Loiter || l.Kind == Turns || l.Kind == Reserve && l.Extent == ByTime
}

func (l *Leg) byDistance() bool { return l.Kind == Alternate || l.stretches() && l.Extent != ByTime }

// LoadFactor is the load factor of the leg, dimensionless, >= 1: 1 but in turns.
func (l *Leg) LoadFactor() float64 {
	switch {
	case l.Kind != Turns:
		return 1
	case l.Path == ByLoad:
		return l.Load
	}
	return pointperf.LoadFactor(l.Bank, nil)
}

// sweep is the angle in rad through which turns go.
func (l *Leg) sweep() float64 {
	if l.Extent == ByHeading {
		return l.Heading
	}
	return 2 * math.Pi * l.Turns
}

// Convert keeps the same turns when another way of giving them is chosen.
func (l *Leg) Convert(choice, from string) {
	switch {
	case l.Kind != Turns:
	case choice == "path" && from == ByBank && l.Path == ByLoad:
		l.Load = math.Max(load.Min, math.Min(load.Max, pointperf.LoadFactor(l.Bank, nil)))
	case choice == "path" && from == ByLoad && l.Path == ByBank:
		l.Bank = math.Max(bank.Min, math.Min(bank.Max, math.Acos(1/l.Load)))
	case choice == "extent" && from == ByTurns && l.Extent == ByHeading:
		l.Heading = math.Min(heading.Max, 2*math.Pi*l.Turns)
	case choice == "extent" && from == ByHeading && l.Extent == ByTurns:
		l.Turns = l.Heading / (2 * math.Pi)
	}
}

// Inputs describes the leg.
func (l *Leg) Inputs() []input.Entry {
	inclined, turning := l.Kind == Climb || l.Kind == Descent, l.Kind == Turns
	air := l.Airborne()
	long := &duration
	if l.Kind == Contingency {
		long = &holding
	}
	return []input.Entry{
		input.Line("name", "Name", 60, &l.Name),
		input.Pick("kind", "Kind of leg", &l.Kind, kindOptions...),
		input.Line("strip", "Strip", 80, &l.Strip).If(l.Kind == TakeOff || l.Kind == Landing),
		input.Num(&altitude, &l.Altitude).If(inclined || l.Spare()),
		input.Pick("extent", "Length given as", &l.Extent, options(extents(l.Kind), extentLabels)...).If(l.stretches() || turning),
		input.Num(&distance, &l.Distance).If(l.byDistance() && !l.Rests()),
		input.Num(long, &l.Time).If(l.byTime() || l.Kind == Contingency),
		input.Num(&turns, &l.Turns).If(turning && l.Extent == ByTurns),
		input.Num(&heading, &l.Heading).If(turning && l.Extent == ByHeading),
		input.Pick("speed_rule", "Speed", &l.SpeedRule, options(rules(l.Kind), ruleLabels)...).If(air),
		input.Num(&speed, &l.Speed).If(air && (l.SpeedRule == ByTAS || l.SpeedRule == ByCAS)),
		input.Num(&mach, &l.Mach).If(air && l.SpeedRule == ByMach),
		input.Num(&power, &l.Power).If(air && l.SpeedRule == PercentPower),
		input.Num(&setting, &l.Setting).If(l.Kind == Taxi),
		input.Pick("path", "Path", &l.Path, options(paths(l.Kind), pathLabels)...).If(inclined || turning),
		input.Num(&rate, &l.Rate).If(inclined && l.Path == ByRate),
		input.Num(&angle, &l.Angle).If(inclined && l.Path == ByAngle),
		input.Num(&bank, &l.Bank).If(turning && l.Path == ByBank),
		input.Num(&load, &l.Load).If(turning && l.Path == ByLoad),
		input.Num(&payload, &l.Payload).If(l.Kind == Drop || l.Kind == PickUp),
		input.Num(&share, &l.Share).If(l.Kind == Contingency),
		input.Pick("day_given", "Day", &l.DayGiven, input.Option{Value: ProjectDay, Label: "the project's"}, input.Option{Value: OwnDay, Label: "its own"}).If(air),
		input.Num(&deviation, &l.Deviation).If(air && l.DayGiven == OwnDay),
		input.Num(&headWind, &l.HeadWind).If(air),
	}
}

// NewLeg returns a leg of the kind with usable values in every field.
func NewLeg(kind, name string) Leg {
	l := Leg{Name: name, Kind: kind, Altitude: 1000, Distance: 100e3, Time: 1800, Turns: 1, Heading: math.Pi, Speed: 35, Mach: 0.3, Power: 0.65, Setting: 0.1,
		Rate: 2.5, Angle: 0.052, Bank: math.Pi / 6, Load: 2, Payload: 10, Share: 0.05, DayGiven: ProjectDay}
	l.Extent, l.Path, l.SpeedRule = extents(kind)[0], paths(kind)[0], rules(kind)[0]
	switch kind {
	case Reserve:
		l.Extent = ByTime
	case Contingency:
		l.Time = 300
	}
	return l
}
