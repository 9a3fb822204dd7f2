package sheet_test

import (
	"math"
	"testing"

	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/sheet"
	"legwright/internal/perf/units"
)

// tableOf is a table of the document's piston engine with its propeller.
func tableOf(t *testing.T, path string) *input.Table {
	t.Helper()
	e, ok := input.Find(new(powerplant.PistonPropeller), path)
	if !ok || e.Table == nil {
		t.Fatal("no table ", path)
	}
	return e.Table
}

// TestChecks: a sheet's own efficiency or torque shows whether its columns are read as they are meant.
// The expected values are worked by hand: at 1800 rpm 38.5 kW are 38500/(2π 30) = 204.25 N·m.
func TestChecks(t *testing.T) {
	powers, coefficients := tableOf(t, "engine.power_curve"), tableOf(t, "propeller.coefficients")
	for name, c := range map[string]struct {
		table        *input.Table
		text         string
		worst        float64 // share of the greatest value; negative when nothing is compared
		given, found float64 // SI
		line         int
	}{
		"efficiency as a fraction":    {coefficients, "J,CT,CP,eta\n0,.1,.05,0\n.4,.08,.044,.727\n.8,-.01,.01,\n", (0.727273 - 0.727) / 0.727273, 0.727, 0.727273, 3},
		"efficiency in percent":       {coefficients, "J,CT,CP,eta [%]\n0,.1,.05,0\n.4,.08,.044,73\n.8,.01,.02,40\n", (0.73 - 0.727273) / 0.727273, 0.73, 0.727273, 3},
		"percent without saying so":   {coefficients, "J,CT,CP,Efficiency\n0,.1,.05,0\n.4,.08,.044,73\n.8,.01,.02,40\n", (0.73 - 0.727273) / 0.727273, 0.73, 0.727273, 3},
		"torque coefficient for CP":   {coefficients, "J,CT,CP,eta\n0,.1,.00796,0\n.4,.08,.0070028,.727\n.8,.01,.0031831,.4\n", 1 - 0.727/4.5696, 0.727, 4.5696, 3},
		"torque in newton metres":     {powers, "rpm,P [kW],M [Nm]\n1800,38.5,204\n2400,50,199\n", 0.2488 / 204.2488, 204, 204.2488, 2},
		"horsepower taken for kW":     {powers, "rpm,P [kW],M [Nm]\n1800,51.6,204\n2400,67,199\n", (273.75 - 204) / 273.75, 204, 273.75, 2},
		"torque in an unknown unit":   {powers, "rpm,P [kW],M [kp]\n1800,38.5,20\n2400,50,20\n", -1, 0, 0, 0},
		"torque without a unit":       {powers, "rpm,P [kW],M\n1800,38.5,204\n2400,50,199\n", -1, 0, 0, 0},
		"two columns of one name":     {coefficients, "J,CT,CP,eta,eta\n0,.1,.05,0,1\n.4,.08,.044,.7,1\n.8,.01,.02,.4,1\n", -1, 0, 0, 0},
		"no cell that can be read":    {coefficients, "J,CT,CP,eta\n0,.1,.05,-\n.4,.08,.044,-\n.8,.01,.02,-\n", -1, 0, 0, 0},
		"nowhere that it has a sense": {coefficients, "J,CT,CP,eta\n0,-.1,.05,0\n.4,-.08,.044,0\n.8,-.01,.02,0\n", -1, 0, 0, 0},
	} {
		_, f := filled(t, c.text, c.table, sheet.Mapping{})
		if len(f.Open)+len(f.Errors) > 0 {
			t.Errorf("%s: %+v", name, f)
			continue
		}
		if c.worst < 0 {
			if len(f.Checks) > 0 {
				t.Errorf("%s: compared %+v", name, f.Checks)
			}
			continue
		}
		near := func(got, want float64) bool { return math.Abs(got-want) <= 2e-4*math.Abs(want)+2e-6 }
		if len(f.Checks) != 1 || !near(f.Checks[0].Worst, c.worst) || !near(f.Checks[0].Given, c.given) || !near(f.Checks[0].Found, c.found) || f.Checks[0].Line != c.line {
			t.Errorf("%s: %+v", name, f.Checks)
		}
	}
	if u, _ := units.Torque.Find("Nm"); u.Symbol != "N·m" {
		t.Error("Nm is no torque")
	}
}
