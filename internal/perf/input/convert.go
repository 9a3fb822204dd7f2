package input

import (
	"reflect"
	"strings"
)

// A Converter is a part of a document that lets the same thing be given in
// several ways. Convert is told that its choice of that name is no longer from,
// and fills the inputs of the way now chosen so that they mean what the others
// did; where that cannot be done it leaves them as they are.
type Converter interface {
	Convert(choice, from string)
}

// Convert tells the part of the document v that owns the choice at path, and
// each part around it, that the choice was from before.
func Convert(v any, path, from string) {
	convert(reflect.ValueOf(v), path, from)
}

func convert(v reflect.Value, path, from string) {
	for v.Kind() == reflect.Interface {
		v = v.Elem()
	}
	if v.Kind() != reflect.Pointer || v.IsNil() || v.Elem().Kind() != reflect.Struct {
		return
	}
	name, rest, nested := strings.Cut(path, ".")
	if nested {
		if field, ok := element(v.Elem(), name); ok {
			convert(field, rest, from)
		}
	}
	if c, ok := v.Interface().(Converter); ok {
		c.Convert(path, from)
	}
}

// element is a pointer to the part of a struct that one element of a path names: "legs[2]".
func element(v reflect.Value, name string) (reflect.Value, bool) {
	list, index, indexed := strings.Cut(strings.TrimSuffix(name, "]"), "[")
	for i := range v.NumField() {
		if JSONName(v.Type().Field(i)) != list {
			continue
		}
		f := v.Field(i)
		if indexed {
			n, ok := whole(index)
			if f.Kind() != reflect.Slice || !ok || n >= f.Len() {
				return reflect.Value{}, false
			}
			f = f.Index(n)
		}
		if f.Kind() == reflect.Interface || f.Kind() == reflect.Pointer {
			return f, true
		}
		return f.Addr(), true
	}
	return reflect.Value{}, false
}

func whole(text string) (int, bool) {
	n := 0
	for _, c := range text {
		if c < '0' || c > '9' || n > 1e6 {
			return 0, false
		}
		n = 10*n + int(c-'0')
	}
	return n, text != ""
}
