package charts

import "math"

// A scale maps one axis to points on the canvas.
type scale struct {
	axis     Axis
	min, max float64 // in display units, min < max
	from, to float64 // canvas coordinates of min and max in points
	step     float64 // between ticks in display units, > 0
	unknown  bool    // neither data nor limits: nothing to tick
}

func (s scale) at(v float64) float64 {
	return s.from + (s.to-s.from)*((v-s.min)/(s.max-s.min))
}

func (s scale) has(v float64) bool { return usable(v) && v >= s.min && v <= s.max }

// ticks returns the multiples of the step within the limits.
func (s scale) ticks() []float64 {
	const most = 60
	if s.unknown {
		return nil
	}
	var t []float64
	first := math.Ceil(s.min/s.step - 1e-9)
	for i := 0; i < most; i++ {
		v := (first + float64(i)) * s.step
		if v > s.max+1e-9*s.step {
			break
		}
		t = append(t, v+0) // + 0 turns a negative zero positive
	}
	return t
}

func (s scale) label(v float64) string {
	if s.axis.Format == "hm" {
		return clock(v)
	}
	return readNumber(v, decimalsFor(s.step))
}

// extent is a growing interval of usable values.
type extent struct {
	lo, hi float64
	some   bool
}

func (e *extent) add(v float64) {
	switch {
	case !usable(v):
	case !e.some:
		e.lo, e.hi, e.some = v, v, true
	default:
		e.lo, e.hi = min(e.lo, v), max(e.hi, v)
	}
}

// newScale chooses the limits of an axis and a step that gives at most about n ticks.
// Limits that come from the data are widened to multiples of a share of the step;
// a share of 0 leaves them where the data ends.
func newScale(a Axis, data extent, n, share float64) scale {
	s := scale{axis: a, min: 0, max: 1}
	given := a.Max > a.Min && usable(a.Min) && usable(a.Max)
	if data.some {
		s.min, s.max = data.lo, data.hi
		if a.Zero {
			s.min, s.max = min(s.min, 0), max(s.max, 0)
		}
	}
	s.unknown = !data.some && !given
	if given {
		s.min, s.max = a.Min, a.Max
	}
	s.min, s.max = spread(s.min, s.max)
	s.step = tickStep((s.max-s.min)/max(n, 1), a.Format)
	if unit := share * s.step; unit > 0 && !given && data.some {
		s.min = math.Floor(s.min/unit+1e-6) * unit
		s.max = math.Ceil(s.max/unit-1e-6) * unit
		s.min, s.max = spread(s.min, s.max)
	}
	return s
}

// spread opens an interval that is too short for its magnitude to be drawn.
func spread(lo, hi float64) (float64, float64) {
	size := max(math.Abs(lo), math.Abs(hi))
	if hi-lo > 1e-9*size && hi-lo > 1e-30 {
		return lo, hi
	}
	d := 0.05 * size
	if size < 1e-20 {
		d = 0.5
	}
	return lo - d, hi + d
}

// clockSteps are the tick distances of a time axis in seconds.
var clockSteps = []float64{60, 120, 300, 600, 900, 1800, 3600, 7200, 10800, 21600, 43200, 86400}

// tickStep returns the smallest agreeable step of at least raw.
func tickStep(raw float64, format string) float64 {
	if format == "hm" {
		for _, s := range clockSteps {
			if s >= raw {
				return s
			}
		}
		return 86400 * tickStep(raw/86400, "")
	}
	mag := math.Pow(10, math.Floor(math.Log10(raw)))
	for _, m := range []float64{1, 2, 5} {
		if m*mag >= raw*(1-1e-9) {
			return m * mag
		}
	}
	return 10 * mag
}
