package project

import (
	"fmt"
	"reflect"
	"slices"
	"strings"

	"legwright/internal/perf/input"
)

// rules says when the inputs of one struct matter.
type rules struct {
	always map[string]input.Entry // by name: the same whatever the choices
	idle   map[string]bool        // by name: under some choices it does not matter
	when   []condition
}

// A condition holds when each of its choices has one of the values listed; entries matter then.
type condition struct {
	choices []axis
	entries []input.Entry
}

// An axis is a choice of the struct with values that it can take.
type axis struct {
	name   string
	values []string
}

func (c condition) shape() *shape {
	s := &shape{}
	for _, a := range c.choices {
		s.Properties = append(s.Properties, property{a.name, &shape{Enum: a.values}})
		s.Required = append(s.Required, a.name)
	}
	return s
}

// concerns reports whether c decides about the input of that name.
func (c condition) concerns(name string) bool {
	return slices.ContainsFunc(c.entries, func(e input.Entry) bool { return e.Path == name })
}

// holds reports whether o's choices are those of c.
func (c condition) holds(o object) bool {
	for _, a := range c.choices {
		if !slices.Contains(a.values, o.value.Field(o.node.field(a.name).index).String()) {
			return false
		}
	}
	return true
}

// conditions finds by trial of every combination of choices which inputs of
// type t matter when: the Inputs methods are the only place where that is written.
func conditions(t reflect.Type) rules {
	r := rules{always: map[string]input.Entry{}, idle: map[string]bool{}}
	d, ok := reflect.New(t).Interface().(input.Described)
	if !ok {
		return r
	}
	axes := discover(d)
	seen := map[string][]input.Entry{}
	for c := range combinations(d, axes) {
		for _, e := range c {
			seen[e.Path] = append(seen[e.Path], e)
			r.idle[e.Path] = r.idle[e.Path] || e.Idle
		}
	}
	groups := map[string]int{}
	for _, e := range d.Inputs() {
		for _, b := range split(axes, seen[e.Path]) {
			if len(b.choices) == 0 {
				r.always[e.Path] = b.entries[0]
				continue
			}
			key := fmt.Sprint(b.choices)
			if _, ok := groups[key]; !ok {
				groups[key] = len(r.when)
				r.when = append(r.when, condition{choices: b.choices})
			}
			g := &r.when[groups[key]]
			g.entries = append(g.entries, b.entries...)
		}
	}
	return r
}

// discover lists d's choices with every option that any state of the others offers,
// less those on which nothing depends: the combinations multiply.
func discover(d input.Described) []axis {
	var axes []axis
	for grown := true; grown; {
		grown = false
		for c := range combinations(d, axes) {
			for _, e := range c {
				if e.Choice != nil && !e.Lone && extend(&axes, e.Path, values(e.Choice.Options)) {
					grown = true
				}
			}
		}
	}
	return axes
}

func extend(axes *[]axis, name string, options []string) (grown bool) {
	i := slices.IndexFunc(*axes, func(a axis) bool { return a.name == name })
	if i < 0 {
		i = len(*axes)
		*axes = append(*axes, axis{name: name})
	}
	a := &(*axes)[i]
	for _, o := range options {
		if !slices.Contains(a.values, o) {
			a.values = append(a.values, o)
			grown = true
		}
	}
	return grown
}

// combinations yields d's inputs under every combination of the choices, the last axis running fastest.
func combinations(d input.Described, axes []axis) func(yield func([]input.Entry) bool) {
	axes = slices.Clone(axes)
	return func(yield func([]input.Entry) bool) {
		count := 1
		for _, a := range axes {
			count *= len(a.values)
		}
		variables := map[string]*string{}
		for _, e := range d.Inputs() {
			if e.Choice != nil {
				variables[e.Path] = e.Choice.Value
			}
		}
		for k := range count {
			rest := k
			for i := len(axes) - 1; i >= 0; i-- {
				n := len(axes[i].values)
				*variables[axes[i].name] = axes[i].values[rest%n]
				rest /= n
			}
			if !yield(d.Inputs()) {
				return
			}
		}
	}
}

// split divides the combinations, in each of which one input is as states says,
// into as few boxes as the order of the axes allows, and returns those in which it matters.
func split(axes []axis, states []input.Entry) []condition {
	if first := signature(states[:1]); !slices.ContainsFunc(states, func(e input.Entry) bool { return signature([]input.Entry{e}) != first }) {
		if states[0].Idle {
			return nil
		}
		return []condition{{entries: states[:1]}}
	}
	stride := len(states) / len(axes[0].values)
	var order []string
	alike := map[string][]int{}
	for i := range axes[0].values {
		s := signature(states[i*stride : (i+1)*stride])
		if alike[s] == nil {
			order = append(order, s)
		}
		alike[s] = append(alike[s], i)
	}
	var boxes []condition
	for _, s := range order {
		at := alike[s][0] * stride
		for _, b := range split(axes[1:], states[at:at+stride]) {
			if len(order) > 1 {
				side := axis{name: axes[0].name}
				for _, i := range alike[s] {
					side.values = append(side.values, axes[0].values[i])
				}
				b.choices = append([]axis{side}, b.choices...)
			}
			boxes = append(boxes, b)
		}
	}
	return boxes
}

// signature tells states of one input apart by what the schema says of them.
func signature(states []input.Entry) string {
	var b strings.Builder
	for _, e := range states {
		switch {
		case e.Idle:
			b.WriteString("-")
		case e.Number != nil:
			fmt.Fprint(&b, e.Number.Quantity, e.Number.Min, e.Number.Max)
		case e.Choice != nil:
			b.WriteString(strings.Join(values(e.Choice.Options), ","))
		default:
			b.WriteString("+")
		}
		b.WriteByte(';')
	}
	return b.String()
}
