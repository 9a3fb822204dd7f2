package numeric

import "math"

const (
	epsilon = 0x1p-52 // spacing of float64 numbers at 1

	// maxEvaluations bounds one refinement. The worst functions known here need
	// about 80; the bound turns a defect into an error, not an endless loop.
	maxEvaluations = 500

	// zeroFloor times the larger bound is the magnitude below which x counts
	// as zero: a purely relative tolerance would never be met by a root at 0.
	zeroFloor = 1e-6
)

// tolerance is an allowed error in x.
type tolerance struct {
	relative float64 // dimensionless, > 0
	absolute float64 // in the unit of x, >= 0
}

// relativeTolerance reads the tol argument of the public searches of [a, b].
func relativeTolerance(tol, byDefault, a, b float64) tolerance {
	if !(tol >= 0) {
		panic("numeric: tolerance is negative or NaN")
	}
	if tol == 0 {
		tol = byDefault
	}
	tol = math.Max(tol, 4*epsilon)
	return tolerance{relative: tol, absolute: tol * zeroFloor * math.Max(math.Abs(a), math.Abs(b))}
}

func (t tolerance) at(x float64) float64 {
	return math.Max(t.relative*math.Abs(x), t.absolute)
}

// node returns boundary i of n equal cells of [a, b]; nodes 0 and n are exact.
func node(a, b float64, i, n int) float64 {
	if i == n {
		return b
	}
	return a + (b-a)*(float64(i)/float64(n))
}
