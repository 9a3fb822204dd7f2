package views

import (
	"fmt"
	"strconv"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/units"
)

// airframe is the group of the airframe, with the list of a drag build-up.
func (f *form) airframe(path string) Group {
	spec := &f.spec.Variants[f.variant].Aircraft
	fields := f.under(path)
	text, unusual := polarSays(spec, f.sys)
	says(fields, path+".drag_given", text, unusual)
	g := Group{ID: "airframe", Title: "Airframe", Open: true, Blocks: []Block{{Fields: fields}}}
	if spec.Airframe.DragGiven != aircraft.ByBuildUp {
		return g
	}
	for i := range spec.Airframe.Components {
		n := strconv.Itoa(i)
		g.Blocks = append(g.Blocks, Block{Title: spec.Airframe.Components[i].Name, Fields: f.under(fmt.Sprintf("%s.components[%d]", path, i)),
			Buttons: []Button{{"copy-component " + n, "Copy", "Add a component like this one"}, {"remove-component " + n, "Remove", "Remove this component"}}})
	}
	g.Adds = []Button{{Action: "add-component", Label: "Add a component"}}
	return g
}

// lift makes the fields of one configuration.
func (f *form) lift(path string, c aircraft.Config) []Field {
	fields := f.under(path)
	text, unusual := liftSays(&f.spec.Variants[f.variant].Aircraft, c, f.sys)
	says(fields, path+".lift_given", text, unusual)
	return fields
}

// says puts beside the choice at path what it comes to, and what of that is unusual.
func says(fields []Field, path, text, unusual string) {
	for i := range fields {
		if fields[i].Path == path {
			fields[i].Says, fields[i].Unusual = text, unusual
		}
	}
}

// figures3 writes a coefficient with three significant digits.
func figures3(v float64) string {
	r, err := strconv.ParseFloat(strconv.FormatFloat(v, 'g', 3, 64), 64)
	if err != nil {
		r = v
	}
	return units.Plain(r)
}

// residual is what a fit leaves of CD as it is told: no less than what is worth telling.
func residual(v float64) float64 { return max(v, 1e-6) }

// polarSays says the clean polar in every way at once, and which of its numbers that are not typed are unusual.
func polarSays(spec *aircraft.Spec, sys units.System) (text, unusual string) {
	e, err := spec.Equivalent()
	if err != nil {
		return "No parabola with drag above 0 comes near this table, so it cannot be said in the other ways.", ""
	}
	text = fmt.Sprintf("f\u00a0%s, best L/D\u00a0%s at %s EAS at %s, CDmin\u00a0%s, e\u00a0%s, K\u00a0%s.", sys.Format(units.DragArea, e.DragArea), figures3(e.GlideRatio),
		sys.Format(units.Speed, e.GlideSpeed), sys.Format(units.Mass, e.Mass), figures3(e.CDMin), figures3(e.Efficiency), figures3(e.K))
	if e.Fitted {
		text = fmt.Sprintf("As a parabola, fitted to within %s in CD: %s CL at minimum drag\u00a0%s.", figures3(residual(e.Worst)), text, figures3(e.CLMinDrag))
	}
	return text, e.Unusual
}

// liftSays says the greatest lift of a configuration in both ways, and whether a CLmax that is not typed is unusual.
func liftSays(spec *aircraft.Spec, c aircraft.Config, sys units.System) (text, unusual string) {
	p := spec.Stall(c)
	return fmt.Sprintf("CLmax\u00a0%s: stalls at %s CAS at %s, at sea level.", figures3(p.CLMax), sys.Format(units.Speed, p.Speed), sys.Format(units.Mass, p.Mass)), p.Unusual
}

// joined puts two sentences behind each other, either of which may be empty.
func joined(a, b string) string {
	if a == "" || b == "" {
		return a + b
	}
	return a + " " + b
}
