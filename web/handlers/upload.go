package handlers

import (
	"errors"
	"fmt"
	"io"
	"mime"
	"mime/multipart"
	"net/http"
	"path"
	"strings"
	"unicode"
	"unicode/utf8"

	"legwright/internal/perf/sheet"
)

// An upload is the form by which a sheet is sent: a file, or text.
type upload struct {
	text    string
	name    string // of the file; empty when none was chosen
	content []byte // of the file
	large   bool   // one of them was cut off
}

// readUpload reads the form part by part, in memory and no further than a sheet may go.
func readUpload(r *http.Request) (upload, error) {
	var up upload
	if kind, _, _ := mime.ParseMediaType(r.Header.Get("Content-Type")); kind != "multipart/form-data" {
		if err := r.ParseForm(); err != nil {
			return up, err
		}
		up.text = r.PostForm.Get("text")
		return up, nil
	}
	parts, err := r.MultipartReader()
	if err != nil {
		return up, err
	}
	for range 10 {
		part, err := parts.NextPart()
		if errors.Is(err, io.EOF) {
			return up, nil
		}
		if err != nil {
			return up, err
		}
		if err := up.take(part); err != nil {
			return up, err
		}
	}
	return up, errors.New("it has too many parts")
}

func (up *upload) take(part *multipart.Part) error {
	b, err := io.ReadAll(io.LimitReader(part, sheet.MaxBytes+1))
	if err != nil {
		return err
	}
	up.large = up.large || len(b) > sheet.MaxBytes
	switch part.FormName() {
	case "text":
		up.text = string(b)
	case "file":
		if part.FileName() != "" {
			up.name, up.content = fileName(part.FileName()), b
		}
	}
	return nil
}

// chosen is what was sent, or why it cannot be told.
func (up upload) chosen() (name string, content []byte, wrong string) {
	pasted := strings.TrimSpace(up.text) != ""
	switch {
	case up.large:
		return "", nil, fmt.Sprintf("This is larger than what is read, %d bytes. Leave out columns and rows that the table does not need.", sheet.MaxBytes)
	case up.name != "" && pasted:
		return "", nil, "There is a file and there is text. Choose one: empty the text, or leave the file out."
	case up.name != "":
		return up.name, up.content, ""
	case pasted:
		return "pasted.csv", []byte(up.text), ""
	}
	return "", nil, "Choose a file, or put text into the box."
}

// fileName is a name without folders and signs that cannot be seen, of a length that fits a line.
func fileName(name string) string {
	name = path.Base(strings.ReplaceAll(name, `\`, "/"))
	name = strings.TrimSpace(strings.Map(func(r rune) rune {
		if r == utf8.RuneError || !unicode.IsPrint(r) {
			return -1
		}
		return r
	}, name))
	if name == "" || name == "." || name == ".." || name == "/" {
		return "sheet.csv"
	}
	return clip(name)
}
