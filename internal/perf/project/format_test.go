package project

import (
	"encoding/json"
	"math"
	"os"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/loads"
)

// testdata/format-1.json is the demo as the last program wrote it whose format was 1.
func TestOldDocument(t *testing.T) {
	text, err := os.ReadFile("testdata/format-1.json")
	if err != nil {
		t.Fatal(err)
	}
	s, err := Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if s.Format != Format {
		t.Errorf("read as format %d, want %d", s.Format, Format)
	}
	again, err := s.Encode()
	if err != nil {
		t.Fatal(err)
	}
	back, err := Decode(again)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(back, s) {
		t.Error("written in the present format, it is another document")
	}
	for i := range s.Variants {
		if got := s.Variants[i].Aircraft.Limits; got != loads.Unentered() || got.Given() {
			t.Errorf("an old document has structural limits: %+v", got)
		}
	}
	want := Demo()
	if s.Name != want.Name || len(s.Legs) != len(want.Legs) || len(s.Variants) != len(want.Variants) || s.Variants[1].Aircraft.Airframe.WingArea != want.Variants[1].Aircraft.Airframe.WingArea {
		t.Error("the old document has lost something")
	}
	// What came later must not change what it says: 298 kg, the engine's mass, 173 kg and 88 L of 720 kg/m³.
	built, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	for i, engine := range []float64{78, 92} {
		if got, want := built.Aircraft[i].StartMass(), 298+engine+173+63.36; math.Abs(got-want) > 1e-9 {
			t.Errorf("variant %d starts at %v kg, want %v", i, got, want)
		}
	}
}

// What a format lacked must be in the tree, and the value that stands for it must be one that the document accepts.
func TestAdded(t *testing.T) {
	found := map[string]bool{}
	var visit func(n *node, path string)
	visit = func(n *node, path string) {
		if _, ok := added[path]; ok {
			found[path] = true
			v := reflect.New(n.typ)
			if err := json.Unmarshal([]byte(added[path]), v.Interface()); err != nil {
				t.Errorf("%s: %v", path, err)
			}
		}
		for _, f := range n.fields {
			visit(f, strings.TrimPrefix(path+"."+f.name, "."))
		}
		if n.item != nil {
			for _, f := range n.item.fields {
				visit(f, strings.TrimPrefix(path+"."+f.name, "."))
			}
		}
		for _, k := range n.kinds {
			visit(k, path+".values")
		}
	}
	visit(document(), "")
	for path := range added {
		if !found[path] {
			t.Errorf("%s is no field of the document", path)
		}
	}
}

func TestOlderThanAny(t *testing.T) {
	text, err := Demo().Encode()
	if err != nil {
		t.Fatal(err)
	}
	for _, number := range []string{"0", "-1", "3", "1e300"} {
		if _, err := Decode([]byte(strings.Replace(string(text), `"format": 2`, `"format": `+number, 1))); err == nil || !strings.Contains(err.Error(), "format") {
			t.Errorf("format %s: %v", number, err)
		}
	}
}
