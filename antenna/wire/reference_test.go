package wire

import (
	"encoding/csv"
	"os"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"fellreach/antenna"
)

// The tests work at a wavelength of 1 m, so that lengths in metres are wavelengths.
const (
	testWavelengthM = 1.0
	testHz          = antenna.SpeedOfLightMPerS / testWavelengthM
)

// referenceRows reads a table of reference values from beside the repository, as maps from column
// to text, and skips the test where there is none.
func referenceRows(t *testing.T, name string) []map[string]string {
	t.Helper()
	file, err := os.Open(filepath.Join(repositoryRoot(t), "..", "shared", "reference", "antenna", name))
	if err != nil {
		t.Skipf("no reference table beside the repository: %v", err)
	}
	defer file.Close()
	records, err := csv.NewReader(file).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	var rows []map[string]string
	for _, record := range records[1:] {
		row := map[string]string{}
		for i, value := range record {
			row[records[0][i]] = value
		}
		rows = append(rows, row)
	}
	return rows
}

// repositoryRoot walks up to the folder that holds go.mod.
func repositoryRoot(t *testing.T) string {
	t.Helper()
	folder, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	for {
		if _, err := os.Stat(filepath.Join(folder, "go.mod")); err == nil {
			return folder
		}
		parent := filepath.Dir(folder)
		if parent == folder {
			t.Fatal("no go.mod above the package")
		}
		folder = parent
	}
}

// number parses a column that must hold a number.
func number(t *testing.T, row map[string]string, column string) float64 {
	t.Helper()
	value, err := strconv.ParseFloat(row[column], 64)
	if err != nil {
		t.Fatalf("row %s, column %s: %v", row["id"], column, err)
	}
	return value
}

// numbers parses a column of numbers with semicolons between.
func numbers(t *testing.T, row map[string]string, column string) []float64 {
	t.Helper()
	var values []float64
	for _, field := range strings.Split(row[column], ";") {
		value, err := strconv.ParseFloat(field, 64)
		if err != nil {
			t.Fatalf("row %s, column %s: %v", row["id"], column, err)
		}
		values = append(values, value)
	}
	return values
}

// A tally counts the values of a table against their tolerances: 95 % must be within, none beyond
// three times it. That is the rule the tolerances were made for, by solving each row five ways.
type tally struct {
	t             *testing.T
	values, off   int
	worst         float64 // deviation over tolerance
	worstWhat     string
	deviationHint []string
}

func (c *tally) check(row map[string]string, what string, got, want, tolerance float64) {
	c.t.Helper()
	c.values++
	ratio := abs(got-want) / tolerance
	if ratio > c.worst {
		c.worst, c.worstWhat = ratio, row["id"]+" "+what
	}
	if ratio > 1 {
		c.off++
		c.deviationHint = append(c.deviationHint, row["id"]+" "+what+": got "+format(got)+", want "+format(want)+" within "+format(tolerance))
	}
	if !(ratio <= 3) {
		c.t.Errorf("row %s: %s = %.6g, want %.6g within 3 times %.3g", row["id"], what, got, want, tolerance)
	}
}

func (c *tally) done() {
	c.t.Helper()
	c.t.Logf("%d values, %d outside their tolerance %q; worst %.2f of it (%s)", c.values, c.off, c.deviationHint, c.worst, c.worstWhat)
	if float64(c.off) > 0.05*float64(c.values) {
		c.t.Errorf("%d of %d values outside their tolerance, at most 5 %% may be: %q", c.off, c.values, c.deviationHint)
	}
}

func abs(x float64) float64 { return max(x, -x) }

func format(x float64) string { return strconv.FormatFloat(x, 'g', 6, 64) }

// upright returns a lossless wire along z about the origin, in wavelengths.
func upright(lengthM, radiusM float64) Wire {
	return Wire{From: [3]float64{0, 0, -lengthM / 2}, To: [3]float64{0, 0, lengthM / 2}, DiameterM: 2 * radiusM, Material: antenna.Ideal}
}

// moved returns a wire at another place.
func (w Wire) moved(by vec) Wire {
	w.From, w.To = vec(w.From).plus(by), vec(w.To).plus(by)
	return w
}

// network solves a structure that must have a solution.
func network(t testing.TB, s Structure) *Network {
	t.Helper()
	n, err := s.Solve(testHz, 0)
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// excited returns the radiation of equal voltages at all ports of a structure.
func excited(t testing.TB, s Structure) (*Network, *Radiation) {
	t.Helper()
	n := network(t, s)
	volts := make([]complex128, len(s.Feeds))
	for i := range volts {
		volts[i] = 1
	}
	r, err := n.Excite(volts)
	if err != nil {
		t.Fatal(err)
	}
	return n, r
}

// dipoleImpedanceOhm solves a lossless wire fed at a fraction of its length.
func dipoleImpedanceOhm(t testing.TB, lengthM, radiusM, at float64) complex128 {
	t.Helper()
	return network(t, Structure{Wires: []Wire{upright(lengthM, radiusM)}, Feeds: []Feed{{1, at}}}).TogetherOhm()
}

func TestReferenceDipoles(t *testing.T) {
	c := tally{t: t}
	for _, row := range referenceRows(t, "dipole_impedance.csv") {
		if row["model"] == "emf" {
			continue // the closed forms, which are no rod's
		}
		z := dipoleImpedanceOhm(t, number(t, row, "length_wl"), number(t, row, "radius_wl"), 0.5)
		c.check(row, "R", real(z), number(t, row, "R_ohm"), number(t, row, "tol_R_ohm"))
		c.check(row, "X", imag(z), number(t, row, "X_ohm"), number(t, row, "tol_X_ohm"))
	}
	for _, row := range referenceRows(t, "offset_feed.csv") {
		z := dipoleImpedanceOhm(t, number(t, row, "length_wl"), number(t, row, "radius_wl"), number(t, row, "feed_fraction"))
		c.check(row, "offset R", real(z), number(t, row, "R_ohm"), number(t, row, "tol_R_ohm"))
		c.check(row, "offset X", imag(z), number(t, row, "X_ohm"), number(t, row, "tol_X_ohm"))
	}
	c.done()
}
