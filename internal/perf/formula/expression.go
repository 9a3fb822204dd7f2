package formula

import (
	"errors"
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"iter"
	"math"
	"slices"
	"strconv"
	"strings"
)

// An Op is what a Node stands for.
type Op int

// The operations. Constant and Variable have no arguments, Negate has one,
// Call as many as its function takes, the others two.
const (
	Constant Op = iota // a number
	Variable           // a symbol, or pi
	Negate
	Add
	Subtract
	Multiply
	Divide
	Call
)

// A Node is a part of an expression with its arguments. The same tree is
// evaluated, written as text and set as mathematics.
type Node struct {
	Op    Op
	Text  string // digits of a Constant as written, name of a Variable or of the function called
	Args  []*Node
	value float64 // of a Constant
}

// A function of the expression language; arity 0 takes one value or more.
type function struct {
	arity int
	of    func(a []float64) float64
}

var funcs = map[string]function{
	"sqrt":  {1, func(a []float64) float64 { return math.Sqrt(a[0]) }},
	"pow":   {2, func(a []float64) float64 { return math.Pow(a[0], a[1]) }},
	"exp":   {1, func(a []float64) float64 { return math.Exp(a[0]) }},
	"log10": {1, func(a []float64) float64 { return math.Log10(a[0]) }},
	"sin":   {1, func(a []float64) float64 { return math.Sin(a[0]) }},
	"cos":   {1, func(a []float64) float64 { return math.Cos(a[0]) }},
	"tan":   {1, func(a []float64) float64 { return math.Tan(a[0]) }},
	"asin":  {1, func(a []float64) float64 { return math.Asin(a[0]) }},
	"min":   {0, func(a []float64) float64 { return slices.Min(a) }},
	"max":   {0, func(a []float64) float64 { return slices.Max(a) }},
}

var operators = map[token.Token]Op{token.ADD: Add, token.SUB: Subtract, token.MUL: Multiply, token.QUO: Divide}

// Parse reads an expression: Go's syntax with numbers, names, + - * /, brackets and the functions in funcs.
func Parse(text string) (*Node, error) {
	tree, err := parser.ParseExpr(text)
	if err != nil {
		return nil, err
	}
	return node(tree)
}

func node(e ast.Expr) (*Node, error) {
	switch e := e.(type) {
	case *ast.BasicLit:
		v, err := strconv.ParseFloat(e.Value, 64)
		return &Node{Op: Constant, Text: e.Value, value: v}, err
	case *ast.Ident:
		return &Node{Op: Variable, Text: e.Name}, nil
	case *ast.ParenExpr:
		return node(e.X)
	case *ast.UnaryExpr:
		if e.Op != token.SUB {
			return nil, fmt.Errorf("unsupported operator %s", e.Op)
		}
		return with(&Node{Op: Negate}, e.X)
	case *ast.BinaryExpr:
		op, ok := operators[e.Op]
		if !ok {
			return nil, fmt.Errorf("unsupported operator %s", e.Op)
		}
		return with(&Node{Op: op}, e.X, e.Y)
	case *ast.CallExpr:
		return call(e)
	}
	return nil, errors.New("unsupported expression")
}

func call(e *ast.CallExpr) (*Node, error) {
	name, _ := e.Fun.(*ast.Ident)
	if name == nil || funcs[name.Name].of == nil {
		return nil, errors.New("unknown function")
	}
	fn := funcs[name.Name]
	if n := len(e.Args); n == 0 || (fn.arity != 0 && n != fn.arity) {
		return nil, fmt.Errorf("%s takes %d values, not %d", name.Name, max(1, fn.arity), n)
	}
	return with(&Node{Op: Call, Text: name.Name}, e.Args...)
}

// with gives n its arguments.
func with(n *Node, args ...ast.Expr) (*Node, error) {
	for _, a := range args {
		arg, err := node(a)
		if err != nil {
			return nil, err
		}
		n.Args = append(n.Args, arg)
	}
	return n, nil
}

// symbols yields the name of every Variable.
func (n *Node) symbols() iter.Seq[string] {
	return func(yield func(string) bool) { n.walk(yield) }
}

func (n *Node) walk(yield func(string) bool) bool {
	if n.Op == Variable && !yield(n.Text) {
		return false
	}
	for _, a := range n.Args {
		if !a.walk(yield) {
			return false
		}
	}
	return true
}

func (n *Node) eval(env map[string]float64) float64 {
	switch n.Op {
	case Constant:
		return n.value
	case Variable:
		return env[n.Text]
	}
	a := make([]float64, len(n.Args))
	for i := range n.Args {
		a[i] = n.Args[i].eval(env)
	}
	switch n.Op {
	case Negate:
		return -a[0]
	case Add:
		return a[0] + a[1]
	case Subtract:
		return a[0] - a[1]
	case Multiply:
		return a[0] * a[1]
	case Divide:
		return a[0] / a[1]
	}
	return funcs[n.Text].of(a)
}

// Value is the number of a Constant, in no unit.
func (n *Node) Value() float64 { return n.value }

// Equal reports whether both are written alike.
func (n *Node) Equal(m *Node) bool {
	return n.Op == m.Op && n.Text == m.Text && slices.EqualFunc(n.Args, m.Args, (*Node).Equal)
}

// binding is how tightly an operation holds its arguments together.
func (n *Node) binding() int {
	switch n.Op {
	case Add, Subtract:
		return 1
	case Multiply, Divide:
		return 2
	case Negate:
		return 3
	}
	return 4
}

// String writes the expression as Parse reads it, with as few brackets as keep its order.
func (n *Node) String() string {
	arg := func(i, least int) string {
		if text := n.Args[i].String(); n.Args[i].binding() >= least {
			return text
		} else {
			return "(" + text + ")"
		}
	}
	switch n.Op {
	case Negate:
		return "-" + arg(0, 4)
	case Add:
		return arg(0, 1) + " + " + arg(1, 2)
	case Subtract:
		return arg(0, 1) + " - " + arg(1, 2)
	case Multiply:
		return arg(0, 2) + "*" + arg(1, 3)
	case Divide:
		return arg(0, 2) + "/" + arg(1, 3)
	case Call:
		list := make([]string, len(n.Args))
		for i := range n.Args {
			list[i] = n.Args[i].String()
		}
		return n.Text + "(" + strings.Join(list, ", ") + ")"
	}
	return n.Text
}
