package views

import (
	"bytes"
	"fmt"
	"strings"

	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A StripAnalysis is the take-off and the landing of a variant on its strip.
type StripAnalysis struct {
	Frame
	Headline string
	Tone     string // good, caution or bad
	Lead     string
	Form     ViewForm
	Sides    []StripSide
	Source   string        // of the published factors
	Warnings []WarningView // of the take-off and landing of the mission; none when another mass is looked at
}

// A StripSide is one of the two.
type StripSide struct {
	ID       string
	Title    string
	Sentence string
	Tone     string
	Drawing  ChartView
	Segments StripTable
	Holds    string // what the distance already has in it
	Matrix   Matrix
	Altitude ChartView
	Mass     ChartView
	Changes  Grid
}

// A Matrix is the distance across altitude and temperature.
type Matrix struct {
	Caption string
	Note    string
	Head    []string
	Rows    []MatrixRow
	Reasons []string // what the short words in its cells mean
}

// A MatrixRow is one altitude.
type MatrixRow struct {
	Head  string
	Cells []MatrixCell
}

// A MatrixCell is a distance with the word of how it fits.
type MatrixCell struct {
	Value, Word, Fit string
}

// NewStrip makes the page.
func NewStrip(s *study.Study, frame Frame) StripAnalysis {
	sys := s.Project.Spec.System()
	off, on := s.Fields()
	p := StripAnalysis{Frame: frame, Form: newViewForm(s, sys, frame),
		Sides:  []StripSide{stripSide(s, &off, sys), stripSide(s, &on, sys)},
		Source: "Published: UK CAA SafetySense Leaflet 7c, Aeroplane Performance, 2013; landing on very short wet grass, UK CAA GM1 CAT.POL.A.335; from memory. It gives one factor for the whole distance, rounded up, whatever the aircraft."}
	a, b := fitOf(&off), fitOf(&on)
	p.Headline = stripHeadline(a, b)
	p.Tone = "good"
	if a != study.Fits || b != study.Fits {
		p.Tone = "bad"
	}
	place := off.Present.Place
	p.Lead = fmt.Sprintf("%s, %s, %s. ", place.Strip.Name, sys.Format(units.FieldLength, place.Strip.Length), place.Surface.Label)
	mission := sys.Format(units.Mass, s.TakeOff.Mass) + " and " + sys.Format(units.Mass, s.Landing.Mass)
	if off.Present.Mass != s.TakeOff.Mass || on.Present.Mass != s.Landing.Mass {
		p.Lead += fmt.Sprintf("Both are flown at %s, in place of their masses in the mission: %s.", sys.Format(units.Mass, off.Present.Mass), mission)
	} else {
		p.Lead += fmt.Sprintf("Until a mass is given here, each is flown at its mass in the mission: %s.", mission)
		p.Warnings = concerning(warnings(s.Warnings, sys), "strip")
	}
	return p
}

// stripHeadline answers for the take-off and the landing at once.
func stripHeadline(off, on study.Fit) string {
	if off != on {
		return "The take-off " + fitWords(off) + "; the landing " + fitWords(on) + "."
	}
	switch off {
	case study.Fits:
		return "The take-off and the landing fit with their safety factors."
	case study.Tight:
		return "The take-off and the landing fit only without their safety factors."
	case study.Over:
		return "Neither the take-off nor the landing fits."
	}
	return "Neither the take-off nor the landing is possible."
}

// fitOf is how the present case suits its strip.
func fitOf(f *study.Field) study.Fit {
	if f.Present.Err != nil {
		return study.None
	}
	p := study.FieldPoint{Run: f.Present.Run}
	return p.Fit(f.Present.Place.Strip.Length)
}

func fitWords(f study.Fit) string {
	switch f {
	case study.Fits:
		return "fits with its safety factor"
	case study.Tight:
		return "fits only without its safety factor"
	case study.Over:
		return "does not fit"
	}
	return "is not possible"
}

func stripSide(s *study.Study, f *study.Field, sys units.System) StripSide {
	name := "Take-off"
	if f.Landing {
		name = "Landing"
	}
	place := f.Present.Place
	side := StripSide{ID: strings.ToLower(name), Title: name + ", " + place.Strip.Name, Tone: "bad",
		Drawing: drawingView(charts.StripDrawing(f, sys)), Segments: stripTable(name, f.Present, sys, f.Factor), Holds: holds(f, sys)}
	side.Sentence = fitSentence(f, sys)
	side.Segments.Why = weakness(s, strings.ReplaceAll(kind(f), "-", "_")+"_distance")
	if fitOf(f) == study.Fits {
		side.Tone = "good"
	}
	side.Matrix = matrix(f, sys)
	side.Altitude, side.Mass = distanceView(charts.FieldAltitudeChart(f, sys)), distanceView(charts.FieldMassChart(f, sys, s.Masses.MaxTakeOff))
	side.Changes = changes(f, sys)
	return side
}

// fitSentence answers whether it fits and by how much.
func fitSentence(f *study.Field, sys units.System) string {
	if f.Present.Err != nil {
		return "No " + kind(f) + ": " + units.Explain(f.Present.Err).In(sys) + "."
	}
	length := func(si float64) string { return sys.Format(units.FieldLength, si) }
	run, there := &f.Present.Run, f.Present.Place.Strip.Length
	factor := "its safety factor × " + units.Plain(f.Factor)
	switch fitOf(f) {
	case study.Fits:
		return fmt.Sprintf("Fits with %s to spare: %s unfactored, %s with %s, %s there.", length(there-run.Factored), length(run.Total), length(run.Factored), factor, length(there))
	case study.Tight:
		return fmt.Sprintf("Fits only unfactored: %s of %s. With %s it needs %s, %s more than there is.", length(run.Total), length(there), factor, length(run.Factored), length(run.Factored-there))
	}
	return fmt.Sprintf("Does not fit: %s unfactored ends %s past the %s there. With %s it needs %s.", length(run.Total), length(run.Total-there), length(there), factor, length(run.Factored))
}

func kind(f *study.Field) string {
	if f.Landing {
		return "landing"
	}
	return "take-off"
}

// holds says what the integration has in it, so that nobody multiplies it in again.
func holds(f *study.Field, sys units.System) string {
	place := f.Present.Place
	mu, what := place.Surface.Rolling, "rolling"
	if f.Landing {
		mu, what = place.Surface.Braking, "braking"
	}
	wind := ""
	if place.HeadWind != 0 {
		wind = " The whole wind is counted: plan with half a head wind and one and a half times a tail wind, as 14 CFR 25.105(d) asks of transport aircraft (from memory)."
	}
	return fmt.Sprintf("The distance itself holds %s (%s friction %s), %s, the wind, height, heat and %s. Only the safety factor comes on top; a further factor for these would count them twice. Grass longer than short, and standing water, are not in it.",
		place.Surface.Label, what, units.Plain(mu), slopeWords(place.Strip.Slope, sys), humidityWords(f.Humidity)) + wind
}

func slopeWords(slope float64, sys units.System) string {
	if slope == 0 {
		return "a level strip"
	}
	return "a slope of " + signed(sys, units.Fraction, slope)
}

func humidityWords(share float64) string {
	if share == 0 {
		return "dry air"
	}
	return percent(share) + " humidity"
}

func percent(share float64) string { return units.Fixed(100*share, 0) + "\u00a0%" }

// matrix words the distances across pressure altitude and temperature.
func matrix(f *study.Field, sys units.System) Matrix {
	place := f.Present.Place
	m := Matrix{Caption: fmt.Sprintf("%s over %s by height and heat%s", strings.ToUpper(kind(f)[:1])+kind(f)[1:], sys.Format(units.Height, place.Strip.Obstacle), unitOf(sys, units.FieldLength)),
		Note: fmt.Sprintf("Unfactored, %s, %s. On %s it fits with the factor × %s, is tight without it only, or goes over. The strip now: %s and %s.",
			condition(f, sys), humidityWords(f.Humidity), sys.Format(units.FieldLength, place.Strip.Length), units.Plain(f.Factor),
			sys.Format(units.Altitude, place.Air.PressureAltitude), sys.Format(units.Temperature, place.Air.Temperature)),
		Head: []string{"Pressure altitude"}}
	seen := map[string]bool{}
	cells := func(head string, row []study.FieldPoint) {
		r := MatrixRow{Head: head}
		for i := range row {
			q := &row[i]
			fit := q.Fit(place.Strip.Length)
			c := MatrixCell{Word: string(fit), Fit: string(fit)}
			if q.Has() {
				c.Value = sys.Number(units.FieldLength, q.Run.Total)
			} else {
				c.Word = q.Word
				if !seen[q.Word] {
					seen[q.Word] = true
					m.Reasons = append(m.Reasons, sentence(q.Word+", as at "+head+": "+units.Explain(q.Err).In(sys)))
				}
			}
			r.Cells = append(r.Cells, c)
		}
		m.Rows = append(m.Rows, r)
	}
	celsius := sys.Unit(units.Temperature)
	for _, t := range f.Grid.Temperatures {
		m.Head = append(m.Head, units.Fixed(celsius.FromSI(t), 0)+"\u00a0"+celsius.Symbol)
	}
	for i, row := range f.Grid.Cells {
		cells(sys.Format(units.Altitude, f.Grid.Altitudes[i]), row)
	}
	if len(f.Grid.Humid) > 0 {
		cells(sys.Format(units.Altitude, f.Grid.Altitudes[f.Grid.HumidRow])+", "+percent(f.Grid.HumidLevel)+" humidity", f.Grid.Humid)
	}
	return m
}

// condition says mass, surface, wind and slope.
func condition(f *study.Field, sys units.System) string {
	p := &f.Present
	wind := "calm"
	switch v := p.Place.HeadWind; {
	case v > 0:
		wind = sys.Format(units.Speed, v) + " head wind"
	case v < 0:
		wind = sys.Format(units.Speed, -v) + " tail wind"
	}
	return sys.Format(units.Mass, p.Mass) + ", " + p.Place.Surface.Label + ", " + wind + ", " + slopeWords(p.Place.Strip.Slope, sys)
}

// changes is the table of what changes the distance.
func changes(f *study.Field, sys units.System) Grid {
	g := Grid{Caption: strings.ToUpper(kind(f)[:1]) + kind(f)[1:], Head: []string{"Change", "Over " + sys.Format(units.Height, f.Present.Place.Strip.Obstacle) + unitOf(sys, units.FieldLength), "Change, %", "Published, %"}}
	if f.Present.Err != nil {
		g.Reason = "There is no present " + kind(f) + " to compare with."
	} else {
		g.Rows = append(g.Rows, []string{"As it is", sys.Number(units.FieldLength, f.Present.Run.Total), "–", "–"})
	}
	var reasons []string
	for i := range f.Changes {
		c := &f.Changes[i]
		row := []string{c.What.In(sys), c.Word, "–", "–"}
		if c.Has() {
			row[1] = sys.Number(units.FieldLength, c.Run.Total)
			if f.Present.Err == nil {
				row[2] = plusMinus(c.Rise)
			}
		} else if f.Present.Err == nil {
			reasons = append(reasons, sentence(c.What.In(sys)+": "+units.Explain(c.Err).In(sys)))
		}
		if c.Published != 0 {
			row[3] = plusMinus(c.Published)
			if c.AtLeast {
				row[3] = "≥ " + row[3]
			}
		}
		g.Rows = append(g.Rows, row)
	}
	g.Reason = strings.TrimSpace(g.Reason + " " + strings.Join(reasons, " "))
	return g
}

// plusMinus writes a share as a signed percentage without its sign of percent.
func plusMinus(share float64) string {
	text := units.Fixed(100*share, 0)
	if share > 0 && text != "0" {
		return "+" + text
	}
	return text
}

func distanceView(c charts.Chart) ChartView {
	c.Width, c.Height = 540, 290
	if c.Panels[0].Blank != "" {
		c.Height = 120
	}
	return chartView(c)
}

// drawingView draws a strip. Writing to a buffer cannot fail.
func drawingView(d charts.Drawing) ChartView {
	var wide, narrow bytes.Buffer
	_ = d.SVG(&wide)
	_ = d.Narrow().SVG(&narrow)
	return ChartView{ID: d.ID, Title: d.Title, Sentence: d.Desc, Wide: wide.String(), Narrow: narrow.String(), Table: d.Table()}
}
