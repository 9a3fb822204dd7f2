package views

import (
	"fmt"
	"strconv"
	"time"
)

// A History is the list of a project's revisions, a page of them at a time.
type History struct {
	Project    string
	ProjectURL string
	Named      []RevisionItem // those with a name, on the first page
	Revisions  []RevisionItem
	Pages      string // which of them are shown, when they are on several pages
	NewerURL   string // empty on the first page
	OlderURL   string // empty on the last
}

// A RevisionItem is one revision as listed.
type RevisionItem struct {
	Number     string
	Saved      string
	Summary    string
	Current    bool
	After      string // says from which revision it was made, when that is not the one before
	URL        string
	RestoreURL string
	Naming     Naming
}

// A Naming is the form of a revision's name.
type Naming struct {
	Revision string
	URL      string
	ID       string // of its field
	Name     string // empty when the revision has none
	Typed    string // what stands in the field
	Error    string
	Back     string // number of the page of the history to which it returns
	Whole    bool   // stands open, on a page of one revision
}

// A Saved is what the history knows of a revision.
type Saved struct {
	Number, Parent int64
	At             time.Time
	Summary        string
	Name           string // given by the user; empty when it has none
	Engine         string // version of the program that saved it
	Current        bool
}

// A HistoryPageOf says which page of the history is shown.
type HistoryPageOf struct {
	Project       int64
	Name          string
	Page, Pages   int // counted from one
	All           int // revisions
	Named, Listed []Saved
	Refused       *NameRefusal // nil when no name was refused
}

// A NameRefusal is a name of a revision that was not taken.
type NameRefusal struct {
	Revision   int64
	Typed, Why string
}

// NewHistory makes the page of a project's revisions, newest first.
func NewHistory(p HistoryPageOf) History {
	base := projectURL(p.Project)
	h := History{Project: p.Name, ProjectURL: base}
	for _, r := range p.Named {
		item := newRevisionItem(base, r, p.Page, "named-")
		item.Naming.refuse(p.Refused, r.Number)
		h.Named = append(h.Named, item)
	}
	for _, r := range p.Listed {
		item := newRevisionItem(base, r, p.Page, "name-")
		item.Naming.refuse(p.Refused, r.Number)
		h.Revisions = append(h.Revisions, item)
	}
	if p.Pages > 1 && len(p.Listed) > 0 {
		h.Pages = fmt.Sprintf("Revisions %d to %d of %d", p.Listed[0].Number, p.Listed[len(p.Listed)-1].Number, p.All)
	}
	if p.Page > 1 {
		h.NewerURL = historyURL(base, p.Page-1)
	}
	if p.Page < p.Pages {
		h.OlderURL = historyURL(base, p.Page+1)
	}
	return h
}

func projectURL(id int64) string { return fmt.Sprintf("/projects/%d", id) }

// historyURL is the address of a page of the history, counted from one.
func historyURL(base string, page int) string {
	if page <= 1 {
		return base + "/history"
	}
	return base + "/history?page=" + strconv.Itoa(page)
}

func newRevisionItem(base string, r Saved, page int, id string) RevisionItem {
	number := strconv.FormatInt(r.Number, 10)
	item := RevisionItem{Number: number, Saved: moment(r.At), Summary: r.Summary, Current: r.Current,
		URL: base + "/history/" + number, RestoreURL: base + "/restore/" + number,
		Naming: Naming{Revision: number, URL: base + "/history/" + number, ID: id + number, Name: r.Name, Typed: r.Name, Back: strconv.Itoa(page)}}
	if r.Parent > 0 && r.Parent != r.Number-1 {
		item.After = fmt.Sprintf("made from revision %d", r.Parent)
	}
	return item
}

// refuse shows what was typed for the revision and why it was not taken.
func (n *Naming) refuse(r *NameRefusal, number int64) {
	if r != nil && r.Revision == number {
		n.Typed, n.Error = r.Typed, r.Why
	}
}

// Open reports whether the form of the name stands open.
func (n Naming) Open() bool { return n.Whole || n.Error != "" }

func moment(t time.Time) string { return t.Local().Format("2 January 2006, 15:04:05") }
