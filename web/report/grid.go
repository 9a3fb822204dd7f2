package report

import (
	"strings"

	"legwright/internal/perf/units"
)

// Distances of tables in points.
const (
	cellPad   = 4.0   // at each side of a cell
	rowPad    = 3.0   // below each line of a table
	widest    = 90.0  // that a word of a text column asks for before it is broken
	mostExtra = 26.0  // that a column gets beyond what it needs
	mostText  = 190.0 // that a text column asks for, however long its text
	keptLines = 8     // rows of at most so many lines are not broken over a page
	mostWhys  = 6     // reasons printed under a table; a file has all of them
)

// table prints a table under its title.
func (s *sheet) table(t *Table, sys units.System) {
	g := t.printed(sys)
	for _, list := range append([][]string{g.heads}, g.all()...) {
		for i := range list {
			list[i] = set(list[i])
		}
	}
	note := s.wrapped(set(t.Note), s.width, noteStyle)
	if t.Note == "" {
		note = nil
	}
	s.need(leading(tableTitle.size) + leading(noteStyle.size)*float64(len(note)) + 70)
	if t.Title != s.under { // which stands over it already
		s.put(s.left, s.y+tableTitle.size, 0, tableTitle, s.cut(set(t.Title), s.width, tableTitle))
		s.y += leading(tableTitle.size) + 1
	}
	for _, line := range note {
		s.put(s.left, s.y+noteStyle.size, 0, noteStyle, line)
		s.y += leading(noteStyle.size)
	}
	if t.Across != nil && t.Across.Says != "" {
		s.para(style{noteStyle.size, true, ink2}, "In each cell: "+t.Across.Says+".")
	}
	s.gap(3)
	if len(g.all()) > 0 {
		l := newLayout(s, &g)
		if t.Tested {
			l.tail = blankSpace
		}
		l.print()
	}
	s.reasons(t, &g)
	if t.Tested && len(g.all()) > 0 {
		s.blanks()
	}
	s.gap(11)
}

// reasons says why there is no number where there is none.
func (s *sheet) reasons(t *Table, g *grid) {
	warn := style{noteStyle.size, false, caution}
	s.para(warn, t.Reason)
	shown := g.whys[:min(len(g.whys), mostWhys)]
	for _, why := range shown {
		s.para(warn, why)
	}
	if g.more || len(shown) < len(g.whys) {
		s.para(warn, "Other cells have no number for reasons like these; the table's file gives each.")
	}
}

// blankSpace is the height that blanks take.
const blankSpace = 24.0

// blanks leaves room for what the flight test says.
func (s *sheet) blanks() {
	s.need(blankSpace)
	s.gap(9)
	x, y := s.left, s.y+smallStyle.size
	for _, b := range []struct {
		label string
		width float64
	}{{"tested:", 150}, {"at mass:", 60}, {"on:", 66}, {"by:", 66}} {
		s.put(x, y, 0, smallStyle, b.label)
		x += s.measure(b.label) + 3
		s.rule(x, x+b.width, y+1.5, 0.5, rule)
		x += b.width + 10
	}
	s.y += leading(smallStyle.size)
}

// all lists every row.
func (g *grid) all() [][]string {
	var list [][]string
	for _, group := range g.groups {
		list = append(list, group.rows...)
	}
	return list
}

// A layout is a grid with its columns measured.
type layout struct {
	*sheet
	grid   *grid
	widths []float64
	cell   style
	head   style
	heads  [][]string // lines of each column's head
	group  string     // title of the rows under way
	tail   float64    // height of what belongs under the last row
}

func newLayout(s *sheet, g *grid) *layout {
	l := &layout{sheet: s, grid: g, cell: cellStyle, head: headStyle}
	n := len(g.heads)
	least, natural, full := make([]float64, n), make([]float64, n), make([]float64, n)
	for i, head := range g.heads {
		s.use(l.head)
		for _, word := range strings.Split(head, " ") {
			least[i] = max(least[i], s.measure(word))
		}
		natural[i] = max(least[i], min(s.measure(head), 64))
		s.use(l.cell)
		for _, row := range g.all() {
			whole := s.measure(row[i])
			natural[i] = max(natural[i], whole)
			if g.right[i] {
				least[i] = max(least[i], whole)
				continue
			}
			full[i] = max(full[i], whole+2*cellPad)
			natural[i] = min(natural[i], mostText)
			for _, word := range strings.Split(row[i], " ") {
				least[i] = max(least[i], min(s.measure(word), widest))
			}
		}
		least[i] += 2 * cellPad
		natural[i] += 2 * cellPad
	}
	l.widths = shared(least, natural, s.width)
	for i := range l.widths { // what is left goes to texts that are longer than they asked for
		l.widths[i] += max(0, min(full[i]-l.widths[i], s.width-sum(l.widths)))
	}
	if sum(l.widths) > s.width+0.01 { // too much even so: smaller letters, and words are broken
		k := s.width / sum(l.widths)
		for i := range l.widths {
			l.widths[i] *= k
		}
		l.cell.size, l.head.size = max(5.5, l.cell.size*k), max(5.5, l.head.size*k)
	}
	for i, head := range g.heads {
		l.heads = append(l.heads, s.wrapped(head, l.widths[i]-2*cellPad, l.head))
	}
	return l
}

// shared gives columns between the least and the natural width, and a little more where there is room.
func shared(least, natural []float64, width float64) []float64 {
	w := make([]float64, len(least))
	needed, wanted := sum(least), sum(natural)
	for i := range w {
		switch {
		case wanted <= width:
			w[i] = natural[i] + min(mostExtra, (width-wanted)/float64(len(w)))
		case needed <= width:
			w[i] = least[i] + (natural[i]-least[i])*(width-needed)/(wanted-needed)
		default:
			w[i] = least[i]
		}
	}
	return w
}

func sum(v []float64) float64 {
	total := 0.0
	for _, x := range v {
		total += x
	}
	return total
}

func (l *layout) print() {
	l.printHead()
	for i, group := range l.grid.groups {
		l.group = group.title
		if group.title != "" {
			l.printGroup(group.title)
		}
		for j, row := range group.rows {
			under := 0.0
			if i == len(l.grid.groups)-1 && j == len(group.rows)-1 {
				under = l.tail
			}
			l.printRow(row, under)
		}
	}
}

func (l *layout) printHead() {
	most := 1
	for _, lines := range l.heads {
		most = max(most, len(lines))
	}
	h := leading(l.head.size)
	l.need(h*float64(most) + 40)
	l.y += h * float64(most)
	for i, lines := range l.heads {
		for j, line := range lines { // on the lower lines
			l.cellAt(i, l.y-h*float64(len(lines)-j)+l.head.size, l.head, line)
		}
	}
	l.y += 2
	l.rule(l.left, l.left+sum(l.widths), l.y, 0.6, rule)
	l.y += 2
}

// cellAt writes a line of a cell of column i with its baseline at y.
func (l *layout) cellAt(i int, y float64, t style, text string) {
	x := l.left + sum(l.widths[:i])
	if l.grid.right[i] {
		l.put(x+l.widths[i]-cellPad, y, 1, t, text)
		return
	}
	if i > 0 {
		x += cellPad
	}
	l.put(x, y, 0, t, text)
}

func (l *layout) printGroup(title string) {
	h := leading(groupStyle.size) + rowPad
	if l.y+3*h > l.bottom {
		l.newPage()
		l.printHead()
	}
	l.gap(2)
	l.box(l.left, l.y, sum(l.widths), h, shade)
	l.put(l.left+2, l.y+groupStyle.size+1, 0, groupStyle, l.cut(set(title), max(l.width-4, 0), groupStyle))
	l.y += h
}

// goOn continues the table on a new page.
func (l *layout) goOn() {
	l.newPage()
	l.printHead()
	if l.group != "" {
		l.printGroup(l.group + ", continued")
	}
}

// printRow prints a row that has the height under it on the same page, if it is not a long one.
func (l *layout) printRow(row []string, under float64) {
	cells, most := make([][]string, len(row)), 1
	for i, text := range row {
		room := l.widths[i] - 2*cellPad
		if i == 0 {
			room += cellPad
		}
		cells[i] = l.wrapped(text, room, l.cell)
		most = max(most, len(cells[i]))
	}
	h := leading(l.cell.size)
	if most <= keptLines && l.y+h*float64(most)+rowPad+under > l.bottom {
		l.goOn()
	}
	for j := range most {
		if l.y+h > l.bottom {
			l.goOn()
		}
		for i, lines := range cells {
			if j < len(lines) {
				l.cellAt(i, l.y+l.cell.size, l.cell, lines[j])
			}
		}
		l.y += h
	}
	l.y += rowPad - 1
	l.rule(l.left, l.left+sum(l.widths), l.y, 0.3, line2)
	l.y += 1
}
