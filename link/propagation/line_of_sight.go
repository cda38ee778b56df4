package propagation

import "math"

// lineOfSightDB returns P.1812's own free-space loss Lbfs, dB, at f GHz over the slant distance dfs
// km: its constant is 92.4, 0.05 dB below the exact one of [FreeSpaceDB].
//
// Source: Rec. ITU-R P.1812-6, (8).
func lineOfSightDB(f, dfs float64) float64 {
	return 92.4 + 20*math.Log10(f) + 20*math.Log10(dfs)
}

// focusingDB returns Esp, dB, the correction of the free-space loss for multipath and focusing not
// exceeded for p percent of the time: 0 at 50 %, negative below. It applies on trans-horizon paths too.
//
// Source: Rec. ITU-R P.1812-6, (9) to (11).
func focusingDB(dlt, dlr, p float64) float64 {
	return 2.6 * (1 - exp(-0.1*(dlt+dlr))) * log10(p/50)
}
