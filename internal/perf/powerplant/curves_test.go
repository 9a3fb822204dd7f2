package powerplant_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/powerplant"
)

func curves(t interface {
	Helper()
	Fatal(...any)
}, m powerplant.Model) powerplant.Curves {
	t.Helper()
	p, err := m.Build()
	if err != nil {
		t.Fatal(err)
	}
	c, ok := p.(powerplant.Curves)
	if !ok {
		t.Fatal("a piston engine on a propeller shows no curves")
	}
	return c
}

// TestCurvesBalance: at full setting the propeller takes what the curve says the
// engine offers at that speed, or less where the redline holds it.
func TestCurvesBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawPiston(t)
		c := curves(t, m)
		at := drawCondition(t, m)
		out, err := c.(powerplant.Powerplant).Run(at, 1, nil)
		if err != nil || out.Limits&powerplant.Idling != 0 {
			return
		}
		offered, taken := c.FullPower(&at.Air, out.Shaft.EngineSpeed), out.Shaft.Power
		if out.Limits&powerplant.SpeedLimited != 0 {
			if taken > offered*(1+1e-9) {
				t.Fatalf("held at the redline it takes %v W of %v", taken, offered)
			}
			return
		}
		if math.Abs(offered-taken) > 1e-7*m.Engine.RatedPower {
			t.Fatalf("it takes %v W, the curve offers %v", taken, offered)
		}
	})
}

// TestCurvesOfTable: the coefficients at the rows as entered are those entered, and none stand beyond.
func TestCurvesOfTable(t *testing.T) {
	m := piston(nil)
	c := curves(t, m)
	f := c.Propeller()
	rows := m.Propeller.Coefficients
	// CP stays positive to the end, so every row is within reach.
	if len(f.Given) != len(rows) || f.Low != 0 || f.High != 1 || f.Governed != 0 || f.Loss != 0 {
		t.Fatalf("facts %+v", f)
	}
	for i, r := range rows {
		ct, cp, known := c.Coefficients(f.Given[i])
		if !known || f.Given[i] != r[0] || math.Abs(ct-r[1]) > 1e-15 || math.Abs(cp-r[2]) > 1e-15 {
			t.Errorf("row %d: J %v gives %v, %v, %v; entered %v", i, f.Given[i], ct, cp, known, r)
		}
	}
	for _, j := range []float64{-0.01, 1.001, math.NaN()} {
		if _, _, known := c.Coefficients(j); known {
			t.Errorf("J %v is said to be known", j)
		}
	}
	if _, _, known := curves(t, piston(constantSpeed)).Coefficients(0.5); known {
		t.Error("a disc is said to have coefficients")
	}
	m.Propeller.Coefficients[len(rows)-1][2] = -0.002
	if f := curves(t, m).Propeller(); len(f.Given) != len(rows)-1 || f.High >= 1 || f.High <= 0.96 {
		t.Errorf("with power turning negative at the end: %+v", f)
	}
}

// TestEngineFacts holds the facts against the inputs and the lapse against its closed form.
func TestEngineFacts(t *testing.T) {
	e := curves(t, piston(nil)).Engine()
	if e.RatedPower != 75e3 || e.RatedSpeed != 45 || e.Greatest != 46 || e.Lowest != 0 || e.GearRatio != 1 {
		t.Errorf("by rating: %+v", e)
	}
	e = curves(t, piston(tables)).Engine()
	if e.RatedPower != 76e3 || e.RatedSpeed != 46 || e.Lowest != 30 {
		t.Errorf("by table: %+v", e)
	}
	geared := func(p *powerplant.PistonPropeller) {
		p.Engine.GearRatio, p.Engine.RatedSpeed, p.Engine.Redline, p.Engine.InstallationLoss, p.Engine.AccessoryPower = 2.4, 92, 97, 0, 0
	}
	c := curves(t, piston(geared))
	at := func(hp float64) float64 {
		a := condition(t, atmos.Day{}, hp, 0).Air
		return c.FullPower(&a, 46)
	}
	if got := at(0); math.Abs(got-75e3*46/92) > 1 {
		t.Errorf("half the rated speed offers %v W", got)
	}
	// 3000 m on the standard day: density ratio 0.7422 (U.S. Standard Atmosphere, 1976).
	if got, want := at(3000)/at(0), 0.7422-(1-0.7422)/7.55; math.Abs(got-want) > 1e-4 {
		t.Errorf("at 3000 m it offers %v of sea level, want %v", got, want)
	}
	c = curves(t, piston(turbocharged))
	if low, crit, high := at(0), at(4000), at(4500); math.Abs(crit/low-1) > 1e-9 || high > 0.99*low {
		t.Errorf("turbocharged to 4000 m: %v, %v, %v W", low, crit, high)
	}
}
