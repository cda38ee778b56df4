package propagation

import "fellreach/terrain"

// A Path is what a method needs to know: the ground between two antennas, the antennas above it,
// the frequency and the air.
//
// The embedded profile's CoverM is P.1812's representative cover height R, its Zone the
// radio-climatic zone. The first point is the transmitter, the last the receiver; cover at these
// two is never used. The statistical fields are read by P.1812 alone.
type Path struct {
	terrain.Profile

	// FreqHz is the frequency, 30e6 to 6e9 Hz.
	FreqHz float64
	// TxAglM and RxAglM are the antenna heights above ground at the first and the last point.
	TxAglM, RxAglM float64
	// VerticalShare is the part of the power that is vertically polarized: 1 vertical,
	// 0 horizontal. In between the two losses of the spherical Earth are mixed linearly in dB by
	// it, which is this project's choice: the Recommendations know the two ends only.
	VerticalShare float64

	// DeltaN is the average fall of radio refractivity through the lowest kilometre, positive,
	// in N-units/km; N0 the sea-level surface refractivity in N-units (Rec. ITU-R P.453, both at
	// the path's centre).
	DeltaN, N0 float64
	// TimePct is P.1812's p: the loss is not exceeded for that part of an average year, up to 50 %.
	TimePct float64
	// LocationPct is P.1812's pL: the loss is not exceeded at that part of the locations, 1 to 99 %;
	// 50 leaves location variability out. LocationSpreadDB is its standard deviation sigmaL.
	LocationPct, LocationSpreadDB float64
	// LatDeg is the latitude of the path's centre, north positive.
	LatDeg float64
	// TxCoastKm and RxCoastKm are the distances over land from each antenna to the coast along the
	// path, dct and dcr; 500 where there is no sea.
	TxCoastKm, RxCoastKm float64
}

// txAslM and rxAslM are the antenna heights above sea level, hts and hrs: on bare ground.
func (p *Path) txAslM() float64 { return p.AslM[0] + p.TxAglM }
func (p *Path) rxAslM() float64 { return p.AslM[len(p.AslM)-1] + p.RxAglM }
