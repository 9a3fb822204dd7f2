package dragbuild

import (
	"errors"
	"fmt"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A BuildUp is the list of parts and what is said of all of them.
type BuildUp struct {
	Components []Component
	Leakage    float64 // leakage and protuberances, as a share of the drag of the parts, dimensionless
	Unlisted   float64 // drag area of what the list leaves out, negative where it counts too much, in m²
	TAS        float64 // true airspeed at which the Reynolds numbers are taken, in m/s
	Air        atmos.Air
}

// A Part is what the estimate says of one component.
type Part struct {
	Name         string
	Kind         string
	Reynolds     float64 // of the length, dimensionless; 0 of a part given by its drag area
	Friction     float64 // friction coefficient, dimensionless; 0 of a part given by its drag area
	Form         float64 // form factor, dimensionless; 0 of a part given by its drag area
	Interference float64 // interference factor, dimensionless; 0 of a part given by its drag area
	DragArea     float64 // in m²
}

// A Sum is the estimate of the whole aircraft.
type Sum struct {
	Parts    []Part
	Leakage  float64 // drag area in m²
	Unlisted float64 // drag area in m²
	DragArea float64 // of everything, in m²
}

var (
	partArea = formula.Must(formula.Formula{
		ID: "drag.part", Out: formula.Sym("fi", "drag area of the part", units.DragArea),
		In: []formula.Symbol{formula.Sym("Cf", "friction coefficient", units.Coefficient), formula.Sym("FF", "form factor", units.Coefficient),
			formula.Sym("Q", "interference factor", units.Coefficient), formula.Sym("Sw", "wetted area", units.Area)},
		Expr: "Cf*FF*Q*Sw", Source: formula.Raymer, Where: "eq. 12.24, from memory",
	})
	wholeArea = formula.Must(formula.Formula{
		ID: "drag.whole", Out: formula.Sym("f", "drag area", units.DragArea),
		In: []formula.Symbol{formula.Sym("fp", "sum of the parts", units.DragArea), formula.Sym("lp", "leakage and protuberances", units.Fraction),
			formula.Sym("fu", "drag area not in the list", units.DragArea)},
		Expr: "fp*(1 + lp) + fu", Source: formula.Raymer, Where: "eq. 12.24, with leakage and protuberances as a share, section 12.5, from memory",
	})
)

// Sum adds the parts up. It fails with an *input.Error at the length of each part
// whose Reynolds number is too small for the friction formulas, with a path such as "components[2].length".
func (b *BuildUp) Sum(w *formula.Working) (Sum, error) {
	s := Sum{Unlisted: b.Unlisted}
	mach := float64(b.Air.Mach(b.TAS))
	var errs []error
	total := 0.0
	for i := range b.Components {
		p, err := b.part(&b.Components[i], mach, w)
		if err != nil {
			errs = append(errs, input.Within(fmt.Sprintf("components[%d]", i), err))
		}
		s.Parts = append(s.Parts, p)
		total += p.DragArea
	}
	if err := errors.Join(errs...); err != nil {
		return Sum{}, err
	}
	s.Leakage = b.Leakage * total
	s.DragArea = w.Step(wholeArea, total*(1+b.Leakage)+b.Unlisted, total, b.Leakage, b.Unlisted)
	return s, nil
}

func (b *BuildUp) part(c *Component, mach float64, w *formula.Working) (Part, error) {
	p := Part{Name: c.Name, Kind: c.Kind}
	if c.Kind == ByDragArea {
		w.Note("%s: drag area %s as given.", c.Name, units.Metric.Format(units.DragArea, c.DragArea))
		p.DragArea = c.DragArea
		return p, nil
	}
	w.Note("%s:", c.Name)
	p.Reynolds = w.Step(reynolds, b.Air.Density*b.TAS*c.Length/b.Air.Viscosity, b.Air.Density, b.TAS, c.Length, b.Air.Viscosity)
	if !(p.Reynolds >= leastReynolds) {
		return p, &input.Error{Path: "length", Spec: &length, Value: c.Length, Err: input.ErrConflict,
			Accepts: fmt.Sprintf("the Reynolds number is %.0f and plate friction is used from %.0f; give the part by its drag area", p.Reynolds, leastReynolds)}
	}
	p.Friction = Friction(p.Reynolds, c.Laminar, w)
	p.Form = c.form(mach, w)
	p.Interference = c.Interference
	p.DragArea = w.Step(partArea, p.Friction*p.Form*c.Interference*c.WettedArea, p.Friction, p.Form, c.Interference, c.WettedArea)
	return p, nil
}

// Smooth reports whether the estimate counts nothing but the skin of clean parts:
// no drag area, no leakage, nothing unlisted.
func (b *BuildUp) Smooth() bool {
	for i := range b.Components {
		if b.Components[i].Kind == ByDragArea && b.Components[i].DragArea > 0 {
			return false
		}
	}
	return b.Leakage == 0 && b.Unlisted <= 0
}
