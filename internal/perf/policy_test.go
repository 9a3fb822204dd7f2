package perf_test

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"os"
	"path"
	"path/filepath"
	"strings"
	"testing"
)

// A source is one Go file of the module, as the rules see it.
type source struct {
	file      string // path from the module's root
	pkg       string // folder of the package from the module's root
	test      bool
	generated bool
	lines     int
	tree      *ast.File
	set       *token.FileSet
}

func (s source) engine() bool {
	return s.pkg == "internal/perf" || strings.HasPrefix(s.pkg, enginePrefix)
}

// at is the place of a node, for messages.
func (s source) at(p token.Pos) string {
	at := s.set.Position(p)
	return at.String()
}

func read(t *testing.T, file, text string) source {
	t.Helper()
	set := token.NewFileSet()
	tree, err := parser.ParseFile(set, file, text, parser.ParseComments)
	if err != nil {
		t.Fatal(err)
	}
	return source{file: file, pkg: path.Dir(file), test: strings.HasSuffix(file, "_test.go"), generated: ast.IsGenerated(tree),
		lines: strings.Count(text, "\n"), tree: tree, set: set}
}

// tree reads every Go file of the module. It reads the files itself: a test
// that asked the go command would be answered from the test cache.
func tree(t *testing.T) []source {
	t.Helper()
	root := filepath.Join("..", "..")
	var all []source
	err := filepath.WalkDir(root, func(file string, d fs.DirEntry, err error) error {
		name := d.Name()
		switch {
		case err != nil:
			return err
		case d.IsDir() && file != root && (name == "testdata" || name == "tmp" || strings.HasPrefix(name, ".")):
			return fs.SkipDir
		case d.IsDir() || !strings.HasSuffix(name, ".go"):
			return nil
		}
		text, err := os.ReadFile(file)
		if err != nil {
			return err
		}
		rel, err := filepath.Rel(root, file)
		if err != nil {
			return err
		}
		all = append(all, read(t, filepath.ToSlash(rel), string(text)))
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if len(all) < 50 {
		t.Fatalf("only %d Go files found", len(all))
	}
	return all
}

// A rule reports what in the module breaks it.
type rule struct {
	name  string
	check func([]source) []string
	// caught is a file that breaks the rule, path and text, and says is what the rule answers.
	caught [][3]string
}

var rules = []rule{
	{"imports", imports, [][3]string{
		{"internal/perf/units/x.go", "package units\nimport \"legwright/internal/perf/input\"", "must not import internal/perf/input"},
		{"internal/perf/units/x.go", "package units\nimport \"net/http\"", "must not import net/http"},
		{"internal/perf/atmos/x.go", "package atmos\nimport \"time\"", "must not import time"},
		{"internal/perf/mission/x.go", "package mission\nimport \"log/slog\"", "must not import log/slog"},
		{"internal/perf/polar/x.go", "package polar\nimport \"github.com/x/y\"", "must not import github.com/x/y"},
		{"internal/perf/polar/x.go", "package polar\nimport \"legwright/internal/perf/reference\"", "must not import internal/perf/reference"},
		{"internal/perf/polar/x_test.go", "package polar\nimport \"legwright/internal/store\"", "must not import internal/store"},
		{"internal/store/x.go", "package store\nimport \"legwright/internal/perf/aircraft\"", "must not import internal/perf/aircraft"},
		{"web/charts/x.go", "package charts\nimport \"net/http\"", "must not import net/http"},
		{"web/views/x.go", "package views\nimport \"legwright/internal/store\"", "must not import internal/store"},
		{"internal/perf/new/x.go", "package new", "is not in the import policy"},
	}},
	{"names", names, [][3]string{
		{"internal/perf/util/x.go", "package util", "says nothing"},
		{"web/service/x.go", "package service", "says nothing"},
		{"web/views/x.go", "package helpers", "says nothing"},
	}},
	{"sizes", sizes, [][3]string{{"web/views/x.go", "package views" + strings.Repeat("\n", 501), "501 lines"}}},
	{"conversions", conversions, [][3]string{
		{"internal/perf/polar/x.go", "package polar\nvar x = u.ToSI(1)", "calls ToSI"},
		{"internal/store/x.go", "package store\nfunc f() { _ = u.FromSI(1) }", "calls FromSI"},
	}},
	{"units stated", unitsStated, [][3]string{
		{"internal/perf/polar/x.go", "package polar\ntype T struct{ Span float64 }", "Span: state the unit"},
		{"internal/perf/polar/x.go", "package polar\ntype T struct {\n\tSpan float64 // wing span\n}", "Span: state the unit"},
		{"internal/perf/polar/x.go", "package polar\ntype T struct {\n\tA, B float64 // tip to tip\n}", "A: state the unit"},
		{"internal/perf/polar/x.go", "package polar\ntype T struct {\n\tSpeed float64 // true airspeed [m/s], in m/s\n}", "square brackets"},
	}},
	{"variables", variables, [][3]string{
		{"internal/perf/polar/x.go", "package polar\nvar count int", "has no value"},
		{"internal/perf/polar/x.go", "package polar\nvar limit = 3.0", "is neither a table"},
		{"internal/perf/polar/x.go", "package polar\nvar list = []int{1}\nfunc f() { list = nil }", "assigns the package-level list"},
		{"internal/perf/polar/x.go", "package polar\nvar list = []int{1}\nfunc f() { list[0]++ }", "assigns the package-level list"},
		{"internal/perf/polar/x.go", "package polar\nfunc init() { x() }", "init"},
	}},
	{"goroutines", goroutines, [][3]string{{"internal/perf/mission/x.go", "package mission\nfunc f() { go f() }", "starts a goroutine"}}},
}

func TestPolicy(t *testing.T) {
	all := tree(t)
	for _, r := range rules {
		for _, v := range r.check(all) {
			t.Errorf("%s: %s", r.name, v)
		}
	}
}

// TestPolicyCatches shows each rule refusing what it is there for.
func TestPolicyCatches(t *testing.T) {
	for _, r := range rules {
		for _, c := range r.caught {
			found := r.check([]source{read(t, c[0], c[1])})
			if len(found) != 1 || !strings.Contains(found[0], c[2]) {
				t.Errorf("%s: %s %q: said %q, want %q", r.name, c[0], c[1], found, c[2])
			}
		}
	}
}
