package island

// What a hand would draw before nature takes over: the lines of Hallin, which noise then bends
// and streams carve.
var (
	// ridges is the uplift in parts per million (see uplift).
	ridges = []swell{
		{105000, 5200, []point{{9500, 20000}, {14500, 15500}, {20500, 13000}, {26500, 13500}}}, // the main ridge
		{85000, 4600, []point{{30500, 13200}, {36500, 11000}, {43500, 11800}, {48500, 9500}}},
		{50000, 3600, []point{{24500, 13500}, {26500, 18500}}},
		{55000, 3600, []point{{38000, 11500}, {40500, 18500}}},
		{42000, 3300, []point{{15000, 16000}, {18500, 20500}}},
		{62000, 4200, []point{{12500, 30500}, {19500, 33000}, {26000, 31500}, {31500, 33500}}}, // the southern hills
		{34000, 4500, []point{{9500, 21000}, {11500, 30500}}},                                  // the western watershed
		{52000, 2600, []point{{46500, 22500}, {48500, 26500}}},                                 // the hill above the mouth
	}

	// lowlands is how many thousandths of the uplift they take away.
	lowlands = []swell{
		{950, 3000, []point{{17500, 24600}, {21500, 24000}, {28500, 23800}, {35500, 24500}, {41500, 28000}, {46500, 31000}, {53000, 33500}}}, // the valley
		{550, 6500, []point{{36500, 36500}, {42500, 36000}, {47000, 35500}}},                                                                 // the plain
		{700, 2300, []point{{28800, 9500}, {28600, 17500}}},                                                                                  // the pass
	}

	// shores is added to the oval of the island (see coast).
	shores = []swell{
		{-520, 3000, []point{{51500, 33200}, {56000, 34500}}}, // the estuary
		{-420, 2600, []point{{22500, 41500}, {24000, 37500}}},
		{-400, 2800, []point{{33000, 4000}, {32000, 7000}}},
		{-380, 2500, []point{{4500, 23500}, {7500, 25500}}},
		{420, 2600, []point{{49500, 9500}, {53500, 6500}}},
		{330, 3000, []point{{42500, 37500}, {46000, 41000}}},
		{560, 900, []point{{57600, 28300}, {57800, 28900}}}, // the islets
		{430, 700, []point{{55900, 39200}, {56000, 39300}}},
		{520, 900, []point{{6400, 10600}, {6900, 10200}}},
	}

	// cliffs is their height in millimetres.
	cliffs = []swell{
		{110000, 7500, []point{{5000, 17000}, {13000, 9500}, {22500, 6500}}},
		{60000, 4000, []point{{44000, 5000}, {53000, 6500}}},
		{70000, 5000, []point{{10000, 36500}, {16500, 39000}}},
	}

	// lakeBed is how far ice has dug below the valley's floor, in millimetres.
	lakeBed = swell{34000, 1500, []point{{20800, 23500}, {23700, 24600}}}
)

// bent returns the drawn place that is found at a place on the ground.
func bent(xM, yM int64) point {
	return point{
		xM + 14*noise(xM, yM, 9000, 11)/10 + noise(xM, yM, 3100, 12)/2,
		yM + 14*noise(xM, yM, 9000, 13)/10 + noise(xM, yM, 3100, 14)/2,
	}
}

// uplift returns how fast the land rises, as the slope, in parts per million, of a stream with a
// catchment of 1 km^2 that just carries away what rises.
func uplift(xM, yM int64) int64 {
	p := bent(xM, yM)
	rise := 24000 + sum(ridges, p)
	rise = rise * (1000 + noise(xM, yM, 5200, 21)*45/100 + noise(xM, yM, 2300, 22)*3/10 + noise(xM, yM, 1100, 23)/4) / 1000
	return max(rise*(1000-min(sum(lowlands, p), 950))/1000, 11000)
}

// coast returns a figure that is positive on land: 1000 in the middle of an oval island.
func coast(xM, yM int64) int64 {
	p := bent(xM, yM)
	dx, dy := (p.xM-30200)<<10/25500, (p.yM-22800)<<10/17800
	land := 1000 - (dx*dx+dy*dy)*1000>>20 + sum(shores, point{xM, yM})
	for octave, amplitude := range []int64{240, 180, 130, 95, 65} {
		land += amplitude * noise(xM, yM, 12100>>octave, 31+int64(octave)) / 1000
	}
	frameM := min(xM, yM, Cols*CellM-xM, Rows*CellM-yM)
	return land - max(3000-frameM, 0) // open sea along the frame
}

// cliff returns the height of the coast's edge in millimetres.
func cliff(xM, yM int64) int64 { return sum(cliffs, point{xM, yM}) }

// dug returns the depth of the lake's bed in millimetres.
func dug(xM, yM int64) int64 {
	return lakeBed.at(point{xM + noise(xM, yM, 1900, 41)*6/10, yM + noise(xM, yM, 1900, 42)*6/10})
}
