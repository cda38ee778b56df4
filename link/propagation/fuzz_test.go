package propagation

import (
	"encoding/binary"
	"math"
	"testing"

	"fellreach/terrain"
)

// FuzzLoss feeds every method with any numbers at all: an error, or a loss without NaN or infinity
// in any term. The first eleven numbers are the path's own, then come points of four.
func FuzzLoss(f *testing.F) {
	f.Add(numbers(150e6, 10, 10, 1, 45, 325, 50, 50, 0, 50, 500, 0, 12, 0, 4, 3, 40, 10, 4, 7, 8, 0, 1))
	f.Add(numbers(30e6, 0.01, 20000, 0, 150, 600, 1, 99, 20, -90, 0, 0, -12000, 0, 1, 20000, 12000, 0, 1))
	f.Add(numbers(6e9, 20000, 0.01, 0.5, 1e-3, 1, 10, 1, 20, 90, 0, 0, 12000, 0, 1, 1e-6, -12000, 1000, 4, 0.001, 12000, 0, 1))
	f.Fuzz(func(t *testing.T, data []byte) {
		p, ok := pathOf(data)
		if !ok {
			t.Skip("these bytes make no path")
		}
		for _, m := range allModels {
			l, err := m.Loss(p)
			if err != nil {
				continue
			}
			for _, term := range append(l.Terms.List(), Term{"loss", "dB", l.DB}, Term{"elevation", "deg", l.TxElDeg + l.RxElDeg}) {
				if math.IsNaN(term.Value) || math.IsInf(term.Value, 0) {
					t.Errorf("%s: %s = %g of %+v", m.Name, term.Symbol, term.Value, p)
				}
			}
		}
		if c, err := Clearance(p); err == nil && (math.IsNaN(c.WorstRatio) || math.IsInf(c.WorstRatio, 0)) {
			t.Errorf("clearance %+v of %+v", c, p)
		}
	})
}

func numbers(values ...float64) []byte {
	var b []byte
	for _, v := range values {
		b = binary.LittleEndian.AppendUint64(b, math.Float64bits(v))
	}
	return b
}

func pathOf(data []byte) (Path, bool) {
	var v []float64
	for ; len(data) >= 8 && len(v) < 500; data = data[8:] {
		v = append(v, math.Float64frombits(binary.LittleEndian.Uint64(data)))
	}
	if len(v) < 11 {
		return Path{}, false
	}
	p := Path{
		FreqHz: v[0], TxAglM: v[1], RxAglM: v[2], VerticalShare: v[3], DeltaN: v[4], N0: v[5], TimePct: v[6],
		LocationPct: v[7], LocationSpreadDB: v[8], LatDeg: v[9], TxCoastKm: v[10], RxCoastKm: v[10],
	}
	for v = v[11:]; len(v) >= 4; v = v[4:] {
		p.DistKm, p.AslM, p.CoverM = append(p.DistKm, v[0]), append(p.AslM, v[1]), append(p.CoverM, v[2])
		p.Zone = append(p.Zone, terrain.Zone(uint8(max(0, min(255, v[3])))))
	}
	return p, true
}
