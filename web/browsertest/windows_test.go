package browsertest

import (
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
)

const emptyMass = "weights.empty"

// TestTwoWindows edits one field in two windows: neither value is lost, and each of the two ways to decide does what it says.
func TestTwoWindows(t *testing.T) {
	one, s := bench(t)
	two := newTab(t)
	two.expect(422)
	two.open(s.url + "/projects/1/variants/a")

	save := func(p *tab, path, text string) {
		t.Helper()
		p.typed(field(path), text)
		p.swapped(func() { p.press(tabKey) })
	}
	const clash = "#form-weights .clash"
	save(one, emptyMass, "305")
	save(two, emptyMass, "310")
	if got := two.value(field(emptyMass)); got != "310" {
		t.Errorf("the field shows %q, want what was typed", got)
	}
	has(t, two.text("#f-variants-0-aircraft-weights-empty-error"), "set it to 305 kg meanwhile (revision 2, ", "not saved yet")
	has(t, two.text(clash), "Keep mine: 310", "Take theirs: 305 kg")
	has(t, two.text("#elsewhere"), "Changed elsewhere since this page was shown", "298 kg → 305 kg")
	two.shot("clash-1280-light")
	two.fitsAt("bench with a clash")
	two.audits("bench with a clash", some)

	// What is not decided does not win by another edit, in the same form or in another one.
	save(two, baggage, "13")
	has(t, two.text("#message"), "12 kg → 13 kg")
	save(two, "airframe.wing_height", "0.95")
	has(t, two.text(clash), "Keep mine: 310")
	if got := two.value(field(emptyMass)); got != "310" {
		t.Errorf("after other edits the field shows %q", got)
	}
	one.open(s.url + "/projects/1/variants/a")
	if got := one.value(field(emptyMass)); got != "305" {
		t.Errorf("the undecided value is stored: %q", got)
	}

	two.swapped(func() { two.click(clash + " button[value^=take]") })
	if got := two.value(field(emptyMass)); got != "305" {
		t.Errorf("theirs taken, the field shows %q", got)
	}
	if got := two.active(); got != "f-variants-0-aircraft-weights-empty" {
		t.Errorf("the focus is in %q", got)
	}
	has(t, two.text("#message"), "stays as the other window saved it")
	if got := two.text(clash + ", .field .error, #refused"); got != "" {
		t.Errorf("still there: %s", got)
	}

	save(one, emptyMass, "315")
	save(two, emptyMass, "320")
	two.tabTo(clash + " button[value^=keep]")
	two.swapped(func() { two.press(enter) })
	has(t, two.text("#message"), "315 kg → 320 kg")
	if got := two.text(clash + ", .field .error, #refused"); got != "" {
		t.Errorf("still there: %s", got)
	}

	// The basis clashes in the same way.
	one.open(s.url + "/projects/1/variants/a")
	two.open(s.url + "/projects/1/variants/a")
	basis := `[name="basis:variants[0].aircraft.weights.empty"]`
	one.swapped(func() { one.choose(basis, "maker") })
	two.swapped(func() { two.choose(basis, "estimated") })
	if got := two.value(basis); got != "estimated" {
		t.Errorf("the basis shows %q, want what was chosen", got)
	}
	has(t, two.text(clash), "Keep mine: estimated", "Take theirs: maker's data")
	save(two, baggage, "14")
	has(t, two.text(clash), "Keep mine: estimated")
	two.swapped(func() { two.click(clash + " button[value^=keep]") })
	has(t, two.text("#message"), "is now estimated")
	if got := two.value(basis); got != "estimated" {
		t.Errorf("kept, the basis shows %q", got)
	}
}

// TestUndoKeys: the keys undo what is being typed while something is, and otherwise the project's last edit, also from within a field.
func TestUndoKeys(t *testing.T) {
	p, _ := bench(t)
	p.typed(field(baggage), "20")
	p.swapped(func() { p.press(tabKey) })
	p.typed(field(emptyMass), "305")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#saved"), "revision 3")

	// Half typed text is the browser's to undo; nothing is sent.
	p.typed(field(baggage), "77")
	asked := eval[int](p, `window.asked`)
	p.press("z", chromedp.ModifierCtrl)
	if now := eval[int](p, `window.asked`); now != asked {
		t.Error("undo in a field that is being typed in went to the project")
	}
	has(t, p.text("#saved"), "revision 3")

	// The field holds what is saved: the keys are the project's.
	p.typed(field(baggage), "20")
	p.swapped(func() { p.press("z", chromedp.ModifierCtrl) })
	has(t, p.text("#message"), "Undone: Empty, less powerplant 298 kg → 305 kg.")
	has(t, p.text("#saved"), "revision 2")
	has(t, p.text("#told"), "Undone: Empty, less powerplant")
	if got := eval[string](p, `document.querySelector("#told").getAttribute("role")`); got != "status" {
		t.Errorf("the line is not announced: role %q", got)
	}
	if got := p.value(field(emptyMass)); got != "298" {
		t.Errorf("the empty mass is %q", got)
	}
	p.swapped(func() { p.press("z", chromedp.ModifierMeta) })
	has(t, p.text("#saved"), "revision 1")
	if got := p.value(field(baggage)); got != "12" {
		t.Errorf("the field with the focus still shows %q", got)
	}
	p.swapped(func() { p.press("Z", chromedp.ModifierCtrl, chromedp.ModifierShift) })
	has(t, p.text("#message"), "Done again: Baggage: Mass 12 kg → 20 kg.")
	// A choice has nothing of its own to undo.
	eval[bool](p, `(document.querySelector("#units").focus(), true)`)
	p.swapped(func() { p.press("y", chromedp.ModifierCtrl) })
	has(t, p.text("#saved"), "revision 3")
	// Nothing is left to redo: the keys do nothing, and say nothing wrong.
	asked = eval[int](p, `window.asked`)
	p.press("y", chromedp.ModifierCtrl)
	if now := eval[int](p, `window.asked`); now != asked || strings.Contains(p.text("#saved"), "not saved") {
		t.Errorf("redo at the end: %s", p.text("#saved"))
	}
}

// TestHistoryByKeyboard names a revision and looks at it.
func TestHistoryByKeyboard(t *testing.T) {
	p, s := bench(t)
	p.typed(field(emptyMass), "305")
	p.swapped(func() { p.press(tabKey) })
	p.open(s.url + "/projects/1/history")
	p.tabTo("#revisions li:last-child summary")
	p.press(enter)
	p.tabTo("#name-1")
	p.press("Before the scales")
	p.press(enter)
	p.until(`document.readyState === "complete" && document.querySelector("#named")`)
	has(t, p.text("#named"), "Before the scales")
	p.shot("history-1280-light")
	p.fitsAt("history with a name")
	p.tabTo("#named a")
	p.press(enter)
	p.until(`document.readyState === "complete" && document.querySelector("#differences")`)
	has(t, p.text("#differences"), "298 kg", "305 kg")
	p.fitsAt("an earlier revision")
	p.audits("an earlier revision", some)
	p.tabTo("#restore-form button")
	p.press(enter)
	p.until(`document.readyState === "complete" && document.querySelector("#bench")`)
	if got := p.value(field(emptyMass)); got != "298" {
		t.Errorf("restored, the empty mass is %q", got)
	}
}
