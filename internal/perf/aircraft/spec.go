// Package aircraft holds one complete aircraft: as the user describes it (Spec)
// and as the engine flies it (Aircraft).
package aircraft

import (
	"legwright/internal/perf/input"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// How the drag polar is given.
const (
	ByParabola = "parabola"
	ByTable    = "table"
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
	DragGiven   string        `json:"drag_given"`   // ByParabola or ByTable
	CDMin       float64       `json:"cd_min"`       // minimum drag coefficient, dimensionless
	Efficiency  float64       `json:"efficiency"`   // span efficiency e, dimensionless
	CLMinDrag   float64       `json:"cl_min_drag"`  // lift coefficient of minimum drag, dimensionless
	Polar       [][]float64   `json:"polar"`        // CL, CD of the whole aircraft
	Clean       Configuration `json:"clean"`        // flaps and gear as cruised
	TakeOff     Configuration `json:"take_off"`     // flaps and gear at take-off
	Landing     Configuration `json:"landing"`      // flaps and gear at landing
	GroundCL    float64       `json:"ground_cl"`    // lift coefficient held in the take-off run, dimensionless
	NeverExceed float64       `json:"never_exceed"` // never-exceed speed, calibrated, in m/s
}

// A Configuration is a setting of flaps and gear.
type Configuration struct {
	CLMax    float64 `json:"cl_max"`    // maximum lift coefficient, dimensionless
	DeltaCD  float64 `json:"delta_cd"`  // drag added to the clean polar, dimensionless
	DeltaCLM float64 `json:"delta_clm"` // shift of the lift coefficient of minimum drag, dimensionless
}

// Weights are the masses without powerplant and fuel.
type Weights struct {
	Empty      float64 `json:"empty"`        // empty mass without the powerplant, in kg
	Items      []Item  `json:"items"`        // crew, payload, equipment
	MaxTakeOff float64 `json:"max_take_off"` // greatest take-off mass in kg
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
	cdMin    = input.Spec{Name: "cd_min", Label: "Minimum drag coefficient", Quantity: units.Coefficient, Min: 0.003, Max: 0.5,
		Typical: &input.Typical{Low: 0.016, High: 0.06, Source: "light aircraft 0.018 to 0.040, common practice, no source"}}
	efficiency = input.Spec{Name: "efficiency", Label: "Span efficiency\u00a0e", Quantity: units.Coefficient, Min: 0.2, Max: 1.5,
		Typical: &input.Typical{Low: 0.7, High: 0.9, Source: "0.7 to 0.85 for flaps up, gliders higher; common practice, no source"}}
	clMinDrag = input.Spec{Name: "cl_min_drag", Label: "CL at minimum drag", Quantity: units.Coefficient, Min: -0.5, Max: 1,
		Typical: &input.Typical{Low: 0, High: 0.3, Source: input.CommonPractice}}
	columnCL = input.Spec{Name: "cl", Label: "CL", Quantity: units.Coefficient, Min: -3, Max: 5}
	columnCD = input.Spec{Name: "cd", Label: "CD", Quantity: units.Coefficient, Min: 0.001, Max: 3}
	clMax    = input.Spec{Name: "cl_max", Label: "CLmax", Quantity: units.Coefficient, Min: 0.3, Max: 5,
		Typical: &input.Typical{Low: 1.1, High: 2.4, Source: "1.2 to 1.5 clean, 1.6 to 2.2 with flaps; common practice, no source"}}
	deltaCD  = input.Spec{Name: "delta_cd", Label: "Drag added", Quantity: units.Coefficient, Min: 0, Max: 0.5}
	deltaCLM = input.Spec{Name: "delta_clm", Label: "Shift of CL at minimum drag", Quantity: units.Coefficient, Min: -0.5, Max: 1.5}
	groundCL = input.Spec{Name: "ground_cl", Label: "CL in the take-off run", Quantity: units.Coefficient, Min: -0.2, Max: 2.5,
		Note: "Lift coefficient in the attitude of the ground run.", Typical: &input.Typical{Low: 0.1, High: 1, Source: input.CommonPractice}}
	neverExceed = input.Spec{Name: "never_exceed", Label: "Never-exceed speed, CAS", Quantity: units.Speed, Min: 5, Max: 250,
		Note: "The designer's structural limit; it is not computed here."}
	emptyMass  = input.Spec{Name: "empty", Label: "Empty, less powerplant", Quantity: units.Mass, Min: 0.05, Max: 50000}
	itemMass   = input.Spec{Name: "mass", Label: "Mass", Quantity: units.Mass, Min: 0, Max: 20000}
	maxTakeOff = input.Spec{Name: "max_take_off", Label: "Greatest take-off mass", Quantity: units.Mass, Min: 0.1, Max: 100000, Note: "The designer's limit."}
)

// Inputs describes the airframe.
func (a *Airframe) Inputs() []input.Entry {
	table := a.DragGiven == ByTable
	return []input.Entry{
		input.Num(&wingArea, &a.WingArea),
		input.Num(&span, &a.Span),
		input.Num(&height, &a.WingHeight),
		input.Pick("drag_given", "Drag polar given as", &a.DragGiven,
			input.Option{Value: ByParabola, Label: "parabola"}, input.Option{Value: ByTable, Label: "table of CL and CD"}),
		input.Num(&cdMin, &a.CDMin).If(!table),
		input.Num(&efficiency, &a.Efficiency).If(!table),
		input.Num(&clMinDrag, &a.CLMinDrag).If(!table),
		input.Rows(input.Table{Name: "polar", Label: "Drag polar", MinRows: 3, Columns: []*input.Spec{&columnCL, &columnCD},
			Note: "CL, CD of the whole aircraft, clean; one row a line, CL rising from 0 or less to the greatest CLmax."}, &a.Polar).If(table),
		input.Num(&groundCL, &a.GroundCL),
		input.Num(&neverExceed, &a.NeverExceed),
	}
}

// Inputs describes one configuration.
func (c *Configuration) Inputs() []input.Entry {
	return []input.Entry{input.Num(&clMax, &c.CLMax), input.Num(&deltaCD, &c.DeltaCD), input.Num(&deltaCLM, &c.DeltaCLM)}
}

// Inputs describes the weights.
func (w *Weights) Inputs() []input.Entry {
	return []input.Entry{input.Num(&emptyMass, &w.Empty), input.Num(&maxTakeOff, &w.MaxTakeOff)}
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
