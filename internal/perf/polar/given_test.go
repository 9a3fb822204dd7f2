package polar_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/numeric"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/reference"
)

// The books' best ratios, both ways.
func TestBestGlideOfTheBook(t *testing.T) {
	for _, row := range reference.Read(t, "anderson_aircraft") {
		p := polar.Parabola{CDMin: row.Num("cd0")}
		span, area := row.SI("span"), row.SI("area")
		if row.Has("k") {
			p.K = row.Num("k")
		} else {
			p.K = polar.InducedFactor(span*span/area, row.Num("e"), nil)
		}
		ratio, cl := p.BestGlide()
		row.Near("best_ratio", ratio)
		if back := polar.OfBestGlide(row.Num("best_ratio"), cl, 0, nil); !p.Near(back, 1e-4) { // the ratio has five figures
			t.Errorf("%s: from the best ratio %+v, want %+v", row, back, p)
		}
	}
}

func drawn(t *rapid.T) polar.Parabola {
	return polar.Parabola{CDMin: rapid.Float64Range(0.003, 0.5).Draw(t, "cdMin"), K: rapid.Float64Range(0.005, 0.8).Draw(t, "k"), CLMinDrag: rapid.Float64Range(-0.5, 1).Draw(t, "clMin")}
}

func TestBestGlide(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawn(t)
		ratio, cl := p.BestGlide()
		if got := cl / p.CD(cl); math.Abs(got-ratio) > 1e-12*ratio {
			t.Fatalf("CL/CD there is %v, the best ratio %v", got, ratio)
		}
		// Found another way: the greatest CL/CD by a search.
		at, err := numeric.Maximum(func(x float64) float64 { return x / p.CD(x) }, 0.01*cl, 4*cl, 1e-9)
		if err != nil || math.Abs(at.X-cl) > 1e-4*cl {
			t.Fatalf("the search finds %v, %v, the closed form %v", at.X, err, cl)
		}
		if back := polar.OfBestGlide(ratio, cl, p.CLMinDrag, nil); !p.Near(back, 1e-10) {
			t.Fatalf("%+v came back as %+v", p, back)
		}
	})
}

// Without a shift: CL = sqrt(CD0/K), E = 1/(2 sqrt(K CD0)).
func TestBestGlideWithoutShift(t *testing.T) {
	ratio, cl := polar.Parabola{CDMin: 0.04, K: 0.04}.BestGlide()
	if math.Abs(cl-1) > 1e-15 || math.Abs(ratio-12.5) > 1e-12 {
		t.Errorf("ratio %v at CL %v, want 12.5 at 1", ratio, cl)
	}
}

func TestFit(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawn(t)
		n := rapid.IntRange(3, 40).Draw(t, "rows")
		cl, cd := make([]float64, n), make([]float64, n)
		x := rapid.Float64Range(-1, 0).Draw(t, "first")
		for i := range cl {
			cl[i], cd[i] = x, p.CD(x)
			x += rapid.Float64Range(0.05, 0.3).Draw(t, "step")
		}
		fit, err := polar.Fit(cl, cd)
		if err != nil || !p.Near(fit.Parabola, 1e-9) || fit.Worst > 1e-12 || fit.RMS > fit.Worst {
			t.Fatalf("%+v fitted as %+v, %v", p, fit, err)
		}
	})
}

// What defines a least-squares fit: the residuals are orthogonal to 1, CL and CL².
func TestFitIsLeastSquares(t *testing.T) {
	cl, cd := []float64{-1, 0, 1, 2, 3.5}, []float64{0.11, 0.088, 0.112, 0.19, 0.44}
	fit, err := polar.Fit(cl, cd)
	if err != nil {
		t.Fatal(err)
	}
	var moments [3]float64
	square := 0.0
	for i, x := range cl {
		r := cd[i] - fit.CD(x)
		square += r * r
		for j := range moments {
			moments[j] += r * math.Pow(x, float64(j))
		}
	}
	for j, m := range moments {
		if math.Abs(m) > 1e-13 {
			t.Errorf("residuals times CL^%d sum to %v", j, m)
		}
	}
	if want := math.Sqrt(square / 5); math.Abs(fit.RMS-want) > 1e-15 || fit.RMS < 1e-4 {
		t.Errorf("RMS %v, want %v", fit.RMS, want)
	}
}

func TestNoFit(t *testing.T) {
	for _, cl := range [][]float64{{}, {0, 1}, {0.3, 0.3, 0.3}, {0, 0, 1, 1}} {
		if fit, err := polar.Fit(cl, make([]float64, len(cl))); !errors.Is(err, polar.ErrNoFit) {
			t.Errorf("%v: %+v, %v", cl, fit, err)
		}
	}
	fit, err := polar.Fit([]float64{0, 0.5, 1}, []float64{0.03, 0.04, 0.05})
	if err != nil || math.IsNaN(fit.CDMin) || math.IsInf(fit.CDMin, 0) || fit.K > 1e-11 {
		t.Errorf("a straight line: %+v, %v", fit, err)
	}
}

func givenWorking(t *rapid.T, record formulatest.Record) {
	var w formula.Working
	polar.FlatPlate(rapid.Float64Range(0.001, 10).Draw(t, "f"), rapid.Float64Range(0.02, 500).Draw(t, "s"), &w)
	m, v, s := rapid.Float64Range(1, 1e4).Draw(t, "m"), rapid.Float64Range(5, 100).Draw(t, "v"), rapid.Float64Range(0.1, 100).Draw(t, "area")
	cl := polar.GlideLift(m, 9.80665, 1.225, v, s, &w)
	polar.StallLift(m, 9.80665, 1.225, v, s, &w)
	polar.OfBestGlide(rapid.Float64Range(1, 60).Draw(t, "ratio"), cl, cl-rapid.Float64Range(0.01, 2).Draw(t, "above"), &w)
	record.Check(t, w)
}
