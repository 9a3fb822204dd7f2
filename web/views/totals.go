package views

import (
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
)

// Totals are what the inputs of a group add up to.
type Totals struct {
	Caption string
	Rows    []TotalRow
}

// A TotalRow is one part, sum or limit.
type TotalRow struct {
	Label, Value string
	Sum          bool   // of the rows above
	Margin       string // to the limit that the row states; empty where it states none
	Tone         string // of the margin: good or bad
}

// weigh puts the mass balance under the weights.
func weigh(groups []Group, s *study.Study, sys units.System) {
	for i := range groups {
		if groups[i].ID == "weights" {
			groups[i].Totals = newTotals(s, sys)
		}
	}
}

func newTotals(s *study.Study, sys units.System) *Totals {
	m := s.Masses
	a := &s.Variant().Aircraft
	t := &Totals{Caption: "What it adds up to"}
	part := func(label string, si float64) {
		t.Rows = append(t.Rows, TotalRow{Label: label, Value: sys.Format(units.Mass, si)})
	}
	sum := func(label string, si float64) {
		t.Rows = append(t.Rows, TotalRow{Label: label, Value: sys.Format(units.Mass, si), Sum: true})
	}
	limit := func(label string, most, si float64) {
		row := TotalRow{Label: label, Value: sys.Format(units.Mass, most), Tone: "good"}
		switch {
		case study.Exceeds(si, most):
			row.Margin, row.Tone = sys.Format(units.Mass, si-most)+" above the limit", "bad"
		case study.Exceeds(most, si):
			row.Margin = sys.Format(units.Mass, most-si) + " below the limit"
		default:
			row.Margin = "at the limit"
		}
		t.Rows = append(t.Rows, row)
	}
	part("Empty, less powerplant", a.Weights.Empty)
	part("Powerplant", a.Powerplant.Model.InstalledMass())
	part("Growth allowance, "+sys.Format(units.Fraction, a.Weights.Growth), m.Growth)
	part("Items", m.Payload)
	if m.Trapped > 0 {
		part("Unusable fuel", m.Trapped)
	}
	usable := m.Fuel - m.Trapped
	most, limited := s.Aircraft().MaxZeroFuel()
	if m.Fuel > 0 || limited {
		sum("Without usable fuel", m.ZeroFuel)
	}
	if limited {
		limit("Greatest without fuel", most, m.ZeroFuel)
	}
	if m.Fuel > 0 {
		part("Usable fuel, of "+sys.Format(units.Mass, m.Fuel)+" aboard", usable)
	}
	sum("At the start", m.Start)
	limit("Greatest at take-off", m.MaxTakeOff, m.Start)
	return t
}
