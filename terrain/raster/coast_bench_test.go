package raster

import (
	"testing"

	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// coastGround is low ground of 48 by 48 km in 30 m cells, with the sea in the west where it is
// a class of its own.
func coastGround(b *testing.B, classes map[int]terrain.Class) Spec {
	spec := benchGround(b)
	low := made{west: 430000, north: 5300000, cell: 30, cols: 1600, rows: 1600, epsg: 32627, value: func(x, y float64) float64 { return hills(x, y) / 6 }}
	cover := asClasses(made{west: 430000, north: 5300000, cell: 30, cols: 1600, rows: 1600, epsg: 32627, value: func(x, y float64) float64 {
		if x < 432000 {
			return seaClass
		}
		return landClass
	}})
	spec.Elevation, spec.Cover, spec.Classes = []string{low.write(b, "low.tif")}, cover.write(b, "cover.tif"), classes
	return spec
}

// A path of 40 km over low land with all in memory: what the coast adds to it is the difference
// of the two.
func BenchmarkCoast(b *testing.B) {
	for _, bc := range []struct {
		name    string
		classes map[int]terrain.Class
	}{
		{"no sea", map[int]terrain.Class{seaClass: {}, landClass: {HeightM: 4}}},
		{"coastal", coastClasses},
	} {
		b.Run(bc.name, func(b *testing.B) {
			g := open(b, coastGround(b, bc.classes))
			from, to := utm(b, 433000, 5270000), utm(b, 472000, 5279000)
			b.ReportAllocs()
			for b.Loop() {
				if _, err := g.Profile(from, to); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// One sheet from nothing, where no cell is sea, so that all 2.6 million cells are read.
func BenchmarkCoastCold(b *testing.B) {
	spec := coastGround(b, map[int]terrain.Class{seaClass: {}, landClass: {}, lakeClass: {Zone: terrain.Sea}})
	g := open(b, spec)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := newShore(g).near.get(sheetKey{1, 1}); err != nil {
			b.Fatal(err)
		}
	}
}

// A coast asked for a place, as a sweep does for every cell.
func BenchmarkCoastZone(b *testing.B) {
	g := open(b, coastGround(b, coastClasses))
	c, err := g.Coast([]orb.Point{utm(b, 433000, 5270000), utm(b, 472000, 5279000)})
	if err != nil {
		b.Fatal(err)
	}
	b.ReportAllocs()
	for b.Loop() {
		c.Zone(terrain.Inland, 5, 800, 800)
	}
}
