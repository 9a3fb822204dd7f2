package reference

import (
	"fmt"
	"math"
	"os"
	"strings"
	"testing"
)

const sample = `# title: A title
# source: A source
# status: computed by hand
# tolerance speed: 0.5; printed to 1 kt
# tolerance ratio: 1e-3 relative; printed to three digits
altitude:ft,speed:kt,ratio,note
1000,100,0.500,
2000,110±2,,read from a chart
`

// A recorder stands in for a test and keeps what is reported.
type recorder struct {
	testing.TB
	said []string
}

func (r *recorder) Helper() {}
func (r *recorder) Errorf(format string, a ...any) {
	r.said = append(r.said, fmt.Sprintf(format, a...))
}
func (r *recorder) Fatalf(format string, a ...any) { panic(fmt.Sprintf(format, a...)) }

func rows(t *testing.T, r *recorder) []Row {
	f, err := parse(sample)
	if err != nil {
		t.Fatal(err)
	}
	f.name = "sample"
	return []Row{{r, f, f.lines[0], f.rows[0]}, {r, f, f.lines[1], f.rows[1]}}
}

func TestNear(t *testing.T) {
	const knot = 1852.0 / 3600
	for _, c := range []struct {
		row    int
		column string
		got    float64
		ok     bool
	}{
		{0, "speed", 100.49 * knot, true}, {0, "speed", 100.51 * knot, false}, {0, "speed", math.NaN(), false},
		{0, "ratio", 0.50049, true}, {0, "ratio", 0.50051, false},
		{1, "speed", 111.9 * knot, true}, {1, "speed", 112.1 * knot, false},
	} {
		r := &recorder{}
		rows(t, r)[c.row].Near(c.column, c.got)
		if ok := len(r.said) == 0; ok != c.ok {
			t.Errorf("row %d, %s, %g: accepted %v, want %v (%v)", c.row, c.column, c.got, ok, c.ok, r.said)
		}
	}
}

func TestCells(t *testing.T) {
	row := rows(t, &recorder{})[1]
	if got := row.SI("altitude"); math.Abs(got-609.6) > 1e-9 {
		t.Errorf("2000 ft read as %v m", got)
	}
	if row.Num("speed") != 110 || row.Has("ratio") || row.Text("note") != "read from a chart" {
		t.Errorf("read %s", row)
	}
	for name, use := range map[string]func(){
		"no column":    func() { row.Num("mass") },
		"invalid":      func() { row.Num("ratio") },
		"no tolerance": func() { row.Near("altitude", 1) },
	} {
		func() {
			defer func() {
				if said := fmt.Sprint(recover()); !strings.Contains(said, name) || !strings.Contains(said, "sample.csv:8") {
					t.Errorf("%s: said %q", name, said)
				}
			}()
			use()
		}()
	}
}

func TestIncompleteFilesAreRefused(t *testing.T) {
	for _, c := range []struct{ from, to, want string }{
		{"# title: A title\n", "", "title"},
		{"# source: A source\n", "", "source"},
		{"computed by hand", "somehow", "status"},
		{"; printed to 1 kt", "", "tolerance is written"},
		{"speed: 0.5", "speed: 0.0", "positive"},
		{"tolerance speed", "tolerance sped", "unknown column"},
		{":kt", ":knots per hour", "unknown unit"},
		{"2000,", "2000,,", "5 cells for 4 columns"},
		{"# status", "# standing", "unknown header"},
		{"1000,100,0.500,\n2000,110±2,,read from a chart\n", "", "no rows"},
	} {
		text := strings.Replace(sample, c.from, c.to, 1)
		if _, err := parse(text); text == sample || err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%q → %q: %v, want %q", c.from, c.to, err, c.want)
		}
	}
}

// TestFiles reads every reference file, also one that no test uses yet.
func TestFiles(t *testing.T) {
	list, err := os.ReadDir(Folder(t))
	if err != nil {
		t.Fatal(err)
	}
	files := 0
	for _, e := range list {
		if name, ok := strings.CutSuffix(e.Name(), ".csv"); ok {
			files++
			Read(t, name)
		}
	}
	if files == 0 {
		t.Fatal("no reference files")
	}
}
