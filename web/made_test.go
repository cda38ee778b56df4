package web

import (
	"bytes"
	"encoding/json"
	"flag"
	"io"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"testing/fstest"

	"fellreach/terrain"
	"fellreach/terrain/island"
	"fellreach/terrain/raster"
)

var update = flag.Bool("update", false, "write openapi.yaml anew")

// islandFolder holds the demo's rasters once [makeIsland] has made them.
var islandFolder string

func TestMain(m *testing.M) {
	flag.Parse()
	status := m.Run()
	if islandFolder != "" {
		os.RemoveAll(islandFolder)
	}
	os.Exit(status)
}

// makeIsland writes the rasters of the demo, once for all tests.
var makeIsland = sync.OnceValue(func() (err error) {
	if islandFolder, err = os.MkdirTemp("", "fellreach-web-*"); err != nil {
		return err
	}
	place := [6]float64{island.WestM, island.CellM, 0, island.NorthM, 0, -island.CellM}
	heights, cover := terrain.NewGrid(island.Cols, island.Rows), terrain.NewGrid(island.Cols, island.Rows)
	for i, dm := range island.Heights() {
		heights.Cells[i] = float32(dm) / 10
	}
	for i, class := range island.Cover() {
		cover.Cells[i] = float32(class)
	}
	void := float64(island.NoData)
	err = raster.WriteGeoTIFF(filepath.Join(islandFolder, "hallin-dem.tif"), raster.GeoTIFF{Grid: heights, GeoTransform: place, EPSG: island.EPSG, Type: raster.Int16, Scale: 0.1, NoData: &void, Unit: "m"})
	if err != nil {
		return err
	}
	return raster.WriteGeoTIFF(filepath.Join(islandFolder, "hallin-cover.tif"), raster.GeoTIFF{Grid: cover, GeoTransform: place, EPSG: island.EPSG, Type: raster.Uint8, NoData: new(float64)})
})

// demoText is the demo's plan.
func demoText(t testing.TB) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "cmd", "fellreach", "hallin.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// demo puts the demo's plan into a folder of the test's own, beside links to the rasters.
func demo(t testing.TB) (path string) {
	t.Helper()
	if err := makeIsland(); err != nil {
		t.Fatal(err)
	}
	folder := t.TempDir()
	for _, name := range []string{"hallin-dem.tif", "hallin-cover.tif"} {
		if err := os.Symlink(filepath.Join(islandFolder, name), filepath.Join(folder, name)); err != nil {
			t.Fatal(err)
		}
	}
	return write(t, filepath.Join(folder, "hallin.yaml"), demoText(t))
}

func write(t testing.TB, path, text string) string {
	t.Helper()
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return path
}

// serve makes a server for a plan, with a small page.
func serve(t testing.TB, path string) *Server {
	t.Helper()
	page := fstest.MapFS{"index.html": {Data: []byte("<!doctype html>")}, "assets/main-1.mjs": {Data: []byte("1")}}
	s, err := New(Options{Plan: path, Page: page, Log: io.Discard})
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(s.Close)
	return s
}

// A reply is what the server gave back.
type reply struct {
	status int
	header http.Header
	body   []byte
}

// ask sends a request to the server in process, with the headers of a browser's own page.
func ask(s http.Handler, method, target, body string, headers ...string) reply {
	r := httptest.NewRequest(method, target, strings.NewReader(body))
	if body == "" {
		r = httptest.NewRequest(method, target, http.NoBody)
	}
	r.Host = "127.0.0.1:8760"
	for i := 0; i+1 < len(headers); i += 2 {
		if headers[i] == "Host" {
			r.Host = headers[i+1]
		}
		r.Header.Set(headers[i], headers[i+1])
	}
	w := httptest.NewRecorder()
	s.ServeHTTP(w, r)
	return reply{w.Code, w.Header(), w.Body.Bytes()}
}

// get asks for a JSON answer that must be 200.
func get[T any](t testing.TB, s http.Handler, target string) T {
	t.Helper()
	return decoded[T](t, http.StatusOK, ask(s, http.MethodGet, target, ""))
}

// send sends a value as JSON and expects a JSON answer of a status.
func send[T any](t testing.TB, s http.Handler, status int, method, target string, value any) T {
	t.Helper()
	body, err := json.Marshal(value)
	if err != nil {
		t.Fatal(err)
	}
	return decoded[T](t, status, ask(s, method, target, string(body)))
}

func decoded[T any](t testing.TB, status int, a reply) T {
	t.Helper()
	var value T
	if a.status != status {
		t.Fatalf("status %d, want %d: %.600s", a.status, status, a.body)
	}
	d := json.NewDecoder(bytes.NewReader(a.body))
	d.DisallowUnknownFields()
	if err := d.Decode(&value); err != nil {
		t.Fatalf("%v in %.600s", err, a.body)
	}
	return value
}

// refused expects a problem of a status whose detail or one of whose errors holds a text.
func refused(t testing.TB, a reply, status int, holds string) Problem {
	t.Helper()
	p := decoded[Problem](t, status, a)
	if a.header.Get("Content-Type") != "application/problem+json" || p.Status != status || p.Title == "" || p.Detail == "" {
		t.Errorf("%q is no problem as RFC 9457 has it: %s", a.header.Get("Content-Type"), a.body)
	}
	if !strings.Contains(string(a.body), holds) {
		t.Errorf("the problem does not say %q: %s", holds, a.body)
	}
	return p
}
