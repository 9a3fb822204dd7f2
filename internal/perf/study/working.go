package study

import (
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/units"
)

// Working derives the numbers of the view, and of the tightest point of the
// mission, step by step from the inputs, as an engineer would on paper.
func (s *Study) Working() (*formula.Working, error) {
	w := &formula.Working{}
	a, v := s.Aircraft(), s.View
	w.Heading("Air")
	air, err := atmos.Day{Deviation: v.Deviation, Humidity: s.Project.Plan.Day.Humidity}.At(v.Altitude, w)
	if err != nil {
		return w, err
	}
	p := &pointperf.Point{Air: air, Mass: v.Mass, Config: v.Config}
	w.Heading("Stall")
	pointperf.Stall(a, p, w)
	if b := s.Speeds.BestRate; b.Err == nil {
		w.Heading("Best rate of climb")
		w.Note("The speed %s is the one that makes the rate of climb greatest; it is found by a bracketed search.", units.Metric.Format(units.Speed, b.TAS))
		if _, err := pointperf.FullClimb(a, p, b.TAS, w); err != nil {
			return w, err
		}
	}
	if b := s.Speeds.LevelMax; b.Err == nil {
		w.Heading("Level maximum")
		w.Note("The speed %s is the fastest at which thrust available is not below thrust required; it is found by a bracketed root.", units.Metric.Format(units.Speed, b.TAS))
		if _, err := pointperf.At(a, p, b.TAS*(1-1e-9), w); err != nil {
			return w, err
		}
	}
	return w, s.tightestWorking(w)
}

// tightestWorking derives the thrust in hand at the tightest point of the mission.
func (s *Study) tightestWorking(w *formula.Working) error {
	t := s.Flight.Tightest
	if t == nil {
		return nil
	}
	w.Heading("Tightest point of the mission, in “" + s.legName(t.Leg) + "”")
	air, err := s.airOf(t)
	if err != nil {
		return err
	}
	w.Note("Pressure altitude %s, mass %s, true airspeed %s.", units.Metric.Format(units.Altitude, t.Altitude), units.Metric.Format(units.Mass, t.Mass), units.Metric.Format(units.Speed, t.TAS))
	_, err = pointperf.At(s.Aircraft(), &pointperf.Point{Air: air, Mass: t.Mass}, t.TAS, w)
	return err
}
