package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"strings"
	"time"
)

// check refuses what must not be saved. Whether doc is JSON is left to the
// CHECK of its column.
func check(name string, doc []byte) error {
	if strings.TrimSpace(name) == "" {
		return ErrNoName
	}
	if len(doc) > MaxDoc {
		return fmt.Errorf("%w: it has %d bytes, the limit is %d", ErrTooLarge, len(doc), MaxDoc)
	}
	return nil
}

// columns ends with the document, which a list leaves out.
const columns = `r.project_id, r.number, coalesce(r.parent, 0), r.name, r.summary, r.saved, r.engine,
	coalesce((SELECT max(c.number) FROM revision c WHERE c.project_id = r.project_id AND c.parent = r.number), 0),
	coalesce((SELECT s.name FROM snapshot s WHERE s.project_id = r.project_id AND s.number = r.number), '')`

func headNumber(ctx context.Context, tx *sql.Tx, id int64) (int64, error) {
	var number int64
	err := tx.QueryRowContext(ctx, "SELECT head FROM project WHERE id = ?", id).Scan(&number)
	if errors.Is(err, sql.ErrNoRows) {
		return 0, ErrNotFound
	}
	return number, err
}

func head(ctx context.Context, tx *sql.Tx, id int64) (Revision, error) {
	number, err := headNumber(ctx, tx, id)
	if err != nil {
		return Revision{}, err
	}
	return revision(ctx, tx, id, number)
}

// headAt is the head, which must be the revision base.
func headAt(ctx context.Context, tx *sql.Tx, id, base int64) (Revision, error) {
	number, err := headNumber(ctx, tx, id)
	if err != nil {
		return Revision{}, err
	}
	if number != base {
		return Revision{}, &ConflictError{Base: base, Head: number}
	}
	return revision(ctx, tx, id, number)
}

// saveOn adds a revision after base, which must be the head.
func (db *DB) saveOn(ctx context.Context, tx *sql.Tx, id, base int64, name string, doc []byte, summary string) (Revision, error) {
	if _, err := headAt(ctx, tx, id, base); err != nil {
		return Revision{}, err
	}
	return db.addRevision(ctx, tx, Revision{Project: id, Parent: base, Name: name, Doc: doc, Summary: summary})
}

func revision(ctx context.Context, tx *sql.Tx, id, number int64) (Revision, error) {
	row := tx.QueryRowContext(ctx, "SELECT "+columns+", r.doc FROM revision r WHERE r.project_id = ? AND r.number = ?", id, number)
	var doc []byte
	rev, err := scanRevision(row, &doc)
	rev.Doc = doc
	if errors.Is(err, sql.ErrNoRows) {
		err = ErrNotFound
	}
	return rev, err
}

// revisions lists those of a project that a further condition allows, newest
// first, up to limit of them; a negative limit is none.
func revisions(ctx context.Context, tx *sql.Tx, id int64, limit int, and string, args ...any) ([]Revision, error) {
	if _, err := headNumber(ctx, tx, id); err != nil {
		return nil, err
	}
	args = append(append([]any{id}, args...), limit)
	rows, err := tx.QueryContext(ctx, "SELECT "+columns+" FROM revision r WHERE r.project_id = ? "+and+" ORDER BY r.number DESC LIMIT ?", args...)
	if err != nil {
		return nil, err
	}
	defer rows.Close()
	var list []Revision
	for rows.Next() {
		rev, err := scanRevision(rows)
		if err != nil {
			return nil, err
		}
		list = append(list, rev)
	}
	return list, rows.Err()
}

func scanRevision(row interface{ Scan(...any) error }, more ...any) (Revision, error) {
	var rev Revision
	var saved string
	into := append([]any{&rev.Project, &rev.Number, &rev.Parent, &rev.Name, &rev.Summary, &saved, &rev.Engine, &rev.next, &rev.Snapshot}, more...)
	if err := row.Scan(into...); err != nil {
		return Revision{}, err
	}
	rev.CanUndo, rev.CanRedo = rev.Parent != 0, rev.next != 0
	var err error
	rev.Saved, err = time.Parse(instant, saved)
	return rev, err
}

// addRevision saves rev under the next free number of its project and makes it
// the head.
func (db *DB) addRevision(ctx context.Context, tx *sql.Tx, rev Revision) (Revision, error) {
	err := tx.QueryRowContext(ctx, "SELECT max(number) + 1 FROM revision WHERE project_id = ?", rev.Project).Scan(&rev.Number)
	if err != nil {
		return Revision{}, err
	}
	rev, err = db.insertRevision(ctx, tx, rev)
	if err != nil {
		return Revision{}, err
	}
	return rev, db.setHead(ctx, tx, rev)
}

// insertRevision stores rev and returns it as it can be read from now on.
func (db *DB) insertRevision(ctx context.Context, tx *sql.Tx, rev Revision) (Revision, error) {
	// The document goes in as a string: a STRICT text column refuses bytes.
	_, err := tx.ExecContext(ctx, `INSERT INTO revision (project_id, number, parent, name, summary, saved, engine, doc)
		VALUES (?, ?, nullif(?, 0), ?, ?, ?, ?, ?)`,
		rev.Project, rev.Number, rev.Parent, rev.Name, rev.Summary, db.timestamp(), db.engine, string(rev.Doc))
	if err != nil {
		return Revision{}, err
	}
	return revision(ctx, tx, rev.Project, rev.Number)
}
