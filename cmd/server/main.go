// Command server runs Legwright on the user's own computer: a web page on the
// loopback address and one folder of data.
package main

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"io"
	"log/slog"
	"net"
	"net/http"
	"os"
	"os/signal"
	"path/filepath"
	"syscall"
	"time"

	"legwright/internal/perf/project"
	"legwright/internal/store"
	"legwright/web/handlers"
)

// version is recorded with each revision that is saved.
const version = "0.1.0"

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	context.AfterFunc(ctx, stop) // a second signal ends the program at once
	err := run(ctx, os.Args[1:], os.Getenv, os.Stdout, os.Stderr)
	stop()
	if err != nil {
		fmt.Fprintln(os.Stderr, "legwright:", err)
		os.Exit(1)
	}
}

// run serves until ctx ends. Args does not hold the program's name.
func run(ctx context.Context, args []string, getenv func(string) string, stdout, stderr io.Writer) error {
	o, err := parseOptions(args, getenv, stdout)
	if errors.Is(err, flag.ErrHelp) {
		return nil
	}
	if err != nil {
		return err
	}
	if o.version {
		_, err := fmt.Fprintln(stdout, "Legwright", version)
		return err
	}
	if o.restore != "" {
		return restore(ctx, o, stdout)
	}
	log := slog.New(slog.NewTextHandler(stderr, &slog.HandlerOptions{Level: o.level}))

	// The database comes before the port: of two programs on the same folder and
	// port, the second should name the folder, which another port does not cure.
	db, err := store.Open(ctx, o.data, version)
	if err != nil {
		return err
	}
	if o.backup != "" {
		return errors.Join(backUp(ctx, o, db, stdout), db.Close())
	}
	if err := begin(ctx, db); err != nil {
		return errors.Join(err, db.Close())
	}
	at := ""
	if o.project != "" {
		if at, err = openFile(ctx, db, o.project); err != nil {
			return errors.Join(err, db.Close())
		}
	}
	return errors.Join(serve(ctx, o, db, log, stdout, at), db.Close())
}

// begin puts the demo project into a new database, so that the first page shows a full result.
func begin(ctx context.Context, db *store.DB) error {
	empty, err := db.Empty(ctx)
	if err != nil || !empty {
		return err
	}
	demo := project.Demo()
	doc, err := demo.Encode()
	if err != nil {
		return err
	}
	_, err = db.Create(ctx, demo.Name, doc, "The demo project")
	return err
}

func serve(ctx context.Context, o options, db *store.DB, log *slog.Logger, stdout io.Writer, opened string) error {
	l, err := listen(ctx, o)
	if err != nil {
		return err
	}
	defer l.Close()
	at := l.Addr().(*net.TCPAddr)
	hosts := o.allowedHosts(at.Port)
	h, err := handlers.New(handlers.Config{DB: db, Log: log, Hosts: hosts})
	if err != nil {
		return err
	}
	srv := &http.Server{
		Handler:           h,
		ReadHeaderTimeout: 5 * time.Second,
		ReadTimeout:       30 * time.Second,
		WriteTimeout:      60 * time.Second, // a report with sampling takes the longest
		IdleTimeout:       2 * time.Minute,
		MaxHeaderBytes:    64 << 10,
		ErrorLog:          slog.NewLogLogger(log.Handler(), slog.LevelWarn),
	}
	log.Info("started", "version", version, "data", o.data, "hosts", hosts)
	if !at.IP.IsLoopback() {
		log.Warn("open to the network: whoever reaches this port can read and change all projects", "address", at.String())
	}
	if _, err := fmt.Fprintf(stdout, "Legwright is at %s\n", o.url(at.Port)); err != nil {
		return err
	}
	if opened != "" {
		if _, err := fmt.Fprintf(stdout, "%s is at %s%s\n", filepath.Base(o.project), o.url(at.Port), opened); err != nil {
			return err
		}
	}

	ended := make(chan error, 1)
	go func() { ended <- srv.Serve(l) }()
	select {
	case err := <-ended:
		return err
	case <-ctx.Done():
	}
	log.Info("stopping")
	return shutDown(srv)
}

// shutDown lets running requests end, for 5 seconds at most.
func shutDown(srv *http.Server) error {
	ctx, cancel := context.WithTimeout(context.Background(), 5*time.Second)
	defer cancel()
	if err := srv.Shutdown(ctx); err != nil {
		return errors.Join(fmt.Errorf("requests were cut off at the end: %w", err), srv.Close())
	}
	return nil
}

func listen(ctx context.Context, o options) (net.Listener, error) {
	l, err := new(net.ListenConfig).Listen(ctx, "tcp", o.listen)
	if errors.Is(err, syscall.EADDRINUSE) {
		return nil, fmt.Errorf("%s is taken by another program, perhaps another Legwright: choose another port, as in -listen %s, or let one be chosen with -listen %s",
			o.listen, o.withPort(o.nextPort()), o.withPort("0"))
	}
	if err != nil {
		return nil, fmt.Errorf("cannot listen on %s: %w", o.listen, err)
	}
	// A name may stand for any address.
	if at, ok := l.Addr().(*net.TCPAddr); !o.allowNetwork && (!ok || !at.IP.IsLoopback()) {
		l.Close()
		return nil, networkError(o.listen)
	}
	return l, nil
}
