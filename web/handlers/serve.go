package handlers

import (
	"bytes"
	"encoding/json"
	"errors"
	"net/http"
	"strconv"

	"github.com/a-h/templ"
	"github.com/go-chi/chi/v5"

	"legwright/internal/perf/input"
	"legwright/internal/store"
	"legwright/web/views"
)

// A page answers a request or says why it cannot.
type page func(http.ResponseWriter, *http.Request) error

// A problem is an error with a status and words for the reader.
type problem struct {
	status      int
	title, text string
}

func (p *problem) Error() string { return p.title + ": " + p.text }

var errNoPage = &problem{http.StatusNotFound, "Not here", "There is no page at this address."}

// status maps an error to a problem; unknown ones are the program's own fault.
func status(err error) *problem {
	var p *problem
	var large *http.MaxBytesError
	switch {
	case errors.As(err, &p):
		return p
	case errors.Is(err, store.ErrNotFound):
		return &problem{http.StatusNotFound, "Not here", "There is no such project in this data folder."}
	case errors.As(err, &large):
		return &problem{http.StatusRequestEntityTooLarge, "Too large", "The request is larger than what is accepted, " + strconv.FormatInt(large.Limit, 10) + " bytes."}
	}
	return &problem{http.StatusInternalServerError, "Something failed", "The program met a fault of its own; what was saved before is safe. The log says more."}
}

// serve turns errors into pages; it is the only place that logs them.
func (s *site) serve(p page) http.HandlerFunc {
	return func(w http.ResponseWriter, r *http.Request) {
		err := p(w, r)
		if err == nil {
			return
		}
		as := status(err)
		if as.status >= 500 {
			s.log.Error("request failed", "method", r.Method, "path", r.URL.Path, "error", err)
		}
		_ = render(w, r, as.status, views.ProblemPage(as.title, as.text))
	}
}

// serveJSON is serve for the JSON interface.
func (s *site) serveJSON(p page) http.HandlerFunc {
	return func(w http.ResponseWriter, r *http.Request) {
		err := p(w, r)
		if err == nil {
			return
		}
		if list := input.Errors(err); len(list) > 0 {
			_ = writeJSON(w, http.StatusUnprocessableEntity, refusals(list))
			return
		}
		as := status(err)
		if as.status >= 500 {
			s.log.Error("request failed", "method", r.Method, "path", r.URL.Path, "error", err)
		}
		_ = writeJSON(w, as.status, map[string]string{"error": as.text})
	}
}

// render writes a whole component or nothing: a view that fails leaves no half page.
func render(w http.ResponseWriter, r *http.Request, code int, c templ.Component) error {
	var b bytes.Buffer
	if err := c.Render(r.Context(), &b); err != nil {
		return err
	}
	h := w.Header()
	h.Set("Content-Type", "text/html; charset=utf-8")
	h.Set("Cache-Control", "no-store")
	h.Set("Content-Length", strconv.Itoa(b.Len()))
	h.Add("Vary", "HX-Request")
	w.WriteHeader(code)
	_, err := w.Write(b.Bytes())
	return err
}

func writeJSON(w http.ResponseWriter, code int, v any) error {
	text, err := json.MarshalIndent(v, "", "  ")
	if err != nil {
		return err
	}
	w.Header().Set("Content-Type", "application/json; charset=utf-8")
	w.Header().Set("Cache-Control", "no-store")
	w.WriteHeader(code)
	_, err = w.Write(append(text, '\n'))
	return err
}

// swaps reports whether the page's script asks for a part of the page only.
func swaps(r *http.Request) bool { return r.Header.Get("HX-Request") == "true" }

// projectID reads the project's number from the path.
func projectID(r *http.Request) (int64, error) {
	id, err := strconv.ParseInt(chi.URLParam(r, "project"), 10, 64)
	if err != nil || id <= 0 {
		return 0, errNoPage
	}
	return id, nil
}
