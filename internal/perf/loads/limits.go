// Package loads draws the manoeuvre and gust envelope of an aeroplane with flaps and
// gear up: the load factors against equivalent airspeed that a rule asks its structure
// to bear, or that its designer gives. It computes no strength.
package loads

import (
	"errors"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// How load factors, speeds, chord and slope are given.
const (
	ByRule     = "rule"     // the least that the rule asks for
	ByValue    = "value"    // the designer's own
	ByArea     = "area"     // mean chord from wing area and span
	ByEstimate = "estimate" // lift-curve slope from the aspect ratio
)

// Limits are the structural limits as entered.
type Limits struct {
	Rule         string  `json:"rule"`          // one of the names of rules
	FactorsGiven string  `json:"factors_given"` // ByRule or ByValue
	Positive     float64 `json:"positive"`      // positive limit load factor, dimensionless
	Negative     float64 `json:"negative"`      // negative limit load factor at VC, dimensionless, <= 0
	NegativeDive float64 `json:"negative_dive"` // negative limit load factor at VD, dimensionless, <= 0
	SpeedsGiven  string  `json:"speeds_given"`  // ByRule or ByValue
	Cruise       float64 `json:"cruise"`        // design cruising speed VC, equivalent, in m/s
	Dive         float64 `json:"dive"`          // design dive speed VD, equivalent, in m/s
	GustCruise   float64 `json:"gust_cruise"`   // derived gust velocity at VC, equivalent, in m/s
	GustDive     float64 `json:"gust_dive"`     // derived gust velocity at VD, equivalent, in m/s
	NegativeCL   float64 `json:"negative_cl"`   // lift coefficient at the negative stall, clean, dimensionless, < 0
	ChordGiven   string  `json:"chord_given"`   // ByArea or ByValue
	Chord        float64 `json:"chord"`         // mean geometric chord in m
	SlopeGiven   string  `json:"slope_given"`   // ByEstimate or ByValue
	Slope        float64 `json:"slope"`         // of lift coefficient against angle of attack, dimensionless (per radian)
}

var (
	positive = input.Spec{Name: "positive", Label: "Positive limit load factor", Quantity: units.Coefficient, Min: 1, Max: 20,
		Typical: &input.Typical{Low: 3.8, High: 6, Source: "14 CFR 23.337 (1996): 3.8 normal to 6 acrobatic"}}
	negative = input.Spec{Name: "negative", Label: "Negative limit load factor", Quantity: units.Coefficient, Min: -20, Max: 0, Note: "Up to VC.",
		Typical: &input.Typical{Low: -3, High: -1.5, Source: "14 CFR 23.337 (1996), CS-VLA 337"}}
	negativeDive = input.Spec{Name: "negative_dive", Label: "Negative limit load factor at VD", Quantity: units.Coefficient, Min: -20, Max: 0,
		Note: "Between VC and VD the limit changes in a straight line.", Typical: &input.Typical{Low: -1, High: 0, Source: "14 CFR 23.333(b) (1996)"}}
	cruise = input.Spec{Name: "cruise", Label: "Design cruising speed VC, EAS", Quantity: units.Speed, Min: 3, Max: 300}
	dive   = input.Spec{Name: "dive", Label: "Design dive speed VD, EAS", Quantity: units.Speed, Min: 4, Max: 400, Note: "What flutter, controls and structure are shown for."}
	gustC  = input.Spec{Name: "gust_cruise", Label: "Gust at VC, EAS", Quantity: units.Speed, Min: 0, Max: 30,
		Typical: &input.Typical{Low: 15, High: 15.3, Source: "15.24 m/s, 14 CFR 23.333(c) (1996), CS-VLA 333(c)"}}
	gustD = input.Spec{Name: "gust_dive", Label: "Gust at VD, EAS", Quantity: units.Speed, Min: 0, Max: 30,
		Typical: &input.Typical{Low: 7.5, High: 7.7, Source: "7.62 m/s, 14 CFR 23.333(c) (1996), CS-VLA 333(c)"}}
	negativeCL = input.Spec{Name: "negative_cl", Label: "Greatest negative CL, clean", Quantity: units.Coefficient, Min: -3, Max: -0.1,
		Note: "Of the stall in inverted or pushed flight.", Typical: &input.Typical{Low: -1.1, High: -0.6, Source: input.CommonPractice}}
	chord = input.Spec{Name: "chord", Label: "Mean geometric chord", Quantity: units.Length, Min: 0.01, Max: 20}
	slope = input.Spec{Name: "slope", Label: "Lift-curve slope, per radian", Quantity: units.Coefficient, Min: 0.5, Max: 8,
		Note: "Of the whole aeroplane, or of the wing alone where the tail's gust load is treated apart.", Typical: &input.Typical{Low: 4, High: 6, Source: input.CommonPractice}}
)

// Inputs describes the limits.
func (l *Limits) Inputs() []input.Entry {
	r := l.rule()
	given, ownRule := r != nil, r != nil && r.name == Own
	factors, speeds := given && (ownRule || l.FactorsGiven == ByValue), given && (ownRule || l.SpeedsGiven == ByValue)
	options := []input.Option{{Value: NoRule, Label: "not entered"}}
	for i := range rules {
		options = append(options, input.Option{Value: rules[i].name, Label: rules[i].label})
	}
	return []input.Entry{
		input.Ways("rule", "Structure designed to", &l.Rule, options...),
		input.Ways("factors_given", "Limit load factors", &l.FactorsGiven,
			input.Option{Value: ByRule, Label: "the rule's least"}, input.Option{Value: ByValue, Label: "own values"}).If(given && !ownRule),
		input.Num(&positive, &l.Positive).If(factors),
		input.Num(&negative, &l.Negative).If(factors),
		input.Num(&negativeDive, &l.NegativeDive).If(ownRule),
		input.Ways("speeds_given", "VC and VD", &l.SpeedsGiven,
			input.Option{Value: ByRule, Label: "the rule's least"}, input.Option{Value: ByValue, Label: "own values"}).If(given && !ownRule),
		input.Num(&cruise, &l.Cruise).If(speeds),
		input.Num(&dive, &l.Dive).If(speeds),
		input.Num(&gustC, &l.GustCruise).If(ownRule),
		input.Num(&gustD, &l.GustDive).If(ownRule),
		input.Num(&negativeCL, &l.NegativeCL).If(given),
		input.Ways("chord_given", "Mean chord", &l.ChordGiven,
			input.Option{Value: ByArea, Label: "wing area over span"}, input.Option{Value: ByValue, Label: "own value"}).If(given),
		input.Num(&chord, &l.Chord).If(given && l.ChordGiven == ByValue),
		input.Ways("slope_given", "Lift-curve slope", &l.SlopeGiven,
			input.Option{Value: ByEstimate, Label: "from the aspect ratio"}, input.Option{Value: ByValue, Label: "own value"}).If(given),
		input.Num(&slope, &l.Slope).If(given && l.SlopeGiven == ByValue),
	}
}

// Given reports whether there are limits at all.
func (l *Limits) Given() bool { return l.rule() != nil }

// Unentered is what a document means that says nothing of limits.
func Unentered() Limits {
	return Limits{Rule: NoRule, FactorsGiven: ByRule, Positive: 3.8, Negative: -1.5, SpeedsGiven: ByRule, Cruise: 60, Dive: 84,
		GustCruise: gustAtCruise, GustDive: gustAtDive, NegativeCL: -0.8, ChordGiven: ByArea, Chord: 1.3, SlopeGiven: ByEstimate, Slope: 5}
}

// Check reports what the entered values contradict in each other.
func (l *Limits) Check() error {
	r := l.rule()
	if r == nil || (r.name != Own && l.SpeedsGiven != ByValue) {
		return nil
	}
	var errs []error
	if l.Dive < l.Cruise {
		errs = append(errs, &input.Error{Path: "dive", Text: units.Metric.Format(units.Speed, l.Dive), Accepts: "the design dive speed is at least the design cruising speed", Err: input.ErrConflict})
	}
	return errors.Join(errs...)
}

// keep takes a converted value where it is one that its input accepts.
func keep(at *float64, v float64, s *input.Spec) {
	if s.Check(v) == nil {
		*at = v
	}
}
