package coverage

import (
	"math"
	"testing"

	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// made is ground by formulas, in metres to the east and north of the site, on a raster of square
// cells around it whose cells are the map's too.
type made struct {
	cellM  float64
	reach  int // cells from the site to the edge
	height func(east, north float64) float64
	class  func(east, north float64) uint8 // of madeClasses; nil for none
	edit   func(*terrain.Disc)
}

var madeClasses = []terrain.Class{{Zone: terrain.Inland}, {HeightM: 12, Zone: terrain.Inland}, {Zone: terrain.Sea}, {HeightM: 6, Zone: terrain.Coastal}}

// linear maps x and y to a*x + b and c*y + d.
func linear(t testing.TB, area orb.Bound, a, b, c, d float64) *terrain.Mesh {
	t.Helper()
	m, err := terrain.NewMesh(area, area.Max[0]-area.Min[0], func(nodes []orb.Point) error {
		for i, p := range nodes {
			nodes[i] = orb.Point{a*p[0] + b, c*p[1] + d}
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return m
}

// lay makes the ground and the map; the site lies off the centre of the middle cell.
func (m made) lay(t testing.TB) (*terrain.Disc, *raster.Frame) {
	t.Helper()
	side := 2*m.reach + 1
	const offEast, offNorth = 0.3, -0.2 // cells
	half := float64(m.reach) * m.cellM
	plane := orb.Bound{Min: orb.Point{-half, -half}, Max: orb.Point{half, half}}
	grid := terrain.NewGrid(side, side)
	cover := &terrain.CoverLayer{Cols: side, Rows: side, Cells: make([]uint8, side*side), Classes: madeClasses}
	for row := range side {
		for col := range side {
			east, north := (float64(col-m.reach)-offEast)*m.cellM, (float64(m.reach-row)-offNorth)*m.cellM
			grid.Set(col, row, float32(m.height(east, north)))
			if m.class != nil {
				cover.Cells[row*side+col] = m.class(east, north)
			}
		}
	}
	place := linear(t, plane, 1/m.cellM, float64(m.reach)+offEast, -1/m.cellM, float64(m.reach)-offNorth)
	cover.Place = place
	d := &terrain.Disc{
		Site: orb.Point{-20, 47.5}, RadiusM: half, Heights: []terrain.Layer{{Grid: grid, Place: place}},
		Places: linear(t, plane, 1/75e3, -20, 1/111e3, 47.5),
	}
	if m.class != nil {
		d.Cover = cover
	}
	if m.edit != nil {
		m.edit(d)
	}
	cells := orb.Bound{Max: orb.Point{float64(side - 1), float64(side - 1)}}
	return d, &raster.Frame{
		Cols: side, Rows: side, CellM: m.cellM,
		Plane: linear(t, cells, m.cellM, -(float64(m.reach)+offEast)*m.cellM, -m.cellM, (float64(m.reach)-offNorth)*m.cellM),
	}
}

// rough is ground with relief at all scales, between 0 and about 900 m, level sea in its lower parts.
func rough(east, north float64) float64 {
	h := 250 + 300*math.Sin(east/5100+1)*math.Cos(north/4300) + 120*math.Sin(east/900-north/1300) + 40*math.Sin(north/310)*math.Cos(east/270)
	i, j := math.Floor(east/60), math.Floor(north/60)
	h += 12 * math.Mod(math.Abs(math.Sin(i*12.9898+j*78.233)*43758.5453), 1)
	return math.Max(0, h)
}

// shapes are the grounds on which ties and limits lie.
var shapes = map[string]func(east, north float64) float64{
	"rough": rough,
	"level": func(_, _ float64) float64 { return 100 },
	"ramp":  func(east, north float64) float64 { return 500 + 0.01*east + 0.007*north },
	"bowl":  func(east, north float64) float64 { return (east*east + north*north) * 2e-7 },
	"dome":  func(east, north float64) float64 { return 800 - (east*east+north*north)*4e-7 },
	"bulge": func(east, north float64) float64 { return (east*east + north*north) / 2 / 8.9e6 },
	"stairs": func(east, north float64) float64 {
		return 10 * math.Floor(math.Hypot(east, north)/500)
	},
	"saw": func(east, north float64) float64 {
		return math.Mod(math.Hypot(east, north), 700) / 10
	},
	"quarters": func(east, north float64) float64 { return math.Round(4*rough(east, north)/20) / 4 },
}

// mixed is cover of all classes in patches, with the sea where rough ground is at 0.
func mixed(east, north float64) uint8 {
	switch {
	case rough(east, north) == 0:
		return 2
	case math.Sin(east/700)*math.Sin(north/450) > 0.3:
		return 1
	case math.Sin(east/1500+1) > 0.8:
		return 3
	}
	return 0
}
