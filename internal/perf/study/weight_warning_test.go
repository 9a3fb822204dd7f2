package study_test

import (
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func TestWeightWarnings(t *testing.T) {
	// Variant A at the start: 298 + 78 + 173 kg and 63.36 kg of fuel, 1.44 of them unusable; without usable fuel 550.44 kg.
	for _, c := range []struct {
		name   string
		change func(*aircraft.Weights, map[string]project.Basis)
		code   string
		level  study.Level
		says   string
	}{
		{"as it is", func(*aircraft.Weights, map[string]project.Basis) {}, "", "", ""},
		{"over take-off", func(w *aircraft.Weights, _ map[string]project.Basis) { w.MaxTakeOff = 612.26 }, "overweight", study.Stop, "612.4 kg at the start is 0.1 kg above"},
		{"at take-off", func(w *aircraft.Weights, _ map[string]project.Basis) { w.MaxTakeOff = 612.36 }, "", "", ""},
		{"growth over take-off", func(w *aircraft.Weights, _ map[string]project.Basis) { w.Growth = 0.2 }, "overweight", study.Stop, "687.6 kg at the start is 37.6 kg above"},
		{"over zero-fuel", func(w *aircraft.Weights, _ map[string]project.Basis) {
			w.ZeroFuelGiven, w.MaxZeroFuel = aircraft.ByZeroFuel, 540
		}, "over-zero-fuel", study.Stop, "550.4 kg without usable fuel is 10.4 kg above"},
		{"within zero-fuel", func(w *aircraft.Weights, _ map[string]project.Basis) {
			w.ZeroFuelGiven, w.MaxZeroFuel = aircraft.ByZeroFuel, 550.45
		}, "", "", ""},
		{"zero-fuel not given", func(w *aircraft.Weights, _ map[string]project.Basis) { w.MaxZeroFuel = 540 }, "", "", ""},
		{"zero-fuel above take-off", func(w *aircraft.Weights, _ map[string]project.Basis) {
			w.ZeroFuelGiven, w.MaxZeroFuel = aircraft.ByZeroFuel, 700
		}, "idle-zero-fuel", study.Caution, "so that it limits nothing"},
		{"estimated", func(_ *aircraft.Weights, b map[string]project.Basis) {
			b["weights.empty"] = project.Basis{Kind: project.Estimated}
		}, "no-growth", study.Info, "376.0 kg, has not been weighed"},
		{"estimated, with growth", func(w *aircraft.Weights, b map[string]project.Basis) {
			b["weights.empty"], w.Growth = project.Basis{Kind: project.Estimated}, 0.03
		}, "", "", ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			spec := project.Demo()
			v := &spec.Variants[0]
			c.change(&v.Aircraft.Weights, v.Basis)
			p := built(t, spec)
			s := study.Run(p, 0, study.DefaultView(p, 0))
			var codes []string
			for _, w := range s.Warnings {
				if w.About != "weights" {
					continue
				}
				codes = append(codes, w.Code)
				if text := strings.ReplaceAll(w.Text.In(units.Metric), "\u00a0", " "); w.Code == c.code && (w.Level != c.level || !strings.Contains(text, c.says)) {
					t.Errorf("%s: %q, want %s: %q", w.Level, text, c.level, c.says)
				}
			}
			if strings.Join(codes, " ") != c.code {
				t.Errorf("warnings %v, want %q", codes, c.code)
			}
		})
	}
}

// An allowance is decided, not known: it has no basis, and rests no figure on a placeholder.
func TestGrowthHasNoBasis(t *testing.T) {
	p := built(t, project.Demo())
	s := study.Run(p, 0, study.DefaultView(p, 0))
	if list := s.Placeholders(); len(list) > 0 {
		t.Errorf("placeholders %v", list)
	}
}

// A warning carries its numbers as data, in the order of its sentence.
func TestWarningNumbers(t *testing.T) {
	spec := project.Demo()
	spec.Variants[0].Aircraft.Weights.MaxTakeOff = 600
	p, err := spec.Build()
	if err != nil {
		t.Fatal(err)
	}
	for _, w := range study.Run(p, 0, study.DefaultView(p, 0)).Answer().Warnings {
		if w.Code != "overweight" {
			continue
		}
		if len(w.Numbers) != 2 || w.Numbers[0].Unit != "kg" || w.Numbers[0].Quantity != "mass" || w.Numbers[0].Value-600 != w.Numbers[1].Value {
			t.Errorf("%+v", w)
		}
		return
	}
	t.Error("no warning of the mass")
}
