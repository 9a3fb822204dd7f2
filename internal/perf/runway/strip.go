// Package runway computes take-off and landing distances by integration,
// segment by segment.
package runway

import (
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A Strip is a runway as entered.
type Strip struct {
	Name      string  `json:"name"`
	Length    float64 `json:"length"`    // usable, in m
	Elevation float64 `json:"elevation"` // above sea level, in m
	Slope     float64 `json:"slope"`     // rise over run in the direction of take-off, dimensionless
	Surface   string  `json:"surface"`   // name of one of Surfaces
	HeadWind  float64 `json:"head_wind"` // along the strip in m/s, negative from behind
	Obstacle  float64 `json:"obstacle"`  // height to clear, in m
}

// A Surface has friction coefficients for rolling and braked wheels.
type Surface struct {
	Name    string
	Label   string
	Rolling float64 // rolling friction coefficient, dimensionless
	Braking float64 // braking friction coefficient, dimensionless
}

// Surfaces lists the ground covers on offer. Source: D. P. Raymer, Aircraft Design: A
// Conceptual Approach, 2nd edition, AIAA, 1992, table 17.1, from memory; the middle
// of each printed range. Dry short grass stands midway between its hard and soft turf,
// and snow is its value for ice. Rolling on soft ground is common practice, no source.
var Surfaces = []Surface{
	{"dry-asphalt", "dry asphalt", 0.04, 0.4},
	{"wet-asphalt", "wet asphalt", 0.05, 0.225},
	{"dry-grass", "dry short grass", 0.06, 0.3},
	{"wet-grass", "wet grass", 0.08, 0.2},
	{"soft-ground", "soft ground", 0.1, 0.2},
	{"ice", "snow or ice", 0.02, 0.08},
}

// LookupSurface finds a surface by its stored name; ok is false for an unknown one.
func LookupSurface(name string) (s Surface, ok bool) {
	for _, s := range Surfaces {
		if s.Name == name {
			return s, true
		}
	}
	return Surface{}, false
}

var (
	stripLength = input.Spec{Name: "length", Label: "Strip length", Quantity: units.FieldLength, Min: 1, Max: 6000}
	elevation   = input.Spec{Name: "elevation", Label: "Elevation", Quantity: units.Altitude, Min: -450, Max: 6000}
	slope       = input.Spec{Name: "slope", Label: "Slope, up positive", Quantity: units.Fraction, Min: -0.2, Max: 0.2,
		Note: "In the direction of take-off; the landing is flown in the same direction.", Typical: &input.Typical{Low: -0.03, High: 0.03, Source: input.CommonPractice}}
	headWind = input.Spec{Name: "head_wind", Label: "Head wind", Quantity: units.Speed, Min: -15, Max: 25, Note: "Negative from behind.", Decided: true}
	obstacle = input.Spec{Name: "obstacle", Label: "Obstacle height", Quantity: units.Height, Min: 0, Max: 60, Note: "15.24 m (50 ft) is the screen of the published rules."}
)

// Inputs describes the strip.
func (s *Strip) Inputs() []input.Entry {
	options := make([]input.Option, len(Surfaces))
	for i, f := range Surfaces {
		options[i] = input.Option{Value: f.Name, Label: f.Label}
	}
	return []input.Entry{
		input.Line("name", "Strip", 80, &s.Name),
		input.Num(&stripLength, &s.Length),
		input.Num(&elevation, &s.Elevation),
		input.Num(&slope, &s.Slope),
		input.Pick("surface", "Surface", &s.Surface, options...),
		input.Num(&headWind, &s.HeadWind),
		input.Num(&obstacle, &s.Obstacle),
	}
}

// A Technique is how the aircraft is flown off and onto the strip, as entered.
type Technique struct {
	LiftOffFactor   float64 `json:"lift_off_factor"`  // lift-off speed over stall speed, dimensionless
	ClimbOutFactor  float64 `json:"climb_out_factor"` // speed at the obstacle over stall speed, dimensionless
	RotationTime    float64 `json:"rotation_time"`    // in s
	ApproachFactor  float64 `json:"approach_factor"`  // approach speed over stall speed, dimensionless
	ApproachAngle   float64 `json:"approach_angle"`   // of the path below the horizontal, in rad
	FreeRollTime    float64 `json:"free_roll_time"`   // between touchdown and braking, in s
	TakeOffFactor   float64 `json:"take_off_factor"`  // safety factor on the take-off distance, dimensionless
	LandingFactor   float64 `json:"landing_factor"`   // safety factor on the landing distance, dimensionless
	BrakingFraction float64 `json:"braking_fraction"` // of the surface's braking friction that is used, 0 to 1
}

var (
	liftOffFactor   = input.Spec{Name: "lift_off_factor", Label: "Lift-off over stall speed", Quantity: units.Coefficient, Min: 1.02, Max: 1.6, Typical: &input.Typical{Low: 1.1, High: 1.2, Source: "14 CFR 23.51, 2003 text"}}
	climbOutFactor  = input.Spec{Name: "climb_out_factor", Label: "Climb-out over stall speed", Quantity: units.Coefficient, Min: 1.05, Max: 2, Typical: &input.Typical{Low: 1.2, High: 1.4, Source: "14 CFR 23.51, 2003 text, at least 1.2 at 50 ft"}}
	rotationTime    = input.Spec{Name: "rotation_time", Label: "Rotation time", Quantity: units.ShortTime, Min: 0, Max: 10, Typical: &input.Typical{Low: 0.5, High: 3, Source: "Raymer 1992, section 17.8: 1 s for small aircraft"}}
	approachFactor  = input.Spec{Name: "approach_factor", Label: "Approach over stall speed", Quantity: units.Coefficient, Min: 1.1, Max: 2, Typical: &input.Typical{Low: 1.3, High: 1.5, Source: "14 CFR 23.73, at least 1.3"}}
	approachAngle   = input.Spec{Name: "approach_angle", Label: "Approach angle", Quantity: units.Angle, Min: 0.01, Max: 0.35, Typical: &input.Typical{Low: 0.05, High: 0.11, Source: "3 to 6 degrees, common practice, no source"}}
	freeRollTime    = input.Spec{Name: "free_roll_time", Label: "Free roll before braking", Quantity: units.ShortTime, Min: 0, Max: 10, Typical: &input.Typical{Low: 1, High: 3, Source: "Raymer 1992, section 17.9: 1 to 3 s"}}
	takeOffFactor   = input.Spec{Name: "take_off_factor", Label: "Take-off safety factor", Quantity: units.Coefficient, Min: 1, Max: 3, Typical: &input.Typical{Low: 1.25, High: 1.33, Source: "UK CAA SafetySense Leaflet 7c, 2013: 1.33, from memory"}}
	landingFactor   = input.Spec{Name: "landing_factor", Label: "Landing safety factor", Quantity: units.Coefficient, Min: 1, Max: 3, Typical: &input.Typical{Low: 1.43, High: 1.67, Source: "UK CAA SafetySense Leaflet 7c, 2013: 1.43, from memory"}}
	brakingFraction = input.Spec{Name: "braking_fraction", Label: "Braking used", Quantity: units.Fraction, Min: 0, Max: 1, Typical: &input.Typical{Low: 0.5, High: 1, Source: input.CommonPractice},
		Note: "Of the friction that the surface gives a braked wheel; 0 for an aircraft without brakes."}
)

// Inputs describes the technique.
func (t *Technique) Inputs() []input.Entry {
	return []input.Entry{
		input.Num(&liftOffFactor, &t.LiftOffFactor), input.Num(&climbOutFactor, &t.ClimbOutFactor), input.Num(&rotationTime, &t.RotationTime),
		input.Num(&approachFactor, &t.ApproachFactor), input.Num(&approachAngle, &t.ApproachAngle), input.Num(&freeRollTime, &t.FreeRollTime),
		input.Num(&brakingFraction, &t.BrakingFraction), input.Num(&takeOffFactor, &t.TakeOffFactor), input.Num(&landingFactor, &t.LandingFactor),
	}
}

// StandardTechnique has the published speeds and the published light-aircraft
// safety factors: UK CAA SafetySense Leaflet 7c, 2013, from memory.
func StandardTechnique() Technique {
	return Technique{LiftOffFactor: 1.1, ClimbOutFactor: 1.2, RotationTime: 1, ApproachFactor: 1.3, ApproachAngle: 3 * 3.14159265358979 / 180,
		FreeRollTime: 1, TakeOffFactor: 1.33, LandingFactor: 1.43, BrakingFraction: 0.75}
}

// A Place is a strip on a day: the air on it and the ground under it.
type Place struct {
	Strip    Strip
	Surface  Surface
	Air      atmos.Air
	HeadWind float64 // along the strip in m/s, negative from behind
}

// On resolves the strip on the entered day. Errors are input errors or atmosphere errors.
func (s Strip) On(day atmos.Spec) (Place, error) {
	surface, ok := LookupSurface(s.Surface)
	if !ok {
		return Place{}, &input.Error{Path: "surface", Text: s.Surface, Err: input.ErrChoice}
	}
	hp := atmos.PressureAltitude(s.Elevation, day.QNH)
	d, err := day.Day(hp)
	if err != nil {
		return Place{}, err
	}
	air, err := d.At(hp, nil)
	if err != nil {
		return Place{}, err
	}
	return Place{Strip: s, Surface: surface, Air: air, HeadWind: s.HeadWind}, nil
}

// Screen is the height in m to which published take-off and landing distances go: 50 ft, 14 CFR 23.53 and 23.75.
const Screen = 15.24
