package report

import (
	"fmt"
	"io"
	"math"
	"strings"

	"fellreach/terrain"
	"fellreach/terrain/raster"
)

// TerrainJSON writes what rasters hold.
func TerrainJSON(w io.Writer, files []raster.Info) error {
	return indented(w, struct {
		Files []raster.Info `json:"files"`
	}{files})
}

// TerrainTable writes what rasters hold, for people.
func TerrainTable(w io.Writer, files []raster.Info) error {
	texts := make([]string, len(files))
	for i, f := range files {
		texts[i] = terrainText(f)
	}
	_, err := io.WriteString(w, strings.Join(texts, "\n"))
	return err
}

func terrainText(f raster.Info) string {
	var text strings.Builder
	fmt.Fprintf(&text, "%s (%s, %s, %s)\n", f.Path, f.Driver, counted(f.Bands, "band", "bands"), f.Type)
	row := func(name, format string, args ...any) {
		fmt.Fprintf(&text, "  %-9s "+format+"\n", append([]any{name}, args...)...)
	}
	row("cells", "%d × %d, %s × %s m", f.Cols, f.Rows, decimals(f.CellXM, 1), decimals(f.CellYM, 1))
	row("CRS", "%s", crsName(f))
	row("extent", "%s to %s west to east, %s to %s south to north", trimmed(f.Extent[0]), trimmed(f.Extent[2]), trimmed(f.Extent[1]), trimmed(f.Extent[3]))
	row("lon, lat", "%s to %s, %s to %s", degrees(f.LonLat[0], "E", "W"), degrees(f.LonLat[2], "E", "W"), degrees(f.LonLat[1], "N", "S"), degrees(f.LonLat[3], "N", "S"))
	row("values", "%s", valueWords(f))
	if s := f.Summary; s != nil {
		row("voids", "%d of %d cells (%s %%)", s.Voids, s.Cells, decimals(100*s.VoidShare(), 2))
		row("heights", "%s m at %s to %s m at %s", decimals(s.MinM, 1), terrain.FormatDecimal(s.MinAt), decimals(s.MaxM, 1), terrain.FormatDecimal(s.MaxAt))
	}
	row("datum", "%s", f.Datum)
	for _, warning := range f.Warnings {
		row("warning", "%s", warning)
	}
	return text.String()
}

func crsName(f raster.Info) string {
	if f.EPSG == 0 {
		return f.CRS + " (no EPSG code)"
	}
	return fmt.Sprintf("%s (EPSG:%d)", f.CRS, f.EPSG)
}

func valueWords(f raster.Info) string {
	text := "metres"
	switch {
	case f.Unit != "" && f.UnitM != 1:
		text = fmt.Sprintf("in %s, read as metres by %g", f.Unit, f.UnitM)
	case f.Unit == "":
		text = "no unit stated, taken as metres"
	}
	if f.Scale != 1 || f.Offset != 0 {
		text += fmt.Sprintf("; stored value × %g + %g", f.Scale, f.Offset)
	}
	if f.NoData == nil {
		return text + "; no nodata value declared"
	}
	return text + fmt.Sprintf("; nodata %g", *f.NoData)
}

// trimmed writes an edge in the unit of its CRS.
func trimmed(x float64) string { return fmt.Sprintf("%.9g", x) }

// degrees writes a longitude or a latitude; longitudes may count on beyond 180.
func degrees(deg float64, positive, negative string) string {
	if math.Abs(deg) > 180 {
		deg = math.Remainder(deg, 360)
	}
	if deg < 0 {
		return decimals(-deg, 4) + " " + negative
	}
	return decimals(deg, 4) + " " + positive
}
