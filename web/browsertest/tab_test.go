package browsertest

import (
	"context"
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/chromedp/cdproto/cdp"
	"github.com/chromedp/cdproto/emulation"
	"github.com/chromedp/cdproto/input"
	"github.com/chromedp/cdproto/log"
	"github.com/chromedp/cdproto/network"
	"github.com/chromedp/cdproto/page"
	"github.com/chromedp/cdproto/runtime"
	"github.com/chromedp/chromedp"
	"github.com/chromedp/chromedp/kb"
)

// watch counts the requests of the page's script, so that a test can wait until
// the last one is swapped in, and notes what the content policy refuses.
const watch = `
window.asked = 0; window.answered = 0; window.refusedByPolicy = [];
document.addEventListener("htmx:config:request", (e) => queueMicrotask(() => { if (!e.defaultPrevented) window.asked++; }));
document.addEventListener("htmx:finally:request", () => window.answered++);
document.addEventListener("securitypolicyviolation", (e) => window.refusedByPolicy.push(e.violatedDirective + " " + e.blockedURI));
`

// A tab is one tab of the browser. At the end of its test it fails the test
// when the console holds an error or a request has failed.
type tab struct {
	t   *testing.T
	ctx context.Context

	mu       sync.Mutex
	problems []string
	expected map[int64]bool // statuses from 400 on that are no problem
}

func newTab(t *testing.T) *tab {
	t.Helper()
	needBrowser(t)
	ctx, cancel := chromedp.NewContext(browser, chromedp.WithNewWindow(true))
	t.Cleanup(cancel)
	ctx, timeout := context.WithTimeout(ctx, 90*time.Second)
	t.Cleanup(timeout)
	p := &tab{t: t, ctx: ctx, expected: map[int64]bool{}}
	if err := chromedp.Listen(ctx, p.listen); err != nil {
		t.Fatal(err)
	}
	call(p, page.AddScriptToEvaluateOnNewDocument, page.AddScriptToEvaluateOnNewDocumentParams{Source: watch})
	call(p, emulation.SetFocusEmulationEnabled, emulation.SetFocusEmulationEnabledParams{Enabled: true})
	p.size(1280, 900)
	t.Cleanup(p.check)
	return p
}

// listen runs on the browser's own goroutine.
func (p *tab) listen(ev any) {
	p.mu.Lock()
	defer p.mu.Unlock()
	add := func(format string, args ...any) { p.problems = append(p.problems, fmt.Sprintf(format, args...)) }
	switch e := ev.(type) {
	case *runtime.EventExceptionThrown:
		add("exception: %s", exceptionText(e.ExceptionDetails))
	case *runtime.EventConsoleAPICalled:
		if e.Type == runtime.ConsoleAPICalledTypeError || e.Type == runtime.ConsoleAPICalledTypeWarning || e.Type == runtime.ConsoleAPICalledTypeAssert {
			var texts []string
			for _, a := range e.Args {
				texts = append(texts, string(a.Value)+a.Description)
			}
			add("console: %s", strings.Join(texts, " "))
		}
	case *log.EventEntryAdded:
		// A status that the test expects is also logged by the browser.
		if e.Entry.Level == log.EntryLevelError && !(e.Entry.Source == log.EntrySourceNetwork && p.expectedIn(e.Entry.Text)) {
			add("log: %s %s", e.Entry.Text, e.Entry.URL)
		}
	case *network.EventLoadingFailed:
		if !e.Canceled {
			add("request failed: %s %s", e.Type, e.ErrorText)
		}
	case *network.EventResponseReceived:
		if e.Response.Status >= 400 && !p.expected[e.Response.Status] {
			add("status %d: %s", e.Response.Status, e.Response.URL)
		}
	}
}

func exceptionText(d *runtime.ExceptionDetails) string {
	if d.Exception != nil {
		return d.Text + " " + d.Exception.Description
	}
	return d.Text
}

func (p *tab) expectedIn(text string) bool {
	for s := range p.expected {
		if strings.Contains(text, fmt.Sprintf("status of %d", s)) {
			return true
		}
	}
	return false
}

// expect says that the status is no problem in this test.
func (p *tab) expect(status int64) {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.expected[status] = true
}

func (p *tab) check() {
	p.t.Helper()
	if p.t.Failed() {
		p.shot("failed-" + strings.ReplaceAll(p.t.Name(), "/", "-"))
	}
	p.mu.Lock()
	defer p.mu.Unlock()
	for _, s := range p.problems {
		p.t.Error(s)
	}
}

func call[P, R any](p *tab, cmd cdp.Command[P, R], params P) R {
	p.t.Helper()
	r, err := chromedp.Call(p.ctx, cmd, params)
	if err != nil {
		p.t.Fatal(err)
	}
	return r
}

func (p *tab) do(steps ...chromedp.Action[chromedp.Void]) {
	p.t.Helper()
	if err := chromedp.Do(p.ctx, steps...); err != nil {
		p.t.Fatal(err)
	}
}

// eval is the value of a script's expression; a promise is awaited.
func eval[T any](p *tab, expression string, args ...any) T {
	p.t.Helper()
	for i, a := range args {
		text, err := json.Marshal(a)
		if err != nil {
			p.t.Fatal(err)
		}
		expression = strings.ReplaceAll(expression, fmt.Sprintf("$%d", i+1), string(text))
	}
	v, err := chromedp.Run(p.ctx, chromedp.Evaluate[T](expression, chromedp.EvalAwaitPromise))
	if err != nil {
		p.t.Fatalf("%s: %v", shortened(expression), err)
	}
	return v
}

func shortened(s string) string {
	if len(s) > 300 {
		return s[:300] + "…"
	}
	return s
}

// open loads a page and waits until its scripts have run.
func (p *tab) open(url string) {
	p.t.Helper()
	p.do(chromedp.Navigate(url))
	p.until(`document.readyState === "complete"`)
	p.noViolations()
}

func (p *tab) noViolations() {
	p.t.Helper()
	if list := eval[[]string](p, `window.refusedByPolicy || []`); len(list) > 0 {
		p.t.Errorf("the content policy refused %v", list)
	}
}

// until waits for a condition of the page.
func (p *tab) until(condition string, args ...any) {
	p.t.Helper()
	for deadline := time.Now().Add(20 * time.Second); time.Now().Before(deadline); time.Sleep(10 * time.Millisecond) {
		if eval[bool](p, `!!(`+condition+`)`, args...) {
			return
		}
	}
	p.t.Fatalf("never became true: %s %v", condition, args)
}

// swapped runs f, which makes the page's script send something, and waits until all of it is answered.
func (p *tab) swapped(f func()) {
	p.t.Helper()
	before := eval[int](p, `window.answered`)
	f()
	p.until(`window.answered > $1 && window.answered === window.asked`, before)
	p.noViolations()
}

// text is the visible text of the first element, or nothing when there is none.
func (p *tab) text(selector string) string {
	p.t.Helper()
	return eval[string](p, `(document.querySelector($1)?.innerText || "").replace(/\s+/g, " ").trim()`, selector)
}

func (p *tab) value(selector string) string {
	p.t.Helper()
	return eval[string](p, `document.querySelector($1).value`, selector)
}

// active is the id of the element with the focus.
func (p *tab) active() string {
	p.t.Helper()
	return eval[string](p, `document.activeElement?.id || document.activeElement?.tagName || ""`)
}

// focus puts the focus into an element and selects what stands there.
func (p *tab) focus(selector string) {
	p.t.Helper()
	eval[bool](p, `(() => { const e = document.querySelector($1); const d = e.closest("details"); if (d) d.open = true; e.focus(); e.select?.(); return document.activeElement === e; })()`, selector)
	if !eval[bool](p, `document.activeElement === document.querySelector($1)`, selector) {
		p.t.Fatalf("%s takes no focus", selector)
	}
}

// typed types over what stands in the field, key by key, and leaves the focus there.
func (p *tab) typed(selector, text string) {
	p.t.Helper()
	p.focus(selector)
	p.press(text)
}

// pasted puts text into the field at once.
func (p *tab) pasted(selector, text string) {
	p.t.Helper()
	p.focus(selector)
	call(p, input.InsertText, input.InsertTextParams{Text: text})
}

func (p *tab) press(keys string, modifiers ...chromedp.Modifier) {
	p.t.Helper()
	p.do(chromedp.KeyEvent(keys, chromedp.KeyModifiers(modifiers...)))
}

// choose takes an option of a select as a person does, with an event.
func (p *tab) choose(selector, value string) {
	p.t.Helper()
	eval[bool](p, `(() => { const e = document.querySelector($1), d = e.closest("details"); if (d) d.open = true; e.focus(); e.value = $2;
		e.dispatchEvent(new Event("input", {bubbles: true})); e.dispatchEvent(new Event("change", {bubbles: true})); return true; })()`, selector, value)
}

func (p *tab) click(selector string) {
	p.t.Helper()
	p.do(chromedp.Click(chromedp.CSS(selector), chromedp.NodeVisible))
}

func (p *tab) size(width, height int64) {
	p.t.Helper()
	p.do(chromedp.EmulateViewport(width, height))
}

// media sets the medium ("" is the screen) and the colour scheme.
func (p *tab) media(medium, scheme string) {
	p.t.Helper()
	call(p, emulation.SetEmulatedMedia, emulation.SetEmulatedMediaParams{Media: medium, Features: []*emulation.MediaFeature{{Name: "prefers-color-scheme", Value: scheme}}})
}

// shot saves a picture when SHOTS names a folder: the top of a wide page, the whole of a narrow one.
func (p *tab) shot(name string) {
	dir := os.Getenv("SHOTS")
	if dir == "" {
		return
	}
	width, err := chromedp.Run(p.ctx, chromedp.Evaluate[int64](`innerWidth`))
	take := chromedp.FullScreenshot(100)
	if err == nil && width > 600 {
		take = chromedp.CaptureScreenshot()
		err = chromedp.Do(p.ctx, chromedp.EmulateViewport(width, 1500))
	}
	var b []byte
	if err == nil {
		b, err = chromedp.Run(p.ctx, take)
	}
	if err == nil {
		err = os.WriteFile(filepath.Join(dir, name+".png"), b, 0o644)
	}
	if err == nil && width > 600 {
		err = chromedp.Do(p.ctx, chromedp.EmulateViewport(width, 900))
	}
	if err != nil {
		p.t.Error(err)
	}
}

// field selects the input at a path of the first variant's aircraft, or at a path from the document's root with a slash before it.
func field(path string) string {
	if root, ok := strings.CutPrefix(path, "/"); ok {
		return fmt.Sprintf("[name=%q]", root)
	}
	return fmt.Sprintf("[name=%q]", "variants[0].aircraft."+path)
}

// has fails the test when the text lacks one of the parts.
func has(t *testing.T, text string, parts ...string) {
	t.Helper()
	for _, part := range parts {
		if !strings.Contains(text, part) {
			t.Errorf("%q lacks %q", text, part)
		}
	}
}

const (
	tabKey = kb.Tab
	enter  = kb.Enter
)

// forget drops the problems noted so far, which the test has brought about itself.
func (p *tab) forget() {
	p.mu.Lock()
	defer p.mu.Unlock()
	p.problems = nil
}
