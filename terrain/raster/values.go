package raster

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"

	"github.com/lukeroth/gdal"

	"fellreach/terrain"
)

// A valueRule says how the numbers stored in a band become heights in metres, or classes.
type valueRule struct {
	single          bool // stored in single precision, so nodata is compared in it
	whole           bool // classes: whole numbers that Grid holds exactly
	noData          float64
	hasNoData       bool
	masked          bool    // a mask band says which cells hold something
	scaleM, offsetM float64 // height = stored*scaleM + offsetM
}

// readRule reads the rule from band 1 and tells it in info too.
func readRule(dataset gdal.Dataset, info *Info, purpose use) (valueRule, error) {
	band := dataset.RasterBand(1)
	kind := band.RasterDataType()
	info.Type = kind.Name()
	info.blockCols, info.blockRows = band.BlockSize()
	if err := checkType(band, kind, purpose); err != nil {
		return valueRule{}, err
	}
	r := valueRule{single: kind == gdal.Float32, whole: purpose == forCover, scaleM: 1}
	if r.noData, r.hasNoData = band.NoDataValue(); r.hasNoData {
		info.NoData = &r.noData
	}
	const allValid, perDataset = 1, 2 // GDAL's GMF_ flags
	flags := band.GetMaskFlags()
	r.masked = flags&perDataset != 0 && flags&allValid == 0
	info.Scale, info.Offset = 1, 0
	if purpose == forCover {
		return r, nil
	}
	return r, r.readScale(band, info)
}

// checkType refuses bands whose numbers can be no heights, or no classes.
func checkType(band gdal.RasterBand, kind gdal.DataType, purpose use) error {
	whole := []gdal.DataType{gdal.Byte, gdal.Int16, gdal.UInt16, gdal.Int32, gdal.UInt32}
	switch {
	case purpose == forCover && !slices.Contains(whole, kind):
		return fmt.Errorf("its cells are %s, but land-cover classes are whole numbers: convert it, for instance with gdal_translate -ot Byte", kind.Name())
	case !slices.Contains(append(whole, gdal.Float32, gdal.Float64), kind):
		return fmt.Errorf("its cells are %s, which are no heights", kind.Name())
	case band.MetadataItem("PIXELTYPE", "IMAGE_STRUCTURE") == "SIGNEDBYTE":
		return errors.New("its cells are signed bytes, which are not supported: convert it, for instance with gdal_translate -ot Int16")
	}
	if colour := band.ColorInterp(); purpose == forElevation && colour != gdal.CI_Undefined && colour != gdal.CI_GrayIndex {
		return fmt.Errorf("its first band is the colour %s of a picture, not heights", colour.Name())
	}
	return nil
}

// readScale reads scale, offset and unit of heights. The band's own unit goes before that of
// the vertical reference system; a file that states neither is in metres.
func (r *valueRule) readScale(band gdal.RasterBand, info *Info) error {
	if scale, stated := band.GetScale(); stated {
		info.Scale = scale
	}
	if offset, stated := band.GetOffset(); stated {
		info.Offset = offset
	}
	if s, o := info.Scale, info.Offset; !(math.Abs(s) > 0) || math.IsInf(s, 0) || math.IsNaN(o) || math.IsInf(o, 0) {
		return fmt.Errorf("its scale %g and offset %g give no heights", s, o)
	}
	info.Unit = band.GetUnitType()
	unitM, err := unitSizeM(info.Unit)
	if err != nil {
		return err
	}
	if _, vertical := parseWKT(info.wkt).split(); info.Unit == "" && vertical != nil {
		if size := vertical.unitM(); size > 0 {
			unitM = size
		}
	}
	info.UnitM = unitM
	r.scaleM, r.offsetM = info.Scale*unitM, info.Offset*unitM
	return nil
}

// unitSizeM is the size of a unit of height in metres, 1 where none is named.
func unitSizeM(unit string) (float64, error) {
	const footM, surveyFootM = 0.3048, 1200.0 / 3937 // exact, by their definitions
	name := strings.NewReplacer("_", " ", "-", " ").Replace(strings.ToLower(strings.TrimSpace(unit)))
	switch name {
	case "", "m", "metre", "metres", "meter", "meters":
		return 1, nil
	case "km", "kilometre", "kilometres", "kilometer", "kilometers":
		return 1000, nil
	case "dm", "decimetre", "decimetres", "decimeter", "decimeters":
		return 0.1, nil
	case "cm", "centimetre", "centimetres", "centimeter", "centimeters":
		return 0.01, nil
	case "mm", "millimetre", "millimetres", "millimeter", "millimeters":
		return 0.001, nil
	case "ft", "foot", "feet", "international foot", "international feet":
		return footM, nil
	case "us survey foot", "us survey feet", "us foot", "us feet", "us ft", "ftus", "foot us", "survey foot", "survey feet":
		return surveyFootM, nil
	}
	return 0, fmt.Errorf("its heights are in %q, a unit that is not known: metres, feet, US survey feet, km, dm, cm and mm are; set it, for instance with gdal_edit.py -units m", unit)
}

// read fills the grid from a window of the band.
func (r valueRule) read(band gdal.RasterBand, col, row int, grid *terrain.Grid) error {
	stored := make([]float64, len(grid.Cells))
	if err := band.IO(gdal.Read, col, row, grid.Cols, grid.Rows, stored, grid.Cols, grid.Rows, 0, 0); err != nil {
		return err
	}
	if r.masked {
		if err := applyMask(band, col, row, grid, stored); err != nil {
			return err
		}
	}
	for i, v := range stored {
		if r.isVoid(v) {
			continue // a new grid is void
		}
		grid.Cells[i] = float32(v*r.scaleM + r.offsetM)
		if r.whole && float64(grid.Cells[i]) != v {
			return fmt.Errorf("class %.0f is over %d, the greatest that is supported", v, 1<<24)
		}
	}
	return nil
}

// isVoid says whether a stored number stands for no value.
func (r valueRule) isVoid(stored float64) bool {
	if math.IsNaN(stored) || math.IsInf(stored, 0) {
		return true
	}
	if r.single {
		return r.hasNoData && float32(stored) == float32(r.noData)
	}
	return r.hasNoData && stored == r.noData
}

// applyMask makes the cells void that the band's mask leaves out.
func applyMask(band gdal.RasterBand, col, row int, grid *terrain.Grid, stored []float64) error {
	mask := make([]uint8, len(stored))
	if err := band.GetMaskBand().IO(gdal.Read, col, row, grid.Cols, grid.Rows, mask, grid.Cols, grid.Rows, 0, 0); err != nil {
		return err
	}
	for i, m := range mask {
		if m == 0 {
			stored[i] = math.NaN()
		}
	}
	return nil
}
