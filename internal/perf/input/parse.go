package input

import (
	"math"
	"regexp"
	"strconv"
	"strings"

	"legwright/internal/perf/units"
)

// Parse reads what a person typed as a value of n, with or without a unit, into
// the SI unit. A number alone is in the unit in which sys shows the quantity.
// Compound values add up ("13 lb 11 oz", "5 ft 10 in"). The bound variable is not touched.
func (n *Number) Parse(text string, sys units.System) (float64, error) {
	v, err := n.Spec.Parse(text, sys)
	if err != nil {
		return 0, err
	}
	return v, n.Check(v)
}

// Parse reads text as a value of s without checking its range. What rounds to
// a bound in the seven digits that a field shows is that bound, so that a
// field holding it can be sent back.
func (s *Spec) Parse(text string, sys units.System) (float64, error) {
	fail := func(err error, accepts string) (float64, error) {
		return 0, &Error{Path: s.Name, Spec: s, Text: strings.TrimSpace(text), Accepts: accepts, Err: err}
	}
	rest := strings.TrimSpace(spaces.Replace(text))
	if rest == "" {
		return fail(ErrRequired, "")
	}
	total, parts := 0.0, 0
	sign := 1.0
	for rest != "" {
		m := leading.FindString(rest)
		if m == "" {
			return fail(ErrSyntax, "")
		}
		v, err := decimal(m)
		if err != nil {
			return fail(err, ambiguity(m))
		}
		var symbol string
		symbol, rest = cutUnit(rest[len(m):])
		unit, ok := find(s.Quantity, symbol, sys)
		if !ok {
			return fail(ErrUnit, "units accepted: "+symbols(s.Quantity))
		}
		switch {
		case parts == 0:
			if total = unit.ToSI(v); math.Signbit(v) {
				sign = -1
			}
		case unit.Offset != 0 || symbol == "" || math.Signbit(v):
			return fail(ErrSyntax, "")
		default:
			total += sign * unit.ToSI(v)
		}
		parts++
	}
	if math.IsInf(total, 0) || math.IsNaN(total) {
		return fail(ErrSyntax, "")
	}
	return s.snap(total), nil
}

// Take is the value in SI of a number written in the unit u, checked against the
// range of s. What only the last digits of a conversion put outside is the bound.
func (s *Spec) Take(written float64, u units.Unit) (float64, error) {
	v := u.ToSI(written)
	if s.Check(v) != nil {
		v = s.snap(v)
	}
	return v, s.Check(v)
}

// snap returns the bound that v, in SI, differs from by no more than the
// rounding of units.Plain and the last bits of a conversion, else v.
func (s *Spec) snap(v float64) float64 {
	const rounding = 5.1e-7
	for _, bound := range [2]float64{s.Min, s.Max} {
		if math.Abs(v-bound) <= rounding*math.Abs(bound) {
			return bound
		}
	}
	return v
}

// spaces maps the blanks and minus signs that people paste to plain ones.
var spaces = strings.NewReplacer("\u00a0", " ", "\u2009", " ", "\u202f", " ", "−", "-", "–", "-", "\t", " ")

// leading matches a number at the start: digits grouped by blanks or apostrophes, point or comma, exponent.
var leading = regexp.MustCompile(`^[+-]?(?:\d{1,3}(?:[ '’]\d{3})+(?:[.,]\d+)?|[\d][\d.,]*|[.,]\d+)(?:[eE][+-]?\d+)?`)

var (
	group     = regexp.MustCompile(`^[+-]?\d{1,3},\d{3}$`)
	thousands = regexp.MustCompile(`^[+-]?\d{1,3}(?:,\d{3})+\.\d+$|^[+-]?\d{1,3}(?:,\d{3}){2,}$`)
)

// decimal reads a number with a decimal point or comma.
func decimal(text string) (float64, error) {
	text = strings.NewReplacer(" ", "", "'", "", "’", "").Replace(text)
	switch commas := strings.Count(text, ","); {
	case thousands.MatchString(text):
		text = strings.ReplaceAll(text, ",", "")
	case group.MatchString(text) && !strings.HasPrefix(strings.TrimLeft(text, "+-"), "0,"):
		return 0, ErrAmbiguous
	case commas == 1 && !strings.Contains(text, "."):
		text = strings.Replace(text, ",", ".", 1)
	case commas > 0:
		return 0, ErrSyntax
	}
	v, err := strconv.ParseFloat(text, 64)
	if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
		return 0, ErrSyntax
	}
	return v, nil
}

func ambiguity(text string) string {
	return "write " + strings.Replace(text, ",", ".", 1) + " or " + strings.ReplaceAll(text, ",", "")
}

// cutUnit splits off the unit symbol that follows a number; the symbol ends where the next number begins.
func cutUnit(s string) (symbol, rest string) {
	s = strings.TrimSpace(s)
	for i, r := range s {
		if i > 0 && r >= '0' && r <= '9' && s[i-1] == ' ' {
			return strings.TrimSpace(s[:i]), s[i:]
		}
	}
	return s, ""
}

// find looks a unit symbol up among those of q; no symbol is the unit of sys.
func find(q units.Quantity, symbol string, sys units.System) (units.Unit, bool) {
	if symbol == "" {
		return sys.Unit(q), true
	}
	return q.Find(symbol)
}

func symbols(q units.Quantity) string {
	var list []string
	for _, u := range q.Units() {
		if u.Symbol == "" {
			list = append(list, "none")
			continue
		}
		list = append(list, u.Symbol)
	}
	return strings.Join(list, ", ")
}

// ParseRows reads a table typed or pasted one row a line, columns parted by a
// tab, a semicolon or blanks, in the units in which sys shows each column.
// Errors name the row. An empty text is an empty table.
func (t *Table) ParseRows(text string, sys units.System) ([][]float64, error) {
	rows := [][]float64{}
	line := 0
	for raw := range strings.Lines(strings.TrimPrefix(text, "\ufeff")) {
		raw = strings.TrimSpace(raw)
		if raw == "" || strings.HasPrefix(raw, "#") {
			continue
		}
		line++
		fail := func(err error) ([][]float64, error) {
			accepts := t.accepted(sys)
			if line == 1 && !strings.ContainsAny(raw, "0123456789") {
				accepts += "; heads and their units are read by an import, not here"
			}
			return nil, &Error{Path: t.Name, Text: "row " + strconv.Itoa(line) + ", " + raw, Accepts: accepts, Err: err}
		}
		cells := columns(raw)
		if len(cells) != len(t.Columns) {
			return fail(ErrSyntax)
		}
		row := make([]float64, len(cells))
		for j, c := range t.Columns {
			v, err := c.Parse(cells[j], sys)
			if err != nil {
				return fail(ErrSyntax)
			}
			row[j] = v
		}
		rows = append(rows, row)
	}
	return rows, nil
}

// columns parts a line. Empty cells at its end, which spreadsheets copy along, are none.
func columns(line string) []string {
	for _, sep := range []string{"\t", ";"} {
		if strings.Contains(line, sep) {
			return strings.Split(strings.TrimRight(line, sep+" "), sep)
		}
	}
	return strings.Fields(strings.ReplaceAll(line, ", ", " "))
}

func (t *Table) accepted(sys units.System) string {
	heads := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		heads[i] = lower(c.Label)
		if sym := sys.Unit(c.Quantity).Symbol; sym != "" {
			heads[i] += " in " + sym
		}
	}
	return "a row has " + strings.Join(heads, ", then ")
}

// Text writes the table as ParseRows reads it.
func (t *Table) Text(sys units.System) string {
	var b strings.Builder
	for _, row := range *t.Value {
		for j, v := range row {
			if j > 0 {
				b.WriteString("  ")
			}
			b.WriteString(sys.Entry(t.Columns[j].Quantity, v))
		}
		b.WriteByte('\n')
	}
	return b.String()
}
