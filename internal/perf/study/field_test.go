package study_test

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/project"
	"legwright/internal/perf/reference"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func fields(t testing.TB, s *project.Spec, change func(*study.View)) (st *study.Study, off, on study.Field) {
	t.Helper()
	p := built(t, s)
	view := study.DefaultView(p, 0)
	if change != nil {
		change(&view)
	}
	st = study.Run(p, 0, view)
	off, on = st.Fields()
	return st, off, on
}

// TestFieldsAgree: at the default view the page of the strip has the distances of the bench.
func TestFieldsAgree(t *testing.T) {
	st, off, on := fields(t, project.Demo(), nil)
	if off.Present.Run.Total != st.TakeOff.Run.Total || on.Present.Run.Factored != st.Landing.Run.Factored {
		t.Errorf("take-off %g and %g m, landing %g and %g m", off.Present.Run.Total, st.TakeOff.Run.Total, on.Present.Run.Factored, st.Landing.Run.Factored)
	}
	if d := off.Deviation - 15; math.Abs(d) > 1e-9 {
		t.Errorf("ISA %+g, want +15", off.Deviation)
	}
	_, _, again := fields(t, project.Demo(), func(v *study.View) { v.Mass, v.Altitude = v.Mass*(1+2e-7), v.Altitude+1e-4 })
	if again.Present.Mass != st.Landing.Mass || again.Present.Run.Total != st.Landing.Run.Total {
		t.Errorf("a form sent unchanged lands at %g kg, the mission at %g kg", again.Present.Mass, st.Landing.Mass)
	}
	_, heavy, _ := fields(t, project.Demo(), func(v *study.View) { v.Mass, v.Altitude, v.Deviation = 640, 1500, 5 })
	place, how := st.Project.Departure, st.Project.Plan.Technique
	place.Air = mustAir(t, 1500, 5, st.Project.Plan.Day.Humidity)
	want, err := runway.TakeOff(st.Aircraft(), 640, place, how)
	if err != nil || heavy.Present.Run.Total != want.Total || heavy.Present.Run.Factored != how.TakeOffFactor*want.Total {
		t.Errorf("at the view %g m, want %g m (%v)", heavy.Present.Run.Total, want.Total, err)
	}
}

// TestFieldTrends: distances grow with height, heat, mass and humidity; the curves pass
// through the present case; the fit of every cell follows from its distances.
func TestFieldTrends(t *testing.T) {
	st, off, on := fields(t, project.Demo(), nil)
	for _, f := range []study.Field{off, on} {
		rising(t, "altitude", f.ByAltitude)
		rising(t, "mass", f.ByMass)
		if f.ByAltitude[0].Altitude > f.Present.Place.Air.PressureAltitude || f.ByMass[0].Mass >= f.Present.Mass {
			t.Errorf("the curves begin at %g m and %g kg", f.ByAltitude[0].Altitude, f.ByMass[0].Mass)
		}
		if last := f.ByMass[len(f.ByMass)-1]; last.Mass != st.Masses.MaxTakeOff {
			t.Errorf("the masses end at %g kg", last.Mass)
		}
		g := f.Grid
		for i, row := range g.Cells {
			rising(t, "temperature", row)
			for j := range row {
				if i > 0 && row[j].Run.Total <= g.Cells[i-1][j].Run.Total {
					t.Errorf("landing %v: higher is no longer at %g m, %g K", f.Landing, g.Altitudes[i], g.Temperatures[j])
				}
				if d := row[j].Temperature - g.Temperatures[j]; math.Abs(d) > 1e-9 || row[j].Altitude != g.Altitudes[i] {
					t.Errorf("cell %d, %d is at %g m, %g K", i, j, row[j].Altitude, row[j].Temperature)
				}
			}
		}
		for j := range g.Humid {
			if g.Humid[j].Run.Total <= g.Cells[g.HumidRow][j].Run.Total {
				t.Errorf("landing %v: humid air is no longer at %g K", f.Landing, g.Temperatures[j])
			}
		}
		if len(g.Humid) != len(g.Temperatures) {
			t.Error("no humid row")
		}
	}
	length := off.Present.Place.Strip.Length
	p := study.FieldPoint{Run: runway.Run{Total: length, Factored: length}}
	for fit, run := range map[study.Fit]runway.Run{study.Fits: {Total: length / 2, Factored: length}, study.Tight: {Total: length, Factored: length + 1}, study.Over: {Total: length + 1, Factored: 2 * length}} {
		if p.Run = run; p.Fit(length) != fit {
			t.Errorf("%+v on %g m: %s", run, length, p.Fit(length))
		}
	}
	if p.Word = "no roll"; p.Fit(length) != study.None {
		t.Error("no run fits")
	}
}

func rising(t *testing.T, what string, list []study.FieldPoint) {
	t.Helper()
	for i := range list {
		if !list[i].Has() || list[i].Run.Total <= 0 {
			t.Fatalf("%s: point %d has no distance: %v", what, i, list[i].Err)
		}
		if i > 0 && list[i].Run.Total <= list[i-1].Run.Total {
			t.Errorf("%s: %g m after %g m", what, list[i].Run.Total, list[i-1].Run.Total)
		}
	}
}

// TestFieldChanges holds the published column to the reference file, and the computed
// one to its order of magnitude: the leaflet rounds up and has no aircraft in mind.
func TestFieldChanges(t *testing.T) {
	s := project.Demo()
	s.Strips[0].Surface, s.Strips[0].Slope = "dry-asphalt", 0
	_, off, on := fields(t, s, nil)
	rows := map[string]reference.Row{}
	for _, r := range reference.Read(t, "field_factors") {
		rows[r.Text("change")] = r
	}
	find := func(f study.Field, part string) *study.FieldChange {
		for i := range f.Changes {
			if strings.Contains(f.Changes[i].What.In(units.Aviation), part) {
				return &f.Changes[i]
			}
		}
		t.Fatalf("no change %q", part)
		return nil
	}
	for name, start := range map[string]string{"weight 10 % more": "10 %", "1000 ft higher": "1000", "10 K warmer": "warmer", "2 % uphill": "2 % more up", "2 % downhill": "2 % more down",
		"tail wind of a tenth of the lift-off speed": "tenth", "wet grass": "wet grass instead", "soft ground": "soft ground instead"} {
		for column, f := range map[string]study.Field{"take_off": off, "landing": on} {
			c, want := find(f, start), 0.0
			if rows[name].Has(column) {
				want = leading(rows[name], column) - 1
			}
			if math.Abs(c.Published-want) > 1e-12 {
				t.Errorf("%s, %s: published %g, the file has %g", name, column, c.Published, want)
			}
			if want > 0 && (c.Rise < 0.2*want || c.Rise > 1.6*want) {
				t.Errorf("%s, %s: %.3f computed, %.3f published", name, column, c.Rise, want)
			}
		}
	}
	for _, f := range []study.Field{off, on} {
		for start, sign := range map[string]float64{"3.9\u00a0kt more head": -1, "3.9\u00a0kt more tail": 1, "5 %": 1} {
			if c := find(f, start); c.Rise*sign <= 0 {
				t.Errorf("landing %v, %s: %+.3f", f.Landing, c.What.In(units.Metric), c.Rise)
			}
		}
	}
}

// leading is the number of a column without its own tolerance.
func leading(r reference.Row, column string) float64 {
	text, _, own := strings.Cut(r.Text(column), "±")
	if !own {
		return r.Num(column)
	}
	v := 0.0
	for i, d := range strings.Replace(text, ".", "", 1) {
		v += float64(d-'0') * math.Pow(10, -float64(i))
	}
	return v
}

// TestFieldWords: where there is no distance, a word and a sentence say why.
func TestFieldWords(t *testing.T) {
	for word, change := range map[string]func(*project.Spec){
		"no roll":     func(s *project.Spec) { s.Strips[0].Slope = 0.2; s.Variants[0].Aircraft.Weights.Empty = 1400 },
		"no lift-off": func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Empty = 1400; s.Strips[0].Slope = 0 },
		"no climb":    func(s *project.Spec) { s.Strips[0].Elevation, s.Day.Deviation = 5100, 20 },
		"no stop":     func(s *project.Spec) { s.Strips[0].Slope, s.Strips[0].Surface = -0.2, "ice" },
	} {
		s := project.Demo()
		change(s)
		_, off, on := fields(t, s, nil)
		f := off
		if word == "no stop" {
			f = on
		}
		last := f.ByMass[len(f.ByMass)-1]
		if last.Word != word || last.Err == nil || len(units.Explain(last.Err).In(units.Metric)) < 20 {
			t.Errorf("%q, %v; want %q", last.Word, last.Err, word)
		}
	}
}

// TestFieldsFinite: on any strip and view a point has finite distances or a word.
func TestFieldsFinite(t *testing.T) {
	rapid.Check(t, func(r *rapid.T) {
		s := project.Demo()
		p := &s.Strips[0]
		p.Elevation = rapid.Float64Range(-450, 6000).Draw(r, "elevation")
		p.Slope = rapid.Float64Range(-0.2, 0.2).Draw(r, "slope")
		p.HeadWind = rapid.Float64Range(-15, 25).Draw(r, "wind")
		p.Obstacle = rapid.Float64Range(0, 60).Draw(r, "obstacle")
		s.Day.Deviation = rapid.Float64Range(-60, 60).Draw(r, "deviation")
		_, off, on := fields(t, s, func(v *study.View) {
			v.Mass = rapid.Float64Range(0.05, 3000).Draw(r, "mass")
			v.Altitude = rapid.Float64Range(-500, 40000).Draw(r, "altitude")
		})
		for _, f := range []study.Field{off, on} {
			points := append(append([]study.FieldPoint{}, f.ByAltitude...), f.ByMass...)
			for _, row := range append(f.Grid.Cells, f.Grid.Humid) {
				points = append(points, row...)
			}
			for _, c := range f.Changes {
				points = append(points, c.FieldPoint)
			}
			for _, p := range points {
				if p.Has() == (p.Err != nil) {
					r.Fatalf("word %q, error %v", p.Word, p.Err)
				}
				if v := p.Run.Total + p.Run.Factored + p.Run.Ground + p.Density; p.Has() && (math.IsNaN(v) || math.IsInf(v, 0) || p.Run.Total <= 0) {
					r.Fatalf("%+v", p)
				}
			}
		}
	})
}

func BenchmarkFields(b *testing.B) {
	p := built(b, project.Demo())
	s := study.Run(p, 0, study.DefaultView(p, 0))
	for b.Loop() {
		s.Fields()
	}
}

func mustAir(t testing.TB, hp, deviation, humidity float64) atmos.Air {
	t.Helper()
	air, err := atmos.Day{Deviation: deviation, Humidity: humidity}.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return air
}
