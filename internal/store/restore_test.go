package store

import (
	"errors"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// changedAfterBackup makes a data folder whose project was changed after the backup that it returns.
func changedAfterBackup(t *testing.T) (dir, backup string) {
	t.Helper()
	dir = t.TempDir()
	db := openAt(t, dir)
	rev := create(t, db, "A", `{"n":1}`)
	backup, err := db.KeepBackup(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	save(t, db, rev, `{"n":2}`)
	if err := db.Close(); err != nil {
		t.Fatal(err)
	}
	return dir, backup
}

// latest is the document of project 1 in the folder.
func latest(t *testing.T, dir string) string {
	t.Helper()
	db := openAt(t, dir)
	defer db.Close()
	rev, err := db.Head(t.Context(), 1)
	if err != nil {
		t.Fatal(err)
	}
	return string(rev.Doc)
}

func TestRestore(t *testing.T) {
	dir, backup := changedAfterBackup(t)
	kept, err := Restore(t.Context(), dir, backup, "test-1")
	if err != nil {
		t.Fatal(err)
	}
	if got := latest(t, dir); got != `{"n":1}` {
		t.Errorf("after restoring the project is %s", got)
	}
	// What was there before is kept and can itself be restored.
	if _, err := Restore(t.Context(), dir, kept, "test-1"); err != nil {
		t.Fatal(err)
	}
	if got := latest(t, dir); got != `{"n":2}` {
		t.Errorf("after taking the restoring back the project is %s", got)
	}
	if left, _ := filepath.Glob(filepath.Join(dir, ".restore-*")); len(left) > 0 {
		t.Errorf("left behind: %v", left)
	}
}

func TestRestoreIntoNothing(t *testing.T) {
	_, backup := changedAfterBackup(t)
	dir := filepath.Join(t.TempDir(), "new")
	kept, err := Restore(t.Context(), dir, backup, "test-1")
	if err != nil || kept != "" {
		t.Fatalf("%q, %v", kept, err)
	}
	if got := latest(t, dir); got != `{"n":1}` {
		t.Errorf("the project is %s", got)
	}
}

// A database that cannot be opened any more is the reason to restore one.
func TestRestoreOverDamage(t *testing.T) {
	dir, backup := changedAfterBackup(t)
	place := filepath.Join(dir, FileName)
	for _, end := range []string{"", "-wal", "-shm"} {
		if err := os.WriteFile(place+end, []byte("ruined "+end), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	kept, err := Restore(t.Context(), dir, backup, "test-1")
	if err != nil {
		t.Fatal(err)
	}
	if got := latest(t, dir); got != `{"n":1}` {
		t.Errorf("the project is %s", got)
	}
	for _, end := range []string{"", "-wal", "-shm"} {
		if got := string(read(t, kept+end)); got != "ruined "+end {
			t.Errorf("of the ruined file%s is kept %q", end, got)
		}
	}
}

func TestRestoreRefuses(t *testing.T) {
	dir, backup := changedAfterBackup(t)
	whole := read(t, backup)
	scratch := t.TempDir()
	file := func(name string, content []byte) string {
		path := filepath.Join(scratch, name)
		if err := os.WriteFile(path, content, 0o600); err != nil {
			t.Fatal(err)
		}
		return path
	}
	damaged := append([]byte{}, whole...)
	for i := 4096; i < 8192; i++ {
		damaged[i] = 0xa5
	}
	empty := openAt(t, filepath.Join(scratch, "empty"))
	if err := empty.Close(); err != nil {
		t.Fatal(err)
	}
	for _, test := range []struct{ file, says string }{
		{file("text.db", []byte("not a database at all, but long enough to be read as a header of one")), "damaged"},
		{file("none.db", nil), "empty"},
		{file("half.db", whole[:len(whole)/2]), "no backup"},
		{file("damaged.db", damaged), "damaged"},
		{filepath.Join(scratch, "empty", FileName), "no project"},
		{filepath.Join(scratch, "missing.db"), "cannot be read"},
		{scratch, "cannot be read"},
	} {
		kept, err := Restore(t.Context(), dir, test.file, "test-1")
		if err == nil || !strings.Contains(err.Error(), test.says) || kept != "" {
			t.Errorf("%s: %q, %v; want %q", filepath.Base(test.file), kept, err, test.says)
		}
		if got := latest(t, dir); got != `{"n":2}` {
			t.Fatalf("%s: the project is %s now", filepath.Base(test.file), got)
		}
	}
	open := openAt(t, dir)
	if _, err := Restore(t.Context(), dir, backup, "test-1"); !errors.Is(err, ErrInUse) {
		t.Errorf("while the folder is open: %v", err)
	}
	if err := open.Close(); err != nil {
		t.Fatal(err)
	}
	if kept, _ := filepath.Glob(filepath.Join(dir, "before-restore-*")); len(kept) > 0 {
		t.Errorf("refused, and yet set aside: %v", kept)
	}
}

func TestBackups(t *testing.T) {
	db := newDB(t)
	if list, err := db.Backups(); err != nil || len(list) != 0 {
		t.Errorf("of a new database: %v, %v", list, err)
	}
	create(t, db, "A", `{}`)
	first, err := db.KeepBackup(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	second, err := db.KeepBackup(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	if err := os.WriteFile(filepath.Join(filepath.Dir(first), "other.txt"), nil, 0o600); err != nil {
		t.Fatal(err)
	}
	list, err := db.Backups()
	if err != nil || len(list) != 2 || list[0].Name != filepath.Base(second) || list[1].Name != filepath.Base(first) || list[0].Size == 0 || !list[0].At.After(list[1].At) {
		t.Errorf("Backups: %+v, %v", list, err)
	}
	f, err := db.OpenBackup(list[0].Name)
	if err != nil {
		t.Fatal(err)
	}
	f.Close()
	for _, name := range []string{"other.txt", "../" + FileName, "", "legwright-x.db"} {
		if f, err := db.OpenBackup(name); !errors.Is(err, ErrNotFound) {
			t.Errorf("%q opens: %v, %v", name, f, err)
		}
	}
}
