package propagation

import "math"

// fieldStrength returns Ep, dB(uV/m), for 1 kW effective radiated power (of a half-wave dipole) at
// f GHz behind the loss lb.
//
// Source: Rec. ITU-R P.1812-6, (70).
func fieldStrength(f, lb float64) float64 { return 199.36 + 20*math.Log10(f) - lb }
