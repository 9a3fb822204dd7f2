package views_test

import (
	"bytes"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"testing"
)

const generate = "go tool templ generate -path web/views"

// TestGenerated makes the Go code of the templates anew and compares it with
// the code beside them, which is what the program is built from.
func TestGenerated(t *testing.T) {
	dir := t.TempDir()
	templates := files(t, ".", "*.templ")
	if len(templates) == 0 {
		t.Fatal("there are no templates")
	}
	for _, name := range templates {
		text, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		if err := os.WriteFile(filepath.Join(dir, name), text, 0o600); err != nil {
			t.Fatal(err)
		}
	}
	if out, err := exec.CommandContext(t.Context(), "go", "tool", "templ", "generate", "-path", dir).CombinedOutput(); err != nil {
		t.Fatalf("%v\n%s", err, out)
	}
	made, kept := files(t, dir, "*_templ.go"), files(t, ".", "*_templ.go")
	if len(made) != len(templates) || !slices.Equal(made, kept) {
		t.Fatalf("templates %q give the files %q, here are %q: run %s", templates, made, kept, generate)
	}
	for _, name := range made {
		want, err := os.ReadFile(filepath.Join(dir, name))
		if err != nil {
			t.Fatal(err)
		}
		got, err := os.ReadFile(name)
		if err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(got, want) {
			t.Errorf("%s is not what its template says: run %s", name, generate)
		}
	}
}

// files lists the names in the folder that match the pattern.
func files(t *testing.T, dir, pattern string) []string {
	t.Helper()
	list, err := filepath.Glob(filepath.Join(dir, pattern))
	if err != nil {
		t.Fatal(err)
	}
	for i := range list {
		list[i] = filepath.Base(list[i])
	}
	return list
}
