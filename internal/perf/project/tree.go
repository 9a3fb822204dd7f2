package project

import (
	"fmt"
	"reflect"
	"strings"
	"sync"

	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
	"legwright/internal/perf/units"
)

// MaxBytes is how much JSON text a document may have.
const MaxBytes = 4 << 20

// Further limits on a document, so that reading one takes bounded time and memory.
const (
	maxDepth = 32    // of arrays and objects in each other
	maxItems = 10000 // of an array or object that has no limit of its own
)

// A size is how many items a list has, both inclusive.
type size struct{ least, most int }

// sizes are the limits of the document's lists, by path without indices.
var sizes = map[string]size{
	"strips":                                {1, 50},
	"legs":                                  {0, 200},
	"requirements":                          {0, 100},
	"variants":                              {1, 24},
	"variants.aircraft.weights.items":       {0, 200},
	"variants.aircraft.airframe.components": {0, 100},
}

// fixed describes the leaves that are no inputs, and those whose unit depends on a choice, by path without indices.
var fixed = map[string]*shape{
	"format":              {Type: "integer", Title: "Format", Description: "Number of the document format.", Const: Format},
	"units":               {Type: "string", Title: "Units", Description: "Every number in the document is in SI.", Const: "SI"},
	"requirements.limit":  {Type: "number", Title: "Limit", Description: "In the SI unit of the figure."},
	"variants.basis.kind": {Type: "string", Title: "Basis", Enum: values(BasisKinds)},
	"variants.basis.note": {Type: "string", Title: "Note"},
	"variants.basis.plus_minus": {Type: "number", Title: "Plus or minus", Description: "Half width of the stated band, in the SI unit of the input; 0 when not stated.",
		Minimum: new(float64(0)), ExclusiveMaximum: new(1e12)},
	"basis.kind": {Type: "string", Title: "Basis", Enum: values(BasisKinds)},
	"basis.note": {Type: "string", Title: "Note"},
	"basis.plus_minus": {Type: "number", Title: "Plus or minus", Description: "Half width of the stated band, in the SI unit of the input; 0 when not stated.",
		Minimum: new(float64(0)), ExclusiveMaximum: new(1e12)},
}

// A form is what a node of the document looks like in JSON.
type form int

const (
	anObject form = iota
	aList         // of objects
	aTable        // of rows of numbers
	aMap          // of objects, by keys of the user's
	aPlant        // {"kind": …, "values": …}
	aNumber
	anInteger
	aText
)

// A node is one place in every document: what stands there and what is accepted.
// The same tree reads documents and writes their JSON schema.
type node struct {
	form     form
	name     string       // JSON key; of a powerplant's values, the kind
	typ      reflect.Type // of the Go value that holds it
	index    int          // of the field in its struct
	optional bool         // may be missing whatever the choices are
	adopted  string       // JSON value of a field that an older document does not have; empty for the first format's fields
	entry    input.Entry  // describes a leaf that is an input, under a zero value's choices
	fixed    *shape       // describes a leaf by its place; it goes before entry
	fields   []*node      // of an object, in order
	rules    func() rules // of an object; found on first use
	item     *node        // of a list or map
	kinds    []*node      // the values of each kind of powerplant
	size     size         // of a list, table or map
}

// document is the tree of Spec.
var document = sync.OnceValue(func() *node { return grow(reflect.TypeFor[Spec](), "") })

// grow builds the node of type t; path is where it stands, without indices.
func grow(t reflect.Type, path string) *node {
	n := &node{typ: t}
	switch {
	case t == reflect.TypeFor[powerplant.Spec]():
		n.form = aPlant
		for _, k := range powerplant.Kinds {
			v := grow(reflect.TypeOf(k.New()).Elem(), path+".values")
			v.name = k.Name
			n.kinds = append(n.kinds, v)
		}
	case t == reflect.TypeFor[[][]float64]():
		n.form, n.size = aTable, size{0, maxItems}
	case t.Kind() == reflect.Struct:
		n.form = anObject
		n.rules = sync.OnceValue(func() rules { return conditions(t) })
		n.growFields(path)
	case t.Kind() == reflect.Slice:
		n.form, n.item, n.size = aList, grow(t.Elem(), path), size{0, maxItems}
		if s, ok := sizes[path]; ok {
			n.size = s
		}
	case t.Kind() == reflect.Map:
		n.form, n.item, n.size = aMap, grow(t.Elem(), path), size{0, maxItems}
	case t.Kind() == reflect.Float64:
		n.form = aNumber
	case t.Kind() == reflect.Int:
		n.form = anInteger
	case t.Kind() == reflect.String:
		n.form = aText
	default:
		panic("project: no JSON form for " + path + " of type " + t.String())
	}
	return n
}

func (n *node) growFields(path string) {
	entries := map[string]input.Entry{}
	if d, ok := reflect.New(n.typ).Interface().(input.Described); ok {
		for _, e := range d.Inputs() {
			entries[e.Path] = e
		}
	}
	for i := range n.typ.NumField() {
		name := input.JSONName(n.typ.Field(i))
		if name == "" {
			continue
		}
		where := strings.TrimPrefix(path+"."+name, ".")
		f := grow(n.typ.Field(i).Type, where)
		f.name, f.index = name, i
		f.optional = name == "note" || name == "basis" || name == "clause"
		f.entry, f.fixed, f.adopted = entries[name], fixed[where], added[where]
		n.fields = append(n.fields, f)
	}
}

// field finds an object's field by its JSON key.
func (n *node) field(name string) *node {
	for _, f := range n.fields {
		if f.name == name {
			return f
		}
	}
	return nil
}

// described reports whether an input describes n.
func (n *node) described() bool {
	e := n.entry
	return e.Number != nil || e.Table != nil || e.Choice != nil || e.Text != nil
}

// accepts says in words what stands at n.
func (n *node) accepts() string {
	e := n.entry
	if n.fixed != nil && n.fixed.Const != nil {
		return fmt.Sprint(n.fixed.Const)
	}
	switch n.form {
	case anObject, aMap:
		return "an object"
	case aPlant:
		return "an object of kind and values"
	case aList:
		return "a list of objects"
	case aTable:
		if e.Table == nil {
			return "a list of rows of numbers"
		}
		return "a list of rows of " + columns(e.Table)
	case anInteger:
		return "a whole number"
	case aNumber:
		if e.Number == nil || n.fixed != nil {
			return "a number"
		}
		return "a number, " + e.Number.Accepted(units.Unit{Symbol: e.Number.Quantity.SI(), Scale: 1})
	}
	switch {
	case e.Choice != nil:
		return "text, one of " + strings.Join(values(e.Choice.Options), ", ")
	case e.Text != nil:
		return fmt.Sprintf("text of up to %d characters", e.Text.Max)
	case n.fixed != nil && n.fixed.Enum != nil:
		return "text, one of " + strings.Join(n.fixed.Enum, ", ")
	}
	return "text"
}

func values(options []input.Option) []string {
	list := make([]string, len(options))
	for i, o := range options {
		list[i] = o.Value
	}
	return list
}

// columns names a table's columns in order.
func columns(t *input.Table) string {
	names := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		names[i] = c.Name
	}
	return strings.Join(names, ", ")
}
