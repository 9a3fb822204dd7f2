package report

import "slices"

// An entry is one table on offer.
type entry struct {
	name, section, title string
	make                 func(*Report) Table
}

// catalogue lists the tables in the order of the report. The names are those of files: a
// bookmark or a script may hold them, so they stay.
var catalogue = []entry{
	{"requirements", "", "Requirements", (*Report).requirements},
	{"sensitivity", "", "What moves the answer", (*Report).sensitivity},
	{"figures", "figures", "Figures", (*Report).figures},
	{"inputs", "inputs", "Inputs of the aircraft", (*Report).inputs},
	{"input-tables", "inputs", "Tables of the aircraft", (*Report).inputTables},
	{"conditions", "inputs", "Day, strips, technique and legs", (*Report).conditions},
	{"weights", "weights", "Weights", (*Report).weights},
	{"speeds", "speeds", "Speeds of note", (*Report).speeds},
	{"speeds-by-mass", "speeds", "Speeds by mass", (*Report).speedsByMass},
	{"thrust", "thrust", "Thrust and power against speed", (*Report).thrust},
	{"climb", "climb", "Rate of climb", (*Report).climb},
	{"time-to-climb", "climb", "Time, fuel and distance to climb", (*Report).toClimb},
	{"ceilings", "climb", "Ceilings", (*Report).ceilings},
	{"take-off", "field", "Take-off by segment", (*Report).takeOff},
	{"landing", "field", "Landing by segment", (*Report).landing},
	{"take-off-distance", "field", "Take-off distance", (*Report).takeOffDistance},
	{"landing-distance", "field", "Landing distance", (*Report).landingDistance},
	{"cruise", "cruise", "Cruise", (*Report).cruise},
	{"range", "cruise", "Range and endurance", (*Report).ranges},
	{"economy", "cruise", "Speeds of best range and endurance", (*Report).economy},
	{"stall", "stall", "Stall", (*Report).stall},
	{"glide", "stall", "Glide at idle", (*Report).glide},
	{"mission", "mission", "Mission leg by leg", (*Report).mission},
	{"mission-powerplant", "mission", "Powerplant at the end of each leg", (*Report).missionPlant},
	{"mission-trace", "mission", "Mission moment by moment", (*Report).trace},
	{"warnings", "warnings", "Warnings in force", (*Report).warnings},
	{"methods", "methods", "Relations used", (*Report).methods},
	{"sources", "methods", "Sources", (*Report).sources},
}

// A Listed is a table that can be asked for.
type Listed struct{ Name, Title, Section string }

// Listing lists every table by its name.
func Listing() []Listed {
	list := make([]Listed, len(catalogue))
	for i, e := range catalogue {
		list[i] = Listed{e.name, e.title, e.section}
	}
	return list
}

// Table computes one table; ok is false for a name that is not listed.
func (r *Report) Table(name string) (t Table, ok bool) {
	i := slices.IndexFunc(catalogue, func(e entry) bool { return e.name == name })
	if i < 0 {
		return Table{}, false
	}
	return r.filled(&catalogue[i]), true
}

// Tables computes every table.
func (r *Report) Tables() []Table {
	list := make([]Table, len(catalogue))
	for i := range catalogue {
		list[i] = r.filled(&catalogue[i])
	}
	return list
}

func (r *Report) filled(e *entry) Table {
	t := e.make(r)
	t.Name, t.Title = e.name, e.title
	return t
}
