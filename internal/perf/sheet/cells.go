package sheet

import (
	"cmp"
	"fmt"
	"slices"
	"strings"
)

// A record is one line of cells, or a comment.
type record struct {
	line    int
	cells   []string // without blanks around them
	comment string   // set when the line is a comment
	after   bool     // a blank line or a comment stands before it
}

// delimiters are the signs that may part cells, in the order in which they are tried.
var delimiters = []struct {
	name string
	sign byte
	many string // in words
}{{Semicolon, ';', "semicolons"}, {Tab, '\t', "tabs"}, {Comma, ',', "commas"}, {Blanks, ' ', "blanks"}}

// lineEnds makes every end of a line a line feed; the quoted ones too.
var lineEnds = strings.NewReplacer("\r\n", "\n", "\r", "\n")

var errLines = fmt.Errorf("%w: it has more than %d lines", ErrTooLarge, MaxLines)

// cut parts text into records. Cells may stand in quotation marks, doubled within
// (RFC 4180, section 2). A mark inside a cell that does not begin with one is a
// sign like any other: inches are written so.
func cut(text string, sign byte) ([]record, error) {
	text = lineEnds.Replace(text)
	var list []record
	line, after := 1, false
	for text != "" {
		end := strings.IndexByte(text, '\n')
		if end < 0 {
			end = len(text)
		}
		switch head := strings.TrimSpace(text[:end]); {
		case head == "":
			text, after = text[min(end+1, len(text)):], true
			line++
			continue
		case head[0] == '#':
			list = append(list, record{line: line, comment: strings.TrimSpace(strings.Trim(strings.TrimLeft(head, "# "), ",;\t "))})
			text, after = text[min(end+1, len(text)):], true
			line++
			if len(list) > MaxLines {
				return nil, errLines
			}
			continue
		}
		cells, rest, lines, err := cutLine(text, sign)
		if err != nil {
			return nil, fmt.Errorf("line %d: %w", line, err)
		}
		if len(cells) > MaxColumns {
			return nil, fmt.Errorf("%w: line %d has %d columns, and at most %d are read", ErrTooLarge, line, len(cells), MaxColumns)
		}
		blank := strings.Join(cells, "") == ""
		if !blank {
			list = append(list, record{line: line, cells: cells, after: after})
		}
		if len(list) > MaxLines {
			return nil, errLines
		}
		text, after = rest, blank
		line += lines
	}
	return list, nil
}

// cutLine takes one record off the text and counts the lines that it takes.
func cutLine(text string, sign byte) (cells []string, rest string, lines int, err error) {
	if sign == ' ' {
		line, rest, _ := strings.Cut(text, "\n")
		return strings.Fields(line), rest, 1, nil
	}
	lines = 1
	for {
		for text != "" && text[0] != sign && (text[0] == ' ' || text[0] == '\t') {
			text = text[1:]
		}
		quoted := ""
		if strings.HasPrefix(text, `"`) {
			if quoted, text, err = cutQuoted(text[1:]); err != nil {
				return nil, "", 0, err
			}
			lines += strings.Count(quoted, "\n")
		}
		end := strings.IndexAny(text, string(sign)+"\n")
		if end < 0 {
			return append(cells, strings.TrimSpace(quoted+text)), "", lines, nil
		}
		cells = append(cells, strings.TrimSpace(quoted+text[:end]))
		ended := text[end] == '\n'
		text = text[end+1:]
		if ended || len(cells) > MaxColumns {
			return cells, text, lines, nil
		}
	}
}

// cutQuoted takes off what stands before the closing mark.
func cutQuoted(text string) (cell, rest string, err error) {
	var b strings.Builder
	for {
		before, after, found := strings.Cut(text, `"`)
		if !found {
			return "", "", ErrQuote
		}
		b.WriteString(before)
		if !strings.HasPrefix(after, `"`) {
			return b.String(), after, nil
		}
		b.WriteByte('"')
		text = after[1:]
	}
}

// signOf is the sign of a delimiter by its name.
func signOf(name string) (byte, bool) {
	for _, d := range delimiters {
		if d.name == name {
			return d.sign, true
		}
	}
	return 0, false
}

// split cuts the text at the delimiter of the settings, or at the one that fits best.
func (s *Sheet) split(text string) ([]record, error) {
	if sign, ok := signOf(s.Delimiter); ok {
		return cut(text, sign)
	}
	s.Delimiter = ""
	type fit struct {
		name, many string
		records    []record
		share      float64
	}
	var fits []fit
	var first error
	for _, d := range delimiters {
		records, err := cut(text, d.sign)
		if err != nil {
			first = cmp.Or(first, err)
			continue
		}
		fits = append(fits, fit{d.name, d.many, records, regular(records)})
	}
	if len(fits) == 0 {
		return nil, first
	}
	// A stable sort: blanks, which also stand inside cells, come last among equals.
	slices.SortStableFunc(fits, func(a, b fit) int { return cmp.Compare(b.share, a.share) })
	best := fits[0]
	if first != nil && (best.share == 0 || best.name == Blanks) {
		return nil, first // one cell a line, and blanks, take any text
	}
	if best.share == 0 {
		s.Delimiter = Semicolon // one column whatever parts it
		s.Found = append(s.Found, "one cell a line")
		return best.records, nil
	}
	for _, other := range fits[1:] {
		if other.name != Blanks && other.share > 0.95*best.share {
			s.Doubt = append(s.Doubt, fmt.Sprintf("Both %s and %s part this text into columns of numbers. Choose what stands between the columns.", best.many, other.many))
			return best.records, nil
		}
	}
	s.Delimiter = best.name
	s.Found = append(s.Found, best.many+" between the columns")
	return best.records, nil
}

// sample is how many lines are enough to tell how a text is written.
const sample = 400

// regular is how well a text is parted, 0 to 1: the share of lines with the usual number of
// cells, if that is more than one, times the share of cells that are numbers either way.
func regular(records []record) float64 {
	widths := map[int]int{}
	lines, cells, numbers := 0, 0, 0
	for _, r := range records {
		if r.comment != "" || len(r.cells) == 0 {
			continue
		}
		if lines++; lines > sample {
			break
		}
		if len(r.cells) > 1 {
			widths[len(r.cells)]++
		}
		for _, c := range r.cells {
			if c == "" {
				continue
			}
			cells++
			if isNumber(c) {
				numbers++
			}
		}
	}
	usual := 0
	for _, n := range widths {
		usual = max(usual, n)
	}
	if lines == 0 || cells == 0 {
		return 0
	}
	return float64(usual) / float64(min(lines, sample)) * float64(numbers) / float64(cells)
}
