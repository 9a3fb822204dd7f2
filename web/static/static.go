// Package static holds the style sheets, scripts and fonts that the pages load.
package static

import "embed"

// Files are served under /static/.
//
//go:embed *.css *.js *.svg *.txt fonts
var Files embed.FS
