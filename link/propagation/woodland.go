package propagation

import (
	"fmt"
	"math"
)

// woodland is a wood at one frequency: the loss of its first metres and the most that it takes.
type woodland struct{ freqHz, gammaDBPerM, amDB float64 }

// Source: Rec. ITU-R P.833-9, section ~2, figures measured in woods.
var woodlands = [...]woodland{
	{105.9e6, 0.04, 9.4},
	{466.475e6, 0.12, 18.0},
	{949e6, 0.17, 26.5},
	{1852.2e6, 0.30, 29.0},
	{2117.5e6, 0.34, 34.1},
}

// WoodlandLossDB returns the excess loss Aev, dB and never negative, of a terminal that stands
// depthM metres inside a wood, counted along the path: 0 at depthM <= 0.
//
// freqHz is above 0. The figures reach from 105.9 to 2117.5 MHz; between them both parameters run
// as powers of frequency, beyond them they go on so, and a note says it.
//
// Source: Rec. ITU-R P.833-9, section ~2, Aev = Am [1 - exp(-d gamma/Am)]; that and the figures from
// memory and one transcription.
func WoodlandLossDB(freqHz, depthM float64) (lossDB float64, note string) {
	if !(depthM > 0) {
		return 0, ""
	}
	w := woodlandAt(freqHz)
	if lo, hi := woodlands[0].freqHz, woodlands[len(woodlands)-1].freqHz; freqHz < lo || freqHz > hi {
		note = fmt.Sprintf("woodland loss by P.833 is known from %g to %g MHz, its trend is continued to %g MHz", lo/1e6, hi/1e6, freqHz/1e6)
	}
	return -w.amDB * math.Expm1(-depthM*w.gammaDBPerM/w.amDB), note
}

// woodlandAt interpolates on logarithmic scales. Beyond the last figure it follows the last octave:
// the last two frequencies lie too close together to carry a trend.
func woodlandAt(freqHz float64) woodland {
	const last = len(woodlands) - 1
	if freqHz > woodlands[last].freqHz {
		return woodlands[last-2].towards(woodlands[last], freqHz)
	}
	i := 1
	for i < last && freqHz > woodlands[i].freqHz {
		i++
	}
	return woodlands[i-1].towards(woodlands[i], freqHz)
}

// towards returns the wood at another frequency on the power laws through a and b.
func (a woodland) towards(b woodland, freqHz float64) woodland {
	t := math.Log(freqHz/a.freqHz) / math.Log(b.freqHz/a.freqHz)
	return woodland{
		freqHz:      freqHz,
		gammaDBPerM: a.gammaDBPerM * math.Pow(b.gammaDBPerM/a.gammaDBPerM, t),
		amDB:        a.amDB * math.Pow(b.amDB/a.amDB, t),
	}
}
