package powerplant

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// How a piston engine's full-throttle power and its consumption are given.
const (
	ByRating   = "rating"
	ByTable    = "table"
	ByConstant = "constant"
)

// A PistonEngine is a piston engine as the user describes it.
type PistonEngine struct {
	PowerGiven       string      `json:"power_given"`       // ByRating or ByTable
	RatedPower       float64     `json:"rated_power"`       // at sea level, standard day, in W
	RatedSpeed       float64     `json:"rated_speed"`       // engine speed of the rated power in rev/s
	PowerCurve       [][]float64 `json:"power_curve"`       // engine speed in rev/s, full-throttle sea-level power in W
	Redline          float64     `json:"redline"`           // greatest engine speed in rev/s
	CriticalAltitude float64     `json:"critical_altitude"` // pressure altitude to which power is held, in m; 0 when unsupercharged
	GearRatio        float64     `json:"gear_ratio"`        // engine turns per propeller turn, dimensionless
	InstallationLoss float64     `json:"installation_loss"` // fraction of power lost to intake, cooling and exhaust, 0 to 1
	AccessoryPower   float64     `json:"accessory_power"`   // taken by generator and pumps, in W
	ConsumptionGiven string      `json:"consumption_given"` // ByConstant or ByTable
	Consumption      float64     `json:"consumption"`       // fuel per brake work in kg/J
	ConsumptionCurve [][]float64 `json:"consumption_curve"` // fraction of rated power, consumption in kg/J
	IdleFlow         float64     `json:"idle_flow"`         // fuel flow below which the engine does not go, in kg/s
}

var (
	ratedPower = input.Spec{Name: "rated_power", Label: "Rated power", Quantity: units.Power, Min: 100, Max: 3e6, Note: "Brake power at full throttle, sea level, standard day."}
	ratedSpeed = input.Spec{Name: "rated_speed", Label: "Rated speed", Quantity: units.Rotation, Min: 5, Max: 500, Note: "Engine speed of the rated power."}
	redline    = input.Spec{Name: "redline", Label: "Greatest speed", Quantity: units.Rotation, Min: 5, Max: 500, Note: "Engine speed that throttling never lets be passed."}
	critical   = input.Spec{Name: "critical_altitude", Label: "Critical altitude", Quantity: units.Altitude, Min: 0, Max: 12000, Note: "Pressure altitude to which a turbocharger holds sea-level power; 0 when there is none."}
	gearRatio  = input.Spec{Name: "gear_ratio", Label: "Reduction ratio", Quantity: units.Coefficient, Min: 0.3, Max: 10, Note: "Engine turns for one propeller turn; 1 for direct drive."}
	loss       = input.Spec{Name: "installation_loss", Label: "Installation loss", Quantity: units.Fraction, Min: 0, Max: 0.5,
		Note: "Intake, cooling and exhaust against the test stand.", Typical: &input.Typical{Low: 0.02, High: 0.1, Source: input.CommonPractice}}
	accessory   = input.Spec{Name: "accessory_power", Label: "Accessory power", Quantity: units.Power, Min: 0, Max: 1e5, Note: "Generator, vacuum and hydraulic pumps."}
	consumption = input.Spec{Name: "consumption", Label: "Fuel consumption", Quantity: units.Consumption, Min: 1e-8, Max: 1e-6,
		Note:    "Fuel per brake work.",
		Also:    []string{"BSFC", "SFC", "specific fuel consumption", "specific consumption", "be"},
		Typical: &input.Typical{Low: 0.38 * 1.68966e-7, High: 0.60 * 1.68966e-7, Source: "0.38 to 0.60 lb/hp·h for four-stroke engines, common practice, no source"}}
	idleFlow   = input.Spec{Name: "idle_flow", Label: "Idle fuel flow", Quantity: units.FuelFlow, Min: 0, Max: 0.05, Note: "Fuel flow with the throttle closed; the flow never falls below it."}
	curveSpeed = input.Spec{Name: "speed", Label: "Engine speed", Quantity: units.Rotation, Min: 1, Max: 500, Note: "Of the crankshaft, before any gearing.",
		Also: []string{"rpm", "n", "revs", "rotational speed", "crankshaft speed"}}
	curvePower = input.Spec{Name: "power", Label: "Full-throttle power", Quantity: units.Power, Min: 1, Max: 3e6, Note: "Brake power at sea level, standard day.",
		Also: []string{"P", "brake power", "shaft power", "rated power", "max power", "kW", "hp", "bhp", "PS"}}
	curveFraction = input.Spec{Name: "fraction", Label: "Share of rated power", Quantity: units.Fraction, Min: 0, Max: 1.2, Note: "Not a share of the lever's travel.",
		Also: []string{"load", "% power", "percent power", "power setting", "power", "share of power"}}
)

// rowTorque is P/(2π n).
var rowTorque = []input.Derived{{
	Spec: &input.Spec{Name: "torque", Label: "Torque", Quantity: units.Torque, Min: -1e9, Max: 1e9, Also: []string{"M", "Q", "T", "Md"}},
	Of:   func(row []float64) float64 { return row[1] / (2 * math.Pi * row[0]) },
}}

// Inputs describes the engine's inputs.
func (e *PistonEngine) Inputs() []input.Entry {
	table := e.PowerGiven == ByTable
	return []input.Entry{
		input.Pick("power_given", "Full-throttle power given as", &e.PowerGiven,
			input.Option{Value: ByRating, Label: "rated power"}, input.Option{Value: ByTable, Label: "table against speed"}),
		input.Num(&ratedPower, &e.RatedPower).If(!table),
		input.Num(&ratedSpeed, &e.RatedSpeed).If(!table),
		input.Rows(input.Table{Name: "power_curve", Label: "Full-throttle power", MinRows: 2, Columns: []*input.Spec{&curveSpeed, &curvePower}, Derived: rowTorque,
			Note: "Sea level, standard day; one row a line."}, &e.PowerCurve).If(table),
		input.Num(&redline, &e.Redline),
		input.Num(&critical, &e.CriticalAltitude),
		input.Num(&gearRatio, &e.GearRatio),
		input.Num(&loss, &e.InstallationLoss),
		input.Num(&accessory, &e.AccessoryPower),
		input.Pick("consumption_given", "Consumption given as", &e.ConsumptionGiven,
			input.Option{Value: ByConstant, Label: "one value"}, input.Option{Value: ByTable, Label: "table against power"}),
		input.Num(&consumption, &e.Consumption).If(e.ConsumptionGiven != ByTable),
		input.Rows(input.Table{Name: "consumption_curve", Label: "Fuel consumption", MinRows: 2, Columns: []*input.Spec{&curveFraction, &consumption},
			Note: "Against the share of rated power; one row a line."}, &e.ConsumptionCurve).If(e.ConsumptionGiven == ByTable),
		input.Num(&idleFlow, &e.IdleFlow),
	}
}

// engine is a PistonEngine ready to run.
type engine struct {
	spec        PistonEngine
	rated       float64        // rated brake power in W
	curve       *numeric.Table // nil when given by rating
	lowest      float64        // first speed of the curve in rev/s
	consumption *numeric.Table // nil when constant
	criticalSig float64        // density ratio at the critical altitude
}

func (e *PistonEngine) build() (*engine, error) {
	b := &engine{spec: *e, rated: e.RatedPower, lowest: 0, criticalSig: 1}
	if e.PowerGiven == ByTable {
		var err error
		var top float64
		if b.curve, err = columns(e.PowerCurve); err != nil {
			return nil, input.Within("power_curve", &input.Error{Err: input.ErrOrder, Text: err.Error(), Accepts: "rising speeds"})
		}
		b.lowest, top = b.curve.Bounds()
		_, b.rated = b.curve.Range()
		if e.Redline > top || e.Redline < b.lowest {
			return nil, &input.Error{Path: "redline", Spec: &redline, Text: units.Metric.Format(units.Rotation, e.Redline), Err: input.ErrConflict,
				Accepts: "the power table runs from " + units.Metric.Format(units.Rotation, b.lowest) + " to " + units.Metric.Format(units.Rotation, top) + " and must reach the greatest speed"}
		}
	}
	if e.ConsumptionGiven == ByTable {
		var err error
		if b.consumption, err = columns(e.ConsumptionCurve); err != nil {
			return nil, input.Within("consumption_curve", &input.Error{Err: input.ErrOrder, Text: err.Error(), Accepts: "rising shares of power"})
		}
	}
	if e.CriticalAltitude > 0 {
		t, p, err := atmos.Standard(e.CriticalAltitude)
		if err != nil {
			return nil, err
		}
		b.criticalSig = p / (atmos.GasConstant * t) / atmos.SeaLevelDensity
	}
	return b, nil
}

func columns(rows [][]float64) (*numeric.Table, error) {
	x, y := make([]float64, len(rows)), make([]float64, len(rows))
	for i, r := range rows {
		x[i], y[i] = r[0], r[1]
	}
	return numeric.NewTable(x, y)
}

var (
	lapse = formula.Must(formula.Formula{
		ID: "piston.lapse", Out: formula.Sym("phi", "power against sea-level power", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("sigma", "density ratio of the dry air", units.Coefficient)},
		Expr: "sigma - (1 - sigma)/7.55", Source: formula.GaggFerrar, Where: "as printed in Raymer 1992, eq. 13.10; dry-air density after NACA TR 426",
	})
	turboLapse = formula.Must(formula.Formula{
		ID: "piston.turbo-lapse", Out: formula.Sym("phi", "power against sea-level power", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("sigma", "density ratio of the dry air", units.Coefficient), formula.Sym("sigmac", "density ratio at the critical altitude", units.Coefficient)},
		Expr: "min(1, (sigma - (1 - sigma)/7.55)/(sigmac - (1 - sigmac)/7.55))", Source: formula.GaggFerrar, Where: "scaled to be continuous at the critical altitude",
	})
	installed = formula.Must(formula.Formula{
		ID: "piston.installed-power", Out: formula.Sym("P", "installed power at the propeller", units.Power),
		In: []formula.Symbol{formula.Sym("f", "throttle", units.Fraction), formula.Sym("Psl", "sea-level full-throttle power at this speed", units.Power), formula.Sym("phi", "power against sea-level power", units.Coefficient),
			formula.Sym("l", "installation loss", units.Fraction), formula.Sym("Pacc", "accessory power", units.Power)},
		Expr: "max(0, f*Psl*phi*(1 - l) - Pacc)", Source: formula.Definition,
	})
	fuelFlow = formula.Must(formula.Formula{
		ID: "piston.fuel-flow", Out: formula.Sym("mdot", "fuel flow", units.FuelFlow),
		In:   []formula.Symbol{formula.Sym("c", "specific fuel consumption", units.Consumption), formula.Sym("Pb", "brake power", units.Power), formula.Sym("idle", "idle fuel flow", units.FuelFlow)},
		Expr: "max(idle, c*Pb)", Source: formula.Definition,
	})
	brakePower = formula.Must(formula.Formula{
		ID: "piston.brake-power", Out: formula.Sym("Pb", "brake power", units.Power),
		In:   []formula.Symbol{formula.Sym("P", "power absorbed by the propeller", units.Power), formula.Sym("Pacc", "accessory power", units.Power), formula.Sym("l", "installation loss", units.Fraction)},
		Expr: "(P + Pacc)/(1 - l)", Source: formula.Definition,
	})
)

// seaLevel is the full-throttle sea-level brake power in W at the engine speed n
// in rev/s. Below a table's first row, and below the rated speed, torque is constant.
func (e *engine) seaLevel(n float64) float64 {
	if e.curve == nil {
		return e.rated * math.Min(1, n/e.spec.RatedSpeed)
	}
	p, inside := e.curve.At(n)
	if !inside && n < e.lowest {
		return p * n / e.lowest
	}
	return p
}

// lapse is full-throttle power in air a against sea-level power. Zero where the air is too thin to run.
func (e *engine) lapse(a *atmos.Air, w *formula.Working) float64 {
	sigma := a.DryDensity / atmos.SeaLevelDensity
	if e.spec.CriticalAltitude > 0 {
		c := e.criticalSig
		return math.Max(0, w.Step(turboLapse, math.Min(1, (sigma-(1-sigma)/7.55)/(c-(1-c)/7.55)), sigma, c))
	}
	return math.Max(0, w.Step(lapse, sigma-(1-sigma)/7.55, sigma))
}

// power is the installed power in W at the propeller with throttle f, lapse phi and propeller speed n in rev/s.
func (e *engine) power(f, phi, n float64, w *formula.Working) float64 {
	sl := e.seaLevel(n * e.spec.GearRatio)
	s := &e.spec
	return w.Step(installed, math.Max(0, f*sl*phi*(1-s.InstallationLoss)-s.AccessoryPower), f, sl, phi, s.InstallationLoss, s.AccessoryPower)
}

// burn completes out with what the engine draws to put p in W into the propeller.
func (e *engine) burn(out *Output, p float64, w *formula.Working) {
	s := &e.spec
	brake := w.Step(brakePower, (p+s.AccessoryPower)/(1-s.InstallationLoss), p, s.AccessoryPower, s.InstallationLoss)
	out.Fraction = brake / e.rated
	c := s.Consumption
	if e.consumption != nil {
		c, _ = e.consumption.At(out.Fraction)
	}
	out.FuelFlow = w.Step(fuelFlow, math.Max(s.IdleFlow, c*brake), c, brake, s.IdleFlow)
}

// top is the greatest propeller speed in rev/s.
func (e *engine) top() float64 { return e.spec.Redline / e.spec.GearRatio }
