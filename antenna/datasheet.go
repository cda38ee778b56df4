package antenna

import (
	"errors"
	"fmt"
	"math"
)

// A Sheet is what a maker's data sheet says of a directional antenna: its gain, the half-power
// widths of its main lobe in the horizontal and the vertical plane (1 to 360 degrees) and its
// front-to-back ratio (0 to 60 dB).
type Sheet struct {
	GainDBi              float64
	WidthHDeg, WidthVDeg float64
	FrontToBackDB        float64
}

// Datasheet returns an antenna from its data sheet. The attenuation is 12 (angle/width)^2 dB in
// each plane, summed, but no more than the front-to-back ratio: a parabola in decibels, 3 dB down
// at half the width. Common practice, no source. The azimuth counts by its cosine of elevation, so
// that the gain is one at the zenith from wherever that is reached. The polarization is that of
// its mount.
func Datasheet(sheet Sheet, port Port) (Design, error) {
	port, err := port.checked()
	if err := errors.Join(sheet.check(), err); err != nil {
		return Design{}, err
	}
	pattern := gainPattern(sheet.GainDBi, sheet.attenuationDB)
	antenna := stated{
		pattern: pattern,
		port:    port,
		source: fmt.Sprintf("%g dBi, widths %g and %g deg, front-to-back %g dB as stated; parabolic main lobe (common practice, no source)",
			sheet.GainDBi, sheet.WidthHDeg, sheet.WidthVDeg, sheet.FrontToBackDB),
		notes: excessNotes(pattern),
	}
	return Design{Kind: "datasheet", Directional: true, Solve: antenna.solve}, nil
}

func (s Sheet) check() error {
	return errors.Join(
		checkGain(s.GainDBi),
		within("width_h", s.WidthHDeg, 1, 360, "deg"),
		within("width_v", s.WidthVDeg, 1, 360, "deg"),
		within("front_to_back", s.FrontToBackDB, 0, 60, "dB"),
	)
}

func (s Sheet) attenuationDB(d Direction) float64 {
	h := math.Remainder(d.AzDeg, 360) * math.Cos(radians(d.ElDeg)) / s.WidthHDeg
	v := d.ElDeg / s.WidthVDeg
	return min(12*(h*h+v*v), s.FrontToBackDB)
}
