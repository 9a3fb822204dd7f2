package atmos

import (
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// How the temperature of a day is given.
const (
	ByDeviation   = "deviation"
	ByTemperature = "temperature"
)

// Spec is a day as the user gives it.
type Spec struct {
	Given       string  `json:"given"`         // ByDeviation or ByTemperature
	Deviation   float64 `json:"isa_deviation"` // of temperature from standard, in K
	Temperature float64 `json:"temperature"`   // outside air temperature at the strip, in K
	Humidity    float64 `json:"humidity"`      // relative, 0 to 1
	QNH         float64 `json:"qnh"`           // altimeter setting in Pa
}

var (
	deviation = input.Spec{Name: "isa_deviation", Label: "Deviation from standard", Quantity: units.TemperatureStep, Min: -60, Max: 60,
		Note:    "Added to the standard temperature at every altitude.",
		Typical: &input.Typical{Low: -20, High: 30, Source: input.CommonPractice}}
	temperature = input.Spec{Name: "temperature", Label: "Temperature at the strip", Quantity: units.Temperature, Min: 213.15, Max: 333.15}
	humidity    = input.Spec{Name: "humidity", Label: "Relative humidity", Quantity: units.Fraction, Min: 0, Max: 1,
		Note: "Moist air is lighter and its vapour displaces oxygen: both thrust and lift fall."}
	qnh = input.Spec{Name: "qnh", Label: "QNH", Quantity: units.Pressure, Min: 85000, Max: 110000,
		Typical: &input.Typical{Low: 97000, High: 105000, Source: input.CommonPractice}}
)

// Inputs describes the day's inputs.
func (s *Spec) Inputs() []input.Entry {
	return []input.Entry{
		input.Pick("given", "Temperature given as", &s.Given,
			input.Option{Value: ByDeviation, Label: "deviation from standard"}, input.Option{Value: ByTemperature, Label: "outside air temperature"}),
		input.Num(&deviation, &s.Deviation).If(s.Given != ByTemperature),
		input.Num(&temperature, &s.Temperature).If(s.Given == ByTemperature),
		input.Num(&humidity, &s.Humidity),
		input.Num(&qnh, &s.QNH),
	}
}

// Day resolves the entered day for a strip at the pressure altitude hp in m.
func (s Spec) Day(hp float64) (Day, error) {
	if s.Given != ByTemperature {
		return Day{Deviation: s.Deviation, Humidity: s.Humidity}, nil
	}
	standard, _, err := Standard(hp)
	if err != nil {
		return Day{}, err
	}
	return Day{Deviation: s.Temperature - standard, Humidity: s.Humidity}, nil
}
