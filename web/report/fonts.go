package report

import (
	"slices"
	"strings"
	"sync"
	"unicode"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"codeberg.org/go-pdf/fpdf"
	"golang.org/x/image/font/sfnt"

	"legwright/internal/perf/input"
	"legwright/internal/perf/study"
)

// family is the one that package charts measures its words with, so that what fits
// there fits on paper: Liberation Sans, SIL Open Font License 1.1.
const family = "Liberation"

// faces are the fonts embedded in a report, by style.
var faces = []struct {
	style string
	ttf   []byte
}{{"", liberationsansregular.TTF}, {"B", liberationsansbold.TTF}}

func addFonts(doc *fpdf.Fpdf) {
	for _, f := range faces {
		doc.AddUTF8FontFromBytes(family, f.style, f.ttf)
	}
}

// substitute stands where the fonts have no sign for a letter.
const substitute = '□'

// signs tells which letters every face has.
var signs = sync.OnceValue(func() func(rune) bool {
	var fonts []*sfnt.Font
	for _, f := range faces {
		font, err := sfnt.Parse(f.ttf)
		if err != nil {
			panic("report: embedded font: " + err.Error()) // the bytes are part of the program
		}
		fonts = append(fonts, font)
	}
	var mu sync.Mutex
	known := map[rune]bool{}
	return func(r rune) bool {
		mu.Lock()
		defer mu.Unlock()
		ok, seen := known[r]
		if !seen {
			ok = true
			var b sfnt.Buffer
			for _, f := range fonts {
				i, err := f.GlyphIndex(&b, r)
				ok = ok && err == nil && i != 0
			}
			known[r] = ok
		}
		return ok
	}
})

// settable reports whether a letter can be set: the fonts have it and it runs from left to
// right, as nothing here turns the order of the others.
func settable(r rune) bool {
	return r >= ' ' && r <= 0xffff && !unicode.Is(unicode.Hebrew, r) && !unicode.Is(unicode.Arabic, r) && !unicode.Is(unicode.Cc, r) && !unicode.Is(unicode.Cf, r) && signs()(r)
}

// powers are the signs of powers, in the order of their plain ones.
const powers, plainPowers = "⁻⁰¹²³⁴⁵⁶⁷⁸⁹", "−0123456789"

// spelled writes powers that the fonts have not all signs for on the line: 10⁻⁸ becomes 10^−8.
func spelled(s string) string {
	start := strings.IndexAny(s, powers)
	if start < 0 {
		return s
	}
	end := start
	for _, r := range s[start:] {
		if !strings.ContainsRune(powers, r) {
			break
		}
		end += len(string(r))
	}
	power := s[start:end]
	if strings.ContainsFunc(power, func(r rune) bool { return !settable(r) }) {
		plain := []rune(plainPowers)
		power = "^" + strings.Map(func(r rune) rune { return plain[slices.Index([]rune(powers), r)] }, power)
	}
	return s[:start] + power + spelled(s[end:])
}

// set replaces what cannot be set, so that its absence is seen.
func set(s string) string {
	s = spelled(s)
	if !strings.ContainsFunc(s, func(r rune) bool { return !settable(r) }) {
		return s
	}
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\n' || r == '\r' || r == '\t':
			return ' '
		case settable(r):
			return r
		case unicode.Is(unicode.Mn, r) || unicode.Is(unicode.Cf, r):
			return -1 // a mark on a letter, or one that only steers: nothing of its own to see
		}
		return substitute
	}, s)
}

// unset reports whether something that a user wrote cannot be set as it is.
func unset(s *study.Study) bool {
	spec := s.Project.Spec
	lost := func(text string) bool {
		plain := strings.NewReplacer("\n", " ", "\r", " ", "\t", " ").Replace(text)
		return set(plain) != plain
	}
	for _, e := range input.Walk(spec) {
		if e.Text != nil && lost(*e.Text.Value) {
			return true
		}
	}
	for _, b := range s.Variant().Basis {
		if lost(b.Note) {
			return true
		}
	}
	return false
}
