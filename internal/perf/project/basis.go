package project

import (
	"strconv"
	"strings"

	"legwright/internal/perf/input"
)

// A Basis says where an input comes from.
type Basis struct {
	Kind      string  `json:"kind"`       // one of BasisKinds
	PlusMinus float64 `json:"plus_minus"` // half width of the stated band in the input's SI unit, >= 0; 0 when not stated
	Note      string  `json:"note"`
}

// The kinds of basis, from the surest to the least.
const (
	Measured    = "measured"
	Maker       = "maker"
	Calculated  = "calculated"
	Estimated   = "estimated"
	Placeholder = "placeholder"
)

// BasisKinds lists the kinds of basis with their words.
var BasisKinds = []input.Option{
	{Value: Measured, Label: "measured"}, {Value: Maker, Label: "maker's data"}, {Value: Calculated, Label: "calculated"},
	{Value: Estimated, Label: "estimated"}, {Value: Placeholder, Label: "placeholder"},
}

// BasisLabel is a kind of basis in words; an unknown one keeps its own.
func BasisLabel(kind string) string {
	for _, o := range BasisKinds {
		if o.Value == kind {
			return o.Label
		}
	}
	return kind
}

// BasisOf is the basis of the aircraft input at path. A path inside a table or a list has the basis of the whole.
func (v *Variant) BasisOf(path string) Basis {
	if b, ok := v.Basis[path]; ok {
		return b
	}
	return Basis{Kind: Placeholder}
}

// InAircraft splits the path of an input of the document into its variant and
// the path within the variant's aircraft, by which a basis is kept.
func (s *Spec) InAircraft(path string) (v *Variant, within string, ok bool) {
	rest, ok := strings.CutPrefix(path, "variants[")
	if !ok {
		return nil, "", false
	}
	index, within, ok := strings.Cut(rest, "].aircraft.")
	i, err := strconv.Atoi(index)
	if !ok || err != nil || i < 0 || i >= len(s.Variants) {
		return nil, "", false
	}
	return &s.Variants[i], within, true
}

// basesFor finds where the basis of the document's input at path is kept, and its key there.
func (s *Spec) basesFor(path string) (bases *map[string]Basis, key string, ok bool) {
	if v, within, ours := s.InAircraft(path); ours {
		return &v.Basis, within, true
	}
	if strings.HasPrefix(path, "strips[") {
		return &s.Basis, path, true
	}
	return nil, "", false
}

// BasisAt is the basis of an input of the document; ok is false for one that is
// decided and not known from anywhere, such as a leg, a day or a requirement: it has none.
func (s *Spec) BasisAt(e input.Entry) (b Basis, ok bool) {
	bases, key, ok := s.basesFor(e.Path)
	if !ok || e.Number == nil && e.Table == nil || e.Number != nil && e.Number.Decided {
		return Basis{}, false
	}
	if b, given := (*bases)[key]; given {
		return b, true
	}
	return Basis{Kind: Placeholder}, true
}

// SetBasisAt gives the input of the document at path a basis, where one is kept for it.
func (s *Spec) SetBasisAt(path string, b Basis) {
	bases, key, ok := s.basesFor(path)
	if !ok {
		return
	}
	if *bases == nil {
		*bases = map[string]Basis{}
	}
	(*bases)[key] = b
}

// SetBasis gives the aircraft input at path a basis.
func (v *Variant) SetBasis(path string, b Basis) {
	if v.Basis == nil {
		v.Basis = map[string]Basis{}
	}
	v.Basis[path] = b
}
