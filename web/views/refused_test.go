package views

import (
	"fmt"
	"slices"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

func TestRefusedText(t *testing.T) {
	for _, c := range []struct {
		all, loose int
		want       string
	}{
		{0, 0, ""},
		{1, 0, "One entry was not taken; see the field marked below. Nothing else is lost."},
		{1, 1, "One entry was not taken. Nothing else is lost."},
		{2, 1, "Two entries were not taken; see the field marked below. Nothing else is lost."},
		{3, 0, "Three entries were not taken; see the fields marked below. Nothing else is lost."},
		{12, 12, "12 entries were not taken. Nothing else is lost."},
	} {
		if got := refusedText(c.all, c.loose); got != c.want {
			t.Errorf("%d, %d: got %q, want %q", c.all, c.loose, got, c.want)
		}
	}
}

// What was refused stands in exactly one place: at its field, or at the top when the page has no such field.
func TestRefusedIsShownOnce(t *testing.T) {
	p, err := project.Demo().Build()
	if err != nil {
		t.Fatal(err)
	}
	const (
		field = "variants[0].aircraft.weights.empty"
		idle  = "variants[0].aircraft.airframe.polar" // the demo's drag is a parabola
		gone  = "legs[77].time"
		basis = "basis:variants[0].aircraft.weights.max_take_off"
	)
	var refusals []Refusal
	for _, path := range []string{field, idle, gone, basis, "action"} {
		refusals = append(refusals, Refusal{Path: path, Text: "typed " + path, Why: "Why " + path + "."})
	}
	b := NewBench(study.Run(p, 0, study.DefaultView(p, 0)), State{ProjectID: 1, Revision: 1, Refusals: refusals})
	want := []string{fmt.Sprintf("“typed %s”: Why %[1]s.", idle), fmt.Sprintf("“typed %s”: Why %[1]s.", gone), "“typed action”: Why action."}
	if !slices.Equal(b.Loose, want) {
		t.Errorf("at the top %q, want %q", b.Loose, want)
	}
	at := map[string]string{}
	for _, g := range b.Groups {
		for _, block := range g.Blocks {
			for _, f := range block.Fields {
				if f.Error == "" {
					continue
				}
				at[f.Path] = f.Value + "|" + f.Error
				if !g.Open {
					t.Errorf("%s is refused in a group that is shut", f.Path)
				}
			}
		}
	}
	if len(at) != 2 || at[field] != "typed "+field+"|Why "+field+"." || at["variants[0].aircraft.weights.max_take_off"] != "650|Basis: why "+basis+"." {
		t.Errorf("at the fields %q", at)
	}
}

// Two inputs with one id would make a label point to the wrong one.
func TestElementIDsDiffer(t *testing.T) {
	seen := map[string]string{}
	for _, e := range newForm(project.Demo(), 0, nil).entries {
		id := elementID(e.Path)
		if other, ok := seen[id]; ok {
			t.Errorf("%s and %s both have id %s", other, e.Path, id)
		}
		seen[id] = e.Path
	}
}
