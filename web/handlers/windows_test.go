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
