package handlers

import (
	"errors"
	"fmt"
	"math"
	"net/http"
	"strconv"
	"strings"

	"github.com/go-chi/chi/v5"

	"legwright/internal/store"
	"legwright/web/views"
)

// historyPage is how many revisions a page of the history lists.
const historyPage = 50

// history lists the revisions of a project.
func (s *site) history(w http.ResponseWriter, r *http.Request) error {
	page, err := strconv.Atoi(r.URL.Query().Get("page"))
	if err != nil || page < 1 {
		page = 1
	}
	return s.listRevisions(w, r, page, nil)
}

// listRevisions shows a page of the history, counted from one, and what name of a revision was refused.
func (s *site) listRevisions(w http.ResponseWriter, r *http.Request, page int, refused *views.NameRefusal) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	// Revisions are numbered from one without a gap.
	newest, err := s.db.RevisionsBefore(r.Context(), h.rev.Project, math.MaxInt64, 1)
	if err != nil {
		return err
	}
	all := int(newest[0].Number)
	pages := (all + historyPage - 1) / historyPage
	page = min(page, pages)
	list, err := s.db.RevisionsBefore(r.Context(), h.rev.Project, int64(all-(page-1)*historyPage+1), historyPage)
	if err != nil {
		return err
	}
	p := views.HistoryPageOf{Project: h.rev.Project, Name: h.spec.Name, Page: page, Pages: pages, All: all, Listed: saved(list, h.rev.Number), Refused: refused}
	if page == 1 {
		named, err := s.db.Snapshots(r.Context(), h.rev.Project)
		if err != nil {
			return err
		}
		p.Named = saved(named, h.rev.Number)
	}
	code := http.StatusOK
	if refused != nil {
		code = http.StatusUnprocessableEntity
	}
	return render(w, r, code, views.HistoryPage(views.NewHistory(p)))
}

// saved is what the pages show of revisions; head is the number of the present one.
func saved(list []store.Revision, head int64) []views.Saved {
	out := make([]views.Saved, len(list))
	for i, rev := range list {
		out[i] = views.Saved{Number: rev.Number, Parent: rev.Parent, At: rev.Saved, Summary: rev.Summary, Name: rev.Snapshot, Engine: rev.Engine, Current: rev.Number == head}
	}
	return out
}

// past reads the revision that the address names.
func (s *site) past(r *http.Request, project int64) (head, error) {
	number, err := strconv.ParseInt(chi.URLParam(r, "revision"), 10, 64)
	if err != nil {
		return head{}, errNoPage
	}
	rev, err := s.db.Revision(r.Context(), project, number)
	if errors.Is(err, store.ErrNotFound) {
		return head{}, &problem{http.StatusNotFound, "Not here", "This project has no such revision."}
	}
	if err != nil {
		return head{}, err
	}
	old, err := decoded(rev)
	if err != nil {
		s.log.Warn("revision not read", "project", project, "revision", number, "error", err)
		return head{}, &problem{http.StatusUnprocessableEntity, "Cannot be read", fmt.Sprintf("Revision %d was saved by version %s of the program, and the present one cannot read it. Nothing was changed.", number, rev.Engine)}
	}
	return old, nil
}

// revision shows an earlier state of the project and how the present one differs.
func (s *site) revision(w http.ResponseWriter, r *http.Request) error {
	now, err := s.head(r)
	if err != nil {
		return err
	}
	old, err := s.past(r, now.rev.Project)
	if err != nil {
		return err
	}
	id := r.URL.Query().Get("variant")
	if _, ok := old.spec.Variant(id); !ok {
		id = old.spec.Variants[0].ID
	}
	then, err := old.studyOf(id)
	if err != nil {
		return err
	}
	present, err := now.studyOf(id)
	if err != nil {
		return err
	}
	item := saved([]store.Revision{old.rev}, now.rev.Number)[0]
	return render(w, r, http.StatusOK, views.RevisionPage(views.NewRevision(now.rev.Project, item, s.db.Program(), then, present, now.spec)))
}

// nameRevision gives a revision a name, another one or none.
func (s *site) nameRevision(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	id, err := projectID(r)
	if err != nil {
		return err
	}
	number, err := strconv.ParseInt(chi.URLParam(r, "revision"), 10, 64)
	if err != nil {
		return errNoPage
	}
	typed := r.PostFormValue("name")
	name := strings.TrimSpace(typed)
	page, err := strconv.Atoi(r.PostFormValue("back"))
	if err != nil || page < 1 {
		page = 1 + s.pageOf(r, id, number)
	}
	if _, err := s.db.Revision(r.Context(), id, number); err != nil {
		return err
	}
	switch {
	case r.PostFormValue("remove") != "":
		name = ""
	case name == "":
		return s.listRevisions(w, r, page, &views.NameRefusal{Revision: number, Typed: typed, Why: "A name is required."})
	}
	err = s.db.NameRevision(r.Context(), id, number, name)
	if errors.Is(err, store.ErrSnapshotName) {
		return s.listRevisions(w, r, page, &views.NameRefusal{Revision: number, Typed: typed, Why: capital(err.Error()) + "."})
	}
	if err != nil {
		return err
	}
	to := fmt.Sprintf("/projects/%d/history", id)
	if r.PostFormValue("back") == "0" {
		to = fmt.Sprintf("%s/%d", to, number)
	} else if page > 1 {
		to = fmt.Sprintf("%s?page=%d", to, page)
	}
	http.Redirect(w, r, to, http.StatusSeeOther)
	return nil
}

// pageOf is the page of the history that lists a revision, counted from zero.
func (s *site) pageOf(r *http.Request, id, number int64) int {
	newest, err := s.db.RevisionsBefore(r.Context(), id, math.MaxInt64, 1)
	if err != nil || number < 1 || number > newest[0].Number {
		return 0
	}
	return int(newest[0].Number-number) / historyPage
}

// restore saves an older revision again as the newest.
func (s *site) restore(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	old, err := s.past(r, h.rev.Project)
	if err != nil {
		return err
	}
	said := fmt.Sprintf("Restored revision %d: %s", old.rev.Number, old.rev.Summary)
	if old.rev.Snapshot != "" {
		said = fmt.Sprintf("Restored “%s”, revision %d: %s", old.rev.Snapshot, old.rev.Number, old.rev.Summary)
	}
	_, err = s.db.Save(r.Context(), h.rev.Project, h.rev.Number, old.spec.Name, old.rev.Doc, said)
	if isConflict(err) {
		return errBusy
	}
	if err != nil {
		return err
	}
	http.Redirect(w, r, fmt.Sprintf("/projects/%d", h.rev.Project), http.StatusSeeOther)
	return nil
}
