// Package dragbuild estimates the minimum drag of an aircraft from its parts: the
// friction of a flat plate of the same wetted area, raised for thickness and for
// interference, and drag areas for what that cannot describe.
package dragbuild

import (
	"math"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// The kinds of component; stored in documents.
const (
	Body        = "body"
	Streamlined = "streamlined"
	Surface     = "surface"
	Nacelle     = "nacelle"
	ByDragArea  = "drag-area"
)

// Kinds lists the kinds of component with their words.
var Kinds = []input.Option{
	{Value: Surface, Label: "wing or tail surface"}, {Value: Body, Label: "fuselage, pod or boom"}, {Value: Streamlined, Label: "streamlined body"},
	{Value: Nacelle, Label: "nacelle or cowl"}, {Value: ByDragArea, Label: "other, by its drag area"},
}

// A Component is one part of the aircraft that the air touches.
type Component struct {
	Name           string  `json:"name"`
	Kind           string  `json:"kind"`            // one of Kinds
	WettedArea     float64 `json:"wetted_area"`     // of both sides, in m²
	Length         float64 `json:"length"`          // along the flow: of a body, or the mean chord, in m
	Fineness       float64 `json:"fineness"`        // length over greatest diameter of a body, dimensionless
	ThicknessRatio float64 `json:"thickness_ratio"` // greatest thickness over chord of a surface, dimensionless
	ThicknessAt    float64 `json:"thickness_at"`    // where on the chord the thickness is greatest, dimensionless
	Laminar        float64 `json:"laminar"`         // share of the length with laminar flow, dimensionless
	Interference   float64 `json:"interference"`    // interference factor, dimensionless
	DragArea       float64 `json:"drag_area"`       // drag coefficient times area, in m²
}

var (
	wettedArea = input.Spec{Name: "wetted_area", Label: "Wetted area", Quantity: units.Area, Min: 1e-4, Max: 3000, Note: "Of both sides, less what other parts cover."}
	length     = input.Spec{Name: "length", Label: "Length or mean chord", Quantity: units.Length, Min: 0.005, Max: 100, Note: "Along the flow."}
	fineness   = input.Spec{Name: "fineness", Label: "Length over diameter", Quantity: units.Coefficient, Min: 2, Max: 40,
		Typical: &input.Typical{Low: 3, High: 12, Source: input.CommonPractice}}
	thicknessRatio = input.Spec{Name: "thickness_ratio", Label: "Thickness over chord", Quantity: units.Fraction, Min: 0.01, Max: 0.4,
		Typical: &input.Typical{Low: 0.08, High: 0.2, Source: input.CommonPractice}}
	thicknessAt = input.Spec{Name: "thickness_at", Label: "Thickest at", Quantity: units.Fraction, Min: 0.1, Max: 0.7, Note: "Of the chord, from the leading edge.",
		Typical: &input.Typical{Low: 0.25, High: 0.5, Source: "0.3 for older sections, about 0.5 for laminar ones; Raymer 1992, section 12.5, from memory"}}
	laminar = input.Spec{Name: "laminar", Label: "Laminar share", Quantity: units.Fraction, Min: 0, Max: 1, Note: "Of the length. Rivets, paint steps, rain, insects and propeller wash end it.",
		Typical: &input.Typical{Low: 0, High: 0.5, Source: "0 to 0.1 for metal, up to 0.5 for smooth composite wings; common practice, no source"}}
	interference = input.Spec{Name: "interference", Label: "Interference factor", Quantity: units.Coefficient, Min: 0.8, Max: 3,
		Typical: &input.Typical{Low: 1, High: 1.5, Source: "1.0 well filleted, 1.1 to 1.4 unfilleted low wing, 1.05 tails, 1.5 nacelle at the surface; Raymer 1992, section 12.5, from memory"}}
	dragArea = input.Spec{Name: "drag_area", Label: "Drag area", Quantity: units.DragArea, Min: 0, Max: 100, Note: "Drag coefficient times the area that it refers to."}
)

// LongestName is the most characters that the name of a component has.
const LongestName = 80

// Inputs describes the component.
func (c *Component) Inputs() []input.Entry {
	skin, surface := c.Kind != ByDragArea, c.Kind == Surface
	return []input.Entry{
		input.Line("name", "Name", LongestName, &c.Name),
		input.Pick("kind", "Kind", &c.Kind, Kinds...),
		input.Num(&wettedArea, &c.WettedArea).If(skin),
		input.Num(&length, &c.Length).If(skin),
		input.Num(&fineness, &c.Fineness).If(skin && !surface),
		input.Num(&thicknessRatio, &c.ThicknessRatio).If(surface),
		input.Num(&thicknessAt, &c.ThicknessAt).If(surface),
		input.Num(&laminar, &c.Laminar).If(skin),
		input.Num(&interference, &c.Interference).If(skin),
		input.Num(&dragArea, &c.DragArea).If(!skin),
	}
}

// New is a component of the kind with values to begin from.
func New(kind, name string) Component {
	return Component{Name: name, Kind: kind, WettedArea: 1, Length: 1, Fineness: 6, ThicknessRatio: 0.12, ThicknessAt: 0.3, Interference: 1, DragArea: 0.01}
}

var (
	surfaceForm = formula.Must(formula.Formula{
		ID: "drag.form-surface", Out: formula.Sym("FF", "form factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("tc", "thickness over chord", units.Fraction), formula.Sym("xm", "place of the greatest thickness on the chord", units.Fraction), formula.Sym("M", "Mach number where friction is taken", units.Coefficient)},
		Expr: "(1 + 0.6/xm*tc + 100*pow(tc, 4))*max(1, 1.34*pow(M, 0.18))", Source: formula.Raymer,
		Where: "eq. 12.30, unswept, from memory; its Mach factor is not taken below 1, which it would be under Mach 0.2",
	})
	bodyForm = formula.Must(formula.Formula{
		ID: "drag.form-body", Out: formula.Sym("FF", "form factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("fr", "length over diameter", units.Coefficient)},
		Expr: "1 + 60/(fr*fr*fr) + fr/400", Source: formula.Raymer, Where: "eq. 12.31, from memory",
	})
	nacelleForm = formula.Must(formula.Formula{
		ID: "drag.form-nacelle", Out: formula.Sym("FF", "form factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("fr", "length over diameter", units.Coefficient)},
		Expr: "1 + 0.35/fr", Source: formula.Raymer, Where: "eq. 12.32, from memory",
	})
	streamlinedForm = formula.Must(formula.Formula{
		ID: "drag.form-streamlined", Out: formula.Sym("FF", "form factor", units.Coefficient),
		In:   []formula.Symbol{formula.Sym("fr", "length over diameter", units.Coefficient)},
		Expr: "1 + 1.5*pow(1/fr, 1.5) + 7*pow(1/fr, 3)", Source: formula.Hoerner, Where: "chapter 6, streamline bodies, eq. 28, from memory",
	})
)

// form is the form factor of c at the Mach number m.
func (c *Component) form(m float64, w *formula.Working) float64 {
	fr := c.Fineness
	switch c.Kind {
	case Surface:
		tc, xm := c.ThicknessRatio, c.ThicknessAt
		return w.Step(surfaceForm, (1+0.6/xm*tc+100*math.Pow(tc, 4))*math.Max(1, 1.34*math.Pow(m, 0.18)), tc, xm, m)
	case Nacelle:
		return w.Step(nacelleForm, 1+0.35/fr, fr)
	case Streamlined:
		return w.Step(streamlinedForm, 1+1.5*math.Pow(1/fr, 1.5)+7*math.Pow(1/fr, 3), fr)
	}
	return w.Step(bodyForm, 1+60/(fr*fr*fr)+fr/400, fr)
}
