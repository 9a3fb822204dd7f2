package store

import (
	"context"
	"errors"
	"io/fs"
	"os"
	"path/filepath"
	"reflect"
	"testing"
)

func TestBackupEqualsDatabase(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	rev := create(t, db, "A", `{"n":1}`)
	rev = save(t, db, rev, `{"n":2}`)
	create(t, db, "B", `{}`)
	step(t, db.Undo, rev.Project)

	dir := t.TempDir()
	if err := db.Backup(ctx, filepath.Join(dir, FileName)); err != nil {
		t.Fatal(err)
	}
	save(t, db, Revision{Project: rev.Project, Number: 1, Name: "later"}, `{"n":3}`)

	copied := openAt(t, dir)
	list, err := copied.Projects(ctx)
	if err != nil || len(list) != 2 || list[0].Name != "A" || list[0].Revision != 1 {
		t.Errorf("Projects in the backup: %+v, %v", list, err)
	}
	for number := int64(1); number <= 2; number++ {
		want, err1 := db.Revision(ctx, rev.Project, number)
		got, err2 := copied.Revision(ctx, rev.Project, number)
		if number == 1 {
			want.next = 2
		}
		if err := errors.Join(err1, err2); err != nil || !reflect.DeepEqual(got, want) {
			t.Errorf("revision %d in the backup %+v, want %+v, %v", number, got, want, err)
		}
	}
	if _, err := copied.Revision(ctx, rev.Project, 3); !errors.Is(err, ErrNotFound) {
		t.Errorf("what was saved after the backup: %v", err)
	}
	if schema(t, copied) != schema(t, db) {
		t.Error("the backup has another schema")
	}
}

func TestBackupKeepsOtherFiles(t *testing.T) {
	db := newDB(t)
	dir := t.TempDir()
	path := filepath.Join(dir, "mine.txt")
	if err := os.WriteFile(path, []byte("mine"), 0o600); err != nil {
		t.Fatal(err)
	}
	if err := db.Backup(t.Context(), path); !errors.Is(err, fs.ErrExist) {
		t.Errorf("Backup over a file: %v", err)
	}
	if got := string(read(t, path)); got != "mine" {
		t.Errorf("the file holds %q", got)
	}
	if err := db.Backup(t.Context(), filepath.Join(dir, "missing", "x.db")); !errors.Is(err, fs.ErrNotExist) {
		t.Errorf("Backup into no folder: %v", err)
	}
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	if err := db.Backup(ctx, filepath.Join(dir, "x.db")); !errors.Is(err, context.Canceled) {
		t.Errorf("Backup in a cancelled request: %v", err)
	}
	if found, _ := os.ReadDir(dir); len(found) != 1 {
		t.Errorf("left behind: %v", found)
	}
}
