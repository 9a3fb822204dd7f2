package charts

import (
	"math"

	"legwright/internal/perf/units"
)

// A measure writes one quantity in the unit and with the digits of a chart.
type measure struct {
	unit     units.Unit
	decimals int
}

// measureOf takes the unit of sys for q. An axis that is short for the digits of
// sys, such as the thrust of a small model in pounds, gets as many as it
// needs to tell 100 steps apart. The span is the length of the axis in the SI unit
// of q; 0 keeps the digits of sys.
func measureOf(sys units.System, q units.Quantity, span float64) measure {
	u := sys.Unit(q)
	return measure{u, max(sys.Decimals(q), decimalsFor(span/u.Scale/100))}
}

func (m measure) of(si float64) float64 { return m.unit.FromSI(si) }

// label writes an SI value with its unit as it stands in the drawing.
func (m measure) label(si float64) string {
	return readNumber(m.of(si), m.decimals) + "\u00a0" + m.unit.Symbol
}

// prose writes an SI value with its unit for a sentence, as the page does: there the thin
// space that the drawing sets off thousands with may break the line.
func (m measure) prose(si float64) string {
	return units.Fixed(m.of(si), m.decimals) + "\u00a0" + m.unit.Symbol
}

// series starts a curve of the measure over x; y is in SI.
func (m measure) series(name string, x, y []float64, class string) Series {
	s := Series{Name: name, Unit: m.unit.Symbol, X: x, Y: make([]float64, len(y)), Class: class, LabelAt: -1, Decimals: m.decimals}
	for i, v := range y {
		s.Y[i] = m.of(v)
	}
	return s
}

// cover rounds the end of an axis that begins at 0 up to a multiple of the step of
// five ticks or fewer. Ends rounded so coarsely hold still while an input is edited by
// a little; at most a third of the axis stays free.
func cover(v float64) float64 {
	if !(v > 0) || !usable(v) {
		return 1
	}
	step := tickStep(v/mostYTicks, "")
	return math.Ceil(v/step-1e-9) * step
}

// coverBelow is the lower end of an axis that holds v: 0, or a cover of what is below it.
func coverBelow(v float64) float64 {
	if !(v < 0) {
		return 0
	}
	return -cover(-v)
}

// dayWords says a deviation of temperature from standard in K.
func dayWords(sys units.System, deviation float64) string {
	m := measureOf(sys, units.TemperatureStep, 0)
	v := m.of(deviation)
	if math.Abs(v) < 0.05 {
		return "ISA"
	}
	if math.Abs(v-math.Round(v)) < 0.05 {
		m.decimals = 0
	}
	sign := "+"
	if v < 0 {
		sign = minusSign
	}
	return "ISA " + sign + m.prose(math.Abs(deviation))
}

// reason says why there is no answer.
func reason(sys units.System, err error) string { return units.Explain(err).In(sys) }

// massWords says a mass in kg with the digits that it needs.
func massWords(sys units.System, mass float64) string {
	return measureOf(sys, units.Mass, mass).prose(mass)
}
