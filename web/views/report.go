package views

import (
	"net/url"
	"strings"

	"legwright/internal/perf/study"
)

// VerdictOf words the answer of a study as the bench does.
func VerdictOf(s *study.Study) Verdict { return newVerdict(s, s.Project.Spec.System()) }

// A ReportPage is where a report is put together and its tables are fetched.
type ReportPage struct {
	Frame
	Base     string // address of the variant
	Lead     string
	Sections []ReportPart
	Papers   []Option
	Units    []Option // of the report
	Files    []Option // of the tables
	Tables   []ReportFile
	Cautions []string
}

// A ReportPart is a section that can be left out.
type ReportPart struct {
	ID, Title, Holds string
	Chosen           bool
}

// A ReportFile is one table with the addresses of its files.
type ReportFile struct {
	Title string
	Links []Link
}

// NewReportPage makes the page of a study's report without what it offers.
func NewReportPage(s *study.Study, f Frame) ReportPage {
	return ReportPage{Frame: f, Base: strings.TrimSuffix(f.URL, "/report"), Lead: VerdictOf(s).Headline}
}

// Offer adds a table with one address for each of the units.
func (p *ReportPage) Offer(name, title string, in []Option) {
	f := ReportFile{Title: title}
	for _, o := range in {
		f.Links = append(f.Links, Link{Label: o.Label, URL: p.Base + "/tables/" + url.PathEscape(name) + ".csv?units=" + url.QueryEscape(o.Value)})
	}
	p.Tables = append(p.Tables, f)
}
