package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// PlantCharts are the charts of a powerplant and its propeller. Engine and
// Propeller are empty where the powerplant shows no such curves.
type PlantCharts struct {
	Speed      Chart // engine speed and thrust over true airspeed
	Efficiency Chart // propeller efficiency and tip Mach over true airspeed
	Engine     []Chart
	Propeller  []Chart
}

// NewPlantCharts draws the powerplant p of the study.
func NewPlantCharts(s *study.Study, p *study.Plant, sys units.System) PlantCharts {
	k := &plantCharts{s: s, p: p, sys: sys, speed: measureOf(sys, units.Speed, 0)}
	c := PlantCharts{Speed: k.speedChart(), Efficiency: k.efficiencyChart()}
	if p.Curves != nil && p.Err == nil {
		c.Engine = []Chart{k.fullPowerChart(), k.lapseChart()}
		if p.Curves.Propeller().High > 0 {
			c.Propeller = []Chart{k.coefficientChart()}
		} else {
			c.Propeller = []Chart{k.discChart()}
		}
	}
	return c
}

// plantCharts is what the charts of one powerplant share.
type plantCharts struct {
	s     *study.Study
	p     *study.Plant
	sys   units.System
	speed measure
}

// Tip Mach numbers of the reference lines: common practice, no source; a study's cautions use the same.
const (
	tipMachCaution = 0.82
	tipMachStop    = 0.90
)

// altitudeClass colours the curve of the run with index i: low is strong, high is pale.
func altitudeClass(i int) string {
	return [...]string{"alt-1", "alt-2", "alt-3", "alt-4"}[min(i, 3)]
}

// over is a curve for each altitude; the one of the view is drawn whole, the others dashed.
func (k *plantCharts) over(name string, m measure, of func(*study.PlantPoint) float64) []Series {
	height := measureOf(k.sys, units.Altitude, 0)
	var list []Series
	for i := range k.p.Runs {
		r := &k.p.Runs[i]
		x, y := make([]float64, len(r.Points)), make([]float64, len(r.Points))
		for j := range r.Points {
			x[j], y[j] = k.speed.of(r.Points[j].TAS), math.NaN()
			if r.Points[j].Err == nil {
				y[j] = of(&r.Points[j])
			}
		}
		at := height.label(r.Air.PressureAltitude)
		s := m.series(name+" at "+at, x, y, altitudeClass(i))
		s.Label, s.LabelAt, s.Dash = at, 0.16+0.3*float64(i), i != k.p.View
		list = append(list, s)
	}
	return list
}

// turning is a value of the shaft where there is one.
func turning(of func(*powerplant.Output) float64) func(*study.PlantPoint) float64 {
	return func(p *study.PlantPoint) float64 {
		if p.Out.Shaft.Speed <= 0 {
			return math.NaN()
		}
		return of(&p.Out)
	}
}

// efficiencyOf leaves out a propeller that gives no thrust.
func efficiencyOf(o *powerplant.Output) float64 {
	if o.Thrust < 0 || o.Shaft.Power <= 0 {
		return math.NaN()
	}
	return o.Shaft.Efficiency
}

// blankOf is why a panel that needs a propeller is empty.
func (k *plantCharts) blankOf() string {
	switch {
	case k.p.Err != nil:
		return reason(k.sys, k.p.Err)
	case !k.p.TurnsPropeller():
		return "this powerplant turns no propeller"
	case k.powerless():
		return "the engine makes no power in this air"
	}
	return "no answer at any speed"
}

// powerless reports whether even full setting only idles at rest in the view.
func (k *plantCharts) powerless() bool {
	rest := &k.p.Marked[0]
	return rest.Err == nil && rest.Out.Limits&powerplant.Idling != 0
}

func (k *plantCharts) speedChart() Chart {
	rotation, force := measureOf(k.sys, units.Rotation, 0), measureOf(k.sys, units.Force, k.most(func(o *powerplant.Output) float64 { return o.Thrust }))
	engine := Panel{
		Y: Axis{Label: "engine speed", Unit: rotation.unit.Symbol}, Height: 0.85, Blank: k.blankOf(),
		Series: k.over("engine speed", rotation, turning(func(o *powerplant.Output) float64 { return o.Shaft.EngineSpeed })),
	}
	if k.p.Curves != nil {
		top := k.p.Curves.Engine().Greatest
		engine.Lines = []HLine{{rotation.of(top), "greatest " + rotation.label(top)}}
		low, _ := k.p.SpeedRange()
		engine.Y.Min, engine.Y.Max = floorTo(rotation.of(low)), rotation.of(top)+0.12*rotation.of(top-low)
	}
	lo, hi := k.reach(func(o *powerplant.Output) float64 { return o.Thrust })
	thrust := Panel{
		Y:      Axis{Label: "thrust", Unit: force.unit.Symbol, Min: coverBelow(force.of(max(lo, -0.25*hi))), Max: cover(1.08 * force.of(hi))},
		Height: 1.15, Blank: k.blankOf(),
		Series: k.over("thrust", force, func(p *study.PlantPoint) float64 { return p.Out.Thrust }),
	}
	return k.acrossSpeed("plant-speed", "Engine speed and thrust", k.speedWords(force, rotation), engine, thrust)
}

func (k *plantCharts) efficiencyChart() Chart {
	share, mach := measureOf(k.sys, units.Fraction, 0), measure{k.sys.Unit(units.Coefficient), 3}
	_, tips := k.reach(func(o *powerplant.Output) float64 { return o.Shaft.TipMach })
	efficiency := Panel{
		Y: Axis{Label: "propeller efficiency", Unit: share.unit.Symbol, Min: 0, Max: share.of(1)}, Height: 1.1, Blank: k.blankOf(),
		Series: k.over("propeller efficiency", share, turning(efficiencyOf)),
	}
	tip := Panel{
		Y: Axis{Label: "helical tip Mach number", Min: 0.4, Max: max(0.95, math.Ceil(20*tips)/20)}, Height: 0.9, Blank: k.blankOf(),
		Series: k.over("helical tip Mach number", mach, turning(func(o *powerplant.Output) float64 { return o.Shaft.TipMach })),
		Lines:  []HLine{{tipMachCaution, "0.82 caution"}, {tipMachStop, "0.90 limit of the model"}},
	}
	if low, _ := k.lowestTip(); low < tip.Y.Min {
		tip.Y.Min = math.Floor(10*low) / 10
	}
	return k.acrossSpeed("plant-efficiency", "Propeller efficiency and helical tip Mach number", k.efficiencyWords(), efficiency, tip)
}

// acrossSpeed puts two panels over true airspeed with the speeds of note marked.
func (k *plantCharts) acrossSpeed(id, what, words string, panels ...Panel) Chart {
	c := Chart{ID: id, Title: what + " at full setting, " + dayWords(k.sys, k.s.View.Deviation) + ".", Desc: words,
		X: Axis{Label: "true airspeed", Unit: k.speed.unit.Symbol}, XFirst: "true airspeed", Panels: panels, Marks: k.marks()}
	if k.p.Err != nil {
		c.Title = what + " at full setting: " + reason(k.sys, k.p.Err) + "."
	}
	fastest := 0.0
	for i := range k.p.Runs {
		r := &k.p.Runs[i]
		fastest = max(fastest, k.speed.of(r.Points[len(r.Points)-1].TAS))
	}
	if fastest > 0 {
		c.X.Max = math.Ceil(fastest/5-1e-9) * 5
	}
	return c
}

// marks are the speeds of the view that the powerplant must serve, and where its table ends.
func (k *plantCharts) marks() []Mark {
	if k.p.Err != nil {
		return nil
	}
	v := &k.s.Speeds
	var marks []Mark
	add := func(name string, tas float64, found bool) {
		if found {
			marks = append(marks, Mark{X: k.speed.of(tas), Label: name + " " + readNumber(k.speed.of(tas), k.speed.decimals)})
		}
	}
	add("stall", v.Stall.TAS, v.Stall.Err == nil)
	add("best rate", v.BestRate.TAS, v.BestRate.Err == nil && v.BestRate.Value > 0)
	add("level max", v.LevelMax.TAS, v.LevelMax.Err == nil)
	if r := &k.p.Runs[k.p.View]; r.Ends.Found && r.Ends.TAS > 0 {
		name := "no answer beyond"
		if k.p.Curves != nil && k.p.Curves.Propeller().High > 0 {
			name = "J " + readNumber(k.p.Curves.Propeller().High, 2) + ", table ends"
		}
		add(name, r.Ends.TAS, true)
	}
	return marks
}

// reach is the extent of a value over all points with an answer, with 0.
func (k *plantCharts) reach(of func(*powerplant.Output) float64) (lo, hi float64) {
	for i := range k.p.Runs {
		for j := range k.p.Runs[i].Points {
			if p := &k.p.Runs[i].Points[j]; p.Err == nil {
				lo, hi = min(lo, of(&p.Out)), max(hi, of(&p.Out))
			}
		}
	}
	return lo, hi
}

func (k *plantCharts) most(of func(*powerplant.Output) float64) float64 {
	_, hi := k.reach(of)
	return hi
}

func (k *plantCharts) lowestTip() (float64, bool) {
	least, found := math.Inf(1), false
	for i := range k.p.Runs {
		for j := range k.p.Runs[i].Points {
			if o := &k.p.Runs[i].Points[j].Out; o.Shaft.Speed > 0 && o.Shaft.TipMach < least {
				least, found = o.Shaft.TipMach, true
			}
		}
	}
	return least, found
}

// floorTo rounds down to a step of a tenth to a fifth of the value.
func floorTo(v float64) float64 {
	if !(v > 0) || !usable(v) {
		return 0
	}
	step := tickStep(v/10, "")
	return math.Floor(v/step+1e-9) * step
}

func (k *plantCharts) viewWords() string {
	return fmt.Sprintf("At %s, %s, full setting", k.sys.Format(units.Altitude, k.s.View.Altitude), dayWords(k.sys, k.s.View.Deviation))
}

func (k *plantCharts) speedWords(force, rotation measure) string {
	if k.p.Err != nil {
		return "There is nothing to draw: " + reason(k.sys, k.p.Err) + "."
	}
	rest := &k.p.Marked[0]
	if rest.Err != nil {
		return fmt.Sprintf("%s, there is no answer at rest: %s.", k.viewWords(), reason(k.sys, rest.Err))
	}
	if k.powerless() {
		return k.viewWords() + ", the engine makes no power: the air is too thin for it."
	}
	text := fmt.Sprintf("%s, the thrust at rest is %s", k.viewWords(), force.prose(rest.Out.Thrust))
	if n := rest.Out.Shaft.EngineSpeed; n > 0 {
		text += " with the engine at " + rotation.prose(n)
	}
	for _, m := range k.p.Marked[1:] {
		if m.Err == nil {
			text += fmt.Sprintf("; %s at %s gives %s", m.Name, k.speed.prose(m.TAS), force.prose(m.Out.Thrust))
			if n := m.Out.Shaft.EngineSpeed; n > 0 {
				text += ", " + rotation.prose(n)
			}
		}
	}
	text += "."
	if r := &k.p.Runs[k.p.View]; r.Throttled.Found && k.p.Curves != nil {
		text += fmt.Sprintf(" From %s the throttle is held back to keep %s.", k.speed.prose(r.Throttled.TAS), rotation.prose(k.p.Curves.Engine().Greatest))
	}
	return text
}

func (k *plantCharts) efficiencyWords() string {
	if k.p.Err != nil || !k.p.TurnsPropeller() {
		return "There is nothing to draw: " + k.blankOf() + "."
	}
	share := measureOf(k.sys, units.Fraction, 0)
	best, tas := 0.0, 0.0
	for _, p := range k.p.Runs[k.p.View].Points {
		if e := p.Out.Shaft.Efficiency; p.Err == nil && e > best {
			best, tas = e, p.TAS
		}
	}
	_, tips := k.reach(func(o *powerplant.Output) float64 { return o.Shaft.TipMach })
	if best == 0 {
		return fmt.Sprintf("%s, the propeller does not pull. The greatest helical tip Mach number drawn is %s.", k.viewWords(), units.Fixed(tips, 2))
	}
	return fmt.Sprintf("%s, the propeller is best near %s with %s. The greatest helical tip Mach number drawn is %s.", k.viewWords(), k.speed.prose(tas), share.prose(best), units.Fixed(tips, 2))
}
