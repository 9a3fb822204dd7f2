package store

import (
	"errors"
	"reflect"
	"strings"
	"testing"
)

func TestSnapshots(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	ctx := t.Context()
	r1 := create(t, db, "A", `1`)
	r2 := save(t, db, r1, `2`)
	r3 := save(t, db, r2, `3`)
	other := create(t, db, "B", `1`)
	name := func(number int64, name string) {
		t.Helper()
		if err := db.NameRevision(ctx, r1.Project, number, name); err != nil {
			t.Fatal(err)
		}
	}
	names := func(id int64) []string {
		t.Helper()
		list, err := db.Snapshots(ctx, id)
		if err != nil {
			t.Fatal(err)
		}
		var out []string
		for _, r := range list {
			if r.Doc != nil {
				t.Error("a document in a list")
			}
			out = append(out, r.Snapshot)
		}
		return out
	}
	if got := names(r1.Project); got != nil {
		t.Errorf("before any: %q", got)
	}
	name(1, "As drawn")
	name(3, "  With the bigger wing ")
	name(2, "In between")
	name(2, "")
	name(1, "As first drawn")
	want := []string{"With the bigger wing", "As first drawn"}
	if got := names(r1.Project); !reflect.DeepEqual(got, want) {
		t.Errorf("%q, want %q", got, want)
	}
	if got := names(other.Project); got != nil {
		t.Errorf("of another project: %q", got)
	}

	// A name is no edit: the head, undo and the number of revisions are as before, also after a restart.
	db.Close()
	db = openAt(t, dir)
	if got := names(r1.Project); !reflect.DeepEqual(got, want) {
		t.Errorf("after a restart %q", got)
	}
	if h, err := db.Head(ctx, r1.Project); err != nil || h.Number != r3.Number || h.Snapshot != "With the bigger wing" || h.CanRedo {
		t.Errorf("head %+v, %v", h, err)
	}
	if list, err := db.Revisions(ctx, r1.Project); err != nil || len(list) != 3 || list[1].Snapshot != "" || list[2].Snapshot != "As first drawn" {
		t.Errorf("%+v, %v", list, err)
	}

	for _, c := range []struct{ id, number int64 }{{r1.Project, 4}, {r1.Project, 0}, {99, 1}} {
		for _, text := range []string{"x", ""} {
			if err := db.NameRevision(ctx, c.id, c.number, text); !errors.Is(err, ErrNotFound) {
				t.Errorf("revision %d of project %d, named %q: %v", c.number, c.id, text, err)
			}
		}
	}
	if err := db.NameRevision(ctx, r1.Project, 1, strings.Repeat("ö", MaxSnapshotName)); err != nil {
		t.Error(err)
	}
	if err := db.NameRevision(ctx, r1.Project, 1, strings.Repeat("ö", MaxSnapshotName+1)); !errors.Is(err, ErrSnapshotName) {
		t.Errorf("a longer name: %v", err)
	}
	if _, err := db.Snapshots(ctx, 99); !errors.Is(err, ErrNotFound) {
		t.Errorf("of no project: %v", err)
	}
}

// Page after page lists every revision once, newest first.
func TestRevisionsBefore(t *testing.T) {
	db := newDB(t)
	rev := create(t, db, "A", `1`)
	for range 22 {
		rev = save(t, db, rev, `2`)
	}
	want := int64(23)
	for before := int64(1 << 40); want > 0; {
		list, err := db.RevisionsBefore(t.Context(), rev.Project, before, 5)
		if err != nil || len(list) == 0 {
			t.Fatalf("before %d: %v, %v", before, list, err)
		}
		for _, r := range list {
			if r.Number != want {
				t.Fatalf("revision %d, want %d", r.Number, want)
			}
			want--
		}
		before = list[len(list)-1].Number
	}
	if list, err := db.RevisionsBefore(t.Context(), rev.Project, 1, 5); err != nil || len(list) != 0 {
		t.Errorf("before the first: %v, %v", list, err)
	}
	if _, err := db.RevisionsBefore(t.Context(), 99, 1, 5); !errors.Is(err, ErrNotFound) {
		t.Errorf("of no project: %v", err)
	}
}
