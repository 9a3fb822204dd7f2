package charts

import (
	"fmt"
	"maps"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
)

var declaration = regexp.MustCompile(`--([a-z0-9-]+):\s*#([0-9a-f]{6});`)

// themes returns the colours of the blocks of tokens.css in their order: light, dark by
// the system, dark by choice.
func themes(t *testing.T) []map[string]uint32 {
	t.Helper()
	css, err := os.ReadFile("../static/tokens.css")
	if err != nil {
		t.Fatal(err)
	}
	var all []map[string]uint32
	for _, block := range strings.Split(string(css), "}") {
		colours := map[string]uint32{}
		for _, m := range declaration.FindAllStringSubmatch(block, -1) {
			v, err := strconv.ParseUint(m[2], 16, 32)
			if err != nil {
				t.Fatal(err)
			}
			colours[m[1]] = uint32(v)
		}
		if len(colours) > 0 {
			all = append(all, colours)
		}
	}
	if len(all) != 3 {
		t.Fatalf("%d blocks with colours, want 3", len(all))
	}
	return all
}

// luminance and contrast follow W3C, Web Content Accessibility Guidelines 2.2, 2023,
// definitions of relative luminance and contrast ratio.
func luminance(rgb uint32) float64 {
	channel := func(shift uint) float64 {
		c := float64(rgb>>shift&0xff) / 255
		if c <= 0.04045 {
			return c / 12.92
		}
		return math.Pow((c+0.055)/1.055, 2.4)
	}
	return 0.2126*channel(16) + 0.7152*channel(8) + 0.0722*channel(0)
}

func contrast(a, b uint32) float64 {
	la, lb := luminance(a), luminance(b)
	return (max(la, lb) + 0.05) / (min(la, lb) + 0.05)
}

func TestContrast(t *testing.T) {
	if c := contrast(0, 0xffffff); math.Abs(c-21) > 1e-9 {
		t.Fatalf("black on white is %v, not 21", c)
	}
	text := []string{"ink", "ink-2", "ink-3", "accent", "good", "bad", "caution",
		"available", "required", "altitude", "energy", "mass", "rate", "alt-1", "alt-2"}
	lines := []string{"alt-3", "alt-4", "short"}
	for i, theme := range themes(t) {
		need := func(front, back string, least float64) {
			f, ok := theme[front]
			b, known := theme[back]
			if !ok || !known {
				t.Fatalf("theme %d lacks %s or %s", i, front, back)
			}
			if c := contrast(f, b); c < least {
				t.Errorf("theme %d: %s on %s has contrast %.2f, needs %.1f", i, front, back, c, least)
			}
		}
		for _, name := range text {
			need(name, "panel", 4.5)
		}
		for _, name := range text[:7] {
			need(name, "paper", 4.5)
			need(name, "shade", 4.5)
		}
		for _, name := range lines {
			need(name, "panel", 3)
		}
		for _, curve := range []string{"available", "required"} {
			need(curve, "hand", 3)
		}
		need("available", "hand", 4.5) // the band's label
		need("panel", "ink", 4.5)      // callouts
	}
}

func TestThemesAgree(t *testing.T) {
	all := themes(t)
	light, bySystem, byChoice := all[0], all[1], all[2]
	if !maps.Equal(bySystem, byChoice) {
		t.Error("the two dark blocks differ")
	}
	for name := range light {
		if _, ok := bySystem[name]; !ok {
			t.Errorf("the dark theme lacks --%s", name)
		}
	}
	for name, rgb := range lightPalette {
		if light[name] != rgb {
			t.Errorf("--%s is #%06x in tokens.css and #%06x here", name, light[name], rgb)
		}
	}
}

func TestTokens(t *testing.T) {
	if got := paintToken("neutral", "curve").class; got != "c-ink-2 curve" {
		t.Errorf("neutral: %q", got)
	}
	if got := paintToken("nobody knows", "").class; got != "c-ink-2" {
		t.Errorf("unknown: %q", got)
	}
	r, g, b, _ := paintToken("available", "").RGBA()
	if got := fmt.Sprintf("%02x%02x%02x", r>>8, g>>8, b>>8); got != "0067a6" {
		t.Errorf("available is #%s", got)
	}
}

func TestStaticFilesStaySmall(t *testing.T) {
	fonts, err := filepath.Glob("../static/fonts/*.woff2")
	if err != nil || len(fonts) == 0 {
		t.Fatalf("no fonts: %v", err)
	}
	total := int64(0)
	var css []byte
	for _, name := range []string{"tokens.css", "working.css"} {
		text, err := os.ReadFile("../static/" + name)
		if err != nil {
			t.Fatal(err)
		}
		css = append(css, text...)
	}
	for _, f := range fonts {
		info, err := os.Stat(f)
		if err != nil {
			t.Fatal(err)
		}
		total += info.Size()
		if !strings.Contains(string(css), `url("fonts/`+filepath.Base(f)+`")`) {
			t.Errorf("no style sheet names %s", f)
		}
	}
	if total >= 250_000 {
		t.Errorf("fonts are %d bytes", total)
	}
	script, err := os.ReadFile("../static/charts.js")
	if err != nil {
		t.Fatal(err)
	}
	if n := strings.Count(string(script), "\n"); n > 200 {
		t.Errorf("charts.js has %d lines", n)
	}
}
