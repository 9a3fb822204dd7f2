package aircraft_test

import (
	"errors"
	"math"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/input"
	"legwright/internal/perf/reference"
)

// toWay gives the drag of s in another way, as the page does.
func toWay(s *aircraft.Spec, way string) []aircraft.Derived {
	from := s.Airframe.DragGiven
	s.Airframe.DragGiven = way
	return s.Switch("airframe.drag_given", from)
}

// shaped is a sample with a random parabola and wing, of which every way of giving stays in range.
func shaped(t *rapid.T) *aircraft.Spec {
	s := sample()
	f := &s.Airframe
	f.WingArea = rapid.Float64Range(4, 30).Draw(t, "area")
	f.Span = math.Sqrt(f.WingArea * rapid.Float64Range(4, 25).Draw(t, "aspect"))
	f.CDMin = rapid.Float64Range(0.008, 0.1).Draw(t, "cd_min")
	f.Efficiency = rapid.Float64Range(0.3, 1.2).Draw(t, "efficiency")
	f.CLMinDrag = rapid.Float64Range(-0.4, 0.6).Draw(t, "cl_min_drag")
	for range rapid.IntRange(0, 3).Draw(t, "components") {
		c := dragbuild.New(rapid.SampledFrom(dragbuild.Kinds).Draw(t, "kind").Value, "x")
		c.WettedArea = rapid.Float64Range(0.1, 40).Draw(t, "wetted")
		f.Components = append(f.Components, c)
	}
	f.Leakage = rapid.Float64Range(0, 0.5).Draw(t, "leakage")
	return s
}

// near compares with what rounding makes of a few dozen operations.
func near(t interface {
	Helper()
	Fatalf(string, ...any)
}, name string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*math.Max(math.Abs(want), 1e-3)) {
		t.Fatalf("%s is %v, want %v", name, got, want)
	}
}

func built(t interface {
	Helper()
	Fatalf(string, ...any)
}, s *aircraft.Spec) *aircraft.Aircraft {
	t.Helper()
	a, err := s.Build()
	if err != nil {
		t.Fatalf("%s: %v", s.Airframe.DragGiven, err)
	}
	return a
}

var ways = []string{aircraft.ByParabola, aircraft.ByDragArea, aircraft.ByBestGlide, aircraft.ByBuildUp, aircraft.ByTable}

// Through any ways in any order and back: the same parabola, and on the way the same polar.
func TestWaysAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := shaped(t)
		f := &s.Airframe
		was := *f
		before := built(t, s)
		for range rapid.IntRange(1, 6).Draw(t, "switches") {
			way := rapid.SampledFrom(ways).Draw(t, "way")
			toWay(s, way)
			if f.DragGiven != way {
				t.Fatalf("%s was not taken", way)
			}
			a := built(t, s)
			for _, c := range []aircraft.Config{aircraft.Clean, aircraft.TakeOff, aircraft.Landing} {
				for _, cl := range []float64{0, 0.3, 0.77, 1.2, a.CLMax(c)} {
					tol := 1e-9
					if way == aircraft.ByTable {
						// The monotone cubic leaves the parabola by up to K/5000.
						tol = 1 / (math.Pi * f.Span * f.Span / f.WingArea * was.Efficiency) / 5000 / 0.008
					}
					near(t, way+", CD", a.Polar(c).CD(cl, 1, nil), before.Polar(c).CD(cl, 1, nil), tol)
				}
			}
		}
		toWay(s, aircraft.ByParabola)
		near(t, "CDmin", f.CDMin, was.CDMin, 1e-9)
		near(t, "e", f.Efficiency, was.Efficiency, 1e-9)
		near(t, "CL of minimum drag", f.CLMinDrag, was.CLMinDrag, 1e-9)
	})
}

// Also after an edit in any of the ways: each switch keeps the polar that was flown before it.
func TestEditedWaysAgree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := shaped(t)
		for range 5 {
			edited := *s
			edited.Airframe.Components = slices.Clone(edited.Airframe.Components)
			for _, e := range input.Walk(&edited.Airframe) {
				if e.Number != nil && !e.Idle {
					*e.Number.Value *= rapid.Float64Range(0.9, 1.1).Draw(t, e.Path)
				}
			}
			if _, err := edited.Build(); err == nil {
				s = &edited
			}
			before := built(t, s)
			from, way := s.Airframe.DragGiven, rapid.SampledFrom(ways[:4]).Draw(t, "way")
			toWay(s, way)
			after, err := s.Build()
			if err != nil { // out of the range of the other way
				s.Airframe.DragGiven = from
				continue
			}
			for _, cl := range []float64{0, 0.4, 1.1} {
				near(t, from+" to "+way+", CD", after.Polar(aircraft.Clean).CD(cl, 1, nil), before.Polar(aircraft.Clean).CD(cl, 1, nil), 1e-9)
			}
		}
	})
}

// What does not change keeps the digits typed: there and back leaves the document as it was but for what was filled.
func TestThereAndBackIsExact(t *testing.T) {
	for _, way := range []string{aircraft.ByDragArea, aircraft.ByBuildUp, aircraft.ByBestGlide} {
		s := sample()
		was := s.Airframe
		toWay(s, way)
		if list := toWay(s, aircraft.ByParabola); len(list) != 0 {
			t.Errorf("%s: the way back filled %+v", way, list)
		}
		f := s.Airframe
		if f.CDMin != was.CDMin || f.Efficiency != was.Efficiency || f.CLMinDrag != was.CLMinDrag {
			t.Errorf("%s: %v %v %v, want %v %v %v", way, f.CDMin, f.Efficiency, f.CLMinDrag, was.CDMin, was.Efficiency, was.CLMinDrag)
		}
	}
}

// A measured table that was fitted comes back whole.
func TestTableComesBack(t *testing.T) {
	s := sample()
	f := &s.Airframe
	f.DragGiven = aircraft.ByTable
	rows := slices.Clone(f.Polar)
	list := toWay(s, aircraft.ByParabola)
	if len(list) != 3 || !strings.Contains(list[0].Note, "fitted to the table, CD within 0.0") {
		t.Fatalf("filled %+v", list)
	}
	// The normal equations of the six rows, solved in rational numbers outside this program.
	const fittedMinimum, fittedK, fittedCL = 0.03404570668385886, 0.05109638583139492, 0.04731393710981435
	near(t, "CDmin", f.CDMin, fittedMinimum, 1e-12)
	near(t, "CL of minimum drag", f.CLMinDrag, fittedCL, 1e-10)
	near(t, "e", f.Efficiency, 1/(math.Pi*9.4*9.4/12*fittedK), 1e-12)
	toWay(s, aircraft.ByBestGlide)
	toWay(s, aircraft.ByTable)
	if !reflect.DeepEqual(rows, f.Polar) {
		t.Errorf("the table is now %v", f.Polar)
	}
	// After another number was typed it is read off that.
	toWay(s, aircraft.ByParabola)
	f.CDMin += 0.002
	toWay(s, aircraft.ByTable)
	if reflect.DeepEqual(rows, f.Polar) || len(f.Polar) < 20 {
		t.Errorf("the table is still %v", f.Polar)
	}
	built(t, s)
}

// A table without a parabola of positive drag cannot be said otherwise; the choice is as before.
func TestNoParabola(t *testing.T) {
	for _, rows := range [][][]float64{{{-0.2, 0.05}, {1, 0.06}, {2.2, 0.04}}, {{-0.2, 0.02}, {1, 0.02}, {2.2, 0.4}}} {
		for _, way := range ways[:4] {
			s := sample()
			s.Airframe.DragGiven, s.Airframe.Polar = aircraft.ByTable, rows
			was := s.Airframe
			if list := toWay(s, way); list != nil || !reflect.DeepEqual(s.Airframe, was) {
				t.Errorf("%s: filled %+v, now %+v", way, list, s.Airframe)
			}
		}
	}
}

// The books' light single from its best glide: 13.606 at CL = sqrt(CD0/K) = sqrt(0.025 π 0.8 7.366) = 0.68027, so at
// sqrt(2·2950/(0.002377·174·0.68027)) = 144.8 ft/s.
func TestBestGlideOfTheBook(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_aircraft") {
		if row.Text("name") != "light single" {
			continue
		}
		b := aircrafttest.Read(t, "light single")
		f := &b.Spec.Airframe
		f.DragGiven, f.GlideRatio, f.GlideMass = aircraft.ByBestGlide, row.Num("best_ratio"), b.Mass
		f.GlideSpeed = aircrafttest.Feet(144.8)
		f.CDMin, f.Efficiency = 9, 9 // of no consequence
		e, err := b.Spec.Equivalent()
		if err != nil {
			t.Fatal(err)
		}
		// The speed has four figures and counts twice.
		near(t, "CDmin", e.CDMin, row.Num("cd0"), 2e-3)
		near(t, "e", e.Efficiency, row.Num("e"), 2e-3)
		near(t, "drag area", e.DragArea, row.Num("cd0")*row.SI("area"), 2e-3)
		if _, err := b.Spec.Build(); err != nil {
			t.Error(err)
		}
	}
}

func TestImpossible(t *testing.T) {
	glide := func(ratio, speed, mass float64) func(*aircraft.Spec) {
		return func(s *aircraft.Spec) {
			f := &s.Airframe
			f.DragGiven, f.GlideRatio, f.GlideSpeed, f.GlideMass = aircraft.ByBestGlide, ratio, speed, mass
		}
	}
	stall := func(speed, mass float64) func(*aircraft.Spec) {
		return func(s *aircraft.Spec) {
			s.Airframe.TakeOff.LiftGiven, s.Airframe.TakeOff.StallSpeed, s.Airframe.TakeOff.StallMass = aircraft.ByStall, speed, mass
		}
	}
	for name, c := range map[string]struct {
		change func(*aircraft.Spec)
		paths  []string
		says   string
	}{
		// CL = 2·600·9.80665/(1.225·90²·12) = 0.0988 < 0.1.
		"too fast": {glide(11, 90, 600), []string{"airframe.glide_speed"}, "“90 m/s” is in conflict with another input; CL is then 0.0988, and the best L/D lies above the CL of minimum drag, 0.1"},
		// CL = 0.889 at 30 m/s; K = 1/(2·40·0.789) = 0.01584, CDmin = 0.889/40 − 0.01584·0.789² = 0.01236: e = 1/(π 7.363 K) = 2.73.
		"too good": {glide(40, 30, 600), []string{"airframe.glide_speed"}, "with CL 0.889 there, e would be 2.73, and 0.2 to 1.5 is accepted"},
		// CL = 3.207 at 15.8 m/s; K = 1/(2·1.2·3.107) = 0.1341, CDmin = 3.207/1.2 − 0.1341·3.107² = 1.378.
		"too slow":      {glide(1.2, 15.8, 600), []string{"airframe.glide_ratio"}, "CDmin would be 1.38, and 0.003 to 0.5 is accepted"},
		"no drag":       {func(s *aircraft.Spec) { s.Airframe.DragGiven, s.Airframe.DragArea = aircraft.ByDragArea, 0.03 }, []string{"airframe.drag_area"}, "“0.03 m²” is in conflict with another input; CDmin would be 0.0025, and 0.003 to 0.5 is accepted"},
		"nothing in it": {func(s *aircraft.Spec) { s.Airframe.DragGiven, s.Airframe.FrictionTAS = aircraft.ByBuildUp, 50 }, []string{"airframe.unlisted"}, "with the components CDmin would be 0,"},
		"slow stall":    {stall(12, 600), []string{"airframe.take_off.stall_speed"}, "“12 m/s” is in conflict with another input; CLmax would be 5.56, and 0.3 to 5 is accepted"},
		"fast stall":    {stall(60, 600), []string{"airframe.take_off.stall_speed"}, "CLmax would be 0.222, and 0.3 to 5"},
		"stall of a table": {func(s *aircraft.Spec) {
			stall(15, 600)(s)
			s.Airframe.DragGiven = aircraft.ByTable
		}, []string{"airframe.take_off.stall_speed"}, "the drag polar runs from CL -0.2 to 2.2"},
		"a model in slow air": {func(s *aircraft.Spec) {
			s.Airframe.DragGiven, s.Airframe.FrictionTAS, s.Airframe.Unlisted = aircraft.ByBuildUp, 2, 0.4
			s.Airframe.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "fin")}
			s.Airframe.Components[0].Length = 0.1
		}, []string{"airframe.components[0].length"}, "Reynolds number is 13692"},
	} {
		s := sample()
		c.change(s)
		a, err := s.Build()
		var paths []string
		for _, e := range input.Errors(err) {
			if paths = append(paths, e.Path); !errors.Is(e, input.ErrConflict) {
				t.Errorf("%s: %v", name, e)
			}
		}
		if a != nil || !slices.Equal(paths, c.paths) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: %v at %v, want %q at %v", name, err, paths, c.says, c.paths)
		}
	}
}

// At every bound of the parabola a switch is taken or refused in words; it never says another polar.
func TestExtremes(t *testing.T) {
	for _, cdMin := range []float64{0.003, 0.5} {
		for _, e := range []float64{0.2, 1.5} {
			for _, clm := range []float64{-0.5, 1} {
				for _, way := range ways[1:] {
					s := sample()
					f := &s.Airframe
					f.CDMin, f.Efficiency, f.CLMinDrag = cdMin, e, clm
					before := built(t, s)
					toWay(s, way)
					a, err := s.Build()
					if err != nil {
						if len(input.Errors(err)) == 0 || strings.Contains(err.Error(), "NaN") {
							t.Errorf("%s: %v", way, err)
						}
						continue
					}
					near(t, way, a.Polar(aircraft.Clean).CD(1, 1, nil), before.Polar(aircraft.Clean).CD(1, 1, nil), 1e-3)
					if toWay(s, aircraft.ByParabola); math.Abs(f.CDMin-cdMin) > 1e-9 || math.Abs(f.Efficiency-e) > 1e-9 {
						t.Errorf("%s: came back as %v, %v", way, f.CDMin, f.Efficiency)
					}
					built(t, s)
				}
			}
		}
	}
}

// CLmax by V = sqrt(2 W/(ρ S CL)): the books' light single stalls at sqrt(2·2950/(0.002377·174·1.4)) = 100.9 ft/s.
func TestStallSpeed(t *testing.T) {
	b := aircrafttest.Read(t, "light single")
	c := &b.Spec.Airframe.Clean
	c.LiftGiven, c.StallSpeed, c.StallMass, c.CLMax = aircraft.ByStall, aircrafttest.Feet(100.9), b.Mass, 9
	near(t, "CLmax", b.Build(t).CLMax(aircraft.Clean), 1.4, 2e-3) // four figures, squared
	if p := b.Spec.Stall(aircraft.Clean); p.Mass != b.Mass || math.Abs(p.Speed-c.StallSpeed) > 1e-9 {
		t.Errorf("said as %+v", p)
	}
	rapid.Check(t, func(t *rapid.T) {
		s := sample()
		c := &s.Airframe.Landing
		c.CLMax = rapid.Float64Range(0.3, 5).Draw(t, "cl_max")
		s.Airframe.WingArea = rapid.Float64Range(5, 30).Draw(t, "area")
		was := c.CLMax
		c.LiftGiven = aircraft.ByStall
		list := s.Switch("airframe.landing.lift_given", aircraft.ByCLMax)
		if len(list) != 2 || c.StallMass != s.StartMass() {
			t.Fatalf("filled %+v", list)
		}
		near(t, "stall speed", c.StallSpeed, math.Sqrt(2*c.StallMass*9.80665/(atmos.SeaLevelDensity*s.Airframe.WingArea*was)), 1e-12)
		near(t, "CLmax as flown", built(t, s).CLMax(aircraft.Landing), was, 1e-12)
		// A heavier mass at the same speed is more lift.
		c.StallMass *= 1.1
		if 1.1*was <= 5 {
			near(t, "CLmax of the heavier", built(t, s).CLMax(aircraft.Landing), 1.1*was, 1e-12)
		}
		c.StallMass /= 1.1
		c.LiftGiven = aircraft.ByCLMax
		s.Switch("airframe.landing.lift_given", aircraft.ByStall)
		near(t, "CLmax", c.CLMax, was, 1e-12)
	})
}

// The rates carry a band over: a small change of the one is that change of the other.
func TestRates(t *testing.T) {
	at := func(path string, s *aircraft.Spec) *float64 {
		e, ok := input.Find(s, path)
		if !ok || e.Number == nil {
			t.Fatalf("no %s", path)
		}
		return e.Number.Value
	}
	check := func(name string, prepare func(*aircraft.Spec), change func(*aircraft.Spec) []aircraft.Derived) {
		s := sample()
		prepare(s)
		rated := 0
		list := change(s)
		for _, d := range list {
			if d.Rate == 0 {
				continue
			}
			rated++
			moved := sample()
			prepare(moved)
			const h = 1e-6
			*at(d.From[0], moved) += h
			change(moved)
			if got := (*at(d.Path, moved) - *at(d.Path, s)) / h; math.Abs(got-d.Rate) > 1e-3*math.Abs(d.Rate) {
				t.Errorf("%s: %s changes by %v per %s, said %v", name, d.Path, got, d.From[0], d.Rate)
			}
		}
		if rated != 1 {
			t.Errorf("%s: %d rates in %+v", name, rated, list)
		}
	}
	for _, c := range [][2]string{{aircraft.ByParabola, aircraft.ByDragArea}, {aircraft.ByParabola, aircraft.ByBuildUp}, {aircraft.ByDragArea, aircraft.ByParabola}, {aircraft.ByDragArea, aircraft.ByBuildUp}} {
		check(c[0]+" to "+c[1], func(s *aircraft.Spec) { s.Airframe.DragGiven, s.Airframe.DragArea = c[0], 0.39 }, func(s *aircraft.Spec) []aircraft.Derived { return toWay(s, c[1]) })
	}
	stall := func(s *aircraft.Spec) {
		s.Airframe.Clean.LiftGiven, s.Airframe.Clean.StallSpeed, s.Airframe.Clean.StallMass = aircraft.ByStall, 24, 600
	}
	check("stall speed", stall, func(s *aircraft.Spec) []aircraft.Derived {
		s.Airframe.Clean.LiftGiven = aircraft.ByCLMax
		return s.Switch("airframe.clean.lift_given", aircraft.ByStall)
	})
	check("CLmax", func(*aircraft.Spec) {}, func(s *aircraft.Spec) []aircraft.Derived {
		s.Airframe.Clean.LiftGiven = aircraft.ByStall
		return s.Switch("airframe.clean.lift_given", aircraft.ByCLMax)
	})
}

func TestEquivalent(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := shaped(t)
		first, err := s.Equivalent()
		if err != nil {
			t.Fatalf("%v", err)
		}
		// Best L/D is what the flight at that speed and mass has.
		a := built(t, s)
		cl := 2 * first.Mass * 9.80665 / (atmos.SeaLevelDensity * first.GlideSpeed * first.GlideSpeed * a.WingArea())
		near(t, "best L/D", cl/a.Polar(aircraft.Clean).CD(cl, 1, nil), first.GlideRatio, 1e-9)
		for _, way := range ways[1:4] {
			toWay(s, way)
			e, err := s.Equivalent()
			if err != nil {
				t.Fatalf("%v", err)
			}
			e.Unusual, first.Unusual = "", ""
			near(t, way+" f", e.DragArea, first.DragArea, 1e-9)
			near(t, way+" e", e.Efficiency, first.Efficiency, 1e-9)
			near(t, way+" speed", e.GlideSpeed, first.GlideSpeed, 1e-9)
		}
	})
	s := sample()
	s.Airframe.DragGiven = aircraft.ByTable
	if e, err := s.Equivalent(); err != nil || !e.Fitted || !(e.RMS > 0 && e.Worst >= e.RMS && e.Worst < 0.02) {
		t.Errorf("%+v, %v", e, err)
	}
	s = sample()
	s.Airframe.DragGiven, s.Airframe.DragArea = aircraft.ByDragArea, 1.2
	if e, _ := s.Equivalent(); !strings.Contains(e.Unusual, "CDmin follows as 0.1; typical 0.016 to 0.06") {
		t.Errorf("unusual: %q", e.Unusual)
	}
}

func TestDragWorking(t *testing.T) {
	record := formulatest.Record{}
	for _, way := range ways {
		s := sample()
		toWay(s, way)
		var w formula.Working
		s.Airframe.DragWorking(&w)
		s.Airframe.Clean.LiftGiven = aircraft.ByStall
		s.Switch("airframe.clean.lift_given", aircraft.ByCLMax)
		s.Airframe.LiftWorking(aircraft.Clean, &w)
		if len(w.Steps) < 2 {
			t.Errorf("%s: %d steps", way, len(w.Steps))
		}
		record.Check(t, w)
	}
	record.Complete(t)
}

func TestSkinOnly(t *testing.T) {
	s := sample()
	s.Airframe.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "Wing")}
	if s.Airframe.SkinOnly() {
		t.Error("a parabola is no build-up")
	}
	toWay(s, aircraft.ByBuildUp)
	if s.Airframe.Unlisted <= 0 || s.Airframe.SkinOnly() {
		t.Errorf("unlisted %v", s.Airframe.Unlisted)
	}
	s.Airframe.Unlisted = 0
	if !s.Airframe.SkinOnly() {
		t.Error("a wing alone is not noticed")
	}
	if s.Unused("airframe.components[0].length") || !sample().Unused("airframe.components[0].length") || sample().Unused("airframe.cd_min") {
		t.Error("components count in a build-up, and only there")
	}
}
