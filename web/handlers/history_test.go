package handlers

import (
	"fmt"
	"net/url"
	"strings"
	"testing"
)

// TestLongHistory: three hundred revisions come in pages, each revision once.
func TestLongHistory(t *testing.T) {
	v := visit(t)
	rev, err := v.db.Head(t.Context(), 1)
	if err != nil {
		t.Fatal(err)
	}
	doc, name := rev.Doc, rev.Name
	for i := range 299 {
		if rev, err = v.db.Save(t.Context(), 1, rev.Number, name, doc, fmt.Sprintf("Edit %d of many", i+2)); err != nil {
			t.Fatal(err)
		}
	}
	if err := v.db.NameRevision(t.Context(), 1, 7, "An early one"); err != nil {
		t.Fatal(err)
	}
	v.get("/projects/1/history")
	seen := map[string]bool{}
	for pages := 1; ; pages++ {
		if v.reply.Code != 200 {
			t.Fatalf("%s: status %d", v.at, v.reply.Code)
		}
		if err := checkPage(v.reply.Body.String()); err != nil {
			t.Errorf("%s: %v", v.at, err)
		}
		items := all(v.page, "#revisions .shelf-name")
		if len(items) > historyPage {
			t.Errorf("%s lists %d", v.at, len(items))
		}
		for _, a := range items {
			if seen[attr(a, "href")] {
				t.Errorf("%s twice", attr(a, "href"))
			}
			seen[attr(a, "href")] = true
		}
		if named := one(v.page, "#named") != nil; named != (pages == 1) {
			t.Errorf("page %d: named ones %v", pages, named)
		}
		older := one(v.page, "a[rel=next]")
		if older == nil {
			if pages != 6 {
				t.Errorf("%d pages", pages)
			}
			break
		}
		v.get(attr(older, "href"))
	}
	if len(seen) != 300 {
		t.Errorf("%d revisions listed", len(seen))
	}
	// Naming one on a later page leads back there; a page beyond the last is the last.
	v.get("/projects/1/history?page=5")
	v.submit(one(v.page, "#form-name-70"), url.Values{"name": {"Far down"}}, "")
	if to := v.reply.Header().Get("Location"); to != "/projects/1/history?page=5" {
		t.Errorf("leads to %q", to)
	}
	v.follow()
	v.submit(one(v.page, "#form-name-69"), url.Values{"name": {" "}}, "")
	if v.reply.Code != 422 || !strings.Contains(text(v.page), "A name is required") {
		t.Errorf("status %d", v.reply.Code)
	}
	for _, page := range []string{"99", "0", "-1", "x", "999999999999999999999"} {
		if v.get("/projects/1/history?page=" + page); v.reply.Code != 200 {
			t.Errorf("page %s: status %d", page, v.reply.Code)
		}
	}
}

// TestUnreadableRevision: a revision that the program cannot read is said, and neither looked at nor restored.
func TestUnreadableRevision(t *testing.T) {
	v := visit(t)
	rev, err := v.db.Head(t.Context(), 1)
	if err != nil {
		t.Fatal(err)
	}
	doc := rev.Doc
	if rev, err = v.db.Save(t.Context(), 1, rev.Number, "A", []byte(`{"format": 77}`), "of another program"); err != nil {
		t.Fatal(err)
	}
	if _, err = v.db.Save(t.Context(), 1, rev.Number, "A", doc, "back"); err != nil {
		t.Fatal(err)
	}
	v.get("/projects/1/history/2")
	if v.reply.Code != 422 || !strings.Contains(text(v.page), "cannot read it") {
		t.Errorf("status %d: %s", v.reply.Code, text(v.page))
	}
	v.post("/projects/1/restore/2", nil)
	if v.reply.Code != 422 {
		t.Errorf("restored: status %d", v.reply.Code)
	}
	if h, err := v.db.Head(t.Context(), 1); err != nil || h.Number != 3 {
		t.Errorf("head %d, %v", h.Number, err)
	}
}
