package handlers

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"math"
	"reflect"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"legwright/internal/perf/project"
	"legwright/internal/perf/study"
)

// asked posts a document to the JSON interface.
func (v *visitor) asked(document string, header ...string) {
	v.t.Helper()
	v.at = nil
	v.send("POST", "/api/evaluate", strings.NewReader(document), append([]string{"Content-Type", "application/json"}, header...)...)
}

type evaluation struct {
	Name, Units, Caution string
	Variants             []study.Answer
}

func (v *visitor) evaluation() evaluation {
	v.t.Helper()
	var e evaluation
	d := json.NewDecoder(v.reply.Body)
	d.DisallowUnknownFields()
	if err := d.Decode(&e); err != nil {
		v.t.Fatal(err)
	}
	return e
}

// The interface says what the engine says and what the page shows.
func TestEvaluate(t *testing.T) {
	v := visit(t)
	v.get("/api/projects/1")
	if v.reply.Code != 200 || v.reply.Header().Get("Content-Type") != "application/json; charset=utf-8" || !bytes.Equal(v.reply.Body.Bytes(), v.document(1)) {
		t.Fatalf("the document as given is not the document as stored: %d, %s", v.reply.Code, v.reply.Header())
	}
	v.asked(v.reply.Body.String())
	if v.reply.Code != 200 {
		t.Fatalf("status %d, %s", v.reply.Code, v.reply.Body)
	}
	finiteNumbers(t, v.reply.Body.Bytes())
	got := v.evaluation()
	p, err := project.Demo().Build()
	if err != nil {
		t.Fatal(err)
	}
	if got.Name != p.Spec.Name || got.Units != "SI" || got.Caution == "" || len(got.Variants) != len(p.Aircraft) {
		t.Fatalf("got %q in %q with %d variants, caution %q", got.Name, got.Units, len(got.Variants), got.Caution)
	}
	for i := range got.Variants {
		st := study.Run(p, i, study.DefaultView(p, i))
		if want := st.Answer(); !reflect.DeepEqual(got.Variants[i], want) {
			t.Errorf("variant %d: got %+v, want %+v", i, got.Variants[i], want)
		}
		v.at = nil
		v.get("/projects/1/variants/" + got.Variants[i].Variant)
		samePage(t, v.page, st, &got.Variants[i])
	}
}

// samePage holds the page's table of figures against the answer.
func samePage(t *testing.T, page *html.Node, st *study.Study, answer *study.Answer) {
	t.Helper()
	rows := all(page, "#figures tr")
	if len(rows) != len(answer.Figures) || len(rows) == 0 {
		t.Fatalf("%d rows, %d figures", len(rows), len(answer.Figures))
	}
	sys := st.Project.Spec.System()
	for i, f := range answer.Figures {
		want := f.Label + " none"
		if f.Value != nil {
			want = f.Label + " " + sys.Format(st.Figures[i].Quantity, *f.Value)
		}
		if got := text(rows[i]); !strings.HasPrefix(got, plain(want)) {
			t.Errorf("the page says %q, the interface %q", got, want)
		}
	}
	if tiles := all(page, ".tile"); len(tiles) != len(answer.Requirements) {
		t.Errorf("%d tiles, %d requirements", len(tiles), len(answer.Requirements))
	}
	flown := strings.HasPrefix(text(one(page, "#verdict h1")), "Flies the mission")
	if flown != answer.Flown {
		t.Errorf("the page says flown %v, the interface %v", flown, answer.Flown)
	}
}

// finiteNumbers fails when a JSON text has null, or a number that no measurement can have.
func finiteNumbers(t *testing.T, text []byte) {
	t.Helper()
	numbers := 0
	d := json.NewDecoder(bytes.NewReader(text))
	for {
		token, err := d.Token()
		if err == io.EOF {
			break
		}
		if err != nil {
			t.Fatal(err)
		}
		switch v := token.(type) {
		case nil:
			t.Errorf("null at byte %d", d.InputOffset())
		case float64:
			if numbers++; math.Abs(v) > 1e12 {
				t.Errorf("%g at byte %d", v, d.InputOffset())
			}
		}
	}
	if numbers < 100 {
		t.Errorf("only %d numbers", numbers)
	}
}

// A document that cannot be taken is answered with every place, what stood there and what is accepted.
func TestEvaluateRefuses(t *testing.T) {
	v := visit(t)
	demo := string(v.document(1))
	const frame = "variants[0].aircraft.airframe"
	for _, c := range []struct {
		about, old, new string
		path, value     string
		accepted        string // part of it
	}{
		{"unknown field", `"wing_area": 12.1`, `"wing_area": 12.1, "wingspan": 9`, frame + ".wingspan", "wingspan", "span"},
		{"wrong type", `"wing_area": 12.1`, `"wing_area": "12.1"`, frame + ".wing_area", `"12.1"`, "0.02 to 500 m²"},
		{"null", `"wing_area": 12.1`, `"wing_area": null`, frame + ".wing_area", "null", "0.02 to 500 m²"},
		{"out of range", `"wing_area": 12.1`, `"wing_area": -1`, frame + ".wing_area", "-1", "0.02 to 500 m²"},
		{"too large to be a number", `"wing_area": 12.1`, `"wing_area": 1e999`, frame + ".wing_area", "1e999", "m²"},
		{"missing", `"wing_area": 12.1,`, ``, frame + ".wing_area", "", "0.02 to 500 m²"},
		{"unknown kind", `"kind": "piston-propeller"`, `"kind": "rubber"`, "variants[0].aircraft.powerplant.kind", "rubber", "piston-propeller"},
		{"conflict", `"volume": 0.088`, `"volume": 0.2`, "variants[0].aircraft.powerplant.values.fuel.volume", "200.0 L", "tanks hold"},
		{"malformed", `"format": 2,`, `"format": 2,,`, "", "", ""},
		{"other format", `"format": 2,`, `"format": 7,`, "format", "7", "2"},
		{"script in a name", `"kind": "taxi"`, `"kind": "<script>"`, "legs[0].kind", "<script>", "taxi"},
	} {
		if !strings.Contains(demo, c.old) {
			t.Fatalf("%s: the demo has no %s", c.about, c.old)
		}
		v.asked(strings.Replace(demo, c.old, c.new, 1))
		if v.reply.Code != 422 || v.reply.Header().Get("Content-Type") != "application/json; charset=utf-8" {
			t.Errorf("%s: status %d, %s", c.about, v.reply.Code, v.reply.Body)
			continue
		}
		var got struct {
			Errors []struct {
				Path, Accepted, Problem string
				Value                   any
			}
		}
		d := json.NewDecoder(v.reply.Body)
		d.DisallowUnknownFields()
		if err := d.Decode(&got); err != nil {
			t.Fatal(err)
		}
		found := false
		for _, e := range got.Errors {
			value := fmt.Sprint(e.Value)
			if e.Value == nil {
				value = ""
			}
			if e.Problem == "" {
				t.Errorf("%s: no words for %+v", c.about, e)
			}
			found = found || e.Path == c.path && plain(value) == c.value && strings.Contains(e.Accepted, c.accepted)
		}
		if !found {
			t.Errorf("%s: got %+v", c.about, got.Errors)
		}
	}
	if v.log.Len() > 0 {
		t.Errorf("logged: %s", v.log)
	}
}

func TestInterfaceStatus(t *testing.T) {
	v := visit(t)
	demo := string(v.document(1))
	for _, c := range []struct {
		about  string
		header []string
		body   string
		want   int
	}{
		{"good", nil, demo, 200},
		{"with a character set", []string{"Content-Type", "application/json; charset=utf-8"}, demo, 200},
		{"a form", []string{"Content-Type", "application/x-www-form-urlencoded"}, demo, 415},
		{"text", []string{"Content-Type", "text/plain"}, demo, 415},
		{"no type", []string{"Content-Type", ""}, demo, 415},
		{"too large", nil, strings.Repeat(" ", maxProject) + demo, 413},
		{"larger than a document", nil, strings.Repeat(" ", maxProject/2) + demo, 422},
		{"empty", nil, "", 422},
		{"from another site", []string{"Sec-Fetch-Site", "cross-site"}, demo, 403},
		{"from another site, old browser", []string{"Origin", "http://elsewhere.example"}, demo, 403},
		{"from the own page", []string{"Sec-Fetch-Site", "same-origin", "Origin", "http://" + host}, demo, 200},
	} {
		v.asked(c.body, append([]string{"Content-Type", "application/json"}, c.header...)...)
		if v.reply.Code != c.want {
			t.Errorf("%s: status %d, want %d", c.about, v.reply.Code, c.want)
		}
	}
	// A body that does not say its length is cut off while it is read.
	v.send("POST", "/api/evaluate", unsized{strings.NewReader(strings.Repeat(" ", maxProject) + demo)}, "Content-Type", "application/json")
	if v.reply.Code != 413 || !json.Valid(v.reply.Body.Bytes()) {
		t.Errorf("too large, length unknown: status %d, %s", v.reply.Code, v.reply.Body)
	}
	for path, want := range map[string]int{"/api/projects/1": 200, "/api/projects/99": 404, "/api/projects/x": 404, "/api/schema": 200, "/api/evaluate": 405} {
		v.get(path)
		if v.reply.Code != want || want == 404 && !json.Valid(v.reply.Body.Bytes()) {
			t.Errorf("%s: status %d, want %d, %s", path, v.reply.Code, want, v.reply.Body)
		}
	}
	// A foreign form cannot change a project either.
	before := v.document(1)
	v.post("/projects/1/variants/a", map[string][]string{"variants[0].aircraft.weights.empty": {"1"}}, "Sec-Fetch-Site", "cross-site")
	if v.reply.Code != 403 || !bytes.Equal(before, v.document(1)) {
		t.Errorf("foreign form: status %d", v.reply.Code)
	}
}

// The schema as served is JSON and knows every key of the document as served; package project proves that both agree on values.
func TestSchemaDescribesTheDocument(t *testing.T) {
	v := visit(t)
	v.get("/api/schema")
	if got := v.reply.Header().Get("Content-Type"); v.reply.Code != 200 || got != "application/schema+json" {
		t.Fatalf("status %d, type %s", v.reply.Code, got)
	}
	var schema, document any
	if err := json.Unmarshal(v.reply.Body.Bytes(), &schema); err != nil {
		t.Fatal(err)
	}
	v.get("/api/projects/1")
	if err := json.Unmarshal(v.reply.Body.Bytes(), &document); err != nil {
		t.Fatal(err)
	}
	described := map[string]bool{}
	properties(schema, described)
	if len(described) < 50 {
		t.Fatalf("only %d properties in the schema", len(described))
	}
	missing := map[string]bool{}
	keys(document, "", func(path, key string) {
		if !strings.HasSuffix(path, ".basis") && !described[key] {
			missing[path+"."+key] = true
		}
	})
	if len(missing) > 0 {
		t.Errorf("not in the schema: %v", missing)
	}
}

// properties collects the names below every "properties" of a schema.
func properties(schema any, found map[string]bool) {
	switch v := schema.(type) {
	case []any:
		for _, e := range v {
			properties(e, found)
		}
	case map[string]any:
		for key, e := range v {
			if props, ok := e.(map[string]any); ok && key == "properties" {
				for name := range props {
					found[name] = true
				}
			}
			properties(e, found)
		}
	}
}

// keys visits every key of a document with the path of its object.
func keys(document any, path string, visit func(path, key string)) {
	switch v := document.(type) {
	case []any:
		for _, e := range v {
			keys(e, path, visit)
		}
	case map[string]any:
		for key, e := range v {
			visit(path, key)
			keys(e, path+"."+key, visit)
		}
	}
}
