package coverage

import (
	"context"
	"fmt"
	"math"
	"sync"
	"testing"

	"fellreach/link/propagation"
)

// An asking is what one run of the sweep is compared on.
type asking struct {
	spec  Spec
	freqs []float64
	share float64
}

// A found cell is what the sweep says of it.
type foundCell struct {
	outline  propagation.Outline
	losses   []propagation.Combined // frequency by frequency, for 50 % with ducting, 50 % and 1 % without
	obstacle float64
	zones    [3]float64
}

var timeRequests = []propagation.Request{{TimePct: 50, Ducting: true}, {TimePct: 50}, {TimePct: 1}}

const madeN0 = 325

type fixedShare float64

func (s fixedShare) VerticalShare() float64 { return float64(s) }

// sweepAll runs the sweep and keeps every every-th cell.
func sweepAll(t testing.TB, s *sweep, a asking, every int) map[int]foundCell {
	t.Helper()
	all := map[int]foundCell{}
	var mu sync.Mutex
	var briefs []*propagation.Brief
	for _, f := range a.freqs {
		briefs = append(briefs, propagation.NewBrief(propagation.P1812, f, madeN0, propagation.Region{MostKm: 160, LeastLatDeg: 46}, timeRequests))
	}
	_, err := s.run(context.Background(), func() func(*Cell) {
		return func(c *Cell) {
			if c.Index%every != 0 {
				return
			}
			f := foundCell{outline: c.Outline}
			for _, b := range briefs {
				out := make([]propagation.Combined, len(timeRequests))
				b.Loss(&c.Outline, c, fixedShare(a.share), out)
				f.losses = append(f.losses, out...)
			}
			f.obstacle = c.ObstacleKm()
			f.zones[0], f.zones[1], f.zones[2] = c.Zones()
			mu.Lock()
			all[c.Index] = f
			mu.Unlock()
		}
	}, nil)
	if err != nil {
		t.Fatal(err)
	}
	return all
}

// compare evaluates a cell's stated profile by the direct method.
func compare(t *testing.T, s *sweep, a asking, index int, f foundCell) (worst float64) {
	profile, lat, ok := newWalk(s).statedProfile(index)
	if !ok {
		t.Fatalf("cell %d has a loss and no profile", index)
	}
	for i, freq := range a.freqs {
		if i != index%len(a.freqs) { // each cell at one of them
			continue
		}
		p := s.path(profile, lat, freq, a.share, madeN0)
		for k, r := range timeRequests {
			p.TimePct = r.TimePct
			method := propagation.P1812WithoutDucting
			if r.Ducting {
				method = propagation.P1812.Loss
			}
			want, err := method(p)
			if err != nil {
				t.Fatal(err)
			}
			diff := math.Abs(f.losses[i*len(timeRequests)+k].LossDB(0) - want.DB)
			if !(diff <= 1e-6) {
				t.Errorf("cell %d, %g MHz, %v: sweep %.9f, direct %.9f dB over %.3f km\n%+v\n%+v", index, freq/1e6, r, f.losses[i*len(timeRequests)+k].LossDB(0), want.DB, p.LengthKm(), f.outline, want.Terms)
			}
			worst = math.Max(worst, diff)
			if k == 0 {
				compareGeometry(t, index, p, f, want)
			}
		}
	}
	return worst
}

func compareGeometry(t *testing.T, index int, p propagation.Path, f foundCell, want propagation.Loss) {
	w, o := want.Terms, f.outline
	if o.TransHorizon != want.TransHorizon {
		t.Errorf("cell %d: trans-horizon %v, direct %v", index, o.TransHorizon, want.TransHorizon)
	}
	for name, pair := range map[string][2]float64{
		"theta": {o.Theta(), w.Theta}, "theta_t": {o.ThetaT, w.ThetaT}, "theta_r": {o.ThetaR, w.ThetaR},
		"dtm": {f.zones[0], w.Dtm}, "dlm": {f.zones[1], w.Dlm}, "sea": {f.zones[2], w.Omega * p.LengthKm()},
	} {
		if !(math.Abs(pair[0]-pair[1]) <= 1e-8) {
			t.Errorf("cell %d: %s = %.12g, direct %.12g", index, name, pair[0], pair[1])
		}
	}
	dlt, dlr := o.Dlt, o.Dlr
	if !o.TransHorizon {
		dlt, dlr = f.obstacle, p.LengthKm()-f.obstacle
	}
	if math.Abs(dlt-w.Dlt) > 1e-9 && !tied(p, dlt, w.Dlt, w, true) || math.Abs(dlr-w.Dlr) > 1e-9 && !tied(p, p.LengthKm()-dlr, p.LengthKm()-w.Dlr, w, false) {
		t.Errorf("cell %d: dlt %.9g, dlr %.9g, direct %.9g, %.9g", index, dlt, dlr, w.Dlt, w.Dlr)
	}
}

// tied says whether two points at distances a and b are horizons of one end to within rounding: on
// some shapes of ground many are, and the last bit decides.
func tied(p propagation.Path, a, b float64, w propagation.Terms, fromTx bool) bool {
	d, last := p.LengthKm(), len(p.AslM)-1
	hts, hrs := p.AslM[0]+p.TxAglM, p.AslM[last]+p.RxAglM
	value := func(km float64) float64 {
		for i, at := range p.DistKm {
			if math.Abs(at-km) < 1e-9 {
				switch h := p.AslM[i]; {
				case w.Dlt+w.Dlr > d-1e-9 && w.Dlt+w.Dlr < d+1e-9: // line of sight
					return (h + propagation.BulgeM(at, d-at, w.Ae) - (hts*(d-at)+hrs*at)/d) / math.Sqrt(at*(d-at))
				case fromTx:
					return (h-hts)/at - 500*at/w.Ae
				default:
					return (h-hrs)/(d-at) - 500*(d-at)/w.Ae
				}
			}
		}
		return math.NaN()
	}
	return math.Abs(value(a)-value(b)) < 1e-9
}

// Source: the direct method of link/propagation, which reproduces the published results, on the
// profile that the package states. 1e-6 dB is the promise.
func TestSweepIsTheDirectMethod(t *testing.T) {
	every, shorter := 79, 1.0
	if testing.Short() {
		every, shorter = 211, 4
	}
	total, worst := 0, 0.0
	for name, height := range shapes {
		for i, variant := range []struct {
			class             func(east, north float64) uint8
			cellM, rangeM     float64
			aglM, farM, share float64
			fine              bool
		}{
			{nil, 30, 12_000, 20, 1.5, 1, false},
			{mixed, 30, 12_000, 4, 10, 0.3, true},
			{mixed, 400, 150_000, 60, 1.5, 0.7, false},
		} {
			t.Run(fmt.Sprintf("%s/%d", name, i), func(t *testing.T) {
				variant.rangeM /= shorter
				m := made{cellM: variant.cellM, reach: int(variant.rangeM/variant.cellM) + 20, height: height, class: variant.class}
				disc, frame := m.lay(t)
				a := asking{
					spec: Spec{
						RangeM: variant.rangeM, StepM: variant.cellM, AglM: variant.aglM, FarAglM: variant.farM, ClearingM: 50,
						DeltaN: 45, LowestHz: 60e6, Beta: true, Fine: variant.fine,
					},
					freqs: []float64{60e6, 450e6, 5.5e9}, share: variant.share,
				}
				s, err := newSweep(a.spec, disc, frame)
				if err != nil {
					t.Fatal(err)
				}
				for index, f := range sweepAll(t, s, a, every) {
					worst = math.Max(worst, compare(t, s, a, index, f))
					total++
					if t.Failed() {
						t.Fatal("stopped at the first")
					}
				}
			})
		}
	}
	t.Logf("%d cells, largest difference %.2g dB", total, worst)
}
