package polar

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// A Parabola is the polar CD = CDMin + K (CL − CLMinDrag)² by its three numbers.
type Parabola struct {
	CDMin     float64 // minimum drag coefficient, dimensionless
	K         float64 // lift-dependent drag factor, dimensionless
	CLMinDrag float64 // lift coefficient of minimum drag, dimensionless
}

var (
	flatPlate = formula.Must(formula.Formula{
		ID: "polar.drag-area", Out: formula.Sym("CDmin", "minimum drag coefficient", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("f", "drag area, or flat-plate area", units.DragArea), formula.Sym("S", "wing area", units.Area)},
		Expr: "f/S", Source: formula.Hoerner, Where: "chapter 1, drag area D/q, from memory",
	})
	glideLift = formula.Must(formula.Formula{
		ID: "polar.glide-lift", Out: formula.Sym("CLb", "lift coefficient of the best ratio", units.Coefficient),
		In: []formula.Symbol{formula.Sym("m", "mass of the best glide", units.Mass), formula.Sym("g", "standard gravity", units.Acceleration), formula.Sym("rho0", "sea-level density", units.Density),
			formula.Sym("V", "equivalent airspeed of the best glide", units.Speed), formula.Sym("S", "wing area", units.Area)},
		Expr: "2*m*g/(rho0*V*V*S)", Source: formula.Anderson, Where: "lift equals weight, chapter 5, with the equivalent airspeed by its definition",
	})
	stallLift = formula.Must(formula.Formula{
		ID: "polar.stall-lift", Out: formula.Sym("CLmax", "maximum lift coefficient", units.Coefficient),
		In: []formula.Symbol{formula.Sym("m", "mass of the stall speed given", units.Mass), formula.Sym("g", "standard gravity", units.Acceleration), formula.Sym("rho0", "sea-level density", units.Density),
			formula.Sym("V", "stall speed given", units.Speed), formula.Sym("S", "wing area", units.Area)},
		Expr: "2*m*g/(rho0*V*V*S)", Source: formula.Anderson, Where: "stalling speed, section 5.4.1, solved for the lift coefficient; calibrated airspeed at sea level is equivalent airspeed",
	})
	glideFactor = formula.Must(formula.Formula{
		ID: "polar.best-glide-factor", Out: formula.Sym("K", "lift-dependent drag factor", units.Coefficient),
		In: []formula.Symbol{formula.Sym("E", "best ratio of lift to drag", units.Coefficient), formula.Sym("CLb", "lift coefficient of the best ratio", units.Coefficient),
			formula.Sym("CLmd", "lift coefficient of minimum drag", units.Coefficient)},
		Expr: "1/(2*E*(CLb - CLmd))", Source: formula.OwnDerivation, Where: "at the best ratio dCD/dCL = CD/CL = 1/E",
	})
	glideMinimum = formula.Must(formula.Formula{
		ID: "polar.best-glide-minimum", Out: formula.Sym("CDmin", "minimum drag coefficient", units.Coefficient),
		In: []formula.Symbol{formula.Sym("E", "best ratio of lift to drag", units.Coefficient), formula.Sym("CLb", "lift coefficient of the best ratio", units.Coefficient),
			formula.Sym("CLmd", "lift coefficient of minimum drag", units.Coefficient), formula.Sym("K", "lift-dependent drag factor", units.Coefficient)},
		Expr: "CLb/E - K*(CLb - CLmd)*(CLb - CLmd)", Source: formula.OwnDerivation, Where: "the parabola passes through CL and CL/E at the best ratio",
	})
)

// FlatPlate is CDmin of the drag area f referred to the wing area s, both in m².
func FlatPlate(f, s float64, w *formula.Working) float64 { return w.Step(flatPlate, f/s, f, s) }

// level is CL in level flight: mass m in kg, gravity g in m/s², sea-level density
// rho0 in kg/m³, equivalent airspeed v in m/s, wing area s in m².
func level(m, g, rho0, v, s float64) float64 { return 2 * m * g / (rho0 * v * v * s) }

// GlideLift is CL of level flight at the equivalent airspeed v in m/s of the best
// glide: mass m in kg, gravity g in m/s², sea-level density rho0 in kg/m³, wing area s in m².
func GlideLift(m, g, rho0, v, s float64, w *formula.Working) float64 {
	return w.Step(glideLift, level(m, g, rho0, v, s), m, g, rho0, v, s)
}

// StallLift is CLmax of an aircraft that stalls at the equivalent airspeed v in
// m/s: mass m in kg, gravity g in m/s², sea-level density rho0 in kg/m³, wing area s in m².
func StallLift(m, g, rho0, v, s float64, w *formula.Working) float64 {
	return w.Step(stallLift, level(m, g, rho0, v, s), m, g, rho0, v, s)
}

// OfBestGlide is the parabola whose best ratio of lift to drag is e, at the lift
// coefficient cl, and whose minimum drag is at clMin. It exists where cl is above
// clMin; CDMin comes out negative where no aircraft has such a glide.
func OfBestGlide(e, cl, clMin float64, w *formula.Working) Parabola {
	k := w.Step(glideFactor, 1/(2*e*(cl-clMin)), e, cl, clMin)
	return Parabola{w.Step(glideMinimum, cl/e-k*(cl-clMin)*(cl-clMin), e, cl, clMin, k), k, clMin}
}

// BestGlide is the best ratio of lift to drag and its lift coefficient, both
// dimensionless, for CDMin and K above 0: where dCD/dCL = CD/CL.
func (p Parabola) BestGlide() (ratio, cl float64) {
	share := p.CDMin / p.K
	cl = math.Sqrt(share + p.CLMinDrag*p.CLMinDrag)
	above := cl - p.CLMinDrag
	if p.CLMinDrag > 0 {
		above = share / (cl + p.CLMinDrag) // the same without the difference of two near numbers
	}
	return 1 / (2 * p.K * above), cl
}

// CD is the drag coefficient at the lift coefficient cl, away from the ground.
func (p Parabola) CD(cl float64) float64 {
	d := cl - p.CLMinDrag
	return p.CDMin + p.K*d*d
}

// Near reports whether q is p to the relative difference tol of each number, CL as of 1.
func (p Parabola) Near(q Parabola, tol float64) bool {
	return math.Abs(p.CDMin-q.CDMin) <= tol*math.Abs(p.CDMin) && math.Abs(p.K-q.K) <= tol*math.Abs(p.K) && math.Abs(p.CLMinDrag-q.CLMinDrag) <= tol
}
