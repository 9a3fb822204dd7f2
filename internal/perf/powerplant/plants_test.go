package powerplant_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/powerplant"
)

// heat is the lower heating value of aviation gasoline in J/kg: ASTM D910 minimum, from memory.
const heat = 43.5e6

// piston is an invented piston powerplant of these tests, changed.
func piston(change func(*powerplant.PistonPropeller)) *powerplant.PistonPropeller {
	p := &powerplant.PistonPropeller{
		Mass: 95,
		Engine: powerplant.PistonEngine{
			PowerGiven: powerplant.ByRating, RatedPower: 75e3, RatedSpeed: 45, Redline: 46,
			PowerCurve: [][]float64{{30, 50e3}, {40, 68e3}, {46, 76e3}}, GearRatio: 1, InstallationLoss: 0.03, AccessoryPower: 500,
			ConsumptionGiven: powerplant.ByConstant, Consumption: 8.1e-8, ConsumptionCurve: [][]float64{{0.3, 9.5e-8}, {0.6, 8.2e-8}, {1, 8.6e-8}}, IdleFlow: 8e-4,
		},
		Propeller: powerplant.Propeller{
			Kind: powerplant.FixedPitch, Diameter: 1.75, Speed: 45, LossFactor: 0.85,
			Coefficients: [][]float64{
				{0, 0.0960, 0.0450}, {0.1, 0.0945, 0.0455}, {0.2, 0.0915, 0.0457}, {0.3, 0.0865, 0.0452}, {0.4, 0.0790, 0.0437}, {0.5, 0.0690, 0.0408},
				{0.6, 0.0570, 0.0365}, {0.7, 0.0430, 0.0303}, {0.8, 0.0275, 0.0222}, {0.9, 0.0110, 0.0122}, {0.96, 0.0006, 0.0053}, {1.0, -0.0065, 0.0005},
			},
		},
		Fuel: powerplant.FuelTank{Kind: "avgas-100ll", FuelGiven: powerplant.ByVolume, Volume: 0.09, Capacity: 0.1, Unusable: 0.002, Mass: 64.8, Density: 720},
	}
	if change != nil {
		change(p)
	}
	return p
}

func constantSpeed(p *powerplant.PistonPropeller) { p.Propeller.Kind = powerplant.ConstantSpeed }
func turbocharged(p *powerplant.PistonPropeller)  { p.Engine.CriticalAltitude = 4000 }
func tables(p *powerplant.PistonPropeller) {
	p.Engine.PowerGiven, p.Engine.ConsumptionGiven = powerplant.ByTable, powerplant.ByTable
}

func both(a, b func(*powerplant.PistonPropeller)) func(*powerplant.PistonPropeller) {
	return func(p *powerplant.PistonPropeller) { a(p); b(p) }
}

func build(t testing.TB, m powerplant.Model) powerplant.Powerplant {
	t.Helper()
	p, err := m.Build()
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func condition(t interface {
	Helper()
	Fatal(...any)
}, d atmos.Day, hp, tas float64) powerplant.Condition {
	t.Helper()
	a, err := d.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return powerplant.Condition{Air: a, TAS: tas}
}

// conditions covers cold to hot, low to high, at rest to fast for the typical powerplants.
func conditions(t testing.TB) []powerplant.Condition {
	var list []powerplant.Condition
	for _, d := range []atmos.Day{{}, {Deviation: -25}, {Deviation: 30, Humidity: 0.9}} {
		for _, hp := range []float64{-300, 1500, 4000, 9000} {
			for _, v := range []float64{0, 0.01, 5, 20, 35, 50, 65} {
				list = append(list, condition(t, d, hp, v))
			}
		}
	}
	return list
}

// drawPiston is a random engine on a random propeller whose table runs into windmilling.
func drawPiston(t *rapid.T) *powerplant.PistonPropeller {
	number := func(name string, low, high float64) float64 { return rapid.Float64Range(low, high).Draw(t, name) }
	m := piston(nil)
	e, p := &m.Engine, &m.Propeller
	p.Diameter = number("diameter", 0.2, 3)
	tip := number("tip speed", 80, 260)
	e.GearRatio = number("gear ratio", 0.8, 4)
	e.Redline = tip / (math.Pi * p.Diameter) * e.GearRatio
	e.RatedSpeed = e.Redline * number("rated share of redline", 0.7, 1)
	p.Coefficients = blade(number("static CT", 0.06, 0.14), number("J of no thrust", 0.4, 1.4), number("bend", 1.2, 3), number("best efficiency", 0.4, 0.9))
	cp := p.Coefficients[0][2]
	// From a third to five times what the propeller absorbs at rest and redline.
	e.RatedPower = number("power share", 0.3, 5) * cp * 1.225 * math.Pow(tip/math.Pi, 3) * p.Diameter * p.Diameter
	e.CriticalAltitude = rapid.SampledFrom([]float64{0, 0, 3000, 7000}).Draw(t, "critical altitude")
	e.InstallationLoss = number("installation loss", 0, 0.2)
	// Accessories that rivalled the propeller would leave two balances, one of them unstable.
	e.AccessoryPower = e.RatedPower * number("accessory share", 0, 0.02)
	e.IdleFlow = e.RatedPower * e.Consumption * number("idle share", 0, 0.1)
	p.Speed = e.RatedSpeed / e.GearRatio * number("governed share", 0.7, 1)
	p.LossFactor = number("loss factor", 0.6, 0.95)
	p.Kind = rapid.SampledFrom([]string{powerplant.FixedPitch, powerplant.ConstantSpeed}).Draw(t, "propeller")
	return m
}

// blade is a table of J, CT, CP that runs a tenth past the J of no thrust and has
// the given best efficiency, or less where momentum theory asks for more static power.
func blade(ct, j, bend, best float64) [][]float64 {
	thrust := func(x float64) float64 { return ct * (1 - math.Pow(x, bend)) }
	power := func(x float64) float64 { return 1 - 0.8*math.Pow(x, bend+0.5) }
	cp := 0.0
	for x := 0.0; x < 1; x += 0.01 {
		cp = math.Max(cp, x*j*thrust(x)/power(x)/best)
		cp = math.Max(cp, 1.001*math.Pow(thrust(x), 1.5)/math.Sqrt(math.Pi/2)/power(x))
	}
	rows := make([][]float64, 12)
	for i := range rows {
		x := float64(i) / 10
		rows[i] = []float64{x * j, thrust(x), cp * power(x)}
	}
	return rows
}

// drawCondition is air that a piston engine breathes, at an airspeed at which
// the greatest speed leaves the propeller of drawPiston some thrust.
func drawCondition(t *rapid.T, m *powerplant.PistonPropeller) powerplant.Condition {
	d := atmos.Day{Deviation: rapid.Float64Range(-30, 35).Draw(t, "deviation"), Humidity: rapid.Float64Range(0, 1).Draw(t, "humidity")}
	rows := m.Propeller.Coefficients
	fastest := rows[10][0] * m.Propeller.Diameter * m.Engine.Redline / m.Engine.GearRatio
	v := fastest * rapid.Float64Range(0, 0.98).Draw(t, "share of the fastest")
	return condition(t, d, rapid.Float64Range(-500, 8000).Draw(t, "hp"), v)
}
