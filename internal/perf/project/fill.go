package project

import (
	"fmt"
	"math"
	"reflect"
	"slices"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
)

// value reads the value v of the document, standing at path and described by n, into dst.
func (d *decoder) value(n *node, dst reflect.Value, path string, v span) {
	d.places[path] = v.start
	if !n.opens(d.text.first(v)) {
		d.fail(&input.Error{Path: path, Text: d.text.clip(v), Accepts: n.accepts(), Err: input.ErrType})
		return
	}
	switch n.form {
	case anObject:
		d.object(n, dst, path, v)
	case aList:
		d.list(n, dst, path, v)
	case aTable:
		d.table(n, dst, path, v)
	case aMap:
		d.dictionary(n, dst, path, v)
	case aPlant:
		d.plant(n, dst, path, v)
	case aNumber:
		if x, ok := d.number(path, n.accepts(), v); ok {
			dst.SetFloat(x)
		}
	case anInteger:
		x, ok := d.number(path, n.accepts(), v)
		if ok && (x != math.Trunc(x) || math.Abs(x) > 1<<53) {
			d.fail(&input.Error{Path: path, Text: d.text.clip(v), Accepts: n.accepts(), Err: input.ErrType})
		} else if ok {
			dst.SetInt(int64(x))
		}
	case aText:
		s, ok := d.text.str(v)
		if !ok {
			d.fail(&input.Error{Path: path, Text: d.text.clip(v), Accepts: "text without broken escapes", Err: input.ErrType})
			return
		}
		dst.SetString(s)
	}
}

// opens reports whether a JSON value that begins with b has n's form.
func (n *node) opens(b byte) bool {
	switch n.form {
	case aList, aTable:
		return b == '['
	case aNumber, anInteger:
		return numeric(b)
	case aText:
		return b == '"'
	}
	return b == '{'
}

func numeric(b byte) bool { return b == '-' || b >= '0' && b <= '9' }

// members lists the members of the object v, each key once; duplicates and too many of them are errors.
func (d *decoder) members(path string, v span) []member {
	list, more := d.text.members(v, maxItems)
	if more {
		d.note(&input.Error{Path: path, Text: fmt.Sprintf("more than %d fields", maxItems), Accepts: fmt.Sprintf("at most %d fields", maxItems), Err: input.ErrRange})
	}
	seen := make(map[string]bool, len(list))
	once := list[:0]
	for _, m := range list {
		switch {
		case !m.sound:
			d.note(&input.Error{Path: path, Text: d.text.clip(m.span), Accepts: "a key without broken escapes", Err: input.ErrType})
			continue
		case seen[m.key]:
			d.note(&input.Error{Path: under(path, m.key), Text: m.key, Accepts: "each field once", Err: input.ErrDuplicate})
			continue
		}
		seen[m.key] = true
		once = append(once, m)
	}
	return once
}

func (d *decoder) object(n *node, dst reflect.Value, path string, v span) {
	d.objects = append(d.objects, object{path, n, dst})
	found := map[string]bool{}
	for _, m := range d.members(path, v) {
		where := under(path, m.key)
		f := n.field(m.key)
		if f == nil {
			d.unknown(where, m, n.names())
			continue
		}
		found[m.key] = true
		d.value(f, dst.Field(f.index), where, m.span)
	}
	for _, f := range n.fields {
		if !found[f.name] && !f.optional && !d.adopt(f, dst.Field(f.index)) {
			d.missing = append(d.missing, missing{under(path, f.name), f})
		}
	}
}

func (n *node) names() []string {
	list := make([]string, len(n.fields))
	for i, f := range n.fields {
		list[i] = f.name
	}
	return list
}

func (d *decoder) unknown(path string, m member, known []string) {
	d.places[path] = m.start
	d.note(&input.Error{Path: path, Text: m.key, Accepts: nearest(m.key, known), Err: input.ErrUnknown})
}

// items lists the items of the array v, as many as size allows.
func (d *decoder) items(path string, v span, s size) []span {
	list, more := d.text.items(v, s.most)
	if more {
		d.note(&input.Error{Path: path, Text: fmt.Sprintf("more than %d items", s.most), Accepts: fmt.Sprintf("at most %d items", s.most), Err: input.ErrRange})
	}
	return list
}

func (d *decoder) list(n *node, dst reflect.Value, path string, v span) {
	items := d.items(path, v, n.size)
	dst.Set(reflect.MakeSlice(n.typ, len(items), len(items)))
	for i, item := range items {
		d.value(n.item, dst.Index(i), at(path, i), item)
	}
}

func (d *decoder) table(n *node, dst reflect.Value, path string, v span) {
	items := d.items(path, v, n.size)
	rows := make([][]float64, len(items))
	for i, item := range items {
		if d.text.first(item) != '[' {
			d.fail(&input.Error{Path: at(path, i), Text: d.text.clip(item), Accepts: "a row of numbers", Err: input.ErrType})
			continue
		}
		cells := d.items(at(path, i), item, n.size)
		rows[i] = make([]float64, len(cells))
		for j, cell := range cells {
			rows[i][j] = d.cell(n, path, i, j, cell)
		}
	}
	dst.Set(reflect.ValueOf(rows))
}

// cell reads the number v in row i and column j of the table at path.
func (d *decoder) cell(n *node, path string, i, j int, v span) float64 {
	b := d.text.first(v)
	if x, ok := d.text.number(v); ok && numeric(b) {
		return x
	}
	where := at(at(path, i), j)
	if t := n.entry.Table; t != nil && j < len(t.Columns) {
		where = at(path, i) + "." + t.Columns[j].Name
	}
	if numeric(b) {
		d.number(where, "a number", v)
		return 0
	}
	d.fail(&input.Error{Path: where, Text: d.text.clip(v), Accepts: "a number", Err: input.ErrType})
	return 0
}

func (d *decoder) dictionary(n *node, dst reflect.Value, path string, v span) {
	members := d.members(path, v)
	dst.Set(reflect.MakeMapWithSize(n.typ, len(members)))
	for _, m := range members {
		item := reflect.New(n.typ.Elem()).Elem()
		// The keys are paths themselves, so they are not quoted.
		d.value(n.item, item, path+"."+m.key, m.span)
		dst.SetMapIndex(reflect.ValueOf(m.key), item)
	}
}

// plant reads {"kind": …, "values": …}, in either order. The values of an unknown kind are not looked at.
func (d *decoder) plant(n *node, dst reflect.Value, path string, v span) {
	found := map[string]span{}
	for _, m := range d.members(path, v) {
		if m.key != "kind" && m.key != "values" {
			d.unknown(under(path, m.key), m, []string{"kind", "values"})
			continue
		}
		found[m.key] = m.span
	}
	values, given := found["values"]
	if !given {
		d.fail(&input.Error{Path: path + ".values", Accepts: "an object", Err: input.ErrRequired})
	}
	names := make([]string, len(n.kinds))
	for i, k := range n.kinds {
		names[i] = k.name
	}
	named, ok := found["kind"]
	if !ok {
		d.fail(&input.Error{Path: path + ".kind", Accepts: strings.Join(names, ", "), Err: input.ErrRequired})
		return
	}
	spec := powerplant.Spec{}
	d.value(&node{form: aText, fixed: &shape{Enum: names}}, reflect.ValueOf(&spec.Kind).Elem(), path+".kind", named)
	i := slices.Index(names, spec.Kind)
	switch {
	case d.failed[path+".kind"]:
	case i < 0:
		d.fail(&input.Error{Path: path + ".kind", Text: spec.Kind, Accepts: nearest(spec.Kind, names), Err: input.ErrChoice})
	case given:
		model := reflect.New(n.kinds[i].typ)
		d.value(n.kinds[i], model.Elem(), path+".values", values)
		spec.Model = model.Interface().(powerplant.Model)
		dst.Set(reflect.ValueOf(spec))
	}
}

// number reads the number v at path.
func (d *decoder) number(path, accepts string, v span) (float64, bool) {
	x, ok := d.text.number(v)
	if !ok {
		d.fail(&input.Error{Path: path, Text: d.text.clip(v), Accepts: accepts, Err: input.ErrRange})
	}
	return x, ok
}
