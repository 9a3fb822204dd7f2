package store

import (
	"errors"
	"fmt"
	"path/filepath"
)

var (
	ErrNotFound      = errors.New("no such project or revision")
	ErrNothingToUndo = errors.New("nothing to undo: this is the project's first state")
	ErrNothingToRedo = errors.New("nothing to redo: no undone change follows this state")
	ErrNoName        = errors.New("a project needs a name")
	ErrNotJSON       = errors.New("the project document is not JSON")
	ErrTooLarge      = errors.New("the project is too large to be saved")
	ErrFileUsed      = errors.New("a table was filled from this file, so it stays")
	ErrInUse         = errors.New("data folder in use")
	ErrNewer         = errors.New("database of a newer program")
)

// A ConflictError says that a save was based on a revision that is no longer
// the head, which is Head.
type ConflictError struct{ Base, Head int64 }

func (e *ConflictError) Error() string {
	return fmt.Sprintf("the project was changed elsewhere: revision %d is current, the change was made on revision %d", e.Head, e.Base)
}

// A DamagedError says that the database at Path cannot be trusted.
type DamagedError struct {
	Path string
	Err  error
}

func (e *DamagedError) Error() string {
	return fmt.Sprintf("the database %s is damaged (%v). Nothing was changed. "+
		"Move %[3]s, %[3]s-wal and %[3]s-shm out of the folder %s, then copy a backup there under the name %[3]s, or use another data folder",
		e.Path, e.Err, filepath.Base(e.Path), filepath.Dir(e.Path))
}

func (e *DamagedError) Unwrap() error { return e.Err }
