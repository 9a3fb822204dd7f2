package main

import (
	"bytes"
	"net/http"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"legwright/internal/perf/project"
)

// said runs the program to its end and returns what it says.
func said(t *testing.T, args ...string) string {
	t.Helper()
	var out, log bytes.Buffer
	if err := run(t.Context(), args, noEnv, &out, &log); err != nil {
		t.Fatalf("%v: %v", args, err)
	}
	return out.String()
}

func TestBackupAndRestore(t *testing.T) {
	dir, other := filepath.Join(t.TempDir(), "data"), filepath.Join(t.TempDir(), "other")
	file := filepath.Join(t.TempDir(), "all.db")
	start(t, noEnv, "-listen", "127.0.0.1:0", "-data", dir).stop(t)
	if got := said(t, "-data", dir, "-backup", file); !strings.Contains(got, file) || !strings.Contains(got, "checked") {
		t.Errorf("backup says %q", got)
	}
	if got := said(t, "-data", other, "-restore", file); strings.Contains(got, "kept") {
		t.Errorf("restore into nothing says %q", got)
	}
	got := said(t, "-data", other, "-restore", file)
	kept := regexp.MustCompile(`kept in (\S+\.db)\.`).FindStringSubmatch(got)
	if kept == nil {
		t.Fatalf("restore says %q", got)
	}
	if _, err := os.Stat(kept[1]); err != nil {
		t.Error(err)
	}
	s := start(t, noEnv, "-listen", "127.0.0.1:0", "-data", other)
	if code, body := get(t, s.url+"projects", ""); code != http.StatusOK || !strings.Contains(body, project.Demo().Name) {
		t.Errorf("the restored shelf: %d %s", code, body)
	}
	s.stop(t)
}

func TestOpenProjectFile(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "data")
	doc, err := project.New("Reed warbler").Encode()
	if err != nil {
		t.Fatal(err)
	}
	file := filepath.Join(t.TempDir(), "reed warbler.json")
	if err := os.WriteFile(file, doc, 0o600); err != nil {
		t.Fatal(err)
	}
	// The second time it is the same project; the demo is the first.
	for range 2 {
		s := start(t, noEnv, "-listen", "127.0.0.1:0", "-data", dir, file)
		if code, body := get(t, s.url+"projects/2", ""); code != http.StatusOK || !strings.Contains(body, "Reed warbler") {
			t.Errorf("the opened project: %d", code)
		}
		if code, _ := get(t, s.url+"projects/3", ""); code != http.StatusNotFound {
			t.Errorf("a third project: %d", code)
		}
		s.cancel()
		<-s.ended
		if rest := <-s.rest; rest != "reed warbler.json is at "+s.url+"projects/2\n" {
			t.Errorf("stdout goes on with %q", rest)
		}
	}
	bad := filepath.Join(t.TempDir(), "bad.json")
	if err := os.WriteFile(bad, bytes.Replace(doc, []byte(`"qnh": 101325`), []byte(`"qnh": 1`), 1), 0o600); err != nil {
		t.Fatal(err)
	}
	if err := run(t.Context(), []string{"-data", dir, "-listen", "127.0.0.1:0", bad}, noEnv, new(bytes.Buffer), new(bytes.Buffer)); err == nil || !strings.Contains(err.Error(), "day.qnh") {
		t.Errorf("a file with a wrong number: %v", err)
	}
}
