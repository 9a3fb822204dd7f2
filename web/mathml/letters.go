package mathml

import (
	"strings"
	"unicode"
)

// difference marks a letter that stands for a change of the next: dCD is ΔC with its subscript.
const difference = "Δ"

// A spelling is how a symbol's name is set.
type spelling struct {
	base  string // letter, with difference before it, or a word
	below string // subscript
	dot   bool   // over the letter: a rate
}

// own are the names that the rules of spelt would set differently from how the trade writes them.
var own = map[string]spelling{
	"RC":   {base: "R/C"},
	"Re":   {base: "Re"},
	"FF":   {base: "FF"},
	"tc":   {base: "t/c"},
	"RH":   {base: "RH"},
	"idle": {base: "m", below: "idle", dot: true},
	"Psl":  {base: "P", below: "SL"},
}

// greek are the letters that names spell out. A longer name goes before a shorter one that begins it.
var greek = []struct{ name, letter string }{
	{"alpha", "α"}, {"beta", "β"}, {"gamma", "γ"}, {"delta", "δ"}, {"epsilon", "ε"}, {"zeta", "ζ"}, {"eta", "η"}, {"theta", "θ"},
	{"kappa", "κ"}, {"lambda", "λ"}, {"mu", "μ"}, {"nu", "ν"}, {"xi", "ξ"}, {"pi", "π"}, {"rho", "ρ"}, {"sigma", "σ"}, {"tau", "τ"},
	{"phi", "φ"}, {"chi", "χ"}, {"psi", "ψ"}, {"omega", "ω"},
	{"Gamma", "Γ"}, {"Delta", "Δ"}, {"Theta", "Θ"}, {"Lambda", "Λ"}, {"Sigma", "Σ"}, {"Phi", "Φ"}, {"Psi", "Ψ"}, {"Omega", "Ω"},
}

// spelt applies the rules: d before a capital is a difference, "dot" at the end a
// rate, a Greek letter's name that letter; what follows the letter is its subscript.
func spelt(name string) spelling {
	if s, ok := own[name]; ok {
		return s
	}
	runes := []rune(name)
	if len(runes) > 1 && runes[0] == 'd' && unicode.IsUpper(runes[1]) {
		s := spelt(string(runes[1:]))
		s.base = difference + s.base
		return s
	}
	if rate, ok := strings.CutSuffix(name, "dot"); ok && rate != "" {
		s := spelt(rate)
		s.dot = true
		return s
	}
	for _, g := range greek {
		if rest, ok := strings.CutPrefix(name, g.name); ok && short(rest) {
			return spelling{base: g.letter, below: subscript(rest)}
		}
	}
	return spelling{base: string(runes[0]), below: subscript(string(runes[1:]))}
}

// short reports whether what follows a Greek letter's name can be a subscript: "sigmac", "phi0", "rhoSL", not the tail of a word that begins like one.
func short(rest string) bool {
	return len(rest) <= 1 || !unicode.IsLower([]rune(rest)[0])
}

// subscript parts a capital from the word after it: "Dmin" is "D,min".
func subscript(text string) string {
	r := []rune(text)
	if len(r) > 1 && unicode.IsUpper(r[0]) && unicode.IsLower(r[1]) {
		return string(r[0]) + "," + string(r[1:])
	}
	return text
}

// letters writes a symbol.
func (b *builder) letters(name string) {
	s := spelt(name)
	if s.below == "" {
		b.base(s)
		return
	}
	b.element("msub", func() {
		b.base(s)
		b.below(s.below)
	})
}

// base writes the letter of a symbol as one element.
func (b *builder) base(s spelling) {
	letter, changed := strings.CutPrefix(s.base, difference)
	if changed && letter != "" {
		b.element("mrow", func() {
			b.upright(difference)
			b.base(spelling{base: letter, dot: s.dot})
		})
		return
	}
	if s.dot {
		b.element("mover", func() {
			b.base(spelling{base: s.base})
			b.operator("˙")
		})
		return
	}
	if s.base == "π" {
		b.upright(s.base)
		return
	}
	b.identifier(s.base)
}

// below writes a subscript as one element: labels stand upright, digits as numbers.
func (b *builder) below(text string) {
	parts := strings.Split(text, ",")
	write := func() {
		for i, part := range parts {
			if i > 0 {
				b.operator(",")
			}
			if strings.Trim(part, "0123456789") == "" {
				b.numeral(part)
			} else {
				b.upright(part)
			}
		}
	}
	if len(parts) == 1 {
		write()
		return
	}
	b.element("mrow", write)
}
