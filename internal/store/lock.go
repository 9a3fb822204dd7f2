package store

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"syscall"
)

// lockFolder takes the data folder for this process. The lock belongs to the
// open file, so it ends with the process, however that ends; the file itself
// stays and means nothing.
func lockFolder(dir string) (*os.File, error) {
	f, err := os.OpenFile(filepath.Join(dir, "legwright.lock"), os.O_CREATE|os.O_RDWR, 0o600)
	if err != nil {
		return nil, fmt.Errorf("the data folder cannot be used: %w", err)
	}
	err = syscall.Flock(int(f.Fd()), syscall.LOCK_EX|syscall.LOCK_NB)
	switch {
	case err == nil:
		return f, nil
	case errors.Is(err, syscall.EWOULDBLOCK):
		err = &inUseError{dir}
	default:
		err = fmt.Errorf("the data folder %s cannot be locked: %w", dir, err)
	}
	f.Close()
	return nil, err
}

type inUseError struct{ dir string }

func (e *inUseError) Error() string {
	return fmt.Sprintf("another Legwright is already using the data folder %s: go to its page, or stop it first, or use another data folder", e.dir)
}

func (e *inUseError) Is(target error) bool { return target == ErrInUse }
