package browsertest

import "testing"

// TestRequirementsPage edits on the page itself: it stays the page, the table follows, and
// the group in which one edits stays open.
func TestRequirementsPage(t *testing.T) {
	p, s := bench(t)
	p.expect(422)
	p.open(s.url + "/projects/1/variants/a/requirements#form-requirement-1")
	if !eval[bool](p, `document.querySelector("#group-requirement-1").open`) {
		t.Error("the address of a form does not open it")
	}
	limit := `[name="requirements[1].limit"]`
	p.typed(limit, "3.5")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#requirements-head"), "3 of 5 requirements met, 2 missed")
	has(t, p.text("#requirements tbody tr:nth-child(2)"), "missed")
	p.swapped(func() { p.choose(`[name="requirements[1].altitude_given"]`, "altitude") })
	p.typed(`[name="requirements[1].altitude"]`, "0")
	p.swapped(func() { p.choose(`[name="requirements[1].mass_given"]`, "greatest") })
	has(t, p.text("#requirements tbody tr:nth-child(2)"), "greatest take-off mass")
	if !eval[bool](p, `document.querySelector("#group-requirement-1").open`) {
		t.Error("an edit closed the group")
	}
	p.typed(limit, "fast")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#f-requirements-1-limit-error"), "fast")
	p.audits("requirements with a refused entry", some)
	p.typed(limit, "2")
	p.swapped(func() { p.press(tabKey) })
	p.swapped(func() { p.click(`[value="add-preset vla"]`) })
	has(t, p.text("#requirements"), "CS-VLA 65")
	p.swapped(func() { p.choose("#add-figure", "add-requirement range"); p.click("#add-form button") })
	has(t, p.text("#requirements tbody tr:last-child"), "10 · Still-air range")
	p.swapped(func() { p.click("#undo-form button") })
	has(t, p.text("#requirements tbody tr:last-child"), "CS-VLA 77")
	p.openAll()
	p.fitsAt("requirements, all open")
	p.audits("requirements, all open", some)
	p.shot("requirements-1280-light")
	p.size(380, 800)
	p.shot("requirements-380-light")
}
