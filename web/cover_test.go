package web

import (
	"bufio"
	"encoding/json"
	"fmt"
	"image/color"
	"math"
	"net/http"
	"net/http/httptest"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"fellreach/link/coverage"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
	"github.com/paulmach/orb/geojson"
	"github.com/paulmach/orb/planar"
)

const gauges = "Hallin Top/gauges"

// coverText is the demo's plan with a map of another range and cell.
func coverText(t testing.TB, rangeText, cellText string) string {
	return strings.NewReplacer(`range: "25 km"`, `range: "`+rangeText+`"`, `cell: "60 m"`, `cell: "`+cellText+`"`).Replace(demoText(t))
}

func smallCover(t testing.TB) (path string) {
	path = demo(t)
	return write(t, path, coverText(t, "3 km", "100 m"))
}

// ended waits for the end of a job.
func ended(t testing.TB, s *Server, id string) CoverJob {
	t.Helper()
	for {
		job := get[CoverJob](t, s, "/api/coverage/"+id)
		if job.State != jobRunning {
			return job
		}
		time.Sleep(5 * time.Millisecond)
	}
}

func start(t testing.TB, s *Server) CoverJob {
	t.Helper()
	return send[CoverJob](t, s, http.StatusOK, http.MethodPost, "/api/coverage", CoverBody{Site: gauges})
}

// TestCover holds a job's map against the one that the cover command's own call makes.
func TestCover(t *testing.T) {
	path := smallCover(t)
	s := serve(t, path)
	job := ended(t, s, start(t, s).ID)
	if job.State != jobFinished || job.Result == nil || job.Total == 0 || job.Done != job.Total {
		t.Fatalf("%+v", job)
	}
	n := direct(t, path)
	sites, err := n.CoverageSites(gauges)
	if err != nil {
		t.Fatal(err)
	}
	m, err := coverage.Compute(t.Context(), n.Ground, sites[0].Task, coverage.Layers{Loss: true, Margin: true}, nil)
	if err != nil {
		t.Fatal(err)
	}
	if want := sites[0].Report(m); job.Result.Cells != want.Cells || job.Result.Bands[0].AreaKm2 != want.Bands[0].AreaKm2 || job.Result.Check != want.Check {
		t.Errorf("%+v, want %+v", job.Result.SiteReport, want)
	}
	places := []orb.Point{}
	for _, at := range [][2]int{{30, 20}, {10, 31}, {41, 50}, {25, 25}} {
		places = append(places, orb.Point{float64(at[0]) + 0.5, float64(at[1]) + 0.5})
	}
	corners := append([]orb.Point{}, places...)
	if err := m.Frame.Places(corners); err != nil {
		t.Fatal(err)
	}
	for i, p := range corners {
		at := int(places[i][1])*m.Frame.Cols + int(places[i][0])
		v := get[CoverValue](t, s, "/api/coverage/"+job.ID+"/value?lon="+number(p.Lon())+"&lat="+number(p.Lat()))
		if v.MarginDB == nil || *v.MarginDB != float64(m.MarginDB[at]) || *v.LossDB != float64(m.LossDB[at]) {
			t.Errorf("cell %v: %+v, want %g and %g", places[i], v, m.MarginDB[at], m.LossDB[at])
		}
		checkPixel(t, s, job, p, float64(m.MarginDB[at]))
	}
	if v := get[CoverValue](t, s, "/api/coverage/"+job.ID+"/value?lon=0&lat=0"); v.MarginDB != nil || v.LossDB != nil {
		t.Errorf("far away: %+v", v)
	}
}

func number(x float64) string {
	text, _ := json.Marshal(x)
	return string(text)
}

// checkPixel compares a pixel of a tile, much finer than a cell, with the legend's colour of a margin.
func checkPixel(t *testing.T, s *Server, job CoverJob, p orb.Point, marginDB float64) {
	t.Helper()
	address, col, row := tileAt(job.Result.Tiles, job.Result.MaxZoom+3, p)
	got := color.NRGBAModel.Convert(tile(t, s, address).At(int(math.Round(min(max(col, 0), 255))), int(math.Round(min(max(row, 0), 255))))).(color.NRGBA)
	want := "clear"
	for _, l := range job.Result.Legend {
		if marginDB >= l.FromDB {
			want = l.Color
		}
	}
	if name := (marginColor{got.R, got.G, got.B}).hex(); (got.A == 0) != (want == "clear") || got.A != 0 && name != want {
		t.Errorf("a margin of %g dB is drawn %s, opacity %d, want %s", marginDB, name, got.A, want)
	}
}

// TestCoverBands: the polygons lie within the range, and their areas are about those of the report.
func TestCoverBands(t *testing.T) {
	s := serve(t, smallCover(t))
	job := ended(t, s, start(t, s).ID)
	a := ask(s, http.MethodGet, "/api/coverage/"+job.ID+"/bands", "")
	layer, err := geojson.UnmarshalFeatureCollection(a.body)
	if err != nil || len(layer.Features) == 0 || a.header.Get("Content-Type") != "application/geo+json" {
		t.Fatalf("%v, %v", err, a.header)
	}
	site := get[PlanAnswer](t, s, "/api/plan").Sites[1].Place
	var drawn, want float64
	for _, f := range layer.Features {
		for _, polygon := range f.Geometry.(orb.MultiPolygon) {
			if d, _, _ := raster.Inverse(polygon[0][0], orb.Point{site.Lon, site.Lat}); d > 3100 {
				t.Errorf("a corner lies %g m from the site", d)
			}
		}
		// A degree is 111.2 km of latitude and 75.2 km of longitude at 47.58 degrees. Patches of few cells
		// belong to the band around them in the polygons, so that only all bands together compare.
		drawn += planar.Area(f.Geometry) * 111.2 * 75.2
		want += f.Properties["area_km2"].(float64)
	}
	if math.Abs(drawn/want-1) > 0.05 {
		t.Errorf("the polygons have %g km2, the bands %g", drawn, want)
	}
}

// TestCoverRasters: the rasters that are handed out hold what the values at a place say.
func TestCoverRasters(t *testing.T) {
	s := serve(t, smallCover(t))
	job := ended(t, s, start(t, s).ID)
	at := get[PlanAnswer](t, s, "/api/plan").Sites[1].Place
	value := get[CoverValue](t, s, fmt.Sprintf("/api/coverage/%s/value?lon=%g&lat=%g", job.ID, at.Lon+0.004, at.Lat))
	for layer, want := range map[string]*float64{"margin": value.MarginDB, "loss": value.LossDB} {
		a := ask(s, http.MethodGet, "/api/coverage/"+job.ID+"/"+layer+".tif", "")
		if a.status != http.StatusOK || !strings.HasPrefix(a.header.Get("Content-Type"), "image/tiff") {
			t.Fatalf("%s: status %d, %v", layer, a.status, a.header)
		}
		path := filepath.Join(t.TempDir(), layer+".tif")
		if err := os.WriteFile(path, a.body, 0o600); err != nil {
			t.Fatal(err)
		}
		s.jobs.mutex.Lock()
		frame := s.jobs.jobs[0].result.frame
		s.jobs.mutex.Unlock()
		cells, err := raster.ReadCOG(path, frame)
		if err != nil {
			t.Fatal(err)
		}
		found := false
		for _, cell := range cells {
			found = found || want != nil && float64(cell) == *want
		}
		if len(cells) != frame.Cols*frame.Rows || !found {
			t.Errorf("%s: %d cells, none of them %v", layer, len(cells), want)
		}
	}
}

// TestCoverEvents watches a job over a socket: progress that grows, the finished job once, then the end.
func TestCoverEvents(t *testing.T) {
	path := demo(t)
	write(t, path, coverText(t, "12 km", "60 m"))
	s := serve(t, path)
	server := httptest.NewServer(s)
	defer server.Close()
	job := start(t, s)
	for _, when := range []string{"while it runs", "when it has ended"} {
		response, err := http.Get(server.URL + "/api/coverage/" + job.ID + "/events")
		if err != nil {
			t.Fatal(err)
		}
		if kind := response.Header.Get("Content-Type"); kind != "text/event-stream" {
			t.Errorf("%s: content type %q", when, kind)
		}
		var event string
		progress, finished, last := 0, 0, -1
		for lines := bufio.NewScanner(response.Body); lines.Scan(); {
			if name, ok := strings.CutPrefix(lines.Text(), "event: "); ok {
				event = name
			}
			data, ok := strings.CutPrefix(lines.Text(), "data: ")
			switch {
			case !ok:
			case event == "progress":
				var p CoverProgress
				if err := json.Unmarshal([]byte(data), &p); err != nil || p.Done < last || finished > 0 {
					t.Errorf("%s: %q after %d radials, %v", when, data, last, err)
				}
				last = p.Done
				progress++
			case event == "finished":
				var done CoverJob
				if err := json.Unmarshal([]byte(data), &done); err != nil || done.State != jobFinished || done.Result == nil {
					t.Errorf("%s: %.200s, %v", when, data, err)
				}
				finished++
			}
		}
		response.Body.Close()
		if finished != 1 || progress == 0 && when == "while it runs" {
			t.Errorf("%s: progress %d times, finished %d times", when, progress, finished)
		}
	}
	refused(t, ask(s, http.MethodGet, "/api/coverage/none/events", ""), http.StatusNotFound, "none")
}

// TestCoverCancel cancels a job, and again: the second time there is nothing to cancel. So many run at
// once and no more; the server ends though one still runs.
func TestCoverCancel(t *testing.T) {
	path := demo(t)
	write(t, path, coverText(t, "40 km", "30 m"))
	s := serve(t, path)
	first, second := start(t, s), start(t, s)
	refused(t, ask(s, http.MethodPost, "/api/coverage", `{"site":"`+gauges+`"}`), http.StatusTooManyRequests, "cancel")
	refused(t, ask(s, http.MethodGet, "/api/coverage/"+second.ID+"/bands", ""), http.StatusConflict, "running")
	refused(t, ask(s, http.MethodGet, "/tiles/coverage/"+second.ID+"/9/0/0.png", ""), http.StatusConflict, "running")
	if a := ask(s, http.MethodDelete, "/api/coverage/"+first.ID, ""); a.status != http.StatusOK || !strings.Contains(string(a.body), jobCancelled) {
		t.Fatalf("status %d: %s", a.status, a.body)
	}
	refused(t, ask(s, http.MethodDelete, "/api/coverage/"+first.ID, ""), http.StatusConflict, "already")
	refused(t, ask(s, http.MethodDelete, "/api/coverage/none", ""), http.StatusNotFound, "none")
	refused(t, ask(s, http.MethodGet, "/api/coverage/"+first.ID+"/value?lon=0&lat=0", ""), http.StatusConflict, "cancelled")
}

func TestCoverMistakes(t *testing.T) {
	path := demo(t)
	write(t, path, coverText(t, "150 km", "30 m"))
	s := serve(t, path)
	for body, says := range map[string]string{
		`{"site":"Nowhere"}`:        "Nowhere",
		`{"site":""}`:               "name a site",
		`{"site":"` + gauges + `"}`: "fellreach cover",
	} {
		refused(t, ask(s, http.MethodPost, "/api/coverage", body), http.StatusUnprocessableEntity, says)
	}
	refused(t, ask(s, http.MethodPost, "/api/coverage", `{"site":"x","version":"0"}`), http.StatusNotFound, "again")
	for _, v := range s.shelf.held {
		if v.users != 0 {
			t.Errorf("version %s has %d users", v.id, v.users)
		}
	}
	if coverage := get[PlanAnswer](t, s, "/api/plan").Coverage; len(coverage) != 1 || coverage[0] != (CoverSummary{gauges, 150}) {
		t.Errorf("%+v", coverage)
	}
}

// TestKeptJobs: only so many results are kept, the newest.
func TestKeptJobs(t *testing.T) {
	s := serve(t, smallCover(t))
	var ids []string
	for range maxKeptJobs + 1 {
		ids = append(ids, ended(t, s, start(t, s).ID).ID)
	}
	refused(t, ask(s, http.MethodGet, "/api/coverage/"+ids[0], ""), http.StatusNotFound, ids[0])
	if job := get[CoverJob](t, s, "/api/coverage/"+ids[1]); job.Result == nil {
		t.Errorf("%+v", job)
	}
}

// TestMarginColors: colours begin at their step, below 0 and in voids there is none, and the palette is
// clear there alone.
func TestMarginColors(t *testing.T) {
	for margin, want := range map[float64]uint8{-0.01: 0, 0: 1, 4.99: 1, 5: 2, 39.9: 8, 40: 9, 400: 9, math.Inf(1): 9} {
		if got := marginClass(margin); got != want {
			t.Errorf("a margin of %g dB has colour %d, want %d", margin, got, want)
		}
	}
	if marginClass(math.NaN()) != 0 {
		t.Error("a void has a colour")
	}
	for i, c := range marginPalette() {
		if _, _, _, a := c.RGBA(); (a == 0) != (i == 0) {
			t.Errorf("colour %d has opacity %d", i, a)
		}
	}
}
