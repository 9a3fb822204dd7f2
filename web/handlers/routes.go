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
)

// A Config is what the handlers need from outside. All fields are required.
type Config struct {
	DB    *store.DB
	Log   *slog.Logger
	Hosts []string // values of Host that are answered, with the port: "127.0.0.1:8080"
}

// New returns the whole site.
func New(cfg Config) (http.Handler, error) {
	if cfg.DB == nil || cfg.Log == nil || len(cfg.Hosts) == 0 {
		return nil, errors.New("handlers: Config needs DB, Log and Hosts")
	}
	r := chi.NewRouter()
	r.Use(guards(cfg.Hosts, cfg.Log)...)
	r.Get("/healthz", healthz)
	r.NotFound(notFound)
	return r, nil
}

func healthz(w http.ResponseWriter, _ *http.Request) {
	w.Header().Set("Content-Type", "text/plain; charset=utf-8")
	io.WriteString(w, "ok")
}

func notFound(w http.ResponseWriter, _ *http.Request) {
	http.Error(w, "There is no page at this address.", http.StatusNotFound)
}
