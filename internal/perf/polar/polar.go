// Package polar gives the drag coefficient of an aircraft against its lift coefficient.
package polar

import (
	"fmt"
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A Polar gives CD against CL in one configuration. It is immutable and safe for concurrent use.
type Polar struct {
	minimum  float64        // CD where the lift-dependent part vanishes
	k        float64        // lift-dependent drag factor of a parabolic polar
	clMin    float64        // CL of minimum drag, with the configuration's shift
	table    *numeric.Table // CD against CL of a tabulated polar; nil when parabolic
	shift    float64        // added to CL of the table's abscissa
	addition float64        // ΔCD of the configuration
}

var (
	inducedFactor = formula.Must(formula.Formula{
		ID: "polar.induced-factor", Out: formula.Sym("K", "lift-dependent drag factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("A", "aspect ratio", units.Coefficient), formula.Sym("e", "span efficiency", units.Coefficient)},
		Expr: "1/(pi*A*e)", Source: formula.Anderson, Where: "section 2.9.2",
	})
	parabolic = formula.Must(formula.Formula{
		ID: "polar.parabolic", Out: formula.Sym("CD", "drag coefficient", units.Coefficient),
		In: []formula.Symbol{formula.Sym("CDmin", "minimum drag coefficient", units.Coefficient), formula.Sym("dCD", "increment of the configuration", units.Coefficient),
			formula.Sym("phi", "ground-effect factor", units.Coefficient), formula.Sym("K", "lift-dependent drag factor", units.Coefficient),
			formula.Sym("CL", "lift coefficient", units.Coefficient), formula.Sym("CLmd", "lift coefficient of minimum drag", units.Coefficient)},
		Expr: "CDmin + dCD + phi*K*(CL - CLmd)*(CL - CLmd)", Source: formula.Anderson, Where: "section 2.9.2, with the ground-effect factor of section 6.7 on the lift-dependent term",
	})
	tabulated = formula.Must(formula.Formula{
		ID: "polar.tabulated", Out: formula.Sym("CD", "drag coefficient", units.Coefficient),
		In: []formula.Symbol{formula.Sym("CDmin", "least CD of the table", units.Coefficient), formula.Sym("dCD", "increment of the configuration", units.Coefficient),
			formula.Sym("phi", "ground-effect factor", units.Coefficient), formula.Sym("CDt", "CD read from the table at this CL", units.Coefficient)},
		Expr: "CDmin + dCD + phi*(CDt - CDmin)", Source: formula.Anderson, Where: "ground-effect factor of section 6.7 applied to a tabulated polar",
	})
	groundEffect = formula.Must(formula.Formula{
		ID: "polar.ground-effect", Out: formula.Sym("phi", "ground-effect factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("h", "height of the wing above the ground", units.Length), formula.Sym("b", "wing span", units.Length)},
		Expr: "(16*h/b)*(16*h/b)/(1 + (16*h/b)*(16*h/b))", Source: formula.Anderson, Where: "section 6.7, take-off performance",
	})
)

// InducedFactor is K = 1/(π A e) for the aspect ratio a and span efficiency e.
func InducedFactor(a, e float64, w *formula.Working) float64 {
	return w.Step(inducedFactor, 1/(math.Pi*a*e), a, e)
}

// GroundEffect is the factor on lift-dependent drag at the wing height h above
// the ground, for the span b, both in m. It is 1 far from the ground.
func GroundEffect(h, b float64, w *formula.Working) float64 {
	r := 16 * h / b
	return w.Step(groundEffect, r*r/(1+r*r), h, b)
}

// Parabolic returns CD = cdMin + k (CL − clMin)².
func Parabolic(cdMin, k, clMin float64) Polar {
	return Polar{minimum: cdMin, k: k, clMin: clMin}
}

// Tabulated returns a polar through the points (cl, cd), monotone cubic between them.
func Tabulated(cl, cd []float64) (Polar, error) {
	t, err := numeric.NewTable(cl, cd)
	if err != nil {
		return Polar{}, fmt.Errorf("drag polar: %w", err)
	}
	least, _ := t.Range()
	return Polar{minimum: least, table: t}, nil
}

// Configured returns p with the increment of drag deltaCD and with the lift
// coefficient of minimum drag moved by deltaCL, both dimensionless.
func (p Polar) Configured(deltaCD, deltaCL float64) Polar {
	p.addition += deltaCD
	p.clMin += deltaCL
	p.shift += deltaCL
	return p
}

// CD is the drag coefficient at the lift coefficient cl, with ground-effect
// factor phi (1 away from the ground). Build ensures that a table reaches every
// cl that is flown; beyond its ends the end value is held.
func (p *Polar) CD(cl, phi float64, w *formula.Working) float64 {
	if p.table == nil {
		d := cl - p.clMin
		return w.Step(parabolic, p.minimum+p.addition+phi*p.k*d*d, p.minimum, p.addition, phi, p.k, cl, p.clMin)
	}
	read, _ := p.table.At(cl - p.shift)
	return w.Step(tabulated, p.minimum+p.addition+phi*(read-p.minimum), p.minimum, p.addition, phi, read)
}

// Minimum is the least drag coefficient that CD returns.
func (p *Polar) Minimum() float64 { return p.minimum + p.addition }

// Slope is dCD/dCL at cl away from the ground, dimensionless.
func (p *Polar) Slope(cl float64) float64 {
	if p.table == nil {
		return 2 * p.k * (cl - p.clMin)
	}
	return p.table.Slope(cl - p.shift)
}
