package store

import (
	"context"
	"database/sql"
	"errors"
	"time"
)

// A Project is one line of the shelf.
type Project struct {
	ID               int64
	Name             string
	Created, Updated time.Time // UTC; archiving does not count as an update
	Archived         bool
	Revision         int64 // number of the head revision
}

// instant is RFC 3339 with a fixed number of digits, so that text sorts as time.
const instant = "2006-01-02T15:04:05.000Z"

func (db *DB) timestamp() string { return db.now().UTC().Format(instant) }

// Projects returns all projects, those not archived first, and the latest
// updated first among each.
func (db *DB) Projects(ctx context.Context) ([]Project, error) {
	var list []Project
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		list, err = projects(ctx, tx)
		return err
	})
	return list, err
}

func projects(ctx context.Context, tx *sql.Tx) ([]Project, error) {
	rows, err := tx.QueryContext(ctx, `SELECT id, name, created, updated, archived, head
		FROM project ORDER BY archived, updated DESC, id DESC`)
	if err != nil {
		return nil, err
	}
	defer rows.Close()
	var list []Project
	for rows.Next() {
		var p Project
		var created, updated string
		if err := rows.Scan(&p.ID, &p.Name, &created, &updated, &p.Archived, &p.Revision); err != nil {
			return nil, err
		}
		var err1, err2 error
		p.Created, err1 = time.Parse(instant, created)
		p.Updated, err2 = time.Parse(instant, updated)
		if err := errors.Join(err1, err2); err != nil {
			return nil, err
		}
		list = append(list, p)
	}
	return list, rows.Err()
}

// Empty reports whether no project was ever made. Archived ones count.
func (db *DB) Empty(ctx context.Context) (bool, error) {
	var empty bool
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		return tx.QueryRowContext(ctx, "SELECT NOT EXISTS (SELECT 1 FROM project)").Scan(&empty)
	})
	return empty, err
}

// Create makes a project with doc as revision 1.
func (db *DB) Create(ctx context.Context, name string, doc []byte, summary string) (Revision, error) {
	if err := check(name, doc); err != nil {
		return Revision{}, err
	}
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) error {
		at := db.timestamp()
		// The head need not exist before the commit: its foreign key is deferred.
		res, err := tx.ExecContext(ctx, "INSERT INTO project (name, created, updated, head) VALUES (?, ?, ?, 1)", name, at, at)
		if err != nil {
			return err
		}
		id, err := res.LastInsertId()
		if err != nil {
			return err
		}
		rev, err = db.insertRevision(ctx, tx, Revision{Project: id, Number: 1, Name: name, Doc: doc, Summary: summary})
		return err
	})
	return rev, err
}

// Rename saves a revision that has the head's document and another name, so
// that it can be undone like any edit. A document that repeats the name is not
// touched: Save it instead. The name that the project has already makes no
// revision.
func (db *DB) Rename(ctx context.Context, id int64, name, summary string) (Revision, error) {
	if err := check(name, nil); err != nil {
		return Revision{}, err
	}
	var rev Revision
	err := db.inTx(ctx, func(tx *sql.Tx) (err error) {
		rev, err = head(ctx, tx, id)
		if err != nil || rev.Name == name {
			return err
		}
		rev, err = db.addRevision(ctx, tx, Revision{Project: id, Parent: rev.Number, Name: name, Doc: rev.Doc, Summary: summary})
		return err
	})
	return rev, err
}

// Archive puts a project away, or back on the shelf.
func (db *DB) Archive(ctx context.Context, id int64, archived bool) error {
	return db.inTx(ctx, func(tx *sql.Tx) error {
		res, err := tx.ExecContext(ctx, "UPDATE project SET archived = ? WHERE id = ?", archived, id)
		if err != nil {
			return err
		}
		n, err := res.RowsAffected()
		if err == nil && n == 0 {
			err = ErrNotFound
		}
		return err
	})
}

func (db *DB) setHead(ctx context.Context, tx *sql.Tx, rev Revision) error {
	_, err := tx.ExecContext(ctx, "UPDATE project SET head = ?, name = ?, updated = ? WHERE id = ?",
		rev.Number, rev.Name, db.timestamp(), rev.Project)
	return err
}
