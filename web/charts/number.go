package charts

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

const (
	thinSpace = "\u2009"
	minusSign = "\u2212"
	noValue   = "–"
	maxPlain  = 1e9 // larger magnitudes are written with an exponent
)

// usable reports whether v can be drawn: finite and not absurdly large, so that
// differences and squares of coordinates stay finite.
func usable(v float64) bool { return math.Abs(v) <= 1e30 }

// plainNumber writes v in ASCII with a fixed number of digits after the point, for
// tables and for CSV.
func plainNumber(v float64, decimals int) string {
	decimals = min(max(decimals, 0), 9)
	if a := math.Abs(v); a >= maxPlain {
		return strings.Replace(strconv.FormatFloat(v, 'g', 4, 64), "e+", "e", 1)
	}
	t := strconv.FormatFloat(v, 'f', decimals, 64)
	if strings.HasPrefix(t, "-") && strings.Trim(t, "-0.") == "" {
		return t[1:] // no negative zero
	}
	return t
}

// readNumber writes v for reading: thin spaces between thousands and a true minus sign.
func readNumber(v float64, decimals int) string {
	t := plainNumber(v, decimals)
	sign := ""
	if strings.HasPrefix(t, "-") {
		sign, t = minusSign, t[1:]
	}
	if strings.Contains(t, "e") {
		return sign + strings.Replace(t, "e-", "e"+minusSign, 1)
	}
	whole, frac, _ := strings.Cut(t, ".")
	for i := len(whole) - 3; i > 0; i -= 3 {
		whole = whole[:i] + thinSpace + whole[i:]
	}
	if frac != "" {
		whole += "." + frac
	}
	return sign + whole
}

// clock writes seconds as hours and minutes, rounded to the minute.
func clock(seconds float64) string {
	if math.Abs(seconds) >= maxPlain {
		return plainNumber(seconds, 0)
	}
	m := int64(math.Round(math.Abs(seconds) / 60))
	sign := ""
	if seconds < 0 && m > 0 {
		sign = minusSign
	}
	return fmt.Sprintf("%s%d:%02d", sign, m/60, m%60)
}

// decimalsFor returns how many digits after the point tell apart values one step
// away from each other.
func decimalsFor(step float64) int {
	if !(step > 0) {
		return 0
	}
	return min(max(0, int(-math.Floor(math.Log10(step)+1e-9))), 9)
}
