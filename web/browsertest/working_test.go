package browsertest

import (
	"fmt"
	"strings"
	"testing"

	"legwright/internal/perf/project"

	permit "github.com/chromedp/cdproto/browser"
	"github.com/chromedp/chromedp"
)

// inSight reports whether the element that the address names is in the window.
const inSight = `(() => { const r = document.querySelector(location.hash)?.getBoundingClientRect(); return !!r && r.height > 0 && r.top < innerHeight && r.bottom > 0; })()`

// TestFigureOpensItsWorking goes from a figure to its part.
func TestFigureOpensItsWorking(t *testing.T) {
	p, s := bench(t)
	page := s.url + "/projects/1/variants/a"
	for _, figure := range []int{6, 18} {
		p.click(fmt.Sprintf(`#figures tr:nth-child(%d) a.worked`, figure+1))
		p.until(`location.pathname.endsWith("/working") && document.readyState === "complete"`)
		p.until(inSight)
		if !eval[bool](p, `!!document.querySelector(":target > h2") && getComputedStyle(document.querySelector(":target")).boxShadow !== "none"`) {
			t.Errorf("figure %d leads to no part that is marked", figure)
		}
		p.open(page)
	}
}

// TestSymbolOpensItsInput goes from a value to the step that gave it, and to its input, which may be folded away.
func TestSymbolOpensItsInput(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.open(s.url + "/projects/1/variants/a/working")
	to := eval[string](p, `document.querySelector('.from a[href^="#step-"]').hash`)
	p.click(`.from a[href="` + to + `"]`)
	p.until(`location.hash === $1`, to)
	p.until(inSight)
	p.click(`a[href$="propeller-coefficients-field"]`)
	p.until(`location.hash.endsWith("propeller-coefficients-field") && document.readyState === "complete"`)
	p.until(inSight)
	if !eval[bool](p, `document.querySelector(location.hash).checkVisibility({contentVisibilityAuto: true, visibilityProperty: true})`) {
		t.Error("the input that a symbol leads to is folded away")
	}
}

// TestMathematics looks at what the browser makes of the markup: fractions stand
// above each other, exponents high and small, and nothing is cut.
func TestMathematics(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.open(s.url + "/projects/1/variants/a/working")
	p.until(`document.fonts.status === "loaded" && document.fonts.check("16px 'Legwright Formula'")`)
	if got := eval[int](p, `document.querySelectorAll(".step").length`); got < 80 || eval[int](p, `document.querySelectorAll(".step-formula math").length`) != got {
		t.Errorf("%d steps, and not as many formulas", got)
	}
	for _, b := range eval[[]string](p, `(() => {
		const bad = [], box = (e) => e.getBoundingClientRect();
		for (const f of document.querySelectorAll("mfrac")) if (!(box(f.children[0]).bottom <= box(f.children[1]).top + 2)) bad.push("fraction is not stacked in " + f.closest(".step").id);
		for (const s of document.querySelectorAll("msup")) if (!(box(s.children[1]).bottom < box(s.children[0]).bottom)) bad.push("exponent is not raised in " + s.closest(".step").id);
		for (const s of document.querySelectorAll("msub")) if (!(box(s.children[1]).bottom > box(s.children[0]).bottom)) bad.push("subscript is not lowered in " + s.closest(".step").id);
		for (const f of document.querySelectorAll("mo + mfrac")) if (f.previousElementSibling.textContent === "(" && box(f.previousElementSibling).height < 0.9 * box(f).height) bad.push("brackets are lower than the fraction in " + f.closest(".step").id);
		for (const a of document.querySelectorAll("annotation")) if (a.checkVisibility()) bad.push("the linear text shows beside the mathematics in " + a.closest(".step").id);
		for (const m of document.querySelectorAll(".step-formula")) if (m.scrollWidth > m.clientWidth) bad.push("formula cut in " + m.closest(".step").id);
		return [...new Set(bad)].slice(0, 10);
	})()`) {
		t.Error(b)
	}
}

// TestCopyWorking: the button copies a part as text; without scripts the text is there to select.
func TestCopyWorking(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.open(s.url + "/projects/1/variants/a/working")
	for _, name := range []string{"clipboard-read", "clipboard-write"} {
		call(p, permit.SetPermission, permit.SetPermissionParams{Permission: &permit.PermissionDescriptor{Name: name}, Setting: permit.PermissionSettingGranted, Origin: s.url})
	}
	p.click(`button[data-copy="working-stall-text"]`)
	p.until(`[...document.querySelectorAll(".copied")].some((e) => e.textContent === "Copied.")`)
	got := eval[string](p, `navigator.clipboard.readText()`)
	for _, want := range []string{"Stall\n=====", "VS = sqrt(2*W/(rho*S*CLmax))", "VS = 25.0006", "Wing area (measured)", "Source: J. D. Anderson"} {
		if !strings.Contains(got, want) {
			t.Errorf("copied %q, without %q", got, want)
		}
	}
	p.noScript()
	p.do(chromedp.Navigate(s.url + "/projects/1/variants/a/working"))
	if eval[bool](p, `document.querySelector("[data-copy]").checkVisibility()`) {
		t.Error("the button to copy shows where it can do nothing")
	}
	p.click("#working-stall-plain summary")
	if !eval[bool](p, `document.querySelector("#working-stall-text").checkVisibility()`) {
		t.Error("the text of a part does not unfold")
	}
}
