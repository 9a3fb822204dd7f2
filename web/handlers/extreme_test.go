package handlers

import (
	"flag"
	"fmt"
	"net/url"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// seeds is how many random edits TestExtremes tries; a thousand take some minutes.
var seeds = flag.Int("extremes", 40, "random edits at the bounds of what is accepted")

// Some numbers and choices of the demo at their bounds, together: what is
// accepted must give a sound page, be the aeroplane ever so strange.
func TestExtremes(t *testing.T) {
	t.Parallel()
	v := visit(t)
	entries := slices.DeleteFunc(input.Walk(project.Demo()), func(e input.Entry) bool { return strings.HasPrefix(e.Path, "variants[1]") || len(extremes(e)) == 0 })
	some := rapid.SliceOfNDistinct(rapid.SampledFrom(entries), 1, 4, func(e input.Entry) string { return e.Path })
	forms := rapid.Custom(func(t *rapid.T) url.Values {
		form := url.Values{"system": {"metric"}}
		for _, e := range some.Draw(t, "fields") {
			form.Set(e.Path, rapid.SampledFrom(extremes(e)).Draw(t, e.Path))
		}
		return form
	})
	taken := 0
	for seed := range *seeds {
		taken += v.extreme(forms.Example(seed))
	}
	if taken < *seeds/2 {
		t.Errorf("only %d of %d were taken", taken, *seeds)
	}
}

// extremes are the texts that a field accepts at its limits.
func extremes(e input.Entry) []string {
	var list []string
	switch {
	case e.Number != nil:
		lo, hi := e.Number.Bounds(units.Metric.Unit(e.Number.Quantity))
		list = []string{fmt.Sprint(lo), fmt.Sprint(hi)}
	case e.Choice != nil:
		for _, o := range e.Choice.Options {
			list = append(list, o.Value)
		}
	}
	return list
}

// extreme sends one edit, checks the answer and the working, and takes the edit back; 1 when it was taken.
func (v *visitor) extreme(form url.Values) int {
	v.t.Helper()
	v.at, v.blind = nil, true
	v.post("/projects/1/variants/a", form, "HX-Request", "true")
	code, page := v.reply.Code, v.reply.Body.String()
	if code != 200 && code != 422 || v.log.Len() > 0 {
		v.t.Errorf("%v: status %d, log %s", form, code, v.log)
		v.log.Reset()
	}
	if err := checkPage(page); err != nil {
		v.t.Errorf("%v: %v", form, err)
	}
	v.get("a/working")
	if err := checkPage(v.reply.Body.String()); v.reply.Code != 200 || err != nil {
		v.t.Errorf("%v: working: status %d, %v", form, v.reply.Code, err)
	}
	if code == 422 {
		return 0
	}
	if rev, err := v.db.Head(v.t.Context(), 1); err == nil && rev.CanUndo {
		if _, err := v.db.Undo(v.t.Context(), 1); err != nil {
			v.t.Error(err)
		}
	}
	return 1
}
