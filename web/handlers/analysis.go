package handlers

import (
	"net/http"

	"github.com/a-h/templ"

	"legwright/internal/perf/study"
	"legwright/web/views"
)

// analysis is a page of a variant beside the bench, under the view that its
// query sets; a setting that was not understood is said at its field. Path is
// the page's own, as the tabs name it.
func (s *site) analysis(path string, show func(*study.Study, views.Frame) templ.Component) page {
	return func(w http.ResponseWriter, r *http.Request) error {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		st, mistaken, err := h.study(r, path == "/working")
		if err != nil {
			return err
		}
		code := http.StatusOK
		if len(mistaken) > 0 {
			code = http.StatusUnprocessableEntity
		}
		return render(w, r, code, show(st, views.NewFrame(st, h.rev.Project, path, query(r.URL.Query()), mistaken)))
	}
}

func drag(st *study.Study, f views.Frame) templ.Component {
	return views.DragOfVariant(views.NewDrag(st, f))
}

func climb(st *study.Study, f views.Frame) templ.Component {
	return views.ClimbAndEnvelope(views.NewClimbPage(st, st.Envelope(), st.Structure(), f))
}

func strip(st *study.Study, f views.Frame) templ.Component {
	return views.StripPage(views.NewStrip(st, f))
}

func plant(st *study.Study, f views.Frame) templ.Component {
	return views.PlantPage(views.NewPlant(st, f))
}

func working(st *study.Study, f views.Frame) templ.Component {
	return views.WorkingPage(views.NewWorking(st, f))
}
