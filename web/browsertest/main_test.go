// Package browsertest drives the pages in a real Chromium: what only a browser
// can show, such as focus, swaps, charts under the pointer, layout and contrast.
// The server, the store and the engine are the real ones.
//
// CHROMIUM names the browser when it is not on the path. SHOTS names a folder
// for pictures of the pages. Without a browser the tests are left out, except
// with CI=true, where they fail.
package browsertest

import (
	"context"
	"fmt"
	"os"
	"os/exec"
	"testing"
	"time"

	"github.com/chromedp/chromedp"
)

// browser is the one browser of all tests; nil when there is none.
var browser context.Context

func chromium() string {
	if p := os.Getenv("CHROMIUM"); p != "" {
		return p
	}
	for _, name := range []string{"chromium", "chromium-browser", "google-chrome-stable", "google-chrome"} {
		if p, err := exec.LookPath(name); err == nil {
			return p
		}
	}
	return ""
}

func TestMain(m *testing.M) { os.Exit(run(m)) }

func run(m *testing.M) int {
	path := chromium()
	if path == "" {
		return m.Run()
	}
	options := append(chromedp.DefaultExecAllocatorOptions[:], chromedp.ExecPath(path), chromedp.NoSandbox, chromedp.DisableGPU,
		chromedp.Flag("disable-quic", true), chromedp.Flag("disable-component-update", true), chromedp.WSURLReadTimeout(60*time.Second), chromedp.WindowSize(1280, 900))
	allocator, stop := chromedp.NewExecAllocator(context.Background(), options...)
	defer stop()
	ctx, cancel := chromedp.NewContext(allocator)
	defer cancel()
	if err := chromedp.Do(ctx); err != nil {
		fmt.Fprintf(os.Stderr, "%s does not start: %v\n", path, err)
		return 1
	}
	browser = ctx
	return m.Run()
}

// needBrowser leaves the test out where there is no browser, or fails it in CI.
func needBrowser(t *testing.T) {
	t.Helper()
	if browser != nil {
		return
	}
	const missing = "no Chromium: set CHROMIUM or install the package chromium"
	if os.Getenv("CI") == "true" {
		t.Fatal(missing)
	}
	t.Skip(missing)
}
