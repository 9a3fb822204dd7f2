package powerplant_test

import (
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
)

// spaced puts plain blanks for the no-break and thin ones of formatted numbers.
func spaced(err error) string {
	return strings.NewReplacer("\u00a0", " ", "\u202f", " ").Replace(fmt.Sprint(err))
}

func TestSpecJSON(t *testing.T) {
	for _, k := range powerplant.Kinds {
		s := powerplant.Spec{Kind: k.Name, Model: k.New()}
		text, err := json.Marshal(s)
		if err != nil {
			t.Fatal(err)
		}
		if want := fmt.Sprintf(`{"kind":"%s","values":{`, k.Name); !strings.HasPrefix(string(text), want) {
			t.Errorf("written as %.60s", text)
		}
		var back powerplant.Spec
		if err := json.Unmarshal(text, &back); err != nil || !reflect.DeepEqual(back, s) {
			t.Errorf("%s came back as %+v, %v", k.Name, back, err)
		}
	}
	var s powerplant.Spec
	err := json.Unmarshal([]byte(`{"kind":"rubber-band","values":{}}`), &s)
	if !errors.Is(err, input.ErrChoice) || !strings.Contains(err.Error(), "rubber-band") || !strings.Contains(err.Error(), "piston-propeller") {
		t.Errorf("an unknown kind: %v", err)
	}
	for _, text := range []string{`{"kind":"piston-propeller"}`, `{"kind":"piston-propeller","values":{"mass":"heavy"}}`, `[]`, `{"kind":1}`} {
		if err := json.Unmarshal([]byte(text), &s); err == nil {
			t.Errorf("%s is accepted", text)
		}
	}
}

func TestClone(t *testing.T) {
	for _, k := range powerplant.Kinds {
		s := powerplant.Spec{Kind: k.Name, Model: k.New()}
		c := s.Clone()
		if !reflect.DeepEqual(c, s) {
			t.Errorf("%s: clone differs", k.Name)
		}
		for _, e := range input.Walk(c.Model) {
			if e.Table != nil && len(*e.Table.Value) > 0 {
				(*e.Table.Value)[0][0] += 1
			}
		}
		if !reflect.DeepEqual(s.Model, k.New()) {
			t.Errorf("%s: an edit of the clone reached the original", k.Name)
		}
	}
	if c := (powerplant.Spec{}).Clone(); c.Model != nil {
		t.Error("the clone of nothing is something")
	}
}

// TestInputsCoverTheDocument: every number of the JSON form is an input, so
// none escapes the check, and each input's path is where the JSON has it.
func TestInputsCoverTheDocument(t *testing.T) {
	for _, k := range powerplant.Kinds {
		m := k.New()
		text, err := json.Marshal(m)
		if err != nil {
			t.Fatal(err)
		}
		var tree map[string]any
		if err := json.Unmarshal(text, &tree); err != nil {
			t.Fatal(err)
		}
		paths := map[string]bool{}
		for _, e := range input.Walk(m) {
			if paths[e.Path] {
				t.Errorf("%s: two inputs at %s", k.Name, e.Path)
			}
			paths[e.Path] = true
		}
		leaves(tree, "", func(path string) {
			if !paths[path] {
				t.Errorf("%s: %s is in the document, not among the inputs", k.Name, path)
			}
			delete(paths, path)
		})
		for p := range paths {
			t.Errorf("%s: input %s is not in the document", k.Name, p)
		}
	}
}

func leaves(tree map[string]any, path string, visit func(string)) {
	for name, v := range tree {
		if sub, ok := v.(map[string]any); ok {
			leaves(sub, path+name+".", visit)
		} else {
			visit(path + name)
		}
	}
}

func TestStores(t *testing.T) {
	m := piston(nil)
	s := m.Stores()
	if math.Abs(s.Fuel-63.36) > 1e-9 || math.Abs(s.Trapped-1.44) > 1e-9 || math.Abs(s.Capacity-70.56) > 1e-9 || s.Charge != 0 {
		t.Errorf("88 usable of 90 litres in a tank of 100, at 720 kg/m³: %+v", s)
	}
	m.Fuel.Volume, m.Fuel.Unusable = 0.001, 0.005
	if s := m.Stores(); s.Fuel != 0 || math.Abs(s.Trapped-0.72) > 1e-9 {
		t.Errorf("less aboard than is usable: %+v", s)
	}
	if m.InstalledMass() != 95 {
		t.Errorf("installed mass %v", m.InstalledMass())
	}
}

func TestBuildErrors(t *testing.T) {
	for _, c := range []struct {
		change func(*powerplant.PistonPropeller)
		path   string
		kind   error
		says   []string
	}{
		{func(p *powerplant.PistonPropeller) { p.Fuel.Volume = 0.2 }, "fuel.volume", input.ErrConflict, []string{"200.0 L", "100.0 L"}},
		{func(p *powerplant.PistonPropeller) { constantSpeed(p); p.Propeller.Speed = 50 }, "propeller.speed", input.ErrConflict, []string{"3000 rpm"}},
		{func(p *powerplant.PistonPropeller) { tables(p); p.Engine.Redline = 48 }, "engine.redline", input.ErrConflict, []string{"2880 rpm", "1800 rpm", "2760 rpm"}},
		{func(p *powerplant.PistonPropeller) { tables(p); p.Engine.PowerCurve[1][0] = 30 }, "engine.power_curve", input.ErrOrder, []string{"point 2", "30"}},
		{func(p *powerplant.PistonPropeller) { tables(p); p.Engine.ConsumptionCurve[2][0] = 0.1 }, "engine.consumption_curve", input.ErrOrder, []string{"point 3", "0.1"}},
		{func(p *powerplant.PistonPropeller) { p.Propeller.Coefficients[3][0] = 0 }, "propeller.coefficients", input.ErrOrder, []string{"point 4"}},
	} {
		p, err := piston(c.change).Build()
		list := input.Errors(err)
		if len(list) != 1 || list[0].Path != c.path || !errors.Is(err, c.kind) {
			t.Errorf("%s: %v (%v)", c.path, err, p)
			continue
		}
		for _, want := range c.says {
			if !strings.Contains(spaced(err), want) {
				t.Errorf("%s: %q does not say %q", c.path, spaced(err), want)
			}
		}
	}
	two := piston(func(p *powerplant.PistonPropeller) { p.Fuel.Volume = 0.2; constantSpeed(p); p.Propeller.Speed = 50 })
	if _, err := two.Build(); len(input.Errors(err)) != 2 {
		t.Errorf("two faults: %v", err)
	}
}

func TestErrorsCarryNumbers(t *testing.T) {
	p := build(t, piston(nil))
	_, _, err := p.Match(condition(t, atmos.Day{}, 0, 40), 5000, nil)
	var short *powerplant.ThrustError
	if !errors.As(err, &short) || short.Want != 5000 || short.TAS != 40 || !(short.Available > 100 && short.Available < 2000) || !strings.Contains(spaced(err), "5000 N") || !strings.Contains(spaced(err), "40.0 m/s") {
		t.Errorf("%v", err)
	}
	// 90 m/s at 46 rev/s of 1.75 m is an advance ratio of 1.118.
	_, err = p.Run(condition(t, atmos.Day{}, 0, 90), 1, nil)
	var fast *powerplant.SpeedError
	if !errors.As(err, &fast) || fast.TAS != 90 || math.Abs(fast.Range.J-1.118) > 1e-3 || !strings.Contains(err.Error(), "1.118") || !strings.Contains(err.Error(), "1.000") {
		t.Errorf("%v", err)
	}
	if out, err := p.Run(condition(t, atmos.Day{}, 0, 90), 0, nil); err != nil || out.Limits&powerplant.Idling == 0 {
		t.Errorf("idle beyond the table: %+v, %v", out, err)
	}
	late := build(t, piston(func(m *powerplant.PistonPropeller) { m.Propeller.Coefficients = m.Propeller.Coefficients[3:] }))
	if _, err := late.Run(condition(t, atmos.Day{}, 0, 0), 1, nil); !errors.As(err, &fast) || !strings.Contains(err.Error(), "0.000 lies outside the propeller table, 0.300 to 1.000") {
		t.Errorf("at rest before a table from J 0.3: %v", err)
	}
	// A table that ends while it still pulls says nothing of what is beyond.
	short80 := build(t, piston(func(m *powerplant.PistonPropeller) { m.Propeller.Coefficients = m.Propeller.Coefficients[:9] }))
	if _, err := short80.Run(condition(t, atmos.Day{}, 0, 50), 0.02, nil); !errors.As(err, &fast) || !strings.Contains(err.Error(), "0.800") {
		t.Errorf("little power beyond a short table: %v", err)
	}
	if _, _, err := short80.Match(condition(t, atmos.Day{}, 0, 50), 1, nil); !errors.As(err, &fast) {
		t.Errorf("1 N beyond a short table: %v", err)
	}
}

// TestDrain: the one measure for fuel and electricity.
func TestDrain(t *testing.T) {
	if got := (powerplant.Output{FuelFlow: 1e-3, BusPower: 500}).Drain(); math.Abs(got-44000) > 1e-9 {
		t.Errorf("drain %v W", got)
	}
}

func ExamplePowerplant() {
	model := powerplant.PistonPropeller{
		Engine: powerplant.PistonEngine{
			PowerGiven: powerplant.ByRating, RatedPower: 75e3, RatedSpeed: 45, Redline: 46, GearRatio: 1,
			ConsumptionGiven: powerplant.ByConstant, Consumption: 8.1e-8,
		},
		Propeller: powerplant.Propeller{Kind: powerplant.ConstantSpeed, Diameter: 1.75, Speed: 40, LossFactor: 0.85},
	}
	plant, err := model.Build()
	if err != nil {
		fmt.Println(err)
		return
	}
	air, err := atmos.Day{}.At(1000, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	c := powerplant.Condition{Air: air, TAS: 45}
	full, err := plant.Run(c, 1, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	setting, level, err := plant.Match(c, 500, nil)
	fmt.Printf("full throttle: %.0f N at %.0f rpm\n", full.Thrust, full.Shaft.Speed*60)
	fmt.Printf("500 N: throttle %.2f, %.1f kg/h (%v)\n", setting, level.FuelFlow*3600, err)
	// Output:
	// full throttle: 1036 N at 2400 rpm
	// 500 N: throttle 0.46, 8.1 kg/h (<nil>)
}
