package report

import (
	"fmt"
	"strconv"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// partTitles word the parts of an aircraft, by the last name in their path; an unknown
// part keeps its own name.
var partTitles = map[string]string{"": "Aircraft", "values": "Powerplant", "take_off": "Flaps and gear for take-off", "landing": "Flaps and gear for landing",
	"clean": "Clean", "fuel": "Fuel"}

// part names the part of the aircraft in which an input stands, from its path; a part that
// is one of a list goes by the name that it was given.
func (r *Report) part(path string) string {
	owner := path[:max(0, strings.LastIndexByte(path, '.'))]
	name := owner[strings.LastIndexByte(owner, '.')+1:]
	list, index, listed := strings.Cut(strings.TrimSuffix(name, "]"), "[")
	if t, ok := partTitles[list]; ok && !listed {
		return t
	}
	title := strings.ToUpper(list[:1]) + strings.ReplaceAll(list[1:], "_", " ")
	if !listed {
		return title
	}
	if list == "items" { // of the weights
		title = "Weights"
	}
	if e, ok := input.Find(&r.Study.Variant().Aircraft, owner+".name"); ok && e.Text != nil && *e.Text.Value != "" {
		return title + ": " + *e.Text.Value
	}
	n, _ := strconv.Atoi(index)
	return fmt.Sprintf("%s: number %d", title, n+1)
}

// inputName names an input by its part and its label.
func (r *Report) inputName(path, label string) string { return r.part(path) + ": " + lowerFirst(label) }

// inputs lists what is entered of the aircraft, with where it comes from.
func (r *Report) inputs() Table {
	t := Table{Note: "As entered; an input without a basis of its own is a placeholder. Inputs that other choices put aside are left out.",
		Columns: []Column{words("Part"), words("Input"), anyOf("Value"), anyOf("±"), unitOf("Unit"), words("Basis"), words("Note")}, Group: []int{0}}
	v := r.Study.Variant()
	for _, e := range input.Walk(&v.Aircraft) {
		if e.Idle || e.Text != nil {
			continue
		}
		b := v.BasisOf(e.Path)
		row := []Cell{say(r.part(e.Path)), say(e.Label()), dash(), dash(), {}, say(project.BasisLabel(b.Kind)), say(b.Note)}
		switch {
		case e.Number != nil:
			q := e.Number.Quantity
			row[2], row[4] = of(q, *e.Number.Value), of(q, 0)
			if b.PlusMinus > 0 {
				row[3] = of(differenceOf(q), b.PlusMinus)
			}
		case e.Table != nil:
			row[2] = say(fmt.Sprintf("table of %s", count(len(*e.Table.Value), "row")))
		default:
			row[2], row[5], row[6] = say(choice(e)), say("choice"), say("")
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// differenceOf is the quantity of a difference of two values of q.
func differenceOf(q units.Quantity) units.Quantity {
	if q == units.Temperature {
		return units.TemperatureStep
	}
	return q
}

func choice(e input.Entry) string {
	for _, o := range e.Choice.Options {
		if o.Value == *e.Choice.Value {
			return o.Label
		}
	}
	return *e.Choice.Value
}

// inputTables is every number of the tables entered of the aircraft.
func (r *Report) inputTables() Table {
	t := Table{Note: "As entered.", Columns: []Column{words("Table"), words("Row"), words("Column"), anyOf("Value"), unitOf("Unit")},
		Group: []int{0}, Across: &Across{Down: 1, Over: 2, Values: []int{3}}}
	v := r.Study.Variant()
	for _, e := range input.Walk(&v.Aircraft) {
		if e.Idle || e.Table == nil {
			continue
		}
		for i, row := range *e.Table.Value {
			for j, c := range e.Table.Columns {
				t.Rows = append(t.Rows, []Cell{say(r.inputName(e.Path, e.Label())), say(fmt.Sprint(i + 1)), say(c.Label), of(c.Quantity, row[j]), of(c.Quantity, 0)})
			}
		}
	}
	if len(t.Rows) == 0 {
		t.Reason = "No tables are entered; the curves follow from single numbers."
	}
	return t
}

// conditions lists what is entered of the project.
func (r *Report) conditions() Table {
	t := Table{Note: "As entered, the same for every variant.", Columns: []Column{words("Part"), words("Input"), anyOf("Value"), unitOf("Unit")}, Group: []int{0}}
	spec := r.Study.Project.Spec
	for _, e := range input.Walk(spec) {
		if _, _, ours := spec.InAircraft(e.Path); ours || e.Idle || strings.HasPrefix(e.Path, "variants[") || strings.HasPrefix(e.Path, "requirements[") || e.Path == "display" {
			continue
		}
		row := []Cell{say(conditionPart(spec, e.Path)), say(e.Label()), {}, {}}
		switch {
		case e.Number != nil:
			row[2], row[3] = of(e.Number.Quantity, *e.Number.Value), of(e.Number.Quantity, 0)
		case e.Choice != nil:
			row[2] = say(choice(e))
		case e.Text != nil && *e.Text.Value != "":
			row[2] = say(*e.Text.Value)
		default:
			continue
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// ownPart is the part of what the project itself is called.
const ownPart = "Project"

// conditionPart names the part of the project in which an input stands.
func conditionPart(spec *project.Spec, path string) string {
	var i int
	if n, _ := fmt.Sscanf(path, "legs[%d]", &i); n == 1 && i < len(spec.Legs) {
		return fmt.Sprintf("Leg %d, %s", i+1, spec.Legs[i].Title())
	}
	if n, _ := fmt.Sscanf(path, "strips[%d]", &i); n == 1 && i < len(spec.Strips) {
		return "Strip " + spec.Strips[i].Name
	}
	first, _, nested := strings.Cut(path, ".")
	if !nested {
		return ownPart
	}
	return strings.ToUpper(first[:1]) + first[1:]
}

// lowerFirst continues a sentence with a label; an abbreviation keeps its capitals.
func lowerFirst(s string) string {
	if len(s) > 1 && s[1] >= 'a' && s[1] <= 'z' {
		return strings.ToLower(s[:1]) + s[1:]
	}
	return s
}
