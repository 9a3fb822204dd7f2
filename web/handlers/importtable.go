package handlers

import (
	"encoding/json"
	"errors"
	"fmt"
	"net/http"
	"net/url"
	"strconv"
	"strings"

	"github.com/go-chi/chi/v5"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/sheet"
	"legwright/internal/store"
	"legwright/web/views"
)

// targets lists the tables of a variant, and which of them the address names: the
// first that counts when it names none.
func (h head) targets(r *http.Request) (all []views.ImportTarget, named views.ImportTarget, err error) {
	i, err := h.variant(r)
	if err != nil {
		return nil, named, err
	}
	prefix, found := fmt.Sprintf("variants[%d].aircraft.", i), -1
	want := r.URL.Query().Get("table")
	for _, e := range input.Walk(h.spec) {
		path, ours := strings.CutPrefix(e.Path, prefix)
		if !ours || e.Table == nil {
			continue
		}
		t := views.ImportTarget{ProjectID: h.rev.Project, Spec: h.spec, Index: i, Entry: e, Path: path}
		if e.Idle {
			t.Choice, t.Option = enabling(h.spec, e.Path)
		}
		if path == want || want == "" && found < 0 && !e.Idle {
			found = len(all)
		}
		all = append(all, t)
	}
	if found < 0 {
		return nil, named, &problem{http.StatusNotFound, "Not here", "This variant has no such table; its powerplant may have been changed."}
	}
	return all, all[found], nil
}

// enabling finds the choice beside an idle table, and its option, that makes the table count.
func enabling(spec *project.Spec, path string) (*input.Entry, input.Option) {
	parent := path[:strings.LastIndexByte(path, '.')+1]
	for _, e := range input.Walk(spec) {
		name, beside := strings.CutPrefix(e.Path, parent)
		if e.Choice == nil || !beside || strings.Contains(name, ".") {
			continue
		}
		for _, o := range e.Choice.Options {
			trial := spec.Clone()
			if c, ok := input.Find(trial, e.Path); ok {
				*c.Choice.Value = o.Value
			}
			if t, ok := input.Find(trial, path); ok && !t.Idle {
				return &e, o
			}
		}
	}
	return nil, input.Option{}
}

// importStart shows where a table and a file are chosen.
func (s *site) importStart(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	return s.showImportStart(w, r, h, http.StatusOK, "", "")
}

func (s *site) showImportStart(w http.ResponseWriter, r *http.Request, h head, code int, text, wrong string) error {
	all, t, err := h.targets(r)
	if err != nil {
		return err
	}
	imports, err := s.db.Imports(r.Context(), h.rev.Project, t.Path)
	if err != nil {
		return err
	}
	files, err := s.db.Originals(r.Context(), h.rev.Project)
	if err != nil {
		return err
	}
	done, kept := make([]views.DoneImport, len(imports)), make([]views.KeptFile, len(files))
	for i, d := range imports {
		done[i] = views.DoneImport{File: d.Original, Name: d.Name, Variant: d.Variant, Revision: d.Revision, Saved: d.Saved}
	}
	for i, f := range files {
		kept[i] = views.KeptFile{ID: f.ID, Name: f.Name, Saved: f.Saved, Size: f.Size, Uses: f.Uses}
	}
	p := views.NewImportStart(t, all, done, kept)
	p.Text, p.Error = text, wrong
	return render(w, r, code, views.ImportStartPage(p))
}

// importUpload keeps the file that was sent, as it came, and goes on to its mapping.
func (s *site) importUpload(w http.ResponseWriter, r *http.Request) error {
	up, err := readUpload(r)
	if err != nil {
		return badForm(err)
	}
	h, err := s.head(r)
	if err != nil {
		return err
	}
	_, t, err := h.targets(r)
	if err != nil {
		return err
	}
	name, content, wrong := up.chosen()
	if wrong == "" {
		if _, _, err := sheet.Decode(content); err != nil {
			wrong = fmt.Sprintf("%s cannot be read: %v.", capital(name), err)
		}
	}
	if wrong != "" {
		return s.showImportStart(w, r, h, http.StatusUnprocessableEntity, up.text, wrong)
	}
	o, err := s.db.Keep(r.Context(), h.rev.Project, name, content)
	if err != nil {
		return err
	}
	http.Redirect(w, r, t.URL(fmt.Sprintf("/%d", o.ID)), http.StatusSeeOther)
	return nil
}

// original finds the file that the address names.
func (s *site) original(r *http.Request) (store.Original, error) {
	project, err := projectID(r)
	if err != nil {
		return store.Original{}, err
	}
	id, err := strconv.ParseInt(chi.URLParam(r, "original"), 10, 64)
	if err != nil {
		return store.Original{}, errNoPage
	}
	o, err := s.db.Original(r.Context(), project, id)
	if errors.Is(err, store.ErrNotFound) {
		return o, &problem{http.StatusNotFound, "Not here", "There is no such file with this project; it may have been discarded."}
	}
	return o, err
}

// importMap shows how the sheet is mapped and the rows that come of it. It changes nothing.
func (s *site) importMap(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	return s.showImportMap(w, r, h, r.URL.Query(), nil)
}

func (s *site) showImportMap(w http.ResponseWriter, r *http.Request, h head, form url.Values, refused []string) error {
	_, t, err := h.targets(r)
	if err != nil {
		return err
	}
	o, err := s.original(r)
	if err != nil {
		return err
	}
	st, err := s.mapped(r, t, o, form)
	if err != nil {
		return err
	}
	st.Revision, st.Refused = h.rev.Number, refused
	st.Basis, st.Use = form.Get("basis"), form.Get("use") != "" || !form.Has("basis")
	if st.Ready() && refused == nil {
		_, _, err := replaced(t, st)
		st.Refused = reasons(t, err)
	}
	code := http.StatusOK
	if refused != nil {
		code = http.StatusUnprocessableEntity
	}
	p := views.NewImportMap(t, st)
	if swaps(r) {
		return render(w, r, code, views.ImportMapBody(p))
	}
	return render(w, r, code, views.ImportMapPage(p))
}

// mapped reads the file as the form says and fills in what the form leaves open.
func (s *site) mapped(r *http.Request, t views.ImportTarget, o store.Original, form url.Values) (views.ImportState, error) {
	st := views.ImportState{File: o.ID, Name: o.Name, Asked: sheet.Settings{Delimiter: form.Get("delimiter"), Decimal: form.Get("decimal"), Heads: form.Get("heads")}}
	text, encoding, err := sheet.Decode(o.Content)
	if err == nil {
		st.Sheet, err = sheet.Read(text, st.Asked)
	}
	if err != nil {
		st.Err = err
		return st, nil
	}
	st.Encoding = encoding
	m := sheet.Mapping{Settings: st.Sheet.Settings, Block: form.Get("block"), Family: form.Get("family"), Sort: form.Get("sort") != ""}
	if st.Block = st.Sheet.Pick(m); st.Block == nil {
		m.Block = ""
		st.Mapping = m
		return st, nil
	}
	if !st.Block.Has(m.Family) {
		m.Family = ""
	}
	if form.Get("shown") == "" {
		if st.Remembered, err = s.remembered(r, t, st.Sheet, &m); err != nil {
			return st, err
		}
	} else if form.Get("was") == views.WasUnder(m) {
		m.Columns = sources(t.Entry.Table, form)
	}
	st.Mapping = st.Block.Guess(t.Entry.Table, m)
	st.Filling = st.Block.Fill(t.Entry.Table, st.Mapping)
	return st, nil
}

// sources are the columns and units that the form chooses. A unit goes with the column
// that it was chosen for.
func sources(table *input.Table, form url.Values) []sheet.Source {
	list := make([]sheet.Source, len(table.Columns))
	for i, c := range table.Columns {
		n, err := strconv.Atoi(form.Get("column-" + c.Name))
		if err != nil {
			continue
		}
		list[i].Column = n
		if form.Get("was-"+c.Name) == form.Get("column-"+c.Name) || form.Get("was-"+c.Name) == "0" {
			list[i].Unit = form.Get("unit-" + c.Name)
		}
	}
	return list
}

// remembered takes columns, units and order from the last import of a sheet with the
// same heads into this table of any variant, and says from which file.
func (s *site) remembered(r *http.Request, t views.ImportTarget, sh *sheet.Sheet, m *sheet.Mapping) (string, error) {
	header := sh.Header()
	if strings.Trim(header, "\x1e\x1f") == "" {
		return "", nil // without heads nothing tells that the sheet is of the same kind
	}
	list, err := s.db.Imports(r.Context(), t.ProjectID, t.Path)
	if err != nil {
		return "", err
	}
	for _, in := range list {
		if in.Header != header {
			continue
		}
		var old sheet.Mapping
		if err := json.Unmarshal(in.Mapping, &old); err != nil {
			return "", err
		}
		if strings.HasPrefix(old.Family, sheet.OfColumns) {
			return "", nil // its columns are those of another family
		}
		m.Columns, m.Sort = old.Columns, old.Sort
		return in.Name, nil
	}
	return "", nil
}
