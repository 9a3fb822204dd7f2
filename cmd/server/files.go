package main

import (
	"bytes"
	"context"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"legwright/internal/perf/project"
	"legwright/internal/store"
)

// openFile takes the project file into the database and returns the project's
// path on the site. A file that says what a project says already makes no second one.
func openFile(ctx context.Context, db *store.DB, file string) (string, error) {
	text, err := readProject(file)
	if err != nil {
		return "", err
	}
	spec, err := project.Decode(text)
	if err != nil {
		return "", fmt.Errorf("%s is no project file that can be used:\n%w", file, err)
	}
	doc, err := spec.Encode()
	if err != nil {
		return "", err
	}
	list, err := db.Projects(ctx)
	if err != nil {
		return "", err
	}
	for _, p := range list {
		rev, err := db.Head(ctx, p.ID)
		if err != nil {
			return "", err
		}
		if !p.Archived && bytes.Equal(rev.Doc, doc) {
			return fmt.Sprintf("projects/%d", p.ID), nil
		}
	}
	rev, err := db.Create(ctx, spec.Name, doc, "opened from the file "+filepath.Base(file))
	return fmt.Sprintf("projects/%d", rev.Project), err
}

// readProject reads a file up to a length that no project has.
func readProject(file string) ([]byte, error) {
	f, err := os.Open(file)
	if err != nil {
		return nil, fmt.Errorf("the project file cannot be read: %w", err)
	}
	defer f.Close()
	text, err := io.ReadAll(io.LimitReader(f, project.MaxBytes+1))
	if err != nil {
		return nil, fmt.Errorf("the project file cannot be read: %w", err)
	}
	return text, nil
}

func backUp(ctx context.Context, o options, db *store.DB, stdout io.Writer) error {
	if err := db.Backup(ctx, o.backup); err != nil {
		return err
	}
	_, err := fmt.Fprintf(stdout, "A backup of %s is in %s, read back and checked.\n", o.data, o.backup)
	return err
}

func restore(ctx context.Context, o options, stdout io.Writer) error {
	kept, err := store.Restore(ctx, o.data, o.restore, version)
	if err != nil {
		return err
	}
	text := fmt.Sprintf("%s holds now what was in %s.", o.data, o.restore)
	if kept != "" {
		text += " What it held before is kept in " + kept + "."
	}
	_, err = fmt.Fprintln(stdout, text)
	return err
}
