package report

import (
	"bytes"
	"fmt"
	"slices"
	"strings"

	"legwright/internal/perf/study"
	"legwright/web/charts"
	"legwright/web/views"
)

// PDF writes the report. The same report gives the same bytes.
func (r *Report) PDF() ([]byte, error) {
	s := newSheet(r.Paper)
	r.describe(s)
	r.firstPage(s)
	s.newPage()
	for _, part := range Sections {
		if r.has(part.ID) {
			r.section(s, part)
		}
	}
	r.edges(s)
	var b bytes.Buffer
	if err := s.doc.Output(&b); err != nil {
		return nil, fmt.Errorf("report: %w", err)
	}
	return b.Bytes(), nil
}

func (r *Report) names() (project, variant string) {
	project, variant = oneLine(r.Study.Project.Spec.Name), oneLine(r.Study.Variant().Name)
	if project == "" {
		project = "Project without a name"
	}
	if variant == "" {
		variant = "variant without a name"
	}
	return set(project), set(variant)
}

// describe fills what a reader of the file sees beside its pages.
func (r *Report) describe(s *sheet) {
	project, variant := r.names()
	s.doc.SetTitle(fmt.Sprintf("Predicted performance: %s, %s, revision %d", project, variant, r.Revision), true)
	s.doc.SetSubject("Design estimates, not approved or demonstrated data", true)
	s.doc.SetCreator("Legwright", true)
	s.doc.SetProducer("Legwright", true)
	s.doc.SetLang("en-GB")
	s.doc.SetCreationDate(r.Saved.UTC())
	s.doc.SetModificationDate(r.Saved.UTC())
}

// firstPage answers: does it fly, what does it miss, what is that worth.
func (r *Report) firstPage(s *sheet) {
	project, variant := r.names()
	r.cautionBox(s)
	s.use(bodyStyle)
	s.doc.Bookmark("Summary", 0, s.y)
	s.para(titleStyle, project)
	s.gap(2)
	s.para(subStyle, variant)
	s.gap(4)
	form := ""
	if r.unmanned() {
		form = " Form for an unmanned aircraft."
	}
	s.para(noteStyle, fmt.Sprintf("Predicted performance, revision %d, saved %s. Units: %s.%s", r.Revision, r.saved(), r.sys().Label(), form))
	if unset(r.Study) {
		s.para(style{noteStyle.size, false, caution}, "Some signs in the names and notes are not in the fonts of this report: "+string(substitute)+" stands where one is missing.")
	}
	s.gap(10)
	v := views.VerdictOf(r.Study)
	tone := map[string]colour{"good": good, "bad": bad, "caution": caution}[v.Tone]
	s.para(style{13, true, tone}, v.Headline)
	s.gap(2)
	s.para(bodyStyle, v.Tightest)
	if v.Why != "" {
		s.para(style{bodyStyle.size, true, caution}, sentence("the answer "+v.Why))
	}
	s.para(bodyStyle, strings.TrimSpace(v.Missed+" "+v.Met))
	for _, w := range v.Worst {
		s.para(style{bodyStyle.size, true, bad}, "Stop: "+w)
	}
	s.gap(10)
	t := r.requirements()
	t.Title = "Requirements"
	s.table(&t, r.sys())
	r.driversShort(s)
}

// shortest is how many drivers the first page names.
const shortest = 5

// driversShort is the head of the table of what moves the answer.
func (r *Report) driversShort(s *sheet) {
	t := r.sensitivity()
	t.Title = "What moves the answer most"
	if n := len(t.Rows); n > shortest {
		t.Rows = t.Rows[:shortest]
		t.Note += fmt.Sprintf(" Of %d inputs moved, the five that matter most.", n)
	}
	s.table(&t, r.sys())
}

// cautionBox puts the five cautions at the foot of the page, whatever comes above them.
func (r *Report) cautionBox(s *sheet) {
	const indent, above = 24.0, 12.0
	line := style{noteStyle.size + 0.5, false, ink}
	list := r.Cautions()
	height := leading(tableTitle.size) + 10
	for _, c := range list {
		height += leading(line.size) * float64(len(s.wrapped(set(c), s.width-indent, line)))
	}
	at := s.y
	top := s.bottom - height
	s.box(s.left, top, 2.5, height, caution)
	s.y = top + 3
	s.put(s.left+12, s.y+tableTitle.size, 0, style{tableTitle.size, true, caution}, "Cautions")
	s.gap(leading(tableTitle.size) + 2)
	for i, c := range list {
		s.put(s.left+12, s.y+line.size, 0, noteStyle, fmt.Sprint(i+1))
		s.paraIn(s.left+indent, s.width-indent, line, c)
	}
	s.y = at
	s.kept = height + above
	s.bottom -= s.kept
}

// section writes one part of the report.
func (r *Report) section(s *sheet, part Section) {
	s.heading(part.Title)
	st, sys := r.Study, r.sys()
	switch part.ID {
	case "speeds":
		r.print(s, "speeds", "speeds-by-mass")
	case "thrust":
		s.chart(charts.ThrustChart(st, sys), 260)
		s.chart(charts.PowerChart(st, sys), 240)
	case "climb":
		s.chart(charts.ClimbChart(st, sys), 200)
		r.print(s, "climb", "time-to-climb", "ceilings")
	case "field":
		r.print(s, "take-off", "landing")
		off, on := st.Fields()
		r.fieldChart(s, &off)
		r.fieldChart(s, &on)
		r.print(s, "take-off-distance", "landing-distance")
	case "mission":
		r.print(s, "mission")
		s.chart(charts.MissionChart(st, sys), 320)
		r.print(s, "mission-powerplant")
	case "inputs":
		r.print(s, "inputs")
		r.entered(s)
		r.scene(s)
		r.notes(s)
	case "working":
		r.working(s)
	default:
		for _, e := range catalogue {
			if e.section == part.ID {
				r.print(s, e.name)
			}
		}
	}
}

// scene prints day, strips, technique and legs, each in a line; a file has them one by one.
func (r *Report) scene(s *sheet) {
	all := r.conditions()
	t := Table{Title: "Day, strips, technique and legs", Note: all.Note, Columns: []Column{words("Part"), words("As entered")}}
	for _, row := range all.Rows {
		part, text := row[0], lowerFirst(row[1].word)+"\u00a0"+strings.ReplaceAll(whole(all.Columns[2].shown(&row[2], r.sys())), " ", "\u00a0")
		if part.word == ownPart || row[1].word == "Name" {
			continue
		}
		if n := len(t.Rows); n > 0 && t.Rows[n-1][0].word == part.word {
			t.Rows[n-1][1].word += "; " + text
			continue
		}
		t.Rows = append(t.Rows, []Cell{part, say(sentenceHead(text))})
	}
	s.table(&t, r.sys())
}

// print prints tables by their names.
func (r *Report) print(s *sheet, names ...string) {
	for _, name := range names {
		if t, ok := r.Table(name); ok {
			s.table(&t, r.sys())
		}
	}
}

// entered prints each table of the aircraft's inputs by itself.
func (r *Report) entered(s *sheet) {
	all := r.inputTables()
	for len(all.Rows) > 0 {
		name := all.Rows[0][0].word
		n := slices.IndexFunc(all.Rows, func(row []Cell) bool { return row[0].word != name })
		if n < 0 {
			n = len(all.Rows)
		}
		t := all
		t.Title, t.Note, t.Group, t.Rows = name, "", nil, all.Rows[:n]
		s.table(&t, r.sys())
		all.Rows = all.Rows[n:]
	}
}

func (r *Report) fieldChart(s *sheet, f *study.Field) {
	s.chart(charts.FieldAltitudeChart(f, r.sys()), 165)
}

// notes are what the user wrote about the project and the variant.
func (r *Report) notes(s *sheet) {
	for _, n := range []struct{ title, text string }{{"Note of the project", r.Study.Project.Spec.Note}, {"Note of the variant", r.Study.Variant().Note}} {
		if n.text == "" {
			continue
		}
		s.need(40)
		s.para(tableTitle, n.title)
		for _, line := range strings.Split(n.text, "\n") {
			s.para(bodyStyle, line)
		}
		s.gap(8)
	}
}

// working is the derivation, as its page shows it.
func (r *Report) working(s *sheet) {
	w := views.NewWorking(r.Study, views.NewFrame(r.Study, 0, "/working", "", nil))
	s.para(noteStyle, w.Lead)
	for _, p := range w.Parts {
		s.need(60)
		s.gap(6)
		s.use(tableTitle)
		s.doc.Bookmark(set(p.Title), 1, s.y)
		s.para(tableTitle, p.Title)
		for _, l := range p.Lines {
			switch {
			case l.Heading != "":
				s.need(44)
				s.gap(2)
				s.para(groupStyle, l.Heading)
			case l.Step == nil:
				s.para(noteStyle, l.Remark)
				s.gap(2)
			default:
				s.step(l.Step)
			}
		}
	}
}

// step writes one use of a formula: what it gives, the formula with its source, and its values.
func (s *sheet) step(l *views.WorkedStep) {
	s.need(34)
	result := l.Number + "   " + sentenceHead(l.Means) + ": " + l.Name + " = " + l.Result
	if l.Shown != "" {
		result += ", " + l.Shown
	}
	s.para(style{8.5, true, ink}, result)
	s.paraIn(s.left+10, s.width-10, style{8.5, false, ink}, l.Name+" = "+strings.ReplaceAll(l.Expr, "*", " · ")+"   ["+l.Source+"]")
	var values []string
	for _, v := range l.Values {
		text := v.Name + " = " + v.Value + ", " + v.Means
		var from []string
		for _, g := range v.From {
			from = append(from, strings.TrimSpace(lowerFirst(g.Label)+" "+bracketed(g.Basis)))
		}
		if len(from) > 0 {
			text += ", from " + strings.Join(from, " and ")
		}
		values = append(values, text)
	}
	s.paraIn(s.left+10, s.width-10, smallStyle, strings.Join(values, "; "))
	s.gap(3)
}

func bracketed(s string) string {
	if s == "" {
		return ""
	}
	return "(" + s + ")"
}

// edges writes head and foot of every page, when their number is known.
func (r *Report) edges(s *sheet) {
	project, variant := r.names()
	pages := s.doc.PageCount()
	foot := fmt.Sprintf("%s · %s · revision %d · %s", s.cut(project, 0.4*s.width, smallStyle), s.cut(variant, 0.24*s.width, smallStyle), r.Revision, r.Saved.UTC().Format("2006-01-02"))
	right := s.left + s.width
	for i := 1; i <= pages; i++ {
		s.doc.SetPage(i)
		// The page ended with a font that the writer does not remember: choosing two makes it write one.
		s.use(style{9, true, ink})
		s.put(s.left, 40, 0, style{9, true, caution}, "Predicted")
		s.put(right, 40, 1, smallStyle, "Design estimates, not flight data: confirm by flight test, with a margin")
		s.rule(s.left, right, 46, 0.5, rule)
		count := fmt.Sprintf("page %d of %d", i, pages)
		s.rule(s.left, right, s.bottom+14, 0.5, rule)
		s.put(right, s.bottom+26, 1, smallStyle, count)
		s.put(s.left, s.bottom+26, 0, smallStyle, foot)
	}
}
