package store

import (
	"context"
	"fmt"
	"io/fs"
	"path/filepath"

	"github.com/pressly/goose/v3"
)

// stamp is a time in a file name: sorted by name is sorted by time.
const stamp = "20060102T150405.000Z"

// migrate brings the database to the newest schema in steps, after a backup if
// there is anything in it. A step that fails leaves no trace. Goose itself
// says nothing about a database with steps that it does not know.
func (db *DB) migrate(ctx context.Context, steps fs.FS) error {
	p, err := goose.NewProvider(goose.DialectSQLite3, db.sql, steps, goose.WithLogger(goose.NopLogger()))
	if err != nil {
		return err
	}
	have, want, err := p.GetVersions(ctx)
	if err != nil {
		return err
	}
	if have > want {
		return &newerError{db.path, have, want}
	}
	if have == want {
		return nil
	}
	backup := ""
	if have > 0 {
		backup = filepath.Join(filepath.Dir(db.path), fmt.Sprintf("backup-%d-%s.db", have, db.now().UTC().Format(stamp)))
		if err := db.Backup(ctx, backup); err != nil {
			return fmt.Errorf("the database %s must be brought from schema %d to %d, but the backup before that could not be made: %w", db.path, have, want, err)
		}
	}
	if _, err := p.Up(ctx); err != nil {
		err = fmt.Errorf("the database %s could not be brought from schema %d to %d: %w", db.path, have, want, err)
		if backup != "" {
			err = fmt.Errorf("%w; a backup was made as %s", err, backup)
		}
		return err
	}
	return nil
}

type newerError struct {
	path       string
	have, want int64
}

func (e *newerError) Error() string {
	return fmt.Sprintf("the database %s was written by a newer Legwright: it has schema %d, this program knows schemas up to %d. Use the newer program, or another data folder; nothing was changed", e.path, e.have, e.want)
}

func (e *newerError) Is(target error) bool { return target == ErrNewer }
