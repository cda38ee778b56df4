package raster

import (
	"strings"
	"testing"
)

// A compound system as GDAL 3.6 writes EPSG:26912+6360, shortened.
const compound = `COMPD_CS["NAD83 / UTM zone 12N + NAVD88 height (ftUS)",PROJCS["NAD83 / UTM zone 12N",GEOGCS["NAD83",DATUM["North_American_Datum_1983",SPHEROID["GRS 1980",6378137,298.257222101]],UNIT["degree",0.0174532925199433]],UNIT["metre",1],AUTHORITY["EPSG","26912"]],VERT_CS["NAVD88 height (ftUS)",VERT_DATUM["North American Vertical Datum 1988",2005],UNIT["US survey foot",0.304800609601219],AXIS["Gravity-related height",UP],AUTHORITY["EPSG","6360"]]]`

// The newer form, as GDAL writes systems of three axes.
const threeAxes = `GEOGCRS["WGS ""84""",
    DATUM["World Geodetic System 1984",ELLIPSOID["WGS 84",6378137,298.257223563,LENGTHUNIT["metre",1]]],
    CS[ellipsoidal,3],
        AXIS["geodetic latitude (Lat)",north,ORDER[1],ANGLEUNIT["degree",0.0174532925199433]],
        AXIS["ellipsoidal height (h)",up,ORDER[3],LENGTHUNIT["metre",1]],
    ID["EPSG",4979]]`

func TestParseWKT(t *testing.T) {
	horizontal, vertical := parseWKT(compound).split()
	if horizontal.name() != "NAD83 / UTM zone 12N" || horizontal.epsg() != 26912 || horizontal.isGeographic() {
		t.Errorf("horizontal %q, EPSG:%d", horizontal.name(), horizontal.epsg())
	}
	if !strings.HasPrefix(horizontal.text, "PROJCS[") || !strings.HasSuffix(horizontal.text, `AUTHORITY["EPSG","26912"]]`) {
		t.Errorf("its text is %q", horizontal.text)
	}
	if vertical == nil || vertical.name() != "NAVD88 height (ftUS)" || vertical.unitM() != 0.304800609601219 {
		t.Errorf("vertical %+v", vertical)
	}
	three := parseWKT(threeAxes)
	if three.name() != `WGS "84"` || three.epsg() != 4979 || !three.hasHeight() || !three.isGeographic() || three.text != threeAxes {
		t.Errorf("%q, EPSG:%d, three axes %v", three.name(), three.epsg(), three.hasHeight())
	}
	newVertical := parseWKT(`VERTCRS["h",VDATUM["d"],CS[vertical,1],AXIS["height",up,LENGTHUNIT["foot",0.3048]]]`)
	if newVertical.unitM() != 0.3048 {
		t.Errorf("unit of the newer form is %g m", newVertical.unitM())
	}
}

func TestParseWKTOfNothing(t *testing.T) {
	for _, text := range []string{"", "PROJCS", "[", "]", `A["`, `A["x`, `A[B[C[`, `A["x",,"y"]`, `A]]]`, "A[1,2"} {
		w := parseWKT(text)
		w.split()
		if w.epsg() != 0 || w.unitM() != 0 || w.hasHeight() {
			t.Errorf("%q gives %+v", text, w)
		}
	}
}

// Any text is taken without a panic, and a node's text is a part of it.
func FuzzParseWKT(f *testing.F) {
	f.Add(compound)
	f.Add(threeAxes)
	f.Add(`A["x""y",B[1],]`)
	f.Fuzz(func(t *testing.T, text string) {
		w := parseWKT(text)
		if !strings.HasPrefix(text, w.text) {
			t.Errorf("node text %q is not the start of %q", w.text, text)
		}
		horizontal, _ := w.split()
		if !strings.Contains(text, horizontal.text) {
			t.Errorf("horizontal text %q is not in %q", horizontal.text, text)
		}
	})
}
