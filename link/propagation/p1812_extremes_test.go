package propagation

import (
	"math"
	"testing"

	"fellreach/terrain"
	"pgregory.net/rapid"
)

// Any path within the accepted ranges, however absurd, has a finite loss in every method.
func TestAnyAcceptedPath(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawAcceptedPath(t)
		for _, m := range allModels {
			l, err := m.Loss(p)
			if err != nil {
				t.Fatalf("%s: %v", m.Name, err)
			}
			for _, term := range append(l.Terms.List(), Term{"loss", "dB", l.DB}, Term{"elevations", "deg", l.TxElDeg + l.RxElDeg}) {
				if math.IsNaN(term.Value) || math.IsInf(term.Value, 0) {
					t.Errorf("%s: %s = %g", m.Name, term.Symbol, term.Value)
				}
			}
			if n := len(l.Terms.List()); m.Name == "p1812" && p.LengthKm() >= leastKm && n != 41 {
				t.Errorf("%d terms, want all 41", n)
			}
		}
		if c, err := Clearance(p); err != nil || math.IsNaN(c.WorstRatio) || math.IsInf(c.WorstRatio, 0) {
			t.Errorf("clearance %+v, %v", c, err)
		}
	})
}

// drawAcceptedPath draws from the whole of the accepted ranges, their ends often.
func drawAcceptedPath(t *rapid.T) Path {
	within := func(name string, lo, hi float64) float64 {
		return rapid.OneOf(rapid.Just(lo), rapid.Just(hi), rapid.Float64Range(lo, hi)).Draw(t, name)
	}
	p := Path{
		FreqHz: within("frequency", 30e6, 6e9), TxAglM: within("tx", 0.01, 20_000), RxAglM: within("rx", 0.01, 20_000),
		VerticalShare: within("vertical", 0, 1), DeltaN: within("delta N", 1e-3, 150), N0: within("N0", 100, 600),
		TimePct: within("time", 0.001, 50), LocationPct: within("locations", 1, 99), LocationSpreadDB: within("spread", 0, 50),
		LatDeg: within("latitude", -90, 90), TxCoastKm: within("dct", 0, 1e6), RxCoastKm: within("dcr", 0, 1e6),
	}
	length := math.Exp(within("log length", math.Log(0.0011), math.Log(19_999)))
	parts := rapid.SliceOfN(rapid.Float64Range(1e-3, 1), 1, 8).Draw(t, "intervals")
	sum := 0.0
	for _, part := range parts {
		sum += part
	}
	at := 0.0
	for i := range len(parts) + 1 {
		p.DistKm = append(p.DistKm, at/sum*length)
		p.AslM = append(p.AslM, within("height", -12_000, 12_000))
		p.CoverM = append(p.CoverM, within("cover", 0, 1000))
		p.Zone = append(p.Zone, rapid.SampledFrom([]terrain.Zone{terrain.Sea, terrain.Coastal, terrain.Inland}).Draw(t, "zone"))
		if i < len(parts) {
			at += max(parts[i], 2e-6/length*sum) // 2 mm at least
		}
	}
	p.DistKm[len(parts)] = max(p.DistKm[len(parts)], 0.001)
	return p
}

// A steep change of the loss is hunted down by halving: what remains is a step. The Recommendation
// has two kinds: the height gain by 0.018 dB per antenna, and where the horizon moves from one
// point to another, which changes dlt or dlr and with them focusing and ducting.
func TestNoUnknownSteps(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := drawPath(t)
		drawStatistics(t, &p)
		set := map[string]func(x float64){
			"tx height":  func(x float64) { p.TxAglM = 1 + 299*x },
			"frequency":  func(x float64) { p.FreqHz = 30e6 * math.Pow(200, x) },
			"time":       func(x float64) { p.TimePct = 1 + 49*x },
			"delta N":    func(x float64) { p.DeltaN = 20 + 70*x },
			"share":      func(x float64) { p.VerticalShare = x },
			"cover":      func(x float64) { p.CoverM[len(p.CoverM)/2] = 100 * x },
			"ground":     func(x float64) { p.AslM[len(p.AslM)/2] = 1000 * x },
			"latitude":   func(x float64) { p.LatDeg = 70 * x },
			"locations":  func(x float64) { p.LocationPct = 1 + 98*x },
			"refraction": func(x float64) { p.N0 = 280 + 100*x },
		}
		name := rapid.SampledFrom([]string{
			"tx height", "frequency", "time", "delta N", "share", "cover", "ground", "latitude", "locations", "refraction",
		}).Draw(t, "parameter")
		at := func(x float64) Loss {
			set[name](x)
			return mustLoss(t, p)
		}
		lo, hi := 0.0, 1.0
		low, high := at(lo), at(hi)
		for hi-lo > 1e-13 {
			mid := (lo + hi) / 2
			middle := at(mid)
			if math.Abs(middle.DB-low.DB) > math.Abs(high.DB-middle.DB) {
				hi, high = mid, middle
			} else {
				lo, low = mid, middle
			}
		}
		moved := math.Abs(low.Terms.Dlt-high.Terms.Dlt) > 1e-9 || math.Abs(low.Terms.Dlr-high.Terms.Dlr) > 1e-9
		if step := math.Abs(high.DB - low.DB); step > 0.0361 && !moved {
			t.Errorf("a step of %g dB at %s = %.15g of its range\nbefore %+v\nafter  %+v", step, name, lo, low, high)
		}
	})
}
