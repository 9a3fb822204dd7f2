package browsertest

import (
	"testing"

	"legwright/internal/perf/project"

	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/chromedp"
)

// noScript switches the page's scripts off; the tests' own expressions still run.
func (p *tab) noScript() {
	p.t.Helper()
	call(p, emulation.SetScriptExecutionDisabled, emulation.SetScriptExecutionDisabledParams{Value: true})
}

// loaded runs f, which makes the browser load a page, and waits for that page.
func (p *tab) loaded(f chromedp.Action[chromedp.Void]) {
	p.t.Helper()
	if _, err := chromedp.Run(p.ctx, chromedp.WaitEvent(page.LoadEventFired, nil, f)); err != nil {
		p.t.Fatal(err)
	}
}

// TestWithoutScript makes the same edits by the plain forms.
func TestWithoutScript(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.expect(422)
	p.noScript()
	p.do(chromedp.Navigate(s.url + "/projects/1/variants/a"))
	if eval[bool](p, `document.documentElement.classList.contains("scripted")`) {
		t.Fatal("scripts run")
	}
	save := func(group string) {
		t.Helper()
		p.loaded(chromedp.Click(chromedp.CSS("#form-"+group+" .save"), chromedp.NodeVisible))
	}

	p.typed(field(baggage), "200 kg")
	save("weights")
	has(t, p.text(headline), "Does not fly the mission")
	has(t, p.text("#saved"), "revision 2")
	if got := p.value(field(baggage)); got != "200" {
		t.Errorf("the baggage shows %q", got)
	}

	p.loaded(chromedp.Click(chromedp.CSS("#undo-form button"), chromedp.NodeVisible))
	has(t, p.text(headline), "Flies the mission")

	// Enter in a field saves the form.
	p.typed(field(baggage), "20")
	p.loaded(chromedp.KeyEvent(enter))
	if got := p.value(field(baggage)); got != "20" {
		t.Errorf("after Enter the baggage shows %q", got)
	}

	p.typed(field(baggage), "heavy")
	save("weights")
	has(t, p.text("#refused"), "One entry was not taken")
	if got := p.value(field(baggage)); got != "heavy" {
		t.Errorf("the refused entry shows %q", got)
	}

	p.typed("#view-altitude", "1500 m")
	p.loaded(chromedp.Click(chromedp.CSS("#view-form button"), chromedp.NodeVisible))
	has(t, eval[string](p, `location.search`), "altitude=1500")
	if got := p.value("#view-altitude"); got != "1500" {
		t.Errorf("the view shows %q", got)
	}

	eval[bool](p, `(document.querySelector("#units").value = "aviation", true)`)
	p.loaded(chromedp.Click(chromedp.CSS("#units-form button"), chromedp.NodeVisible))
	has(t, p.text("#speeds"), "kt")
	has(t, eval[string](p, `location.search`), "altitude=1500")

	// A closed group opens without a script as well.
	p.do(chromedp.Click(chromedp.CSS("#group-names > summary"), chromedp.NodeVisible))
	p.typed(field("/name"), "Renamed")
	save("names")
	has(t, p.text(".crumbs"), "Renamed")
}
