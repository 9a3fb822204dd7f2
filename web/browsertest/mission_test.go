package browsertest

import (
	"fmt"
	"strings"
	"testing"

	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"

	"legwright/internal/perf/mission"
	"legwright/internal/perf/project"
)

// missionPage opens the page of the mission of the first variant.
func missionPage(t *testing.T, specs ...*project.Spec) (*tab, *site) {
	t.Helper()
	p, s := bench(t, specs...)
	p.open(s.url + "/projects/1/variants/a/mission")
	return p, s
}

// legNames are the names of the legs in the order of their cards.
func (p *tab) legNames() string {
	p.t.Helper()
	return strings.Join(eval[[]string](p, `[...document.querySelectorAll("#form-legs .leg-card")].map((c, i) => c.querySelector("#f-legs-" + i + "-name").value)`), ", ")
}

const legsAtFirst = "Start and taxi, Take-off, Climb, Cruise out, Loiter, Cruise back, Descend, Land, Reserve"

// TestLegsByKeyboard moves legs with Alt and an arrow: what was typed is saved, and the focus goes along.
func TestLegsByKeyboard(t *testing.T) {
	p, _ := missionPage(t)
	alt := chromedp.ModifierAlt
	p.focus("#f-legs-3-distance")
	p.swapped(func() { p.press(kb.ArrowDown, alt) })
	if got := p.legNames(); got != "Start and taxi, Take-off, Climb, Loiter, Cruise out, Cruise back, Descend, Land, Reserve" {
		t.Errorf("legs %s", got)
	}
	if got := p.active(); got != "leg-4-down" {
		t.Errorf("the focus is on %s", got)
	}
	p.swapped(func() { p.press(kb.ArrowDown, alt) })
	p.swapped(func() { p.press(kb.ArrowUp, alt) })
	p.swapped(func() { p.press(kb.ArrowUp, alt) })
	if got := p.legNames(); got != legsAtFirst {
		t.Errorf("back again the legs are %s", got)
	}
	if got := p.active(); got != "leg-3-up" {
		t.Errorf("the focus is on %s", got)
	}

	// What was typed and not sent yet goes with its leg, and to no other.
	p.typed("#f-legs-3-distance", "150")
	p.swapped(func() { p.press(kb.ArrowDown, alt) })
	p.until(`document.querySelector("#f-legs-4-name").value === "Cruise out"`)
	if got := p.value("#f-legs-4-distance"); got != "150" {
		t.Errorf("the leg that moved shows %s km", got)
	}
	if eval[bool](p, `!!document.querySelector("#f-legs-3-distance")`) {
		t.Error("the loiter has a distance")
	}
	p.swapped(func() { p.press("z", chromedp.ModifierCtrl) })
	p.swapped(func() { p.press("z", chromedp.ModifierCtrl) })
	if got := p.value("#f-legs-3-distance"); got != "180" || p.legNames() != legsAtFirst {
		t.Errorf("undone twice: %s km, %s", got, p.legNames())
	}

	// At the ends there is nowhere to go, and in a choice the keys open it.
	asked := eval[int](p, `window.asked`)
	p.focus("#f-legs-0-time")
	p.press(kb.ArrowUp, alt)
	p.focus("#f-legs-8-time")
	p.press(kb.ArrowDown, alt)
	p.focus("#f-legs-4-kind")
	p.press(kb.ArrowDown, alt)
	p.press(kb.Escape)
	if got := eval[int](p, `window.asked`); got != asked || p.legNames() != legsAtFirst {
		t.Errorf("%d requests for nothing, %s", got-asked, p.legNames())
	}
}

// TestLegButtons: a new leg has the focus, a removed one leaves it to its neighbour, and all is done without a pointer too.
func TestLegButtons(t *testing.T) {
	p, _ := missionPage(t)
	do := func(button, names, focus string) {
		t.Helper()
		p.focus(button)
		p.swapped(func() { p.press(enter) })
		if got := p.legNames(); got != names {
			t.Errorf("%s: legs %s", button, got)
		}
		if got := p.active(); got != focus {
			t.Errorf("%s: the focus is on %s, want %s", button, got, focus)
		}
	}
	do("#leg-4-duplicate", strings.Replace(legsAtFirst, "Loiter,", "Loiter, Copy of Loiter,", 1), "f-legs-5-name")
	do("#leg-5-remove", legsAtFirst, "leg-5-remove")
	do("#leg-8-up", strings.Replace(legsAtFirst, "Land, Reserve", "Reserve, Land", 1), "leg-7-up")
	do("#leg-1-up", "Take-off, Start and taxi, Climb, Cruise out, Loiter, Cruise back, Descend, Reserve, Land", "leg-0-down")
	do(`#leg-adds [value="add-leg turns"]`, "Take-off, Start and taxi, Climb, Cruise out, Loiter, Cruise back, Descend, Reserve, Land, Turns", "f-legs-9-name")
	p.swapped(func() { p.choose("#f-legs-9-path", mission.ByLoad) })
	if got := p.value("#f-legs-9-load_factor"); got != "1.1547" && !strings.HasPrefix(got, "1.154") {
		t.Errorf("a bank of 30° is a load factor of %s", got)
	}
	has(t, p.text("#leg-9 .leg-result"), "0.6 min", "least in hand")
}

// manyLegs is the demo with forty legs of every kind whose names are as long as they may be.
func manyLegs() *project.Spec {
	s := project.Demo()
	kinds := mission.KindOptions()
	for i := len(s.Legs); i < 40; i++ {
		s.Legs = append(s.Legs, mission.NewLeg(kinds[i%len(kinds)].Value, fmt.Sprintf("%s%02d", strings.Repeat("Legname", 9)[:58], i)))
	}
	return s
}

// TestMissionPageLooks: the page fits at every width and passes the audit, as it is, with a refused entry, and with forty legs.
func TestMissionPageLooks(t *testing.T) {
	p, _ := missionPage(t)
	p.fitsAt("mission")
	p.audits("mission", some)
}

func TestMissionPageRefused(t *testing.T) {
	p, _ := missionPage(t)
	p.expect(422)
	p.typed("#f-legs-3-distance", "far away")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#f-legs-3-distance-error"), "far away")
	p.fitsAt("mission with a refused entry")
	p.audits("mission with a refused entry", some[1:])
}

func TestMissionOfFortyLegs(t *testing.T) {
	p, _ := missionPage(t, manyLegs())
	has(t, p.text(headline), "not the reserve")
	p.fitsAt("mission of forty legs")
	p.audits("mission of forty legs", some[:1])
}

func TestMissionUgly(t *testing.T) {
	p, _ := missionPage(t, ugly())
	has(t, p.text(headline), "Does not fly")
	p.fitsAt("ugly mission")
}
