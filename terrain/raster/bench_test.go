package raster

import (
	"testing"
)

// benchGround is hills of 48 by 48 km in 30 m cells of decimetres, as the demonstration's are.
func benchGround(b *testing.B) Spec {
	m := made{west: 430000, north: 5300000, cell: 30, cols: 1600, rows: 1600, epsg: 32627, value: hills}
	m.edit = func(g *GeoTIFF) { g.Type, g.Scale, g.NoData = Int16, 0.1, noData(-32768) }
	return Spec{Elevation: []string{m.write(b, "hills.tif")}, StepM: 30}
}

// A path of 40 km at 30 m with all its tiles in memory.
func BenchmarkProfileWarm(b *testing.B) {
	g := open(b, benchGround(b))
	from, to := utm(b, 433000, 5270000), utm(b, 472000, 5279000)
	b.ReportAllocs()
	for b.Loop() {
		if _, err := g.Profile(from, to); err != nil {
			b.Fatal(err)
		}
	}
}

// The same from opening the file on, as a single command meets it.
func BenchmarkProfileCold(b *testing.B) {
	spec := benchGround(b)
	from, to := utm(b, 433000, 5270000), utm(b, 472000, 5279000)
	b.ReportAllocs()
	for b.Loop() {
		g, err := Open(spec)
		if err != nil {
			b.Fatal(err)
		}
		if _, err := g.Profile(from, to); err != nil {
			b.Fatal(err)
		}
		g.Close()
	}
}

// Many goroutines on one ground.
func BenchmarkProfileParallel(b *testing.B) {
	g := open(b, benchGround(b))
	from, to := utm(b, 433000, 5270000), utm(b, 472000, 5279000)
	b.ReportAllocs()
	b.RunParallel(func(pb *testing.PB) {
		for pb.Next() {
			if _, err := g.Profile(from, to); err != nil {
				b.Error(err)
			}
		}
	})
}
