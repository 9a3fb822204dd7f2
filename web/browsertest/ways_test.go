package browsertest

import "testing"

// TestOtherWay says the drag as a best glide, types another, and goes back, all at the keyboard:
// the focus stays on the choice, and the line beside it follows.
func TestOtherWay(t *testing.T) {
	p, _ := bench(t)
	p.expect(422)
	given, says := field("airframe.drag_given"), "#f-variants-0-aircraft-airframe-drag_given-says"
	has(t, p.text(says), "CDmin 0.0335", "best L/D 13.1 at 32.3")
	p.focus(given)
	p.swapped(func() { p.choose(given, "best-glide") })
	if got, want := p.active(), eval[string](p, `document.querySelector($1).id`, given); got != want {
		t.Errorf("the focus is in %q, want %q", got, want)
	}
	has(t, p.text(says), "CDmin 0.0335", "e 0.77")
	has(t, p.text("#message"), "Drag polar given as: best L/D and its speed")
	if got := p.value(field("airframe.glide_mass")); got != "612.36" {
		t.Errorf("the mass is %q", got)
	}
	p.typed(field("airframe.glide_ratio"), "11.5")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text(says), "best L/D 11.5 at 32.3", "CDmin 0.0381")

	// What no wing does is refused beside the field; the line stays with what is flown.
	p.typed(field("airframe.glide_ratio"), "60")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#f-variants-0-aircraft-airframe-glide_speed-error")+p.text("#f-variants-0-aircraft-airframe-glide_ratio-error"), "would be")
	has(t, p.text(says), "best L/D 11.5")
	p.typed(field("airframe.glide_ratio"), "11.5")
	p.swapped(func() { p.press(tabKey) })
	p.swapped(func() { p.choose(given, "parabola") })
	has(t, p.value(field("airframe.cd_min")), "0.0380")
}

// TestBuildUpPage fills a component list and reads it on the drag page; both fit and are sound.
func TestBuildUpPage(t *testing.T) {
	p, s := bench(t)
	p.swapped(func() { p.choose(field("airframe.drag_given"), "build-up") })
	for range 2 {
		p.swapped(func() { p.click(`#form-airframe button[value="add-component"]`) })
	}
	p.swapped(func() { p.choose(field("airframe.components[1].kind"), "drag-area") })
	p.typed(field("airframe.components[0].name"), "Wing")
	p.swapped(func() { p.press(tabKey) })
	p.fitsAt("bench with components")
	p.audit("bench with components")
	p.open(s.url + "/projects/1/variants/a/drag")
	has(t, p.text("#build-section"), "Wing", "other, by its drag area", "Leakage", "Not in the list", "100.0")
	p.shot("drag-build-up-1280-light")
	p.fitsAt("drag page with components")
	p.audits("drag page with components", some)
}
