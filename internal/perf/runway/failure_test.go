package runway_test

import (
	"errors"
	"math"
	"regexp"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// powered is the homebuilt with an engine of the rated power in W.
func powered(t *testing.T, rated float64) *aircraft.Aircraft {
	s := aircrafttest.Homebuilt(powerplant.FixedPitch)
	s.Powerplant.Model.(*powerplant.PistonPropeller).Engine.RatedPower = rated
	return aircrafttest.Build(t, s)
}

func TestNoTakeOffOrLanding(t *testing.T) {
	steep, downhill, soft := level, level, level
	steep.Slope = 0.2
	downhill.Slope, downhill.Surface = -0.2, "ice"
	soft.Surface = "soft-ground"
	for what, c := range map[string]struct {
		rated float64
		strip runway.Strip
		land  bool
		want  string
	}{
		"does not roll":         {12e3, steep, false, `^the aircraft does not start to roll: static thrust is [0-9]+.N short of friction and slope$`},
		"does not lift off":     {30e3, soft, false, `^the aircraft does not reach its lift-off speed of [0-9.]+.m/s: it stops gaining at [0-9.]+.m/s$`},
		"does not climb away":   {26e3, level, false, `^it leaves the ground but does not climb away: at [0-9.]+.m/s the path is −?[0-9.]+° with full power at 0.m and 594\.8.kg$`},
		"does not stop":         {75e3, downhill, true, `^the aircraft does not stop: friction does not hold it on the slope at [0-9.]+.m/s$`},
		"lands on level ground": {75e3, level, true, ""},
	} {
		a := powered(t, c.rated)
		place, err := c.strip.On(standardDay)
		if err != nil {
			t.Fatal(err)
		}
		run, err := runway.TakeOff(a, a.StartMass(), place, runway.StandardTechnique())
		if c.land {
			run, err = runway.Landing(a, a.StartMass(), place, runway.StandardTechnique())
		}
		if c.want == "" {
			if err != nil {
				t.Errorf("%s: %v", what, err)
			}
			continue
		}
		if err == nil || !errors.Is(err, runway.ErrNoRun) {
			t.Errorf("%s: %v", what, err)
			continue
		}
		if said := units.Explain(err).In(units.Metric); !regexp.MustCompile(c.want).MatchString(said) {
			t.Errorf("%s: says %q", what, said)
		}
		if math.IsNaN(run.Total) || math.IsInf(run.Total, 0) {
			t.Errorf("%s: total %g m", what, run.Total)
		}
	}
}

func TestStripsThatAreNot(t *testing.T) {
	unknown, high := level, level
	unknown.Surface = "lava"
	high.Elevation = 40000
	var bad *input.Error
	if _, err := unknown.On(standardDay); !errors.As(err, &bad) || bad.Path != "surface" {
		t.Errorf("unknown surface: %v", err)
	}
	var altitude *atmos.AltitudeError
	if _, err := high.On(standardDay); !errors.As(err, &altitude) {
		t.Errorf("strip above the atmosphere: %v", err)
	}
	if _, err := high.On(atmos.Spec{Given: atmos.ByTemperature, Temperature: 288, QNH: atmos.SeaLevelPressure}); !errors.As(err, &altitude) {
		t.Errorf("strip above the atmosphere, temperature given: %v", err)
	}
}

// An obstacle that is cleared inside the arc is cleared after the chord of the
// arc: x² = h (2 R − h), R = V²/(g (n − 1)) with n = 1.2, Raymer 1992, section 17.8.
func TestLowObstacleIsClearedInTheArc(t *testing.T) {
	a := both(t)[powerplant.ConstantSpeed]
	low := level
	low.Obstacle = 3
	off, on := runs(t, a, 560, low, standardDay)
	if len(off.Segments) != 3 {
		t.Fatalf("take-off in %+v", off.Segments)
	}
	speed := (off.Speed + off.Screen) / 2
	radius := speed * speed / (0.2 * atmos.Gravity)
	near(t, "transition", off.Segments[2].Distance, math.Sqrt(low.Obstacle*(2*radius-low.Obstacle)), 1e-12)
	// The landing's arc is shallow: the approach at 3° comes first, then the whole arc.
	speed = (on.Speed + on.Screen) / 2
	radius = speed * speed / (0.2 * atmos.Gravity)
	angle := runway.StandardTechnique().ApproachAngle
	near(t, "flare", on.Segments[1].Distance, radius*math.Sin(angle), 1e-12)
	near(t, "approach", on.Segments[0].Distance, (low.Obstacle-radius*(1-math.Cos(angle)))/math.Tan(angle), 1e-12)
	// Without an obstacle there is neither arc nor approach.
	none := level
	none.Obstacle = 0
	off, on = runs(t, a, 560, none, standardDay)
	if off.Total != off.Ground || on.Total != on.Ground {
		t.Errorf("without obstacle: %g of %g m and %g of %g m on the ground", off.Ground, off.Total, on.Ground, on.Total)
	}
}

// A head wind as fast as the lift-off speed leaves no ground roll.
func TestHeadWindOfTheLiftOffSpeed(t *testing.T) {
	a := both(t)[powerplant.FixedPitch]
	gale := level
	gale.HeadWind = 25
	place, err := gale.On(standardDay)
	if err != nil {
		t.Fatal(err)
	}
	place.HeadWind = 40
	off, err := runway.TakeOff(a, 500, place, runway.StandardTechnique())
	if err != nil {
		t.Fatal(err)
	}
	on, err := runway.Landing(a, 500, place, runway.StandardTechnique())
	if err != nil {
		t.Fatal(err)
	}
	if off.Total != 0 || on.Total != 0 || off.Ground != 0 || on.Ground != 0 {
		t.Errorf("take-off of %g m, landing of %g m against 40 m/s", off.Total, on.Total)
	}
}

// Resistance is what the take-off run integrates: at rest friction and slope alone.
func TestResistance(t *testing.T) {
	a := both(t)[powerplant.FixedPitch]
	slope := level
	slope.Slope = 0.03
	place, err := slope.On(standardDay)
	if err != nil {
		t.Fatal(err)
	}
	w := 560 * atmos.Gravity
	tilt := math.Atan(0.03)
	near(t, "resistance at rest", runway.Resistance(a, 560, place, 0), w*math.Sin(tilt)+place.Surface.Rolling*w*math.Cos(tilt), 1e-14)
	if fast := runway.Resistance(a, 560, place, 60); fast <= runway.Resistance(a, 560, place, 50) {
		t.Errorf("resistance falls to %g N", fast)
	}
}

func TestFactoredDistance(t *testing.T) {
	off, _ := runs(t, both(t)[powerplant.FixedPitch], 560, level, standardDay)
	off.Factor(1.33)
	near(t, "factored distance", off.Factored, 1.33*off.Total, 1e-15)
}
