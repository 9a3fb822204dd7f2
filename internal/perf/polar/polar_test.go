package polar_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/reference"
)

func TestPublishedPolar(t *testing.T) {
	p := polar.Parabolic(0.015, 0.08, 0)
	for _, row := range reference.Read(t, "drag_polar_anderson") {
		row.Near("cd", p.CD(row.Num("cl"), 1, nil))
	}
}

// draw is a random parabola, configured.
func draw(t *rapid.T) (p polar.Polar, cdMin, k, clMin, dCD, dCL float64) {
	cdMin = rapid.Float64Range(0.003, 0.5).Draw(t, "cdMin")
	k = polar.InducedFactor(rapid.Float64Range(2, 40).Draw(t, "aspect"), rapid.Float64Range(0.2, 1.5).Draw(t, "e"), nil)
	clMin = rapid.Float64Range(-0.5, 1).Draw(t, "clMin")
	dCD = rapid.Float64Range(0, 0.5).Draw(t, "dCD")
	dCL = rapid.Float64Range(-0.5, 1.5).Draw(t, "dCL")
	return polar.Parabolic(cdMin, k, clMin).Configured(dCD, dCL), cdMin, k, clMin, dCD, dCL
}

var lifts = rapid.Float64Range(-3, 5)

func TestParabola(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p, cdMin, k, clMin, dCD, dCL := draw(t)
		at := clMin + dCL
		if got := p.CD(at, 1, nil); math.Abs(got-(cdMin+dCD)) > 1e-12 || math.Abs(p.Minimum()-got) > 1e-12 {
			t.Fatalf("minimum %v, CD there %v, want %v", p.Minimum(), got, cdMin+dCD)
		}
		cl := lifts.Draw(t, "cl")
		want := cdMin + dCD + k*(cl-at)*(cl-at)
		if got := p.CD(cl, 1, nil); math.Abs(got-want) > 1e-12*want || got < p.Minimum() {
			t.Fatalf("CD(%v) = %v, want %v", cl, got, want)
		}
		// Symmetric about the minimum.
		if a, b := p.CD(at+0.3, 1, nil), p.CD(at-0.3, 1, nil); math.Abs(a-b) > 1e-12 {
			t.Fatalf("CD %v above the minimum's CL, %v below", a, b)
		}
	})
}

func TestSlope(t *testing.T) {
	table, err := polar.Tabulated([]float64{-1, 0, 0.3, 0.8, 1.2, 1.8}, []float64{0.07, 0.03, 0.028, 0.05, 0.09, 0.21})
	if err != nil {
		t.Fatal(err)
	}
	shifted := table.Configured(0.02, 0.15)
	parabola := polar.Parabolic(0.03, 0.06, 0.1).Configured(0.01, 0.1)
	for name, p := range map[string]*polar.Polar{"table": &table, "shifted table": &shifted, "parabola": &parabola} {
		for _, cl := range []float64{-0.45, 0.05, 0.37, 0.71, 1.07, 1.61} {
			// A central difference over 2e-6 is good to the third derivative times 1e-12 and rounding of 1e-10.
			const h = 1e-6
			want := (p.CD(cl+h, 1, nil) - p.CD(cl-h, 1, nil)) / (2 * h)
			if got := p.Slope(cl); math.Abs(got-want) > 1e-8 {
				t.Errorf("%s: slope at CL %v is %v, difference gives %v", name, cl, got, want)
			}
		}
	}
}

func TestTable(t *testing.T) {
	cl, cd := []float64{-0.2, 0.1, 0.5, 1, 1.5}, []float64{0.038, 0.034, 0.043, 0.08, 0.144}
	p, err := polar.Tabulated(cl, cd)
	if err != nil {
		t.Fatal(err)
	}
	q := p.Configured(0.02, 0.1)
	for i := range cl {
		if got := p.CD(cl[i], 1, nil); math.Abs(got-cd[i]) > 1e-15 {
			t.Errorf("CD(%v) = %v, want the row's %v", cl[i], got, cd[i])
		}
		if got := q.CD(cl[i]+0.1, 1, nil); math.Abs(got-cd[i]-0.02) > 1e-12 {
			t.Errorf("configured CD(%v) = %v, want %v", cl[i]+0.1, got, cd[i]+0.02)
		}
	}
	if p.Minimum() != 0.034 || math.Abs(q.Minimum()-0.054) > 1e-15 {
		t.Errorf("minimum %v, configured %v", p.Minimum(), q.Minimum())
	}
	if got, want := p.CD(0.5, 0.5, nil), 0.034+0.5*(0.043-0.034); math.Abs(got-want) > 1e-15 {
		t.Errorf("half the lift-dependent drag: %v, want %v", got, want)
	}
	if _, err := polar.Tabulated([]float64{0, 0}, []float64{0.1, 0.2}); err == nil || !strings.Contains(err.Error(), "drag polar") || !strings.Contains(err.Error(), "point 2") {
		t.Errorf("rows out of order: %v", err)
	}
}

func TestTableStaysInRange(t *testing.T) {
	p, err := polar.Tabulated([]float64{-0.2, 0.1, 0.5, 1, 1.5}, []float64{0.038, 0.034, 0.043, 0.08, 0.144})
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(-0.2, 1.5).Draw(t, "cl")
		phi := rapid.Float64Range(0, 1).Draw(t, "phi")
		got := p.CD(x, phi, nil)
		if !(got >= p.Minimum() && got <= 0.144+1e-15 && got <= p.CD(x, 1, nil)+1e-15) {
			t.Fatalf("CD(%v, %v) = %v leaves the table's range", x, phi, got)
		}
	})
}

// TestConfiguredLeavesTheOriginal: configurations of one aircraft share a base.
func TestConfiguredLeavesTheOriginal(t *testing.T) {
	base := polar.Parabolic(0.03, 0.05, 0)
	_ = base.Configured(0.1, 0.5)
	if got := base.CD(0.5, 1, nil); math.Abs(got-0.0425) > 1e-15 {
		t.Errorf("the base's CD became %v", got)
	}
}

func TestGroundEffect(t *testing.T) {
	if got := polar.GroundEffect(0.1*10, 10, nil); math.Abs(got-2.56/3.56) > 1e-12 {
		t.Errorf("at a tenth of the span %v, want 2.56/3.56", got)
	}
	if got := polar.GroundEffect(0, 10, nil); got != 0 {
		t.Errorf("on the ground plane %v, want 0", got)
	}
	if got := polar.GroundEffect(1000, 10, nil); math.Abs(got-1) > 1e-6 {
		t.Errorf("at a hundred spans %v, want 1", got)
	}
	rapid.Check(t, func(t *rapid.T) {
		h, b := rapid.Float64Range(0.02, 10).Draw(t, "h"), rapid.Float64Range(0.2, 80).Draw(t, "b")
		low, high := polar.GroundEffect(h, b, nil), polar.GroundEffect(1.1*h, b, nil)
		if !(low > 0 && high > low && high < 1) {
			t.Fatalf("factor %v at %v m, %v a tenth higher", low, h, high)
		}
		p, _, _, _, _, _ := draw(t)
		cl := lifts.Draw(t, "cl")
		if near, far := p.CD(cl, low, nil), p.CD(cl, 1, nil); near > far || near < p.Minimum() {
			t.Fatalf("CD %v near the ground, %v away, minimum %v", near, far, p.Minimum())
		}
	})
}

func TestWorking(t *testing.T) {
	record := formulatest.Record{}
	table, err := polar.Tabulated([]float64{-3, 0, 5}, []float64{0.2, 0.03, 0.5})
	if err != nil {
		t.Fatal(err)
	}
	rapid.Check(t, func(t *rapid.T) {
		var w formula.Working
		polar.InducedFactor(rapid.Float64Range(2, 40).Draw(t, "aspect"), rapid.Float64Range(0.2, 1.5).Draw(t, "e"), &w)
		phi := polar.GroundEffect(rapid.Float64Range(0.02, 10).Draw(t, "h"), rapid.Float64Range(0.2, 80).Draw(t, "b"), &w)
		p, _, _, _, dCD, dCL := draw(t)
		p.CD(lifts.Draw(t, "cl"), phi, &w)
		q := table.Configured(dCD, dCL)
		q.CD(lifts.Draw(t, "cl in table"), phi, &w)
		if len(w.Steps) != 4 {
			t.Fatalf("%d steps", len(w.Steps))
		}
		record.Check(t, w)
		givenWorking(t, record)
	})
	record.Complete(t)
}

func TestNoAllocation(t *testing.T) {
	p := polar.Parabolic(0.03, 0.05, 0.1)
	sum := 0.0
	if n := testing.AllocsPerRun(100, func() {
		sum += p.CD(0.4, polar.GroundEffect(1, 9, nil), nil) + polar.InducedFactor(7, 0.8, nil)
	}); n != 0 {
		t.Errorf("%v allocations without a working", n)
	}
}

func ExampleParabolic() {
	k := polar.InducedFactor(7.4, 0.77, nil)
	p := polar.Parabolic(0.034, k, 0)
	cl := math.Sqrt(p.Minimum() / k)
	fmt.Printf("best L/D %.1f at CL %.2f\n", cl/p.CD(cl, 1, nil), cl)
	// Output: best L/D 11.5 at CL 0.78
}
