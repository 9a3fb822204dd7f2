package views

import (
	"fmt"
	"strings"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// segmentTitles words the segments of a take-off or landing.
var segmentTitles = map[string]string{"ground roll": "Ground roll", "rotation": "Rotation", "transition": "Transition arc", "climb": "Climb to the obstacle",
	"approach": "Approach from the obstacle", "flare": "Flare", "free roll": "Free roll", "braked roll": "Braked roll"}

// stripTable words a take-off or landing by segment, unfactored and factored.
func stripTable(title string, s study.Strip, sys units.System, factor float64) StripTable {
	length := s.Place.Strip.Length
	t := StripTable{Title: title, Caution: "Unfactored: new engine, practised technique, stated surface. Use the factored distance, and less strip than you have."}
	if s.Err != nil {
		t.Sentence, t.Tone = "No "+strings.ToLower(title)+": "+units.Explain(s.Err).In(sys)+".", "bad"
		return t
	}
	run := &s.Run
	air := s.Place.Air
	t.Rows = append(t.Rows,
		Row{Label: "Density altitude", Value: sys.Format(units.Altitude, air.DensityAltitude()), Remark: sys.Format(units.Altitude, air.PressureAltitude) + " pressure altitude, " + sys.Format(units.Temperature, air.Temperature)},
		Row{Label: "Stall", Value: sys.Format(units.Speed, run.Stall), Remark: sys.Format(units.Mass, s.Mass)})
	for _, seg := range run.Segments {
		remark := sys.Format(units.ShortTime, seg.Time)
		if seg.Speed > 0 {
			remark += ", " + sys.Format(units.Speed, seg.Speed)
		}
		if seg.Height > 0 {
			remark += ", " + sys.Format(units.Height, seg.Height) + " high"
		}
		t.Rows = append(t.Rows, Row{Label: segmentTitles[seg.Name], Value: sys.Format(units.FieldLength, seg.Distance), Remark: remark})
	}
	over := "Over " + sys.Format(units.Height, s.Place.Strip.Obstacle) + ", unfactored"
	t.Rows = append(t.Rows,
		Row{Label: over, Value: sys.Format(units.FieldLength, run.Total)},
		Row{Label: fmt.Sprintf("Safety factor × %s", units.Plain(factor)), Value: sys.Format(units.FieldLength, run.Factored)},
		Row{Label: "Strip there", Value: sys.Format(units.FieldLength, length), Remark: s.Place.Surface.Label})
	verb := strings.ToLower(title)
	switch {
	case run.Total > length:
		t.Tone, t.Sentence = "bad", fmt.Sprintf("Does not fit: the %s needs %s before any safety factor, and the strip has %s.", verb, sys.Format(units.FieldLength, run.Total), sys.Format(units.FieldLength, length))
	case run.Factored > length:
		t.Tone, t.Sentence = "bad", fmt.Sprintf("Does not fit with its safety factor: %s needed, %s there.", sys.Format(units.FieldLength, run.Factored), sys.Format(units.FieldLength, length))
	default:
		t.Tone, t.Sentence = "good", fmt.Sprintf("Fits with its safety factor: %s needed, %s there.", sys.Format(units.FieldLength, run.Factored), sys.Format(units.FieldLength, length))
	}
	return t
}

// climbGrid is time, fuel and distance to climb, with the mass falling.
func climbGrid(s *study.Study, sys units.System) Grid {
	day := s.Project.Plan.Day
	g := Grid{Caption: "Time, fuel and distance to climb", Note: fmt.Sprintf("At best rate from the strip, %s at the start, ISA %s, calm air.", sys.Format(units.Mass, s.Masses.Start), signed(sys, units.TemperatureStep, day.Deviation)),
		Head: []string{"Altitude" + unitOf(sys, units.Altitude), "Rate" + unitOf(sys, units.ClimbRate), "TAS" + unitOf(sys, units.Speed), "Time" + unitOf(sys, units.Duration),
			"Distance" + unitOf(sys, units.Distance), "Fuel" + unitOf(sys, units.Mass)}}
	for _, r := range s.Climb {
		g.Rows = append(g.Rows, []string{sys.Number(units.Altitude, r.Altitude), sys.Number(units.ClimbRate, r.Rate), sys.Number(units.Speed, r.TAS),
			sys.Number(units.Duration, r.Time), sys.Number(units.Distance, r.Distance), sys.Number(units.Mass, r.Fuel)})
	}
	if err := s.ClimbErr(); err != nil {
		g.Reason = sentence(units.Explain(err).In(sys))
	}
	return g
}

// legGrid is the mission leg by leg.
func legGrid(s *study.Study, sys units.System) Grid {
	g := Grid{Caption: "The mission leg by leg", Head: []string{"Leg", "Time" + unitOf(sys, units.Duration), "Distance" + unitOf(sys, units.Distance), "Altitude at end" + unitOf(sys, units.Altitude),
		"TAS" + unitOf(sys, units.Speed), "Mass at end" + unitOf(sys, units.Mass), "Fuel" + unitOf(sys, units.Mass), "Least in hand, %"}}
	for i := range s.Flight.Legs {
		l := &s.Flight.Legs[i]
		tas := "–"
		if l.End.TAS > 0 && l.Leg.Kind != mission.Landing && l.Time > 0 {
			tas = sys.Number(units.Speed, l.End.TAS)
		}
		g.Rows = append(g.Rows, []string{legName(s, i), sys.Number(units.Duration, l.Time), sys.Number(units.Distance, l.Distance), sys.Number(units.Altitude, l.End.Altitude),
			tas, sys.Number(units.Mass, l.End.Mass), sys.Number(units.Mass, l.Fuel), leastInHand(s, i)})
	}
	return g
}

// plantGrid is the powerplant at the end of every leg.
func plantGrid(s *study.Study, sys units.System) Grid {
	g := Grid{Caption: "The powerplant at the end of each leg", Head: []string{"Leg", "Lever, %", "Share of rating, %", "Fuel flow" + unitOf(sys, units.FuelFlow),
		"Engine speed" + unitOf(sys, units.Rotation), "Propeller efficiency, %", "Tip Mach"}}
	for i := range s.Flight.Legs {
		l := &s.Flight.Legs[i]
		if l.Leg.Kind == mission.Landing || l.Leg.Kind == mission.Drop || l.Leg.Kind == mission.PickUp || l.Leg.Kind == mission.Contingency {
			continue
		}
		o := &l.End.Output
		row := []string{legName(s, i), units.Fixed(100*l.End.Setting, 0), units.Fixed(100*o.Fraction, 0), sys.Number(units.FuelFlow, o.FuelFlow), "–", "–", "–"}
		if o.Shaft.Speed > 0 {
			row[4], row[6] = sys.Number(units.Rotation, o.Shaft.EngineSpeed), units.Fixed(o.Shaft.TipMach, 2)
			if o.Shaft.Efficiency > 0 {
				row[5] = units.Fixed(100*o.Shaft.Efficiency, 0)
			}
		}
		g.Rows = append(g.Rows, row)
	}
	return g
}

// tightestOf is the sample of an airborne leg with the least thrust in hand; nil when it has none.
func tightestOf(s *study.Study, leg int) *mission.Sample {
	if !s.Project.Spec.Legs[leg].Airborne() {
		return nil
	}
	var least *mission.Sample
	for i := range s.Flight.Trace {
		t := &s.Flight.Trace[i]
		if t.Leg == leg && t.Required > 0 && (least == nil || t.Ratio() < least.Ratio()) {
			least = t
		}
	}
	return least
}

// leastInHand is the smallest thrust in hand of an airborne leg in percent.
func leastInHand(s *study.Study, leg int) string {
	if t := tightestOf(s, leg); t != nil {
		return units.Fixed(100*t.Ratio(), 0)
	}
	return "–"
}
