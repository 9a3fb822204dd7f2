package views

import (
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

func dragOf(t *testing.T, change func(*aircraft.Airframe)) DragPage {
	t.Helper()
	s := project.Demo()
	change(&s.Variants[0].Aircraft.Airframe)
	p, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	return NewDrag(study.Run(p, 0, study.DefaultView(p, 0)), Frame{})
}

// listed gives the drag by a wing and a gear leg. The wing as worked on paper in package dragbuild: Re 4.416e6,
// Cf 0.0031119, FF 1.350625, 0.10171 m²; with 0.06 m² of gear and a tenth for leaks 0.17788 m², less 0.01 m²: 0.16788 m².
func listed(f *aircraft.Airframe) {
	f.DragGiven, f.FrictionTAS, f.Leakage, f.Unlisted = aircraft.ByBuildUp, 50, 0.1, -0.01
	f.Components = []dragbuild.Component{
		{Name: "Wing", Kind: dragbuild.Surface, WettedArea: 22, Length: 1.29, ThicknessRatio: 0.15, ThicknessAt: 0.3, Laminar: 0.1, Interference: 1.1},
		{Name: "Gear", Kind: dragbuild.ByDragArea, DragArea: 0.06},
	}
}

func TestBuildUpTable(t *testing.T) {
	p := dragOf(t, listed)
	for i, want := range []string{
		"Wing|wing or tail surface|4.42|0.00311|1.351|1.10|0.102|0.00841|60.6",
		"Gear|other, by its drag area|–|–|–|–|0.060|0.00496|35.7",
		"Leakage and protuberances|10 % of the above|–|–|–|–|0.016|0.00134|9.6",
		"Not in the list|as given|–|–|–|–|−0.010|−0.00083|−6.0",
		"Together|CDmin|–|–|–|–|0.168|0.01387|100.0",
	} {
		if i >= len(p.Build.Rows) || strings.Join(p.Build.Rows[i], "|") != want {
			t.Errorf("row %d of %q, want %q", i, p.Build.Rows, want)
		}
	}
	if p.Method == "" || len(p.Warn) > 0 {
		t.Errorf("method %q, warning %v", p.Method, p.Warn)
	}
	// Without gear and leaks it is skin alone, of a drag that no such aircraft has.
	p = dragOf(t, func(f *aircraft.Airframe) {
		listed(f)
		f.Leakage, f.Components = 0, f.Components[:1]
		f.Components[0].WettedArea = 40
	})
	if len(p.Warn) != 1 || !strings.Contains(p.Unusual, "CDmin follows as 0.0145; typical 0.016") {
		t.Errorf("warnings %v, unusual %q", p.Warn, p.Unusual)
	}
	// A list that is not in use is a check on what is; without its corrections.
	p = dragOf(t, func(f *aircraft.Airframe) {
		listed(f)
		f.DragGiven = aircraft.ByParabola
	})
	if last := p.Build.Rows[len(p.Build.Rows)-1]; last[6] != "0.178" || !strings.Contains(p.Build.Note, "check") {
		t.Errorf("together %q, %q", last, p.Build.Note)
	}
	if p = dragOf(t, func(*aircraft.Airframe) {}); len(p.Build.Rows) != 0 || !strings.Contains(p.Build.Note, "No component") || p.Method != "" {
		t.Errorf("without a list: %q, %q", p.Build.Rows, p.Build.Note)
	}
	p = dragOf(t, func(f *aircraft.Airframe) {
		listed(f)
		f.DragGiven, f.FrictionTAS = aircraft.ByParabola, 0
	})
	if !strings.Contains(p.Build.Reason, "the Reynolds number is 0") || len(p.Build.Rows) != 0 {
		t.Errorf("a list at rest: %q, %q", p.Build.Rows, p.Build.Reason)
	}
}

func TestWays(t *testing.T) {
	p := dragOf(t, func(*aircraft.Airframe) {})
	if len(p.Ways) != 3 || p.Ways[0].Value != "0.0335 and 0.77" || p.Ways[2].Value != "13.1 at 32.3\u00a0m/s EAS" || p.Fit != "" {
		t.Errorf("%+v, %q", p.Ways, p.Fit)
	}
	// CDmin 0.0335 + 0.045, CL at minimum drag 0.3: CL = sqrt(0.0785/0.05660 + 0.09) = 1.2153, L/D = 1/(2·0.05660·0.9153) = 9.652.
	if got := strings.Join(p.Lift.Rows[2], "|"); got != "Landing|CLmax|1.95|20.4|612.4|0.0785|9.65" {
		t.Errorf("landing: %q", got)
	}
	p = dragOf(t, func(f *aircraft.Airframe) { f.DragGiven = aircraft.ByTable })
	if !strings.Contains(p.Fit, "comes nearest to the table") || p.Ways[0].Value == "" {
		t.Errorf("%+v, %q", p.Ways, p.Fit)
	}
	p = dragOf(t, func(f *aircraft.Airframe) {
		f.DragGiven, f.Polar = aircraft.ByTable, [][]float64{{-0.3, 0.05}, {0.6, 0.07}, {2.2, 0.06}}
	})
	if len(p.Ways) != 0 || !strings.Contains(p.Fit, "No parabola") {
		t.Errorf("%+v, %q", p.Ways, p.Fit)
	}
}
