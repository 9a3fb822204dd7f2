package study

import (
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
)

// TestClaimsNameWhatExists: a path or formula that was renamed would silently never be claimed.
func TestClaimsNameWhatExists(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Aircraft.Airframe.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "Wing")}
	places := map[string]string{"aircraft": "variants[0].aircraft", "departure": "strips[0]", "arrival": "strips[0]"}
	var paths, formulas, meanings []string
	for _, e := range input.Walk(spec) {
		paths = append(paths, e.Path)
	}
	for _, f := range formulatest.Declared(t, "..") {
		formulas = append(formulas, f.ID)
		for _, s := range f.In {
			meanings = append(meanings, s.Meaning)
		}
	}
	for meaning, list := range claims {
		if !slices.Contains(meanings, meaning) {
			t.Errorf("no formula has a symbol that means %q", meaning)
		}
		for _, c := range list {
			for _, config := range []string{"clean", "take_off", "landing"} {
				tr := &tracer{places: places, config: config}
				for _, path := range c.paths {
					if path = tr.path(path); !slices.Contains(paths, path) {
						t.Errorf("%s: there is no input %s", meaning, path)
					}
				}
			}
			for _, id := range c.steps {
				if !slices.Contains(formulas, id) {
					t.Errorf("%s: there is no formula %s", meaning, id)
				}
			}
			if len(c.paths)+len(c.steps) == 0 && strings.TrimSpace(c.words) == "" {
				t.Errorf("%s: a claim of nothing", meaning)
			}
		}
	}
}
