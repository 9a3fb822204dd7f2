package pointperf_test

import (
	"fmt"

	"legwright/internal/perf/aircraft/aircrafttest"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
)

// An invented two-seater at 40 m/s, 1 000 m, on a standard day, with the working of its drag.
func ExampleAt() {
	spec := aircrafttest.Homebuilt(powerplant.FixedPitch)
	a, err := spec.Build()
	if err != nil {
		fmt.Println(err)
		return
	}
	air, err := atmos.Day{}.At(1000, nil)
	if err != nil {
		fmt.Println(err)
		return
	}
	var w formula.Working
	b, err := pointperf.At(a, &pointperf.Point{Air: air, Mass: 600}, 40, &w)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("required %.0f N, available %.0f N, in hand %.0f N\n", b.Required, b.Available, b.InHand())
	for _, s := range w.Steps[:6] {
		if s.Formula != nil {
			fmt.Printf("%s = %s = %.4g\n", s.Formula.Out.Name, s.Formula.Expr, s.Out)
		}
	}
	// Output:
	// required 445 N, available 1061 N, in hand 615 N
	// W = m*g = 5884
	// q = 0.5*rho*V*V = 889.3
	// CL = L/(q*S) = 0.5753
	// CD = CDmin + dCD + phi*K*(CL - CLmd)*(CL - CLmd) = 0.04353
	// D = q*S*CD = 445.2
}
