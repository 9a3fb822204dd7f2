package handlers

import (
	"fmt"
	"net/http"
	"strings"
	"unicode/utf8"

	"legwright/internal/perf/project"
	"legwright/internal/store"
	"legwright/web/views"
)

// longestName of a project, in characters.
const longestName = 120

// first is the page of the bare address: the one project there is, computed, so
// that a newcomer sees a result at once; the shelf when there are more or none.
func (s *site) first(w http.ResponseWriter, r *http.Request) error {
	list, err := s.db.Projects(r.Context())
	if err != nil {
		return err
	}
	to, active := "/projects", 0
	for _, p := range list {
		if !p.Archived {
			to, active = fmt.Sprintf("/projects/%d", p.ID), active+1
		}
	}
	if active != 1 {
		to = "/projects"
	}
	http.Redirect(w, r, to, http.StatusSeeOther)
	return nil
}

func (s *site) shelf(w http.ResponseWriter, r *http.Request) error {
	v, err := s.shelfView(r)
	if err != nil {
		return err
	}
	return render(w, r, http.StatusOK, views.ShelfPage(v))
}

func (s *site) shelfView(r *http.Request) (views.Shelf, error) {
	list, err := s.db.Projects(r.Context())
	if err != nil {
		return views.Shelf{}, err
	}
	listed := make([]views.Listed, len(list))
	for i, p := range list {
		listed[i] = views.Listed{ID: p.ID, Name: p.Name, Updated: p.Updated, Revision: p.Revision, Archived: p.Archived}
	}
	return views.NewShelf(listed), nil
}

func (s *site) createProject(w http.ResponseWriter, r *http.Request) error {
	if err := r.ParseForm(); err != nil {
		return badForm(err)
	}
	name := strings.TrimSpace(r.PostFormValue("name"))
	if n := utf8.RuneCountInString(name); n == 0 || n > longestName {
		v, err := s.shelfView(r)
		if err != nil {
			return err
		}
		v.Typed, v.Error = r.PostFormValue("name"), fmt.Sprintf("A name is required, up to %d characters; this one has %d.", longestName, n)
		return render(w, r, http.StatusUnprocessableEntity, views.ShelfPage(v))
	}
	rev, err := s.create(r, project.New(name), "begun")
	if err != nil {
		return err
	}
	http.Redirect(w, r, fmt.Sprintf("/projects/%d", rev.Project), http.StatusSeeOther)
	return nil
}

func (s *site) create(r *http.Request, spec *project.Spec, summary string) (store.Revision, error) {
	doc, err := spec.Encode()
	if err != nil {
		return store.Revision{}, err
	}
	return s.db.Create(r.Context(), spec.Name, doc, summary)
}

func (s *site) copyProject(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	copied := h.spec.Clone()
	copied.Name = clip("Copy of " + copied.Name)
	if _, err := s.create(r, copied, "copied from “"+h.spec.Name+"”"); err != nil {
		return err
	}
	http.Redirect(w, r, "/projects", http.StatusSeeOther)
	return nil
}

func clip(name string) string { return clipTo(name, longestName) }

// clipTo cuts a name to a number of characters.
func clipTo(name string, most int) string {
	if runes := []rune(name); len(runes) > most {
		return string(runes[:most])
	}
	return name
}

func (s *site) archiveProject(archived bool) page {
	return func(w http.ResponseWriter, r *http.Request) error {
		id, err := projectID(r)
		if err != nil {
			return err
		}
		if err := s.db.Archive(r.Context(), id, archived); err != nil {
			return err
		}
		http.Redirect(w, r, "/projects", http.StatusSeeOther)
		return nil
	}
}

// openProject goes to the project's first variant.
func (s *site) openProject(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	http.Redirect(w, r, fmt.Sprintf("/projects/%d/variants/%s", h.rev.Project, h.spec.Variants[0].ID), http.StatusSeeOther)
	return nil
}

// badForm words a form that could not be read; a body that is too large keeps its own status.
func badForm(err error) error {
	if status(err).status == http.StatusRequestEntityTooLarge {
		return err
	}
	return &problem{http.StatusBadRequest, "Not understood", "The form could not be read: " + err.Error() + "."}
}
