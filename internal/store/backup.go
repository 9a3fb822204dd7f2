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
	"slices"
	"time"
)

// Backup writes a copy of the whole database to a new file at path, which can
// be opened as it is. The file appears complete, read back and checked, and on disk, or not at all. It
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
	if err := verify(ctx, f.Name()); err != nil {
		return err
	}
	if err := f.Sync(); err != nil {
		return err
	}
	return os.Rename(f.Name(), path)
}

// verify reads a database file through from disk.
func verify(ctx context.Context, path string) error {
	file, err := sql.Open("sqlite3", "file:"+(&url.URL{Path: filepath.ToSlash(path)}).EscapedPath()+"?mode=ro&immutable=1")
	if err != nil {
		return err
	}
	copied := &DB{sql: file, path: path}
	return errors.Join(copied.checkFile(ctx), file.Close())
}

// backupFolder holds the backups that KeepBackup makes, below the data folder.
const backupFolder = "backups"

// Folder is the data folder.
func (db *DB) Folder() string { return filepath.Dir(db.path) }

// A Kept is a backup in the data folder.
type Kept struct {
	Name string // of the file
	Size int64  // in bytes
	At   time.Time
}

// KeepBackup makes a backup in the data folder, named by the time, and returns the path of the file.
func (db *DB) KeepBackup(ctx context.Context) (string, error) {
	dir := filepath.Join(filepath.Dir(db.path), backupFolder)
	if err := os.MkdirAll(dir, 0o700); err != nil {
		return "", err
	}
	path := filepath.Join(dir, "legwright-"+db.now().UTC().Format(stamp)+".db")
	return path, db.Backup(ctx, path)
}

// Backups lists the backups that KeepBackup made, the latest first.
func (db *DB) Backups() ([]Kept, error) {
	entries, err := os.ReadDir(filepath.Join(filepath.Dir(db.path), backupFolder))
	if errors.Is(err, fs.ErrNotExist) {
		return nil, nil
	}
	var list []Kept
	for _, e := range entries {
		at, bad := time.Parse("legwright-"+stamp+".db", e.Name())
		info, gone := e.Info()
		if bad == nil && gone == nil && info.Mode().IsRegular() {
			list = append(list, Kept{e.Name(), info.Size(), at})
		}
	}
	slices.SortFunc(list, func(a, b Kept) int { return b.At.Compare(a.At) })
	return list, err
}

// OpenBackup opens one of Backups by its name.
func (db *DB) OpenBackup(name string) (*os.File, error) {
	list, err := db.Backups()
	if err != nil {
		return nil, err
	}
	if !slices.ContainsFunc(list, func(k Kept) bool { return k.Name == name }) {
		return nil, ErrNotFound
	}
	return os.Open(filepath.Join(filepath.Dir(db.path), backupFolder, name))
}

// syncFolder makes a new or renamed file's name in dir last over a power cut.
func syncFolder(dir string) error {
	d, err := os.Open(dir)
	if err != nil {
		return err
	}
	return errors.Join(d.Sync(), d.Close())
}
