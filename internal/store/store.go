// Package store keeps projects and their revisions in one SQLite file.
//
// A revision is one saved state of a project: an opaque JSON document, what
// changed in words, and the revision that it was made from. Revisions are only
// added, never changed or removed. The head is the revision that the user
// sees; undo and redo move the head along the tree of parents, so they last
// over a restart as edits do. Results are not stored: they are recomputed.
//
// When a method that saves returns without an error, what it saved is on disk.
package store

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io/fs"
	"net/url"
	"os"
	"path/filepath"
	"time"

	"github.com/mattn/go-sqlite3"

	"legwright/migrations"
)

// FileName is the name of the database in the data folder.
const FileName = "legwright.db"

// A DB is the database of one data folder, which no other process can open
// while it is open. Its methods are safe for concurrent use; each is one
// transaction.
type DB struct {
	sql    *sql.DB
	lock   *os.File
	path   string
	engine string
	now    func() time.Time
}

// Open opens the database in the folder dir, making both if need be. It checks
// the whole file, makes a backup beside it if its schema must be changed, and
// refuses a file that is damaged, in use, or of a newer program. The text of
// an error is meant for the user. Engine is the version of the program, which
// each revision records.
func Open(ctx context.Context, dir, engine string) (*DB, error) {
	return open(ctx, dir, engine, migrations.Files, time.Now)
}

func open(ctx context.Context, dir, engine string, steps fs.FS, now func() time.Time) (_ *DB, err error) {
	dir, err = filepath.Abs(dir)
	if err != nil {
		return nil, err
	}
	if err := os.MkdirAll(dir, 0o700); err != nil {
		return nil, fmt.Errorf("the data folder cannot be made: %w", err)
	}
	lock, err := lockFolder(dir)
	if err != nil {
		return nil, err
	}
	db := &DB{lock: lock, path: filepath.Join(dir, FileName), engine: engine, now: now}
	defer func() {
		if err != nil {
			db.Close()
		}
	}()
	if err := makeFile(db.path); err != nil {
		return nil, fmt.Errorf("the database cannot be made: %w", err)
	}
	db.sql, err = sql.Open("sqlite3", dsn(db.path))
	if err != nil {
		return nil, err
	}
	// One connection: writers queue here and never meet SQLITE_BUSY. The price is
	// that using db.sql while holding a transaction would wait for ever.
	db.sql.SetMaxOpenConns(1)
	if err := db.checkSettings(ctx); err != nil {
		return nil, db.explain(err)
	}
	if err := db.checkFile(ctx); err != nil {
		return nil, db.explain(err)
	}
	if err := db.migrate(ctx, steps); err != nil {
		return nil, db.explain(err)
	}
	return db, nil
}

// Program is the version of the program, as each revision that it saves records it.
func (db *DB) Program() string { return db.engine }

// Close closes the database and gives the data folder free.
func (db *DB) Close() error {
	var err error
	if db.sql != nil {
		err = db.sql.Close()
	}
	return errors.Join(err, db.lock.Close())
}

// makeFile makes an empty database file that only its owner can read, unless
// there is one. SQLite gives the same mode to the files that it puts beside it.
func makeFile(path string) error {
	f, err := os.OpenFile(path, os.O_CREATE|os.O_RDWR, 0o600)
	if err != nil {
		return err
	}
	return errors.Join(f.Close(), syncFolder(filepath.Dir(path)))
}

// dsn carries the settings, so that each connection of the pool has them. The
// path is escaped because SQLite reads ?, # and % in it as parts of a URI.
func dsn(path string) string {
	return "file:" + (&url.URL{Path: filepath.ToSlash(path)}).EscapedPath() +
		"?_journal_mode=WAL&_synchronous=FULL&_busy_timeout=5000&_foreign_keys=on&_txlock=immediate"
}

// checkSettings reads back what dsn asked for: the driver ignores a key that
// it does not know, and a file system without shared memory refuses WAL.
func (db *DB) checkSettings(ctx context.Context) error {
	for _, s := range []struct{ pragma, want string }{
		{"journal_mode", "wal"},
		{"synchronous", "2"}, // FULL: with less, a power cut can undo the last saves
		{"foreign_keys", "1"},
		{"busy_timeout", "5000"},
	} {
		var got string
		if err := db.sql.QueryRowContext(ctx, "PRAGMA "+s.pragma).Scan(&got); err != nil {
			return err
		}
		if got != s.want {
			return fmt.Errorf("the database %s cannot be used safely: its %s is %s, not %s; the data folder may be on a network drive",
				db.path, s.pragma, got, s.want)
		}
	}
	return nil
}

// inTx runs f in one transaction, which is kept only if f returns nil.
func (db *DB) inTx(ctx context.Context, f func(*sql.Tx) error) error {
	tx, err := db.sql.BeginTx(ctx, nil)
	if err != nil {
		return db.explain(err)
	}
	defer tx.Rollback()
	if err := f(tx); err != nil {
		return db.explain(err)
	}
	return db.explain(tx.Commit())
}

// explain puts SQLite's codes that the user can act on into words.
func (db *DB) explain(err error) error {
	var e sqlite3.Error
	if !errors.As(err, &e) {
		return err
	}
	switch e.Code {
	case sqlite3.ErrCorrupt, sqlite3.ErrNotADB:
		return &DamagedError{Path: db.path, Err: err}
	case sqlite3.ErrFull:
		return fmt.Errorf("the disk of %s is full, nothing was saved: %w", db.path, err)
	case sqlite3.ErrReadonly:
		return fmt.Errorf("%s is write-protected, nothing was saved: %w", db.path, err)
	}
	if e.ExtendedCode == sqlite3.ErrConstraintCheck {
		return fmt.Errorf("%w: %w", ErrNotJSON, err)
	}
	return err
}
