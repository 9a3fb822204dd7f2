package browsertest

import "strings"

// pages are the pages beside the bench, by name. Each is audited, laid out at two
// widths and printed; a new page needs only a line here.
var pages = map[string]string{
	"shelf":        "/projects",
	"backups":      "/backups",
	"problem":      "/projects/99",
	"history":      "/projects/1/history",
	"revision":     "/projects/1/history/1",
	"climb":        "/projects/1/variants/a/climb",
	"drag":         "/projects/1/variants/a/drag",
	"strip":        "/projects/1/variants/a/strip",
	"mission":      "/projects/1/variants/a/mission",
	"requirements": "/projects/1/variants/a/requirements",
	"powerplant":   "/projects/1/variants/a/powerplant",
	"import":       "/projects/1/variants/a/import",
	"report":       "/projects/1/variants/a/report",
	"working":      "/projects/1/variants/a/working",
}

// openPage opens one of pages in a tab of its own, so that each has the time of a whole test.
func (s *site) openPage(name string) *tab {
	s.t.Helper()
	p := newTab(s.t)
	p.expect(404)
	p.open(s.url + pages[name])
	return p
}

// slow reports whether the page takes so long that it has tests of its own.
func slow(name string) bool { return strings.HasPrefix(name, "working") }
