package study

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// A Figure is one number of the study that a requirement can name.
type Figure struct {
	project.FigureKind
	Value  float64       // in the quantity's SI unit; meaningless when Reason is set
	Reason units.Message // why there is no value; empty when there is one
	Where  units.Message // the condition it holds for
	Rests  []string      // prefixes of the aircraft inputs that it depends on
}

// Has reports whether the figure has a value.
func (f *Figure) Has() bool { return f.Reason.Empty() }

// Groups of aircraft inputs that figures rest on, by path prefix.
var (
	polarInputs = []string{"airframe.wing_area", "airframe.span", "airframe.drag_given", "airframe.cd_min", "airframe.efficiency", "airframe.cl_min_drag", "airframe.polar",
		"airframe.drag_area", "airframe.glide_ratio", "airframe.glide_speed", "airframe.glide_mass",
		"airframe.components", "airframe.leakage", "airframe.unlisted", "airframe.friction_tas", "airframe.friction_alt"}
	massInputs  = []string{"weights.empty", "weights.growth", "weights.items"}
	plantInputs = []string{"powerplant"}
	cleanLift   = []string{"airframe.wing_area", "airframe.clean.cl_max", "airframe.clean.stall_speed", "airframe.clean.stall_mass"}
	clean       = slices.Concat(polarInputs, massInputs, plantInputs, []string{"airframe.clean", "airframe.never_exceed"})
	off         = slices.Concat(polarInputs, massInputs, plantInputs, []string{"strips", "airframe.wing_height", "airframe.ground_cl", "airframe.take_off"})
	flapped     = slices.Concat(clean, []string{"airframe.take_off", "airframe.landing"})
	structural  = slices.Concat(massInputs, plantInputs, []string{"limits", "weights.max_take_off"})
	flown       = slices.Concat(clean, []string{"strips", "airframe.wing_height", "airframe.ground_cl", "airframe.take_off", "airframe.landing"})
)

// rests gives the inputs of the figures that do not rest on all of a flown mission.
var rests = map[string][]string{
	"take_off_distance": off, "take_off_roll": off, "climb_gradient": off,
	"climb_rate": flapped, "steepest_gradient": flapped, "glide_ratio": flapped, "turn_load": flapped,
	"balked_gradient":   slices.Concat(clean, []string{"airframe.landing"}),
	"maneuvering_speed": slices.Concat(structural, cleanLift), "gust_load": slices.Concat(structural, cleanLift, []string{"airframe.span"}),
	"service_ceiling": clean, "absolute_ceiling": clean, "level_max": clean, "cruise_speed": clean, "time_to_climb": clean, "range": clean, "endurance": clean,
	"static_thrust": plantInputs, "static_speed": plantInputs,
	"static_thrust_ratio": slices.Concat(massInputs, plantInputs), "power_loading": slices.Concat(massInputs, plantInputs),
}

// blank is a figure without its value.
func (s *Study) blank(kind project.FigureKind) Figure {
	f := Figure{FigureKind: kind, Rests: flown}
	if r, ok := rests[kind.ID]; ok {
		f.Rests = r
	}
	stall := slices.Concat([]string{"airframe.wing_area"}, massInputs, s.weighs())
	switch kind.ID {
	case "stall_clean":
		f.Rests = append(stall, "airframe.clean.cl_max", "airframe.clean.stall_speed", "airframe.clean.stall_mass")
	case "stall_take_off":
		f.Rests = append(stall, "airframe.take_off.cl_max", "airframe.take_off.stall_speed", "airframe.take_off.stall_mass")
	case "stall_landing":
		f.Rests = append(stall, "airframe.landing.cl_max", "airframe.landing.stall_speed", "airframe.landing.stall_mass")
	case "wing_loading":
		f.Rests = stall
	}
	return f
}

// Figure finds a figure by its identifier; nil when there is none of that name.
func (s *Study) Figure(id string) *Figure {
	for i := range s.Figures {
		if s.Figures[i].ID == id {
			return &s.Figures[i]
		}
	}
	return nil
}

func (s *Study) set(id string, value float64, where units.Message, err error) {
	s.Figure(id).take(value, where, err)
}

// take gives the figure its value in SI, or the reason why there is none.
func (f *Figure) take(value float64, where units.Message, err error) {
	f.Where = where
	switch {
	case err != nil:
		f.Reason = units.Explain(err)
	case math.IsNaN(value) || math.IsInf(value, 0):
		f.Reason = units.Say("no answer")
	default:
		f.Value = value
	}
}

// figures fills every figure that is computed whether or not a requirement asks for it.
func (s *Study) figures(a *aircraft.Aircraft) {
	for _, k := range project.FigureKinds() {
		if !k.Asked {
			s.Figures = append(s.Figures, s.blank(k))
		}
	}
	strip := s.TakeOff
	on := stripCondition(strip)
	s.set("take_off_distance", strip.Run.Total, on, strip.Err)
	s.set("take_off_roll", strip.Run.Ground, on, strip.Err)
	s.set("climb_gradient", math.Tan(strip.Run.Angle), on, strip.Err)
	landing := stripCondition(s.Landing)
	s.set("landing_distance", s.Landing.Run.Total, landing, s.Landing.Err)
	s.set("landing_roll", s.Landing.Run.Ground, landing, s.Landing.Err)

	air, mass := s.Project.Departure.Air, a.StartMass()
	here := units.Say("{}, {}", units.Of(units.Altitude, air.PressureAltitude), units.Of(units.Mass, mass))
	p := &pointperf.Point{Air: air, Mass: mass}
	best := pointperf.BestRate(a, p)
	s.set("climb_rate", best.Value, here, best.Err)
	fast := pointperf.LevelMax(a, p)
	s.set("level_max", fast.TAS, here, fast.Err)
	for id, c := range map[string]aircraft.Config{"stall_clean": aircraft.Clean, "stall_take_off": aircraft.TakeOff, "stall_landing": aircraft.Landing} {
		s.set(id, pointperf.Stall(a, &pointperf.Point{Air: air, Mass: mass, Config: c}, nil), here, nil)
	}
	atMass := units.Say("{}", units.Of(units.Mass, mass))
	s.set("service_ceiling", s.Service.Value, atMass, s.Service.Err)
	s.set("absolute_ceiling", s.Absolute.Value, atMass, s.Absolute.Err)

	s.set("static_thrust", s.Static.Thrust, units.Say("{}", units.Of(units.Altitude, air.PressureAltitude)), s.staticErr)
	s.set("static_thrust_ratio", s.Static.Thrust/p.Weight(), here, s.staticErr)
	s.set("static_speed", s.Static.Shaft.EngineSpeed, units.Message{}, s.shaftErr())
	s.set("power_loading", mass/s.Static.Shaft.Power, here, s.shaftErr())
	s.set("wing_loading", mass/a.WingArea(), atMass, nil)
	s.set("tip_mach", s.tipMach(), units.Message{}, s.shaftErr())
	s.missionFigures()
}

func (s *Study) shaftErr() error {
	if s.staticErr != nil {
		return s.staticErr
	}
	return turns(s.Static)
}

// weighs lists the powerplant inputs that decide mass, by full path prefix.
func (s *Study) weighs() []string {
	list := s.Variant().Aircraft.Powerplant.Model.Weighs()
	for i := range list {
		list[i] = "powerplant.values." + list[i]
	}
	return list
}

func stripCondition(s Strip) units.Message {
	return units.Say("{}, {}, {}", units.Text(s.Place.Strip.Name), units.Of(units.Altitude, s.Place.Air.PressureAltitude), units.Of(units.Mass, s.Mass))
}

// tipMach is the greatest helical tip Mach number on the mission and at rest.
func (s *Study) tipMach() float64 {
	greatest := s.Static.Shaft.TipMach
	for i := range s.Flight.Trace {
		greatest = math.Max(greatest, s.Flight.Trace[i].Output.Shaft.TipMach)
	}
	return greatest
}

func (s *Study) missionFigures() {
	f := &s.Flight
	var err error
	if !f.Flown() {
		err = units.Errorf(f.Failure.Err, "the mission ends in “{}”", units.Text(f.Failure.Name))
	}
	none := units.Message{}
	if t := f.Tightest; t != nil {
		s.set("thrust_in_hand", t.Ratio(), units.Say("{}, {}, {}", units.Text(s.legName(t.Leg)), units.Of(units.Altitude, t.Altitude), units.Of(units.Mass, t.Mass)), nil)
	} else {
		s.set("thrust_in_hand", 0, none, units.Errorf(err, "no leg was flown"))
	}
	s.set("mission_time", f.Time, none, err)
	s.set("mission_distance", f.Distance, none, err)
	s.set("mission_fuel", f.Fuel, none, err)
	s.set("energy_left", s.energyLeft(), none, err)
	s.groundSpeed()
	r := f.Reserve
	reserveErr := err
	if reserveErr == nil && !r.Asked {
		reserveErr = units.Errorf(nil, "the mission keeps no reserve")
	}
	s.set("fuel_left", r.Left, none, reserveErr)
	if reserveErr == nil && !r.Has(mission.Reserve) {
		reserveErr = units.Errorf(nil, "the mission has no reserve leg")
	}
	s.set("reserve_time", r.Flown, none, reserveErr)
}

// energyLeft is the least share of a store of energy that the mission without its reserve leaves, dimensionless.
func (s *Study) energyLeft() float64 {
	aboard, left := s.Aircraft().Stores(), 1.0
	if aboard.Fuel > 0 {
		left = math.Min(left, 1-s.Flight.Fuel/aboard.Fuel)
	}
	if aboard.Charge > 0 {
		left = math.Min(left, 1-s.Flight.Energy/aboard.Charge)
	}
	return left
}

// groundSpeed finds the greatest ground speed of the mission as flown; a leg that
// circles meets its wind from behind.
func (s *Study) groundSpeed() {
	greatest, at := math.Inf(-1), -1
	for i := range s.Flight.Trace {
		t := &s.Flight.Trace[i]
		leg := &s.Project.Spec.Legs[t.Leg]
		wind := leg.HeadWind
		switch leg.Kind {
		case mission.TakeOff:
			wind = s.TakeOff.Place.HeadWind
		case mission.Landing:
			wind = s.Landing.Place.HeadWind
		case mission.Loiter, mission.Reserve, mission.Turns:
			wind = -math.Abs(wind)
		}
		if v := math.Sqrt(math.Max(0, t.TAS*t.TAS-t.Rate*t.Rate)) - wind; v > greatest {
			greatest, at = v, t.Leg
		}
	}
	if at < 0 {
		s.set("ground_speed", 0, units.Message{}, units.Errorf(nil, "no leg was flown"))
		return
	}
	s.set("ground_speed", greatest, units.Say("in “{}”", units.Text(s.legName(at))), nil)
}

// legName is the name of the leg with the given index.
func (s *Study) legName(i int) string { return s.Project.Spec.Legs[i].Title() }

// Unsure lists the inputs that the figure rests on and whose basis is placeholder.
func (s *Study) Unsure(f *Figure) []string {
	var list []string
	for _, path := range s.Placeholders() {
		if slices.ContainsFunc(f.Rests, func(prefix string) bool {
			return path == prefix || strings.HasPrefix(path, prefix+".") || strings.HasPrefix(path, prefix+"[")
		}) {
			list = append(list, path)
		}
	}
	return list
}

// Placeholders lists the relevant inputs whose basis is placeholder: the aircraft's by path within it, and those of the strips.
func (s *Study) Placeholders() []string { return s.OnBasis(project.Placeholder) }

// OnBasis lists the relevant inputs whose basis is of the kind: the aircraft's by path within it, and those of the strips.
func (s *Study) OnBasis(kind string) []string {
	var list []string
	v := s.Variant()
	for _, e := range inputsOf(&v.Aircraft) {
		if v.BasisOf(e.Path).Kind == kind {
			list = append(list, e.Path)
		}
	}
	for i := range s.Project.Spec.Strips {
		for _, e := range s.Project.Spec.Strips[i].Inputs() {
			e.Path = fmt.Sprintf("strips[%d].%s", i, e.Path)
			if b, ok := s.Project.Spec.BasisAt(e); ok && b.Kind == kind {
				list = append(list, e.Path)
			}
		}
	}
	return list
}

// Input finds an input that Placeholders or OnBasis lists.
func (s *Study) Input(path string) (input.Entry, bool) {
	if e, ok := input.Find(&s.Variant().Aircraft, path); ok {
		return e, true
	}
	return input.Find(s.Project.Spec, path)
}
