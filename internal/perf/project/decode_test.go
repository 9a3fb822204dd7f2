package project

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"reflect"
	"strings"
	"testing"

	"legwright/internal/perf/input"
)

// replaced is the demo's text with the first old replaced.
func replaced(t *testing.T, old, new string) []byte {
	t.Helper()
	text := encoded(t, Demo())
	if !bytes.Contains(text, []byte(old)) {
		t.Fatalf("no %s in the example", old)
	}
	return bytes.Replace(text, []byte(old), []byte(new), 1)
}

func TestDecodeSaysWhatIsWrong(t *testing.T) {
	const plant = "variants[0].aircraft.powerplant"
	for _, test := range []struct {
		old, new string
		path     string
		cause    error
		says     string // part of the message
	}{
		{`"wing_area": 12.1`, `"wingArea": 12.1, "wing_area": 12.1`, "variants[0].aircraft.airframe.wingArea", input.ErrUnknown, "accepted: wing_area"},
		{`"qnh"`, `"zzzzzzzzzz": 0, "qnh"`, "day.zzzzzzzzzz", input.ErrUnknown, "accepted: given, isa_deviation, temperature, humidity, qnh"},
		{`"qnh": 101800`, `"QNH": 101800`, "day.qnh", input.ErrRequired, "QNH must be 850 to 1100 hPa"},
		{`"qnh": 101800`, `"qnh": 101800, "qnh": 101801`, "day.qnh", input.ErrDuplicate, "“qnh” is given more than once"},
		{`"wing_area": 12.1`, `"wing_area": "12.1"`, "variants[0].aircraft.airframe.wing_area", input.ErrType, `“"12.1"” is of the wrong type; accepted: a number, 0.02 to 500 m²`},
		{`"wing_area": 12.1`, `"wing_area": null`, "variants[0].aircraft.airframe.wing_area", input.ErrType, "null"},
		{`"wing_area": 12.1`, `"wing_area": 1e999`, "variants[0].aircraft.airframe.wing_area", input.ErrRange, "1e999"},
		{`"wing_area": 12.1`, `"wing_area": 0.001`, "variants[0].aircraft.airframe.wing_area", input.ErrRange, "got 0.001 m²"},
		{`"wing_area": 12.1,`, ``, "variants[0].aircraft.airframe.wing_area", input.ErrRequired, "a value is required"},
		{`"kind": "piston-propeller"`, `"kind": "piston-propellor"`, plant + ".kind", input.ErrChoice, "accepted: piston-propeller"},
		{`"kind": "piston-propeller",`, ``, plant + ".kind", input.ErrRequired, "piston-propeller"},
		{`"values": {`, `"kind": "rubber", "values": {`, plant + ".kind", input.ErrDuplicate, "kind"},
		{`"values": {`, `"valeus": {}, "values": {`, plant + ".valeus", input.ErrUnknown, "accepted: values"},
		{`"values": {`, `"valeus": {`, plant + ".values", input.ErrRequired, ""},
		{`"format": 2`, `"format": 3`, "format", input.ErrChoice, "accepted: 2"},
		{`"format": 2`, `"format": 1.5`, "format", input.ErrType, "accepted: 2"},
		{`"format": 2`, `"format": "2"`, "format", input.ErrType, "accepted: 2"},
		{`"units": "SI"`, `"units": "ft"`, "units", input.ErrChoice, "accepted: SI"},
		{`"kind": "measured"`, `"kind": "guessed"`, "variants[0].basis.airframe.span.kind", input.ErrChoice, ""},
		{`"bound": "at-most"`, `"bound": "below"`, "requirements[0].bound", input.ErrChoice, "at-most, at-least"},
		{`"kind": "taxi"`, `"kind": "swim"`, "legs[0].kind", input.ErrChoice, "take-off"},
		{`"strip": ""`, `"strip": "x\ud800y"`, "legs[0].strip", input.ErrType, "escapes"},
		{`"given": "deviation"`, `"given": ["deviation", {"a": 1}]`, "day.given", input.ErrType, "deviation, temperature"},
		{`"strips": [`, `"strips": [7, `, "strips[0]", input.ErrType, "“7” is of the wrong type; accepted: an object"},
		{`"id": "b"`, `"id": "a"`, "variants[1].id", input.ErrConflict, ""},
		{`"volume": 0.088`, `"volume": 0.2`, plant + ".values.fuel.volume", input.ErrConflict, "the tanks hold"},
	} {
		_, err := Decode(replaced(t, test.old, test.new))
		found := false
		for _, e := range input.Errors(err) {
			found = found || e.Path == test.path && errors.Is(e, test.cause) && strings.Contains(e.Error(), test.says)
		}
		if !found {
			t.Errorf("%s: got %v\nwant %s: %v … %s", test.new, err, test.path, test.cause, test.says)
		}
	}
}

func TestDecodeRefusesWhatIsNotJSON(t *testing.T) {
	for _, test := range []struct{ text, says string }{
		{"", "line 1, column 1: unexpected end"},
		{"{\n  \"é\": }", "line 2, column 8: invalid character '}'"},
		{"{\n  \"a\": 1,\n", "line 3, column 1: unexpected end"},
		{"{} x", "line 1, column 4: invalid character 'x' after top-level value"},
		{"{}\n{}", "line 2, column 1"},
		{"{\"a\": \"\xff\"}", "line 1, column 8: bytes that are not UTF-8"},
		{"{\"a\": NaN}", "line 1, column 7"},
		{"\ufeff{}", "line 1, column 1"},
	} {
		_, err := Decode([]byte(test.text))
		if !errors.Is(err, input.ErrMalformed) || !strings.Contains(err.Error(), test.says) {
			t.Errorf("%q: got %v, want %s", test.text, err, test.says)
		}
	}
	for _, text := range []string{"7", "[]", "null", `"x"`} {
		if _, err := Decode([]byte(text)); !errors.Is(err, input.ErrType) || len(input.Errors(err)) != 1 {
			t.Errorf("%s: got %v, want one type error", text, err)
		}
	}
}

func TestDecodeHasLimits(t *testing.T) {
	leg := `{"name": "a", "kind": "taxi", "time": 1, "setting": 0}`
	repeat := func(item string, n int) string { return strings.TrimSuffix(strings.Repeat(item+",", n), ",") }
	rows := func(n int) string {
		var list []string
		for i := range n {
			list = append(list, fmt.Sprintf("[%g, 0.1]", float64(i)/1e4-0.5))
		}
		return strings.Join(list, ",")
	}
	for _, test := range []struct {
		name      string
		good, bad string // instead of key
		key       string
		path      string
	}{
		{"legs", `"legs": [` + repeat(leg, 200) + `], "x": [`, `"legs": [` + repeat(leg, 201) + `], "x": [`, `"legs": [`, "legs"},
		{"rows", `"polar": [` + rows(10000) + `], "x": [`, `"polar": [` + rows(10001) + `], "x": [`, `"polar": [`, "variants[0].aircraft.airframe.polar"},
		{"depth", `"x": ` + strings.Repeat("[", 31) + strings.Repeat("]", 31) + `, "legs": [`, `"x": ` + strings.Repeat("[", 32) + strings.Repeat("]", 32) + `, "legs": [`, `"legs": [`, ""},
		{"bytes", strings.Repeat(" ", 3<<20) + `"note": `, strings.Repeat(" ", 4<<20) + `"note": `, `"note": `, ""},
	} {
		_, err := Decode(replaced(t, test.key, test.good))
		for _, e := range input.Errors(err) {
			if e.Path == test.path && e.Path != "x" {
				t.Errorf("%s within the limit: %v", test.name, e)
			}
		}
		_, err = Decode(replaced(t, test.key, test.bad))
		if got := paths(err); len(got) == 0 || !contains(got, test.path) || !errors.Is(err, input.ErrRange) {
			t.Errorf("%s beyond the limit: %v", test.name, err)
		}
	}
}

func TestDecodeReportsEverythingInTheOrderOfTheText(t *testing.T) {
	text := replaced(t, `"qnh": 101800`, `"qnh": 5`)
	for _, r := range [][2]string{{`"length": 600`, `"lenght": 600`}, {`"wing_area": 12.1`, `"wing_area": true`}, {`"kind": "measured"`, `"kind": "guessed"`},
		{`"kind": "estimated"`, `"kind": "hoped"`}, {`"kind": "maker"`, `"kind": "told"`}} {
		text = bytes.Replace(text, []byte(r[0]), []byte(r[1]), 1)
	}
	_, first := Decode(text)
	if n := len(input.Errors(first)); n != 7 {
		t.Errorf("%d errors, want 7:\n%v", n, first)
	}
	want := []string{"day.qnh", "strips[0].length", "strips[0].lenght", "variants[0].aircraft.airframe.wing_area"}
	if got := paths(first); !reflect.DeepEqual(got[:4], want) {
		t.Errorf("got %v, want %v first", got, want)
	}
	for range 30 {
		if _, err := Decode(text); !reflect.DeepEqual(paths(err), paths(first)) {
			t.Fatalf("order changes: %v and %v", paths(first), paths(err))
		}
	}
}

func TestDecodeStopsAtTwoHundredErrors(t *testing.T) {
	var many strings.Builder
	for i := range 300 {
		fmt.Fprintf(&many, `"x%d": 0, `, i)
	}
	legs := `"legs": [` + strings.Repeat(`{"name": "a", "kind": "taxi", "time": -1, "setting": 2},`, 150)
	for name, text := range map[string][]byte{"strangers": replaced(t, `"qnh"`, many.String()+`"qnh"`), "ranges": replaced(t, `"legs": [`, legs)} {
		_, err := Decode(text)
		if n := len(input.Errors(err)); n != maxErrors {
			t.Errorf("%s: %d errors, want %d", name, n, maxErrors)
		}
	}
}

// A wrong choice is one error, not one for each input that it governs; what other choices need is still reported.
func TestDecodeWaitsForTheChoice(t *testing.T) {
	text := encoded(t, Demo())
	start, end := bytes.Index(text, []byte(`"legs": [`)), bytes.Index(text, []byte(`"requirements": [`))
	legs := `"legs": [{"name": "a", "kind": "climb", "speed_rule": "tass", "speed": 1, "path": "rate", "rate": 1000, "day_given": "project", "head_wind": 0}, {"name": "b"}],`
	_, err := Decode(bytes.Join([][]byte{text[:start], []byte(legs), text[end:]}, nil))
	want := []string{"legs[0].altitude", "legs[0].speed_rule", "legs[0].rate", "legs[1].kind"}
	if got := paths(err); !reflect.DeepEqual(got, want) {
		t.Errorf("got %v, want %v", got, want)
	}
}

func TestDecodeTellsOnceOfAnUnreadableKind(t *testing.T) {
	for _, kind := range []string{"5", "null", `"rubber"`} {
		_, err := Decode(replaced(t, `"kind": "piston-propeller"`, `"kind": `+kind))
		if got := paths(err); len(got) != 1 || got[0] != "variants[0].aircraft.powerplant.kind" {
			t.Errorf("%s: got %v", kind, err)
		}
	}
}

// What a document may leave out takes the zero value or the first option.
func TestDecodeFillsWhatMayBeMissing(t *testing.T) {
	text := encoded(t, Demo())
	start, end := bytes.Index(text, []byte(`"legs": [`)), bytes.Index(text, []byte(`"requirements": [`))
	short := `"legs": [{"name": "t", "kind": "taxi", "time": 60, "setting": 0.1}],`
	s, err := Decode(append(append(append([]byte{}, text[:start]...), short...), text[end:]...))
	if err != nil {
		t.Fatal(err)
	}
	l := s.Legs[0]
	if l.Extent != "distance" || l.SpeedRule != "best-range" || l.Path != "full-power" || l.DayGiven != "project" || l.Speed != 0 || l.Time != 60 {
		t.Errorf("got %+v", l)
	}
}

func TestDecodeNeedsNoNotesOrBases(t *testing.T) {
	doc := generic(t, small())
	for _, p := range places(doc, "") {
		if strings.HasSuffix(p.path, "note") || strings.HasSuffix(p.path, ".basis") {
			p.remove()
		}
	}
	text, err := json.Marshal(doc)
	if err != nil {
		t.Fatal(err)
	}
	s, err := Decode(text)
	if err != nil {
		t.Fatal(err)
	}
	if s.Note != "" || s.Variants[0].Basis == nil || len(s.Variants[0].Basis) > 0 {
		t.Errorf("note %q, bases %v", s.Note, s.Variants[0].Basis)
	}
	if got := refused(t, schemaOf(t), doc); len(got) > 0 {
		t.Errorf("the schema refuses %v", got)
	}
}

func FuzzDecode(f *testing.F) {
	for _, s := range []*Spec{Demo(), New("x")} {
		f.Add(encoded(f, s))
	}
	f.Add([]byte(`{"format":2,"day":{"given":5},"legs":[{"kind":"climb"}],"variants":[{"aircraft":{"powerplant":{"values":{},"kind":"piston-propeller"}}}]}`))
	f.Add([]byte(`{"strips":[[["\ud800"]]],"":{"\u0000":-1e-400}}`))
	f.Fuzz(func(t *testing.T, text []byte) {
		s, err := Decode(text)
		if err != nil {
			if n := len(input.Errors(err)); n == 0 || n > maxErrors || s != nil {
				t.Fatalf("%d input errors, document %v, from %v", n, s, err)
			}
			return
		}
		if _, err := s.Build(); err != nil {
			t.Fatalf("accepted but does not build: %v", err)
		}
		once := encoded(t, s) // refuses NaN and infinities
		back, err := Decode(once)
		if err != nil {
			t.Fatalf("own text refused: %v", err)
		}
		if twice := encoded(t, back); !bytes.Equal(once, twice) {
			t.Fatalf("not stable:\n%s\n%s", once, twice)
		}
	})
}
