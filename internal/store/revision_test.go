package store

import (
	"context"
	"errors"
	"fmt"
	"reflect"
	"sync"
	"testing"
	"time"

	"pgregory.net/rapid"
)

func TestSaveAndRead(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	first := create(t, db, "A", `{"mass": 398}`)
	second, err := db.Save(ctx, first.Project, 1, "B", []byte(`{"mass": 420}`), "Empty mass 398 kg → 420 kg")
	if err != nil {
		t.Fatal(err)
	}
	want := Revision{Project: 1, Number: 2, Parent: 1, Name: "B", Doc: []byte(`{"mass": 420}`), Summary: "Empty mass 398 kg → 420 kg",
		Saved: time.Date(2030, 1, 2, 2, 4, 8, 0, time.UTC), Engine: "test-1", CanUndo: true}
	if !reflect.DeepEqual(second, want) {
		t.Errorf("Save = %+v\nwant %+v", second, want)
	}
	if head, err := db.Head(ctx, 1); err != nil || !reflect.DeepEqual(head, want) {
		t.Errorf("Head = %+v, %v\nwant %+v", head, err, want)
	}
	wantFirst := Revision{Project: 1, Number: 1, Name: "A", Doc: []byte(`{"mass": 398}`), Summary: "New project",
		Saved: time.Date(2030, 1, 2, 2, 4, 7, 0, time.UTC), Engine: "test-1", CanRedo: true, next: 2}
	if got, err := db.Revision(ctx, 1, 1); err != nil || !reflect.DeepEqual(got, wantFirst) {
		t.Errorf("Revision 1 = %+v, %v\nwant %+v", got, err, wantFirst)
	}
	want.Doc, wantFirst.Doc = nil, nil
	if got, err := db.Revisions(ctx, 1); err != nil || !reflect.DeepEqual(got, []Revision{want, wantFirst}) {
		t.Errorf("Revisions = %+v, %v", got, err)
	}
}

func TestUndoRedoBranch(t *testing.T) {
	dir := t.TempDir()
	db := openAt(t, dir)
	ctx := t.Context()
	r1 := create(t, db, "A", `1`)
	id := r1.Project
	if _, err := db.Undo(ctx, id); !errors.Is(err, ErrNothingToUndo) {
		t.Errorf("Undo of the first revision: %v", err)
	}
	if _, err := db.Redo(ctx, id); !errors.Is(err, ErrNothingToRedo) {
		t.Errorf("Redo without an undo: %v", err)
	}
	r2 := save(t, db, r1, `2`)
	save(t, db, r2, `3`)
	if r := step(t, db.Undo, id); string(r.Doc) != "2" || !r.CanUndo || !r.CanRedo {
		t.Errorf("first undo: %+v", r)
	}
	if r := step(t, db.Undo, id); string(r.Doc) != "1" || r.CanUndo || !r.CanRedo {
		t.Errorf("second undo: %+v", r)
	}

	db.Close()
	db = openAt(t, dir)
	if r, err := db.Head(ctx, id); err != nil || r.Number != 1 || !r.CanRedo {
		t.Errorf("head after a restart: %+v, %v", r, err)
	}
	r2 = step(t, db.Redo, id)
	if string(r2.Doc) != "2" || !r2.CanRedo {
		t.Errorf("redo: %+v", r2)
	}

	r4 := save(t, db, r2, `4`)
	if r4.Number != 4 || r4.Parent != 2 || r4.CanRedo {
		t.Errorf("edit after an undo: %+v", r4)
	}
	if _, err := db.Redo(ctx, id); !errors.Is(err, ErrNothingToRedo) {
		t.Errorf("Redo after a new edit: %v", err)
	}
	step(t, db.Undo, id)
	if r := step(t, db.Redo, id); r.Number != 4 {
		t.Errorf("redo takes the branch %d that was left earlier", r.Number)
	}
	if r, err := db.Revision(ctx, id, 3); err != nil || string(r.Doc) != "3" {
		t.Errorf("the branch that was left: %+v, %v", r, err)
	}
}

func TestConflict(t *testing.T) {
	db := newDB(t)
	r1 := create(t, db, "A", `1`)
	save(t, db, r1, `2`)
	for _, base := range []int64{0, 1, 3} {
		_, err := db.Save(t.Context(), r1.Project, base, "A", []byte(`3`), "")
		var conflict *ConflictError
		if !errors.As(err, &conflict) || conflict.Head != 2 || conflict.Base != base {
			t.Errorf("Save on %d: %v", base, err)
		}
	}
	if r, _ := db.Head(t.Context(), r1.Project); r.Number != 2 {
		t.Errorf("head %d after conflicts", r.Number)
	}
}

// Of several pages that edit the same revision at once, one gets through.
func TestConcurrentSaves(t *testing.T) {
	db := newDB(t)
	r1 := create(t, db, "A", `1`)
	var wg sync.WaitGroup
	var mu sync.Mutex
	saved, refused := 0, 0
	for i := range 8 {
		wg.Go(func() {
			_, err := db.Save(t.Context(), r1.Project, 1, "A", fmt.Appendf(nil, "%d", i), "")
			mu.Lock()
			defer mu.Unlock()
			var conflict *ConflictError
			switch {
			case err == nil:
				saved++
			case errors.As(err, &conflict):
				refused++
			default:
				t.Error(err)
			}
		})
	}
	wg.Wait()
	if saved != 1 || refused != 7 {
		t.Errorf("%d saved, %d refused", saved, refused)
	}
}

func TestCancelled(t *testing.T) {
	db := newDB(t)
	r1 := create(t, db, "A", `1`)
	ctx, cancel := context.WithCancel(t.Context())
	cancel()
	if _, err := db.Save(ctx, r1.Project, 1, "A", []byte(`2`), ""); !errors.Is(err, context.Canceled) {
		t.Errorf("Save in a cancelled request: %v", err)
	}
	if r := save(t, db, r1, `3`); r.Number != 2 {
		t.Errorf("the save after it has number %d", r.Number)
	}
}

// Undo and redo agree with two stacks, which is how a user thinks of them.
func TestUndoIsTwoStacks(t *testing.T) {
	db := newDB(t)
	ctx := t.Context()
	rapid.Check(t, func(t *rapid.T) {
		rev, err := db.Create(ctx, "A", []byte(`0`), "")
		if err != nil {
			t.Fatal(err)
		}
		current, undo, redo := "0", []string{}, []string{}
		edits := 0
		for range rapid.IntRange(1, 25).Draw(t, "steps") {
			switch rapid.SampledFrom([]string{"save", "undo", "undo", "redo", "redo"}).Draw(t, "step") {
			case "save":
				edits++
				undo, redo, current = append(undo, current), nil, fmt.Sprint(edits)
				rev, err = db.Save(ctx, rev.Project, rev.Number, "A", []byte(current), "")
			case "undo":
				if len(undo) == 0 {
					if _, err := db.Undo(ctx, rev.Project); !errors.Is(err, ErrNothingToUndo) {
						t.Fatal(err)
					}
					continue
				}
				redo, current, undo = append(redo, current), undo[len(undo)-1], undo[:len(undo)-1]
				rev, err = db.Undo(ctx, rev.Project)
			case "redo":
				if len(redo) == 0 {
					if _, err := db.Redo(ctx, rev.Project); !errors.Is(err, ErrNothingToRedo) {
						t.Fatal(err)
					}
					continue
				}
				undo, current, redo = append(undo, current), redo[len(redo)-1], redo[:len(redo)-1]
				rev, err = db.Redo(ctx, rev.Project)
			}
			if err != nil {
				t.Fatal(err)
			}
			if string(rev.Doc) != current || rev.CanUndo != (len(undo) > 0) || rev.CanRedo != (len(redo) > 0) {
				t.Fatalf("document %s, undo %v, redo %v; want %s with %v before and %v after", rev.Doc, rev.CanUndo, rev.CanRedo, current, undo, redo)
			}
		}
		if list, err := db.Revisions(ctx, rev.Project); err != nil || len(list) != edits+1 {
			t.Fatalf("%d revisions after %d edits, %v", len(list), edits, err)
		}
	})
}
