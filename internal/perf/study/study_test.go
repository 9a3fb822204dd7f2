package study_test

import (
	"encoding/json"
	"math"
	"reflect"
	"strings"
	"sync"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func built(t testing.TB, s *project.Spec) *project.Project {
	t.Helper()
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// TestDemo holds the demo to what its story needs: the small engine flies the
// mission tightly and misses the strip, the bigger one meets every requirement.
func TestDemo(t *testing.T) {
	all := study.All(built(t, project.Demo()))
	for i, s := range all {
		if !s.Flight.Flown() || !s.Flight.Reserve.Met {
			t.Fatalf("%s: %v, reserve %+v", s.Variant().Name, s.Flight.Failure, s.Flight.Reserve)
		}
		for _, f := range s.Figures {
			if !f.Has() {
				t.Errorf("%s: %s has no value: %s", s.Variant().Name, f.ID, f.Reason.In(units.Metric))
			}
		}
		missed := 0
		for _, r := range s.Requirements {
			if !r.Judged() || !r.Met {
				missed++
			}
		}
		if want := []int{1, 0}[i]; missed != want {
			t.Errorf("%s misses %d requirements, want %d", s.Variant().Name, missed, want)
		}
	}
	if a, b := all[0].Figure("thrust_in_hand").Value, all[1].Figure("thrust_in_hand").Value; !(a > 0.1 && a < b) {
		t.Errorf("thrust in hand %.3f and %.3f", a, b)
	}
}

// TestEngineeringSense compares the demo with what such an aircraft does: common
// practice, no source. A 60 kW two-seater of 612 kg climbs at 2 to 5 m/s, is off a
// grass strip over 15 m in 300 to 700 m, flies level at 45 to 60 m/s and has 20 to
// 30 N of static thrust per kW.
func TestEngineeringSense(t *testing.T) {
	s := study.All(built(t, project.Demo()))[0]
	for id, band := range map[string][2]float64{"climb_rate": {2, 5}, "take_off_distance": {300, 700}, "landing_distance": {200, 500},
		"level_max": {45, 60}, "stall_landing": {18, 24}, "service_ceiling": {3500, 6000}, "static_thrust": {20 * 60, 30 * 60}, "tip_mach": {0.5, 0.82}} {
		if v := s.Figure(id).Value; v < band[0] || v > band[1] {
			t.Errorf("%s = %.4g, expected %v", id, v, band)
		}
	}
}

// TestRestsAreTrue nudges every input of the aircraft in turn: a figure that
// does not rest on it must not change by a bit.
func TestRestsAreTrue(t *testing.T) {
	base := project.Demo()
	before := study.Run(built(t, base), 0, study.DefaultView(built(t, base), 0))
	moved := map[string]bool{}
	for _, e := range input.Walk(&base.Variants[0].Aircraft) {
		if e.Idle || (e.Number == nil && e.Table == nil) {
			continue
		}
		changed := base.Clone()
		target, ok := input.Find(&changed.Variants[0].Aircraft, e.Path)
		if !ok {
			t.Fatalf("%s is not found again", e.Path)
		}
		nudge(target)
		p, err := changed.Build()
		if err != nil {
			t.Errorf("%s: %v", e.Path, err)
			continue
		}
		after := study.Run(p, 0, study.DefaultView(p, 0))
		for i := range before.Figures {
			a, b := &before.Figures[i], &after.Figures[i]
			if a.Value == b.Value && a.Has() == b.Has() {
				continue
			}
			moved[a.ID] = true
			if !restsOn(a.Rests, e.Path) {
				t.Errorf("%s changed with %s, which it is not said to rest on", a.ID, e.Path)
			}
		}
	}
	for _, f := range before.Figures {
		if !moved[f.ID] && f.ID != "reserve_time" && f.ID != "ground_speed" { // the demo's cruises have given speeds
			t.Errorf("%s changed with no input at all", f.ID)
		}
	}
}

func nudge(e input.Entry) {
	if e.Table != nil {
		rows := *e.Table.Value
		rows[len(rows)/2][len(e.Table.Columns)-1] *= 1.001
		return
	}
	v := e.Number.Value
	*v += math.Max(math.Abs(*v)*1e-3, 1e-4*(e.Number.Max-e.Number.Min))
	if *v > e.Number.Max {
		*v = e.Number.Max * 0.999
	}
}

func restsOn(prefixes []string, path string) bool {
	for _, p := range prefixes {
		if path == p || strings.HasPrefix(path, p+".") || strings.HasPrefix(path, p+"[") {
			return true
		}
	}
	return false
}

func TestPlaceholdersAreNamed(t *testing.T) {
	s := project.Demo()
	delete(s.Variants[0].Basis, "airframe.take_off.cl_max")
	st := study.All(built(t, s))[0]
	if got := st.Unsure(st.Figure("take_off_distance")); !reflect.DeepEqual(got, []string{"airframe.take_off.cl_max"}) {
		t.Errorf("take-off rests on the placeholders %v", got)
	}
	if got := st.Unsure(st.Figure("stall_clean")); len(got) != 0 {
		t.Errorf("the clean stall rests on %v", got)
	}
	fresh := study.All(built(t, project.New("empty")))[0]
	if n := len(fresh.Placeholders()); n < 20 {
		t.Errorf("a new project has %d placeholders", n)
	}
}

// TestConcurrent asks for the same study from many goroutines: same bits, and the race detector looks on.
func TestConcurrent(t *testing.T) {
	p := built(t, project.Demo())
	text := func() string {
		b, err := json.Marshal(study.Run(p, 0, study.DefaultView(p, 0)).Answer())
		if err != nil {
			t.Error(err)
		}
		return string(b)
	}
	want := text()
	var wg sync.WaitGroup
	for range 8 {
		wg.Go(func() {
			if got := text(); got != want {
				t.Error("concurrent studies differ")
			}
		})
	}
	wg.Wait()
}

// TestWorkingIsTrue re-evaluates every step shown.
func TestWorkingIsTrue(t *testing.T) {
	for _, s := range study.All(built(t, project.Demo())) {
		w := s.Working()
		if len(w.Steps) < 40 {
			t.Errorf("only %d steps", len(w.Steps))
		}
		for _, step := range w.Steps {
			if err := step.Check(1e-9); err != nil {
				t.Error(err)
			}
		}
	}
}

// TestImpossible keeps every answer a number or a reason when nothing works.
func TestImpossible(t *testing.T) {
	for name, change := range map[string]func(*project.Spec){
		"far too heavy":  func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Items[2].Mass = 900 },
		"no fuel":        func(s *project.Spec) { s.Legs = s.Legs[:0] },
		"stall over VNE": func(s *project.Spec) { s.Variants[0].Aircraft.Airframe.NeverExceed = 20 },
		"high and hot":   func(s *project.Spec) { s.Strips[0].Elevation, s.Day.Deviation = 6000, 40 },
	} {
		s := project.Demo()
		change(s)
		st := study.All(built(t, s))[0]
		text, err := json.Marshal(st.Answer())
		if err != nil {
			t.Errorf("%s: %v", name, err)
		}
		for _, f := range st.Figures {
			if f.Has() && (math.IsNaN(f.Value) || math.IsInf(f.Value, 0)) {
				t.Errorf("%s: %s = %v", name, f.ID, f.Value)
			}
			if r := f.Reason.In(units.Metric); strings.ContainsAny(r, "\n{}") || strings.Contains(r, "NaN") {
				t.Errorf("%s: %s says %q", name, f.ID, r)
			}
		}
		if strings.Contains(string(text), "NaN") {
			t.Errorf("%s: NaN in the answer", name)
		}
	}
}

func TestWarnings(t *testing.T) {
	codes := func(change func(*project.Spec)) map[string]study.Level {
		s := project.Demo()
		change(s)
		found := map[string]study.Level{}
		for _, w := range study.All(built(t, s))[0].Warnings {
			found[w.Code] = w.Level
		}
		return found
	}
	for code, change := range map[string]func(*project.Spec){
		"overweight":         func(s *project.Spec) { s.Variants[0].Aircraft.Weights.MaxTakeOff = 600 },
		"take-off-too-long":  func(s *project.Spec) { s.Strips[0].Length = 400 },
		"take-off-no-margin": func(s *project.Spec) { s.Strips[0].Length = 600 },
		"landing-too-long":   func(s *project.Spec) { s.Strips[0].Length = 250 },
		"no-reserve":         func(s *project.Spec) { s.Legs = s.Legs[:len(s.Legs)-1] },
		"reserve-short":      func(s *project.Spec) { s.Legs[len(s.Legs)-1].Time = 8 * 3600 },
		"mission-ends":       func(s *project.Spec) { s.Legs[2].Altitude = 9000 },
		"weak-climb-out":     func(s *project.Spec) { s.Strips[0].Elevation = 2200 },
		"stall-margin":       func(s *project.Spec) { s.Legs[4].SpeedRule, s.Legs[4].Speed = "tas", 29 },
		"dry-air":            func(s *project.Spec) { s.Day.Humidity = 0 },
		"placeholders":       func(s *project.Spec) { s.Variants[0].Basis = nil },
		"low-screen":         func(s *project.Spec) { s.Strips[0].Obstacle = 5 },
	} {
		if _, ok := codes(change)[code]; !ok {
			t.Errorf("%s is not raised", code)
		}
	}
	quiet := codes(func(s *project.Spec) { s.Strips[0].Length = 900 })
	for code, level := range quiet {
		if level == study.Stop {
			t.Errorf("a long strip leaves %s", code)
		}
	}
}

func BenchmarkStudy(b *testing.B) {
	p := built(b, project.Demo())
	b.ReportAllocs()
	for b.Loop() {
		study.Run(p, 0, study.DefaultView(p, 0))
	}
}

// TestEveryFigureHasAWorking: the part that a figure points to stands in the working, with more than its heading.
func TestEveryFigureHasAWorking(t *testing.T) {
	steps := study.All(built(t, project.Demo()))[0].Working().Steps
	for _, k := range project.FigureKinds() {
		part, found := study.WorkingPart(k.ID), false
		for i, step := range steps {
			found = found || step.Heading && step.Note == part && i+1 < len(steps) && !steps[i+1].Heading
		}
		if part == "" || !found {
			t.Errorf("%s: no part %q in the working", k.ID, part)
		}
	}
}
