package terrain

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/paulmach/orb"
	"pgregory.net/rapid"
)

// evenKm returns n distances of 30 m.
func evenKm(n int) []float64 {
	d := make([]float64, n)
	for i := range d {
		d[i] = float64(i) * 0.03
	}
	return d
}

// Hand-worked: straight lines over the voids.
func TestBridge(t *testing.T) {
	nan := math.NaN()
	aslM := []float64{10, nan, 30, 40, nan, nan, nan, 0, 5}
	notes, err := Bridge(evenKm(9), aslM, nil, nil, 120)
	if err != nil {
		t.Fatal(err)
	}
	want := []float64{10, 20, 30, 40, 30, 20, 10, 0, 5}
	for i := range want {
		if !same(aslM[i], want[i], 1e-9) {
			t.Errorf("height %d is %g, want %g", i, aslM[i], want[i])
		}
	}
	if !slices.Equal(notes, []string{"bridged a void of 60 m at 0.0 km", "bridged a void of 120 m at 0.1 km"}) {
		t.Errorf("notes %q", notes)
	}
}

func TestBridgeRefuses(t *testing.T) {
	nan := math.NaN()
	points := []orb.Point{{1, 0}, {2, 0}, {3, 0}, {4, 0}, {5, 0}}
	for _, tc := range []struct {
		name    string
		aslM    []float64
		outside []bool
		bridgeM float64
		want    VoidError
		says    []string
	}{
		{"no bridge", []float64{1, nan, 3, 4, 5}, nil, 0, VoidError{From: points[1], To: points[1], StartKm: 0, LengthM: 60}, []string{`bridge_voids: "60 m"`, "0.00000 N, 2.00000 E"}},
		{"too long", []float64{1, 2, nan, nan, 5}, nil, 89, VoidError{From: points[2], To: points[3], StartKm: 0.03, LengthM: 90}, []string{"for 90 m", "from 0.03 km", `bridge_voids: "90 m"`}},
		{"at the start", []float64{nan, nan, 3, 4, 5}, nil, 1e9, VoidError{From: points[0], To: points[1], StartKm: 0, LengthM: 60, AtEnd: true}, []string{"another raster that fills it"}},
		{"at the end", []float64{1, 2, 3, 4, nan}, nil, 1e9, VoidError{From: points[4], To: points[4], StartKm: 0.09, LengthM: 30, AtEnd: true}, []string{"another raster that fills it"}},
		{"everywhere", []float64{nan, nan, nan, nan, nan}, nil, 1e9, VoidError{From: points[0], To: points[4], StartKm: 0, LengthM: 120, AtEnd: true}, nil},
		{"outside", []float64{1, 2, 3, nan, nan}, []bool{false, false, false, false, true}, 0, VoidError{From: points[3], To: points[4], StartKm: 0.06, LengthM: 60, Outside: true, AtEnd: true}, []string{"do not reach", "beyond: sea"}},
		{"NaN bridges nothing", []float64{1, nan, 3, 4, 5}, nil, nan, VoidError{From: points[1], To: points[1], LengthM: 60}, nil},
	} {
		_, err := Bridge(evenKm(5), tc.aslM, points, tc.outside, tc.bridgeM)
		var got *VoidError
		if !errors.As(err, &got) {
			t.Errorf("%s: %v, want a VoidError", tc.name, err)
			continue
		}
		rounded := *got
		rounded.StartKm, rounded.LengthM = math.Round(got.StartKm*1e6)/1e6, math.Round(got.LengthM*1e6)/1e6
		if rounded != tc.want {
			t.Errorf("%s: %+v, want %+v", tc.name, rounded, tc.want)
		}
		for _, text := range tc.says {
			if !strings.Contains(err.Error(), text) {
				t.Errorf("%s: %q lacks %q", tc.name, err, text)
			}
		}
	}
}

// The bridge that an error asks for is long enough.
func TestBridgeAsTold(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		stepKm := rapid.Float64Range(0.001, 0.2).Draw(t, "step")
		gap := rapid.IntRange(1, 20).Draw(t, "gap")
		distKm, aslM := make([]float64, gap+2), make([]float64, gap+2)
		for i := range distKm {
			distKm[i], aslM[i] = float64(i)*stepKm, math.NaN()
		}
		aslM[0], aslM[gap+1] = -3, 400
		_, err := Bridge(distKm, aslM, nil, nil, 0)
		var void *VoidError
		if !errors.As(err, &void) {
			t.Fatal(err)
		}
		if _, err := Bridge(distKm, aslM, nil, nil, math.Ceil(void.LengthM-lengthSlackM)); err != nil {
			t.Fatal(err)
		}
		for i := 1; i < len(aslM); i++ {
			if want := 403.0 / float64(gap+1); math.Abs(aslM[i]-aslM[i-1]-want) > 1e-9 {
				t.Fatalf("heights %v do not rise evenly", aslM)
			}
		}
	})
}

// With every height known there is nothing to do, and nothing is touched.
func TestBridgeWithoutVoids(t *testing.T) {
	aslM := []float64{1, 2, 3}
	notes, err := Bridge(evenKm(3), aslM, nil, nil, 0)
	if err != nil || notes != nil || !slices.Equal(aslM, []float64{1, 2, 3}) {
		t.Errorf("%q, %v, %v", notes, err, aslM)
	}
}

func TestErrorsOfOnePlace(t *testing.T) {
	at := orb.Point{-20.118, 47.5231}
	for _, tc := range []struct {
		err  error
		want []string
	}{
		{&VoidError{From: at, To: at}, []string{"no height at 47.52310 N, 20.11800 W", "another raster"}},
		{&VoidError{From: at, To: at, Outside: true}, []string{"do not reach", "no height at 47.52310 N, 20.11800 W"}},
		{&HeightError{At: at, HeightM: -32768, File: "dem.tif"}, []string{"dem.tif", "-32768 m", "47.52310 N", "-500 to 9000 m", "nodata"}},
	} {
		for _, want := range tc.want {
			if !strings.Contains(tc.err.Error(), want) {
				t.Errorf("%q lacks %q", tc.err, want)
			}
		}
	}
}
