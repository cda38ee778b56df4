package antenna

import (
	"encoding/csv"
	"os"
	"path/filepath"
	"strconv"
	"testing"
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
