package study

import (
	"legwright/internal/perf/project"
	"legwright/internal/perf/units"
)

// Exceeds reports whether a mass is above a limit, both in kg, by more than what a sum rounds.
func Exceeds(mass, limit float64) bool { return mass > limit*(1+1e-9) }

// warnWeights holds the masses against the designer's limits and against how well the empty mass is known.
func (s *Study) warnWeights() {
	m := s.Masses
	if Exceeds(m.Start, m.MaxTakeOff) {
		s.add("overweight", Stop, "weights", "Take something out, or show that the structure bears more.",
			units.Say("{} at the start is {} above the designer's greatest take-off mass; structural margin is not checked here",
				units.Of(units.Mass, m.Start), units.Of(units.Mass, m.Start-m.MaxTakeOff)))
	}
	if Exceeds(m.ZeroFuel, m.MaxZeroFuel) {
		s.add("over-zero-fuel", Stop, "weights", "Carry less, or show that the structure bears more; more fuel does not help.",
			units.Say("{} without usable fuel is {} above the designer's greatest mass without fuel; structural margin is not checked here",
				units.Of(units.Mass, m.ZeroFuel), units.Of(units.Mass, m.ZeroFuel-m.MaxZeroFuel)))
	}
	if _, limited := s.Aircraft().MaxZeroFuel(); limited && Exceeds(m.MaxZeroFuel, m.MaxTakeOff) {
		s.add("idle-zero-fuel", Caution, "weights", "Check both limits.",
			units.Say("the greatest mass without fuel, {}, is above the greatest take-off mass, {}, so that it limits nothing", units.Of(units.Mass, m.MaxZeroFuel), units.Of(units.Mass, m.MaxTakeOff)))
	}
	if m.Growth == 0 && s.Variant().BasisOf("weights.empty").Kind != project.Measured {
		s.add("no-growth", Info, "weights", "Set a growth allowance, 3 to 5 % commonly, until the aircraft has been weighed.",
			units.Say("the empty mass, {}, has not been weighed and nothing is allowed for growth; aircraft mostly come out heavier than planned", units.Of(units.Mass, m.Empty)))
	}
}
