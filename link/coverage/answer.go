package coverage

import "io"

// Report returns what cover.json says of a site, from its map with the margin in it.
func (s *Site) Report(m *Map) SiteReport {
	return s.report(m, measure(classify(m.MarginDB, s.BandsDB), m.Frame, s.BandsDB))
}

// WriteBands writes the bands of a site's map as the file bands-SITE.geojson holds them.
func (s *Site) WriteBands(w io.Writer, m *Map) error {
	classes := classify(m.MarginDB, s.BandsDB)
	return writeBands(w, s.Name, m.Frame, patchesOf(classes, m.Frame.Cols, m.Frame.Rows, leastPatch), measure(classes, m.Frame, s.BandsDB), 0)
}
