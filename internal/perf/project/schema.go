package project

import (
	"bytes"
	"encoding/json"
	"fmt"
	"strings"
	"sync"

	"legwright/internal/perf/input"
)

// Schema is the JSON Schema (draft 2020-12) of project documents. It states
// everything that Decode asks of one value or of one part's choices; what must
// agree between parts, such as a leg's strip with the list of strips, is left to Decode.
func Schema() ([]byte, error) {
	text, err := schema()
	return bytes.Clone(text), err
}

var schema = sync.OnceValues(func() ([]byte, error) {
	s := document().shape()
	s.Schema = "https://json-schema.org/draft/2020-12/schema"
	s.Title = "Legwright project"
	s.Description = "One problem of flight performance: mission, day, strips, requirements and the variants of an aircraft. Every number is in SI."
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	err := e.Encode(s)
	return b.Bytes(), err
})

// A shape is a JSON schema.
type shape struct {
	Schema           string     `json:"$schema,omitempty"`
	Title            string     `json:"title,omitempty"`
	Description      string     `json:"description,omitempty"`
	Type             string     `json:"type,omitempty"`
	Const            any        `json:"const,omitempty"`
	Enum             []string   `json:"enum,omitempty"`
	Minimum          *float64   `json:"minimum,omitempty"`          // in the SI unit that Description names
	Maximum          *float64   `json:"maximum,omitempty"`          // in the SI unit that Description names
	ExclusiveMaximum *float64   `json:"exclusiveMaximum,omitempty"` // in the SI unit that Description names
	MaxLength        *int       `json:"maxLength,omitempty"`
	MinItems         *int       `json:"minItems,omitempty"`
	MaxItems         *int       `json:"maxItems,omitempty"`
	PrefixItems      []*shape   `json:"prefixItems,omitempty"`
	Items            any        `json:"items,omitempty"` // *shape or false
	MaxProperties    *int       `json:"maxProperties,omitempty"`
	Properties       properties `json:"properties,omitempty"`
	Required         []string   `json:"required,omitempty"`
	Additional       any        `json:"additionalProperties,omitempty"` // *shape or false
	OneOf            []*shape   `json:"oneOf,omitempty"`
	AllOf            []*shape   `json:"allOf,omitempty"`
	If               *shape     `json:"if,omitempty"`
	Then             *shape     `json:"then,omitempty"`
}

// properties are written in the order given.
type properties []property

type property struct {
	name string
	*shape
}

// MarshalJSON writes an object.
func (p properties) MarshalJSON() ([]byte, error) {
	var b bytes.Buffer
	for i, f := range p {
		b.WriteByte("{,"[min(i, 1)])
		text, err := json.Marshal(f.shape)
		if err != nil {
			return nil, err
		}
		fmt.Fprintf(&b, "%q:%s", f.name, text)
	}
	b.WriteByte('}')
	return b.Bytes(), nil
}

// shape is the schema of the values at n.
func (n *node) shape() *shape {
	switch n.form {
	case anObject:
		return n.objectShape()
	case aList:
		s := &shape{Type: "array", Items: n.item.shape(), MaxItems: &n.size.most}
		if n.size.least > 0 {
			s.MinItems = &n.size.least
		}
		return s
	case aMap:
		return &shape{Type: "object", Additional: n.item.shape(), MaxProperties: &n.size.most}
	case aPlant:
		s := &shape{}
		for _, k := range n.kinds {
			s.OneOf = append(s.OneOf, &shape{Type: "object", Additional: false, Required: []string{"kind", "values"},
				Properties: properties{{"kind", &shape{Const: k.name}}, {"values", k.shape()}}})
		}
		return s
	}
	if n.fixed != nil {
		return n.fixed
	}
	if n.described() {
		return about(n.entry)
	}
	return &shape{Type: map[form]string{aNumber: "number", anInteger: "integer", aText: "string", aTable: "array"}[n.form]}
}

// objectShape says of each input what its description says, unconditionally
// where the object's choices do not change it and otherwise under their condition.
func (n *node) objectShape() *shape {
	s := &shape{Type: "object", Additional: false}
	rules := n.rules()
	for _, f := range n.fields {
		p := f.shape()
		r, ok := rules.always[f.name]
		if ok {
			p = merge(p, limits(r))
		}
		s.Properties = append(s.Properties, property{f.name, p})
		if !f.optional && !rules.idle[f.name] {
			s.Required = append(s.Required, f.name)
		}
	}
	for _, c := range rules.when {
		then := &shape{}
		for _, e := range c.entries {
			p := limits(e)
			if e.Number != nil {
				p.Description = sentences("", unit(e.Number.Spec))
			}
			then.Properties = append(then.Properties, property{e.Path, p})
			if rules.idle[e.Path] && !n.field(e.Path).optional {
				then.Required = append(then.Required, e.Path)
			}
		}
		s.AllOf = append(s.AllOf, &shape{If: c.shape(), Then: then})
	}
	return s
}

// about is what holds of an input even while it is idle.
func about(e input.Entry) *shape {
	s := &shape{Title: e.Label()}
	switch {
	case e.Number != nil:
		s.Type, s.Description = "number", sentences(e.Number.Note, unit(e.Number.Spec))
	case e.Table != nil:
		heads := make([]string, len(e.Table.Columns))
		for i, c := range e.Table.Columns {
			heads[i] = c.Name + " " + unit(c)
		}
		s.Type, s.Description = "array", sentences(e.Table.Note, "Columns: "+strings.Join(heads, ", "))
		s.MaxItems = new(maxItems)
		s.Items = &shape{Type: "array", Items: &shape{Type: "number"}, MaxItems: new(maxItems)}
	case e.Choice != nil, e.Text != nil:
		s.Type = "string"
	}
	return s
}

// limits is what holds of an input that is not idle.
func limits(e input.Entry) *shape {
	switch {
	case e.Number != nil:
		return &shape{Minimum: &e.Number.Min, Maximum: &e.Number.Max}
	case e.Choice != nil:
		return &shape{Enum: values(e.Choice.Options)}
	case e.Text != nil:
		return &shape{MaxLength: &e.Text.Max}
	}
	columns := len(e.Table.Columns)
	row := &shape{Type: "array", MinItems: &columns, MaxItems: &columns}
	for _, c := range e.Table.Columns {
		row.PrefixItems = append(row.PrefixItems, &shape{Title: c.Label, Description: sentences(c.Note, unit(c)), Type: "number", Minimum: &c.Min, Maximum: &c.Max})
	}
	return &shape{MinItems: &e.Table.MinRows, Items: row}
}

// merge adds limits to what about says.
func merge(about, limits *shape) *shape {
	s := *about
	s.Minimum, s.Maximum, s.Enum, s.MaxLength = limits.Minimum, limits.Maximum, limits.Enum, limits.MaxLength
	if limits.Items != nil {
		s.MinItems, s.Items = limits.MinItems, limits.Items
	}
	return &s
}

func unit(s *input.Spec) string {
	if si := s.Quantity.SI(); si != "" {
		return "in " + si
	}
	return "dimensionless"
}

func sentences(text, more string) string {
	more = strings.ToUpper(more[:1]) + more[1:] + "."
	if text == "" {
		return more
	}
	return text + " " + more
}
