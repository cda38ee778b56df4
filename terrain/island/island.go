// Package island makes Hallin, the invented island of the demonstration: about 53 km from west to
// east in mid-ocean, with a main ridge of 800 m, a river of 45 km with its valley and a lake,
// a plain, cliffs and islets, on a grid of 30 m.
//
// The method is fluvial landscape evolution: hand-drawn lines of uplift and coast (outline.go), bent by
// noise, are carved by the streams that drain them (erode.go, water.go) on ever finer grids
// (raise.go). All of it is whole-number arithmetic, but for square roots, which IEEE 754 rounds
// exactly, so that every processor makes the same island.
package island

// The grid, in the projection EPSG (WGS 84, UTM zone 27 north), row by row from the north-west.
// Its middle lies near 47.50 N, 19.99 W.
const (
	Cols, Rows = 2048, 1536
	CellM      = 30
	EPSG       = 32627
	WestM      = 545000  // easting of the grid's outer edge
	NorthM     = 5284000 // northing of the grid's outer edge

	NoData = -32768 // what a file may name as "no height"; Hallin has no voids
)

// Heights returns the heights of the Cols x Rows cells in decimetres above the sea, which lies
// at 0; all land is higher. From every cell water finds a way to the sea that never climbs.
//
// Making the island takes one to two seconds and 170 MB; nothing is kept between calls.
func Heights() []int16 {
	_, w, _ := flooded()
	dm := make([]int16, len(w.levelMm))
	for i, mm := range w.levelMm {
		dm[i] = int16((mm + 50) / 100)
	}
	return dm
}

// Cover returns what covers the Cols x Rows cells: Sea, Open, Wood, Village or Fresh. It makes
// the island anew, as Heights does.
func Cover() []uint8 {
	g, w, lake := flooded()
	return g.clothe(w, lake)
}

// flooded makes the ground, lets the rain fill its hollows, and tells which cells are the lake.
func flooded() (g ground, w water, lake []bool) {
	g = raise()
	bed := sample(dug).finer().finer().finer()
	for i, dry := range g.land {
		if dry {
			g.height.v[i] -= bed.v[i]
		}
	}
	w = drain(g.height, g.land)
	return g, w, w.lake(g.height)
}
