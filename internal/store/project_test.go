package store

import (
	"errors"
	"reflect"
	"strings"
	"testing"
	"time"
)

func TestShelf(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	if empty, err := db.Empty(ctx); err != nil || !empty {
		t.Errorf("new database: Empty = %v, %v", empty, err)
	}
	if list, err := db.Projects(ctx); err != nil || len(list) != 0 {
		t.Errorf("new database: Projects = %v, %v", list, err)
	}
	one := create(t, db, "One", `{}`) // 03:04:06 +01:00, saved a second later
	create(t, db, "Two", `{}`)        // :08
	create(t, db, "Three", `{}`)      // :10
	save(t, db, one, `{"mass":1}`)    // revision :12, project :13
	if err := db.Archive(ctx, one.Project, true); err != nil {
		t.Fatal(err)
	}
	at := func(s int) time.Time { return time.Date(2030, 1, 2, 2, 4, s, 0, time.UTC) }
	want := []Project{
		{ID: 3, Name: "Three", Created: at(10), Updated: at(10), Revision: 1},
		{ID: 2, Name: "Two", Created: at(8), Updated: at(8), Revision: 1},
		{ID: 1, Name: "One", Created: at(6), Updated: at(13), Archived: true, Revision: 2},
	}
	got, err := db.Projects(ctx)
	if err != nil || !reflect.DeepEqual(got, want) {
		t.Errorf("Projects = %+v, %v\nwant %+v", got, err, want)
	}
	if err := db.Archive(ctx, one.Project, false); err != nil {
		t.Fatal(err)
	}
	if got, _ := db.Projects(ctx); got[0].Archived || got[0].ID != 1 {
		t.Errorf("back on the shelf: %+v", got)
	}
	for _, p := range got {
		if err := db.Archive(ctx, p.ID, true); err != nil {
			t.Fatal(err)
		}
	}
	if empty, err := db.Empty(ctx); err != nil || empty {
		t.Errorf("all archived: Empty = %v, %v", empty, err)
	}
}

func TestRename(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	first := create(t, db, "Old", `{"a":1}`)
	second, err := db.Rename(ctx, first.Project, "New", "Name Old → New")
	if err != nil {
		t.Fatal(err)
	}
	if second.Number != 2 || second.Parent != 1 || second.Name != "New" || string(second.Doc) != `{"a":1}` || second.Summary != "Name Old → New" {
		t.Errorf("after Rename: %+v", second)
	}
	again, err := db.Rename(ctx, first.Project, "New", "Name New → New")
	if err != nil || again.Number != 2 {
		t.Errorf("same name again: revision %d, %v", again.Number, err)
	}
	onShelf := func() string {
		list, err := db.Projects(ctx)
		if err != nil || len(list) != 1 {
			t.Fatal(list, err)
		}
		return list[0].Name
	}
	if got := onShelf(); got != "New" {
		t.Errorf("name on the shelf %q", got)
	}
	step(t, db.Undo, first.Project)
	if got := onShelf(); got != "Old" {
		t.Errorf("name on the shelf after undo %q", got)
	}
	step(t, db.Redo, first.Project)
	if got := onShelf(); got != "New" {
		t.Errorf("name on the shelf after redo %q", got)
	}
}

func TestRefusedContent(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	rev := create(t, db, "A", `{}`)
	fits := []byte(`"` + strings.Repeat("x", MaxDoc-2) + `"`)
	for _, c := range []struct {
		about, name string
		doc         []byte
		want        error
	}{
		{"no name", "", []byte(`{}`), ErrNoName},
		{"blank name", " \t", []byte(`{}`), ErrNoName},
		{"no document", "A", nil, ErrNotJSON},
		{"half a document", "A", []byte(`{"a":`), ErrNotJSON},
		{"JSON5", "A", []byte(`{a:1}`), ErrNotJSON},
		{"a byte too large", "A", append(fits, ' '), ErrTooLarge},
	} {
		if _, err := db.Create(ctx, c.name, c.doc, ""); !errors.Is(err, c.want) {
			t.Errorf("%s: Create: %v", c.about, err)
		}
		if _, err := db.Save(ctx, rev.Project, rev.Number, c.name, c.doc, ""); !errors.Is(err, c.want) {
			t.Errorf("%s: Save: %v", c.about, err)
		}
	}
	if _, err := db.Rename(ctx, rev.Project, " ", ""); !errors.Is(err, ErrNoName) {
		t.Errorf("Rename: %v", err)
	}
	if list, _ := db.Projects(ctx); len(list) != 1 || list[0].Revision != 1 {
		t.Errorf("refused content left %+v", list)
	}
	got, err := db.Save(ctx, rev.Project, rev.Number, "A", fits, "")
	if err != nil || string(got.Doc) != string(fits) {
		t.Errorf("the largest document: %d bytes back, %v", len(got.Doc), err)
	}
}

func TestNotFound(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	create(t, db, "A", `{}`)
	calls := map[string]func() error{
		"Head":      func() error { _, err := db.Head(ctx, 9); return err },
		"Revision":  func() error { _, err := db.Revision(ctx, 1, 2); return err },
		"Revisions": func() error { _, err := db.Revisions(ctx, 9); return err },
		"Save":      func() error { _, err := db.Save(ctx, 9, 1, "A", []byte(`{}`), ""); return err },
		"Undo":      func() error { _, err := db.Undo(ctx, 9); return err },
		"Redo":      func() error { _, err := db.Redo(ctx, 9); return err },
		"Rename":    func() error { _, err := db.Rename(ctx, 9, "B", ""); return err },
		"Archive":   func() error { return db.Archive(ctx, 9, true) },
	}
	for name, call := range calls {
		if err := call(); !errors.Is(err, ErrNotFound) {
			t.Errorf("%s of what is not there: %v", name, err)
		}
	}
}
