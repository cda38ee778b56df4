package antenna_test

import (
	"fmt"

	"fellreach/antenna"
)

// A rod cut for 151.5 MHz, fed through 27 m of feeder: what reaches it of the radio's power, and
// its gain towards a path that leaves 1 degree below the horizontal.
func Example() {
	aluminium, _ := antenna.MaterialNamed("aluminium")
	rod, err := antenna.Dipole(antenna.DipoleSpec{FeedAt: 0.5, DiameterM: 0.012, Material: aluminium})
	if err != nil {
		fmt.Println(err)
		return
	}
	solution, err := rod.Solve(antenna.Setting{FreqHz: 151.5e6})
	if err != nil {
		fmt.Println(err)
		return
	}
	feeder := antenna.Feeder{
		Name: "half-inch", ImpedanceOhm: 50, VelocityFactor: 0.88,
		Loss: []antenna.LossPoint{{FreqHz: 100e6, DBPerM: 0.022}, {FreqHz: 450e6, DBPerM: 0.049}},
	}
	transfer, err := antenna.Run{Feeder: feeder, LengthM: 27}.Transfer(solution.ImpedanceOhm, antenna.Match{}, 151.5e6)
	if err != nil {
		fmt.Println(err)
		return
	}
	field := antenna.Mount{FacingDeg: 210}.Field(solution.Pattern, antenna.Direction{AzDeg: 163, ElDeg: -1})
	fmt.Printf("directivity towards the path %.1f dBi, vertical share %.0f %%\n", solution.Pattern.Filled(field).GainDBi(), 100*field.VerticalShare())
	fmt.Printf("feeder %.2f dB, standing waves %.2f dB, mismatch %.2f dB\n", transfer.MatchedLossDB, transfer.ExtraLossDB, transfer.MismatchLossDB)
	// Output:
	// directivity towards the path 2.1 dBi, vertical share 100 %
	// feeder 0.74 dB, standing waves 0.01 dB, mismatch 0.03 dB
}
