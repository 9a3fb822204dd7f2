package input

import (
	"slices"
	"strconv"
	"strings"
)

// A Difference is one thing in which two documents of a kind differ.
type Difference struct {
	Kind Change
	Then string // path in the first document; empty where it is not in it
	Now  string // path in the second document; empty where it is not in it

	// The inputs, of a difference of kind Changed. One of them is nil when the
	// other document does not have the input, or has it idle.
	Before, After *Entry
}

// A Change is what became of an input, or of an element of a list.
type Change int

// The changes. All but the first are of whole elements of lists.
const (
	Changed Change = iota
	Added
	Removed
	Moved // to another place among its neighbours
)

// Identifiers are the names of the inputs that tell the elements of a list
// apart, the surest first. An element has the first of them that it has at all.
var identifiers = [...]string{"id", "name", "figure"}

// Compare lists the differences of two documents of one kind, in the order of
// the second. Elements of lists are matched by what identifies them and, where
// that has changed, by their place. An input that is idle in both is no difference.
// Was has, for each input of the second that the first has too, its path there.
func Compare(then, now any) (list []Difference, was map[string]string) {
	c := &comparison{was: map[string]string{}}
	c.parts(tree(Walk(then)), tree(Walk(now)))
	return c.list, c.was
}

// A part is one place in a document: an input, or what holds inputs or elements.
type part struct {
	path     string
	name     string // within what holds it; empty for an element of a list
	entry    *Entry
	fields   []*part
	elements []*part
}

// tree arranges inputs by the elements of their paths.
func tree(entries []Entry) *part {
	root := &part{}
	for i := range entries {
		at := root
		for _, step := range strings.Split(entries[i].Path, ".") {
			name, index, indexed := strings.Cut(strings.TrimSuffix(step, "]"), "[")
			at = at.field(name)
			if n, err := strconv.Atoi(index); indexed && err == nil {
				at = at.element(n)
			}
		}
		at.entry = &entries[i]
	}
	return root
}

func (p *part) field(name string) *part {
	for _, f := range p.fields {
		if f.name == name {
			return f
		}
	}
	f := &part{name: name, path: join(p.path, name)}
	p.fields = append(p.fields, f)
	return f
}

func (p *part) element(n int) *part {
	for len(p.elements) <= n {
		p.elements = append(p.elements, &part{path: p.path + "[" + strconv.Itoa(len(p.elements)) + "]"})
	}
	return p.elements[n]
}

// find is the field of that name, nil when there is none.
func (p *part) find(name string) *part {
	if p == nil {
		return nil
	}
	for _, f := range p.fields {
		if f.name == name {
			return f
		}
	}
	return nil
}

// identity is the text that tells an element from its neighbours.
func (p *part) identity() string {
	for _, name := range identifiers {
		f := p.find(name)
		switch {
		case f == nil || f.entry == nil:
		case f.entry.Text != nil:
			return *f.entry.Text.Value
		case f.entry.Choice != nil:
			return *f.entry.Choice.Value
		}
	}
	return ""
}

type comparison struct {
	list []Difference
	was  map[string]string
}

// same reports whether two inputs of one kind hold the same.
func same(a, b *Entry) bool {
	switch {
	case a.Number != nil && b.Number != nil:
		return *a.Number.Value == *b.Number.Value
	case a.Table != nil && b.Table != nil:
		return slices.EqualFunc(*a.Table.Value, *b.Table.Value, slices.Equal)
	case a.Choice != nil && b.Choice != nil:
		return *a.Choice.Value == *b.Choice.Value
	case a.Text != nil && b.Text != nil:
		return *a.Text.Value == *b.Text.Value
	}
	return false
}

// parts compares what stands at the same place in both documents; one of them may be nil.
func (c *comparison) parts(then, now *part) {
	c.entries(then, now)
	if now != nil {
		for _, f := range now.fields {
			c.parts(then.find(f.name), f)
		}
	}
	if then != nil {
		for _, f := range then.fields {
			if now.find(f.name) == nil {
				c.parts(f, nil)
			}
		}
	}
	c.lists(then.items(), now.items())
}

func (p *part) items() []*part {
	if p == nil {
		return nil
	}
	return p.elements
}

func (p *part) input() *Entry {
	if p == nil || p.entry == nil || p.entry.Idle {
		return nil
	}
	return p.entry
}

func (c *comparison) entries(then, now *part) {
	before, after := then.input(), now.input()
	if then != nil && now != nil && then.entry != nil && now.entry != nil {
		c.was[now.path] = then.path
	}
	if before == nil && after == nil || before != nil && after != nil && same(before, after) {
		return
	}
	d := Difference{Kind: Changed, Before: before, After: after}
	if then != nil {
		d.Then = then.path
	}
	if now != nil {
		d.Now = now.path
	}
	c.list = append(c.list, d)
}

// lists compares the elements of a list in the order of the second document;
// one that was removed stands before what took its place.
func (c *comparison) lists(then, now []*part) {
	match, moved := matched(then, now)
	gone := func(from, to int) {
		for i := from; i < to; i++ {
			if !slices.Contains(match, i) {
				c.list = append(c.list, Difference{Kind: Removed, Then: then[i].path})
			}
		}
	}
	next := 0 // of the first document, not yet listed
	for j, e := range now {
		i := match[j]
		switch {
		case i < 0:
			c.list = append(c.list, Difference{Kind: Added, Now: e.path})
			continue
		case moved[j]:
			c.list = append(c.list, Difference{Kind: Moved, Then: then[i].path, Now: e.path})
		default:
			gone(next, i)
			next = i + 1
		}
		c.parts(then[i], e)
	}
	gone(next, len(then))
}

// matched tells for each element of now which of then it was, -1 for none, and
// which have changed their place among the others.
func matched(then, now []*part) (match []int, moved []bool) {
	match, moved = make([]int, len(now)), make([]bool, len(now))
	for j := range match {
		match[j] = -1
	}
	for _, pair := range kept(then, now) {
		match[pair[1]] = pair[0]
	}
	for j, e := range now {
		if match[j] >= 0 || e.identity() == "" {
			continue
		}
		for i, o := range then {
			if o.identity() == e.identity() && !slices.Contains(match, i) {
				match[j], moved[j] = i, true
				break
			}
		}
	}
	// What is left over between the same neighbours, in the same number, was renamed; an identifier never is.
	for j := 0; j < len(now); j++ {
		if match[j] >= 0 || now[j].find("id") != nil {
			continue
		}
		end := j
		for end < len(now) && match[end] < 0 {
			end++
		}
		from := 0
		if before := last(match, moved, j); before >= 0 {
			from = before + 1
		}
		var free []int
		for i := from; i < len(then) && len(free) <= end-j; i++ {
			if slices.Contains(match, i) {
				break
			}
			free = append(free, i)
		}
		if len(free) == end-j {
			copy(match[j:end], free)
		}
		j = end
	}
	return match, moved
}

// last is the element of the first document that the nearest unmoved one before j was, -1 when there is none.
func last(match []int, moved []bool, j int) int {
	for j--; j >= 0; j-- {
		if match[j] >= 0 && !moved[j] {
			return match[j]
		}
	}
	return -1
}

// kept is a longest sequence of elements with the same identities in both lists, as pairs of places.
func kept(then, now []*part) [][2]int {
	// longest[i][j] is the length of the sequence in then[i:] and now[j:].
	longest := make([][]int, len(then)+1)
	for i := range longest {
		longest[i] = make([]int, len(now)+1)
	}
	equal := func(i, j int) bool { return then[i].identity() == now[j].identity() }
	for i := len(then) - 1; i >= 0; i-- {
		for j := len(now) - 1; j >= 0; j-- {
			longest[i][j] = max(longest[i+1][j], longest[i][j+1])
			if equal(i, j) {
				longest[i][j] = max(longest[i][j], 1+longest[i+1][j+1])
			}
		}
	}
	var pairs [][2]int
	for i, j := 0, 0; i < len(then) && j < len(now); {
		switch {
		case equal(i, j) && longest[i][j] == 1+longest[i+1][j+1]:
			pairs = append(pairs, [2]int{i, j})
			i, j = i+1, j+1
		case longest[i+1][j] >= longest[i][j+1]:
			i++
		default:
			j++
		}
	}
	return pairs
}
