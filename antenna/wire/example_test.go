package wire_test

import (
	"fmt"
	"math"

	"fellreach/antenna"
	"fellreach/antenna/wire"
)

// A rod of 12 mm aluminium for 151.5 MHz, half a metre from a mast of 114 mm. The figures are what
// the program prints, rounded to what the method promises.
func ExampleDipole() {
	aluminium, _ := antenna.MaterialNamed("aluminium")
	rod, err := wire.Dipole(antenna.DipoleSpec{FeedAt: 0.5, DiameterM: 0.012, Material: aluminium})
	if err != nil {
		fmt.Println(err)
		return
	}
	s, err := rod.Solve(antenna.Setting{
		FreqHz: 151.5e6, MastDiameterM: 0.114, StandoffM: 0.5, MastAboveM: math.Inf(1),
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%.0f ohm, away from the mast %.1f dBi, toward it %.0f dBi\n", real(s.ImpedanceOhm),
		s.Pattern.GainDBi(antenna.Direction{AzDeg: 0}), s.Pattern.GainDBi(antenna.Direction{AzDeg: 180}))
	// Output: 75 ohm, away from the mast 4.7 dBi, toward it -3 dBi
}

// What to cut for a folded dipole.
func ExampleAntenna_Analyse() {
	loop, err := wire.FoldedDipole(wire.FoldedDipoleSpec{
		Spacing: antenna.Length{M: 0.06}, DiameterM: 0.008, Material: antenna.Ideal,
	})
	if err != nil {
		fmt.Println(err)
		return
	}
	a, err := loop.Analyse(antenna.Setting{FreqHz: 151.5e6}, 4*50)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, part := range a.Cut {
		fmt.Printf("%s: %.0f mm\n", part.Name, 1000*part.LengthM)
	}
	fmt.Printf("VSWR 2 over %.0f %%\n", 100*a.BandWidth())
	// Output:
	// fed limb: 893 mm
	// plain limb: 893 mm
	// spacing, axis to axis: 60 mm
	// VSWR 2 over 14 %
}

// Two crossed dipoles as a network of two ports: they hardly see each other.
func ExampleStructure_Solve() {
	rod := func(from, to [3]float64) wire.Wire {
		return wire.Wire{From: from, To: to, DiameterM: 0.01, Material: antenna.Ideal}
	}
	n, err := wire.Structure{
		Wires: []wire.Wire{
			rod([3]float64{0, 0, -0.47}, [3]float64{0, 0, 0.47}),
			rod([3]float64{0.1, -0.47, 0}, [3]float64{0.1, 0.47, 0}),
		},
		Feeds: []wire.Feed{{Wire: 1, At: 0.5}, {Wire: 2, At: 0.5}},
	}.Solve(150e6, 0)
	if err != nil {
		fmt.Println(err)
		return
	}
	z, err := n.ImpedanceOhm()
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("own %.0f ohm, mutual %.2f ohm\n", real(z[0][0]), math.Abs(real(z[0][1])))
	// Output: own 72 ohm, mutual 0.00 ohm
}
