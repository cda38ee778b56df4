package raster

import (
	"errors"
	"fmt"
	"io/fs"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"strings"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// Hand-worked: on a plane the height between cell centres is the plane's, and nearer than half a
// cell to the raster's edge it is that of the outermost centre.
func TestHeightAslM(t *testing.T) {
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}})
	for _, tc := range []struct {
		name     string
		e, n     float64
		wantFrom [2]float64 // where on the plane the height is taken from
	}{
		{"cell centre", 441005 + 10, 5264005 + 10, [2]float64{441015, 5264015}},
		{"between cells", 441234.5, 5263321.25, [2]float64{441234.5, 5263321.25}},
		{"across a tile border", 440000 + 256*30 + 3, 5264000, [2]float64{440000 + 256*30 + 3, 5264000}},
		{"half a cell from the west edge", 440003, 5264000, [2]float64{440015, 5264000}},
		{"corner", 448999, 5260001, [2]float64{448985, 5260015}},
		{"on the edge", 440000, 5264000, [2]float64{440015, 5264000}},
	} {
		got, err := g.HeightAslM(utm(t, tc.e, tc.n))
		want := plane(tc.wantFrom[0], tc.wantFrom[1])
		if err != nil || math.Abs(got-want) > 1e-4 { // float32 near 230 m: 8e-6 m; places 1e-6 m
			t.Errorf("%s: %.6f m, %v, want %.6f", tc.name, got, err, want)
		}
	}
}

func TestHeightOutside(t *testing.T) {
	path := utmPlane().write(t, "plane.tif")
	out := utm(t, 439990, 5264000)
	_, err := open(t, Spec{Elevation: []string{path}}).HeightAslM(out)
	var void *terrain.VoidError
	if !errors.As(err, &void) || !void.Outside {
		t.Errorf("outside: %v, want a VoidError that says so", err)
	}
	h, err := open(t, Spec{Elevation: []string{path}, BeyondSea: true}).HeightAslM(out)
	if h != 0 || err != nil {
		t.Errorf("beyond the sea: %g, %v", h, err)
	}
	if _, err := open(t, Spec{Elevation: []string{path}}).HeightAslM(orb.Point{0, 91}); err == nil {
		t.Error("latitude 91 has a height")
	}
}

// The spacing is the larger of 30 m and the shorter side of the finest raster's cell.
func TestStepM(t *testing.T) {
	utm := utmPlane().write(t, "plane.tif")
	fine := utmPlane()
	fine.cell = 10
	degrees := made{west: -22, north: 48, cell: 1.0 / 1200, cols: 20, rows: 20, epsg: 4326, value: func(x, y float64) float64 { return 5 }}
	three := degrees.write(t, "3s.tif")
	for _, tc := range []struct {
		name     string
		spec     Spec
		min, max float64
	}{
		{"10 m cells", Spec{Elevation: []string{fine.write(t, "fine.tif")}}, 30, 30},
		{"30 m of UTM", Spec{Elevation: []string{utm}}, 30.01, 30.02}, // scale factor 0.9996 + at 441 km
		// 3 seconds of longitude at 48 N: cos(48 deg) * 92.77 m = 62.1 m, a little more on the ellipsoid
		{"3 seconds", Spec{Elevation: []string{three}}, 62.1, 62.3},
		{"both", Spec{Elevation: []string{three, utm}}, 30.01, 30.02},
		{"stated", Spec{Elevation: []string{three}, StepM: 7}, 7, 7},
	} {
		if got := open(t, tc.spec).StepM(); got < tc.min || got > tc.max {
			t.Errorf("%s: step %g m, want %g to %g", tc.name, got, tc.min, tc.max)
		}
	}
}

func TestOpenErrors(t *testing.T) {
	dir := t.TempDir()
	good := utmPlane().write(t, "plane.tif")
	bare := filepath.Join(dir, "bare.tif")
	run(t, "", "gdal_translate", "-q", "-co", "PROFILE=BASELINE", good, bare)
	os.Remove(bare + ".aux.xml")
	noCRS := writeFile(t, "nocrs.asc", "ncols 2\nnrows 2\nxllcorner 0\nyllcorner 0\ncellsize 30\n1 2\n3 4\n")
	odd, complexCells := filepath.Join(dir, "odd.tif"), filepath.Join(dir, "complex.tif")
	run(t, "", "gdal_translate", "-q", "-a_srs", "EPSG:4326", "-a_ullr", "0", "5e6", "100", "4e6", good, odd)
	run(t, "", "gdal_translate", "-q", "-ot", "CFloat32", good, complexCells)
	picture := filepath.Join(dir, "picture.tif")
	run(t, "", "gdal_translate", "-q", "-ot", "Byte", "-b", "1", "-b", "1", "-b", "1", "-co", "PHOTOMETRIC=RGB", good, picture)
	container := filepath.Join(dir, "two.gpkg")
	run(t, "", "gdal_translate", "-q", "-ot", "Byte", "-of", "GPKG", "-co", "RASTER_TABLE=a", good, container)
	run(t, "", "gdal_translate", "-q", "-ot", "Byte", "-of", "GPKG", "-co", "RASTER_TABLE=b", "-co", "APPEND_SUBDATASET=YES", good, container)
	furlongs := utmPlane()
	furlongs.edit = func(g *GeoTIFF) { g.Unit = "furlong" }
	local := filepath.Join(dir, "local.tif")
	run(t, "", "gdal_translate", "-q", "-a_srs", `LOCAL_CS["site grid",UNIT["metre",1]]`, good, local)

	for _, tc := range []struct {
		name string
		spec Spec
		want []string
	}{
		{"none", Spec{}, []string{"no elevation raster"}},
		{"missing", Spec{Elevation: []string{"absent.tif"}}, []string{"absent.tif", "file does not exist"}},
		{"text", Spec{Elevation: []string{writeFile(t, "note.tif", "no raster")}}, []string{"note.tif", "not recognized"}},
		{"empty", Spec{Elevation: []string{writeFile(t, "empty.tif", "")}}, []string{"empty.tif", "not recognized"}},
		{"folder", Spec{Elevation: []string{dir}}, []string{dir, "cannot read it as a raster"}},
		{"no geotransform", Spec{Elevation: []string{bare}}, []string{"bare.tif", "no geotransform"}},
		{"no system", Spec{Elevation: []string{noCRS}}, []string{"nocrs.asc", "no coordinate reference system"}},
		{"local system", Spec{Elevation: []string{local}}, []string{"local.tif", "site grid", "WGS 84"}},
		{"degrees by the million", Spec{Elevation: []string{odd}}, []string{"odd.tif", "do not belong together"}},
		{"complex", Spec{Elevation: []string{complexCells}}, []string{"complex.tif", "CFloat32"}},
		{"picture", Spec{Elevation: []string{picture}}, []string{"picture.tif", "Red", "not heights"}},
		{"container", Spec{Elevation: []string{container}}, []string{"two.gpkg", "container of several rasters", "GPKG:" + container + ":a"}},
		{"unit", Spec{Elevation: []string{furlongs.write(t, "furlongs.tif")}}, []string{"furlongs.tif", "furlong", "US survey feet"}},
		{"cover in floats", Spec{Elevation: []string{good}, Cover: good}, []string{"cover raster", "plane.tif", "whole numbers"}},
		{"step", Spec{Elevation: []string{good}, StepM: -1}, []string{"step of -1 m"}},
		{"step NaN", Spec{Elevation: []string{good}, StepM: math.NaN()}, []string{"step of NaN"}},
		{"bridge", Spec{Elevation: []string{good}, BridgeM: -1}, []string{"-1 m is below 0"}},
		{"class", Spec{Elevation: []string{good}, Classes: map[int]terrain.Class{3: {HeightM: -2}}}, []string{"class 3", "-2 m"}},
	} {
		g, err := Open(tc.spec)
		if err == nil {
			g.Close()
			t.Errorf("%s: opens", tc.name)
			continue
		}
		for _, want := range tc.want {
			if !strings.Contains(err.Error(), want) {
				t.Errorf("%s: %q lacks %q", tc.name, err, want)
			}
		}
	}
	if _, err := Open(Spec{Elevation: []string{"absent.tif"}}); !errors.Is(err, fs.ErrNotExist) {
		t.Errorf("a missing file is not fs.ErrNotExist: %v", err)
	}
}

// truncate cuts a file off in the middle of its cells.
func truncate(t *testing.T, path string) string {
	t.Helper()
	if err := os.Truncate(path, 150_000); err != nil {
		t.Fatal(err)
	}
	return path
}

func TestTruncatedFile(t *testing.T) {
	g, err := Open(Spec{Elevation: []string{truncate(t, utmPlane().write(t, "cut.tif"))}})
	if err != nil { // where the header says it at once
		return
	}
	defer g.Close()
	_, err = g.Profile(utm(t, 440100, 5261000), utm(t, 448000, 5260500))
	if err == nil || !strings.Contains(err.Error(), "cut.tif") {
		t.Errorf("a truncated file gives %v, want an error with its name", err)
	}
}

// printsEnv makes this test binary do what a user's program does with bad files, so that a parent
// can look at what it prints.
const printsEnv = "FELLREACH_TEST_PRINTS"

// GDAL and PROJ print nothing of their own, whatever goes wrong.
func TestNoStrayOutput(t *testing.T) {
	if dir := os.Getenv(printsEnv); dir != "" {
		for _, name := range []string{"cut.tif", "note.tif", "absent.tif"} {
			g, err := Open(Spec{Elevation: []string{filepath.Join(dir, name)}})
			if err == nil {
				_, err = g.Profile(utm(t, 440100, 5261000), utm(t, 448000, 5260500))
				g.Close()
			}
			if err == nil {
				t.Errorf("%s gives no error", name)
			}
		}
		_, err := Locate(terrain.Coordinates{EPSG: 99999})
		if err == nil {
			t.Error("EPSG:99999 is found")
		}
		if err := WriteGeoTIFF(filepath.Join(dir, "w.tif"), GeoTIFF{Grid: terrain.NewGrid(1, 1), EPSG: 99999, Type: Float32, NoData: noData(0)}); err == nil {
			t.Error("EPSG:99999 is written")
		}
		return
	}
	dir := filepath.Dir(truncate(t, utmPlane().write(t, "cut.tif")))
	if err := os.WriteFile(filepath.Join(dir, "note.tif"), []byte("II*\x00garbage that begins as a TIFF does"), 0o644); err != nil {
		t.Fatal(err)
	}
	command := exec.Command(os.Args[0], "-test.run=^TestNoStrayOutput$")
	command.Env = append(os.Environ(), printsEnv+"="+dir, "CPL_DEBUG=ON", "PROJ_DEBUG=3")
	out, err := command.CombinedOutput()
	if err != nil {
		t.Fatalf("%v\n%s", err, out)
	}
	for line := range strings.Lines(string(out)) {
		if line = strings.TrimSpace(line); line != "PASS" && !strings.HasPrefix(line, "coverage:") {
			t.Errorf("stray output: %s", line)
		}
	}
}

// A 40,000 by 40,000 raster is never loaded whole: 6.4 GB of heights, hardly anything on disk.
func TestHugeRaster(t *testing.T) {
	path := filepath.Join(t.TempDir(), "huge.tif")
	run(t, "", "gdal_create", "-q", "-of", "GTiff", "-ot", "Int16", "-outsize", "40000", "40000",
		"-a_srs", "EPSG:32627", "-a_ullr", "100000", "6000000", "900000", "5200000", "-co", "SPARSE_OK=TRUE", "-co", "COMPRESS=DEFLATE", "-co", "TILED=YES", path)
	g := open(t, Spec{Elevation: []string{path}})
	g.cache = newTileCache(20 * tileBytes)
	p, err := g.Profile(utm(t, 300000, 5300000), utm(t, 500000, 5500000))
	if err != nil {
		t.Fatal(err)
	}
	for i, h := range p.AslM {
		if h != 0 { // what a sparse file holds where nothing was written
			t.Fatalf("height %g m at %g km, want 0", h, p.DistKm[i])
		}
	}
	if n := g.cache.order.Len(); n != 20 || len(g.cache.tiles) != 20 {
		t.Errorf("%d tiles in order, %d in the table, want the limit of 20", n, len(g.cache.tiles))
	}
	rss := residentMB(t)
	t.Logf("profile of %d points, %d MB resident", len(p.AslM), rss)
	if rss > 1024 {
		t.Errorf("%d MB resident", rss)
	}
}

// residentMB is the memory that the process holds, as Linux counts it.
func residentMB(t *testing.T) int {
	status, err := os.ReadFile("/proc/self/status")
	if err != nil {
		t.Skip("no /proc/self/status")
	}
	_, after, _ := strings.Cut(string(status), "VmHWM:")
	var kB int
	fmt.Sscan(after, &kB)
	return kB / 1024
}

func TestFiles(t *testing.T) {
	cover := utmPlane()
	cover.value = func(x, y float64) float64 { return 2 }
	cover.edit = func(g *GeoTIFF) { g.Type, g.NoData, g.Unit = Uint8, noData(0), "" }
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: cover.write(t, "cover.tif"), Classes: map[int]terrain.Class{2: {}}})
	files := g.Files()
	if len(files) != 2 || files[0].Type != "Float32" || files[1].Type != "Byte" || filepath.Base(files[1].Path) != "cover.tif" {
		t.Errorf("files are %+v", files)
	}
}
