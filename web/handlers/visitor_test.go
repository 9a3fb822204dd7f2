package handlers

import (
	"bytes"
	"errors"
	"io"
	"log/slog"
	"mime/multipart"
	"net/http"
	"net/http/httptest"
	"net/url"
	"slices"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"legwright/internal/perf/project"
	"legwright/internal/store"
)

const host = "localhost:8080"

// A visitor is a person's browser in front of a real site with a real database,
// in which project 1 is the demo. It has no script and follows no redirect by itself.
type visitor struct {
	t     testing.TB
	site  http.Handler
	db    *store.DB
	log   *bytes.Buffer // errors of the site
	at    *url.URL      // of the last answer
	reply *httptest.ResponseRecorder
	page  *html.Node // of the last answer, nil when it was no page
	blind bool       // does not read pages, for measuring
}

func visit(t testing.TB) *visitor {
	t.Helper()
	db, err := store.Open(t.Context(), t.TempDir(), "test")
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { db.Close() })
	v := &visitor{t: t, db: db, log: new(bytes.Buffer)}
	v.site, err = New(Config{DB: db, Log: slog.New(slog.NewTextHandler(v.log, &slog.HandlerOptions{Level: slog.LevelError})), Hosts: []string{host}})
	if err != nil {
		t.Fatal(err)
	}
	v.keep(project.Demo())
	return v
}

// keep puts a document into the database as a new project.
func (v *visitor) keep(spec *project.Spec) int64 {
	v.t.Helper()
	doc, err := spec.Encode()
	if err != nil {
		v.t.Fatal(err)
	}
	rev, err := v.db.Create(v.t.Context(), spec.Name, doc, "begun")
	if err != nil {
		v.t.Fatal(err)
	}
	return rev.Project
}

// send makes one request; header is in pairs.
func (v *visitor) send(method, address string, body io.Reader, header ...string) {
	v.t.Helper()
	to, err := url.Parse(address)
	if err != nil {
		v.t.Fatal(err)
	}
	if v.at != nil {
		to = v.at.ResolveReference(to)
	}
	r := httptest.NewRequest(method, to.RequestURI(), body)
	r.Host = host
	for i := 0; i < len(header); i += 2 {
		r.Header.Set(header[i], header[i+1])
	}
	v.reply, v.page = httptest.NewRecorder(), nil
	v.site.ServeHTTP(v.reply, r)
	v.at = &url.URL{Path: to.Path, RawQuery: to.RawQuery}
	if !v.blind && strings.HasPrefix(v.reply.Header().Get("Content-Type"), "text/html") {
		v.page = parsePage(v.t, v.reply.Body.String())
	}
}

func (v *visitor) get(address string, header ...string) {
	v.t.Helper()
	v.send("GET", address, nil, header...)
}

func (v *visitor) post(address string, form url.Values, header ...string) {
	v.t.Helper()
	v.send("POST", address, strings.NewReader(form.Encode()), append(header, "Content-Type", "application/x-www-form-urlencoded")...)
}

// follow goes where a redirect leads.
func (v *visitor) follow() {
	v.t.Helper()
	for range 5 {
		to := v.reply.Header().Get("Location")
		if to == "" {
			return
		}
		v.get(to)
	}
	v.t.Fatalf("%s redirects without end", v.at)
}

// submit sends a form as a browser does, with changes to what stands in its
// fields, by the button with the given action; "" is the button of the Enter key.
func (v *visitor) submit(form *html.Node, changes url.Values, action string, header ...string) {
	v.t.Helper()
	values := controls(form)
	for name, list := range changes {
		box := func(n *html.Node) bool { return attr(n, "name") == name }
		if !values.Has(name) && !slices.ContainsFunc(all(form, "input[type=checkbox]"), box) {
			v.t.Errorf("%s: form %s has no field %s", v.at, attr(form, "id"), name)
		}
		values[name] = list
	}
	if action != "" {
		if !slices.ContainsFunc(all(form, "button[name=action]"), func(b *html.Node) bool { return attr(b, "value") == action }) {
			v.t.Errorf("%s: form %s has no button %s", v.at, attr(form, "id"), action)
		}
		values.Set("action", action)
	}
	if attr(form, "enctype") == "multipart/form-data" {
		body, kind := multiparts(v.t, form, values)
		v.send("POST", attr(form, "action"), body, append(header, "Content-Type", kind)...)
		return
	}
	if strings.EqualFold(attr(form, "method"), "post") {
		v.post(attr(form, "action"), values, header...)
		return
	}
	to := url.URL{Path: attr(form, "action"), RawQuery: values.Encode()}
	v.get(to.String(), header...)
}

// multiparts is the body of a form with files, of which none is chosen, and its type.
func multiparts(t testing.TB, form *html.Node, values url.Values) (io.Reader, string) {
	t.Helper()
	var body bytes.Buffer
	w := multipart.NewWriter(&body)
	var errs []error
	for name, list := range values {
		for _, text := range list {
			if n := one(form, `input[name="`+name+`"]`); n != nil && attr(n, "type") == "file" {
				_, err := w.CreateFormFile(name, "")
				errs = append(errs, err)
				continue
			}
			errs = append(errs, w.WriteField(name, text))
		}
	}
	if err := errors.Join(append(errs, w.Close())...); err != nil {
		t.Fatal(err)
	}
	return &body, w.FormDataContentType()
}

// controls is what a browser would send of a form. An input of one line loses
// its line ends and a text area gets the long ones, as HTML demands.
func controls(form *html.Node) url.Values {
	values := url.Values{}
	for n := range form.Descendants() {
		if n.Type != html.ElementNode || attr(n, "name") == "" || has(n, "disabled") {
			continue
		}
		switch n.Data {
		case "input":
			if attr(n, "type") == "file" || attr(n, "type") == "checkbox" && !has(n, "checked") {
				continue
			}
			values.Add(attr(n, "name"), strings.NewReplacer("\r", "", "\n", "").Replace(value(n)))
		case "select":
			values.Add(attr(n, "name"), value(n))
		case "textarea":
			values.Add(attr(n, "name"), strings.ReplaceAll(value(n), "\n", "\r\n"))
		}
	}
	return values
}

// document is the stored document of a project.
func (v *visitor) document(id int64) []byte {
	v.t.Helper()
	rev, err := v.db.Head(v.t.Context(), id)
	if err != nil {
		v.t.Fatal(err)
	}
	return rev.Doc
}
