package input_test

import (
	"errors"
	"fmt"
	"io"
	"math"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// documents are what a user fills in; every input of the engine's foundations is in one of them.
func documents() []any {
	docs := []any{&atmos.Spec{}}
	for _, k := range powerplant.Kinds {
		docs = append(docs, &aircraft.Spec{Weights: aircraft.Weights{Items: make([]aircraft.Item, 2)}, Powerplant: powerplant.Spec{Kind: k.Name, Model: k.New()}})
	}
	return docs
}

// specs lists each described number once, with where it was met.
func specs() map[*input.Spec]string {
	seen := map[*input.Spec]string{}
	for _, d := range documents() {
		for _, e := range input.Walk(d) {
			if e.Number != nil {
				seen[e.Number.Spec] = e.Path
			}
			if e.Table != nil {
				for _, c := range e.Table.Columns {
					seen[c] = e.Path + "." + c.Name
				}
			}
		}
	}
	return seen
}

// TestBoundsAreAccepted: a limit that a page shows can be typed back, in every unit, and so can what a field shows at the limit.
func TestBoundsAreAccepted(t *testing.T) {
	all := specs()
	if len(all) < 40 {
		t.Fatalf("only %d inputs found", len(all))
	}
	for s, path := range all {
		if !(s.Min < s.Max) || s.Label == "" || s.Name == "" {
			t.Errorf("%s: range %v to %v, label %q", path, s.Min, s.Max, s.Label)
		}
		v := 0.0
		n := input.Num(s, &v).Number
		for _, u := range s.Quantity.Units() {
			lo, hi := s.Bounds(u)
			for _, x := range []float64{lo, hi} {
				text := units.Plain(x) + " " + u.Symbol
				if _, err := n.Parse(text, units.Metric); err != nil {
					t.Errorf("%s: shown bound %q is refused: %v", path, text, err)
				}
			}
			// Inward, and by no more than the rounding to four digits.
			if l, h := u.ToSI(lo), u.ToSI(hi); math.Abs(u.FromSI(s.Min)-lo) > 1.01e-3*math.Abs(lo) || math.Abs(u.FromSI(s.Max)-hi) > 1.01e-3*math.Abs(hi) {
				t.Errorf("%s: bounds %v to %v shown as %v to %v", path, s.Min, s.Max, l, h)
			}
		}
		for _, sys := range units.Systems {
			for _, bound := range []float64{s.Min, s.Max} {
				text := sys.Entry(s.Quantity, bound)
				if got, err := n.Parse(text, sys); err != nil {
					t.Errorf("%s: a field that holds the bound %v shows %q, which is refused: %v (%v)", path, bound, text, err, got)
				}
			}
		}
	}
}

func TestTypicalRangesAreInside(t *testing.T) {
	for s, path := range specs() {
		if y := s.Typical; y != nil && (!(y.Low < y.High) || y.Low < s.Min || y.High > s.Max || y.Source == "") {
			t.Errorf("%s: typical %v to %v of %v to %v, source %q", path, y.Low, y.High, s.Min, s.Max, y.Source)
		}
	}
}

func TestUnusual(t *testing.T) {
	s := &input.Spec{Quantity: units.Consumption, Min: 1e-8, Max: 1e-6, Typical: &input.Typical{Low: 6.42e-8, High: 1.0138e-7, Source: "a source"}}
	if got := s.Unusual(8e-8, units.Metric.Unit(units.Consumption)); got != "" {
		t.Errorf("a typical value: %q", got)
	}
	if got := s.Unusual(2e-7, units.Metric.Unit(units.Consumption)); got != "Typical 231 to 365 g/kWh (a source)." {
		t.Errorf("twice the typical: %q", got)
	}
	s.Typical = nil
	if got := s.Unusual(2e-7, units.Metric.Unit(units.Consumption)); got != "" {
		t.Errorf("nothing typical: %q", got)
	}
}

func TestCheck(t *testing.T) {
	s := &input.Spec{Name: "x", Label: "X", Quantity: units.Speed, Min: 5, Max: 340}
	for v, ok := range map[float64]bool{5: true, 340: true, 100: true, 4.99: false, 340.1: false, -5: false, math.Inf(1): false} {
		if err := s.Check(v); (err == nil) != ok {
			t.Errorf("%v: %v", v, err)
		}
	}
	if err := s.Check(math.NaN()); !errors.Is(err, input.ErrRange) {
		t.Errorf("NaN: %v", err)
	}
}

func TestWalk(t *testing.T) {
	docs := documents()
	paths := map[string]bool{}
	for _, e := range input.Walk(docs[1]) {
		if paths[e.Path] {
			t.Errorf("%s appears twice", e.Path)
		}
		paths[e.Path] = true
		if e.Label() == "" {
			t.Errorf("%s has no label", e.Path)
		}
		if found, ok := input.Find(docs[1], e.Path); !ok || found.Label() != e.Label() {
			t.Errorf("%s is not found", e.Path)
		}
	}
	for _, want := range []string{"airframe.wing_area", "airframe.polar", "airframe.clean.cl_max", "airframe.landing.delta_clm", "weights.empty", "weights.items[1].mass", "weights.items[0].name",
		"powerplant.values.mass", "powerplant.values.engine.rated_power", "powerplant.values.propeller.coefficients", "powerplant.values.fuel.density"} {
		if !paths[want] {
			t.Errorf("%s is not reached", want)
		}
	}
	if _, ok := input.Find(docs[1], "airframe.wings"); ok {
		t.Error("an unknown path is found")
	}
}

// TestEntriesWriteThrough: the walk's entries are bound to the document itself.
func TestEntriesWriteThrough(t *testing.T) {
	s := documents()[1].(*aircraft.Spec)
	for path, at := range map[string]*float64{"airframe.take_off.cl_max": &s.Airframe.TakeOff.CLMax, "weights.items[1].mass": &s.Weights.Items[1].Mass} {
		e, ok := input.Find(s, path)
		if !ok {
			t.Fatalf("%s is not reached", path)
		}
		*e.Number.Value = 1.25
		if *at != 1.25 {
			t.Errorf("%s is bound elsewhere", path)
		}
	}
}

func TestChoiceAndText(t *testing.T) {
	choice, text := "c", strings.Repeat("ö", 5)
	pick := input.Pick("kind", "Kind", &choice, input.Option{Value: "a", Label: "A"}, input.Option{Value: "b", Label: "B"})
	err := pick.Check()
	if !errors.Is(err, input.ErrChoice) || err.Error() != "kind: “c” is not one of the choices; accepted: a, b" {
		t.Errorf("%v", err)
	}
	choice = "b"
	if err := pick.Check(); err != nil {
		t.Errorf("%v", err)
	}
	if err := input.Line("name", "Name", 5, &text).Check(); err != nil {
		t.Errorf("five letters: %v", err)
	}
	err = input.Line("name", "Name", 4, &text).Check()
	if !errors.Is(err, input.ErrRange) || !strings.Contains(err.Error(), "up to 4 characters") {
		t.Errorf("%v", err)
	}
}

func TestWithinAndErrors(t *testing.T) {
	a := &input.Error{Path: "tas", Text: "x", Err: input.ErrSyntax}
	b := &input.Error{Path: "[2].cl", Text: "y", Err: input.ErrOrder}
	c := &input.Error{Err: input.ErrRequired}
	joined := input.Within("legs[1]", errors.Join(a, fmt.Errorf("deeper: %w", errors.Join(b, c)), io.EOF))
	var paths []string
	for _, e := range input.Errors(joined) {
		paths = append(paths, e.Path)
	}
	if want := []string{"legs[1].tas", "legs[1][2].cl", "legs[1]"}; !reflect.DeepEqual(paths, want) {
		t.Errorf("paths %v, want %v", paths, want)
	}
	if a.Path != "tas" {
		t.Errorf("the original's path became %q", a.Path)
	}
	if input.Within("x", nil) != nil || input.Errors(nil) != nil {
		t.Error("no error became one")
	}
	if !errors.Is(joined, io.EOF) {
		t.Error("an error that is not an input error was dropped")
	}
}

func TestSentences(t *testing.T) {
	area := &input.Spec{Name: "wing_area", Label: "Wing area", Quantity: units.Area, Min: 0.02, Max: 500}
	cl := &input.Spec{Name: "cl_max", Label: "CLmax", Quantity: units.Coefficient, Min: 0.3, Max: 5}
	long := strings.Repeat("x", 80)
	for _, c := range []struct {
		e    input.Error
		sys  units.System
		want string
	}{
		{input.Error{Spec: area, Err: input.ErrRange}, units.Metric, "wing area must be 0.02 to 500 m²; got 0 m²"},
		{input.Error{Spec: area, Value: 600, Err: input.ErrRange}, units.Aviation, "wing area must be 0.2153 to 5381 ft²; got 6458.35 ft²"},
		{input.Error{Spec: cl, Value: 7.25, Err: input.ErrRange}, units.Metric, "CLmax must be 0.3 to 5; got 7.25"},
		{input.Error{Spec: cl, Text: "big", Err: input.ErrSyntax}, units.Metric, "“big” is not understood as a number; CLmax must be 0.3 to 5"},
		{input.Error{Spec: cl, Err: input.ErrRequired}, units.Metric, "a value is required; CLmax must be 0.3 to 5"},
		{input.Error{Spec: area, Text: "3 kg", Accepts: "units accepted: m²", Err: input.ErrUnit}, units.Metric, "“3 kg” is unit not known here; units accepted: m²"},
		{input.Error{Text: long, Err: input.ErrUnknown}, units.Metric, "“" + long[:60] + "…” is not a field of this document"},
		{input.Error{Err: input.ErrRequired}, units.Metric, "required"},
	} {
		if got := c.e.Sentence(c.sys); got != c.want {
			t.Errorf("%q, want %q", got, c.want)
		}
	}
	if got := (&input.Error{Path: "a.b", Spec: area, Err: input.ErrRange}).Error(); got != "a.b: wing area must be 0.02 to 500 m²; got 0 m²" {
		t.Errorf("%q", got)
	}
}

func ExampleNumber_Parse() {
	mass := 0.0
	n := input.Num(&input.Spec{Name: "mass", Label: "Pilot", Quantity: units.Mass, Min: 0, Max: 200}, &mass).Number
	for _, text := range []string{"80", "176 lb", "13 st", "500"} {
		kg, err := n.Parse(text, units.Metric)
		fmt.Printf("%.1f %v\n", kg, err)
	}
	// Output:
	// 80.0 <nil>
	// 79.8 <nil>
	// 0.0 mass: “13 st” is unit not known here; units accepted: kg, lb, g, oz, t
	// 500.0 mass: pilot must be 0 to 200 kg; got 500 kg
}
