package powerplant_test

import (
	"math"
	"path/filepath"
	"strings"
	"sync/atomic"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/powerplant/powerplanttest"
	"legwright/internal/perf/reference"
)

func TestKinds(t *testing.T) {
	names := map[string]bool{}
	for _, k := range powerplant.Kinds {
		if k.Name == "" || k.Label == "" || names[k.Name] {
			t.Errorf("kind %q, label %q: both are needed, the name once", k.Name, k.Label)
		}
		names[k.Name] = true
		if found, ok := powerplant.Lookup(k.Name); !ok || found.Name != k.Name {
			t.Errorf("%s is not found", k.Name)
		}
		m := k.New()
		if err := input.Check(m); err != nil {
			t.Errorf("%s: typical values: %v", k.Name, err)
		}
		if err := powerplanttest.Test(build(t, m), conditions(t), heat); err != nil {
			t.Errorf("%s: %v", k.Name, err)
		}
		files, err := filepath.Glob(filepath.Join(reference.Folder(t), k.Name+"*.csv"))
		if err != nil || len(files) == 0 {
			t.Errorf("%s has no reference case testdata/reference/%s….csv (%v)", k.Name, k.Name, err)
		}
	}
	if _, ok := powerplant.Lookup("perpetual"); ok {
		t.Error("an unknown kind is found")
	}
}

func TestContractOfPistons(t *testing.T) {
	for name, change := range map[string]func(*powerplant.PistonPropeller){
		"constant speed": constantSpeed, "turbocharged": turbocharged, "turbocharged, constant speed": both(turbocharged, constantSpeed),
		"tables": tables, "tables, constant speed": both(tables, constantSpeed),
		"no idle flow, no accessories": func(p *powerplant.PistonPropeller) {
			p.Engine.IdleFlow, p.Engine.AccessoryPower, p.Engine.InstallationLoss = 0, 0, 0
		},
		"geared": func(p *powerplant.PistonPropeller) {
			p.Engine.GearRatio, p.Engine.RatedSpeed, p.Engine.Redline = 2.4, 92, 97
		},
	} {
		if err := powerplanttest.Test(build(t, piston(change)), conditions(t), heat); err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

func TestContractOfRandomPistons(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := drawPiston(t)
		p, err := m.Build()
		if err != nil {
			t.Fatal(err)
		}
		moving := drawCondition(t, m)
		still := moving
		still.TAS = 0
		if err := powerplanttest.Test(p, []powerplant.Condition{still, moving}, heat); err != nil {
			t.Fatal(err)
		}
	})
}

// broken is a sound powerplant with one thing wrong.
type broken struct {
	powerplant.Powerplant
	run   func(c powerplant.Condition, setting float64, out *powerplant.Output)
	match func(setting float64, out *powerplant.Output, err error) (float64, error)
}

func (b *broken) Run(c powerplant.Condition, setting float64, w *formula.Working) (powerplant.Output, error) {
	out, err := b.Powerplant.Run(c, setting, w)
	if b.run != nil {
		b.run(c, setting, &out)
	}
	return out, err
}

func (b *broken) Match(c powerplant.Condition, want float64, w *formula.Working) (float64, powerplant.Output, error) {
	setting, out, err := b.Powerplant.Match(c, want, w)
	if b.match != nil {
		setting, err = b.match(setting, &out, err)
	}
	return setting, out, err
}

func TestContractRefuses(t *testing.T) {
	var calls atomic.Int64
	for _, c := range []struct {
		fault broken
		want  string
	}{
		{broken{run: func(c powerplant.Condition, _ float64, o *powerplant.Output) {
			if c.TAS == 0 {
				o.Thrust = math.NaN()
			}
		}}, "0 m/s, setting 0: thrust is NaN"},
		{broken{run: func(_ powerplant.Condition, _ float64, o *powerplant.Output) { o.Shaft.Efficiency = math.Inf(1) }}, "propeller efficiency is +Inf"},
		{broken{run: func(_ powerplant.Condition, s float64, o *powerplant.Output) {
			if s > 0.9 {
				o.Thrust *= 0.9
			}
		}}, "as the setting rises"},
		{broken{run: func(_ powerplant.Condition, _ float64, o *powerplant.Output) { o.FuelFlow -= 0.001 }}, "negative fuel flow"},
		{broken{run: func(_ powerplant.Condition, _ float64, o *powerplant.Output) { o.BusPower = -1 }}, "negative electrical power"},
		{broken{run: func(_ powerplant.Condition, _ float64, o *powerplant.Output) { o.FuelFlow /= 5 }}, "of thrust power from"},
		{broken{run: func(_ powerplant.Condition, _ float64, o *powerplant.Output) {
			o.Thrust += 1e-12 * float64(calls.Add(1))
		}}, "concurrent calls give"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) { return 0.9 * s, err }}, "which runs at"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) {
			o.Thrust *= 1.001
			return s, err
		}}, "Match for"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) { return s + 0.5, err }}, "Match gives the setting 1.5"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) {
			o.FuelFlow *= 1.01
			return s, err
		}}, "Match gives a fuel flow"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) { return s, nil }}, "more than full thrust"},
		{broken{match: func(s float64, o *powerplant.Output, err error) (float64, error) {
			o.Limits &^= powerplant.Idling
			return s, err
		}}, "is not idle"},
	} {
		c.fault.Powerplant = build(t, piston(nil))
		err := powerplanttest.Test(&c.fault, conditions(t), heat)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			text := "nothing"
			if err != nil {
				text, _, _ = strings.Cut(err.Error(), "\n")
			}
			t.Errorf("want %q, the contract says %s", c.want, text)
		}
	}
}

// TestContractNeedsRest: at rest is where propeller models divide by zero.
func TestContractNeedsRest(t *testing.T) {
	err := powerplanttest.Test(build(t, piston(nil)), conditions(t)[1:2], heat)
	if err == nil || !strings.Contains(err.Error(), "at rest") {
		t.Errorf("%v", err)
	}
}
