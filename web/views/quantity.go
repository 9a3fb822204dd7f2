// Package views turns studies and documents into pages. A view model is made of
// strings that are already formatted and the few booleans that a page branches on.
package views

import (
	"strconv"
	"strings"

	"legwright/internal/perf/units"
)

// elementID makes an HTML id of a document path.
func elementID(path string) string {
	return "f-" + strings.NewReplacer(".", "-", "[", "-", "]", "", ":", "-", " ", "-").Replace(path)
}

// unitOf is the unit symbol of a quantity, for column heads: ", m" or nothing.
func unitOf(sys units.System, q units.Quantity) string {
	if sym := sys.Unit(q).Symbol; sym != "" {
		return ", " + sym
	}
	return ""
}

// signed writes a number with its sign.
func signed(sys units.System, q units.Quantity, si float64) string {
	text := sys.Format(q, si)
	if si > 0 && !strings.HasPrefix(text, "−") {
		return "+" + text
	}
	return text
}

// sentence makes a clause stand alone: a capital at the start and a full stop at the end.
func sentence(text string) string {
	if text == "" {
		return ""
	}
	r := []rune(text)
	first := strings.ToUpper(string(r[0]))
	text = first + string(r[1:])
	if strings.HasSuffix(text, ".") {
		return text
	}
	return text + "."
}

// plural writes a small count as a word at the start of a sentence.
func plural(n int) string {
	words := []string{"No", "One", "Two", "Three", "Four", "Five", "Six", "Seven", "Eight", "Nine"}
	if n >= 0 && n < len(words) {
		return words[n]
	}
	return strconv.Itoa(n)
}
