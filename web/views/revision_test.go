package views

import (
	"strings"
	"testing"
	"time"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

func TestFigurePairs(t *testing.T) {
	light, _, _ := stripOf(t, nil)
	heavy, _, _ := stripOf(t, func(s *project.Spec) { s.Variants[0].Aircraft.Weights.Empty = 1400 })
	plain := func(text string) string { return strings.ReplaceAll(text, "\u00a0", " ") }
	pairs := func(then, now *study.Study) map[string]FigurePair {
		p := NewRevision(1, Saved{Number: 3, At: time.Now(), Engine: "old"}, "new", then, now, project.Demo())
		if p.Program == "" || !strings.Contains(p.Program, "old") {
			t.Errorf("another version of the program is not told: %q", p.Program)
		}
		byLabel := map[string]FigurePair{}
		for _, f := range p.Figures {
			byLabel[f.Label] = f
		}
		return byLabel
	}
	same := pairs(light, light)
	if f := same["Take-off over the obstacle"]; plain(f.Then) != "503 m" || f.Now != f.Then || f.Change != "same" || !f.Has || !f.HasNow {
		t.Errorf("%+v", f)
	}
	worse := pairs(light, heavy)
	if f := worse["Take-off over the obstacle"]; plain(f.Then) != "503 m" || !strings.HasPrefix(f.Now, "none: ") || f.Change != absent || f.HasNow {
		t.Errorf("%+v", f)
	}
	if f := worse["Stall, clean"]; !strings.HasPrefix(f.Change, "+") || !strings.HasSuffix(plain(f.Change), " %)") {
		t.Errorf("%+v", f)
	}
	gone := pairs(light, nil)
	if f := gone["Take-off over the obstacle"]; f.Now != absent || f.Change != absent {
		t.Errorf("%+v", f)
	}
	for _, c := range []struct {
		q         units.Quantity
		then, now float64
		want      string
	}{
		{units.FieldLength, 400, 500, "+100 m (+25.0 %)"}, {units.FieldLength, 500, 400, "−100 m (−20.0 %)"}, {units.FieldLength, 0, 5, "+5.0 m"},
		{units.Fraction, 0.10, 0.125, "+2.5 points"}, {units.Force, -100, -50, "+50 N (+50.0 %)"}, {units.Force, 1, 500, "+499 N"},
	} {
		if got := plain(changeWords(units.Metric, c.q, c.then, c.now)); got != c.want {
			t.Errorf("%v from %v to %v: %q, want %q", c.q.Name(), c.then, c.now, got, c.want)
		}
	}
}
