package study_test

import (
	"encoding/json"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// held is the demo's first variant held against one requirement.
func held(t testing.TB, r project.Requirement, change ...func(*project.Spec)) (*study.Study, *study.Verdict) {
	t.Helper()
	s := project.Demo()
	for _, f := range change {
		f(s)
	}
	s.Requirements = []project.Requirement{r}
	p := built(t, s)
	st := study.Run(p, 0, study.DefaultView(p, 0))
	return st, &st.Requirements[0]
}

// value is the figure of a requirement, which must have one.
func value(t testing.TB, r project.Requirement, change ...func(*project.Spec)) float64 {
	t.Helper()
	_, v := held(t, r, change...)
	if !v.Judged() {
		t.Fatalf("%s: %s", r.Figure, v.Reason.In(units.Metric))
	}
	return v.Figure.Value
}

func nearly(t testing.TB, what string, got, want, relative float64) {
	t.Helper()
	if !(math.Abs(got-want) <= relative*math.Abs(want)) {
		t.Errorf("%s is %.9g, want %.9g within %g of it", what, got, want, relative)
	}
}

// ask is a requirement of the figure at a pressure altitude in m on a standard day, at a mass in kg.
func ask(figure string, altitude, mass float64) project.Requirement {
	kind, _ := project.LookupFigure(figure)
	r := project.Require(figure, kind.Bound, kind.Usual)
	r.AltitudeGiven, r.Altitude, r.DayGiven = project.AtAltitude, altitude, mission.OwnDay
	r.MassGiven, r.Mass = project.GivenMass, mass
	return r
}

// A requirement without conditions has the very figure of the study; one that states the
// study's own condition comes to the same number by the other way.
func TestAskedAsInTheStudy(t *testing.T) {
	dry := func(s *project.Spec) { s.Day = atmos.Spec{Given: atmos.ByDeviation, Deviation: 15, QNH: 101800} }
	for _, k := range project.FigureKinds() {
		plain := project.Require(k.ID, k.Bound, k.Usual)
		st, v := held(t, plain, dry)
		if k.Asked {
			if st.Figure(k.ID) != nil || !v.Judged() {
				t.Errorf("%s: computed unasked, or not when asked: %s", k.ID, v.Reason.In(units.Metric))
			}
			continue
		}
		if v.Figure != st.Figure(k.ID) {
			t.Errorf("%s is not the figure of the study", k.ID)
		}
		if k.Takes == 0 {
			continue
		}
		own := plain
		own.DayGiven, own.Deviation = mission.OwnDay, 15
		own.AltitudeGiven, own.Altitude = project.AtAltitude, st.Project.Departure.Air.PressureAltitude
		own.MassGiven, own.Mass = project.GivenMass, st.Masses.Start
		switch {
		case strings.HasPrefix(k.ID, "take_off"), k.ID == "climb_gradient":
			own.Mass = st.TakeOff.Mass
		case strings.HasPrefix(k.ID, "landing"):
			own.MassGiven = project.AtLanding
		}
		_, again := held(t, own, dry)
		if !again.Judged() {
			t.Errorf("%s: %s", k.ID, again.Reason.In(units.Metric))
			continue
		}
		nearly(t, k.ID, again.Figure.Value, v.Figure.Value, 1e-9)
		if again.Figure.Where.Empty() {
			t.Errorf("%s does not say its condition", k.ID)
		}
	}
}

// The calibrated stall does not depend on altitude but by compressibility, some parts in ten
// thousand at these speeds: it is √(2 W/(ρ0 S CLmax)).
func TestCalibratedStall(t *testing.T) {
	a := built(t, project.Demo()).Aircraft[0]
	for figure, c := range map[string]aircraft.Config{"stall_clean": aircraft.Clean, "stall_take_off": aircraft.TakeOff, "stall_landing": aircraft.Landing} {
		want := math.Sqrt(2 * 600 * 9.80665 / (1.225 * a.WingArea() * a.CLMax(c)))
		for _, hp := range []float64{0, 1500, 4000} {
			r := ask(figure, hp, 600)
			nearly(t, figure+", true", value(t, r), want*math.Sqrt(1.225/airAt(t, hp).Density), 1e-6)
			r.Airspeed = project.Calibrated
			nearly(t, figure+", calibrated", value(t, r), want, 5e-4)
		}
	}
}

func airAt(t testing.TB, hp float64) atmos.Air {
	t.Helper()
	air, err := atmos.Day{}.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}

// The gradients follow from thrust and drag alone: sin γ = (T − D)/W with the lift W cos γ, here
// solved by a plain iteration on the drag of the polar as entered.
func TestGradientsFromForces(t *testing.T) {
	s := project.Demo()
	a := built(t, s).Aircraft[0]
	air := airAt(t, 800)
	f := &s.Variants[0].Aircraft.Airframe
	for _, c := range []struct {
		figure string
		config *aircraft.Configuration
		factor float64
	}{{"climb_gradient", &f.TakeOff, s.Technique.ClimbOutFactor}, {"balked_gradient", &f.Landing, s.Technique.ApproachFactor}} {
		weight := 620 * 9.80665
		v := c.factor * math.Sqrt(2*weight/(air.Density*f.WingArea*c.config.CLMax))
		out, err := a.Plant().Run(powerplant.Condition{Air: air, TAS: v}, 1, nil)
		if err != nil {
			t.Fatal(err)
		}
		q, sin := 0.5*air.Density*v*v*f.WingArea, 0.0
		k := f.WingArea / (math.Pi * f.Span * f.Span * f.Efficiency)
		for range 50 {
			cl := weight * math.Sqrt(1-sin*sin) / q
			lifted := cl - f.CLMinDrag - c.config.DeltaCLM
			sin = (out.Thrust - q*(f.CDMin+c.config.DeltaCD+k*lifted*lifted)) / weight
		}
		nearly(t, c.figure, value(t, ask(c.figure, 800, 620)), math.Tan(math.Asin(sin)), 1e-8)
	}
	// The steepest climb is no flatter than any other.
	steepest := value(t, ask("steepest_gradient", 800, 620))
	p := &pointperf.Point{Air: air, Mass: 620}
	for v := 26.0; v < 60; v++ {
		if climb, err := pointperf.FullClimb(a, p, v, nil); err == nil && climb.Gradient() > steepest*(1+1e-9) {
			t.Errorf("%g at %g m/s is steeper than %g", climb.Gradient(), v, steepest)
		}
	}
}

// The time to climb is the sum of slices at best rate, the mass falling by the fuel flow: a
// trapezoid rule of 40 slices, apart from the integration of the program. Its speed follows the
// schedule's five nodes, which costs some parts in ten thousand.
func TestTimeToClimbInSlices(t *testing.T) {
	a := built(t, project.Demo()).Aircraft[0]
	r := ask("time_to_climb", 200, 600)
	r.ClimbTo = 2200
	const slices = 40
	mass, sum := 600.0, 0.0
	for i := range slices {
		air := airAt(t, 200+2000*(float64(i)+0.5)/slices)
		p := &pointperf.Point{Air: air, Mass: mass}
		best := pointperf.BestRate(a, p)
		out, err := pointperf.ThrustAvailable(a, p, best.TAS, nil)
		if err != nil {
			t.Fatal(err)
		}
		seconds := 2000.0 / slices / best.Value
		sum += seconds
		mass -= out.FuelFlow * seconds
	}
	nearly(t, "time to climb", value(t, r), sum, 5e-3)
}

// Speeds, glide, turn and reach are those of the point at that condition.
func TestAskedAtItsPoint(t *testing.T) {
	a := built(t, project.Demo()).Aircraft[0]
	p := &pointperf.Point{Air: airAt(t, 1000), Mass: 610}
	level, err := pointperf.AtFraction(a, p, 0.65)
	if err != nil {
		t.Fatal(err)
	}
	cruise := ask("cruise_speed", 1000, 610)
	cruise.Power = 0.65
	nearly(t, "cruise", value(t, cruise), level.TAS, 1e-12)
	nearly(t, "share of power there", level.Output.Fraction, 0.65, 1e-6)
	cruise.Airspeed = project.Calibrated
	nearly(t, "cruise, calibrated", value(t, cruise), float64(p.Air.CAS(level.TAS)), 1e-12)

	glide, err := pointperf.BestGlide(a, p)
	if err != nil {
		t.Fatal(err)
	}
	nearly(t, "glide", value(t, ask("glide_ratio", 1000, 610)), glide.Ratio, 1e-12)
	flapped := ask("glide_ratio", 1000, 610)
	flapped.Config = "landing"
	if got := value(t, flapped); got >= glide.Ratio {
		t.Errorf("glides 1 : %g with flaps, 1 : %g without", got, glide.Ratio)
	}

	turn := ask("turn_load", 1000, 610)
	best := value(t, turn)
	turn.TurnGiven, turn.TurnSpeed = project.TurnSpeed, 36
	given := value(t, turn)
	n, _, err := pointperf.SustainedLoad(a, p, 36)
	if err != nil || given != n || given > best {
		t.Errorf("%g at 36 m/s, want %g; %g at best: %v", given, n, best, err)
	}

	reach, err := mission.LevelReach(a, p.Air, 610, 0.3, false)
	if err != nil {
		t.Fatal(err)
	}
	far := ask("range", 1000, 610)
	far.Kept = 0.3
	nearly(t, "range", value(t, far), reach.Distance, 1e-12)
	long := ask("endurance", 1000, 610)
	if got := value(t, long); got <= reach.Time/0.7*0.9 {
		t.Errorf("endurance %g s, best range takes %g s on 70 %% of the fuel", got, reach.Time)
	}
}

// Distances on a strip of the rules are those of that strip; the safety factor multiplies them.
func TestAskedDistances(t *testing.T) {
	s := project.Demo()
	p := built(t, s)
	a := p.Aircraft[0]
	hard, _ := runway.LookupSurface("dry-asphalt")
	at := runway.Place{Strip: runway.Strip{Surface: "dry-asphalt", Obstacle: 15.24}, Surface: hard, Air: airAt(t, 0)}
	off, err := runway.TakeOff(a, 650, at, s.Technique)
	if err != nil {
		t.Fatal(err)
	}
	on, err := runway.Landing(a, 650, at, s.Technique)
	if err != nil {
		t.Fatal(err)
	}
	for figure, want := range map[string]float64{"take_off_distance": off.Total, "take_off_roll": off.Ground, "landing_distance": on.Total, "landing_roll": on.Ground} {
		r := ask(figure, 0, 0)
		r.MassGiven, r.StripGiven = project.AtGreatest, project.LevelHard
		nearly(t, figure, value(t, r), want, 1e-12)
		r.Distance = project.Factored
		switch figure {
		case "take_off_distance":
			want *= 1.33
		case "landing_distance":
			want *= 1.43
		}
		nearly(t, figure+" with its factor", value(t, r), want, 1e-12)
		r.StripGiven = project.LevelGrass
		if strings.HasPrefix(figure, "take_off") && value(t, r) <= want {
			t.Errorf("%s is no longer on grass", figure)
		}
	}
	// A strip by name has its own slope, surface and height.
	named := project.Require("take_off_roll", project.AtMost, 300)
	named.StripGiven, named.Strip = project.NamedStrip, "High Moor"
	high := func(s *project.Spec) {
		s.Strips = append(s.Strips, runway.Strip{Name: "High Moor", Length: 500, Elevation: 1100, Slope: 0.02, Surface: "wet-grass", Obstacle: 15.24})
	}
	there := value(t, named, high)
	if here := value(t, project.Require("take_off_roll", project.AtMost, 300)); there < 1.2*here {
		t.Errorf("%g m on the high moor, %g m at home", there, here)
	}
}

// A landing is held for the strip of arrival, a take-off for that of departure.
func TestAskedOnItsOwnStrip(t *testing.T) {
	away := func(s *project.Spec) {
		s.Strips = append(s.Strips, runway.Strip{Name: "Lake", Length: 900, Elevation: 900, Surface: "dry-asphalt", Obstacle: 15.24})
		for i := range s.Legs {
			if s.Legs[i].Kind == mission.Landing {
				s.Legs[i].Strip = "Lake"
			}
		}
	}
	for figure, name := range map[string]string{"landing_distance": "Lake", "take_off_distance": "Sorrel Down 08"} {
		r := project.Require(figure, project.AtMost, 500)
		r.MassGiven = project.AtGreatest
		_, v := held(t, r, away)
		if where := v.Figure.Where.In(units.Metric); !strings.HasPrefix(where, name) {
			t.Errorf("%s holds at %s", figure, where)
		}
		r.StripGiven, r.Strip = project.NamedStrip, name
		if _, named := held(t, r, away); named.Figure.Value != v.Figure.Value {
			t.Errorf("%s: %g m, %g m on %s", figure, v.Figure.Value, named.Figure.Value, name)
		}
	}
}

// The demo's return is flown at 50 m/s with 3 m/s from behind; what is left of the fuel is what was not burnt.
func TestMissionShares(t *testing.T) {
	st := study.All(built(t, project.Demo()))[0]
	nearly(t, "ground speed", st.Figure("ground_speed").Value, 53, 1e-9)
	aboard := st.Aircraft().Stores().Fuel
	nearly(t, "fuel left", st.Figure("energy_left").Value, 1-st.Figure("mission_fuel").Value/aboard, 1e-12)
	nearly(t, "wing loading", st.Figure("wing_loading").Value, st.Masses.Start/12.1, 1e-12)
	nearly(t, "static thrust ratio", st.Figure("static_thrust_ratio").Value, st.Figure("static_thrust").Value/(st.Masses.Start*9.80665), 1e-12)
	nearly(t, "power loading", st.Figure("power_loading").Value, st.Masses.Start/st.Static.Shaft.Power, 1e-12)
}

// What cannot be evaluated says why, with the numbers.
func TestAskedInVain(t *testing.T) {
	noLanding := func(s *project.Spec) { s.Legs = s.Legs[:4] }
	change := func(r project.Requirement, f func(*project.Requirement)) project.Requirement { f(&r); return r }
	for _, c := range []struct {
		r     project.Requirement
		says  string
		other func(*project.Spec)
	}{
		{ask("climb_rate", 0, 100), "below that of the empty aircraft", nil},
		{ask("level_max", 0, 20000), "", nil},
		{ask("climb_rate", 25000, 600), "", nil},
		{ask("range", 0, 400), "less than the empty aircraft with its fuel", nil},
		{change(ask("time_to_climb", 1000, 600), func(r *project.Requirement) { r.ClimbTo = 900 }), "is not above", nil},
		{change(ask("time_to_climb", 1000, 600), func(r *project.Requirement) { r.ClimbTo = 9000 }), "", nil},
		{change(ask("cruise_speed", 4000, 600), func(r *project.Requirement) { r.Power = 1 }), "makes only", nil},
		{change(ask("turn_load", 0, 600), func(r *project.Requirement) { r.TurnGiven, r.TurnSpeed = project.TurnSpeed, 12 }), "below the stall", nil},
		{change(ask("turn_load", 0, 600), func(r *project.Requirement) { r.TurnGiven, r.TurnSpeed = project.TurnSpeed, 120 }), "never-exceed", nil},
		{change(ask("stall_clean", 0, 600), func(r *project.Requirement) { r.MassGiven = project.AtLanding }), "no landing mass", noLanding},
		{ask("take_off_distance", 4000, 3000), "", nil},
	} {
		change := func(s *project.Spec) {
			if c.other != nil {
				c.other(s)
			}
		}
		st, v := held(t, c.r, change)
		said := v.Reason.In(units.Metric)
		if v.Judged() || v.Met || said == "" || !strings.Contains(said, c.says) || v.Margin() != 0 {
			t.Errorf("%s: %q, wanted one with %q", c.r.Figure, said, c.says)
		}
		a := st.Answer().Requirements[0]
		if a.Reason != said || a.Value != nil || a.Margin != nil || a.Share != nil {
			t.Errorf("answers %+v", a)
		}
	}
}

// Any requirement that the document accepts gets a finite number or a reason, on the page of
// the working as well, and the interface can write it.
func TestAskedAnything(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := project.Demo()
		r := project.Require("climb_rate", project.AtMost, 1)
		for range 2 {
			for _, e := range r.Inputs() {
				switch {
				case e.Choice != nil:
					*e.Choice.Value = rapid.SampledFrom(e.Choice.Options).Draw(t, e.Path).Value
				case e.Number != nil && e.Path != "limit":
					*e.Number.Value = rapid.Float64Range(e.Number.Min, e.Number.Max).Draw(t, e.Path)
				}
			}
		}
		r.Limit = rapid.SampledFrom([]float64{0, 1, -5, 1e9}).Draw(t, "limit")
		r.Strip = ""
		s.Requirements = []project.Requirement{r}
		if err := input.Check(s); err != nil {
			t.Fatal(err)
		}
		p, err := s.Build()
		if err != nil {
			t.Fatal(err)
		}
		st := study.Run(p, 0, study.DefaultView(p, 0))
		v := &st.Requirements[0]
		if v.Judged() && (math.IsNaN(v.Figure.Value) || math.IsInf(v.Figure.Value, 0) || v.Met != (v.Margin() >= 0)) {
			t.Errorf("%+v: %+v", r, v.Figure)
		}
		if !v.Judged() && v.Reason.In(units.Aviation) == "" {
			t.Errorf("%+v: no reason", r)
		}
		if text, err := json.Marshal(st.Answer()); err != nil || strings.Contains(string(text), "NaN") {
			t.Errorf("%v", err)
		}
		for _, step := range st.Working().Steps {
			if strings.Contains(step.Note, "NaN") || strings.Contains(step.Note, "Inf") {
				t.Errorf("%s: %s", r.Figure, step.Note)
			}
		}
	})
}

// The margin is positive on the wanted side, and its share is of the limit.
func TestMargin(t *testing.T) {
	for _, c := range []struct {
		bound         string
		limit         float64
		met           bool
		margin, share float64
	}{
		{project.AtMost, 60, true, 60 - 50.61, (60 - 50.61) / 60},
		{project.AtMost, 50, false, 50 - 50.61, (50 - 50.61) / 50},
		{project.AtLeast, 50, true, 0.61, 0.61 / 50},
		{project.AtLeast, 60, false, 50.61 - 60, (50.61 - 60) / 60},
	} {
		_, v := held(t, project.Require("wing_loading", c.bound, c.limit))
		share, ok := v.Share()
		// 612.4 kg over 12.1 m² by hand.
		if v.Met != c.met || !ok || math.Abs(v.Margin()-c.margin) > 0.01 || math.Abs(share-c.share) > 2e-4 {
			t.Errorf("%s %g: met %v, margin %g, share %g", c.bound, c.limit, v.Met, v.Margin(), share)
		}
	}
	r := ask("stall_landing", 0, 600)
	r.Clause, r.Note = "a rule", "a note"
	st, v := held(t, r)
	a := st.Answer().Requirements[0]
	share, _ := v.Share()
	if a.Value == nil || *a.Value != v.Figure.Value || *a.Margin != v.Margin() || *a.Share != share || a.Unit != "m/s" || a.Clause != "a rule" || a.Note != "a note" ||
		a.Conditions != "0\u00a0m, standard day, 600.0\u00a0kg" || a.Where != a.Conditions {
		t.Errorf("answers %+v", a)
	}
	if _, v := held(t, project.Require("wing_loading", project.AtLeast, 0)); v.Met != true {
		t.Error("not met at 0")
	} else if _, ok := v.Share(); ok {
		t.Error("a share of nothing")
	}
}

// The working derives each requirement that has conditions of its own, with its number.
func TestAskedWorking(t *testing.T) {
	s := project.Demo()
	s.Requirements = nil
	for _, k := range project.FigureKinds() {
		r := project.Require(k.ID, k.Bound, k.Usual)
		if k.Takes != 0 {
			r = ask(k.ID, 700, 600)
		}
		s.Requirements = append(s.Requirements, r)
	}
	st := study.All(built(t, s))[0]
	notes := map[string]bool{}
	for _, step := range st.Working().Steps {
		notes[step.Note] = true
		if step.Formula != nil {
			if err := step.Check(1e-9); err != nil {
				t.Error(err)
			}
		}
	}
	for i := range st.Requirements {
		v := &st.Requirements[i]
		if v.Figure.Takes == 0 {
			continue
		}
		if want := v.Figure.Label + " is " + units.Metric.Format(v.Figure.Quantity, v.Figure.Value) + "."; !notes[want] {
			t.Errorf("no line %q", want)
		}
		if v.WorkingPart() == study.WorkingPart("mission_time") {
			t.Errorf("%s leads to the mission", v.Figure.ID)
		}
	}
}
