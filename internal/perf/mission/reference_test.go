package mission_test

import (
	"encoding/json"
	"os"
	"path/filepath"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/project"
	"legwright/internal/perf/reference"
)

// scipyProject is the project that mission_scipy.py flies too.
func scipyProject(t testing.TB) *project.Project {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(reference.Folder(t), "mission_scipy.json"))
	if err != nil {
		t.Fatal(err)
	}
	s, err := project.Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	return build(t, s)
}

func build(t testing.TB, s *project.Spec) *project.Project {
	t.Helper()
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// variant finds an aircraft of p by the identifier of its variant.
func variant(t testing.TB, p *project.Project, id string) *aircraft.Aircraft {
	t.Helper()
	i, ok := p.Spec.Variant(id)
	if !ok {
		t.Fatalf("no variant %s", id)
	}
	return p.Aircraft[i]
}

func TestAgainstIndependentIntegration(t *testing.T) {
	p := scipyProject(t)
	rows := reference.Read(t, "mission_scipy")
	for _, id := range []string{"a", "b"} {
		f := mission.Fly(variant(t, p, id), &p.Plan)
		if !f.Flown() || !f.Reserve.Met {
			t.Fatalf("variant %s: %+v, %+v", id, f.Failure, f.Reserve)
		}
		for _, leg := range f.Legs {
			if len(rows) == 0 || rows[0].Text("variant") != id || rows[0].Text("leg") != leg.Leg.Name {
				t.Fatalf("variant %s flies %q where the file has %v", id, leg.Leg.Name, rows[:min(1, len(rows))])
			}
			row := rows[0]
			rows = rows[1:]
			row.Near("time", leg.Time)
			row.Near("distance", leg.Distance)
			row.Near("fuel", leg.Fuel)
			row.Near("altitude", leg.End.Altitude)
			if row.Has("ground") {
				row.Near("ground", leg.Run.Ground)
				row.Near("total", leg.Run.Total)
			}
		}
	}
	if len(rows) != 0 {
		t.Errorf("%d rows not flown", len(rows))
	}
}

// kindsProject is the same project with the legs of mission_kinds.json.
func kindsProject(t testing.TB) *project.Project {
	t.Helper()
	text, err := os.ReadFile(filepath.Join(reference.Folder(t), "mission_kinds.json"))
	if err != nil {
		t.Fatal(err)
	}
	s := scipyProject(t).Spec.Clone()
	if err := json.Unmarshal(text, s); err != nil {
		t.Fatal(err)
	}
	return build(t, s)
}

// Dashes, turns, loads, the rest of the range, alternates and contingencies against the same independent integration.
func TestOtherKindsAgainstIndependentIntegration(t *testing.T) {
	p := kindsProject(t)
	rows := reference.Read(t, "mission_kinds")
	for _, id := range []string{"a", "b"} {
		f := mission.Fly(variant(t, p, id), &p.Plan)
		if !f.Flown() || !f.Reserve.Met {
			t.Fatalf("variant %s: %+v, %+v", id, f.Failure, f.Reserve)
		}
		healthy(t, &f)
		kept := map[int]float64{}
		for _, part := range f.Reserve.Parts {
			kept[part.Leg] = part.Fuel
		}
		for i, leg := range f.Legs {
			if len(rows) == 0 || rows[0].Text("variant") != id || rows[0].Text("leg") != leg.Leg.Name {
				t.Fatalf("variant %s flies %q where the file has %v", id, leg.Leg.Name, rows[:min(1, len(rows))])
			}
			row := rows[0]
			rows = rows[1:]
			row.Near("time", leg.Time)
			row.Near("distance", leg.Distance)
			row.Near("fuel", leg.Fuel)
			row.Near("mass", leg.End.Mass)
			if leg.Leg.Kind != mission.Contingency {
				row.Near("altitude", leg.End.Altitude)
			}
			if row.Has("kept") {
				row.Near("kept", kept[i])
			}
		}
	}
	if len(rows) != 0 {
		t.Errorf("%d rows not flown", len(rows))
	}
}
