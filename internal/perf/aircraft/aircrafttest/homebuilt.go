package aircrafttest

import (
	"testing"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/powerplant"
)

// Homebuilt is an invented two-seater of 75 kW with the propeller of the given
// kind, powerplant.FixedPitch or powerplant.ConstantSpeed. The caller owns it.
func Homebuilt(propeller string) aircraft.Spec {
	kind := powerplant.Kinds[0]
	model := kind.New().(*powerplant.PistonPropeller)
	model.Propeller.Kind = propeller
	return aircraft.Spec{
		Airframe: aircraft.Airframe{
			WingArea: 11.5, Span: 9.2, WingHeight: 0.9, DragGiven: aircraft.ByParabola, CDMin: 0.031, Efficiency: 0.78, CLMinDrag: 0.1,
			Clean:    aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.45},
			TakeOff:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.65, DeltaCD: 0.012, DeltaCLM: 0.1},
			Landing:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.95, DeltaCD: 0.045, DeltaCLM: 0.2},
			GroundCL: 0.45, NeverExceed: 72,
		},
		Weights:    aircraft.Weights{Empty: 270, Items: []aircraft.Item{{Name: "Crew", Mass: 165}}, MaxTakeOff: 650, ZeroFuelGiven: aircraft.NoZeroFuel},
		Limits:     loads.Unentered(),
		Powerplant: powerplant.Spec{Kind: kind.Name, Model: model},
	}
}

// Build assembles s.
func Build(t testing.TB, s aircraft.Spec) *aircraft.Aircraft {
	t.Helper()
	a, err := s.Build()
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// Propellers are the kinds that Homebuilt takes.
var Propellers = []string{powerplant.FixedPitch, powerplant.ConstantSpeed}
