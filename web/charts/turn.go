package charts

import (
	"fmt"
	"math"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// bankLines are the load factors of the bank angles in degrees that pilots think in.
var bankLines = []float64{30, 45, 60}

// LoadChart draws the load factor of a level turn that full thrust sustains and the one
// that maximum lift allows, against true airspeed.
func LoadChart(s *study.Study, e *study.Envelope, t *study.Structure, sys units.System) Chart {
	const least, beyond, floor = 2.6, 1.5, 0.9
	speed := measureOf(sys, units.Speed, 0)
	c := Chart{ID: "loads", X: speedAxis(s, speed), XFirst: "true airspeed"}
	p := Panel{Y: Axis{Label: "load factor", Min: floor, Max: least}}
	var x, lift, held, ground, sustained []float64
	best := study.LoadAt{}
	for _, l := range e.Loads {
		n := math.NaN()
		if l.Sustained >= 1 {
			n = l.Sustained
		}
		if l.Sustained > best.Sustained {
			best = l
		}
		x, lift, held = append(x, speed.of(l.TAS)), append(lift, l.Lift), append(held, n)
		ground, sustained = append(ground, 1), append(sustained, max(l.Sustained, 1))
	}
	if e.LoadsErr != nil || len(x) == 0 {
		p.Blank = reason(sys, e.LoadsErr)
	} else {
		p.Y.Max = max(least, beyond*best.Sustained)
		m := measure{sys.Unit(units.Coefficient), 2}
		a, b := m.series("limit of lift", x, lift, "neutral"), m.series("sustained at full thrust", x, held, "available")
		a.LabelAt, b.LabelAt, b.Label = 0.3, 0.45, "sustained"
		p.Series = []Series{a, b}
		p.Bands = []Band{{X: x, Lower: ground, Upper: sustained, Class: "hand"}, {X: x, Lower: sustained, Upper: lift, Class: "short", Label: "loses height or speed"}}
		for _, bank := range bankLines {
			p.Lines = append(p.Lines, HLine{1 / math.Cos(bank*math.Pi/180), fmt.Sprintf("%.0f° bank", bank)})
		}
		if t.Given {
			p.Lines = append(p.Lines, HLine{t.Design.Positive, "structural limit " + readNumber(t.Design.Positive, 2)})
		}
		if best.Sustained > 1 {
			p.Flags = []Flag{{X: speed.of(best.TAS), Y: best.Sustained, Label: fmt.Sprintf("%.2f at %s", best.Sustained, speed.label(best.TAS)), Class: "available"}}
		}
	}
	c.Panels = []Panel{p}
	c.Title, c.Desc = loadWords(s, e, best, sys)
	return c
}

func loadWords(s *study.Study, e *study.Envelope, best study.LoadAt, sys units.System) (title, desc string) {
	head := "Load factor in a level turn against speed, " + conditionWords(s, sys)
	switch {
	case e.LoadsErr != nil:
		why := reason(sys, e.LoadsErr)
		return head + ": " + why + ".", "There is no turn to draw: " + why + "."
	case best.Sustained < 1:
		return head + ": no level flight.", "Full thrust sustains no level flight here, with or without bank; the limit of lift alone is drawn."
	}
	held := fmt.Sprintf("%.2f", best.Sustained)
	ends := "lift"
	if best.Thrust {
		ends = "thrust"
	}
	return fmt.Sprintf("%s: at most %s is sustained.", head, held),
		fmt.Sprintf("At full thrust the greatest sustained load factor is %s, a bank of %.0f°, at %s, where %s ends it. Above it and below the limit of lift a turn is possible for a while, losing height or speed.",
			held, math.Acos(1/best.Sustained)*180/math.Pi, sys.Format(units.Speed, best.TAS), ends)
}
