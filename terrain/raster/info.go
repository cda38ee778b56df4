package raster

import "github.com/paulmach/orb"

// A Box holds the bounds of an area: west, south, east, north.
type Box [4]float64

// box is a bound as a Box.
func box(b orb.Bound) Box { return Box{b.Left(), b.Bottom(), b.Right(), b.Top()} }

// Info is what a raster says of itself.
type Info struct {
	Path         string     `json:"path"`
	Driver       string     `json:"driver"` // GDAL's name of the format
	Cols         int        `json:"cols"`
	Rows         int        `json:"rows"`
	Bands        int        `json:"bands"` // the first is read
	CRS          string     `json:"crs"`
	EPSG         int        `json:"epsg,omitempty"`   // 0 where the file states no code
	GeoTransform [6]float64 `json:"geotransform"`     // in GDAL's order
	Extent       Box        `json:"extent"`           // in the reference system
	LonLat       Box        `json:"lon_lat"`          // degrees; beyond 180 where it crosses the date line
	CellXM       float64    `json:"cell_x_m"`         // sides of the middle cell on the ellipsoid
	CellYM       float64    `json:"cell_y_m"`         //
	Type         string     `json:"type"`             // of the stored numbers
	Unit         string     `json:"unit"`             // as the band states it
	UnitM        float64    `json:"unit_m,omitempty"` // size of the unit that heights are read in
	Scale        float64    `json:"scale"`            // height = (stored*Scale + Offset) units
	Offset       float64    `json:"offset"`
	NoData       *float64   `json:"nodata"` // the stored number that means void, nil for none
	Datum        string     `json:"vertical_datum"`
	Summary      *Summary   `json:"summary,omitempty"` // what the cells hold, from [Inspect] alone
	Warnings     []string   `json:"warnings"`

	wkt                  string
	blockCols, blockRows int // how the file stores its cells
}

// readCRS fills in what the file's reference system says and returns its horizontal part.
func (in *Info) readCRS() wkt {
	system := parseWKT(in.wkt)
	horizontal, vertical := system.split()
	in.CRS, in.EPSG = horizontal.name(), horizontal.epsg()
	switch {
	case vertical != nil:
		in.Datum = "the file states " + vertical.name()
	case horizontal.hasHeight():
		in.Datum = "the file states ellipsoidal heights"
		// The geoid's height is from memory.
		in.Warnings = append(in.Warnings, "the reference system has ellipsoidal heights, which differ from heights above sea level by the geoid's height, up to 107 m")
	default:
		in.Datum = "the file states no vertical datum; heights are taken as above mean sea level"
	}
	return horizontal
}
