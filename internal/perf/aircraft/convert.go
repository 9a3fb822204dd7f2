package aircraft

import (
	"math"
	"strings"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/input"
	"legwright/internal/perf/polar"
	"legwright/internal/perf/powerplant"
)

// A Derived is an input that a change of the way of giving has filled.
type Derived struct {
	Path string   // within the aircraft
	From []string // inputs that it follows from, by path prefix within the aircraft
	Rate float64  // its change per change of the first of From, in their SI units; 0 where it follows from several
	Note string   // how it came about
}

// Switch is told that the choice at the path within the aircraft was from before,
// and fills the inputs of the way now chosen so that they mean what the others
// did. It lists the inputs whose value that changed. Where the way left behind
// means no aircraft, the choice is set back.
func (s *Spec) Switch(choice, from string) []Derived {
	if choice == "airframe.drag_given" {
		return s.switchDrag(from)
	}
	if name, ok := strings.CutPrefix(choice, "limits."); ok {
		return s.switchLimits(name, from)
	}
	for i, c := range s.Airframe.configurations() {
		if path := "airframe." + configPaths[i]; choice == path+".lift_given" {
			return s.switchLift(c, path, from)
		}
	}
	const plant = "powerplant.values."
	inner, ok := strings.CutPrefix(choice, plant)
	if m, follows := s.Powerplant.Model.(powerplant.Follower); ok && follows {
		if f, ok := m.Follows(inner); ok {
			return []Derived{{Path: plant + f.Path, From: []string{plant + f.From}, Rate: f.Rate, Note: f.Note}}
		}
	}
	return nil
}

// What the notes of Switch say.
const (
	noteStart = "the start mass"
	noteStall = "from the stall speed"
	noteCLMax = "from CLmax"
	noteFit   = "fitted to the table, CD within "
	noteRows  = "rows "
	noteRule  = "the rule's least"
	noteWing  = "from wing area and span"
)

// DerivedNote reports whether a note is one of Switch.
func DerivedNote(note string) bool {
	note = strings.TrimPrefix(note, noteRows)
	for _, w := range dragInputs {
		if w.words != "" && note == w.words {
			return true
		}
	}
	return note == powerplant.NoteFuelMass || note == powerplant.NoteFuelVolume || note == noteStart || note == noteStall || note == noteCLMax || note == noteRule || note == noteWing || strings.HasPrefix(note, noteFit)
}

// dragInputs are the inputs of each way to give the drag polar, and what the way is called in a note.
var dragInputs = map[string]struct {
	words     string
	minimum   []string // from which CDmin follows
	induced   []string // from which K follows
	clMinDrag string
}{
	ByParabola:  {"from CDmin and e", []string{"airframe.cd_min"}, []string{"airframe.efficiency"}, "airframe.cl_min_drag"},
	ByDragArea:  {"from the flat-plate area and e", []string{"airframe.drag_area"}, []string{"airframe.efficiency"}, "airframe.cl_min_drag"},
	ByBuildUp:   {"from the component build-up", []string{"airframe.components", "airframe.leakage", "airframe.unlisted", "airframe.friction_tas"}, []string{"airframe.efficiency"}, "airframe.cl_min_drag"},
	ByBestGlide: {"from the best L/D and its speed", glideInputs, glideInputs, "airframe.cl_min_drag"},
	ByTable:     {"", []string{"airframe.polar"}, []string{"airframe.polar"}, "airframe.polar"},
}

var glideInputs = []string{"airframe.glide_ratio", "airframe.glide_speed", "airframe.glide_mass", "airframe.cl_min_drag"}

// A filling fills inputs with values that follow from others.
type filling struct {
	list []Derived
	note string
}

// same is the relative difference that rounding makes: a value that close stays as it was typed.
const same = 1e-12

func (l *filling) set(at *float64, v float64, path string, rate float64, from ...string) {
	if math.Abs(*at-v) <= same*math.Abs(v) {
		return
	}
	*at = v
	l.list = append(l.list, Derived{Path: path, From: from, Rate: rate, Note: l.note})
}

// mass fills the mass of a speed with the start mass, where none stands there from before.
func (l *filling) mass(at *float64, s *Spec, path string) {
	if *at > 0 {
		return
	}
	*at = s.StartMass()
	l.list = append(l.list, Derived{Path: path, Note: noteStart})
}

func (s *Spec) switchDrag(from string) []Derived {
	f := &s.Airframe
	to := f.DragGiven
	f.DragGiven = from
	p, err := f.parabola(nil)
	if err != nil || !(p.CDMin > 0 && p.K > 0) {
		return nil
	}
	f.DragGiven = to
	was := dragInputs[from]
	l := &filling{note: was.words}
	if from == ByTable {
		fit, _ := f.fit()
		l.note = noteFit + short(math.Max(fit.Worst, 1e-6))
	}
	if to == ByTable {
		return f.tabulate(p, l, was.minimum, was.induced)
	}
	l.set(&f.CLMinDrag, p.CLMinDrag, "airframe.cl_min_drag", 0, was.clMinDrag)
	if to == ByBestGlide {
		s.giveGlide(p, l, append(append(append([]string{}, was.minimum...), was.induced...), was.clMinDrag))
		return l.list
	}
	l.set(&f.Efficiency, f.efficiencyOf(p), "airframe.efficiency", 0, was.induced...)
	area := p.CDMin * f.WingArea
	perArea, perUnit := 1/f.WingArea, f.WingArea // rates against CDmin of what is given as an area
	switch from {
	case ByDragArea:
		perUnit = 1
	case ByParabola:
		perArea = 1
	default:
		perArea, perUnit = 0, 0
	}
	switch to {
	case ByParabola:
		l.set(&f.CDMin, p.CDMin, "airframe.cd_min", perArea, was.minimum...)
	case ByDragArea:
		l.set(&f.DragArea, area, "airframe.drag_area", perUnit, was.minimum...)
	case ByBuildUp:
		f.giveBuildUp(area, s.carson(p), l, perUnit, was.minimum)
	}
	return l.list
}

// giveGlide fills the best L/D and its speed, at the mass that stands there or else at the start.
func (s *Spec) giveGlide(p polar.Parabola, l *filling, from []string) {
	f := &s.Airframe
	ratio, cl := p.BestGlide()
	l.set(&f.GlideRatio, ratio, "airframe.glide_ratio", 0, from...)
	l.mass(&f.GlideMass, s, "airframe.glide_mass")
	l.set(&f.GlideSpeed, s.eas(cl, f.GlideMass), "airframe.glide_speed", 0, from...)
}

// giveBuildUp makes the list and what it leaves out add up to the drag area in m².
func (f *Airframe) giveBuildUp(area, tas float64, l *filling, rate float64, from []string) {
	if f.FrictionTAS < frictionTAS.Min {
		f.FrictionTAS = math.Round(math.Max(tas, frictionTAS.Min))
	}
	sum, err := f.BuildUp(nil)
	if err != nil {
		return // Build says what is wrong with the list
	}
	l.set(&f.Unlisted, f.Unlisted+area-sum.DragArea, "airframe.unlisted", rate, from...)
}

// carson is Carson's speed in m/s at sea level at the start mass, a common cruise.
func (s *Spec) carson(p polar.Parabola) float64 {
	_, cl := p.BestGlide()
	return math.Sqrt(math.Sqrt(3)) * s.eas(cl, s.StartMass())
}

// eas is the equivalent airspeed in m/s of level flight at cl and the mass m in kg.
func (s *Spec) eas(cl, m float64) float64 {
	return math.Sqrt(2 * m * atmos.Gravity / (atmos.SeaLevelDensity * s.Airframe.WingArea * cl))
}

// StartMass is the mass with everything aboard in kg.
func (s *Spec) StartMass() float64 {
	m := s.Weights.Empty + s.Weights.PayloadMass()
	if plant := s.Powerplant.Model; plant != nil {
		m += plant.InstalledMass() + plant.Stores().Trapped + plant.Stores().Fuel
	}
	return m
}

// tableStep is the distance of CL between rows that a parabola is read at: between
// them the monotone cubic leaves it by less than K/5000.
const tableStep = 0.05

// tabulate reads the parabola at rows that reach every lift coefficient flown. A
// table to which the parabola is the fit is the better knowledge, and stays.
func (f *Airframe) tabulate(p polar.Parabola, l *filling, from ...[]string) []Derived {
	if fit, err := f.fit(); err == nil && fit.Near(p, 1e-9) && f.tableReaches() {
		return nil
	}
	low, high := 0.0, f.GroundCL
	for _, c := range f.configurations() {
		cl := c.lift(f.WingArea, nil)
		low = math.Min(low, math.Min(-c.DeltaCLM, f.GroundCL-c.DeltaCLM))
		high = math.Max(high, math.Max(cl-c.DeltaCLM, f.GroundCL-c.DeltaCLM))
	}
	first, last := math.Floor((low-p.CLMinDrag)/tableStep+1e-8), math.Ceil((high-p.CLMinDrag)/tableStep-1e-8)
	first, last = math.Min(first, -2), math.Max(last, 2)
	if !(last-first < 1000) {
		return nil
	}
	f.Polar = nil
	for i := first; i <= last; i++ {
		cl := math.Round((p.CLMinDrag+i*tableStep)*1e10) / 1e10
		f.Polar = append(f.Polar, []float64{cl, p.CD(cl)})
	}
	return []Derived{{Path: "airframe.polar", From: append(append([]string{}, from[0]...), from[1]...), Note: noteRows + l.note}}
}

// tableReaches reports whether the table could be flown.
func (f *Airframe) tableReaches() bool {
	trial := *f
	trial.DragGiven = ByTable
	if input.Check(&trial) != nil {
		return false
	}
	_, err := trial.tabulated()
	return err == nil
}

func (s *Spec) switchLift(c *Configuration, path, from string) []Derived {
	area, to := s.Airframe.WingArea, c.LiftGiven
	c.LiftGiven = from
	cl := c.lift(area, nil)
	c.LiftGiven = to
	if !(cl > 0) {
		return nil
	}
	l := &filling{}
	switch to {
	case ByCLMax:
		l.note = noteStall
		l.set(&c.CLMax, cl, path+".cl_max", -2*cl/c.StallSpeed, path+".stall_speed", path+".stall_mass")
	case ByStall:
		l.note = noteCLMax
		l.mass(&c.StallMass, s, path+".stall_mass")
		v := s.eas(cl, c.StallMass)
		l.set(&c.StallSpeed, v, path+".stall_speed", -v/(2*cl), path+".cl_max")
	}
	return l.list
}
