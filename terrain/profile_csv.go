package terrain

import (
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// Limits of a profile read from a table.
const (
	maxProfilePoints = 100_000
	maxProfileBytes  = 16 << 20
)

// ReadProfile reads a profile from comma-separated values under a header that names the columns:
// d_km and h_m (distance and bare ground above sea level) and, where wanted, R_m (height of what
// stands on the ground, else 0) and zone (1 sea, 3 coastal land, 4 inland, else 4), in any order.
// The other columns of a section (lon, lat, ray_m, bulge_m, fresnel1_m) may stand beside them.
// Distances start at 0 and increase. There are at least 2 points and at most 100,000, in at most
// 16 MB.
//
// Errors start with name and the line they were found on. The profile has no Points: a table has
// no place on Earth.
func ReadProfile(r io.Reader, name string) (Profile, error) {
	table := profileTable{name: name, limited: &io.LimitedReader{R: r, N: maxProfileBytes + 1}}
	table.csv = csv.NewReader(table.limited)
	table.csv.TrimLeadingSpace = true
	table.csv.ReuseRecord = true
	return table.read()
}

// A profileTable is a profile on its way in.
type profileTable struct {
	name    string
	limited *io.LimitedReader
	csv     *csv.Reader
	columns []string
	profile Profile
}

func (t *profileTable) read() (Profile, error) {
	if err := t.readHeader(); err != nil {
		return Profile{}, err
	}
	for {
		record, err := t.record()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return Profile{}, err
		}
		if err := t.add(record); err != nil {
			return Profile{}, err
		}
	}
	if n := len(t.profile.DistKm); n < 2 {
		return Profile{}, fmt.Errorf("%s: the profile has %d points, at least 2 are needed", t.name, n)
	}
	return t.profile, nil
}

// readHeader takes the first record as the names of the columns.
func (t *profileTable) readHeader() error {
	header, err := t.record()
	if errors.Is(err, io.EOF) {
		return fmt.Errorf("%s: the file is empty, its first line must name the columns d_km,h_m[,R_m][,zone]", t.name)
	}
	if err != nil {
		return err
	}
	seen := map[string]bool{}
	for i, field := range header {
		column := strings.TrimSpace(field)
		if i == 0 {
			column = strings.TrimPrefix(column, "\ufeff") // spreadsheets write a byte order mark
		}
		switch column {
		case "d_km", "h_m", "R_m", "zone", "lon", "lat", "ray_m", "bulge_m", "fresnel1_m":
		default:
			return t.errorf("unknown column %.40q, the columns are d_km, h_m, R_m and zone", column)
		}
		if seen[column] {
			return t.errorf("column %s stands twice", column)
		}
		seen[column] = true
		t.columns = append(t.columns, column)
	}
	for _, column := range []string{"d_km", "h_m"} {
		if !seen[column] {
			return t.errorf("column %s is missing", column)
		}
	}
	return nil
}

// record returns the next record, io.EOF at the end of the file.
func (t *profileTable) record() ([]string, error) {
	record, err := t.csv.Read()
	if t.limited.N <= 0 {
		return nil, fmt.Errorf("%s: more than %d MB, a profile may have no more", t.name, maxProfileBytes>>20)
	}
	var syntax *csv.ParseError
	switch {
	case errors.As(err, &syntax) && errors.Is(err, csv.ErrFieldCount):
		return nil, fmt.Errorf("%s:%d: %d fields, the header names %d columns", t.name, syntax.Line, len(record), len(t.columns))
	case errors.As(err, &syntax):
		return nil, fmt.Errorf("%s:%d: %w", t.name, syntax.Line, syntax.Err)
	case err != nil && !errors.Is(err, io.EOF):
		return nil, fmt.Errorf("%s: %w", t.name, err)
	}
	return record, err
}

// add appends the point of one record.
func (t *profileTable) add(record []string) error {
	p := &t.profile
	if len(p.DistKm) == maxProfilePoints {
		return t.errorf("more than %d points, a profile may have no more", maxProfilePoints)
	}
	d, h, cover, zone := 0.0, 0.0, 0.0, float64(Inland)
	for i, column := range t.columns {
		v, err := strconv.ParseFloat(strings.TrimSpace(record[i]), 64)
		if err != nil || math.IsNaN(v) || math.IsInf(v, 0) {
			return t.errorf("%s is %.40q, a number is needed", column, record[i])
		}
		switch column {
		case "d_km":
			d = v
		case "h_m":
			h = v
		case "R_m":
			cover = v
		case "zone":
			zone = v
		}
	}
	switch n := len(p.DistKm); {
	case n == 0 && d != 0:
		return t.errorf("the first distance is %g km, it must be 0", d)
	case n > 0 && d <= p.DistKm[n-1]:
		return t.errorf("d_km does not increase: %g km follows %g km", d, p.DistKm[n-1])
	case cover < 0:
		return t.errorf("R_m is %g, a height of cover is not negative", cover)
	case zone != float64(Sea) && zone != float64(Coastal) && zone != float64(Inland):
		return t.errorf("zone is %g, it must be 1 (sea), 3 (coastal land) or 4 (inland)", zone)
	}
	p.DistKm = append(p.DistKm, d)
	p.AslM = append(p.AslM, h)
	p.CoverM = append(p.CoverM, cover)
	p.Zone = append(p.Zone, Zone(zone))
	return nil
}

// errorf returns an error at the line of the last record read.
func (t *profileTable) errorf(format string, args ...any) error {
	line, _ := t.csv.FieldPos(0)
	return fmt.Errorf("%s:%d: %s", t.name, line, fmt.Sprintf(format, args...))
}
