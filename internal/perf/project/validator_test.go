package project

import (
	"encoding/json"
	"fmt"
	"maps"
	"math"
	"slices"
	"testing"
	"unicode/utf8"
)

// A validator knows as much of JSON Schema as Schema writes; an unknown keyword fails the test.
type validator struct {
	t     interface{ Fatalf(string, ...any) }
	paths map[string]bool // refused
}

func schemaOf(t *testing.T) any {
	t.Helper()
	text, err := Schema()
	if err != nil {
		t.Fatal(err)
	}
	var s any
	if err := json.Unmarshal(text, &s); err != nil {
		t.Fatal(err)
	}
	return s
}

// refused lists the paths at which schema refuses doc.
func refused(t interface{ Fatalf(string, ...any) }, schema, doc any) []string {
	v := &validator{t, map[string]bool{}}
	v.check(schema, doc, "")
	return slices.Sorted(maps.Keys(v.paths))
}

func (v *validator) check(schema, x any, path string) {
	if schema == false {
		v.paths[path] = true
		return
	}
	s := schema.(map[string]any)
	for key, want := range s {
		if !v.keyword(s, key, want, x, path) {
			v.paths[path] = true
		}
	}
}

// keyword applies one keyword to x; what is wrong deeper inside it notes by itself.
func (v *validator) keyword(s map[string]any, key string, want, x any, path string) bool {
	switch key {
	case "$schema", "title", "description", "then":
	case "type":
		return isType(want.(string), x)
	case "const":
		return x == want
	case "enum":
		return slices.Contains(want.([]any), x)
	case "minimum", "maximum", "exclusiveMaximum":
		n, ok := x.(float64)
		w := want.(float64)
		return !ok || key == "minimum" && n >= w || key == "maximum" && n <= w || key == "exclusiveMaximum" && n < w
	case "maxLength":
		text, ok := x.(string)
		return !ok || float64(utf8.RuneCountInString(text)) <= want.(float64)
	case "allOf":
		for _, sub := range want.([]any) {
			v.check(sub, x, path)
		}
	case "if":
		if len(refused(v.t, want, x)) == 0 {
			v.check(s["then"], x, path)
		}
	case "oneOf":
		return v.oneOf(want.([]any), x, path)
	default:
		if list, ok := x.([]any); ok {
			return v.array(s, key, want, list, path)
		}
		if object, ok := x.(map[string]any); ok {
			return v.object(s, key, want, object, path)
		}
		known := []string{"items", "prefixItems", "minItems", "maxItems", "maxProperties", "properties", "required", "additionalProperties"}
		if !slices.Contains(known, key) {
			v.t.Fatalf("keyword %s is not known here", key)
		}
	}
	return true
}

func (v *validator) oneOf(branches []any, x any, path string) bool {
	fits := 0
	var last *validator
	for _, b := range branches {
		last = &validator{v.t, map[string]bool{}}
		if last.check(b, x, path); len(last.paths) == 0 {
			fits++
		}
	}
	if fits == 0 && len(branches) == 1 {
		maps.Copy(v.paths, last.paths)
	}
	return fits == 1 || len(branches) == 1
}

func (v *validator) array(s map[string]any, key string, want any, list []any, path string) bool {
	prefix, _ := s["prefixItems"].([]any)
	switch key {
	case "minItems":
		return float64(len(list)) >= want.(float64)
	case "maxItems":
		return float64(len(list)) <= want.(float64)
	case "prefixItems":
		for i := range min(len(prefix), len(list)) {
			v.check(prefix[i], list[i], fmt.Sprintf("%s[%d]", path, i))
		}
	case "items":
		for i := len(prefix); i < len(list); i++ {
			v.check(want, list[i], fmt.Sprintf("%s[%d]", path, i))
		}
	}
	return true
}

func (v *validator) object(s map[string]any, key string, want any, object map[string]any, path string) bool {
	known, _ := s["properties"].(map[string]any)
	join := func(name string) string {
		if path == "" {
			return name
		}
		return path + "." + name
	}
	switch key {
	case "maxProperties":
		return float64(len(object)) <= want.(float64)
	case "required":
		for _, name := range want.([]any) {
			if _, ok := object[name.(string)]; !ok {
				v.paths[join(name.(string))] = true
			}
		}
	case "properties":
		for name, x := range object {
			if sub, ok := known[name]; ok {
				v.check(sub, x, join(name))
			}
		}
	case "additionalProperties":
		for name, x := range object {
			if _, ok := known[name]; !ok {
				v.check(want, x, join(name))
			}
		}
	}
	return true
}

func isType(name string, x any) bool {
	switch x := x.(type) {
	case map[string]any:
		return name == "object"
	case []any:
		return name == "array"
	case string:
		return name == "string"
	case float64:
		return name == "number" || name == "integer" && x == math.Trunc(x)
	}
	return false
}
