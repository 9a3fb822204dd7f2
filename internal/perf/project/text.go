package project

import (
	"encoding/json"
	"errors"
	"fmt"
	"regexp"
	"strconv"
	"strings"
	"unicode/utf8"

	"legwright/internal/perf/input"
)

// A jsonText is the text of a document; after check it is known to be well formed.
type jsonText []byte

// A span is where a value stands in the text: from its first byte to behind its last.
type span struct{ start, end int }

// A member is one "key": value of an object.
type member struct {
	key   string
	sound bool // the key is free of broken escapes
	span
}

// check refuses text that is too large, not JSON, or nested too deeply.
func (t jsonText) check() error {
	if len(t) > MaxBytes {
		return &input.Error{Text: fmt.Sprintf("a document of %d bytes", len(t)), Accepts: fmt.Sprintf("up to %d bytes", MaxBytes), Err: input.ErrRange}
	}
	if !utf8.Valid(t) {
		return t.malformed(t.firstInvalid(), "bytes that are not UTF-8")
	}
	var whole json.RawMessage
	if err := json.Unmarshal(t, &whole); err != nil {
		var syntax *json.SyntaxError
		if !errors.As(err, &syntax) {
			return &input.Error{Err: fmt.Errorf("%w: %w", input.ErrMalformed, err)}
		}
		at := int(syntax.Offset)
		if !strings.HasPrefix(syntax.Error(), "unexpected end") {
			at-- // Offset counts the byte at fault as read.
		}
		return t.malformed(at, syntax.Error())
	}
	return t.checkDepth()
}

func (t jsonText) firstInvalid() int {
	at := 0
	for at < len(t) {
		r, n := utf8.DecodeRune(t[at:])
		if r == utf8.RuneError && n == 1 {
			break
		}
		at += n
	}
	return at
}

func (t jsonText) checkDepth() error {
	depth := 0
	for i := 0; i < len(t); i++ {
		switch t[i] {
		case '"':
			i = t.endOfString(i) - 1
		case '{', '[':
			if depth++; depth > maxDepth {
				return &input.Error{Text: "what begins at " + t.position(i), Accepts: fmt.Sprintf("arrays and objects up to %d deep", maxDepth), Err: input.ErrRange}
			}
		case '}', ']':
			depth--
		}
	}
	return nil
}

func (t jsonText) malformed(at int, what string) error {
	return &input.Error{Err: fmt.Errorf("%w at %s: %s", input.ErrMalformed, t.position(at), what)}
}

// position says the line and the column, in characters, of the byte at.
func (t jsonText) position(at int) string {
	before := string(t[:min(max(at, 0), len(t))])
	line := strings.Count(before, "\n") + 1
	column := utf8.RuneCountInString(before[strings.LastIndexByte(before, '\n')+1:]) + 1
	return fmt.Sprintf("line %d, column %d", line, column)
}

// whole is the span of the document's one value.
func (t jsonText) whole() span {
	start := t.space(0)
	return span{start, t.skip(start)}
}

// first is the byte that tells what kind of value v is.
func (t jsonText) first(v span) byte { return t[v.start] }

// clip is the text of v, shortened for a message.
func (t jsonText) clip(v span) string {
	const longest = 60
	raw := t[v.start:v.end]
	if len(raw) <= longest {
		return string(raw)
	}
	cut := longest
	for !utf8.RuneStart(raw[cut]) {
		cut--
	}
	return string(raw[:cut]) + "…"
}

// space returns the first place from i on that is not white space.
func (t jsonText) space(i int) int {
	for i < len(t) && strings.IndexByte(" \t\r\n", t[i]) >= 0 {
		i++
	}
	return i
}

// skip returns the place behind the value that begins at i.
func (t jsonText) skip(i int) int {
	switch t[i] {
	case '"':
		return t.endOfString(i)
	case '{', '[':
		depth := 0
		for ; ; i++ {
			switch t[i] {
			case '"':
				i = t.endOfString(i) - 1
			case '{', '[':
				depth++
			case '}', ']':
				if depth--; depth == 0 {
					return i + 1
				}
			}
		}
	}
	for i < len(t) && strings.IndexByte(",]} \t\r\n", t[i]) < 0 {
		i++
	}
	return i
}

func (t jsonText) endOfString(i int) int {
	for i++; t[i] != '"'; i++ {
		if t[i] == '\\' {
			i++
		}
	}
	return i + 1
}

// members lists up to limit members of the object v; more reports that there are others.
func (t jsonText) members(v span, limit int) (list []member, more bool) {
	i := t.space(v.start + 1)
	for t[i] != '}' {
		if len(list) == limit {
			return list, true
		}
		end := t.skip(i)
		var m member
		m.key, m.sound = t.str(span{i, end})
		i = t.space(t.space(end) + 1)
		m.span = span{i, t.skip(i)}
		list = append(list, m)
		i = t.next(m.end)
	}
	return list, false
}

// items lists up to limit items of the array v; more reports that there are others.
func (t jsonText) items(v span, limit int) (list []span, more bool) {
	i := t.space(v.start + 1)
	for t[i] != ']' {
		if len(list) == limit {
			return list, true
		}
		item := span{i, t.skip(i)}
		list = append(list, item)
		i = t.next(item.end)
	}
	return list, false
}

// next returns the beginning of what follows a value that ended at i: the next key or item, or the closing bracket.
func (t jsonText) next(i int) int {
	if i = t.space(i); t[i] == ',' {
		i = t.space(i + 1)
	}
	return i
}

// number reads the number v; ok is false where it exceeds floating-point range.
func (t jsonText) number(v span) (x float64, ok bool) {
	x, err := strconv.ParseFloat(string(t[v.start:v.end]), 64)
	return x, err == nil
}

// surrogates matches an escaped backslash, an escaped surrogate pair, or half of one.
var surrogates = regexp.MustCompile(`\\\\|\\u[dD][89abAB][0-9a-fA-F]{2}\\u[dD][c-fC-F][0-9a-fA-F]{2}|\\u[dD][89a-fA-F][0-9a-fA-F]{2}`)

// str reads the string v; sound is false where it escapes half a surrogate pair,
// for which encoding/json would silently put a replacement character.
func (t jsonText) str(v span) (s string, sound bool) {
	raw := t[v.start:v.end]
	for _, m := range surrogates.FindAll(raw, -1) {
		if len(m) == len(`\ud800`) {
			return "", false
		}
	}
	return s, json.Unmarshal(raw, &s) == nil
}
