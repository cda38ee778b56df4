package island

// ground is the island at one stage of its making.
type ground struct {
	height field // mm above the sea
	uplift field // see uplift
	coast  field // positive on land, see coast
	cliff  field // mm
	land   []bool
}

// raise makes the ground: streams carve it on cells of 240, 120 and 60 m, then a last
// refinement winds what the grid had kept straight and roughens it.
func raise() ground {
	g := ground{uplift: sample(uplift), coast: sample(coast), cliff: sample(cliff)}
	g.height = sample(func(xM, yM int64) int64 { // tilted, so that the main river runs east
		return 250_000 - 4*xM + 3*uplift(xM, yM) + 25*noise(xM, yM, 4000, 51) + 15*noise(xM, yM, 1000, 52)
	})
	g.carve(30)
	g = g.finer()
	g.carve(8)
	g = g.finer()
	g.carve(4)
	g.cutBeds()
	g.height = g.height.smooth()
	g = g.finer()
	g.wind()
	g.weather()
	return g
}

// carve lets the streams find their way a number of times; in between, the slopes creep.
func (g *ground) carve(rounds int) {
	for k := range rounds {
		if k > 0 && k%2 == 0 {
			g.height = g.height.smooth()
		}
		g.drown()
		g.erode()
	}
}

// drown finds the land, which is all that the open sea does not reach, and lays the sea at 0.
func (g *ground) drown() {
	g.land = make([]bool, len(g.coast.v))
	for i := range g.land {
		g.land[i] = true
	}
	around := g.coast.around()
	g.land[0] = false
	for open := []int{0}; len(open) > 0; {
		i := open[len(open)-1]
		open = open[:len(open)-1]
		g.height.v[i] = 0
		for _, step := range around[:4] {
			if n := i + step; n >= 0 && n < len(g.land) && g.land[n] && g.coast.v[n] <= 0 {
				g.land[n] = false
				open = append(open, n)
			}
		}
	}
}

// finer returns the ground on cells of half the size, with roughness of that size added.
func (g ground) finer() ground {
	f := ground{height: g.height.finer(), uplift: g.uplift.finer(), coast: g.coast.finer(), cliff: g.cliff.finer()}
	f.height.roughen(40*f.height.cellM, 7*f.height.cellM, 61)
	f.coast.roughen(f.coast.cellM/3, 6*f.coast.cellM, 62)
	return f
}

// wind shifts every place by up to some 400 m, so that streams, crests and coast meander.
func (g *ground) wind() {
	shiftM := func(seed int64) []int32 {
		return sample(func(xM, yM int64) int64 {
			return noise(xM, yM, 2100, seed)*34/100 + noise(xM, yM, 800, seed+1)*17/100
		}).finer().finer().finer().v
	}
	eastM, southM := shiftM(71), shiftM(73)
	height, coast := g.height, g.coast
	g.height.v, g.coast.v = make([]int32, len(height.v)), make([]int32, len(coast.v))
	for i := range height.v {
		x, y := height.place(i)
		x, y = x+int64(eastM[i]), y+int64(southM[i])
		g.height.v[i], g.coast.v[i] = height.at(x, y), coast.at(x, y)
	}
}

// weather roughens the land, mountains more than plains, and lets none lie lower than 0.3 m.
func (g *ground) weather() {
	const lowestMm = 300
	g.drown()
	for i, dry := range g.land {
		if dry {
			x, y := g.height.place(i)
			rough := noise(x, y, 520, 81) + noise(x, y, 230, 82)/2 + noise(x, y, 110, 83)/4
			amplitudeMm := 2000 + int64(g.uplift.v[i])/6
			g.height.v[i] = max(g.height.v[i]+int32(amplitudeMm*rough/1000), lowestMm)
		}
	}
}
