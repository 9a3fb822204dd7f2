package aircraft

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/input"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/units"
)

// How the drag polar is given; stored in documents.
const (
	ByParabola  = "parabola"
	ByDragArea  = "drag-area"
	ByBestGlide = "best-glide"
	ByBuildUp   = "build-up"
	ByTable     = "table"
)

var (
	cdMin = input.Spec{Name: "cd_min", Label: "Minimum drag coefficient", Quantity: units.Coefficient, Min: 0.003, Max: 0.5,
		Typical: &input.Typical{Low: 0.016, High: 0.06, Source: "light aircraft 0.018 to 0.040, common practice, no source"}}
	dragArea   = input.Spec{Name: "drag_area", Label: "Flat-plate area\u00a0f", Quantity: units.DragArea, Min: 6e-5, Max: 250, Note: "Minimum drag per dynamic pressure, CDmin times wing area."}
	efficiency = input.Spec{Name: "efficiency", Label: "Span efficiency\u00a0e", Quantity: units.Coefficient, Min: 0.2, Max: 1.5,
		Typical: &input.Typical{Low: 0.7, High: 0.9, Source: "0.7 to 0.85 for flaps up, gliders higher; common practice, no source"}}
	glideRatio = input.Spec{Name: "glide_ratio", Label: "Best L/D", Quantity: units.Coefficient, Min: 1, Max: 120, Note: "Without propeller drag: a windmilling propeller spoils a glide test.",
		Typical: &input.Typical{Low: 7, High: 20, Source: "light aircraft 8 to 14, motor gliders 20 to 30; common practice, no source"}}
	glideSpeed = input.Spec{Name: "glide_speed", Label: "Speed of best L/D, EAS", Quantity: units.Speed, Min: 1, Max: 250, Note: "Equivalent airspeed, which is calibrated airspeed at sea level."}
	glideMass  = input.Spec{Name: "glide_mass", Label: "Mass at that speed", Quantity: units.Mass, Min: 0.05, Max: 100000}
	clMinDrag  = input.Spec{Name: "cl_min_drag", Label: "CL at minimum drag", Quantity: units.Coefficient, Min: -0.5, Max: 1,
		Typical: &input.Typical{Low: 0, High: 0.3, Source: input.CommonPractice}}
	leakage = input.Spec{Name: "leakage", Label: "Leakage and protuberances", Quantity: units.Fraction, Min: 0, Max: 2, Note: "Share of the drag of the components.",
		Typical: &input.Typical{Low: 0.05, High: 1, Source: "5 to 10 % for propeller aircraft, Raymer 1992, section 12.5, from memory; small unmanned aircraft up to as much again"}}
	unlisted    = input.Spec{Name: "unlisted", Label: "Drag area not in the list", Quantity: units.DragArea, Min: -50, Max: 250, Note: "0 once the list is whole; negative where it counts too much."}
	frictionTAS = input.Spec{Name: "friction_tas", Label: "Friction taken at, TAS", Quantity: units.Speed, Min: 2, Max: 250, Note: "True airspeed of the Reynolds numbers: that of the cruise."}
	frictionAlt = input.Spec{Name: "friction_alt", Label: "Friction taken at altitude", Quantity: units.Altitude, Min: -500, Max: 25000, Note: "Pressure altitude, standard day."}
	columnCL    = input.Spec{Name: "cl", Label: "CL", Quantity: units.Coefficient, Min: -3, Max: 5, Note: "Of the whole aircraft, on the wing area above.",
		Also: []string{"lift coefficient", "lift coeff", "CA"}}
	columnCD = input.Spec{Name: "cd", Label: "CD", Quantity: units.Coefficient, Min: 0.001, Max: 3, Note: "Of the whole aircraft, clean, trimmed, on the same wing area; an airfoil's alone is far less.",
		Also: []string{"drag coefficient", "drag coeff", "CW"}}
)

// DragWays lists the ways to give the drag polar, with their words.
var DragWays = []input.Option{
	{Value: ByParabola, Label: "CDmin and e"}, {Value: ByDragArea, Label: "flat-plate area and e"}, {Value: ByBestGlide, Label: "best L/D and its speed"},
	{Value: ByBuildUp, Label: "component build-up and e"}, {Value: ByTable, Label: "table of CL and CD"},
}

// Inputs describes the airframe.
func (f *Airframe) Inputs() []input.Entry {
	way := f.DragGiven
	table, glide, build := way == ByTable, way == ByBestGlide, way == ByBuildUp
	return []input.Entry{
		input.Num(&wingArea, &f.WingArea),
		input.Num(&span, &f.Span),
		input.Num(&height, &f.WingHeight),
		input.Ways("drag_given", "Drag polar given as", &f.DragGiven, DragWays...),
		input.Num(&cdMin, &f.CDMin).If(!table && !glide && !build && way != ByDragArea),
		input.Num(&dragArea, &f.DragArea).If(way == ByDragArea),
		input.Num(&glideRatio, &f.GlideRatio).If(glide),
		input.Num(&glideSpeed, &f.GlideSpeed).If(glide),
		input.Num(&glideMass, &f.GlideMass).If(glide),
		input.Num(&efficiency, &f.Efficiency).If(!table && !glide),
		input.Num(&clMinDrag, &f.CLMinDrag).If(!table),
		input.Num(&leakage, &f.Leakage).If(build),
		input.Num(&unlisted, &f.Unlisted).If(build),
		input.Num(&frictionTAS, &f.FrictionTAS).If(build),
		input.Num(&frictionAlt, &f.FrictionAlt).If(build),
		input.Rows(input.Table{Name: "polar", Label: "Drag polar", MinRows: 3, Columns: []*input.Spec{&columnCL, &columnCD},
			Note: "CL, CD of the whole aircraft, clean; one row a line, CL rising from 0 or less to the greatest CLmax."}, &f.Polar).If(table),
		input.Num(&groundCL, &f.GroundCL),
		input.Num(&neverExceed, &f.NeverExceed),
	}
}

// Unused reports whether the input at the path within the aircraft is kept and
// checked but of no consequence: a component while the drag is not given by the build-up.
func (s *Spec) Unused(path string) bool {
	return s.Airframe.DragGiven != ByBuildUp && strings.HasPrefix(path, "airframe.components[")
}

// aspect is the aspect ratio, dimensionless.
func (f *Airframe) aspect() float64 { return f.Span * f.Span / f.WingArea }

// polar assembles the clean polar from whatever it is given by.
func (f *Airframe) polar(w *formula.Working) (polar.Polar, error) {
	if f.DragGiven == ByTable {
		return f.tabulated()
	}
	p, err := f.parabola(w)
	if err != nil {
		return polar.Polar{}, err
	}
	return polar.Parabolic(p.CDMin, p.K, p.CLMinDrag), f.flyable(p)
}

// DragWorking shows how the clean polar follows from what is given; of an aircraft that builds.
func (f *Airframe) DragWorking(w *formula.Working) {
	if f.DragGiven == ByTable {
		w.Note("The polar is a table of %d rows, read by a monotone cubic.", len(f.Polar))
		return
	}
	f.polar(w)
}

func (f *Airframe) tabulated() (polar.Polar, error) {
	cl, cd := f.columns()
	p, err := polar.Tabulated(cl, cd)
	if err != nil {
		return p, &input.Error{Path: "polar", Text: err.Error(), Accepts: "rows with rising CL", Err: input.ErrOrder}
	}
	return p, f.reach(cl[0], cl[len(cl)-1])
}

// columns are CL and CD of the table.
func (f *Airframe) columns() (cl, cd []float64) {
	for _, r := range f.Polar {
		if len(r) == 2 {
			cl, cd = append(cl, r[0]), append(cd, r[1])
		}
	}
	return cl, cd
}

// parabola is the clean polar by its three numbers; that of a table is fitted.
// The error says what has no parabola; whether the numbers are those of an aircraft is not looked at.
func (f *Airframe) parabola(w *formula.Working) (polar.Parabola, error) {
	minimum := f.CDMin
	switch f.DragGiven {
	case ByTable:
		fit, err := f.fit()
		return fit.Parabola, err
	case ByBestGlide:
		return f.glideParabola(w)
	case ByDragArea:
		minimum = polar.FlatPlate(f.DragArea, f.WingArea, w)
	case ByBuildUp:
		sum, err := f.BuildUp(w)
		if err != nil {
			return polar.Parabola{}, err
		}
		minimum = polar.FlatPlate(sum.DragArea, f.WingArea, w)
	}
	return polar.Parabola{CDMin: minimum, K: polar.InducedFactor(f.aspect(), f.Efficiency, w), CLMinDrag: f.CLMinDrag}, nil
}

// fit is the parabola nearest to the table.
func (f *Airframe) fit() (polar.Fitted, error) {
	cl, cd := f.columns()
	fit, err := polar.Fit(cl, cd)
	if err != nil {
		return fit, &input.Error{Path: "polar", Text: err.Error(), Accepts: "rows with rising CL", Err: input.ErrOrder}
	}
	return fit, nil
}

func (f *Airframe) glideParabola(w *formula.Working) (polar.Parabola, error) {
	cl := polar.GlideLift(f.GlideMass, atmos.Gravity, atmos.SeaLevelDensity, f.GlideSpeed, f.WingArea, w)
	if cl <= f.CLMinDrag {
		return polar.Parabola{}, &input.Error{Path: "glide_speed", Spec: &glideSpeed, Value: f.GlideSpeed, Err: input.ErrConflict,
			Accepts: fmt.Sprintf("CL is then %s, and the best L/D lies above the CL of minimum drag, %s", short(cl), short(f.CLMinDrag))}
	}
	p := polar.OfBestGlide(f.GlideRatio, cl, f.CLMinDrag, w)
	w.Step(spanEfficiency, f.efficiencyOf(p), p.K, f.aspect())
	return p, nil
}

var spanEfficiency = formula.Must(formula.Formula{
	ID: "aircraft.span-efficiency", Out: formula.Sym("e", "span efficiency", units.Coefficient),
	In:   []formula.Symbol{formula.Sym("K", "lift-dependent drag factor", units.Coefficient), formula.Sym("A", "aspect ratio", units.Coefficient)},
	Expr: "1/(pi*A*K)", Source: formula.Anderson, Where: "section 2.9.2",
})

// efficiencyOf is the span efficiency of a parabola on this wing, dimensionless.
func (f *Airframe) efficiencyOf(p polar.Parabola) float64 { return 1 / (math.Pi * f.aspect() * p.K) }

// flyable checks the numbers that follow from those given, against the ranges in which they are accepted when given themselves.
func (f *Airframe) flyable(p polar.Parabola) error {
	switch f.DragGiven {
	case ByParabola:
		return nil // checked as inputs
	case ByDragArea:
		return f.implausible("drag_area", &dragArea, f.DragArea, "CDmin", p.CDMin, &cdMin)
	case ByBuildUp:
		return f.implausible("unlisted", &unlisted, f.Unlisted, "with the components CDmin", p.CDMin, &cdMin)
	}
	at := fmt.Sprintf("with CL %s there, ", short(polar.GlideLift(f.GlideMass, atmos.Gravity, atmos.SeaLevelDensity, f.GlideSpeed, f.WingArea, nil)))
	return errors.Join(f.implausible("glide_ratio", &glideRatio, f.GlideRatio, at+"CDmin", p.CDMin, &cdMin),
		f.implausible("glide_speed", &glideSpeed, f.GlideSpeed, at+"e", f.efficiencyOf(p), &efficiency))
}

// implausible is the error of an input of the value given from which a number follows that spec does not accept; nil when it does.
func (f *Airframe) implausible(path string, given *input.Spec, value float64, what string, follows float64, spec *input.Spec) error {
	if err := spec.Check(snapped(spec, follows)); err == nil {
		return nil
	}
	return &input.Error{Path: path, Spec: given, Value: value, Err: input.ErrConflict,
		Accepts: fmt.Sprintf("%s would be %s, and %s is accepted", what, short(follows), spec.Accepted(units.Unit{Scale: 1}))}
}

// snapped is the bound of spec that v passes only by rounding, else v.
func snapped(spec *input.Spec, v float64) float64 {
	for _, bound := range [2]float64{spec.Min, spec.Max} {
		if math.Abs(v-bound) <= 1e-9*math.Abs(bound) {
			return bound
		}
	}
	return v
}

// short writes a coefficient with three significant digits.
func short(v float64) string { return fmt.Sprintf("%.3g", v) }

// NewComponent is a component to begin from, of the size of a tail.
func (f *Airframe) NewComponent() dragbuild.Component {
	c := dragbuild.New(dragbuild.Surface, "Component")
	c.WettedArea, c.Length, c.DragArea = rounded(0.3*f.WingArea), rounded(0.6*f.WingArea/f.Span), rounded(0.001*f.WingArea)
	return c
}

// rounded is v > 0 with two significant digits.
func rounded(v float64) float64 {
	scale := math.Pow(10, 1-math.Floor(math.Log10(v)))
	return math.Round(v*scale) / scale
}

// BuildUp adds the components up, whatever the drag is given by.
func (f *Airframe) BuildUp(w *formula.Working) (dragbuild.Sum, error) {
	b, err := f.buildUp()
	if err != nil {
		return dragbuild.Sum{}, err
	}
	return b.Sum(w)
}

func (f *Airframe) buildUp() (*dragbuild.BuildUp, error) {
	air, err := atmos.Day{}.At(f.FrictionAlt, nil)
	if err != nil {
		return nil, &input.Error{Path: "friction_alt", Spec: &frictionAlt, Value: f.FrictionAlt, Err: input.ErrRange}
	}
	return &dragbuild.BuildUp{Components: f.Components, Leakage: f.Leakage, Unlisted: f.Unlisted, TAS: f.FrictionTAS, Air: air}, nil
}

// SkinOnly reports whether the drag is a build-up of nothing but clean skin.
func (f *Airframe) SkinOnly() bool {
	b, err := f.buildUp()
	return f.DragGiven == ByBuildUp && err == nil && b.Smooth()
}
