package handlers

import (
	"io"
	"mime"
	"net/http"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// evaluate answers a project document with the study of every variant.
func (s *site) evaluate(w http.ResponseWriter, r *http.Request) error {
	if kind, _, err := mime.ParseMediaType(r.Header.Get("Content-Type")); err != nil || kind != "application/json" {
		return &problem{http.StatusUnsupportedMediaType, "Not understood", "send the document as application/json"}
	}
	text, err := io.ReadAll(r.Body)
	if err != nil {
		return err
	}
	spec, err := project.Decode(text)
	if err != nil {
		return err
	}
	p, err := spec.Build()
	if err != nil {
		return err
	}
	studies := study.All(p)
	answer := struct {
		Name     string         `json:"name"`
		Units    string         `json:"units"`
		Caution  string         `json:"caution"`
		Variants []study.Answer `json:"variants"`
	}{spec.Name, "SI", "Design estimates, not flight data: confirm by flight test and follow the makers' limits, local rules and a licensed person's judgement.", nil}
	for _, st := range studies {
		answer.Variants = append(answer.Variants, st.Answer())
	}
	return writeJSON(w, http.StatusOK, answer)
}

// schema answers with the JSON Schema of a project document.
func (s *site) schema(w http.ResponseWriter, _ *http.Request) error {
	text, err := project.Schema()
	if err != nil {
		return err
	}
	w.Header().Set("Content-Type", "application/schema+json")
	_, err = w.Write(text)
	return err
}

// document answers with the project document as it is stored.
func (s *site) document(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	return writeDocument(w, h)
}

// writeDocument answers with the document in its one written form.
func writeDocument(w http.ResponseWriter, h head) error {
	text, err := h.spec.Encode()
	if err != nil {
		return err
	}
	w.Header().Set("Content-Type", "application/json; charset=utf-8")
	w.Header().Set("Cache-Control", "no-store")
	_, err = w.Write(text)
	return err
}

// A refusal is one input that the JSON interface does not take.
type refusal struct {
	Path     string `json:"path"`
	Value    any    `json:"value,omitempty"`
	Accepted string `json:"accepted"`
	Problem  string `json:"problem"`
}

// refusals words input errors for the JSON interface, in SI.
func refusals(list []*input.Error) map[string][]refusal {
	out := make([]refusal, len(list))
	for i, e := range list {
		r := refusal{Path: e.Path, Accepted: e.Accepts, Problem: e.Sentence(units.Metric)}
		switch {
		case e.Text != "":
			r.Value = e.Text
		case e.Spec != nil && e.Err == input.ErrRange:
			r.Value = e.Value
		}
		if r.Accepted == "" && e.Spec != nil {
			r.Accepted = e.Spec.Accepted(units.Unit{Symbol: e.Spec.Quantity.SI(), Scale: 1})
		}
		out[i] = r
	}
	return map[string][]refusal{"errors": out}
}
