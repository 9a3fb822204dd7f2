package project

import (
	"encoding/json"
	"fmt"
	"math"
	"reflect"
	"regexp"
	"slices"
	"strings"
	"testing"

	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/input"
	"pgregory.net/rapid"
)

// encoded is the text of s.
func encoded(t interface{ Fatalf(string, ...any) }, s *Spec) []byte {
	text, err := s.Encode()
	if err != nil {
		t.Fatalf("Encode: %v", err)
	}
	return text
}

// small is the example with one of everything, so that each place in it can be tried.
func small() *Spec {
	s := Demo()
	s.Variants, s.Requirements = s.Variants[:1], s.Requirements[:1]
	s.Legs = append(s.Legs[:4:4], s.Legs[len(s.Legs)-1])
	v := &s.Variants[0]
	v.Basis = map[string]Basis{"airframe.span": {Kind: Measured}}
	v.Aircraft.Weights.Items = v.Aircraft.Weights.Items[:1]
	v.Aircraft.Airframe.Polar = v.Aircraft.Airframe.Polar[:3]
	v.Aircraft.Airframe.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "Wing")}
	p := piston(s)
	for _, rows := range []*[][]float64{&p.Engine.ConsumptionCurve, &p.Engine.PowerCurve, &p.Propeller.Coefficients} {
		*rows = append((*rows)[:2:2], (*rows)[len(*rows)-1])
	}
	return s
}

// generic is the document of s as encoding/json sees it without types.
func generic(t interface{ Fatalf(string, ...any) }, s *Spec) map[string]any {
	var doc map[string]any
	if err := json.Unmarshal(encoded(t, s), &doc); err != nil {
		t.Fatalf("%v", err)
	}
	return doc
}

// A place is a value inside a generic document together with the ways to change it.
type place struct {
	path   string
	value  any
	set    func(any)
	remove func() // nil in a list
}

// places lists every value inside x in a fixed order.
func places(x any, path string) []place {
	var list []place
	switch x := x.(type) {
	case map[string]any:
		for _, name := range sortedKeys(x) {
			where := strings.TrimPrefix(path+"."+name, ".")
			list = append(list, place{where, x[name], func(v any) { x[name] = v }, func() { delete(x, name) }})
			list = append(list, places(x[name], where)...)
		}
	case []any:
		for i := range x {
			where := fmt.Sprintf("%s[%d]", path, i)
			list = append(list, place{where, x[i], func(v any) { x[i] = v }, nil})
			list = append(list, places(x[i], where)...)
		}
	}
	return list
}

func sortedKeys(m map[string]any) []string {
	var keys []string
	for k := range m {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	return keys
}

// cell matches the end of the path of a table's cell, which Decode names by its column and a schema counts.
var cell = regexp.MustCompile(`((?:polar|coefficients|_curve)\[\d+\])(?:\[\d+\]|\.\w+)$`)

func paths(err error) []string {
	var list []string
	for _, e := range input.Errors(err) {
		list = append(list, e.Path)
	}
	return list
}

func rowOf(path string) string { return cell.ReplaceAllString(path, "$1") }

// shuffled draws a document from those that build: the example with random inputs
// and list lengths, keeping of each change only what the rest of the document agrees with.
func shuffled(t *rapid.T) *Spec {
	s := []*Spec{Demo(), New("x")}[rapid.IntRange(0, 1).Draw(t, "base")]
	valid := func(change func(s *Spec)) {
		c := s.Clone()
		change(c)
		if _, err := c.Build(); err == nil {
			s = c
		}
	}
	valid(func(s *Spec) { s.Strips = append(s.Strips, s.Strips[0]) })
	valid(func(s *Spec) { s.Requirements = s.Requirements[:rapid.IntRange(0, 2).Draw(t, "requirements")] })
	valid(func(s *Spec) {
		s.Requirements = append(s.Requirements, Require("tip_mach", AtMost, rapid.Float64Range(-1e9, 1e9).Draw(t, "limit")))
	})
	valid(func(s *Spec) { s.Legs = s.Legs[:rapid.IntRange(0, len(s.Legs)).Draw(t, "legs")] })
	valid(func(s *Spec) {
		s.Variants[0].Basis[rapid.String().Draw(t, "path")] = Basis{Estimated, rapid.Float64Range(0, 1e11).Draw(t, "band"), rapid.String().Draw(t, "note")}
	})
	for range rapid.IntRange(0, 40).Draw(t, "changes") {
		valid(func(s *Spec) {
			list := input.Walk(s)
			randomize(t, list[rapid.IntRange(0, len(list)-1).Draw(t, "input")])
		})
	}
	return s
}

// randomize puts a random acceptable value into e.
func randomize(t *rapid.T, e input.Entry) {
	switch {
	case e.Number != nil:
		*e.Number.Value = rapid.Float64Range(e.Number.Min, e.Number.Max).Draw(t, e.Path)
	case e.Choice != nil:
		*e.Choice.Value = rapid.SampledFrom(e.Choice.Options).Draw(t, e.Path).Value
	case e.Text != nil:
		*e.Text.Value = rapid.StringN(0, e.Text.Max, -1).Draw(t, e.Path)
	case e.Table != nil:
		for _, row := range *e.Table.Value {
			for j := 1; j < len(row); j++ {
				row[j] *= rapid.Float64Range(0.99, 1.01).Draw(t, e.Path)
			}
		}
	}
}

// bits lists every number of the inputs of s as it is stored.
func bits(s *Spec) []uint64 {
	var list []uint64
	for _, e := range input.Walk(s) {
		switch {
		case e.Number != nil:
			list = append(list, math.Float64bits(*e.Number.Value))
		case e.Table != nil:
			for _, row := range *e.Table.Value {
				for _, x := range row {
					list = append(list, math.Float64bits(x))
				}
			}
		}
	}
	return list
}

// Every leaf is described once, under the name that it has in JSON, and no rule here stands for a leaf that is gone.
func TestEveryLeafIsDescribed(t *testing.T) {
	found := map[string]bool{}
	var bare []string
	var visit func(n *node, path string)
	visit = func(n *node, path string) {
		switch {
		case n.form == anObject:
			checkNames(t, n, path)
			for _, f := range n.fields {
				visit(f, strings.TrimPrefix(path+"."+f.name, "."))
			}
		case n.form == aList:
			if _, ok := sizes[path]; !ok {
				t.Errorf("list %s has no limit", path)
			}
			found[path] = true
			visit(n.item, path)
		case n.form == aMap:
			visit(n.item, path)
		case n.form == aPlant:
			for _, k := range n.kinds {
				visit(k, path+".values")
			}
		case n.fixed != nil:
			found[path] = true
		case !n.described():
			t.Errorf("%s of type %s is neither an input nor fixed", path, n.typ)
		}
		if leaf := n.form >= aNumber || n.form == aTable; leaf && !n.described() {
			bare = append(bare, path)
		}
	}
	visit(document(), "")
	if want := []string{"format", "units", "variants.basis.kind", "variants.basis.plus_minus", "variants.basis.note", "basis.kind", "basis.plus_minus", "basis.note"}; !slices.Equal(bare, want) {
		t.Errorf("leaves that are no inputs: %v, want %v", bare, want)
	}
	for path := range fixed {
		if !found[path] {
			t.Errorf("%s is fixed but no leaf", path)
		}
	}
	for path := range sizes {
		if !found[path] {
			t.Errorf("%s has a limit but is no list", path)
		}
	}
}

func checkNames(t *testing.T, n *node, path string) {
	d, ok := reflect.New(n.typ).Interface().(input.Described)
	if !ok {
		return
	}
	for _, e := range d.Inputs() {
		f := n.field(e.Path)
		if f == nil {
			t.Errorf("%s: input %s is no field", path, e.Path)
			continue
		}
		suits := map[form]bool{aNumber: e.Number != nil, aTable: e.Table != nil, aText: e.Choice != nil || e.Text != nil}
		if !suits[f.form] {
			t.Errorf("%s.%s: input and field differ in type", path, e.Path)
		}
		if e.Number != nil && e.Number.Quantity.Name() == "" {
			t.Errorf("%s.%s: no quantity", path, e.Path)
		}
	}
}
