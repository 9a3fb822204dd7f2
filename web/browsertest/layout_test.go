package browsertest

import (
	"fmt"
	"strings"
	"testing"

	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/project"
)

// tooWide lists what makes the page scroll sideways and what is cut or runs out of its box.
const tooWide = `(() => {
	const bad = [], seen = (e) => e.id ? "#" + e.id : e.tagName.toLowerCase() + "." + e.className;
	const room = document.documentElement.clientWidth;
	if (document.documentElement.scrollWidth > room) bad.push("page: " + document.documentElement.scrollWidth + " in " + room);
	const scrolls = (e) => { for (let a = e.parentElement; a; a = a.parentElement) if (/auto|scroll|hidden|clip/.test(getComputedStyle(a).overflowX)) return true; return false; };
	const hidden = (e) => { const r = e.getBoundingClientRect(); return r.width < 2 || r.height < 2 || !e.checkVisibility({visibilityProperty: true}); };
	for (const e of document.querySelectorAll("body *")) {
		if (hidden(e) || e.closest("svg, math, .skip, .visually-hidden, .first-submit, option")) continue;
		const r = e.getBoundingClientRect();
		if ((r.right > room + 1 || r.left < -1) && !scrolls(e)) bad.push("beyond the page: " + seen(e) + " " + Math.round(r.left) + ".." + Math.round(r.right));
	}
	for (const e of document.querySelectorAll(".tile, .tile *, .field > label, .verdict, .verdict-text *, .crumbs, .crumbs a, .message, .field .error, .field .hint, .group > summary, .group > summary *, legend, .rows th, .rows td, h1, h2, h3, .shelf li, .shelf-name, .warning > *, .lead, .note, button, .saved")) {
		if (hidden(e) || e.closest(".visually-hidden, .first-submit") || getComputedStyle(e).display === "inline" || getComputedStyle(e).display === "contents") continue;
		if (e.scrollWidth > e.clientWidth + 1) bad.push("cut or overflowing: " + seen(e) + " " + e.scrollWidth + " in " + e.clientWidth + ": " + e.innerText.slice(0, 40));
	}
	for (const e of document.querySelectorAll("select:not(.basis), .entry input")) {
		if (hidden(e)) continue;
		if (e.scrollWidth > e.clientWidth + 1) bad.push("entry cut: " + seen(e) + " " + e.scrollWidth + " in " + e.clientWidth + ": " + e.value);
	}
	const tiles = [...document.querySelectorAll(".tile")].map((e) => e.getBoundingClientRect());
	tiles.forEach((a, i) => tiles.slice(i + 1).forEach((b) => { if (a.left < b.right - 1 && b.left < a.right - 1 && a.top < b.bottom - 1 && b.top < a.bottom - 1) bad.push("tiles overlap"); }));
	return [...new Set(bad)].slice(0, 12);
})()`

// fits fails the test when something runs out of its place.
func (p *tab) fits(name string) {
	p.t.Helper()
	for _, b := range eval[[]string](p, tooWide) {
		p.t.Errorf("%s: %s", name, b)
	}
}

// fitsAt looks at the page at the widths that matter, and on paper.
func (p *tab) fitsAt(name string) {
	p.t.Helper()
	for _, width := range []int64{380, 1280, 700, 901, 1600} {
		p.size(width, 900)
		p.fits(fmt.Sprint(name, " at ", width))
	}
	p.media("print", "light")
	p.size(718, 1000) // A4 less the margins
	p.fits(name + " on paper")
	p.media("", "light")
	p.size(1280, 900)
}

func TestLayout(t *testing.T) {
	p, _ := bench(t)
	p.expect(422)
	p.shot("bench-1280-light")
	p.media("", "dark")
	p.shot("bench-1280-dark")
	p.size(380, 800)
	p.shot("bench-380-dark")
	p.media("", "light")
	p.shot("bench-380-light")
	p.fitsAt("bench")
	p.openAll()
	p.fitsAt("bench, all open")
	p.swapped(func() { p.choose("#units", "aviation") })
	p.shot("aviation-1280-light")
	p.fitsAt("bench in aviation units")
	p.typed(field(baggage), "550")
	p.typed(field("airframe.span"), "wide")
	p.swapped(func() { p.press(tabKey) })
	p.shot("failing-1280-light")
	p.fitsAt("failing bench")
}

// TestLayoutOtherPages has a tab for each page, so that each has the time of a whole test.
func TestLayoutOtherPages(t *testing.T) {
	s := newSite(t, project.Demo())
	for name, path := range map[string]string{"shelf": "/projects", "working": "/projects/1/variants/a/working", "climb": "/projects/1/variants/a/climb", "drag": "/projects/1/variants/a/drag",
		"strip": "/projects/1/variants/a/strip", "powerplant": "/projects/1/variants/a/powerplant", "requirements": "/projects/1/variants/a/requirements", "history": "/projects/1/history", "revision": "/projects/1/history/1", "problem": "/projects/99"} {
		p := newTab(t)
		p.expect(404)
		p.open(s.url + path)
		p.shot(name + "-1280-light")
		p.fitsAt(name)
	}
}

// ugly is a very small aircraft with very long names, an impossible mission and the other units.
func ugly() *project.Spec {
	// Names as long as they are accepted, without a place to break.
	long := func(word string, n int) string { return strings.Repeat(word, n)[:n] }
	s := project.Demo()
	s.Name, s.Note, s.Display = long("Projectname", 120), long("Note", 120), "aviation"
	for i := range s.Variants {
		s.Variants[i].Name = long("Variantname", 120)
		a := &s.Variants[i].Aircraft
		a.Airframe.WingArea, a.Airframe.Span = 0.6, 2.2
		a.Weights.Empty, a.Weights.MaxTakeOff = 1.6, 3
		for j := range a.Weights.Items {
			a.Weights.Items[j].Name, a.Weights.Items[j].Mass = long("Itemname", 80), 0.05
		}
		p := a.Powerplant.Model.(*powerplant.PistonPropeller)
		p.Mass, p.Propeller.Diameter = 0.6, 0.4
		p.Fuel.Volume, p.Fuel.Capacity, p.Fuel.Unusable = 0.0004, 0.0005, 0
		for _, row := range p.Engine.PowerCurve {
			row[1] /= 200
		}
	}
	s.Strips[0].Name = long("Stripname", 80)
	for _, k := range project.FigureKinds() {
		r := project.Require(k.ID, k.Bound, k.Usual)
		r.Clause, r.Note, r.StripGiven, r.Strip = long("Clause", 120), long("Remark", 500), project.NamedStrip, s.Strips[0].Name
		s.Requirements = append(s.Requirements, r)
	}
	for i := range s.Legs {
		s.Legs[i].Name = long("Legname", 60)
		if s.Legs[i].Distance > 0 {
			s.Legs[i].Distance = 9e6
		}
	}
	return s
}

func TestUgly(t *testing.T) {
	spec := ugly()
	if _, err := spec.Build(); err != nil {
		t.Fatal(err)
	}
	p, s := bench(t, spec)
	has(t, p.text(headline), "Does not fly")
	p.size(380, 800)
	p.shot("ugly-380-light")
	p.size(1280, 900)
	p.shot("ugly-1280-light")
	p.openAll()
	p.fitsAt("ugly bench")
	for name, path := range map[string]string{"shelf": "/projects", "working": "/projects/1/variants/a/working", "climb": "/projects/1/variants/a/climb", "drag": "/projects/1/variants/a/drag",
		"strip": "/projects/1/variants/a/strip", "powerplant": "/projects/1/variants/a/powerplant", "requirements": "/projects/1/variants/a/requirements", "history": "/projects/1/history", "revision": "/projects/1/history/1"} {
		p.open(s.url + path)
		p.fitsAt("ugly " + name)
	}
}
