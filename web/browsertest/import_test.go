package browsertest

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"legwright/internal/perf/project"

	"github.com/chromedp/chromedp"
)

const families = "# tunnel, climb propeller\nrpm;J;CT;CP\n2400;0,00;0,1050;0,0480\n2400;0,40;0,0820;0,0450\n2400;0,60;0,0560;0,0390\n2400;0,88;-0,0020;0,0130\n" +
	"2700;0,00;0,1070;0,0485\n2700;0,40;0,0830;0,0455\n2700;0,60;0,0570;0,0395\n2700;0,88;-0,0010;0,0140\n"

// choosesFile puts a file from the disk into a file input.
func (p *tab) choosesFile(selector, name, content string) {
	p.t.Helper()
	path := filepath.Join(p.t.TempDir(), name)
	if err := os.WriteFile(path, []byte(content), 0o600); err != nil {
		p.t.Fatal(err)
	}
	p.do(chromedp.SetUploadFiles(chromedp.CSS(selector), []string{path}))
}

// sent clicks a button that loads a page.
func (p *tab) sent(selector string) {
	p.t.Helper()
	p.loaded(chromedp.Click(chromedp.CSS(selector), chromedp.NodeVisible))
	p.until(`document.readyState === "complete"`)
	p.noViolations()
}

// TestImport goes from the bench to a file, its family, its rows and back.
func TestImport(t *testing.T) {
	p, s := bench(t)
	thrust := p.text("#speeds")
	p.focus(field("powerplant.values.propeller.coefficients")) // opens its group
	p.sent(`a[href*="propeller.coefficients"]`)
	has(t, p.text("h1"), "Import a table")
	p.choosesFile("#import-file", "prop.csv", families)
	p.sent("#import-upload button")
	has(t, p.text("h1"), "Propeller coefficients from prop.csv")
	has(t, p.text("#import-family-error"), "not averaged")
	if eval[bool](p, `!!document.querySelector("#import-confirm")`) {
		t.Error("two families can be imported")
	}
	p.shot("import-families-1280-light")

	// A choice changes the rows at once, and the place of the keyboard stays.
	p.swapped(func() { p.choose("#import-family", "1=2700") })
	has(t, p.text("#import-counts"), "4 rows can be read.")
	if got := p.active(); got != "import-family" {
		t.Errorf("after the choice the focus is on %q", got)
	}
	if got := p.value("#import-family"); got != "1=2700" {
		t.Errorf("the family shows %q", got)
	}
	has(t, eval[string](p, `location.search`), "family=1%3D2700")
	p.swapped(func() { p.choose("#import-column-cp", "3") })
	has(t, p.text("#import-mapping"), "The same column")
	p.swapped(func() { p.choose("#import-column-cp", "4") })
	if n := eval[int](p, `document.querySelectorAll("#import-chart-figure svg").length`); n != 2 {
		t.Errorf("%d drawings, want a wide and a narrow one", n)
	}
	p.shot("import-rows-1280-light")
	p.choose("#import-basis", "measured")
	p.sent("#import-confirm button")
	p.until(`document.querySelector("#verdict")`)
	has(t, eval[string](p, `location.hash`), "propeller-coefficients-field")
	if !eval[bool](p, `document.querySelector(location.hash).checkVisibility()`) {
		t.Error("the table's field is not to be seen after the import")
	}
	has(t, p.value(field("powerplant.values.propeller.coefficients")), "0.4  0.083  0.0455")
	if got := p.value(`[name="basis:variants[0].aircraft.powerplant.values.propeller.coefficients"]`); got != "measured" {
		t.Errorf("the basis is %q", got)
	}
	if n := p.revision(); n != 2 {
		t.Errorf("the import made revision %d", n)
	}
	if p.text("#speeds") == thrust {
		t.Error("the speeds are those of the old propeller")
	}
	p.swapped(func() { p.click("#undo-form button") })
	if p.text("#speeds") != thrust {
		t.Error("undo does not bring the old propeller back")
	}
	p.open(s.url + "/projects/1/variants/a/import?table=powerplant.values.propeller.coefficients")
	has(t, p.text("#import-done"), "prop.csv into", "revision 2")
	if got := eval[string](p, `fetch(document.querySelector("#import-kept a[href*=originals]").href).then((r) => r.text())`); got != families {
		t.Errorf("the original came back as %q", got)
	}
}

// TestImportByKeyboardAndPaste pastes a sheet, chooses and imports without a pointer and without a script.
func TestImportByKeyboardAndPaste(t *testing.T) {
	s := newSite(t, project.Demo())
	p := newTab(t)
	p.noScript()
	p.do(chromedp.Navigate(s.url + "/projects/1/variants/a/import"))
	p.pasted("#import-text", "rpm\tP\n2800\t81\n1800\t50\n")
	p.tabTo("#import-upload button")
	p.loaded(chromedp.KeyEvent(enter))
	has(t, p.text("#import-unit-power-error"), "Choose the unit")
	p.choose("#import-unit-power", "hp")
	p.focus("#import-sort")
	p.press(" ")
	p.tabTo("#import-mapping button")
	p.loaded(chromedp.KeyEvent(enter))
	has(t, p.text("#import-counts"), "2 rows can be read; sorted")
	p.tabTo("#import-confirm button")
	p.loaded(chromedp.KeyEvent(enter))
	has(t, p.text("#saved"), "revision 2")
	if got := strings.Fields(p.value(field("powerplant.values.engine.power_curve"))); len(got) != 4 || got[0] != "1800" || got[3] != "60.40169" {
		t.Errorf("the table holds %q", got)
	}
}

// TestImportLooks audits the mapping in its states: undecided, in error, ready, and with names that do not break.
func TestImportLooks(t *testing.T) {
	long := strings.Repeat("Sheetname", 12)
	s := newSite(t, ugly())
	p := newTab(t)
	wide := "rpm;J;CT;CP;" + strings.Repeat("Head", 30) + "\n" + strings.ReplaceAll(strings.TrimPrefix(families, "# tunnel, climb propeller\nrpm;J;CT;CP\n"), "\n", ";"+strings.Repeat("cell", 30)+"\n")
	for _, c := range []struct{ name, table, content, query string }{
		{"families", "powerplant.values.propeller.coefficients", families, ""},
		{"ready", "powerplant.values.propeller.coefficients", families, "&shown=1&family=1%3D2700"},
		{"undecided", "powerplant.values.engine.power_curve", "rpm;P\n1,800;2,000\n2,700;3,000\n", ""},
		{"cells in error", "powerplant.values.engine.power_curve", "rpm;P [kW]\n1800;" + strings.Repeat("fifty", 30) + "\n;40\n900;1e9\n", ""},
		{"unreadable", "airframe.polar", "no numbers\nat all\n", ""},
		{"blocks", "airframe.polar", "CL,CD\n-.3,.04\n0,.03\n4,.5\nCL,CD\n-.3,.05\n.2,.04\n4,.6\n", ""},
		{"ready and idle", "airframe.polar", "CL,CD\n-.3,.04\n0,.03\n4,.5\n", ""},
		{"long names", "powerplant.values.propeller.coefficients", wide, ""},
	} {
		p.open(s.url + "/projects/1/variants/a/import?table=" + c.table)
		p.choosesFile("#import-file", long+".csv", c.content)
		p.sent("#import-upload button")
		if c.query != "" {
			p.open(eval[string](p, `location.href`) + c.query)
		}
		p.fitsAt("import, " + c.name)
		p.audits("import, "+c.name, some)
	}
	p.open(s.url + "/projects/1/variants/a/import")
	p.fitsAt("import, files kept")
	p.audits("import, files kept", some)
}
