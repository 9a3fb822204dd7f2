package handlers

import (
	"errors"
	"net/http"
	"net/url"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
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
		if i >= len(base.Variants) || base.Variants[i].ID != h.spec.Variants[i].ID {
			return &problem{http.StatusConflict, "Out of date", "Another window has added or removed a variant since this page was shown; nothing was saved here. Go back, reload and try again."}
		}
		e := newEdit(h.spec, base, i, systemOf(r.PostForm, base))
		e.since = func(name string) string { return s.since(r.Context(), h, h.spec.System(), name) }
		e.apply(r.PostForm)
		missed := unseen(r, h)
		if len(e.changes) == 0 {
			return s.answerEdit(w, r, h, e, missed)
		}
		rev, err := s.db.Save(r.Context(), h.rev.Project, h.rev.Number, e.spec.Name, e.doc, e.summary())
		if isConflict(err) {
			continue
		}
		if err != nil {
			return err
		}
		return s.answerEdit(w, r, head{rev, e.spec, e.built}, e, missed)
	}
	return errBusy
}

var errBusy = &problem{http.StatusConflict, "Busy", "Another window kept changing this project; nothing was saved here. Go back and try again."}

func isConflict(err error) bool {
	var conflict *store.ConflictError
	return errors.As(err, &conflict)
}

func (s *site) answerEdit(w http.ResponseWriter, r *http.Request, h head, e *edit, missed span) error {
	o := outcome{refused: e.refused, message: e.message(), missed: missed}
	if len(e.refused) > 0 {
		return s.show(w, r, h, pageName(r), o)
	}
	return s.settled(w, r, h, o)
}

// unseen is what the window that sent the form has not seen of the history up to the head.
func unseen(r *http.Request, h head) span {
	n, err := strconv.ParseInt(r.PostFormValue("revision"), 10, 64)
	if err != nil {
		return span{}
	}
	return span{n, h.rev.Number}
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

// setUnits changes the unit system of the project: no stored value changes.
func (s *site) setUnits(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	sys := units.System(r.PostFormValue("system"))
	if !sys.Valid() {
		return &problem{http.StatusUnprocessableEntity, "Not understood", "There is no unit system of that name."}
	}
	for range 5 {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		if sys == h.spec.System() {
			return s.settled(w, r, h, outcome{})
		}
		spec := h.spec.Clone()
		spec.Display = string(sys)
		doc, err := spec.Encode()
		if err != nil {
			return err
		}
		rev, err := s.db.Save(r.Context(), h.rev.Project, h.rev.Number, spec.Name, doc, "Units: "+sys.Label())
		if isConflict(err) {
			continue
		}
		if err != nil {
			return err
		}
		return s.settled(w, r, head{rev: rev, spec: spec}, outcome{})
	}
	return errBusy
}

// An edit collects the changes of one form.
type edit struct {
	head    *project.Spec // as it was before the edit
	base    *project.Spec // what the form showed; head itself when nothing changed since
	spec    *project.Spec // changed so far
	built   *project.Project
	doc     []byte // of spec
	shown   map[string]input.Entry
	now     map[string]input.Entry // of head
	variant int
	sys     units.System
	form    url.Values
	changes []string
	said    []string // beside the changes
	refused []views.Refusal
	since   func(name string) string // says when the present value of a field was saved; nil where nobody asks
}

func newEdit(h, base *project.Spec, variant int, sys units.System) *edit {
	return &edit{head: h, base: base, spec: h, variant: variant, sys: sys}
}

// message is what the reader is told of the edit.
func (e *edit) message() string {
	return strings.Join(append(slices.Clone(e.changes), e.said...), "; ")
}

// summary says in words what changed.
func (e *edit) summary() string { return strings.Join(e.changes, "; ") }
