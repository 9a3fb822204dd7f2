package project

import (
	"fmt"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/loads"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// New returns a project of one variant in which every input is a placeholder.
func New(name string) *Spec {
	s := &Spec{Format: Format, Units: "SI", Name: name, Display: string(units.Metric),
		Day:       atmos.Spec{Given: atmos.ByDeviation, Temperature: atmos.SeaLevelTemperature, QNH: atmos.SeaLevelPressure},
		Strips:    []runway.Strip{{Name: "Strip", Length: 600, Surface: "dry-asphalt", Obstacle: 15.24}},
		Technique: runway.StandardTechnique(),
		Legs:      outAndBack(0, 1500, 200e3),
		Variants:  []Variant{{ID: "a", Name: "A", Aircraft: typicalAircraft(), Basis: map[string]Basis{}}},
		Basis:     map[string]Basis{},
	}
	s.Requirements = []Requirement{Require("take_off_distance", AtMost, 600), Require("climb_rate", AtLeast, 2.5)}
	return s
}

// outAndBack is a mission from a strip at the pressure altitude ground in m to
// a turning point at the distance in m and back, at the pressure altitude top in m.
func outAndBack(ground, top, distance float64) []mission.Leg {
	leg := mission.NewLeg
	taxi := leg(mission.Taxi, "Start and taxi")
	taxi.Time, taxi.Setting = 480, 0.12
	climb := leg(mission.Climb, "Climb")
	climb.Altitude = top
	out := leg(mission.Cruise, "Cruise out")
	out.Distance, out.SpeedRule, out.Power = distance, mission.PercentPower, 0.65
	loiter := leg(mission.Loiter, "Loiter")
	loiter.Time = 900
	back := out
	back.Name = "Cruise back"
	down := leg(mission.Descent, "Descend")
	down.Altitude, down.Speed, down.Rate = ground+150, 45, 2.5
	land := leg(mission.Landing, "Land")
	reserve := leg(mission.Reserve, "Reserve")
	reserve.Altitude, reserve.Time = ground+450, 1800
	return []mission.Leg{taxi, leg(mission.TakeOff, "Take-off"), climb, out, loiter, back, down, land, reserve}
}

// typicalAircraft is an invented light two-seater; every value is a placeholder.
func typicalAircraft() aircraft.Spec {
	kind := powerplant.Kinds[0]
	return aircraft.Spec{
		Airframe: aircraft.Airframe{
			WingArea: 12, Span: 9.4, WingHeight: 0.9, DragGiven: aircraft.ByParabola, CDMin: 0.034, Efficiency: 0.77, CLMinDrag: 0.1,
			Polar:    [][]float64{{-0.2, 0.038}, {0.1, 0.034}, {0.5, 0.043}, {1, 0.08}, {1.5, 0.144}, {2.2, 0.27}},
			Clean:    aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.45},
			TakeOff:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.65, DeltaCD: 0.012, DeltaCLM: 0.1},
			Landing:  aircraft.Configuration{LiftGiven: aircraft.ByCLMax, CLMax: 1.95, DeltaCD: 0.045, DeltaCLM: 0.2},
			GroundCL: 0.45, NeverExceed: 75, Components: []dragbuild.Component{},
		},
		Weights:    aircraft.Weights{Empty: 290, Items: []aircraft.Item{{Name: "Crew", Mass: 160}, {Name: "Baggage", Mass: 15}}, MaxTakeOff: 650, ZeroFuelGiven: aircraft.NoZeroFuel, MaxZeroFuel: 650},
		Limits:     typicalLimits(),
		Powerplant: powerplant.Spec{Kind: kind.Name, Model: kind.New()},
	}
}

// typicalLimits are those of an invented light two-seater that the gusts of its cruise do not overstress.
func typicalLimits() loads.Limits {
	l := loads.Unentered()
	l.Rule, l.FactorsGiven, l.SpeedsGiven = "vla", loads.ByValue, loads.ByValue
	l.Positive, l.Negative, l.Cruise, l.Dive = 4.8, -2.8, 60, 84
	return l
}

// Demo returns the project that a first start shows: an invented two-seat
// homebuilt, an invented short grass strip, and a mission out and back with
// reserve, flown by two variants. Nothing in it is a real aircraft, engine or place.
func Demo() *Spec {
	s := New("Sorrel Down to the lake and back")
	s.Note = "An invented scenario: every number in it is made up."
	s.Day = atmos.Spec{Given: atmos.ByDeviation, Deviation: 15, Temperature: 299.19, Humidity: 0.4, QNH: 101800}
	s.Strips = []runway.Strip{{Name: "Sorrel Down 08", Length: 600, Elevation: 610, Slope: 0.008, Surface: "dry-grass", Obstacle: 15.24}}
	s.Basis = map[string]Basis{"strips[0].length": {Kind: Measured, Note: "paced and taped"}, "strips[0].elevation": {Kind: Measured}, "strips[0].slope": {Kind: Measured}, "strips[0].obstacle": {Kind: Calculated, Note: "the screen of the rules"}}
	s.Technique.ApproachAngle = 5 * math.Pi / 180
	s.Legs = outAndBack(570, 2700, 180e3)
	for i, wind := range map[int]float64{3: 5, 5: -3} {
		s.Legs[i].HeadWind, s.Legs[i].SpeedRule, s.Legs[i].Speed = wind, mission.ByTAS, 50
	}
	s.Requirements = []Requirement{
		Require("take_off_distance", AtMost, 450),
		Require("climb_rate", AtLeast, 2.5),
		Require("stall_landing", AtMost, 23.5),
		Require("thrust_in_hand", AtLeast, 0.1),
		Require("reserve_time", AtLeast, 1800),
	}
	a := &s.Variants[0]
	a.ID, a.Name, a.Note = "a", "A · 60 kW, climb propeller", "The engine at hand."
	a.Aircraft = demoAircraft(60e3, 78, 1.68, 0.88)
	a.Basis = demoBasis(&a.Aircraft)
	b := Variant{ID: "b", Name: "B · 74 kW, climb propeller", Note: "The bigger engine of the same family.", Aircraft: demoAircraft(74e3, 92, 1.75, 0.9)}
	b.Basis = demoBasis(&b.Aircraft)
	s.Variants = append(s.Variants, b)
	return s
}

// demoAircraft is the invented homebuilt with an engine of the rated power in W
// and mass in kg, turning a propeller of the diameter in m whose pitch is
// stretched by the factor.
func demoAircraft(rated, mass, diameter, pitch float64) aircraft.Spec {
	a := typicalAircraft()
	f := &a.Airframe
	f.WingArea, f.Span, f.CDMin = 12.1, 9.4, 0.0335
	a.Weights = aircraft.Weights{Empty: 298, MaxTakeOff: 650, ZeroFuelGiven: aircraft.NoZeroFuel, MaxZeroFuel: 650, Items: []aircraft.Item{{Name: "Pilot", Mass: 86}, {Name: "Passenger", Mass: 75}, {Name: "Baggage", Mass: 12}}}
	p := a.Powerplant.Model.(*powerplant.PistonPropeller)
	p.Mass = mass
	e := &p.Engine
	e.PowerGiven, e.Redline = powerplant.ByTable, 2800.0/60
	e.PowerCurve = nil
	// Share of rated power against rpm of an invented direct-drive four-stroke.
	for _, row := range [][2]float64{{1600, 0.52}, {1900, 0.65}, {2200, 0.785}, {2500, 0.91}, {2750, 1}, {2850, 1.015}} {
		e.PowerCurve = append(e.PowerCurve, []float64{row[0] / 60, row[1] * rated})
	}
	e.ConsumptionGiven = powerplant.ByTable
	e.ConsumptionCurve = [][]float64{{0.25, 1.03e-7}, {0.4, 8.9e-8}, {0.55, 8.2e-8}, {0.7, 8.0e-8}, {0.85, 8.4e-8}, {1.05, 9.4e-8}}
	e.IdleFlow = 5.5e-4
	pr := &p.Propeller
	pr.Diameter = diameter
	for _, row := range pr.Coefficients {
		// A coarser blade carries its curves to higher J, with thrust and power raised so that the efficiency stays.
		row[0] *= pitch
		row[1] *= math.Pow(pitch, 0.3)
		row[2] *= math.Pow(pitch, 1.3)
	}
	p.Fuel = powerplant.FuelTank{Kind: "avgas-100ll", FuelGiven: powerplant.ByVolume, Volume: 0.088, Capacity: 0.1, Unusable: 0.002, Mass: 63.36, Density: 720}
	return a
}

// demoBasis gives the invented inputs bases as a builder half way through a project would have them.
func demoBasis(a *aircraft.Spec) map[string]Basis {
	b := map[string]Basis{}
	set := func(kind string, paths ...string) {
		for _, p := range paths {
			b[p] = Basis{Kind: kind}
		}
	}
	set(Measured, "airframe.wing_area", "airframe.span", "airframe.wing_height", "weights.empty", "powerplant.values.propeller.diameter", "powerplant.values.mass")
	set(Calculated, "airframe.clean.cl_max", "airframe.take_off.cl_max", "airframe.landing.cl_max", "airframe.ground_cl", "weights.max_take_off", "airframe.never_exceed",
		"limits.positive", "limits.negative", "limits.cruise", "limits.dive")
	set(Estimated, "airframe.cd_min", "airframe.efficiency", "airframe.cl_min_drag", "airframe.take_off.delta_cd", "airframe.landing.delta_cd",
		"airframe.take_off.delta_clm", "airframe.landing.delta_clm", "airframe.clean.delta_cd", "airframe.clean.delta_clm", "limits.negative_cl",
		"powerplant.values.engine.installation_loss", "powerplant.values.engine.accessory_power", "powerplant.values.propeller.coefficients", "powerplant.values.engine.idle_flow")
	set(Maker, "powerplant.values.engine.power_curve", "powerplant.values.engine.consumption_curve", "powerplant.values.engine.redline", "powerplant.values.engine.gear_ratio",
		"powerplant.values.engine.critical_altitude", "powerplant.values.fuel.volume", "powerplant.values.fuel.capacity", "powerplant.values.fuel.unusable", "powerplant.values.fuel.density")
	for i := range a.Weights.Items {
		set(Estimated, fmt.Sprintf("weights.items[%d].mass", i))
	}
	b["airframe.cd_min"] = Basis{Kind: Estimated, PlusMinus: 0.003, Note: "from similar aircraft"}
	return b
}
