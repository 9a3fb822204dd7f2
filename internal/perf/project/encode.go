package project

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"math"
	"reflect"
	"unicode/utf8"

	"legwright/internal/perf/input"
	"legwright/internal/perf/powerplant"
)

// Encode writes s in its canonical form, the same bytes for the same document:
// two spaces a level, fields in the order of the Go types, map keys sorted, empty lists as [].
// It does not check ranges, but refuses what Decode could not read back.
func (s *Spec) Encode() ([]byte, error) {
	if err := s.storable(); err != nil {
		return nil, err
	}
	c := s.Clone()
	fill(reflect.ValueOf(c).Elem())
	var b bytes.Buffer
	e := json.NewEncoder(&b)
	e.SetEscapeHTML(false)
	e.SetIndent("", "  ")
	if err := e.Encode(c); err != nil {
		return nil, err
	}
	if b.Len() > MaxBytes {
		return nil, &input.Error{Text: fmt.Sprintf("a document of %d bytes", b.Len()), Accepts: fmt.Sprintf("up to %d bytes", MaxBytes), Err: input.ErrRange}
	}
	return b.Bytes(), nil
}

// storable reports what JSON cannot carry and what exceeds the limits of a document.
func (s *Spec) storable() error {
	return errors.Join(document().storable(reflect.ValueOf(s).Elem(), "")...)
}

func (n *node) storable(v reflect.Value, path string) (errs []error) {
	refuse := func(text, accepts string, cause error) {
		errs = append(errs, &input.Error{Path: path, Text: text, Accepts: accepts, Err: cause})
	}
	if k := v.Kind(); (k == reflect.Slice || k == reflect.Map) && v.Len() > n.size.most {
		refuse(fmt.Sprintf("%d items", v.Len()), fmt.Sprintf("at most %d items", n.size.most), input.ErrRange)
		return errs
	}
	switch n.form {
	case anObject:
		for _, f := range n.fields {
			errs = append(errs, f.storable(v.Field(f.index), under(path, f.name))...)
		}
	case aList:
		for i := range v.Len() {
			errs = append(errs, n.item.storable(v.Index(i), at(path, i))...)
		}
	case aTable:
		for i, row := range v.Interface().([][]float64) {
			for _, x := range row {
				if !finite(x) {
					refuse(fmt.Sprintf("row %d", i+1), "numbers", input.ErrRange)
				}
			}
		}
	case aMap:
		for _, k := range v.MapKeys() {
			errs = append(errs, n.item.storable(v.MapIndex(k), path+"."+k.String())...)
		}
	case aPlant:
		return n.plantStorable(v.Interface().(powerplant.Spec), path)
	case aNumber:
		if !finite(v.Float()) {
			refuse(fmt.Sprint(v.Float()), n.accepts(), input.ErrRange)
		}
	case aText:
		if !utf8.ValidString(v.String()) {
			refuse("bytes that are not UTF-8", n.accepts(), input.ErrRange)
		}
	}
	return errs
}

func (n *node) plantStorable(p powerplant.Spec, path string) []error {
	for _, k := range n.kinds {
		if k.name == p.Kind && reflect.TypeOf(p.Model) == reflect.PointerTo(k.typ) {
			return k.storable(reflect.ValueOf(p.Model).Elem(), path+".values")
		}
	}
	return []error{&input.Error{Path: path + ".kind", Text: p.Kind, Accepts: "a kind of powerplant and its values", Err: input.ErrChoice}}
}

func finite(x float64) bool { return !math.IsNaN(x) && !math.IsInf(x, 0) }

// fill makes every nil list and map in v empty, so that it is not written as null.
func fill(v reflect.Value) {
	switch v.Kind() {
	case reflect.Struct:
		for i := range v.NumField() {
			fill(v.Field(i))
		}
	case reflect.Interface, reflect.Pointer:
		fill(v.Elem())
	case reflect.Slice:
		if v.IsNil() {
			v.Set(reflect.MakeSlice(v.Type(), 0, 0))
		}
		for i := range v.Len() {
			fill(v.Index(i))
		}
	case reflect.Map:
		if v.IsNil() {
			v.Set(reflect.MakeMap(v.Type()))
		}
	}
}
