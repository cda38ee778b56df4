package raster

import (
	"fmt"
	"maps"
	"os"
	"slices"
	"strings"
)

// Fingerprint is a text that changes when the ground does, as far as the names, sizes and times of
// its files and its spec tell.
func (g *Ground) Fingerprint() (string, error) {
	var b strings.Builder
	for _, f := range g.files() {
		info, err := os.Stat(f.info.Path)
		if err != nil {
			return "", err
		}
		fmt.Fprintln(&b, info.Name(), info.Size(), info.ModTime().UnixNano(), f.info.GeoTransform, f.info.wkt)
	}
	s := g.spec
	fmt.Fprintln(&b, s.Surface, g.stepM, s.BridgeM, s.BeyondSea)
	for _, class := range slices.Sorted(maps.Keys(s.Classes)) {
		fmt.Fprintln(&b, class, s.Classes[class])
	}
	return b.String(), nil
}
