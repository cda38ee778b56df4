package antenna

import (
	"errors"
	"fmt"
)

// Isotropic returns an antenna of one gain in dBi towards all directions: a reference, or a
// mobile's antenna of which only a gain is stated. The polarization is that of its mount.
func Isotropic(gainDBi float64, port Port) (Design, error) {
	port, err := port.checked()
	if err := errors.Join(checkGain(gainDBi), err); err != nil {
		return Design{}, err
	}
	antenna := stated{
		pattern: gainPattern(gainDBi, func(Direction) float64 { return 0 }),
		port:    port,
		source:  fmt.Sprintf("%g dBi as stated, the same in all directions", gainDBi),
	}
	return Design{Kind: "isotropic", Solve: antenna.solve}, nil
}
