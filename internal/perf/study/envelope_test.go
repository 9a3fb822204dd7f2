package study_test

import (
	"errors"
	"math"
	"reflect"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// small is an unmanned aircraft of about 3 kg.
func small() *project.Spec {
	s := project.New("Small")
	a := &s.Variants[0].Aircraft
	f := &a.Airframe
	f.WingArea, f.Span, f.WingHeight, f.NeverExceed = 0.5, 2.2, 0.2, 35
	a.Weights.Empty, a.Weights.Items, a.Weights.MaxTakeOff = 2.2, nil, 3.2
	p := a.Powerplant.Model.(*powerplant.PistonPropeller)
	p.Mass, p.Propeller.Diameter = 0.5, 0.28
	e := &p.Engine
	e.RatedPower, e.RatedSpeed, e.Redline, e.AccessoryPower, e.IdleFlow = 200, 120, 125, 1, 5e-6
	p.Fuel.Volume, p.Fuel.Capacity, p.Fuel.Unusable = 4e-4, 5e-4, 1e-5
	return s
}

// envelopes are envelopes of aircraft that fly well, badly and not at all.
func envelopes(t *testing.T) map[string]*study.Envelope {
	t.Helper()
	list := map[string]*study.Envelope{}
	add := func(name string, s *project.Spec, variant int, change func(*study.View)) {
		p := built(t, s)
		v := study.DefaultView(p, variant)
		if change != nil {
			change(&v)
		}
		list[name] = study.Run(p, variant, v).Envelope()
	}
	aviation := project.Demo()
	aviation.Display = string(units.Aviation)
	add("demo", project.Demo(), 0, nil)
	add("other variant", project.Demo(), 1, nil)
	add("aviation", aviation, 0, nil)
	add("small", small(), 0, nil)
	add("landing", project.Demo(), 0, func(v *study.View) { v.Config = aircraft.Landing })
	add("above the ceiling", project.Demo(), 0, func(v *study.View) { v.Altitude = 6000 })
	add("below the sea", project.Demo(), 0, func(v *study.View) { v.Altitude = -300 })
	add("too heavy to climb", project.Demo(), 0, func(v *study.View) { v.Mass = 1500 })
	add("too heavy to fly", project.Demo(), 0, func(v *study.View) { v.Mass = 9000 })
	add("far too light", project.Demo(), 1, func(v *study.View) { v.Mass = 5 })
	add("outside the air", project.Demo(), 0, func(v *study.View) { v.Altitude = 1e6 })
	return list
}

// finiteIn reports every number of a value that is none.
func finiteIn(t *testing.T, name string, v reflect.Value) {
	t.Helper()
	switch v.Kind() {
	case reflect.Float64:
		if f := v.Float(); math.IsNaN(f) || math.IsInf(f, 0) {
			t.Errorf("%s is %v", name, f)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			finiteIn(t, name+"."+v.Type().Field(i).Name, v.Field(i))
		}
	case reflect.Slice:
		for i := range v.Len() {
			finiteIn(t, name, v.Index(i))
		}
	case reflect.Pointer:
		if !v.IsNil() {
			finiteIn(t, name, v.Elem())
		}
	}
}

func TestEnvelopeHasOnlyNumbers(t *testing.T) {
	for name, e := range envelopes(t) {
		finiteIn(t, name, reflect.ValueOf(*e))
		if (len(e.Contours) == 0) != (e.GridErr != nil || !climbs(e)) {
			t.Errorf("%s: %d lines, %v", name, len(e.Contours), e.GridErr)
		}
		if e.LoadsErr == nil && len(e.Loads) == 0 {
			t.Errorf("%s: neither turns nor a reason", name)
		}
	}
}

// climbs reports whether anywhere on the grid thrust exceeds drag and somewhere it does not.
func climbs(e *study.Envelope) bool {
	best, _, ok := e.Grid.Most()
	return ok && best.Excess > 0
}

// What any aircraft's envelope obeys: a ceiling falls with mass, a rate with altitude, a glide
// against the wind is shorter and faster, bank costs thrust, and lift bounds what thrust sustains.
func TestEnvelopeInOrder(t *testing.T) {
	for name, e := range envelopes(t) {
		for i := 1; i < len(e.Ceilings); i++ {
			a, b := e.Ceilings[i-1], e.Ceilings[i]
			if b.Mass <= a.Mass || a.Absolute.Err == nil && b.Absolute.Err == nil && b.Absolute.Value >= a.Absolute.Value {
				t.Errorf("%s: ceilings %+v, %+v", name, a, b)
			}
			if b.Service.Err == nil && (b.Absolute.Err != nil || b.Service.Value >= b.Absolute.Value) {
				t.Errorf("%s: service above absolute ceiling: %+v", name, b)
			}
		}
		for i := 1; i < len(e.Curves); i++ {
			a, b := e.Curves[i-1], e.Curves[i]
			if b.Altitude <= a.Altitude || b.Rate.Value >= a.Rate.Value || b.Altitude >= e.Absolute.Value {
				t.Errorf("%s: %g m/s at %g m, %g m/s at %g m", name, a.Rate.Value, a.Altitude, b.Rate.Value, b.Altitude)
			}
			for _, q := range b.Points {
				if q.Rate > b.Rate.Value+1e-9 {
					t.Errorf("%s: %g m/s beats the best rate %g", name, q.Rate, b.Rate.Value)
				}
			}
		}
		for _, g := range e.Glides {
			if g.Err == nil && g.WindErr == nil && !(g.Against.Ratio < g.Glide.Ratio && g.Against.TAS > g.Glide.RatioTAS && g.Glide.SinkTAS <= g.Glide.RatioTAS*(1+1e-6)) {
				t.Errorf("%s: glide %+v, against the wind %+v", name, g.Glide, g.Against)
			}
		}
		for _, l := range e.Loads {
			if l.Sustained > l.Lift*(1+1e-9) || l.Sustained != 0 && l.Sustained < 1 || l.Radius > 0 && l.Radius < e.Tightest.Radius {
				t.Errorf("%s: %+v, tightest %+v", name, l, e.Tightest)
			}
		}
	}
}

func TestEnvelopeOfTheDemo(t *testing.T) {
	all := envelopes(t)
	e := all["demo"]
	p := built(t, project.Demo())
	s := study.Run(p, 0, study.DefaultView(p, 0))
	// At the view as it comes the page says what the bench says.
	if e.Absolute != s.Absolute || e.Service != s.Service || e.Curves[0].Rate != s.Speeds.BestRate || e.Turns[0].Available-e.Turns[0].Required < 0 {
		t.Errorf("ceilings %+v %+v, %+v; bench %+v %+v, %+v", e.Absolute, e.Service, e.Curves[0].Rate, s.Absolute, s.Service, s.Speeds.BestRate)
	}
	if len(e.Curves) != 5 || e.Curves[4].Altitude < 0.85*e.Absolute.Value {
		t.Errorf("%d curves, the last at %g m of %g", len(e.Curves), e.Curves[len(e.Curves)-1].Altitude, e.Absolute.Value)
	}
	last := e.Loads[0]
	for _, l := range e.Loads {
		if l.Sustained > 0 {
			last = l
		}
	}
	if math.Abs(last.TAS-s.Speeds.LevelMax.TAS) > 1e-9 || math.Abs(last.Sustained-1) > 1e-6 {
		t.Errorf("sustains %g at %g m/s, level maximum %g", last.Sustained, last.TAS, s.Speeds.LevelMax.TAS)
	}
	if !reflect.DeepEqual(e.Steps, []float64{0, 1, 2, 3}) {
		t.Errorf("steps %v m/s", e.Steps)
	}
	if wind := all["aviation"].HeadWind; math.Abs(wind-10*1852.0/3600) > 1e-12 || e.HeadWind != 5 {
		t.Errorf("head winds %g and %g m/s", wind, e.HeadWind)
	}
	for _, step := range all["aviation"].Steps {
		if feet := step * 60 / 0.3048; math.Abs(feet-100*math.Round(feet/100)) > 1e-6 {
			t.Errorf("a step of %g ft/min", feet)
		}
	}
}

func TestEnvelopeSaysWhyNot(t *testing.T) {
	all := envelopes(t)
	if all["too heavy to fly"].GridErr == nil {
		t.Error("9 t have an envelope")
	}
	for _, name := range []string{"too heavy to fly", "outside the air"} {
		e := all[name]
		for what, err := range map[string]error{"loads": e.LoadsErr, "glide": e.Glides[len(e.Glides)-1].Err} {
			var explained units.Explained
			if !errors.As(err, &explained) {
				t.Errorf("%s: %s says %v", name, what, err)
			}
		}
	}
	if e := all["too heavy to climb"]; e.Absolute.Err == nil || len(e.Ridge) != 0 || len(e.Curves) != 1 || e.Tightest.Radius != 0 {
		t.Errorf("climbs at 1.5 t: %+v, %d points, %d curves, %+v", e.Absolute, len(e.Ridge), len(e.Curves), e.Tightest)
	}
}
