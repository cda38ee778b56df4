package wire

import (
	"fmt"
	"math"
	"testing"

	"fellreach/antenna"
)

// curtain returns parallel wires of 20 segments each, 19 unknowns, a fifth of a wave apart: all
// alike, or each of its own length so that none shares blocks with another.
func curtain(wires int, alike bool) Structure {
	s := Structure{Feeds: middleFeed()}
	for i := range wires {
		w := upright(0.47, 0.003)
		if !alike {
			w = upright(0.4+0.08*math.Mod(float64(i)*0.618, 1), 0.003)
		}
		w.Segments = 20
		s.Wires = append(s.Wires, w.moved(vec{0.2 * float64(i), 0, 0}))
	}
	return s
}

func BenchmarkCurtain(b *testing.B) {
	const k = 2 * math.Pi
	for _, wires := range []int{1, 5, 21, 53} {
		for _, alike := range []bool{true, false} {
			s := curtain(wires, alike)
			m := newMesh(s, testWavelengthM)
			name := fmt.Sprintf("%d unknowns, alike %v/", len(m.bases), alike)
			b.Run(name+"fill", func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					impedances(k, m, m, nil)
				}
			})
			if !alike {
				continue
			}
			z := impedances(k, m, m, nil)
			b.Run(name+"solve", func(b *testing.B) {
				b.ReportAllocs()
				scratch, right := newMatrix(z.rows, z.columns), make([]complex128, z.rows)
				for b.Loop() {
					copy(scratch.data, z.data)
					f, err := factor(scratch)
					if err != nil {
						b.Fatal(err)
					}
					f.solve(right)
				}
			})
			_, r := excited(b, s)
			b.Run(name+"far field", func(b *testing.B) {
				b.ReportAllocs()
				for b.Loop() {
					r.radiator.radiatedW()
					r.Pattern()
				}
			})
		}
	}
}

// BenchmarkDipole solves a dipole with its pattern, from its measures on.
func BenchmarkDipole(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		a := rodOf(b, 0.47, 0.003, 0.5)
		if _, err := a.Solve(clearOfMasts()); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkYagiCurve solves a Yagi of six elements at 41 frequencies for its VSWR curve.
func BenchmarkYagiCurve(b *testing.B) {
	spec := YagiSpec{DiameterM: 0.003, Material: antenna.Ideal}
	at := []float64{-0.22, 0, 0.1, 0.3, 0.58, 0.9}
	for i, lengthM := range []float64{0.488, 0.465, 0.445, 0.437, 0.432, 0.428} {
		spec.Elements = append(spec.Elements, Element{metresOf(lengthM), metresOf(at[i]), i == 1})
	}
	a, err := Yagi(spec)
	built(b, a, err)
	freqsHz := make([]float64, 41)
	for i := range freqsHz {
		freqsHz[i] = testHz * (0.95 + 0.0025*float64(i))
	}
	onMast := endless(antenna.Setting{FreqHz: testHz, MastDiameterM: 0.08, StandoffM: 0.6})
	for name, in := range map[string]antenna.Setting{"clear": clearOfMasts(), "mast": onMast} {
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				if _, err := a.Sweep(in, freqsHz); err != nil {
					b.Fatal(err)
				}
			}
		})
	}
}

// BenchmarkResonanceOnMast cuts a dipole to resonance beside a mast of 114 mm at 151.5 MHz; the
// sweep is 41 frequencies of it.
func BenchmarkResonanceOnMast(b *testing.B) {
	in, err := endless(antenna.Setting{FreqHz: channelHz, MastDiameterM: 0.114, StandoffM: 0.5}).Checked()
	if err != nil {
		b.Fatal(err)
	}
	b.Run("cut", func(b *testing.B) {
		b.ReportAllocs()
		for b.Loop() {
			if _, err := rodOf(b, 0, 0.006, 0.5).cut(in); err != nil {
				b.Fatal(err)
			}
		}
	})
	freqsHz := make([]float64, 41)
	for i := range freqsHz {
		freqsHz[i] = channelHz * (0.95 + 0.0025*float64(i))
	}
	a := rodOf(b, 0, 0.006, 0.5)
	b.Run("sweep", func(b *testing.B) {
		for b.Loop() {
			if _, err := a.Sweep(in, freqsHz); err != nil {
				b.Fatal(err)
			}
		}
	})
	b.Run("analysis", func(b *testing.B) {
		for b.Loop() {
			if _, err := rodOf(b, 0, 0.006, 0.5).Analyse(in, 50); err != nil {
				b.Fatal(err)
			}
		}
	})
	p, err := rodOf(b, 0, 0.006, 0.5).lay(in, 0.9, nil).structure.prepare(channelHz, 0)
	if err != nil {
		b.Fatal(err)
	}
	k := 2 * math.Pi * channelHz / antenna.SpeedOfLightMPerS
	b.Run("mast alone", func(b *testing.B) {
		for b.Loop() {
			if _, err := newCage(k, p.mast); err != nil {
				b.Fatal(err)
			}
		}
	})
	c, err := newCage(k, p.mast)
	if err != nil {
		b.Fatal(err)
	}
	b.Run("border alone", func(b *testing.B) {
		for b.Loop() {
			c.border(k, p.mesh)
		}
	})
}

// BenchmarkPattern evaluates a sampled pattern towards one direction.
func BenchmarkPattern(b *testing.B) {
	_, r := excited(b, besideMast(0.5, 0.06, 0, 5))
	p := r.Pattern()
	b.ReportAllocs()
	sum := 0.0
	for i := 0; b.Loop(); i++ {
		sum += p.Field(antenna.Direction{AzDeg: float64(i % 360), ElDeg: float64(i%179) - 89}).Power()
	}
}
