package handlers

import (
	"log/slog"
	"net/http"
	"runtime/debug"
	"strings"
	"time"

	"github.com/go-chi/chi/v5/middleware"
)

// The server has no password: what keeps other web pages and other computers
// out is the address that it listens on and the checks of this file. They rest
// on GET changing nothing.

// policy lets a page use this server's own files and nothing else: no inline
// script, no style attribute, no other host.
const policy = "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; " +
	"connect-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'"

// Largest bodies in bytes: forms; what carries whole projects, which is the JSON
// interface and imports; and sheets, of which more is let in than is read, so that the page can say so.
const (
	maxForm    = 1 << 20
	maxProject = 8 << 20
	maxUpload  = 8 << 20
)

// guards returns the checks in the order in which they must run. The log comes
// first so that it also has the requests that are refused.
func guards(hosts []string, log *slog.Logger) []func(http.Handler) http.Handler {
	return []func(http.Handler) http.Handler{
		logRequests(log),
		recoverPanics(log),
		allowHosts(hosts),
		setHeaders,
		refuseForeignReads,
		http.NewCrossOriginProtection().Handler,
		limitBody,
	}
}

// recoverPanics answers 500 instead of a panic, unless the answer has begun.
func recoverPanics(log *slog.Logger) func(http.Handler) http.Handler {
	return func(next http.Handler) http.Handler {
		return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
			ww := middleware.NewWrapResponseWriter(w, r.ProtoMajor)
			defer func() {
				p := recover()
				if p == nil {
					return
				}
				if p != http.ErrAbortHandler {
					log.Error("panic", "method", r.Method, "path", r.URL.Path, "value", p, "stack", string(debug.Stack()))
				}
				if p == http.ErrAbortHandler || ww.Status() != 0 {
					// Only a broken connection tells the client that the answer is not whole.
					panic(http.ErrAbortHandler)
				}
				http.Error(ww, "Something went wrong inside Legwright. The log says what.", http.StatusInternalServerError)
			}()
			next.ServeHTTP(ww, r)
		})
	}
}

// allowHosts refuses a request whose Host is not one of hosts, in full with
// the port. A foreign page can have its own name resolve to 127.0.0.1 (DNS
// rebinding) and would then be of the same origin as this server; the name in
// Host gives it away.
func allowHosts(hosts []string) func(http.Handler) http.Handler {
	allowed := make(map[string]bool, len(hosts))
	for _, h := range hosts {
		allowed[strings.ToLower(h)] = true
	}
	return func(next http.Handler) http.Handler {
		return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
			if !allowed[strings.ToLower(r.Host)] {
				http.Error(w, "Legwright does not answer under this name. Use the address that it printed at its start.", http.StatusMisdirectedRequest)
				return
			}
			next.ServeHTTP(w, r)
		})
	}
}

func setHeaders(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		h := w.Header()
		h.Set("Content-Security-Policy", policy)
		h.Set("X-Content-Type-Options", "nosniff")
		h.Set("Referrer-Policy", "same-origin")
		h.Set("Cross-Origin-Opener-Policy", "same-origin")
		h.Set("Cross-Origin-Resource-Policy", "same-origin")
		next.ServeHTTP(w, r)
	})
}

// refuseForeignReads refuses what another page loads from here, be it only a
// picture; a link from another page to one of ours is let through.
// CrossOriginProtection lets all of these through, since they change nothing.
func refuseForeignReads(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		switch r.Header.Get("Sec-Fetch-Site") {
		case "", "same-origin", "none": // none: typed, or a bookmark
		default:
			link := r.Method == http.MethodGet && r.Header.Get("Sec-Fetch-Mode") == "navigate" && r.Header.Get("Sec-Fetch-Dest") == "document"
			if !link {
				http.Error(w, "Another site may not use Legwright.", http.StatusForbidden)
				return
			}
		}
		next.ServeHTTP(w, r)
	})
}

// limitBody refuses a body that says it is too large. One that does not say
// so ends, when it is read, with a *http.MaxBytesError.
func limitBody(next http.Handler) http.Handler {
	return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
		limit := int64(maxForm)
		if r.URL.Path == "/api" || strings.HasPrefix(r.URL.Path, "/api/") || r.URL.Path == "/projects/import" {
			limit = maxProject
		}
		if strings.Contains(r.URL.Path, "/variants/") && strings.HasSuffix(r.URL.Path, "/import") {
			limit = maxUpload
		}
		if r.ContentLength > limit {
			http.Error(w, "This is too large to be taken.", http.StatusRequestEntityTooLarge)
			return
		}
		r.Body = http.MaxBytesReader(w, r.Body, limit)
		next.ServeHTTP(w, r)
	})
}

// logRequests writes one line a request at debug level, without the query,
// which holds what the user typed.
func logRequests(log *slog.Logger) func(http.Handler) http.Handler {
	return func(next http.Handler) http.Handler {
		return http.HandlerFunc(func(w http.ResponseWriter, r *http.Request) {
			if !log.Enabled(r.Context(), slog.LevelDebug) {
				next.ServeHTTP(w, r)
				return
			}
			ww := middleware.NewWrapResponseWriter(w, r.ProtoMajor)
			start := time.Now()
			defer func() {
				log.Debug("request", "method", r.Method, "path", r.URL.Path, "status", ww.Status(),
					"bytes", ww.BytesWritten(), "took", time.Since(start))
			}()
			next.ServeHTTP(ww, r)
		})
	}
}
