package web

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"encoding/xml"
	"errors"
	"io"
	"math"
	"mime"
	"net/http"
	"strings"
	"testing"

	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/google/go-cmp/cmp"
	"github.com/paulmach/orb/geojson"
)

// direct computes the links of a plan's text without the server.
func direct(t testing.TB, path string) *plan.Network {
	t.Helper()
	p, err := plan.Load(path)
	if err != nil {
		t.Fatal(err)
	}
	n, err := p.Open()
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(n.Close)
	return n
}

// linksText is what links --format json prints for a plan.
func linksText(t testing.TB, path string) string {
	t.Helper()
	result, err := direct(t, path).Run(t.Context(), nil)
	if err != nil {
		t.Fatal(err)
	}
	var b strings.Builder
	if err := report.LinksJSON(&b, result); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// same compares two JSON texts but for their spacing.
func same(t testing.TB, what, got, want string) {
	t.Helper()
	var a, b any
	if err := errors.Join(json.Unmarshal([]byte(got), &a), json.Unmarshal([]byte(want), &b)); err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff(b, a); diff != "" {
		t.Errorf("%s differs (-want +got):\n%.2000s", what, diff)
	}
}

// TestLinks: the API answers what the command prints, figure by figure.
func TestLinks(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	same(t, "GET /api/links", string(ask(s, http.MethodGet, "/api/links", "").body), linksText(t, path))
	same(t, "the file links.json", string(ask(s, http.MethodGet, "/api/files/links.json", "").body), linksText(t, path))
}

// TestTry: links tried are those of the plan with the change written into its file, in full precision,
// whatever was solved and remembered before.
func TestTry(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	for _, tc := range []struct{ old, new string }{
		{"UTM 27N 558875 5262235", "UTM 27N 559000 5262000"},
		{`{use: stick, above_ground: "8 m"}`, `{use: pair, above_ground: "9 m"}`},
		{`{use: rod, above_ground: "16 m", standoff`, `{use: rod, above_ground: "12 m", standoff`},
	} {
		changed := strings.Replace(demoText(t), tc.old, tc.new, 1)
		other := demo(t)
		write(t, other, changed)
		checked := send[Checked](t, s, 200, http.MethodPost, "/api/plan/check", TextBody{changed})
		same(t, tc.new, string(ask(s, http.MethodGet, "/api/links?version="+checked.Version, "").body), linksText(t, other))
	}
	// An edit by path gives the same version as the same text typed.
	tried := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Edits: []EditBody{EditBody(jsonEdit([]string{"sites", "West head", "at"}, "UTM 27N 559000 5262000"))}})
	if want := idOf([]byte(strings.Replace(demoText(t), "UTM 27N 558875 5262235", "UTM 27N 559000 5262000", 1))); tried.Version != want {
		t.Errorf("version %s, want %s", tried.Version, want)
	}
	if get[PlanAnswer](t, s, "/api/plan").Text != demoText(t) {
		t.Error("trying has changed the file")
	}
}

// TestTryOneLink: one link alone has the figures that it has among all.
func TestTryOneLink(t *testing.T) {
	s := serve(t, demo(t))
	edits := []EditBody{EditBody(dragTop(300))}
	all := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Edits: edits})
	one := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Edits: edits, Link: "West head..Ormvik/coast"})
	if all.Version != one.Version || len(one.Links.Links) != 1 || len(all.Links.Links) != 10 {
		t.Fatalf("%d and %d links", len(all.Links.Links), len(one.Links.Links))
	}
	if diff := cmp.Diff(all.Links.Links[9].Directions, one.Links.Links[0].Directions); diff != "" {
		t.Errorf("the budgets differ: %s", diff)
	}
}

// TestTryAdds adds a site and a link to it, takes them away again, and is back at the file's version.
func TestTryAdds(t *testing.T) {
	s := serve(t, demo(t))
	edit := func(do string, value string, path ...string) EditBody {
		return EditBody{do, path, json.RawMessage(value)}
	}
	add := []EditBody{
		edit(plan.AddEntry, `{"name":"New gauge","at":"47.51000 N, 20.10000 W","mast":{"kind":"pole","height":"4 m"},"radio":"logger","antenna":{"use":"rod","above_ground":"4 m"}}`, "sites"),
		edit(plan.AddEntry, `{"from":"New gauge","to":"Hallin Top/gauges","channel":"poll"}`, "links"),
	}
	added := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Edits: add})
	last := added.Links.Links[len(added.Links.Links)-1]
	if len(added.Links.Links) != 11 || last.From != "New gauge" || math.Abs(last.DistanceKm-8.36) > 0.05 { // 0.07295 degrees of latitude, 8.11 km, and 0.027 of longitude, 2.03 km
		t.Errorf("%d links, the last from %s over %g km", len(added.Links.Links), last.From, last.DistanceKm)
	}
	back := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Version: added.Version, Edits: []EditBody{
		edit(plan.RemoveKey, ``, "links", "10"), edit(plan.RemoveKey, ``, "sites", "New gauge"),
	}})
	if back.Version != idOf([]byte(demoText(t))) {
		t.Error("taken away, they leave something behind")
	}
}

// TestTryMistakes: what cannot be has its line in the changed text, or says what the edit lacks.
func TestTryMistakes(t *testing.T) {
	s := serve(t, demo(t))
	name := 1 + strings.Count(demoText(t)[:strings.Index(demoText(t), westHead)], "\n") // the line of West head's name
	for _, tc := range []struct {
		path        []string
		value       string
		field, says string
		line        int
	}{
		{[]string{"sites", "West head", "antenna", "above_ground"}, `"4000 m"`, "sites[7].antenna.above_ground", "0.1 to 1000 m", name + 4},
		{[]string{"sites", "West head", "antenna", "above_ground"}, `"1e9 m"`, "sites[7].antenna.above_ground", "", name + 4},
		{[]string{"sites", "West head", "antenna", "above_ground"}, `7`, "sites[7].antenna.above_ground", "lacks its unit", name + 4},
		{[]string{"sites", "West head", "antenna", "use"}, `"horn"`, "sites[7].antenna.use", "horn", name + 4},
		{[]string{"sites", "West head", "at"}, `"UTM 27X 1 2"`, "sites[7].at", "", name + 1},
		{[]string{"sites", "West head", "at"}, `"UTM 27N 591350 5250250"`, "sites[7].at", "Ormvik", name + 1},
		{[]string{"sites", "West head", "name"}, `"Gauge 5"`, "", "Gauge 5", 0},
		{[]string{"links", "3", "from"}, `"Nowhere"`, "links[3].from", "Nowhere", 0},
		{[]string{"sites", "Nowhere", "at"}, `"1 N, 2 W"`, "", "Nowhere", 0},
		{[]string{"sites", "0", "colour"}, `"red"`, "sites[0].colour", "not a key", 0},
	} {
		body, err := json.Marshal(TryBody{Edits: []EditBody{{plan.SetKey, tc.path, json.RawMessage(tc.value)}}})
		if err != nil {
			t.Fatal(err)
		}
		p := refused(t, ask(s, http.MethodPost, "/api/try", string(body)), http.StatusUnprocessableEntity, tc.says)
		if tc.field != "" && (len(p.Errors) == 0 || p.Errors[0].Field != tc.field || tc.line > 0 && p.Errors[0].Line != tc.line) {
			t.Errorf("%v to %s: %+v", tc.path, tc.value, p.Errors)
		}
	}
	refused(t, ask(s, http.MethodPost, "/api/try", `{"version":"0123","edits":[]}`), http.StatusNotFound, "0123")
	refused(t, ask(s, http.MethodPost, "/api/try", `{"edits":[],"link":"A..B"}`), http.StatusUnprocessableEntity, "A..B")
}

// TestSection: as the command prints it, by name, by ends, of a version tried.
func TestSection(t *testing.T) {
	path := demo(t)
	s := serve(t, path)
	n := direct(t, path)
	for _, named := range []string{"trunk", "West head..Ormvik/coast", "Ormvik/coast..West head"} {
		l, err := n.Named(named)
		if err != nil {
			t.Fatal(err)
		}
		traced, err := n.Section(l)
		if err != nil {
			t.Fatal(err)
		}
		var b strings.Builder
		if err := report.SectionJSON(&b, traced); err != nil {
			t.Fatal(err)
		}
		query := strings.ReplaceAll(named, " ", "+")
		same(t, named, string(ask(s, http.MethodGet, "/api/section?link="+query, "").body), b.String())
		same(t, named, string(ask(s, http.MethodGet, "/api/files/section.json?link="+query, "").body), b.String())
	}
	tried := send[Tried](t, s, 200, http.MethodPost, "/api/try", TryBody{Link: "trunk", Edits: []EditBody{EditBody(dragPlace(2000))}})
	before, after := get[report.Section](t, s, "/api/section?link=West+head..Ormvik/coast"), get[report.Section](t, s, "/api/section?link=West+head..Ormvik/coast&version="+tried.Version)
	if shift := before.DistanceKm - after.DistanceKm; shift < 1.7 || shift > 2 { // 2 km east towards a site at azimuth 111: 2 sin 111
		t.Errorf("a site moved 2 km nearer by %g km", shift)
	}
	refused(t, ask(s, http.MethodGet, "/api/section?link=nothing", ""), http.StatusUnprocessableEntity, "nothing")
}

// TestFiles downloads every file and reads it with a reader of its kind.
func TestFiles(t *testing.T) {
	s := serve(t, demo(t))
	readers := map[string]func([]byte) error{
		"text/csv":             func(b []byte) error { _, err := csv.NewReader(bytes.NewReader(b)).ReadAll(); return err },
		"application/json":     func(b []byte) error { return json.Unmarshal(b, new(any)) },
		"application/geo+json": func(b []byte) error { _, err := geojson.UnmarshalFeatureCollection(b); return err },
		"image/svg+xml":        readXML,
		"application/yaml":     func(b []byte) error { _, err := plan.Parse("x.yaml", b); return err },
		"text/plain":           func([]byte) error { return nil },
	}
	const link, station = "?link=West+head..Ormvik/coast", "?station=Gauge+3"
	for target, name := range map[string]string{
		"/api/files/plan.yaml": "hallin.yaml", "/api/files/links.txt": "hallin-links.txt", "/api/files/links.csv": "hallin-links.csv",
		"/api/files/links.json": "hallin-links.json", "/api/files/links.geojson": "hallin-links.geojson",
		"/api/files/section.txt" + link: "hallin-section-west-head-ormvik-coast.txt", "/api/files/section.csv" + link: "hallin-section-west-head-ormvik-coast.csv",
		"/api/files/section.json" + link: "hallin-section-west-head-ormvik-coast.json", "/api/files/section.geojson" + link: "hallin-section-west-head-ormvik-coast.geojson",
		"/api/files/section.svg" + link: "hallin-section-west-head-ormvik-coast.svg", "/api/files/antenna.txt" + station: "hallin-antenna-rod.txt",
		"/api/files/antenna.json" + station: "hallin-antenna-rod.json", "/api/files/pattern.svg" + station: "hallin-pattern-rod.svg", "/api/files/vswr.svg" + station: "hallin-vswr-rod.svg",
		"/api/layers/sites": "hallin-sites.geojson", "/api/layers/links": "hallin-links.geojson", "/api/layers/section" + link: "hallin-section.geojson",
	} {
		a := ask(s, http.MethodGet, target, "")
		kind, _, err := mime.ParseMediaType(a.header.Get("Content-Type"))
		_, disposition, err2 := mime.ParseMediaType(a.header.Get("Content-Disposition"))
		if a.status != 200 || err != nil || err2 != nil || readers[kind] == nil || len(a.body) < 50 {
			t.Errorf("%s: status %d, %v, %d bytes", target, a.status, a.header, len(a.body))
			continue
		}
		if err := readers[kind](a.body); err != nil {
			t.Errorf("%s is no %s: %v", target, kind, err)
		}
		if disposition["filename"] != name {
			t.Errorf("%s is named %q, want %q", target, disposition["filename"], name)
		}
	}
	refused(t, ask(s, http.MethodGet, "/api/files/section.svg?link=none", ""), http.StatusUnprocessableEntity, "none")
	refused(t, ask(s, http.MethodGet, "/api/files/links.csv?version=0", ""), http.StatusNotFound, "again")
	refused(t, ask(s, http.MethodGet, "/api/files/vswr.svg?antenna=stick&channel=poll", ""), http.StatusUnprocessableEntity, "maker")
}

func readXML(text []byte) error {
	for d := xml.NewDecoder(bytes.NewReader(text)); ; {
		if _, err := d.Token(); errors.Is(err, io.EOF) {
			return nil
		} else if err != nil {
			return err
		}
	}
}

// TestLayers holds the layers against the plan: every site a point, every link a line with its verdict.
func TestLayers(t *testing.T) {
	s := serve(t, demo(t))
	links := get[report.Links](t, s, "/api/links")
	layer, err := geojson.UnmarshalFeatureCollection(ask(s, http.MethodGet, "/api/layers/links", "").body)
	if err != nil {
		t.Fatal(err)
	}
	lines := 0
	for _, f := range layer.Features {
		if f.Properties["kind"] == "link" {
			if want := links.Links[lines]; f.Properties["verdict"] != string(want.Verdict) || f.Properties["from"] != want.From {
				t.Errorf("line %d is %v, want %s from %s", lines, f.Properties, want.Verdict, want.From)
			}
			lines++
		}
	}
	sites, err := geojson.UnmarshalFeatureCollection(ask(s, http.MethodGet, "/api/layers/sites", "").body)
	if err != nil || lines != 10 || len(sites.Features) != 10 {
		t.Errorf("%d lines, %d sites, %v", lines, len(sites.Features), err)
	}
}

// TestPlace: the ground under a place is that of the sites, whichever way the place is written.
func TestPlace(t *testing.T) {
	s := serve(t, demo(t))
	site := get[PlanAnswer](t, s, "/api/plan").Sites[1]
	p := get[PlaceAnswer](t, s, "/api/place?lon=-20.073&lat=47.58295")
	if p.GroundM == nil || *p.GroundM != *site.GroundM || p.PlaceText != site.Place || p.CoverM == nil {
		t.Errorf("%+v, want that of %+v", p, site)
	}
	if byText := get[PlaceAnswer](t, s, "/api/place?at=47.58295+N,+20.07300+W"); *byText.GroundM != *p.GroundM {
		t.Errorf("by its text: %+v", byText)
	}
	refused(t, ask(s, http.MethodGet, "/api/place?at=here", ""), http.StatusUnprocessableEntity, "here")
	refused(t, ask(s, http.MethodGet, "/api/place?lon=NaN", ""), http.StatusUnprocessableEntity, "lon")
	// One degree of the meridian from 47 to 48 degrees: 111.18 km (M of WGS 84 at 47.5, 6370.1 km, times a degree).
	m := get[Measured](t, s, "/api/measure?from_lon=-20&from_lat=47&to_lon=-20&to_lat=48")
	if math.Abs(m.DistanceKm-111.18) > 0.02 || m.AzimuthDeg != 0 || math.Abs(m.BackAzDeg-180) > 1e-9 {
		t.Errorf("%+v", m)
	}
	if m := get[Measured](t, s, "/api/measure?from_lon=1&from_lat=2&to_lon=1&to_lat=2"); m != (Measured{}) {
		t.Errorf("from a place to itself: %+v", m)
	}
}
