package mission_test

import (
	"fmt"
	"testing"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// An invented two-seater takes off, climbs, cruises and keeps a reserve.
func ExampleFly() {
	spec := aircrafttest.Homebuilt(powerplant.FixedPitch)
	a, err := spec.Build()
	if err != nil {
		fmt.Println(err)
		return
	}
	strip := runway.Strip{Name: "Meadow", Length: 500, Elevation: 400, Surface: "dry-grass", Obstacle: 15.24}
	place, err := strip.On(atmos.Spec{Given: atmos.ByDeviation, QNH: atmos.SeaLevelPressure})
	if err != nil {
		fmt.Println(err)
		return
	}
	climb, cruise, reserve := mission.NewLeg(mission.Climb, "Climb"), mission.NewLeg(mission.Cruise, "Cruise"), mission.NewLeg(mission.Reserve, "Reserve")
	climb.Altitude, reserve.Altitude = 1500, 1000
	cruise.Distance = 200e3
	f := mission.Fly(a, &mission.Plan{
		Legs:      []mission.Leg{mission.NewLeg(mission.TakeOff, "Take-off"), climb, cruise, reserve},
		Places:    []runway.Place{place},
		Technique: runway.StandardTechnique(),
	})
	for _, l := range f.Legs {
		fmt.Printf("%-8s %6.1f min %6.1f km %6.2f kg\n", l.Leg.Name, l.Time/60, l.Distance/1e3, l.Fuel)
	}
	fmt.Printf("flown %v, reserve met %v\n", f.Flown(), f.Reserve.Met)
	fmt.Printf("tightest in the %s: %.0f %% of the thrust required in hand\n", f.Legs[f.Tightest.Leg].Leg.Name, 100*f.Tightest.Ratio())
	// Output:
	// Take-off    0.3 min    0.0 km   0.10 kg
	// Climb       4.2 min    9.7 km   1.21 kg
	// Cruise     91.8 min  200.0 km   9.13 kg
	// Reserve    30.0 min    0.0 km   2.61 kg
	// flown true, reserve met true
	// tightest in the Climb: 137 % of the thrust required in hand
}

// The demo project's variants fly as healthily as any, and each says why it does not where it does not.
func TestDemo(t *testing.T) {
	p := build(t, project.Demo())
	for i, a := range p.Aircraft {
		f := mission.Fly(a, &p.Plan)
		healthy(t, &f)
		if len(f.Legs) < 3 || f.Failure != nil && f.Failure.Reason.In(units.Aviation) == "" {
			t.Errorf("variant %d: %+v after %d legs", i, f.Failure, len(f.Legs))
		}
	}
}

var sink mission.Flight

func BenchmarkFly(b *testing.B) {
	demo, whole := build(b, project.Demo()), scipyProject(b)
	for name, p := range map[string]*project.Project{"demo": demo, "whole": whole, "every kind": kindsProject(b)} {
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				sink = mission.Fly(p.Aircraft[0], &p.Plan)
			}
		})
	}
}
