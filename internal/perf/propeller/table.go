// Package propeller models propellers: a fixed-pitch propeller by its measured
// coefficients, and a constant-speed propeller as a loaded disc.
package propeller

import (
	"fmt"
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/units"
)

// A Fixed is a fixed-pitch propeller known by thrust and power coefficients
// against advance ratio: CT = T/(ρ n² D⁴), CP = P/(ρ n³ D⁵), J = V/(n D).
type Fixed struct {
	Diameter float64 // in m
	ct, cp   *numeric.Table
	jMax     float64 // largest useful J: where CP falls to zero, else the end of the table
	jMin     float64
	given    []float64 // advance ratios of the rows
}

// NewFixed builds a propeller of the given diameter in m from rows of J, CT, CP with rising J.
func NewFixed(diameter float64, rows [][]float64) (*Fixed, error) {
	j, ct, cp := make([]float64, len(rows)), make([]float64, len(rows)), make([]float64, len(rows))
	for i, r := range rows {
		j[i], ct[i], cp[i] = r[0], r[1], r[2]
	}
	p := &Fixed{Diameter: diameter, given: j}
	err := possible(rows)
	if err != nil {
		return nil, err
	}
	if p.ct, err = numeric.NewTable(j, ct); err != nil {
		return nil, fmt.Errorf("thrust coefficients: %w", err)
	}
	if p.cp, err = numeric.NewTable(j, cp); err != nil {
		return nil, fmt.Errorf("power coefficients: %w", err)
	}
	p.jMin, p.jMax = p.ct.Bounds()
	if end, _ := p.cp.At(p.jMax); end < 0 {
		zero, err := numeric.LastRoot(func(x float64) float64 { y, _ := p.cp.At(x); return y }, p.jMin, p.jMax, 64, 0)
		if err != nil {
			return nil, fmt.Errorf("power coefficients never pass through zero: %w", err)
		}
		p.jMax = zero.X
	}
	return p, nil
}

// Range gives the advance ratios between which the propeller is known to absorb power.
func (p *Fixed) Range() (low, high float64) { return p.jMin, p.jMax }

// CT is the thrust coefficient at advance ratio j within Range.
func (p *Fixed) CT(j float64) float64 { ct, _ := p.ct.At(j); return ct }

// CP is the power coefficient at advance ratio j within Range.
func (p *Fixed) CP(j float64) float64 { cp, _ := p.cp.At(j); return cp }

// Windmills reports whether the table reaches negative thrust, so that an
// idling propeller's drag is known.
func (p *Fixed) Windmills() bool { return p.CT(p.jMax) < 0 }

// possible checks that no row gives more power than it takes, or more static
// thrust than momentum theory allows for its power: CT <= (π/2)^(1/3) CP^(2/3)
// (H. Glauert, Airplane Propellers, 1935, chapter II, in coefficients).
func possible(rows [][]float64) error {
	for i, r := range rows {
		j, ct, cp := r[0], r[1], r[2]
		switch {
		case ct > 0 && cp <= 0:
			return fmt.Errorf("row %d gives thrust without taking power", i+1)
		case ct > 0 && j*ct > cp:
			return fmt.Errorf("row %d has an efficiency of %.2f, which is above 1", i+1, j*ct/cp)
		case ct > 0 && ct > math.Cbrt(math.Pi/2)*math.Cbrt(cp*cp):
			return fmt.Errorf("row %d has more thrust than momentum theory allows for its power, CT %.4f against %.4f", i+1, ct, math.Cbrt(math.Pi/2)*math.Cbrt(cp*cp))
		}
	}
	return nil
}

// A RangeError reports an advance ratio outside a propeller's table.
type RangeError struct {
	J         float64 // advance ratio asked for, dimensionless; 0 with Beyond
	Low, High float64 // ends of the table, dimensionless
	Beyond    bool    // an advance ratio somewhere above High is needed
}

func (e *RangeError) Error() string {
	if e.Beyond {
		return fmt.Sprintf("so little thrust needs an advance ratio above %.3f, the end of the propeller table", e.High)
	}
	return fmt.Sprintf("an advance ratio of %.3f lies outside the propeller table, %.3f to %.3f", e.J, e.Low, e.High)
}

var (
	advanceRatio = formula.Must(formula.Formula{
		ID: "propeller.advance-ratio", Out: formula.Sym("J", "advance ratio", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("V", "true airspeed", units.Speed), formula.Sym("n", "propeller speed in rev/s", units.Coefficient), formula.Sym("D", "propeller diameter", units.Length)},
		Expr: "V/(n*D)", Source: formula.Glauert, Where: "chapter VII",
	})
	thrust = formula.Must(formula.Formula{
		ID: "propeller.thrust", Out: formula.Sym("T", "propeller thrust", units.Force),
		In: []formula.Symbol{formula.Sym("CT", "thrust coefficient at J, from the table", units.Coefficient), formula.Sym("rho", "air density", units.Density),
			formula.Sym("n", "propeller speed in rev/s", units.Coefficient), formula.Sym("D", "propeller diameter", units.Length)},
		Expr: "CT*rho*n*n*D*D*D*D", Source: formula.Glauert, Where: "chapter VII",
	})
	power = formula.Must(formula.Formula{
		ID: "propeller.power", Out: formula.Sym("P", "power absorbed by the propeller", units.Power),
		In: []formula.Symbol{formula.Sym("CP", "power coefficient at J, from the table", units.Coefficient), formula.Sym("rho", "air density", units.Density),
			formula.Sym("n", "propeller speed in rev/s", units.Coefficient), formula.Sym("D", "propeller diameter", units.Length)},
		Expr: "CP*rho*n*n*n*D*D*D*D*D", Source: formula.Glauert, Where: "chapter VII",
	})
	efficiency = formula.Must(formula.Formula{
		ID: "propeller.efficiency", Out: formula.Sym("eta", "propeller efficiency", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("T", "propeller thrust", units.Force), formula.Sym("V", "true airspeed", units.Speed), formula.Sym("P", "power absorbed by the propeller", units.Power)},
		Expr: "T*V/P", Source: formula.Definition,
	})
	tipMach = formula.Must(formula.Formula{
		ID: "propeller.tip-mach", Out: formula.Sym("Mtip", "helical tip Mach number", units.Coefficient),
		In: []formula.Symbol{formula.Sym("V", "true airspeed", units.Speed), formula.Sym("n", "propeller speed in rev/s", units.Coefficient),
			formula.Sym("D", "propeller diameter", units.Length), formula.Sym("a", "speed of sound", units.Speed)},
		Expr: "sqrt(V*V + pi*n*D*pi*n*D)/a", Source: formula.Definition,
	})
)

// Thrust is the thrust in N at the true airspeed v in m/s, n rev/s > 0 and density rho in kg/m³.
func (p *Fixed) Thrust(rho, v, n float64, w *formula.Working) float64 {
	d := p.Diameter
	ct := p.CT(w.Step(advanceRatio, v/(n*d), v, n, d))
	return w.Step(thrust, ct*rho*n*n*d*d*d*d, ct, rho, n, d)
}

// Power is the shaft power absorbed in W at the true airspeed v in m/s, n rev/s > 0 and density rho in kg/m³.
func (p *Fixed) Power(rho, v, n float64, w *formula.Working) float64 {
	d := p.Diameter
	cp := p.CP(v / (n * d))
	return w.Step(power, cp*rho*n*n*n*d*d*d*d*d, cp, rho, n, d)
}

// Efficiency is T V / P, zero where no power is absorbed; t in N, v in m/s, p in W.
func Efficiency(t, v, p float64, w *formula.Working) float64 {
	if p <= 0 {
		return 0
	}
	return w.Step(efficiency, t*v/p, t, v, p)
}

// TipMach is the helical tip Mach number at the true airspeed v in m/s, n rev/s,
// the diameter d in m and the speed of sound a in m/s.
func TipMach(v, n, d, a float64, w *formula.Working) float64 {
	return w.Step(tipMach, math.Sqrt(v*v+math.Pi*n*d*math.Pi*n*d)/a, v, n, d, a)
}
