package handlers

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/project"
)

// componentList is the path of the drag build-up's list within the aircraft.
const componentList = "airframe.components"

// actOnComponents does one action on the list of the drag build-up.
func actOnComponents(v *project.Variant, verb, arg string) (string, error) {
	list := &v.Aircraft.Airframe.Components
	switch verb {
	case "add-component":
		*list = append(*list, v.Aircraft.Airframe.NewComponent())
		return "Component added", nil
	case "remove-component":
		return removed(list, arg, "Component", func(i int) string {
			v.Basis = shifted(v.Basis, componentList, i)
			return (*list)[i].Name
		})
	}
	i, err := index(arg, len(*list))
	if err != nil {
		return "", err
	}
	copied := (*list)[i]
	if name := []rune("Copy of " + copied.Name); len(name) <= dragbuild.LongestName {
		copied.Name = string(name)
	}
	*list = append(*list, copied)
	from, to := fmt.Sprintf("%s[%d].", componentList, i), fmt.Sprintf("%s[%d].", componentList, len(*list)-1)
	for _, path := range slices.Sorted(maps.Keys(v.Basis)) {
		if input, ok := strings.CutPrefix(path, from); ok {
			v.Basis[to+input] = v.Basis[path]
		}
	}
	return fmt.Sprintf("Component “%s” copied", (*list)[i].Name), nil
}
