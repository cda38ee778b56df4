package coverage

import "fellreach/terrain"

// zoneRuns measure the stretches of a profile in its radio-climatic zones while points come with
// growing distance. Between two points of different zones the border lies half-way.
type zoneRuns struct {
	zone terrain.Zone // of the last point
	at   float64      // its distance, km

	land, inland, sea             float64 // longest, longest and all of the finished stretches, km
	landFrom, inlandFrom, seaFrom float64 // where the stretches on their way began
}

func (z *zoneRuns) start(zone terrain.Zone) { *z = zoneRuns{zone: zone} }

func (z *zoneRuns) push(d float64, zone terrain.Zone) {
	if zone != z.zone {
		z.turn((z.at+d)/2, zone)
	}
	z.at = d
}

// turn ends and begins stretches at a border.
func (z *zoneRuns) turn(border float64, zone terrain.Zone) {
	ended := z.ended(border)
	z.land, z.inland, z.sea = ended.land, ended.inland, ended.sea
	if (z.zone == terrain.Sea) != (zone == terrain.Sea) {
		z.landFrom, z.seaFrom = border, border
	}
	if zone == terrain.Inland {
		z.inlandFrom = border
	}
	z.zone = zone
}

// ended returns the stretches with those on their way ended at a distance.
func (z *zoneRuns) ended(d float64) zoneRuns {
	e := *z
	switch z.zone {
	case terrain.Sea:
		e.sea += d - z.seaFrom
	case terrain.Inland:
		e.inland = max(e.inland, d-z.inlandFrom)
		fallthrough
	default:
		e.land = max(e.land, d-z.landFrom)
	}
	return e
}
