package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"strings"
	"unicode/utf8"
)

// MaxSnapshotName is the length of the longest name of a revision, in characters.
const MaxSnapshotName = 80

// ErrSnapshotName says that a name of a revision is too long.
var ErrSnapshotName = fmt.Errorf("the name of a revision has up to %d characters", MaxSnapshotName)

// NameRevision gives a revision the user's name for it, in place of the one it
// had; blank takes the name away. It makes no revision and moves no head.
func (db *DB) NameRevision(ctx context.Context, id, number int64, name string) error {
	name = strings.TrimSpace(name)
	if utf8.RuneCountInString(name) > MaxSnapshotName {
		return ErrSnapshotName
	}
	return db.inTx(ctx, func(tx *sql.Tx) error {
		var there bool
		err := tx.QueryRowContext(ctx, "SELECT true FROM revision WHERE project_id = ? AND number = ?", id, number).Scan(&there)
		switch {
		case errors.Is(err, sql.ErrNoRows):
			return ErrNotFound
		case err != nil:
			return err
		case name == "":
			_, err = tx.ExecContext(ctx, "DELETE FROM snapshot WHERE project_id = ? AND number = ?", id, number)
		default:
			_, err = tx.ExecContext(ctx, `INSERT INTO snapshot (project_id, number, name) VALUES (?, ?, ?)
				ON CONFLICT (project_id, number) DO UPDATE SET name = excluded.name`, id, number, name)
		}
		return err
	})
}

// Snapshots returns the revisions of a project that have a name, without their
// documents, newest first.
func (db *DB) Snapshots(ctx context.Context, id int64) ([]Revision, error) {
	var list []Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		list, err = revisions(ctx, tx, id, -1, "AND r.number IN (SELECT s.number FROM snapshot s WHERE s.project_id = r.project_id)")
		return err
	})
	return list, err
}

// RevisionsBefore returns up to limit revisions of a project with numbers below
// before, without their documents, newest first.
func (db *DB) RevisionsBefore(ctx context.Context, id, before int64, limit int) ([]Revision, error) {
	var list []Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		list, err = revisions(ctx, tx, id, limit, "AND r.number < ?", before)
		return err
	})
	return list, err
}
