package views

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/sheet"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// An ImportMap is the page on which a sheet is mapped onto a table and its rows are looked at.
type ImportMap struct {
	Frame
	Title      string
	File       string
	FileURL    string
	StartURL   string
	Action     string // address of this page
	ConfirmURL string
	Table      string // path of the table, for the form
	Found      string
	Doubt      []string
	Remember   string
	Reading    []Field // delimiter, decimal sign, heads
	Block      *Field
	Family     *GroupedField
	Sources    []SourceField
	Sort       bool
	SortNote   string
	Was        string // what the columns were chosen under
	Ready      bool
	Agrees     []string // what else the sheet states and the rows agree with
	Differs    []string // and what they do not agree with
	Errors     []RowProblem
	MoreWrong  string
	Counts     string // of the rows, in words
	Refused    []string
	Chart      ChartView
	Head       []string
	Rows       []ImportRow
	MoreRows   string
	Hidden     []Link // Label and URL are name and value of what the import takes along
	Basis      []Option
	Use        string // label of the box that makes the table count
	UseNow     bool
	Confirm    string // label of the button
	Idle       string
}

// A GroupedField is a choice whose options are grouped.
type GroupedField struct {
	Field
	Groups []OptionGroup
}

// An OptionGroup is a run of options under a label.
type OptionGroup struct {
	Label   string
	Options []Option
}

// A SourceField is where one column of the table comes from.
type SourceField struct {
	Label, Note  string
	Column, Unit Field
	Was          string // the column when the unit was chosen
	Caution      string
}

// A RowProblem is a cell that cannot be taken.
type RowProblem struct {
	Line, Column, Text, Why string
}

// An ImportRow is one row as it will be stored.
type ImportRow struct {
	Line  string
	Cells []string
}

// An ImportState is a sheet, how it is mapped, and what came of it.
type ImportState struct {
	File       int64
	Name       string
	Encoding   string
	Sheet      *sheet.Sheet // nil when it cannot be read
	Err        error        // why not
	Asked      sheet.Settings
	Block      *sheet.Block // nil when it is not decided
	Mapping    sheet.Mapping
	Filling    sheet.Filling
	Remembered string   // the file from which the mapping is remembered; empty when it is not
	Refused    []string // why the document does not take the rows
	Revision   int64
	Basis      string
	Use        bool
}

// Ready reports whether the sheet gives rows and nothing is wrong with any.
func (st ImportState) Ready() bool {
	return st.Sheet != nil && st.Block != nil && len(st.Sheet.Doubt)+len(st.Filling.Open)+len(st.Filling.Errors) == 0 && len(st.Filling.Rows) > 0
}

// Most of what the page lists.
const (
	mostProblems = 30
	mostRows     = 200
)

// NewImportMap makes the page.
func NewImportMap(t ImportTarget, st ImportState) ImportMap {
	own := fmt.Sprintf("/%d", st.File)
	p := ImportMap{Frame: t.frame("Import " + st.Name), Title: t.Title(), File: st.Name, FileURL: t.fileURL(st.File), StartURL: t.URL(""), Action: t.here() + "/import" + own, ConfirmURL: t.URL(own), Table: t.Path,
		Sort: st.Mapping.Sort, Idle: t.idle(), Refused: st.Refused}
	if st.Sheet == nil {
		p.Doubt = []string{sentence("This file cannot be read: " + st.Err.Error())}
		p.Reading = readings(st.Asked, sheet.Settings{})
		return p
	}
	p.Found, p.Doubt = sentence(strings.Join(append(append([]string(nil), st.Sheet.Found...), st.Encoding), "; ")), st.Sheet.Doubt
	p.Reading = readings(st.Asked, st.Sheet.Settings)
	p.Block = blockField(st)
	if p.Block != nil && st.Block == nil {
		p.Block.Error = "This sheet holds several blocks, and the table takes one. Choose which; they are not averaged."
	}
	if st.Block == nil {
		return p
	}
	if st.Remembered != "" {
		p.Remember = "Columns and units are filled in as at the last import with these heads, from " + st.Remembered + "."
	}
	p.families(t, st)
	p.sources(t, st)
	p.Was = WasUnder(st.Mapping)
	if len(st.Filling.Open) > 0 || len(st.Sheet.Doubt) > 0 {
		return p
	}
	p.result(t, st)
	return p
}

// WasUnder is what the choice of columns depends on: when it changes, they are chosen anew.
func WasUnder(m sheet.Mapping) string {
	family := m.Family
	if !strings.HasPrefix(family, sheet.OfColumns) {
		family = ""
	}
	return strings.Join([]string{m.Delimiter, m.Heads, m.Block, family}, " ")
}

func choice(name, label string, chosen string, options ...Option) Field {
	f := Field{Path: name, ID: "import-" + name, Label: label, Kind: "choice", Options: options}
	for i := range f.Options {
		f.Options[i].Selected = f.Options[i].Value == chosen
	}
	return f
}

// readings are the choices of how the text is read; each may be left to the program.
func readings(asked, found sheet.Settings) []Field {
	as := func(word string) string {
		if word == "" {
			return "find it"
		}
		return "found: " + word
	}
	delimiters := map[string]string{sheet.Comma: "comma", sheet.Semicolon: "semicolon", sheet.Tab: "tab", sheet.Blanks: "blanks"}
	decimals := map[string]string{sheet.Point: "point", sheet.CommaSign: "comma"}
	return []Field{
		choice("delimiter", "Between the columns", asked.Delimiter, Option{Value: "", Label: as(delimiters[found.Delimiter])}, Option{Value: sheet.Comma, Label: "comma ,"},
			Option{Value: sheet.Semicolon, Label: "semicolon ;"}, Option{Value: sheet.Tab, Label: "tab"}, Option{Value: sheet.Blanks, Label: "blanks"}),
		choice("decimal", "Decimal sign", asked.Decimal, Option{Value: "", Label: as(decimals[found.Decimal])}, Option{Value: sheet.Point, Label: "point 0.5"}, Option{Value: sheet.CommaSign, Label: "comma 0,5"}),
		choice("heads", "Heads", asked.Heads, Option{Value: "", Label: "find them"}, Option{Value: sheet.NoHeads, Label: "none"}, Option{Value: sheet.OneHead, Label: "first line"},
			Option{Value: sheet.TwoHeads, Label: "first line, units in the second"}),
	}
}

func blockField(st ImportState) *Field {
	if len(st.Sheet.Blocks) < 2 {
		return nil
	}
	options := []Option{{Value: "", Label: "choose …"}}
	for i, b := range st.Sheet.Blocks {
		label := fmt.Sprintf("block %d, from line %d", i+1, b.Line)
		if b.Title != "" {
			label += ": " + b.Title
		}
		options = append(options, Option{Value: sheet.BlockName(i), Label: label})
	}
	if st.Sheet.Alike() {
		options = append(options, Option{Value: sheet.All, Label: "all blocks as one table"})
	}
	f := choice("block", "Block", st.Mapping.Block, options...)
	return &f
}

// families offers what rows or columns can be chosen by, and says when one must be.
func (p *ImportMap) families(t ImportTarget, st ImportState) {
	groups := st.Block.Families()
	if len(groups) == 0 {
		return
	}
	f := GroupedField{Field: Field{Path: "family", ID: "import-family", Label: "Family"}}
	f.Options = []Option{{"", "every row", st.Mapping.Family == ""}}
	for _, g := range groups {
		if taken(g, st.Mapping) {
			continue
		}
		og := OptionGroup{Label: g.Label}
		for _, one := range g.List {
			og.Options = append(og.Options, Option{one.Value, one.Label, one.Value == st.Mapping.Family})
		}
		f.Groups = append(f.Groups, og)
	}
	first := lowerFirst(t.Entry.Table.Columns[0].Label)
	if st.Mapping.Family == "" && (st.Filling.Repeats || severalAt(t, st, groups)) {
		f.Error = fmt.Sprintf("This sheet seems to hold several families of rows: choose which goes in. The table holds one value for each %s, and families are not averaged.", first)
	}
	if len(f.Groups) > 0 {
		p.Family = &f
	}
}

// taken reports whether the texts of g are those of a column that fills one of the table.
func taken(g sheet.Families, m sheet.Mapping) bool {
	column, _, _ := strings.Cut(g.List[0].Value, "=")
	return slices.ContainsFunc(m.Columns, func(s sheet.Source) bool { return strconv.Itoa(s.Column) == column })
}

// severalAt reports whether a column of the table could come from several columns that differ in what stands behind "@".
func severalAt(t ImportTarget, st ImportState, groups []sheet.Families) bool {
	if !strings.HasPrefix(groups[0].List[0].Value, sheet.OfColumns) {
		return false
	}
	for _, c := range t.Entry.Table.Columns {
		if len(st.Block.Matches(c, "")) > 1 {
			return true
		}
	}
	return false
}

// sources are the choices of column and unit for each column of the table.
func (p *ImportMap) sources(t ImportTarget, st ImportState) {
	for i, spec := range t.Entry.Table.Columns {
		src := st.Mapping.Columns[i]
		columns := []Option{{Value: "0", Label: "choose …"}}
		for j := range st.Block.Columns {
			columns = append(columns, Option{Value: strconv.Itoa(j + 1), Label: shortened(st.Block.Label(j), 40)})
		}
		list := []Option{{Value: "", Label: "choose …"}}
		for _, u := range spec.Quantity.Units() {
			label := u.Symbol
			if label == "" {
				label = "none, a pure number"
			}
			list = append(list, Option{Value: sheet.UnitName(u), Label: label})
		}
		f := SourceField{Label: spec.Label, Note: spec.Note, Was: strconv.Itoa(src.Column),
			Column: choice("column-"+spec.Name, "Column for "+spec.Label, strconv.Itoa(src.Column), columns...), Unit: choice("unit-"+spec.Name, "Unit of "+spec.Label, src.Unit, list...)}
		if said := st.Block.UnitOf(src.Column, spec.Quantity); said != "" && src.Unit != "" && said != src.Unit {
			f.Caution = fmt.Sprintf("The sheet says %s here, and it is read in %s.", said, src.Unit)
		}
		for _, o := range st.Filling.Open {
			if o.Column == i {
				openProblem(&f, o.Err, st, spec)
			}
		}
		p.Sources = append(p.Sources, f)
	}
}

// openProblem says what is not decided at the field where it can be.
func openProblem(f *SourceField, err error, st ImportState, spec *input.Spec) {
	if errors.Is(err, sheet.ErrNoUnit) {
		f.Unit.Error = sentence(err.Error())
		return
	}
	f.Column.Error = sentence(err.Error())
	var heads []string
	for _, c := range st.Block.Matches(spec, st.Mapping.Family) {
		heads = append(heads, "“"+st.Block.Label(c-1)+"”")
	}
	if len(heads) > 1 {
		f.Column.Error += " Several could be it: " + strings.Join(heads, ", ") + "."
	}
}

// result shows the rows that come of the mapping and what is wrong with others.
func (p *ImportMap) result(t ImportTarget, st ImportState) {
	sys, table, fill := t.Spec.System(), t.Entry.Table, st.Filling
	for i, e := range fill.Errors {
		if i == mostProblems {
			p.MoreWrong = fmt.Sprintf("And %d more.", len(fill.Errors)-i)
			break
		}
		p.Errors = append(p.Errors, rowProblem(e, sys))
	}
	p.Counts = counts(fill, st.Mapping.Sort)
	if fill.Moved > 0 && !st.Mapping.Sort {
		p.SortNote = fmt.Sprintf("They do not rise now: sorting moves %s.", rowWords(fill.Moved))
	}
	if fill.Moved > 0 && st.Mapping.Sort {
		p.SortNote = rowWords(fill.Moved) + " moved."
	}
	p.Head = []string{"Line"}
	for _, c := range table.Columns {
		p.Head = append(p.Head, c.Label+unitOf(sys, c.Quantity))
	}
	for i, r := range fill.Rows {
		if i == mostRows {
			p.MoreRows = fmt.Sprintf("And %d more rows.", len(fill.Rows)-i)
			break
		}
		row := ImportRow{Line: strconv.Itoa(fill.Lines[i])}
		for j, c := range table.Columns {
			row.Cells = append(row.Cells, sys.Entry(c.Quantity, r[j]))
		}
		p.Rows = append(p.Rows, row)
	}
	if len(fill.Rows) > 0 {
		c := charts.ImportChart(table, t.Title()+": what comes and what is there.", fill.Rows, *table.Value, sys)
		c.Width, c.Height = 560, 300+110*float64(len(c.Panels)-1)
		p.Chart = chartView(c)
	}
	p.checks(fill, sys)
	p.Ready = st.Ready()
	p.confirm(t, st)
}

// agreement is how far a sheet's own figure may be from what its rows give, of the greatest
// value, and still be called the same: printed tables round to two or three digits.
const agreement = 0.02

// checks words how the rows compare with what else the sheet states.
func (p *ImportMap) checks(fill sheet.Filling, sys units.System) {
	for _, c := range fill.Checks {
		apart := sys.Format(units.Fraction, c.Worst)
		if c.Worst <= agreement {
			p.Agrees = append(p.Agrees, fmt.Sprintf("The sheet's column “%s” agrees with the %s that these rows give, to %s of its greatest value.", shortened(c.Head, 40), lowerFirst(c.Label), apart))
			continue
		}
		p.Differs = append(p.Differs, fmt.Sprintf("The sheet's column “%s” is not the %s that these rows give: in line %d it says “%s”, and the row gives %s. A column may be read in another unit or definition than it is written in.",
			shortened(c.Head, 40), lowerFirst(c.Label), c.Line, shortened(c.Text, 40), sys.Format(c.Quantity, c.Found)))
	}
}

// confirm is the form that stores the rows that are shown, however the fields above it stand by then.
func (p *ImportMap) confirm(t ImportTarget, st ImportState) {
	m := st.Mapping
	p.Hidden = []Link{{Label: "table", URL: t.Path}, {Label: "shown", URL: "1"}, {Label: "was", URL: WasUnder(m)}, {Label: "revision", URL: strconv.FormatInt(st.Revision, 10)},
		{Label: "delimiter", URL: st.Asked.Delimiter}, {Label: "decimal", URL: st.Asked.Decimal}, {Label: "heads", URL: st.Asked.Heads}, {Label: "block", URL: m.Block}, {Label: "family", URL: m.Family}}
	if m.Sort {
		p.Hidden = append(p.Hidden, Link{Label: "sort", URL: "1"})
	}
	for i, c := range t.Entry.Table.Columns {
		column := strconv.Itoa(m.Columns[i].Column)
		p.Hidden = append(p.Hidden, Link{Label: "column-" + c.Name, URL: column}, Link{Label: "was-" + c.Name, URL: column}, Link{Label: "unit-" + c.Name, URL: m.Columns[i].Unit})
	}
	p.Basis = basisOptions(t.Spec.Variants[t.Index].BasisOf(t.Path).Kind, st.Basis)
	if t.Entry.Idle && t.Choice != nil {
		p.Use, p.UseNow = fmt.Sprintf("Set “%s” to “%s”, so that the table counts", t.Choice.Label(), t.Option.Label), st.Use
	}
	p.Confirm = fmt.Sprintf("Import these %d rows", len(st.Filling.Rows))
}

func rowProblem(e sheet.RowError, sys units.System) RowProblem {
	p := RowProblem{Column: shortened(e.Column, 40), Text: shortened(e.Text, 40), Why: sentence(e.Err.Error())}
	if in, ok := errors.AsType[*input.Error](e.Err); ok {
		p.Why = sentence(in.Sentence(sys))
	}
	if e.Line > 0 {
		p.Line = strconv.Itoa(e.Line)
	}
	return p
}

// counts says how many rows come and how many do not.
func counts(f sheet.Filling, sorted bool) string {
	wrong := map[int]bool{}
	for _, e := range f.Errors {
		wrong[e.Line] = true
	}
	text := rowWords(len(f.Rows)) + " can be read"
	if len(f.Errors) > 0 {
		text += fmt.Sprintf("; %s mending, and nothing is imported before", linesNeed(len(wrong)))
	}
	if f.Skipped > 0 {
		text += fmt.Sprintf("; %s empty in these columns and left out", rowsAre(f.Skipped))
	}
	if sorted && f.Moved > 0 {
		text += fmt.Sprintf("; sorted, which moved %s", rowWords(f.Moved))
	}
	return sentence(text)
}

func rowWords(n int) string {
	if n == 1 {
		return "1 row"
	}
	return fmt.Sprintf("%d rows", n)
}

func rowsAre(n int) string {
	if n == 1 {
		return "1 row is"
	}
	return fmt.Sprintf("%d rows are", n)
}

func linesNeed(n int) string {
	if n == 1 {
		return "1 line needs"
	}
	return fmt.Sprintf("%d lines need", n)
}

func shortened(text string, n int) string {
	if r := []rune(text); len(r) > n {
		return string(r[:n]) + "…"
	}
	return text
}
