package handlers

import (
	"errors"
	"fmt"
	"io"
	"mime"
	"net/http"
	"strings"

	"legwright/internal/perf/input"
	"legwright/internal/perf/project"
	"legwright/web/views"
)

// export answers with the project as a file: the document as the database keeps it.
func (s *site) export(w http.ResponseWriter, r *http.Request) error {
	h, err := s.head(r)
	if err != nil {
		return err
	}
	attach(w, h.spec.Name+".json")
	return writeDocument(w, h)
}

// attach has the browser save the answer under the name, in which signs that part folders and drives are replaced.
func attach(w http.ResponseWriter, name string) {
	safe := strings.Map(func(c rune) rune {
		if c < ' ' || strings.ContainsRune(`"\/:*?<>|`, c) {
			return '_'
		}
		return c
	}, name)
	w.Header().Set("Content-Disposition", mime.FormatMediaType("attachment", map[string]string{"filename": safe}))
}

// importProject takes a project file into the database as a new project. A file that
// is not one changes nothing, and the page says what is wrong with it, line by line.
func (s *site) importProject(w http.ResponseWriter, r *http.Request) error {
	name, text, err := uploaded(r, "file")
	if errors.Is(err, errNoFile) {
		return s.refuseFile(w, r, "", err)
	}
	if err != nil {
		return err
	}
	spec, err := project.Decode(text)
	if err != nil {
		return s.refuseFile(w, r, name, err)
	}
	rev, err := s.create(r, spec, "imported from the file "+clip(name))
	if err != nil {
		return err
	}
	http.Redirect(w, r, fmt.Sprintf("/projects/%d", rev.Project), http.StatusSeeOther)
	return nil
}

// mostFaults is how many faults of a file the page lists.
const mostFaults = 20

func (s *site) refuseFile(w http.ResponseWriter, r *http.Request, name string, cause error) error {
	v, err := s.shelfView(r)
	if err != nil {
		return err
	}
	v.File = name
	list := input.Errors(cause)
	for i, e := range list {
		if i == mostFaults {
			v.Faults = append(v.Faults, fmt.Sprintf("and %d more", len(list)-mostFaults))
			break
		}
		v.Faults = append(v.Faults, e.Error())
	}
	if len(list) == 0 {
		v.Faults = []string{cause.Error()}
	}
	return render(w, r, http.StatusUnprocessableEntity, views.ShelfPage(v))
}

var errNoFile = errors.New("no file was chosen")

// uploaded reads the one file of a form.
func uploaded(r *http.Request, field string) (name string, content []byte, err error) {
	const inMemory = 1 << 20
	if kind, _, err := mime.ParseMediaType(r.Header.Get("Content-Type")); err != nil || kind != "multipart/form-data" {
		return "", nil, &problem{http.StatusBadRequest, "Not understood", "The form carries no file."}
	}
	if err := r.ParseMultipartForm(inMemory); err != nil {
		return "", nil, badForm(err)
	}
	defer r.MultipartForm.RemoveAll()
	f, head, err := r.FormFile(field)
	if errors.Is(err, http.ErrMissingFile) {
		return "", nil, errNoFile
	}
	if err != nil {
		return "", nil, badForm(err)
	}
	defer f.Close()
	content, err = io.ReadAll(f)
	return head.Filename, content, err
}
