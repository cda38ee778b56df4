package web

import (
	"encoding/json"
	"fmt"
	"math"
	"net/http"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/terrain"
	"fellreach/terrain/raster"
)

// TestReadPlan checks the summary against the plan's own text.
func TestReadPlan(t *testing.T) {
	p := get[PlanAnswer](t, serve(t, demo(t)), "/api/plan")
	if p.Text != demoText(t) || p.File != "hallin.yaml" || !p.InFile || len(p.FileProblems) != 0 || p.Title != "Hallin river gauges" {
		t.Errorf("file %q, in file %v, problems %v, title %q", p.File, p.InFile, p.FileProblems, p.Title)
	}
	if len(p.Sites) != 10 || len(p.Links) != 10 || len(p.Channels) != 4 || len(p.Antennas) != 5 || len(p.Rasters) != 2 {
		t.Fatalf("%d sites, %d links, %d channels, %d antennas, %d rasters", len(p.Sites), len(p.Links), len(p.Channels), len(p.Antennas), len(p.Rasters))
	}
	ormvik, top := p.Sites[0], p.Sites[1]
	if ormvik.Name != "Ormvik" || ormvik.At != "UTM 27N 591350 5250250" || ormvik.Place.UTM != ormvik.At || ormvik.Mast.HeightM != 18 || ormvik.Mast.WidthM != 0.114 || len(ormvik.Stations) != 2 {
		t.Errorf("Ormvik is %+v", ormvik)
	}
	if got := top.Place; got.Decimal != "47.58295 N, 20.07300 W" || math.Abs(got.Lat-47.58295) > 1e-9 || got.DMS != `47°34'58.6"N 20°04'22.8"W` { // 0.58295*60 = 34.977, 0.977*60 = 58.62
		t.Errorf("Hallin Top lies at %+v", got)
	}
	trunk := ormvik.Stations[1]
	if trunk.Name != "Ormvik/trunk" || trunk.Antenna != "beam" || trunk.AboveGroundM != 18 || trunk.FacingSite != "Hallin Top" || trunk.FeederLengthM != 22 || strings.Join(trunk.Path, "|") != "sites|Ormvik|stations|trunk" {
		t.Errorf("the trunk's station is %+v", trunk)
	}
	if c := p.Channels[3]; c.Name != "trunk" || c.OutHz != 157.9e6 || c.BackHz != 153.3e6 || c.BandwidthHz != 12500 {
		t.Errorf("channel %+v", c)
	}
}

// TestNotations reads each site's place back from each of its three notations.
func TestNotations(t *testing.T) {
	for _, site := range get[PlanAnswer](t, serve(t, demo(t)), "/api/plan").Sites {
		for _, text := range []string{site.Place.Decimal, site.Place.DMS, site.Place.UTM} {
			written, err := terrain.ParseCoordinates(text)
			if err != nil {
				t.Fatal(err)
			}
			back, err := raster.Locate(written)
			if err != nil || math.Abs(back.Lat()-site.Place.Lat) > 2e-5 || math.Abs(back.Lon()-site.Place.Lon) > 3e-5 { // 0.05" and half a metre
				t.Errorf("%s: %q is %v, %v; want %g, %g", site.Name, text, back, err, site.Place.Lon, site.Place.Lat)
			}
		}
	}
}

func TestCheckPlan(t *testing.T) {
	s := serve(t, demo(t))
	check := func(text string) Checked {
		return send[Checked](t, s, http.StatusOK, http.MethodPost, "/api/plan/check", TextBody{text})
	}
	if got := check(demoText(t)); len(got.Problems) != 0 || got.Version != get[PlanAnswer](t, s, "/api/plan").Version {
		t.Errorf("the demo: %+v", got)
	}
	before, _, _ := strings.Cut(demoText(t), `power: "500 mW"`)
	got := check(strings.Replace(demoText(t), `power: "500 mW"`, `power: "500"`, 1))
	if len(got.Problems) != 1 || got.Problems[0].Field != "radios.logger.power" || got.Problems[0].Line != 1+strings.Count(before, "\n") || got.Problems[0].Hint == "" {
		t.Errorf("a power without its unit: %+v", got.Problems)
	}
	got = check(strings.Replace(demoText(t), "47.58295 N", "67.58295 N", 1) + "# and more\n")
	if len(got.Problems) != 0 { // the sea lies beyond the demo's rasters
		t.Errorf("a site in the sea: %+v", got.Problems)
	}
	got = check(strings.Replace(strings.Replace(demoText(t), "47.58295 N", "67.58295 N", 1), "beyond: sea", "beyond: void", 1))
	if len(got.Problems) == 0 || got.Problems[0].Line == 0 {
		t.Errorf("a site outside the rasters: %+v", got.Problems)
	}
	if got = check(""); len(got.Problems) != 1 {
		t.Errorf("no text: %+v", got.Problems)
	}
}

// TestForeignFiles: a text from a client may not make the server open files that the plan on disk does
// not name, neither tried nor saved.
func TestForeignFiles(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	version := get[PlanAnswer](t, s, "/api/plan").Version
	for _, change := range [][2]string{
		{"files: [hallin-dem.tif]", "files: [/etc/passwd]"},
		{"files: [hallin-dem.tif]", "files: [hallin-dem.tif, ../../other.tif]"},
		{"raster: hallin-cover.tif", "raster: /vsicurl/http://example.org/x.tif"},
		{"antennas:\n", "antennas:\n  bought: {kind: table, pattern: /etc/passwd, impedance: \"50 ohm\"}\n"},
	} {
		text := strings.Replace(demoText(t), change[0], change[1], 1)
		if got := send[Checked](t, s, 200, http.MethodPost, "/api/plan/check", TextBody{text}); len(got.Problems) != 1 || !strings.Contains(got.Problems[0].Message, "does not name") || got.Problems[0].Line == 0 {
			t.Errorf("%s is checked: %+v", change[1], got.Problems)
		}
		body, err := json.Marshal(SaveBody{version, text})
		if err != nil {
			t.Fatal(err)
		}
		refused(t, ask(s, http.MethodPut, "/api/plan", string(body)), http.StatusUnprocessableEntity, "in an editor")
	}
	got, err := os.ReadFile(path)
	if err != nil || string(got) != demoText(t) {
		t.Errorf("the file has changed: %v", err)
	}
	// The planner's own editor may name any file.
	if err := os.Link(filepath.Join(islandFolder, "hallin-dem.tif"), filepath.Join(filepath.Dir(path), "other.tif")); err != nil {
		t.Fatal(err)
	}
	write(t, path, strings.Replace(demoText(t), "files: [hallin-dem.tif]", "files: [hallin-dem.tif, other.tif]", 1))
	if got := get[PlanAnswer](t, s, "/api/plan"); len(got.Rasters) != 3 || !got.InFile {
		t.Errorf("after an edit on disk: %d rasters, problems %v", len(got.Rasters), got.FileProblems)
	}
}

// TestSavePlan saves what was tried, comments and all; a file that somebody else has changed stays.
func TestSavePlan(t *testing.T) {
	path := demo(t)
	if err := os.Chmod(path, 0o640); err != nil {
		t.Fatal(err)
	}
	s := serve(t, path)
	read := get[PlanAnswer](t, s, "/api/plan")
	tried := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Edits: []EditBody{EditBody(dragTop(250))}})
	changed := get[PlanAnswer](t, s, "/api/plan?version="+tried.Version)
	if changed.InFile || changed.Text != strings.Replace(demoText(t), westHead, strings.Replace(westHead, `above_ground: "4 m"`, `above_ground: "6.50 m"`, 1), 1) {
		t.Fatalf("the changed text is:\n%s", changed.Text)
	}
	saved := send[Saved](t, s, 200, http.MethodPut, "/api/plan", SaveBody{read.Version, changed.Text})
	info, err := os.Stat(path)
	text, _ := os.ReadFile(path)
	if err != nil || string(text) != changed.Text || saved.Version != tried.Version || info.Mode().Perm() != 0o640 {
		t.Errorf("saved as %s (tried %s), mode %v, %v", saved.Version, tried.Version, info.Mode(), err)
	}
	if now := get[PlanAnswer](t, s, "/api/plan"); now.Version != saved.Version || !now.InFile {
		t.Errorf("the file holds %s", now.Version)
	}
	body, _ := json.Marshal(SaveBody{read.Version, demoText(t)})
	refused(t, ask(s, http.MethodPut, "/api/plan", string(body)), http.StatusConflict, saved.Version)
	write(t, path, changed.Text+"# an edit in an editor\n")
	body, _ = json.Marshal(SaveBody{saved.Version, demoText(t)})
	refused(t, ask(s, http.MethodPut, "/api/plan", string(body)), http.StatusConflict, "read it again")
	if text, _ := os.ReadFile(path); !strings.HasSuffix(string(text), "# an edit in an editor\n") {
		t.Error("the edit is lost")
	}
	left, err := filepath.Glob(filepath.Join(filepath.Dir(path), "*"))
	if err != nil || len(left) != 3 {
		t.Errorf("the folder holds %v", left)
	}
}

// westHead is the demo's site of that name, down to its antenna.
const westHead = `  - name: West head
    at: UTM 27N 558875 5262235
    mast: {kind: pole, height: "4 m", diameter: "42 mm"}
    radio: logger
    antenna: {use: rod, above_ground: "4 m"}`

// TestSaveThroughLink keeps a symbolic link to the plan as one.
func TestSaveThroughLink(t *testing.T) {
	path := demo(t)
	link := filepath.Join(filepath.Dir(path), "link.yaml")
	if err := os.Symlink(path, link); err != nil {
		t.Fatal(err)
	}
	s := serve(t, link)
	send[Saved](t, s, 200, http.MethodPut, "/api/plan", SaveBody{get[PlanAnswer](t, s, "/api/plan").Version, demoText(t) + "# more\n"})
	info, err := os.Lstat(link)
	text, _ := os.ReadFile(path)
	if err != nil || info.Mode()&os.ModeSymlink == 0 || !strings.HasSuffix(string(text), "# more\n") {
		t.Errorf("the link is %v, %v", info.Mode(), err)
	}
}

// TestBrokenOnDisk breaks the file while it is served: questions about the file get its problem with
// the line, the last good version goes on answering, and a mended file is taken up.
func TestBrokenOnDisk(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	good := get[PlanAnswer](t, s, "/api/plan")
	write(t, path, strings.Replace(demoText(t), "title: Hallin", "titel: Hallin", 1))
	p := refused(t, ask(s, http.MethodGet, "/api/links", ""), http.StatusUnprocessableEntity, "titel")
	if len(p.Errors) != 1 || p.Errors[0].Line != 4 || p.Errors[0].Column != 1 || p.Errors[0].Field != "titel" || p.Errors[0].Hint == "" {
		t.Errorf("errors %+v", p.Errors)
	}
	still := get[PlanAnswer](t, s, "/api/plan")
	if still.Version != good.Version || still.InFile || len(still.FileProblems) != 1 || still.FileProblems[0].Line != 4 {
		t.Errorf("version %s, in file %v, problems %v", still.Version, still.InFile, still.FileProblems)
	}
	get[json.RawMessage](t, s, "/api/links?version="+good.Version)
	send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Version: good.Version, Edits: []EditBody{EditBody(dragTop(1))}, Link: "trunk"})
	if err := os.Remove(path); err != nil {
		t.Fatal(err)
	}
	refused(t, ask(s, http.MethodGet, "/api/links", ""), http.StatusInternalServerError, "no such file")
	if gone := get[PlanAnswer](t, s, "/api/plan"); len(gone.FileProblems) != 1 || gone.Version != good.Version {
		t.Errorf("without a file: %v", gone.FileProblems)
	}
	write(t, path, demoText(t)+"# mended\n")
	if mended := get[PlanAnswer](t, s, "/api/plan"); !mended.InFile || len(mended.FileProblems) != 0 || !strings.HasSuffix(mended.Text, "# mended\n") {
		t.Errorf("mended: in file %v, problems %v", mended.InFile, mended.FileProblems)
	}
}

// TestVersionsEnd: only so many versions are held, the file's among them; asking for one that has gone
// says so.
func TestVersionsEnd(t *testing.T) {
	s := serve(t, demo(t))
	first := get[PlanAnswer](t, s, "/api/plan")
	var tried []string
	for i := range maxVersions + 3 {
		text := demoText(t) + fmt.Sprintf("# %d\n", i)
		tried = append(tried, send[Checked](t, s, 200, http.MethodPost, "/api/plan/check", TextBody{text}).Version)
	}
	if len(s.shelf.held) > maxVersions+1 {
		t.Errorf("%d versions are held", len(s.shelf.held))
	}
	get[json.RawMessage](t, s, "/api/plan?version="+first.Version)
	get[json.RawMessage](t, s, "/api/plan?version="+tried[len(tried)-1])
	refused(t, ask(s, http.MethodGet, "/api/plan?version="+tried[0], ""), http.StatusNotFound, "again")
	for _, v := range s.shelf.held {
		if v.users != 0 {
			t.Errorf("version %s has %d users", v.id, v.users)
		}
	}
	if got, want := s.shelf.file.ground.users, len(s.shelf.held); got != want {
		t.Errorf("the ground has %d users, want %d", got, want)
	}
}

// TestManySites refuses a plan of 10,000 sites with a clear message, whichever limit it meets.
func TestManySites(t *testing.T) {
	s := serve(t, demo(t))
	var b strings.Builder
	b.WriteString(demoText(t)[:strings.Index(demoText(t), "links:\n")])
	for i := range 10000 {
		fmt.Fprintf(&b, "  - {name: S%d, at: UTM 27N %d %d, radio: logger, antenna: {use: rod, above_ground: \"4 m\"}, feeder: {use: thin, length: \"6 m\"}}\n", i, 560000+i%200*50, 5240000+i/200*50)
	}
	b.WriteString("links:\n  - {from: S1, to: S9999, channel: poll}\n")
	body, err := json.Marshal(TextBody{b.String()})
	if err != nil {
		t.Fatal(err)
	}
	a := ask(s, http.MethodPost, "/api/plan/check", string(body))
	if a.status == 200 {
		if got := decoded[Checked](t, 200, a); len(got.Problems) > 0 && !strings.Contains(got.Problems[0].Message, "than") {
			t.Errorf("%+v", got.Problems)
		}
		return
	}
	refused(t, a, http.StatusUnprocessableEntity, "1048576")
}
