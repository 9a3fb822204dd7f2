package report

import (
	"archive/zip"
	"bytes"
	"fmt"
	"strings"

	"legwright/internal/perf/units"
)

// Units of a file of numbers: one of the unit systems, or SI for programs.
type Units string

// SI asks for the base units of the engine.
const SI Units = "si"

// FileUnits lists what a file can be written in.
func FileUnits() []Units {
	list := make([]Units, 0, len(units.Systems)+1)
	for _, s := range units.Systems {
		list = append(list, Units(s))
	}
	return append(list, SI)
}

// Label says the units in words.
func (u Units) Label() string {
	if u == SI {
		return "SI base units"
	}
	return units.System(u).Label()
}

// of is the unit in which numbers of the quantity are written.
func (u Units) of(q units.Quantity) units.Unit {
	if u == SI {
		return units.Unit{Symbol: q.SI(), Scale: 1}
	}
	return units.System(u).Unit(q)
}

// mark is the byte order mark of UTF-8. Spreadsheets on some systems read a file without it
// in the code page of the place, and make "mÂ²" of m² and rubbish of names with accents; with it
// they read it as what it is. Programs skip it: Python calls this encoding utf-8-sig.
const mark = "\ufeff"

// CSV writes the table as RFC 4180 asks: commas, CRLF, quotes where needed; a head line
// with the units in brackets, and numbers in full with a point.
func (t *Table) CSV(u Units) []byte {
	var b bytes.Buffer
	b.WriteString(mark)
	remarks := t.remarks()
	var line []string
	for _, c := range t.Columns {
		line = append(line, field(c.fileHead(u)))
	}
	if remarks != nil {
		line = append(line, "Remark")
	}
	record(&b, line)
	for i, row := range t.Rows {
		line = line[:0]
		for j, c := range t.Columns {
			line = append(line, c.inFile(&row[j], u))
		}
		if remarks != nil {
			line = append(line, field(remarks[i]))
		}
		record(&b, line)
	}
	return b.Bytes()
}

// fileHead is the column's head with its unit in brackets.
func (c Column) fileHead(u Units) string {
	switch c.kind {
	case number:
		if sym := u.of(c.Quantity).Symbol; sym != "" {
			return c.Head + " [" + sym + "]"
		}
		return c.Head + " [1]"
	case fixed:
		return c.Head + " [1]"
	}
	return c.Head
}

func (c Column) inFile(cell *Cell, u Units) string {
	switch {
	case c.kind == unit:
		if !cell.has {
			return ""
		}
		if sym := u.of(cell.quantity).Symbol; sym != "" {
			return field(sym)
		}
		return "1"
	case cell.has && c.kind == fixed:
		return plain(cell.si)
	case cell.has:
		return plain(u.of(c.quantity(cell)).FromSI(cell.si))
	case c.numeric() && cell.word == "–":
		return "none"
	}
	return field(cell.word)
}

// remarks are the reasons of each row's cells without a number; nil when no row has any.
func (t *Table) remarks() []string {
	list := make([]string, len(t.Rows))
	found := false
	for i, row := range t.Rows {
		for j := range row {
			if why := row[j].why; why != "" && !strings.Contains(list[i], why) {
				list[i] = strings.TrimSpace(list[i] + " " + why)
				found = true
			}
		}
	}
	if !found {
		return nil
	}
	return list
}

func record(b *bytes.Buffer, fields []string) {
	b.WriteString(strings.Join(fields, ","))
	b.WriteString("\r\n")
}

// field makes free text safe in a file: quoted as RFC 4180 asks, and with an apostrophe
// before what a spreadsheet would take for a formula (OWASP, CSV Injection). Numbers do not
// come here, so a negative one stays as it is.
func field(s string) string {
	// A line break of its own would be read back as another by some; and what is no UTF-8 is no text.
	s = strings.ToValidUTF8(strings.ReplaceAll(s, "\r\n", "\n"), "\ufffd")
	if s != "" && strings.ContainsRune("=+-@\t\r\n＝＋－＠", []rune(s)[0]) {
		s = "'" + s
	}
	// A spreadsheet that is set to semicolons would begin a cell after one.
	if strings.ContainsAny(s, "\",;\t\r\n") || s != strings.TrimSpace(s) {
		s = `"` + strings.ReplaceAll(s, `"`, `""`) + `"`
	}
	return s
}

// Zip is every table as a file, with a text that says what they are.
func (r *Report) Zip(u Units) ([]byte, error) {
	tables := r.Tables()
	var b bytes.Buffer
	z := zip.NewWriter(&b)
	add := func(name string, text []byte) error {
		w, err := z.CreateHeader(&zip.FileHeader{Name: name, Method: zip.Deflate, Modified: r.Saved.UTC()})
		if err != nil {
			return err
		}
		_, err = w.Write(text)
		return err
	}
	if err := add("README.txt", r.readme(tables, u)); err != nil {
		return nil, err
	}
	for i := range tables {
		if err := add(tables[i].Name+".csv", tables[i].CSV(u)); err != nil {
			return nil, err
		}
	}
	if err := z.Close(); err != nil {
		return nil, err
	}
	return b.Bytes(), nil
}

// readme says what the files are, in lines that any editor shows.
func (r *Report) readme(tables []Table, u Units) []byte {
	var b strings.Builder
	line := func(format string, a ...interface{}) { fmt.Fprintf(&b, format+"\r\n", a...) }
	spec, v := r.Study.Project.Spec, r.Study.Variant()
	line("Predicted performance: %s", oneLine(spec.Name))
	line("Variant: %s", oneLine(v.Name))
	line("Revision: %d, saved %s", r.Revision, r.saved())
	line("Units: %s", u.Label())
	line("")
	line("CAUTIONS")
	for i, c := range r.Cautions() {
		line("%d. %s", i+1, c)
	}
	line("")
	line("THE FILES")
	line("Comma-separated values as RFC 4180 describes them, in UTF-8 with a byte order mark, so that")
	line("spreadsheets read the signs right. The first line names the columns with their units in brackets;")
	line("[1] is a pure number. Numbers are in full, with a decimal point. Where there is no number stands")
	line("a word, with the reason in the column Remark. An apostrophe before a text keeps a spreadsheet from")
	line("taking it for a formula.")
	for i := range tables {
		t := &tables[i]
		line("")
		line("%s.csv: %s", t.Name, t.Title)
		if t.Note != "" {
			line("    %s", oneLine(t.Note))
		}
		if t.Reason != "" {
			line("    %s", oneLine(t.Reason))
		}
	}
	return []byte(mark + b.String())
}

// oneLine keeps what a user wrote from looking like lines of the program's own.
func oneLine(s string) string { return strings.Join(strings.Fields(s), " ") }
