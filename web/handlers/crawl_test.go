package handlers

import (
	"net/url"
	"regexp"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"legwright/internal/perf/aircraft"
	"legwright/internal/perf/dragbuild"
	"legwright/internal/perf/project"
	"legwright/internal/store"
)

// A crawler follows every link and sends every form of the site as it stands,
// by each of its buttons. Addresses, forms and buttons that differ only in a
// number or a variant count as one, except for GET.
type crawler struct {
	*visitor
	waiting []string
	known   map[string]bool
	pages   int
	sent    int
}

// most is far above what the site needs; a walk that reaches it goes in circles.
const most = 400

func TestCrawl(t *testing.T) {
	c := &crawler{visitor: visit(t), known: map[string]bool{}}
	c.keep(project.New("Second"))
	c.keep(builtUp())
	c.files()
	c.add("/")
	for len(c.waiting) > 0 && c.pages+c.sent < most {
		next := c.waiting[0]
		c.waiting = c.waiting[1:]
		c.visitPage(next)
	}
	if c.pages+c.sent >= most {
		t.Errorf("stopped after %d pages and %d forms, %d addresses left", c.pages, c.sent, len(c.waiting))
	}
	for _, path := range []string{"/projects/1/variants/a", "/projects/1/variants/b", "/projects/2/variants/a", "/projects/1/variants/a/working", "/projects/1/variants/a/climb", "/projects/1/variants/a/drag",
		"/projects/1/variants/a/strip", "/projects/1/variants/a/mission", "/projects/1/variants/a/powerplant", "/projects/1/variants/a/requirements", "/projects/1/variants/a/report", "/projects/1/history", "/static/htmx.min.js",
		"/projects/1/variants/a/import?table=powerplant.values.engine.power_curve", "/projects/1/variants/a/import/2?table=powerplant.values.engine.power_curve", "/projects/1/originals/2", "/projects/1/history/1"} {
		if !c.known[path] {
			t.Errorf("never reached %s", path)
		}
	}
	for _, form := range []string{"form-weights remove-item #", "form-airframe remove-component #", "form-mission move-leg-up #", "form-legs move-leg-down #", "form-legs duplicate-leg #", "form-legs add-leg contingency", "form-legs add-leg turns", "form-requirements add-requirement", "form-requirement-# remove-requirement #", "add-form", "presets-form add-preset vla", "view-form", "undo-form", "redo-form", "units-form", "report-form", "tables-form", "table mission-trace.csv?units=si", "import-upload", "import-mapping", "import-confirm"} {
		if !c.known[form] {
			t.Errorf("never sent %s", form)
		}
	}
	t.Logf("%d pages, %d forms", c.pages, c.sent)
}

// builtUp is a project whose drag is a build-up and whose lift is a stall speed.
func builtUp() *project.Spec {
	s := project.New("Built up")
	f := &s.Variants[0].Aircraft.Airframe
	f.DragGiven, f.FrictionTAS, f.Unlisted = aircraft.ByBuildUp, 45, 0.3
	f.Components = []dragbuild.Component{dragbuild.New(dragbuild.Surface, "Wing"), dragbuild.New(dragbuild.ByDragArea, "Gear")}
	f.Clean.LiftGiven, f.Clean.StallSpeed, f.Clean.StallMass = aircraft.ByStall, 24, 600
	return s
}

// files keeps a file that was used, so that it stays, and one that can be discarded.
func (c *crawler) files() {
	var used store.Original
	for _, name := range []string{"unused.csv", "curve.csv"} {
		var err error
		if used, err = c.db.Keep(c.t.Context(), 1, name, []byte("rpm;P [kW]\n1800;40\n2800;62\n")); err != nil {
			c.t.Fatal(err)
		}
	}
	in := store.Import{Original: used.ID, Variant: "a", Path: "powerplant.values.engine.power_curve", Mapping: []byte("{}")}
	if _, err := c.db.SaveImport(c.t.Context(), 1, 1, "Used", nil, "", in); err != nil {
		c.t.Fatal(err)
	}
}

func (c *crawler) add(address string) {
	if !c.known[address] {
		c.known[address] = true
		c.waiting = append(c.waiting, address)
	}
}

// visitPage gets one address, checks it, and sends the forms on it, each from the page as it then is.
func (c *crawler) visitPage(address string) {
	for {
		c.at = nil
		c.get(address)
		c.pages++
		c.sound(address)
		if c.page == nil {
			return
		}
		form, action := c.next()
		if form == nil {
			return
		}
		c.submit(form, nil, action)
		c.sent++
		c.sound(address + ", form " + formName(form) + " " + action)
	}
}

// next is a form of the page with a button that was not yet pressed; nil when there is none.
func (c *crawler) next() (*html.Node, string) {
	for _, form := range all(c.page, "form") {
		for _, action := range actions(form) {
			name := masked(formName(form) + " " + action)
			if !c.known[name] {
				c.known[name] = true
				return form, action
			}
		}
	}
	return nil, ""
}

// sound follows redirects, checks the answer and notes where its links lead.
func (c *crawler) sound(what string) {
	c.follow()
	switch code := c.reply.Code; {
	case code == 422 && c.page != nil && one(c.page, ".error") != nil: // it explains
	case code == 404 && c.page != nil && strings.Contains(text(one(c.page, ".lead")), "no such variant; it may have been undone"): // the crawler undid it
	case code == 404 && c.page != nil && strings.Contains(text(one(c.page, ".lead")), "it may have been discarded"): // the crawler did that
	case code < 200 || code > 299:
		c.t.Errorf("%s: status %d", what, code)
	}
	if c.log.Len() > 0 {
		c.t.Errorf("%s: the site logged %s", what, c.log)
		c.log.Reset()
	}
	if c.page == nil {
		return
	}
	if err := checkPage(c.reply.Body.String()); err != nil {
		c.t.Errorf("%s: %v", what, err)
	}
	for _, n := range append(all(c.page, "[href]"), all(c.page, "[src]")...) {
		c.link(attr(n, "href") + attr(n, "src"))
	}
}

// link notes the address that a link names; one that leads off the site is a fault.
func (c *crawler) link(address string) {
	to, err := c.at.Parse(address)
	if err != nil || to.Host != "" || to.Scheme != "" {
		c.t.Errorf("%s leads to %s", c.at, address)
		return
	}
	to.Fragment = ""
	if _, table, ok := strings.Cut(to.Path, "/tables/"); ok { // of one variant: they are many
		name := "table " + table + "?" + to.RawQuery
		if c.known[name] {
			return
		}
		c.known[name] = true
	}
	c.add(to.String())
}

// actions lists the buttons of a form: "" is the one without a name.
func actions(form *html.Node) []string {
	var list []string
	for _, b := range all(form, "button") {
		if !has(b, "disabled") && attr(b, "type") != "button" {
			list = append(list, attr(b, "value"))
		}
	}
	return list
}

func formName(form *html.Node) string {
	if id := attr(form, "id"); id != "" {
		return id
	}
	u, _ := url.Parse(attr(form, "action"))
	return u.Path
}

var digits = regexp.MustCompile(`\d+`)

func masked(name string) string { return strings.TrimSpace(digits.ReplaceAllString(name, "#")) }
