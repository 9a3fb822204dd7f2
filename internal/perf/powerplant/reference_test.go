package powerplant_test

import (
	"math"
	"testing"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/reference"
)

// bare is an engine of the power in W on a constant-speed propeller, without losses.
func bare(power, criticalAltitude float64) func(*powerplant.PistonPropeller) {
	return func(p *powerplant.PistonPropeller) {
		constantSpeed(p)
		e := &p.Engine
		e.RatedPower, e.CriticalAltitude, e.InstallationLoss, e.AccessoryPower, e.IdleFlow = power, criticalAltitude, 0, 0, 0
	}
}

// full is the shaft power in W at full throttle.
func full(t *testing.T, p powerplant.Powerplant, d atmos.Day, hp float64) float64 {
	t.Helper()
	out, err := p.Run(condition(t, d, hp, 40), 1, nil)
	if err != nil {
		t.Fatal(err)
	}
	return out.Shaft.Power
}

func TestPublishedLapse(t *testing.T) {
	p := build(t, piston(bare(100e3, 0)))
	for _, row := range reference.Read(t, "piston-propeller_lapse") {
		got := full(t, p, atmos.Day{}, row.SI("altitude")) / 100e3
		row.Near("ratio_raymer", got)
		row.Near("ratio_original", got)
	}
	for _, row := range reference.Read(t, "piston-propeller_power") {
		row.Near("power", full(t, build(t, piston(bare(160*745.69987, 0))), atmos.Day{}, row.SI("altitude")))
	}
}

// TestTurbocharged: power is held to the critical altitude and falls above it
// as it does unsupercharged, without a step.
func TestTurbocharged(t *testing.T) {
	rows := reference.Read(t, "piston-propeller_lapse")
	for _, critical := range rows[2:7] {
		p := build(t, piston(bare(100e3, critical.SI("altitude"))))
		for _, row := range rows {
			want := math.Min(1, row.Num("ratio_raymer")/critical.Num("ratio_raymer"))
			// Two printed ratios of six decimals.
			if got := full(t, p, atmos.Day{}, row.SI("altitude")) / 100e3; math.Abs(got-want) > 1e-5 {
				t.Errorf("critical altitude %s ft, at %s ft: ratio %v, want %v", critical.Text("altitude"), row.Text("altitude"), got, want)
			}
		}
	}
}

// TestMeasuredPropeller gives the published propeller an engine that makes, at
// the speed of each published row, the power that the row absorbs: there the
// torque must balance, with the row's thrust.
func TestMeasuredPropeller(t *testing.T) {
	var table [][]float64
	var rows []reference.Row
	for _, row := range reference.Read(t, "propeller_da4002_9x6.75") {
		if row.Text("use") == "node" {
			table, rows = append(table, []float64{row.Num("j"), row.Num("ct"), row.Num("cp")}), append(rows, row)
		}
	}
	const d = 9 * 0.0254
	rho := condition(t, atmos.Day{}, 0, 0).Air.Density
	for i, row := range rows {
		n := row.SI("speed")
		m := piston(bare(row.Num("cp")*rho*math.Pow(n, 3)*math.Pow(d, 5), 0))
		m.Propeller.Kind, m.Propeller.Diameter, m.Propeller.Coefficients = powerplant.FixedPitch, d, table
		m.Engine.RatedSpeed, m.Engine.Redline = n, 2*n
		out, err := build(t, m).Run(condition(t, atmos.Day{}, 0, row.Num("j")*n*d), 1, nil)
		if err != nil {
			t.Fatal(err)
		}
		want := row.Num("ct") * rho * n * n * math.Pow(d, 4)
		// The root is found to 1e-12; near zero thrust the coefficient magnifies it. The last row is where idling begins.
		if math.Abs(out.Shaft.Speed/n-1) > 1e-9 || math.Abs(out.Thrust-want) > 1e-8 || (out.Limits != 0 && i < len(rows)-1) {
			t.Errorf("%s: %v rpm, %v N, limits %b; want %v N", row, out.Shaft.Speed*60, out.Thrust, out.Limits, want)
		}
		row.Near("efficiency", out.Shaft.Efficiency)
	}
	for _, row := range reference.Read(t, "piston-propeller_static") {
		m := piston(bare(row.SI("power"), 0))
		m.Propeller.Kind, m.Propeller.Diameter, m.Propeller.Coefficients = powerplant.FixedPitch, d, table
		m.Engine.RatedSpeed, m.Engine.Redline = row.SI("rated_speed"), 2*row.SI("rated_speed")
		out, err := build(t, m).Run(condition(t, atmos.Day{}, 0, 0), 1, nil)
		if err != nil {
			t.Fatal(err)
		}
		row.Near("speed", out.Shaft.Speed)
		row.Near("thrust", out.Thrust)
	}
}
