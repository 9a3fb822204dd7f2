package polar

import (
	"errors"
	"math"
)

// ErrNoFit reports points through which no parabola is determined.
var ErrNoFit = errors.New("a parabola needs three points of different CL")

// A Fitted is the parabola nearest to points.
type Fitted struct {
	Parabola
	RMS   float64 // root mean square of the differences in CD, dimensionless
	Worst float64 // greatest difference in CD, dimensionless
}

// Fit is the parabola CD = a + b CL + c CL² with the least sum of squared
// differences in CD at the points (cl, cd), all of equal weight. It is found by
// projecting on polynomials that are orthogonal over the points: G. E. Forsythe,
// Generation and use of orthogonal polynomials for data-fitting with a digital
// computer, Journal of SIAM 5 (1957) 74-88, from memory. K is negative where the
// points bend downwards.
func Fit(cl, cd []float64) (Fitted, error) {
	n := float64(len(cl))
	if len(cl) < 3 || len(cd) != len(cl) {
		return Fitted{}, ErrNoFit
	}
	mean := 0.0
	for _, x := range cl {
		mean += x / n
	}
	// p1 = x − mean, p2 = (x − mean − shift) p1 − spread.
	var square, cube float64
	for _, x := range cl {
		d := x - mean
		square += d * d
		cube += d * d * d
	}
	if !(square > 0) {
		return Fitted{}, ErrNoFit
	}
	shift, spread := cube/square, square/n
	var a0, a1, a2, norm float64
	for i, x := range cl {
		d := x - mean
		p2 := (d-shift)*d - spread
		a0 += cd[i] / n
		a1 += cd[i] * d / square
		a2 += cd[i] * p2
		norm += p2 * p2
	}
	if !(norm > 1e-24*square*square) {
		return Fitted{}, ErrNoFit
	}
	a2 /= norm
	return residuals(parabolaOf(a0-a2*spread, a1-a2*shift, a2, mean), cl, cd), nil
}

// parabolaOf is the parabola a + b d + c d² in d = CL − mean.
func parabolaOf(a, b, c, mean float64) Parabola {
	const least = 1e-12 // of the curvature, so that a straight line still has a number to be refused for
	if math.Abs(c) < least {
		c = math.Copysign(least, c)
	}
	return Parabola{CDMin: a - b*b/(4*c), K: c, CLMinDrag: mean - b/(2*c)}
}

func residuals(p Parabola, cl, cd []float64) Fitted {
	f := Fitted{Parabola: p}
	sum := 0.0
	for i, x := range cl {
		d := math.Abs(cd[i] - p.CD(x))
		sum += d * d
		f.Worst = math.Max(f.Worst, d)
	}
	f.RMS = math.Sqrt(sum / float64(len(cl)))
	return f
}
