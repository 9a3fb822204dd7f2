package handlers

import (
	"fmt"
	"net/http"

	"legwright/internal/perf/study"
	"legwright/web/views"
)

// strip shows take-off and landing under the view that the query sets, and says
// at the form which of its settings was not understood.
func (s *site) strip(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	i, err := h.variant(r)
	if err != nil {
		return err
	}
	p, err := h.build()
	if err != nil {
		return err
	}
	view, mistaken := viewOf(r.URL.Query(), p, i)
	st := study.Run(p, i, view)
	code := http.StatusOK
	if len(mistaken) > 0 {
		code = http.StatusUnprocessableEntity
	}
	frame := views.NewFrame(st, h.rev.Project, "/strip", query(r.URL.Query()))
	here := fmt.Sprintf("/projects/%d/variants/%s/strip", h.rev.Project, st.Variant().ID)
	return render(w, r, code, views.StripPage(views.NewStrip(st, frame, here, mistaken)))
}
