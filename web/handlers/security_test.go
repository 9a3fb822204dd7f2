package handlers

import (
	"bytes"
	"errors"
	"io"
	"log/slog"
	"net/http"
	"net/http/httptest"
	"strings"
	"testing"

	"github.com/go-chi/chi/v5"

	"legwright/internal/store"
)

// guarded puts h behind the guards, with its log at debug level.
func guarded(h http.HandlerFunc) (http.Handler, *bytes.Buffer) {
	var log bytes.Buffer
	r := chi.NewRouter()
	r.Use(guards([]string{"127.0.0.1:8080", "LocalHost:8080", "[::1]:8080"},
		slog.New(slog.NewTextHandler(&log, &slog.HandlerOptions{Level: slog.LevelDebug})))...)
	r.HandleFunc("/*", h)
	return r, &log
}

// readBody answers with the number of bytes of the body.
func readBody(w http.ResponseWriter, r *http.Request) {
	b, err := io.ReadAll(r.Body)
	var large *http.MaxBytesError
	if errors.As(err, &large) {
		http.Error(w, "too large", http.StatusRequestEntityTooLarge)
		return
	}
	if err != nil {
		http.Error(w, err.Error(), http.StatusBadRequest)
		return
	}
	w.Header().Set("Seen", http.StatusText(http.StatusOK))
	w.Write(b)
}

func request(method, path, host string, header map[string]string, body io.Reader) *http.Request {
	r := httptest.NewRequest(method, path, body)
	r.Host = host
	for k, v := range header {
		r.Header.Set(k, v)
	}
	return r
}

func TestWhoGetsThrough(t *testing.T) {
	type headers = map[string]string
	const own = "localhost:8080"
	link := func(site string) headers {
		return headers{"Sec-Fetch-Site": site, "Sec-Fetch-Mode": "navigate", "Sec-Fetch-Dest": "document"}
	}
	for _, c := range []struct {
		about, method, host string
		header              headers
		want                int
	}{
		{"typed address", "GET", "127.0.0.1:8080", headers{"Sec-Fetch-Site": "none"}, 200},
		{"client without a browser's headers", "GET", "127.0.0.1:8080", nil, 200},
		{"name in capitals", "GET", "LOCALHOST:8080", nil, 200},
		{"IPv6", "GET", "[::1]:8080", nil, 200},
		{"name that was made to point here", "GET", "elsewhere.example:8080", nil, 421},
		{"same, as its own page sees it", "POST", "elsewhere.example:8080", headers{"Sec-Fetch-Site": "same-origin", "Origin": "http://elsewhere.example:8080"}, 421},
		{"other port", "GET", "localhost:8081", nil, 421},
		{"no port", "GET", "localhost", nil, 421},
		{"no host", "GET", "", nil, 421},
		{"name that begins alike", "GET", "localhost:8080.elsewhere.example", nil, 421},
		{"name with a dot at its end", "GET", "localhost.:8080", nil, 421},

		{"own page reads", "GET", own, headers{"Sec-Fetch-Site": "same-origin", "Sec-Fetch-Mode": "cors"}, 200},
		{"own form", "POST", own, headers{"Sec-Fetch-Site": "same-origin", "Origin": "http://localhost:8080"}, 200},
		{"own form, old browser", "POST", own, headers{"Origin": "http://localhost:8080"}, 200},
		{"command line posts", "POST", own, nil, 200},

		{"foreign form", "POST", own, headers{"Sec-Fetch-Site": "cross-site", "Origin": "http://elsewhere.example"}, 403},
		{"foreign form that navigates", "POST", own, link("cross-site"), 403},
		{"foreign form, old browser", "POST", own, headers{"Origin": "http://elsewhere.example"}, 403},
		{"foreign delete, old browser", "DELETE", own, headers{"Origin": "http://elsewhere.example"}, 403},
		{"form of a sandboxed page", "POST", own, headers{"Origin": "null"}, 403},
		{"form of another port here", "POST", own, headers{"Sec-Fetch-Site": "same-site", "Origin": "http://localhost:9999"}, 403},
		{"same, old browser", "POST", own, headers{"Origin": "http://localhost:9999"}, 403},
		{"own name at another address", "POST", own, headers{"Origin": "http://127.0.0.1:8080"}, 403},

		{"foreign page links here", "GET", own, link("cross-site"), 200},
		{"page of another port links here", "GET", own, link("same-site"), 200},
		{"foreign picture", "GET", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "no-cors", "Sec-Fetch-Dest": "image"}, 403},
		{"foreign script asks", "GET", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "cors", "Sec-Fetch-Dest": "empty"}, 403},
		{"foreign frame", "GET", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "navigate", "Sec-Fetch-Dest": "iframe"}, 403},
		{"script of another port asks", "GET", own, headers{"Sec-Fetch-Site": "same-site", "Sec-Fetch-Mode": "cors"}, 403},
		{"foreign HEAD", "HEAD", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "no-cors"}, 403},
		{"foreign HEAD that says it navigates", "HEAD", own, link("cross-site"), 403},
		{"foreign script asks for a document", "GET", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "cors", "Sec-Fetch-Dest": "document"}, 403},
		{"foreign OPTIONS", "OPTIONS", own, headers{"Sec-Fetch-Site": "cross-site", "Sec-Fetch-Mode": "cors"}, 403},
		{"unknown kind of site", "GET", own, headers{"Sec-Fetch-Site": "new-kind"}, 403},
	} {
		h, log := guarded(readBody)
		w := httptest.NewRecorder()
		h.ServeHTTP(w, request(c.method, "/p", c.host, c.header, nil))
		if w.Code != c.want {
			t.Errorf("%s: status %d, want %d", c.about, w.Code, c.want)
		}
		if reached := w.Header().Get("Seen") != ""; reached != (c.want == 200) {
			t.Errorf("%s: reached the page: %v", c.about, reached)
		}
		if strings.Count(log.String(), "\n") != 1 || !strings.Contains(log.String(), "msg=request") {
			t.Errorf("%s: log %q, want one line", c.about, log)
		}
	}
}

// unsized hides the length of a body, as a chunked request does.
type unsized struct{ io.Reader }

func TestBodyLimits(t *testing.T) {
	for _, c := range []struct {
		path string
		size int
		want int
	}{
		{"/p", maxForm, 200},
		{"/p", maxForm + 1, 413},
		{"/apiary", maxForm + 1, 413},
		{"/api", maxForm + 1, 200},
		{"/api/v", maxProject, 200},
		{"/api/v", maxProject + 1, 413},
	} {
		for _, sized := range []bool{true, false} {
			h, _ := guarded(readBody)
			var body io.Reader = strings.NewReader(strings.Repeat("x", c.size))
			if !sized {
				body = unsized{body}
			}
			w := httptest.NewRecorder()
			h.ServeHTTP(w, request("POST", c.path, "localhost:8080", nil, body))
			if w.Code != c.want || c.want == 200 && w.Body.Len() != c.size {
				t.Errorf("%d bytes to %s, size known %v: status %d with %d bytes, want %d", c.size, c.path, sized, w.Code, w.Body.Len(), c.want)
			}
		}
	}
	reached := false
	h, _ := guarded(func(http.ResponseWriter, *http.Request) { reached = true })
	h.ServeHTTP(httptest.NewRecorder(), request("POST", "/p", "localhost:8080", nil, strings.NewReader(strings.Repeat("x", maxForm+1))))
	if reached {
		t.Error("a body that says it is too large reached the page")
	}
}

func TestHeaders(t *testing.T) {
	h, _ := guarded(readBody)
	foreign := map[string]string{"Sec-Fetch-Site": "cross-site"}
	for _, header := range []map[string]string{nil, foreign} {
		w := httptest.NewRecorder()
		h.ServeHTTP(w, request("GET", "/p", "localhost:8080", header, nil))
		for name, want := range map[string]string{
			"Content-Security-Policy": "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; " +
				"connect-src 'self'; form-action 'self'; base-uri 'none'; frame-ancestors 'none'",
			"X-Content-Type-Options":       "nosniff",
			"Referrer-Policy":              "same-origin",
			"Cross-Origin-Opener-Policy":   "same-origin",
			"Cross-Origin-Resource-Policy": "same-origin",
		} {
			if got := w.Header().Get(name); got != want {
				t.Errorf("status %d: %s is %q, want %q", w.Code, name, got, want)
			}
		}
	}
}

func TestPanic(t *testing.T) {
	h, log := guarded(func(http.ResponseWriter, *http.Request) { panic("wing off") })
	w := httptest.NewRecorder()
	h.ServeHTTP(w, request("GET", "/p?mass=secret", "localhost:8080", nil, nil))
	if w.Code != 500 || strings.Contains(w.Body.String(), "wing off") {
		t.Errorf("status %d, body %q", w.Code, w.Body)
	}
	if got := log.String(); !strings.Contains(got, "wing off") || !strings.Contains(got, "security_test.go") || !strings.Contains(got, "status=500") {
		t.Errorf("log %q lacks the panic, its place or the status", got)
	}
	if strings.Contains(log.String(), "secret") {
		t.Errorf("log %q shows the query", log)
	}
}

// An answer that was begun must not look complete.
func TestPanicHalfWay(t *testing.T) {
	h, log := guarded(func(w http.ResponseWriter, _ *http.Request) {
		io.WriteString(w, "half")
		panic("wing off")
	})
	defer func() {
		if p := recover(); p != http.ErrAbortHandler {
			t.Errorf("recovered %v", p)
		}
		if !strings.Contains(log.String(), "wing off") {
			t.Errorf("log %q", log)
		}
	}()
	h.ServeHTTP(httptest.NewRecorder(), request("GET", "/p", "localhost:8080", nil, nil))
}

func TestNew(t *testing.T) {
	db, err := store.Open(t.Context(), t.TempDir(), "test")
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	log := slog.New(slog.DiscardHandler)
	h, err := New(Config{DB: db, Log: log, Hosts: []string{"localhost:8080"}})
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		method, path, host string
		status             int
		kind               string
		says               string
	}{
		{"GET", "/healthz", "localhost:8080", 200, "text/plain; charset=utf-8", "ok"},
		{"POST", "/healthz", "localhost:8080", 405, "", ""},
		{"GET", "/nowhere", "localhost:8080", 404, "text/html; charset=utf-8", "<p class=\"lead\">There is no page at this address.</p>"},
		{"GET", "/nowhere", "elsewhere.example", 421, "text/plain; charset=utf-8", "Legwright does not answer under this name. Use the address that it printed at its start.\n"},
	} {
		w := httptest.NewRecorder()
		h.ServeHTTP(w, request(c.method, c.path, c.host, nil, nil))
		if w.Code != c.status || !strings.Contains(w.Body.String(), c.says) {
			t.Errorf("%s %s: %d %q, want %d %q", c.method, c.path, w.Code, w.Body, c.status, c.says)
		}
		if kind := w.Header().Get("Content-Type"); kind != c.kind {
			t.Errorf("%s: type %q, want %q", c.path, kind, c.kind)
		}
	}
	for _, cfg := range []Config{{Log: log, Hosts: []string{"x"}}, {DB: db, Hosts: []string{"x"}}, {DB: db, Log: log}} {
		if _, err := New(cfg); err == nil {
			t.Errorf("New took %+v", cfg)
		}
	}
}
