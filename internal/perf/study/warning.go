package study

import (
	"math"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/atmos"
	"legwright/internal/perf/formula"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/runway"
	"legwright/internal/perf/units"
)

// A Level is how grave a warning is.
type Level string

// The levels.
const (
	Info    Level = "info"
	Caution Level = "caution"
	Stop    Level = "stop"
)

// A Warning is something that the reader must know beside a figure.
type Warning struct {
	Code  string // stable
	Level Level
	About string // what it concerns: airframe, weights, strip, mission, powerplant, limits, inputs
	Text  units.Message
	Clear string // how to clear it
}

// Thresholds of the warnings.
const (
	tipMachCaution  = 0.82  // common practice, no source: efficiency falls beyond
	tipMachStop     = 0.90  // the propeller models hold no compressibility
	leastGradient   = 0.083 // 14 CFR 23.65, 2003 text: 8.3 % for landplanes
	leastStallRatio = 1.2   // 14 CFR 23.51, 2003 text, over the stall at 50 ft
	staticShare     = 0.75  // of rated power at rest, common practice, no source
)

func (s *Study) add(code string, level Level, about, clear string, text units.Message) {
	s.Warnings = append(s.Warnings, Warning{code, level, about, text, clear})
}

// warn gathers every warning, the gravest first within each subject.
func (s *Study) warn(a *aircraft.Aircraft) {
	s.warnWeights()
	s.warnStrip("take-off", s.TakeOff)
	s.warnStrip("landing", s.Landing)
	s.warnMission(a)
	s.warnPlant()
	s.warnDrag()
	s.warnStructure()
	if n := len(s.Placeholders()); n > 0 {
		s.add("placeholders", Caution, "inputs", "Give each its measured, maker's, calculated or estimated value and basis.",
			units.Say("{} inputs are still placeholders", units.Of(units.Coefficient, float64(n))))
	}
	if s.Project.Spec.Day.Humidity == 0 {
		s.add("dry-air", Info, "inputs", "Give the day's relative humidity.", units.Say("the air is taken as dry; on a humid day engine power is a few per cent lower"))
	}
}

// warnDrag names a build-up that leaves out what small aircraft have most of: gear,
// turrets and the like were near half of the parasite drag of ten unmanned
// aircraft (CEAS Aeronautical Journal, 2021, doi 10.1007/s13272-021-00522-w; known here from an excerpt).
func (s *Study) warnDrag() {
	if s.Variant().Aircraft.Airframe.SkinOnly() {
		s.add("skin-only", Caution, "airframe", "Add gear, struts, cooling, aerials, gaps and the like by their drag areas, or a share for leakage and protuberances.",
			units.Say("the drag build-up counts clean skin alone; what sticks out and leaks made near half of the parasite drag of ten small unmanned aircraft (doi 10.1007/s13272-021-00522-w)"))
	}
}

func (s *Study) warnStrip(what string, strip Strip) {
	run, length := strip.Run, strip.Place.Strip.Length
	switch {
	case strip.Err != nil:
		s.add(what+"-impossible", Stop, "strip", "Do not plan it: more power, less mass, a longer or harder strip.",
			units.Say("no {}: {}", units.Text(what), units.Nest(units.Explain(strip.Err))))
		return
	case run.Total > length:
		s.add(what+"-too-long", Stop, "strip", "Do not plan it: less mass, more power, a longer strip.",
			units.Say("{} needs {} and the strip has {}, before any safety factor", units.Text(what), units.Of(units.FieldLength, run.Total), units.Of(units.FieldLength, length)))
	case run.Factored > length:
		s.add(what+"-no-margin", Stop, "strip", "Do not plan it: less mass, more power, a longer strip.",
			units.Say("{} with its safety factor needs {} and the strip has {}", units.Text(what), units.Of(units.FieldLength, run.Factored), units.Of(units.FieldLength, length)))
	}
	if s.Project.Spec.Technique.TakeOffFactor < 1.5 && (strip.Place.Surface.Name == "dry-grass" || strip.Place.Surface.Name == "wet-grass" || strip.Place.Surface.Name == "soft-ground") && what == "take-off" {
		s.add("soft-surface", Info, "strip", "Walk the strip, and take a larger safety factor where the grass is long, wet or soft.",
			units.Say("grass enters through its friction alone, here {}; UK CAA SafetySense Leaflet 7c (2013) adds 20 % for dry grass up to 20 cm and 30 % for wet, which is more", units.Of(units.Coefficient, strip.Place.Surface.Rolling)))
	}
	if what == "take-off" {
		if g := s.Figure("climb_gradient"); g.Has() && g.Value < leastGradient {
			s.add("weak-climb-out", Stop, "strip", "Less mass or more power.",
				units.Say("after take-off it climbs at a gradient of {}, below the {} of 14 CFR 23.65 (2003): ground effect can mask how weak that is",
					units.Of(units.Fraction, g.Value), units.Of(units.Fraction, leastGradient)))
		}
	}
}

func (s *Study) warnMission(a *aircraft.Aircraft) {
	f := &s.Flight
	if f.Failure != nil {
		s.add("mission-ends", Stop, "mission", "Lower the demand of the leg, or give the aircraft more power or fuel.",
			units.Say("the mission ends in “{}”: {}", units.Text(f.Failure.Name), units.Nest(f.Failure.Reason)))
	}
	if r := f.Reserve; f.Failure == nil {
		switch {
		case !r.Asked:
			s.add("no-reserve", Stop, "mission", addReserve, units.Say("the mission keeps no reserve"))
		case !r.Has(mission.Reserve):
			s.add("no-reserve", Stop, "mission", addReserve, units.Say("the mission has no reserve leg: an alternate and a contingency are no reserve of time"))
		}
		switch {
		case r.Met || !r.Asked:
		case r.Flown < r.Wanted:
			s.add("reserve-short", Stop, "mission", "More fuel, or a shorter mission.",
				units.Say("the reserve is not met: {} of {} flown; {}", units.Of(units.Duration, r.Flown), units.Of(units.Duration, r.Wanted), units.Nest(r.Reason)))
		default:
			s.add("reserve-short", Stop, "mission", "More fuel, or a shorter mission.", units.Say("the reserve is not met: {}", units.Nest(r.Reason)))
		}
	}
	for i := range f.Legs {
		s.warnLeg(&f.Legs[i], i)
		for _, n := range f.Legs[i].Notes {
			s.add("leg-note", Info, "mission", "Change the leg if that is not meant.", units.Say("{}: {}", units.Text(s.legName(i)), units.Nest(n)))
		}
	}
	s.warnStall(a)
}

const addReserve = "Add a reserve leg: rules ask for 30 minutes by day, 45 by night (14 CFR 91.151)."

// warnLeg warns of what a leg asks of the structure.
func (s *Study) warnLeg(l *mission.LegResult, i int) {
	if l.Leg.Kind == mission.PickUp && l.End.Mass > s.Masses.MaxTakeOff {
		s.add("overweight", Stop, "mission", "Pick up less, or later, or show that the structure bears more.",
			units.Say("after {} it is {}, {} above the designer's greatest take-off mass; structural margin is not checked here",
				units.Text("“"+s.legName(i)+"”"), units.Of(units.Mass, l.End.Mass), units.Of(units.Mass, l.End.Mass-s.Masses.MaxTakeOff)))
	}
	n := l.Leg.LoadFactor()
	if n <= 1 {
		return
	}
	leg := units.Text("“" + s.legName(i) + "”")
	switch d, given := s.Aircraft().Structure(nil); {
	case !given:
		s.add("turn-load", Caution, "mission", "Enter the structural limits, and leave room for gusts on top.",
			units.Say("{} is flown at a load factor of {}, and no structural limits are entered to hold it against", leg, hundredth(n)))
	case n > d.Positive*(1+1e-9):
		s.add("turn-load", Stop, "mission", "Less bank.",
			units.Say("{} is flown at a load factor of {}, beyond the limit of {} that was given", leg, hundredth(n), hundredth(d.Positive)))
	}
}

// warnStall names each leg flown closer to the stall than the published margin.
func (s *Study) warnStall(a *aircraft.Aircraft) {
	seen := -1
	for i := range s.Flight.Trace {
		t := &s.Flight.Trace[i]
		leg := &s.Project.Spec.Legs[t.Leg]
		if t.Leg == seen || !leg.Airborne() {
			continue
		}
		air, err := s.airOf(t, nil)
		if err != nil {
			continue
		}
		stall := pointperf.Stall(a, &pointperf.Point{Air: air, Mass: t.Mass}, nil) * math.Sqrt(leg.LoadFactor())
		if t.TAS < leastStallRatio*stall {
			seen = t.Leg
			s.add("stall-margin", Caution, "mission", "Give the leg a speed of its own.",
				units.Say("{} is flown at {}, {} times the stall; below 1.2 the margin is thin", units.Text(s.legName(t.Leg)), units.Of(units.Speed, t.TAS), units.Of(units.Coefficient, roundTo(t.TAS/stall, 100))))
		}
	}
}

func roundTo(v, per float64) float64 { return float64(int64(v*per+0.5)) / per }

// airOf is the air around a sample of the mission.
func (s *Study) airOf(t *mission.Sample, w *formula.Working) (atmos.Air, error) {
	day := s.Project.Plan.Day
	if l := s.Project.Spec.Legs[t.Leg]; l.DayGiven == mission.OwnDay {
		day.Deviation = l.Deviation
	}
	return day.At(t.Altitude, w)
}

func (s *Study) warnPlant() {
	if m := s.Figure("tip_mach"); m.Has() {
		switch {
		case m.Value >= tipMachStop:
			s.add("tip-mach", Stop, "powerplant", "A smaller diameter or a lower speed of rotation.",
				units.Say("the propeller tips reach Mach {}: the thrust shown leaves compressibility out and is not to be relied on", units.Of(units.Coefficient, roundTo(m.Value, 1000))))
		case m.Value >= tipMachCaution:
			s.add("tip-mach", Caution, "powerplant", "A smaller diameter or a lower speed of rotation.",
				units.Say("the propeller tips reach Mach {}: efficiency falls and noise rises above 0.82", units.Of(units.Coefficient, roundTo(m.Value, 1000))))
		}
	}
	if s.staticErr != nil {
		s.add("static", Caution, "powerplant", "Add rows to the propeller table.", units.Say("no static thrust: {}", units.Nest(units.Explain(s.staticErr))))
		return
	}
	lapse := s.TakeOff.Place.Air.Density / atmos.SeaLevelDensity
	if s.Static.Fraction > 0 && s.Static.Fraction < staticShare*lapse {
		s.add("static-power", Caution, "powerplant", "Less propeller pitch or diameter.",
			units.Say("at rest the engine makes only {} of its rated power: the propeller holds it down", units.Of(units.Fraction, s.Static.Fraction)))
	}
	if s.Static.Limits&powerplant.Extrapolated != 0 {
		s.add("power-curve", Caution, "powerplant", "Add a row to the power table.", units.Say("at rest the engine turns slower than the first row of its power table; torque is taken as constant below"))
	}
	if s.TakeOff.Err == nil && s.TakeOff.Place.Strip.Obstacle < runway.Screen-0.5 {
		s.add("low-screen", Info, "strip", "Give the height of what stands at the end.", units.Say("the distance is to {}; published distances go to {}", units.Of(units.Height, s.TakeOff.Place.Strip.Obstacle), units.Of(units.Height, runway.Screen)))
	}
}
