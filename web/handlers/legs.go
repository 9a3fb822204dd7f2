package handlers

import (
	"fmt"
	"slices"
	"strings"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/project"
)

// actOnLeg does one action on the list of legs: "add-leg climb", "duplicate-leg 2".
func actOnLeg(s *project.Spec, action string) (string, error) {
	verb, arg, _ := strings.Cut(action, " ")
	if verb == "add-leg" {
		return addLeg(s, arg, action)
	}
	i, err := index(arg, len(s.Legs))
	if err != nil {
		return "", noAction(action)
	}
	l := &s.Legs[i]
	title := "“" + l.Title() + "”"
	switch {
	case verb == "insert-leg":
		s.Legs = slices.Insert(s.Legs, i+1, mission.NewLeg(mission.Cruise, "New leg"))
		return "Leg added after " + title, nil
	case verb == "duplicate-leg":
		again := *l
		again.Name = clipTo("Copy of "+l.Title(), 60)
		s.Legs = slices.Insert(s.Legs, i+1, again)
		return "Leg " + title + " duplicated", nil
	case verb == "remove-leg":
		s.Legs = slices.Delete(s.Legs, i, i+1)
		return "Leg " + title + " removed", nil
	case verb == "move-leg-up" && i > 0:
		s.Legs[i-1], s.Legs[i] = s.Legs[i], s.Legs[i-1]
		return "Leg " + title + " moved earlier", nil
	case verb == "move-leg-down" && i+1 < len(s.Legs):
		s.Legs[i+1], s.Legs[i] = s.Legs[i], s.Legs[i+1]
		return "Leg " + title + " moved later", nil
	}
	return "", noAction(action)
}

// addLeg adds a leg of a kind at the end, named after it; without a kind it is a cruise.
func addLeg(s *project.Spec, kind, action string) (string, error) {
	if kind == "" {
		s.Legs = append(s.Legs, mission.NewLeg(mission.Cruise, "New leg"))
		return "Leg added", nil
	}
	for _, o := range mission.KindOptions() {
		if o.Value == kind {
			s.Legs = append(s.Legs, mission.NewLeg(kind, capital(o.Label)))
			return fmt.Sprintf("Leg “%s” added", capital(o.Label)), nil
		}
	}
	return "", noAction(action)
}
