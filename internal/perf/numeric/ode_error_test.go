package numeric

import (
	"errors"
	"math"
	"strings"
	"testing"
)

var errWall = errors.New("beyond the wall")

// TestDerivsErrorHalves: y' = 1 refused at y > 2. The integration creeps up to
// the wall and returns what it has with the cause.
func TestDerivsErrorHalves(t *testing.T) {
	f := func(_ float64, y, dydt []float64) error {
		if y[0] > 2 {
			return errWall
		}
		dydt[0] = 1
		return nil
	}
	s, err := Integrate(f, 0, []float64{0}, 10, Options{})
	var e *StepError
	if !errors.Is(err, errWall) || !errors.As(err, &e) || e.T0 != 0 || e.T1 != 10 {
		t.Fatalf("error %v", err)
	}
	end, y := s.End()
	if end > 2 || end < 2-1e-9 || e.T != end || math.Abs(y[0]-end) > 1e-12 {
		t.Errorf("ended at %.15g with %v, error says %.15g", end, y, e.T)
	}
	if s.Evaluations > 1500 || s.Rejected < 20 {
		t.Errorf("%d evaluations, %d rejected", s.Evaluations, s.Rejected)
	}
	if want := "integration from 0 to 10 ended at 2: beyond the wall"; err.Error() != want {
		t.Errorf("message %q, want %q", err, want)
	}
}

// TestDerivsErrorPassed: a refusal of long trial steps only is got over.
func TestDerivsErrorPassed(t *testing.T) {
	refused := 0
	f := func(x float64, y, dydt []float64) error {
		if y[0] < 0.5*math.Exp(-x) { // only a coarse stage falls so far
			refused++
			return errWall
		}
		return decay(x, y, dydt)
	}
	s := mustIntegrate(t, f, 0, []float64{1}, 6, Options{InitialStep: 6})
	_, y := s.End()
	if refused == 0 || s.Rejected == 0 || math.Abs(y[0]-math.Exp(-6)) > 1e-9 {
		t.Errorf("%d refusals, %d rejected, end %v", refused, s.Rejected, y)
	}
}

func TestIntegrateErrors(t *testing.T) {
	nan := math.NaN()
	one := []float64{1}
	root := func(_ float64, y, dydt []float64) error { dydt[0] = -1 / math.Sqrt(y[0]); return nil }
	blowUp := func(_ float64, y, dydt []float64) error { dydt[0] = y[0] * y[0]; return nil }
	pole := func(x float64, _, dydt []float64) error { dydt[0] = 1 / (1 - x) / (1 - x); return nil }
	ramp := func(_ float64, _, dydt []float64) error { dydt[0] = 1; return nil }
	square := func(_ float64, y, dydt []float64) error { dydt[0] = math.Sqrt(y[0]); return nil }
	watch := func(g func(float64) float64) Options {
		return Options{Events: []Event{{Name: "log", G: func(x float64, _ []float64) float64 { return g(x) }}}}
	}
	always := func(float64, []float64, []float64) error { return errWall }
	overflow := func(_ float64, y, dydt []float64) error {
		if math.IsInf(y[0], 0) {
			t.Error("f was handed an infinite state")
		}
		dydt[0] = 1e307
		return nil
	}
	for _, c := range []struct {
		name   string
		f      Derivs
		t0     float64
		y0     []float64
		t1     float64
		opt    Options
		want   error
		lo, hi float64 // where it ends
	}{
		{"backwards", decay, 3, one, 2, Options{}, ErrInterval, 3, 3},
		{"NaN time", decay, 3, one, nan, Options{}, ErrNotFinite, 3, 3},
		{"infinite time", decay, 3, one, math.Inf(1), Options{}, ErrNotFinite, 3, 3},
		{"NaN state, not looked at", ramp, 3, []float64{nan}, 4, Options{}, ErrNotFinite, 3, 3},
		{"NaN derivative at once", square, 3, []float64{-1}, 4, Options{}, ErrNotFinite, 3, 3},
		{"NaN state", decay, 3, []float64{nan}, 4, Options{}, ErrNotFinite, 3, 3},
		{"refused at once", always, 3, one, 4, Options{}, errWall, 3, 3},
		{"NaN derivative", root, 0, one, 4, Options{}, ErrNotFinite, 0.66, 0.6667},
		{"blow up", blowUp, 0, one, 4, Options{}, ErrNotFinite, 0.999999, 1.000001},
		{"pole", pole, 0, one, 4, Options{}, ErrNoConvergence, 0.999999, 1},
		{"overflow", overflow, 0, []float64{1e300}, 100, Options{}, ErrNotFinite, 17.976, 17.977},
		{"steps", oscillator, 0, []float64{1, 0}, 1e4, Options{MaxSteps: 50}, ErrNoConvergence, 1, 100},
		{"NaN event", decay, 0, one, 4, watch(func(x float64) float64 { return math.Sqrt(2 - x) }), ErrNotFinite, 0, 4},
		{"NaN event at start", decay, 0, one, 4, watch(func(float64) float64 { return nan }), ErrNotFinite, 0, 0},
	} {
		s, err := Integrate(c.f, c.t0, c.y0, c.t1, c.opt)
		var e *StepError
		if !errors.Is(err, c.want) || !errors.As(err, &e) || s == nil {
			t.Errorf("%s: %v, want %v", c.name, err, c.want)
			continue
		}
		if end, _ := s.End(); end < c.lo || end > c.hi || e.T != end {
			t.Errorf("%s: ended at %.12g, error says %.12g, want %g to %g", c.name, end, e.T, c.lo, c.hi)
		}
		if s.Accepted+s.Rejected > 10000 {
			t.Errorf("%s: %d steps", c.name, s.Accepted+s.Rejected)
		}
		if c.hi == c.t0 && s.Rejected > 0 || !allFinite(c.y0) && s.Evaluations > 0 {
			t.Errorf("%s: %d steps tried, %d evaluations from a hopeless start", c.name, s.Rejected, s.Evaluations)
		}
		if strings.Contains(c.name, "event") && !strings.Contains(err.Error(), "event log") {
			t.Errorf("%s: %v does not name the event", c.name, err)
		}
	}
}

func TestOptionPanics(t *testing.T) {
	for name, opt := range map[string]Options{
		"negative RelTol":  {RelTol: -1},
		"NaN RelTol":       {RelTol: math.NaN()},
		"negative MaxStep": {MaxStep: -1},
		"negative first":   {InitialStep: -1},
		"negative steps":   {MaxSteps: -1},
		"AbsTol length":    {AbsTol: []float64{1, 1}},
		"AbsTol zero":      {AbsTol: []float64{0}},
		"event without G":  {Events: []Event{{}}},
		"event direction":  {Events: []Event{{Direction: 2, G: func(float64, []float64) float64 { return 0 }}}},
	} {
		wantPanic(t, name, func() { Integrate(decay, 0, []float64{1}, 1, opt) })
	}
	wantPanic(t, "empty state", func() { Integrate(decay, 0, nil, 1, Options{}) })
}
