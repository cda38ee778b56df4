package link

import (
	"fmt"

	"fellreach/link/propagation"
)

// A reflection is worth a word when its nulls are this deep and a mast can be moved out of one.
// Common practice, no source.
const (
	notedNullDB = 3
	mastHeightM = 50
)

// warnings are those of the path as a whole: reflections, and ends under the canopy.
func (w *way) warnings(c propagation.FresnelClearance) []Warning {
	var list []Warning
	if c.WorstRatio > 1 && !w.trans {
		r, found := propagation.FindReflection(w.path(w.link.Channel.CentreHz(), w.verticalShare))
		if found && r.NullDB >= notedNullDB && min(r.SpacingTxM, r.SpacingRxM) <= mastHeightM {
			list = append(list, Warning{"", w.reflectionText(r)})
		}
	}
	for _, s := range []*Station{w.first, w.second} {
		if s.CanopyM > s.AglM {
			list = append(list, Warning{s.Name, fmt.Sprintf("stands in cover of %g m, its antenna at %g m: describe its surroundings, woodland or built", s.CanopyM, s.AglM)})
		}
		if s.OnCanopyM > 0 {
			list = append(list, Warning{s.Name, fmt.Sprintf("stands in cover of %g m, and the raster's heights hold it: the antenna is taken to stand on the canopy; give ground_level", s.OnCanopyM)})
		}
	}
	return list
}

func (w *way) reflectionText(r propagation.Reflection) string {
	surface := "flat ground"
	if r.Sea {
		surface = "water"
	}
	return fmt.Sprintf("a reflection from %s at %.1f km from %s can take %.0f dB where it arrives in opposite phase; from null to null it is %.0f m of height at %s, %.0f m at %s; no loss is added",
		surface, r.AtKm, w.first.Name, r.NullDB, r.SpacingTxM, w.first.Name, r.SpacingRxM, w.second.Name)
}
