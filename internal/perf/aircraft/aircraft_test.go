package aircraft_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/powerplant"
)

// sample is an invented light two-seater.
func sample() *aircraft.Spec {
	kind := powerplant.Kinds[0]
	return &aircraft.Spec{
		Airframe: aircraft.Airframe{
			WingArea: 12, Span: 9.4, WingHeight: 0.9, DragGiven: aircraft.ByParabola, CDMin: 0.034, Efficiency: 0.77, CLMinDrag: 0.1,
			Polar:    [][]float64{{-0.2, 0.038}, {0.1, 0.034}, {0.5, 0.043}, {1, 0.08}, {1.5, 0.144}, {2.2, 0.27}},
			Clean:    aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.45},
			TakeOff:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.65, DeltaCD: 0.012, DeltaCLM: 0.1},
			Landing:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.95, DeltaCD: 0.045, DeltaCLM: 0.2},
			GroundCL: 0.45, NeverExceed: 75,
		},
		Weights:    aircraft.Weights{Empty: 290, Items: []aircraft.Item{{Name: "Crew", Mass: 160}, {Name: "Baggage", Mass: 15}}, MaxTakeOff: 650, ZeroFuelGiven: aircraft.NoZeroFuel},
		Limits:     loads.Unentered(),
		Powerplant: powerplant.Spec{Kind: kind.Name, Model: kind.New()},
	}
}

func TestBuild(t *testing.T) {
	s := sample()
	a, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	m := s.Powerplant.Model
	st := m.Stores()
	for name, pair := range map[string][2]float64{
		"wing area": {a.WingArea(), 12}, "span": {a.Span(), 9.4}, "wing height": {a.WingHeight(), 0.9}, "CL on the ground": {a.GroundCL(), 0.45}, "never-exceed speed": {a.NeverExceed(), 75},
		"CLmax clean": {a.CLMax(aircraft.Clean), 1.45}, "CLmax take-off": {a.CLMax(aircraft.TakeOff), 1.65}, "CLmax landing": {a.CLMax(aircraft.Landing), 1.95},
		"empty": {a.EmptyMass(), 290 + m.InstalledMass()}, "payload": {a.Payload(), 175}, "dry": {a.DryMass(), 290 + m.InstalledMass() + 175 + st.Trapped},
		"start": {a.StartMass(), 290 + m.InstalledMass() + 175 + st.Trapped + st.Fuel}, "greatest": {a.MaxTakeOff(), 650},
	} {
		if math.Abs(pair[0]-pair[1]) > 1e-9 {
			t.Errorf("%s is %v, want %v", name, pair[0], pair[1])
		}
	}
	if a.Stores() != st || a.Plant() == nil {
		t.Errorf("stores %+v, plant %v", a.Stores(), a.Plant())
	}
	// K = 1/(π A e) with A = 9.4²/12.
	k := 1 / (math.Pi * 9.4 * 9.4 / 12 * 0.77)
	for c, want := range map[aircraft.Config]float64{
		aircraft.Clean: 0.034 + k*0.4*0.4, aircraft.TakeOff: 0.046 + k*0.3*0.3, aircraft.Landing: 0.079 + k*0.2*0.2,
	} {
		if got := a.Polar(c).CD(0.5, 1, nil); math.Abs(got-want) > 1e-12 {
			t.Errorf("%s: CD(0.5) = %v, want %v", c, got, want)
		}
	}
}

func TestTabulatedPolar(t *testing.T) {
	s := sample()
	s.Airframe.DragGiven = aircraft.ByTable
	a, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	if got := a.Polar(aircraft.Clean).CD(0.5, 1, nil); math.Abs(got-0.043) > 1e-12 {
		t.Errorf("clean CD(0.5) = %v, the row says 0.043", got)
	}
	if got := a.Polar(aircraft.Landing).CD(0.7, 1, nil); math.Abs(got-0.088) > 1e-12 {
		t.Errorf("landing CD(0.7) = %v, the row shifted by 0.2 and raised by 0.045 says 0.088", got)
	}
}

func TestBuildErrors(t *testing.T) {
	for _, c := range []struct {
		change func(*aircraft.Spec)
		path   string
		kind   error
		says   string
	}{
		{func(s *aircraft.Spec) { s.Airframe.WingArea = 0 }, "airframe.wing_area", input.ErrRange, "0.02 to 500 m²; got 0"},
		{func(s *aircraft.Spec) { s.Airframe.CDMin = math.NaN() }, "airframe.cd_min", input.ErrRange, "0.003 to 0.5"},
		{func(s *aircraft.Spec) { s.Airframe.DragGiven = "guess" }, "airframe.drag_given", input.ErrChoice, "parabola, drag-area, best-glide, build-up, table"},
		{func(s *aircraft.Spec) { s.Airframe.TakeOff.CLMax = 9 }, "airframe.take_off.cl_max", input.ErrRange, "got 9"},
		{func(s *aircraft.Spec) { s.Weights.Items[1].Mass = -1 }, "weights.items[1].mass", input.ErrRange, "got -1 kg"},
		{func(s *aircraft.Spec) { s.Weights.Items[0].Name = strings.Repeat("long ", 20) }, "weights.items[0].name", input.ErrRange, "up to 80 characters"},
		{func(s *aircraft.Spec) { s.Powerplant.Model.(*powerplant.PistonPropeller).Engine.RatedPower = 1 }, "powerplant.values.engine.rated_power", input.ErrRange, "got 0.001 kW"},
		{func(s *aircraft.Spec) { s.Powerplant.Model.(*powerplant.PistonPropeller).Fuel.Volume = 0.5 }, "powerplant.values.fuel.volume", input.ErrConflict, "100.0"},
		{func(s *aircraft.Spec) { s.Powerplant.Model = nil }, "powerplant.kind", input.ErrRequired, "a powerplant"},
		{func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.Polar[2][0] = aircraft.ByTable, 0.05
		}, "airframe.polar[2].cl", input.ErrOrder, "rise from row to row"},
		{func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.Polar = aircraft.ByTable, s.Airframe.Polar[:2]
		}, "airframe.polar", input.ErrRange, "at least 3 rows"},
		{func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.Polar[3] = aircraft.ByTable, []float64{1}
		}, "airframe.polar[3]", input.ErrRange, "2 numbers a row"},
		{func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.Landing.CLMax = aircraft.ByTable, 2.5
		}, "airframe.landing.cl_max", input.ErrConflict, "from CL -0.2 to 2.2"},
		{func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.GroundCL = aircraft.ByTable, 2.45
		}, "airframe.ground_cl", input.ErrConflict, "must reach it, less the shift"},
	} {
		s := sample()
		c.change(s)
		a, err := s.Build()
		list := input.Errors(err)
		if a != nil || len(list) != 1 || list[0].Path != c.path || !errors.Is(err, c.kind) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: %v, want %q", c.path, err, c.says)
		}
	}
}

// TestEveryErrorAtOnce: Build reports all that is wrong.
func TestEveryErrorAtOnce(t *testing.T) {
	_, err := (&aircraft.Spec{Powerplant: powerplant.Spec{Model: powerplant.Kinds[0].New()}}).Build()
	paths := map[string]bool{}
	for _, e := range input.Errors(err) {
		paths[e.Path] = true
	}
	for _, want := range []string{"airframe.wing_area", "airframe.span", "airframe.drag_given", "airframe.clean.cl_max", "airframe.landing.cl_max", "weights.empty", "weights.max_take_off"} {
		if !paths[want] {
			t.Errorf("%s is not among %d errors", want, len(paths))
		}
	}
}

// TestInputsCoverTheDocument: every number of the JSON form is an input.
func TestInputsCoverTheDocument(t *testing.T) {
	s := sample()
	text, err := json.Marshal(s)
	if err != nil {
		t.Fatal(err)
	}
	var tree any
	if err := json.Unmarshal(text, &tree); err != nil {
		t.Fatal(err)
	}
	paths := map[string]bool{}
	for _, e := range input.Walk(s) {
		paths[e.Path] = true
	}
	numbers := 0
	var visit func(v any, path string)
	visit = func(v any, path string) {
		switch v := v.(type) {
		case map[string]any:
			for name, sub := range v {
				visit(sub, strings.TrimPrefix(path+"."+name, "."))
			}
		case []any:
			if paths[path] { // a table
				return
			}
			for i, sub := range v {
				visit(sub, fmt.Sprintf("%s[%d]", path, i))
			}
		case float64:
			if numbers++; !paths[path] {
				t.Errorf("%s is a number of the document and not an input", path)
			}
		}
	}
	visit(tree, "")
	if numbers < 30 {
		t.Errorf("only %d numbers seen", numbers)
	}
}

// A choice of the structural limits keeps what they mean, and a contradiction in them is told at its field.
func TestLimits(t *testing.T) {
	s := sample()
	s.Limits.Rule = "normal"
	s.Limits.SpeedsGiven = loads.ByValue
	filled := s.Switch("limits.speeds_given", loads.ByRule)
	if len(filled) != 2 || filled[0].Path != "limits.cruise" || filled[1].Path != "limits.dive" || !aircraft.DerivedNote(filled[0].Note) {
		t.Errorf("filled %+v", filled)
	}
	a, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	// 33 kt times the root of 650 kg on 12 m² in lb/ft².
	want := 33 * 1852.0 / 3600 * math.Sqrt(650/0.45359237/(12/0.3048/0.3048))
	if d, ok := a.Structure(nil); !ok || math.Abs(d.Cruise-want) > 1e-9 || math.Abs(s.Limits.Cruise-want) > 1e-9 || math.Abs(d.Dive-1.4*want) > 1e-9 {
		t.Errorf("VC %g and VD %g m/s, want VC %g", d.Cruise, d.Dive, want)
	}
	s.Limits.Dive = 20
	_, err = s.Build()
	if list := input.Errors(err); len(list) != 1 || list[0].Path != "limits.dive" || !errors.Is(err, input.ErrConflict) {
		t.Errorf("VD below VC: %v", err)
	}
}

func TestJSON(t *testing.T) {
	s := sample()
	text, err := json.Marshal(s)
	if err != nil {
		t.Fatal(err)
	}
	var back aircraft.Spec
	if err := json.Unmarshal(text, &back); err != nil || !reflect.DeepEqual(&back, s) {
		t.Errorf("came back as %+v, %v", back, err)
	}
}

func TestConfigNames(t *testing.T) {
	for c, want := range map[aircraft.Config]string{aircraft.Clean: "clean", aircraft.TakeOff: "take-off", aircraft.Landing: "landing"} {
		if c.String() != want {
			t.Errorf("%d is %q, want %q", c, c, want)
		}
	}
}

func ExampleSpec_Build() {
	s := sample()
	s.Airframe.Span = -9.4
	_, err := s.Build()
	fmt.Println(err)
	s.Airframe.Span = 9.4
	a, err := s.Build()
	fmt.Println(a.Payload(), err)
	// Output:
	// airframe.span: span must be 0.2 to 80 m; got -9.4 m
	// 175 <nil>
}
