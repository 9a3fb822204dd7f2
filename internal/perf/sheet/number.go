package sheet

import (
	"cmp"
	"fmt"
	"math"
	"regexp"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
)

// spaces maps the blanks, minus signs and apostrophes of printed tables to plain ones.
var spaces = strings.NewReplacer("\u00a0", " ", "\u2009", " ", "\u202f", " ", "−", "-", "–", "-", "’", "'")

var (
	numeral  = regexp.MustCompile(`^([+-]?)([0-9.,' ]*[0-9][0-9.,' ]*)((?:[eE][+-]?[0-9]{1,4})?)$`)
	spaced   = regexp.MustCompile(`^\d{1,3}(?:[ ']\d{3})+(?:[.,]\d*)?$`)
	oneGroup = regexp.MustCompile(`^[1-9]\d{0,2}[.,]\d{3}$`)
	// Commas, or points, between thousands, and what comes after the other sign.
	commaGroups = regexp.MustCompile(`^\d{1,3}(?:,\d{3})+(?:\.\d*)?$`)
	pointGroups = regexp.MustCompile(`^\d{1,3}(?:\.\d{3})+(?:,\d*)?$`)
)

// longestNumber is above what any program writes, in bytes.
const longestNumber = 100

// body takes a cell apart: sign, digits with what parts them, exponent. Blanks and
// apostrophes between thousands are dropped; elsewhere they make the cell no number.
func body(cell string) (sign, digits, exponent string, ok bool) {
	if len(cell) > longestNumber {
		return "", "", "", false
	}
	if rest := strings.TrimLeft(cell, "+-"); len(cell)-len(rest) <= 1 && strings.ContainsAny(rest, "0123456789") && strings.Trim(rest, "0123456789.,") == "" {
		return cell[:len(cell)-len(rest)], rest, "", true // as most are, and much faster than the expression
	}
	m := numeral.FindStringSubmatch(spaces.Replace(cell))
	if m == nil {
		return "", "", "", false
	}
	digits = m[2]
	if strings.ContainsAny(digits, "' ") {
		if !spaced.MatchString(digits) {
			return "", "", "", false
		}
		digits = strings.NewReplacer(" ", "", "'", "").Replace(digits)
	}
	return m[1], digits, m[3], true
}

// isNumber reports whether a cell is a number with one decimal sign or the other.
func isNumber(cell string) bool {
	for _, sign := range []string{Point, CommaSign} {
		if _, err := number(cell, sign); err == nil {
			return true
		}
	}
	return false
}

// A cellError is a cell that is no number: why, and what would be one.
type cellError struct {
	err     error
	accepts string
}

func (e *cellError) Error() string { return e.err.Error() }
func (e *cellError) Unwrap() error { return e.err }

// number reads a cell written with the decimal sign. Where the other sign stands, it
// must part thousands beyond doubt.
func number(cell, decimal string) (float64, error) {
	sign, digits, exponent, ok := body(cell)
	if !ok {
		return 0, &cellError{err: input.ErrSyntax}
	}
	point, other, groups := ".", ",", commaGroups
	if decimal == CommaSign {
		point, other, groups = ",", ".", pointGroups
	}
	if strings.Contains(digits, other) {
		plain := strings.ReplaceAll(digits, other, "")
		switch sure := strings.Contains(digits, point) || strings.Count(digits, other) > 1; {
		case !sure && oneGroup.MatchString(digits):
			return 0, &cellError{input.ErrAmbiguous, fmt.Sprintf("write %s or %s", plain, strings.Replace(digits, other, point, 1))}
		case !sure || !groups.MatchString(digits):
			return 0, &cellError{input.ErrSyntax, "the decimal sign of this sheet is " + decimalWords[decimal]}
		}
		digits = plain
	}
	v, err := strconv.ParseFloat(sign+strings.Replace(digits, point, ".", 1)+exponent, 64)
	if err != nil || math.IsInf(v, 0) {
		return 0, &cellError{err: input.ErrSyntax}
	}
	return v, nil
}

var decimalWords = map[string]string{Point: "the point", CommaSign: "the comma"}

// decideDecimal finds the decimal sign. A cell such as 1,234 can be meant both ways and is no evidence.
func (s *Sheet) decideDecimal(records []record) {
	if s.Decimal == Point || s.Decimal == CommaSign {
		return
	}
	s.Decimal = ""
	var sure [2]record // with a decimal point, with a decimal comma
	var seen [2]string
	unsure := ""
	for _, r := range records {
		for _, c := range r.cells {
			_, digits, _, ok := body(c)
			if !ok || !strings.ContainsAny(digits, ".,") {
				continue
			}
			if oneGroup.MatchString(digits) && !(s.Delimiter == Comma && strings.Contains(digits, ".")) {
				unsure = cmp.Or(unsure, c)
				continue
			}
			for i, decimal := range []string{Point, CommaSign} {
				if _, err := number(c, decimal); err == nil && seen[i] == "" {
					sure[i], seen[i] = r, c
				}
			}
		}
	}
	switch {
	case seen[0] != "" && seen[1] != "":
		s.Doubt = append(s.Doubt, fmt.Sprintf("“%s” in line %d has a decimal point and “%s” in line %d a decimal comma. Choose which is the decimal sign.", seen[0], sure[0].line, seen[1], sure[1].line))
	case seen[1] != "":
		s.Decimal = CommaSign
		s.Found = append(s.Found, "decimal comma")
	case seen[0] != "":
		s.Decimal = Point
		s.Found = append(s.Found, "decimal point")
	case unsure != "":
		s.Doubt = append(s.Doubt, fmt.Sprintf("“%s” could mean two numbers, and no other cell tells which. Choose the decimal sign.", unsure))
	default:
		s.Decimal = Point
		s.Found = append(s.Found, "whole numbers only")
	}
}
