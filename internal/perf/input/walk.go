package input

import (
	"errors"
	"fmt"
	"reflect"
	"strings"
)

// Described is a part of a document that describes its own inputs. The paths
// that Inputs gives are the JSON names of its fields.
type Described interface {
	Inputs() []Entry
}

// Walk returns every input of the document v, a pointer to a struct, with its
// full path. It descends into structs, slices of structs and interfaces by their
// JSON names; the order is that of the Inputs methods and the fields.
func Walk(v any) []Entry {
	var all []Entry
	walk(reflect.ValueOf(v), "", &all)
	return all
}

// Check reports every unacceptable input of the document v.
func Check(v any) error {
	var errs []error
	for _, e := range Walk(v) {
		errs = append(errs, e.Check())
	}
	return errors.Join(errs...)
}

// Find returns the input at path.
func Find(v any, path string) (Entry, bool) {
	for _, e := range Walk(v) {
		if e.Path == path {
			return e, true
		}
	}
	return Entry{}, false
}

func walk(v reflect.Value, path string, all *[]Entry) {
	switch v.Kind() {
	case reflect.Interface:
		if !v.IsNil() {
			walk(v.Elem(), path, all)
		}
	case reflect.Pointer:
		if v.IsNil() {
			return
		}
		if d, ok := v.Interface().(Described); ok {
			for _, e := range d.Inputs() {
				e.Path = join(path, e.Path)
				*all = append(*all, e)
			}
		}
		walkFields(v.Elem(), path, all)
	}
}

func walkFields(v reflect.Value, path string, all *[]Entry) {
	if v.Kind() != reflect.Struct {
		return
	}
	for i := range v.NumField() {
		field := v.Type().Field(i)
		name := JSONName(field)
		if name == "" {
			continue
		}
		switch f := v.Field(i); f.Kind() {
		case reflect.Struct:
			walk(f.Addr(), join(path, name), all)
		case reflect.Slice:
			if f.Type().Elem().Kind() != reflect.Struct {
				continue
			}
			for j := range f.Len() {
				walk(f.Index(j).Addr(), fmt.Sprintf("%s[%d]", join(path, name), j), all)
			}
		case reflect.Interface, reflect.Pointer:
			walk(f, join(path, name), all)
		}
	}
}

// JSONName is the name under which encoding/json writes the field, or "" where it does not.
func JSONName(f reflect.StructField) string {
	name, _, _ := strings.Cut(f.Tag.Get("json"), ",")
	if !f.IsExported() || name == "-" {
		return ""
	}
	return name
}

func join(path, name string) string {
	if path == "" {
		return name
	}
	return path + "." + name
}

// Settle gives every choice of the document v that counts and holds none of its
// options the first of them: what one choice offers may depend on another that
// has just changed.
func Settle(v any) {
	for settled := false; !settled; {
		settled = true
		for _, e := range Walk(v) {
			if e.Idle || e.Choice == nil || len(e.Choice.Options) == 0 || e.Check() == nil {
				continue
			}
			*e.Choice.Value = e.Choice.Options[0].Value
			settled = false
			break
		}
	}
}
