package browsertest

import (
	_ "embed"
	"fmt"
	"testing"

	"legwright/internal/perf/project"
)

// axe is axe-core, MPL-2.0; its licence stands beside it.
//
//go:embed testdata/axe.min.js
var axe string

// audit runs every rule of axe-core on the page as it stands.
func (p *tab) audit(name string) {
	p.t.Helper()
	if eval[bool](p, `typeof window.axe === "undefined"`) {
		eval[bool](p, axe+";true")
	}
	list := eval[[]string](p, `axe.run(document, {resultTypes: ["violations"]}).then((r) => r.violations.flatMap((v) => v.nodes.map((n) => v.id + ": " + n.target.join(" ") + ": " + n.failureSummary.replace(/\s+/g, " "))))`)
	for _, v := range list {
		p.t.Errorf("%s: %s", name, shortened(v))
	}
}

// A look is a width of the page and a theme.
type look struct {
	width  int64
	scheme string
}

// looks are both themes, wide and narrow; some are enough for what differs little from a page already looked at.
var (
	looks = []look{{1280, "light"}, {1280, "dark"}, {380, "dark"}, {380, "light"}}
	some  = []look{looks[0], looks[2]}
)

func (p *tab) audits(name string, looks []look) {
	p.t.Helper()
	for _, v := range looks {
		p.size(v.width, 900)
		p.media("", v.scheme)
		p.audit(fmt.Sprint(name, ", ", v.scheme, " at ", v.width))
	}
	p.size(1280, 900)
	p.media("", "light")
}

func TestAxeBench(t *testing.T) {
	p, _ := bench(t)
	p.expect(422)
	p.audits("bench", looks)
	p.openAll()
	p.audits("bench, all open", some)

	p.typed(field(baggage), "250")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text(headline), "Does not fly")
	p.typed(field("airframe.span"), "wide")
	p.swapped(func() { p.press(tabKey) })
	has(t, p.text("#refused"), "One entry")
	p.audits("failing bench with a refused entry", some)
}

func TestAxeOtherPages(t *testing.T) {
	s := newSite(t, project.Demo())
	for name := range pages {
		if slow(name) {
			continue
		}
		p := s.openPage(name)
		p.audits(name, some)
	}
}

// TestAxeWorking has the working for itself, and a tab for each look: with its
// mathematics the page takes longer than all the others together.
func TestAxeWorking(t *testing.T) {
	s := newSite(t, project.Demo())
	for _, v := range some {
		p := newTab(t)
		p.open(s.url + "/projects/1/variants/a/working")
		p.openAll()
		p.audits("working", []look{v})
	}
}

// openAll opens every part of the page that folds.
func (p *tab) openAll() {
	p.t.Helper()
	eval[bool](p, `(document.querySelectorAll("details").forEach((d) => { d.open = true; }), true)`)
}
