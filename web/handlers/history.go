package handlers

import (
	"fmt"
	"net/http"
	"strconv"

	"github.com/go-chi/chi/v5"

	"legwright/web/views"
)

// history lists the revisions of a project.
func (s *site) history(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	list, err := s.db.Revisions(r.Context(), h.rev.Project)
	if err != nil {
		return err
	}
	saved := make([]views.Saved, len(list))
	for i, rev := range list {
		saved[i] = views.Saved{Number: rev.Number, Parent: rev.Parent, At: rev.Saved, Summary: rev.Summary, Current: rev.Number == h.rev.Number}
	}
	return render(w, r, http.StatusOK, views.HistoryPage(views.NewHistory(h.rev.Project, h.spec.Name, saved)))
}

// restore saves an older revision again as the newest.
func (s *site) restore(w http.ResponseWriter, r *http.Request) error {
	number, err := strconv.ParseInt(chi.URLParam(r, "revision"), 10, 64)
	if err != nil {
		return errNoPage
	}
	h, err := s.head(r)
	if err != nil {
		return err
	}
	rev, err := s.db.Revision(r.Context(), h.rev.Project, number)
	if err != nil {
		return err
	}
	old, err := decoded(rev)
	if err != nil {
		return err
	}
	_, err = s.db.Save(r.Context(), h.rev.Project, h.rev.Number, old.spec.Name, rev.Doc, fmt.Sprintf("Restored revision %d: %s", number, rev.Summary))
	if isConflict(err) {
		return errBusy
	}
	if err != nil {
		return err
	}
	http.Redirect(w, r, fmt.Sprintf("/projects/%d", h.rev.Project), http.StatusSeeOther)
	return nil
}
