package handlers

import (
	"cmp"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
)

// act does one action on a list of the document: "add-item", "remove-leg 3".
func act(s *project.Spec, variant int, action string) (string, error) {
	verb, arg, _ := strings.Cut(action, " ")
	v := &s.Variants[variant]
	items := &v.Aircraft.Weights.Items
	switch verb {
	case "add-item":
		*items = append(*items, aircraft.Item{Name: "Item"})
		return "Item added", nil
	case "remove-item":
		return removed(items, arg, "Item", func(i int) string {
			v.Basis = shifted(v.Basis, "weights.items", i)
			return (*items)[i].Name
		})
	case "add-component", "copy-component", "remove-component":
		return actOnComponents(v, verb, arg)
	case "copy-variant":
		copied := s.Clone().Variants[variant]
		copied.ID, copied.Name = freeID(s), clip("Copy of "+copied.Name)
		s.Variants = append(s.Variants, copied)
		return fmt.Sprintf("Variant “%s” copied", v.Name), nil
	case "add-requirement":
		kind, ok := project.LookupFigure(cmp.Or(arg, "service_ceiling"))
		if !ok {
			return "", noAction(action)
		}
		s.Requirements = append(s.Requirements, project.Require(kind.ID, kind.Bound, kind.Usual))
		return "Requirement added: " + kind.Label, nil
	case "add-preset":
		preset, ok := project.LookupPreset(arg)
		if !ok {
			return "", noAction(action)
		}
		lacking := preset.Lacking(s)
		s.Requirements = append(s.Requirements, lacking...)
		if len(lacking) == 0 {
			return "", nil
		}
		return fmt.Sprintf("Added from %s: %s", preset.Clause, preset.Title), nil
	case "remove-requirement":
		return removed(&s.Requirements, arg, "Requirement", func(i int) string { return s.Requirements[i].Kind().Label })
	}
	return actOnLeg(s, action)
}

// freeID is an identifier that no variant of the document has: a, b, … then v27, v28, ….
func freeID(s *project.Spec) string {
	for n := 0; ; n++ {
		id := fmt.Sprintf("v%d", n+1)
		if n < 26 {
			id = string(rune('a' + n))
		}
		if _, taken := s.Variant(id); !taken {
			return id
		}
	}
}

// removed takes the element at the position that arg names out of a list.
func removed[T any](list *[]T, arg, what string, name func(i int) string) (string, error) {
	i, err := index(arg, len(*list))
	if err != nil {
		return "", err
	}
	said := fmt.Sprintf("%s “%s” removed", what, name(i))
	*list = slices.Delete(*list, i, i+1)
	return said, nil
}

func index(arg string, length int) (int, error) {
	i, err := strconv.Atoi(arg)
	if err != nil || i < 0 || i >= length {
		return 0, noAction(arg)
	}
	return i, nil
}

func noAction(text string) error {
	return &input.Error{Path: "action", Text: text, Accepts: "something that is still there", Err: input.ErrUnknown}
}

// shifted moves the bases of the elements of a list after a removed one to their new places.
func shifted(bases map[string]project.Basis, list string, gone int) map[string]project.Basis {
	moved := map[string]project.Basis{}
	for path, b := range bases {
		rest, ok := strings.CutPrefix(path, list+"[")
		n, tail, _ := strings.Cut(rest, "]")
		i, err := strconv.Atoi(n)
		switch {
		case !ok || err != nil || i < gone:
			moved[path] = b
		case i > gone:
			moved[fmt.Sprintf("%s[%d]%s", list, i-1, tail)] = b
		}
	}
	return moved
}
