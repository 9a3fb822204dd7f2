package study_test

import (
	"math"
	"slices"
	"testing"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// plantOf studies the first variant of the demo, changed.
func plantOf(t testing.TB, change func(*project.Spec, *powerplant.PistonPropeller)) (*study.Study, *study.Plant) {
	t.Helper()
	s := project.Demo()
	if change != nil {
		change(s, s.Variants[0].Aircraft.Powerplant.Model.(*powerplant.PistonPropeller))
	}
	p := built(t, s)
	st := study.Run(p, 0, study.DefaultView(p, 0))
	return st, st.Plant()
}

func governed(_ *project.Spec, p *powerplant.PistonPropeller) {
	p.Propeller.Kind, p.Propeller.Speed, p.Propeller.LossFactor = powerplant.ConstantSpeed, 44, 0.85
}

// TestPlantRuns: power taken is power offered short of the redline, the efficiency
// is thrust power over shaft power, no thrust passes its bound, and the run goes
// from rest to the never-exceed speed.
func TestPlantRuns(t *testing.T) {
	for name, change := range map[string]func(*project.Spec, *powerplant.PistonPropeller){"fixed pitch": nil, "constant speed": governed} {
		s, p := plantOf(t, change)
		if len(p.Runs) != 3 || p.Runs[p.View].Air.PressureAltitude != s.View.Altitude {
			t.Fatalf("%s: %d runs, the view's at %v", name, len(p.Runs), p.Runs[p.View].Air.PressureAltitude)
		}
		balanced := 0
		for _, r := range p.Runs {
			if r.Points[0].TAS != 0 || math.Abs(float64(r.Air.CAS(r.Points[len(r.Points)-1].TAS))-s.Aircraft().NeverExceed()) > 1e-6 {
				t.Errorf("%s: a run from %v to %v m/s", name, r.Points[0].TAS, r.Points[len(r.Points)-1].TAS)
			}
			for _, pt := range r.Points {
				sh := pt.Out.Shaft
				if pt.Err != nil || pt.Out.Limits&powerplant.Idling != 0 {
					continue
				}
				if want := pt.Out.Thrust * pt.TAS; math.Abs(sh.Efficiency*sh.Power-want) > 1e-9*sh.Power {
					t.Errorf("%s at %v m/s: efficiency %v of %v W is not %v W of thrust", name, pt.TAS, sh.Efficiency, sh.Power, want)
				}
				if pt.Out.Limits&powerplant.SpeedLimited == 0 {
					balanced++
					if offered := p.Curves.FullPower(&r.Air, sh.EngineSpeed); math.Abs(offered-sh.Power) > 1e-6*offered {
						t.Errorf("%s at %v m/s: %v W taken of %v W", name, pt.TAS, sh.Power, offered)
					}
				}
			}
		}
		if balanced < 100 {
			t.Errorf("%s: only %d points were compared", name, balanced)
		}
		for _, pt := range p.Runs[p.View].Points {
			if pt.Err == nil && pt.Out.Shaft.Power > 0 && !(pt.Out.Thrust < pt.Bound) {
				t.Errorf("%s at %v m/s: %v N, a disc without losses gives %v N", name, pt.TAS, pt.Out.Thrust, pt.Bound)
			}
		}
	}
}

// TestPlantOnsets: just below an onset it does not hold yet, just above it does.
func TestPlantOnsets(t *testing.T) {
	s, p := plantOf(t, nil)
	r := p.Runs[p.View]
	at := func(tas float64) (powerplant.Output, error) {
		return s.Aircraft().Plant().Run(powerplant.Condition{Air: r.Air, TAS: tas}, 1, nil)
	}
	below, _ := at(r.Throttled.TAS - 0.01)
	above, _ := at(r.Throttled.TAS + 0.01)
	if !r.Throttled.Found || below.Limits&powerplant.SpeedLimited != 0 || above.Limits&powerplant.SpeedLimited == 0 {
		t.Errorf("throttled from %+v: limits %b below, %b above", r.Throttled, below.Limits, above.Limits)
	}
	// At the redline J reaches the end of the table at V = J n D.
	f, e := p.Curves.Propeller(), p.Curves.Engine()
	if want := f.High * e.Greatest / e.GearRatio * f.Diameter; !r.Ends.Found || math.Abs(r.Ends.TAS-want) > 1e-3 {
		t.Errorf("it ends at %+v, want %v m/s", r.Ends, want)
	}
	if r.Tips.Found || r.FastTips.Found {
		t.Errorf("tips %+v, %+v", r.Tips, r.FastTips)
	}
}

// TestStaticBound: a fixed pitch stays below momentum theory; a disc with the
// loss factor k gives k^(2/3) of it (Glauert 1935, chapter II, at rest).
func TestStaticBound(t *testing.T) {
	_, fixed := plantOf(t, nil)
	if got := fixed.Static.Share(); !fixed.Static.Has || got < 0.5 || got >= 1 {
		t.Errorf("fixed pitch: %v of the bound", got)
	}
	_, disc := plantOf(t, governed)
	if got, want := disc.Static.Share(), math.Pow(0.85, 2.0/3); math.Abs(got-want) > 1e-9 {
		t.Errorf("disc: %v of the bound, want %v", got, want)
	}
}

// TestPlantTable: the points are those that the study has elsewhere.
func TestPlantTable(t *testing.T) {
	s, p := plantOf(t, nil)
	names := []string{}
	for _, o := range p.Table {
		names = append(names, o.Name)
		if o.Err != nil {
			t.Errorf("%s: %v", o.Name, o.Err)
		}
	}
	if want := []string{"At rest", "Lift-off", "Best angle", "Best rate", "Cruise out", "Cruise back", "Level maximum"}; !slices.Equal(names, want) {
		t.Fatalf("points %v", names)
	}
	if p.Table[0].Out != s.Static {
		t.Error("at rest it differs from the study's static thrust")
	}
	if p.Table[1].TAS != s.TakeOff.Run.Speed || p.Table[6].TAS != s.Figure("level_max").Value {
		t.Errorf("lift-off %v, level maximum %v", p.Table[1].TAS, p.Table[6].TAS)
	}
	if got := p.Table[4]; got.TAS != 50 || got.Out != s.Flight.Legs[3].End.Output {
		t.Errorf("cruise out %+v", got)
	}
	// The view stands at the strip's altitude rounded to the metre, which moves the thrust by less than 1e-4.
	if got, want := p.Table[6].Out.Thrust, s.Speeds.LevelMax.Value; math.Abs(got/want-1) > 1e-4 {
		t.Errorf("thrust %v at the level maximum, %v required", got, want)
	}
	for i, m := range p.Marked {
		if other := p.Table[[]int{0, 3, 6}[i]]; math.Abs(m.TAS-other.TAS) > 1e-4*other.TAS || math.Abs(m.Out.Thrust-other.Out.Thrust) > 1e-4*other.Out.Thrust {
			t.Errorf("%s of the view: %v m/s, %v N; of the strip: %v, %v", m.Name, m.TAS, m.Out.Thrust, other.TAS, other.Out.Thrust)
		}
	}
}

// TestPropellerLoads: the load passes through its operating point.
func TestPropellerLoads(t *testing.T) {
	_, p := plantOf(t, nil)
	if len(p.Loads) != 3 {
		t.Fatalf("%d loads", len(p.Loads))
	}
	for i, l := range p.Loads {
		sh := p.Marked[i].Out.Shaft
		last := len(l.Speeds) - 1
		k, _ := slices.BinarySearch(l.Speeds, sh.EngineSpeed)
		k = min(max(k, 1), last)
		f := (sh.EngineSpeed - l.Speeds[k-1]) / (l.Speeds[k] - l.Speeds[k-1])
		// Straight between points a hundredth of the range apart.
		if got := l.Power[k-1] + f*(l.Power[k]-l.Power[k-1]); math.Abs(got/sh.Power-1) > 2e-3 {
			t.Errorf("%s: the load gives %v W, the engine turns with %v W", l.Name, got, sh.Power)
		}
	}
	if _, disc := plantOf(t, governed); len(disc.Loads) != 0 || len(disc.Given) != 0 {
		t.Error("a disc has loads or rows")
	}
}

func TestLapseAndBurn(t *testing.T) {
	s, p := plantOf(t, nil)
	if len(p.Lapse) != 2 || p.Lapse[0].Deviation != 0 || p.Lapse[1].Deviation != 15 {
		t.Fatalf("lapse curves %+v", p.Lapse)
	}
	for k, hp := range p.Lapse[0].Altitude {
		if p.Lapse[1].Power[k] >= p.Lapse[0].Power[k] {
			t.Errorf("at %v m heat does not cost power", hp)
		}
		if k > 0 && p.Lapse[0].Power[k] >= p.Lapse[0].Power[k-1] {
			t.Errorf("at %v m power does not fall", hp)
		}
	}
	b, curve := p.Burn, []float64{8.0e-8, 1.03e-7}
	if !b.Has || b.Low < curve[0]*(1-1e-9) || b.High > curve[1]*(1+1e-9) || b.Low >= b.High || b.LowShare <= 0 || b.HighShare >= 1 {
		t.Errorf("burn %+v", b)
	}
	if b.FlowHigh*s.Flight.Time < s.Flight.Fuel {
		t.Errorf("at most %v kg/s burn %v kg in %v s", b.FlowHigh, s.Flight.Fuel, s.Flight.Time)
	}
	_, turbo := plantOf(t, func(s *project.Spec, p *powerplant.PistonPropeller) {
		s.Day.Humidity, p.Engine.CriticalAltitude = 0, 3000
	})
	l := turbo.Lapse[0]
	for k, hp := range l.Altitude {
		if held := math.Abs(l.Power[k]/l.Power[0]-1) < 1e-9; held != (hp <= 3000) {
			t.Errorf("critical altitude 3000 m: at %v m it is %v of sea level", hp, l.Power[k]/l.Power[0])
		}
	}
}

func TestPlantCautions(t *testing.T) {
	type prop = powerplant.PistonPropeller
	for name, c := range map[string]struct {
		change func(*project.Spec, *prop)
		code   string
		level  study.Level
		in     bool
	}{
		"coarse at rest":   {nil, "static-power", study.Caution, true},
		"governed at rest": {governed, "static-power", "", false},
		"fine pitch":       {nil, "throttled", study.Caution, true},
		"governed":         {governed, "throttled", "", false},
		"slow tips":        {nil, "tip-mach", "", false},
		"fast tips": {func(_ *project.Spec, p *prop) {
			governed(nil, p)
			p.Propeller.Diameter = 1.95
		}, "tip-mach", study.Caution, true},
		"too fast tips": {func(_ *project.Spec, p *prop) {
			governed(nil, p)
			p.Propeller.Diameter = 2.2
		}, "tip-mach", study.Stop, true},
		"table ends": {nil, "table-ends", study.Caution, true},
		"short table": {func(_ *project.Spec, p *prop) {
			p.Propeller.Coefficients = p.Propeller.Coefficients[:7]
		}, "point-outside", study.Caution, true},
		"power curve":       {func(_ *project.Spec, p *prop) { p.Engine.PowerCurve = p.Engine.PowerCurve[3:] }, "power-curve", study.Caution, true},
		"whole power curve": {nil, "power-curve", "", false},
	} {
		_, p := plantOf(t, c.change)
		i := slices.IndexFunc(p.Cautions, func(w study.Warning) bool { return w.Code == c.code })
		if (i >= 0) != c.in || (i >= 0 && p.Cautions[i].Level != c.level) {
			t.Errorf("%s: %s is at %d of %+v", name, c.code, i, p.Cautions)
		}
	}
}

// TestPlantOfTheImpossible: every number exists or says why not.
func TestPlantOfTheImpossible(t *testing.T) {
	for name, change := range map[string]func(*project.Spec, *powerplant.PistonPropeller){
		"far too heavy":  func(s *project.Spec, _ *powerplant.PistonPropeller) { s.Variants[0].Aircraft.Weights.Empty = 2500 },
		"no legs":        func(s *project.Spec, _ *powerplant.PistonPropeller) { s.Legs = nil },
		"stall over VNE": func(s *project.Spec, _ *powerplant.PistonPropeller) { s.Variants[0].Aircraft.Airframe.NeverExceed = 12 },
		"thin air": func(s *project.Spec, _ *powerplant.PistonPropeller) {
			s.Strips[0].Elevation, s.Day.Deviation = 6000, 40
		},
		"thin air, disc": func(s *project.Spec, p *powerplant.PistonPropeller) {
			governed(s, p)
			s.Strips[0].Elevation, s.Day.Deviation = 6000, 40
		},
		"climb too high": func(s *project.Spec, _ *powerplant.PistonPropeller) { s.Legs[2].Altitude = 6000 },
	} {
		s, p := plantOf(t, change)
		if p.Err != nil {
			t.Errorf("%s: %v", name, p.Err)
			continue
		}
		for _, o := range append(slices.Clone(p.Table), p.Marked...) {
			if r := units.Explain(o.Err).In(units.Metric); o.Err != nil && r == "" {
				t.Errorf("%s: %s has no reason", name, o.Name)
			}
			for _, v := range []float64{o.TAS, o.Out.Thrust, o.Out.FuelFlow, o.Out.Shaft.Power, o.Out.Shaft.TipMach} {
				if math.IsNaN(v) || math.IsInf(v, 0) {
					t.Errorf("%s: %s holds %v", name, o.Name, v)
				}
			}
		}
		if p.Static.Has && !(p.Static.Share() < 1) {
			t.Errorf("%s: %v of the bound", name, p.Static.Share())
		}
		if p.View < 0 || len(p.Runs[p.View].Points) == 0 {
			t.Errorf("%s: no run of the view, %v", name, s.View)
		}
	}
	pr := built(t, project.Demo())
	view := study.DefaultView(pr, 0)
	view.Altitude = 20000
	if p := study.Run(pr, 0, view).Plant(); p.Err != nil || p.Cautions[0].Code != "no-power" {
		t.Errorf("at 20000 m: %v, %+v", p.Err, p.Cautions)
	}
	view.Altitude = 1e6
	if p := study.Run(pr, 0, view).Plant(); p.Err == nil || len(p.Runs) != 0 {
		t.Errorf("outside the air: %v", p.Err)
	}
}

// TestPlantAltitudes: the view is among the runs, and they are apart and rise.
func TestPlantAltitudes(t *testing.T) {
	pr := built(t, project.Demo())
	for _, hp := range []float64{-300, 0, 571, 2600, 4500, 8000} {
		view := study.DefaultView(pr, 0)
		view.Altitude = hp
		p := study.Run(pr, 0, view).Plant()
		for i := range p.Runs {
			if i > 0 && p.Runs[i].Air.PressureAltitude < p.Runs[i-1].Air.PressureAltitude+500 {
				t.Errorf("view at %v m: run %d at %v m after %v m", hp, i, p.Runs[i].Air.PressureAltitude, p.Runs[i-1].Air.PressureAltitude)
			}
		}
		if len(p.Runs) != 3 || p.Runs[p.View].Air.PressureAltitude != hp {
			t.Errorf("view at %v m: %d runs", hp, len(p.Runs))
		}
	}
}

func BenchmarkPlant(b *testing.B) {
	s, _ := plantOf(b, nil)
	for b.Loop() {
		s.Plant()
	}
}
