package views

import (
	"fmt"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

// A Frame is what every page of a variant has: where it is and where else to go.
type Frame struct {
	Title      string
	ProjectURL string
	Project    string
	Variant    string
	Variants   []Link    // the same page of the other variants
	Tabs       []Link    // the other pages of this variant
	URL        string    // of this page, without the view's query
	Mistaken   []Refusal // settings of the view that were not understood
}

// tabs lists the pages of a variant in order; the bench has no path of its own.
var tabs = []struct{ Path, Label string }{
	{"", "Bench"},
	{"/drag", "Drag"},
	{"/climb", "Climb and envelope"},
	{"/strip", "Strip"},
	{"/mission", "Mission"},
	{"/requirements", "Requirements"},
	{"/powerplant", "Powerplant and propeller"},
	{"/report", "Report"},
	{"/working", "Working"},
}

// NewFrame makes the frame of the page at path ("" for the bench) of a study's
// variant; query is that of the view, with its question mark, or empty; mistaken
// are the settings in it that were not understood.
func NewFrame(s *study.Study, projectID int64, path, query string, mistaken []Refusal) Frame {
	f := frameOf(s.Project.Spec, s.Index, projectID, path, query)
	f.Mistaken = mistaken
	return f
}

// frameOf is the frame of a page that needs no study.
func frameOf(spec *project.Spec, index int, projectID int64, path, query string) Frame {
	v := &spec.Variants[index]
	base := fmt.Sprintf("/projects/%d", projectID)
	f := Frame{ProjectURL: base, Project: spec.Name, Variant: v.Name, URL: base + "/variants/" + v.ID + path}
	for i := range spec.Variants {
		o := &spec.Variants[i]
		f.Variants = append(f.Variants, Link{o.Name, base + "/variants/" + o.ID + path + query, i == index})
	}
	for _, t := range tabs {
		f.Tabs = append(f.Tabs, Link{t.Label, base + "/variants/" + v.ID + t.Path + query, t.Path == path})
		if t.Path == path {
			f.Title = t.Label + " · " + v.Name + " · " + spec.Name
		}
	}
	return f
}

// tab is the address of a page of the variant by its path, under the same view.
func (f *Frame) tab(path string) string {
	for i, t := range tabs {
		if t.Path == path {
			return f.Tabs[i].URL
		}
	}
	return f.URL
}
