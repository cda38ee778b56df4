package propagation

import "math"

// LocationSpreadDB returns the standard deviation sigmaL of the loss among the places of a square
// of side widthM, m, dB, at freqHz: the mobile's antenna stands rxAglM above ground among cover of
// coverM. It shrinks to 0 within the 10 m above the cover.
//
// Source: Rec. ITU-R P.1812-6, section ~4.7, by the constants of the reference implementation; no
// published case tests it.
func LocationSpreadDB(freqHz, widthM, rxAglM, coverM float64) float64 {
	u := min(max(1-(rxAglM-coverM)/10, 0), 1)
	return (0.52 + 0.024*freqHz/1e9) * math.Pow(widthM, 0.28) * u
}

// LocationDB returns Lloc, dB, what the loss gains when it shall not be exceeded at pl percent of
// the locations: 0 at 50 %, positive above.
//
// Source: Rec. ITU-R P.1812-6, section ~4.7.
func LocationDB(pl, spreadDB float64) float64 {
	if pl == 50 {
		return 0
	}
	return -inverseNormal(pl/100) * spreadDB
}
