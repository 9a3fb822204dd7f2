package handlers

import (
	"encoding/json"
	"fmt"
	"net/http"
	"slices"
	"strconv"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/store"
	"legwright/web/views"
)

// importConfirm stores the rows that the page showed as one revision.
func (s *site) importConfirm(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	for range 5 {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		_, t, err := h.targets(r)
		if err != nil {
			return err
		}
		o, err := s.original(r)
		if err != nil {
			return err
		}
		st, err := s.mapped(r, t, o, r.PostForm)
		if err != nil {
			return err
		}
		st.Basis, st.Use = r.PostForm.Get("basis"), r.PostForm.Get("use") != ""
		refused, err := s.importClash(r, h, t)
		if err != nil {
			return err
		}
		if !st.Ready() {
			refused = append(refused, "The rows are not ready to be imported; see above.")
		}
		var trial *project.Spec
		var said string
		if len(refused) == 0 {
			trial, said, err = replaced(t, st)
			refused = reasons(t, err)
		}
		if len(refused) > 0 {
			return s.showImportMap(w, r, h, r.PostForm, refused)
		}
		err = s.saveImport(r, h, t, o, st, trial, said)
		if isConflict(err) {
			continue
		}
		if err != nil {
			return err
		}
		now, _ := input.Find(trial, t.Entry.Path)
		http.Redirect(w, r, t.BenchURL(now.Idle), http.StatusSeeOther)
		return nil
	}
	return errBusy
}

// importClash refuses an import when another window has changed the table since the page was shown.
func (s *site) importClash(r *http.Request, h head, t views.ImportTarget) ([]string, error) {
	base, err := s.shown(r, h)
	if err != nil || base == h.spec {
		return nil, err
	}
	path := fmt.Sprintf("variants[%d].aircraft.%s", t.Index, t.Path)
	was, ok := input.Find(base, path)
	if ok && base.Variants[t.Index].ID == h.spec.Variants[t.Index].ID && slices.EqualFunc(*was.Table.Value, *t.Entry.Table.Value, slices.Equal) {
		return nil, nil
	}
	return []string{"Another window has changed this table since these rows were shown. The chart shows it as it is now; import again to replace it."}, nil
}

// replaced is the document with the rows in the table, and what changed in words.
// Its error is an input error of the table, or of what no longer fits it.
func replaced(t views.ImportTarget, st views.ImportState) (*project.Spec, string, error) {
	trial := t.Spec.Clone()
	said := ""
	if st.Use && t.Choice != nil {
		c, ok := input.Find(trial, t.Choice.Path)
		if !ok {
			return nil, "", errGone
		}
		before := *c.Choice.Value
		*c.Choice.Value = t.Option.Value
		input.Convert(trial, t.Choice.Path, before)
		input.Settle(trial)
		said = fmt.Sprintf("; %s: %s", t.Choice.Label(), t.Option.Label)
	}
	e, ok := input.Find(trial, t.Entry.Path)
	if !ok {
		return nil, "", errGone
	}
	*e.Table.Value = st.Filling.Rows
	e.Idle = false // it is to be sound although it does not count now
	if err := e.Check(); err != nil {
		return nil, "", err
	}
	v := &trial.Variants[t.Index]
	if b := v.BasisOf(t.Path); st.Basis != "" && st.Basis != b.Kind {
		b.Kind = st.Basis
		v.SetBasis(t.Path, b)
		said += fmt.Sprintf("; its basis is now %s", project.BasisLabel(st.Basis))
	}
	if _, err := trial.Build(); err != nil {
		return nil, "", err
	}
	return trial, fmt.Sprintf("%s: %d rows imported from %s", t.Title(), len(st.Filling.Rows), st.Name) + said, nil
}

// reasons words why the document does not take the rows.
func reasons(t views.ImportTarget, err error) []string {
	if err == nil {
		return nil
	}
	var list []string
	for _, e := range input.Errors(err) {
		list = append(list, capital(e.Sentence(t.Spec.System()))+".")
	}
	if len(list) == 0 {
		list = []string{capital(err.Error()) + "."}
	}
	return slices.Compact(list)
}

// saveImport saves the document and the record of where its rows came from. Rows that
// the table held already make no revision, but the record.
func (s *site) saveImport(r *http.Request, h head, t views.ImportTarget, o store.Original, st views.ImportState, trial *project.Spec, said string) error {
	doc, err := trial.Encode()
	if err != nil {
		return err
	}
	now, err := h.spec.Encode()
	if err != nil {
		return err
	}
	if slices.Equal(doc, now) {
		doc = nil
	}
	mapping, err := json.Marshal(st.Mapping)
	if err != nil {
		return err
	}
	_, err = s.db.SaveImport(r.Context(), h.rev.Project, h.rev.Number, trial.Name, doc, said,
		store.Import{Original: o.ID, Variant: trial.Variants[t.Index].ID, Path: t.Path, Header: st.Sheet.Header(), Mapping: mapping})
	return err
}

// downloadOriginal gives a kept file back as it came.
func (s *site) downloadOriginal(w http.ResponseWriter, r *http.Request) error {
	o, err := s.original(r)
	if err != nil {
		return err
	}
	h := w.Header()
	attach(w, o.Name)
	h.Set("Content-Type", "text/csv")
	h.Set("Content-Length", strconv.Itoa(len(o.Content)))
	h.Set("Cache-Control", "no-store")
	_, err = w.Write(o.Content)
	return err
}

// discardOriginal removes a file that no table was filled from.
func (s *site) discardOriginal(w http.ResponseWriter, r *http.Request) error {
	o, err := s.original(r)
	if err != nil {
		return err
	}
	h, err := s.head(r)
	if err != nil {
		return err
	}
	_, t, err := h.targets(r)
	if err != nil {
		return err
	}
	if o.Uses > 0 {
		return &problem{http.StatusConflict, "Not discarded", capital(store.ErrFileUsed.Error()) + "."}
	}
	if err := s.db.Discard(r.Context(), o.Project, o.ID); err != nil {
		return err
	}
	http.Redirect(w, r, t.URL(""), http.StatusSeeOther)
	return nil
}
