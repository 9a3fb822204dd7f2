package handlers

import (
	"bytes"
	"io"
	"mime"
	"mime/multipart"
	"net/http"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/store"
)

// uploads sends a file in the named field of a form, as a browser does.
func (v *visitor) uploads(address, field, name, content string) {
	v.t.Helper()
	var body bytes.Buffer
	form := multipart.NewWriter(&body)
	part, err := form.CreateFormFile(field, name)
	if err == nil {
		_, err = io.WriteString(part, content)
	}
	if err == nil {
		err = form.Close()
	}
	if err != nil {
		v.t.Fatal(err)
	}
	v.send("POST", address, &body, "Content-Type", form.FormDataContentType())
}

// What is saved as a file and taken in elsewhere is the same document, byte for byte.
func TestExportImport(t *testing.T) {
	from, to := visit(t), visit(t)
	from.get("/projects/1/project.json")
	text := from.reply.Body.String()
	kind, params, err := mime.ParseMediaType(from.reply.Header().Get("Content-Disposition"))
	if err != nil || kind != "attachment" || params["filename"] != project.Demo().Name+".json" {
		t.Errorf("saved as %s %v, %v", kind, params, err)
	}
	if text != string(from.document(1)) {
		t.Error("the file is not the stored document")
	}
	to.uploads("/projects/import", "file", "sorrel.json", text)
	if to.reply.Code != http.StatusSeeOther || to.reply.Header().Get("Location") != "/projects/2" {
		t.Fatalf("%d %s", to.reply.Code, to.reply.Body)
	}
	if !bytes.Equal(to.document(2), from.document(1)) {
		t.Error("the imported document is another")
	}
	to.follow()
	if to.reply.Code != http.StatusOK {
		t.Errorf("the imported project: %d", to.reply.Code)
	}
}

func TestExportNames(t *testing.T) {
	v := visit(t)
	for name, want := range map[string]string{`a "b" \c/d`: "a _b_ _c_d.json", "Möwe ✈": "Möwe ✈.json", "..": "...json", "a\tb": "a_b.json"} {
		spec := project.New(name)
		id := v.keep(spec)
		v.get("/projects/" + string(rune('0'+id)) + "/project.json")
		_, params, err := mime.ParseMediaType(v.reply.Header().Get("Content-Disposition"))
		if err != nil || params["filename"] != want {
			t.Errorf("%q is saved as %q, %v; want %q", name, params["filename"], err, want)
		}
	}
}

func TestImportRefuses(t *testing.T) {
	v := visit(t)
	demo := string(v.document(1))
	for _, test := range []struct{ about, content, says string }{
		{"nothing", "", "JSON"},
		{"a picture", "\x89PNG\r\n\x1a\n\x00\x00", "not well-formed"},
		{"cut off", demo[:len(demo)/2], "not well-formed"},
		{"another's JSON", `{"aircraft": [1, 2, 3]}`, "aircraft"},
		{"a newer format", strings.Replace(demo, `"format": 2`, `"format": 99`, 1), "format"},
		{"a wrong number", strings.Replace(demo, `"wing_area": 12.1`, `"wing_area": -1`, 1), "wing area must be"},
		{"deep", strings.Repeat("[", 1e5), "JSON"},
		{"large", demo + strings.Repeat(" ", project.MaxBytes), "bytes"},
		{"script", `{"<script>alert(1)</script>": 1}`, "script"},
	} {
		v.uploads("/projects/import", "file", "x<b>.json", test.content)
		if v.reply.Code != http.StatusUnprocessableEntity || !strings.Contains(v.reply.Body.String(), test.says) || strings.Contains(v.reply.Body.String(), "<script>alert") {
			t.Errorf("%s: %d, want %q in %s", test.about, v.reply.Code, test.says, only(v, "#import-error"))
		}
	}
	v.uploads("/projects/import", "other", "x.json", demo)
	if v.reply.Code != http.StatusUnprocessableEntity {
		t.Errorf("without a file: %d", v.reply.Code)
	}
	v.post("/projects/import", nil)
	if v.reply.Code != http.StatusBadRequest {
		t.Errorf("a form without a file: %d", v.reply.Code)
	}
	v.uploads("/projects/import", "file", "x.json", strings.Repeat(" ", maxProject+1))
	if v.reply.Code != http.StatusRequestEntityTooLarge {
		t.Errorf("too large: %d", v.reply.Code)
	}
	list, err := v.db.Projects(t.Context())
	if err != nil || len(list) != 1 {
		t.Errorf("projects after all that: %+v, %v", list, err)
	}
}

// only is the text of the first element that the selector finds.
func only(v *visitor, selector string) string {
	if v.page == nil {
		return ""
	}
	for _, n := range all(v.page, selector) {
		return text(n)
	}
	return ""
}

// A backup made on the page is listed, can be saved, and is a database of the same projects.
func TestBackupPage(t *testing.T) {
	v := visit(t)
	v.get("/backups")
	if v.reply.Code != http.StatusOK || !strings.Contains(v.reply.Body.String(), "none yet") {
		t.Fatalf("%d %s", v.reply.Code, v.reply.Body)
	}
	v.post("/backups", nil)
	v.follow()
	links := all(v.page, ".shelf-name")
	if len(links) != 1 {
		t.Fatalf("%d backups listed", len(links))
	}
	v.get(attr(links[0], "href"))
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, store.FileName), v.reply.Body.Bytes(), 0o600); err != nil {
		t.Fatal(err)
	}
	db, err := store.Open(t.Context(), dir, "test")
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	rev, err := db.Head(t.Context(), 1)
	if err != nil || !bytes.Equal(rev.Doc, v.document(1)) {
		t.Errorf("in the saved backup: %v", err)
	}
	v.get("/backups/legwright.db")
	if v.reply.Code != http.StatusNotFound {
		t.Errorf("another file of the folder: %d", v.reply.Code)
	}
}
