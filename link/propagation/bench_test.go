package propagation

import (
	"fmt"
	"math"
	"testing"
)

// rolling returns a path of that many points, 30 m apart, over hills with woods.
func rolling(points int) Path {
	p := level(points, 0.03*float64(points-1))
	for i, d := range p.DistKm {
		p.AslM[i] = 200 + 80*math.Sin(d/1.7) + 40*math.Sin(d/0.43+1) + 15*math.Sin(d/0.11)
		if i%7 < 3 {
			p.CoverM[i] = 12
		}
	}
	p.TxAglM, p.RxAglM = 20, 3
	return p
}

func BenchmarkLoss(b *testing.B) {
	for _, m := range allModels {
		for _, points := range []int{100, 1000, 5000} {
			b.Run(fmt.Sprintf("%s/%d", m.Name, points), func(b *testing.B) {
				p := rolling(points)
				b.ReportAllocs()
				for b.Loop() {
					if _, err := m.Loss(p); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}
