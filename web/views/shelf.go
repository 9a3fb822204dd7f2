package views

import (
	"fmt"
	"time"
)

// A Shelf is the list of projects.
type Shelf struct {
	Projects []ShelfItem
	Archived []ShelfItem
	Error    string
	Typed    string
	File     string   // that was refused
	Faults   []string // of that file
}

// A ShelfItem is one project on the shelf.
type ShelfItem struct {
	Name, URL, Changed, Revisions string
}

// A Listed is what the shelf knows of a project.
type Listed struct {
	ID       int64
	Name     string
	Updated  time.Time
	Revision int64
	Archived bool
}

// NewShelf makes the page of the projects.
func NewShelf(list []Listed) Shelf {
	var s Shelf
	for _, p := range list {
		item := ShelfItem{Name: p.Name, URL: fmt.Sprintf("/projects/%d", p.ID), Changed: p.Updated.Local().Format("2 January 2006, 15:04"), Revisions: fmt.Sprintf("revision %d", p.Revision)}
		if p.Archived {
			s.Archived = append(s.Archived, item)
		} else {
			s.Projects = append(s.Projects, item)
		}
	}
	return s
}

// described lists the ids of the texts that explain the name of a new project.
func (s Shelf) described() string {
	if s.Error != "" {
		return "new-error new-hint"
	}
	return "new-hint"
}

// fileDescribed lists the ids of the texts that explain the file to import.
func (s Shelf) fileDescribed() string {
	if len(s.Faults) > 0 {
		return "import-error import-hint"
	}
	return "import-hint"
}
