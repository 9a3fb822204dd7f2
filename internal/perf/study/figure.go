package study

import (
	"math"
	"slices"
	"strings"

	"legwright/internal/perf/aircraft"
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
	polarInputs = []string{"airframe.wing_area", "airframe.span", "airframe.drag_given", "airframe.cd_min", "airframe.efficiency", "airframe.cl_min_drag", "airframe.polar"}
	massInputs  = []string{"weights.empty", "weights.items"}
	plantInputs = []string{"powerplant"}
	clean       = slices.Concat(polarInputs, massInputs, plantInputs, []string{"airframe.clean", "airframe.never_exceed"})
	off         = slices.Concat(polarInputs, massInputs, plantInputs, []string{"airframe.wing_height", "airframe.ground_cl", "airframe.take_off"})
	flown       = slices.Concat(clean, []string{"airframe.wing_height", "airframe.ground_cl", "airframe.take_off", "airframe.landing"})
)

// rests gives the inputs of the figures that do not rest on all of a flown mission.
var rests = map[string][]string{
	"take_off_distance": off, "take_off_roll": off, "climb_gradient": off,
	"climb_rate": clean, "service_ceiling": clean, "absolute_ceiling": clean, "level_max": clean,
	"static_thrust": plantInputs, "static_speed": plantInputs,
}

// blank lists every figure without its value, in the order shown.
func blank() []Figure {
	kinds := project.FigureKinds()
	list := make([]Figure, len(kinds))
	for i, k := range kinds {
		list[i] = Figure{FigureKind: k, Rests: flown}
		if r, ok := rests[k.ID]; ok {
			list[i].Rests = r
		}
	}
	return list
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
	f := s.Figure(id)
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

// figures fills every figure.
func (s *Study) figures(a *aircraft.Aircraft) {
	s.Figures = blank()
	stall := slices.Concat([]string{"airframe.wing_area"}, massInputs, s.weighs())
	s.Figure("stall_clean").Rests = append(slices.Clone(stall), "airframe.clean.cl_max")
	s.Figure("stall_landing").Rests = append(slices.Clone(stall), "airframe.landing.cl_max")

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
	speeds := pointperf.AllSpeeds(a, p)
	s.set("level_max", speeds.LevelMax.TAS, here, speeds.LevelMax.Err)
	s.set("stall_clean", pointperf.Stall(a, p, nil), here, nil)
	land := &pointperf.Point{Air: air, Mass: mass, Config: aircraft.Landing}
	s.set("stall_landing", pointperf.Stall(a, land, nil), here, nil)
	atMass := units.Say("{}", units.Of(units.Mass, mass))
	s.set("service_ceiling", s.Service.Value, atMass, s.Service.Err)
	s.set("absolute_ceiling", s.Absolute.Value, atMass, s.Absolute.Err)

	s.set("static_thrust", s.Static.Thrust, units.Say("{}", units.Of(units.Altitude, air.PressureAltitude)), s.staticErr)
	s.set("static_speed", s.Static.Shaft.EngineSpeed, units.Message{}, s.shaftErr())
	s.set("tip_mach", s.tipMach(), units.Message{}, s.shaftErr())
	s.missionFigures()
}

func (s *Study) shaftErr() error {
	if s.staticErr == nil && s.Static.Shaft.Speed == 0 {
		return units.Errorf(nil, "this powerplant turns no propeller")
	}
	return s.staticErr
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
	r := f.Reserve
	reserveErr := err
	if reserveErr == nil && !r.Asked {
		reserveErr = units.Errorf(nil, "the mission has no reserve leg")
	}
	s.set("reserve_time", r.Flown, none, reserveErr)
	s.set("fuel_left", r.Left, none, reserveErr)
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

// Placeholders lists the relevant aircraft inputs whose basis is placeholder, by path within the aircraft.
func (s *Study) Placeholders() []string { return s.OnBasis(project.Placeholder) }

// OnBasis lists the relevant aircraft inputs whose basis is of the kind, by path within the aircraft.
func (s *Study) OnBasis(kind string) []string {
	var list []string
	v := s.Variant()
	for _, e := range inputsOf(&v.Aircraft) {
		if v.BasisOf(e.Path).Kind == kind {
			list = append(list, e.Path)
		}
	}
	return list
}
