package link

import (
	"fmt"

	"fellreach/link/propagation"
)

// Surroundings describe what stands right around a station, in place of the cover raster: trees
// (WoodlandM of depth) or houses (BuiltM high, across a street of StreetM). Zero is none.
type Surroundings struct {
	WoodlandM, BuiltM, StreetM float64
	Source                     string
}

// clearM is how far from the station cover heights are left out: its clearing, or the depth of
// the surroundings that are counted in a line of their own, so that no obstacle counts twice.
func (s *Station) clearM() float64 {
	return max(s.ClearingM, s.Surroundings.WoodlandM, s.Surroundings.StreetM)
}

// pathAglM is the height from which the path method sees the path: the antenna's, or the roofs'
// around it, down from which the line of the surroundings leads.
func (s *Station) pathAglM() float64 { return max(s.AglM, s.Surroundings.BuiltM) }

// surroundingsLine writes the loss in the station's surroundings.
func (s *Station) surroundingsLine(b *Budget, freqHz float64) {
	switch around := s.Surroundings; {
	case around.WoodlandM > 0:
		loss, note := propagation.WoodlandLossDB(freqHz, around.WoodlandM)
		b.add(LossLine, fmt.Sprintf("%s: woodland, %g m", s.Name, around.WoodlandM), -loss, "P.833-9, "+around.Source)
		s.note(b, note)
	case around.BuiltM > 0:
		loss, note := propagation.BuiltLossDB(freqHz, s.AglM, around.BuiltM, around.StreetM)
		b.add(LossLine, fmt.Sprintf("%s: among buildings of %g m", s.Name, around.BuiltM), -loss, "P.2108-1 section 3.1, "+around.Source)
		s.note(b, note)
	}
}

func (s *Station) note(b *Budget, note string) {
	if note != "" {
		b.warn(s.Name, note)
	}
}
