package antenna

import (
	"fmt"
	"math"
	"strings"
)

// A Material is the metal of a conductor: its conductivity in S/m, infinite for a conductor
// without loss, and its relative permeability.
type Material struct {
	Name                 string
	ConductivitySPerM    float64
	RelativePermeability float64
}

// Ideal is a conductor without loss.
var Ideal = Material{"ideal", math.Inf(1), 1}

// Materials returns the known metals. Conductivities are those of handbooks, from memory; the
// permeability of steel at radio frequencies is common practice, no source.
func Materials() []Material {
	return []Material{
		{"copper", 5.8e7, 1},
		{"aluminium", 2.5e7, 1}, // 6061 tube; the pure metal has 3.8e7
		{"brass", 1.57e7, 1},
		{"stainless", 1.39e6, 1},
		{"steel", 6e6, 100},
		Ideal,
	}
}

// MaterialNamed returns the material of a name, or an error that lists the names.
func MaterialNamed(name string) (Material, error) {
	var names []string
	for _, m := range Materials() {
		if m.Name == name {
			return m, nil
		}
		names = append(names, m.Name)
	}
	return Material{}, fmt.Errorf("material %q is not known: choose one of %s", name, strings.Join(names, ", "))
}

// check returns an error unless the material's figures can be those of a metal.
func (m Material) check() error {
	if err := within("relative permeability of "+m.Name, m.RelativePermeability, 1, 1e5, ""); err != nil {
		return err
	}
	if m == Ideal {
		return nil
	}
	return within("conductivity of "+m.Name, m.ConductivitySPerM, 1e3, 1e9, "S/m")
}
