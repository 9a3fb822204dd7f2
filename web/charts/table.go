package charts

import (
	"math"
	"slices"
)

// A Table is the data behind a chart. Cells are plain ASCII numbers without
// separators between thousands, so that they serve CSV as well; an en dash
// stands where a series has no value. The headers carry the units.
type Table struct {
	Caption string
	Header  []string
	Rows    [][]string
}

// maxRows bounds the table to what a person reads; longer data is resampled.
const maxRows = 30

// Table returns the values of every series over one common column of x.
func (c Chart) Table() Table {
	c = c.withDefaults()
	f := &frame{chart: c}
	f.readCurves()
	t := Table{Caption: c.Title, Header: []string{heading(f.xName(), f.xUnit())}}
	var curves []curve
	var decimals []int
	for _, p := range f.panels {
		for i, s := range p.spec.Series {
			t.Header = append(t.Header, heading(s.Name, s.Unit))
			curves = append(curves, p.data[i])
			decimals = append(decimals, s.Decimals)
		}
	}
	xs, finest := tableX(curves, c.X.Format)
	digits := digitsFor(xs, finest)
	for _, x := range xs {
		row := []string{plainNumber(x, digits)}
		if c.X.Format == "hm" {
			row[0] = clock(x)
		}
		for i, cv := range curves {
			cell := noValue
			if y, ok := cv.at(x); ok {
				cell = plainNumber(y, decimals[i])
			}
			row = append(row, cell)
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// digitsFor returns the fewest digits after the point that show every x to within the
// finest difference that matters.
func digitsFor(xs []float64, finest float64) int {
	most := decimalsFor(finest)
	for d := range most {
		unit := math.Pow(10, -float64(d))
		exact := func(x float64) bool { return math.Abs(x-math.Round(x/unit)*unit) < finest/2 }
		if !slices.ContainsFunc(xs, func(x float64) bool { return !exact(x) }) {
			return d
		}
	}
	return most
}

// tableX returns the distinct x of all curves, or round values between their ends if
// there are too many, and the finest difference that the column has to show.
func tableX(curves []curve, format string) (xs []float64, finest float64) {
	for _, c := range curves {
		for _, run := range c {
			for _, p := range run {
				xs = append(xs, p.x)
			}
		}
	}
	slices.Sort(xs)
	xs = slices.Compact(xs)
	if len(xs) <= 1 {
		return xs, 0.001
	}
	lo, hi := xs[0], xs[len(xs)-1]
	if len(xs) <= maxRows {
		step := hi - lo
		for i := 1; i < len(xs); i++ {
			step = min(step, xs[i]-xs[i-1])
		}
		// One digit finer than the closest neighbours, and not finer than 1/100 000 of the range.
		return xs, max(step/10, (hi-lo)/1e5)
	}
	step := tickStep((hi-lo)/(maxRows-4), format)
	xs = []float64{lo}
	for i := math.Ceil(lo/step + 1e-6); i*step < hi-1e-6*step && len(xs) < maxRows-1; i++ {
		xs = append(xs, i*step)
	}
	return append(xs, hi), step / 10
}
