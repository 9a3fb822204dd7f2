package browsertest

import (
	"regexp"
	"testing"

	"github.com/chromedp/chromedp"
)

var (
	speedRead = regexp.MustCompile(`speed [\d.]+ m/s`)
	forceRead = regexp.MustCompile(`\d[\d ]* N`)
)

// hover moves the pointer to the middle of a chart.
func (p *tab) hover(figure string) {
	p.t.Helper()
	at := eval[[]float64](p, `(() => { const f = document.querySelector($1); f.scrollIntoView({block: "center", behavior: "instant"});
		const r = [...f.querySelectorAll("svg.chart")].find((s) => s.getBoundingClientRect().width > 0).getBoundingClientRect();
		return [r.left + r.width * 0.55, r.top + r.height * 0.5]; })()`, figure)
	eval[bool](p, `new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(() => done(true))))`) // the scrolling's own event hides a read-out
	p.do(chromedp.MouseEvent("mouseMoved", at[0]-8, at[1]), chromedp.MouseEvent("mouseMoved", at[0], at[1]))
}

func (p *tab) read(t *testing.T) string {
	t.Helper()
	p.until(`document.querySelector(".read:not([hidden])")`)
	return p.text(".read")
}

// TestChartsAreRead reads the charts by pointer and by keyboard, before and after a swap.
func TestChartsAreRead(t *testing.T) {
	p, _ := bench(t)
	for _, round := range []string{"as loaded", "after an edit"} {
		p.hover("#thrust-figure")
		if got := p.read(t); !speedRead.MatchString(got) || len(forceRead.FindAllString(got, -1)) < 2 {
			t.Errorf("%s: the pointer reads %q", round, got)
		}
		box := eval[[]float64](p, `(() => { const r = document.querySelector(".read").getBoundingClientRect(); return [r.left, r.top, innerWidth - r.right, innerHeight - r.bottom]; })()`)
		for _, gap := range box {
			if gap < 0 {
				t.Errorf("%s: the read-out leaves the window: %v", round, box)
			}
		}
		p.do(chromedp.MouseEvent("mouseMoved", 2, 2))
		p.until(`!document.querySelector(".read:not([hidden])")`)
		if round == "as loaded" {
			p.swapped(func() { p.typed(field(baggage), "30"); p.press(tabKey) })
		}
	}
	for _, figure := range []string{"#power-figure", "#climb-figure", "#mission-figure"} {
		p.hover(figure)
		if got := p.read(t); !regexp.MustCompile(`\d`).MatchString(got) {
			t.Errorf("%s: the pointer reads %q", figure, got)
		}
	}
}

func TestChartsByKeyboard(t *testing.T) {
	p, _ := bench(t)
	const chart = "#thrust-figure svg.chart"
	keys := func(round string) {
		t.Helper()
		eval[bool](p, `(document.querySelector($1).focus(), document.querySelector(".read-live") && (document.querySelector(".read-live").textContent = ""), true)`, chart)
		if !eval[bool](p, `document.activeElement === document.querySelector($1)`, chart) {
			t.Fatalf("%s: the chart takes no focus", round)
		}
		p.press("\u0303") // right
		first := p.read(t)
		p.press("\u0303", chromedp.ModifierShift)
		second := p.read(t)
		if first == second || !speedRead.MatchString(second) {
			t.Errorf("%s: the keys read %q, then %q", round, first, second)
		}
		p.until(`document.querySelector(".read-live[aria-live=polite]")?.textContent.length > 10`)
		if got := p.text(".read-live"); !speedRead.MatchString(got) {
			t.Errorf("%s: announced %q", round, got)
		}
		p.press("\u001b")
		p.until(`!document.querySelector(".read:not([hidden])")`)
	}
	keys("as loaded")
	p.swapped(func() { p.typed(field(baggage), "30"); p.press(tabKey) })
	keys("after an edit")

	// The table behind the chart opens and stays open over an edit.
	p.click("#thrust-data > summary")
	p.swapped(func() { p.typed(field(baggage), "31"); p.press(tabKey) })
	if !eval[bool](p, `document.querySelector("#thrust-data").open`) {
		t.Error("an edit closed the numbers behind the chart")
	}
	has(t, p.text("#thrust-data"), "peed, m/s")
}

// TestKeysOutliveScrolling: the scroll that brings a focused chart into view does not wipe what the keys read.
func TestKeysOutliveScrolling(t *testing.T) {
	p, _ := bench(t)
	const chart = "#mission-figure svg.chart"
	eval[bool](p, `(document.querySelector($1).focus(), true)`, chart)
	p.press("\u0303") // right
	first := p.read(t)
	eval[bool](p, `(scrollBy(0, 40), requestAnimationFrame(() => requestAnimationFrame(() => { window.scrolled = true; })), true)`)
	p.until(`window.scrolled`)
	if got := p.read(t); got != first {
		t.Errorf("after a scroll the read-out is %q, before it %q", got, first)
	}
}
