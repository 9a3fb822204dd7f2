package report

import (
	"fmt"
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// weights are the masses from empty to landing.
func (r *Report) weights() Table {
	t := Table{Columns: []Column{words("Mass"), num("Mass", units.Mass), words("Remark")}}
	m := r.Study.Masses
	add := func(label string, mass float64, remark string) {
		t.Rows = append(t.Rows, []Cell{say(label), value(mass), say(remark)})
	}
	add("Empty, with powerplant", m.Empty, "")
	if m.Growth > 0 {
		add("Allowance for growth", m.Growth, "what building adds")
	}
	for i, item := range r.Study.Variant().Aircraft.Weights.Items {
		name := item.Name
		if name == "" {
			name = fmt.Sprintf("Item %d", i+1)
		}
		add(name, item.Mass, "")
	}
	add("Payload", m.Payload, "sum of the items")
	if stores := r.Study.Aircraft().Stores(); m.Fuel > 0 {
		add("Fuel aboard", m.Fuel, r.sys().Format(units.Mass, stores.Trapped)+" of it unusable")
	}
	add("Without usable fuel", m.ZeroFuel, "")
	if limit := m.MaxZeroFuel; limit < math.MaxFloat64 {
		add("Greatest without usable fuel", limit, "the designer's")
	}
	add("Start of the mission", m.Start, "")
	add("Greatest take-off mass", m.MaxTakeOff, "the designer's; structural margin is not checked here")
	add("In hand to that", m.MaxTakeOff-m.Start, "")
	add("Landing of the mission", m.Landing, "")
	return t
}

// airWords says the condition of the view.
func (r *Report) airWords() string {
	sys, v := r.sys(), r.Study.View
	return fmt.Sprintf("Pressure altitude %s, ISA %s, humidity %s, %s, %s, full power", sys.Format(units.Altitude, v.Altitude), signed(sys, v.Deviation),
		percent(r.Study.Project.Plan.Day.Humidity), sys.Format(units.Mass, v.Mass), v.Config)
}

// dayWords says the project's day.
func (r *Report) dayWords() string {
	d := r.Study.Project.Plan.Day
	return fmt.Sprintf("ISA %s, humidity %s", signed(r.sys(), d.Deviation), percent(d.Humidity))
}

// signed writes a difference of temperature with its sign.
func signed(sys units.System, kelvin float64) string {
	text := sys.Format(units.TemperatureStep, kelvin)
	if kelvin > 0 {
		return "+" + text
	}
	return text
}

// noted are the speeds of note in the order of the bench, each with the quantity of what is best there.
func noted(s *pointperf.Speeds) []struct {
	name string
	best *pointperf.Best
	q    units.Quantity
} {
	return []struct {
		name string
		best *pointperf.Best
		q    units.Quantity
	}{{"Stall", &s.Stall, units.Coefficient}, {"Best angle of climb", &s.BestAngle, units.Angle}, {"Best rate of climb", &s.BestRate, units.ClimbRate},
		{"Least power required", &s.LeastPower, units.Power}, {"Least thrust required", &s.LeastThrust, units.Force}, {"Carson", &s.Carson, units.Force},
		{"Slowest level flight", &s.LevelMin, units.Force}, {"Fastest level flight", &s.LevelMax, units.Force}}
}

// speeds are the speeds of note on the departure strip.
func (r *Report) speeds() Table {
	t := Table{Note: r.airWords() + ". Airspeed errors of the installation are taken as zero.",
		Columns: []Column{words("Speed"), num("TAS", units.Speed), num("CAS", units.Speed), anyOf("Best there"), unitOf("Unit"), words("Remark")}, Tested: true}
	for _, n := range noted(&r.Study.Speeds) {
		row := []Cell{say(n.name), {}, {}, dash(), {}, say(n.best.Bound)}
		if n.best.Err != nil {
			row[1] = r.none("none", n.best.Err)
			row[2] = Cell{word: "none"}
		} else {
			row[1], row[2] = value(n.best.TAS), value(float64(r.Study.Point.Air.CAS(n.best.TAS)))
			if n.q != units.Coefficient {
				row[3], row[4] = of(n.q, n.best.Value), of(n.q, 0)
			}
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// speedsByMass are the calibrated airspeeds that a handbook suggests.
func (r *Report) speedsByMass() Table {
	s, how := r.Study, r.Study.Project.Plan.Technique
	t := Table{Note: "CAS at the air of the departure strip, " + r.sys().Format(units.Altitude, s.Project.Departure.Air.PressureAltitude) + " pressure altitude. Never-exceed, manoeuvring and flap speeds are structural: they are entered or tested, and never computed here.",
		Columns: []Column{words("Speed"), num("Mass", units.Mass), num("CAS", units.Speed)}, Across: &Across{Down: 0, Over: 1, Values: []int{2}}, Tested: true}
	air := s.Project.Departure.Air
	for _, m := range s.Handbook().Masses {
		add := func(name string, cas float64, err error) {
			t.Rows = append(t.Rows, []Cell{say(name), value(m.Mass), r.valueOr(cas, err)})
		}
		best := func(name string, b pointperf.Best) { add(name, float64(air.CAS(b.TAS)), b.Err) }
		clean, off, on := s.HandbookStall(aircraft.Clean, m.Mass, 0), s.HandbookStall(aircraft.TakeOff, m.Mass, 0), s.HandbookStall(aircraft.Landing, m.Mass, 0)
		add("Stall, clean", clean, nil)
		add("Stall, take-off", off, nil)
		add("Stall, landing", on, nil)
		scaled := func(cas, by float64) float64 { return float64(air.CAS(by * air.FromCAS(atmos.CAS(cas)))) }
		add(fmt.Sprintf("Lift-off, %s × stall", units.Plain(how.LiftOffFactor)), scaled(off, how.LiftOffFactor), nil)
		add(fmt.Sprintf("Climb-out, %s × stall", units.Plain(how.ClimbOutFactor)), scaled(off, how.ClimbOutFactor), nil)
		add(fmt.Sprintf("Approach, %s × stall", units.Plain(how.ApproachFactor)), scaled(on, how.ApproachFactor), nil)
		speeds := s.HandbookSpeeds(m.Mass)
		best("Best angle of climb", speeds.BestAngle)
		best("Best rate of climb", speeds.BestRate)
		best("Fastest level flight", speeds.LevelMax)
		g := s.HandbookGlide(m.Mass, 0)
		add("Best glide", g.RatioCAS, g.Err)
	}
	return t
}

// thrust is the curve of the chart.
func (r *Report) thrust() Table {
	t := Table{Note: r.airWords() + ".", Columns: []Column{num("TAS", units.Speed), num("CAS", units.Speed), num("Thrust required", units.Force), num("Thrust available", units.Force),
		num("Power required", units.Power), num("Power available", units.Power)}}
	s := r.Study
	for i := range s.Curve {
		b := &s.Curve[i]
		available, power := value(b.Available), value(b.Available*b.TAS)
		if !(b.Available == b.Available) {
			available = Cell{word: "none", why: "The powerplant has no answer at this speed."}
			power = Cell{word: "none"}
		}
		t.Rows = append(t.Rows, []Cell{value(b.TAS), value(float64(s.Point.Air.CAS(b.TAS))), value(b.Required), available, value(b.Required * b.TAS), power})
	}
	if len(t.Rows) == 0 {
		t.Reason = "There is no curve: the air of the view is outside the air model."
	}
	return t
}

// climb is the rate of climb by mass, height and heat.
func (r *Report) climb() Table {
	s, h := r.Study, r.Study.Handbook()
	t := Table{Note: "Best rate at full power, clean, calm air, humidity " + percent(s.Project.Plan.Day.Humidity) + ".",
		Columns: []Column{words("Load"), num("Mass", units.Mass), num("Pressure altitude", units.Altitude), num("ISA deviation", units.TemperatureStep), num("Rate of climb", units.ClimbRate),
			num("CAS", units.Speed), num("Gradient", units.Fraction)},
		Group: []int{1, 0}, Across: &Across{Down: 2, Over: 3, Word: "ISA ", Values: []int{4, 5, 6}, Says: r.says(units.ClimbRate, "rate", units.Speed, "CAS", units.Fraction, "gradient")}, Tested: true}
	na, nd := len(h.Aloft), len(h.Deviations)
	t.Rows = spreadRows(len(h.Masses)*na*nd, func(i int) []Cell {
		m, hp, dev := &h.Masses[i/(na*nd)], h.Aloft[i/nd%na], h.Deviations[i%nd]
		row := []Cell{say(m.Label), value(m.Mass), value(hp), value(dev)}
		c := s.HandbookClimb(m.Mass, hp, dev)
		if c.Err != nil {
			return append(row, r.none("no climb", c.Err), Cell{word: "no climb"}, Cell{word: "no climb"})
		}
		return append(row, value(c.Rate), value(c.CAS), value(c.Gradient))
	})
	return t
}

// says names the values of one cell of a grid with their units: quantity, word, quantity, word …
func (r *Report) says(pairs ...interface{}) string {
	text := ""
	for i := 0; i < len(pairs); i += 2 {
		if i > 0 {
			text += " / "
		}
		text += pairs[i+1].(string)
		if sym := r.sys().Unit(pairs[i].(units.Quantity)).Symbol; sym != "" {
			text += ", " + sym
		}
	}
	return text
}

// toClimb is time, fuel and distance to climb.
func (r *Report) toClimb() Table {
	s, h := r.Study, r.Study.Handbook()
	t := Table{Note: fmt.Sprintf("From the departure strip at best rate and full power, %s, calm air, the mass falling with the fuel. Fuel for start, taxi and take-off is not in it.", r.dayWords()),
		Columns: []Column{words("Load"), num("Mass at the strip", units.Mass), num("Pressure altitude", units.Altitude), num("Rate", units.ClimbRate), num("TAS", units.Speed), num("Time", units.Duration),
			num("Distance", units.Distance), num("Fuel", units.Mass)}, Group: []int{1, 0}, Tested: true}
	electric := s.Aircraft().Stores().Charge > 0
	if electric {
		t.Columns = append(t.Columns, num("Energy", units.Energy))
	}
	for _, m := range h.Masses[max(0, len(h.Masses)-2):] {
		rows, err := s.HandbookToClimb(m.Mass)
		for _, c := range rows {
			row := []Cell{say(m.Label), value(m.Mass), value(c.Altitude), value(c.Rate), value(c.TAS), value(c.Time), value(c.Distance), value(c.Fuel)}
			if electric {
				row = append(row, value(c.Energy))
			}
			t.Rows = append(t.Rows, row)
		}
		if err != nil && t.Reason == "" {
			t.Reason = fmt.Sprintf("%s: %s", r.sys().Format(units.Mass, m.Mass), sentence(units.Explain(err).In(r.sys())))
		}
	}
	return t
}

// ceilings are both ceilings by mass and heat.
func (r *Report) ceilings() Table {
	s, h := r.Study, r.Study.Handbook()
	t := Table{Note: fmt.Sprintf("Clean, full power. At the service ceiling the best rate has fallen to %s, at the absolute ceiling to nothing.", r.sys().Format(units.ClimbRate, pointperf.ServiceRate)),
		Columns: []Column{words("Load"), num("Mass", units.Mass), num("ISA deviation", units.TemperatureStep), num("Service ceiling", units.Altitude), num("Absolute ceiling", units.Altitude)}, Group: []int{1, 0}, Tested: true}
	nd := len(h.Deviations)
	t.Rows = spreadRows(len(h.Masses)*nd, func(i int) []Cell {
		m, dev := &h.Masses[i/nd], h.Deviations[i%nd]
		service, absolute := s.HandbookCeilings(m.Mass, dev)
		return []Cell{say(m.Label), value(m.Mass), value(dev), r.valueOr(service.Value, service.Err), r.valueOr(absolute.Value, absolute.Err)}
	})
	return t
}
