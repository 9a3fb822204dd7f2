package formula_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/formula"
)

// drawn is a random expression in a, b and c.
func drawn() *rapid.Generator[*formula.Node] {
	leaf := rapid.Custom(func(t *rapid.T) *formula.Node {
		text := rapid.SampledFrom([]string{"a", "b", "c", "pi", "2", "0.5", "1.5e3", "0.0065"}).Draw(t, "leaf")
		n, err := formula.Parse(text)
		if err != nil {
			t.Fatal(err)
		}
		return n
	})
	return rapid.Custom(func(t *rapid.T) *formula.Node { return grown(t, leaf, rapid.IntRange(0, 4).Draw(t, "depth")) })
}

func grown(t *rapid.T, leaf *rapid.Generator[*formula.Node], depth int) *formula.Node {
	if depth == 0 {
		return leaf.Draw(t, "leaf")
	}
	under := func() *formula.Node { return grown(t, leaf, rapid.IntRange(0, depth-1).Draw(t, "depth")) }
	switch op := rapid.SampledFrom([]formula.Op{formula.Negate, formula.Add, formula.Subtract, formula.Multiply, formula.Divide, formula.Call}).Draw(t, "op"); op {
	case formula.Negate:
		return &formula.Node{Op: op, Args: []*formula.Node{under()}}
	case formula.Call:
		name := rapid.SampledFrom([]string{"sqrt", "exp", "pow", "max"}).Draw(t, "function")
		args := []*formula.Node{under()}
		if name == "pow" || name == "max" {
			args = append(args, under())
		}
		return &formula.Node{Op: op, Text: name, Args: args}
	default:
		return &formula.Node{Op: op, Args: []*formula.Node{under(), under()}}
	}
}

// TestTextIsTheTree: what is written reads as the same tree, and so has the same value to the last bit.
func TestTextIsTheTree(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := drawn().Draw(t, "expression")
		text := n.String()
		back, err := formula.Parse(text)
		if err != nil {
			t.Fatalf("%s: %v", text, err)
		}
		if !back.Equal(n) {
			t.Fatalf("%s reads as %s", text, back)
		}
		f := formula.Must(of("("+text+")", "a", "b", "c"))
		got, err := f.Eval(2, 3, 0.7)
		want := value(n, map[string]float64{"a": 2, "b": 3, "c": 0.7, "pi": math.Pi})
		if err != nil || math.Float64bits(got) != math.Float64bits(want) && !(math.IsNaN(got) && math.IsNaN(want)) {
			t.Fatalf("%s = %v, %v; the tree gives %v", text, got, err, want)
		}
	})
}

// value evaluates the tree apart from the package.
func value(n *formula.Node, env map[string]float64) float64 {
	arg := func(i int) float64 { return value(n.Args[i], env) }
	switch n.Op {
	case formula.Constant:
		return n.Value()
	case formula.Variable:
		return env[n.Text]
	case formula.Negate:
		return -arg(0)
	case formula.Add:
		return arg(0) + arg(1)
	case formula.Subtract:
		return arg(0) - arg(1)
	case formula.Multiply:
		return arg(0) * arg(1)
	case formula.Divide:
		return arg(0) / arg(1)
	}
	switch n.Text {
	case "sqrt":
		return math.Sqrt(arg(0))
	case "exp":
		return math.Exp(arg(0))
	case "pow":
		return math.Pow(arg(0), arg(1))
	}
	return max(arg(0), arg(1))
}

func TestBrackets(t *testing.T) {
	for text, want := range map[string]string{
		"a-(b-c)": "a - (b - c)", "(a-b)-c": "a - b - c", "a/(b/c)": "a/(b/c)", "(a*b)/c": "a*b/c", "a*(b/c)": "a*(b/c)", "-(-a)": "-(-a)",
		"-(a*b)": "-(a*b)", "(-a)*b": "-a*b", "a*-b": "a*-b", "a - -b": "a - -b", "((sqrt((a))))": "sqrt(a)", "pow((a+b),2)*c": "pow(a + b, 2)*c",
	} {
		n, err := formula.Parse(text)
		if err != nil || n.String() != want {
			t.Errorf("%s is written %s, %v; want %s", text, n, err, want)
		}
	}
}
