package browsertest

import (
	"testing"

	"legwright/internal/perf/project"

	"github.com/chromedp/chromedp"
)

// bench opens the first variant of a server's first project.
func bench(t *testing.T, specs ...*project.Spec) (*tab, *site) {
	t.Helper()
	if len(specs) == 0 {
		specs = []*project.Spec{project.Demo()}
	}
	s := newSite(t, specs...)
	p := newTab(t)
	p.open(s.url + "/projects/1/variants/a")
	return p, s
}

// TestFocusStays edits by Tab from field to field: neither the focus nor the
// place on the page nor what is half typed may move when the answer comes in.
func TestFocusStays(t *testing.T) {
	p, _ := bench(t)
	eval[bool](p, `(document.querySelector("#group-configurations").open = true, document.querySelector("#group-weights").open = true)`)
	p.focus(field(baggage))
	p.press("30 kg")
	eval[bool](p, `(scrollBy(0, 40), document.querySelector(".inputs").scrollTop += 30, true)`)
	place := eval[[]float64](p, `[scrollY, document.querySelector(".inputs").scrollTop]`)
	if place[0] == 0 || place[1] == 0 {
		t.Fatalf("nothing to scroll: %v", place)
	}
	p.swapped(func() { p.press(tabKey) })
	basis := p.active()
	if want := eval[string](p, `document.querySelector($1).id`, `[name="basis:variants[0].aircraft.`+baggage+`"]`); basis != want {
		t.Errorf("the focus is in %q, want %q", basis, want)
	}
	if got := p.value(field(baggage)); got != "30" {
		t.Errorf("the entry shows %q, want it as it is stored", got)
	}
	if now := eval[[]float64](p, `[scrollY, document.querySelector(".inputs").scrollTop]`); now[0] != place[0] || now[1] != place[1] {
		t.Errorf("scrolled from %v to %v", place, now)
	}
	for _, id := range []string{"configurations", "weights", "airframe"} {
		if !eval[bool](p, `document.querySelector($1).open`, "#group-"+id) {
			t.Errorf("the group %s was closed", id)
		}
	}
	if eval[bool](p, `document.querySelector("#group-requirements").open`) {
		t.Error("a group was opened")
	}
}

// TestHalfTypedStays types into a field while the answer to another edit comes in.
func TestHalfTypedStays(t *testing.T) {
	p, _ := bench(t)
	p.typed(field("weights.items[0].mass"), "90")
	p.swapped(func() {
		p.focus(field("weights.items[1].mass")) // leaving the first field sends it
		p.press("7")
	})
	if got := p.value(field("weights.items[1].mass")); got != "7" {
		t.Errorf("half typed %q, want 7", got)
	}
	if got := eval[int](p, `document.activeElement.selectionStart`); got != 1 {
		t.Errorf("the caret is at %d, want 1", got)
	}
	p.press("8")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#message"), "75 kg → 78 kg")
	has(t, p.text("#saved"), "revision 3")
}

// TestFastEdits sends edits faster than they are answered, with units typed, so
// that the second one still carries the first as typed.
func TestFastEdits(t *testing.T) {
	p, _ := bench(t)
	p.typed(field("weights.items[0].mass"), "200 lb")
	p.swapped(func() {
		p.press(tabKey)
		p.press(tabKey)
		p.typed(field("weights.items[1].mass"), "70 kg")
		p.press(tabKey)
		p.typed(field(baggage), "9 kg")
		p.press(tabKey)
	})
	if got := p.text("#refused") + p.text(".field .error"); got != "" {
		t.Errorf("refused: %s", got)
	}
	for path, want := range map[string]string{"weights.items[0].mass": "90.71847", "weights.items[1].mass": "70", baggage: "9"} {
		if got := p.value(field(path)); got != want {
			t.Errorf("%s shows %q, want %q", path, got, want)
		}
	}
	has(t, p.text("#saved"), "revision 4")
}

// TestEnterSavesOnce: a browser fires both a change and a submit on Enter.
func TestEnterSavesOnce(t *testing.T) {
	p, _ := bench(t)
	p.typed(field(baggage), "20 kg")
	p.swapped(func() { p.press(enter) })
	if got := p.text("#refused") + p.text(".field .error"); got != "" {
		t.Errorf("refused: %s", got)
	}
	has(t, p.text("#saved"), "revision 2")
	has(t, p.text("#message"), "12 kg → 20 kg")
}

// TestRefusedEntry keeps what was typed beside the reason until it is corrected.
func TestRefusedEntry(t *testing.T) {
	p, _ := bench(t)
	p.expect(422)
	const span = "airframe.span"
	p.typed(field(span), "9,4 x")
	p.swapped(func() { p.press(tabKey) })
	if got := p.value(field(span)); got != "9,4 x" {
		t.Errorf("the field shows %q, want what was typed", got)
	}
	if !eval[bool](p, `document.querySelector($1).getAttribute("aria-invalid") === "true"`, field(span)) {
		t.Error("not marked as invalid")
	}
	described := eval[string](p, `document.querySelector($1).getAttribute("aria-describedby").trim().split(/ +/).map((id) => document.getElementById(id).textContent).join(" ")`, field(span))
	has(t, described, "9,4 x", "Accepted: 0.2 to 80 m")
	if got := eval[string](p, `document.querySelector("[role=alert]").textContent`); got == "" {
		t.Error("no alert")
	}
	has(t, p.text("#saved"), "revision 1")
	p.shot("refused-1280-light")

	// Another edit is taken while the refused one stands.
	p.typed(field("airframe.wing_height"), "0.95")
	p.swapped(func() { p.press(tabKey) })
	if got := p.value(field(span)); got != "9,4 x" {
		t.Errorf("after another edit the field shows %q, want what was typed", got)
	}
	has(t, p.text("#saved"), "revision 2")

	p.typed(field(span), "9.6")
	p.swapped(func() { p.press(tabKey) })
	if eval[bool](p, `document.querySelector($1).getAttribute("aria-invalid") === "true" || !!document.querySelector("[role=alert], .field .error")`, field(span)) {
		t.Error("the mark is still there after the correction")
	}
	has(t, p.text("#message"), "9.4 m → 9.6 m")
}

// TestRefusedStaysInOtherGroup: an edit of another subject must not lose what was refused.
func TestRefusedStaysInOtherGroup(t *testing.T) {
	p, _ := bench(t)
	p.expect(422)
	p.typed(field("airframe.span"), "wide")
	p.swapped(func() { p.press(tabKey) })
	p.typed(field(baggage), "14")
	p.swapped(func() { p.press(tabKey) })
	if got := p.value(field("airframe.span")); got != "wide" {
		t.Errorf("the field shows %q, want what was typed", got)
	}
	if !eval[bool](p, `document.querySelector($1).getAttribute("aria-invalid") === "true"`, field("airframe.span")) {
		t.Error("no longer marked as refused")
	}
	has(t, p.text("#message"), "12 kg → 14 kg")
}

// TestChoicesFollow: a select that was used by hand must still show what is stored
// after undo and redo, or the next edit would send the old choice again.
func TestChoicesFollow(t *testing.T) {
	p, _ := bench(t)
	for _, v := range []string{"rating", "table", "rating"} {
		p.swapped(func() { p.choose(field(given), v) })
	}
	p.swapped(func() { p.click("#undo-form button") })
	if got := p.value(field(given)); got != "table" {
		t.Errorf("after undo the choice shows %q", got)
	}
	p.swapped(func() { p.click("#undo-form button") })
	if got := p.value(field(given)); got != "rating" {
		t.Errorf("after two undos the choice shows %q", got)
	}
	for _, v := range []string{"aviation", "metric"} {
		p.swapped(func() { p.choose("#units", v) })
	}
	p.swapped(func() { p.click("#undo-form button") })
	if got := p.value("#units"); got != "aviation" {
		t.Errorf("after undo the units show %q", got)
	}
	has(t, p.text("#speeds"), "kt")
}

// TestButtonsOfLists: a button's name and value reach the server, together with what was just typed.
func TestButtonsOfLists(t *testing.T) {
	p, _ := bench(t)
	items := func() int {
		return eval[int](p, `document.querySelectorAll('[name^="variants[0].aircraft.weights.items"][name$=".mass"]').length`)
	}
	p.typed(field(baggage), "22 kg")
	p.swapped(func() { p.click(`#form-weights button[value="add-item"]`) })
	if items() != 4 || p.value(field(baggage)) != "22" {
		t.Errorf("%d items and baggage %q, want 4 and 22", items(), p.value(field(baggage)))
	}
	p.swapped(func() { p.click(`#form-weights button[value="remove-item 1"]`) })
	if items() != 3 || p.value(field("weights.items[1].mass")) != "22" {
		t.Errorf("%d items, the second %q; want 3 and 22", items(), p.value(field("weights.items[1].mass")))
	}
	if got := p.text("#refused"); got != "" {
		t.Errorf("refused: %s", got)
	}
}

// TestPastedTable pastes an engine's power from a spreadsheet.
func TestPastedTable(t *testing.T) {
	p, _ := bench(t)
	const curve = "powerplant.values.engine.power_curve"
	p.pasted(field(curve), "1600\t40\n2200\t60\n2850\t80\n")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#message"), "3 rows")
	if got := p.text("#refused") + p.text(".field .error"); got != "" {
		t.Errorf("refused: %s", got)
	}
	p.swapped(func() { p.click("#undo-form button") })
	has(t, p.value(field(curve)), "1900")
}

// TestView changes the condition of the chart and goes back in the history.
func TestView(t *testing.T) {
	p, _ := bench(t)
	before := p.text("#speeds")
	p.typed("#view-altitude", "2000")
	p.swapped(func() { p.press(tabKey) })
	after := p.text("#speeds")
	if after == before {
		t.Error("the table of speeds does not follow")
	}
	has(t, eval[string](p, `location.search`), "altitude=2000")
	p.swapped(func() { p.choose("#view-config", "landing") })
	has(t, eval[string](p, `location.search`), "altitude=2000", "config=landing")
	// The view stays when an input is edited.
	p.typed(field(baggage), "13")
	p.swapped(func() { p.press(tabKey) })
	if got := p.value("#view-altitude") + p.value("#view-config"); got != "2000landing" {
		t.Errorf("after an edit the view is %q", got)
	}
	p.do(chromedp.NavigateBack())
	p.until(`document.readyState === "complete" && document.querySelector("#view-config").value === "clean"`)
	if got := p.value("#view-altitude"); got != "2000" {
		t.Errorf("back in the history the altitude is %q", got)
	}
}
