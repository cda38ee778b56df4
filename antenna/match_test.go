package antenna

import (
	"math"
	"math/cmplx"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// lineOf returns a run of 50 ohm with the given matched loss at 100 MHz.
func lineOf(lossDB float64) Run {
	return Run{
		Feeder:  Feeder{Name: "line", ImpedanceOhm: 50, VelocityFactor: 0.66, Loss: []LossPoint{{100e6, lossDB / 10}}},
		LengthM: 10,
	}
}

// Source: mismatch loss of handbooks: VSWR 1.5, 2 and 3 lose 0.18, 0.51 and 1.25 dB.
func TestMismatchOfHandbooks(t *testing.T) {
	for _, tc := range []struct{ vswr, want float64 }{{1, 0}, {1.5, 0.18}, {2, 0.51}, {3, 1.25}, {5.8284, 3.01}} {
		for _, load := range []complex128{complex(50*tc.vswr, 0), complex(50/tc.vswr, 0)} {
			got, err := Run{}.Transfer(load, Match{}, 100e6)
			if err != nil {
				t.Fatal(err)
			}
			near(t, "VSWR at the antenna", got.AntennaVSWR, tc.vswr, 1e-9)
			near(t, "VSWR at the radio", got.RadioVSWR, tc.vswr, 1e-9)
			near(t, "mismatch", got.MismatchLossDB, tc.want, 0.006) // two decimals in print
			near(t, "total", got.TotalDB(), got.MismatchLossDB, 1e-12)
		}
	}
}

// Source: handbook charts of additional loss by standing waves, from memory: 1 dB of matched loss
// and a VSWR of 3 at the load add a little under 0.5 dB; 3 dB and 3 add 0.9 dB.
func TestExtraLossOfHandbooks(t *testing.T) {
	for _, tc := range []struct{ matchedDB, vswr, want, tol float64 }{{1, 3, 0.47, 0.05}, {3, 3, 0.9, 0.1}, {1, 1, 0, 1e-9}, {0, 3, 0, 1e-9}} {
		got, err := lineOf(tc.matchedDB).Transfer(complex(50*tc.vswr, 0), Match{}, 100e6)
		if err != nil {
			t.Fatal(err)
		}
		near(t, "extra loss", got.ExtraLossDB, tc.want, tc.tol)
	}
}

// Worked by hand: 200 + j100 ohm through 4:1 is 50 + j25, G = j25/(100 + j25), |G|^2 = 1/17,
// VSWR 1.6404; behind 3.0103 dB (a = 2) the radio sees |G|^2 = 1/68.
func TestTransferByHand(t *testing.T) {
	got, err := lineOf(10*math.Log10(2)).Transfer(complex(200, 100), Match{Ratio: 4, LossDB: 0.3}, 100e6)
	if err != nil {
		t.Fatal(err)
	}
	if got.LoadOhm != complex(50, 25) || got.ReferenceOhm != 50 {
		t.Errorf("load %v against %g ohm, want 50+25j against 50", got.LoadOhm, got.ReferenceOhm)
	}
	near(t, "|G|^2", squared(got.Reflection), 1.0/17, 1e-12)
	near(t, "VSWR at the antenna", got.AntennaVSWR, 1.6404, 1e-4)
	near(t, "VSWR at the radio", got.RadioVSWR, (1+math.Sqrt(1.0/68))/(1-math.Sqrt(1.0/68)), 1e-9)
	near(t, "transformer", got.TransformerLossDB, 0.3, 0)
	near(t, "matched", got.MatchedLossDB, 3.0103, 1e-4)
	near(t, "extra", got.ExtraLossDB, 10*math.Log10((67.0/68)/(16.0/17)), 1e-9)
	near(t, "mismatch", got.MismatchLossDB, -10*math.Log10(67.0/68), 1e-9)
	near(t, "total", got.TotalDB(), 0.3-10*math.Log10((16.0/17)/2), 1e-9)
}

func anyLoad(t *rapid.T) complex128 {
	return complex(
		math.Exp(rapid.Float64Range(math.Log(1e-3), math.Log(1e5)).Draw(t, "log R")),
		rapid.Float64Range(-3000, 3000).Draw(t, "X"))
}

// The three losses of the line together are -10 log10((1 - |G|^2)/a): nothing is counted twice.
func TestTransferIdentity(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		load, matchedDB := anyLoad(t), rapid.Float64Range(0, 30).Draw(t, "matched loss")
		got, err := lineOf(matchedDB).Transfer(load, Match{}, 100e6)
		if err != nil {
			t.Fatal(err)
		}
		accepted := 4 * real(load) * 50 / squared(load+50)
		want := -10*math.Log10(accepted) + matchedDB
		if math.Abs(got.TotalDB()-want) > 1e-8 {
			t.Fatalf("total %.12g dB, want %.12g", got.TotalDB(), want)
		}
		if got.ExtraLossDB < 0 || got.MismatchLossDB < 0 || got.RadioVSWR < 1 || got.RadioVSWR > got.AntennaVSWR*(1+1e-9) {
			t.Fatalf("%+v", got)
		}
		if math.Abs(squared(got.Reflection)+accepted-1) > 1e-9 {
			t.Fatalf("reflection %v of a load that takes %g", got.Reflection, accepted)
		}
	})
}

// The same by circuit theory, with the chain matrix of a lossy line of any electrical length
// between a 50 ohm source and the load.
func TestTransferAgainstChainMatrix(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		load, matchedDB := anyLoad(t), rapid.Float64Range(0.01, 20).Draw(t, "matched loss")
		phase := rapid.Float64Range(0, 40).Draw(t, "electrical length")
		gl := complex(matchedDB*math.Ln10/20, phase) // propagation constant times length
		z := 50 * (load + 50*cmplx.Tanh(gl)) / (50 + load*cmplx.Tanh(gl))
		current := 1 / (50 + z) // of a source of 1 V open
		input := real(z) * squared(current)
		voltage := z * current
		atLoad := voltage*cmplx.Cosh(gl) - 50*current*cmplx.Sinh(gl)
		delivered := squared(atLoad) * real(1/load)
		available := 1.0 / (4 * 50)
		got, err := lineOf(matchedDB).Transfer(load, Match{}, 100e6)
		if err != nil {
			t.Fatal(err)
		}
		if want := decibels(available / delivered); math.Abs(got.TotalDB()-want) > 1e-6 {
			t.Fatalf("total %g dB, by the chain matrix %g", got.TotalDB(), want)
		}
		if want := decibels(available / input); math.Abs(got.MismatchLossDB-want) > 1e-6 {
			t.Fatalf("mismatch %g dB, by the chain matrix %g", got.MismatchLossDB, want)
		}
		if want := decibels(input / delivered); math.Abs(got.MatchedLossDB+got.ExtraLossDB-want) > 1e-6 {
			t.Fatalf("line %g dB, by the chain matrix %g", got.MatchedLossDB+got.ExtraLossDB, want)
		}
	})
}

func TestTransferNotes(t *testing.T) {
	for _, tc := range []struct {
		name   string
		load   complex128
		freqHz float64
		says   []string
	}{
		{"matched", 50, 100e6, nil},
		{"VSWR 1.9", 95, 100e6, nil},
		{"VSWR 2.5", 125, 100e6, []string{"VSWR 2.5 at the radio"}},
		{"beyond the table", 50, 150e6, []string{"goes on from 100 MHz"}},
		{"both", 500, 150e6, []string{"goes on from 100 MHz", "VSWR"}},
	} {
		got, err := lineOf(0.01).Transfer(tc.load, Match{}, tc.freqHz)
		if err != nil || len(got.Notes) != len(tc.says) {
			t.Errorf("%s: notes %q, %v, want %q", tc.name, got.Notes, err, tc.says)
			continue
		}
		for i, part := range tc.says {
			if !strings.Contains(got.Notes[i], part) {
				t.Errorf("%s: note %q, want %q in it", tc.name, got.Notes[i], part)
			}
		}
	}
}

func TestTransferRefuses(t *testing.T) {
	for _, tc := range []struct {
		name  string
		load  complex128
		match Match
		run   Run
		says  string
	}{
		{"no resistance", 25i, Match{}, Run{}, "antenna impedance (0+25i) ohm is not allowed"},
		{"negative resistance", complex(-5, 0), Match{}, Run{}, "above 0"},
		{"NaN", cmplx.NaN(), Match{}, Run{}, "antenna impedance"},
		{"Inf", cmplx.Inf(), Match{}, Run{}, "both parts finite"},
		{"ratio", 50, Match{Ratio: -4}, Run{}, "match ratio -4"},
		{"ratio NaN", 50, Match{Ratio: math.NaN()}, Run{}, "match ratio NaN"},
		{"match loss", 50, Match{LossDB: -1}, Run{}, "match loss -1 dB"},
		{"feeder", 50, Match{}, Run{LengthM: 3}, "no loss is given"},
	} {
		_, err := tc.run.Transfer(tc.load, tc.match, 100e6)
		wantError(t, tc.name, err, tc.says)
	}
}

func TestVSWR(t *testing.T) {
	for _, tc := range []struct {
		load complex128
		ref  float64
		want float64
	}{
		{50, 50, 1},
		{75, 50, 1.5},
		{25, 50, 2},
		{complex(50, 50), 50, 2.6180},
		{complex(73.1, 42.5), 50, 2.1819},
		{1e-9, 50, 5e10}, // nearly all comes back: no digit may be lost
	} {
		near(t, "VSWR over the wanted", VSWR(tc.load, tc.ref)/tc.want, 1, 1e-4)
	}
}
