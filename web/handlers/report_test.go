package handlers

import (
	"bytes"
	"mime"
	"strings"
	"testing"

	"legwright/internal/perf/project"
	"legwright/web/report"
)

// TestReportPage: everything on offer can be chosen, and each file is there under the name of its revision.
func TestReportPage(t *testing.T) {
	v := visit(t)
	const at = "/projects/1/variants/b/"
	v.get(at + "report")
	if err := checkPage(v.reply.Body.String()); err != nil {
		t.Error(err)
	}
	for _, s := range report.Sections {
		if box := one(v.page, "#part-"+s.ID); box == nil || !has(box, "checked") || attr(box, "value") != s.ID {
			t.Errorf("no box for %s", s.ID)
		}
	}
	if n := len(all(v.page, "#report-cautions li")); n != 5 {
		t.Errorf("%d cautions", n)
	}
	if n := len(all(v.page, "#tables tbody tr")); n != len(report.Listing()) {
		t.Errorf("%d tables", n)
	}
	if got := text(one(v.page, "[aria-current=page]")); !strings.HasPrefix(got, "B ·") {
		t.Errorf("at %q", got)
	}
	for _, c := range []struct{ path, kind, name, begins string }{
		{"report.pdf?paper=letter&units=aviation&section=weights", "application/pdf", "sorrel-down-to-the-lake-and-back-b-74-kw-climb-propeller-r1-report.pdf", "%PDF-"},
		{"tables.zip?units=si", "application/zip", "sorrel-down-to-the-lake-and-back-b-74-kw-climb-propeller-r1-tables.zip", "PK"},
		{"tables/weights.csv?units=aviation", "text/csv", "sorrel-down-to-the-lake-and-back-b-74-kw-climb-propeller-r1-weights.csv", "\ufeffMass,Mass [lb],Remark\r\n"},
		{"tables/weights.csv?units=cubits", "text/csv", "sorrel-down-to-the-lake-and-back-b-74-kw-climb-propeller-r1-weights.csv", "\ufeffMass,Mass [kg],Remark\r\n"},
	} {
		v.at = nil
		v.get(at + c.path)
		kind, _, _ := mime.ParseMediaType(v.reply.Header().Get("Content-Type"))
		how, name, _ := mime.ParseMediaType(v.reply.Header().Get("Content-Disposition"))
		if v.reply.Code != 200 || kind != c.kind || how != "attachment" || name["filename"] != c.name || v.reply.Header().Get("Cache-Control") != "no-store" {
			t.Errorf("%s: %d %v", c.path, v.reply.Code, v.reply.Header())
		}
		if !strings.HasPrefix(v.reply.Body.String(), c.begins) {
			t.Errorf("%s begins with %.30q", c.path, v.reply.Body)
		}
	}
	for _, path := range []string{"tables/nothing.csv", "tables/weights", "tables/weights.txt", "tables/..%2fweights.csv"} {
		v.at = nil
		v.get(at + path)
		if v.reply.Code != 404 {
			t.Errorf("%s: %d", path, v.reply.Code)
		}
	}
	for _, path := range []string{"report", "report.pdf", "tables.zip", "tables/weights.csv"} {
		v.at = nil
		v.get("/projects/1/variants/nobody/" + path)
		if v.reply.Code != 404 {
			t.Errorf("no variant, %s: %d", path, v.reply.Code)
		}
	}
}

// TestReportStands: asking twice for the same revision gives the same bytes, whatever was edited between, and
// an edit gives others.
func TestReportStands(t *testing.T) {
	v := visit(t)
	const at = "/projects/1/variants/a"
	get := func() []byte {
		v.at = nil
		v.get(at + "/report.pdf?section=weights")
		return bytes.Clone(v.reply.Body.Bytes())
	}
	first := get()
	if !bytes.Equal(first, get()) {
		t.Error("two reports of one revision differ")
	}
	v.post(at, map[string][]string{"variants[0].aircraft.weights.empty": {"310"}, "was:variants[0].aircraft.weights.empty": {"298"}})
	if v.reply.Code >= 400 {
		t.Fatal(v.reply.Code, v.reply.Body)
	}
	if bytes.Equal(first, get()) {
		t.Error("the edit is not in the report")
	}
	v.post(at+"/undo", nil)
	if !bytes.Equal(first, get()) {
		t.Error("back at the revision the report is another")
	}
}

// TestReportName: whatever a project is called, its files have a name.
func TestReportName(t *testing.T) {
	for name, want := range map[string]string{"A · 60 kW, climb": "a-60-kw-climb", "": "x", "高度": "x", "../../etc": "etc", "a\r\nb\"": "a-b", strings.Repeat("ab ", 40): "ab-ab-ab-ab-ab-ab-ab-ab-ab-ab-ab-ab-ab-a"} {
		if got := slug(name, "x"); got != want {
			t.Errorf("%q becomes %q, want %q", name, got, want)
		}
	}
	v := visit(t)
	s := project.Demo()
	s.Name, s.Variants[0].Name = "高度", "\"; filename=evil.exe"
	v.keep(s)
	v.get("/projects/2/variants/a/tables/weights.csv")
	if got := v.reply.Header().Get("Content-Disposition"); got != "attachment; filename=project-filename-evil-exe-r1-weights.csv" {
		t.Error(got)
	}
}
