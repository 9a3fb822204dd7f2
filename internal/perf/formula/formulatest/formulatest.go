// Package formulatest checks that the working a package shows is the working
// it does. It is test support: it reads the source files of the package under
// test, and no package of the program may import it.
package formulatest

import (
	"go/ast"
	"go/parser"
	"go/token"
	"os"
	"strconv"
	"strings"
	"testing"

	"legwright/internal/perf/formula"
)

// Tolerance is the relative difference allowed between a number as computed
// and as re-evaluated from the expression shown: both use the same inputs, so
// only the order of a few operations differs.
const Tolerance = 1e-9

// A Record gathers the workings of a test.
type Record map[string]bool

// Check re-evaluates every step of w and notes its formula as exercised.
func (r Record) Check(t interface {
	Helper()
	Errorf(string, ...any)
}, w formula.Working) {
	t.Helper()
	for _, s := range w.Steps {
		if s.Formula == nil {
			continue
		}
		r[s.Formula.ID] = true
		if err := s.Check(Tolerance); err != nil {
			t.Errorf("%v, with %v", err, s.In)
		}
	}
}

// Complete reports each formula of the package under test that no checked
// working used. It reads the files of the working directory, which go test
// sets to the package's folder.
func (r Record) Complete(t testing.TB) {
	t.Helper()
	ids := declared(t)
	if len(ids) == 0 {
		t.Fatal("the package declares no formula")
	}
	for _, id := range ids {
		if !r[id] {
			t.Errorf("formula %s is in no checked working", id)
		}
	}
}

// declared lists the ID of each formula.Formula literal in the package's files.
func declared(t testing.TB) []string {
	t.Helper()
	entries, err := os.ReadDir(".")
	if err != nil {
		t.Fatal(err)
	}
	var ids []string
	for _, e := range entries {
		if !strings.HasSuffix(e.Name(), ".go") || strings.HasSuffix(e.Name(), "_test.go") {
			continue
		}
		f, err := parser.ParseFile(token.NewFileSet(), e.Name(), nil, 0)
		if err != nil {
			t.Fatal(err)
		}
		ast.Inspect(f, func(n ast.Node) bool {
			lit, ok := n.(*ast.CompositeLit)
			if !ok {
				return true
			}
			if sel, ok := lit.Type.(*ast.SelectorExpr); ok && sel.Sel.Name == "Formula" {
				ids = append(ids, idOf(t, lit))
			}
			return true
		})
	}
	return ids
}

func idOf(t testing.TB, lit *ast.CompositeLit) string {
	t.Helper()
	for _, e := range lit.Elts {
		kv, ok := e.(*ast.KeyValueExpr)
		if !ok {
			continue
		}
		if key, ok := kv.Key.(*ast.Ident); ok && key.Name == "ID" {
			if v, ok := kv.Value.(*ast.BasicLit); ok {
				id, err := strconv.Unquote(v.Value)
				if err != nil {
					t.Fatal(err)
				}
				return id
			}
		}
	}
	t.Fatal("a formula without a literal ID")
	return ""
}
