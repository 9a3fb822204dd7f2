// Package mathml sets expressions as mathematics in MathML Core, from the same
// tree that is evaluated. A browser without MathML shows the expression as text.
package mathml

import (
	"html"
	"math"
	"strings"

	"legwright/internal/perf/formula"
)

// Equation sets "out = expression" as a line of its own, with the linear text
// twice: for screen readers, and for browsers that do not know MathML.
func Equation(out string, expr *formula.Node) string {
	var b builder
	b.letters(out)
	b.operator("=")
	b.expression(expr)
	text := html.EscapeString(out + " = " + expr.String())
	return `<math display="block" alttext="` + text + `"><semantics><mrow>` + b.String() + `</mrow><annotation encoding="text/plain">` + text + `</annotation></semantics></math>`
}

// Symbol sets one symbol in the text.
func Symbol(name string) string {
	var b builder
	b.letters(name)
	return `<math alttext="` + html.EscapeString(name) + `">` + b.String() + `</math>`
}

type builder struct{ strings.Builder }

// element writes what inside writes as one element.
func (b *builder) element(name string, inside func()) {
	b.WriteString("<" + name + ">")
	inside()
	b.WriteString("</" + name + ">")
}

func (b *builder) operator(text string)   { b.WriteString("<mo>" + text + "</mo>") }
func (b *builder) numeral(text string)    { b.WriteString("<mn>" + text + "</mn>") }
func (b *builder) identifier(text string) { b.WriteString("<mi>" + text + "</mi>") }

// upright writes a letter that is no quantity: a label, or pi.
func (b *builder) upright(text string) { b.WriteString(`<mi mathvariant="normal">` + text + "</mi>") }

const (
	minus    = "−"
	times    = "\u2062" // product by juxtaposition
	applying = "\u2061" // between a function and its arguments
)

// expression writes n without brackets around it.
func (b *builder) expression(n *formula.Node) {
	switch n.Op {
	case formula.Constant:
		b.constant(n)
	case formula.Variable:
		b.letters(n.Text)
	case formula.Negate:
		b.operator(minus)
		b.bracketed(n.Args[0], n.Args[0].Op == formula.Add || n.Args[0].Op == formula.Subtract || negative(n.Args[0]))
	case formula.Add, formula.Subtract:
		b.expression(n.Args[0])
		if n.Op == formula.Add {
			b.operator("+")
		} else {
			b.operator(minus)
		}
		right := n.Args[1]
		b.bracketed(right, right.Op == formula.Add || right.Op == formula.Subtract || negative(right))
	case formula.Multiply:
		b.product(n)
	case formula.Divide:
		b.element("mfrac", func() {
			b.grouped(n.Args[0])
			b.grouped(n.Args[1])
		})
	case formula.Call:
		b.call(n)
	}
}

// grouped writes n as one element.
func (b *builder) grouped(n *formula.Node) {
	if n.Op == formula.Variable || n.Op == formula.Divide {
		b.expression(n)
		return
	}
	b.element("mrow", func() { b.expression(n) })
}

// negative reports whether n, written without brackets, begins with a minus sign.
func negative(n *formula.Node) bool {
	switch n.Op {
	case formula.Negate:
		return true
	case formula.Add, formula.Subtract, formula.Multiply:
		return negative(n.Args[0])
	}
	return false
}

func (b *builder) bracketed(n *formula.Node, need bool) {
	if !need {
		b.expression(n)
		return
	}
	b.brackets(func() { b.expression(n) })
}

func (b *builder) brackets(inside func()) {
	b.element("mrow", func() {
		b.operator("(")
		inside()
		b.operator(")")
	})
}

// constant writes a number: thirds as fractions, powers of ten as such, the rest as written.
func (b *builder) constant(n *formula.Node) {
	for _, p := range []string{"1", "2", "4", "5"} {
		if len(n.Text) > 8 && n.Value() == float64(p[0]-'0')/3 {
			b.fraction(p, "3")
			return
		}
	}
	mantissa, exponent, scaled := strings.Cut(strings.ToLower(n.Text), "e")
	if !scaled || strings.HasPrefix(mantissa, "0x") {
		b.numeral(n.Text)
		return
	}
	b.element("mrow", func() {
		b.numeral(mantissa)
		b.operator("×")
		b.element("msup", func() {
			b.numeral("10")
			b.numeral(strings.Replace(strings.TrimPrefix(exponent, "+"), "-", minus, 1))
		})
	})
}

func (b *builder) fraction(over, under string) {
	b.element("mfrac", func() {
		b.numeral(over)
		b.numeral(under)
	})
}

// call writes a function: roots and powers by their place, others by name.
func (b *builder) call(n *formula.Node) {
	switch n.Text {
	case "sqrt":
		b.element("msqrt", func() { b.expression(n.Args[0]) })
	case "pow":
		b.power(n.Args[0], func() { b.grouped(n.Args[1]) })
	default:
		b.named(n.Text)
		b.operator(applying)
		b.brackets(func() {
			for i, a := range n.Args {
				if i > 0 {
					b.operator(",")
				}
				b.expression(a)
			}
		})
	}
}

// named writes the name of a function, the decimal logarithm with its base.
func (b *builder) named(name string) {
	if name != "log10" {
		b.identifier(strings.Replace(name, "asin", "arcsin", 1))
		return
	}
	b.element("msub", func() {
		b.identifier("log")
		b.numeral("10")
	})
}

// power writes a base with its exponent.
func (b *builder) power(base *formula.Node, exponent func()) {
	b.element("msup", func() {
		if base.Op == formula.Variable && !strings.HasPrefix(spelt(base.Text).base, difference) {
			b.letters(base.Text)
		} else if base.Op == formula.Constant && math.Trunc(base.Value()) == base.Value() && !strings.ContainsAny(base.Text, "eExX") {
			b.constant(base)
		} else {
			b.brackets(func() { b.expression(base) })
		}
		exponent()
	})
}

// A factor is part of a product: a run of equal ones is a power.
type factor struct {
	of    *formula.Node
	count int
}

// product writes factors beside each other, equal ones in a row as a power, and
// a product that repeats a shorter one as a power of that.
func (b *builder) product(n *formula.Node) {
	list := factors(n)
	if short, count := repeated(list); count > 1 {
		b.element("msup", func() {
			b.brackets(func() { b.factors(short) })
			b.numeral(digit(count))
		})
		return
	}
	b.factors(list)
}

// factors flattens a product: a*b*(c*d) has four.
func factors(n *formula.Node) []*formula.Node {
	if n.Op != formula.Multiply {
		return []*formula.Node{n}
	}
	return append(factors(n.Args[0]), factors(n.Args[1])...)
}

// repeated finds the shortest list of two factors or more that, repeated, is the whole.
func repeated(list []*formula.Node) (short []*formula.Node, count int) {
	for size := 2; size <= len(list)/2; size++ {
		same := len(list)%size == 0 && len(list)/size < 10
		for i := range list {
			same = same && list[i].Equal(list[i%size])
		}
		if same && !list[0].Equal(list[1]) {
			return list[:size], len(list) / size
		}
	}
	return list, 1
}

func (b *builder) factors(list []*formula.Node) {
	var runs []factor
	for _, n := range list {
		if last := len(runs) - 1; last >= 0 && runs[last].of.Equal(n) && runs[last].count < 9 {
			runs[last].count++
		} else {
			runs = append(runs, factor{n, 1})
		}
	}
	for i, f := range runs {
		if i > 0 {
			b.between(f.of)
		}
		switch n := f.of; {
		case f.count > 1:
			b.power(n, func() { b.numeral(digit(f.count)) })
		case n.Op == formula.Constant && n.Text == "0.5" && len(runs) > 1:
			b.fraction("1", "2")
		default:
			sum := n.Op == formula.Add || n.Op == formula.Subtract
			b.bracketed(n, sum || i > 0 && negative(n))
		}
	}
}

// between separates the factor before from the one that follows: a digit needs a point, anything else a little room.
func (b *builder) between(next *formula.Node) {
	if next.Op == formula.Constant {
		b.operator("⋅")
		return
	}
	b.operator(times)
	b.WriteString(`<mspace width="0.17em"></mspace>`)
}

func digit(n int) string { return string(rune('0' + n)) }
