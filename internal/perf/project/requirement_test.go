package project

import (
	"fmt"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/units"
)

// words joins what the requirement states for itself.
func words(r *Requirement) string {
	var list []string
	for _, m := range r.Stated() {
		list = append(list, m.In(units.Metric))
	}
	return strings.Join(list, "; ")
}

// Whatever the choices are, one that says that nothing depends on it keeps that: otherwise the
// schema and the decoder, which do not try it, would be wrong.
func TestLoneChoices(t *testing.T) {
	lone := 0
	var visit func(n *node)
	visit = func(n *node) {
		for _, f := range slices.Concat(n.fields, n.kinds) {
			visit(f)
		}
		if n.item != nil {
			visit(n.item)
		}
		if d, ok := reflect.New(n.typ).Interface().(input.Described); ok && n.form == anObject {
			for _, e := range d.Inputs() {
				if e.Lone {
					lone++
					loneChoice(t, n.typ, e.Path)
				}
			}
		}
	}
	visit(document())
	if lone == 0 {
		t.Error("no choice is alone")
	}
}

func loneChoice(t *testing.T, typ reflect.Type, name string) {
	rapid.Check(t, func(t *rapid.T) {
		d := reflect.New(typ).Interface().(input.Described)
		var alone *input.Choice
		for range 3 { // what one choice offers may depend on another
			for _, e := range d.Inputs() {
				if e.Choice != nil {
					*e.Choice.Value = rapid.SampledFrom(e.Choice.Options).Draw(t, e.Path).Value
				}
				if e.Path == name {
					alone = e.Choice
				}
			}
		}
		// What stands in the choice itself may change; what matters, and within which ranges, may not.
		others := func() string { return signature(d.Inputs()) }
		before := others()
		for _, o := range alone.Options {
			*alone.Value = o.Value
			if after := others(); after != before {
				t.Fatalf("%s %s: with %s = %q, %s instead of %s", typ, name, name, o.Value, after, before)
			}
		}
	})
}

func TestStated(t *testing.T) {
	plain := Require("climb_rate", AtLeast, 2)
	if got := words(&plain); got != "" {
		t.Errorf("as the study has it: %q", got)
	}
	hot := plain
	hot.AltitudeGiven, hot.Altitude, hot.DayGiven, hot.Deviation, hot.MassGiven, hot.Config = AtAltitude, 1200, mission.OwnDay, 20, AtGreatest, "landing"
	if got, want := words(&hot), "landing configuration; 1200\u00a0m; ISA +20.0\u00a0°C; greatest take-off mass"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
	// The same settings say nothing of a figure that does not depend on them.
	hot.Figure = "mission_time"
	if got := words(&hot); got != "" {
		t.Errorf("mission time under %q", got)
	}
	cold := Require("take_off_distance", AtMost, 400)
	cold.DayGiven, cold.Deviation, cold.StripGiven, cold.Distance, cold.MassGiven, cold.Mass = mission.OwnDay, -10, LevelGrass, Factored, GivenMass, 480
	if got, want := words(&cold), "with the safety factor; level dry short grass, still air; ISA −10.0\u00a0°C; 480.0\u00a0kg"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
	for _, r := range []Requirement{Require("time_to_climb", AtMost, 1), Require("cruise_speed", AtLeast, 1)} {
		if words(&r) == "" {
			t.Errorf("%s does not say to where or at which power", r.Figure)
		}
	}
}

// A requirement whose figure becomes one of another quantity begins anew; one of the same keeps its limit.
func TestFigureConverts(t *testing.T) {
	s := Demo()
	r := &s.Requirements[0] // take-off over the obstacle
	r.Clause = "a rule"
	r.Figure = "take_off_roll"
	input.Convert(s, "requirements[0].figure", "take_off_distance")
	if r.Limit != 450 || r.Clause != "a rule" {
		t.Errorf("limit %g, clause %q", r.Limit, r.Clause)
	}
	r.Figure = "climb_rate"
	input.Convert(s, "requirements[0].figure", "take_off_roll")
	if kind := r.Kind(); r.Limit != kind.Usual || r.Bound != AtLeast || r.Clause != "" {
		t.Errorf("limit %g, %s, clause %q", r.Limit, r.Bound, r.Clause)
	}
	r.MassGiven = GivenMass
	input.Convert(s, "requirements[0].mass_given", AtGreatest)
	if r.Mass != 650 {
		t.Errorf("a mass of %g kg instead of the greatest, 650", r.Mass)
	}
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	input.Convert(s, "requirements[0].mass_given", AtStart)
	if r.Mass != p.Aircraft[0].StartMass() {
		t.Errorf("a mass of %g kg instead of the start mass, %g", r.Mass, p.Aircraft[0].StartMass())
	}
	r.Figure, r.StripGiven = "take_off_roll", NamedStrip
	input.Convert(s, "requirements[0].strip_given", OfMission)
	if r.Strip != s.Strips[0].Name {
		t.Errorf("strip %q", r.Strip)
	}
}

func TestNamedStripMustBeThere(t *testing.T) {
	s := Demo()
	s.Requirements[0].StripGiven, s.Requirements[0].Strip = NamedStrip, "Nowhere"
	_, err := s.Build()
	if err == nil || !strings.Contains(err.Error(), "requirements[0].strip") {
		t.Errorf("says %v", err)
	}
	s.Requirements[0].Figure = "stall_clean" // which takes no strip
	if _, err := s.Build(); err != nil {
		t.Error(err)
	}
}

// Every figure can be required at once with its usual limit, and read back.
func TestEveryFigureCanBeRequired(t *testing.T) {
	s := Demo()
	s.Requirements = nil
	for _, k := range FigureKinds() {
		s.Requirements = append(s.Requirements, Require(k.ID, k.Bound, k.Usual))
	}
	if _, err := s.Build(); err != nil {
		t.Fatal(err)
	}
	back, err := Decode(encoded(t, s))
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(back.Requirements, s.Requirements) {
		t.Error("the requirements read back are others")
	}
}

// What an older document requires is held against the study as it is.
func TestOlderRequirements(t *testing.T) {
	s := Demo()
	text := strings.ReplaceAll(string(encoded(t, s)), `"format": 2`, `"format": 1`)
	start, end := strings.Index(text, `"requirements": [`), strings.Index(text, `"variants": [`)
	head, tail, text := text[:start], text[end:], text[start:end]
	for path, value := range added {
		if name, ok := strings.CutPrefix(path, "requirements."); ok {
			text = strings.ReplaceAll(text, fmt.Sprintf(",\n      %q: %s", name, value), "")
		}
	}
	if strings.Count(text, ":") != 1+3*len(s.Requirements) {
		t.Fatalf("there are new fields still: %s", text)
	}
	text = head + text + tail
	old, err := Decode([]byte(text))
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(old.Requirements, s.Requirements) {
		t.Errorf("reads %+v", old.Requirements)
	}
}

func TestUnusualFigures(t *testing.T) {
	k, ok := LookupFigure("static_thrust_ratio")
	if !ok {
		t.Fatal("no such figure")
	}
	u := units.Metric.Unit(k.Quantity)
	for value, usual := range map[float64]bool{0.1: false, 0.2: true, 0.3: true, 0.4: true, 0.9: false} {
		if got := k.Unusual(value, u); (got == "") != usual {
			t.Errorf("%v of the weight: %q", value, got)
		}
	}
	for id := range usual {
		if _, ok := LookupFigure(id); !ok {
			t.Errorf("%s is no figure", id)
		}
	}
}
