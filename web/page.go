package web

import (
	"embed"
	"errors"
	"io"
	"io/fs"
	"mime"
	"net/http"
	"path"
	"strings"
	"time"
)

// The page is built by `make app`; a .keep file lets the program build without it.
//
//go:embed all:app/dist
var dist embed.FS

// Page returns the embedded page.
func Page() fs.FS {
	page, err := fs.Sub(dist, "app/dist")
	if err != nil {
		panic("web: " + err.Error()) // the path is a constant
	}
	return page
}

const noPage = "This fellreach was built without its page: run `make app` (it needs Node 20) and build again. The API under /api/ works all the same."

// servePage answers with a file of the page. Hashed assets are kept by browsers for good, all else
// is asked for again.
func (s *Server) servePage(w http.ResponseWriter, r *http.Request) {
	name := strings.TrimPrefix(path.Clean(r.URL.Path), "/")
	if name == "" {
		name = "index.html"
	}
	f, err := s.page.Open(name)
	if err == nil {
		defer f.Close()
	}
	content, seekable := f.(io.ReadSeeker)
	if err == nil && seekable && isFile(f) {
		w.Header().Set("Content-Type", contentType(name))
		if strings.HasPrefix(name, "assets/") {
			w.Header().Set("Cache-Control", "max-age=31536000, immutable")
		}
		http.ServeContent(w, r, "", time.Time{}, content)
		return
	}
	if _, err := fs.Stat(s.page, "index.html"); errors.Is(err, fs.ErrNotExist) && name == "index.html" {
		refuse(w, http.StatusServiceUnavailable, noPage)
		return
	}
	refuse(w, http.StatusNotFound, "there is nothing here; the page is at / and the API's description at /api/openapi.json")
}

func isFile(f fs.File) bool {
	info, err := f.Stat()
	return err == nil && info.Mode().IsRegular()
}

// contentType is that of a file of the page, the same on every machine.
func contentType(name string) string {
	switch ext := path.Ext(name); ext {
	case ".woff2":
		return "font/woff2"
	case ".md", ".keep":
		return "text/plain; charset=utf-8"
	default:
		if known := mime.TypeByExtension(ext); known != "" {
			return known
		}
		return "application/octet-stream"
	}
}
