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

// piston is the typical piston powerplant, changed.
func piston(change func(*powerplant.PistonPropeller)) *powerplant.PistonPropeller {
	p := powerplant.Kinds[0].New().(*powerplant.PistonPropeller)
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
	// Power in step with the disc, from far too little to far too much.
	e.RatedPower = p.Diameter * p.Diameter * math.Exp(number("log disc loading", 7, 12))
	e.CriticalAltitude = rapid.SampledFrom([]float64{0, 0, 3000, 7000}).Draw(t, "critical altitude")
	e.InstallationLoss = number("installation loss", 0, 0.2)
	e.AccessoryPower = e.RatedPower * number("accessory share", 0, 0.05)
	e.IdleFlow = e.RatedPower * e.Consumption * number("idle share", 0, 0.1)
	ct, cp := number("static CT", 0.06, 0.14), number("static CP", 0.03, 0.09)
	j, bend := number("J of no thrust", 0.4, 1.4), number("bend", 1.2, 3)
	p.Coefficients = nil
	for i := range 12 {
		x := float64(i) / 10
		p.Coefficients = append(p.Coefficients, []float64{x * j, ct * (1 - math.Pow(x, bend)), cp * (1 - 0.8*math.Pow(x, bend+0.5))})
	}
	p.Speed = e.RatedSpeed / e.GearRatio * number("governed share", 0.7, 1)
	p.LossFactor = number("loss factor", 0.6, 0.95)
	p.Kind = rapid.SampledFrom([]string{powerplant.FixedPitch, powerplant.ConstantSpeed}).Draw(t, "propeller")
	return m
}

// drawCondition is air that a piston engine breathes, at an airspeed that the propeller of m covers.
func drawCondition(t *rapid.T, m *powerplant.PistonPropeller) powerplant.Condition {
	d := atmos.Day{Deviation: rapid.Float64Range(-30, 35).Draw(t, "deviation"), Humidity: rapid.Float64Range(0, 1).Draw(t, "humidity")}
	rows := m.Propeller.Coefficients
	fastest := rows[len(rows)-1][0] * m.Propeller.Diameter * m.Engine.Redline / m.Engine.GearRatio
	v := fastest * rapid.Float64Range(0, 0.97).Draw(t, "share of the fastest")
	return condition(t, d, rapid.Float64Range(-500, 8000).Draw(t, "hp"), v)
}
