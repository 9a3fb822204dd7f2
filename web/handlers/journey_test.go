package handlers

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"net/url"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"golang.org/x/net/html"
	"golang.org/x/tools/txtar"
)

// A journey is a script of what a person does and must then see. Its steps, one a
// line, are the cases of step; the indented lines under a request are its form
// fields, "name = text", where "@file" stands for a file of the archive.
// Selectors stand in backquotes and are those of all.
type journey struct {
	*visitor
	files   map[string]string
	windows map[string]*visitor
	kept    map[string][]byte
}

func TestJourneys(t *testing.T) {
	files, err := filepath.Glob("testdata/journeys/*.txtar")
	if err != nil || len(files) == 0 {
		t.Fatal("no journeys", err)
	}
	for _, file := range files {
		t.Run(strings.TrimSuffix(filepath.Base(file), ".txtar"), func(t *testing.T) {
			t.Parallel()
			archive, err := txtar.ParseFile(file)
			if err != nil {
				t.Fatal(err)
			}
			j := &journey{visitor: visit(t), files: map[string]string{}, windows: map[string]*visitor{}, kept: map[string][]byte{}}
			for _, f := range archive.Files {
				j.files[f.Name] = string(f.Data)
			}
			j.run(string(archive.Comment))
		})
	}
}

// run takes the steps of a script and says in which line one went wrong.
func (j *journey) run(script string) {
	lines := strings.Split(script, "\n")
	for i := 0; i < len(lines); i++ {
		line := strings.TrimSpace(lines[i])
		if line == "" || strings.HasPrefix(line, "#") {
			continue
		}
		number, form := i+1, url.Values{}
		for i+1 < len(lines) && strings.HasPrefix(lines[i+1], "  ") {
			i++
			name, value, ok := strings.Cut(strings.TrimSpace(lines[i]), " =")
			if !ok {
				j.t.Fatalf("line %d: no “name = text”", i+1)
			}
			value = strings.TrimPrefix(value, " ")
			if file, ok := strings.CutPrefix(value, "@"); ok {
				value = j.files[file]
			}
			form.Set(name, value)
		}
		if err := j.step(line, form); err != nil {
			j.t.Errorf("line %d, %s: %v", number, line, err)
		}
		if j.log.Len() > 0 {
			j.t.Fatalf("line %d, %s: the site logged %s", number, line, j.log)
		}
	}
}

var stepForm = regexp.MustCompile("^([a-zA-Z]+)(?: `([^`]*)`)? ?(.*)$")

// step does one line.
func (j *journey) step(line string, form url.Values) error {
	m := stepForm.FindStringSubmatch(line)
	if m == nil {
		return fmt.Errorf("not a step")
	}
	verb, selector, rest := m[1], m[2], m[3]
	address, header := headed(rest)
	switch verb {
	case "GET":
		j.get(address, header...)
	case "POST":
		j.post(address, form, header...)
	case "submit": // `form` [button ACTION] [hx]
		if j.page == nil {
			return fmt.Errorf("no page but %q", j.reply.Body)
		}
		action, header := headed(rest)
		n, err := j.element(selector)
		if err != nil {
			return err
		}
		j.submit(n, form, strings.TrimPrefix(action, "button "), header...)
	case "follow":
		j.follow()
	case "window": // the page that another window shows
		if j.windows[rest] == nil {
			other := *j.visitor
			j.windows[rest] = &other
		}
		j.visitor = j.windows[rest]
	case "keep":
		j.kept[rest] = j.document(j.project())
	default:
		return j.check(verb, selector, rest)
	}
	return nil
}

// headed splits off the mark of a request by the page's script.
func headed(rest string) (string, []string) {
	if address, ok := strings.CutSuffix(rest, "hx"); ok {
		return strings.TrimSpace(address), []string{"HX-Request", "true"}
	}
	return rest, nil
}

// check is a step that only looks.
func (j *journey) check(verb, selector, rest string) error {
	if selector != "" && j.page == nil {
		return fmt.Errorf("no page but %q", j.reply.Body)
	}
	switch verb {
	case "status":
		return j.status(rest)
	case "to": // where a redirect leads
		return same(j.reply.Header().Get("Location"), rest)
	case "sound": // no fault that checkPage knows
		return checkPage(j.reply.Body.String())
	case "no":
		if n := one(j.page, selector); n != nil {
			return fmt.Errorf("there is %q", text(n))
		}
		return nil
	case "count":
		return same(strconv.Itoa(len(all(j.page, selector))), rest)
	case "root": // a fragment has no other element beside it
		return j.fragment(selector)
	case "in":
		n, err := j.element(selector)
		if err != nil {
			return err
		}
		return j.look(n, rest)
	case "stored":
		path, want, _ := strings.Cut(rest, " ")
		return j.stored(path, want)
	case "same":
		name, but, _ := strings.Cut(rest, " but ")
		return j.unchanged(j.kept[name], but)
	case "revision": // of the head
		rev, err := j.db.Head(j.t.Context(), j.project())
		if err != nil {
			return err
		}
		return same(strconv.FormatInt(rev.Number, 10), rest)
	}
	return fmt.Errorf("not a step")
}

// status also tells what a page that was not awaited refuses.
func (j *journey) status(want string) error {
	err := same(strconv.Itoa(j.reply.Code), want)
	if err != nil && j.page != nil {
		for _, n := range all(j.page, ".error") {
			err = fmt.Errorf("%w; %s", err, text(n))
		}
	}
	return err
}

func same(got, want string) error {
	if got != want {
		return fmt.Errorf("got %q", got)
	}
	return nil
}

func (j *journey) element(selector string) (*html.Node, error) {
	n := one(j.page, selector)
	if n == nil {
		return nil, fmt.Errorf("there is no such element")
	}
	return n, nil
}

// look holds an element against "text …", "lacks …", "holds …" or "says NAME …", its attribute.
func (j *journey) look(n *html.Node, rest string) error {
	how, want, _ := strings.Cut(rest, " ")
	switch how {
	case "text":
		if got := text(n); !strings.Contains(got, want) {
			return fmt.Errorf("got %q", got)
		}
	case "lacks":
		if got := text(n); strings.Contains(got, want) {
			return fmt.Errorf("got %q", got)
		}
	case "holds":
		if file, ok := strings.CutPrefix(want, "@"); ok {
			return same(strings.TrimSpace(value(n)), strings.TrimSpace(j.files[file]))
		}
		return same(value(n), want)
	case "says":
		name, want, _ := strings.Cut(want, " ")
		return same(attr(n, name), want)
	default:
		return fmt.Errorf("not a look")
	}
	return nil
}

// fragment checks that the answer is one element and no whole page.
func (j *journey) fragment(selector string) error {
	if strings.Contains(j.reply.Body.String(), "<html") {
		return fmt.Errorf("a whole page")
	}
	body := one(j.page, "body")
	for n := range body.ChildNodes() {
		if n.Type == html.ElementNode && !matches(n, selector) {
			return fmt.Errorf("there is also %s", n.Data)
		}
	}
	_, err := j.element(selector)
	return err
}

// project is the number of the project that the last address names.
func (j *journey) project() int64 {
	m := regexp.MustCompile(`^/projects/(\d+)`).FindStringSubmatch(j.at.Path)
	if m == nil {
		j.t.Fatalf("%s names no project", j.at)
	}
	id, _ := strconv.ParseInt(m[1], 10, 64)
	return id
}

// stored compares a value of the stored document. A number may differ in the
// seventh digit, the last that a script states.
func (j *journey) stored(path, want string) error {
	var at any
	if err := json.Unmarshal(j.document(j.project()), &at); err != nil {
		return err
	}
	for _, step := range strings.FieldsFunc(path, func(r rune) bool { return r == '.' || r == '[' }) {
		index, isIndex := strings.CutSuffix(step, "]")
		switch v := at.(type) {
		case map[string]any:
			at = v[step]
		case []any:
			n, err := strconv.Atoi(index)
			if !isIndex || err != nil || n >= len(v) {
				return fmt.Errorf("%s leads nowhere", step)
			}
			at = v[n]
		default:
			return fmt.Errorf("%s leads nowhere", step)
		}
	}
	number, isNumber := at.(float64)
	wanted, err := strconv.ParseFloat(want, 64)
	if isNumber && err == nil {
		if math.Abs(number-wanted) > 1e-6*math.Abs(wanted) {
			return fmt.Errorf("got %v", number)
		}
		return nil
	}
	if list, ok := at.([]any); ok {
		return same(fmt.Sprintf("%d items", len(list)), want)
	}
	return same(fmt.Sprint(at), want)
}

// unchanged compares the document byte for byte, but for the line of one key.
func (j *journey) unchanged(before []byte, but string) error {
	if len(before) == 0 {
		return fmt.Errorf("nothing kept under this name")
	}
	now := j.document(j.project())
	if but != "" {
		line := regexp.MustCompile(`(?m)^ *"` + regexp.QuoteMeta(but) + `": .*$`)
		if bytes.Equal(line.Find(before), line.Find(now)) {
			return fmt.Errorf("%s is the same too", but)
		}
		before, now = line.ReplaceAll(before, nil), line.ReplaceAll(now, nil)
	}
	if !bytes.Equal(before, now) {
		return fmt.Errorf("the document differs")
	}
	return nil
}
