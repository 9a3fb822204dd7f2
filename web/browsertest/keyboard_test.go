package browsertest

import (
	"testing"

	"github.com/chromedp/chromedp"
)

// tabTo presses Tab, or Tab with a modifier, until the element has the focus.
func (p *tab) tabTo(selector string, modifiers ...chromedp.Modifier) {
	p.t.Helper()
	for range 200 {
		p.press(tabKey, modifiers...)
		if eval[bool](p, `document.activeElement.matches($1)`, selector) {
			return
		}
	}
	p.t.Fatalf("Tab does not reach %s", selector)
}

// TestKeyboardOnly goes from the top of the page to an edit and its undo without a pointer.
func TestKeyboardOnly(t *testing.T) {
	p, s := bench(t)
	p.press(tabKey)
	if got := eval[string](p, `document.activeElement.className`); got != "skip" {
		t.Fatalf("the first stop is %q, want the skip link", got)
	}
	if !eval[bool](p, `(() => { const r = document.activeElement.getBoundingClientRect(); return r.left >= 0 && r.top >= 0 && r.width > 20; })()`) {
		t.Error("the skip link cannot be seen when it has the focus")
	}
	p.press(enter)
	p.until(`location.hash === "#main"`)
	p.press(tabKey)
	if !eval[bool](p, `document.querySelector("#main").contains(document.activeElement)`) {
		t.Errorf("after the skip link Tab goes to %q", p.active())
	}

	p.open(s.url + "/projects/1/variants/a?altitude=1000")
	eval[bool](p, `(window.stops = new Set(), document.addEventListener("focusin", (e) => stops.add(e.target)), true)`)
	p.tabTo("#units")
	if seen := eval[bool](p, `(() => { const s = getComputedStyle(document.activeElement); return s.outlineStyle !== "none" && parseFloat(s.outlineWidth) >= 2; })()`); !seen {
		t.Error("the focus cannot be seen on the units")
	}
	p.tabTo("#group-requirements > summary")
	if missed := eval[[]string](p, `[...document.querySelectorAll(".skip, header :is(a[href], select, button:enabled)")].filter((e) => e.checkVisibility() && !stops.has(e)).map((e) => e.outerHTML.slice(0, 90))`); len(missed) > 0 {
		t.Errorf("Tab passes by %q", missed)
	}
	p.press(enter)
	p.until(`document.querySelector("#group-requirements").open`)
	p.tabTo("#group-names > summary")
	p.press(" ")
	p.until(`document.querySelector("#group-names").open`)
	p.tabTo(field("/name"))
	p.press("a", chromedp.ModifierCtrl)
	p.press("By keyboard")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text(".crumbs"), "By keyboard")

	p.tabTo("#undo-form button", chromedp.ModifierShift)
	p.swapped(func() { p.press(enter) })
	has(t, p.text(".crumbs"), "Sorrel Down to the lake and back")
	if p.active() == "BODY" {
		t.Error("undo lost the place of the keyboard")
	}
}
