package island

// water is the way the rain takes over a surface.
type water struct {
	levelMm  []int32 // the surface with its hollows filled, 0 at sea
	order    []int32 // the land's cells, lowest first
	receiver []int32 // the neighbour each of them drains to
}

// drain fills the hollows of a surface, in millimetres, and finds the steepest way down from each
// land cell; over level water, the shortest way to the outlet.
//
// The land is flooded from the coast upwards, one queue of cells for each millimetre (a
// priority flood; Barnes, Lehman and Mulla, Computers & Geosciences 62, 2014, from memory).
func drain(h field, land []bool) water {
	w := water{make([]int32, len(h.v)), nil, make([]int32, len(h.v))}
	// Cell 0 is sea: it stands for all of it, and in the queues for their end.
	first, last, next := make([]int32, maxMm), make([]int32, maxMm), make([]int32, len(h.v))
	flood := func(i, from int32) {
		mm := max(h.v[i], w.levelMm[from], 1)
		w.levelMm[i], w.receiver[i] = mm, from
		if first[mm] == 0 {
			first[mm] = i
		} else {
			next[last[mm]] = i
		}
		last[mm] = i
	}
	around := h.around()
	for _, i := range shore(land, around) {
		flood(i, 0)
	}
	for _, i := range first {
		for ; i > 0; i = next[i] {
			w.order = append(w.order, i)
			for _, step := range around {
				if n := i + int32(step); land[n] && w.levelMm[n] == 0 {
					flood(n, i)
				}
			}
		}
	}
	for _, i := range w.order {
		w.receiver[i] = w.steepest(i, around)
	}
	return w
}

// shore lists the land cells that touch the sea. The outermost cells of a grid are always sea.
func shore(land []bool, around [8]int) (cells []int32) {
	for i, dry := range land {
		if !dry {
			continue
		}
		for _, step := range around {
			if !land[i+step] {
				cells = append(cells, int32(i))
				break
			}
		}
	}
	return cells
}

// steepest returns the neighbour to which a cell drains: the steepest way down, or the way by
// which the flood came. A quarter of chance keeps long slopes from draining in the eight
// directions of the grid alone.
func (w water) steepest(i int32, around [8]int) int32 {
	best, receiver := int64(0), w.receiver[i]
	for k, step := range around {
		n := i + int32(step)
		drop := int64(w.levelMm[i] - w.levelMm[n])
		if drop <= 0 {
			continue
		}
		if k >= 4 {
			drop = drop * straight / diagonal
		}
		if drop *= 768 + hash(int64(i), int64(k), 96)>>7; drop > best {
			best, receiver = drop, n
		}
	}
	return receiver
}

// catchment returns how many cells drain through each cell, itself included.
func (w water) catchment() []int32 {
	cells := make([]int32, len(w.levelMm))
	for k := len(w.order) - 1; k >= 0; k-- {
		i := w.order[k]
		cells[i]++
		cells[w.receiver[i]] += cells[i]
	}
	return cells
}

// lake returns which cells are under the deepest water that stands on the ground.
func (w water) lake(ground field) []bool {
	deepest := w.order[0]
	for _, i := range w.order {
		if w.levelMm[i]-ground.v[i] > w.levelMm[deepest]-ground.v[deepest] {
			deepest = i
		}
	}
	under := make([]bool, len(w.levelMm))
	for i, mm := range w.levelMm {
		under[i] = mm == w.levelMm[deepest] && mm > ground.v[i]
	}
	return under
}
