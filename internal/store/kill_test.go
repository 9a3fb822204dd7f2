package store

import (
	"bufio"
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"strconv"
	"testing"
	"time"

	"legwright/migrations"
)

// writerFolder is the environment variable that makes this test program save
// revisions in a data folder until it is killed.
const writerFolder = "LEGWRIGHT_TEST_WRITER"

// writeForEver saves documents that hold their revision's number, with an undo
// and redo at times, and prints the number after each Save has returned.
func writeForEver(dir string) {
	ctx := context.Background()
	check := func(err error) {
		if err != nil {
			fmt.Fprintln(os.Stderr, err)
			os.Exit(1)
		}
	}
	db, err := open(ctx, dir, "test-1", migrations.Files, time.Now)
	check(err)
	empty, err := db.Empty(ctx)
	check(err)
	if empty {
		_, err := db.Create(ctx, "A", []byte("1"), "")
		check(err)
	}
	// A kill between an undo and its redo leaves the head one back.
	for err == nil {
		_, err = db.Redo(ctx, 1)
	}
	rev, err := db.Head(ctx, 1)
	check(err)
	for {
		rev, err = db.Save(ctx, 1, rev.Number, "A", strconv.AppendInt(nil, rev.Number+1, 10), "")
		check(err)
		fmt.Println(rev.Number)
		if rev.Number%7 == 0 {
			_, err = db.Undo(ctx, 1)
			check(err)
			rev, err = db.Redo(ctx, 1)
			check(err)
		}
	}
}

// A process killed at any moment loses nothing that Save said was saved.
func TestKilledWriter(t *testing.T) {
	dir := t.TempDir()
	acked := int64(0)
	for range 10 {
		acked = runAndKill(t, dir, 1+rand.IntN(60), time.Duration(rand.IntN(1000))*time.Microsecond)
		checkSaved(t, dir, acked)
	}
	t.Log(acked, "revisions")
}

// runAndKill returns the last number that the writer printed.
func runAndKill(t *testing.T, dir string, lines int, wait time.Duration) int64 {
	t.Helper()
	c := exec.CommandContext(t.Context(), os.Args[0])
	c.Env = append(os.Environ(), writerFolder+"="+dir)
	c.Stderr = os.Stderr
	out, err := c.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := c.Start(); err != nil {
		t.Fatal(err)
	}
	acked, seen := int64(0), 0
	for in := bufio.NewScanner(out); in.Scan(); seen++ {
		n, err := strconv.ParseInt(in.Text(), 10, 64)
		if err != nil {
			t.Fatal(err)
		}
		acked = n
		if seen == lines {
			time.AfterFunc(wait, func() { c.Process.Kill() })
		}
	}
	c.Wait()
	if seen <= lines {
		t.Fatalf("the writer ended by itself after %d saves", seen)
	}
	return acked
}

func checkSaved(t *testing.T, dir string, acked int64) {
	t.Helper()
	db := openAt(t, dir) // checks the integrity
	defer db.Close()
	list, err := db.Revisions(t.Context(), 1)
	if err != nil {
		t.Fatal(err)
	}
	if int64(len(list)) < acked || list[0].Number != int64(len(list)) {
		t.Errorf("%d revisions up to %d, but %d were acknowledged", len(list), list[0].Number, acked)
	}
	for _, r := range list {
		got, err := db.Revision(t.Context(), 1, r.Number)
		if err != nil || string(got.Doc) != strconv.FormatInt(r.Number, 10) {
			t.Errorf("revision %d holds %s, %v", r.Number, got.Doc, err)
		}
	}
	head, err := db.Head(t.Context(), 1)
	if err != nil || head.Number < acked-1 {
		t.Errorf("head %d after %d, %v", head.Number, acked, err)
	}
}
