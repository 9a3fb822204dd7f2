package store

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"time"
)

// Restore puts the backup at file in the place of the database of the folder
// dir, and returns where what stood there before is kept; an empty path means
// that nothing did. The backup is copied and opened first: one that is damaged,
// of another program or of a newer one is refused and nothing is changed. The
// exchange itself is one renaming of a file. No process may have the folder open.
func Restore(ctx context.Context, dir, file, engine string) (kept string, err error) {
	dir, err = filepath.Abs(dir)
	if err != nil {
		return "", err
	}
	if err := os.MkdirAll(dir, 0o700); err != nil {
		return "", fmt.Errorf("the data folder cannot be made: %w", err)
	}
	lock, err := lockFolder(dir)
	if err != nil {
		return "", err
	}
	defer lock.Close()
	trial, err := os.MkdirTemp(dir, ".restore-*")
	if err != nil {
		return "", err
	}
	defer os.RemoveAll(trial)
	fresh := filepath.Join(trial, FileName)
	if err := copyFile(fresh, file); err != nil {
		return "", fmt.Errorf("the backup cannot be read: %w", err)
	}
	if err := proven(ctx, trial, engine); err != nil {
		return "", fmt.Errorf("%s is no backup that can be restored, nothing was changed: %w", file, err)
	}
	place := filepath.Join(dir, FileName)
	kept, err = setAside(place, filepath.Join(dir, "before-restore-"+time.Now().UTC().Format(stamp)+".db"))
	if err != nil {
		return "", fmt.Errorf("what is there now could not be kept, nothing was changed: %w", err)
	}
	if err := os.Rename(fresh, place); err != nil {
		return kept, err
	}
	return kept, syncFolder(dir)
}

// proven opens the database of the folder as Open does, which checks the whole of it, and wants projects in it.
func proven(ctx context.Context, dir, engine string) error {
	if info, err := os.Stat(filepath.Join(dir, FileName)); err != nil || info.Size() == 0 {
		return errors.Join(errors.New("the file is empty"), err)
	}
	db, err := Open(ctx, dir, engine)
	if err != nil {
		return err
	}
	empty, err := db.Empty(ctx)
	if err == nil && empty {
		err = errors.New("there is no project in it")
	}
	return errors.Join(err, db.Close())
}

// setAside copies the database at place, with what SQLite has not yet put into
// it, and takes its companion files away, so that they cannot be applied to
// what comes in its place. It returns the copy, or "" where there is nothing.
func setAside(place, safe string) (string, error) {
	if _, err := os.Stat(place); errors.Is(err, fs.ErrNotExist) {
		return "", nil
	}
	companions := []string{"-wal", "-shm"}
	for _, end := range append([]string{""}, companions...) {
		if err := copyFile(safe+end, place+end); err != nil && (end == "" || !errors.Is(err, fs.ErrNotExist)) {
			return "", err
		}
	}
	if err := syncFolder(filepath.Dir(safe)); err != nil {
		return "", err
	}
	for _, end := range companions {
		if err := os.Remove(place + end); err != nil && !errors.Is(err, fs.ErrNotExist) {
			return "", err
		}
	}
	return safe, nil
}

// copyFile writes a copy of from to a new file and on disk.
func copyFile(to, from string) error {
	in, err := os.Open(from)
	if err != nil {
		return err
	}
	defer in.Close()
	out, err := os.OpenFile(to, os.O_CREATE|os.O_EXCL|os.O_WRONLY, 0o600)
	if err != nil {
		return err
	}
	_, err = io.Copy(out, in)
	return errors.Join(err, out.Sync(), out.Close())
}
