package report

import (
	"strings"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/units"
)

// drawn are the columns of the energy that a leg takes.
func (r *Report) drawn(fuel, energy string) []Column {
	var list []Column
	stores := r.Study.Aircraft().Stores()
	if stores.Charge == 0 || stores.Fuel > 0 {
		list = append(list, num(fuel, units.Mass))
	}
	if stores.Charge > 0 {
		list = append(list, num(energy, units.Energy))
	}
	return list
}

func (r *Report) drawnCells(fuel, energy float64) []Cell {
	var list []Cell
	for _, c := range r.drawn("", "") {
		if c.Quantity == units.Mass {
			list = append(list, value(fuel))
		} else {
			list = append(list, value(energy))
		}
	}
	return list
}

func (r *Report) leg(i int) string { return r.Study.Project.Spec.Legs[i].Title() }

// mission is the mission leg by leg.
func (r *Report) mission() Table {
	s, f := r.Study, &r.Study.Flight
	t := Table{Note: "From the start mass " + r.sys().Format(units.Mass, s.Masses.Start) + " on the project's day, " + r.dayWords() + ", with the winds of the legs. The sums are without reserve.",
		Columns: []Column{words("Leg"), num("Time", units.Duration), num("Distance", units.Distance), num("Altitude at end", units.Altitude), num("TAS at end", units.Speed), num("Mass at end", units.Mass)}}
	t.Columns = append(t.Columns, r.drawn("Fuel", "Energy")...)
	t.Columns = append(t.Columns, num("Least in hand", units.Fraction))
	for i := range f.Legs {
		l := &f.Legs[i]
		tas, hand := dash(), dash()
		if l.End.TAS > 0 && l.Leg.Kind != mission.Landing {
			tas = value(l.End.TAS)
		}
		if least, ok := r.leastInHand(i); ok {
			hand = value(least)
		}
		row := []Cell{say(r.leg(i)), value(l.Time), value(l.Distance), value(l.End.Altitude), tas, value(l.End.Mass)}
		t.Rows = append(t.Rows, append(append(row, r.drawnCells(l.Fuel, l.Energy)...), hand))
	}
	if len(f.Legs) > 0 {
		row := []Cell{say("Together, without reserve"), value(f.Time), value(f.Distance), dash(), dash(), dash()}
		t.Rows = append(t.Rows, append(append(row, r.drawnCells(f.Fuel, f.Energy)...), dash()))
	}
	switch {
	case f.Failure != nil:
		t.Reason = "The mission ends in “" + f.Failure.Name + "”: " + f.Failure.Reason.In(r.sys()) + ". The later legs are not flown."
	case f.Reserve.Asked && !f.Reserve.Met:
		t.Reason = "The reserve is not met: " + sentence(f.Reserve.Reason.In(r.sys()))
	case !f.Reserve.Asked:
		t.Reason = "The mission keeps no reserve."
	}
	return t
}

// leastInHand is the smallest thrust in hand of an airborne leg over the thrust required.
func (r *Report) leastInHand(leg int) (least float64, found bool) {
	switch r.Study.Project.Spec.Legs[leg].Kind {
	case mission.Taxi, mission.TakeOff, mission.Landing:
		return 0, false
	}
	for i := range r.Study.Flight.Trace {
		t := &r.Study.Flight.Trace[i]
		if t.Leg == leg && t.Required > 0 && (!found || t.Ratio() < least) {
			least, found = t.Ratio(), true
		}
	}
	return least, found
}

// missionPlant is the powerplant at the end of each leg.
func (r *Report) missionPlant() Table {
	t := Table{Columns: []Column{words("Leg"), num("Lever", units.Fraction), num("Share of rating", units.Fraction), num("Thrust", units.Force)}}
	t.Columns = append(t.Columns, r.flows()[0], num("Engine speed", units.Rotation), num("Propeller efficiency", units.Fraction), pure("Tip Mach", 2))
	for i := range r.Study.Flight.Legs {
		l := &r.Study.Flight.Legs[i]
		if l.Leg.Kind == mission.Landing {
			continue
		}
		o := &l.End.Output
		drain := value(o.FuelFlow)
		if t.Columns[4].Quantity == units.Power {
			drain = value(o.BusPower)
		}
		row := []Cell{say(r.leg(i)), value(l.End.Setting), value(o.Fraction), value(o.Thrust), drain, dash(), dash(), dash()}
		if o.Shaft.Speed > 0 {
			row[5], row[7] = value(o.Shaft.EngineSpeed), value(o.Shaft.TipMach)
			if o.Shaft.Efficiency > 0 {
				row[6] = value(o.Shaft.Efficiency)
			}
		}
		t.Rows = append(t.Rows, row)
	}
	if len(t.Rows) == 0 {
		t.Reason = "No leg was flown."
	}
	return t
}

// trace is the mission moment by moment, as it was integrated.
func (r *Report) trace() Table {
	t := Table{Note: "The moments of the integration; distance is over the ground, altitude is pressure altitude.",
		Columns: []Column{words("Leg"), num("Time", units.Duration), num("Distance", units.Distance), num("Altitude", units.Altitude), num("TAS", units.Speed), num("Rate of climb", units.ClimbRate), num("Mass", units.Mass)}}
	t.Columns = append(t.Columns, r.drawn("Usable fuel left", "Usable charge left")...)
	t.Columns = append(t.Columns, num("Thrust available", units.Force), num("Thrust required", units.Force), num("Lever", units.Fraction), num("Engine speed", units.Rotation))
	for i := range r.Study.Flight.Trace {
		m := &r.Study.Flight.Trace[i]
		row := []Cell{say(r.leg(m.Leg)), value(m.Time), value(m.Distance), value(m.Altitude), value(m.TAS), value(m.Rate), value(m.Mass)}
		row = append(row, r.drawnCells(m.Fuel, m.Charge)...)
		t.Rows = append(t.Rows, append(row, value(m.Available), value(m.Required), value(m.Setting), value(m.Output.Shaft.EngineSpeed)))
	}
	if len(t.Rows) == 0 {
		t.Reason = "No leg was flown."
	}
	return t
}

// warnings are all in force.
func (r *Report) warnings() Table {
	t := Table{Columns: []Column{words("Level"), words("About"), words("Warning"), words("How to clear it")}}
	for _, w := range r.Study.Warnings {
		level := map[string]string{"stop": "Stop", "caution": "Caution", "info": "Note"}[string(w.Level)]
		t.Rows = append(t.Rows, []Cell{say(level), say(w.About), say(sentence(w.Text.In(r.sys()))), say(w.Clear)})
	}
	if len(t.Rows) == 0 {
		t.Reason = "None are in force."
	}
	return t
}

// methods lists each relation that the working uses, once.
func (r *Report) methods() Table {
	t := Table{Note: "Relations as the working uses them; the working shows each with its numbers.", Columns: []Column{words("What"), words("Relation"), words("Source"), words("Place")}}
	seen := map[string]bool{}
	for _, step := range r.Study.Working().Steps {
		f := step.Formula
		if f == nil || seen[f.ID] {
			continue
		}
		seen[f.ID] = true
		t.Rows = append(t.Rows, []Cell{say(sentenceHead(f.Out.Meaning)), say(f.Out.Name + " = " + strings.ReplaceAll(f.Expr, "*", " · ")), say(f.Source.Key), say(f.Where)})
	}
	return t
}

// sources lists the works that the relations come from.
func (r *Report) sources() Table {
	t := Table{Note: "Bibliographic facts are from memory where no address was looked up.", Columns: []Column{words("Source"), words("Work")}}
	seen := map[string]bool{}
	for _, step := range r.Study.Working().Steps {
		if f := step.Formula; f != nil && !seen[f.Source.Key] {
			seen[f.Source.Key] = true
			t.Rows = append(t.Rows, []Cell{say(f.Source.Key), say(f.Source.Citation)})
		}
	}
	return t
}
