package store

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
)

// Backup writes a copy of the whole database to a new file at path, which can
// be opened as it is. The file appears complete and on disk, or not at all. It
// must not exist: Backup then returns an fs.ErrExist.
func (db *DB) Backup(ctx context.Context, path string) error {
	path, err := filepath.Abs(path)
	if err != nil {
		return err
	}
	if _, err := os.Lstat(path); err == nil {
		return fmt.Errorf("backup %s: %w", path, fs.ErrExist)
	}
	dir := filepath.Dir(path)
	// SQLite writes into an existing file only if that is empty, as this one is.
	f, err := os.CreateTemp(dir, "."+filepath.Base(path)+"-*")
	if err != nil {
		return err
	}
	defer f.Close()
	if err := db.copyTo(ctx, f, path); err != nil {
		os.Remove(f.Name())
		return fmt.Errorf("backup %s: %w", path, err)
	}
	return syncFolder(dir)
}

func (db *DB) copyTo(ctx context.Context, f *os.File, path string) error {
	if _, err := db.sql.ExecContext(ctx, "VACUUM INTO ?", f.Name()); err != nil {
		return err
	}
	if err := f.Sync(); err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}

// syncFolder makes a new or renamed file's name in dir last over a power cut.
func syncFolder(dir string) error {
	d, err := os.Open(dir)
	if err != nil {
		return err
	}
	return errors.Join(d.Sync(), d.Close())
}
