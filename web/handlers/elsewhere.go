package handlers

import (
	"context"
	"fmt"
	"net/http"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
	"legwright/internal/store"
	"legwright/web/views"
)

// farBack is how many revisions are read to find when something was saved.
const farBack = 40

// since tells when the field of that name, as the head has it, was saved: the
// first revision in a row up to the head that has the same.
func (s *site) since(ctx context.Context, h head, sys units.System, name string) string {
	text, ok := textOf(h.spec, name, sys)
	rev := h.rev
	for range farBack {
		if !ok || rev.Parent == 0 {
			break
		}
		older, err := s.db.Revision(ctx, rev.Project, rev.Parent)
		if err != nil {
			break
		}
		was, err := decoded(older)
		if err != nil {
			break
		}
		if before, there := textOf(was.spec, name, sys); !there || before != text {
			break
		}
		rev = older
	}
	return fmt.Sprintf("revision %d, %s", rev.Number, views.Clock(rev.Saved))
}

// textOf is what a document has in the form field of that name.
func textOf(s *project.Spec, name string, sys units.System) (string, bool) {
	for _, f := range facets {
		if path, ok := strings.CutPrefix(name, f.prefix); ok {
			e, ok := input.Find(s, path)
			if !ok {
				return "", false
			}
			b, ok := s.BasisAt(e)
			return f.get(b), ok
		}
	}
	e, ok := input.Find(s, name)
	if !ok {
		return "", false
	}
	return views.FieldText(s, e, sys), true
}

// A span is a stretch of the history that a window did not see: the revisions after one, up to another.
type span struct{ from, to int64 }

// elsewhere is the name of the query's setting that carries a span over a redirect.
const elsewhere = "elsewhere"

func (v span) String() string { return fmt.Sprintf("%d-%d", v.from, v.to) }

// spanOf reads the span of a query; its zero value stands for none.
func spanOf(r *http.Request) span {
	from, to, ok := strings.Cut(r.URL.Query().Get(elsewhere), "-")
	a, err := strconv.ParseInt(from, 10, 64)
	b, err2 := strconv.ParseInt(to, 10, 64)
	if !ok || err != nil || err2 != nil {
		return span{}
	}
	return span{a, b}
}

// changedElsewhere tells in words what another window, or this one on another page, changed in the span; nothing when there is nothing to tell.
func (s *site) changedElsewhere(ctx context.Context, project int64, v span) (string, error) {
	if v.from == v.to || v.from <= 0 || v.to <= 0 {
		return "", nil
	}
	list, err := s.db.RevisionsBefore(ctx, project, v.to+1, farBack)
	if err != nil || len(list) == 0 || list[0].Number != v.to {
		return "", err
	}
	byNumber := map[int64]store.Revision{}
	for _, rev := range list {
		byNumber[rev.Number] = rev
	}
	const most = 3
	var said []string
	steps := 0
	at := v.to
	for at > v.from {
		rev, ok := byNumber[at]
		if !ok {
			break
		}
		if steps++; steps <= most {
			said = append([]string{rev.Summary}, said...)
		}
		at = rev.Parent
	}
	switch {
	case at != v.from:
		return fmt.Sprintf("Elsewhere the project has gone to revision %d since this page was shown: %s.", v.to, list[0].Summary), nil
	case steps > most:
		return fmt.Sprintf("Elsewhere %d changes were saved since this page was shown, the last: %s.", steps, strings.Join(said, "; ")), nil
	}
	return fmt.Sprintf("Changed elsewhere since this page was shown: %s.", strings.Join(said, "; ")), nil
}
