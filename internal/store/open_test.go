package store

import (
	"bytes"
	"database/sql"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"
	"testing/fstest"

	"legwright/migrations"
)

func TestOddFolderNames(t *testing.T) {
	for _, name := range []string{"my data", "50%", "%41", "a#b", "a?c=d", "ö ß", "file:x", "a&mode=memory", `q'"q`} {
		dir := filepath.Join(t.TempDir(), name, "deeper")
		db := openAt(t, dir)
		create(t, db, "A", `{}`)
		if err := db.Backup(t.Context(), filepath.Join(dir, "copy "+name+".db")); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		if err := db.Close(); err != nil {
			t.Errorf("%s: %v", name, err)
		}
		found, err := filepath.Glob(filepath.Join(filepath.Dir(filepath.Dir(dir)), "*", "*", "*"))
		if err != nil || len(found) != 3 {
			t.Errorf("%s: files %q, %v; want the database, its copy and the lock", name, found, err)
		}
		if list, err := openAt(t, dir).Projects(t.Context()); err != nil || len(list) != 1 {
			t.Errorf("%s: opened again: %v, %v", name, list, err)
		}
	}
}

func TestFilesArePrivate(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "new", "data")
	db := openAt(t, dir)
	create(t, db, "A", `{}`)
	if err := db.Backup(t.Context(), filepath.Join(dir, "copy.db")); err != nil {
		t.Fatal(err)
	}
	for _, name := range []string{"", FileName, FileName + "-wal", FileName + "-shm", "legwright.lock", "copy.db"} {
		st, err := os.Stat(filepath.Join(dir, name))
		if err != nil {
			t.Error(err)
		} else if st.Mode().Perm()&0o077 != 0 {
			t.Errorf("%q can be read by others: %v", name, st.Mode())
		}
	}
}

func TestSecondInstance(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	_, err := Open(t.Context(), dir, "test-1")
	if !errors.Is(err, ErrInUse) || !strings.Contains(err.Error(), "already using the data folder "+dir) {
		t.Errorf("second instance: %v", err)
	}
	db.Close()
	openAt(t, dir)
}

func TestSettingsReadBack(t *testing.T) {
	db := newDB(t)
	if _, err := db.sql.Exec("PRAGMA synchronous = NORMAL"); err != nil {
		t.Fatal(err)
	}
	if err := db.checkSettings(t.Context()); err == nil || !strings.Contains(err.Error(), "its synchronous is 1, not 2") {
		t.Errorf("with synchronous NORMAL: %v", err)
	}
}

func TestNewerDatabase(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	if _, err := db.sql.Exec("INSERT INTO goose_db_version (version_id, is_applied) VALUES (99, 1)"); err != nil {
		t.Fatal(err)
	}
	db.Close()
	before := read(t, filepath.Join(dir, FileName))
	_, err := Open(t.Context(), dir, "test-1")
	if !errors.Is(err, ErrNewer) {
		t.Fatalf("newer database: %v", err)
	}
	for _, part := range []string{filepath.Join(dir, FileName), "schema 99", fmt.Sprintf("up to %d", newest(t)), "Use the newer program"} {
		if !strings.Contains(err.Error(), part) {
			t.Errorf("%q lacks %q", err, part)
		}
	}
	if !bytes.Equal(before, read(t, filepath.Join(dir, FileName))) {
		t.Error("the newer database was changed")
	}
}

func TestDamagedFile(t *testing.T) {
	fresh := func(t *testing.T) (dir, path string) {
		dir = t.TempDir()
		db := openAt(t, dir)
		rev := create(t, db, "A", `{}`)
		for range 50 {
			rev = save(t, db, rev, `{"text":"`+strings.Repeat("x", 300)+`"}`)
		}
		db.Close()
		return dir, filepath.Join(dir, FileName)
	}
	for name, damage := range map[string]func(b []byte) []byte{
		"header":     func(b []byte) []byte { b[0] ^= 0xff; return b },
		"every page": func(b []byte) []byte { return flip(b, 8) },
		"cut off":    func(b []byte) []byte { return b[:len(b)-8192] },
		"document":   func(b []byte) []byte { return bytes.Replace(b, []byte(`{"text"`), []byte(`{'text"`), -1) },
	} {
		t.Run(name, func(t *testing.T) {
			dir, path := fresh(t)
			bad := damage(read(t, path))
			if err := os.WriteFile(path, bad, 0o600); err != nil {
				t.Fatal(err)
			}
			_, err := Open(t.Context(), dir, "test-1")
			var damaged *DamagedError
			if !errors.As(err, &damaged) || !strings.Contains(err.Error(), "the database "+path+" is damaged (") {
				t.Fatalf("damaged file: %v", err)
			}
			if !bytes.Equal(bad, read(t, path)) {
				t.Error("the damaged file was changed")
			}
		})
	}
}

// flip changes one byte in each page after the first, at an offset in it.
func flip(b []byte, offset int) []byte {
	for at := 4096 + offset; at < len(b); at += 4096 {
		b[at] ^= 0x55
	}
	return b
}

func TestBrokenReference(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	create(t, db, "A", `{}`)
	db.Close()
	raw, err := sql.Open("sqlite3", filepath.Join(dir, FileName))
	if err != nil {
		t.Fatal(err)
	}
	if _, err := raw.Exec("UPDATE project SET head = 7"); err != nil {
		t.Fatal(err)
	}
	raw.Close()
	_, err = Open(t.Context(), dir, "test-1")
	var damaged *DamagedError
	if !errors.As(err, &damaged) || !strings.Contains(err.Error(), "row 1 of table project refers to a missing row of table revision") {
		t.Errorf("head without revision: %v", err)
	}
}

func read(t *testing.T, path string) []byte {
	t.Helper()
	b, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	return b
}

// numbers are those of the real migrations, by the names of the files, rising.
func numbers(t *testing.T) []int {
	t.Helper()
	names, err := fs.Glob(migrations.Files, "*.sql")
	if err != nil || len(names) == 0 {
		t.Fatal(names, err)
	}
	var list []int
	for _, name := range names {
		n, err := strconv.Atoi(name[:5])
		if err != nil {
			t.Fatal(err)
		}
		list = append(list, n)
	}
	slices.Sort(list)
	return list
}

// newest is the number of the present schema.
func newest(t *testing.T) int { return slices.Max(numbers(t)) }

// firstSteps are the real migrations up to number n: the program of that day.
func firstSteps(t *testing.T, n int) fs.FS {
	t.Helper()
	names, err := fs.Glob(migrations.Files, "*.sql")
	if err != nil {
		t.Fatal(err)
	}
	steps := fstest.MapFS{}
	for _, name := range names {
		if number, err := strconv.Atoi(name[:5]); err != nil || number > n {
			continue
		}
		b, err := migrations.Files.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		steps[name] = &fstest.MapFile{Data: b}
	}
	return steps
}

// TestEarlierSchemas: what a program of each earlier schema saved is there after the steps since.
func TestEarlierSchemas(t *testing.T) {
	all := numbers(t)
	for _, n := range all[:len(all)-1] {
		dir := t.TempDir()
		db, err := open(t.Context(), dir, "test-0", firstSteps(t, n), clock())
		if err != nil {
			t.Fatal(err)
		}
		// The present program reads what that schema has not, so this is written as the earlier one did: two revisions, the second undone.
		if _, err := db.sql.Exec(`BEGIN;
			INSERT INTO project (id, name, created, updated, head) VALUES (1, 'A', '2030-01-02T02:04:07.000Z', '2030-01-02T02:04:08.000Z', 1);
			INSERT INTO revision (project_id, number, parent, name, summary, saved, engine, doc) VALUES
				(1, 1, NULL, 'A', 'begun', '2030-01-02T02:04:07.000Z', 'test-0', '{"n":1}'),
				(1, 2, 1, 'A', 'changed', '2030-01-02T02:04:08.000Z', 'test-0', '{"n":2}');
			COMMIT`); err != nil {
			t.Fatal(err)
		}
		if err := db.Close(); err != nil {
			t.Fatal(err)
		}
		db = openAt(t, dir)
		if r, err := db.Head(t.Context(), 1); err != nil || string(r.Doc) != `{"n":1}` || !r.CanRedo || r.Engine != "test-0" {
			t.Errorf("from schema %d: %+v, %v", n, r, err)
		}
		save(t, db, Revision{Project: 1, Number: 1, Name: "A"}, `{"n":3}`)
		if got, want := schema(t, db), string(read(t, "testdata/schema.sql")); got != want {
			t.Errorf("from schema %d the schema is\n%s", n, got)
		}
		if found, _ := filepath.Glob(filepath.Join(dir, fmt.Sprintf("backup-%d-*.db", n))); len(found) != 1 {
			t.Errorf("from schema %d backups %q", n, found)
		}
	}
}

// withStep is the real migrations and one more.
func withStep(t *testing.T, text string) fs.FS {
	t.Helper()
	names, err := fs.Glob(migrations.Files, "*.sql")
	if err != nil || len(names) == 0 {
		t.Fatal(names, err)
	}
	steps := fstest.MapFS{}
	for _, name := range names {
		b, err := migrations.Files.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		steps[name] = &fstest.MapFile{Data: b}
	}
	steps["00999_next.sql"] = &fstest.MapFile{Data: []byte("-- +goose Up\n" + text)}
	return steps
}

func TestMigrationMakesBackup(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	create(t, db, "A", `{}`)
	db.Close()
	db, err := open(t.Context(), dir, "test-2", withStep(t, "CREATE TABLE more (x INTEGER) STRICT;"), clock())
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	if _, err := db.sql.Exec("INSERT INTO more VALUES (1)"); err != nil {
		t.Error(err)
	}
	backup := filepath.Join(dir, fmt.Sprintf("backup-%d-20300102T020406.000Z.db", newest(t)))
	old := t.TempDir()
	if err := os.WriteFile(filepath.Join(old, FileName), read(t, backup), 0o600); err != nil {
		t.Fatal(err)
	}
	// The older program opens the backup.
	if list, err := openAt(t, old).Projects(t.Context()); err != nil || len(list) != 1 {
		t.Errorf("backup holds %v, %v", list, err)
	}
	if found, _ := filepath.Glob(filepath.Join(dir, "backup*")); len(found) != 1 {
		t.Errorf("backups %q", found)
	}
}

func TestFailedMigration(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	create(t, db, "A", `{}`)
	db.Close()
	_, err := open(t.Context(), dir, "test-2", withStep(t, "CREATE TABLE half (x INTEGER);\nDELETE FROM revision;\nINSERT INTO nowhere VALUES (1);"), clock())
	if err == nil {
		t.Fatal("a failing step was taken")
	}
	for _, part := range []string{filepath.Join(dir, FileName), fmt.Sprintf("from schema %d to 999", newest(t)), "no such table: nowhere", "a backup was made as " + dir} {
		if !strings.Contains(err.Error(), part) {
			t.Errorf("%q lacks %q", err, part)
		}
	}
	db = openAt(t, dir)
	if got := schema(t, db); strings.Contains(got, "half") {
		t.Errorf("the failing step left a table: %s", got)
	}
	if r, err := db.Head(t.Context(), 1); err != nil || string(r.Doc) != `{}` {
		t.Errorf("after the failing step: %+v, %v", r, err)
	}
}
