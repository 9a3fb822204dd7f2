package report

import (
	"fmt"
	"strings"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// takeOff and landing are those of the mission by segment.
func (r *Report) takeOff() Table {
	return r.segments(r.Study.TakeOff, "take-off", r.Study.Project.Plan.Technique.TakeOffFactor)
}

func (r *Report) landing() Table {
	return r.segments(r.Study.Landing, "landing", r.Study.Project.Plan.Technique.LandingFactor)
}

func (r *Report) segments(s study.Strip, what string, factor float64) Table {
	sys := r.sys()
	place, air := s.Place, s.Place.Air
	t := Table{Columns: []Column{words("Segment"), num("Distance", units.FieldLength), num("Time", units.ShortTime), num("TAS at its end", units.Speed), num("Height at its end", units.Height)}, Tested: true,
		Note: fmt.Sprintf("%s: %s long, %s, slope %s, %s; pressure altitude %s, %s, density altitude %s; %s. The distance is to %s.", place.Strip.Name, sys.Format(units.FieldLength, place.Strip.Length),
			place.Surface.Label, sys.Format(units.Fraction, place.Strip.Slope), windWords(place.HeadWind, sys), sys.Format(units.Altitude, air.PressureAltitude), sys.Format(units.Temperature, air.Temperature),
			sys.Format(units.Altitude, air.DensityAltitude()), sys.Format(units.Mass, s.Mass), sys.Format(units.Height, place.Strip.Obstacle))}
	if s.Err != nil {
		t.Reason = "No " + what + ": " + units.Explain(s.Err).In(sys) + "."
		return t
	}
	run := &s.Run
	for _, seg := range run.Segments {
		t.Rows = append(t.Rows, []Cell{say(strings.ToUpper(seg.Name[:1]) + seg.Name[1:]), value(seg.Distance), value(seg.Time), value(seg.Speed), value(seg.Height)})
	}
	total := func(label string, distance float64) {
		t.Rows = append(t.Rows, []Cell{say(label), value(distance), dash(), dash(), dash()})
	}
	total("On the ground", run.Ground)
	total("Over the obstacle, unfactored", run.Total)
	total("Safety factor × "+units.Plain(factor), run.Factored)
	total("Strip there", place.Strip.Length)
	if run.Factored > place.Strip.Length {
		t.Reason = "Do not plan this " + what + ": with its safety factor it does not fit on the strip."
	}
	return t
}

func windWords(head float64, sys units.System) string {
	switch {
	case head > 0:
		return sys.Format(units.Speed, head) + " head wind"
	case head < 0:
		return sys.Format(units.Speed, -head) + " tail wind"
	}
	return "calm"
}

func (r *Report) takeOffDistance() Table { return r.distances(false) }
func (r *Report) landingDistance() Table { return r.distances(true) }

// distances are the take-off or the landing by mass, height and heat.
func (r *Report) distances(landing bool) Table {
	s, h, sys := r.Study, r.Study.Handbook(), r.sys()
	place, factor := s.HandbookPlace(landing), s.Project.Plan.Technique.TakeOffFactor
	if landing {
		factor = s.Project.Plan.Technique.LandingFactor
	}
	over := "over " + sys.Format(units.Height, place.Strip.Obstacle)
	launched := ""
	if r.unmanned() {
		launched = " A launch by hand, rail or bungee and an arrival on the belly, in a net or under a parachute are not modelled."
	}
	t := Table{Note: fmt.Sprintf("Level strip, %s, calm, humidity %s. Use the factored figure; the others assume a new engine, practised technique and exactly this surface.%s",
		place.Surface.Label, percent(s.Project.Plan.Day.Humidity), launched),
		Columns: []Column{words("Load"), num("Mass", units.Mass), num("Pressure altitude", units.Altitude), num("Temperature", units.Temperature), num("Ground roll", units.FieldLength),
			num("Over the obstacle", units.FieldLength), num("Factored", units.FieldLength), num("Density altitude", units.Altitude)},
		Group: []int{1, 0}, Across: &Across{Down: 2, Over: 3, Values: []int{4, 5, 6},
			Says: fmt.Sprintf("ground roll / %s / factored × %s, %s", over, units.Plain(factor), sys.Unit(units.FieldLength).Symbol)}, Tested: true}
	na, nt := len(h.Ground), len(h.Temperatures)
	t.Rows = spreadRows(len(h.Masses)*na*nt, func(i int) []Cell {
		m, hp, temperature := &h.Masses[i/(na*nt)], h.Ground[i/nt%na], h.Temperatures[i%nt]
		row := []Cell{say(m.Label), value(m.Mass), value(hp), value(temperature)}
		p := s.HandbookRun(landing, m.Mass, hp, temperature)
		if !p.Has() {
			none := Cell{word: p.Word}
			density := Cell{word: "none"}
			if p.Temperature > 0 {
				density = value(p.Density)
			}
			return append(row, r.none(p.Word, p.Err), none, none, density)
		}
		return append(row, value(p.Run.Ground), value(p.Run.Total), value(p.Run.Factored), value(p.Density))
	})
	return t
}
