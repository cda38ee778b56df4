package main

import (
	"math"
	"os"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"testing"

	"fellreach/terrain/raster"

	"github.com/goccy/go-yaml"
)

// noChange leaves the raster of the small plan as it is.
func noChange(*raster.GeoTIFF) {}

// The demo holds one plan, its rasters, and links of every verdict.
func TestDemo(t *testing.T) {
	plan := demo(t)
	entries, err := os.ReadDir(filepath.Dir(plan))
	if err != nil {
		t.Fatal(err)
	}
	count := map[string]int{}
	for _, e := range entries {
		count[filepath.Ext(e.Name())]++
	}
	if count[".yaml"] != 1 || count[".tif"] != 2 || len(entries) != 3 {
		t.Errorf("the demo's folder holds %v", entries)
	}
	links := linksOf(t, plan)
	if len(links) < 8 {
		t.Errorf("%d links", len(links))
	}
	for _, verdict := range []string{"closes", "thin", "fails"} {
		if !slices.ContainsFunc(links, func(l linkAnswer) bool { return l.Verdict == verdict }) {
			t.Errorf("no link %s", verdict)
		}
	}
}

// What the demo prints is what links prints; what it says beside that can be silenced.
func TestDemoPrintsItsLinks(t *testing.T) {
	plan := demo(t)
	a, _ := makeDemo()
	if want := succeeds(t, exitLinks, "links", plan); a.out != want {
		t.Errorf("got:\n%s\nwant:\n%s", a.out, want)
	}
}

// The demo's plan has no absolute path in it: the folder can be moved.
func TestDemoMoves(t *testing.T) {
	plan := demo(t)
	t.Chdir(filepath.Dir(plan))
	if got := succeeds(t, exitLinks, "links", "hallin.yaml"); got != succeeds(t, exitLinks, "links", plan) {
		t.Error("the plan is another one from its own folder")
	}
}

// The commands that the demo proposes work as they stand.
func TestDemoHints(t *testing.T) {
	demo(t)
	a, _ := makeDemo()
	t.Chdir(t.TempDir())
	hints := regexp.MustCompile(`(?m)^  fellreach (.*)$`).FindAllStringSubmatch(a.err, -1)
	if len(hints) < 2 {
		t.Errorf("it does not say how to go on: %s", a.err)
	}
	for _, hint := range hints {
		var args []string
		for i, part := range strings.Split(hint[1], `"`) { // every other part stands in quotes
			if i%2 == 1 {
				args = append(args, part)
			} else {
				args = append(args, strings.Fields(part)...)
			}
		}
		if a := fellreach(args...); a.status != exitDone && a.status != exitLinks {
			t.Errorf("%s: %+v", hint[1], a)
		}
	}
}

// A new plan passes the check and stands for itself.
func TestPlanNew(t *testing.T) {
	path := filepath.Join(t.TempDir(), "new.yaml")
	succeeds(t, exitDone, "plan", "new", path)
	if out := succeeds(t, exitDone, "plan", "check", path); !strings.Contains(out, "new.yaml: the plan is well formed (sites: 2, links: 1)") {
		t.Errorf("plan check says %s", out)
	}
	text, err := os.ReadFile(path)
	if err != nil || string(text) != succeeds(t, exitDone, "plan", "new") {
		t.Errorf("the file differs from standard output: %v", err)
	}
}

func TestPlanCheck(t *testing.T) {
	for _, path := range []string{demo(t), jacksboro, testdata("plans", "every-key.yaml")} {
		if out := succeeds(t, exitDone, "plan", "check", path); !strings.Contains(out, "the plan is well formed") {
			t.Errorf("%s: %s", path, out)
		}
	}
}

// The schema is JSON, and names each section that a plan uses.
func TestPlanSchema(t *testing.T) {
	schema := decoded[map[string]any](t, succeeds(t, exitDone, "plan", "schema"))
	text, err := os.ReadFile(demo(t))
	if err != nil {
		t.Fatal(err)
	}
	var plan map[string]any
	if err := yaml.Unmarshal(text, &plan); err != nil {
		t.Fatal(err)
	}
	haveKeys(t, schema, "$schema", "properties", "required")
	for section := range plan {
		haveKeys(t, schema["properties"].(map[string]any), section)
	}
}

func TestVersion(t *testing.T) {
	lines := strings.Split(succeeds(t, exitDone, "version"), "\n")
	for i, want := range []string{"fellreach ", "go1.", "GDAL ", "PROJ "} {
		if !strings.HasPrefix(lines[i], want) {
			t.Errorf("line %d is %q, want %s", i+1, lines[i], want)
		}
	}
}

// What gdalinfo says of the same file: 403 by 344 cells of 1/1200 degree, EPSG:4326, upper left
// corner 84.41375 W, 36.73291667 N, heights of 236 m to 1076 m.
func TestTerrain(t *testing.T) {
	path := testdata("terrain", "jacksboro.tif")
	f := decoded[struct{ Files []raster.Info }](t, succeeds(t, exitDone, "terrain", path, "--format", "json")).Files[0]
	if f.Path != path || f.Cols != 403 || f.Rows != 344 || f.EPSG != 4326 || f.Summary.Voids != 0 || f.Summary.MinM != 236 || f.Summary.MaxM != 1076 {
		t.Errorf("%+v", f)
	}
	for i, want := range []float64{-84.41375, 36.73291667 - 344/1200.0, -84.41375 + 403/1200.0, 36.73291667} {
		near(t, "extent", f.Extent[i], want, 1e-8)
	}
	// A cell of 3 arc-seconds at 36.6 degrees: 111.32 km cos(36.6) / 1200 by 110.98 km / 1200 (degrees of
	// longitude and latitude on the ellipsoid, handbook figures to 0.01 km), within 0.3 %.
	near(t, "cell_x_m", f.CellXM, 111_320*math.Cos(36.6*math.Pi/180)/1200, 0.25)
	near(t, "cell_y_m", f.CellYM, 110_980/1200.0, 0.25)
	text := succeeds(t, exitDone, "terrain", path, path)
	for _, want := range []string{"403 × 344", "EPSG:4326", "84.4137 W to 84.0779 W", "0 of 138632 cells", "236.0 m", "1076.0 m at 36.48500 N, 84.23083 W"} {
		if strings.Count(text, want) != 2 {
			t.Errorf("want %q twice in:\n%s", want, text)
		}
	}
}

// Help goes to standard output and names every command.
func TestHelp(t *testing.T) {
	for _, args := range [][]string{{}, {"--help"}, {"help"}} {
		out := succeeds(t, exitDone, args...)
		for _, command := range []string{"demo", "links", "section", "loss", "terrain", "plan", "version"} {
			if !strings.Contains(out, "\n  "+command+" ") {
				t.Errorf("%q does not name %s:\n%s", args, command, out)
			}
		}
	}
}

// --quiet leaves standard error to errors.
func TestQuiet(t *testing.T) {
	if a := fellreach("plan", "new", filepath.Join(t.TempDir(), "new.yaml"), "--quiet"); a.status != exitDone || a.out+a.err != "" {
		t.Errorf("%+v", a)
	}
}
