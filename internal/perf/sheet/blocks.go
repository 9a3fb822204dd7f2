package sheet

import (
	"fmt"
	"slices"
	"strings"

	"legwright/internal/perf/units"
)

// content counts the cells of a record that are numbers and those that are other text.
func (r record) content() (numbers, texts int) {
	for _, c := range r.cells {
		switch {
		case c == "":
		case isNumber(c):
			numbers++
		default:
			texts++
		}
	}
	return numbers, texts
}

// A builder makes blocks of records.
type builder struct {
	blocks   []Block
	heads    []record // text since the last row of numbers
	title    string
	comments int
	left     []string // lines that belong to nothing
}

// arrange makes blocks of the records.
func (s *Sheet) arrange(records []record) {
	var b builder
	switch s.Heads {
	case NoHeads, OneHead, TwoHeads:
		b.fixed(records, slices.Index([]string{NoHeads, OneHead, TwoHeads}, s.Heads))
	default:
		s.Heads = ""
		for _, r := range records {
			b.add(r)
		}
		for _, r := range b.heads {
			b.leave(r, "has no numbers below it")
		}
	}
	s.Blocks = b.blocks
	s.Found = append(s.Found, b.words()...)
}

// fixed makes one block whose first records are heads.
func (b *builder) fixed(records []record, heads int) {
	for _, r := range records {
		switch numbers, texts := r.content(); {
		case r.comment != "":
			b.comments++
		case numbers+texts == 0:
		case heads > 0:
			b.heads = append(b.heads, r)
			heads--
		case len(b.blocks) == 0:
			b.begin(r)
		default:
			b.put(r)
		}
	}
}

// add takes the next record: words are heads or a title, numbers are rows.
func (b *builder) add(r record) {
	if r.comment != "" {
		b.comments++
		b.title = r.comment
		return
	}
	switch numbers, texts := r.content(); {
	case numbers+texts == 0:
	case numbers == 0 && texts == 1 && !b.unitRow(r):
		b.title = strings.Join(r.cells, "")
		b.heads = append(b.heads, r)
	case numbers == 0, len(b.blocks) == 0 && len(b.heads) == 0 && texts > numbers:
		b.heads = append(b.heads, r)
	case len(b.blocks) == 0 || len(b.heads) > 0 || r.after && b.again(r):
		b.begin(r)
	default:
		b.title = ""
		b.put(r)
	}
}

// again reports whether the first column, which has risen so far, starts anew.
func (b *builder) again(r record) bool {
	rows := b.blocks[len(b.blocks)-1].Rows
	if len(rows) < 2 {
		return false
	}
	first := func(cells []string) float64 {
		v, err := number(cells[0], Point)
		if err != nil {
			v, _ = number(cells[0], CommaSign)
		}
		return v
	}
	end := first(rows[len(rows)-1].Cells)
	return first(rows[len(rows)-2].Cells) < end && first(r.cells) < end
}

// begin starts a block with its first row. Heads are the last line of words, and
// below it a line of units; what stands above is a title.
func (b *builder) begin(r record) {
	block := Block{Line: r.line, Title: clip(b.title)}
	head := -1
	for i, h := range b.heads {
		if _, texts := h.content(); texts > 1 && !(i > 0 && b.unitRow(h)) || len(r.cells) == 1 {
			head = i
		}
	}
	below := head >= 0 && head+1 < len(b.heads) && b.unitRow(b.heads[head+1])
	switch {
	case below:
		block.Columns = columns(b.heads[head].cells, b.heads[head+1].cells)
	case head >= 0:
		block.Columns = columns(b.heads[head].cells, nil)
	case len(b.blocks) > 0:
		block.Columns = b.blocks[len(b.blocks)-1].Columns
	}
	for i, h := range b.heads {
		switch {
		case i == head || below && i == head+1:
		case strings.Join(h.cells, "") == b.title:
			b.leave(h, "is taken as a title")
		default:
			b.leave(h, "is no head of columns")
		}
	}
	b.blocks = append(b.blocks, block)
	b.heads, b.title = nil, ""
	b.put(r)
}

// put adds a row to the last block.
func (b *builder) put(r record) {
	block := &b.blocks[len(b.blocks)-1]
	block.Rows = append(block.Rows, Row{Line: r.line, Cells: r.cells})
	if more := len(r.cells) - len(block.Columns); more > 0 {
		block.Columns = append(slices.Clip(block.Columns), make([]Column, more)...)
	}
}

func (b *builder) leave(r record, why string) {
	b.left = append(b.left, fmt.Sprintf("line %d, “%s”, %s", r.line, clip(strings.TrimSpace(strings.Join(r.cells, " "))), why))
}

// words says what the blocks are.
func (b *builder) words() []string {
	var list []string
	rows := 0
	for _, block := range b.blocks {
		rows += len(block.Rows)
	}
	headed := len(b.blocks) > 0 && slices.ContainsFunc(b.blocks[0].Columns, func(c Column) bool { return c.Head != "" })
	switch {
	case len(b.blocks) == 0:
	case headed:
		list = append(list, "heads above the columns")
	default:
		list = append(list, "no heads above the columns")
	}
	list = append(list, counted(rows, "row"))
	if len(b.blocks) > 1 {
		list = append(list, counted(len(b.blocks), "block"))
	}
	if b.comments > 0 {
		list = append(list, counted(b.comments, "comment line")+" left out")
	}
	return append(list, b.left...)
}

func counted(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// unitRow reports whether every cell of a line of words states a unit.
func (b *builder) unitRow(r record) bool {
	if len(b.heads) == 0 {
		return false
	}
	for _, c := range r.cells {
		if c != "" && !isUnit(bare(c)) {
			return false
		}
	}
	return true
}

// columns takes heads apart; a unit in the row below counts where the head has none.
func columns(heads, below []string) []Column {
	list := make([]Column, max(len(heads), len(below)))
	for i := range list {
		c := &list[i]
		if i < len(heads) {
			c.Head = heads[i]
			c.Name, c.Unit = cutUnit(heads[i])
		}
		if i < len(below) && c.Unit == "" && below[i] != "" {
			c.Unit = bare(below[i])
			c.Head = strings.TrimSpace(c.Head + " " + below[i])
		}
	}
	return list
}

// cutUnit parts a head into name and unit: "Power [kW]", "rpm (1/min)", "Power, kW", "P / kW".
func cutUnit(head string) (name, unit string) {
	for _, pair := range []string{"[]", "()", "{}"} {
		open := strings.LastIndexByte(head, pair[0])
		if open > 0 && head[open-1] != '/' && head[len(head)-1] == pair[1] { // V/(n D) is no V in n D
			return strings.TrimSpace(head[:open]), strings.TrimSpace(head[open+1 : len(head)-1])
		}
	}
	for _, sign := range []string{",", " / ", " in "} {
		at := strings.LastIndex(head, sign)
		if at <= 0 {
			continue
		}
		if unit := strings.TrimSpace(head[at+len(sign):]); isUnit(unit) {
			return strings.TrimSpace(head[:at]), unit
		}
	}
	return head, ""
}

// bare is a unit without the brackets around it.
func bare(cell string) string { return strings.TrimSpace(strings.Trim(cell, "[](){} ")) }

// pure are the ways in which heads say that a number has no unit.
var pure = []string{"", "-", "–", "—", "1", "none", "n/a", "dimensionless"}

// isUnit reports whether text is a unit of any quantity, or says that there is none.
func isUnit(text string) bool {
	if slices.Contains(pure, strings.ToLower(text)) {
		return true
	}
	return slices.ContainsFunc(units.Quantities(), func(q units.Quantity) bool { _, ok := q.Find(text); return ok })
}

func clip(text string) string {
	if r := []rune(text); len(r) > 60 {
		return string(r[:60]) + "…"
	}
	return text
}
