package raster

import (
	"path/filepath"
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A block holds sea if one of its cells does, wherever in it and in whichever of the windows that
// a sheet of 10 m cells is read in; the raster's last blocks are cut off by its edge.
func TestFindSea(t *testing.T) {
	const cols, rows, block = 1700, 1650, 49 // 10 m in UTM at 441 km are 10.004 m: 49 to a block
	cells := [][2]int{{0, 0}, {49, 48}, {97, 49}, {1699, 3}, {700, 660}, {701, 669}, {703, 700}, {5, 1649}, {1699, 1649}, {1567, 1567}, {1568, 1568}}
	grid := terrain.NewGrid(cols, rows)
	for i := range grid.Cells {
		grid.Cells[i] = landClass
	}
	want := map[[2]int]bool{}
	for _, cell := range cells {
		grid.Set(cell[0], cell[1], seaClass)
		want[[2]int{cell[0] / block, cell[1] / block}] = true
	}
	path := filepath.Join(t.TempDir(), "cover.tif")
	if err := WriteGeoTIFF(path, GeoTIFF{Grid: grid, GeoTransform: [6]float64{440000, 10, 0, 5266000, 0, -10}, EPSG: 32627, Type: Int16}); err != nil {
		t.Fatal(err)
	}
	s := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: path, Classes: coastClasses}).shore
	if s.blockCols != block || s.blockRows != block {
		t.Fatalf("blocks of %d by %d cells, want %d", s.blockCols, s.blockRows, block)
	}
	for row := -sheetBlocks; row < 3*sheetBlocks; row++ {
		for col := -sheetBlocks; col < 3*sheetBlocks; col++ {
			key, c, r := sheetOf(col, row)
			sheet, err := s.sea.get(key)
			if err != nil {
				t.Fatal(err)
			}
			if got := sheet.has(r, c, c); got != want[[2]int{col, row}] {
				t.Errorf("block %d, %d: sea %v", col, row, got)
			}
		}
	}
}

// A cell that is void is no sea, whatever number it holds, as a profile has it.
func TestVoidIsNoSea(t *testing.T) {
	cover := asClasses(made{west: 440000, north: 5266000, cell: 30, cols: 300, rows: 200, epsg: 32627, value: func(x, y float64) float64 {
		if x < 442000 {
			return 9
		}
		return landClass
	}})
	plain := func(g *GeoTIFF) { g.Type, g.NoData, g.Unit = Uint8, nil, "" }
	classes := map[int]terrain.Class{9: {Zone: terrain.Sea}, landClass: {}}
	shown, dir := cover, t.TempDir()
	shown.edit = plain
	seen := shown.write(t, "seen.tif")
	noData, masked, mask := filepath.Join(dir, "nodata.tif"), filepath.Join(dir, "masked.tif"), filepath.Join(dir, "mask.vrt")
	run(t, "", "gdal_translate", "-q", "-a_nodata", "9", seen, noData)
	run(t, "", "gdal_translate", "-q", "-of", "VRT", "-scale", "2", "9", "255", "0", seen, mask) // 0 where the sea is
	both := filepath.Join(dir, "both.vrt")
	run(t, "", "gdalbuildvrt", "-q", "-separate", both, seen, mask)
	run(t, "", "gdal_translate", "-q", "-b", "1", "-mask", "2", "--config", "GDAL_TIFF_INTERNAL_MASK", "YES", both, masked)
	for _, tc := range []struct {
		name, path string
		want       terrain.Zone
	}{
		{"seen", seen, terrain.Coastal}, {"nodata", noData, terrain.Inland}, {"masked", masked, terrain.Inland},
	} {
		g := open(t, Spec{
			Elevation: []string{made{west: 440000, north: 5266000, cell: 100, cols: 90, rows: 60, epsg: 32627, value: func(x, y float64) float64 { return 9 }}.write(t, "dem.tif")},
			Cover:     tc.path, Classes: classes,
		})
		p, err := g.Profile(utm(t, 444000, 5263000), utm(t, 447000, 5263000))
		if err != nil {
			t.Fatal(err)
		}
		if p.Zone[0] != tc.want {
			t.Errorf("%s: zone %d, want %d", tc.name, p.Zone[0], tc.want)
		}
		_, known, err := g.CoverAt(utm(t, 441000, 5263000))
		if err != nil || known != (tc.want == terrain.Coastal) {
			t.Errorf("%s: the sea is known: %v, %v", tc.name, known, err)
		}
	}
}

// Places are outside only if they are outside all rasters.
func TestOutsideAll(t *testing.T) {
	east := utmPlane()
	east.west = 449000
	g := open(t, Spec{Elevation: []string{utmPlane().write(t, "west.tif"), east.write(t, "east.tif")}})
	places := []orb.Point{utm(t, 439000, 5263000), utm(t, 441000, 5263000), utm(t, 457000, 5263000), utm(t, 459000, 5263000)}
	got, err := outsideAll(g.elevation, places)
	if err != nil {
		t.Fatal(err)
	}
	for i, want := range []bool{true, false, false, true} {
		if got[i] != want {
			t.Errorf("%v: outside %v", places[i], got[i])
		}
	}
}
