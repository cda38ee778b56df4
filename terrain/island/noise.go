package island

// turns are rotations by rational angles: cosine, sine and their common denominator.
var turns = [4][3]int64{{4, 3, 5}, {12, 5, 13}, {8, 15, 17}, {-5, 12, 13}}

// noise returns gradient noise at a place in metres; its mean is 0, and it rarely leaves ±1000.
//
// The seed, from 0 to 99, tells one octave from another. It also turns and shifts the lattice,
// so that neither the axes of the grid nor knots shared by the octaves show in the sum.
func noise(xM, yM, wavelengthM, seed int64) int64 {
	const farAway = 1 << 20 // keeps u and v positive over the whole grid
	t := &turns[seed&3]
	u := (t[0]*xM-t[1]*yM)/t[2] + 7919*seed + farAway
	v := (t[1]*xM+t[0]*yM)/t[2] + 4729*seed + farAway
	i, j := u/wavelengthM, v/wavelengthM
	fx, fy := (u-i*wavelengthM)<<10/wavelengthM, (v-j*wavelengthM)<<10/wavelengthM
	sx, sy := ease(fx), ease(fy)
	upper := blend(incline(i, j, seed, fx, fy), incline(i+1, j, seed, fx-1024, fy), sx)
	lower := blend(incline(i, j+1, seed, fx, fy-1024), incline(i+1, j+1, seed, fx-1024, fy-1024), sx)
	return blend(upper, lower, sy)
}

// incline returns the height of a knot's own inclined plane at (fx, fy) from the knot,
// in 1/1024 of the lattice's spacing.
func incline(i, j, seed, fx, fy int64) int64 {
	h := hash(i, j, seed)
	return ((h&255-128)*fx + (h>>8-128)*fy) >> 6
}

// ease maps 0..1024 to itself, without slope or curvature at the ends: t^3 (6 t^2 - 15 t + 10).
func ease(t int64) int64 {
	return t * t * t >> 10 * (6*t*t>>10 - 15*t + 10<<10) >> 20
}

// blend goes from a to b as t goes from 0 to 1024.
func blend(a, b, t int64) int64 { return a + (b-a)*t>>10 }

// hash returns 16 bits that look random for a pair of numbers below 2^24 and a seed. The mixing
// is the last step of the SplitMix64 generator (Steele, Lea and Flood, OOPSLA 2014; constants from memory).
func hash(i, j, seed int64) int64 {
	x := uint64(i)<<40 ^ uint64(j)<<16 ^ uint64(seed)
	x = (x ^ x>>30) * 0xbf58476d1ce4e5b9
	x = (x ^ x>>27) * 0x94d049bb133111eb
	return int64(x >> 48)
}
