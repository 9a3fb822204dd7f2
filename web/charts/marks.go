package charts

import (
	"cmp"
	"slices"
)

// A placedMark is a mark with the row of its label; row 0 is nearest to the data. The
// label stands beside the top of the mark's line like a flag on its mast.
type placedMark struct {
	x     float64 // of the line in points
	label string
	width float64 // of the label in points
	left  bool    // the label stands on the left of the line
	row   int
}

// flagGap is the distance between a mark's line and its label in points.
const flagGap = 3.0

// span returns the ends of the label in points.
func (m placedMark) span() (x0, x1 float64) {
	if m.left {
		return m.x - flagGap - m.width, m.x - flagGap
	}
	return m.x + flagGap, m.x + flagGap + m.width
}

// placeMarks stacks the labels in rows so that no label meets another label or
// another mark's line. Labels stand on the right of their lines except for the
// rightmost ones, as few as possible.
func placeMarks(marks []Mark, x scale, width, size float64) (placed []placedMark, rows int) {
	for _, m := range marks {
		if !x.has(m.X) {
			continue
		}
		label := shortened(m.Label, width/2-2*flagGap, size, false)
		placed = append(placed, placedMark{x: x.at(m.X), label: label, width: textWidth(label, size, false)})
	}
	slices.SortStableFunc(placed, func(a, b placedMark) int { return cmp.Compare(a.x, b.x) })

	var best []placedMark
	for flipped := 0; flipped <= len(placed); flipped++ {
		try := slices.Clone(placed)
		for i := range try {
			try[i].left = i >= len(try)-flipped
		}
		if !fits(try, width) || !stack(try) {
			continue
		}
		if best == nil || rowCount(try) < rowCount(best) {
			best = try
		}
	}
	if best == nil {
		best = placed
		for i := range best { // a line may cross a label here, a label never a label
			best[i].left, best[i].row = best[i].x > width/2, i
		}
	}
	return best, rowCount(best)
}

func fits(marks []placedMark, width float64) bool {
	for _, m := range marks {
		if x0, x1 := m.span(); x0 < 0 || x1 > width {
			return false
		}
	}
	return true
}

func rowCount(marks []placedMark) int {
	n := 0
	for _, m := range marks {
		if m.label != "" {
			n = max(n, m.row+1)
		}
	}
	return n
}

// stack raises rows until every pair agrees; it reports false if a pair cannot.
func stack(marks []placedMark) bool {
	for changed := true; changed; {
		changed = false
		for i := range marks {
			for j := i + 1; j < len(marks); j++ {
				raised, ok := settle(&marks[i], &marks[j])
				if !ok || max(marks[i].row, marks[j].row) > len(marks) {
					return false
				}
				changed = changed || raised
			}
		}
	}
	return true
}

// settle raises one of two marks if they conflict. A label has to stand above the lines
// that pass under it.
func settle(a, b *placedMark) (raised, ok bool) {
	const gap = 5
	a0, a1 := a.span()
	b0, b1 := b.span()
	under := func(x, x0, x1 float64) bool { return x > x0-1 && x < x1+1 }
	aHigh, bHigh := under(b.x, a0, a1), under(a.x, b0, b1)
	switch {
	case aHigh && bHigh:
		return false, false
	case aHigh && a.row <= b.row:
		a.row = b.row + 1
		return true, true
	case bHigh && b.row <= a.row:
		b.row = a.row + 1
		return true, true
	case a.row == b.row && a0 < b1+gap && b0 < a1+gap:
		a.row++
		return true, true
	}
	return false, true
}

// A placedSpan is a span on the canvas; its name is empty where none fits.
type placedSpan struct {
	x0, x1 float64 // in points
	name   words
	shaded bool
}

// placeSpans names the spans, widest first, in full, in short or not at all. A name may
// stand a little over the ends of its span if the space is free.
func placeSpans(spans []Span, x scale, width, baseline, size float64) []placedSpan {
	const gap, overhang = 3, 10
	var placed []placedSpan
	var labels [][2]string
	for i, s := range spans {
		if !usable(s.From) || !usable(s.To) || s.To <= x.min || s.From >= x.max || s.From >= s.To {
			continue
		}
		placed = append(placed, placedSpan{
			x0: x.at(max(s.From, x.min)), x1: x.at(min(s.To, x.max)), shaded: i%2 == 1,
		})
		labels = append(labels, [2]string{s.Label, s.Short})
	}
	order := make([]int, len(placed))
	for i := range order {
		order[i] = i
	}
	slices.SortStableFunc(order, func(a, b int) int {
		return cmp.Compare(placed[b].x1-placed[b].x0, placed[a].x1-placed[a].x0)
	})
	var taken []box
	for _, i := range order {
		p := &placed[i]
		for _, text := range labels[i] {
			w := words{text: text, x: (p.x0 + p.x1) / 2, y: baseline, anchor: 0.5, size: size, class: "ink-2"}
			w = w.keptIn(0, width)
			b := w.box().grown(gap)
			if text == "" || w.width() > p.x1-p.x0+overhang || slices.ContainsFunc(taken, b.overlaps) {
				continue
			}
			p.name, taken = w, append(taken, w.box())
			break
		}
	}
	return placed
}
