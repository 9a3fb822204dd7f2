package handlers

import (
	"errors"
	"fmt"
	"slices"
	"strings"
	"testing"

	"golang.org/x/net/html"
)

// wrecks are what a number or a format that went wrong leaves in a page.
var wrecks = []string{"NaN", "+Inf", "-Inf", "−Inf", "Inf ", "Inf<", "Inf\u00a0", "∞", "%!", "&lt;nil&gt;", "<nil>", "{}", "undefined", "[object"}

// checkPage reports every fault of a page, or of a fragment, that needs no knowledge of what the page is about.
func checkPage(source string) error {
	root, err := html.Parse(strings.NewReader(source))
	if err != nil {
		return err
	}
	errs := []error{checkWhole(root, source)}
	for _, bad := range wrecks {
		if i := strings.Index(source, bad); i >= 0 {
			errs = append(errs, fmt.Errorf("%q in … %s …", bad, source[max(0, i-60):min(len(source), i+60)]))
		}
	}
	ids, labelled := map[string]bool{}, map[string]bool{}
	for _, l := range all(root, "label") {
		labelled[attr(l, "for")] = text(l) != ""
	}
	for _, n := range all(root, "[id]") {
		if id := attr(n, "id"); ids[id] || id == "" || strings.ContainsAny(id, " \t\n") {
			errs = append(errs, fmt.Errorf("id %q twice, empty or with a blank", id))
		}
		ids[attr(n, "id")] = true
	}
	for n := range root.Descendants() {
		if n.Type == html.ElementNode {
			errs = append(errs, checkElement(n, ids, labelled))
		}
	}
	return errors.Join(errs...)
}

// checkWhole checks what a page has exactly once.
func checkWhole(root *html.Node, source string) error {
	var errs []error
	if n := len(all(root, "h1")); n != 1 {
		errs = append(errs, fmt.Errorf("%d h1, want 1", n))
	}
	if n := len(all(root, "main")); n != 1 {
		errs = append(errs, fmt.Errorf("%d main, want 1", n))
	}
	if !strings.Contains(source, "<html") {
		return errors.Join(errs...)
	}
	if n := one(root, "html"); attr(n, "lang") == "" {
		errs = append(errs, errors.New("no language"))
	}
	if n := one(root, "title"); n == nil || text(n) == "" {
		errs = append(errs, errors.New("no title"))
	}
	return errors.Join(errs...)
}

// checkElement checks one element: what names it, what it points to, and that the content policy lets it be.
func checkElement(n *html.Node, ids, labelled map[string]bool) error {
	var errs []error
	fault := func(format string, args ...any) {
		errs = append(errs, fmt.Errorf("<%s id=%q name=%q> %s", n.Data, attr(n, "id"), attr(n, "name"), fmt.Sprintf(format, args...)))
	}
	for _, a := range n.Attr {
		switch {
		case a.Key == "style" || strings.HasPrefix(a.Key, "on") || strings.HasPrefix(a.Key, "hx-on"):
			fault("has %s, which the content policy forbids", a.Key)
		case slices.Contains([]string{"aria-describedby", "aria-labelledby", "aria-controls", "for"}, a.Key):
			for _, id := range strings.Fields(a.Val) {
				if !ids[id] {
					fault("%s points to no %s", a.Key, id)
				}
			}
		case a.Key == "href" && strings.HasPrefix(a.Val, "#") && !ids[a.Val[1:]]:
			fault("leads to no %s", a.Val)
		}
	}
	switch n.Data {
	case "style":
		fault("is forbidden by the content policy")
	case "script":
		if attr(n, "src") == "" {
			fault("is inline")
		}
	case "input", "select", "textarea":
		if attr(n, "type") != "hidden" && !labelled[attr(n, "id")] && plain(attr(n, "aria-label")) == "" {
			fault("has no label")
		}
	case "button", "a", "summary", "h1", "h2", "h3", "legend", "caption":
		if text(n) == "" && attr(n, "aria-label") == "" {
			fault("has no text")
		}
	case "svg":
		if attr(n, "role") == "img" && one(n, "title") == nil && attr(n, "aria-label") == "" && attr(n, "aria-labelledby") == "" {
			fault("has no title")
		}
	}
	return errors.Join(errs...)
}

// Each check is seen to fail.
func TestCheckPageFindsFaults(t *testing.T) {
	const good = `<!DOCTYPE html><html lang="en"><head><title>t</title></head><body><main><h1>h</h1><p id="p">12</p>` +
		`<label for="i">l</label><input id="i" aria-describedby="p"><a href="#p">a</a></main></body></html>`
	if err := checkPage(good); err != nil {
		t.Fatalf("a good page has a fault: %v", err)
	}
	for old, bad := range map[string]string{
		`12`: "NaN m", `>12<`: ">+Inf<", `>h<`: "><", `lang="en"`: "", `<title>t</title>`: "", `</h1>`: `</h1><h1>2</h1>`, `for="i"`: `for="j"`,
		`<p id="p">`: `<p id="i">`, `aria-describedby="p"`: `aria-describedby="p q"`, `href="#p"`: `href="#q"`, `<input`: `<input style="a"`, `</main>`: `<script>1</script></main>`,
		`>a<`: `>%!d(string=a)<`, `>l<`: `><`, `<a `: `<a onclick="x" `, `</body>`: `<style></style></body>`, `<main>`: `<main><main>`, `id="p"`: `id=""`, `12<`: `&lt;nil&gt;<`,
	} {
		if err := checkPage(strings.Replace(good, old, bad, 1)); err == nil {
			t.Errorf("%s: no fault found", bad)
		}
	}
}
