// Package handlers is the web side of Legwright: the route table, the checks
// in front of it, and one file for each page.
package handlers

import (
	"errors"
	"io"
	"log/slog"
	"net/http"

	"github.com/go-chi/chi/v5"

	"legwright/internal/store"
	"legwright/web/static"
)

// A Config is what the handlers need from outside. All fields are required.
type Config struct {
	DB    *store.DB
	Log   *slog.Logger
	Hosts []string // values of Host that are answered, with the port: "127.0.0.1:8080"
}

// site holds what every page needs.
type site struct {
	db  *store.DB
	log *slog.Logger
}

// New returns the whole site.
func New(cfg Config) (http.Handler, error) {
	if cfg.DB == nil || cfg.Log == nil || len(cfg.Hosts) == 0 {
		return nil, errors.New("handlers: Config needs DB, Log and Hosts")
	}
	s := &site{db: cfg.DB, log: cfg.Log}
	r := chi.NewRouter()
	r.Use(guards(cfg.Hosts, cfg.Log)...)
	r.NotFound(s.serve(func(http.ResponseWriter, *http.Request) error { return errNoPage }))

	r.Get("/healthz", healthz)
	r.Handle("/static/*", http.StripPrefix("/static/", cached(http.FileServerFS(static.Files))))

	r.Get("/", s.serve(s.first))
	r.Get("/projects", s.serve(s.shelf))
	r.Post("/projects", s.serve(s.createProject))
	r.Post("/projects/import", s.serve(s.importProject))
	r.Get("/projects/import", http.RedirectHandler("/projects", http.StatusSeeOther).ServeHTTP)
	r.Get("/backups", s.serve(s.backups))
	r.Post("/backups", s.serve(s.makeBackup))
	r.Get("/backups/{name}", s.serve(s.downloadBackup))
	r.Route("/projects/{project}", func(r chi.Router) {
		r.Get("/", s.serve(s.openProject))
		r.Get("/project.json", s.serve(s.export))
		r.Post("/copy", s.serve(s.copyProject))
		r.Post("/archive", s.serve(s.archiveProject(true)))
		r.Post("/unarchive", s.serve(s.archiveProject(false)))
		r.Get("/history", s.serve(s.history))
		r.Get("/history/{revision}", s.serve(s.revision))
		r.Post("/history/{revision}", s.serve(s.nameRevision))
		r.Post("/restore/{revision}", s.serve(s.restore))
		r.Get("/variants/{variant}", s.serve(s.editable("")))
		r.Post("/variants/{variant}", s.serve(s.edit))
		r.Post("/variants/{variant}/units", s.serve(s.setUnits))
		r.Post("/variants/{variant}/undo", s.serve(s.step(s.db.Undo, undone)))
		r.Post("/variants/{variant}/redo", s.serve(s.step(s.db.Redo, redone)))
		r.Get("/variants/{variant}/drag", s.serve(s.analysis("/drag", drag)))
		r.Get("/variants/{variant}/import", s.serve(s.importStart))
		r.Post("/variants/{variant}/import", s.serve(s.importUpload))
		r.Get("/variants/{variant}/import/{original}", s.serve(s.importMap))
		r.Post("/variants/{variant}/import/{original}", s.serve(s.importConfirm))
		r.Post("/variants/{variant}/import/{original}/discard", s.serve(s.discardOriginal))
		r.Get("/originals/{original}", s.serve(s.downloadOriginal))
		r.Get("/variants/{variant}/climb", s.serve(s.analysis("/climb", climb)))
		r.Get("/variants/{variant}/strip", s.serve(s.analysis("/strip", strip)))
		r.Get("/variants/{variant}/mission", s.serve(s.editable("mission")))
		r.Get("/variants/{variant}/requirements", s.serve(s.editable("requirements")))
		r.Get("/variants/{variant}/powerplant", s.serve(s.analysis("/powerplant", plant)))
		r.Get("/variants/{variant}/report", s.serve(s.reportPage))
		r.Get("/variants/{variant}/report.pdf", s.serve(s.reportFile("pdf", reportPDF)))
		r.Get("/variants/{variant}/tables.zip", s.serve(s.reportFile("zip", reportTables)))
		r.Get("/variants/{variant}/tables/{table}", s.serve(s.reportFile("csv", reportTable)))
		r.Get("/variants/{variant}/working", s.serve(s.analysis("/working", working)))
	})

	r.Post("/api/evaluate", s.serveJSON(s.evaluate))
	r.Get("/api/schema", s.serveJSON(s.schema))
	r.Get("/api/projects/{project}", s.serveJSON(s.document))
	return r, nil
}

func healthz(w http.ResponseWriter, _ *http.Request) {
	w.Header().Set("Content-Type", "text/plain; charset=utf-8")
	io.WriteString(w, "ok")
}

// cached lets the browser keep static files but ask each time whether they are
// still the same: the program may have been replaced by a newer one.
func cached(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		w.Header().Set("Cache-Control", "no-cache")
		next.ServeHTTP(w, r)
	})
}
