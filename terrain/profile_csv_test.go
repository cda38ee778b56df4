package terrain

import (
	"fmt"
	"io"
	"regexp"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestReadProfile(t *testing.T) {
	for _, tc := range []struct {
		name, table string
		want        Profile
	}{
		{
			"two columns", "d_km,h_m\n0,12.5\n0.25,-3\n",
			Profile{DistKm: []float64{0, 0.25}, AslM: []float64{12.5, -3}, CoverM: []float64{0, 0}, Zone: []Zone{Inland, Inland}},
		},
		{
			"any order", "zone,R_m,h_m,d_km\n1,0,0,0\n3,7.5,2,1\n4,15,40,2.5\n",
			Profile{DistKm: []float64{0, 1, 2.5}, AslM: []float64{0, 2, 40}, CoverM: []float64{0, 7.5, 15}, Zone: []Zone{Sea, Coastal, Inland}},
		},
		{
			"spaces, CRLF, byte order mark, no last newline", "\ufeffd_km, h_m\r\n 0 , 1e2 \r\n\r\n1,\t+5",
			Profile{DistKm: []float64{0, 1}, AslM: []float64{100, 5}, CoverM: []float64{0, 0}, Zone: []Zone{Inland, Inland}},
		},
	} {
		t.Run(tc.name, func(t *testing.T) {
			got, err := ReadProfile(strings.NewReader(tc.table), "p.csv")
			if err != nil {
				t.Fatalf("ReadProfile(%q): %v", tc.table, err)
			}
			if diff := cmp.Diff(tc.want, got); diff != "" {
				t.Errorf("ReadProfile(%q) (-want +got):\n%s", tc.table, diff)
			}
		})
	}
}

func TestReadProfileErrors(t *testing.T) {
	for _, tc := range []struct{ name, table, want string }{
		{"empty", "", "p.csv: the file is empty, its first line must name the columns d_km,h_m[,R_m][,zone]"},
		{"header alone", "d_km,h_m\n", "p.csv: the profile has 0 points, at least 2 are needed"},
		{"one point", "d_km,h_m\n0,5\n", "p.csv: the profile has 1 points, at least 2 are needed"},
		{"unknown column", "d_km,h_m,slope\n0,1,2\n", `p.csv:1: unknown column "slope", the columns are d_km, h_m, R_m and zone`},
		{"no header", "0,1\n1,2\n", `p.csv:1: unknown column "0", the columns are d_km, h_m, R_m and zone`},
		{"comment", "# made by hand\nd_km,h_m\n", `p.csv:1: unknown column "# made by hand", the columns are d_km, h_m, R_m and zone`},
		{"column twice", "d_km,h_m,h_m\n", "p.csv:1: column h_m stands twice"},
		{"no height", "d_km,R_m\n0,1\n", "p.csv:1: column h_m is missing"},
		{"decimal comma", "d_km;h_m\n0;1\n", `p.csv:1: unknown column "d_km;h_m", the columns are d_km, h_m, R_m and zone`},
		{"not a number", "d_km,h_m\n0,1\n1,high\n", `p.csv:3: h_m is "high", a number is needed`},
		{"empty field", "d_km,h_m\n0,1\n1,\n", `p.csv:3: h_m is "", a number is needed`},
		{"NaN", "d_km,h_m\n0,NaN\n1,1\n", `p.csv:2: h_m is "NaN", a number is needed`},
		{"infinite", "d_km,h_m\n0,1\n1e999,1\n", `p.csv:3: d_km is "1e999", a number is needed`},
		{"first not 0", "d_km,h_m\n0.1,1\n1,1\n", "p.csv:2: the first distance is 0.1 km, it must be 0"},
		{"standing still", "d_km,h_m\n0,1\n1,1\n1,1\n", "p.csv:4: d_km does not increase: 1 km follows 1 km"},
		{"going back", "d_km,h_m\n0,1\n\n2,1\n1,1\n", "p.csv:5: d_km does not increase: 1 km follows 2 km"},
		{"zone 2", "d_km,h_m,zone\n0,1,2\n", "p.csv:2: zone is 2, it must be 1 (sea), 3 (coastal land) or 4 (inland)"},
		{"zone 4.5", "d_km,h_m,zone\n0,1,4.5\n", "p.csv:2: zone is 4.5, it must be 1 (sea), 3 (coastal land) or 4 (inland)"},
		{"negative cover", "d_km,h_m,R_m\n0,1,-1\n", "p.csv:2: R_m is -1, a height of cover is not negative"},
		{"too few fields", "d_km,h_m\n0\n", "p.csv:2: 1 fields, the header names 2 columns"},
		{"too many fields", "d_km,h_m\n0,1,4\n", "p.csv:2: 3 fields, the header names 2 columns"},
		{"open quote", "d_km,h_m\n0,\"1\n", `p.csv:2: extraneous or missing " in quoted-field`},
	} {
		t.Run(tc.name, func(t *testing.T) {
			got, err := ReadProfile(strings.NewReader(tc.table), "p.csv")
			if err == nil {
				t.Fatalf("ReadProfile(%q) = %+v, want error %q", tc.table, got, tc.want)
			}
			if err.Error() != tc.want {
				t.Errorf("ReadProfile(%q):\n got %s\nwant %s", tc.table, err, tc.want)
			}
		})
	}
}

// The two limits, one point or one byte to either side.
func TestReadProfileLimits(t *testing.T) {
	table := func(points int) string {
		var b strings.Builder
		b.WriteString("d_km,h_m\n")
		for i := range points {
			fmt.Fprintf(&b, "%d,0\n", i)
		}
		return b.String()
	}
	if p, err := ReadProfile(strings.NewReader(table(100_000)), "p.csv"); err != nil || len(p.DistKm) != 100_000 {
		t.Errorf("100,000 points: got %d points, error %v", len(p.DistKm), err)
	}
	want := "p.csv:100002: more than 100000 points, a profile may have no more"
	if _, err := ReadProfile(strings.NewReader(table(100_001)), "p.csv"); err == nil || err.Error() != want {
		t.Errorf("100,001 points: got error %v, want %s", err, want)
	}

	small := "d_km,h_m\n0,1\n1,2\n"
	blank := func(bytes int) io.Reader { return strings.NewReader(small + strings.Repeat("\n", bytes-len(small))) }
	if _, err := ReadProfile(blank(16<<20), "p.csv"); err != nil {
		t.Errorf("16 MB: %v", err)
	}
	want = "p.csv: more than 16 MB, a profile may have no more"
	if _, err := ReadProfile(blank(16<<20+1), "p.csv"); err == nil || err.Error() != want {
		t.Errorf("a byte over 16 MB: got error %v, want %s", err, want)
	}
}

// A reader's own error keeps its identity.
func TestReadProfileBrokenReader(t *testing.T) {
	r, w := io.Pipe()
	w.CloseWithError(io.ErrUnexpectedEOF)
	if _, err := ReadProfile(r, "p.csv"); err == nil || err.Error() != "p.csv: unexpected EOF" {
		t.Errorf("got error %v", err)
	}
}

// Whatever the bytes: a profile that keeps the promises of its type, or an error that names the
// file.
func FuzzReadProfile(f *testing.F) {
	f.Add("d_km,h_m\n0,1\n1,2\n")
	f.Add("zone,R_m,h_m,d_km\n1,0,0,0\n3,7.5,2,1\n")
	f.Add("d_km,h_m\n0,\"1\n")
	f.Add("\ufeffd_km,h_m\n0,0x1p3\n1,1e-400")
	place := regexp.MustCompile(`^p\.csv(:[0-9]+)?: `)
	f.Fuzz(func(t *testing.T, table string) {
		p, err := ReadProfile(strings.NewReader(table), "p.csv")
		if err != nil {
			if !place.MatchString(err.Error()) {
				t.Errorf("%q: the error does not say where: %v", table, err)
			}
			return
		}
		n := len(p.DistKm)
		if n < 2 || len(p.AslM) != n || len(p.CoverM) != n || len(p.Zone) != n {
			t.Fatalf("%q: ragged profile %+v", table, p)
		}
		for i, d := range p.DistKm {
			if i == 0 && d != 0 || i > 0 && !(d > p.DistKm[i-1]) {
				t.Errorf("%q: distances %v", table, p.DistKm)
			}
		}
	})
}
