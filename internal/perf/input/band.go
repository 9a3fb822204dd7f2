package input

import (
	"math"
	"strings"

	"legwright/internal/perf/units"
)

// bands are the ways in which people write plus or minus; the first is how it is shown.
var bands = []string{"±", "+/-", "+-"}

// CutBand splits "0.034 ± 0.003" into the value and the half width of its band;
// stated is false when the text names no band.
func CutBand(text string) (value, band string, stated bool) {
	for _, sign := range bands {
		if before, after, ok := strings.Cut(text, sign); ok {
			return strings.TrimSpace(before), strings.TrimSpace(after), true
		}
	}
	return text, "", false
}

// WithBand writes an entry with the half width of its band, which is left out when it is 0.
func (n *Number) WithBand(sys units.System, value, band float64) string {
	text := sys.Entry(n.Quantity, value)
	if band > 0 {
		text += " ± " + units.Plain(band/sys.Step(n.Quantity, 1))
	}
	return text
}

// ParseBand reads the half width of the band around the value, in SI, as a
// person typed it: in the unit of the entry, in another of the same quantity, or
// in per cent of the value. It returns it in SI, 0 or more. It is not for quantities whose unit has a zero point of its own.
func (n *Number) ParseBand(text string, value float64, sys units.System) (float64, error) {
	width := Spec{Name: n.Name, Label: "The band of " + lower(n.Label), Quantity: n.Quantity, Min: 0, Max: math.Max(math.Abs(n.Min), math.Abs(n.Max))}
	if number, ok := strings.CutSuffix(text, "%"); ok && n.Quantity != units.Fraction {
		share := Spec{Name: n.Name, Label: width.Label, Quantity: units.Fraction, Min: 0, Max: 10}
		f, err := share.Parse(number+"%", sys)
		if err == nil {
			err = share.Check(f)
		}
		return f * math.Abs(value), err
	}
	v, err := width.Parse(text, sys)
	if err != nil {
		return 0, err
	}
	return v, width.Check(v)
}
