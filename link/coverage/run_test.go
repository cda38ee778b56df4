package coverage

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"fellreach/link"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// madeGround writes rough ground of 10 x 10 km in UTM 27N, with a void and a cover raster on it.
func madeGround(t testing.TB, spec raster.Spec) *raster.Ground {
	t.Helper()
	const side, cellM = 400, 25
	write := func(name string, kind raster.CellType, value func(east, north float64) float64) string {
		grid := terrain.NewGrid(side, side)
		for row := range side {
			for col := range side {
				grid.Set(col, row, float32(value(float64(col-side/2)*cellM, float64(side/2-row)*cellM)))
			}
		}
		nodata := 255.0
		path := filepath.Join(t.TempDir(), name)
		tiff := raster.GeoTIFF{Grid: grid, GeoTransform: [6]float64{440000, cellM, 0, 5270000, 0, -cellM}, EPSG: 32627, Type: kind, NoData: &nodata}
		if kind == raster.Float32 {
			tiff.Unit, nodata = "m", -9999
		}
		if err := raster.WriteGeoTIFF(path, tiff); err != nil {
			t.Fatal(err)
		}
		return path
	}
	spec.Elevation = []string{write("dem.tif", raster.Float32, func(east, north float64) float64 {
		if math.Hypot(east-2000, north-2000) < 300 {
			return math.NaN()
		}
		return rough(east, north)
	})}
	spec.Cover = write("cover.tif", raster.Uint8, func(east, north float64) float64 { return float64(mixed(east, north)) })
	spec.Classes = map[int]terrain.Class{0: {}, 1: {HeightM: 12}, 2: {Zone: terrain.Sea}, 3: {HeightM: 6}}
	g, err := raster.Open(spec)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(g.Close)
	return g
}

// madeSites are two sites on it that transmit on one frequency.
func madeSites(t testing.TB) []Site {
	t.Helper()
	var sites []Site
	for i, at := range []terrain.Coordinates{{EPSG: 32627, Easting: 444900, Northing: 5265100}, {EPSG: 32627, Easting: 446300, Northing: 5263200}} {
		s := Site{Name: []string{"Base", "Far Hill/uhf"}[i], Task: madeTask(t), BandsDB: []float64{0, 6, 20}, AimDB: 6}
		place, err := raster.Locate(at)
		if err != nil {
			t.Fatal(err)
		}
		s.Task.Link.From.At, s.Task.Link.From.Name = place, s.Name
		s.Task.RangeM, s.Task.CellM = 3000, 25
		sites = append(sites, s)
	}
	return sites
}

func mustRun(t testing.TB, g *raster.Ground, sites []Site, o Options) *Report {
	t.Helper()
	r, err := Run(context.Background(), g, "made", sites, o)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// tool runs one of GDAL's command-line tools, or skips the test where it is not installed.
func tool(t testing.TB, name string, args ...string) string {
	t.Helper()
	if _, err := exec.LookPath(name); err != nil {
		t.Skipf("%s is not installed (Debian package gdal-bin)", name)
	}
	out, err := exec.Command(name, args...).CombinedOutput()
	if err != nil {
		t.Fatalf("%s %v: %v\n%s", name, args, err, out)
	}
	return string(out)
}

// All files are there, GDAL's own tools read them, two runs write the same bytes, and a third keeps
// what is done.
func TestRun(t *testing.T) {
	g, sites := madeGround(t, raster.Spec{}), madeSites(t)
	dirs := []string{filepath.Join(t.TempDir(), "a"), filepath.Join(t.TempDir(), "b")}
	var report *Report
	for _, dir := range dirs {
		report = mustRun(t, g, sites, Options{Dir: dir, Outputs: allOutputs})
	}
	files := []string{
		"loss-base.tif", "margin-base.tif", "field-base.tif", "bands-base.geojson", "picture-base.png",
		"loss-far-hill-uhf.tif", "margin-far-hill-uhf.tif", "field-far-hill-uhf.tif", "bands-far-hill-uhf.geojson", "picture-far-hill-uhf.png",
		"network-margin.tif", "network-server.tif", "network-count.tif", "network-ratio.tif", "bands-network.geojson", "layers.gpkg",
	}
	for _, file := range files {
		a, err := os.ReadFile(filepath.Join(dirs[0], file))
		if err != nil {
			t.Fatal(err)
		}
		if b, _ := os.ReadFile(filepath.Join(dirs[1], file)); !bytes.Equal(a, b) {
			t.Errorf("two runs write different %s", file)
		}
		if strings.HasSuffix(file, ".tif") {
			if info := tool(t, "gdalinfo", filepath.Join(dirs[0], file)); !strings.Contains(info, "LAYOUT=COG") || !strings.Contains(info, "NoData Value=-9999") {
				t.Errorf("%s: %s", file, info)
			}
		}
	}
	if layers := tool(t, "ogrinfo", "-so", filepath.Join(dirs[0], "layers.gpkg")); !strings.Contains(layers, "base (Multi Polygon)") || !strings.Contains(layers, "network (Multi Polygon)") {
		t.Errorf("layers.gpkg: %s", layers)
	}
	checkBands(t, filepath.Join(dirs[0], "bands-base.geojson"), report.Sites[0])
	if void := report.Sites[0].VoidCells; void < 200 || void > report.Sites[0].Cells/2 {
		t.Errorf("%d of %d cells void, with a hole of 450 cells", void, report.Sites[0].Cells)
	}
	kept := 0
	again := mustRun(t, g, sites, Options{Dir: dirs[0], Outputs: allOutputs, Note: func(string) { kept++ }})
	if kept != 2 || again.Sites[1].Check != report.Sites[1].Check {
		t.Errorf("the third run kept %d sites", kept)
	}
	sites[1].Task.Link.From.AglM++
	kept = 0
	if mustRun(t, g, sites, Options{Dir: dirs[0], Outputs: allOutputs, Note: func(string) { kept++ }}); kept != 1 {
		t.Errorf("with a higher mast at one site the run kept %d sites", kept)
	}
}

// checkBands sets the polygons' areas, by the plane of their own rings, against the counted ones: the
// outlines leave out small patches, some percent.
func checkBands(t *testing.T, path string, r SiteReport) {
	t.Helper()
	data, err := os.ReadFile(path)
	if err != nil {
		t.Fatal(err)
	}
	var all struct {
		Features []struct {
			Properties Band `json:"properties"`
			Geometry   struct {
				Coordinates [][][]orb.Point `json:"coordinates"`
			} `json:"geometry"`
		} `json:"features"`
	}
	if err := json.Unmarshal(data, &all); err != nil {
		t.Fatal(err)
	}
	if len(all.Features) != len(r.Bands) {
		t.Fatalf("%d features for %d bands", len(all.Features), len(r.Bands))
	}
	for i, f := range all.Features {
		area := 0.0
		for _, polygon := range f.Geometry.Coordinates {
			for _, ring := range polygon {
				for k := 1; k < len(ring); k++ {
					area += (ring[k-1][0]*ring[k][1] - ring[k][0]*ring[k-1][1]) / 2
				}
			}
		}
		// Kilometres of a degree of longitude and latitude at 47.5 N: WGS 84, from the usual series.
		area *= 75.35 * 111.18
		if want := r.Bands[i].AreaKm2; math.Abs(area-want) > 0.15*want+0.2 {
			t.Errorf("band from %g dB: %.2f km2 outlined, %.2f km2 counted", f.Properties.FromDB, area, want)
		}
	}
	sum := 0.0
	for _, b := range r.Bands {
		sum += b.AreaKm2
		if math.Abs(b.AreaKm2-float64(b.Cells)*25*25/1e6) > 0.002*b.AreaKm2 {
			t.Errorf("%d cells of 25 m are %.4f km2", b.Cells, b.AreaKm2)
		}
	}
	if sum > math.Pi*9 {
		t.Errorf("all bands have %.2f km2, more than the circle", sum)
	}
}

// Bad input and bad luck: one clear error each, nothing half-written.
func TestRunErrors(t *testing.T) {
	g := madeGround(t, raster.Spec{})
	for _, tc := range []struct {
		name string
		edit func(*Site)
		says string
	}{
		{"outside", func(s *Site) { s.Task.Link.From.At = orb.Point{-21, 47.5} }, "do not reach"},
		{"on a void", func(s *Site) {
			s.Task.Link.From.At, _ = raster.Locate(terrain.Coordinates{EPSG: 32627, Easting: 447000, Northing: 5267000})
		}, "void"},
		{"too many cells", func(s *Site) { s.Task.RangeM, s.Task.CellM = 150000, 5 }, "a cell of 25 m fits"},
		{"cell", func(s *Site) { s.Task.CellM = 0 }, "5 to 500 m"},
		{"range", func(s *Site) { s.Task.RangeM = 500 }, "1 to 150 km"},
		{"availability", func(s *Site) { s.Task.Link.Aim.AvailabilityPct = 99.99 }, "99.9 %"},
	} {
		sites := madeSites(t)[:1]
		tc.edit(&sites[0])
		dir := t.TempDir()
		_, err := Run(context.Background(), g, "made", sites, Options{Dir: dir, Outputs: allOutputs})
		if err == nil || !strings.Contains(err.Error(), tc.says) {
			t.Errorf("%s: error %v, want one that says %q", tc.name, err, tc.says)
		}
		left, _ := filepath.Glob(filepath.Join(dir, "*"))
		if len(left) > 0 {
			t.Errorf("%s: left %v", tc.name, left)
		}
	}
	file := filepath.Join(t.TempDir(), "file")
	if err := os.WriteFile(file, nil, 0o644); err != nil {
		t.Fatal(err)
	}
	if _, err := Run(context.Background(), g, "made", madeSites(t), Options{Dir: filepath.Join(file, "below"), Outputs: allOutputs}); err == nil {
		t.Error("a folder below a file is no error")
	}
}

// An interruption keeps the sites that were finished, and the next run goes on from there.
func TestInterrupted(t *testing.T) {
	g, sites, dir := madeGround(t, raster.Spec{}), madeSites(t), t.TempDir()
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	_, err := Run(ctx, g, "made", sites, Options{Dir: dir, Outputs: allOutputs, Progress: func(site string, done, _ int) {
		if site == sites[1].Name && done > 10 {
			cancel()
		}
	}})
	if !errors.Is(err, context.Canceled) {
		t.Fatalf("error %v", err)
	}
	if _, err := os.Stat(filepath.Join(dir, "cover.json")); !os.IsNotExist(err) {
		t.Error("an interrupted run wrote cover.json")
	}
	kept := 0
	if mustRun(t, g, sites, Options{Dir: dir, Outputs: allOutputs, Note: func(string) { kept++ }}); kept != 1 {
		t.Errorf("the next run kept %d sites", kept)
	}
}

// Source: the margins of both sites themselves, cell by cell.
func TestNetwork(t *testing.T) {
	g, sites, dir := madeGround(t, raster.Spec{BeyondSea: true}), madeSites(t), t.TempDir()
	report := mustRun(t, g, sites, Options{Dir: dir, Outputs: allOutputs})
	var members []member
	for i, slug := range []string{"base", "far-hill-uhf"} {
		frame, err := g.Frame(sites[i].Task.Link.From.At, 3000, 25)
		if err != nil {
			t.Fatal(err)
		}
		m := member{frame: frame}
		for kind, cells := range map[string]*[]float32{"margin": &m.marginDB, "field": &m.fieldDBuV} {
			if *cells, err = raster.ReadCOG(filepath.Join(dir, kind+"-"+slug+".tif"), frame); err != nil {
				t.Fatal(err)
			}
		}
		members = append(members, m)
	}
	frame, err := around(members)
	if err != nil {
		t.Fatal(err)
	}
	layer := map[string][]float32{}
	for _, name := range []string{"margin", "server", "count", "ratio"} {
		if layer[name], err = raster.ReadCOG(filepath.Join(dir, "network-"+name+".tif"), frame); err != nil {
			t.Fatal(err)
		}
	}
	at := func(m *member, cells []float32, col, row int) float64 {
		left, top := offset(frame, m.frame)
		col, row = col-left, row-top
		if col < 0 || row < 0 || col >= m.frame.Cols || row >= m.frame.Rows {
			return math.NaN()
		}
		return float64(cells[row*m.frame.Cols+col])
	}
	both := 0
	for row := range frame.Rows {
		for col := range frame.Cols {
			i := row*frame.Cols + col
			a, b := at(&members[0], members[0].marginDB, col, row), at(&members[1], members[1].marginDB, col, row)
			best, server, other := a, 0, 1
			if !(a >= b) && !math.IsNaN(b) {
				best, server, other = b, 1, 0
			}
			if math.IsNaN(best) {
				if v := layer["margin"][i]; v == v {
					t.Fatalf("cell %d, %d has a best margin and no site", col, row)
				}
				continue
			}
			count := 0.0
			for _, m := range []float64{a, b} {
				if m >= 6 {
					count++
				}
			}
			if float64(layer["margin"][i]) != best || int(layer["server"][i]) != server+1 || float64(layer["count"][i]) != count {
				t.Fatalf("cell %d, %d: margins %g and %g, layers %g, %g, %g", col, row, a, b, layer["margin"][i], layer["server"][i], layer["count"][i])
			}
			if !math.IsNaN(a) && !math.IsNaN(b) {
				both++
				wanted := at(&members[server], members[server].fieldDBuV, col, row) - at(&members[other], members[other].fieldDBuV, col, row)
				if math.Abs(float64(layer["ratio"][i])-wanted) > 1e-4 {
					t.Fatalf("cell %d, %d: ratio %g, by the fields %g dB", col, row, layer["ratio"][i], wanted)
				}
			}
		}
	}
	if both < 5000 || len(report.Network.Covered) != 2 || report.Network.Covered[0].AreaKm2 <= 0 {
		t.Errorf("%d cells of both sites; %+v", both, report.Network)
	}
}

// Source: link.Compute on the profile that a link takes.
func TestAlongIsALink(t *testing.T) {
	g, sites := madeGround(t, raster.Spec{}), madeSites(t)[:1]
	sites[0].Task.LocationsPct = 50
	track := Track{{sites[0].Task.Link.From.At, raster.Direct(sites[0].Task.Link.From.At, 40, 4000)}}
	stops, err := track.Stops(250)
	if err != nil {
		t.Fatal(err)
	}
	stops = stops[1:]
	ride, err := Along(context.Background(), g, sites, stops, nil)
	if err != nil {
		t.Fatal(err)
	}
	known := 0
	for i, s := range stops {
		task := sites[0].Task
		p, err := g.Profile(task.Link.From.At, s.At)
		var void *terrain.VoidError
		if errors.As(err, &void) {
			if !math.IsNaN(ride.BestDB[i]) {
				t.Errorf("stop %d lies behind a void and has a margin", i)
			}
			continue
		}
		if err != nil {
			t.Fatal(err)
		}
		want, err := link.Compute(task.Link, p, task.Conditions)
		if err != nil {
			t.Fatal(err)
		}
		known++
		if math.Abs(ride.BestDB[i]-want.MarginDB) > 1e-9 {
			t.Errorf("stop %d: margin %.9f, as a link %.9f dB", i, ride.BestDB[i], want.MarginDB)
		}
	}
	if known < 8 {
		t.Errorf("%d stops with a profile", known)
	}
}
