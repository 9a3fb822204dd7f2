// Package report turns a study into what leaves the program: a report on paper, and
// the tables behind it as files for a spreadsheet. It reads no clock and keeps nothing,
// so that the same revision gives the same bytes.
//
// Places to start: [Sections], [Report.PDF], [Report.Zip], catalogue in catalogue.go.
package report

import (
	"fmt"
	"slices"
	"time"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// A Report is one revision of one variant, ready to be written.
type Report struct {
	Study    *study.Study // at its default view, of a document whose Display is the unit system to write in
	Revision int64
	Saved    time.Time // when the revision was saved
	Paper    Paper
	Sections []string // identifiers of those that are written; nil for all
}

// A Paper is a size of page.
type Paper struct {
	ID, Label string
	size      string // as the writer of PDF names it
}

// Papers lists the sizes on offer, the usual one first.
var Papers = []Paper{{"a4", "A4", "A4"}, {"letter", "US Letter", "Letter"}}

// PaperOf is the paper of that identifier, or the first.
func PaperOf(id string) Paper {
	for _, p := range Papers {
		if p.ID == id {
			return p
		}
	}
	return Papers[0]
}

// A Section is a part of the report that can be left out.
type Section struct {
	ID, Title, Holds string
}

// Sections lists the parts after the first page, in order.
var Sections = []Section{
	{"figures", "Figures", "every number that a requirement can name"},
	{"inputs", "Configuration and inputs", "every input with its basis, ± and note; day, strips, technique and legs"},
	{"weights", "Weights", "empty, payload, fuel, start and landing"},
	{"speeds", "Speeds", "speeds of note, true and calibrated, and by mass"},
	{"thrust", "Thrust and power", "thrust and power against speed"},
	{"climb", "Climb and ceilings", "rate by height, heat and mass; time, fuel and distance; ceilings"},
	{"field", "Take-off and landing", "by segment with the safety factors; by height, heat and mass"},
	{"cruise", "Cruise, range and endurance", "speed and flow by height and power; range, endurance and their best speeds"},
	{"stall", "Stall and glide", "stall by bank and mass; glide in calm air and against wind"},
	{"mission", "Mission", "leg by leg, with its chart"},
	{"warnings", "Warnings in force", "all of them, with how to clear each"},
	{"methods", "Methods and sources", "each relation that was used and where it is published"},
	{"working", "Working", "step by step from the inputs"},
}

// SectionsOf keeps the identifiers of sections, in their order; nil, which stands for all, when none is among them.
func SectionsOf(ids []string) []string {
	var kept []string
	for _, s := range Sections {
		if slices.Contains(ids, s.ID) {
			kept = append(kept, s.ID)
		}
	}
	return kept
}

func (r *Report) has(section string) bool {
	return r.Sections == nil || slices.Contains(r.Sections, section)
}

func (r *Report) sys() units.System { return r.Study.Project.Spec.System() }

// smallest is the take-off mass in kg below which the report takes its form for unmanned
// aircraft: the least that a light aircraft with a person in it weighs (common practice, no source).
const smallest = 150.0

// unmanned reports whether the aircraft is taken for one without a person in it.
func (r *Report) unmanned() bool { return r.Study.Masses.MaxTakeOff < smallest }

// saved writes when the revision was saved, the same wherever it is read.
func (r *Report) saved() string { return r.Saved.UTC().Format("2006-01-02 15:04 UTC") }

// InUnits builds the project again with its numbers shown in the unit system, and studies the variant.
func InUnits(spec *project.Spec, variant int, sys units.System) (*study.Study, error) {
	spec = spec.Clone()
	spec.Display = string(sys)
	p, err := spec.Build()
	if err != nil {
		return nil, err
	}
	return study.Run(p, variant, study.DefaultView(p, variant)), nil
}

// Cautions are the five lines that go with every report and every set of tables.
func (r *Report) Cautions() []string {
	s, sys := r.Study, r.sys()
	hand := "practised technique"
	if r.unmanned() {
		hand = "practised technique or a well-tuned autopilot"
	}
	rough, placeholders := len(s.OnBasis(project.Estimated)), len(s.Placeholders())
	return []string{
		"These are estimates computed from the data entered. They are not approved data and not demonstrated data.",
		"They hold for a new engine and propeller, " + hand + " and the surface stated. Wear, rain, dirt and haste are not in them.",
		fmt.Sprintf("Each table holds for the conditions and the mass written over it, and for no other. The mission starts at %s.", sys.Format(units.Mass, s.Masses.Start)),
		fmt.Sprintf("Of placeholders and estimates there are %d and %d among the aircraft's inputs; the first page says how far those that matter most move the answer.", placeholders, rough),
		"Confirm by flight test, with a margin, before anybody relies on a number here. The makers' limits, the rules of the authority and the judgement of a licensed person come first.",
	}
}

// count writes a number with its noun.
func count(n int, noun string) string {
	switch n {
	case 0:
		return "no " + noun
	case 1:
		return "one " + noun
	}
	return fmt.Sprintf("%d %ss", n, noun)
}
