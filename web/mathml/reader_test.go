package mathml

import (
	"encoding/xml"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
)

// A tester is what a test or a property gives to its checks.
type tester interface {
	Helper()
	Errorf(string, ...any)
	Fatalf(string, ...any)
}

// An element is a node of the markup.
type element struct {
	name, text string
	inside     []*element
}

// parsed reads markup as XML, which is stricter than HTML.
func parsed(t tester, markup string) *element {
	t.Helper()
	d := xml.NewDecoder(strings.NewReader(markup))
	stack := []*element{{}}
	for {
		token, err := d.Token()
		if err == io.EOF {
			break
		}
		if err != nil {
			t.Fatalf("%v in %s", err, markup)
		}
		top := stack[len(stack)-1]
		switch token := token.(type) {
		case xml.StartElement:
			e := &element{name: token.Name.Local}
			top.inside = append(top.inside, e)
			stack = append(stack, e)
		case xml.EndElement:
			stack = stack[:len(stack)-1]
		case xml.CharData:
			top.text += string(token)
		}
	}
	if len(stack) != 1 || len(stack[0].inside) != 1 {
		t.Fatalf("not one element: %s", markup)
	}
	return stack[0].inside[0]
}

// arity is how many children each element has: what MathML Core asks; -1 is any number, -2 text.
var arity = map[string]int{"math": 1, "semantics": 2, "annotation": -2, "mrow": -1, "mi": -2, "mn": -2, "mo": -2, "mspace": 0,
	"mfrac": 2, "msqrt": -1, "msup": 2, "msub": 2, "mover": 2}

func checkShape(t tester, name string, e *element) {
	t.Helper()
	want, known := arity[e.name]
	switch {
	case !known:
		t.Errorf("%s: <%s> is not of MathML Core or not expected", name, e.name)
	case want >= 0 && len(e.inside) != want:
		t.Errorf("%s: <%s> has %d children, not %d", name, e.name, len(e.inside), want)
	case want == -2 && (e.text == "" || len(e.inside) > 0):
		t.Errorf("%s: <%s> without text", name, e.name)
	case want != -2 && strings.TrimSpace(e.text) != "":
		t.Errorf("%s: text in <%s>", name, e.name)
	}
	for _, c := range e.inside {
		checkShape(t, name, c)
	}
}

// key is what distinguishes an element for the eye.
func (e *element) key() string {
	s := e.name + "(" + e.text
	for _, c := range e.inside {
		s += c.key()
	}
	return s + ")"
}

// spoken is the key of a symbol.
func spoken(name string) string {
	var b builder
	b.letters(name)
	d := xml.NewDecoder(strings.NewReader(b.String()))
	stack := []*element{{}}
	for token, err := d.Token(); err == nil; token, err = d.Token() {
		switch token := token.(type) {
		case xml.StartElement:
			e := &element{name: token.Name.Local}
			stack[len(stack)-1].inside = append(stack[len(stack)-1].inside, e)
			stack = append(stack, e)
		case xml.EndElement:
			stack = stack[:len(stack)-1]
		case xml.CharData:
			stack[len(stack)-1].text += string(token)
		}
	}
	return stack[0].inside[0].key()
}

// A reader gives mathematics its value, by the rules by which it is read.
type reader struct {
	names map[string]string // of symbols, by key
}

// equation is the value of what stands right of the equals sign.
func (r reader) equation(t tester, root *element, env map[string]float64) float64 {
	t.Helper()
	row := root.inside[0].inside[0].inside
	if len(row) < 3 || row[1].text != "=" || r.names[row[0].key()] == "" {
		t.Fatalf("not an equation: %s", root.key())
	}
	return r.sum(t, row[2:], env)
}

func isOperator(e *element, text string) bool { return e.name == "mo" && e.text == text }

// sum reads terms with + and − between them.
func (r reader) sum(t tester, row []*element, env map[string]float64) float64 {
	t.Helper()
	total, sign, from := 0.0, 1.0, 0
	for i := 0; i <= len(row); i++ {
		if i < len(row) && !isOperator(row[i], "+") && !isOperator(row[i], minus) {
			continue
		}
		if i > from {
			total += sign * r.product(t, row[from:i], env)
		} else if i > 0 || i == len(row) {
			t.Fatalf("two signs beside each other, or nothing: %v", row)
		}
		if i < len(row) {
			sign, from = 1, i+1
			if isOperator(row[i], minus) {
				sign = -1
			}
		}
	}
	return total
}

// product reads factors beside each other; a digit may not follow anything without a point.
func (r reader) product(t tester, row []*element, env map[string]float64) float64 {
	t.Helper()
	value := 1.0
	for i := 0; i < len(row); i++ {
		e := row[i]
		if e.name == "mspace" || isOperator(e, times) || isOperator(e, "⋅") || isOperator(e, "×") {
			continue
		}
		if e.name == "mn" && i > 0 && !isOperator(row[i-1], "⋅") && !isOperator(row[i-1], "×") {
			t.Fatalf("a number follows without a sign between")
		}
		if name := e.function(); name != "" && i+2 < len(row) && isOperator(row[i+1], applying) {
			value *= r.function(t, name, row[i+2], env)
			i += 2
			continue
		}
		value *= r.value(t, e, env)
	}
	return value
}

// function is the name of a function that e spells: a word, or a logarithm with its base.
func (e *element) function() string {
	switch {
	case e.name == "mi":
		return e.text
	case e.name == "msub" && e.inside[0].text == "log":
		return "log" + e.inside[1].text
	}
	return ""
}

func (r reader) function(t tester, name string, brackets *element, env map[string]float64) float64 {
	t.Helper()
	row := brackets.inside
	if len(row) < 3 || !isOperator(row[0], "(") || !isOperator(row[len(row)-1], ")") {
		t.Fatalf("%s has no brackets", name)
	}
	var a []float64
	from := 1
	for i := 1; i < len(row); i++ {
		if i == len(row)-1 || isOperator(row[i], ",") {
			a = append(a, r.sum(t, row[from:i], env))
			from = i + 1
		}
	}
	switch name {
	case "exp":
		return math.Exp(a[0])
	case "sin":
		return math.Sin(a[0])
	case "cos":
		return math.Cos(a[0])
	case "tan":
		return math.Tan(a[0])
	case "arcsin":
		return math.Asin(a[0])
	case "log10":
		return math.Log10(a[0])
	case "min":
		return slices.Min(a)
	case "max":
		return slices.Max(a)
	}
	t.Fatalf("no function %s", name)
	return 0
}

func (r reader) value(t tester, e *element, env map[string]float64) float64 {
	t.Helper()
	if name, ok := r.names[e.key()]; ok {
		return env[name]
	}
	switch e.name {
	case "mn":
		v, err := strconv.ParseFloat(strings.Replace(e.text, minus, "-", 1), 64)
		if err != nil {
			t.Fatalf("%v", err)
		}
		return v
	case "mrow":
		row := e.inside
		if isOperator(row[0], "(") {
			row = row[1 : len(row)-1]
		}
		return r.sum(t, row, env)
	case "mfrac":
		return r.value(t, e.inside[0], env) / r.value(t, e.inside[1], env)
	case "msqrt":
		return math.Sqrt(r.sum(t, e.inside, env))
	case "msup":
		return math.Pow(r.value(t, e.inside[0], env), r.value(t, e.inside[1], env))
	}
	t.Fatalf("no meaning for %s", e.key())
	return 0
}
