package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"time"
)

// MaxOriginal is the size of the largest file that is kept, in bytes.
const MaxOriginal = 1 << 20

// An Original is a file from which a table was or is to be filled, kept as it came.
type Original struct {
	ID, Project int64
	Name        string
	Saved       time.Time
	Content     []byte // nil in a list
	Size        int64  // of the content in bytes
	Uses        int    // how many times a table was filled from it
}

// An Import is one filling of a table from an original.
type Import struct {
	Original int64
	Revision int64  // whose document holds the table as it was filled
	Variant  string // identifier of the variant
	Path     string // of the table within the variant's aircraft
	Header   string // heads of the sheet
	Mapping  []byte // JSON: how the sheet was read
	Saved    time.Time
	Name     string // of the original
}

// Keep stores a file with a project. The same file under the same name is kept once.
func (db *DB) Keep(ctx context.Context, project int64, name string, content []byte) (Original, error) {
	if len(content) > MaxOriginal {
		return Original{}, fmt.Errorf("%w: it has %d bytes, the limit is %d", ErrTooLarge, len(content), MaxOriginal)
	}
	var o Original
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		if _, err := headNumber(ctx, tx, project); err != nil {
			return err
		}
		var id int64
		err := tx.QueryRowContext(ctx, "SELECT id FROM original WHERE project_id = ? AND name = ? AND content = ?", project, name, content).Scan(&id)
		if errors.Is(err, sql.ErrNoRows) {
			var res sql.Result
			res, err = tx.ExecContext(ctx, "INSERT INTO original (project_id, name, saved, content) VALUES (?, ?, ?, ?)", project, name, db.timestamp(), content)
			if err == nil {
				id, err = res.LastInsertId()
			}
		}
		if err != nil {
			return err
		}
		o, err = original(ctx, tx, project, id)
		return err
	})
	return o, err
}

// Original returns one kept file of a project.
func (db *DB) Original(ctx context.Context, project, id int64) (Original, error) {
	var o Original
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		o, err = original(ctx, tx, project, id)
		return err
	})
	return o, err
}

// Originals lists the kept files of a project without their content, newest first.
func (db *DB) Originals(ctx context.Context, project int64) ([]Original, error) {
	var list []Original
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		rows, err := tx.QueryContext(ctx, "SELECT "+originalColumns+" FROM original o WHERE o.project_id = ? ORDER BY o.id DESC", project)
		if err != nil {
			return err
		}
		defer rows.Close()
		for rows.Next() {
			o, err := scanOriginal(rows)
			if err != nil {
				return err
			}
			list = append(list, o)
		}
		return rows.Err()
	})
	return list, err
}

// Discard removes a kept file from which no table was filled; one that was used returns ErrFileUsed.
func (db *DB) Discard(ctx context.Context, project, id int64) error {
	return db.inTx(ctx, func(tx *sql.Tx) error {
		o, err := original(ctx, tx, project, id)
		if err != nil {
			return err
		}
		if o.Uses > 0 {
			return ErrFileUsed
		}
		_, err = tx.ExecContext(ctx, "DELETE FROM original WHERE id = ?", id)
		return err
	})
}

// SaveImport is Save together with the record of the original that the change
// came from. An empty doc saves no revision: the table held the rows already.
func (db *DB) SaveImport(ctx context.Context, id, base int64, name string, doc []byte, summary string, in Import) (Revision, error) {
	if err := check(name, doc); err != nil {
		return Revision{}, err
	}
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		if _, err := original(ctx, tx, id, in.Original); err != nil {
			return err
		}
		var err error
		if len(doc) == 0 {
			rev, err = headAt(ctx, tx, id, base)
		} else {
			rev, err = db.saveOn(ctx, tx, id, base, name, doc, summary)
		}
		if err != nil {
			return err
		}
		_, err = tx.ExecContext(ctx, `INSERT INTO imported (original_id, project_id, revision, variant, path, header, mapping, saved)
			VALUES (?, ?, ?, ?, ?, ?, ?, ?)`, in.Original, id, rev.Number, in.Variant, in.Path, in.Header, string(in.Mapping), db.timestamp())
		return err
	})
	return rev, err
}

// Imports lists what tables at a path of the variants' aircraft were filled from, newest first.
func (db *DB) Imports(ctx context.Context, project int64, path string) ([]Import, error) {
	var list []Import
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		rows, err := tx.QueryContext(ctx, `SELECT i.original_id, i.revision, i.variant, i.path, i.header, i.mapping, i.saved, o.name
			FROM imported i JOIN original o ON o.id = i.original_id WHERE i.project_id = ? AND i.path = ? ORDER BY i.id DESC`, project, path)
		if err != nil {
			return err
		}
		defer rows.Close()
		for rows.Next() {
			var in Import
			var saved string
			if err := rows.Scan(&in.Original, &in.Revision, &in.Variant, &in.Path, &in.Header, &in.Mapping, &saved, &in.Name); err != nil {
				return err
			}
			if in.Saved, err = time.Parse(instant, saved); err != nil {
				return err
			}
			list = append(list, in)
		}
		return rows.Err()
	})
	return list, err
}

const originalColumns = `o.id, o.project_id, o.name, o.saved, length(o.content),
	(SELECT count(*) FROM imported i WHERE i.original_id = o.id)`

func original(ctx context.Context, tx *sql.Tx, project, id int64) (Original, error) {
	var content []byte
	o, err := scanOriginal(tx.QueryRowContext(ctx, "SELECT "+originalColumns+", o.content FROM original o WHERE o.project_id = ? AND o.id = ?", project, id), &content)
	o.Content = content
	if errors.Is(err, sql.ErrNoRows) {
		err = ErrNotFound
	}
	return o, err
}

func scanOriginal(row interface{ Scan(...any) error }, more ...any) (Original, error) {
	var o Original
	var saved string
	if err := row.Scan(append([]any{&o.ID, &o.Project, &o.Name, &saved, &o.Size, &o.Uses}, more...)...); err != nil {
		return Original{}, err
	}
	var err error
	o.Saved, err = time.Parse(instant, saved)
	return o, err
}
