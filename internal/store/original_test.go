package store

import (
	"bytes"
	"errors"
	"path/filepath"
	"reflect"
	"testing"
	"time"
)

func keep(t *testing.T, db *DB, project int64, name, content string) Original {
	t.Helper()
	o, err := db.Keep(t.Context(), project, name, []byte(content))
	if err != nil {
		t.Fatal(err)
	}
	return o
}

func TestOriginals(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	ctx := t.Context()
	a, b := create(t, db, "A", `{}`), create(t, db, "B", `{}`)
	o := keep(t, db, a.Project, "prop.csv", "\xff\x00J;CT\r\n")
	want := Original{ID: 1, Project: a.Project, Name: "prop.csv", Saved: time.Date(2030, 1, 2, 2, 4, 10, 0, time.UTC), Content: []byte("\xff\x00J;CT\r\n"), Size: 8}
	if !reflect.DeepEqual(o, want) {
		t.Errorf("Keep = %+v\nwant %+v", o, want)
	}
	if again := keep(t, db, a.Project, "prop.csv", "\xff\x00J;CT\r\n"); again.ID != o.ID {
		t.Errorf("the same file is kept twice: %+v", again)
	}
	other := keep(t, db, a.Project, "prop.csv", "changed")
	theirs := keep(t, db, b.Project, "prop.csv", "\xff\x00J;CT\r\n")
	if other.ID == o.ID || theirs.ID == o.ID {
		t.Errorf("different files are one: %+v, %+v", other, theirs)
	}
	if _, err := db.Original(ctx, b.Project, o.ID); !errors.Is(err, ErrNotFound) {
		t.Errorf("another project's file: %v", err)
	}
	if _, err := db.Keep(ctx, 99, "x", nil); !errors.Is(err, ErrNotFound) {
		t.Errorf("a file without a project: %v", err)
	}
	if _, err := db.Keep(ctx, a.Project, "x", make([]byte, MaxOriginal+1)); !errors.Is(err, ErrTooLarge) {
		t.Errorf("a file too large: %v", err)
	}

	in := Import{Original: o.ID, Variant: "a", Path: "airframe.polar", Header: "J;CT", Mapping: []byte(`{"sort":true}`)}
	rev, err := db.SaveImport(ctx, a.Project, a.Number, "A", []byte(`{"rows":3}`), "3 rows imported from prop.csv", in)
	if err != nil || rev.Number != 2 || string(rev.Doc) != `{"rows":3}` || rev.Summary != "3 rows imported from prop.csv" || !rev.CanUndo {
		t.Fatalf("SaveImport = %+v, %v", rev, err)
	}
	same, err := db.SaveImport(ctx, a.Project, rev.Number, "A", nil, "", in)
	if err != nil || same.Number != rev.Number {
		t.Errorf("the same rows again: %+v, %v", same, err)
	}
	for base, doc := range map[int64][]byte{1: []byte(`{}`), 3: nil} {
		var conflict *ConflictError
		if _, err := db.SaveImport(ctx, a.Project, base, "A", doc, "", in); !errors.As(err, &conflict) {
			t.Errorf("on revision %d: %v", base, err)
		}
	}
	if _, err := db.SaveImport(ctx, b.Project, 1, "B", []byte(`{}`), "", in); !errors.Is(err, ErrNotFound) {
		t.Errorf("from another project's file: %v", err)
	}
	if _, err := db.SaveImport(ctx, a.Project, 2, "A", []byte(`{}`), "", Import{Original: o.ID, Mapping: []byte("{")}); !errors.Is(err, ErrNotJSON) {
		t.Errorf("a mapping that is no JSON: %v", err)
	}
	if h, _ := db.Head(ctx, b.Project); h.Number != 1 {
		t.Errorf("a refused import saved revision %d", h.Number)
	}

	list, err := db.Imports(ctx, a.Project, "airframe.polar")
	if err != nil || len(list) != 2 || list[0].Saved.Before(list[1].Saved) {
		t.Fatalf("Imports = %+v, %v", list, err)
	}
	in.Revision, in.Name, in.Saved = 2, "prop.csv", list[1].Saved
	if !reflect.DeepEqual(list[1], in) {
		t.Errorf("Imports = %+v\nwant %+v", list[1], in)
	}
	if list, err := db.Imports(ctx, a.Project, "elsewhere"); err != nil || list != nil {
		t.Errorf("imports of another table: %+v, %v", list, err)
	}

	if err := db.Discard(ctx, a.Project, o.ID); !errors.Is(err, ErrFileUsed) {
		t.Errorf("a used file is removed: %v", err)
	}
	if err := db.Discard(ctx, b.Project, other.ID); !errors.Is(err, ErrNotFound) {
		t.Errorf("another project's file is removed: %v", err)
	}
	if err := db.Discard(ctx, a.Project, other.ID); err != nil {
		t.Error(err)
	}
	db.Close()
	db = openAt(t, dir)
	kept, err := db.Originals(ctx, a.Project)
	if err != nil || len(kept) != 1 || kept[0].ID != o.ID || kept[0].Content != nil || kept[0].Size != 8 || kept[0].Uses != 2 {
		t.Errorf("Originals = %+v, %v", kept, err)
	}
	if got, err := db.Original(ctx, a.Project, o.ID); err != nil || !bytes.Equal(got.Content, o.Content) {
		t.Errorf("Original = %+v, %v", got, err)
	}
	copied := t.TempDir()
	if err := db.Backup(ctx, filepath.Join(copied, FileName)); err != nil {
		t.Fatal(err)
	}
	if got, err := openAt(t, copied).Original(ctx, a.Project, o.ID); err != nil || !bytes.Equal(got.Content, o.Content) {
		t.Errorf("Original in a backup = %+v, %v", got, err)
	}
}
