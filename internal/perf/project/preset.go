package project

import (
	"slices"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/mission"
)

// A Preset is what a published rule or a practice asks of performance, as requirements
// that a project can take over. The current text of the rule decides, not this table.
type Preset struct {
	Code         string // names the preset in the action that adds it
	Title        string
	Class        string // of aircraft
	Clause       string
	Status       string // how the numbers got here: ReadInExcerpt, FromMemory or NoSource
	Note         string // what the rule asks beyond the requirements, or how it is read here
	Requirements []Requirement
}

// How the numbers of a preset got here.
const (
	ReadInExcerpt = "read in excerpt"
	FromMemory    = "from memory"
	NoSource      = "common practice, no source"
)

// Classes of aircraft of the presets.
const (
	lightClass  = "Light aeroplane"
	vlaClass    = "Very light and light-sport aeroplane"
	gliderClass = "Powered sailplane"
	fuelClass   = "Fuel reserve, any powered aeroplane"
	uavClass    = "Fixed-wing UAV"
)

// presets are grouped by class, in the order shown.
var presets = []Preset{
	{Code: "23-climb-land", Title: "Initial climb, landplane", Class: lightClass, Clause: "14 CFR 23.2120(a)", Status: ReadInExcerpt,
		Note: "For levels 1 and 2, low speed.", Requirements: []Requirement{
			rule("climb_gradient", AtLeast, 0.083, "14 CFR 23.2120(a), landplane", atSeaLevel)}},
	{Code: "23-climb-water", Title: "Initial climb, seaplane or amphibian", Class: lightClass, Clause: "14 CFR 23.2120(a)", Status: ReadInExcerpt,
		Note: "For levels 1 and 2, low speed.", Requirements: []Requirement{
			rule("climb_gradient", AtLeast, 0.067, "14 CFR 23.2120(a), seaplane", atSeaLevel)}},
	{Code: "23-former-climb", Title: "Climb with all engines, the former rule", Class: lightClass, Clause: "14 CFR 23.65 as in force before 2017", Status: FromMemory,
		Note: "Landplane of up to 6 000 lb; its cooling and power conditions are not modelled.", Requirements: []Requirement{
			rule("climb_gradient", AtLeast, 0.083, "former 14 CFR 23.65", atSeaLevel)}},
	{Code: "23-former-balked", Title: "Balked landing, the former rule", Class: lightClass, Clause: "14 CFR 23.77 as in force before 2017", Status: ReadInExcerpt,
		Note: "Landing configuration, full power, at the approach speed of the project's technique.", Requirements: []Requirement{
			rule("balked_gradient", AtLeast, 0.033, "former 14 CFR 23.77", atSeaLevel)}},
	{Code: "23-former-stall", Title: "Stall of a single, the former rule", Class: lightClass, Clause: "14 CFR 23.49 as in force before 2017", Status: FromMemory,
		Note: "61 kt.", Requirements: []Requirement{
			rule("stall_landing", AtMost, 31.38111, "former 14 CFR 23.49", atSeaLevel, calibrated)}},

	{Code: "vla", Title: "Stall, take-off, climb and balked landing", Class: vlaClass, Clause: "CS-VLA 49, 51, 65 and 77", Status: FromMemory,
		Note: "45 kt, 500 m, 2 m/s and 1 in 30. CS-VLA 75 has the landing distance from 15 m measured and sets no limit. The screen here is 50 ft, 0.24 m more than the rule's 15 m.",
		Requirements: []Requirement{
			rule("stall_landing", AtMost, 23.15, "CS-VLA 49", atSeaLevel, calibrated),
			rule("take_off_distance", AtMost, 500, "CS-VLA 51", atSeaLevel, on(LevelHard)),
			rule("climb_rate", AtLeast, 2, "CS-VLA 65", atSeaLevel, flaps(aircraft.TakeOff)),
			rule("balked_gradient", AtLeast, 1.0/30, "CS-VLA 77", atSeaLevel)}},
	{Code: "lsa", Title: "Climb of a light-sport aeroplane", Class: vlaClass, Clause: "ASTM F2245", Status: FromMemory,
		Note: "1.6 m/s (315 ft/min) and 1 in 12; buy the standard for its present text.", Requirements: []Requirement{
			rule("climb_rate", AtLeast, 1.6, "ASTM F2245, rate of climb", atSeaLevel, flaps(aircraft.TakeOff)),
			rule("climb_gradient", AtLeast, 1.0/12, "ASTM F2245, gradient", atSeaLevel)}},
	{Code: "sport-pilot", Title: "Stall limit for sport pilots", Class: vlaClass, Clause: "14 CFR 61.316, in force from 2025", Status: ReadInExcerpt,
		Note: "59 kt calibrated, clean, at greatest mass; the number was read, the section is from memory.", Requirements: []Requirement{
			rule("stall_clean", AtMost, 30.352222, "14 CFR 61.316", atSeaLevel, calibrated)}},

	{Code: "sailplane-hard", Title: "Take-off from a hard surface", Class: gliderClass, Clause: "JAR-22 and CS-22, powered sailplanes", Status: ReadInExcerpt,
		Note: "500 m to 15 m.", Requirements: []Requirement{
			rule("take_off_distance", AtMost, 500, "CS-22 take-off, hard surface", atSeaLevel, on(LevelHard))}},
	{Code: "sailplane-grass", Title: "Take-off from grass", Class: gliderClass, Clause: "JAR-22 and CS-22, powered sailplanes", Status: ReadInExcerpt,
		Note: "600 m to 15 m.", Requirements: []Requirement{
			rule("take_off_distance", AtMost, 600, "CS-22 take-off, grass", atSeaLevel, on(LevelGrass))}},
	{Code: "sailplane-climb", Title: "360 m in four minutes", Class: gliderClass, Clause: "JAR-22 and CS-22, powered sailplanes", Status: ReadInExcerpt,
		Note: "Counted here from the climb at sea level, without the take-off.", Requirements: []Requirement{
			rule("time_to_climb", AtMost, 240, "CS-22 climb", atSeaLevel, func(r *Requirement) { r.ClimbTo = 360 })}},
	{Code: "sailplane-stall", Title: "Stall in the landing configuration", Class: gliderClass, Clause: "CS 22.49", Status: ReadInExcerpt,
		Note: "80 km/h, with airbrakes in and without water ballast; 90 km/h with ballast and 95 km/h with airbrakes out.", Requirements: []Requirement{
			rule("stall_landing", AtMost, 22.222222, "CS 22.49", atSeaLevel, calibrated)}},

	{Code: "vfr-day", Title: "Reserve by day", Class: fuelClass, Clause: "14 CFR 91.151(a)(1)", Status: ReadInExcerpt,
		Note: "30 minutes at normal cruise; the mission's reserve leg says how it is flown.", Requirements: []Requirement{
			rule("reserve_time", AtLeast, 1800, "14 CFR 91.151(a)(1), day")}},
	{Code: "vfr-night", Title: "Reserve by night", Class: fuelClass, Clause: "14 CFR 91.151(a)(2)", Status: ReadInExcerpt,
		Note: "45 minutes at normal cruise; the mission's reserve leg says how it is flown.", Requirements: []Requirement{
			rule("reserve_time", AtLeast, 2700, "14 CFR 91.151(a)(2), night")}},

	{Code: "small-uas-speed", Title: "Ground speed of a small unmanned aircraft", Class: uavClass, Clause: "14 CFR 107.51(a)", Status: ReadInExcerpt,
		Note: "87 kt over the ground, wind included, on the mission as flown.", Requirements: []Requirement{
			rule("ground_speed", AtMost, 44.756667, "14 CFR 107.51(a)")}},
	{Code: "uav-energy", Title: "A fifth of the energy left", Class: uavClass, Clause: NoSource, Status: NoSource,
		Note: "Of the usable fuel or charge, at the end of the mission before any reserve leg.", Requirements: []Requirement{
			rule("energy_left", AtLeast, 0.2, NoSource)}},
}

// rule is a requirement of a preset.
func rule(figure, bound string, limit float64, clause string, under ...func(*Requirement)) Requirement {
	r := Require(figure, bound, limit)
	r.Clause = clause
	for _, set := range under {
		set(&r)
	}
	return r
}

// atSeaLevel is the condition of the airworthiness rules: sea level, standard day, greatest take-off mass.
func atSeaLevel(r *Requirement) {
	r.AltitudeGiven, r.DayGiven, r.MassGiven = AtAltitude, mission.OwnDay, AtGreatest
}

func calibrated(r *Requirement) { r.Airspeed = Calibrated }

func on(strip string) func(*Requirement) { return func(r *Requirement) { r.StripGiven = strip } }

func flaps(c aircraft.Config) func(*Requirement) {
	return func(r *Requirement) { r.Config = c.String() }
}

// Presets lists every preset, class by class.
func Presets() []Preset {
	list := slices.Clone(presets)
	for i := range list {
		list[i].Requirements = slices.Clone(list[i].Requirements)
	}
	return list
}

// LookupPreset finds a preset by its code.
func LookupPreset(code string) (Preset, bool) {
	for _, p := range Presets() {
		if p.Code == code {
			return p, true
		}
	}
	return Preset{}, false
}

// Lacking lists the requirements of the preset that s does not have: one of the same
// figure and clause counts, whatever became of its limit.
func (p *Preset) Lacking(s *Spec) []Requirement {
	var list []Requirement
	for _, r := range p.Requirements {
		has := func(o Requirement) bool { return o.Figure == r.Figure && o.Clause == r.Clause }
		if !slices.ContainsFunc(s.Requirements, has) {
			list = append(list, r)
		}
	}
	return list
}
