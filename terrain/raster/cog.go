package raster

import (
	"fmt"
	"math"
	"os"

	"github.com/lukeroth/gdal"
)

// A COG is a map that is written as a cloud-optimised GeoTIFF: single-precision cells in compressed
// tiles, with overviews.
type COG struct {
	Frame *Frame
	Cells []float32 // row by row; NaN is written as the nodata value
	Unit  string    // "dB"; may be empty
	About string    // one line on what the map holds
	Small bool      // deflate for a small file that every reader takes; else zstd, in half the time
}

// cogNoData is the nodata value of a [COG]: no level or loss.
const cogNoData = -9999

// WriteCOG writes a map. The file appears under its name when it is complete, by renaming a
// temporary one in the same folder; equal input gives equal bytes.
func WriteCOG(path string, c COG) (err error) {
	if len(c.Cells) != c.Frame.Cols*c.Frame.Rows {
		panic(fmt.Sprintf("raster: %d cells for a frame of %d x %d", len(c.Cells), c.Frame.Cols, c.Frame.Rows))
	}
	temporary, err := temporaryName(path)
	if err != nil {
		return fmt.Errorf("writing %s: %w", path, err)
	}
	defer func() {
		if err != nil {
			os.Remove(temporary)
			err = fmt.Errorf("writing %s: %w", path, err)
		}
	}()
	defer keepFewBlocks()()
	if err := call(func() error { return c.create(temporary) }); err != nil {
		return err
	}
	if err := os.Chmod(temporary, 0o644); err != nil {
		return err
	}
	return os.Rename(temporary, path)
}

func (c COG) create(path string) error {
	source, err := c.inMemory()
	if err != nil {
		return err
	}
	defer source.Close()
	driver, err := gdal.GetDriverByName("COG")
	if err != nil {
		return err
	}
	options := []string{"COMPRESS=ZSTD", "LEVEL=1", "PREDICTOR=YES", "OVERVIEW_RESAMPLING=NEAREST", "NUM_THREADS=ALL_CPUS", "BIGTIFF=IF_SAFER"}
	if c.Small {
		options[0], options[1] = "COMPRESS=DEFLATE", "LEVEL=9"
	}
	dataset := driver.CreateCopy(path, source, 1, options, nil, nil)
	if dataset == (gdal.Dataset{}) {
		return gdal.ErrFailure
	}
	dataset.Close()
	if kind := gdal.CPLGetLastErrorType(); kind == gdal.CE_Failure || kind == gdal.CE_Fatal {
		return gdal.ErrFailure // closing writes too, and has no status of its own
	}
	return nil
}

// inMemory hands the map to GDAL.
func (c COG) inMemory() (gdal.Dataset, error) {
	driver, err := gdal.GetDriverByName("MEM")
	if err != nil {
		return gdal.Dataset{}, err
	}
	f := c.Frame
	dataset := driver.Create("", f.Cols, f.Rows, 1, gdal.Float32, nil)
	if dataset == (gdal.Dataset{}) {
		return dataset, gdal.ErrFailure
	}
	if err := c.fill(dataset); err != nil {
		dataset.Close()
		return gdal.Dataset{}, err
	}
	return dataset, nil
}

func (c COG) fill(dataset gdal.Dataset) error {
	f, band := c.Frame, dataset.RasterBand(1)
	row := make([]float32, f.Cols)
	for y := range f.Rows {
		copy(row, c.Cells[y*f.Cols:])
		for x, v := range row {
			if math.IsNaN(float64(v)) {
				row[x] = cogNoData
			}
		}
		if err := band.IO(gdal.Write, 0, y, f.Cols, 1, row, f.Cols, 1, 0, 0); err != nil {
			return err
		}
	}
	for _, set := range []func() error{
		func() error { return dataset.SetProjection(f.WKT) },
		func() error { return dataset.SetGeoTransform(f.GeoTransform) },
		func() error { return band.SetNoDataValue(cogNoData) },
		func() error { return band.SetUnitType(c.Unit) },
		func() error { return dataset.SetMetadataItem("TIFFTAG_IMAGEDESCRIPTION", c.About, "") },
	} {
		if err := set(); err != nil {
			return err
		}
	}
	return nil
}

// ReadCOG reads the cells of a map back, NaN where it holds its nodata value. The file must have been
// written for the frame.
func ReadCOG(path string, f *Frame) ([]float32, error) {
	dataset, err := openDataset(path)
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	defer dataset.Close()
	if dataset.RasterXSize() != f.Cols || dataset.RasterYSize() != f.Rows {
		return nil, fmt.Errorf("%s has %d x %d cells, %d x %d are expected", path, dataset.RasterXSize(), dataset.RasterYSize(), f.Cols, f.Rows)
	}
	cells := make([]float32, f.Cols*f.Rows)
	err = call(func() error {
		return dataset.RasterBand(1).IO(gdal.Read, 0, 0, f.Cols, f.Rows, cells, f.Cols, f.Rows, 0, 0)
	})
	if err != nil {
		return nil, fmt.Errorf("%s: %w", path, err)
	}
	for i, v := range cells {
		if v == cogNoData {
			cells[i] = float32(math.NaN())
		}
	}
	return cells, nil
}
