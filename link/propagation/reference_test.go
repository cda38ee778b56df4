package propagation

import (
	"encoding/csv"
	"errors"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"testing"

	"fellreach/terrain"
)

// referencePath returns a file of the published check data, which lies beside the repository and
// is not part of it. Without it the test is skipped.
func referencePath(t *testing.T, elem ...string) string {
	t.Helper()
	dir, err := os.Getwd()
	if err != nil {
		t.Fatal(err)
	}
	for {
		if _, err := os.Stat(filepath.Join(dir, "go.mod")); err == nil {
			break
		}
		parent := filepath.Dir(dir)
		if parent == dir {
			t.Fatal("no go.mod above the package")
		}
		dir = parent
	}
	path := filepath.Join(append([]string{dir, "..", "shared", "reference"}, elem...)...)
	if _, err := os.Stat(path); errors.Is(err, fs.ErrNotExist) {
		t.Skipf("published check data not present: %s", filepath.Join(elem...))
	}
	return path
}

// A row is one line of a table of check data.
type row struct {
	t     *testing.T
	names []string
	cells []string
}

func (r row) text(column string) string {
	r.t.Helper()
	i := slices.Index(r.names, column)
	if i < 0 {
		r.t.Fatalf("the table has no column %q: %q", column, r.names)
	}
	return r.cells[i]
}

// num returns a number, NaN for an empty cell.
func (r row) num(column string) float64 {
	r.t.Helper()
	s := r.text(column)
	if s == "" {
		return math.NaN()
	}
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		r.t.Fatalf("column %s: %v", column, err)
	}
	return v
}

func readTable(t *testing.T, elem ...string) []row {
	t.Helper()
	f, err := os.Open(referencePath(t, elem...))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	lines, err := csv.NewReader(f).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	rows := make([]row, 0, len(lines))
	for _, l := range lines[1:] {
		rows = append(rows, row{t, lines[0], l})
	}
	return rows
}

func readProfile(t *testing.T, elem ...string) terrain.Profile {
	t.Helper()
	f, err := os.Open(referencePath(t, elem...))
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	p, err := terrain.ReadProfile(f, elem[len(elem)-1])
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// A deviation keeps the largest difference seen in one column.
type deviation map[string]float64

// check compares a value with the published one and reports a difference beyond tol. An absent
// published value (NaN) is passed over.
func (d deviation) check(t *testing.T, name, column string, got, want, tol float64) {
	t.Helper()
	if math.IsNaN(want) {
		return
	}
	diff := math.Abs(got - want)
	d[column] = max(d[column], diff)
	if !(diff <= tol) {
		t.Errorf("%s: %s = %.9g, want %.9g (off by %.3g, allowed %g)", name, column, got, want, diff, tol)
	}
}

// log prints the largest differences in the order of the columns' names.
func (d deviation) log(t *testing.T) {
	t.Helper()
	columns := make([]string, 0, len(d))
	for c := range d {
		columns = append(columns, c)
	}
	slices.Sort(columns)
	for _, c := range columns {
		t.Logf("largest difference in %s: %.3g", c, d[c])
	}
}
