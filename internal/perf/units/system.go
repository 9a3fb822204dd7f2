package units

import (
	"math"
	"strconv"
	"strings"
)

// A System chooses the unit in which each quantity is shown.
type System string

// The unit systems on offer. Their names are stored in project documents.
const (
	Metric   System = "metric"   // m, m/s, kg, kW
	Aviation System = "aviation" // ft, kt, lb, hp, as the aviation trade customarily writes
	Small    System = "small"    // SI with the decimals of a small unmanned aircraft
)

// Systems lists the unit systems in the order offered.
var Systems = []System{Metric, Aviation, Small}

// Label says the system's name in words.
func (s System) Label() string {
	switch s {
	case Aviation:
		return "aviation customary"
	case Small:
		return "small aircraft, SI"
	}
	return "metric"
}

// Valid reports whether s is one of Systems.
func (s System) Valid() bool { return s == Metric || s == Aviation || s == Small }

func (s System) shown(q Quantity) shown {
	r := &table[q]
	switch s {
	case Aviation:
		return r.aviation
	case Small:
		return r.small
	}
	return r.metric
}

// Unit returns the unit in which s shows q.
func (s System) Unit(q Quantity) Unit { return s.shown(q).unit }

// Decimals returns how many digits after the point s shows of q.
func (s System) Decimals(q Quantity) int { return s.shown(q).decimals }

// Number writes an SI value of q as a result is read: rounded to the quantity's
// decimals, thousands set off by a narrow no-break space, a true minus sign, no unit.
// Coefficients lose trailing zeros.
func (s System) Number(q Quantity, si float64) string {
	sh := s.shown(q)
	v := sh.unit.FromSI(si)
	text := Fixed(v, readable(v, sh.decimals))
	if q == Coefficient && strings.Contains(text, ".") {
		text = strings.TrimRight(strings.TrimRight(text, "0"), ".")
	}
	return text
}

// readable is how many digits after the point v needs so that a small aircraft's
// number does not round away: two significant digits where the quantity is shown
// in whole units, one where it would read zero; at most two more than usual. What
// rounds to zero even so is written as plain zero.
func readable(v float64, decimals int) int {
	a := math.Abs(v)
	need := decimals
	switch {
	case a == 0:
	case decimals == 0 && a < 9.95:
		need = 1 - int(math.Floor(math.Log10(a)))
	case a < 0.5*math.Pow(10, -float64(decimals)):
		need = -int(math.Floor(math.Log10(a)))
	}
	if need > decimals+2 {
		return decimals
	}
	return need
}

// Format writes an SI value of q with its unit, joined by a no-break space.
func (s System) Format(q Quantity, si float64) string {
	text, sym := s.Number(q, si), s.Unit(q).Symbol
	switch {
	case sym == "":
		return text
	case sym == "°":
		return text + sym
	}
	return text + "\u00a0" + sym
}

// Entry writes an SI value of q as it stands in an input field: up to seven
// significant digits, plain ASCII digits, no unit.
func (s System) Entry(q Quantity, si float64) string {
	return Plain(s.Unit(q).FromSI(si))
}

// Plain writes a number with up to seven significant digits and no exponent
// where it can be read without one.
func Plain(v float64) string {
	if v == 0 {
		return "0"
	}
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', 7, 64), 64)
	if err != nil {
		r = v
	}
	if a := math.Abs(r); a < 1e-6 || a >= 1e12 {
		return strconv.FormatFloat(r, 'g', -1, 64)
	}
	return strconv.FormatFloat(r, 'f', -1, 64)
}

// Fixed writes a number with the given digits after the point, a thin space
// between groups of three and a true minus sign.
func Fixed(v float64, decimals int) string {
	text := strconv.FormatFloat(math.Abs(v), 'f', decimals, 64)
	whole, frac, point := strings.Cut(text, ".")
	var b strings.Builder
	if v < 0 && strings.Trim(text, "0.") != "" {
		b.WriteString("−")
	}
	for i, d := range whole {
		if rest := len(whole) - i; i > 0 && rest%3 == 0 && len(whole) > 4 {
			b.WriteString("\u202f")
		}
		b.WriteRune(d)
	}
	if point {
		b.WriteString("." + frac)
	}
	return b.String()
}

// Step is the SI value of a difference of n of the unit in which s shows q, for
// grids whose steps are round where they are read.
func (s System) Step(q Quantity, n float64) float64 { return n * s.Unit(q).Scale }
