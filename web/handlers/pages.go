package handlers

import (
	"net/http"

	"github.com/a-h/templ"

	"legwright/internal/perf/study"
	"legwright/web/views"
)

// An editPage is a page of a variant on which the project can be edited.
type editPage struct {
	path string // below the variant's address, as the tabs name it
	// show makes the page, and the part of it that an edit replaces.
	show func(*study.Study, views.State) (page, part templ.Component)
}

// editPages are the pages that answer the edits made on them, by the name that their forms carry in the field "page".
var editPages = map[string]editPage{
	"":             {"", benchPage},
	"requirements": {"/requirements", requirementsPage},
	"mission":      {"/mission", missionPage},
}

// pageName is the page on which the edit was made; the bench answers for one that is not known.
func pageName(r *http.Request) string {
	name := r.PostFormValue("page")
	if _, ok := editPages[name]; !ok {
		return ""
	}
	return name
}

// editable shows the page of that name.
func (s *site) editable(name string) page {
	return func(w http.ResponseWriter, r *http.Request) error {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		return s.show(w, r, h, name, outcome{missed: spanOf(r)})
	}
}

func benchPage(st *study.Study, state views.State) (page, part templ.Component) {
	b := views.NewBench(st, state)
	return views.BenchPage(b), views.BenchBody(b)
}

func requirementsPage(st *study.Study, state views.State) (page, part templ.Component) {
	p := views.NewRequirements(st, state)
	return views.RequirementsPage(p), views.RequirementsBody(p)
}

func missionPage(st *study.Study, state views.State) (page, part templ.Component) {
	m := views.NewMission(st, state)
	return views.MissionPage(m), views.MissionBody(m)
}
