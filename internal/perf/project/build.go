package project

import (
	"errors"
	"fmt"
	"maps"
	"slices"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/runway"
)

// A Project is a Spec checked and resolved: immutable and safe for concurrent use.
type Project struct {
	Spec      *Spec
	Aircraft  []*aircraft.Aircraft // one for each variant, in order
	Plan      mission.Plan
	Departure runway.Place // the strip of the first take-off, or the first strip
	Arrival   runway.Place // the strip of the last landing, or the first strip
}

// Build checks the whole document and returns the project, or every input error
// joined, with full paths. It keeps no reference into s that a later edit of s could reach.
func (s *Spec) Build() (*Project, error) {
	if err := s.storable(); err != nil {
		return nil, err
	}
	s = s.Clone()
	errs := []error{s.head(), input.Check(s), s.references()}
	if err := errors.Join(errs...); err != nil {
		return nil, err
	}
	p := &Project{Spec: s, Plan: mission.Plan{Legs: s.Legs, Technique: s.Technique}}
	errs = []error{s.resolve(p)}
	for i := range s.Variants {
		a, err := s.Variants[i].Aircraft.Build()
		errs = append(errs, input.Within(fmt.Sprintf("variants[%d].aircraft", i), err))
		p.Aircraft = append(p.Aircraft, a)
	}
	if err := errors.Join(errs...); err != nil {
		return nil, err
	}
	return p, nil
}

// head checks what says how to read the document.
func (s *Spec) head() error {
	var errs []error
	if s.Format != Format {
		errs = append(errs, &input.Error{Path: "format", Text: fmt.Sprint(s.Format), Accepts: fmt.Sprint(Format), Err: input.ErrChoice})
	}
	if s.Units != "SI" {
		errs = append(errs, &input.Error{Path: "units", Text: s.Units, Accepts: "SI", Err: input.ErrChoice})
	}
	return errors.Join(errs...)
}

// references checks lists and what one part of the document says of another.
func (s *Spec) references() error {
	var errs []error
	if len(s.Strips) == 0 {
		errs = append(errs, &input.Error{Path: "strips", Accepts: "at least one strip", Err: input.ErrRequired})
	}
	if len(s.Variants) == 0 {
		errs = append(errs, &input.Error{Path: "variants", Accepts: "at least one variant", Err: input.ErrRequired})
	}
	rest := -1
	for i := range s.Legs {
		switch l := &s.Legs[i]; {
		case l.Rests() && rest >= 0:
			errs = append(errs, &input.Error{Path: fmt.Sprintf("legs[%d].extent", i), Text: l.Extent, Err: input.ErrConflict,
				Accepts: fmt.Sprintf("distance or time: leg %d already flies the rest of the range", rest+1)})
		case l.Rests():
			rest = i
		}
	}
	errs = append(errs, checkBases(s.Basis, "basis."))
	seen := map[string]bool{}
	for i := range s.Variants {
		v := &s.Variants[i]
		path := fmt.Sprintf("variants[%d]", i)
		if v.ID == "" || seen[v.ID] || strings.ContainsAny(v.ID, "/?#% ") {
			errs = append(errs, &input.Error{Path: path + ".id", Text: v.ID, Accepts: "an identifier of its own, without blanks and / ? # %", Err: input.ErrConflict})
		}
		seen[v.ID] = true
		errs = append(errs, checkBases(v.Basis, path+".basis."))
	}
	return errors.Join(errs...)
}

// checkBases checks the bases of a part of the document; prefix is the path before their keys.
func checkBases(bases map[string]Basis, prefix string) error {
	var errs []error
	for _, key := range slices.Sorted(maps.Keys(bases)) {
		b := bases[key]
		where := prefix + key
		if !isBasis(b.Kind) {
			errs = append(errs, &input.Error{Path: where + ".kind", Text: b.Kind, Accepts: "measured, maker, calculated, estimated, placeholder", Err: input.ErrChoice})
		}
		if !(b.PlusMinus >= 0 && b.PlusMinus < 1e12) {
			errs = append(errs, &input.Error{Path: where + ".plus_minus", Text: fmt.Sprint(b.PlusMinus), Accepts: "0 or more", Err: input.ErrRange})
		}
	}
	return errors.Join(errs...)
}

func isBasis(kind string) bool {
	for _, o := range BasisKinds {
		if o.Value == kind {
			return true
		}
	}
	return false
}

// resolve puts the strips and legs on their day.
func (s *Spec) resolve(p *Project) error {
	var errs []error
	for i, strip := range s.Strips {
		place, err := strip.On(s.Day)
		if err != nil {
			errs = append(errs, &input.Error{Path: fmt.Sprintf("strips[%d].elevation", i), Text: err.Error(), Accepts: "an elevation and QNH inside the atmosphere model", Err: input.ErrConflict})
			continue
		}
		p.Plan.Places = append(p.Plan.Places, place)
	}
	if len(errs) > 0 {
		return errors.Join(errs...)
	}
	var err error
	if p.Plan.Day, err = s.Day.Day(p.Plan.Places[0].Air.PressureAltitude); err != nil {
		return err
	}
	p.Departure, p.Arrival = p.Plan.Places[0], p.Plan.Places[0]
	first := true
	for i, l := range s.Legs {
		if l.Kind != mission.TakeOff && l.Kind != mission.Landing {
			continue
		}
		place, ok := p.Place(l.Strip)
		if !ok {
			errs = append(errs, noStrip(fmt.Sprintf("legs[%d].strip", i), l.Strip))
			continue
		}
		if l.Kind == mission.Landing {
			p.Arrival = place
		} else if first {
			p.Departure, first = place, false
		}
	}
	for i := range s.Requirements {
		r := &s.Requirements[i]
		if _, ok := p.Place(r.Strip); !ok && r.StripGiven == NamedStrip && r.Kind().Takes&Ground != 0 {
			errs = append(errs, noStrip(fmt.Sprintf("requirements[%d].strip", i), r.Strip))
		}
	}
	return errors.Join(errs...)
}

func noStrip(path, name string) error {
	return &input.Error{Path: path, Text: name, Accepts: "the name of one of the project's strips, or nothing for the first", Err: input.ErrChoice}
}

// Place is the strip of that name on the project's day, the first for no name.
func (p *Project) Place(name string) (runway.Place, bool) {
	for _, place := range p.Plan.Places {
		if name == "" || place.Strip.Name == name {
			return place, true
		}
	}
	return runway.Place{}, false
}
