package dragbuild_test

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/input"
	"legwright/internal/perf/reference"
)

func TestPlateFriction(t *testing.T) {
	for _, row := range reference.Read(t, "plate_friction") {
		row.Near("turbulent", dragbuild.Turbulent(row.Num("re"), nil))
	}
	// Blasius: 1.328e-3 at a million, exactly.
	if got := dragbuild.Laminar(1e6, nil); math.Abs(got-1.328e-3) > 1e-15 {
		t.Errorf("laminar friction at 1e6 is %v", got)
	}
}

// Prandtl's A = Re (Ct − Cf) depends on the Reynolds number of transition alone, whatever the length.
func TestPlateTransition(t *testing.T) {
	for _, row := range reference.Read(t, "plate_transition") {
		at := row.Num("transition")
		for _, re := range []float64{2 * at, 10 * at} {
			row.Near("a", re*(dragbuild.Turbulent(re, nil)-dragbuild.Friction(re, at/re, nil)))
		}
	}
}

func TestFrictionLimits(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		re := math.Pow(10, rapid.Float64Range(4.31, 9).Draw(t, "log Re"))
		if got, want := dragbuild.Friction(re, 0, nil), dragbuild.Turbulent(re, nil); got != want {
			t.Fatalf("no laminar run: %v, want %v", got, want)
		}
		if got, want := dragbuild.Friction(re, 1, nil), dragbuild.Laminar(re, nil); math.Abs(got-want) > 1e-12*want {
			t.Fatalf("laminar throughout: %v, want %v", got, want)
		}
		x := rapid.Float64Range(0, 0.99).Draw(t, "x")
		less, more := dragbuild.Friction(re, x, nil), dragbuild.Friction(re, x+0.01, nil)
		if more > less*(1+1e-12) {
			t.Fatalf("friction rises from %v to %v with the laminar share %v at %v", less, more, x, re)
		}
		if longer := dragbuild.Friction(1.01*re, x, nil); longer >= less {
			t.Fatalf("friction %v at %v, %v at one per cent more", less, re, longer)
		}
	})
}

func air(t testing.TB) atmos.Air {
	t.Helper()
	a, err := atmos.Day{}.At(0, nil)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// build is an invented light two-seater.
func build(t testing.TB) *dragbuild.BuildUp {
	wing := dragbuild.Component{Name: "Wing", Kind: dragbuild.Surface, WettedArea: 22, Length: 1.29, ThicknessRatio: 0.15, ThicknessAt: 0.3, Laminar: 0.1, Interference: 1.1}
	tail := dragbuild.Component{Name: "Tail", Kind: dragbuild.Surface, WettedArea: 6, Length: 0.7, ThicknessRatio: 0.09, ThicknessAt: 0.3, Interference: 1.05}
	body := dragbuild.Component{Name: "Fuselage", Kind: dragbuild.Body, WettedArea: 14, Length: 5.8, Fineness: 5.5, Interference: 1}
	return &dragbuild.BuildUp{Components: []dragbuild.Component{wing, tail, body,
		{Name: "Spats", Kind: dragbuild.Streamlined, WettedArea: 0.9, Length: 0.8, Fineness: 4, Interference: 1.3},
		{Name: "Cowl", Kind: dragbuild.Nacelle, WettedArea: 2.5, Length: 1.1, Fineness: 2, Interference: 1.2},
		{Name: "Gear legs", Kind: dragbuild.ByDragArea, DragArea: 0.06}}, Leakage: 0.1, Unlisted: 0.02, TAS: 50, Air: air(t)}
}

// One wing, worked on paper: Re = 1.225·50·1.29/1.789e-5 = 4.416e6, log10 = 6.6450, Ct = 0.455/6.645^2.58 = 0.0034353;
// run 4.416e5: Ct = 0.0052326, Cl = 0.0019984; Cf = 0.0034353 − 0.1·0.0032342 = 0.0031119; FF = 1 + 2·0.15 + 100·0.15⁴ = 1.350625
// (M = 0.147 has a Mach factor below 1); f = 0.0031119·1.350625·1.1·22 = 0.10171 m².
func TestByHand(t *testing.T) {
	b := build(t)
	b.Components, b.Leakage, b.Unlisted = b.Components[:1], 0.1, 0.02
	s, err := b.Sum(nil)
	if err != nil {
		t.Fatal(err)
	}
	p := s.Parts[0]
	for name, pair := range map[string][2]float64{"Re": {p.Reynolds / 4.416e6, 1}, "Cf": {p.Friction / 0.0031119, 1}, "FF": {p.Form / 1.350625, 1}, "f": {p.DragArea / 0.10171, 1},
		"whole": {s.DragArea, 0.10171*1.1 + 0.02}, "leakage": {s.Leakage, 0.010171}} {
		// Four figures were carried.
		if math.Abs(pair[0]-pair[1]) > 3e-4*pair[1] {
			t.Errorf("%s: %v, want %v", name, pair[0], pair[1])
		}
	}
}

// Thin and slender parts are plates; a Mach factor above 1 counts.
func TestFormLimits(t *testing.T) {
	form := func(c dragbuild.Component, tas float64) float64 {
		c.WettedArea, c.Interference = 1, 1
		c.Length = 5
		s, err := (&dragbuild.BuildUp{Components: []dragbuild.Component{c}, TAS: tas, Air: air(t)}).Sum(nil)
		if err != nil {
			t.Fatal(err)
		}
		return s.Parts[0].Form
	}
	thin := dragbuild.Component{Kind: dragbuild.Surface, ThicknessRatio: 1e-9, ThicknessAt: 0.3}
	if got := form(thin, 40); math.Abs(got-1) > 1e-6 {
		t.Errorf("form factor of a plate %v", got)
	}
	if got, want := form(thin, 0.5*atmos.SeaLevelSoundSpeed), 1.34*math.Pow(0.5, 0.18); math.Abs(got-want) > 1e-6 {
		t.Errorf("at Mach 0.5 %v, want %v", got, want)
	}
	for _, kind := range []string{dragbuild.Streamlined, dragbuild.Nacelle} {
		if got := form(dragbuild.Component{Kind: kind, Fineness: 1e9}, 40); math.Abs(got-1) > 1e-6 {
			t.Errorf("form factor of an endless %s %v", kind, got)
		}
	}
	// A body at a fineness of 6: 1 + 60/216 + 6/400.
	if got := form(dragbuild.Component{Kind: dragbuild.Body, Fineness: 6}, 40); math.Abs(got-(1+60./216+0.015)) > 1e-12 {
		t.Errorf("body %v", got)
	}
	// A streamlined body at 4: 1 + 1.5/8 + 7/64.
	if got := form(dragbuild.Component{Kind: dragbuild.Streamlined, Fineness: 4}, 40); math.Abs(got-(1+1.5/8+7./64)) > 1e-12 {
		t.Errorf("streamlined %v", got)
	}
}

func TestSumIsOfItsParts(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := &dragbuild.BuildUp{Leakage: rapid.Float64Range(0, 2).Draw(t, "leakage"), Unlisted: rapid.Float64Range(-1, 1).Draw(t, "unlisted"), TAS: rapid.Float64Range(10, 100).Draw(t, "tas")}
		var err error
		if b.Air, err = (atmos.Day{}).At(rapid.Float64Range(-500, 11000).Draw(t, "altitude"), nil); err != nil {
			t.Fatal(err)
		}
		for range rapid.IntRange(0, 5).Draw(t, "parts") {
			b.Components = append(b.Components, draw(t))
		}
		s, err := b.Sum(nil)
		if err != nil {
			for _, e := range input.Errors(err) {
				if !errors.Is(e, input.ErrConflict) || !strings.HasSuffix(e.Path, "].length") {
					t.Fatalf("%v", err)
				}
			}
			return
		}
		sum := s.Leakage + s.Unlisted
		for _, p := range s.Parts {
			if !(p.DragArea >= 0) || math.IsInf(p.DragArea, 0) {
				t.Fatalf("%+v", p)
			}
			sum += p.DragArea
		}
		if math.Abs(sum-s.DragArea) > 1e-9*(1+math.Abs(sum)) {
			t.Fatalf("parts, leakage and the rest give %v, the whole is %v", sum, s.DragArea)
		}
	})
}

func draw(t *rapid.T) dragbuild.Component {
	c := dragbuild.New(rapid.SampledFrom(dragbuild.Kinds).Draw(t, "kind").Value, "x")
	for _, e := range c.Inputs() {
		if e.Number != nil {
			*e.Number.Value = rapid.Float64Range(e.Number.Min, e.Number.Max).Draw(t, e.Path)
		}
	}
	return c
}

func TestTooSmallForFriction(t *testing.T) {
	b := build(t)
	b.Components[3].Length = 0.005
	_, err := b.Sum(nil)
	list := input.Errors(err)
	if len(list) != 1 || list[0].Path != "components[3].length" || !strings.Contains(err.Error(), "Reynolds number is 17115 and plate friction is used from 20000") {
		t.Errorf("%v", err)
	}
}

func TestSmooth(t *testing.T) {
	b := build(t)
	if b.Smooth() {
		t.Error("gear legs and leakage are no clean skin")
	}
	b.Components, b.Leakage, b.Unlisted = b.Components[:3], 0, -0.01
	if !b.Smooth() {
		t.Error("skin alone is not noticed")
	}
	b.Leakage = 0.05
	if b.Smooth() {
		t.Error("leakage is not noticed")
	}
}

func TestWorking(t *testing.T) {
	record := formulatest.Record{}
	var w formula.Working
	if _, err := build(t).Sum(&w); err != nil {
		t.Fatal(err)
	}
	record.Check(t, w)
	record.Complete(t)
}

func TestNewBuilds(t *testing.T) {
	b := &dragbuild.BuildUp{TAS: 50, Air: air(t)}
	for _, k := range dragbuild.Kinds {
		c := dragbuild.New(k.Value, "x")
		if err := input.Check(&c); err != nil {
			t.Errorf("%s: %v", k.Value, err)
		}
		b.Components = append(b.Components, c)
	}
	if _, err := b.Sum(nil); err != nil {
		t.Error(err)
	}
}

func ExampleBuildUp_Sum() {
	a, _ := atmos.Day{}.At(0, nil)
	wing := dragbuild.New(dragbuild.Surface, "Wing")
	wing.WettedArea, wing.Length = 22, 1.29
	s, err := (&dragbuild.BuildUp{Components: []dragbuild.Component{wing}, TAS: 50, Air: a}).Sum(nil)
	fmt.Printf("%.3f m² %v\n", s.DragArea, err)
	// Output: 0.095 m² <nil>
}
