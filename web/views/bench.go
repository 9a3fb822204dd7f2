package views

import (
	"bytes"
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/mission"
	"legwright/internal/perf/pointperf"
	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
	"legwright/internal/perf/units"
	"legwright/web/charts"
)

// A Bench is the page of one variant: inputs at one side, results at the other.
type Bench struct {
	Frame
	Editing
	Top
	View     ViewForm
	Speeds   Speeds
	Charts   Charts
	Strips   []StripTable
	Climb    Grid
	Legs     Grid
	Plant    Grid
	Figures  []Row
	Warnings []WarningView
	Weak     string // how many inputs are placeholders or estimates
}

// A Top is what a page about the whole variant answers first.
type Top struct {
	Verdict Verdict
	Tiles   []Tile
	More    string // says how many requirements have no tile; empty when each has one
	MoreURL string // of the page of requirements
}

// newTop makes the top of a page; here is the address of the variant.
func newTop(s *study.Study, sys units.System, here string, st State) Top {
	t := Top{Verdict: newVerdict(s, sys), MoreURL: here + "/requirements" + st.Query}
	t.Tiles, t.More = tiles(s, sys, here+"/working")
	return t
}

// A Link is a way to another page.
type Link struct {
	Label, URL string
	Current    bool
}

// A Verdict is the sentence that answers.
type Verdict struct {
	Headline string
	Tone     string // good, caution or bad
	Tightest string
	Missed   string
	Why      string   // says that the answer rests on placeholders; empty when it does not
	Met      string   // said when every requirement is met
	Worst    []string // the gravest warnings that the headline does not say already
}

// A Tile is one requirement held against its figure.
type Tile struct {
	Value, Caption, Word, Tone string
	Why                        string // says that it rests on placeholders; empty when it does not
	URL                        string // of the figure's working
}

// A Row is a name and a value with its remark.
type Row struct {
	Label   string
	Value   string
	Remark  string
	Unusual string // says that it lies outside what is usual; empty when it does not
	Why     string // says that it rests on placeholders; empty when it does not
	URL     string // of its working; empty when it has none
}

// Speeds is the table of the speeds of note.
type Speeds struct {
	Unit string
	Rows []SpeedRow
	Why  string // says that they rest on placeholders; empty when they do not
}

// A SpeedRow is one speed of note and what is best there.
type SpeedRow struct {
	Label, TAS, CAS, There string
	Remark                 string
}

// A Grid is a table with heads.
type Grid struct {
	Caption string
	Note    string
	Head    []string
	Rows    [][]string
	Reason  string // why it is empty
}

// A StripTable is a take-off or landing by segment.
type StripTable struct {
	Title    string
	Sentence string
	Tone     string
	Rows     []Row
	Caution  string
	Why      string // says that it rests on placeholders; empty when it does not
}

// A ViewForm is the condition of the thrust chart.
type ViewForm struct {
	URL       string
	Altitude  Field
	Mass      Field
	Deviation Field
	Setting   Field // shown where the lever means something
	Config    Field
	Errors    []string
}

// A ChartView is a chart drawn twice, for wide and narrow pages, with its data.
type ChartView struct {
	ID, Title, Sentence string
	Wide, Narrow        string
	Table               charts.Table
}

// Charts are the bench's charts.
type Charts struct {
	Thrust, Power, Climb, Mission ChartView
}

// NewBench makes the page of a study.
func NewBench(s *study.Study, st State) Bench {
	spec, v := s.Project.Spec, s.Variant()
	sys := spec.System()
	here := fmt.Sprintf("/projects/%d/variants/%s", st.ProjectID, v.ID)
	b := Bench{Frame: NewFrame(s, st.ProjectID, "", st.Query, st.View), Editing: newEditing(s, st)}
	b.Top = newTop(s, sys, here, st)
	b.form(newForm(spec, s.Index, st.Refusals).groups(), st.Refusals)
	summarise(b.Groups, s, sys)
	weigh(b.Groups, s, sys)
	b.View = newViewForm(s, sys, b.Frame)
	b.Speeds = speeds(s, sys)
	b.Charts = newCharts(s, sys)
	b.Strips = []StripTable{stripTable("Take-off", s.TakeOff, sys, spec.Technique.TakeOffFactor), stripTable("Landing", s.Landing, sys, spec.Technique.LandingFactor)}
	b.Strips[0].Why, b.Strips[1].Why = weakness(s, "take_off_distance"), weakness(s, "landing_distance")
	b.Climb, b.Legs, b.Plant = climbGrid(s, sys), legGrid(s, sys), plantGrid(s, sys)
	b.Figures = figures(s, sys, here+"/working")
	b.Warnings = warnings(s.Warnings, sys)
	for i := range b.Groups {
		b.Groups[i].Warnings = concerning(b.Warnings, groupSubjects[b.Groups[i].ID])
	}
	b.Weak = firmness(s)
	return b
}

// firmness says how many of the aircraft's inputs are placeholders and how many estimates.
func firmness(s *study.Study) string {
	var parts []string
	for _, k := range []struct{ kind, one, many string }{{project.Placeholder, "one placeholder", "%d placeholders"}, {project.Estimated, "one estimate", "%d estimates"}} {
		switch n := len(s.OnBasis(k.kind)); n {
		case 0:
		case 1:
			parts = append(parts, k.one)
		default:
			parts = append(parts, fmt.Sprintf(k.many, n))
		}
	}
	if len(parts) == 0 {
		return "Every input that is known from somewhere is measured, calculated or the maker's."
	}
	text := "Among the inputs: " + strings.Join(parts, " and ") + "."
	if len(s.Placeholders()) > 0 {
		text += " A figure that rests on a placeholder is marked."
	}
	return text
}

// newVerdict words the answer to: does it fly the mission, and where is it tightest.
func newVerdict(s *study.Study, sys units.System) Verdict {
	f := &s.Flight
	var v Verdict
	switch {
	case f.Failure != nil:
		v.Tone = "bad"
		v.Headline = fmt.Sprintf("Does not fly the mission: it ends in “%s”.", f.Failure.Name)
		v.Tightest = sentence(f.Failure.Reason.In(sys))
	case len(f.Legs) == 0:
		v.Tone, v.Headline = "caution", "The mission has no legs."
	case f.Reserve.Asked && !f.Reserve.Met && f.Reserve.Flown >= f.Reserve.Wanted:
		v.Tone, v.Headline = "bad", "Flies the mission but does not keep the reserve."
		v.Tightest = sentence(f.Reserve.Reason.In(sys))
	case f.Reserve.Asked && !f.Reserve.Met:
		v.Tone = "bad"
		v.Headline = fmt.Sprintf("Flies the mission but not the reserve: %s of %s.", sys.Format(units.Duration, f.Reserve.Flown), sys.Format(units.Duration, f.Reserve.Wanted))
		v.Tightest = sentence(f.Reserve.Reason.In(sys))
	case f.Tightest != nil:
		v.Tone = "good"
		v.Headline = fmt.Sprintf("Flies the mission, with %.0f\u00a0%% thrust in hand at its tightest.", 100*f.Tightest.Ratio())
	default:
		v.Tone, v.Headline = "good", "Flies the mission."
	}
	if t := f.Tightest; t != nil {
		where := fmt.Sprintf("Tightest %s “%s”: %s available, %s required at %s, %s and %s.", whenIn(s, t, sys), legName(s, t.Leg),
			sys.Format(units.Force, t.Available), sys.Format(units.Force, t.Required), sys.Format(units.Speed, t.TAS), sys.Format(units.Altitude, t.Altitude), sys.Format(units.Mass, t.Mass))
		if v.Tightest != "" {
			where = v.Tightest + " " + where
		}
		v.Tightest = where
	}
	v.Missed = missed(s)
	v.Why = weakness(s, "thrust_in_hand")
	if n := len(s.Requirements); v.Missed == "" && n > 0 {
		v.Met = fmt.Sprintf("Meets all %d requirements.", n)
	}
	for _, w := range s.Warnings {
		if w.Level == study.Stop && w.Code != "mission-ends" && w.Code != "reserve-short" {
			v.Worst = append(v.Worst, sentence(w.Text.In(sys)))
		}
	}
	if len(v.Worst) > 2 {
		v.Worst = append(v.Worst[:2], fmt.Sprintf("%s more below.", plural(len(v.Worst)-2)))
	}
	if (v.Missed != "" || len(v.Worst) > 0) && v.Tone == "good" {
		v.Tone = "caution"
	}
	return v
}

func missed(s *study.Study) string {
	var names []string
	open := 0
	for i := range s.Requirements {
		r := &s.Requirements[i]
		switch {
		case !r.Judged():
			open++
		case !r.Met:
			names = append(names, lowerFirst(r.Figure.Label))
		}
	}
	text := ""
	all := len(names)
	if all > 4 {
		names = append(names[:3], fmt.Sprintf("%d more", all-3))
	}
	switch n := len(s.Requirements); all {
	case 0:
	case 1:
		text = fmt.Sprintf("Misses one requirement of %d: %s.", n, names[0])
	default:
		text = fmt.Sprintf("Misses %d requirements of %d: %s.", all, n, strings.Join(names, "; "))
	}
	if open > 0 {
		text = strings.TrimSpace(text + " " + plural(open) + " cannot be judged.")
	}
	return text
}

func lowerFirst(s string) string {
	if len(s) > 1 && s[1] >= 'a' && s[1] <= 'z' {
		return string(s[0]|0x20) + s[1:]
	}
	return s
}

func legName(s *study.Study, i int) string { return s.Project.Spec.Legs[i].Title() }

// whenIn says when in its leg a sample stands.
func whenIn(s *study.Study, t *mission.Sample, sys units.System) string {
	if t.Leg >= len(s.Flight.Legs) {
		return "in"
	}
	l := &s.Flight.Legs[t.Leg]
	since := t.Time - l.Start.Time
	switch {
	case since < 1:
		return "at the start of"
	case l.Time-since < 1:
		return "at the end of"
	}
	return sys.Format(units.Duration, since) + " into"
}

// mostTiles is how many requirements the verdict shows one by one.
const mostTiles = 8

// tiles holds requirements against their figures, each with a link to its working on the page
// at the given address. Where there are too many, those that are missed or were not judged go first,
// and more says how many are left out.
func tiles(s *study.Study, sys units.System, page string) (list []Tile, more string) {
	shown := make([]*study.Verdict, 0, len(s.Requirements))
	for i := range s.Requirements {
		if s.Requirements[i].Figure != nil {
			shown = append(shown, &s.Requirements[i])
		}
	}
	if n := len(shown) - mostTiles; n > 0 {
		slices.SortStableFunc(shown, func(a, b *study.Verdict) int { return cmp.Compare(urgency(a), urgency(b)) })
		more = fmt.Sprintf("and %d more", n)
		shown = shown[:mostTiles]
	}
	for _, r := range shown {
		t := Tile{Caption: lowerFirst(r.Figure.Label) + ", " + wanted(&r.Requirement, sys)}
		if under := stated(&r.Requirement, sys); under != "" {
			t.Caption += "; " + under
		}
		switch {
		case !r.Judged():
			t.Value, t.Word, t.Tone = "–", "not judged: "+r.Reason.In(sys), "caution"
		case r.Met:
			t.Value, t.Word, t.Tone = sys.Format(r.Figure.Quantity, r.Figure.Value), "met", "good"
		default:
			t.Value, t.Word, t.Tone = sys.Format(r.Figure.Quantity, r.Figure.Value), "missed", "bad"
		}
		t.Why, t.URL = weaknessOf(s, r.Figure), page+"#"+anchor(r.WorkingPart())
		list = append(list, t)
	}
	return list, more
}

// urgency puts what is missed before what was not judged, and that before what is met.
func urgency(v *study.Verdict) int {
	switch {
	case !v.Judged():
		return 1
	case v.Met:
		return 2
	}
	return 0
}

// summarise gives each group its line of what matters.
func summarise(groups []Group, s *study.Study, sys units.System) {
	spec, a := s.Project.Spec, s.Aircraft()
	aspect := a.Span() * a.Span() / a.WingArea()
	strip := spec.Strips[0]
	lines := map[string]string{
		"configurations": fmt.Sprintf("CLmax %s / %s / %s", sys.Number(units.Coefficient, a.CLMax(aircraft.Clean)), sys.Number(units.Coefficient, a.CLMax(aircraft.TakeOff)), sys.Number(units.Coefficient, a.CLMax(aircraft.Landing))),
		"airframe":       fmt.Sprintf("%s · A %.1f · CDmin %s", sys.Format(units.Area, a.WingArea()), aspect, sys.Number(units.Coefficient, a.Polar(aircraft.Clean).Minimum())),
		"weights":        sys.Format(units.Mass, s.Masses.Start) + " at start",
		"strip":          fmt.Sprintf("%s, %s", sys.Format(units.FieldLength, strip.Length), sys.Format(units.Altitude, strip.Elevation)),
		"mission":        fmt.Sprintf("%d legs", len(spec.Legs)),
		"requirements":   fmt.Sprint(len(spec.Requirements)),
		"names":          sys.Label(),
		"limits":         limitSummary(a, sys),
	}
	if len(s.Static.Limits.Words()) == 0 && s.Static.Shaft.Speed > 0 {
		lines["powerplant-propeller"] = fmt.Sprintf("%s at rest", sys.Format(units.Rotation, s.Static.Shaft.Speed))
	}
	lines["powerplant-fuel"] = sys.Format(units.Mass, s.Masses.Fuel)
	lines["powerplant-engine"] = sys.Format(units.Power, s.Static.Shaft.Power) + " at rest"
	for i := range groups {
		groups[i].Summary = lines[groups[i].ID]
	}
}

// rounded is how a condition that nobody typed stands in its field: to the decimals of results, in plain digits.
func rounded(sys units.System, q units.Quantity, si float64) string {
	u := sys.Unit(q)
	scale := math.Pow(10, float64(sys.Decimals(q)))
	return units.Plain(math.Round(u.FromSI(si)*scale) / scale)
}

// newViewForm makes the form of the condition under which a page shows its curves.
func newViewForm(s *study.Study, sys units.System, f Frame) ViewForm {
	given := study.DefaultView(s.Project, s.Index)
	number := func(name, label string, q units.Quantity, si, usual float64) Field {
		text := sys.Entry(q, si)
		if si == usual {
			text = rounded(sys, q, si)
		}
		return Field{Path: name, ID: "view-" + name, Label: label, Kind: "number", Value: text, Unit: sys.Unit(q).Symbol}
	}
	v := ViewForm{URL: f.URL, Altitude: number("altitude", "altitude", units.Altitude, s.View.Altitude, given.Altitude), Mass: number("mass", "mass", units.Mass, s.View.Mass, given.Mass),
		Deviation: number("isa", "ISA", units.TemperatureStep, s.View.Deviation, given.Deviation),
		Setting:   number("lever", "power lever", units.Fraction, s.View.Setting, given.Setting), Config: Field{Path: "config", ID: "view-config", Label: "configuration", Kind: "choice"}}
	for _, c := range []aircraft.Config{aircraft.Clean, aircraft.TakeOff, aircraft.Landing} {
		v.Config.Options = append(v.Config.Options, Option{c.String(), c.String(), c == s.View.Config})
	}
	for _, r := range f.Mistaken {
		for _, field := range []*Field{&v.Altitude, &v.Mass, &v.Deviation, &v.Setting} {
			if field.Path == r.Path {
				field.Value, field.Error = r.Text, r.Why
			}
		}
		v.Errors = append(v.Errors, r.Why)
	}
	return v
}

// speeds lists the speeds of note of the view.
func speeds(s *study.Study, sys units.System) Speeds {
	sp := &s.Speeds
	table := Speeds{Unit: sys.Unit(units.Speed).Symbol, Why: weakness(s, "level_max")}
	add := func(label string, tas float64, there, remark string) {
		table.Rows = append(table.Rows, SpeedRow{label, sys.Number(units.Speed, tas), sys.Number(units.Speed, float64(s.Point.Air.CAS(tas))), there, remark})
	}
	row := func(label string, b pointperf.Best, q units.Quantity) {
		if b.Err != nil {
			table.Rows = append(table.Rows, SpeedRow{Label: label, TAS: "none", Remark: sentence(units.Explain(b.Err).In(sys))})
			return
		}
		there := ""
		if q != units.Coefficient {
			there = sys.Format(q, b.Value)
		}
		add(label, b.TAS, there, b.Bound)
	}
	row("Stall", sp.Stall, units.Coefficient)
	row("Best angle", sp.BestAngle, units.Angle)
	row("Best rate", sp.BestRate, units.ClimbRate)
	row("Least power", sp.LeastPower, units.Power)
	row("Least thrust", sp.LeastThrust, units.Force)
	row("Carson", sp.Carson, units.Force)
	if sp.LevelMin.Err == nil && sp.LevelMin.Bound == "" {
		row("Level minimum", sp.LevelMin, units.Force)
	}
	row("Level maximum", sp.LevelMax, units.Force)
	if g := s.Glide; g.Ratio > 0 {
		drag := "idling without thrust or drag"
		if g.Windmills {
			drag = "with the idling propeller's drag"
		}
		add("Best glide", g.RatioTAS, fmt.Sprintf("1 : %.1f", g.Ratio), drag)
		add("Least sink", g.SinkTAS, sys.Format(units.ClimbRate, g.Sink), "")
	}
	return table
}

// newCharts draws the charts at about the width that the page gives them, so that their text keeps its size.
func newCharts(s *study.Study, sys units.System) Charts {
	sized := func(c charts.Chart, width, height float64) ChartView {
		c.Width, c.Height = width, height
		return chartView(c)
	}
	return Charts{
		Thrust:  sized(charts.ThrustChart(s, sys), 520, 330),
		Power:   sized(charts.PowerChart(s, sys), 420, 300),
		Climb:   sized(charts.ClimbChart(s, sys), 420, 300),
		Mission: sized(charts.MissionChart(s, sys), 860, 400),
	}
}

// chartView draws a chart. Writing to a buffer cannot fail.
func chartView(c charts.Chart) ChartView {
	var wide, narrow bytes.Buffer
	_ = c.SVG(&wide)
	_ = c.Narrow().SVG(&narrow)
	return ChartView{ID: c.ID, Title: c.Title, Sentence: c.Desc, Wide: wide.String(), Narrow: narrow.String(), Table: c.Table()}
}

// weakness says that a figure rests on placeholders; empty when it does not.
func weakness(s *study.Study, id string) string { return weaknessOf(s, s.Figure(id)) }

func weaknessOf(s *study.Study, f *study.Figure) string {
	switch n := len(s.Unsure(f)); n {
	case 0:
		return ""
	case 1:
		return "rests on a placeholder"
	default:
		return fmt.Sprintf("rests on %d placeholders", n)
	}
}

// figures lists every figure, each with a link to its working on the page at the given address.
func figures(s *study.Study, sys units.System, page string) []Row {
	list := make([]Row, len(s.Figures))
	for i := range s.Figures {
		f := &s.Figures[i]
		list[i] = Row{Label: f.Label, Remark: f.Where.In(sys)}
		if f.Has() {
			list[i].Value, list[i].Unusual = sys.Format(f.Quantity, f.Value), f.Unusual(f.Value, sys.Unit(f.Quantity))
		} else {
			list[i].Value, list[i].Remark = "none", sentence(f.Reason.In(sys))
		}
		list[i].Why, list[i].URL = weakness(s, f.ID), workingURL(page, f.ID)
	}
	return list
}
