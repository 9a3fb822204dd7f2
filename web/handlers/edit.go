package handlers

import (
	"errors"
	"net/http"
	"net/url"
	"strconv"
	"strings"

	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/internal/store"
	"legwright/web/views"
)

func isNothing(err error) bool {
	return errors.Is(err, store.ErrNothingToUndo) || errors.Is(err, store.ErrNothingToRedo)
}

// edit takes a posted form: every field that differs from what the form showed
// is one change. What cannot be taken stays in its field with the reason; the
// rest is saved as one revision before the page says saved.
func (s *site) edit(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	// A second writer may come between reading and saving; then the edit is tried again on the new state.
	for range 5 {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		i, err := h.variant(r)
		if err != nil {
			return err
		}
		base, err := s.shown(r, h)
		if err != nil {
			return err
		}
		e := newEdit(h.spec, base, i, systemOf(r.PostForm, base))
		e.apply(r.PostForm)
		if len(e.changes) == 0 {
			return s.answerEdit(w, r, h, e)
		}
		saved, err := s.save(r, h, e.spec, e.summary())
		var conflict *store.ConflictError
		if errors.As(err, &conflict) {
			continue
		}
		if err != nil {
			return err
		}
		return s.answerEdit(w, r, saved, e)
	}
	return &problem{http.StatusConflict, "Busy", "Another window kept changing this project; nothing was saved here. Go back and try again."}
}

func (s *site) answerEdit(w http.ResponseWriter, r *http.Request, h head, e *edit) error {
	if len(e.refused) > 0 {
		return s.show(w, r, h, e.refused, e.summary())
	}
	return s.settled(w, r, h, e.summary())
}

// shown is the document that the form showed, by the revision it carries; the head when it carries none.
func (s *site) shown(r *http.Request, h head) (*project.Spec, error) {
	n, err := strconv.ParseInt(r.PostFormValue("revision"), 10, 64)
	if err != nil || n == h.rev.Number {
		return h.spec, nil
	}
	rev, err := s.db.Revision(r.Context(), h.rev.Project, n)
	if errors.Is(err, store.ErrNotFound) {
		return h.spec, nil
	}
	if err != nil {
		return nil, err
	}
	old, err := decoded(rev)
	return old.spec, err
}

// systemOf is the unit system in which the form showed its numbers.
func systemOf(form url.Values, base *project.Spec) units.System {
	if sys := units.System(form.Get("system")); sys.Valid() {
		return sys
	}
	return base.System()
}

// save stores the document as one revision.
func (s *site) save(r *http.Request, h head, spec *project.Spec, summary string) (head, error) {
	doc, err := spec.Encode()
	if err != nil {
		return head{}, err
	}
	rev, err := s.db.Save(r.Context(), h.rev.Project, h.rev.Number, spec.Name, doc, summary)
	return head{rev, spec}, err
}

// setUnits changes the unit system of the project: no stored value changes.
func (s *site) setUnits(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	h, err := s.head(r)
	if err != nil {
		return err
	}
	sys := units.System(r.PostFormValue("system"))
	if !sys.Valid() {
		return &problem{http.StatusUnprocessableEntity, "Not understood", "There is no unit system of that name."}
	}
	if sys == h.spec.System() {
		return s.settled(w, r, h, "")
	}
	spec := h.spec.Clone()
	spec.Display = string(sys)
	saved, err := s.save(r, h, spec, "Units: "+sys.Label())
	if err != nil {
		return err
	}
	return s.settled(w, r, saved, "")
}

// An edit collects the changes of one form.
type edit struct {
	spec    *project.Spec // changed so far; always builds
	base    *project.Spec // what the form showed
	variant int
	sys     units.System
	changes []string
	refused []views.Refusal
}

func newEdit(spec, base *project.Spec, variant int, sys units.System) *edit {
	return &edit{spec: spec.Clone(), base: base, variant: variant, sys: sys}
}

// summary says in words what changed.
func (e *edit) summary() string { return strings.Join(e.changes, "; ") }
