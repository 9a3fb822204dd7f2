package views

import (
	"fmt"
	"net/url"
	"strings"
	"time"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
)

// An ImportTarget is the table of a variant that an import fills.
type ImportTarget struct {
	ProjectID int64
	Spec      *project.Spec
	Index     int // of the variant
	Entry     input.Entry
	Path      string       // of the table within the variant's aircraft
	Choice    *input.Entry // which must hold Option for the table to count; nil when the table counts already
	Option    input.Option
}

// Title names the table with the part of the aircraft that it belongs to.
func (t ImportTarget) Title() string { return importTitle(t.Path, t.Entry) }

func importTitle(path string, e input.Entry) string {
	parts := strings.Split(path, ".")
	part := ""
	if len(parts) > 1 {
		part = strings.ReplaceAll(parts[len(parts)-2], "_", " ")
	}
	if part == "" || part == "values" || strings.HasPrefix(strings.ToLower(e.Table.Label), part) {
		return e.Table.Label
	}
	return strings.ToUpper(part[:1]) + part[1:] + " " + lowerFirst(e.Table.Label)
}

// here is the address of the variant.
func (t ImportTarget) here() string {
	return fmt.Sprintf("/projects/%d/variants/%s", t.ProjectID, t.Spec.Variants[t.Index].ID)
}

// URL is the address of the import page, or of what stands below it.
func (t ImportTarget) URL(below string) string { return importURL(t.here(), below, t.Path) }

func importURL(here, below, path string) string {
	return here + "/import" + below + "?table=" + url.QueryEscape(path)
}

// BenchURL leads to the table's field on the bench, or to the bench when the field is not shown there.
func (t ImportTarget) BenchURL(idle bool) string {
	if idle {
		return t.here()
	}
	return t.here() + "#" + elementID(t.Entry.Path) + "-field"
}

// frame is the frame of the pages of an import.
func (t ImportTarget) frame(title string) Frame {
	f := frameOf(t.Spec, t.Index, t.ProjectID, "/import", "")
	for i := range f.Variants {
		f.Variants[i].URL += "?table=" + url.QueryEscape(t.Path)
	}
	f.Title = title + " · " + f.Variant + " · " + f.Project
	return f
}

// offerImports gives each table of an aircraft the link to its import; here is the address of the variant.
func offerImports(groups []Group, here string) {
	for _, g := range groups {
		for _, b := range g.Blocks {
			for i := range b.Fields {
				f := &b.Fields[i]
				if _, path, ok := strings.Cut(f.Path, "].aircraft."); ok && f.Kind == "table" {
					f.Import = importURL(here, "", path)
				}
			}
		}
	}
}

// An ImportStart is the page on which a table and a file are chosen.
type ImportStart struct {
	Frame
	Title    string
	Tables   []Link
	Note     string
	Columns  []Row // of the table: what each is
	Idle     string
	Action   string
	Text     string // as typed or pasted
	Error    string
	Imported []ImportedItem
	Kept     []KeptItem
	Largest  string
}

// An ImportedItem is one time that the table was filled from a file.
type ImportedItem struct {
	Name, Note, OpenURL, FileURL string
}

// A KeptItem is a file kept with the project.
type KeptItem struct {
	Name, Note, OpenURL, FileURL, DiscardURL string
}

// A KeptFile is what the page knows of a file.
type KeptFile struct {
	ID    int64
	Name  string
	Saved time.Time
	Size  int64 // in bytes
	Uses  int
}

// A DoneImport is what the page knows of a filling.
type DoneImport struct {
	File     int64
	Name     string
	Variant  string
	Revision int64
	Saved    time.Time
}

// NewImportStart makes the page; tables are all that the variant has.
func NewImportStart(t ImportTarget, tables []ImportTarget, done []DoneImport, kept []KeptFile) ImportStart {
	p := ImportStart{Frame: t.frame("Import " + lowerFirst(t.Title())), Title: t.Title(), Note: t.Entry.Table.Note, Action: t.URL(""), Idle: t.idle()}
	for _, o := range tables {
		p.Tables = append(p.Tables, Link{o.Title(), o.URL(""), o.Path == t.Path})
	}
	sys := t.Spec.System()
	for _, c := range t.Entry.Table.Columns {
		p.Columns = append(p.Columns, Row{Label: c.Label, Value: c.Accepted(sys.Unit(c.Quantity)), Remark: c.Note})
	}
	for _, d := range done {
		who := d.Variant
		if i, ok := t.Spec.Variant(d.Variant); ok {
			who = t.Spec.Variants[i].Name
		}
		p.Imported = append(p.Imported, ImportedItem{Name: d.Name, Note: fmt.Sprintf("into %s, revision %d, %s", who, d.Revision, moment(d.Saved)),
			OpenURL: t.URL(fmt.Sprintf("/%d", d.File)), FileURL: t.fileURL(d.File)})
	}
	for _, k := range kept {
		item := KeptItem{Name: k.Name, OpenURL: t.URL(fmt.Sprintf("/%d", k.ID)), FileURL: t.fileURL(k.ID), Note: fmt.Sprintf("%s, kept %s", bytesWords(k.Size), moment(k.Saved))}
		if k.Uses == 0 {
			item.Note += ", not used"
			item.DiscardURL = t.URL(fmt.Sprintf("/%d/discard", k.ID))
		}
		p.Kept = append(p.Kept, item)
	}
	return p
}

// idle says that the table does not count as the variant stands.
func (t ImportTarget) idle() string {
	switch {
	case !t.Entry.Idle:
		return ""
	case t.Choice == nil:
		return "This table does not count now, because of a choice on the bench. What is imported is kept for later."
	}
	return fmt.Sprintf("This table does not count now: “%s” is not “%s”. The import can set that too.", t.Choice.Label(), t.Option.Label)
}

func (t ImportTarget) fileURL(id int64) string {
	return fmt.Sprintf("/projects/%d/originals/%d", t.ProjectID, id)
}

// described lists the ids of the texts that explain the pasted text.
func (p ImportStart) described() string {
	if p.Error != "" {
		return "import-error import-hint"
	}
	return "import-hint"
}

// basisOptions lists the kinds of basis after leaving the present one as it is.
func basisOptions(now string, chosen string) []Option {
	list := []Option{{"", "as it is: " + project.BasisLabel(now), chosen == ""}}
	for _, o := range project.BasisKinds {
		list = append(list, Option{o.Value, o.Label, o.Value == chosen})
	}
	return list
}
