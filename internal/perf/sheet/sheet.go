// Package sheet reads tables as spreadsheets write them: text of unknown
// encoding, delimiter and decimal sign becomes rows of numbers of a table of the
// document. What it finds it says; where two readings are possible it asks for a
// choice and takes neither.
package sheet

import (
	"errors"
	"fmt"
	"strings"
)

// Limits of what is read. A document is saved whole at each edit, so that a table
// of many rows would cost at every one of them.
const (
	MaxBytes   = 1 << 20
	MaxLines   = 10000
	MaxColumns = 100
	MaxRows    = 1000 // that may go into a table of the document
)

// What keeps a text from being read at all.
var (
	ErrEmpty     = errors.New("there is nothing in it")
	ErrTooLarge  = errors.New("it is too large")
	ErrNotText   = errors.New("it is not text")
	ErrQuote     = errors.New("a quotation mark is not closed")
	ErrUndecided = errors.New("not decided")
)

// Settings says how a sheet is to be read; what is empty is found from the text.
type Settings struct {
	Delimiter string `json:"delimiter"` // Comma, Semicolon, Tab or Blanks
	Decimal   string `json:"decimal"`   // Point or CommaSign
	Heads     string `json:"heads"`     // NoHeads, OneHead or TwoHeads
}

// Values of Settings.
const (
	Comma     = "comma"
	Semicolon = "semicolon"
	Tab       = "tab"
	Blanks    = "blanks"

	Point     = "point"
	CommaSign = "comma"

	NoHeads  = "none"
	OneHead  = "one"
	TwoHeads = "two"
)

// A Sheet is a text read as blocks of rows of cells.
type Sheet struct {
	Settings          // as read; Delimiter or Decimal is empty where they could not be decided
	Blocks   []Block  // each with at least one row
	Found    []string // what was found and left out, in words
	Doubt    []string // what the reader must decide first, in words
}

// A Block is a run of rows under one row of heads.
type Block struct {
	Title   string // of a line above it; empty when there is none
	Line    int    // of the first row, from 1
	Columns []Column
	Rows    []Row
}

// A Column is one column of a block.
type Column struct {
	Head string // the whole head as written; empty when there is none
	Name string // the head without its unit
	Unit string // as written beside the name or in the row below it; empty when none is stated
}

// A Row is one row of a block.
type Row struct {
	Line  int      // in the text, from 1
	Cells []string // without blanks around them
}

// Label names a column for a person.
func (b *Block) Label(i int) string {
	if i < len(b.Columns) && b.Columns[i].Head != "" {
		return b.Columns[i].Head
	}
	return fmt.Sprintf("column %d", i+1)
}

// Cell is the cell of row r in column i, empty where the row ends before it.
func (r Row) Cell(i int) string {
	if i < 0 || i >= len(r.Cells) {
		return ""
	}
	return r.Cells[i]
}

// Header joins the heads of the sheet's first block: sheets of one kind have the same.
func (s *Sheet) Header() string {
	if len(s.Blocks) == 0 {
		return ""
	}
	var heads []string
	for _, c := range s.Blocks[0].Columns {
		heads = append(heads, c.Name+"\x1f"+c.Unit)
	}
	return strings.Join(heads, "\x1e")
}

// Read reads text as a sheet. An error means that no cell of it can be read; what is
// only in doubt is in the sheet's Doubt.
func Read(text string, as Settings) (*Sheet, error) {
	s := &Sheet{Settings: as}
	records, err := s.split(text)
	if err != nil {
		return nil, err
	}
	s.decideDecimal(records)
	s.arrange(records)
	if len(s.Blocks) == 0 {
		return nil, fmt.Errorf("%w: no line of it holds a number", ErrEmpty)
	}
	return s, nil
}
