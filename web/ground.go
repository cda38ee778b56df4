package web

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"math"
	"os"
	"sync"

	"fellreach/link/plan"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// A ground is the open rasters that some versions stand on; the last of them closes it.
type ground struct {
	id      string        // names what its tiles show
	network *plan.Network // one that holds it open
	users   int           // versions; guarded by the shelf
	relief  func() (minM, maxM float64, err error)
}

func newGround(n *plan.Network) *ground {
	g := &ground{id: groundID(n), network: n}
	var minM, maxM float64
	look := sync.OnceValue(func() (err error) {
		minM, maxM, err = n.Ground.Relief()
		return err
	})
	g.relief = func() (float64, float64, error) {
		err := look()
		return minM, maxM, err
	}
	return g
}

// groundID is a hash of what the tiles depend on: the files, by their names, sizes and times, and what
// lies beyond them.
func groundID(n *plan.Network) string {
	h := sha256.New()
	fmt.Fprintln(h, tileVersion, n.Plan().Ground.Beyond)
	for _, in := range elevationOf(n) {
		fmt.Fprintln(h, in.Path)
		if info, err := os.Stat(in.Path); err == nil {
			fmt.Fprintln(h, info.Size(), info.ModTime().UnixNano())
		}
	}
	return hex.EncodeToString(h.Sum(nil)[:8])
}

// elevationOf lists the elevation rasters.
func elevationOf(n *plan.Network) []raster.Info {
	return n.Ground.Files()[:len(n.Plan().Ground.Elevation.Files)]
}

// bounds returns the bounds of the elevation rasters in longitude and latitude, and the finest cell.
func (g *ground) bounds() (all orb.Bound, finestM float64) {
	finestM = math.Inf(1)
	for i, in := range elevationOf(g.network) {
		box := orb.Bound{Min: orb.Point{in.LonLat[0], in.LonLat[1]}, Max: orb.Point{in.LonLat[2], in.LonLat[3]}}
		if i == 0 {
			all = box
		}
		all = all.Union(box)
		finestM = min(finestM, in.CellXM, in.CellYM)
	}
	return all, finestM
}

// zooms returns the least zoom at which tiles are quick to cut from the rasters, and the one at which
// pixels are about as large as cells.
func (g *ground) zooms() (least, most int) {
	bounds, finestM := g.bounds()
	zoom := func(pixelM float64) int {
		return min(max(int(math.Ceil(math.Log2(pixelSizeM(0, bounds.Center().Lat())/pixelM))), 0), maxZoom)
	}
	most = zoom(finestM)
	if coarsestM := g.network.Ground.CoarsestM(); !math.IsInf(coarsestM, 1) {
		least = min(zoom(coarsestM), most)
	}
	return least, most
}
