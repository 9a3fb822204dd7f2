// Package project is one problem as the user enters it: the mission, day, strips
// and requirements, and the variants of an aircraft that are to meet them. Its
// one JSON form is what the store keeps, the project file carries and the JSON
// interface takes.
package project

import (
	"maps"
	"slices"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// Spec is a project document. Every number in it is in SI.
type Spec struct {
	Format       int              `json:"format"` // of the document
	Units        string           `json:"units"`  // "SI"
	Name         string           `json:"name"`
	Note         string           `json:"note"`
	Display      string           `json:"display"` // unit system in which pages show the project
	Day          atmos.Spec       `json:"day"`
	Strips       []runway.Strip   `json:"strips"`
	Technique    runway.Technique `json:"technique"`
	Legs         []mission.Leg    `json:"legs"`
	Requirements []Requirement    `json:"requirements"`
	Variants     []Variant        `json:"variants"`
	Basis        map[string]Basis `json:"basis"` // of the strips' inputs, by path; an input without one is a placeholder
}

// A Variant is one complete aircraft.
type Variant struct {
	ID       string           `json:"id"` // unique in the project, never reused
	Name     string           `json:"name"`
	Note     string           `json:"note"`
	Aircraft aircraft.Spec    `json:"aircraft"`
	Basis    map[string]Basis `json:"basis"` // of the aircraft's inputs, by path within it; an input without one is a placeholder
}

// Inputs describes the project's own inputs.
func (s *Spec) Inputs() []input.Entry {
	options := make([]input.Option, len(units.Systems))
	for i, sys := range units.Systems {
		options[i] = input.Option{Value: string(sys), Label: sys.Label()}
	}
	return []input.Entry{
		input.Line("name", "Project", 120, &s.Name),
		input.Line("note", "Note", 2000, &s.Note),
		input.Pick("display", "Units", &s.Display, options...),
	}
}

// Inputs describes the variant's own inputs.
func (v *Variant) Inputs() []input.Entry {
	return []input.Entry{
		input.Line("id", "Identifier", 40, &v.ID),
		input.Line("name", "Variant", 120, &v.Name),
		input.Line("note", "Note", 2000, &v.Note),
	}
}

// System is the unit system in which pages show the project.
func (s *Spec) System() units.System { return units.System(s.Display) }

// Variant finds a variant by its identifier.
func (s *Spec) Variant(id string) (index int, ok bool) {
	i := slices.IndexFunc(s.Variants, func(v Variant) bool { return v.ID == id })
	return i, i >= 0
}

// Clone copies s so that the copy shares nothing with it.
func (s *Spec) Clone() *Spec {
	c := *s
	c.Strips = slices.Clone(s.Strips)
	c.Legs = slices.Clone(s.Legs)
	c.Requirements = slices.Clone(s.Requirements)
	c.Variants = slices.Clone(s.Variants)
	c.Basis = maps.Clone(s.Basis)
	for i := range c.Variants {
		v := &c.Variants[i]
		v.Basis = maps.Clone(v.Basis)
		v.Aircraft.Weights.Items = slices.Clone(v.Aircraft.Weights.Items)
		v.Aircraft.Airframe.Polar = cloneRows(v.Aircraft.Airframe.Polar)
		v.Aircraft.Airframe.Components = slices.Clone(v.Aircraft.Airframe.Components)
		v.Aircraft.Powerplant = v.Aircraft.Powerplant.Clone()
	}
	return &c
}

func cloneRows(rows [][]float64) [][]float64 {
	c := slices.Clone(rows)
	for i := range c {
		c[i] = slices.Clone(c[i])
	}
	return c
}
