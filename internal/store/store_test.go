package store

import (
	"context"
	"os"
	"testing"
	"time"

	"legwright/migrations"
)

func TestMain(m *testing.M) {
	if dir := os.Getenv(writerFolder); dir != "" {
		writeForEver(dir)
	}
	os.Exit(m.Run())
}

// clock is a time that goes on by one second a reading.
func clock() func() time.Time {
	at := time.Date(2030, 1, 2, 3, 4, 5, 0, time.FixedZone("", 3600))
	return func() time.Time {
		at = at.Add(time.Second)
		return at
	}
}

func openAt(t *testing.T, dir string) *DB {
	t.Helper()
	db, err := open(t.Context(), dir, "test-1", migrations.Files, clock())
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { db.Close() })
	return db
}

func newDB(t *testing.T) *DB { return openAt(t, t.TempDir()) }

func create(t *testing.T, db *DB, name, doc string) Revision {
	t.Helper()
	rev, err := db.Create(t.Context(), name, []byte(doc), "New project")
	if err != nil {
		t.Fatal(err)
	}
	return rev
}

func save(t *testing.T, db *DB, on Revision, doc string) Revision {
	t.Helper()
	rev, err := db.Save(t.Context(), on.Project, on.Number, on.Name, []byte(doc), "Edit")
	if err != nil {
		t.Fatal(err)
	}
	return rev
}

func step(t *testing.T, f func(context.Context, int64) (Revision, error), id int64) Revision {
	t.Helper()
	rev, err := f(t.Context(), id)
	if err != nil {
		t.Fatal(err)
	}
	return rev
}
