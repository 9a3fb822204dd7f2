package study

import (
	"math"
	"strings"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// An Answer is a study as the JSON interface gives it: every number in SI, a
// number that does not exist absent with its reason beside it.
type Answer struct {
	Variant      string              `json:"variant"` // identifier
	Name         string              `json:"name"`
	Flown        bool                `json:"flown"`
	Failure      *FailureAnswer      `json:"failure,omitempty"`
	Tightest     *SampleAnswer       `json:"tightest,omitempty"`
	Reserve      ReserveAnswer       `json:"reserve"`
	Figures      []FigureAnswer      `json:"figures"`
	Requirements []RequirementAnswer `json:"requirements"`
	Warnings     []WarningAnswer     `json:"warnings"`
	Masses       MassesAnswer        `json:"masses"`
	Speeds       []SpeedAnswer       `json:"speeds"`
	TakeOff      RunAnswer           `json:"take_off"`
	Landing      RunAnswer           `json:"landing"`
	Climb        []ClimbAnswer       `json:"climb"`
	Legs         []LegAnswer         `json:"legs"`
	Trace        []SampleAnswer      `json:"trace"`
	Placeholders []string            `json:"placeholders"` // paths within the aircraft
}

// A FailureAnswer is where and why the mission ended.
type FailureAnswer struct {
	Leg    int    `json:"leg"` // index from 0
	Name   string `json:"name"`
	Reason string `json:"reason"`
}

// A ReserveAnswer is what the reserve asked for and got.
type ReserveAnswer struct {
	Asked  bool    `json:"asked"`
	Met    bool    `json:"met"`
	Wanted float64 `json:"wanted_time"` // in s
	Flown  float64 `json:"flown_time"`  // in s
	Fuel   float64 `json:"fuel"`        // in kg
	Left   float64 `json:"fuel_left"`   // in kg
	Kept   float64 `json:"fuel_kept"`   // that contingencies ask to be left, in kg
	Reason string  `json:"reason,omitempty"`

	Parts []ReservePartAnswer `json:"parts"`
}

// A ReservePartAnswer is what one leg of the reserve asked for and got.
type ReservePartAnswer struct {
	Leg      int     `json:"leg"` // index from 0
	Kind     string  `json:"kind"`
	Met      bool    `json:"met"`
	Fuel     float64 `json:"fuel"`     // that it takes, or of a contingency keeps, in kg
	Energy   float64 `json:"energy"`   // that it takes, or of a contingency keeps, in J
	Time     float64 `json:"time"`     // flown in s
	Distance float64 `json:"distance"` // in m
	Reason   string  `json:"reason,omitempty"`
	Rule     string  `json:"rule,omitempty"`
}

// A FigureAnswer is one figure.
type FigureAnswer struct {
	ID     string   `json:"id"`
	Label  string   `json:"label"`
	Value  *float64 `json:"value,omitempty"` // in unit
	Unit   string   `json:"unit"`            // SI
	Reason string   `json:"reason,omitempty"`
	Where  string   `json:"where,omitempty"`
}

// A RequirementAnswer is one requirement held against its figure.
type RequirementAnswer struct {
	Figure string  `json:"figure"`
	Bound  string  `json:"bound"`
	Limit  float64 `json:"limit"` // in the SI unit of the figure
	Met    bool    `json:"met"`
	Reason string  `json:"reason,omitempty"`

	Conditions string   `json:"conditions,omitempty"` // that it sets for itself
	Where      string   `json:"where,omitempty"`      // the whole condition that the value holds for
	Value      *float64 `json:"value,omitempty"`      // of the figure, in unit
	Unit       string   `json:"unit"`                 // SI
	Margin     *float64 `json:"margin,omitempty"`     // on the wanted side of the limit, in unit; negative when missed
	Share      *float64 `json:"share,omitempty"`      // margin over the limit, dimensionless
	Clause     string   `json:"clause,omitempty"`
	Note       string   `json:"note,omitempty"`
}

// A WarningAnswer is one warning.
type WarningAnswer struct {
	Code  string `json:"code"`
	Level Level  `json:"level"`
	About string `json:"about"`
	Text  string `json:"text"`
	Clear string `json:"clear"`

	Numbers []NumberAnswer `json:"numbers"` // that the text names, in its order
}

// A NumberAnswer is one number that a sentence names.
type NumberAnswer struct {
	Quantity string  `json:"quantity"`
	Value    float64 `json:"value"` // in the SI unit of Quantity
	Unit     string  `json:"unit"`  // SI
}

// numbers lists the quantities that a message names.
func numbers(m units.Message) []NumberAnswer {
	list := []NumberAnswer{}
	for _, a := range m.Numbers() {
		if finite(a.SI) != nil {
			list = append(list, NumberAnswer{a.Quantity.Name(), a.SI, a.Quantity.SI()})
		}
	}
	return list
}

// MassesAnswer are masses in kg.
type MassesAnswer struct {
	Empty       float64  `json:"empty"`                   // with powerplant, in kg
	Growth      float64  `json:"growth"`                  // allowed on top of it, in kg
	Payload     float64  `json:"payload"`                 // in kg
	ZeroFuel    float64  `json:"zero_fuel"`               // without usable fuel, in kg
	Fuel        float64  `json:"fuel"`                    // in kg
	Start       float64  `json:"start"`                   // in kg
	MaxTakeOff  float64  `json:"max_take_off"`            // in kg
	MaxZeroFuel *float64 `json:"max_zero_fuel,omitempty"` // in kg
	Landing     float64  `json:"landing"`                 // in kg
}

// A SpeedAnswer is one speed of note at the default view.
type SpeedAnswer struct {
	Name   string   `json:"name"`
	TAS    *float64 `json:"tas,omitempty"`   // true airspeed in m/s
	Value  *float64 `json:"value,omitempty"` // what is best there, in SI
	Bound  string   `json:"bound,omitempty"`
	Reason string   `json:"reason,omitempty"`
}

// A RunAnswer is a take-off or landing.
type RunAnswer struct {
	Segments []SegmentAnswer `json:"segments,omitempty"`
	Ground   *float64        `json:"ground,omitempty"`   // in m
	Total    *float64        `json:"total,omitempty"`    // in m
	Factored *float64        `json:"factored,omitempty"` // in m
	Reason   string          `json:"reason,omitempty"`
}

// A SegmentAnswer is one segment of a run.
type SegmentAnswer struct {
	Name     string  `json:"name"`
	Distance float64 `json:"distance"` // in m
	Time     float64 `json:"time"`     // in s
	Speed    float64 `json:"speed"`    // true airspeed at its end in m/s
}

// A ClimbAnswer is one row of the climb table.
type ClimbAnswer struct {
	Altitude float64 `json:"altitude"` // pressure altitude in m
	Rate     float64 `json:"rate"`     // in m/s
	TAS      float64 `json:"tas"`      // in m/s
	Time     float64 `json:"time"`     // in s
	Distance float64 `json:"distance"` // in m
	Fuel     float64 `json:"fuel"`     // in kg
}

// A LegAnswer is one leg as flown.
type LegAnswer struct {
	Name     string  `json:"name"`
	Kind     string  `json:"kind"`
	Time     float64 `json:"time"`     // in s
	Distance float64 `json:"distance"` // in m
	Fuel     float64 `json:"fuel"`     // in kg
	Energy   float64 `json:"energy"`   // in J
	Payload  float64 `json:"payload"`  // taken aboard in kg, negative when dropped
	Altitude float64 `json:"altitude"` // pressure altitude at its end in m
	Mass     float64 `json:"mass"`     // at its end in kg
}

// A SampleAnswer is one moment of the mission.
type SampleAnswer struct {
	Leg       int     `json:"leg"`                // index from 0
	Time      float64 `json:"time"`               // in s
	Distance  float64 `json:"distance"`           // in m
	Altitude  float64 `json:"altitude"`           // pressure altitude in m
	TAS       float64 `json:"tas"`                // in m/s
	Mass      float64 `json:"mass"`               // in kg
	Fuel      float64 `json:"fuel"`               // usable fuel left in kg
	Charge    float64 `json:"charge"`             // usable electrical energy left in J
	Available float64 `json:"thrust_available"`   // in N
	Required  float64 `json:"thrust_required"`    // in N
	Setting   float64 `json:"setting"`            // of the power lever, 0 to 1
	Shaft     float64 `json:"propeller_rotation"` // in rev/s; 0 where there is none
}

// Answer gives the study as the JSON interface does. Sentences are in metric units.
func (s *Study) Answer() Answer {
	f := &s.Flight
	a := Answer{Variant: s.Variant().ID, Name: s.Variant().Name, Flown: f.Flown(), Placeholders: append([]string{}, s.Placeholders()...),
		Reserve: reserveAnswer(&f.Reserve),
		Masses: MassesAnswer{s.Masses.Empty, s.Masses.Growth, s.Masses.Payload, s.Masses.ZeroFuel, s.Masses.Fuel, s.Masses.Start, s.Masses.MaxTakeOff,
			finite(s.Masses.MaxZeroFuel), s.Masses.Landing},
		TakeOff: runAnswer(s.TakeOff), Landing: runAnswer(s.Landing),
		Requirements: []RequirementAnswer{}, Warnings: []WarningAnswer{}, Climb: []ClimbAnswer{}, Legs: []LegAnswer{}, Trace: []SampleAnswer{}}
	if e := f.Failure; e != nil {
		a.Failure = &FailureAnswer{e.Leg, e.Name, e.Reason.In(units.Metric)}
	}
	if f.Tightest != nil {
		t := sampleAnswer(f.Tightest)
		a.Tightest = &t
	}
	for i := range s.Figures {
		a.Figures = append(a.Figures, figureAnswer(&s.Figures[i]))
	}
	for i := range s.Requirements {
		a.Requirements = append(a.Requirements, requirementAnswer(&s.Requirements[i]))
	}
	for _, w := range s.Warnings {
		a.Warnings = append(a.Warnings, WarningAnswer{w.Code, w.Level, w.About, w.Text.In(units.Metric), w.Clear, numbers(w.Text)})
	}
	a.Speeds = s.speedAnswers()
	for _, r := range s.Climb {
		a.Climb = append(a.Climb, ClimbAnswer{r.Altitude, r.Rate, r.TAS, r.Time, r.Distance, r.Fuel})
	}
	for i := range f.Legs {
		l := &f.Legs[i]
		a.Legs = append(a.Legs, LegAnswer{s.legName(i), l.Leg.Kind, l.Time, l.Distance, l.Fuel, l.Energy, l.Payload, l.End.Altitude, l.End.Mass})
	}
	for i := range f.Trace {
		a.Trace = append(a.Trace, sampleAnswer(&f.Trace[i]))
	}
	return a
}

func reserveAnswer(r *mission.ReserveResult) ReserveAnswer {
	a := ReserveAnswer{r.Asked, r.Met, r.Wanted, r.Flown, r.Fuel, r.Left, r.Kept, r.Reason.In(units.Metric), []ReservePartAnswer{}}
	for i := range r.Parts {
		p := &r.Parts[i]
		a.Parts = append(a.Parts, ReservePartAnswer{p.Leg, p.Kind, p.Met, p.Fuel, p.Energy, p.Time, p.Distance, p.Reason.In(units.Metric), p.Rule.In(units.Metric)})
	}
	return a
}

func sampleAnswer(t *mission.Sample) SampleAnswer {
	return SampleAnswer{t.Leg, t.Time, t.Distance, t.Altitude, t.TAS, t.Mass, t.Fuel, t.Charge, t.Available, t.Required, t.Setting, t.Output.Shaft.Speed}
}

func figureAnswer(f *Figure) FigureAnswer {
	a := FigureAnswer{ID: f.ID, Label: f.Label, Unit: f.Quantity.SI(), Where: f.Where.In(units.Metric), Reason: f.Reason.In(units.Metric)}
	if f.Has() {
		a.Value = finite(f.Value)
	}
	return a
}

func requirementAnswer(v *Verdict) RequirementAnswer {
	r := &v.Requirement
	a := RequirementAnswer{Figure: r.Figure, Bound: r.Bound, Limit: r.Limit, Met: v.Met, Reason: v.Reason.In(units.Metric), Clause: r.Clause, Note: r.Note}
	var conditions []string
	for _, m := range r.Stated() {
		conditions = append(conditions, m.In(units.Metric))
	}
	a.Conditions = strings.Join(conditions, ", ")
	if v.Figure != nil {
		a.Unit, a.Where = v.Figure.Quantity.SI(), v.Figure.Where.In(units.Metric)
	}
	if v.Judged() {
		a.Value, a.Margin = finite(v.Figure.Value), finite(v.Margin())
		if share, ok := v.Share(); ok {
			a.Share = finite(share)
		}
	}
	return a
}

// finite is a pointer to v, nil when it is no number.
func finite(v float64) *float64 {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return nil
	}
	return &v
}

func (s *Study) speedAnswers() []SpeedAnswer {
	p := &s.Speeds
	var list []SpeedAnswer
	for _, b := range []struct {
		name string
		best pointperf.Best
	}{{"stall", p.Stall}, {"best_angle", p.BestAngle}, {"best_rate", p.BestRate}, {"least_power", p.LeastPower}, {"least_thrust", p.LeastThrust},
		{"carson", p.Carson}, {"level_min", p.LevelMin}, {"level_max", p.LevelMax}} {
		a := SpeedAnswer{Name: b.name, Bound: b.best.Bound}
		if b.best.Err != nil {
			a.Reason = units.Explain(b.best.Err).In(units.Metric)
		} else {
			a.TAS = finite(b.best.TAS)
			if b.name != "stall" {
				a.Value = finite(b.best.Value)
			}
		}
		list = append(list, a)
	}
	return list
}

func runAnswer(s Strip) RunAnswer {
	if s.Err != nil {
		return RunAnswer{Reason: units.Explain(s.Err).In(units.Metric)}
	}
	run := &s.Run
	a := RunAnswer{Ground: finite(run.Ground), Total: finite(run.Total), Factored: finite(run.Factored)}
	for _, seg := range run.Segments {
		a.Segments = append(a.Segments, segmentAnswer(seg))
	}
	return a
}

func segmentAnswer(s runway.Segment) SegmentAnswer {
	return SegmentAnswer{s.Name, s.Distance, s.Time, s.Speed}
}

// All studies every variant of a project at its default view, in order.
func All(p *project.Project) []*Study {
	list := make([]*Study, len(p.Aircraft))
	for i := range list {
		list[i] = Run(p, i, DefaultView(p, i))
	}
	return list
}
