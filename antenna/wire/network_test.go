package wire

import (
	"errors"
	"math"
	"math/cmplx"
	"runtime"
	"testing"
)

// Source: the impedance matrix is the inverse of the admittance matrix.
func TestImpedanceMatrix(t *testing.T) {
	n := network(t, rowOf(3, vec{0, 0.3, 0.2}))
	z, err := n.ImpedanceOhm()
	if err != nil {
		t.Fatal(err)
	}
	for i := range z {
		for j := range z {
			want := complex128(0)
			if i == j {
				want = 1
			}
			if got := dot(n.AdmittanceS[i], z[j]); cmplx.Abs(got-want) > 1e-9 {
				t.Errorf("Y Z [%d][%d] = %v", i, j, got)
			}
		}
	}
	if _, err := (&Network{AdmittanceS: [][]complex128{{1, 1}, {1, 1}}}).ImpedanceOhm(); err == nil {
		t.Error("ports that short each other have an impedance matrix")
	}
}

// A sweep stays on the mesh of the design frequency, until that would be too coarse.
func TestMeshOfASweep(t *testing.T) {
	s := Structure{Wires: []Wire{upright(0.47, 0.002)}, Feeds: middleFeed()}
	for _, tc := range []struct {
		freqHz, designHz float64
		segments         int
	}{{testHz, 0, 20}, {1.4 * testHz, testHz, 20}, {1.6 * testHz, testHz, 32}, {0.5 * testHz, testHz, 20}, {0.5 * testHz, 0, 12}} {
		n, err := s.Solve(tc.freqHz, tc.designHz)
		if err != nil {
			t.Fatal(err)
		}
		if n.Segments != tc.segments {
			t.Errorf("%+v: %d segments", tc, n.Segments)
		}
	}
}

// One core and several give the same, to the last bit.
func TestCoresDoNotMatter(t *testing.T) {
	s := besideMast(0.4, 0.06, 0.2, 3)
	s.Wires = append(s.Wires, upright(0.45, 0.002).moved(vec{0.6, 0, 0.2}))
	several := network(t, s)
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(1))
	if one := network(t, s); one.TogetherOhm() != several.TogetherOhm() {
		t.Errorf("%v ohm on one core, %v on several", one.TogetherOhm(), several.TogetherOhm())
	}
}

// The factors of a mast serve another structure at the same frequency, and no other.
func TestMastIsFactoredOnce(t *testing.T) {
	first, err := besideMast(0.4, 0.05, 0, 4).solveAfter(nil, testHz)
	if err != nil {
		t.Fatal(err)
	}
	for _, tc := range []struct {
		name   string
		s      Structure
		freqHz float64
		shared bool
	}{
		{"moved", besideMast(0.5, 0.05, 0.3, 4), testHz, true},
		{"longer", besideMast(0.4, 0.05, 0, 4.3), testHz, false},
		{"thicker", besideMast(0.4, 0.045, 0, 4), testHz, false},
		{"more wires", besideMast(0.4, 0.07, 0, 4), testHz, false},
		{"other frequency", besideMast(0.4, 0.05, 0, 4), 1.01 * testHz, false},
	} {
		n, err := tc.s.solveAfter(first, tc.freqHz)
		if err != nil {
			t.Fatal(err)
		}
		if shared := n.border.cage.harmonics[0] == first.border.cage.harmonics[0]; shared != tc.shared {
			t.Errorf("%s: factors shared %v", tc.name, shared)
		}
		fresh, err := tc.s.Solve(tc.freqHz, tc.freqHz)
		if err != nil {
			t.Fatal(err)
		}
		if cmplx.Abs(fresh.TogetherOhm()-n.TogetherOhm()) > 1e-9 {
			t.Errorf("%s: %v ohm with factors of another, %v with its own", tc.name, n.TogetherOhm(), fresh.TogetherOhm())
		}
	}
}

func TestParallel(t *testing.T) {
	for _, n := range []int{0, 1, 2, 100} {
		counts := make([]int, n)
		parallel(n, func(i int) { counts[i]++ })
		for i, c := range counts {
			if c != 1 {
				t.Errorf("%d of %d was done %d times", i, n, c)
			}
		}
	}
}

// Zeros of functions that are known, rising and falling, with and without poles.
func TestRisingZero(t *testing.T) {
	plain := func(f func(float64) float64) func(float64) (float64, error) {
		return func(x float64) (float64, error) { return f(x), nil }
	}
	for _, tc := range []struct {
		name          string
		f             func(float64) float64
		lo, hi, guess float64
		want          float64
	}{
		{"line", func(x float64) float64 { return 3*x - 1 }, 0, 1, 0.5, 1. / 3},
		{"from below", func(x float64) float64 { return math.Expm1(4*x - 3) }, 0, 1, 0.1, 0.75},
		{"at the guess", func(x float64) float64 { return x - 0.5 }, 0, 1, 0.5, 0.5},
		{"beside a pole", func(x float64) float64 { return math.Tan(x) }, 2, 4, 3.5, math.Pi},
		{"flat", func(x float64) float64 { return math.Pow(x-0.3, 3) }, 0, 1, 0.6, 0.3},
	} {
		got, err := risingZero(tc.lo, tc.hi, tc.guess, 0.05, plain(tc.f))
		if err != nil || abs(got-tc.want) > 0.03 || abs(tc.f(got)) > 1e-4 {
			t.Errorf("%s: %g, %v; want %g", tc.name, got, err, tc.want)
		}
	}
	for name, f := range map[string]func(float64) float64{
		"above":   func(x float64) float64 { return 1 },
		"below":   func(x float64) float64 { return -1 },
		"falling": func(x float64) float64 { return 0.5 - x },
		"pole":    func(x float64) float64 { return 1 / (0.55 - x) },
	} {
		if x, err := risingZero(0, 1, 0.4, 0.05, plain(f)); !errors.Is(err, errNoZero) {
			t.Errorf("%s: %g, %v, want no zero", name, x, err)
		}
	}
	broken := errors.New("broken")
	calls := 0
	for fails := range 4 {
		calls = 0
		_, err := risingZero(0, 1, 0.4, 0.05, func(x float64) (float64, error) {
			if calls++; calls > fails {
				return 0, broken
			}
			return math.Expm1(x) - 0.7, nil
		})
		if !errors.Is(err, broken) {
			t.Errorf("failure at call %d: %v", fails+1, err)
		}
	}
}

func TestQuadrature(t *testing.T) {
	for name, r := range map[string]rule{"outer": outerRule, "inner": innerRule, "round": roundRule, "far": farRules[4], "segment": segmentRule} {
		sum, square := 0.0, 0.0
		for i, x := range r.x {
			sum += r.weight[i]
			square += r.weight[i] * x * x
		}
		near(t, name+": 1", sum, 1, 1e-12)
		near(t, name+": x^2", square, 1./3, 1e-12)
	}
	sinh, cosh := sinhCosh(-1.3)
	near(t, "sinh", sinh, math.Sinh(-1.3), 1e-14)
	near(t, "cosh", cosh, math.Cosh(-1.3), 1e-14)
}
