package antenna

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"
)

// A FileError is what is wrong with a pattern file, and in which line (1-based; 0 for the file as
// a whole).
type FileError struct {
	Line    int
	Problem string
}

func (e *FileError) Error() string {
	if e.Line == 0 {
		return e.Problem
	}
	return fmt.Sprintf("line %d: %s", e.Line, e.Problem)
}

func fileErrorf(line int, format string, args ...any) error {
	return &FileError{line, fmt.Sprintf(format, args...)}
}

// Limits of pattern files: half a degree in both angles has 260 000 rows. The largest gap between
// neighbouring angles is as far as interpolation between them means anything.
const (
	maxFileBytes  = 32 << 20
	maxGapDeg     = 30
	lowestFileDBi = -100
	highestDBi    = 40
)

// A row is one line of figures of a pattern file.
type row struct {
	line   int
	values []float64
}

// readRows reads a CSV file whose header is one of those given, as comma-separated names, and
// returns which one and the rows. Spaces, empty lines and lines that begin with # are ignored.
func readRows(r io.Reader, headers ...string) (header string, rows []row, err error) {
	content, err := io.ReadAll(io.LimitReader(r, maxFileBytes+1))
	if err != nil {
		return "", nil, err
	}
	if len(content) > maxFileBytes {
		return "", nil, fileErrorf(0, "the file is larger than %d MiB: thin it to steps of half a degree or more", maxFileBytes>>20)
	}
	reader := csv.NewReader(bytes.NewReader(bytes.TrimPrefix(content, []byte("\ufeff"))))
	reader.Comment = '#'
	reader.FieldsPerRecord = -1
	reader.ReuseRecord = true
	for {
		fields, err := reader.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if bad := new(csv.ParseError); errors.As(err, &bad) {
			return "", nil, fileErrorf(bad.Line, "%v", bad.Err)
		}
		line, _ := reader.FieldPos(0)
		for i := range fields {
			fields[i] = strings.TrimSpace(fields[i])
		}
		if header == "" {
			header = strings.Join(fields, ",")
			if !slices.Contains(headers, header) {
				return "", nil, fileErrorf(line, "header %q is not known: it must be %s", header, strings.Join(headers, " or "))
			}
			continue
		}
		values, err := numbers(line, fields, 1+strings.Count(header, ","))
		if err != nil {
			return "", nil, err
		}
		rows = append(rows, row{line, values})
	}
	if len(rows) == 0 {
		return "", nil, fileErrorf(0, "no rows: the file needs the header %s and figures under it", strings.Join(headers, " or "))
	}
	return header, rows, nil
}

func numbers(line int, fields []string, want int) ([]float64, error) {
	if len(fields) != want {
		return nil, fileErrorf(line, "%d values where the header has %d", len(fields), want)
	}
	values := make([]float64, want)
	for i, field := range fields {
		value, err := strconv.ParseFloat(field, 64)
		if err != nil || math.IsNaN(value) || math.IsInf(value, 0) {
			return nil, fileErrorf(line, "%q is not a number: write decimals with a dot, and %d for a null", field, lowestFileDBi)
		}
		values[i] = value
	}
	return values, nil
}

// circleDeg returns an angle as one within [0, 360), rounded so that the same angle is the same
// number whichever way it was written.
func circleDeg(deg float64) float64 {
	turned := math.Mod(math.Round(deg*1e6)/1e6+360, 360)
	return math.Round(turned*1e6) / 1e6
}

// checkGaps returns an error where neighbouring ascending angles are too far apart.
func checkGaps(what string, deg []float64) error {
	for i := 1; i < len(deg); i++ {
		if deg[i]-deg[i-1] > maxGapDeg {
			return fileErrorf(0, "no rows between %s %g and %g: steps of at most %d degrees are needed", what, deg[i-1], deg[i], maxGapDeg)
		}
	}
	return nil
}

// between returns i and the fraction such that x lies at that fraction from xs[i] to xs[i+1], for
// ascending xs of at least two values; beyond the ends it stays at the end.
func between(xs []float64, x float64) (i int, fraction float64) {
	i, _ = slices.BinarySearch(xs, x)
	i = min(max(i-1, 0), len(xs)-2)
	fraction = (x - xs[i]) / (xs[i+1] - xs[i])
	return i, min(max(fraction, 0), 1)
}
