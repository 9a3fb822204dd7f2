package views

import (
	"fmt"
	"time"
)

// A History is the list of a project's revisions.
type History struct {
	Project    string
	ProjectURL string
	Revisions  []RevisionItem
}

// A RevisionItem is one revision as listed.
type RevisionItem struct {
	Number     string
	Saved      string
	Summary    string
	Current    bool
	After      string // says from which revision it was made, when that is not the one before
	RestoreURL string
}

// A Saved is what the history knows of a revision.
type Saved struct {
	Number, Parent int64
	At             time.Time
	Summary        string
	Current        bool
}

// NewHistory makes the page of a project's revisions, newest first.
func NewHistory(id int64, name string, list []Saved) History {
	h := History{Project: name, ProjectURL: fmt.Sprintf("/projects/%d", id)}
	for _, r := range list {
		item := RevisionItem{Number: fmt.Sprint(r.Number), Saved: r.At.Local().Format("2 January 2006, 15:04:05"), Summary: r.Summary, Current: r.Current,
			RestoreURL: fmt.Sprintf("/projects/%d/restore/%d", id, r.Number)}
		if r.Parent > 0 && r.Parent != r.Number-1 {
			item.After = fmt.Sprintf("made from revision %d", r.Parent)
		}
		h.Revisions = append(h.Revisions, item)
	}
	return h
}
