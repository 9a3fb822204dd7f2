package report_test

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"runtime"
	"slices"
	"strings"
	"sync"
	"testing"

	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/web/report"
)

// tool runs a program that knows PDF from outside. Without it the test is left out, except
// with CI=true, where it fails.
func tool(t *testing.T, name string, args ...string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil {
		const missing = ": install the packages poppler-utils and qpdf"
		if os.Getenv("CI") == "true" {
			t.Fatal(name + missing)
		}
		t.Skip(name + missing)
	}
	out, err := exec.Command(path, args...).CombinedOutput()
	if err != nil {
		t.Fatalf("%s: %v\n%s", name, err, out)
	}
	return string(out)
}

// printed keeps what a report was printed to: a report does not change.
var printed sync.Map

func pdf(t testing.TB, r *report.Report) []byte {
	t.Helper()
	if b, ok := printed.Load(r); ok {
		return b.([]byte)
	}
	b, err := r.PDF()
	if err != nil {
		t.Fatal(err)
	}
	printed.Store(r, b)
	return b
}

// file writes the report to a file of the test's own.
func file(t *testing.T, r *report.Report) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "report.pdf")
	if err := os.WriteFile(path, pdf(t, r), 0o600); err != nil {
		t.Fatal(err)
	}
	return path
}

var blanks = strings.NewReplacer("\u00a0", " ", "\u202f", " ", "\u2009", " ")

// flat makes every run of blanks one.
func flat(s string) string { return strings.Join(strings.Fields(blanks.Replace(s)), " ") }

// pages is the text of each page as a reader copies it.
func pages(t *testing.T, path string) []string {
	t.Helper()
	list := strings.Split(tool(t, "pdftotext", "-enc", "UTF-8", path, "-"), "\f")
	return list[:len(list)-1]
}

// TestPDFIsSound: the outline of the file is right, every font is in it and its text can be read.
func TestPDFIsSound(t *testing.T) {
	for name, r := range cases(t) {
		t.Run(name, func(t *testing.T) {
			path := file(t, r)
			if out := tool(t, "qpdf", "--check", path); !strings.Contains(out, "No syntax or stream encoding errors") || strings.Contains(strings.ToUpper(out), "WARNING") {
				t.Error(out)
			}
			fonts := strings.Split(strings.TrimSpace(tool(t, "pdffonts", path)), "\n")[2:]
			if len(fonts) == 0 {
				t.Error("no fonts")
			}
			for _, line := range fonts {
				if f := strings.Fields(line); !slices.Equal(f[len(f)-5:len(f)-2], []string{"yes", "no", "yes"}) {
					t.Errorf("a font is not embedded or has no Unicode: %s", line)
				}
			}
			if out := tool(t, "pdfimages", "-list", path); strings.Count(out, "\n") > 2 {
				t.Errorf("pictures of dots in the file:\n%s", out)
			}
			text := pages(t, path)
			for i, page := range text {
				for _, want := range []string{"Predicted", "Design estimates, not flight data", fmt.Sprintf("page %d of %d", i+1, len(text))} {
					if !strings.Contains(page, want) {
						t.Errorf("page %d does not say %q", i+1, want)
					}
				}
				for _, wreck := range []string{"NaN", "Inf\n", "%!", "<nil>", "{}"} {
					if strings.Contains(page, wreck) {
						t.Errorf("page %d holds %q", i+1, wreck)
					}
				}
			}
			first := flat(text[0])
			for i, c := range r.Cautions() {
				if !strings.Contains(first, flat(c)) {
					t.Errorf("the first page lacks caution %d", i+1)
				}
			}
		})
	}
}

// TestPDFAgrees: the numbers on paper are those of the study.
func TestPDFAgrees(t *testing.T) {
	for name, r := range cases(t) {
		if name == "long" { // its names are broken over lines
			continue
		}
		t.Run(name, func(t *testing.T) {
			all := flat(strings.Join(pages(t, file(t, r)), "\n"))
			st, sys := r.Study, r.Study.Project.Spec.System()
			want := func(what, text string) {
				if !strings.Contains(all, flat(text)) {
					t.Errorf("%s: no %q", what, flat(text))
				}
			}
			for i := range st.Figures {
				if f := &st.Figures[i]; f.Has() {
					want(f.ID, sys.Format(f.Quantity, f.Value))
				} else {
					want(f.ID, f.Reason.In(sys)[1:])
				}
			}
			answer := st.Answer()
			for i, l := range answer.Legs {
				want(l.Name, sys.Number(units.Duration, l.Time))
				want(l.Name, sys.Number(units.Mass, l.Mass))
				_ = i
			}
			for _, run := range []struct{ total, factored *float64 }{{answer.TakeOff.Total, answer.TakeOff.Factored}, {answer.Landing.Total, answer.Landing.Factored}} {
				if run.total != nil {
					want("strip", sys.Number(units.FieldLength, *run.total))
					want("strip", sys.Number(units.FieldLength, *run.factored))
				}
			}
			for _, s := range answer.Speeds {
				if s.TAS != nil {
					want(s.Name, sys.Number(units.Speed, *s.TAS))
				}
			}
			h := st.Handbook()
			for _, m := range h.Masses {
				if p := st.HandbookRun(false, m.Mass, h.Ground[1], h.Temperatures[2]); p.Has() {
					want("take-off table", sys.Number(units.FieldLength, p.Run.Ground)+" / "+sys.Number(units.FieldLength, p.Run.Total)+" / "+sys.Number(units.FieldLength, p.Run.Factored))
				}
				if c := st.HandbookClimb(m.Mass, h.Aloft[1], h.Deviations[2]); c.Err == nil {
					want("climb table", sys.Number(units.ClimbRate, c.Rate)+" / "+sys.Number(units.Speed, c.CAS)+" / "+sys.Number(units.Fraction, c.Gradient))
				}
			}
			for _, w := range st.Warnings {
				want(w.Code, w.Clear)
			}
		})
	}
}

// TestPDFFirstPage: what must stand there does, and what moves the answer is named with its ends.
func TestPDFFirstPage(t *testing.T) {
	r := of(t, project.Demo(), 0, units.Metric)
	first := flat(pages(t, file(t, r))[0])
	for _, want := range []string{"Flies the mission, with 16 % thrust in hand", "Tightest at the start of “Cruise out”", "Misses one requirement of 5", "missed", "What moves the answer most",
		"Minimum drag coefficient", "± 0.003, stated", "± 10 %, estimated", "the five that matter most", "revision 12, saved 2026-11-30 16:40 UTC", "not approved data"} {
		if !strings.Contains(strings.ToLower(first), strings.ToLower(want)) {
			t.Errorf("no %q in %s", want, first)
		}
	}
	t.Run("unmanned", func(t *testing.T) {
		text := flat(strings.Join(pages(t, file(t, of(t, small(), 0, units.Small))), " "))
		for _, want := range []string{"Form for an unmanned aircraft", "well-tuned autopilot", "Time on station", "launch by hand, rail or bungee", "Camera"} {
			if !strings.Contains(strings.ToLower(text), strings.ToLower(want)) {
				t.Errorf("no %q", want)
			}
		}
	})
}

// TestPDFChoices: only what was asked for goes in, on the paper asked for.
func TestPDFChoices(t *testing.T) {
	r := of(t, project.Demo(), 0, units.Metric)
	r.Sections, r.Paper = []string{"weights"}, report.PaperOf("letter")
	path := file(t, r)
	info := tool(t, "pdfinfo", path)
	if !strings.Contains(info, "612 x 792 pts (letter)") || !strings.Contains(info, "Title:           Predicted performance: Sorrel Down") {
		t.Error(info)
	}
	text := strings.Join(pages(t, path), "\n")
	if !strings.Contains(text, "Greatest take-off mass") || strings.Contains(text, "Glide at idle") {
		t.Error("weights alone were asked for")
	}
	b := pdf(t, r)
	if !bytes.Contains(b, []byte("/Lang (en-GB)")) {
		t.Error("no language")
	}
}

// TestPDFBookmarks: every section that is in can be gone to.
func TestPDFBookmarks(t *testing.T) {
	path := file(t, of(t, project.Demo(), 0, units.Metric))
	out := tool(t, "qpdf", "--json", "--json-key=outlines", path)
	titles := regexp.MustCompile(`"title": "([^"]*)"`).FindAllStringSubmatch(out, -1)
	var got []string
	for _, m := range titles {
		got = append(got, m[1])
	}
	for _, s := range append(report.Sections, report.Section{Title: "Summary"}, report.Section{Title: "Best rate of climb"}) {
		if !slices.Contains(got, s.Title) {
			t.Errorf("no bookmark %s in %q", s.Title, got)
		}
	}
}

// TestPDFStands: the same revision gives the same bytes, on one core as on many.
func TestPDFStands(t *testing.T) {
	first := pdf(t, of(t, project.Demo(), 0, units.Metric))
	before := runtime.GOMAXPROCS(1)
	alone := pdf(t, of(t, project.Demo(), 0, units.Metric))
	runtime.GOMAXPROCS(max(4, before))
	many := pdf(t, of(t, project.Demo(), 0, units.Metric))
	runtime.GOMAXPROCS(before)
	if !bytes.Equal(first, alone) || !bytes.Equal(first, many) {
		t.Error("other bytes of the same revision")
	}
	r := of(t, project.Demo(), 0, units.Metric)
	r.Saved = saved.AddDate(0, 0, 1)
	if bytes.Equal(first, pdf(t, r)) {
		t.Error("another day gives the same bytes")
	}
	a, err1 := of(t, project.Demo(), 0, units.Metric).Zip("metric")
	b, err2 := of(t, project.Demo(), 0, units.Metric).Zip("metric")
	if errors.Join(err1, err2) != nil || !bytes.Equal(a, b) {
		t.Error("other bytes of the same tables")
	}
}

// TestPDFSigns: letters that the fonts lack are seen to be missing, and that is said once.
func TestPDFSigns(t *testing.T) {
	text := flat(strings.Join(pages(t, file(t, of(t, long(), 0, units.Metric))), "\n"))
	if n := strings.Count(text, "not in the fonts of this report"); n != 1 {
		t.Errorf("said %d times", n)
	}
	if !strings.Contains(text, "□□") || strings.Contains(text, "高") {
		t.Error("the missing letters are not seen to be missing")
	}
	for name, r := range cases(t) {
		if name == "long" {
			continue
		}
		if text := strings.Join(pages(t, file(t, r)), "\n"); strings.Contains(text, "□") || strings.Contains(text, "not in the fonts") {
			t.Errorf("%s: a letter is missing", name)
		}
	}
	s := project.Demo()
	s.Name = "Żółw über Ακρόπολη, Ёлка и Đà Nẵng" // Latin, Greek, Cyrillic and Vietnamese are there
	if text := pages(t, file(t, of(t, s, 0, units.Metric)))[0]; !strings.Contains(text, s.Name) {
		t.Errorf("%s", text[:200])
	}
}
