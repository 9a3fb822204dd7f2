package report

import (
	"slices"
	"strconv"
	"strings"
	"unicode"

	"legwright/internal/perf/units"
)

// A Table is numbers in SI with their words. The same table is printed, rounded, and
// written to a file in full.
type Table struct {
	Name    string // of its file, without the ending
	Title   string
	Note    string // the condition that it holds for
	Columns []Column
	Rows    [][]Cell
	Reason  string  // why it has no rows, or stops short
	Group   []int   // columns whose cells stand on paper as a heading over the rows that share them
	Across  *Across // how it is printed when not as it stands
	Tested  bool    // paper leaves room for what the flight test says
}

// A Column is one column of a table.
type Column struct {
	Head     string
	Quantity units.Quantity
	kind     kind
	decimals int // on paper, for a fixed column
}

type kind uint8

const (
	text   kind = iota
	number      // of the column's quantity, with the decimals of the unit system
	fixed       // a pure number with the column's decimals
	mixed       // each cell has a quantity of its own; its unit stands beside it on paper
	unit        // the units of a mixed column, which only a file needs
)

func words(head string) Column                 { return Column{Head: head} }
func num(head string, q units.Quantity) Column { return Column{Head: head, Quantity: q, kind: number} }
func pure(head string, decimals int) Column {
	return Column{Head: head, kind: fixed, decimals: decimals}
}
func anyOf(head string) Column  { return Column{Head: head, kind: mixed} }
func unitOf(head string) Column { return Column{Head: head, kind: unit} }
func (c Column) numeric() bool  { return c.kind == number || c.kind == fixed || c.kind == mixed }
func (c Column) printed() bool  { return c.kind != unit }
func (c Column) quantity(cell *Cell) units.Quantity {
	if c.kind == mixed || c.kind == unit {
		return cell.quantity
	}
	return c.Quantity
}

// A Cell is a number in SI or, where there is none, a word for it and the reason.
type Cell struct {
	si       float64
	quantity units.Quantity // in a mixed column
	word     string         // instead of the number; the text of a text column
	why      string         // a sentence
	has      bool           // there is a number
}

func say(s string) Cell                    { return Cell{word: s} }
func value(si float64) Cell                { return Cell{si: si, has: true} }
func of(q units.Quantity, si float64) Cell { return Cell{si: si, quantity: q, has: true} }
func dash() Cell                           { return Cell{word: "–"} }
func (r *Report) none(word string, err error) Cell {
	return Cell{word: word, why: sentence(units.Explain(err).In(r.sys()))}
}

// valueOr is the number, or the reason why there is none.
func (r *Report) valueOr(si float64, err error) Cell {
	if err != nil {
		return r.none("none", err)
	}
	return value(si)
}

// shown writes the cell as it is printed.
func (c Column) shown(cell *Cell, sys units.System) string {
	if !cell.has {
		return cell.word
	}
	switch c.kind {
	case fixed:
		return units.Fixed(cell.si, c.decimals)
	case mixed:
		return sys.Format(cell.quantity, cell.si)
	}
	return sys.Number(c.Quantity, cell.si)
}

// head writes the column's head as it is printed.
func (c Column) head(sys units.System) string {
	if sym := sys.Unit(c.Quantity).Symbol; c.kind == number && sym != "" {
		return c.Head + ", " + sym
	}
	return c.Head
}

// An Across prints a long table wide: Down names the lines, Over the columns, and Values
// are what stands in the grid.
type Across struct {
	Down   int
	Over   int
	Values []int
	Word   string // before each head
	Says   string // what the values of one cell of the grid are, when there are several
}

// A grid is a table as it is printed, in words.
type grid struct {
	heads  []string
	right  []bool // columns that stand at the right
	groups []gridGroup
	whys   []string // reasons, one of each kind
	likes  map[string]bool
	more   bool // there are reasons that differ from one of whys in a number only
}

func newGrid() grid { return grid{likes: map[string]bool{}} }

type gridGroup struct {
	title string // empty when the table has no groups
	rows  [][]string
}

// printed lays the table out for paper.
func (t *Table) printed(sys units.System) grid {
	if t.Across != nil {
		return t.wide(sys)
	}
	g := newGrid()
	for i, c := range t.Columns {
		if c.printed() && !slices.Contains(t.Group, i) {
			g.heads, g.right = append(g.heads, c.head(sys)), append(g.right, c.numeric() && len(g.right) > 0)
		}
	}
	for i := range t.Rows {
		if title := t.groupTitle(t.Rows[i], sys); i == 0 || title != g.groups[len(g.groups)-1].title {
			g.groups = append(g.groups, gridGroup{title: title})
		}
		var row []string
		for j, c := range t.Columns {
			cell := &t.Rows[i][j]
			if c.printed() && !slices.Contains(t.Group, j) {
				row = append(row, c.shown(cell, sys))
			}
			g.note(cell)
		}
		group := &g.groups[len(g.groups)-1]
		group.rows = append(group.rows, row)
	}
	return g
}

// note keeps the reason of a cell, one of those that differ in nothing but numbers.
func (g *grid) note(c *Cell) {
	if c.why == "" {
		return
	}
	line := c.why
	if c.word != "none" && c.word != "–" {
		line = c.word + ": " + c.why
	}
	like := strings.Map(func(r rune) rune {
		if unicode.IsDigit(r) || strings.ContainsRune(".\u2212\u202f", r) {
			return -1
		}
		return r
	}, line)
	switch {
	case !g.likes[like]:
		g.likes[like] = true
		g.whys = append(g.whys, line)
	case !slices.Contains(g.whys, line):
		g.more = true
	}
}

// wide lays a long table out as its Across says.
func (t *Table) wide(sys units.System) grid {
	a := t.Across
	over := t.Columns[a.Over]
	g := newGrid()
	g.heads, g.right = []string{t.Columns[a.Down].head(sys)}, []bool{false}
	at := map[string]int{} // column of the grid by its head
	seen := map[string]int{}
	for _, row := range t.Rows {
		title := t.groupTitle(row, sys)
		group, ok := seen[title]
		if !ok {
			group = len(g.groups)
			seen[title] = group
			g.groups = append(g.groups, gridGroup{title: title})
		}
		head := a.Word + over.withUnit(&row[a.Over], sys)
		if t.Columns[a.Values[0]].kind == mixed {
			if sym := sys.Unit(row[a.Values[0]].quantity).Symbol; sym != "" {
				head += ", " + sym
			}
		}
		if _, ok := at[head]; !ok {
			at[head] = len(g.heads)
			g.heads, g.right = append(g.heads, head), append(g.right, true)
		}
		line := whole(t.Columns[a.Down].shown(&row[a.Down], sys))
		rows := &g.groups[group].rows
		n := slices.IndexFunc(*rows, func(r []string) bool { return r[0] == line })
		if n < 0 {
			n = len(*rows)
			*rows = append(*rows, []string{line})
		}
		var parts []string
		for _, v := range a.Values {
			parts = append(parts, t.Columns[v].bare(&row[v], sys))
			g.note(&row[v])
		}
		cell := strings.Join(parts, " / ")
		if !row[a.Values[0]].has { // the same word for each
			cell = parts[0]
		}
		for len((*rows)[n]) <= at[head] {
			(*rows)[n] = append((*rows)[n], "")
		}
		(*rows)[n][at[head]] = cell
	}
	for i := range g.groups {
		for j := range g.groups[i].rows {
			for len(g.groups[i].rows[j]) < len(g.heads) {
				g.groups[i].rows[j] = append(g.groups[i].rows[j], "")
			}
		}
	}
	return g
}

// groupTitle joins what the rows of a group share.
func (t *Table) groupTitle(row []Cell, sys units.System) string {
	var parts []string
	for _, i := range t.Group {
		parts = append(parts, t.Columns[i].withUnit(&row[i], sys))
	}
	return strings.Join(parts, ", ")
}

// withUnit writes a cell with its unit, to stand at the head of other cells.
func (c Column) withUnit(cell *Cell, sys units.System) string {
	if c.kind == number && cell.has {
		text := whole(sys.Format(c.Quantity, cell.si))
		if c.Quantity == units.TemperatureStep && cell.si > 0 {
			text = "+" + text
		}
		return text
	}
	return c.shown(cell, sys)
}

// whole drops zeros after the point of a number that stands for a round one: "0.0°" is 0°.
func whole(text string) string {
	before, after, found := strings.Cut(text, ".")
	rest := strings.TrimLeft(after, "0")
	if !found || rest == after || (rest != "" && unicode.IsDigit(rune(rest[0]))) {
		return text
	}
	return before + rest
}

// bare writes a cell without its unit, which the table says elsewhere.
func (c Column) bare(cell *Cell, sys units.System) string {
	if c.kind == mixed && cell.has {
		return sys.Number(cell.quantity, cell.si)
	}
	return c.shown(cell, sys)
}

// sentence makes a clause stand alone.
func sentence(s string) string {
	if s == "" {
		return ""
	}
	r := []rune(s)
	s = strings.ToUpper(string(r[0])) + string(r[1:])
	if strings.HasSuffix(s, ".") || strings.HasSuffix(s, "?") {
		return s
	}
	return s + "."
}

// plain writes a number in full for a program to read.
func plain(v float64) string {
	if v == 0 {
		return "0" // drops the sign of a negative zero
	}
	if a := max(v, -v); a >= 1e15 || a < 1e-6 {
		return strconv.FormatFloat(v, 'e', -1, 64)
	}
	return strconv.FormatFloat(v, 'f', -1, 64)
}
