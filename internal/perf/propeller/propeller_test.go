package propeller_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/propeller"
	"legwright/internal/perf/reference"
)

const inch = 0.0254

// measured is the published propeller and the rows that make it; the rest of
// the file are rows of a second run, held out.
func measured(t *testing.T) (p *propeller.Fixed, nodes, held []reference.Row) {
	t.Helper()
	var table [][]float64
	for _, row := range reference.Read(t, "propeller_da4002_9x6.75") {
		if row.Text("use") == "held out" {
			held = append(held, row)
			continue
		}
		nodes = append(nodes, row)
		table = append(table, []float64{row.Num("j"), row.Num("ct"), row.Num("cp")})
	}
	p, err := propeller.NewFixed(9*inch, table)
	if err != nil {
		t.Fatal(err)
	}
	if len(nodes) < 20 || len(held) < 3 {
		t.Fatalf("%d rows of the table, %d held out", len(nodes), len(held))
	}
	return p, nodes, held
}

func TestMeasuredPropeller(t *testing.T) {
	p, nodes, held := measured(t)
	rho := atmos.SeaLevelDensity
	for _, row := range nodes {
		j, n := row.Num("j"), row.SI("speed")
		v := j * n * p.Diameter
		thrust, power := p.Thrust(rho, v, n, nil), p.Power(rho, v, n, nil)
		d := p.Diameter
		if want := row.Num("ct") * rho * n * n * math.Pow(d, 4); math.Abs(thrust-want) > 1e-9*math.Abs(want) {
			t.Errorf("%s: thrust %v N, want %v", row, thrust, want)
		}
		if want := row.Num("cp") * rho * math.Pow(n, 3) * math.Pow(d, 5); math.Abs(power-want) > 1e-9*want {
			t.Errorf("%s: power %v W, want %v", row, power, want)
		}
		row.Near("efficiency", propeller.Efficiency(thrust, v, power, nil))
	}
	for _, row := range held {
		row.Near("ct", p.CT(row.Num("j")))
		row.Near("cp", p.CP(row.Num("j")))
	}
	if low, high := p.Range(); low != 0 || high != 0.914534 || !p.Windmills() {
		t.Errorf("range %v to %v, windmills %v", low, high, p.Windmills())
	}
}

func TestPowerThroughZero(t *testing.T) {
	rows := [][]float64{{0, 0.1, 0.05}, {0.5, 0.06, 0.04}, {0.8, 0, 0.01}, {1, -0.04, -0.02}}
	p, err := propeller.NewFixed(1.8, rows)
	if err != nil {
		t.Fatal(err)
	}
	_, high := p.Range()
	if cp := p.CP(high); !(high > 0.8 && high < 1) || math.Abs(cp) > 1e-9 {
		t.Errorf("the useful range ends at J %v, where CP is %v", high, cp)
	}
	if _, err := propeller.NewFixed(1.8, [][]float64{{0, 0, -0.05}, {0.5, -0.06, -0.04}, {0.8, -0.1, -0.01}}); err == nil || !strings.Contains(err.Error(), "never pass through zero") {
		t.Errorf("negative power throughout: %v", err)
	}
	for _, c := range []struct {
		rows [][]float64
		want string
	}{
		{[][]float64{{0, 0.1, 0.05}, {0, 0.06, 0.04}}, "thrust coefficients: table point 2"},
		{[][]float64{{0, 0.1, 0.05}}, "at least two points"},
		{[][]float64{{0, 0.1, math.NaN()}, {1, 0.1, 0.1}}, "power coefficients: table point 1"},
		{[][]float64{{0, 0.1, 0.05}, {0.5, 0.06, 0.02}, {0.8, 0, 0.01}}, "row 2 has an efficiency of 1.50, which is above 1"},
		{[][]float64{{0, 0.1, 0.02}, {0.5, 0.03, 0.02}, {0.8, 0, 0.01}}, "row 1 has more thrust than momentum theory allows"},
		{[][]float64{{0, 0.1, 0.05}, {0.5, 0.03, -0.02}, {0.8, 0, 0.01}}, "row 2 gives thrust without taking power"},
	} {
		if _, err := propeller.NewFixed(1.8, c.rows); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v: %v, want %q", c.rows, err, c.want)
		}
	}
	e := &propeller.RangeError{J: 1.2345, Low: 0, High: 1}
	if e.Error() != "an advance ratio of 1.234 lies outside the propeller table, 0.000 to 1.000" && e.Error() != "an advance ratio of 1.235 lies outside the propeller table, 0.000 to 1.000" {
		t.Errorf("%v", e)
	}
}

func TestMomentum(t *testing.T) {
	for _, row := range reference.Read(t, "momentum_disc") {
		d := propeller.Disc{Diameter: row.SI("diameter"), Loss: 1}
		rho, v, power, thrust := row.SI("density"), row.SI("speed"), row.SI("power"), row.SI("thrust")
		row.Near("thrust", d.Thrust(rho, v, power, nil))
		row.Near("power", d.Power(rho, v, thrust, nil))
		if row.Text("case") == "static" {
			row.Near("thrust", propeller.StaticBound(rho, d.Diameter, power, nil))
			row.Near("induced_speed", math.Sqrt(d.Thrust(rho, 0, power, nil)/(2*rho*propeller.Area(d.Diameter))))
		} else {
			row.Near("efficiency", propeller.Efficiency(thrust, v, d.Power(rho, v, thrust, nil), nil))
		}
	}
}

func TestTipMach(t *testing.T) {
	for _, row := range reference.Read(t, "propeller_tip_mach") {
		row.Near("tip_mach", propeller.TipMach(row.SI("tas"), row.SI("speed"), row.SI("diameter"), atmos.SeaLevelSoundSpeed, nil))
	}
}

// drawn is a disc at random work.
type drawn struct {
	propeller.Disc
	rho, v, p float64
}

func draw(t *rapid.T) drawn {
	return drawn{
		propeller.Disc{Diameter: rapid.Float64Range(0.05, 6).Draw(t, "diameter"), Loss: rapid.Float64Range(0.6, 0.95).Draw(t, "loss")},
		rapid.Float64Range(0.01, 1.5).Draw(t, "rho"), rapid.Float64Range(0, 250).Draw(t, "v"), rapid.Float64Range(0.1, 3e6).Draw(t, "p"),
	}
}

func TestDisc(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := draw(t)
		thrust := d.Thrust(d.rho, d.v, d.p, nil)
		if !(thrust > 0) || math.IsInf(thrust, 0) {
			t.Fatalf("thrust %v", thrust)
		}
		// The induced speed at high speed is a small difference, which costs digits.
		if back := d.Power(d.rho, d.v, thrust, nil); math.Abs(back-d.p) > 1e-9*d.p {
			t.Fatalf("%v W gave %v N, which takes %v W", d.p, thrust, back)
		}
		if bound := propeller.StaticBound(d.rho, d.Diameter, d.p, nil); thrust > bound {
			t.Fatalf("thrust %v N above the static bound %v N", thrust, bound)
		}
		if eta := propeller.Efficiency(thrust, d.v, d.p, nil); eta > d.Loss {
			t.Fatalf("efficiency %v above the loss factor %v", eta, d.Loss)
		}
		if faster := d.Thrust(d.rho, d.v+1, d.p, nil); faster >= thrust {
			t.Fatalf("thrust rose from %v to %v N with 1 m/s", thrust, faster)
		}
		if stronger := d.Thrust(d.rho, d.v, 1.01*d.p, nil); stronger <= thrust {
			t.Fatalf("thrust fell from %v to %v N with 1 %% more power", thrust, stronger)
		}
	})
}

// TestDiscLimits: at rest the closed form, fast the ideal k P = T V, without power nothing.
func TestDiscLimits(t *testing.T) {
	d := propeller.Disc{Diameter: 1.8, Loss: 0.85}
	static := d.Thrust(1.225, 0, 80e3, nil)
	if want := propeller.StaticBound(1.225, 1.8, 0.85*80e3, nil); math.Abs(static-want) > 1e-12*want {
		t.Errorf("static thrust %v, want %v", static, want)
	}
	if creep := d.Thrust(1.225, 1e-200, 80e3, nil); math.Abs(creep-static) > 1e-12*static {
		t.Errorf("thrust %v at a creep, %v at rest", creep, static)
	}
	if fast := d.Thrust(1.225, 1e6, 80e3, nil); math.Abs(fast-0.085*0.8) > 1e-9 {
		t.Errorf("thrust %v N at 1000 km/s, want kP/V", fast)
	}
	if got := d.Thrust(1.225, 50, 0, nil); got != 0 {
		t.Errorf("thrust %v without power", got)
	}
	if got := d.Power(1.225, 50, 0, nil); got != 0 {
		t.Errorf("power %v without thrust", got)
	}
	if got := propeller.Efficiency(0, 50, 0, nil); got != 0 {
		t.Errorf("efficiency %v without power", got)
	}
}

func TestWorking(t *testing.T) {
	p, _, _ := measured(t)
	record := formulatest.Record{}
	rapid.Check(t, func(t *rapid.T) {
		var w formula.Working
		d := draw(t)
		thrust := d.Thrust(d.rho, d.v, d.p, &w)
		d.Power(d.rho, d.v, thrust, &w)
		propeller.StaticBound(d.rho, d.Diameter, d.p, &w)
		n := rapid.Float64Range(20, 200).Draw(t, "n")
		v := rapid.Float64Range(0, 0.9).Draw(t, "j") * n * p.Diameter
		power := p.Power(d.rho, v, n, &w)
		propeller.Efficiency(p.Thrust(d.rho, v, n, &w), v, power, &w)
		propeller.TipMach(v, n, p.Diameter, 340, &w)
		record.Check(t, w)
	})
	record.Complete(t)
}

func TestNoAllocation(t *testing.T) {
	p, _, _ := measured(t)
	d := propeller.Disc{Diameter: 1.8, Loss: 0.85}
	sum := 0.0
	if n := testing.AllocsPerRun(100, func() {
		sum += p.Thrust(1.2, 10, 80, nil) + p.Power(1.2, 10, 80, nil) + propeller.TipMach(10, 80, 1, 340, nil) + propeller.Efficiency(10, 10, 200, nil)
		sum += d.Thrust(1.2, 50, 7e4, nil) + d.Power(1.2, 50, 1e3, nil) + propeller.StaticBound(1.2, 1.8, 7e4, nil)
	}); n != 0 {
		t.Errorf("%v allocations without a working", n)
	}
}

func ExampleDisc_Thrust() {
	d := propeller.Disc{Diameter: 1.8, Loss: 0.85}
	for _, v := range []float64{0, 30, 60} {
		fmt.Printf("%2.0f m/s: %.0f N\n", v, d.Thrust(1.225, v, 75e3, nil))
	}
	// Output:
	//  0 m/s: 2937 N
	// 30 m/s: 1707 N
	// 60 m/s: 1018 N
}
