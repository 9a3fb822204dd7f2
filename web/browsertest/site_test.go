package browsertest

import (
	"context"
	"errors"
	"log/slog"
	"net"
	"net/http"
	"os"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/store"
	"legwright/web/handlers"
)

// A site is a running server on a data folder of its own.
type site struct {
	t    *testing.T
	dir  string
	url  string // without a slash at its end
	stop func()
}

// newSite starts a server whose database holds the given projects.
func newSite(t *testing.T, specs ...*project.Spec) *site {
	t.Helper()
	needBrowser(t)
	t.Parallel()
	s := &site{t: t, dir: t.TempDir(), stop: func() {}}
	t.Cleanup(func() { s.stop() })
	s.start(specs...)
	return s
}

// start serves the data folder on a free port.
func (s *site) start(specs ...*project.Spec) {
	s.t.Helper()
	ctx := context.Background()
	db, err := store.Open(ctx, s.dir, "test")
	if err != nil {
		s.t.Fatal(err)
	}
	for _, spec := range specs {
		doc, err := spec.Encode()
		if err != nil {
			s.t.Fatal(err)
		}
		if _, err := db.Create(ctx, spec.Name, doc, "for a test"); err != nil {
			s.t.Fatal(err)
		}
	}
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		s.t.Fatal(err)
	}
	h, err := handlers.New(handlers.Config{DB: db, Log: slog.New(slog.NewTextHandler(os.Stderr, &slog.HandlerOptions{Level: slog.LevelWarn})), Hosts: []string{l.Addr().String()}})
	if err != nil {
		s.t.Fatal(err)
	}
	srv := &http.Server{Handler: h}
	ended := make(chan error, 1)
	go func() { ended <- srv.Serve(l) }()
	s.url = "http://" + l.Addr().String()
	s.stop = func() {
		s.stop = func() {}
		srv.Close()
		if err := <-ended; !errors.Is(err, http.ErrServerClosed) {
			s.t.Error(err)
		}
		if err := db.Close(); err != nil {
			s.t.Error(err)
		}
	}
}

// restart ends the server and starts another on the same data folder.
func (s *site) restart() {
	s.t.Helper()
	s.stop()
	s.start()
}
