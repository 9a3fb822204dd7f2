// Package mission flies a list of legs: it integrates distance, altitude and
// energy along each, with the mass falling as fuel burns, and finds where the
// thrust in hand is smallest.
package mission

import (
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// Kinds of leg. The names are stored.
const (
	Taxi    = "taxi"
	TakeOff = "take-off"
	Climb   = "climb"
	Cruise  = "cruise"
	Loiter  = "loiter"
	Descent = "descent"
	Landing = "landing"
	Reserve = "reserve"
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
)

// Rules for the path of a climb or descent, and for how far a leg goes.
const (
	FullPower  = "full-power"
	ByRate     = "rate"
	ByAngle    = "angle"
	Idle       = "idle"
	ByDistance = "distance"
	ByTime     = "time"
	ProjectDay = "project"
	OwnDay     = "own"
)

// A Leg is one part of a mission as entered. Which of its fields count depends on its kind.
type Leg struct {
	Name      string  `json:"name"`
	Kind      string  `json:"kind"`
	Strip     string  `json:"strip"`         // name of the strip of a take-off or landing; empty for the first
	Altitude  float64 `json:"altitude"`      // pressure altitude at the end of a climb or descent, or of a reserve, in m
	Extent    string  `json:"extent"`        // ByDistance or ByTime
	Distance  float64 `json:"distance"`      // over the ground in m
	Time      float64 `json:"time"`          // in s
	SpeedRule string  `json:"speed_rule"`    // one of the rules for speed
	Speed     float64 `json:"speed"`         // true or calibrated, as the rule says, in m/s
	Mach      float64 `json:"mach"`          // dimensionless
	Power     float64 `json:"power"`         // fraction of rated power, 0 to 1
	Setting   float64 `json:"setting"`       // of the power lever while taxiing, 0 to 1
	Path      string  `json:"path"`          // FullPower, ByRate, ByAngle or Idle
	Rate      float64 `json:"rate"`          // of climb or descent, geometric, positive, in m/s
	Angle     float64 `json:"angle"`         // of descent, positive, in rad
	DayGiven  string  `json:"day_given"`     // ProjectDay or OwnDay
	Deviation float64 `json:"isa_deviation"` // of temperature from standard, in K
	HeadWind  float64 `json:"head_wind"`     // in m/s, negative from behind
}

var (
	altitude = input.Spec{Name: "altitude", Label: "Pressure altitude", Quantity: units.Altitude, Min: -400, Max: 25000}
	distance = input.Spec{Name: "distance", Label: "Distance", Quantity: units.Distance, Min: 0, Max: 2e7}
	duration = input.Spec{Name: "time", Label: "Time", Quantity: units.Duration, Min: 0, Max: 7 * 24 * 3600}
	speed    = input.Spec{Name: "speed", Label: "Speed", Quantity: units.Speed, Min: 3, Max: 300}
	mach     = input.Spec{Name: "mach", Label: "Mach number", Quantity: units.Coefficient, Min: 0.05, Max: 0.95}
	power    = input.Spec{Name: "power", Label: "Share of rated power", Quantity: units.Fraction, Min: 0.05, Max: 1,
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
}

var ruleLabels = map[string]string{
	BestRate: "best rate of climb", BestAngle: "best angle of climb", BestRange: "best range", BestEndurance: "best endurance", CarsonSpeed: "Carson",
	Maximum: "level maximum", PercentPower: "share of rated power", ByTAS: "true airspeed", ByCAS: "calibrated airspeed", ByMach: "Mach number",
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
	}
	return []string{BestRange, CarsonSpeed, PercentPower, ByTAS, ByCAS, ByMach, Maximum, BestEndurance}
}

func options(values []string, label map[string]string) []input.Option {
	list := make([]input.Option, len(values))
	for i, v := range values {
		list[i] = input.Option{Value: v, Label: label[v]}
	}
	return list
}

var pathLabels = map[string]string{FullPower: "full power", ByRate: "rate", ByAngle: "angle", Idle: "idle"}

// Title is the leg's name, or its kind when it has none.
func (l *Leg) Title() string {
	if l.Name != "" {
		return l.Name
	}
	return l.Kind
}

// airborne reports whether the leg is flown along a path.
func (l *Leg) airborne() bool {
	return l.Kind == Climb || l.Kind == Cruise || l.Kind == Loiter || l.Kind == Descent || l.Kind == Reserve
}

// byTime reports whether the leg ends after a time.
func (l *Leg) byTime() bool {
	return l.Kind == Taxi || l.Kind == Loiter || ((l.Kind == Cruise || l.Kind == Reserve) && l.Extent == ByTime)
}

// stays reports whether the leg circles over one place and so covers no ground.
func (l *Leg) stays() bool {
	return l.Kind == Loiter || (l.Kind == Reserve && l.Extent == ByTime)
}

func (l *Leg) byDistance() bool {
	return (l.Kind == Cruise || l.Kind == Reserve) && l.Extent != ByTime
}

// Inputs describes the leg.
func (l *Leg) Inputs() []input.Entry {
	paths := []string{FullPower, ByRate}
	if l.Kind == Descent {
		paths = []string{ByRate, ByAngle, Idle}
	}
	inclined := l.Kind == Climb || l.Kind == Descent
	air := l.airborne()
	return []input.Entry{
		input.Line("name", "Name", 60, &l.Name),
		input.Pick("kind", "Kind of leg", &l.Kind, kindOptions...),
		input.Line("strip", "Strip", 80, &l.Strip).If(l.Kind == TakeOff || l.Kind == Landing),
		input.Num(&altitude, &l.Altitude).If(inclined || l.Kind == Reserve),
		input.Pick("extent", "Length given as", &l.Extent, input.Option{Value: ByDistance, Label: "distance"}, input.Option{Value: ByTime, Label: "time"}).
			If(l.Kind == Cruise || l.Kind == Reserve),
		input.Num(&distance, &l.Distance).If(l.byDistance()),
		input.Num(&duration, &l.Time).If(l.byTime()),
		input.Pick("speed_rule", "Speed", &l.SpeedRule, options(rules(l.Kind), ruleLabels)...).If(air),
		input.Num(&speed, &l.Speed).If(air && (l.SpeedRule == ByTAS || l.SpeedRule == ByCAS)),
		input.Num(&mach, &l.Mach).If(air && l.SpeedRule == ByMach),
		input.Num(&power, &l.Power).If(air && l.SpeedRule == PercentPower),
		input.Num(&setting, &l.Setting).If(l.Kind == Taxi),
		input.Pick("path", "Path", &l.Path, options(paths, pathLabels)...).If(inclined),
		input.Num(&rate, &l.Rate).If(inclined && l.Path == ByRate),
		input.Num(&angle, &l.Angle).If(inclined && l.Path == ByAngle),
		input.Pick("day_given", "Day", &l.DayGiven, input.Option{Value: ProjectDay, Label: "the project's"}, input.Option{Value: OwnDay, Label: "its own"}).If(air),
		input.Num(&deviation, &l.Deviation).If(air && l.DayGiven == OwnDay),
		input.Num(&headWind, &l.HeadWind).If(air),
	}
}

// NewLeg returns a leg of the kind with usable values in every field.
func NewLeg(kind, name string) Leg {
	l := Leg{Name: name, Kind: kind, Altitude: 1000, Extent: ByDistance, Distance: 100e3, Time: 1800, Speed: 35, Mach: 0.3, Power: 0.65, Setting: 0.1,
		Path: FullPower, Rate: 2.5, Angle: 0.052, DayGiven: ProjectDay}
	if kind == Descent {
		l.Path = ByRate
	}
	if kind == Reserve {
		l.Extent = ByTime
	}
	l.SpeedRule = rules(kind)[0]
	return l
}
