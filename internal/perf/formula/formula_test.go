package formula_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/units"
)

func number(name string) formula.Symbol { return formula.Sym(name, name, units.Coefficient) }

func of(expr string, in ...string) formula.Formula {
	f := formula.Formula{ID: "test", Out: number("y"), Expr: expr, Source: formula.Definition}
	for _, name := range in {
		f.In = append(f.In, number(name))
	}
	return f
}

func TestEval(t *testing.T) {
	for _, c := range []struct {
		expr string
		want float64
	}{
		{"1 - 2 - 3", -4}, {"8/4/2", 1}, {"-a + b*2", 4}, {"-(a + b)", -5}, {"2*-a", -4}, {"pi*a", 2 * math.Pi}, {"1.5e3/b", 500},
		{"sqrt(a*8)", 4}, {"pow(a, b)", 8}, {"exp(a)", math.Exp(2)}, {"sin(a)", math.Sin(2)}, {"cos(a)", math.Cos(2)}, {"tan(a)", math.Tan(2)},
		{"asin(1/a)", math.Asin(0.5)}, {"min(a, b, 1)", 1}, {"max(a, b, 1)", 3}, {"pow(sqrt(a), 2)*b/(1 - a)", -6},
	} {
		got, err := formula.Must(of(c.expr, "a", "b")).Eval(2, 3)
		if err != nil || math.Abs(got-c.want) > 1e-12*math.Abs(c.want) {
			t.Errorf("%s = %v, %v; want %v", c.expr, got, err, c.want)
		}
	}
	if _, err := formula.Must(of("a", "a")).Eval(1, 2); err == nil || !strings.Contains(err.Error(), "2 values for 1 symbols") {
		t.Errorf("too many values: %v", err)
	}
}

func TestMustPanics(t *testing.T) {
	unsourced := of("a", "a")
	unsourced.Source = formula.Source{}
	for _, c := range []struct {
		f    formula.Formula
		want string
	}{
		{unsourced, "no source"}, {of("a +", "a"), "formula test"}, {of("a*c", "a"), "unknown symbol c"}, {of("log(a)", "a"), "unknown function"},
		{of("sqrt()", "a"), "sqrt takes"}, {of("a % 2", "a"), "unsupported operator %"}, {of("a[0]", "a"), "unsupported expression"},
		{of(`"a"`, "a"), "invalid syntax"}, {of("!a", "a"), "unsupported operator !"}, {of("sqrt(a, 2)", "a"), "sqrt takes"}, {of("pow(a)", "a"), "pow takes"},
	} {
		func() {
			defer func() {
				if said := fmt.Sprint(recover()); !strings.Contains(said, c.want) {
					t.Errorf("%s: panic %q, want %q", c.f.Expr, said, c.want)
				}
			}()
			formula.Must(c.f)
		}()
	}
}

func TestCheck(t *testing.T) {
	f := formula.Must(of("0.5*rho*V*V", "rho", "V"))
	var w formula.Working
	w.Step(f, 0.5*1.225*50*50, 1.225, 50)
	w.Step(f, 1.225*50*50, 1.225, 50)
	w.Step(f, math.NaN(), 1.225, 50)
	w.Step(f, 0, 0, 50)
	w.Note("a remark")
	for i, ok := range []bool{true, false, false, true, true} {
		if err := w.Steps[i].Check(1e-9); (err == nil) != ok {
			t.Errorf("step %d: %v", i, err)
		}
	}
	if err := w.Steps[1].Check(1e-9); err == nil || !strings.Contains(err.Error(), "1531.25") || !strings.Contains(err.Error(), "3062.5") {
		t.Errorf("the error must give both numbers: %v", err)
	}
}

// TestStepKeepsItsInputs: the record does not change when the caller reuses its slice.
func TestStepKeepsItsInputs(t *testing.T) {
	f := formula.Must(of("a", "a"))
	var w formula.Working
	in := []float64{1}
	w.Step(f, 1, in...)
	in[0] = 2
	if got := w.Steps[0].In[0]; got != 1 {
		t.Errorf("recorded input became %v", got)
	}
}

func TestWorking(t *testing.T) {
	f := formula.Must(of("a", "a"))
	var w formula.Working
	w.Heading("Air")
	got := w.Step(f, 7, 7)
	w.Note("%d of %s", 3, "them")
	if got != 7 || len(w.Steps) != 3 {
		t.Fatalf("step returned %v, %d steps", got, len(w.Steps))
	}
	if s := w.Steps[0]; !s.Heading || s.Note != "Air" || s.Formula != nil {
		t.Errorf("heading recorded as %+v", s)
	}
	if s := w.Steps[1]; s.Formula != f || s.Out != 7 || len(s.In) != 1 || s.In[0] != 7 {
		t.Errorf("step recorded as %+v", s)
	}
	if s := w.Steps[2]; s.Heading || s.Note != "3 of them" {
		t.Errorf("note recorded as %+v", s)
	}
}

// TestNilWorking: what sweeps and root-finders pass costs no memory.
func TestNilWorking(t *testing.T) {
	f := formula.Must(of("0.5*rho*V*V", "rho", "V"))
	var w *formula.Working
	sum, v := 0.0, 50.0
	if n := testing.AllocsPerRun(100, func() { sum += w.Step(f, 0.5*1.225*v*v, 1.225, v); w.Heading("Air") }); n != 0 {
		t.Errorf("%v allocations", n)
	}
	w.Note("nothing %d", 1)
	if sum == 0 {
		t.Error("step returned nothing")
	}
}

// TestEvalFollowsGo: an expression means what the same Go expression means.
func TestEvalFollowsGo(t *testing.T) {
	f := formula.Must(of("(a + b)*c - a/(b*b + 1) - c", "a", "b", "c"))
	rapid.Check(t, func(t *rapid.T) {
		g := rapid.Float64Range(-1e3, 1e3)
		a, b, c := g.Draw(t, "a"), g.Draw(t, "b"), g.Draw(t, "c")
		got, err := f.Eval(a, b, c)
		want := (a+b)*c - a/(b*b+1) - c
		if err != nil || math.Abs(got-want) > 1e-9*math.Max(1, math.Abs(want)) {
			t.Fatalf("%v, %v; want %v", got, err, want)
		}
	})
}

func FuzzEval(f *testing.F) {
	for _, s := range []string{"a", "1/(pi*a*e)", "pow(a, 2)", "max(", "a..b", "func(){}", "sqrt(-a)", "a(a)", "-a", "0x1p-2*a", "'a'", "min(a)", "pow(a)"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, expr string) {
		defer func() {
			if r := recover(); r != nil && !strings.Contains(fmt.Sprint(r), "formula test") {
				t.Errorf("%q: %v", expr, r)
			}
		}()
		formula.Must(of(expr, "a"))
	})
}

func Example() {
	dynamicPressure := formula.Must(formula.Formula{
		ID: "air.dynamic-pressure", Out: formula.Sym("q", "dynamic pressure", units.Pressure),
		In:   []formula.Symbol{formula.Sym("rho", "air density", units.Density), formula.Sym("V", "true airspeed", units.Speed)},
		Expr: "0.5*rho*V*V", Source: formula.Definition,
	})
	var w formula.Working
	rho, v := 1.225, 40.0
	w.Step(dynamicPressure, 0.5*rho*v*v, rho, v)
	for _, s := range w.Steps {
		fmt.Printf("%s = %s = %.0f %s (%v)\n", s.Formula.Out.Name, s.Formula.Expr, s.Out, s.Formula.Out.Quantity.SI(), s.Check(1e-9))
	}
	// Output: q = 0.5*rho*V*V = 980 Pa (<nil>)
}
