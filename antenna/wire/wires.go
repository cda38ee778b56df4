package wire

import (
	"fmt"
	"slices"
)

// Wires returns an antenna of any wires and feeds. Several feeds are driven in phase with equal
// voltages, as those of a [Stack]. Whether the wires fit the method is known only when they are
// solved at a frequency; what is wrong with one of them by itself is an error here.
func Wires(wires []Wire, feeds []Feed) (Antenna, error) {
	if err := (Structure{Wires: wires, Feeds: feeds}).checkEach(); err != nil {
		return Antenna{}, err
	}
	l := layout{wires: slices.Clone(wires), feeds: slices.Clone(feeds)}
	directional := false
	for i, w := range wires {
		directional = directional || w.From != [3]float64{0, 0, w.From[2]} || w.To != [3]float64{0, 0, w.To[2]}
		l.parts = append(l.parts, Part{fmt.Sprintf("wire %d", i+1), w.lengthM()})
	}
	return newAntenna("wires", directional, blueprint{lay: func(_, _ float64) layout { return l }}), nil
}
