package perf_test

import (
	"fmt"
	"go/ast"
	"path"
	"regexp"
	"slices"
	"strconv"
	"strings"
)

const (
	module       = "legwright/"
	enginePrefix = "internal/perf/"
)

// allowed says which packages of this module each package may import, those of
// the engine without their prefix. It is a statement of policy: change it in
// its own commit, with the reason.
var allowed = map[string]string{
	"internal/perf":            "",
	"internal/perf/units":      "",
	"internal/perf/numeric":    "",
	"internal/perf/input":      "units",
	"internal/perf/formula":    "units",
	"internal/perf/atmos":      "units input formula numeric",
	"internal/perf/polar":      "units input formula numeric",
	"internal/perf/dragbuild":  "units input formula atmos",
	"internal/perf/propeller":  "units input formula numeric atmos",
	"internal/perf/powerplant": "units input formula numeric atmos propeller",
	"internal/perf/loads":      "units input formula atmos",
	"internal/perf/aircraft":   "units input formula numeric atmos propeller polar dragbuild powerplant loads",
	"internal/perf/pointperf":  "units formula numeric atmos polar powerplant aircraft",
	"internal/perf/runway":     "units input formula numeric atmos polar powerplant aircraft pointperf",
	"internal/perf/envelope":   "units formula numeric atmos polar powerplant aircraft pointperf",
	"internal/perf/mission":    "units input formula numeric atmos polar powerplant aircraft pointperf runway",
	"internal/perf/sheet":      "units input",
	"internal/perf/project":    "units input atmos dragbuild powerplant loads aircraft runway mission",
	"internal/perf/study":      engine,

	"internal/perf/reference":                 "units",
	"internal/perf/formula/formulatest":       "formula",
	"internal/perf/powerplant/powerplanttest": "powerplant",
	"internal/perf/aircraft/aircrafttest":     engine + " reference",

	"internal/store": "migrations",
	"migrations":     "",
	"web/static":     "",
	"web/charts":     engine,
	"web/mathml":     "formula",
	"web/views":      engine + " web/charts web/mathml",
	"web/report":     engine + " web/charts web/views",
	"web/handlers":   engine + " web/charts web/views web/report web/static internal/store",
	"cmd/server":     "web/handlers internal/store project",

	"web/browsertest": "web/handlers internal/store project powerplant", // tests only
}

// engine is every package of the engine that the program itself may use.
const engine = "units input formula numeric atmos polar dragbuild propeller powerplant loads aircraft pointperf runway envelope mission sheet project study"

// support are the packages that only tests import; they may read files.
var support = []string{"internal/perf/reference", "internal/perf/formula/formulatest", "internal/perf/powerplant/powerplanttest", "internal/perf/aircraft/aircrafttest"}

// impure is what the engine must not import: input, output, clocks and logs.
var impure = []string{"net", "net/http", "net/url", "database/sql", "os", "os/exec", "os/signal", "io/fs", "path/filepath", "log", "log/slog", "time", "syscall", "unsafe", "embed", "flag"}

func imports(all []source) []string {
	var bad []string
	for _, s := range all {
		list, ok := allowed[s.pkg]
		if !ok {
			bad = append(bad, fmt.Sprintf("%s: %s is not in the import policy", s.file, s.pkg))
			continue
		}
		for _, spec := range s.tree.Imports {
			imp, err := strconv.Unquote(spec.Path.Value)
			if err != nil || !s.mayImport(imp, strings.Fields(list)) {
				bad = append(bad, fmt.Sprintf("%s: %s must not import %s", s.file, s.pkg, strings.TrimPrefix(imp, module)))
			}
		}
	}
	return bad
}

func (s source) mayImport(imp string, list []string) bool {
	first, _, _ := strings.Cut(imp, "/")
	if dep, ours := strings.CutPrefix(imp, module); ours {
		if s.test {
			return !s.engine() || strings.HasPrefix(dep, enginePrefix)
		}
		return slices.Contains(list, dep) || slices.Contains(list, strings.TrimPrefix(dep, enginePrefix))
	}
	switch {
	case s.test:
		return true
	case s.engine() && strings.Contains(first, "."):
		return first == "gonum.org"
	case slices.Contains(support, s.pkg):
		return !strings.HasPrefix(imp, "net") && imp != "time"
	case s.engine():
		return !slices.Contains(impure, imp)
	case s.pkg == "web/charts" || s.pkg == "web/views" || s.pkg == "web/report":
		return imp != "net/http" && imp != "database/sql"
	}
	return true
}

// hollow are package names that say nothing about what is inside.
var hollow = []string{"util", "utils", "common", "helper", "helpers", "manager", "service", "services", "types", "misc", "base", "core", "lib"}

func names(all []source) []string {
	var bad []string
	for _, s := range all {
		if slices.Contains(hollow, s.tree.Name.Name) || slices.Contains(hollow, path.Base(s.pkg)) {
			bad = append(bad, fmt.Sprintf("%s: the package name %s says nothing", s.file, s.tree.Name.Name))
		}
	}
	return bad
}

// longest is how many lines a file written by hand may have.
const longest = 500

func sizes(all []source) []string {
	var bad []string
	for _, s := range all {
		if s.lines > longest && !s.generated {
			bad = append(bad, fmt.Sprintf("%s has %d lines, at most %d", s.file, s.lines, longest))
		}
	}
	return bad
}

// converters may turn written numbers into SI and back.
var converters = append([]string{"internal/perf/units", "internal/perf/input", "web/views", "web/charts", "web/report", "web/handlers"}, support...)

func conversions(all []source) []string {
	var bad []string
	for _, s := range all {
		if s.test || slices.Contains(converters, s.pkg) {
			continue
		}
		ast.Inspect(s.tree, func(n ast.Node) bool {
			if sel, ok := n.(*ast.SelectorExpr); ok && (sel.Sel.Name == "ToSI" || sel.Sel.Name == "FromSI") {
				bad = append(bad, fmt.Sprintf("%s calls %s: convert where text is read or written", s.at(sel.Pos()), sel.Sel.Name))
			}
			return true
		})
	}
	return bad
}

var (
	stated = regexp.MustCompile(`\b(in (m|m²|m³|m/s|m/s²|kg|kg/s|kg/m³|kg/J|N|W|J|Pa|Pa·s|K|K/m|s|rad|rad/s|rev/s|m/kg|J/kg|J/\(kg·K\)|kg/\(N·s\)|SI|1/s)($|[^A-Za-z/·²³])` +
		`|dimensionless|0 to \d|Mach number|SI unit|SI value|unit of|in the unit)`)
	bracketed = regexp.MustCompile(`\[(m|kg|N|W|J|Pa|K|s|rad|rev)(/[a-z³²]+)?\]`)
)

func unitsStated(all []source) []string {
	var bad []string
	for _, s := range all {
		if s.test || !s.engine() {
			continue
		}
		ast.Inspect(s.tree, func(n ast.Node) bool {
			st, ok := n.(*ast.StructType)
			if !ok {
				return true
			}
			for _, f := range st.Fields.List {
				if id, ok := f.Type.(*ast.Ident); !ok || id.Name != "float64" || len(f.Names) == 0 || !f.Names[0].IsExported() {
					continue
				}
				switch doc := f.Doc.Text() + f.Comment.Text(); {
				case bracketed.MatchString(doc):
					bad = append(bad, fmt.Sprintf("%s: %s: no square brackets around a unit, go doc makes links of them", s.at(f.Pos()), f.Names[0].Name))
				case !stated.MatchString(doc):
					bad = append(bad, fmt.Sprintf("%s: %s: state the unit in words", s.at(f.Pos()), f.Names[0].Name))
				}
			}
			return true
		})
	}
	return bad
}

// makers are the calls that may make a package-level variable: what they return does not change.
var makers = []string{"formula.Must", "errors.New", "regexp.MustCompile", "strings.NewReplacer", "sync.OnceValue", "sync.OnceValues", "fmt.Errorf", "slices.Concat"}

// computed are package-level values that no constant expression or literal can give.
var computed = []string{"internal/perf/atmos.SeaLevelSoundSpeed", "internal/perf/atmos.layers"}

// variables allows tables, sentinel errors and formulas at package level, and nothing that changes.
func variables(all []source) []string {
	var bad []string
	level := map[string]bool{}
	for _, s := range all {
		if s.test || !s.engine() {
			continue
		}
		for _, d := range s.tree.Decls {
			if f, ok := d.(*ast.FuncDecl); ok && f.Recv == nil && f.Name.Name == "init" {
				bad = append(bad, fmt.Sprintf("%s: no init functions", s.at(f.Pos())))
			}
			bad = append(bad, s.declared(d, level)...)
		}
	}
	for _, s := range all {
		if !s.test && s.engine() {
			bad = append(bad, s.assigned(level)...)
		}
	}
	return bad
}

// declared checks the variables that d declares and notes them in level.
func (s source) declared(d ast.Decl, level map[string]bool) []string {
	gen, ok := d.(*ast.GenDecl)
	if !ok || gen.Tok.String() != "var" {
		return nil
	}
	var bad []string
	for _, sp := range gen.Specs {
		v := sp.(*ast.ValueSpec)
		for i, name := range v.Names {
			if name.Name == "_" {
				continue
			}
			key := s.pkg + "." + name.Name
			level[key] = true
			switch {
			case i >= len(v.Values):
				bad = append(bad, fmt.Sprintf("%s: %s has no value, so something must change it", s.at(name.Pos()), name.Name))
			case !constant(v.Values[i]) && !slices.Contains(computed, key):
				bad = append(bad, fmt.Sprintf("%s: %s is neither a table, a sentinel error nor a formula", s.at(name.Pos()), name.Name))
			}
		}
	}
	return bad
}

// constant reports whether e is a literal table or one of makers.
func constant(e ast.Expr) bool {
	switch e := e.(type) {
	case *ast.CompositeLit:
		return true
	case *ast.UnaryExpr:
		return constant(e.X)
	case *ast.CallExpr:
		if sel, ok := e.Fun.(*ast.SelectorExpr); ok {
			if x, ok := sel.X.(*ast.Ident); ok {
				return slices.Contains(makers, x.Name+"."+sel.Sel.Name)
			}
		}
	}
	return false
}

// assigned reports assignments to variables in level.
func (s source) assigned(level map[string]bool) []string {
	var bad []string
	check := func(e ast.Expr) {
		id := root(e)
		// An identifier resolved in its function is local.
		if id == nil || !level[s.pkg+"."+id.Name] || (id.Obj != nil && id.Obj != s.tree.Scope.Lookup(id.Name)) {
			return
		}
		bad = append(bad, fmt.Sprintf("%s assigns the package-level %s", s.at(id.Pos()), id.Name))
	}
	ast.Inspect(s.tree, func(n ast.Node) bool {
		switch n := n.(type) {
		case *ast.AssignStmt:
			if n.Tok.String() != ":=" {
				for _, e := range n.Lhs {
					check(e)
				}
			}
		case *ast.IncDecStmt:
			check(n.X)
		}
		return true
	})
	return bad
}

// root is the variable that the assignable expression e reaches into.
func root(e ast.Expr) *ast.Ident {
	for {
		switch x := e.(type) {
		case *ast.Ident:
			return x
		case *ast.SelectorExpr:
			e = x.X
		case *ast.IndexExpr:
			e = x.X
		case *ast.StarExpr:
			e = x.X
		case *ast.ParenExpr:
			e = x.X
		default:
			return nil
		}
	}
}

// goroutines lets only the sweeps of envelope run side by side.
func goroutines(all []source) []string {
	var bad []string
	for _, s := range all {
		if s.test || !s.engine() || s.pkg == "internal/perf/envelope" || slices.Contains(support, s.pkg) {
			continue
		}
		ast.Inspect(s.tree, func(n ast.Node) bool {
			if g, ok := n.(*ast.GoStmt); ok {
				bad = append(bad, fmt.Sprintf("%s starts a goroutine", s.at(g.Pos())))
			}
			return true
		})
	}
	return bad
}
