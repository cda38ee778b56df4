package propagation

import (
	"fmt"
	"strings"
)

// A Model is a method that gives the basic transmission loss of a path: a value, not a registration.
type Model struct {
	// Name is the word by which plans and commands know the method, Edition the publication it follows.
	Name, Edition string
	// MinHz and MaxHz are the frequencies it takes; Loss returns an error outside them.
	MinHz, MaxHz float64
	// Loss evaluates a path. It returns an error when a value of the path is missing or outside
	// what can be computed, and panics when the profile's slices differ in length.
	Loss func(Path) (Loss, error)
}

// The range of frequencies of this program, which is that of P.1812-8.
const minHz, maxHz = 30e6, 6e9

// Loss is the answer of a method.
type Loss struct {
	// DB is the basic transmission loss (between isotropic antennas), dB.
	DB float64
	// TxElDeg and RxElDeg are the elevations at which the path leaves each end, above the local
	// horizontal, over bare terrain at the median effective Earth radius: towards the other
	// antenna on a line of sight, the horizon angle on a trans-horizon path. They are the same for
	// every method, free space included: antennas point along the real path.
	TxElDeg, RxElDeg float64
	// TransHorizon tells that bare terrain stands in the line of sight at the median radius.
	TransHorizon bool
	// Terms are the intermediates by the Recommendation's symbols.
	Terms Terms
	// Notes say which limits of the method the path touches; nil when none.
	Notes []string
}

// ByName returns the method of that name: "free-space", "p526" or "p1812".
func ByName(name string) (Model, error) {
	models := [...]Model{FreeSpace, P526, P1812}
	names := make([]string, len(models))
	for i, m := range models {
		if m.Name == name {
			return m, nil
		}
		names[i] = m.Name
	}
	return Model{}, fmt.Errorf("no propagation method is called %q: use %s", name, strings.Join(names, ", "))
}
