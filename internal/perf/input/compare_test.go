package input_test

import (
	"fmt"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"legwright/internal/perf/input"
	"legwright/internal/perf/units"
)

// A route is a document with all that Compare meets: lists in lists, a choice that makes inputs idle, a table.
type route struct {
	Name  string      `json:"name"`
	Kind  string      `json:"kind"`
	Speed float64     `json:"speed"` // in m/s
	Rows  [][]float64 `json:"rows"`
	Stops []stop      `json:"stops"`
	Crew  []member    `json:"crew"`
}

type stop struct {
	Name  string `json:"name"`
	Wait  wait   `json:"wait"`
	Signs []sign `json:"signs"`
}

type wait struct {
	Time float64 `json:"time"` // in s
}

type sign struct {
	Width float64 `json:"width"` // in m
}

type member struct {
	ID   string `json:"id"`
	Name string `json:"name"`
}

var (
	speedSpec = input.Spec{Name: "speed", Label: "Speed", Quantity: units.Speed, Max: 100}
	timeSpec  = input.Spec{Name: "time", Label: "Time", Quantity: units.Duration, Max: 1e6}
	widthSpec = input.Spec{Name: "width", Label: "Width", Quantity: units.Length, Max: 10}
)

func (r *route) Inputs() []input.Entry {
	return []input.Entry{input.Line("name", "Name", 80, &r.Name), input.Pick("kind", "Kind", &r.Kind, input.Option{Value: "fast"}, input.Option{Value: "slow"}),
		input.Num(&speedSpec, &r.Speed).If(r.Kind == "fast"), input.Rows(input.Table{Name: "rows", Columns: []*input.Spec{&speedSpec}}, &r.Rows)}
}
func (s *stop) Inputs() []input.Entry { return []input.Entry{input.Line("name", "Name", 80, &s.Name)} }
func (w *wait) Inputs() []input.Entry { return []input.Entry{input.Num(&timeSpec, &w.Time)} }
func (s *sign) Inputs() []input.Entry { return []input.Entry{input.Num(&widthSpec, &s.Width)} }
func (m *member) Inputs() []input.Entry {
	return []input.Entry{input.Line("id", "ID", 80, &m.ID), input.Line("name", "Name", 80, &m.Name)}
}

func stops(names string) []stop {
	var list []stop
	for i, n := range strings.Fields(names) {
		list = append(list, stop{Name: n, Wait: wait{Time: float64(n[0])}, Signs: make([]sign, i%2)})
	}
	return list
}

func said(list []input.Difference) string {
	var out []string
	for _, d := range list {
		switch d.Kind {
		case input.Changed:
			text := func(e *input.Entry) string {
				switch {
				case e == nil:
					return "–"
				case e.Number != nil:
					return fmt.Sprint(*e.Number.Value)
				case e.Table != nil:
					return fmt.Sprint(*e.Table.Value)
				case e.Choice != nil:
					return *e.Choice.Value
				}
				return *e.Text.Value
			}
			path := d.Now
			if path == "" {
				path = d.Then
			}
			out = append(out, path+" "+text(d.Before)+"→"+text(d.After))
		default:
			out = append(out, []string{"", "+", "-", "~"}[d.Kind]+d.Then+">"+d.Now)
		}
	}
	return strings.Join(out, "; ")
}

func TestCompare(t *testing.T) {
	base := func() *route {
		return &route{Name: "R", Kind: "fast", Speed: 20, Rows: [][]float64{{1}, {2}}, Stops: stops("A B C D"), Crew: []member{{"a", "Ann"}, {"b", "Ben"}}}
	}
	for _, c := range []struct {
		name   string
		change func(*route)
		want   string
	}{
		{"nothing", func(*route) {}, ""},
		{"number", func(r *route) { r.Speed = 21 }, "speed 20→21"},
		{"text and table", func(r *route) { r.Name, r.Rows = "S", [][]float64{{1}, {3}} }, "name R→S; rows [[1] [2]]→[[1] [3]]"},
		{"choice makes idle", func(r *route) { r.Kind, r.Speed = "slow", 30 }, "kind fast→slow; speed 20→–"},
		{"deep", func(r *route) { r.Stops[1].Wait.Time = 7 }, "stops[1].wait.time 66→7"},
		{"added last", func(r *route) { r.Stops = append(r.Stops, stop{Name: "E"}) }, "+>stops[4]"},
		{"added between", func(r *route) { r.Stops = slices.Insert(r.Stops, 1, stop{Name: "N"}) }, "+>stops[1]"},
		{"removed first", func(r *route) { r.Stops = r.Stops[1:] }, "-stops[0]>"},
		{"removed, next changed", func(r *route) { r.Stops = slices.Delete(r.Stops, 1, 2); r.Stops[1].Wait.Time = 1 }, "-stops[1]>; stops[1].wait.time 67→1"},
		{"renamed", func(r *route) { r.Stops[2].Name = "X" }, "stops[2].name C→X"},
		{"renamed and added elsewhere", func(r *route) { r.Stops[0].Name = "X"; r.Stops = append(r.Stops, stop{Name: "E"}) }, "stops[0].name A→X; +>stops[4]"},
		{"replaced by two", func(r *route) {
			r.Stops = slices.Concat(r.Stops[:1], stops("X Y"), r.Stops[2:])
		}, "+>stops[1]; +>stops[2]; -stops[1]>"},
		{"two replaced by one", func(r *route) { r.Stops = slices.Concat(r.Stops[:1], stops("X"), r.Stops[3:]) }, "+>stops[1]; -stops[1]>; -stops[2]>"},
		{"moved", func(r *route) { r.Stops[1], r.Stops[2] = r.Stops[2], r.Stops[1] }, "~stops[1]>stops[2]"},
		{"all gone", func(r *route) { r.Stops = nil }, "-stops[0]>; -stops[1]>; -stops[2]>; -stops[3]>"},
		{"inner list", func(r *route) { r.Stops[0].Signs = make([]sign, 2) }, "+>stops[0].signs[0]; +>stops[0].signs[1]"},
		{"an identifier is no name", func(r *route) { r.Crew[0] = member{"c", "Ann"} }, "+>crew[0]; -crew[0]>"},
		{"name of what has an identifier", func(r *route) { r.Crew[1].Name = "Bob" }, "crew[1].name Ben→Bob"},
	} {
		now := base()
		c.change(now)
		list, _ := input.Compare(base(), now)
		if got := said(list); got != c.want {
			t.Errorf("%s: %q, want %q", c.name, got, c.want)
		}
	}
	now := base()
	now.Stops = slices.Concat(stops("N"), now.Stops[1:])
	now.Stops[1], now.Stops[2] = now.Stops[2], now.Stops[1]
	_, was := input.Compare(base(), now)
	for path, want := range map[string]string{"speed": "speed", "stops[0].name": "stops[0].name", "stops[1].name": "stops[2].name", "stops[2].wait.time": "stops[1].wait.time", "stops[3].name": "stops[3].name"} {
		if was[path] != want {
			t.Errorf("%s was at %q, want %q", path, was[path], want)
		}
	}
}

// A document differs in nothing from itself, and what is added and removed accounts for the lengths; each element is told once.
func TestComparePairs(t *testing.T) {
	names := rapid.Custom(func(t *rapid.T) string {
		return strings.Join(rapid.SliceOfN(rapid.SampledFrom([]string{"A", "B", "C", "D", "E"}), 0, 7).Draw(t, "names"), " ")
	})
	rapid.Check(t, func(t *rapid.T) {
		a, b := &route{Stops: stops(names.Draw(t, "then"))}, &route{Stops: stops(names.Draw(t, "now"))}
		for _, r := range []*route{a, b} {
			if list, _ := input.Compare(r, r); len(list) > 0 {
				t.Fatalf("from itself: %s", said(list))
			}
		}
		there, _ := input.Compare(a, b)
		count := map[input.Change]int{}
		seen := map[string]bool{}
		for _, d := range there {
			if d.Kind == input.Changed || strings.Contains(d.Then+d.Now, ".") {
				continue
			}
			count[d.Kind]++
			if key := fmt.Sprint(d.Kind, d.Then, d.Now); seen[key] {
				t.Fatalf("twice: %s", said(there))
			} else {
				seen[key] = true
			}
		}
		if len(a.Stops)-count[input.Removed]+count[input.Added] != len(b.Stops) {
			t.Fatalf("%d elements, now %d: %s", len(a.Stops), len(b.Stops), said(there))
		}
		if !reflect.DeepEqual(a.Stops, b.Stops) && len(there) == 0 {
			t.Fatal("a difference is not told")
		}
	})
}
