package report

import (
	"fmt"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// flows are the columns of what is drawn in level flight: fuel, electricity, or both.
func (r *Report) flows() []Column {
	var list []Column
	stores := r.Study.Aircraft().Stores()
	if stores.Charge == 0 || stores.Fuel > 0 {
		list = append(list, num("Fuel flow", units.FuelFlow), num("Specific range", units.SpecificRange))
	}
	if stores.Charge > 0 {
		list = append(list, num("Electrical power", units.Power))
	}
	return list
}

func (r *Report) flowCells(l *levelOut) []Cell {
	var list []Cell
	for _, c := range r.flows() {
		switch {
		case c.Quantity == units.FuelFlow:
			list = append(list, value(l.flow))
		case c.Quantity == units.Power:
			list = append(list, value(l.bus))
		case l.flow > 0:
			list = append(list, value(l.tas/l.flow))
		default:
			list = append(list, Cell{word: "none", why: "No fuel is burnt there."})
		}
	}
	return list
}

type levelOut struct{ tas, flow, bus float64 }

// shareWords names a power setting.
func shareWords(share float64) string {
	if share >= study.Full {
		return "full"
	}
	return percent(share)
}

// grid of the cruise: each cell is computed once for the two tables that share it.
func (r *Report) cruises() (study.Handbook, []study.HandbookCruise) {
	h := r.Study.Handbook()
	n := len(h.Shares)
	cells := make([]study.HandbookCruise, len(h.Cruise)*n)
	spread(len(cells), func(i int) { cells[i] = r.Study.HandbookCruise(h.CruiseMass, h.Cruise[i/n], h.Shares[i%n]) })
	return h, cells
}

// cruise is level flight by height and power.
func (r *Report) cruise() Table {
	h, cells := r.cruises()
	t := Table{Note: fmt.Sprintf("Level at %s, half way between start and landing of the mission; clean, %s. The power is a share of the rating.", r.sys().Format(units.Mass, h.CruiseMass), r.dayWords()),
		Columns: []Column{num("Pressure altitude", units.Altitude), words("Power"), num("TAS", units.Speed), num("CAS", units.Speed), num("Lever", units.Fraction), num("Engine speed", units.Rotation)}, Group: []int{0}, Tested: true}
	t.Columns = append(t.Columns, r.flows()...)
	for i := range cells {
		c := &cells[i]
		row := []Cell{value(h.Cruise[i/len(h.Shares)]), say(shareWords(h.Shares[i%len(h.Shares)]))}
		if c.Err != nil {
			row = append(row, r.none("none", c.Err))
			for len(row) < len(t.Columns) {
				row = append(row, Cell{word: "–"})
			}
			t.Rows = append(t.Rows, row)
			continue
		}
		l := &c.Level
		row = append(row, value(l.TAS), value(float64(c.Air.CAS(l.TAS))), value(l.Setting), dash())
		if n := l.Output.Shaft.EngineSpeed; n > 0 {
			row[5] = value(n)
		}
		t.Rows = append(t.Rows, append(row, r.flowCells(&levelOut{l.TAS, l.Output.FuelFlow, l.Output.BusPower})...))
	}
	return t
}

// ranges are range and endurance by height and power.
func (r *Report) ranges() Table {
	h, cells := r.cruises()
	s, sys := r.Study, r.sys()
	kept := "no reserve is kept back, as the mission has none"
	if t := s.ReserveTime(); t > 0 {
		kept = sys.Format(units.Duration, t) + " at the same power is kept back as reserve"
	}
	endurance := "Endurance"
	if r.unmanned() {
		endurance = "Time on station"
	}
	t := Table{Note: fmt.Sprintf("Level flight in calm air, %s, from the start mass %s; %s. Start, taxi, take-off, climb and descent are not in it.", r.dayWords(), sys.Format(units.Mass, s.Masses.Start), kept),
		Columns: []Column{num("Pressure altitude", units.Altitude), words("Power"), num("Range", units.Distance), num(endurance, units.Duration)},
		Across:  &Across{Down: 0, Over: 1, Values: []int{2, 3}, Says: r.says(units.Distance, "range", units.Duration, lowerFirst(endurance))}, Tested: true}
	for i := range cells {
		c := &cells[i]
		row := []Cell{value(h.Cruise[i/len(h.Shares)]), say(shareWords(h.Shares[i%len(h.Shares)]))}
		if c.RangeErr != nil {
			t.Rows = append(t.Rows, append(row, r.none("none", c.RangeErr), Cell{word: "none"}))
			continue
		}
		t.Rows = append(t.Rows, append(row, value(c.Distance), value(c.Time)))
	}
	return t
}

// economy is the level flight of best range and of best endurance by mass and height.
func (r *Report) economy() Table {
	s, h, sys := r.Study, r.Study.Handbook(), r.sys()
	t := Table{Note: fmt.Sprintf("Clean, level, %s. A speed close to the stall leaves little margin: 1.2 times it is the least that is usually flown (14 CFR 23.51, 2003, from memory).", r.dayWords()),
		Columns: []Column{num("Mass", units.Mass), num("Pressure altitude", units.Altitude), words("For"), num("CAS", units.Speed), num("TAS", units.Speed), pure("Over stall", 2)}, Group: []int{0, 1}, Tested: true}
	t.Columns = append(t.Columns, r.flows()...)
	against := "range against " + sys.Format(units.Speed, h.HeadWind) + " of head wind"
	list := []float64{h.Cruise[0], h.Cruise[len(h.Cruise)/2]}
	if list[0] == list[1] {
		list = list[:1]
	}
	na := len(list)
	cells := make([][][]Cell, len(h.Masses)*na)
	spread(len(cells), func(i int) {
		m, hp := &h.Masses[i/na], list[i%na]
		e := s.HandbookEconomy(m.Mass, hp, h.HeadWind)
		add := func(what string, tas float64, flow, bus float64, err error) {
			row := []Cell{value(m.Mass), value(hp), say(what)}
			if err != nil {
				row = append(row, r.none("none", err))
				for len(row) < len(t.Columns) {
					row = append(row, Cell{word: "–"})
				}
			} else {
				row = append(row, value(float64(e.Air.CAS(tas))), value(tas), value(tas/e.Stall))
				row = append(row, r.flowCells(&levelOut{tas, flow, bus})...)
			}
			cells[i] = append(cells[i], row)
		}
		add("range", e.Range.TAS, e.Range.Output.FuelFlow, e.Range.Output.BusPower, e.RangeErr)
		if e.AgainstWindOK {
			w := &e.AgainstWind
			add(against, w.TAS, w.Output.FuelFlow, w.Output.BusPower, nil)
		}
		add("endurance", e.Endurance.TAS, e.Endurance.Output.FuelFlow, e.Endurance.Output.BusPower, e.EnduranceErr)
	})
	for _, rows := range cells {
		t.Rows = append(t.Rows, rows...)
	}
	return t
}

// stall is the stall by configuration, mass and bank.
func (r *Report) stall() Table {
	s, h := r.Study, r.Study.Handbook()
	t := Table{Note: "CAS, powerplant at idle, in a level turn at the bank; the centre of gravity is taken in the middle of its range. Airspeed errors of the installation are taken as zero.",
		Columns: []Column{words("Configuration"), words("Load"), num("Mass", units.Mass), num("Bank", units.Angle), num("Stall, CAS", units.Speed)},
		Group:   []int{0}, Across: &Across{Down: 2, Over: 3, Values: []int{4}}, Tested: true}
	for _, c := range []aircraft.Config{aircraft.Clean, aircraft.TakeOff, aircraft.Landing} {
		name := c.String()
		if c != aircraft.Clean {
			name = "as at " + name
		}
		for i := range h.Masses {
			m := &h.Masses[i]
			for _, bank := range h.Banks {
				t.Rows = append(t.Rows, []Cell{say(sentenceHead(name)), say(m.Label), value(m.Mass), value(bank), value(s.HandbookStall(c, m.Mass, bank))})
			}
		}
	}
	return t
}

func sentenceHead(s string) string {
	whole := sentence(s)
	return whole[:len(whole)-1]
}

// glide is the glide at idle by mass.
func (r *Report) glide() Table {
	s, h, sys := r.Study, r.Study.Handbook(), r.sys()
	t := Table{Columns: []Column{words("Load"), num("Mass", units.Mass), pure("Best ratio", 1), num("at CAS", units.Speed), num("Least sink", units.ClimbRate), num("at CAS", units.Speed), pure("Ratio against wind", 1), num("at CAS", units.Speed)}, Tested: true}
	propeller := "The propeller is taken to give neither thrust nor drag; a windmilling or stopped one glides steeper."
	for i := range h.Masses {
		m := &h.Masses[i]
		g := s.HandbookGlide(m.Mass, h.HeadWind)
		if g.Glide.Windmills {
			propeller = "The propeller windmills, with the drag that its table gives; a stopped one glides differently."
		}
		row := []Cell{say(m.Label), value(m.Mass)}
		if g.Err != nil {
			row = append(row, r.none("none", g.Err), dash(), dash(), dash())
		} else {
			row = append(row, value(g.Glide.Ratio), value(g.RatioCAS), value(g.Glide.Sink), value(g.SinkCAS))
		}
		if g.WindErr != nil {
			row = append(row, r.none("none", g.WindErr), dash())
		} else {
			row = append(row, value(g.Against.Ratio), value(g.WindCAS))
		}
		t.Rows = append(t.Rows, row)
	}
	t.Note = fmt.Sprintf("Clean, at %s on the project's day; over the ground against %s of head wind. %s", sys.Format(units.Altitude, s.Project.Departure.Air.PressureAltitude), sys.Format(units.Speed, h.HeadWind), propeller)
	return t
}
