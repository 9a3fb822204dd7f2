package mathml

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
	"legwright/internal/perf/formula/formulatest"
)

// engine is where the formulas are declared.
const engine = "../../internal/perf"

// TestEveryFormula sets every formula of the program, reads the mathematics back
// as a person reads it, and compares its value with that of the formula.
func TestEveryFormula(t *testing.T) {
	list := formulatest.Declared(t, engine)
	if len(list) < 30 {
		t.Fatalf("only %d formulas", len(list))
	}
	for _, f := range list {
		f.Source = formula.Definition
		set := formula.Must(f)
		markup := Equation(f.Out.Name, set.Tree())
		root := parsed(t, markup)
		checkShape(t, f.ID, root)
		if !strings.Contains(markup, `alttext="`+f.Out.Name+" = ") {
			t.Errorf("%s: no linear text in %s", f.ID, markup)
		}
		names := []string{"pi"}
		for _, s := range f.In {
			names = append(names, s.Name)
		}
		r := reader{names: map[string]string{}}
		for _, n := range append(names, f.Out.Name) {
			key := spoken(n)
			if was, taken := r.names[key]; taken && was != n {
				t.Errorf("%s: %s and %s are set alike", f.ID, was, n)
			}
			r.names[key] = n
		}
		rapid.Check(t, func(t *rapid.T) {
			env, in := map[string]float64{"pi": math.Pi}, make([]float64, len(f.In))
			for i, s := range f.In {
				in[i] = rapid.Float64Range(0.01, 3).Draw(t, s.Name)
				env[s.Name] = in[i]
			}
			want, err := set.Eval(in...)
			if err != nil {
				t.Fatal(err)
			}
			if got := r.equation(t, root, env); !same(got, want) {
				t.Fatalf("%s: reads as %v, is %v with %v\n%s", f.Expr, got, want, env, markup)
			}
		})
	}
}

func same(a, b float64) bool {
	return math.IsNaN(a) && math.IsNaN(b) || a == b || math.Abs(a-b) <= 1e-9*math.Max(math.Abs(a), math.Abs(b))
}

// TestSetAsRead: brackets stand wherever the order of operations needs them.
func TestSetAsRead(t *testing.T) {
	r := reader{names: map[string]string{}}
	for _, n := range []string{"rho", "CDmin", "dT", "pi"} {
		r.names[spoken(n)] = n
	}
	var drawn func(t *rapid.T, depth int) string
	drawn = func(t *rapid.T, depth int) string {
		kind := "leaf"
		if depth > 0 {
			kind = rapid.SampledFrom([]string{"leaf", "-", "+", " - ", "*", "*", "/", "square", "pow", "sqrt", "max", "exp"}).Draw(t, "kind")
		}
		under := func() string { return "(" + drawn(t, depth-1) + ")" }
		switch kind {
		case "leaf":
			return rapid.SampledFrom([]string{"rho", "CDmin", "dT", "pi", "2", "0.5", "1.5e3", "2e-2", "0.3333333333333333", "0.0065"}).Draw(t, "leaf")
		case "-":
			return "-" + under()
		case "square":
			x := under()
			return x + "*" + x
		case "pow", "max":
			return kind + "(" + under() + ", " + under() + ")"
		case "sqrt", "exp":
			return kind + under()
		}
		return under() + kind + under()
	}
	rapid.Check(t, func(t *rapid.T) {
		f := formula.Formula{ID: "drawn", Out: formula.Symbol{Name: "y"}, Source: formula.Definition, Expr: drawn(t, 4),
			In: []formula.Symbol{{Name: "rho"}, {Name: "CDmin"}, {Name: "dT"}}}
		set := formula.Must(f)
		r.names[spoken("y")] = "y"
		want, err := set.Eval(1.7, 0.3, 2.9)
		if err != nil {
			t.Fatal(err)
		}
		root := parsed(t, Equation("y", set.Tree()))
		got := r.equation(t, root, map[string]float64{"rho": 1.7, "CDmin": 0.3, "dT": 2.9, "pi": math.Pi})
		if !close(got, want) {
			t.Fatalf("%s reads as %v, is %v\n%s", f.Expr, got, want, Equation("y", set.Tree()))
		}
	})
}

// close allows for what cancellation makes of a regrouped product; huge and lost values count as alike.
func close(a, b float64) bool {
	lost := func(x float64) bool { return math.IsNaN(x) || math.Abs(x) > 1e100 || math.Abs(x) < 1e-12 }
	return same(a, b) || math.Abs(a-b) <= 1e-6*math.Max(math.Abs(a), math.Abs(b)) || lost(a) && lost(b)
}

// TestSetLikePrint looks at how some things are set.
func TestSetLikePrint(t *testing.T) {
	for text, want := range map[string]string{
		"V*V":                        "<msup><mi>V</mi><mn>2</mn></msup>",
		"0.5*rho":                    "<mfrac><mn>1</mn><mn>2</mn></mfrac><mo>\u2062</mo><mspace width=\"0.17em\"></mspace><mi>ρ</mi>",
		"sqrt(V)":                    "<msqrt><mi>V</mi></msqrt>",
		"T/W":                        "<mfrac><mi>T</mi><mi>W</mi></mfrac>",
		"CDmin":                      `<msub><mi>C</mi><mrow><mi mathvariant="normal">D</mi><mo>,</mo><mi mathvariant="normal">min</mi></mrow></msub>`,
		"T0":                         "<msub><mi>T</mi><mn>0</mn></msub>",
		"mdot":                       "<mover><mi>m</mi><mo>˙</mo></mover>",
		"dT":                         `<mrow><mi mathvariant="normal">Δ</mi><mi>T</mi></mrow>`,
		"sigmac":                     `<msub><mi>σ</mi><mi mathvariant="normal">c</mi></msub>`,
		"pow(V, 0.3333333333333333)": "<msup><mi>V</mi><mrow><mfrac><mn>1</mn><mn>3</mn></mfrac></mrow></msup>",
		"T*2":                        "<mi>T</mi><mo>⋅</mo><mn>2</mn>",
		"sin(gamma)":                 "<mi>sin</mi><mo>\u2061</mo><mrow><mo>(</mo><mi>γ</mi><mo>)</mo></mrow>",
		"(a*V)*(a*V)":                "<msup><mrow><mo>(</mo><mi>a</mi>",
		"pi*n*D*pi*n*D":              `<msup><mrow><mo>(</mo><mi mathvariant="normal">π</mi>`,
	} {
		n, err := formula.Parse(text)
		if err != nil {
			t.Fatal(err)
		}
		if got := Equation("y", n); !strings.Contains(got, "<mi>y</mi><mo>=</mo>"+want) {
			t.Errorf("%s is set %s, want %s", text, got, want)
		}
	}
	if got := Symbol(`<b>"`); strings.Contains(got, "<b>") {
		t.Errorf("a symbol is not escaped: %s", got)
	}
}
