package powerplant

import (
	"encoding/json"
	"errors"
	"math"

	"legwright/internal/perf/input"
	"legwright/internal/perf/propeller"
	"legwright/internal/perf/units"
)

// The propellers that a piston engine may turn. The names are stored.
const (
	FixedPitch    = "fixed-pitch"
	ConstantSpeed = "constant-speed"
)

// A PistonPropeller is a piston engine with its propeller and fuel, as the user describes it.
type PistonPropeller struct {
	Mass      float64      `json:"mass"` // engine, propeller, mount and systems installed, dry, in kg
	Engine    PistonEngine `json:"engine"`
	Propeller Propeller    `json:"propeller"`
	Fuel      FuelTank     `json:"fuel"`
}

// A Propeller is a propeller as the user describes it.
type Propeller struct {
	Kind         string      `json:"kind"`         // FixedPitch or ConstantSpeed
	Diameter     float64     `json:"diameter"`     // in m
	Coefficients [][]float64 `json:"coefficients"` // advance ratio, thrust coefficient, power coefficient
	Speed        float64     `json:"speed"`        // governed propeller speed in rev/s
	LossFactor   float64     `json:"loss_factor"`  // of the loaded disc, dimensionless, 0 to 1
}

var (
	plantMass  = input.Spec{Name: "mass", Label: "Powerplant mass", Quantity: units.Mass, Min: 0, Max: 5000, Note: "Engine, propeller, mount, exhaust and oil, installed, without fuel."}
	diameter   = input.Spec{Name: "diameter", Label: "Propeller diameter", Quantity: units.Length, Min: 0.05, Max: 6}
	propSpeed  = input.Spec{Name: "speed", Label: "Governed propeller speed", Quantity: units.Rotation, Min: 3, Max: 500}
	lossFactor = input.Spec{Name: "loss_factor", Label: "Loss factor of the disc", Quantity: units.Coefficient, Min: 0.6, Max: 0.95,
		Note: "Share of the shaft power that reaches the slipstream.", Typical: &input.Typical{Low: 0.78, High: 0.9, Source: input.CommonPractice}}
	columnJ  = input.Spec{Name: "j", Label: "Advance ratio", Quantity: units.Coefficient, Min: 0, Max: 10, Note: "V/(n D) with n in turns per second.", Also: []string{"V/nD", "V/(n D)", "adv ratio"}}
	columnCT = input.Spec{Name: "ct", Label: "CT", Quantity: units.Coefficient, Min: -1, Max: 1, Note: "T/(ρ n² D⁴) with n in turns per second.", Also: []string{"thrust coefficient", "thrust coeff"}}
	columnCP = input.Spec{Name: "cp", Label: "CP", Quantity: units.Coefficient, Min: -1, Max: 1, Note: "P/(ρ n³ D⁵) with n in turns per second; 2π times a torque coefficient.", Also: []string{"power coefficient", "power coeff"}}
)

// Inputs describes what belongs to the powerplant as a whole.
func (p *PistonPropeller) Inputs() []input.Entry {
	return []input.Entry{input.Num(&plantMass, &p.Mass)}
}

// rowEfficiency is J CT/CP, by the definitions of the three; nothing where the propeller does not pull.
var rowEfficiency = []input.Derived{{
	Spec: &input.Spec{Name: "eta", Label: "Efficiency", Quantity: units.Fraction, Min: -1e3, Max: 1e3, Also: []string{"η", "efficiency", "propeller efficiency", "eff"}},
	Of: func(row []float64) float64 {
		if row[1] <= 0 || row[2] <= 0 {
			return math.NaN()
		}
		return row[0] * row[1] / row[2]
	},
}}

// Inputs describes the propeller.
func (p *Propeller) Inputs() []input.Entry {
	fixed := p.Kind != ConstantSpeed
	return []input.Entry{
		input.Pick("kind", "Propeller", &p.Kind,
			input.Option{Value: FixedPitch, Label: "fixed pitch, measured coefficients"}, input.Option{Value: ConstantSpeed, Label: "constant speed, loaded disc"}),
		input.Num(&diameter, &p.Diameter),
		input.Rows(input.Table{Name: "coefficients", Label: "Coefficients", MinRows: 3, Columns: []*input.Spec{&columnJ, &columnCT, &columnCP}, Derived: rowEfficiency,
			Note: "Advance ratio, CT, CP; one row a line; J from 0 (at rest) to where the thrust has gone."}, &p.Coefficients).If(fixed),
		input.Num(&propSpeed, &p.Speed).If(!fixed),
		input.Num(&lossFactor, &p.LossFactor).If(!fixed),
	}
}

// InstalledMass is the dry mass of the powerplant in kg.
func (p *PistonPropeller) InstalledMass() float64 { return p.Mass }

// Weighs lists the inputs that decide mass.
func (p *PistonPropeller) Weighs() []string { return []string{"mass", "fuel"} }

// Stores is the fuel aboard.
func (p *PistonPropeller) Stores() Stores { return p.Fuel.stores() }

// Build assembles the powerplant. Its errors are input errors with paths relative to p.
func (p *PistonPropeller) Build() (Powerplant, error) {
	errs := []error{input.Within("fuel", p.Fuel.check())}
	e, err := p.Engine.build()
	errs = append(errs, input.Within("engine", err))
	if err != nil {
		return nil, errors.Join(errs...)
	}
	plant, err := p.assemble(e)
	errs = append(errs, err)
	return plant, errors.Join(errs...)
}

func (p *PistonPropeller) assemble(e *engine) (Powerplant, error) {
	if p.Propeller.Kind == ConstantSpeed {
		if n := p.Propeller.Speed * p.Engine.GearRatio; n > p.Engine.Redline*(1+1e-9) {
			return nil, &input.Error{Path: "propeller.speed", Spec: &propSpeed, Text: units.Metric.Format(units.Rotation, p.Propeller.Speed), Err: input.ErrConflict,
				Accepts: "it turns the engine at " + units.Metric.Format(units.Rotation, n) + ", above its greatest speed"}
		}
		return &constantSpeed{engine: e, disc: propeller.Disc{Diameter: p.Propeller.Diameter, Loss: p.Propeller.LossFactor}, speed: p.Propeller.Speed}, nil
	}
	prop, err := propeller.NewFixed(p.Propeller.Diameter, p.Propeller.Coefficients)
	if err != nil {
		return nil, &input.Error{Path: "propeller.coefficients", Text: err.Error(), Accepts: "rising J, at least three rows", Err: input.ErrOrder}
	}
	return &fixedPitch{engine: e, prop: prop}, nil
}

// clone copies p so that the copy shares no table with it.
func (p *PistonPropeller) clone() Model {
	var c PistonPropeller
	text, err := json.Marshal(p)
	if err == nil {
		err = json.Unmarshal(text, &c)
	}
	if err != nil {
		panic("powerplant: " + err.Error())
	}
	return &c
}
