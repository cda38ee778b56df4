package island

// The classes of Cover.
const (
	Sea     = 1
	Open    = 2 // moor, meadow and rock
	Wood    = 3
	Village = 4
	Fresh   = 5 // rivers and the lake
)

const (
	riverCells = 9_000   // the catchment, in cells, from which a stream is a river: 8.1 km^2
	treeLineMm = 300_000 // about where the woods end
)

// A village is a round of houses, ragged at the edge.
type village struct {
	at      point
	radiusM int64
}

var villages = []village{
	{point{46300, 33300}, 450}, // at the mouth
	{point{44300, 30350}, 260},
	{point{34300, 25100}, 300},
	{point{26300, 24300}, 240}, // below the lake
	{point{17800, 24600}, 170},
	{point{31800, 8600}, 300},
	{point{23600, 35750}, 330},
	{point{52600, 21600}, 250},
	{point{9000, 25500}, 220},
}

// clothe returns what covers the land.
func (g ground) clothe(w water, lake []bool) []uint8 {
	cover := make([]uint8, len(g.land))
	for i, cells := range w.catchment() {
		switch {
		case !g.land[i]:
			cover[i] = Sea
		case lake[i] || cells >= riverCells:
			cover[i] = Fresh
		case g.wooded(i):
			cover[i] = Wood
		default:
			cover[i] = Open
		}
	}
	for _, v := range villages {
		v.build(g.height, cover)
	}
	return cover
}

// wooded tells whether trees stand on a cell: in patches, on slopes rather than on flat or sheer
// ground, and fewer towards the tree line.
func (g ground) wooded(i int) bool {
	h, n := g.height.v, 3*g.height.cols
	if h[i] > treeLineMm*4/3 || h[i] < 4000 {
		return false
	}
	fall := int64(max(h[i+3], h[i-3], h[i+n], h[i-n]) - min(h[i+3], h[i-3], h[i+n], h[i-n])) // mm over 180 m
	x, y := g.height.place(i)
	patch := noise(x, y, 2600, 91) + noise(x, y, 800, 92)*6/10 + noise(x, y, 250, 93)*3/10
	thin := max(int64(h[i])-treeLineMm+60*patch, 0) / 60
	return fall < 130_000 && patch+min(fall/60, 700)-thin > 620
}

// build puts the village where its ground is not under water.
func (v village) build(f field, cover []uint8) {
	reach := 2 * v.radiusM / f.cellM
	for row := v.at.yM/f.cellM - reach; row <= v.at.yM/f.cellM+reach; row++ {
		for col := v.at.xM/f.cellM - reach; col <= v.at.xM/f.cellM+reach; col++ {
			i := int(row)*f.cols + int(col)
			x, y := f.place(i)
			east, south := x-v.at.xM, y-v.at.yM
			edgeM := v.radiusM * (1000 + noise(x, y, 190, 95)*6/10) / 1000
			if (cover[i] == Open || cover[i] == Wood) && east*east+south*south < edgeM*edgeM {
				cover[i] = Village
			}
		}
	}
}
