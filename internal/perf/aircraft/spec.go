// Package aircraft holds one complete aircraft: as the user describes it (Spec)
// and as the engine flies it (Aircraft).
package aircraft

import (
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/input"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// Spec is an aircraft as entered. Build checks and assembles it.
type Spec struct {
	Airframe   Airframe        `json:"airframe"`
	Weights    Weights         `json:"weights"`
	Limits     loads.Limits    `json:"limits"`
	Powerplant powerplant.Spec `json:"powerplant"`
}

// An Airframe is the aeroplane without its powerplant.
type Airframe struct {
	WingArea    float64       `json:"wing_area"`    // reference area in m²
	Span        float64       `json:"span"`         // in m
	WingHeight  float64       `json:"wing_height"`  // of the wing above the ground on its wheels, in m
	DragGiven   string        `json:"drag_given"`   // ByParabola, ByDragArea, ByBestGlide, ByBuildUp or ByTable
	CDMin       float64       `json:"cd_min"`       // minimum drag coefficient, dimensionless
	DragArea    float64       `json:"drag_area"`    // minimum drag per dynamic pressure, in m²
	Efficiency  float64       `json:"efficiency"`   // span efficiency e, dimensionless
	GlideRatio  float64       `json:"glide_ratio"`  // best ratio of lift to drag, dimensionless
	GlideSpeed  float64       `json:"glide_speed"`  // equivalent airspeed of the best ratio, in m/s
	GlideMass   float64       `json:"glide_mass"`   // mass at which that is the speed, in kg
	CLMinDrag   float64       `json:"cl_min_drag"`  // lift coefficient of minimum drag, dimensionless
	Polar       [][]float64   `json:"polar"`        // CL, CD of the whole aircraft
	Leakage     float64       `json:"leakage"`      // leakage and protuberances as a share of the drag of the components, dimensionless
	Unlisted    float64       `json:"unlisted"`     // drag area that the components leave out, in m²
	FrictionTAS float64       `json:"friction_tas"` // true airspeed of the components' Reynolds numbers, in m/s
	FrictionAlt float64       `json:"friction_alt"` // pressure altitude of the components' Reynolds numbers, in m
	Clean       Configuration `json:"clean"`        // flaps and gear as cruised
	TakeOff     Configuration `json:"take_off"`     // flaps and gear at take-off
	Landing     Configuration `json:"landing"`      // flaps and gear at landing
	GroundCL    float64       `json:"ground_cl"`    // lift coefficient held in the take-off run, dimensionless
	NeverExceed float64       `json:"never_exceed"` // never-exceed speed, calibrated, in m/s

	// Components of the build-up. Their inputs are checked also while the drag is given otherwise.
	Components []dragbuild.Component `json:"components"`
}

// A Configuration is a setting of flaps and gear.
type Configuration struct {
	LiftGiven  string  `json:"lift_given"`  // ByCLMax or ByStall
	CLMax      float64 `json:"cl_max"`      // maximum lift coefficient, dimensionless
	StallSpeed float64 `json:"stall_speed"` // calibrated at sea level, in m/s
	StallMass  float64 `json:"stall_mass"`  // mass at which that is the stall speed, in kg
	DeltaCD    float64 `json:"delta_cd"`    // drag added to the clean polar, dimensionless
	DeltaCLM   float64 `json:"delta_clm"`   // shift of the lift coefficient of minimum drag, dimensionless
}

// How the greatest mass without usable fuel is given.
const (
	NoZeroFuel = "none" // the designer sets no such limit
	ByZeroFuel = "given"
)

// Weights are the masses without powerplant and fuel, and the limits of the whole.
type Weights struct {
	Empty         float64 `json:"empty"`           // empty mass without the powerplant, in kg
	Growth        float64 `json:"growth"`          // allowance for what building adds, share of the empty mass with the powerplant, 0 to 0.5
	Items         []Item  `json:"items"`           // crew, payload, equipment
	MaxTakeOff    float64 `json:"max_take_off"`    // greatest take-off mass in kg
	ZeroFuelGiven string  `json:"zero_fuel_given"` // NoZeroFuel or ByZeroFuel
	MaxZeroFuel   float64 `json:"max_zero_fuel"`   // greatest mass without usable fuel, in kg
}

// An Item is something carried.
type Item struct {
	Name string  `json:"name"`
	Mass float64 `json:"mass"` // in kg
}

var (
	wingArea = input.Spec{Name: "wing_area", Label: "Wing area", Quantity: units.Area, Min: 0.02, Max: 500, Note: "Reference area of every coefficient."}
	span     = input.Spec{Name: "span", Label: "Span", Quantity: units.Length, Min: 0.2, Max: 80}
	height   = input.Spec{Name: "wing_height", Label: "Wing above ground", Quantity: units.Length, Min: 0.02, Max: 10, Note: "For ground effect, on its wheels."}
	groundCL = input.Spec{Name: "ground_cl", Label: "CL in the take-off run", Quantity: units.Coefficient, Min: -0.2, Max: 2.5,
		Note: "Lift coefficient in the attitude of the ground run.", Typical: &input.Typical{Low: 0.1, High: 1, Source: input.CommonPractice}}
	neverExceed = input.Spec{Name: "never_exceed", Label: "Never-exceed speed, CAS", Quantity: units.Speed, Min: 5, Max: 250,
		Note: "The designer's structural limit; it is not computed here."}
	growth = input.Spec{Name: "growth", Label: "Growth allowance", Quantity: units.Fraction, Min: 0, Max: 0.5, Decided: true,
		Note: "What building is expected to add to the empty mass, powerplant included. Set it to 0 once the aircraft has been weighed. Commonly 3 to 5 % while it is designed; common practice, no source."}
	emptyMass   = input.Spec{Name: "empty", Label: "Empty, less powerplant", Quantity: units.Mass, Min: 0.05, Max: 50000}
	itemMass    = input.Spec{Name: "mass", Label: "Mass", Quantity: units.Mass, Min: 0, Max: 20000}
	maxTakeOff  = input.Spec{Name: "max_take_off", Label: "Greatest take-off mass", Quantity: units.Mass, Min: 0.1, Max: 100000, Note: "The designer's limit."}
	maxZeroFuel = input.Spec{Name: "max_zero_fuel", Label: "Greatest mass without fuel", Quantity: units.Mass, Min: 0.1, Max: 100000,
		Note: "The designer's limit on everything but usable fuel: what the fuselage carries bends the wing, fuel in the wing relieves it."}
)

// Inputs describes the weights.
func (w *Weights) Inputs() []input.Entry {
	return []input.Entry{
		input.Num(&emptyMass, &w.Empty),
		input.Num(&growth, &w.Growth),
		input.Num(&maxTakeOff, &w.MaxTakeOff),
		input.Pick("zero_fuel_given", "Limit without fuel", &w.ZeroFuelGiven,
			input.Option{Value: NoZeroFuel, Label: "none"}, input.Option{Value: ByZeroFuel, Label: "a greatest mass"}),
		input.Num(&maxZeroFuel, &w.MaxZeroFuel).If(w.ZeroFuelGiven == ByZeroFuel),
	}
}

// Convert lets a limit that was never given begin where it limits nothing: at the greatest take-off mass.
func (w *Weights) Convert(choice, _ string) {
	if choice == "zero_fuel_given" && w.ZeroFuelGiven == ByZeroFuel && maxZeroFuel.Check(w.MaxZeroFuel) != nil {
		w.MaxZeroFuel = w.MaxTakeOff
	}
}

// Inputs describes one item.
func (i *Item) Inputs() []input.Entry {
	return []input.Entry{input.Line("name", "Name", 80, &i.Name), input.Num(&itemMass, &i.Mass)}
}

// PayloadMass is the sum of the items in kg.
func (w Weights) PayloadMass() float64 {
	sum := 0.0
	for _, i := range w.Items {
		sum += i.Mass
	}
	return sum
}
