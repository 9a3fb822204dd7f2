package atmos_test

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
	"legwright/internal/perf/input"
)

var (
	altitudes  = rapid.Float64Range(atmos.MinAltitude, atmos.MaxAltitude)
	deviations = rapid.Float64Range(-60, 60)
	humidities = rapid.Float64Range(0, 1)
)

// draw gives the air of a random day, and false where the air is too cold for the model.
func draw(t *rapid.T) (atmos.Day, float64, atmos.Air, bool) {
	d := atmos.Day{Deviation: deviations.Draw(t, "deviation"), Humidity: humidities.Draw(t, "humidity")}
	hp := altitudes.Draw(t, "hp")
	a, err := d.At(hp, nil)
	return d, hp, a, err == nil
}

// TestAirIsAir: every state is finite and positive, vapour included.
func TestAirIsAir(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		_, hp, a, ok := draw(t)
		if !ok {
			t.Skip("too cold")
		}
		for name, v := range map[string]float64{"pressure": a.Pressure, "temperature": a.Temperature, "density": a.Density, "sound speed": a.SoundSpeed, "viscosity": a.Viscosity, "height ratio": a.HeightRatio} {
			if !(v > 0) || math.IsInf(v, 0) {
				t.Fatalf("%s is %v at %v m", name, v, hp)
			}
		}
		if !(a.DryDensity >= 0 && a.DryDensity <= a.Density) {
			t.Fatalf("dry density %v of %v at %v m", a.DryDensity, a.Density, hp)
		}
		if h := a.DensityAltitude(); !(h >= atmos.MinAltitude && h <= atmos.MaxAltitude) {
			t.Fatalf("density altitude %v", h)
		}
	})
}

func TestHeatAndHumidityThinTheAir(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		hp := rapid.Float64Range(atmos.MinAltitude, 12000).Draw(t, "hp")
		d := atmos.Day{Deviation: rapid.Float64Range(-40, 40).Draw(t, "deviation"), Humidity: rapid.Float64Range(0, 0.9).Draw(t, "humidity")}
		hot, wet := d, d
		hot.Deviation += 5
		wet.Humidity += 0.1
		a, err := d.At(hp, nil)
		b, err2 := hot.At(hp, nil)
		c, err3 := wet.At(hp, nil)
		if err := errors.Join(err, err2, err3); err != nil {
			t.Fatal(err)
		}
		held := b.DensityAltitude() < atmos.MinAltitude+1 // density altitudes below the model are held at its end
		if b.Density >= a.Density || b.SoundSpeed <= a.SoundSpeed || (b.DensityAltitude() <= a.DensityAltitude() && !held) {
			t.Fatalf("hotter by 5 K: %+v, then %+v", a, b)
		}
		if b.DryDensity >= a.DryDensity {
			t.Fatalf("hotter by 5 K leaves %v of dry air, before %v", b.DryDensity, a.DryDensity)
		}
		if c.Density >= a.Density || c.DryDensity >= a.DryDensity || c.DensityAltitude() < a.DensityAltitude() {
			t.Fatalf("wetter by 10 %%: %+v, then %+v", a, c)
		}
		if b.Pressure != a.Pressure || c.Pressure != a.Pressure {
			t.Fatal("pressure follows from the pressure altitude alone")
		}
	})
}

// TestHydrostatics: dp/dh = -rho g on a standard day, by central difference.
func TestHydrostatics(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := rapid.Float64Range(atmos.MinAltitude+1, atmos.MaxAltitude-1).Draw(t, "h")
		_, below, _ := atmos.Standard(h - 1)
		_, above, _ := atmos.Standard(h + 1)
		a, err := atmos.Day{}.At(h, nil)
		if err != nil {
			t.Fatal(err)
		}
		// A step of 1 m leaves a third-order term below 1e-8; where a layer ends the second derivative jumps.
		if got, want := (above-below)/2, -a.Density*atmos.Gravity; math.Abs(got/want-1) > 2e-5 {
			t.Fatalf("dp/dh at %v m is %v, want %v", h, got, want)
		}
	})
}

func TestDensityAltitudeOfTheStandardDay(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		hp := altitudes.Draw(t, "hp")
		a, err := atmos.Day{}.At(hp, nil)
		if err != nil {
			t.Fatal(err)
		}
		if got := a.DensityAltitude(); math.Abs(got-hp) > 1e-6 {
			t.Fatalf("%v m has density altitude %v", hp, got)
		}
	})
}

func TestStandardSettingChangesNothing(t *testing.T) {
	if got := atmos.PressureAltitude(321, atmos.SeaLevelPressure); math.Abs(got-321) > 1e-9 {
		t.Errorf("at standard QNH 321 m is %v", got)
	}
	rapid.Check(t, func(t *rapid.T) {
		// QNH is defined so that the standard pressure at that pressure altitude is the pressure of the place at sea level.
		qnh := rapid.Float64Range(95000, 108000).Draw(t, "qnh")
		_, p, err := atmos.Standard(atmos.PressureAltitude(0, qnh))
		if err != nil || math.Abs(p/qnh-1) > 1e-9 {
			t.Fatalf("QNH %v came back as %v, %v", qnh, p, err)
		}
	})
}

func TestAirspeedsRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		_, hp, a, ok := draw(t)
		if !ok {
			t.Skip("too cold")
		}
		v := rapid.Float64Range(0, 0.99).Draw(t, "mach") * a.SoundSpeed
		for name, back := range map[string]float64{"CAS": a.FromCAS(a.CAS(v)), "EAS": a.FromEAS(a.EAS(v)), "Mach": a.FromMach(a.Mach(v))} {
			// Below 1 m/s the impact pressure is lost in the rounding of 1 + 0.2 M².
			if !(math.Abs(back-v) <= 1e-9*v+1e-3) || (v > 20 && math.Abs(back-v) > 1e-7*v) {
				t.Fatalf("%s of %v m/s at %v m came back as %v", name, v, hp, back)
			}
		}
	})
}

// TestAirspeedsAgreeLowAndSlow: without compressibility all three are one.
func TestAirspeedsAgreeLowAndSlow(t *testing.T) {
	a := air(t, atmos.Day{}, 0)
	for _, v := range []float64{5, 50, 150, 300} {
		if cas := float64(a.CAS(v)); math.Abs(cas-v) > 1e-9*v {
			t.Errorf("standard sea level: CAS of %v is %v", v, cas)
		}
		if eas := float64(a.EAS(v)); math.Abs(eas-v) > 1e-9*v {
			t.Errorf("standard sea level: EAS of %v is %v", v, eas)
		}
	}
	high := air(t, atmos.Day{}, 9000)
	if cas, eas := float64(high.CAS(30)), float64(high.EAS(30)); math.Abs(cas/eas-1) > 0.003 {
		t.Errorf("at Mach 0.1 CAS %v and EAS %v differ by more than compressibility", cas, eas)
	}
	if cas, eas := float64(high.CAS(250)), float64(high.EAS(250)); cas <= eas {
		t.Errorf("at Mach 0.8 CAS %v must exceed EAS %v", cas, eas)
	}
	if v := high.FromCAS(0); v != 0 {
		t.Errorf("CAS 0 is %v m/s", v)
	}
}

// TestBoilingAir: high, hot and damp, the vapour pressure would exceed the whole.
func TestBoilingAir(t *testing.T) {
	a := air(t, atmos.Day{Deviation: 60, Humidity: 1}, 32000)
	if !(a.DryDensity >= 0 && a.Density > 0.6*a.Pressure/(atmos.GasConstant*a.Temperature)) {
		t.Errorf("%+v", a)
	}
}

// spaced puts plain blanks for the no-break and thin ones of formatted numbers.
func spaced(err error) string {
	return strings.NewReplacer("\u00a0", " ", "\u202f", " ").Replace(fmt.Sprint(err))
}

func TestOutsideTheModel(t *testing.T) {
	for _, hp := range []float64{-600.1, 32000.1, math.NaN(), math.Inf(1)} {
		_, err := atmos.Day{}.At(hp, nil)
		var e *atmos.AltitudeError
		if !errors.As(err, &e) || !strings.Contains(spaced(err), "−600 m to 32 000 m") {
			t.Errorf("%v m: %v", hp, err)
		}
	}
	if _, err := (atmos.Spec{Given: atmos.ByTemperature, Temperature: 288}).Day(40000); err == nil || !strings.Contains(spaced(err), "40 000 m") {
		t.Errorf("a strip at 40 km: %v", err)
	}
	_, err := atmos.Day{Deviation: -80}.At(15000, nil)
	if err == nil || !strings.Contains(spaced(err), "−136.5 °C at 15 000 m") {
		t.Errorf("too cold: %v", err)
	}
}

func TestHeightRatio(t *testing.T) {
	a := air(t, atmos.Day{Deviation: 28.15}, 0)
	if want := 316.3 / 288.15; math.Abs(a.HeightRatio-want) > 1e-12 {
		t.Errorf("28.15 K above standard: %v, want %v", a.HeightRatio, want)
	}
}

func TestSpec(t *testing.T) {
	s := atmos.Spec{Given: atmos.ByDeviation, Deviation: 12, Temperature: 400, Humidity: 0.4, QNH: 101325}
	if err := input.Check(&s); err != nil {
		t.Errorf("an unused temperature was checked: %v", err)
	}
	if d, err := s.Day(1000); err != nil || d != (atmos.Day{Deviation: 12, Humidity: 0.4}) {
		t.Errorf("by deviation: %+v, %v", d, err)
	}
	s.Given = atmos.ByTemperature
	err := input.Check(&s)
	if list := input.Errors(err); len(list) != 1 || list[0].Path != "temperature" {
		t.Errorf("400 K: %v", err)
	}
	s.Temperature = 293.65
	if d, err := s.Day(1000); err != nil || math.Abs(d.Deviation-12) > 1e-9 {
		t.Errorf("by temperature: %+v, %v", d, err)
	}
}

func TestWorking(t *testing.T) {
	record := formulatest.Record{}
	rapid.Check(t, func(t *rapid.T) {
		d, hp, _, ok := draw(t)
		var w formula.Working
		if _, err := d.At(hp, &w); (err == nil) != ok {
			t.Fatal(err)
		}
		record.Check(t, w)
	})
	record.Complete(t)
}

func TestNoAllocation(t *testing.T) {
	d := atmos.Day{Deviation: 10, Humidity: 0.5}
	var a atmos.Air
	if n := testing.AllocsPerRun(100, func() { a, _ = d.At(1500, nil); _ = a.CAS(50) }); n != 0 {
		t.Errorf("%v allocations without a working", n)
	}
}

func ExampleDay_At() {
	hot := atmos.Day{Deviation: 20, Humidity: 0.6}
	hp := atmos.PressureAltitude(450, 100800)
	a, err := hot.At(hp, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.0f m pressure altitude, %.3f kg/m³, %.0f m density altitude\n", hp, a.Density, a.DensityAltitude())
	fmt.Printf("50 m/s true is %.1f m/s calibrated\n", a.CAS(50))
	// Output:
	// 494 m pressure altitude, 1.079 kg/m³, 1300 m density altitude
	// 50 m/s true is 47.2 m/s calibrated
}
