package views

import "strings"

// plain is the part as text that can be pasted anywhere.
func (p *Part) plain() string {
	var b strings.Builder
	b.WriteString("\n" + p.Title + "\n" + strings.Repeat("=", len([]rune(p.Title))) + "\n")
	for _, l := range p.Lines {
		switch {
		case l.Heading != "":
			b.WriteString("\n" + l.Heading + "\n" + strings.Repeat("-", len([]rune(l.Heading))) + "\n")
		case l.Step == nil:
			b.WriteString("\n" + l.Remark + "\n")
		default:
			l.Step.plain(&b)
		}
	}
	return b.String()
}

func (s *WorkedStep) plain(b *strings.Builder) {
	b.WriteString("\n(" + s.Number + ") " + s.Means + "\n    " + s.Name + " = " + s.Expr + "\n    " + s.Name + " = " + s.Result)
	if s.Shown != "" {
		b.WriteString(" (" + s.Shown + ")")
	}
	b.WriteString("\n")
	for _, v := range s.Values {
		b.WriteString("      " + v.Name + " = " + v.Value + "  " + v.Means)
		if from := v.plain(); from != "" {
			b.WriteString("; " + from)
		}
		b.WriteString("\n")
	}
	b.WriteString("    Source: " + s.Source + "\n")
}

// plain is where the value comes from, in words.
func (v *WorkedValue) plain() string {
	var parts []string
	for _, g := range v.From {
		text := g.Label
		if g.Basis != "" {
			text += " (" + g.Basis + ")"
		}
		parts = append(parts, text)
	}
	if v.Words != "" {
		parts = append(parts, v.Words)
	}
	return strings.Join(parts, ", ")
}
