package browsertest

import (
	"regexp"
	"strconv"
	"strings"
	"testing"

	"legwright/internal/perf/project"

	"github.com/chromedp/chromedp"
)

const (
	headline = "#verdict h1"
	baggage  = "weights.items[2].mass"
	given    = "powerplant.values.engine.power_given"
	rating   = "powerplant.values.engine.rated_power"
)

var revisionWord = regexp.MustCompile(`^saved \d\d:\d\d:\d\d, revision (\d+)$`)

// revision reads the number from the sentence that the page says after saving.
func (p *tab) revision() int {
	p.t.Helper()
	m := revisionWord.FindStringSubmatch(p.text("#saved"))
	if m == nil {
		p.t.Fatalf("the page does not say saved: %q", p.text("#saved"))
	}
	n, _ := strconv.Atoi(m[1])
	return n
}

// results is every number that the bench shows as a result.
func (p *tab) results() string {
	p.t.Helper()
	var all []string
	for _, part := range []string{headline, "#tightest", ".tiles", "#figures", "#mission-section", "#strip-section", "#speeds"} {
		all = append(all, p.text(part))
	}
	return strings.Join(all, "\n")
}

// TestJourney is the demo as a person goes through it.
func TestJourney(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.open(s.url + "/") // with one project, its bench
	p.until(`document.querySelector("#verdict")`)
	has(t, p.text(headline), "Flies the mission, with ", "% thrust in hand")
	has(t, p.text("#tightest"), "Tightest", "available", "required at", "kg")
	if n := p.revision(); n != 1 {
		t.Errorf("a new project is at revision %d", n)
	}
	first := p.results()

	// Too heavy.
	p.typed(field(baggage), "200")
	p.swapped(func() { p.press(tabKey) })
	heavy := p.text(headline)
	has(t, heavy, "Does not fly the mission: it ends in “")
	if !regexp.MustCompile(`\d.* (N|kg|m/s|m)\b`).MatchString(p.text("#tightest")) {
		t.Errorf("no numbers in the reason: %q", p.text("#tightest"))
	}
	has(t, p.text("#message"), "12 kg → 200 kg")
	if n := p.revision(); n != 2 {
		t.Errorf("the edit made revision %d", n)
	}

	// A bigger engine.
	p.swapped(func() { p.choose(field(given), "rating") })
	p.typed(field(rating), "95 kW")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text(headline), "Flies the mission")
	if v := p.value(field(rating)); v != "95" {
		t.Errorf("the field shows %q", v)
	}
	if n := p.revision(); n != 4 {
		t.Errorf("two more edits made revision %d", n)
	}
	repaired := p.results()

	p.undone(heavy, first)

	p.swapped(func() { p.click("#redo-form button") })
	p.swapped(func() { p.click("#redo-form button") })
	p.swapped(func() { p.press("y", chromedp.ModifierCtrl) })
	if p.results() != repaired {
		t.Error("redo does not lead to the same numbers")
	}
	url := eval[string](p, `location.href`)
	p.open(url)
	if p.results() != repaired || p.revision() != 4 {
		t.Error("a reload shows other numbers")
	}
	old := s.url
	s.restart()
	p.open(strings.Replace(url, old, s.url, 1))
	if p.results() != repaired || p.revision() != 4 {
		t.Error("after a new start of the server the numbers are others")
	}
}

// undone takes three edits back, by the button and by keyboard.
func (p *tab) undone(heavy, first string) {
	p.t.Helper()
	p.swapped(func() { p.click("#undo-form button") })
	p.swapped(func() { p.click("#undo-form button") })
	if got := p.text(headline); got != heavy {
		p.t.Errorf("after two undos: %q, want %q", got, heavy)
	}
	eval[bool](p, `(document.activeElement.blur(), true)`)
	p.swapped(func() { p.press("z", chromedp.ModifierCtrl) })
	if got := p.results(); got != first {
		p.t.Errorf("after three undos: %q, want %q", got, first)
	}
	has(p.t, p.text("#message"), "Undone: ")
	if got := p.value(field(baggage)); got != "12" {
		p.t.Errorf("the baggage is %q after undo", got)
	}
	if got := p.value(field(given)); got != "table" {
		p.t.Errorf("the power is given as %q after undo", got)
	}
	if n := p.revision(); n != 1 {
		p.t.Errorf("after three undos at revision %d", n)
	}
}
