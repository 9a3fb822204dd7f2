package report

import (
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"reflect"
	"slices"
	"strconv"
	"strings"
	"testing"

	"golang.org/x/image/font/sfnt"
)

// TestSigns: every letter in a text of the program that a report can hold is in every font of the
// report. It looks at all literals of the packages that word what is reported.
func TestSigns(t *testing.T) {
	signs := map[rune]string{substitute: "substitute"}
	for _, dir := range []string{"../../internal/perf", "../views", "../charts", "."} {
		err := filepath.WalkDir(dir, func(path string, d fs.DirEntry, err error) error {
			if err != nil || d.IsDir() || !strings.HasSuffix(path, ".go") || strings.HasSuffix(path, "_test.go") {
				return err
			}
			f, err := parser.ParseFile(token.NewFileSet(), path, nil, 0)
			if err != nil {
				return err
			}
			ast.Inspect(f, func(n ast.Node) bool {
				if l, ok := n.(*ast.BasicLit); ok && (l.Kind == token.STRING || l.Kind == token.CHAR) {
					if s, err := strconv.Unquote(l.Value); err == nil {
						for _, r := range s {
							if _, known := signs[r]; !known {
								signs[r] = path + ": " + l.Value
							}
						}
					}
				}
				return true
			})
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
	}
	if len(signs) < 120 {
		t.Errorf("only %d signs found", len(signs))
	}
	// What only steers, and what fields of files are looked through for.
	skip := "\n\r\t\ufeff＝＋－＠"
	for _, face := range faces {
		font, err := sfnt.Parse(face.ttf)
		if err != nil {
			t.Fatal(err)
		}
		var b sfnt.Buffer
		for r, where := range signs {
			if strings.ContainsRune(powers, r) || r < ' ' || r == 0xfffd || r > 0xfff0 || strings.ContainsRune(skip, r) {
				continue
			}
			if i, err := font.GlyphIndex(&b, r); err != nil || i == 0 {
				t.Errorf("face %q has no %q (%U), as in %s", face.style, r, r, where)
			}
			if set(string(r)) != string(r) {
				t.Errorf("%q is replaced although the fonts have it", r)
			}
		}
	}
}

func TestSet(t *testing.T) {
	for in, want := range map[string]string{"plain 12 m²": "plain 12 m²", "3×10⁹": "3×10^9", "8.2×10⁻⁸ kg, 3 m⁻¹": "8.2×10^−8 kg, 3 m^−1", "高度": "□□", "a\nb": "a b", "שלום": "□□□□", "e\u0301\u200b": "e", "\U0001f6e9": "□"} {
		if got := set(in); got != want && !(in == "e\u0301\u200b" && got == "e\u0301") {
			t.Errorf("%q is set as %q, want %q", in, got, want)
		}
	}
}

func TestSpread(t *testing.T) {
	const n = 1000
	var seen [n]int
	spread(n, func(i int) { seen[i]++ })
	for i, times := range seen {
		if times != 1 {
			t.Fatalf("%d was done %d times", i, times)
		}
	}
	spread(0, func(int) { t.Error("nothing to do") })
	defer func() {
		if recover() != "broken" {
			t.Error("a panic was lost")
		}
	}()
	spread(3, func(i int) {
		if i == 1 {
			panic("broken")
		}
	})
}

func TestWhole(t *testing.T) {
	for in, want := range map[string]string{"0.0\u00a0°C": "0\u00a0°C", "650.0\u00a0kg": "650\u00a0kg", "612.4\u00a0kg": "612.4\u00a0kg", "0.050": "0.050", "10": "10", "1.0": "1", "720.0000\u00a0kg/m³": "720\u00a0kg/m³"} {
		if got := whole(in); got != want {
			t.Errorf("%q becomes %q, want %q", in, got, want)
		}
	}
}

func TestPlain(t *testing.T) {
	for v, want := range map[float64]string{0: "0", -53.5: "-53.5", 1e-9: "1e-09", 123456789: "123456789", 0.1: "0.1", -2e20: "-2e+20"} {
		if got := plain(v); got != want {
			t.Errorf("%v is written %s, want %s", v, got, want)
		}
	}
}

// TestWide: a grid has each number of its cell, also where two of them read alike.
func TestWide(t *testing.T) {
	t1 := Table{Columns: []Column{words("Load"), words("Down"), words("Over"), pure("A", 1), pure("B", 1)}, Group: []int{0}, Across: &Across{Down: 1, Over: 2, Values: []int{3, 4}}}
	row := func(group, down, over string, a, b Cell) {
		t1.Rows = append(t1.Rows, []Cell{say(group), say(down), say(over), a, b})
	}
	row("g", "1", "x", value(9.1), value(9.1))
	row("g", "1", "y", Cell{word: "no climb", why: "Because of 5."}, Cell{word: "no climb"})
	row("g", "2", "y", Cell{word: "no climb", why: "Because of 7."}, Cell{word: "no climb"})
	row("h", "1", "x", value(1), value(2))
	g := t1.printed("metric")
	want := []gridGroup{{"g", [][]string{{"1", "9.1 / 9.1", "no climb"}, {"2", "", "no climb"}}}, {"h", [][]string{{"1", "1.0 / 2.0", ""}}}}
	if !reflect.DeepEqual(g.groups, want) || !slices.Equal(g.heads, []string{"Down", "x", "y"}) {
		t.Errorf("%q under %q", g.groups, g.heads)
	}
	if !slices.Equal(g.whys, []string{"no climb: Because of 5."}) || !g.more {
		t.Errorf("reasons %q, more %v", g.whys, g.more)
	}
}
