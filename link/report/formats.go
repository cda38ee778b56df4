package report

import (
	"io"

	"fellreach/link"
	"fellreach/link/plan"
)

// The formats of links and sections, the one for people first.
var (
	LinksFormats   = []string{"table", "json", "csv", "geojson"}
	SectionFormats = []string{"table", "json", "csv", "geojson", "svg"}
)

// WriteLinks writes the links of a plan in one of [LinksFormats].
func WriteLinks(w io.Writer, r *plan.Result, format string) error {
	switch format {
	case "json":
		return LinksJSON(w, r)
	case "csv":
		return LinksCSV(w, r)
	case "geojson":
		return LinksGeoJSON(w, r)
	}
	return LinksTable(w, r)
}

// WriteSection writes a section in one of [SectionFormats].
func WriteSection(w io.Writer, s *link.Section, format string) error {
	switch format {
	case "json":
		return SectionJSON(w, s)
	case "csv":
		return SectionCSV(w, s)
	case "geojson":
		return SectionGeoJSON(w, s)
	case "svg":
		return SectionSVG(w, s)
	}
	return SectionTable(w, s)
}
