package loads

import (
	"math"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

// An Airframe is what the loads depend on beside the limits.
type Airframe struct {
	Area       float64 // wing area in m², > 0
	Span       float64 // in m, > 0
	CLMax      float64 // greatest lift coefficient, clean, dimensionless, > 0
	MaxTakeOff float64 // greatest take-off mass in kg, > 0
}

// A Design is the limits complete: what is entered, and else what the rule asks for at
// least at the greatest take-off mass. Speeds are equivalent airspeeds.
type Design struct {
	Rule         string  // name in a sentence
	Positive     float64 // limit load factor, dimensionless, >= 1
	Negative     float64 // limit load factor up to VC, dimensionless, <= 0
	NegativeDive float64 // limit load factor at VD, dimensionless, <= 0
	Cruise       float64 // VC in m/s
	Dive         float64 // VD in m/s, >= VC
	Chord        float64 // mean geometric chord in m
	Slope        float64 // of lift coefficient against angle of attack, dimensionless (per radian)
	NegativeCL   float64 // lift coefficient of the negative stall, dimensionless, < 0
	Least        Least
	Airframe     Airframe

	rule         *rule
	gustC, gustD float64
}

// Least is what the rule asks for; everything is zero where the designer's values are the rule.
type Least struct {
	Positive float64 // limit load factor, dimensionless
	Negative float64 // limit load factor up to VC, dimensionless, <= 0
	Cruise   float64 // VC in m/s
	Dive     float64 // VD in m/s
	Mass     float64 // greatest mass that the rule covers in kg
}

var (
	meanChord = formula.Must(formula.Formula{
		ID: "loads.chord", Out: formula.Sym("C", "mean geometric chord", units.Length),
		In:   []formula.Symbol{formula.Sym("S", "wing area", units.Area), formula.Sym("b", "wing span", units.Length)},
		Expr: "S/b", Source: formula.Definition,
	})
	aspectRatio = formula.Must(formula.Formula{
		ID: "loads.aspect-ratio", Out: formula.Sym("A", "aspect ratio", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("b", "wing span", units.Length), formula.Sym("S", "wing area", units.Area)},
		Expr: "b*b/S", Source: formula.Definition,
	})
	liftSlope = formula.Must(formula.Formula{
		ID: "loads.lift-slope", Out: formula.Sym("a", "lift-curve slope per radian, straight wing, section slope 2π, low speed", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("A", "aspect ratio", units.Coefficient)},
		Expr: "2*pi*A/(2 + sqrt(4 + A*A))", Source: formula.Helmbold, Where: "as in Raymer 1992, eq. 12.6, without sweep and compressibility",
	})
)

// LiftSlope estimates the lift-curve slope per radian of a straight wing at low speed from
// its aspect ratio, > 0. H. B. Helmbold, Der unverwundene Ellipsenflügel als tragende
// Fläche, 1942; the same as D. P. Raymer, Aircraft Design, 2nd edition, 1992, eq. 12.6 with a section slope of 2π.
func LiftSlope(aspect float64, w *formula.Working) float64 {
	return w.Step(liftSlope, 2*math.Pi*aspect/(2+math.Sqrt(4+aspect*aspect)), aspect)
}

// Design completes the limits; ok is false where none are entered.
func (l *Limits) Design(a Airframe, w *formula.Working) (d Design, ok bool) {
	r := l.rule()
	if r == nil {
		return Design{}, false
	}
	d = Design{Rule: r.short, rule: r, NegativeCL: l.NegativeCL, Airframe: a, gustC: gustAtCruise, gustD: gustAtDive, NegativeDive: r.dive}
	if r.name == Own {
		d.Positive, d.Negative, d.NegativeDive = l.Positive, l.Negative, l.NegativeDive
		d.Cruise, d.Dive, d.gustC, d.gustD = l.Cruise, l.Dive, l.GustCruise, l.GustDive
		w.Note("Limit load factors, design speeds and gusts are the designer's: %s and %s up to VC, %s at VD.", units.Plain(d.Positive), units.Plain(d.Negative), units.Plain(d.NegativeDive))
	} else {
		d.least(l, w)
	}
	d.Chord, d.Slope = l.Chord, l.Slope
	if l.ChordGiven != ByValue {
		d.Chord = w.Step(meanChord, a.Area/a.Span, a.Area, a.Span)
	}
	if l.SlopeGiven != ByValue {
		d.Slope = LiftSlope(w.Step(aspectRatio, a.Span*a.Span/a.Area, a.Span, a.Area), w)
	}
	return d, true
}

// least fills factors and speeds from the rule, and takes what is entered instead of it.
func (d *Design) least(l *Limits, w *formula.Working) {
	r, a := d.rule, &d.Airframe
	w.Note("%s, at the greatest take-off mass.", r.label)
	d.Least.Mass = r.heaviest
	d.Least.Positive, d.Least.Negative = r.factors(a.MaxTakeOff*atmos.Gravity, w)
	loading := w.Step(wingLoading, a.MaxTakeOff/a.Area, a.MaxTakeOff, a.Area)
	d.Least.Cruise = r.leastCruise(loading, w)
	d.Positive, d.Negative = d.Least.Positive, d.Least.Negative
	if l.FactorsGiven == ByValue {
		d.Positive, d.Negative = l.Positive, l.Negative
	}
	w.Note("Limit load factors used: %s and %s up to VC, %s at VD.", units.Plain(d.Positive), units.Plain(d.Negative), units.Plain(d.NegativeDive))
	d.Cruise = d.Least.Cruise
	if l.SpeedsGiven == ByValue {
		d.Cruise = l.Cruise
	}
	d.Least.Dive = r.leastDive(d.Cruise, d.Least.Cruise, loading, w)
	d.Dive = d.Least.Dive
	if l.SpeedsGiven == ByValue {
		d.Dive = l.Dive
		w.Note("VC and VD used are those entered.")
	}
}

// LeastDive is the least VD of the rule in m/s where its least VC is the given one in m/s; 0 without a rule.
func (d *Design) LeastDive(leastCruise float64) float64 {
	if d.rule.name == Own {
		return 0
	}
	return d.rule.leastDive(d.Cruise, leastCruise, d.Airframe.MaxTakeOff/d.Airframe.Area, nil)
}

// Convert keeps the meaning of the limits when the choice of that name has changed from
// another: what the rule gave before becomes the value now given.
func (l *Limits) Convert(choice, from string, a Airframe) {
	was := *l
	switch choice {
	case "rule":
		was.Rule = from
	case "factors_given":
		was.FactorsGiven = from
	case "speeds_given":
		was.SpeedsGiven = from
	case "chord_given":
		was.ChordGiven = from
	case "slope_given":
		was.SlopeGiven = from
	default:
		return
	}
	d, ok := was.Design(a, nil)
	if !ok {
		return
	}
	own := l.Rule == Own
	if own || choice == "factors_given" {
		keep(&l.Positive, d.Positive, &positive)
		keep(&l.Negative, d.Negative, &negative)
	}
	if own || choice == "speeds_given" {
		keep(&l.Cruise, d.Cruise, &cruise)
		keep(&l.Dive, d.Dive, &dive)
	}
	switch {
	case choice == "rule" && own:
		keep(&l.NegativeDive, d.NegativeDive, &negativeDive)
		l.GustCruise, l.GustDive = d.gustC, d.gustD
	case choice == "rule" && from == Own:
		l.FactorsGiven, l.SpeedsGiven = ByValue, ByValue
	case choice == "chord_given":
		keep(&l.Chord, d.Chord, &chord)
	case choice == "slope_given":
		keep(&l.Slope, d.Slope, &slope)
	}
}
