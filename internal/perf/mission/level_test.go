package mission_test

import (
	"math"
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
)

// A long cruise at the level maximum is flown, with no thrust in hand all the
// way, though its speed is interpolated between masses. So is one on the
// greatest share of power that can be set at the start, up where the throttle is
// wide open: at the redline a lighter, faster aircraft absorbs less.
func TestCruiseAtTheMost(t *testing.T) {
	for _, kind := range aircrafttest.Propellers {
		a := aircrafttest.Build(t, aircrafttest.Homebuilt(kind))
		for _, hp := range []float64{500, 3500} {
			p := &pointperf.Point{Air: aircrafttest.Air(t, hp), Mass: a.StartMass(), Config: aircraft.Clean}
			top, err := pointperf.LevelAt(a, p, pointperf.AllSpeeds(a, p).LevelMax.TAS*(1-1e-9))
			if err != nil {
				t.Fatal(err)
			}
			shares := []float64{0}
			if hp > 3000 {
				shares = append(shares, top.Output.Fraction*(1-1e-9))
			}
			for _, share := range shares {
				l := mission.NewLeg(mission.Cruise, "")
				l.Distance, l.SpeedRule, l.Power = 500e3, mission.Maximum, share
				if share > 0 {
					l.SpeedRule = mission.PercentPower
				}
				f := mission.Fly(a, from(t, hp, l))
				if !f.Flown() {
					t.Errorf("%s at %g m, share %g: %v", kind, hp, share, f.Failure.Err)
				}
				for _, s := range f.Trace {
					if r := s.Ratio(); share == 0 && (math.Abs(r) > 1e-4 || hp > 3000 && s.Setting < 0.999) {
						t.Errorf("%s at %g m: thrust in hand is %g of the thrust required after %g s, at setting %g", kind, hp, r, s.Time, s.Setting)
					}
				}
			}
		}
	}
}
