package powerplant

import (
	"encoding/json"

	"legwright/internal/perf/input"
)

// A Model is a powerplant as a user describes it.
type Model interface {
	// Build assembles the powerplant; errors are input errors with paths relative to the model.
	Build() (Powerplant, error)
	// Stores is the energy aboard at the start.
	Stores() Stores
	// InstalledMass is the dry mass of the powerplant in kg.
	InstalledMass() float64
	// Weighs lists the inputs that decide mass, by paths relative to the model.
	Weighs() []string
	clone() Model
}

// A Kind is an entry in the list of powerplants on offer.
type Kind struct {
	Name  string // stored in documents; never reused
	Label string
	New   func() Model // typical values: the form's defaults and the subject of the contract test
}

// Kinds lists every powerplant kind. To add one, write its file and add a line.
var Kinds = []Kind{
	{"piston-propeller", "Piston engine and propeller", func() Model { return typicalPiston() }},
}

// Lookup finds a kind by its stored name.
func Lookup(name string) (Kind, bool) {
	for _, k := range Kinds {
		if k.Name == name {
			return k, true
		}
	}
	return Kind{}, false
}

// Spec is the powerplant of a variant: its kind and the kind's own inputs.
type Spec struct {
	Kind  string `json:"kind"`
	Model Model  `json:"values"`
}

type wire struct {
	Kind   string          `json:"kind"`
	Values json.RawMessage `json:"values"`
}

// MarshalJSON writes {"kind": …, "values": …}.
func (s Spec) MarshalJSON() ([]byte, error) {
	values, err := json.Marshal(s.Model)
	if err != nil {
		return nil, err
	}
	return json.Marshal(wire{s.Kind, values})
}

// UnmarshalJSON reads what MarshalJSON writes; an unknown kind is an input error.
func (s *Spec) UnmarshalJSON(text []byte) error {
	var w wire
	if err := json.Unmarshal(text, &w); err != nil {
		return err
	}
	k, ok := Lookup(w.Kind)
	if !ok {
		return &input.Error{Path: "kind", Text: w.Kind, Accepts: kindNames(), Err: input.ErrChoice}
	}
	m := k.New()
	if err := json.Unmarshal(w.Values, m); err != nil {
		return err
	}
	s.Kind, s.Model = w.Kind, m
	return nil
}

func kindNames() string {
	text := ""
	for i, k := range Kinds {
		if i > 0 {
			text += ", "
		}
		text += k.Name
	}
	return text
}

// Clone copies s so that the copy shares nothing with it.
func (s Spec) Clone() Spec {
	if s.Model != nil {
		s.Model = s.Model.clone()
	}
	return s
}

// typicalPiston is an invented engine of a light two-seater with an invented
// propeller; every value is a placeholder.
func typicalPiston() *PistonPropeller {
	return &PistonPropeller{
		Mass: 95,
		Engine: PistonEngine{
			PowerGiven: ByRating, RatedPower: 75e3, RatedSpeed: 45, Redline: 46,
			PowerCurve: [][]float64{{30, 50e3}, {40, 68e3}, {46, 76e3}}, GearRatio: 1, InstallationLoss: 0.03, AccessoryPower: 500,
			ConsumptionGiven: ByConstant, Consumption: 8.1e-8, ConsumptionCurve: [][]float64{{0.3, 9.5e-8}, {0.6, 8.2e-8}, {1, 8.6e-8}}, IdleFlow: 8e-4,
		},
		Propeller: Propeller{
			Kind: FixedPitch, Diameter: 1.75, Speed: 45, LossFactor: 0.85,
			Coefficients: [][]float64{
				{0, 0.104, 0.059}, {0.1, 0.102, 0.0593}, {0.2, 0.098, 0.0585}, {0.3, 0.0915, 0.0578}, {0.4, 0.083, 0.0558},
				{0.5, 0.0725, 0.0525}, {0.6, 0.06, 0.0477}, {0.7, 0.046, 0.0408}, {0.8, 0.0315, 0.0321}, {0.85, 0.0236, 0.0267},
				{0.9, 0.0155, 0.021}, {0.96, 0.005, 0.0141}, {1, -0.0025, 0.0098}, {1.08, -0.0135, 0.0012},
			},
		},
		Fuel: FuelTank{Kind: "avgas-100ll", FuelGiven: ByVolume, Volume: 0.09, Capacity: 0.1, Unusable: 0.002, Mass: 64.8, Density: 720},
	}
}
