package main

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"math/rand/v2"
	"net/http"
	"net/url"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"sync"
	"testing"
	"time"

	"legwright/internal/store"
)

// The program is killed in the middle of edits, again and again. What it had
// called saved is there at the next start, in the head as in the history.
func TestKilledServer(t *testing.T) {
	program := filepath.Join(t.TempDir(), "legwright")
	if out, err := exec.CommandContext(t.Context(), "go", "build", "-o", program, ".").CombinedOutput(); err != nil {
		t.Fatalf("%v: %s", err, out)
	}
	k := &killed{data: t.TempDir(), saved: map[int64]save{}}
	for range 5 {
		k.round(t, program)
		k.check(t)
	}
	if len(k.saved) < 15 {
		t.Errorf("only %d edits were saved: the rounds are too short to prove anything", len(k.saved))
	}
	t.Log(len(k.saved), "edits")
}

// A save is what one answered edit put into one field.
type save struct {
	field string
	value float64
}

// fields are the two that the writers edit, by the end of their names.
var fields = []string{"empty", "max_take_off"}

type killed struct {
	data  string
	mu    sync.Mutex
	saved map[int64]save // by revision
	last  int64
	next  float64 // each value is used once
}

// round starts the program, edits from two windows at once and kills it after some answers.
func (k *killed) round(t *testing.T, program string) {
	t.Helper()
	c, at := launch(t, program, k.data)
	k.whatWasSaved(t, at)
	answers := make(chan error, 100)
	var writers sync.WaitGroup
	for _, field := range fields {
		writers.Go(func() {
			for err := error(nil); err == nil; answers <- err {
				err = k.edit(at, field)
			}
		})
	}
	for range 4 + rand.IntN(6) {
		if err := <-answers; err != nil {
			t.Error("an edit failed before the kill:", err)
		}
	}
	time.Sleep(time.Duration(rand.IntN(40)) * time.Millisecond)
	if err := c.Process.Kill(); err != nil {
		t.Error(err)
	}
	writers.Wait()
	c.Wait()
}

// launch starts the program and returns it with its address.
func launch(t *testing.T, program, data string) (*exec.Cmd, string) {
	t.Helper()
	c := exec.CommandContext(t.Context(), program, "-listen", "127.0.0.1:0", "-data", data)
	var log bytes.Buffer
	c.Stderr = &log
	out, err := c.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := c.Start(); err != nil {
		t.Fatal(err)
	}
	line, _ := bufio.NewReader(out).ReadString('\n')
	_, at, ok := strings.Cut(strings.TrimSpace(line), "Legwright is at ")
	if !ok {
		c.Process.Kill()
		c.Wait()
		t.Fatalf("it says %q, and %s", line, &log)
	}
	return c, at
}

var savedAs = regexp.MustCompile(`saved [0-9:]+, revision ([0-9]+)`)

// edit sends one edit and notes it when the answer calls it saved.
func (k *killed) edit(at, field string) error {
	k.mu.Lock()
	k.next++
	value := 300 + k.next/8 // exact in binary and in seven digits
	k.mu.Unlock()
	if field == "max_take_off" {
		value += 400
	}
	form := url.Values{"system": {"metric"}, "variants[0].aircraft.weights." + field: {fmt.Sprint(value)}}
	r, err := http.NewRequest("POST", at+"projects/1/variants/a", strings.NewReader(form.Encode()))
	if err != nil {
		return err
	}
	r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
	r.Header.Set("HX-Request", "true")
	res, err := http.DefaultClient.Do(r)
	if err != nil {
		return err
	}
	defer res.Body.Close()
	body, err := io.ReadAll(res.Body)
	m := savedAs.FindSubmatch(body)
	if m == nil { // cut off before that line
		return fmt.Errorf("status %d, %d bytes, %w", res.StatusCode, len(body), err)
	}
	number, _ := strconv.ParseInt(string(m[1]), 10, 64)
	k.mu.Lock()
	defer k.mu.Unlock()
	k.saved[number] = save{field, value}
	k.last = max(k.last, number)
	return err
}

// whatWasSaved asks the program itself for the state after the last kill. An
// edit that was under way may have been saved without an answer, but only after all answered ones.
func (k *killed) whatWasSaved(t *testing.T, at string) {
	t.Helper()
	res, err := http.Get(at + "api/projects/1")
	if err != nil {
		t.Fatal(err)
	}
	defer res.Body.Close()
	doc, err := io.ReadAll(res.Body)
	if err != nil {
		t.Fatal(err)
	}
	for _, field := range fields {
		var want float64
		for n := k.last; n > 0 && want == 0; n-- {
			if s := k.saved[n]; s.field == field {
				want = s.value
			}
		}
		if got := weight(t, doc, field); got < want {
			t.Errorf("%s is %v after the start, but %v was saved", field, got, want)
		}
	}
}

// check reads the history from the disk of the killed program.
func (k *killed) check(t *testing.T) {
	t.Helper()
	db, err := store.Open(t.Context(), k.data, "test") // checks the integrity
	if err != nil {
		t.Fatal(err)
	}
	defer db.Close()
	for number, s := range k.saved {
		rev, err := db.Revision(t.Context(), 1, number)
		if err != nil {
			t.Errorf("revision %d was called saved: %v", number, err)
			continue
		}
		if got := weight(t, rev.Doc, s.field); got != s.value {
			t.Errorf("revision %d holds %v as %s, not %v", number, got, s.field, s.value)
		}
	}
	head, err := db.Head(t.Context(), 1)
	if err != nil || head.Number < k.last {
		t.Errorf("the head is %d, but %d was called saved; %v", head.Number, k.last, err)
	}
}

// weight reads one field of the first variant's weights.
func weight(t *testing.T, doc []byte, field string) float64 {
	t.Helper()
	var d struct {
		Variants []struct {
			Aircraft struct{ Weights map[string]any }
		}
	}
	if err := json.Unmarshal(doc, &d); err != nil {
		t.Fatal(err)
	}
	v, _ := d.Variants[0].Aircraft.Weights[field].(float64)
	return v
}
