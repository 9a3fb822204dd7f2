package charts

import "image/color"

// A token is a colour with its CSS classes. The SVG canvas writes the classes, and the
// light colour as a fallback attribute; every other canvas sees the light colour.
type token struct {
	color.NRGBA
	class string
}

// lightPalette repeats the light theme of tokens.css for canvases without CSS.
var lightPalette = map[string]uint32{
	"panel":     0xffffff,
	"ink":       0x16222c,
	"ink-2":     0x44525e,
	"ink-3":     0x5c6a76,
	"line":      0xc9d3da,
	"line-2":    0xdde5ea,
	"shade":     0xf3f6f8,
	"available": 0x0067a6,
	"required":  0xb54708,
	"altitude":  0x00735a,
	"energy":    0x97407a,
	"mass":      0x6f5f00,
	"rate":      0x5a4bb3,
	"alt-1":     0x0b3c4d,
	"alt-2":     0x1a6079,
	"alt-3":     0x2d82a0,
	"alt-4":     0x4d9bb8,
	"hand":      0xdcebf5,
	"short":     0xc4602a,
}

// aliases are series classes that share another token's colour.
var aliases = map[string]string{"neutral": "ink-2", "ghost": "ink-3"}

// paintToken returns the token for a class of this package or of a caller; an unknown
// class is drawn neutral. Extra CSS classes follow the colour's.
func paintToken(class, extra string) token {
	name := class
	if a, ok := aliases[class]; ok {
		name = a
	}
	rgb, ok := lightPalette[name]
	if !ok {
		name, rgb = "ink-2", lightPalette["ink-2"]
	}
	t := token{color.NRGBA{uint8(rgb >> 16), uint8(rgb >> 8), uint8(rgb), 255}, "c-" + name}
	if extra != "" {
		t.class += " " + extra
	}
	return t
}

// textClass returns the class for text about a series: the pale altitude
// tokens reach the contrast of a line but not that of text.
func textClass(class string) string {
	if class == "alt-3" || class == "alt-4" {
		return "ink-2"
	}
	return class
}
