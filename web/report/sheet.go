package report

import (
	"strings"

	"codeberg.org/go-pdf/fpdf"

	"legwright/web/charts"
)

// A colour of the light theme, as in the style sheets.
type colour struct{ r, g, b int }

var (
	ink     = colour{0x16, 0x22, 0x2c}
	ink2    = colour{0x44, 0x52, 0x5e}
	ink3    = colour{0x5c, 0x6a, 0x76}
	line2   = colour{0xdd, 0xe5, 0xea}
	rule    = colour{0x8a, 0x98, 0xa3}
	shade   = colour{0xf3, 0xf6, 0xf8}
	accent  = colour{0x0b, 0x6a, 0x6b}
	good    = colour{0x1d, 0x6b, 0x3f}
	bad     = colour{0xab, 0x1f, 0x2a}
	caution = colour{0x83, 0x53, 0x00}
)

// A style of text: size in points and colour.
type style struct {
	size   float64
	bold   bool
	colour colour
}

var (
	titleStyle   = style{20, true, ink}
	subStyle     = style{12, false, ink2}
	headingStyle = style{14, true, accent}
	tableTitle   = style{10, true, ink}
	bodyStyle    = style{9.5, false, ink}
	noteStyle    = style{8, false, ink2}
	cellStyle    = style{8, false, ink}
	headStyle    = style{7.5, false, ink2}
	groupStyle   = style{8, true, ink2}
	smallStyle   = style{7.5, false, ink3}
)

// leading is the height of a line of text of a size.
func leading(size float64) float64 { return 1.32 * size }

// A sheet is a document with a place on its page that moves down as things are put there.
// All its lengths are in points from the upper left corner.
type sheet struct {
	doc                *fpdf.Fpdf
	left, width        float64
	top, bottom, pageW float64
	y                  float64
	under              string  // title of the section under way
	kept               float64 // height at the foot of this page that is taken already
}

const (
	sideMargin = 54.0
	topMargin  = 62.0
	footMargin = 58.0
)

func newSheet(p Paper) *sheet {
	doc := fpdf.New("P", "pt", p.size, "")
	doc.SetAutoPageBreak(false, 0)
	doc.SetMargins(0, 0, 0)
	doc.SetCatalogSort(true)
	addFonts(doc)
	w, h := doc.GetPageSize()
	s := &sheet{doc: doc, left: sideMargin, width: w - 2*sideMargin, top: topMargin, bottom: h - footMargin, pageW: w}
	s.newPage()
	return s
}

func (s *sheet) newPage() {
	s.doc.AddPage()
	s.y = s.top
	s.bottom += s.kept
	s.kept = 0
}

// need starts a page where less than the height is left.
func (s *sheet) need(height float64) {
	if s.y+height > s.bottom && s.y > s.top {
		s.newPage()
	}
}

func (s *sheet) use(t style) {
	weight := ""
	if t.bold {
		weight = "B"
	}
	s.doc.SetFont(family, weight, t.size)
	s.doc.SetTextColor(t.colour.r, t.colour.g, t.colour.b)
}

func (s *sheet) measure(text string) float64 { return s.doc.GetStringWidth(text) }

// put writes one line with its baseline at y; align is 0 for the left end at x, 1 for the right.
func (s *sheet) put(x, y, align float64, t style, text string) {
	if text == "" {
		return
	}
	s.use(t)
	if align > 0 {
		x -= align * s.measure(text)
	}
	s.doc.Text(x, y, text)
}

// slack is how far a word may stand out, so that the width measured for it holds it.
const slack = 0.01

// wrapped breaks text between words, and words where they do not fit, into lines of at most a width.
func (s *sheet) wrapped(text string, width float64, t style) []string {
	s.use(t)
	var lines []string
	current := ""
	for _, word := range strings.FieldsFunc(text, func(r rune) bool { return r == ' ' }) {
		whole := word
		if current != "" {
			whole = current + " " + word
		}
		if s.measure(whole) <= width+slack {
			current = whole
			continue
		}
		if current != "" {
			lines = append(lines, current)
		}
		for s.measure(word) > width+slack {
			n := s.fitting(word, width)
			lines = append(lines, word[:n])
			word = word[n:]
		}
		current = word
	}
	return append(lines, current)
}

// fitting is how many bytes of a word fit in a width, one letter at least.
func (s *sheet) fitting(word string, width float64) int {
	fits := 0
	for i, r := range word {
		if end := i + len(string(r)); i == 0 || s.measure(word[:end]) <= width {
			fits = end
		} else {
			break
		}
	}
	return fits
}

// cut shortens a line to a width with an ellipsis.
func (s *sheet) cut(text string, width float64, t style) string {
	s.use(t)
	if s.measure(text) <= width {
		return text
	}
	r := []rune(text)
	for n := len(r) - 1; n > 0; n-- {
		if short := strings.TrimRight(string(r[:n]), " ,.") + "…"; s.measure(short) <= width {
			return short
		}
	}
	return ""
}

// para writes a paragraph over the width of the page.
func (s *sheet) para(t style, text string) {
	s.paraIn(s.left, s.width, t, text)
}

func (s *sheet) paraIn(x, width float64, t style, text string) {
	if text == "" {
		return
	}
	for _, line := range s.wrapped(set(text), width, t) {
		s.need(leading(t.size))
		s.put(x, s.y+t.size, 0, t, line)
		s.y += leading(t.size)
	}
}

func (s *sheet) gap(height float64) { s.y += height }

// heading starts a section, with a bookmark; it stays with what follows it.
func (s *sheet) heading(text string) {
	text = set(text)
	s.under = text
	s.need(150)
	if s.y > s.top {
		s.gap(16)
	}
	s.use(headingStyle)
	s.doc.Bookmark(text, 0, s.y)
	s.put(s.left, s.y+headingStyle.size, 0, headingStyle, text)
	s.y += leading(headingStyle.size) + 2
	s.rule(s.left, s.left+s.width, s.y, 0.7, accent)
	s.y += 8
}

func (s *sheet) rule(x0, x1, y, width float64, c colour) {
	s.doc.SetDrawColor(c.r, c.g, c.b)
	s.doc.SetLineWidth(width)
	s.doc.Line(x0, y, x1, y)
}

func (s *sheet) box(x, y, w, h float64, c colour) {
	s.doc.SetFillColor(c.r, c.g, c.b)
	s.doc.Rect(x, y, w, h, "F")
}

// chartScale shrinks a chart so that its words are about as large as those of a table.
const chartScale = 0.8

// chart draws a chart of a height on paper over the width of the page, under its title.
func (s *sheet) chart(c charts.Chart, height float64) {
	c.Width, c.Height = s.width/chartScale, height/chartScale
	title, lines := s.wrapped(set(c.Title), s.width, tableTitle), s.wrapped(set(c.Desc), s.width, noteStyle)
	s.need(leading(tableTitle.size)*float64(len(title)) + height + 6 + leading(noteStyle.size)*float64(len(lines)))
	for _, line := range title {
		s.put(s.left, s.y+tableTitle.size, 0, tableTitle, line)
		s.y += leading(tableTitle.size)
	}
	paper := newCanvas(s.doc, s.left, s.y+height)
	paper.Scale(chartScale, chartScale)
	c.Draw(paper)
	s.y += height + 6
	for _, line := range lines {
		s.put(s.left, s.y+noteStyle.size, 0, noteStyle, line)
		s.y += leading(noteStyle.size)
	}
	s.gap(10)
}
