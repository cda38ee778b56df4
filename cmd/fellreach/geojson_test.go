package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"math"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"testing"

	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
	"github.com/paulmach/orb/geojson"
)

// geoJSON runs a command with --format geojson and checks what RFC 7946 asks of any file: section
// 3 its members, section 4 no other reference system, section 3.1.1 positions of longitude and
// latitude, section 11.2 no more digits than the data bear.
func geoJSON(t *testing.T, status int, args ...string) *geojson.FeatureCollection {
	t.Helper()
	text := succeeds(t, status, append(args, "--format", "geojson")...)
	members := decoded[map[string]json.RawMessage](t, text)
	if string(members["type"]) != `"FeatureCollection"` || members["features"] == nil {
		t.Fatalf("no collection of features: %.300s", text)
	}
	if members["crs"] != nil {
		t.Error("names a reference system")
	}
	all, err := geojson.UnmarshalFeatureCollection([]byte(text))
	if err != nil {
		t.Fatal(err)
	}
	for _, f := range all.Features {
		b := f.Geometry.Bound()
		if b.Min.Lon() < -180 || b.Max.Lon() > 180 || b.Min.Lat() < -90 || b.Max.Lat() > 90 {
			t.Errorf("%v lies at %v", f.Properties, b)
		}
	}
	if long := regexp.MustCompile(`\d\.\d{8,}`).FindString(text); long != "" {
		t.Errorf("digits that mean nothing: %s", long)
	}
	return all
}

// Links are geodesics: every point of their lines lies on the geodesic of the ends to the
// centimetre of seven decimals, and half-way between two of them the chord is off by less than a
// metre.
func TestLinksGeoJSON(t *testing.T) {
	for name, path := range plans {
		t.Run(name, func(t *testing.T) {
			all := geoJSON(t, exitLinks, "links", path(t))
			places := map[string]orb.Point{}
			for _, f := range all.Features {
				if p, ok := f.Geometry.(orb.Point); ok {
					places[f.Properties.MustString("name")] = p
				}
			}
			links := linksOf(t, path(t))
			if len(all.Features) != len(places)+len(links) {
				t.Errorf("%d features of %d stations and %d links", len(all.Features), len(places), len(links))
			}
			for i, l := range links {
				f := all.Features[len(places)+i]
				line := f.Geometry.(orb.LineString)
				if line[0] != places[l.From] || line[len(line)-1] != places[l.To] {
					t.Errorf("the line of %s to %s does not join them", l.From, l.To)
				}
				if f.Properties["verdict"] != l.Verdict || f.Properties["from"] != l.From || f.Properties["to"] != l.To {
					t.Errorf("%s to %s has the properties %v", l.From, l.To, f.Properties)
				}
				near(t, "margin_db", f.Properties.MustFloat64("margin_db"), l.MarginDB, 0.0051)
				near(t, "distance_km", f.Properties.MustFloat64("distance_km"), l.DistanceKm, 0.00051)
				followsGeodesic(t, line)
			}
		})
	}
}

func followsGeodesic(t *testing.T, line orb.LineString) {
	t.Helper()
	from, to := line[0], line[len(line)-1]
	lengthM, azDeg, _ := raster.Inverse(from, to)
	for i, p := range line {
		s, _, _ := raster.Inverse(from, p)
		if off, _, _ := raster.Inverse(raster.Direct(from, azDeg, s), p); off > 0.03 { // two rounded places
			t.Errorf("point %d of %d lies %.3f m off the geodesic", i, len(line), off)
		}
		if i == 0 {
			continue
		}
		half := orb.Point{(p[0] + line[i-1][0]) / 2, (p[1] + line[i-1][1]) / 2}
		s, _, _ = raster.Inverse(from, half)
		if off, _, _ := raster.Inverse(raster.Direct(from, azDeg, s), half); off > 1 {
			t.Errorf("the chord before point %d is %.2f m off the geodesic of %.1f km", i, off, lengthM/1000)
		}
	}
}

func TestSectionGeoJSON(t *testing.T) {
	all := geoJSON(t, exitDone, "section", jacksboro, "--link", "Cairn..Ferry gauge")
	kinds := map[string]int{}
	for _, f := range all.Features {
		kinds[f.Properties.MustString("kind")]++
		if line, ok := f.Geometry.(orb.LineString); ok {
			followsGeodesic(t, line)
		}
	}
	if kinds["path"] != 1 || kinds["end"] != 2 || kinds["worst point"] != 1 {
		t.Errorf("features by kind: %v", kinds)
	}
}

// GDAL's ogr2ogr reads the files, and writes them by RFC 7946 without a change of place.
func TestGeoJSONInGDAL(t *testing.T) {
	if _, err := exec.LookPath("ogr2ogr"); err != nil {
		t.Skip("ogr2ogr is not installed (Debian: gdal-bin)")
	}
	folder := t.TempDir()
	files := map[string]string{"over the antimeridian": testdata("golden", "made-links.geojson")}
	for name, args := range map[string][]string{
		"demo": {"links", demo(t)}, "jacksboro": {"links", jacksboro}, "section": {"section", jacksboro, "--link", "backbone"},
	} {
		files[name] = filepath.Join(folder, name+".geojson")
		fellreach(append(args, "--format", "geojson", "-o", files[name])...)
	}
	for name, ours := range files {
		t.Run(name, func(t *testing.T) {
			theirs := filepath.Join(t.TempDir(), "theirs.geojson")
			out, err := exec.Command("ogr2ogr", "-f", "GeoJSON", "-lco", "RFC7946=YES", "-lco", "COORDINATE_PRECISION=7", theirs, ours).CombinedOutput()
			if err != nil || len(out) > 0 {
				t.Fatalf("ogr2ogr: %v %s", err, out)
			}
			if a, b := geometries(t, ours), geometries(t, theirs); a != b || a == "" {
				t.Errorf("ours: %s\ntheirs: %s", a, b)
			}
		})
	}
}

// geometries writes the geometries of a file in well-known text, as ogrinfo reads them.
func geometries(t *testing.T, path string) string {
	t.Helper()
	out, err := exec.Command("ogrinfo", "-ro", "-al", "-q", "-fields=NO", path).Output()
	if err != nil {
		t.Fatal(err)
	}
	var text bytes.Buffer
	for _, shape := range regexp.MustCompile(`(?:POINT|LINESTRING|MULTILINESTRING) \(.*\)`).FindAllString(string(out), -1) {
		for _, number := range regexp.MustCompile(`-?\d+\.?\d*`).FindAllString(shape, -1) {
			x, _ := strconv.ParseFloat(number, 64)
			fmt.Fprintf(&text, "%.0f ", math.Round(x*1e7))
		}
		fmt.Fprintln(&text)
	}
	return text.String()
}
