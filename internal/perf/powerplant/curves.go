package powerplant

import (
	"math"

	"legwright/internal/perf/atmos"
)

// Curves is what an engine on a propeller can show of itself beside what Run
// answers. A powerplant need not have it: callers ask by type assertion.
type Curves interface {
	// Engine describes the engine.
	Engine() EngineFacts

	// FullPower is the power in W, >= 0, that the engine offers its propeller
	// at full throttle in air a when the engine turns at n rev/s, >= 0.
	FullPower(a *atmos.Air, n float64) float64

	// Propeller describes the propeller.
	Propeller() PropellerFacts

	// Coefficients gives CT and CP at the advance ratio j, both dimensionless. It
	// is not known outside the table, nor for a propeller that has none.
	Coefficients(j float64) (ct, cp float64, known bool)
}

var (
	_ Curves = (*fixedPitch)(nil)
	_ Curves = (*constantSpeed)(nil)
)

// EngineFacts are the fixed numbers of an engine.
type EngineFacts struct {
	RatedPower       float64 // brake power at sea level on the standard day in W, > 0
	RatedSpeed       float64 // engine speed of the rated power, or the greatest allowed when that is less, in rev/s, > 0
	Greatest         float64 // greatest allowed engine speed in rev/s, > 0
	Lowest           float64 // first speed of the power table in rev/s; 0 when power is given by rating
	CriticalAltitude float64 // pressure altitude to which power is held in m; 0 when unsupercharged
	GearRatio        float64 // engine turns for one of the propeller, dimensionless, > 0
}

// PropellerFacts are the fixed numbers of a propeller.
type PropellerFacts struct {
	Diameter  float64   // in m, > 0
	Governed  float64   // speed that the governor holds in rev/s; 0 for a fixed pitch
	Loss      float64   // loss factor of the loaded disc, dimensionless; 0 when known by a table
	Low, High float64   // ends of the table within which power is absorbed, advance ratio, dimensionless; both 0 without a table
	Given     []float64 // advance ratios of the rows as entered, dimensionless
}

func (e *engine) facts() EngineFacts {
	s := &e.spec
	f := EngineFacts{RatedPower: e.rated, RatedSpeed: s.RatedSpeed, Greatest: s.Redline, Lowest: e.lowest, CriticalAltitude: s.CriticalAltitude, GearRatio: s.GearRatio}
	if e.curve != nil {
		best := 0.0
		for _, row := range s.PowerCurve {
			if row[1] > best {
				best, f.RatedSpeed = row[1], row[0]
			}
		}
	}
	f.RatedSpeed = math.Min(f.RatedSpeed, s.Redline)
	return f
}

// fullPower is the installed power in W at full throttle at the engine speed n in rev/s.
func (e *engine) fullPower(a *atmos.Air, n float64) float64 {
	return e.power(1, e.lapse(a, nil), n/e.spec.GearRatio, nil)
}

// Engine describes the engine.
func (p *fixedPitch) Engine() EngineFacts { return p.engine.facts() }

// FullPower is the installed power in W at the engine speed n in rev/s.
func (p *fixedPitch) FullPower(a *atmos.Air, n float64) float64 { return p.engine.fullPower(a, n) }

// Propeller describes the propeller by its table.
func (p *fixedPitch) Propeller() PropellerFacts {
	low, high := p.prop.Range()
	return PropellerFacts{Diameter: p.prop.Diameter, Low: low, High: high, Given: p.prop.Given()}
}

// Coefficients reads the table.
func (p *fixedPitch) Coefficients(j float64) (ct, cp float64, known bool) {
	low, high := p.prop.Range()
	if !(j >= low && j <= high) {
		return 0, 0, false
	}
	return p.prop.CT(j), p.prop.CP(j), true
}

// Engine describes the engine.
func (p *constantSpeed) Engine() EngineFacts { return p.engine.facts() }

// FullPower is the installed power in W at the engine speed n in rev/s.
func (p *constantSpeed) FullPower(a *atmos.Air, n float64) float64 { return p.engine.fullPower(a, n) }

// Propeller describes the disc.
func (p *constantSpeed) Propeller() PropellerFacts {
	return PropellerFacts{Diameter: p.disc.Diameter, Governed: p.speed, Loss: p.disc.Loss}
}

// Coefficients are not known of a disc: its blades turn to whatever takes the power.
func (p *constantSpeed) Coefficients(float64) (ct, cp float64, known bool) { return 0, 0, false }
