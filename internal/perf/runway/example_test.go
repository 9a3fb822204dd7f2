package runway_test

import (
	"fmt"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
)

// The take-off of an invented two-seater from grass at 400 m on a warm day.
func ExampleTakeOff() {
	spec := aircrafttest.Homebuilt(powerplant.FixedPitch)
	a, err := spec.Build()
	if err != nil {
		fmt.Println(err)
		return
	}
	strip := runway.Strip{Name: "Meadow", Length: 500, Elevation: 400, Surface: "dry-grass", HeadWind: 2, Obstacle: 15.24}
	place, err := strip.On(atmos.Spec{Given: atmos.ByDeviation, Deviation: 15, QNH: atmos.SeaLevelPressure})
	if err != nil {
		fmt.Println(err)
		return
	}
	run, err := runway.TakeOff(a, a.StartMass(), place, runway.StandardTechnique())
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, s := range run.Segments {
		fmt.Printf("%-11s %4.0f m %5.1f s\n", s.Name, s.Distance, s.Time)
	}
	fmt.Printf("over the obstacle after %.0f m\n", run.Total)
	// Output:
	// ground roll  182 m  14.6 s
	// rotation      24 m   1.0 s
	// transition    44 m   1.8 s
	// climb         89 m   3.4 s
	// over the obstacle after 338 m
}
