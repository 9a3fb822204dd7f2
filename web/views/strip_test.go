package views

import (
	"bytes"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// stripOf makes the page of the demo's first variant after a change.
func stripOf(t testing.TB, change func(*project.Spec)) (*study.Study, StripAnalysis, string) {
	t.Helper()
	s := project.Demo()
	if change != nil {
		change(s)
	}
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	st := study.Run(p, 0, study.DefaultView(p, 0))
	page := NewStrip(st, NewFrame(st, 1, "/strip", "", nil))
	var b bytes.Buffer
	if err := StripPage(page).Render(t.Context(), &b); err != nil {
		t.Fatal(err)
	}
	return st, page, b.String()
}

func TestStripAnswers(t *testing.T) {
	for _, c := range []struct {
		length         float64
		headline, says string
	}{
		{800, "The take-off and the landing fit with their safety factors.", "Fits with "},
		{600, "The take-off fits only without its safety factor; the landing fits with its safety factor.", "Fits only unfactored: 503\u00a0m of 600\u00a0m."},
		{450, "The take-off does not fit; the landing fits only without its safety factor.", "Does not fit: 503\u00a0m unfactored ends 53\u00a0m past"},
		{300, "Neither the take-off nor the landing fits.", "Does not fit: "},
	} {
		_, p, _ := stripOf(t, func(s *project.Spec) { s.Strips[0].Length = c.length })
		if p.Headline != c.headline || !strings.HasPrefix(p.Sides[0].Sentence, c.says) {
			t.Errorf("%g m: %q, %q", c.length, p.Headline, p.Sides[0].Sentence)
		}
		if (p.Tone == "good") != (c.length == 800) {
			t.Errorf("%g m: tone %s", c.length, p.Tone)
		}
	}
	_, p, _ := stripOf(t, func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Empty = 1400 })
	if !strings.HasPrefix(p.Headline, "The take-off is not possible") || !strings.HasPrefix(p.Sides[0].Sentence, "No take-off: the aircraft does not") {
		t.Errorf("%q, %q", p.Headline, p.Sides[0].Sentence)
	}
}

// TestStripSaysPlaceholders: a distance that rests on placeholders says so, and only then.
func TestStripSaysPlaceholders(t *testing.T) {
	if _, p, page := stripOf(t, nil); p.Sides[0].Segments.Why != "" || strings.Contains(page, "Every figure here") {
		t.Errorf("the demo's take-off %s", p.Sides[0].Segments.Why)
	}
	if _, _, page := stripOf(t, func(s *project.Spec) { s.Variants[0].Basis = nil }); strings.Count(page, "Every figure here rests on") != 2 {
		t.Error("placeholders are not said")
	}
}

// TestStripMatrix: every cell has a word that agrees with its number and a class of that
// word; one without a number is explained under the table.
func TestStripMatrix(t *testing.T) {
	words := map[string]int{}
	for name, change := range map[string]func(*project.Spec){
		"demo": nil, "high": func(s *project.Spec) { s.Strips[0].Elevation = 4800 }, "aviation": func(s *project.Spec) { s.Display = string(units.Aviation) },
		"ice": func(s *project.Spec) { s.Strips[0].Slope, s.Strips[0].Surface = -0.2, "ice" },
	} {
		st, p, _ := stripOf(t, change)
		off, on := st.Fields()
		for k, f := range []study.Field{off, on} {
			m, sys := p.Sides[k].Matrix, st.Project.Spec.System()
			if len(m.Rows) != len(f.Grid.Cells)+1 || len(m.Head) != len(f.Grid.Temperatures)+1 {
				t.Fatalf("%s: %d rows, %d heads", name, len(m.Rows), len(m.Head))
			}
			for i, r := range m.Rows[:len(f.Grid.Cells)] {
				for j, c := range r.Cells {
					q := f.Grid.Cells[i][j]
					words[c.Word]++
					want := string(q.Fit(f.Present.Place.Strip.Length))
					if c.Fit != want || q.Has() && (c.Word != want || c.Value != sys.Number(units.FieldLength, q.Run.Total)) {
						t.Errorf("%s: cell %+v of %g m, %s", name, c, q.Run.Total, want)
					}
					if !q.Has() && (c.Value != "" || !strings.Contains(strings.ToLower(strings.Join(m.Reasons, " ")), c.Word)) {
						t.Errorf("%s: %q is not explained in %q", name, c.Word, m.Reasons)
					}
				}
			}
		}
	}
	for _, w := range []string{"fits", "tight", "over", "no climb", "no lift-off", "no stop"} {
		if words[w] == 0 {
			t.Errorf("no cell says %q: %v", w, words)
		}
	}
}

// TestStripChanges: the first row is the present case and published numbers stand as signed percentages.
func TestStripChanges(t *testing.T) {
	_, p, page := stripOf(t, func(s *project.Spec) { s.Strips[0].Surface = "dry-asphalt" })
	rows := map[string][]string{}
	for _, r := range p.Sides[0].Changes.Rows {
		rows[r[0]] = r
	}
	for what, want := range map[string]string{"As it is": "–", "10 % heavier": "+20", "5 % heavier": "–", "soft ground instead of dry asphalt": "≥ +25"} {
		if r := rows[what]; r == nil || r[3] != want {
			t.Errorf("%s: %q, want %s", what, r, want)
		}
	}
	for _, want := range []string{"SafetySense Leaflet 7c", "count them twice", "Unfactored", "80\u00a0% humidity"} {
		if !strings.Contains(page, want) {
			t.Errorf("the page lacks %q", want)
		}
	}
}

// TestStripSound: whatever the project, no wreck of a number reaches the page.
func TestStripSound(t *testing.T) {
	for name, change := range map[string]func(*project.Spec){
		"tiny":  func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Empty, s.Display = 1, string(units.Small) },
		"heavy": func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Empty = 2500 }, "gale": func(s *project.Spec) { s.Strips[0].HeadWind = 25 },
		"no mission": func(s *project.Spec) { s.Legs = s.Legs[:0] }, "flat": func(s *project.Spec) { s.Strips[0].Obstacle = 0 },
		"highest": func(s *project.Spec) {
			s.Strips[0].Elevation, s.Day.Deviation, s.Display = 6000, 60, string(units.Aviation)
		},
		"coldest": func(s *project.Spec) { s.Strips[0].Elevation, s.Day.Deviation = -450, -60 }, "failing": func(s *project.Spec) { s.Legs[2].Altitude = 9000 },
	} {
		_, _, page := stripOf(t, change)
		for _, bad := range []string{"NaN", "Inf<", "Inf\u00a0", "%!", "{}", "&lt;nil&gt;"} {
			if i := strings.Index(page, bad); i >= 0 {
				t.Errorf("%s: %q in … %s", name, bad, page[max(0, i-80):i+20])
			}
		}
	}
}

func BenchmarkStripPage(b *testing.B) {
	for b.Loop() {
		stripOf(b, nil)
	}
}
