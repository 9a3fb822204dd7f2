package views

import (
	"bytes"
	"fmt"
	"strconv"
	"strings"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A Mission is the page of the mission: its legs to edit, and what flying them gives.
type Mission struct {
	Frame
	Editing
	Top
	Cards    []LegCard
	Adds     []Button
	Chart    ChartView
	Shares   ChartView
	Legs     Grid
	Account  []Row
	Parts    Grid
	Caution  string // about the reserve
	Holds    string // the condition that the page holds for
	Warnings []WarningView
}

// A LegCard is one leg as entered, with what flying it gave.
type LegCard struct {
	ID      string
	Title   string
	Result  string
	Tone    string // good, caution or bad; empty where there is nothing to judge
	Fields  []Field
	Buttons []LegButton
}

// A LegButton is an action on one leg.
type LegButton struct {
	Button
	ID   string
	Name string // for those who do not see beside which leg it stands
}

// NewMission makes the page.
func NewMission(s *study.Study, st State) Mission {
	spec := s.Project.Spec
	sys := spec.System()
	frame := NewFrame(s, st.ProjectID, "/mission", st.Query, st.View)
	m := Mission{Frame: frame, Editing: newEditing(s, st), Top: newTop(s, sys, strings.TrimSuffix(frame.URL, "/mission"), st)}
	f := newForm(spec, s.Index, st.Refusals)
	g := f.legs()
	m.form([]Group{g}, st.Refusals)
	for i, b := range g.Blocks {
		m.Cards = append(m.Cards, legCard(s, i, b.Fields, sys))
	}
	for _, o := range mission.KindOptions() {
		m.Adds = append(m.Adds, Button{Action: "add-leg " + o.Value, Label: o.Label, Title: "Add a leg at the end: " + o.Label})
	}
	chart := charts.MissionChart(s, sys)
	chart.Width, chart.Height = 760, 440
	m.Chart = chartView(chart)
	shares := charts.MissionShares(s, sys)
	shares.Width = 760
	m.Shares = sharesView(shares)
	m.Legs = missionGrid(s, sys)
	m.Account, m.Parts = account(s, sys), parts(s, sys)
	m.Caution = "A computed reserve is no substitute for the rules of your authority and for fuel measured in the tank; flow in flight, leaning and unusable fuel differ from the inputs here."
	m.Holds = holdsFor(s, sys)
	m.Warnings = warnings(s.Warnings, sys)
	return m
}

// sharesView draws shares. Writing to a buffer cannot fail.
func sharesView(d charts.Shares) ChartView {
	var wide, narrow bytes.Buffer
	_ = d.SVG(&wide)
	_ = d.Narrow().SVG(&narrow)
	return ChartView{ID: d.ID, Title: d.Title, Sentence: d.Desc, Wide: wide.String(), Narrow: narrow.String(), Table: d.Table()}
}

func legCard(s *study.Study, i int, fields []Field, sys units.System) LegCard {
	legs := s.Project.Spec.Legs
	n, title := strconv.Itoa(i), legs[i].Title()
	c := LegCard{ID: "leg-" + n, Title: fmt.Sprintf("%d · %s", i+1, title), Fields: fields}
	c.Result, c.Tone = legResult(s, i, sys)
	button := func(id, action, label string) {
		c.Buttons = append(c.Buttons, LegButton{Button: Button{Action: action + " " + n, Label: label}, ID: c.ID + "-" + id, Name: label + ": leg " + strconv.Itoa(i+1) + ", " + title})
	}
	if i > 0 {
		button("up", "move-leg-up", "Earlier")
	}
	if i+1 < len(legs) {
		button("down", "move-leg-down", "Later")
	}
	button("duplicate", "duplicate-leg", "Duplicate")
	button("insert", "insert-leg", "Add after")
	button("remove", "remove-leg", "Remove")
	return c
}

// legResult words what flying a leg gave.
func legResult(s *study.Study, i int, sys units.System) (text, tone string) {
	f := &s.Flight
	switch {
	case i >= len(f.Legs):
		return "Not reached.", "caution"
	case f.Failure != nil && f.Failure.Leg == i:
		return "The mission ends here: " + f.Failure.Reason.In(sys) + ".", "bad"
	}
	for k := range f.Reserve.Parts {
		if p := &f.Reserve.Parts[k]; p.Leg == i && !p.Met {
			return "Not met: " + p.Reason.In(sys) + ".", "bad"
		} else if p.Leg == i && p.Kind == mission.Contingency {
			return "Keeps " + energyText(sys, p.Fuel, p.Energy) + ": " + p.Rule.In(sys) + ".", "good"
		}
	}
	l := &f.Legs[i]
	if l.Payload != 0 {
		return fmt.Sprintf("%s, %s after it.", signed(sys, units.Mass, l.Payload), sys.Format(units.Mass, l.End.Mass)), ""
	}
	words := []string{sys.Format(units.Duration, l.Time)}
	if l.Distance != 0 {
		words = append(words, sys.Format(units.Distance, l.Distance))
	}
	words = append(words, energyText(sys, l.Fuel, l.Energy))
	if t := tightestOf(s, i); t != nil {
		words = append(words, "least in hand "+percent(t.Ratio()))
	}
	return strings.Join(words, " · "), ""
}

// energyText words fuel in kg, or electrical energy in J where no fuel is meant.
func energyText(sys units.System, fuel, energy float64) string {
	if fuel == 0 && energy > 0 {
		return sys.Format(units.Energy, energy)
	}
	return sys.Format(units.Mass, fuel)
}

// missionGrid is everything about each leg flown.
func missionGrid(s *study.Study, sys units.System) Grid {
	charge := s.Aircraft().Stores().Fuel == 0 && s.Aircraft().Stores().Charge > 0
	word, q := "Fuel", units.Mass
	if charge {
		word, q = "Energy", units.Energy
	}
	g := Grid{Caption: "The mission leg by leg", Head: []string{"Leg", "Time" + unitOf(sys, units.Duration), "Distance" + unitOf(sys, units.Distance), "Altitude" + unitOf(sys, units.Altitude),
		"TAS" + unitOf(sys, units.Speed), word + unitOf(sys, q), word + " left" + unitOf(sys, q), "Mass at end" + unitOf(sys, units.Mass), "Least in hand", "Where"}}
	for i := range s.Flight.Legs {
		l := &s.Flight.Legs[i]
		took, left := l.Fuel, l.End.Fuel
		if charge {
			took, left = l.Energy, l.End.Charge
		}
		row := []string{fmt.Sprintf("%d · %s", i+1, legName(s, i)), sys.Number(units.Duration, l.Time), sys.Number(units.Distance, l.Distance),
			"", "–", sys.Number(q, took), sys.Number(q, left), sys.Number(units.Mass, l.End.Mass), "–", "–"}
		from := l.Start.Altitude
		if first, last := endsOf(s, i); first != nil {
			from, row[4] = first.Altitude, span(sys, units.Speed, first.TAS, last.TAS)
		}
		row[3] = span(sys, units.Altitude, from, l.End.Altitude)
		if t := tightestOf(s, i); t != nil {
			row[8] = sys.Format(units.Force, t.Available-t.Required) + ", " + percent(t.Ratio())
			row[9] = whenWithin(s, t, sys) + ", " + sys.Format(units.Altitude, t.Altitude)
		}
		g.Rows = append(g.Rows, row)
	}
	if len(g.Rows) == 0 {
		g.Reason = "No leg was flown."
	}
	return g
}

// whenWithin says when in its leg a sample stands, where the leg is named beside it.
func whenWithin(s *study.Study, t *mission.Sample, sys units.System) string {
	text, ends := strings.CutSuffix(whenIn(s, t, sys), " of")
	if ends {
		return text
	}
	return strings.TrimSuffix(text, "to")
}

// span words a value at the start and at the end of a leg; once, where it does not change.
func span(sys units.System, q units.Quantity, from, to float64) string {
	a, b := sys.Number(q, from), sys.Number(q, to)
	if a == b {
		return a
	}
	return a + " → " + b
}

// endsOf are the first and last sample of an airborne leg; nil where it has none.
func endsOf(s *study.Study, leg int) (first, last *mission.Sample) {
	if !s.Project.Spec.Legs[leg].Airborne() {
		return nil, nil
	}
	for i := range s.Flight.Trace {
		if t := &s.Flight.Trace[i]; t.Leg == leg {
			if first == nil {
				first = t
			}
			last = t
		}
	}
	return first, last
}

// account is where the energy goes: the trip, the reserve, what is kept and what is over.
func account(s *study.Study, sys units.System) []Row {
	f := &s.Flight
	start, r := s.Aircraft().Stores(), &f.Reserve
	row := func(label string, fuel, energy float64, remark string) Row {
		return Row{Label: label, Value: energyText(sys, fuel, energy), Remark: remark}
	}
	list := []Row{row("Usable at the start", start.Fuel, start.Charge, ""), row("Trip, with taxi", f.Fuel, f.Energy, sys.Format(units.Duration, f.Time)+", "+sys.Format(units.Distance, f.Distance))}
	if f.Failure != nil {
		list[1].Remark += ", up to where it ends"
		return list
	}
	if !r.Asked {
		return append(list, Row{Label: "Reserve", Value: "none", Remark: "The mission keeps no reserve."})
	}
	asked := "no reserve leg"
	if r.Has(mission.Reserve) {
		asked = sys.Format(units.Duration, r.Flown) + " in reserve legs"
		if r.Wanted > 0 {
			asked = fmt.Sprintf("%s of %s flown in reserve legs", sys.Format(units.Duration, r.Flown), sys.Format(units.Duration, r.Wanted))
		}
	}
	list = append(list, row("Reserve and alternates", r.Fuel, r.Energy, asked))
	if r.Has(mission.Contingency) {
		list = append(list, row("To be kept by contingencies", r.Kept, r.KeptEnergy, ""))
	}
	over := Row{Label: "Left beyond that", Value: energyText(sys, r.Left-r.Kept, r.LeftEnergy-r.KeptEnergy)}
	if !r.Met {
		over = Row{Label: "The reserve is not met", Value: energyText(sys, r.Left, r.LeftEnergy) + " left", Remark: sentence(r.Reason.In(sys))}
	}
	return append(list, over)
}

// parts is the reserve leg by leg.
func parts(s *study.Study, sys units.System) Grid {
	g := Grid{Caption: "The reserve leg by leg", Head: []string{"Part", "Asked", "Takes or keeps", "Met"}}
	for i := range s.Flight.Reserve.Parts {
		p := &s.Flight.Reserve.Parts[i]
		met := "met"
		if !p.Met {
			met = "not met: " + p.Reason.In(sys)
		}
		g.Rows = append(g.Rows, []string{fmt.Sprintf("%d · %s", p.Leg+1, legName(s, p.Leg)), askedOf(&s.Project.Spec.Legs[p.Leg], sys), energyText(sys, p.Fuel, p.Energy), met})
	}
	return g
}

// askedOf words what a leg of the reserve asks for.
func askedOf(l *mission.Leg, sys units.System) string {
	at := " at " + sys.Format(units.Altitude, l.Altitude)
	switch {
	case l.Kind == mission.Contingency:
		return fmt.Sprintf("the greater of %s of the trip and %s of holding%s", percent(l.Share), sys.Format(units.Duration, l.Time), at)
	case l.Kind == mission.Reserve && l.Extent == mission.ByTime:
		return sys.Format(units.Duration, l.Time) + at
	}
	return sys.Format(units.Distance, l.Distance) + at
}

// holdsFor says the condition and the assumptions of the page.
func holdsFor(s *study.Study, sys units.System) string {
	day, place := s.Project.Plan.Day, s.Project.Departure
	own := 0
	for i := range s.Project.Spec.Legs {
		if l := &s.Project.Spec.Legs[i]; l.Airborne() && (l.DayGiven == mission.OwnDay || l.HeadWind != 0) {
			own++
		}
	}
	text := fmt.Sprintf("Holds for ISA %s and %s, from %s at %s, with %s at the start.", signed(sys, units.TemperatureStep, day.Deviation), humidityWords(day.Humidity),
		place.Strip.Name, sys.Format(units.Altitude, place.Air.PressureAltitude), sys.Format(units.Mass, s.Masses.Start))
	switch own {
	case 0:
	case 1:
		text += " One leg has a day or wind of its own."
	default:
		text += " " + plural(own) + " legs have a day or wind of their own."
	}
	return text + " Energy for changes of speed between legs is left out. A reserve begins at its own altitude; an alternate climbs to its altitude at best rate from where the aircraft is, and comes down to it without fuel or time."
}
