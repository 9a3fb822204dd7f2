package handlers

import (
	"net/http"
	"path/filepath"

	"github.com/go-chi/chi/v5"

	"legwright/web/views"
)

// backups lists the backups in the data folder.
func (s *site) backups(w http.ResponseWriter, r *http.Request) error {
	list, err := s.db.Backups()
	if err != nil {
		return err
	}
	v := views.Backups{Folder: s.db.Folder()}
	for _, k := range list {
		v.List = append(v.List, views.NewBackup(k.Name, k.At, k.Size))
	}
	return render(w, r, http.StatusOK, views.BackupPage(v))
}

// makeBackup writes one more.
func (s *site) makeBackup(w http.ResponseWriter, r *http.Request) error {
	path, err := s.db.KeepBackup(r.Context())
	if err != nil {
		return err
	}
	s.log.Info("backup made", "file", path)
	http.Redirect(w, r, "/backups#"+filepath.Base(path), http.StatusSeeOther)
	return nil
}

// downloadBackup answers with one of them.
func (s *site) downloadBackup(w http.ResponseWriter, r *http.Request) error {
	name := chi.URLParam(r, "name")
	f, err := s.db.OpenBackup(name)
	if err != nil {
		return err
	}
	defer f.Close()
	info, err := f.Stat()
	if err != nil {
		return err
	}
	w.Header().Set("Content-Type", "application/vnd.sqlite3")
	w.Header().Set("Cache-Control", "no-store")
	attach(w, name)
	http.ServeContent(w, r, "", info.ModTime(), f)
	return nil
}
