package handlers

import (
	"flag"
	"fmt"
	"math/rand/v2"
	"net/url"
	"slices"
	"strings"
	"testing"

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
	entries := slices.DeleteFunc(input.Walk(project.Demo()), func(e input.Entry) bool {
		return e.Idle || strings.HasPrefix(e.Path, "variants[1]") || len(extremes(e)) == 0
	})
	tabs := []string{"working", "climb", "strip", "powerplant", "requirements"}
	taken := 0
	for seed := range *seeds {
		chance := rand.New(rand.NewPCG(1, uint64(seed)))
		form := url.Values{"system": {"metric"}}
		for range 1 + chance.IntN(4) {
			e := entries[chance.IntN(len(entries))]
			texts := extremes(e)
			form.Set(e.Path, texts[chance.IntN(len(texts))])
		}
		taken += v.extreme(form, tabs[seed%len(tabs)])
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

// extreme sends one edit, checks the answer and another page of the variant, and takes the edit back; 1 when it was taken.
func (v *visitor) extreme(form url.Values, also string) int {
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
	for _, row := range all(parsePage(v.t, page), "#figures tr") {
		if strings.HasSuffix(text(row), " none") {
			v.t.Errorf("%v: no reason: %s", form, text(row))
		}
	}
	v.get("a/" + also)
	if err := checkPage(v.reply.Body.String()); v.reply.Code != 200 || err != nil {
		v.t.Errorf("%v: %s: status %d, %v", form, also, v.reply.Code, err)
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
