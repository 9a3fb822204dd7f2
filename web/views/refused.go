package views

import "fmt"

// loose words the refusals that no field of the groups shows, so that what was typed is never lost.
func loose(refusals []Refusal, groups []Group) []string {
	marked := map[string]bool{}
	for _, g := range groups {
		for _, b := range g.Blocks {
			for _, f := range b.Fields {
				if f.Error != "" {
					marked[f.Path], marked["basis:"+f.Path], marked["note:"+f.Path] = true, true, true
				}
			}
		}
	}
	var list []string
	for _, r := range refusals {
		if !marked[r.Path] {
			list = append(list, fmt.Sprintf("“%s”: %s", r.Text, r.Why))
		}
	}
	return list
}

// refusedText says how many entries were refused and where to read why.
func refusedText(all, loose int) string {
	if all == 0 {
		return ""
	}
	text := "One entry was not taken"
	if all > 1 {
		text = plural(all) + " entries were not taken"
	}
	switch marked := all - loose; {
	case marked == 1:
		text += "; see the field marked below"
	case marked > 1:
		text += "; see the fields marked below"
	}
	return text + ". Nothing else is lost."
}
