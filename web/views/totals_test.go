package views

import (
	"strings"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

func TestTotals(t *testing.T) {
	st, _, _ := stripOf(t, func(s *project.Spec) {
		w := &s.Variants[0].Aircraft.Weights
		w.Growth, w.ZeroFuelGiven, w.MaxZeroFuel, w.MaxTakeOff = 0.05, aircraft.ByZeroFuel, 560, 631.16
	})
	// 298 + 78 kg, 5 % of them 18.8 kg, 86 + 75 + 12 kg, 2 L and 86 L of 0.72 kg/L.
	var rows []string
	for _, r := range newTotals(st, units.Metric).Rows {
		rows = append(rows, strings.ReplaceAll(r.Label+": "+r.Value+" "+r.Margin+" "+r.Tone, "\u00a0", " "))
	}
	want := `Empty, less powerplant: 298.0 kg  
Powerplant: 78.0 kg  
Growth allowance, 5.0 %: 18.8 kg  
Items: 173.0 kg  
Unusable fuel: 1.4 kg  
Without usable fuel: 569.2 kg  
Greatest without fuel: 560.0 kg 9.2 kg above the limit bad
Usable fuel, of 63.4 kg aboard: 61.9 kg  
At the start: 631.2 kg  
Greatest at take-off: 631.2 kg at the limit good`
	if got := strings.Join(rows, "\n"); got != want {
		t.Errorf("got\n%s\nwant\n%s", got, want)
	}
}
