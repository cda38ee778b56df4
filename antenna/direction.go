package antenna

// A Direction is where something is seen from an antenna or a site: AzDeg clockwise from the
// reference (true north at a site, the facing of an antenna in its own frame), ElDeg up from
// the horizontal, both in degrees.
type Direction struct{ AzDeg, ElDeg float64 }
