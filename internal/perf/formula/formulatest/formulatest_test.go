package formulatest

import (
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"legwright/internal/perf/formula"
)

// A recorder stands in for a test and keeps what is reported.
type recorder struct {
	testing.TB
	said []string
}

func (r *recorder) Helper() {}
func (r *recorder) Errorf(format string, a ...any) {
	r.said = append(r.said, fmt.Sprintf(format, a...))
}
func (r *recorder) Fatal(a ...any) { panic(fmt.Sprint(a...)) }

func TestCheck(t *testing.T) {
	f := formula.Must(formula.Formula{ID: "x.double", Expr: "2*a", In: []formula.Symbol{formula.Sym("a", "a", 0)}, Source: formula.Definition})
	var right, wrong formula.Working
	right.Step(f, 6, 3)
	right.Note("a remark")
	wrong.Step(f, 6.00001, 3)
	r, record := &recorder{}, Record{}
	if record.Check(r, right); len(r.said) != 0 || !record["x.double"] {
		t.Errorf("a true working: %q, %v", r.said, record)
	}
	if record.Check(r, wrong); len(r.said) != 1 || !strings.Contains(r.said[0], "x.double") {
		t.Errorf("a false working: %q", r.said)
	}
}

func TestComplete(t *testing.T) {
	t.Chdir(t.TempDir())
	write := func(name, text string) {
		if err := os.WriteFile(name, []byte(text), 0o600); err != nil {
			t.Fatal(err)
		}
	}
	fatal := func() (said string) {
		defer func() { said = fmt.Sprint(recover()) }()
		Record{}.Complete(&recorder{})
		return ""
	}
	if said := fatal(); !strings.Contains(said, "declares no formula") {
		t.Errorf("an empty package: %q", said)
	}
	write("a.go", "package a\nvar x, y = formula.Must(formula.Formula{ID: \"a.x\"}), formula.Must(formula.Formula{Expr: \"1\", ID: \"a.y\"})\n")
	write("a_test.go", "package a\nvar z = formula.Formula{ID: \"a.z\"}\n")
	r := &recorder{}
	if (Record{"a.x": true}).Complete(r); len(r.said) != 1 || !strings.Contains(r.said[0], "a.y") {
		t.Errorf("one of two formulas used: %q", r.said)
	}
	write("b.go", "package a\nvar n = formula.Formula{ID: name}\n")
	if said := fatal(); !strings.Contains(said, "without a literal ID") {
		t.Errorf("a computed ID: %q", said)
	}
}

// TestDeclared reads symbols where they stand, and in variables.
func TestDeclared(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "x")
	if err := os.Mkdir(dir, 0o700); err != nil {
		t.Fatal(err)
	}
	text := "package x\nvar speed = formula.Sym(\"V\", \"speed\", 1)\nvar f = formula.Must(formula.Formula{ID: \"x.q\", Out: formula.Sym(\"q\", \"\", 2), In: []formula.Symbol{formula.Sym(\"rho\", \"\", 3), speed}, Expr: \"0.5*rho*V*V\"})\n"
	if err := os.WriteFile(filepath.Join(dir, "x.go"), []byte(text), 0o600); err != nil {
		t.Fatal(err)
	}
	list := Declared(t, filepath.Dir(dir))
	if len(list) != 1 || list[0].ID != "x.q" || list[0].Expr != "0.5*rho*V*V" || list[0].Out.Name != "q" || len(list[0].In) != 2 || list[0].In[0].Name != "rho" || list[0].In[1].Name != "V" {
		t.Errorf("read %+v", list)
	}
}
