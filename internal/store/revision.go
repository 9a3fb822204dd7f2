package store

import (
	"context"
	"database/sql"
	"time"
)

// MaxDoc is the size of the largest document that is stored, in bytes.
const MaxDoc = 4 << 20

// A Revision is one saved state of a project.
type Revision struct {
	Project, Number int64
	Parent          int64  // the revision that it was made from; 0 for the first
	Name            string // of the project at that time
	Doc             []byte // JSON; nil in a list
	Summary         string // what changed against Parent, in words
	Saved           time.Time
	Engine          string // version of the program that saved it
	Snapshot        string // the user's name for it; empty when it has none

	// Whether undo and redo lead somewhere when this revision is the head.
	CanUndo, CanRedo bool

	// The newest child, 0 for none. Redo goes there, since it is the child last
	// visited: a head is reached by saving it, when it is the newest child, or by
	// undo and redo; and redo cannot reach a child that has a newer sibling.
	next int64
}

// Next is the number of the revision to which redo leads when r is the head; 0 for none.
func (r Revision) Next() int64 { return r.next }

// Head returns the current revision of a project.
func (db *DB) Head(ctx context.Context, id int64) (Revision, error) {
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		rev, err = head(ctx, tx, id)
		return err
	})
	return rev, err
}

// Revision returns one revision of a project.
func (db *DB) Revision(ctx context.Context, id, number int64) (Revision, error) {
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		rev, err = revision(ctx, tx, id, number)
		return err
	})
	return rev, err
}

// Revisions returns all revisions of a project without their documents,
// newest first. It includes those on branches that undo no longer reaches.
func (db *DB) Revisions(ctx context.Context, id int64) ([]Revision, error) {
	var list []Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		list, err = revisions(ctx, tx, id, -1, "")
		return err
	})
	return list, err
}

// Save adds a revision after base and makes it the head. Base must be the
// present head, else Save returns a *ConflictError and saves nothing. To
// restore an old revision, save its document again.
func (db *DB) Save(ctx context.Context, id, base int64, name string, doc []byte, summary string) (Revision, error) {
	if err := check(name, doc); err != nil {
		return Revision{}, err
	}
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		rev, err = db.saveOn(ctx, tx, id, base, name, doc, summary)
		return err
	})
	return rev, err
}

// Undo makes the head's parent the head, or returns ErrNothingToUndo.
func (db *DB) Undo(ctx context.Context, id int64) (Revision, error) {
	return db.move(ctx, id, func(from Revision) (int64, error) {
		if !from.CanUndo {
			return 0, ErrNothingToUndo
		}
		return from.Parent, nil
	})
}

// Redo takes the last undo back, or returns ErrNothingToRedo. After a new
// edit, what was undone before it is in the history only.
func (db *DB) Redo(ctx context.Context, id int64) (Revision, error) {
	return db.move(ctx, id, func(from Revision) (int64, error) {
		if !from.CanRedo {
			return 0, ErrNothingToRedo
		}
		return from.next, nil
	})
}

func (db *DB) move(ctx context.Context, id int64, to func(from Revision) (int64, error)) (Revision, error) {
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		from, err := head(ctx, tx, id)
		if err != nil {
			return err
		}
		number, err := to(from)
		if err != nil {
			return err
		}
		rev, err = revision(ctx, tx, id, number)
		if err != nil {
			return err
		}
		return db.setHead(ctx, tx, rev)
	})
	return rev, err
}
