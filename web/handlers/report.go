package handlers

import (
	"fmt"
	"net/http"
	"slices"
	"strconv"
	"strings"
	"unicode"

	"github.com/go-chi/chi/v5"

	"legwright/internal/perf/units"
	"legwright/web/report"
	"legwright/web/views"
)

// reportPage is where a report is put together.
func (s *site) reportPage(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	rep, err := h.report(r, h.spec.System())
	if err != nil {
		return err
	}
	p := views.NewReportPage(rep.Study, views.NewFrame(rep.Study, h.rev.Project, "/report", query(r.URL.Query()), nil))
	p.Cautions = rep.Cautions()
	for _, part := range report.Sections {
		p.Sections = append(p.Sections, views.ReportPart{ID: part.ID, Title: part.Title, Holds: part.Holds, Chosen: true})
	}
	for _, o := range report.Papers {
		p.Papers = append(p.Papers, views.Option{Value: o.ID, Label: o.Label})
	}
	for _, u := range report.FileUnits() {
		o := views.Option{Value: string(u), Label: u.Label(), Selected: string(u) == h.spec.Display}
		p.Files = append(p.Files, o)
		if u != report.SI {
			p.Units = append(p.Units, o)
		}
	}
	var two []views.Option // one by one: the project's units, and SI
	for _, o := range p.Files {
		if o.Selected || o.Value == string(report.SI) {
			two = append(two, o)
		}
	}
	for _, t := range report.Listing() {
		p.Offer(t.Name, t.Title, two)
	}
	return render(w, r, http.StatusOK, views.ReportPageView(p))
}

// report studies the variant that the address names, in the unit system, for a report.
func (h head) report(r *http.Request, sys units.System) (*report.Report, error) {
	i, err := h.variant(r)
	if err != nil {
		return nil, err
	}
	st, err := report.InUnits(h.spec, i, sys)
	if err != nil {
		return nil, err
	}
	q := r.URL.Query()
	return &report.Report{Study: st, Revision: h.rev.Number, Saved: h.rev.Saved, Paper: report.PaperOf(q.Get("paper")), Sections: report.SectionsOf(q["section"])}, nil
}

// fileUnits are the units that the query asks for, or those of the project.
func (h head) fileUnits(r *http.Request) report.Units {
	if u := report.Units(r.URL.Query().Get("units")); slices.Contains(report.FileUnits(), u) {
		return u
	}
	return report.Units(h.spec.Display)
}

// A made is a file made of a report; its name is without the ending.
type made struct {
	name, kind string
	bytes      []byte
}

// reportFile answers with a file that is made of the present revision.
func (s *site) reportFile(ending string, build func(*http.Request, *report.Report, report.Units) (made, error)) page {
	return func(w http.ResponseWriter, r *http.Request) error {
		h, err := s.head(r)
		if err != nil {
			return err
		}
		u := h.fileUnits(r)
		sys := units.System(u)
		if u == report.SI { // words beside the numbers are in metric units then
			sys = units.Metric
		}
		rep, err := h.report(r, sys)
		if err != nil {
			return err
		}
		f, err := build(r, rep, u)
		if err != nil {
			return err
		}
		name := fmt.Sprintf("%s-%s-r%d", slug(h.spec.Name, "project"), slug(rep.Study.Variant().Name, "variant"), h.rev.Number)
		if f.name != "" {
			name += "-" + f.name
		}
		head := w.Header()
		head.Set("Content-Type", f.kind)
		attach(w, name+"."+ending)
		head.Set("Cache-Control", "no-store")
		head.Set("Content-Length", strconv.Itoa(len(f.bytes)))
		_, err = w.Write(f.bytes)
		return err
	}
}

func reportPDF(_ *http.Request, rep *report.Report, _ report.Units) (made, error) {
	b, err := rep.PDF()
	return made{"report", "application/pdf", b}, err
}

func reportTables(_ *http.Request, rep *report.Report, u report.Units) (made, error) {
	b, err := rep.Zip(u)
	return made{"tables", "application/zip", b}, err
}

func reportTable(r *http.Request, rep *report.Report, u report.Units) (made, error) {
	name, ok := strings.CutSuffix(chi.URLParam(r, "table"), ".csv")
	t, known := rep.Table(name)
	if !ok || !known {
		return made{}, &problem{http.StatusNotFound, "Not here", "There is no table of that name. The page of the report lists them."}
	}
	return made{name, "text/csv; charset=utf-8; header=present", t.CSV(u)}, nil
}

// slug makes a name fit for a file: letters and digits of ASCII, joined by hyphens.
func slug(name, without string) string {
	words := strings.FieldsFunc(strings.ToLower(name), func(r rune) bool { return r > unicode.MaxASCII || !(unicode.IsLetter(r) || unicode.IsDigit(r)) })
	const longest = 40
	text := strings.Join(words, "-")
	if len(text) > longest {
		text = strings.TrimRight(text[:longest], "-")
	}
	if text == "" {
		return without
	}
	return text
}
