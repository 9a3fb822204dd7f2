package loads

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// Names of rules that the program treats apart; names are stored in documents.
const (
	NoRule = "none" // nothing is entered
	Own    = "own"  // every value is the designer's
)

// A rule is what a published rule asks of the structure at least.
type rule struct {
	name, label string
	short       string  // in a sentence
	factor      float64 // positive limit load factor, dimensionless
	heavy       bool    // the factor falls with weight
	share       float64 // negative limit load factor over the positive one, dimensionless, < 0
	negative    float64 // negative limit load factor where it is not a share, dimensionless
	dive        float64 // negative limit load factor at VD, dimensionless
	cruise      float64 // VC over the root of the wing loading, in kt over root of lb/ft²
	overCruise  float64 // least VD over the least VC, dimensionless
	thin        bool    // gusts weaken above thinFrom, and cruise and overCruise fall with wing loading
	heaviest    float64 // mass that the rule covers, in kg; 0 for any
}

// rules are, in the order shown, those of 14 CFR 23.333 to 23.341 as amended to Amendment 23-48 (1996), before the
// rewriting of 2017, and of CS-VLA 333 to 341; values from memory.
var rules = []rule{
	{name: "vla", label: "CS-VLA, very light aeroplane", short: "CS-VLA", factor: 3.8, negative: -1.5, overCruise: 1.4, heaviest: 750},
	{name: "normal", label: "14 CFR 23 (1996), normal", short: "14 CFR 23, normal category", factor: 3.8, heavy: true, share: -0.4, cruise: 33, overCruise: 1.4, thin: true, heaviest: 5670},
	{name: "utility", label: "14 CFR 23 (1996), utility", short: "14 CFR 23, utility category", factor: 4.4, share: -0.4, dive: -1, cruise: 33, overCruise: 1.5, thin: true, heaviest: 5670},
	{name: "aerobatic", label: "14 CFR 23 (1996), acrobatic", short: "14 CFR 23, acrobatic category", factor: 6, share: -0.5, dive: -1, cruise: 36, overCruise: 1.55, thin: true, heaviest: 5670},
	{name: Own, label: "own values throughout", short: "own values"},
}

// rule is the rule chosen, nil where nothing is entered or the name is not known.
func (l *Limits) rule() *rule {
	for i := range rules {
		if rules[i].name == l.Rule {
			return &rules[i]
		}
	}
	return nil
}

// Derived gust velocities of 14 CFR 23.333(c) (1996), 50 and 25 ft/s, and of CS-VLA 333(c), equivalent, in m/s.
const (
	gustAtCruise = 15.24
	gustAtDive   = 7.62
)

// Customary units in which 14 CFR 23 states its formulas, exact.
const (
	knot         = 1852.0 / 3600                  // in m/s
	pound        = 0.45359237 * 9.80665           // of force, in N
	poundPerFoot = 0.45359237 / (0.3048 * 0.3048) // of mass per square foot, in kg/m²
)

var (
	wingLoading = formula.Must(formula.Formula{
		ID: "loads.wing-loading", Out: formula.Sym("w", "wing loading, mass over area", units.WingLoading),
		In:   []formula.Symbol{formula.Sym("m", "mass", units.Mass), formula.Sym("S", "wing area", units.Area)},
		Expr: "m/S", Source: formula.Definition,
	})
	limitFactor = formula.Must(formula.Formula{
		ID: "loads.limit-factor", Out: formula.Sym("n1", "positive limit load factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("W", "greatest take-off weight", units.Force), formula.Sym("lb", "one pound-force", units.Force)},
		Expr: "min(3.8, 2.1 + 24000/(W/lb + 10000))", Source: formula.FAR23, Where: "23.337(a)(1)",
	})
	negativeFactor = formula.Must(formula.Formula{
		ID: "loads.negative-factor", Out: formula.Sym("n2", "negative limit load factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("k", "share of the positive one", units.Coefficient), formula.Sym("n1", "positive limit load factor", units.Coefficient)},
		Expr: "k*n1", Source: formula.FAR23, Where: "23.337(b)",
	})
	leastCruise = formula.Must(formula.Formula{
		ID: "loads.least-cruise", Out: formula.Sym("VCmin", "least design cruising speed, equivalent", units.Speed),
		In: []formula.Symbol{formula.Sym("k", "factor of the category, kt over root of lb/ft²", units.Coefficient), formula.Sym("w", "wing loading at the greatest take-off mass", units.WingLoading),
			formula.Sym("p", "one pound per square foot", units.WingLoading), formula.Sym("kt", "one knot", units.Speed)},
		Expr: "(k - (k - 28.6)*max(0, min(1, (w/p - 20)/80)))*sqrt(w/p)*kt", Source: formula.FAR23, Where: "23.335(a)(1) and (2)",
	})
	leastCruiseVLA = formula.Must(formula.Formula{
		ID: "loads.least-cruise-vla", Out: formula.Sym("VCmin", "least design cruising speed, equivalent", units.Speed),
		In:   []formula.Symbol{formula.Sym("w", "wing loading at the greatest take-off mass", units.WingLoading), formula.Sym("g", "standard gravity", units.Acceleration)},
		Expr: "2.4*sqrt(w*g)", Source: formula.CSVLA, Where: "335(a)",
	})
	leastDive = formula.Must(formula.Formula{
		ID: "loads.least-dive", Out: formula.Sym("VDmin", "least design dive speed, equivalent", units.Speed),
		In: []formula.Symbol{formula.Sym("VC", "design cruising speed", units.Speed), formula.Sym("k", "factor of the category", units.Coefficient), formula.Sym("VCmin", "least design cruising speed", units.Speed),
			formula.Sym("w", "wing loading at the greatest take-off mass", units.WingLoading), formula.Sym("p", "one pound per square foot", units.WingLoading)},
		Expr: "max(1.25*VC, (k - (k - 1.35)*max(0, min(1, (w/p - 20)/80)))*VCmin)", Source: formula.FAR23, Where: "23.335(b)(1) to (3)",
	})
	leastDiveVLA = formula.Must(formula.Formula{
		ID: "loads.least-dive-vla", Out: formula.Sym("VDmin", "least design dive speed, equivalent", units.Speed),
		In:   []formula.Symbol{formula.Sym("VC", "design cruising speed", units.Speed), formula.Sym("VCmin", "least design cruising speed", units.Speed)},
		Expr: "max(1.25*VC, 1.4*VCmin)", Source: formula.CSVLA, Where: "335(b)",
	})
	gustAloft = formula.Must(formula.Formula{
		ID: "loads.gust-aloft", Out: formula.Sym("U", "derived gust velocity", units.Speed),
		In:   []formula.Symbol{formula.Sym("U0", "derived gust velocity up to 20 000 ft", units.Speed), formula.Sym("h", "pressure altitude", units.Altitude)},
		Expr: "U0*(1 - 0.5*max(0, min(1, (h - 6096)/9144)))", Source: formula.FAR23, Where: "23.333(c)(1)",
	})
)

// above is how far a wing loading in kg/m² is from 20 to 100 lb/ft², 0 to 1.
func above(loading float64) float64 { return math.Max(0, math.Min(1, (loading/poundPerFoot-20)/80)) }

// factors are the least limit load factors, dimensionless, at the greatest take-off weight in N.
func (r *rule) factors(weight float64, w *formula.Working) (positive, negative float64) {
	positive, negative = r.factor, r.negative
	if r.heavy {
		positive = w.Step(limitFactor, math.Min(3.8, 2.1+24000/(weight/pound+10000)), weight, pound)
	}
	if r.share != 0 {
		negative = w.Step(negativeFactor, r.share*positive, r.share, positive)
	}
	return positive, negative
}

// leastCruise is the least VC in m/s at the wing loading in kg/m² of the greatest take-off mass.
func (r *rule) leastCruise(loading float64, w *formula.Working) float64 {
	if !r.thin {
		return w.Step(leastCruiseVLA, 2.4*math.Sqrt(loading*atmos.Gravity), loading, atmos.Gravity)
	}
	k := r.cruise - (r.cruise-28.6)*above(loading)
	return w.Step(leastCruise, k*math.Sqrt(loading/poundPerFoot)*knot, r.cruise, loading, poundPerFoot, knot)
}

// leastDive is the least VD in m/s for VC and the least VC in m/s, at the wing loading in kg/m².
func (r *rule) leastDive(vc, least, loading float64, w *formula.Working) float64 {
	if !r.thin {
		return w.Step(leastDiveVLA, math.Max(1.25*vc, 1.4*least), vc, least)
	}
	k := r.overCruise - (r.overCruise-1.35)*above(loading)
	return w.Step(leastDive, math.Max(1.25*vc, k*least), vc, r.overCruise, least, loading, poundPerFoot)
}

// gust is the gust velocity in m/s at the pressure altitude hp in m of one that is u0 in m/s below 20 000 ft.
func (r *rule) gust(u0, hp float64, w *formula.Working) float64 {
	if !r.thin {
		return u0
	}
	return w.Step(gustAloft, u0*(1-0.5*math.Max(0, math.Min(1, (hp-6096)/9144))), u0, hp)
}
