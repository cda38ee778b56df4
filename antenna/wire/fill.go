package wire

import "math"

// A table holds the blocks of two runs: one for each difference of segment numbers where it
// alone counts, else one for each pair.
type table struct {
	q        int  // segments of the second run
	byOffset bool // the runs lie in one direction, with segments of one length
	shift    int  // index of offset zero
	blocks   []block
}

func (t *table) at(i, j int) *block {
	if t.byOffset {
		return &t.blocks[t.shift+j-i]
	}
	return &t.blocks[i*t.q+j]
}

// newTable computes the blocks of two runs.
func newTable(k float64, p, q *run) *table {
	x := newInteraction(k, p, q)
	if x.cosine > 1-1e-12 && math.Abs(p.stepM-q.stepM) < 1e-9*p.stepM {
		return x.offsets()
	}
	t := &table{q: q.count, blocks: make([]block, p.count*q.count)}
	for i := range p.count {
		for j := range q.count {
			t.blocks[i*q.count+j] = x.block(i, j)
		}
	}
	return t
}

// offsets returns a table by the difference of segment numbers. Where both runs begin side by
// side, or are one, a negative difference is the transpose of a positive one.
func (x *interaction) offsets() *table {
	p, q := x.p, x.q
	t := &table{byOffset: true, shift: p.count - 1, blocks: make([]block, p.count+q.count-1)}
	mirrored := math.Abs(p.start.to(q.start).dot(p.along)) < 1e-9*p.stepM && p.radiusM == q.radiusM
	for n := range q.count {
		t.blocks[t.shift+n] = x.block(0, n)
	}
	for n := 1; n < p.count; n++ {
		if mirrored && n < q.count {
			t.blocks[t.shift-n] = t.blocks[t.shift+n].transposed()
		} else {
			t.blocks[t.shift-n] = x.block(n, 0)
		}
	}
	if p == q {
		own := &t.blocks[t.shift]
		mean := (own[0][1] + own[1][0]) / 2 // equal but for the two quadratures
		own[0][1], own[1][0] = mean, mean
	}
	return t
}

// A geometry is all that a table of parallel runs depends on, in units fine enough to tell runs
// apart and coarse enough to overlook rounding: runs of one geometry share a table.
type geometry struct {
	counts, steps, radii [2]int64
	along, apart         int64
}

// geometryOf returns the geometry of two parallel runs. ok is false for others.
func geometryOf(p, q *run, wavelengthM float64) (g geometry, ok bool) {
	if p == q || p.along.dot(q.along) < 1-1e-12 {
		return geometry{}, false
	}
	units := func(m float64) int64 { return int64(math.Round(m / wavelengthM * 1e10)) }
	offset := p.start.to(q.start)
	return geometry{
		[2]int64{int64(p.count), int64(q.count)},
		[2]int64{units(p.stepM), units(q.stepM)},
		[2]int64{units(p.radiusM), units(q.radiusM)},
		units(offset.dot(p.along)), units(offset.across(p.along).length()),
	}, true
}

// tables returns the tables of all pairs of runs, those of rows first; of a mesh with itself only
// those with the first run before the second or the same. Equal ones are computed once.
func tables(k float64, rows, columns *mesh) [][]*table {
	type job struct {
		p, q *run
		out  []**table
	}
	var jobs []*job
	known := map[geometry]*job{}
	all := make([][]*table, len(rows.runs))
	for i := range rows.runs {
		all[i] = make([]*table, len(columns.runs))
		for j := range columns.runs {
			if rows == columns && j < i {
				continue
			}
			p, q := &rows.runs[i], &columns.runs[j]
			g, parallel := geometryOf(p, q, 2*math.Pi/k)
			j0, ok := known[g]
			if !ok || !parallel {
				j0 = &job{p: p, q: q}
				jobs = append(jobs, j0)
			}
			if parallel {
				known[g] = j0
			}
			j0.out = append(j0.out, &all[i][j])
		}
	}
	parallel(len(jobs), func(i int) {
		t := newTable(k, jobs[i].p, jobs[i].q)
		for _, out := range jobs[i].out {
			*out = t
		}
	})
	return all
}

// impedances returns the matrix of two meshes' interaction, in ohm: of a mesh with itself, which
// holds the conductors' own impedances too, or of one with another that it does not touch.
func impedances(k float64, rows, columns *mesh, ohmPerM []complex128) *matrix {
	all := tables(k, rows, columns)
	losses := make([]block, len(ohmPerM))
	for i, z := range ohmPerM {
		losses[i] = lossBlock(z, k, rows.runs[i].stepM)
	}
	z := newMatrix(len(rows.bases), len(columns.bases))
	parallel(z.rows, func(m int) {
		row, first := z.row(m), 0
		if rows == columns {
			first = m
		}
		for n := first; n < z.columns; n++ {
			row[n] = between(all, losses, &rows.bases[m], &columns.bases[n])
			if rows == columns {
				z.data[n*z.columns+m] = row[n]
			}
		}
	})
	return z
}

// between sums the blocks of two basis functions. losses are empty unless they are of one mesh.
func between(all [][]*table, losses []block, a, b *basis) complex128 {
	var sum complex128
	for i := range a {
		for j := range b {
			p, q := &a[i], &b[j]
			var z complex128
			if t := all[p.run][q.run]; t != nil {
				z = t.at(p.segment, q.segment)[p.side][q.side]
			} else {
				z = all[q.run][p.run].at(q.segment, p.segment)[q.side][p.side]
			}
			if p.run == q.run && p.segment == q.segment && len(losses) > 0 {
				z += losses[p.run][p.side][q.side]
			}
			sum += complex(p.sign*q.sign, 0) * z
		}
	}
	return sum
}
