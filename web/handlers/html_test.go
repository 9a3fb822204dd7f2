package handlers

import (
	"fmt"
	"slices"
	"strings"
	"testing"
	"unicode"

	"golang.org/x/net/html"
)

// parsePage reads HTML as a browser does: it never fails, so checkPage looks for what it had to mend.
func parsePage(t testing.TB, text string) *html.Node {
	t.Helper()
	n, err := html.Parse(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// all returns the elements that a selector means: "tag", "#id", ".class",
// "[name]", "[name=value]", joined without a blank when they hold of one
// element, and with a blank when the second is inside the first.
func all(root *html.Node, selector string) []*html.Node {
	found := []*html.Node{root}
	for _, part := range strings.Fields(selector) {
		var next []*html.Node
		seen := map[*html.Node]bool{}
		for _, from := range found {
			for n := range from.Descendants() {
				if n.Type == html.ElementNode && !seen[n] && matches(n, part) {
					seen[n] = true
					next = append(next, n)
				}
			}
		}
		found = next
	}
	return found
}

// one returns the first element that the selector means, or nil.
func one(root *html.Node, selector string) *html.Node {
	if list := all(root, selector); len(list) > 0 {
		return list[0]
	}
	return nil
}

// matches holds one element against a selector without blanks.
func matches(n *html.Node, selector string) bool {
	tag := selector
	if end := strings.IndexAny(selector, "#.["); end >= 0 {
		tag, selector = selector[:end], selector[end:]
	} else {
		selector = ""
	}
	if tag != "" && n.Data != tag {
		return false
	}
	for selector != "" {
		var part string
		part, selector = cutPart(selector)
		switch name, value, valued := strings.Cut(part[1:], "="); {
		case part[0] == '#' && attr(n, "id") != part[1:],
			part[0] == '.' && !slices.Contains(strings.Fields(attr(n, "class")), part[1:]),
			part[0] == '[' && !valued && !has(n, name),
			part[0] == '[' && valued && (!has(n, name) || attr(n, name) != value):
			return false
		}
	}
	return true
}

// cutPart splits "#a.b[c=d]" behind its first part; the bracket is dropped.
func cutPart(s string) (part, rest string) {
	if s[0] == '[' {
		end := strings.LastIndexByte(s, ']') // a value may hold brackets, as names of fields do
		return s[:end], s[end+1:]
	}
	if end := strings.IndexAny(s[1:], "#.["); end >= 0 {
		return s[:end+1], s[end+1:]
	}
	return s, ""
}

func attr(n *html.Node, name string) string {
	for _, a := range n.Attr {
		if a.Key == name {
			return a.Val
		}
	}
	return ""
}

func has(n *html.Node, name string) bool {
	return slices.ContainsFunc(n.Attr, func(a html.Attribute) bool { return a.Key == name })
}

// text is what a reader sees of n, with single blanks of every kind as plain ones.
func text(n *html.Node) string {
	var b strings.Builder
	for d := range n.Descendants() {
		if d.Type == html.TextNode {
			b.WriteString(d.Data)
		}
		if d.Type == html.ElementNode {
			b.WriteByte(' ')
		}
	}
	return plain(b.String())
}

func plain(s string) string { return strings.Join(strings.FieldsFunc(s, unicode.IsSpace), " ") }

func raw(n *html.Node) string {
	var b strings.Builder
	for d := range n.Descendants() {
		if d.Type == html.TextNode {
			b.WriteString(d.Data)
		}
	}
	return b.String()
}

// value is what a control holds.
func value(n *html.Node) string {
	switch n.Data {
	case "textarea":
		return raw(n)
	case "select":
		options := all(n, "option")
		for _, o := range options {
			if has(o, "selected") {
				return attr(o, "value")
			}
		}
		if len(options) > 0 {
			return attr(options[0], "value")
		}
	}
	return attr(n, "value")
}

// A selector that matches too little or too much would make every journey worthless.
func TestSelector(t *testing.T) {
	root := parsePage(t, `<body><p id="a" class="x y">one</p><div id="b"><p class="x">two <b>b</b></p><input name="v[0].c" value="7"></div>
		<select><option value="1"><option value="2" selected></select><textarea>
 a
b</textarea>`)
	for selector, want := range map[string]int{"p": 2, "#a": 1, ".x": 2, ".y": 1, "p.x": 2, "p.y": 1, "div p": 1, "#b .x": 1, "#b .y": 0, "#a.y": 1, "#b.y": 0,
		"[name]": 1, "input[name=v[0].c]": 1, "[name=v[0]]": 0, "p b": 1, "body div b": 1, "h1": 0} {
		if got := len(all(root, selector)); got != want {
			t.Errorf("%s: %d elements, want %d", selector, got, want)
		}
	}
	got := fmt.Sprint(text(one(root, "#b")), "|", value(one(root, "input")), "|", value(one(root, "select")), "|", value(one(root, "textarea")))
	if want := "two b|7|2| a\nb"; got != want {
		t.Errorf("got %q, want %q", got, want)
	}
}
