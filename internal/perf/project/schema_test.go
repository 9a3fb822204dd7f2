package project

import (
	"encoding/json"
	"errors"
	"fmt"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"pgregory.net/rapid"
)

func TestSchemaAcceptsTheExamples(t *testing.T) {
	schema := schemaOf(t)
	for _, s := range []*Spec{Demo(), New("x"), small()} {
		if got := refused(t, schema, generic(t, s)); len(got) > 0 {
			t.Errorf("%s: refused at %v", s.Name, got)
		}
	}
}

// A change is one mistake that a document can have at a place.
type change struct {
	name string
	make func(p place) (wanted string, ok bool) // the path at which it is to be refused, if it is
}

var changes = []change{
	{"removed", func(p place) (string, bool) {
		if p.remove == nil {
			return "", false
		}
		p.remove()
		return p.path, true
	}},
	{"null", func(p place) (string, bool) { p.set(nil); return p.path, true }},
	{"of another type", func(p place) (string, bool) {
		if _, ok := p.value.(string); ok {
			p.set(1.5)
		} else {
			p.set("1.5")
		}
		return p.path, true
	}},
	{"huge", func(p place) (string, bool) {
		_, ok := p.value.(float64)
		p.set(1e30)
		return p.path, ok
	}},
	{"far below", func(p place) (string, bool) {
		_, ok := p.value.(float64)
		p.set(-1e30)
		return p.path, ok
	}},
	{"another word", func(p place) (string, bool) {
		_, ok := p.value.(string)
		p.set("nonsense")
		// A leg's strip is one of a list elsewhere in the document, which a schema cannot say.
		return p.path, ok && !strings.HasSuffix(p.path, ".strip")
	}},
	{"endless", func(p place) (string, bool) {
		_, ok := p.value.(string)
		p.set(strings.Repeat("x", 3000))
		return p.path, ok && !strings.HasSuffix(p.path, ".strip")
	}},
	{"with a stranger", func(p place) (string, bool) {
		m, ok := p.value.(map[string]any)
		if ok {
			m["wing_aera"] = 1.5
		}
		return p.path + ".wing_aera", ok
	}},
	{"emptied", func(p place) (string, bool) {
		_, ok := p.value.([]any)
		p.set([]any{})
		return p.path, ok
	}},
}

// Every single mistake at every place of the example is refused, or let pass, by both at the same path.
func TestSchemaAndDecodeAgree(t *testing.T) {
	schema := schemaOf(t)
	example := encoded(t, small())
	count := len(places(generic(t, small()), ""))
	both, neither := 0, 0
	for _, c := range changes {
		for i := range count {
			var doc any
			if err := json.Unmarshal(example, &doc); err != nil {
				t.Fatal(err)
			}
			p := places(doc, "")[i]
			want, ok := c.make(p)
			if !ok {
				continue
			}
			name := fmt.Sprintf("%s %s", p.path, c.name)
			bySchema := refused(t, schema, doc)
			text, err := json.Marshal(doc)
			if err != nil {
				t.Fatal(err)
			}
			_, err = Decode(text)
			switch {
			case err == nil && len(bySchema) == 0:
				neither++
			case !contains(bySchema, want) || !contains(paths(err), want):
				t.Errorf("%s: schema refuses %v, Decode says %v", name, bySchema, err)
			default:
				both++
			}
		}
	}
	if both < 700 || neither < 100 {
		t.Errorf("%d mistakes refused, %d without consequence: too few to mean anything", both, neither)
	}
}

func contains(list []string, path string) bool {
	return slices.ContainsFunc(list, func(p string) bool { return rowOf(p) == rowOf(path) })
}

// Whatever the choices and however many mistakes, Decode reports all that the
// schema refuses, unless it stopped further out, and refuses a value by itself only where the schema does.
func TestSchemaAndDecodeAgreeOnAnyChoices(t *testing.T) {
	schema := schemaOf(t)
	rapid.Check(t, func(t *rapid.T) {
		s := shuffled(t)
		for i := range s.Legs {
			s.Legs[i].Kind = rapid.SampledFrom([]string{mission.Taxi, mission.TakeOff, mission.Climb, mission.Cruise, mission.Loiter, mission.Descent, mission.Landing, mission.Reserve}).Draw(t, "kind")
		}
		doc := generic(t, s)
		for range rapid.IntRange(0, 6).Draw(t, "mistakes") {
			p := rapid.SampledFrom(places(doc, "")).Draw(t, "place")
			rapid.SampledFrom(changes).Draw(t, "change").make(p)
		}
		text, err := json.Marshal(doc)
		if err != nil {
			t.Fatal(err)
		}
		_, err = Decode(text)
		bySchema := refused(t, schema, doc)
		for _, p := range bySchema {
			// The values of a powerplant of an unknown kind are not looked at.
			within := func(q string) bool { return strings.HasPrefix(rowOf(p), strings.TrimSuffix(rowOf(q), "plant.kind")) }
			if !slices.ContainsFunc(paths(err), within) {
				t.Fatalf("the schema refuses %s; Decode says %v", p, err)
			}
		}
		for _, e := range input.Errors(err) {
			own := errors.Is(e, input.ErrType) || errors.Is(e, input.ErrRequired) || errors.Is(e, input.ErrUnknown) || errors.Is(e, input.ErrRange)
			if own && !contains(bySchema, e.Path) {
				t.Fatalf("Decode says %v; the schema refuses %v", e, bySchema)
			}
		}
	})
}
