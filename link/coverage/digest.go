package coverage

import (
	"crypto/sha256"
	"encoding/hex"
	"fmt"
	"hash"

	"fellreach/antenna"
	"fellreach/link"
)

// digest tells results apart: two sites with one digest have the same map. It takes in the numbers
// that the map is made of, the antennas by their fields in many directions, and the ground by its
// fingerprint.
func (s *Site) digest(places *link.Places, fingerprint string) string {
	h, t := sha256.New(), &s.Task
	from, to := *t.Link.From, *t.Link.To
	ground := "raster"
	if from.GroundAslM != nil {
		ground = fmt.Sprint(*from.GroundAslM)
	}
	fromAglM, toAglM, clearM := places.Heights()
	c := t.Conditions
	fmt.Fprintln(h, formatVersion, fingerprint, from.At, ground, fromAglM, toAglM, to.AglM, clearM)
	fmt.Fprintln(h, c.Method.Name, c.Method.Edition, c.DeltaN, c.N0, c.Dn1, c.RoughnessM)
	fmt.Fprintln(h, t.LocationsPct, t.RangeM, t.CellM, t.Fine, t.StepM, t.BridgeM, t.Link.Aim, s.BandsDB)
	if t.Link.Fade != nil {
		fmt.Fprintln(h, "fade", t.Link.Fade.LossDB)
	}
	for i := range places.Directions {
		d := &places.Directions[i]
		fmt.Fprintln(h, d.FreqHz, d.SentDBm, d.FixedDB)
		addAntennas(h, d)
	}
	return hex.EncodeToString(h.Sum(nil))
}

// formatVersion changes whenever the same input gives another map.
const formatVersion = "coverage 1"

func addAntennas(h hash.Hash, d *link.PlacesDirection) {
	const azStep, elStep = 5, 2.5
	for el := -90.0; el <= 90; el += elStep {
		for az := 0.0; az < 360; az += azStep {
			toward := antenna.Direction{AzDeg: az, ElDeg: el}
			for _, trans := range []bool{false, true} {
				sent, caught, vertical := d.Antennas(&link.PlacePath{Toward: toward, Back: toward, Trans: trans})
				fmt.Fprintln(h, sent, caught, vertical)
			}
		}
	}
}
