package raster

import (
	"fmt"
	"math"
	"path/filepath"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"

	"fellreach/terrain"
)

// A disc of 50 km around one block of sea, on grids of many kinds and far from where their scale
// is true. The distances are geodesics of PROJ from the sea's cells to the middle of every block.
func TestNearSeaOnManyGrids(t *testing.T) {
	for _, tc := range []struct {
		name       string
		epsg       int
		place      orb.Point // of the sea
		cellX      float64   // in units of the system
		aspect     float64   // height of a cell over its width
		rotateDeg  float64
		cols, rows int
	}{
		{"UTM", 32627, orb.Point{-20, 47}, 250, 1, 0, 560, 560},
		{"UTM, far outside its zone", 32627, orb.Point{-6, 57}, 250, 1, 0, 560, 560},
		{"UTM, turned", 32627, orb.Point{-20, 47}, 250, 1, 30, 560, 560},
		{"degrees at 60 N", 4326, orb.Point{5, 60}, 1.0 / 240, 0.5, 0, 640, 640},
		{"square degrees at 60 N", 4326, orb.Point{5, 60}, 1.0 / 400, 1, 0, 900, 500},
		{"square degrees at 81 N", 4326, orb.Point{-30, 81}, 1.0 / 100, 1, 0, 800, 130},
		{"across the date line", 4326, orb.Point{179.95, 52}, 1.0 / 240, 1, 0, 500, 300},
		{"Mercator at 70 N", 3857, orb.Point{20, 70}, 700, 1, 0, 540, 560},
		{"equal area, at its edge", 3035, orb.Point{-22, 64}, 250, 1, 0, 560, 560},
		{"polar", 3413, orb.Point{-52, 70}, 250, 1, 0, 560, 560},
	} {
		t.Run(tc.name, func(t *testing.T) {
			crs, err := transformTo(fmt.Sprintf("EPSG:%d", tc.epsg))
			if err != nil {
				t.Fatal(err)
			}
			middle := []orb.Point{tc.place}
			if err := crs.forward(middle); err != nil {
				t.Fatal(err)
			}
			sin, cos := math.Sincos(tc.rotateDeg * math.Pi / 180)
			toGround := affine{0, tc.cellX * cos, tc.cellX * tc.aspect * sin, 0, tc.cellX * sin, -tc.cellX * tc.aspect * cos}
			seaCol, seaRow := tc.cols/2, tc.rows/2
			corner := toGround.apply(float64(seaCol)+0.5, float64(seaRow)+0.5)
			toGround[0], toGround[3] = middle[0][0]-corner[0], middle[0][1]-corner[1]
			path := writeOneSea(t, tc.cols, tc.rows, seaCol, seaRow, tc.epsg, toGround)

			g := open(t, Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: path, Classes: coastClasses})
			checkDisc(t, g, tc.place)
		})
	}
}

// writeOneSea writes a cover raster of land with one cell of sea.
func writeOneSea(t *testing.T, cols, rows, seaCol, seaRow, epsg int, toGround affine) string {
	grid := terrain.NewGrid(cols, rows)
	for i := range grid.Cells {
		grid.Cells[i] = landClass
	}
	grid.Set(seaCol, seaRow, seaClass)
	path := filepath.Join(t.TempDir(), "cover.tif")
	if err := WriteGeoTIFF(path, GeoTIFF{Grid: grid, GeoTransform: toGround, EPSG: epsg, Type: Uint8}); err != nil {
		t.Fatal(err)
	}
	return path
}

// checkDisc compares every block of a raster with its distance from the one place of sea.
func checkDisc(t *testing.T, g *Ground, sea orb.Point) {
	s := g.shore
	in := g.cover.info
	wrong, near, deepest := 0, 0, 0.0
	sampler := nearSampler{shore: s}
	for row := 0; row < in.Rows; row += s.blockRows {
		for col := 0; col < in.Cols; col += s.blockCols {
			blockCol, blockRow, _ := s.block(float64(col), float64(row))
			places, err := g.cover.places([]orb.Point{s.middle(blockCol, blockRow)}, 0, 0)
			if err != nil {
				t.Fatal(err)
			}
			got, err := sampler.at(float64(col), float64(row))
			if err != nil {
				t.Fatal(err)
			}
			distM, _, _ := Inverse(sea, places[0])
			if got {
				near++
			}
			if missKm := math.Abs(distM/1000 - 50); got != (distM < 50_000) {
				deepest = max(deepest, missKm)
				// Here the places are middles of blocks, and only the sea's is anywhere in its own.
				if missKm > toleranceKm/2 {
					wrong++
				}
			}
		}
	}
	t.Logf("cells of %.0f by %.0f m, blocks of %d by %d cells: %d near, off by %.0f m at most", in.CellXM, in.CellYM, s.blockCols, s.blockRows, near, deepest*1000)
	if near == 0 || wrong > 0 {
		t.Errorf("%d blocks near the sea, %d wrong, by up to %.2f km", near, wrong, deepest)
	}
}

// Hand-worked: on square blocks of 500 m, 100 blocks make 50 km; 60 rows on, 80 columns do. Blocks
// turned by 30 degrees span the same; twice as wide ones half as many.
func TestMetricSpan(t *testing.T) {
	square, wide := metric{500 * 500, 0, 500 * 500}, metric{1000 * 1000, 0, 500 * 500}
	slanted := metric{500 * 500, 500 * 300, 500 * 500} // rows run on 3 columns for every 5
	for _, tc := range []struct {
		name        string
		m           metric
		y           int
		first, last int
	}{
		{"own row", square, 0, -100, 100},
		{"60 rows on", square, 60, -80, 80},
		{"80 rows back", square, -80, -60, 60},
		{"farthest row", square, 100, 0, 0},
		{"beyond", square, 101, 0, -1},
		{"wide", wide, 60, -40, 40},
		{"slanted", slanted, 100, -120, 0}, // x^2 + 1.2*100 x = 0
	} {
		if first, last := tc.m.span(tc.y); first != tc.first || last != tc.last {
			t.Errorf("%s: columns %d to %d, want %d to %d", tc.name, first, last, tc.first, tc.last)
		}
	}
	if cols, rows, ok := slanted.reach(); cols != 125 || rows != 125 || !ok { // 100/sqrt(1 - 0.36)
		t.Errorf("reach of %d columns, %d rows, %v, want 125 both", cols, rows, ok)
	}
	nowhere := newMetric(orb.Point{math.Inf(1), 0}, orb.Point{}, orb.Point{}, orb.Point{})
	if _, _, ok := nowhere.reach(); ok {
		t.Error("50 km reach somewhere off the Earth")
	}
	if first, last := nowhere.span(0); first <= last {
		t.Errorf("off the Earth: columns %d to %d", first, last)
	}
}

// A sheet's row has sea from one block to another exactly if one of these blocks does.
func TestSeaSheet(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		var sea blockSet
		row := rapid.IntRange(0, sheetBlocks-1).Draw(t, "row")
		for col := range sea[row] {
			sea[row][col] = rapid.IntRange(0, 9).Draw(t, "sea") == 0
		}
		first, last := rapid.IntRange(-40, 80).Draw(t, "first"), rapid.IntRange(-40, 80).Draw(t, "last")
		want := false
		for col := max(first, 0); col <= min(last, sheetBlocks-1); col++ {
			want = want || sea[row][col]
		}
		if got := newSeaSheet(&sea).has(row, first, last); got != want {
			t.Fatalf("blocks %d to %d: %v, want %v", first, last, got, want)
		}
	})
}

// Every block is on one sheet, at a place within it, below zero too.
func TestSheetOf(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		blockCol, blockRow := rapid.IntRange(-1e6, 1e6).Draw(t, "col"), rapid.IntRange(-1e6, 1e6).Draw(t, "row")
		key, col, row := sheetOf(blockCol, blockRow)
		if col < 0 || col >= sheetBlocks || row < 0 || row >= sheetBlocks || key.col*sheetBlocks+col != blockCol || key.row*sheetBlocks+row != blockRow {
			t.Fatalf("sheet %v, place %d, %d", key, col, row)
		}
	})
}

// Sheets are made once, forgotten when they fail, and thrown out when there are too many.
func TestSheetTable(t *testing.T) {
	made, broken := 0, true
	table := newSheetTable(func(key sheetKey) (*blockSet, error) {
		made++
		if key.col == -1 && broken {
			return nil, fmt.Errorf("no such sheet")
		}
		return new(blockSet), nil
	})
	for range 2 {
		if _, err := table.get(sheetKey{-1, 0}); err == nil {
			t.Error("a broken sheet is there")
		}
	}
	broken = false
	a, err := table.get(sheetKey{-1, 0})
	b, _ := table.get(sheetKey{-1, 0})
	if made != 3 || err != nil || a != b {
		t.Errorf("made %d times, %v, the same: %v", made, err, a == b)
	}
	for i := range 3 * maxSheets {
		if _, err := table.get(sheetKey{i, 1}); err != nil {
			t.Fatal(err)
		}
	}
	if n := len(table.sheets); n > maxSheets {
		t.Errorf("%d sheets are kept", n)
	}
}

// A cover raster of 40,000 by 40,000 cells of 20 m: opening it reads nothing, a profile only what
// is within 50 km, and where the sea is near less than that.
func TestHugeCover(t *testing.T) {
	path := filepath.Join(t.TempDir(), "huge.tif")
	run(t, "", "gdal_create", "-q", "-of", "GTiff", "-ot", "Byte", "-outsize", "40000", "40000", "-a_srs", "EPSG:32627",
		"-a_ullr", "100000", "6000000", "900000", "5200000", "-co", "SPARSE_OK=TRUE", "-co", "COMPRESS=DEFLATE", "-co", "TILED=YES", path)
	spec := Spec{Elevation: []string{utmPlane().write(t, "plane.tif")}, Cover: path}
	from, to := utm(t, 441000, 5262000), utm(t, 448000, 5264000)
	for _, tc := range []struct {
		name      string
		zone      terrain.Zone // of the whole raster
		maxSheets int
	}{
		{"all land", terrain.Inland, 100}, // sheets of 15 km: 10 by 10 around two
		{"all sea", terrain.Sea, 12},      // the sheets that the places are on
	} {
		spec.Classes = map[int]terrain.Class{0: {Zone: tc.zone}, seaClass: {Zone: terrain.Sea}}
		g := open(t, spec)
		if n := len(g.shore.sea.sheets); n != 0 {
			t.Errorf("%s: opening reads %d sheets", tc.name, n)
		}
		c, err := g.Coast([]orb.Point{from, to})
		if err != nil {
			t.Fatal(err)
		}
		want := map[terrain.Zone]terrain.Zone{terrain.Inland: terrain.Inland, terrain.Sea: terrain.Coastal}[tc.zone]
		at := []orb.Point{from}
		if err := g.cover.crs.forward(at); err != nil {
			t.Fatal(err)
		}
		col, row := g.cover.cell(at[0])
		if got := c.Zone(terrain.Inland, 5, col, row); got != want {
			t.Errorf("%s: zone %d, want %d", tc.name, got, want)
		}
		if n := len(g.shore.sea.sheets); n == 0 || n > tc.maxSheets {
			t.Errorf("%s: %d sheets are read, want at most %d", tc.name, n, tc.maxSheets)
		}
		t.Logf("%s: %d sheets are read", tc.name, len(g.shore.sea.sheets))
	}
	if rss := residentMB(t); rss > 1024 {
		t.Errorf("%d MB resident", rss)
	}
}
