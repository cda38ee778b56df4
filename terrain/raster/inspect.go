package raster

// Info is what a raster says of itself.
type Info struct {
	Path         string     `json:"path"`
	Driver       string     `json:"driver"` // GDAL's name of the format
	Cols         int        `json:"cols"`
	Rows         int        `json:"rows"`
	Bands        int        `json:"bands"` // the first is read
	CRS          string     `json:"crs"`
	EPSG         int        `json:"epsg,omitempty"` // 0 where the file states no code
	GeoTransform [6]float64 `json:"geotransform"`   // in GDAL's order
	CellXM       float64    `json:"cell_x_m"`       // sides of the middle cell on the ellipsoid
	CellYM       float64    `json:"cell_y_m"`
	Type         string     `json:"type"`             // of the stored numbers
	Unit         string     `json:"unit"`             // as the band states it
	UnitM        float64    `json:"unit_m,omitempty"` // the size of the unit heights are read in
	Scale        float64    `json:"scale"`            // height = (stored*Scale + Offset) in units
	Offset       float64    `json:"offset"`
	NoData       *float64   `json:"nodata"` // the stored number that means void, nil for none
	Datum        string     `json:"vertical_datum"`

	wkt string
}

// readCRS fills in what the file's reference system says and returns its horizontal part.
func (in *Info) readCRS() wkt {
	system := parseWKT(in.wkt)
	horizontal, vertical := system.split()
	in.CRS, in.EPSG = horizontal.name(), horizontal.epsg()
	switch {
	case vertical != nil:
		in.Datum = "the file states heights of " + vertical.name()
	case system.hasHeight():
		in.Datum = "the file states ellipsoidal heights"
	default:
		in.Datum = "the file states no vertical datum; heights are taken as above mean sea level"
	}
	return horizontal
}
