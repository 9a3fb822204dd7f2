package handlers

import (
	"context"
	"fmt"
	"net/http"
	"net/url"
	"strings"

	"github.com/go-chi/chi/v5"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/internal/store"
	"legwright/web/views"
)

// A head is the current state of a project.
type head struct {
	rev   store.Revision
	spec  *project.Spec
	built *project.Project // of spec; nil when not built yet
}

func (s *site) head(r *http.Request) (head, error) {
	id, err := projectID(r)
	if err != nil {
		return head{}, err
	}
	rev, err := s.db.Head(r.Context(), id)
	if err != nil {
		return head{}, err
	}
	return decoded(rev)
}

func decoded(rev store.Revision) (head, error) {
	spec, err := project.Decode(rev.Doc)
	if err != nil {
		return head{}, fmt.Errorf("project %d, revision %d: %w", rev.Project, rev.Number, err)
	}
	return head{rev: rev, spec: spec}, nil
}

func (h head) build() (*project.Project, error) {
	if h.built != nil {
		return h.built, nil
	}
	return h.spec.Build()
}

// variant finds the variant that the address names.
func (h head) variant(r *http.Request) (int, error) {
	i, ok := h.spec.Variant(chi.URLParam(r, "variant"))
	if !ok {
		return 0, &problem{http.StatusNotFound, "Not here", "This project has no such variant; it may have been undone."}
	}
	return i, nil
}

// study computes the variant that the address names under the view that its query
// sets, and says which of the query's settings were not understood. The setting of
// the power lever counts on pages that say so; the others are at full power.
func (h head) study(r *http.Request, lever bool) (*study.Study, []views.Refusal, error) {
	i, err := h.variant(r)
	if err != nil {
		return nil, nil, err
	}
	p, err := h.build()
	if err != nil {
		return nil, nil, err
	}
	view, mistaken := viewOf(r.URL.Query(), p, i)
	if !lever {
		view.Setting = 1
	}
	return study.Run(p, i, view), mistaken, nil
}

// studyOf computes a variant at its default view; nil when the document has no such variant.
func (h head) studyOf(id string) (*study.Study, error) {
	i, ok := h.spec.Variant(id)
	if !ok {
		return nil, nil
	}
	p, err := h.build()
	if err != nil {
		return nil, err
	}
	return study.Run(p, i, study.DefaultView(p, i)), nil
}

// An outcome is what became of an edit.
type outcome struct {
	refused []views.Refusal
	message string
	missed  span // of the history, that the window did not see
}

// show answers with the page on which the edit was made, or with its changed part for the page's script.
func (s *site) show(w http.ResponseWriter, r *http.Request, h head, name string, o outcome) error {
	studied, mistaken, err := h.study(r, name == "")
	if err != nil {
		return err
	}
	st := views.State{ProjectID: h.rev.Project, Page: name, Revision: h.rev.Number, Saved: h.rev.Saved, CanUndo: h.rev.CanUndo, CanRedo: h.rev.CanRedo,
		Query: query(r.URL.Query()), Refusals: o.refused, Message: o.message, View: mistaken}
	if st.Elsewhere, err = s.changedElsewhere(r.Context(), h.rev.Project, o.missed); err != nil {
		return err
	}
	code := http.StatusOK
	if len(o.refused) > 0 || len(mistaken) > 0 {
		code = http.StatusUnprocessableEntity
	}
	page, part := editPages[name].show(studied, st)
	if swaps(r) {
		return render(w, r, code, part)
	}
	return render(w, r, code, page)
}

// viewNames are the query's settings of the view.
var viewNames = []string{"altitude", "isa", "mass", "config", "lever"}

// query keeps only the settings of the view.
func query(q url.Values) string {
	kept := url.Values{}
	for _, name := range viewNames {
		if q.Has(name) {
			kept.Set(name, q.Get(name))
		}
	}
	if len(kept) == 0 {
		return ""
	}
	return "?" + kept.Encode()
}

var (
	viewAltitude  = input.Spec{Name: "altitude", Label: "Altitude of the chart", Quantity: units.Altitude, Min: -500, Max: 25000}
	viewMass      = input.Spec{Name: "mass", Label: "Mass of the chart", Quantity: units.Mass, Min: 0.05, Max: 1e5}
	viewSetting   = input.Spec{Name: "lever", Label: "Power lever", Quantity: units.Fraction, Min: 0, Max: 1}
	viewDeviation = input.Spec{Name: "isa", Label: "Deviation from standard", Quantity: units.TemperatureStep, Min: -60, Max: 60}
)

// viewOf reads the condition of the chart from the query; what is not understood keeps its default and is said.
func viewOf(q url.Values, p *project.Project, variant int) (study.View, []views.Refusal) {
	v := study.DefaultView(p, variant)
	sys := p.Spec.System()
	var mistaken []views.Refusal
	for _, n := range []*input.Number{{Spec: &viewAltitude, Value: &v.Altitude}, {Spec: &viewMass, Value: &v.Mass}, {Spec: &viewDeviation, Value: &v.Deviation}, {Spec: &viewSetting, Value: &v.Setting}} {
		text := q.Get(n.Name)
		if text == "" {
			continue
		}
		value, err := n.Parse(text, sys)
		if err != nil {
			for _, e := range input.Errors(err) {
				mistaken = append(mistaken, views.Refusal{Path: n.Name, Text: text, Why: e.Sentence(sys) + "."})
			}
			continue
		}
		*n.Value = value
	}
	for _, c := range []aircraft.Config{aircraft.Clean, aircraft.TakeOff, aircraft.Landing} {
		if q.Get("config") == c.String() {
			v.Config = c
		}
	}
	if _, err := (atmos.Day{Deviation: v.Deviation}).At(v.Altitude, nil); err != nil {
		mistaken = append(mistaken, views.Refusal{Path: "altitude", Text: q.Get("altitude"), Why: units.Explain(err).In(sys) + "."})
		v = study.DefaultView(p, variant)
	}
	return v, mistaken
}

// The steps along the history, as they are told.
const (
	undone = "undone"
	redone = "done again"
)

// step undoes or redoes one revision.
func (s *site) step(move func(context.Context, int64) (store.Revision, error), done string) page {
	return func(w http.ResponseWriter, r *http.Request) error {
		id, err := projectID(r)
		if err != nil {
			return err
		}
		message := ""
		rev, err := move(r.Context(), id)
		switch {
		case isNothing(err):
			message = "There is nothing more to take back or bring back."
			if rev, err = s.db.Head(r.Context(), id); err != nil {
				return err
			}
		case err != nil:
			return err
		default:
			message = s.stepped(r.Context(), rev, done)
		}
		h, err := decoded(rev)
		if err != nil {
			return err
		}
		return s.settled(w, r, h, outcome{message: message})
	}
}

// stepped says what a step of the given name has taken back or brought back, now that rev is the head.
func (s *site) stepped(ctx context.Context, rev store.Revision, done string) string {
	if done == undone {
		left, err := s.db.Revision(ctx, rev.Project, rev.Next())
		if err != nil {
			return "One change was undone."
		}
		rev = left
	}
	return capital(done) + ": " + strings.TrimSuffix(rev.Summary, ".") + "."
}

// settled answers an edit that was taken: the new page for the script, else a redirect to it.
func (s *site) settled(w http.ResponseWriter, r *http.Request, h head, o outcome) error {
	if swaps(r) {
		return s.show(w, r, h, pageName(r), o)
	}
	id := chi.URLParam(r, "variant")
	if _, ok := h.spec.Variant(id); !ok {
		id = h.spec.Variants[0].ID
	}
	to := fmt.Sprintf("/projects/%d/variants/%s%s%s", h.rev.Project, id, editPages[pageName(r)].path, query(r.URL.Query()))
	if o.missed.from != o.missed.to {
		mark := "?"
		if strings.Contains(to, "?") {
			mark = "&"
		}
		to += mark + elsewhere + "=" + o.missed.String()
	}
	http.Redirect(w, r, to, http.StatusSeeOther)
	return nil
}
