package handlers

import (
	"fmt"
	"net/http"

	"legwright/internal/perf/study"
	"legwright/web/views"
)

// working shows the derivation of the numbers of a view.
func (s *site) working(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	i, err := h.variant(r)
	if err != nil {
		return err
	}
	p, err := h.spec.Build()
	if err != nil {
		return err
	}
	view, _ := viewOf(r.URL.Query(), p, i)
	back := fmt.Sprintf("/projects/%d/variants/%s%s", h.rev.Project, h.spec.Variants[i].ID, query(r.URL.Query()))
	return render(w, r, http.StatusOK, views.WorkingPage(views.NewWorking(study.Run(p, i, view), back)))
}
