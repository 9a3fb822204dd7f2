package views

import (
	"fmt"
	"time"
)

// Backups are the copies of the database that the data folder holds.
type Backups struct {
	Folder string
	List   []Backup
}

// A Backup is one of them.
type Backup struct {
	Name, At, Size, URL string
}

// NewBackup makes the line of a backup of the size in bytes.
func NewBackup(name string, at time.Time, size int64) Backup {
	return Backup{Name: name, At: moment(at), Size: bytesWords(size), URL: "/backups/" + name}
}

func bytesWords(n int64) string {
	if n < 1000 {
		return fmt.Sprintf("%d\u00a0bytes", n)
	}
	if n < 1e6 {
		return fmt.Sprintf("%.0f\u00a0kB", float64(n)/1e3)
	}
	return fmt.Sprintf("%.1f\u00a0MB", float64(n)/1e6)
}
