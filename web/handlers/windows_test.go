package handlers

import (
	"fmt"
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"sync"
	"testing"

	"legwright/internal/perf/project"
)

// Windows that save at the same moment lose nothing of each other: each field
// ends as its own window left it, while the units change to and fro.
func TestWindowsAtOnce(t *testing.T) {
	v := visit(t)
	fields := map[string]func(*project.Spec) float64{
		"variants[0].aircraft.weights.empty":        func(s *project.Spec) float64 { return s.Variants[0].Aircraft.Weights.Empty },
		"variants[0].aircraft.weights.max_take_off": func(s *project.Spec) float64 { return s.Variants[0].Aircraft.Weights.MaxTakeOff },
		"strips[0].length":                          func(s *project.Spec) float64 { return s.Strips[0].Length },
	}
	const edits = 6
	var windows sync.WaitGroup
	for field := range fields {
		windows.Go(func() {
			for i := range edits {
				v.window(t, "/projects/1/variants/a", url.Values{"system": {"metric"}, field: {fmt.Sprint(400 + i)}})
			}
		})
	}
	windows.Go(func() {
		for i := range edits {
			v.window(t, "/projects/1/variants/a/units", url.Values{"system": {[]string{"aviation", "metric"}[i%2]}})
		}
	})
	windows.Wait()
	spec, err := project.Decode(v.document(1))
	if err != nil {
		t.Fatal(err)
	}
	for field, of := range fields {
		if got := of(spec); got != 400+edits-1 {
			t.Errorf("%s is %v", field, got)
		}
	}
	if v.log.Len() > 0 {
		t.Error(v.log)
	}
}

// window posts a form from a window of its own, again while others are in its way.
func (v *visitor) window(t *testing.T, address string, form url.Values) {
	for range 20 {
		r := httptest.NewRequest(http.MethodPost, address, strings.NewReader(form.Encode()))
		r.Host = host
		r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
		w := httptest.NewRecorder()
		v.site.ServeHTTP(w, r)
		if w.Code == http.StatusConflict {
			continue
		}
		if w.Code != http.StatusSeeOther {
			t.Errorf("%s %v: status %d", address, form, w.Code)
		}
		return
	}
	t.Errorf("%s %v: always busy", address, form)
}

// Windows that showed the same state and give one field different values at the
// same moment: one is saved, and each of the others is told that one's value and keeps its own.
func TestSameFieldAtOnce(t *testing.T) {
	v := visit(t)
	const field = "variants[0].aircraft.weights.empty"
	values := []string{"301", "302", "303", "304"}
	replies := make([]*httptest.ResponseRecorder, len(values))
	var windows sync.WaitGroup
	for i, value := range values {
		windows.Go(func() {
			form := url.Values{"revision": {"1"}, "system": {"metric"}, field: {value}}
			r := httptest.NewRequest(http.MethodPost, "/projects/1/variants/a", strings.NewReader(form.Encode()))
			r.Host = host
			r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
			replies[i] = httptest.NewRecorder()
			v.site.ServeHTTP(replies[i], r)
		})
	}
	windows.Wait()
	spec, err := project.Decode(v.document(1))
	if err != nil {
		t.Fatal(err)
	}
	stored := fmt.Sprint(spec.Variants[0].Aircraft.Weights.Empty)
	taken := 0
	for i, value := range values {
		if replies[i].Code == http.StatusSeeOther {
			taken++
			if value != stored {
				t.Errorf("%s was taken, %s is stored", value, stored)
			}
			continue
		}
		page := parsePage(t, replies[i].Body.String())
		shown := text(one(page, "#form-weights .clash"))
		if replies[i].Code != http.StatusUnprocessableEntity || !strings.Contains(shown, "Keep mine: "+value) || !strings.Contains(shown, "Take theirs: "+stored+" kg") {
			t.Errorf("%s: status %d, %q", value, replies[i].Code, shown)
		}
	}
	if taken != 1 {
		t.Errorf("%d of the values were taken", taken)
	}
	if h, err := v.db.Head(t.Context(), 1); err != nil || h.Number != 2 {
		t.Errorf("revision %d, %v", h.Number, err)
	}
}

// TestSince finds the revision that set a field, behind later edits of other things.
func TestSince(t *testing.T) {
	v := visit(t)
	edit := func(name, value string) {
		t.Helper()
		v.post("/projects/1/variants/a", url.Values{"system": {"metric"}, name: {value}})
		if v.reply.Code != http.StatusSeeOther {
			t.Fatalf("%s: status %d", name, v.reply.Code)
		}
	}
	edit("variants[0].aircraft.weights.empty", "310")         // revision 2
	edit("basis:variants[0].aircraft.weights.empty", "maker") // 3
	edit("strips[0].length", "640")                           // 4
	for name, want := range map[string]string{"variants[0].aircraft.weights.empty": "310 kg meanwhile (revision 2, ", "basis:variants[0].aircraft.weights.empty": "maker's data meanwhile (revision 3, ", "strips[0].length": "640 m meanwhile (revision 4, "} {
		value := "333"
		if strings.HasPrefix(name, "basis:") {
			value = "calculated"
		}
		v.post("/projects/1/variants/a", url.Values{"revision": {"1"}, "system": {"metric"}, name: {value}})
		if got := text(v.page); v.reply.Code != http.StatusUnprocessableEntity || !strings.Contains(got, want) {
			t.Errorf("%s: status %d, no %q", name, v.reply.Code, want)
		}
	}
}
