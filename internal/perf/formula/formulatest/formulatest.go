// Package formulatest checks that the working a package shows is the working
// it does. It is test support: it reads the source files of the package under
// test, and no package of the program may import it.
package formulatest

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
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
	files, err := filepath.Glob("*.go")
	if err != nil {
		t.Fatal(err)
	}
	list := read(t, files)
	if len(list) == 0 {
		t.Fatal("the package declares no formula")
	}
	for _, f := range list {
		if !r[f.ID] {
			t.Errorf("formula %s is in no checked working", f.ID)
		}
	}
}

// Declared reads every formula.Formula literal of the Go files in and below the
// folder root: identifier, expression, and name and meaning of the symbols, all of it as written.
func Declared(t testing.TB, root string) []formula.Formula {
	t.Helper()
	var list []formula.Formula
	err := filepath.WalkDir(root, func(dir string, d fs.DirEntry, err error) error {
		if err != nil || !d.IsDir() {
			return err
		}
		files, err := filepath.Glob(filepath.Join(dir, "*.go"))
		list = append(list, read(t, files)...)
		return err
	})
	if err != nil {
		t.Fatal(err)
	}
	return list
}

// read finds the formulas in the files of one package. Symbols may stand in variables of the package.
func read(t testing.TB, files []string) []formula.Formula {
	t.Helper()
	var trees []*ast.File
	symbols := map[string]formula.Symbol{}
	for _, name := range files {
		if strings.HasSuffix(name, "_test.go") {
			continue
		}
		f, err := parser.ParseFile(token.NewFileSet(), name, nil, 0)
		if err != nil {
			t.Fatal(err)
		}
		trees = append(trees, f)
		ast.Inspect(f, func(n ast.Node) bool {
			if v, ok := n.(*ast.ValueSpec); ok && len(v.Names) == len(v.Values) {
				for i, value := range v.Values {
					symbols[v.Names[i].Name] = symbol(value, nil)
				}
			}
			return true
		})
	}
	var list []formula.Formula
	for _, f := range trees {
		ast.Inspect(f, func(n ast.Node) bool {
			lit, ok := n.(*ast.CompositeLit)
			if !ok {
				return true
			}
			if sel, ok := lit.Type.(*ast.SelectorExpr); ok && sel.Sel.Name == "Formula" {
				list = append(list, literal(t, lit, symbols))
			}
			return true
		})
	}
	return list
}

// literal reads one formula.
func literal(t testing.TB, lit *ast.CompositeLit, symbols map[string]formula.Symbol) formula.Formula {
	t.Helper()
	var f formula.Formula
	for _, e := range lit.Elts {
		kv, ok := e.(*ast.KeyValueExpr)
		if !ok {
			continue
		}
		key, ok := kv.Key.(*ast.Ident)
		if !ok {
			continue
		}
		switch key.Name {
		case "ID":
			f.ID = unquoted(kv.Value)
		case "Expr":
			f.Expr = unquoted(kv.Value)
		case "Out":
			f.Out = symbol(kv.Value, symbols)
		case "In":
			if in, ok := kv.Value.(*ast.CompositeLit); ok {
				for _, s := range in.Elts {
					f.In = append(f.In, symbol(s, symbols))
				}
			}
		}
	}
	if f.ID == "" {
		t.Fatal("a formula without a literal ID")
	}
	return f
}

// symbol is name and meaning in formula.Sym("V", "speed", …), or in the variable that holds it.
func symbol(e ast.Expr, symbols map[string]formula.Symbol) formula.Symbol {
	switch e := e.(type) {
	case *ast.Ident:
		return symbols[e.Name]
	case *ast.CallExpr:
		if len(e.Args) > 1 {
			return formula.Symbol{Name: unquoted(e.Args[0]), Meaning: unquoted(e.Args[1])}
		}
	}
	return formula.Symbol{}
}

func unquoted(e ast.Expr) string {
	lit, ok := e.(*ast.BasicLit)
	if !ok {
		return ""
	}
	text, _ := strconv.Unquote(lit.Value) // a number gives ""
	return text
}
