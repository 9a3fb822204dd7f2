package browsertest

import (
	"testing"

	"legwright/internal/perf/project"

	"github.com/chromedp/chromedp"
)

// unprintable lists what is of no use on paper and shows, and what paper would cut.
const unprintable = `(() => {
	const bad = [], seen = (e) => e.id ? "#" + e.id : e.tagName.toLowerCase() + "." + e.className;
	const shown = (e) => e.checkVisibility({visibilityProperty: true}) && e.getBoundingClientRect().width > 1;
	for (const e of document.querySelectorAll("nav, button, .skip, .top, .tools, .read, details:not([open]) > summary:not(.group > summary)")) if (shown(e)) bad.push("printed: " + seen(e));
	for (const e of document.querySelectorAll("body *")) {
		if (!shown(e) || e.closest("svg, math, .visually-hidden, option")) continue;
		const style = getComputedStyle(e);
		if (/auto|scroll|hidden/.test(style.overflowX + style.overflowY) && !/INPUT|SELECT/.test(e.tagName) && (e.scrollWidth > e.clientWidth + 1 || e.scrollHeight > e.clientHeight + 2)) bad.push("cut: " + seen(e));
		if (/INPUT|SELECT|TEXTAREA/.test(e.tagName) && (style.borderTopWidth !== "0px" || e.scrollWidth > e.clientWidth + 1)) bad.push("a box, or cut: " + seen(e) + " " + e.value);
	}
	for (const t of document.querySelectorAll("table:has(thead)")) if (shown(t) && getComputedStyle(t).display === "table" && getComputedStyle(t.tHead).display !== "table-header-group" && !t.tHead.matches(".visually-hidden")) bad.push("the head does not repeat: " + seen(t));
	for (const s of document.querySelectorAll("svg.chart")) if (shown(s) && getComputedStyle(s).breakInside !== "avoid") bad.push("a chart can be split: " + seen(s));
	if (!shown(document.querySelector(".paper-title"))) bad.push("no title line");
	return [...new Set(bad)].slice(0, 12);
})()`

// printed looks at the page as it goes on A4, from the dark theme.
func (p *tab) printed(name string) {
	p.t.Helper()
	p.media("print", "dark")
	p.size(680, 1000) // 180 mm
	for _, b := range eval[[]string](p, unprintable) {
		p.t.Errorf("%s: %s", name, b)
	}
	p.fits(name + " on paper")
	if got := eval[string](p, `getComputedStyle(document.body).color`); got != "rgb(22, 34, 44)" {
		p.t.Errorf("%s: text on paper is %s in the dark theme", name, got)
	}
	p.media("", "light")
	p.size(1280, 900)
}

// TestPrint: the bench prints what is read, in light colours, and nothing wider than the paper.
func TestPrint(t *testing.T) {
	p, _ := bench(t)
	p.printed("bench")
	p.media("print", "dark")
	for _, there := range []string{"#verdict", "#figures", "#mission-section", "#strip-section", "#warnings-section", ".inputs", "#group-powerplant-propeller form", ".caution-note"} {
		if !eval[bool](p, `document.querySelector($1).checkVisibility()`, there) {
			t.Errorf("%s is not printed", there)
		}
	}
	if n := eval[int](p, `[...document.querySelectorAll("svg.chart")].filter((s) => s.getBoundingClientRect().width > 0).length`); n != 4 {
		t.Errorf("%d charts are printed, want 4", n)
	}
	if eval[bool](p, `document.querySelector("#thrust-data table").checkVisibility()`) {
		t.Error("the numbers behind a chart are printed though they are folded")
	}
	b, err := chromedp.Run(p.ctx, chromedp.PrintToPDF())
	if err != nil || len(b) < 20000 {
		t.Errorf("printed %d bytes, %v", len(b), err)
	}
	p.media("", "light")
	p.openAll()
	p.printed("bench, all open")
}

func TestPrintOtherPages(t *testing.T) {
	s := newSite(t, project.Demo())
	for name := range pages {
		p := s.openPage(name)
		p.openAll()
		p.printed(name + ", all open")
	}
}

// TestPrintUgly: names as long as can be do not leave the paper.
func TestPrintUgly(t *testing.T) {
	p, s := bench(t, ugly())
	p.printed("ugly bench")
	for name, path := range map[string]string{"working": "/projects/1/variants/a/working", "strip": "/projects/1/variants/a/strip"} {
		p.open(s.url + path)
		p.printed("ugly " + name)
	}
}
