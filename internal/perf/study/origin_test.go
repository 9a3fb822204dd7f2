package study_test

import (
	"math"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

// origins are the demo in every way that changes what a working consists of.
var origins = map[string]func(*project.Spec){
	"demo": func(*project.Spec) {},
	"polar by table": func(s *project.Spec) {
		for i := range s.Variants {
			f := &s.Variants[i].Aircraft.Airframe
			f.DragGiven, f.Polar = "table", [][]float64{{-0.5, 0.035}, {0, 0.03}, {0.5, 0.034}, {1, 0.06}, {2.5, 0.3}}
		}
	},
	"turbocharged, dry": func(s *project.Spec) {
		s.Day.Humidity = 0
		for i := range s.Variants {
			s.Variants[i].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Engine.CriticalAltitude = 3000
		}
	},
	"by rating": func(s *project.Spec) {
		for i := range s.Variants {
			e := &s.Variants[i].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller).Engine
			e.PowerGiven, e.RatedPower, e.RatedSpeed = "rating", 75e3, e.Redline
		}
	},
	"requirements of their own": func(s *project.Spec) {
		s.Requirements = nil
		for _, k := range project.FigureKinds() {
			r := project.Require(k.ID, project.AtLeast, 0)
			r.MassGiven, r.AltitudeGiven, r.Altitude, r.DayGiven, r.Deviation = project.AtGreatest, project.AtAltitude, 800, mission.OwnDay, 10
			s.Requirements = append(s.Requirements, r)
		}
	},
	"by drag area, lift by stall speed":  func(s *project.Spec) { sayOtherwise(s, aircraft.ByDragArea, aircraft.ByStall) },
	"by best glide, lift by stall speed": func(s *project.Spec) { sayOtherwise(s, aircraft.ByBestGlide, aircraft.ByStall) },
	"by build-up": func(s *project.Spec) {
		for i := range s.Variants {
			f := &s.Variants[i].Aircraft.Airframe
			for _, k := range dragbuild.Kinds {
				f.Components = append(f.Components, dragbuild.New(k.Value, k.Label), dragbuild.New(k.Value, "other"))
				c := &f.Components[len(f.Components)-1]
				c.Length, c.WettedArea, c.Fineness, c.ThicknessRatio, c.ThicknessAt, c.Laminar, c.Interference = 0.8, 0.7, 4, 0.1, 0.4, 0.2, 1.2
			}
		}
		sayOtherwise(s, aircraft.ByBuildUp, aircraft.ByCLMax)
	},
	"high": func(s *project.Spec) { s.Strips[0].Elevation = 1500 },
}

// TestOrigins: every number of every working says where it comes from, and an
// input or a step that it names gives that number.
func TestOrigins(t *testing.T) {
	for name, change := range origins {
		spec := project.Demo()
		change(spec)
		for _, s := range study.All(built(t, spec)) {
			inputs := map[string]input.Entry{}
			for _, e := range input.Walk(s.Project.Spec) {
				inputs[e.Path] = e
			}
			w := s.Working()
			all := s.Origins(w)
			named := 0
			for i, step := range w.Steps {
				for j, o := range all[i] {
					sym, value := step.Formula.In[j], step.In[j]
					where := name + ", " + s.Variant().Name + ": " + step.Formula.ID + ", " + sym.Name + " (" + sym.Meaning + ")"
					if !o.Known() {
						t.Errorf("%s: no origin; add the meaning to claims", where)
					}
					for _, path := range o.Inputs {
						e, ok := inputs[path]
						if !ok || e.Idle {
							t.Errorf("%s: there is no input %s", where, path)
							continue
						}
						named++
						if len(o.Inputs) == 1 && o.Words == "" && math.Float64bits(*e.Number.Value) != math.Float64bits(value) {
							t.Errorf("%s: %s is %v, the step used %v", where, path, *e.Number.Value, value)
						}
					}
					if o.Step >= 0 {
						from := w.Steps[o.Step]
						if o.Step >= i || from.Formula == nil || o.Words == "" && from.Out != value {
							t.Errorf("%s: step %d gave %v, the step used %v", where, o.Step, from.Out, value)
						}
						if o.Words == "" && from.Formula.Out.Quantity != sym.Quantity {
							t.Errorf("%s: comes from another quantity, %s", where, from.Formula.Out.Meaning)
						}
					}
				}
			}
			if named < 60 {
				t.Errorf("%s: only %d inputs are named", name, named)
			}
		}
	}
}

// TestOriginsInEveryWay gives each part of the aircraft in each way that there is.
func TestOriginsInEveryWay(t *testing.T) {
	ways := 0
	for _, e := range input.Walk(project.Demo()) {
		if e.Choice == nil || !strings.HasPrefix(e.Path, "variants[0].aircraft.") {
			continue
		}
		for _, o := range e.Choice.Options {
			spec := project.Demo()
			for _, own := range input.Walk(spec) {
				if own.Path == e.Path {
					from := *own.Choice.Value
					*own.Choice.Value = o.Value
					input.Convert(spec, e.Path, from)
				}
			}
			p, err := spec.Build()
			if err != nil {
				continue // this way needs numbers that the demo does not have
			}
			ways++
			s := study.Run(p, 0, study.DefaultView(p, 0))
			w := s.Working()
			said := map[string]bool{}
			for i, list := range s.Origins(w) {
				for j, origin := range list {
					if sym := w.Steps[i].Formula.In[j]; !origin.Known() && !said[sym.Meaning] {
						said[sym.Meaning] = true
						t.Errorf("%s %s: %s (%s) has no origin; add the meaning to claims", e.Path, o.Value, sym.Name, sym.Meaning)
					}
				}
			}
		}
	}
	if ways < 6 {
		t.Errorf("only %d ways", ways)
	}
}

// TestOriginFollowsTheDocument: a changed input is claimed with its new value, by its own configuration.
func TestOriginFollowsTheDocument(t *testing.T) {
	spec := project.Demo()
	// All maximum lift coefficients alike: the value alone could not tell them apart.
	f := &spec.Variants[0].Aircraft.Airframe
	f.TakeOff.CLMax, f.Landing.CLMax = f.Clean.CLMax, f.Clean.CLMax
	s := study.All(built(t, spec))[0]
	w := s.Working()
	part, seen := "", map[string]string{}
	for i, o := range s.Origins(w) {
		step := w.Steps[i]
		if step.Heading && study.IsPart(step.Note) {
			part = step.Note
		}
		if step.Formula != nil && step.Formula.ID == "stall.speed" {
			seen[part] = strings.Join(o[3].Inputs, " ")
		}
	}
	for part, want := range map[string]string{"Stall": "clean", "Take-off": "take_off", "Landing": "landing"} {
		if got := seen[part]; got != "variants[0].aircraft.airframe."+want+".cl_max" {
			t.Errorf("%s: CLmax comes from %q", part, got)
		}
	}
}
