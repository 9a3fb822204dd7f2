package project

import (
	"math"
	"os"
	"reflect"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
)

// given sets the choice at a path of the first variant's aircraft as the page does.
func given(t *testing.T, s *Spec, path, way string) {
	t.Helper()
	path = "variants[0].aircraft." + path
	e, ok := input.Find(s, path)
	if !ok || e.Choice == nil {
		t.Fatalf("no choice %s", path)
	}
	from := *e.Choice.Value
	*e.Choice.Value = way
	input.Convert(s, path, from)
}

// The basis follows the numbers: what is calculated from a band has a band, 0.003·12.1 to two digits.
func TestConvertedBases(t *testing.T) {
	s := Demo()
	v := &s.Variants[0]
	given(t, s, "airframe.drag_given", aircraft.ByDragArea)
	f := v.Aircraft.Airframe
	if math.Abs(f.DragArea-0.0335*12.1) > 1e-12 {
		t.Errorf("drag area %v, want 0.0335·12.1", f.DragArea)
	}
	if b := v.BasisOf("airframe.drag_area"); b.Kind != Calculated || b.Note != "from CDmin and e" || math.Abs(b.PlusMinus-0.036) > 1e-12 {
		t.Errorf("basis of the drag area %+v", b)
	}
	was := Basis{Kind: Estimated, PlusMinus: 0.003, Note: "from similar aircraft"}
	given(t, s, "airframe.drag_given", aircraft.ByParabola)
	if b := v.BasisOf("airframe.cd_min"); b != was {
		t.Errorf("the way back made the basis of CDmin %+v", b)
	}

	// What follows from a placeholder is one.
	v.Basis["airframe.cl_min_drag"] = Basis{Kind: Placeholder}
	given(t, s, "airframe.drag_given", aircraft.ByBestGlide)
	if b := v.BasisOf("airframe.glide_speed"); b.Kind != Placeholder || b.Note != "from CDmin and e" || b.PlusMinus != 0 {
		t.Errorf("basis of the speed %+v", b)
	}
	if b := v.BasisOf("airframe.glide_mass"); b.Kind != Calculated || b.Note != "the start mass" {
		t.Errorf("basis of the mass %+v", b)
	}
	given(t, s, "airframe.clean.lift_given", aircraft.ByStall)
	if b := v.BasisOf("airframe.clean.stall_speed"); b.Kind != Calculated || b.Note != "from CLmax" {
		t.Errorf("basis of the stall speed %+v", b)
	}
	if _, err := s.Build(); err != nil {
		t.Error(err)
	}
	v.Basis = nil
	given(t, s, "airframe.landing.lift_given", aircraft.ByStall)
	if b := v.BasisOf("airframe.landing.stall_speed"); b.Kind != Placeholder {
		t.Errorf("without any basis %+v", b)
	}
}

// A document of the first format flies as it did: its polar by CDmin and e, its lift by CLmax.
func TestOldAircraft(t *testing.T) {
	text, err := os.ReadFile("testdata/format-1.json")
	if err != nil {
		t.Fatal(err)
	}
	s, err := Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(s.Variants[0].Aircraft.Airframe, Demo().Variants[0].Aircraft.Airframe) {
		t.Errorf("the airframe is now %+v", s.Variants[0].Aircraft.Airframe)
	}
}
