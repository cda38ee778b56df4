package raster

import (
	"errors"
	"fmt"
	"math"
	"os"
	"path/filepath"

	"github.com/lukeroth/gdal"

	"fellreach/terrain"
)

// A CellType is the number type of the cells of a raster that is written.
type CellType int

// The cell types of [WriteGeoTIFF].
const (
	Uint8 CellType = iota
	Int16
	Float32
)

// A GeoTIFF is a grid with its place on Earth and how its cells are stored.
type GeoTIFF struct {
	Grid         *terrain.Grid // values in Unit; NaN is written as NoData
	GeoTransform [6]float64    // as in [Info]: top left corner and cell vectors, in GDAL's order
	EPSG         int           // code of the coordinate reference system

	Type     CellType
	Scale    float64  // value = stored*Scale; 0 means 1
	NoData   *float64 // the stored number that means void; nil for none, then a void is an error
	Unit     string   // "m", "dB"; may be empty
	About    string   // one line on what the raster holds; may be empty
	Compress bool     // deflate, in tiles; else uncompressed rows
}

// WriteGeoTIFF writes a raster of one band. The file appears under its name when it is complete,
// by renaming a temporary one in the same folder; equal input gives equal bytes. Values that the
// cell type cannot hold, and voids without a nodata number, are errors that name the cell.
func WriteGeoTIFF(path string, raster GeoTIFF) (err error) {
	stored, err := raster.stored()
	if err != nil {
		return fmt.Errorf("%s: %w", path, err)
	}
	temporary, err := temporaryName(path)
	if err != nil {
		return fmt.Errorf("writing %s: %w", path, err)
	}
	defer func() {
		if err != nil {
			os.Remove(temporary)
		}
	}()
	if err := call(func() error { return raster.create(temporary, stored) }); err != nil {
		return fmt.Errorf("writing %s: %w", path, err)
	}
	return os.Rename(temporary, path)
}

// temporaryName makes an empty file beside the final one; GDAL replaces it.
func temporaryName(path string) (string, error) {
	f, err := os.CreateTemp(filepath.Dir(path), "."+filepath.Base(path)+".*")
	if err != nil {
		return "", err
	}
	return f.Name(), errors.Join(f.Chmod(0o644), f.Close())
}

// stored turns the grid into the numbers of the cell type.
func (t GeoTIFF) stored() (any, error) {
	switch t.Type {
	case Uint8:
		return convert[uint8](t, 0, math.MaxUint8)
	case Int16:
		return convert[int16](t, math.MinInt16, math.MaxInt16)
	case Float32:
		return convert[float32](t, -math.MaxFloat32, math.MaxFloat32)
	}
	panic(fmt.Sprintf("raster: cell type %d", t.Type))
}

// convert scales and rounds the cells to a number type whose range is lowest to highest.
func convert[T uint8 | int16 | float32](t GeoTIFF, lowest, highest float64) ([]T, error) {
	scale := t.Scale
	if scale == 0 {
		scale = 1
	}
	if n := t.NoData; n != nil && t.Type != Float32 && !(*n >= lowest && *n <= highest && *n == math.Trunc(*n)) {
		return nil, fmt.Errorf("its nodata number %g is none that its cell type holds: a whole one from %g to %g", *n, lowest, highest)
	}
	stored := make([]T, len(t.Grid.Cells))
	for i, value := range t.Grid.Cells {
		number := float64(value) / scale
		if t.Type != Float32 {
			number = math.Round(number)
		}
		switch void := math.IsNaN(number); {
		case void && t.NoData == nil:
			return nil, fmt.Errorf("column %d, row %d is void, but no nodata number is stated", i%t.Grid.Cols, i/t.Grid.Cols)
		case void:
			number = *t.NoData
		case !(number >= lowest && number <= highest) || t.NoData != nil && number == *t.NoData:
			return nil, fmt.Errorf("column %d, row %d holds %g, which its cell type and nodata number cannot express", i%t.Grid.Cols, i/t.Grid.Cols, value)
		}
		stored[i] = T(number)
	}
	return stored, nil
}

// create writes the file under its temporary name.
func (t GeoTIFF) create(path string, stored any) error {
	driver, err := gdal.GetDriverByName("GTiff")
	if err != nil {
		return err
	}
	options := []string{"COMPRESS=NONE", "BIGTIFF=IF_SAFER"}
	if t.Compress {
		options = []string{"COMPRESS=DEFLATE", "TILED=YES", "BIGTIFF=IF_SAFER"}
	}
	kind := [...]gdal.DataType{gdal.Byte, gdal.Int16, gdal.Float32}[t.Type]
	dataset := driver.Create(path, t.Grid.Cols, t.Grid.Rows, 1, kind, options)
	if dataset == (gdal.Dataset{}) {
		return gdal.ErrFailure
	}
	err = errors.Join(t.describe(dataset), dataset.RasterBand(1).IO(gdal.Write, 0, 0, t.Grid.Cols, t.Grid.Rows, stored, t.Grid.Cols, t.Grid.Rows, 0, 0))
	dataset.Close()
	if kind := gdal.CPLGetLastErrorType(); err == nil && (kind == gdal.CE_Failure || kind == gdal.CE_Fatal) {
		err = gdal.ErrFailure // closing writes too, and has no status of its own
	}
	return err
}

// describe writes all that is not cells.
func (t GeoTIFF) describe(dataset gdal.Dataset) error {
	system := gdal.CreateSpatialReference("")
	defer system.Destroy()
	if err := system.FromEPSG(t.EPSG); err != nil {
		return fmt.Errorf("EPSG:%d is no coordinate reference system that is known: %w", t.EPSG, err)
	}
	text, err := system.ToWKT()
	band := dataset.RasterBand(1)
	errs := []error{err, dataset.SetProjection(text), dataset.SetGeoTransform(t.GeoTransform)}
	if t.NoData != nil {
		errs = append(errs, band.SetNoDataValue(*t.NoData))
	}
	if t.Scale != 0 {
		errs = append(errs, band.SetScale(t.Scale))
	}
	if t.Unit != "" {
		errs = append(errs, band.SetUnitType(t.Unit))
	}
	if t.About != "" {
		errs = append(errs, dataset.SetMetadataItem("TIFFTAG_IMAGEDESCRIPTION", t.About, ""))
	}
	return errors.Join(errs...)
}
