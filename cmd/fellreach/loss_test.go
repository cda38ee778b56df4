package main

import (
	"math"
	"strconv"
	"strings"
	"testing"
)

type lossAnswer struct {
	LossDB   float64 `json:"loss_db"`
	Method   string
	Warnings []string
	Terms    map[string]float64
}

func lossOf(t *testing.T, profile string, flags ...string) lossAnswer {
	t.Helper()
	path := write(t, t.TempDir(), "profile.csv", profile)
	return decoded[lossAnswer](t, succeeds(t, exitDone, append([]string{"loss", path, "--latitude", "50", "--format", "json"}, flags...)...))
}

// Free space: Rec. ITU-R P.525, 20 log f + 20 log d + 32.4 with f in MHz and d in km; the constant
// is rounded by up to 0.05 dB.
func TestLossInFreeSpace(t *testing.T) {
	for _, tc := range []struct {
		frequency string
		mhz, km   float64
		profile   string
	}{
		{"151.5 MHz", 151.5, 2, smallProfile},
		{"0.433 GHz", 433, 2, smallProfile},
		{"6 GHz", 6000, 20, "d_km,h_m\n0,100\n10,500\n20,100\n"},
	} {
		got := lossOf(t, tc.profile, "--frequency", tc.frequency, "--method", "free-space")
		near(t, tc.frequency, got.LossDB, 20*math.Log10(tc.mhz)+20*math.Log10(tc.km)+32.4, 0.06)
		near(t, "Lbfs", got.Terms["Lbfs"], got.LossDB, 1e-12)
		if got.Method != "free-space" {
			t.Errorf("method %q", got.Method)
		}
	}
}

// A sharp ridge in the middle costs what one knife edge costs: J(nu) of Rec. ITU-R P.526, here
// by its exact integral: nu = 2.0 gives 19.0 dB (P.526 figure of J(nu), read to 0.5 dB). The
// method adds its own correction for the path's length (Rec. ITU-R P.526-15, section 4.5.2:
// 10 + 0.02 d with 1 - exp(-J/6)) and little for the sphere.
func TestLossOverRidge(t *testing.T) {
	// nu = h sqrt(2 d / (lambda d1 d2)), d1 = d2 = 5 km, lambda 1.9788 m at 151.5 MHz; the bulge
	// of 1.5 m (a = 8474 km) is part of h.
	h := 2 / math.Sqrt(2*10/(1.9788e-3*5*5)) // km
	ridge := "d_km,h_m\n0,0\n4.97,0\n5," + strconv.FormatFloat(h*1000+30-1.47, 'f', 3, 64) + "\n5.03,0\n10,0\n"
	got := lossOf(t, ridge, "--frequency", "151.5 MHz", "--tx-height", "30 m", "--rx-height", "30 m", "--method", "p526")
	j := 19.0
	want := j + (1-math.Exp(-j/6))*(10+0.02*10)
	near(t, "loss over free space", got.LossDB-got.Terms["Lbfs"], want, 1.5)
}

// termSymbols are the keys of the terms: the symbols of Rec. ITU-R P.1812 that its readers are
// promised.
const termSymbols = `Lbfs Lb0p Lb0beta Lbulla_k50 Lbulls_k50 Ldsph_k50 Ld50 Ldbeta Fi Ldp Lbd50 Lbd Lminb0p Lba Lminbap Lbda Lbam Lbs Lbc Lloc Lb Ep
	theta theta_t theta_r dlt dlr dtm dlm ae hst hsr hstd hsrd hte hre hm hts hrs omega beta0`

// The terms bear the Recommendation's symbols: all of them with P.1812, those it works out with
// another method. Lb is the loss.
func TestLossTerms(t *testing.T) {
	for method, symbols := range map[string]string{
		"p1812": termSymbols, "p526": "Lbfs Lbulla_k50 Lbulls_k50 Ldsph_k50 Ld50 theta theta_t theta_r dlt dlr ae hts hrs Lb", "free-space": "Lbfs ae hts hrs Lb",
	} {
		got := lossOf(t, smallProfile, "--frequency", "151.5 MHz", "--method", method)
		if got.Method != method || len(got.Warnings) > 0 {
			t.Errorf("%s: %+v", method, got)
		}
		for _, symbol := range strings.Fields(symbols) {
			if _, ok := got.Terms[symbol]; !ok {
				t.Errorf("%s: no %s among the terms", method, symbol)
			}
		}
		near(t, "Lb", got.Terms["Lb"], got.LossDB, 1e-9)
	}
	got := lossOf(t, smallProfile, "--frequency", "151.5 MHz", "--method", "p526")
	near(t, "ae", got.Terms["ae"], 6371*157/(157-45.0), 0.5) // P.1812: a k, k = 157/(157 - delta N)
	near(t, "hts", got.Terms["hts"], 110, 1e-9)
	near(t, "hrs", got.Terms["hrs"], 120, 1e-9)
}

func TestLossTable(t *testing.T) {
	path := write(t, t.TempDir(), "profile.csv", smallProfile)
	text := succeeds(t, exitDone, "loss", path, "--frequency", "151.5 MHz", "--method", "p526", "--latitude", "50")
	for _, want := range []string{"basic transmission loss", "dB by p526", "Lbfs", "mrad"} {
		if !strings.Contains(text, want) {
			t.Errorf("want %q in:\n%s", want, text)
		}
	}
}

// Without a latitude P.1812 takes one and says so.
func TestLossWithoutLatitude(t *testing.T) {
	path := write(t, t.TempDir(), "profile.csv", smallProfile)
	args := []string{"loss", path, "--frequency", "151.5 MHz", "--method", "p1812", "--format", "json"}
	silent := decoded[lossAnswer](t, succeeds(t, exitDone, append(args, "--latitude=-45")...))
	warned := decoded[lossAnswer](t, succeeds(t, exitDone, args...))
	if len(silent.Warnings) != 0 || len(warned.Warnings) != 1 || !strings.Contains(warned.Warnings[0], "45") {
		t.Errorf("warnings %q with a latitude, %q without", silent.Warnings, warned.Warnings)
	}
	near(t, "loss", warned.LossDB, silent.LossDB, 1e-9)
}

// Polarization counts where the ground does: on a sea path beyond the horizon at low frequency.
func TestLossKnowsPolarization(t *testing.T) {
	sea := "d_km,h_m,zone\n0,0,1\n30,0,1\n60,0,1\n"
	vertical := lossOf(t, sea, "--frequency", "30 MHz", "--method", "p526", "--polarization", "vertical")
	horizontal := lossOf(t, sea, "--frequency", "30 MHz", "--method", "p526", "--polarization", "horizontal")
	if !(horizontal.LossDB > vertical.LossDB+5) {
		t.Errorf("vertical %.1f dB, horizontal %.1f dB", vertical.LossDB, horizontal.LossDB)
	}
}

// What is asked and changes nothing is told: times and locations of a method without them, and
// locations without a spread.
func TestLossTellsIdleFlags(t *testing.T) {
	path := write(t, t.TempDir(), "profile.csv", smallProfile)
	for _, tc := range []struct {
		flags string
		want  string // empty: nothing is told
	}{
		{"--method p526 --time 1%", "method p526 knows neither"},
		{"--method free-space --locations 90% --location-spread 5dB", "method free-space knows neither"},
		{"--method p526 --time 50%", ""},
		{"--locations 90%", "changes nothing without a --location-spread"},
		{"--locations 90% --location-spread 5dB --time 1%", ""},
	} {
		args := append([]string{"loss", path, "--frequency", "151.5 MHz", "--latitude", "50", "--format", "json"}, strings.Fields(tc.flags)...)
		told := strings.Join(decoded[lossAnswer](t, succeeds(t, exitDone, args...)).Warnings, "; ")
		if (tc.want == "") != (told == "") || !strings.Contains(told, tc.want) {
			t.Errorf("%s: told %q, want %q", tc.flags, told, tc.want)
		}
	}
}
