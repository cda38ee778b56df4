package raster

import (
	"errors"
	"fmt"
	"io/fs"
	"math"
	"os"
	"strings"

	"github.com/lukeroth/gdal"
	"github.com/paulmach/orb"

	"fellreach/terrain"
)

// A file is one open raster: its place on Earth and how its values are to be read.
type file struct {
	datasets *pool[gdal.Dataset]
	info     Info
	toCell   affine // from the reference system to cell-centre coordinates
	crs      *transform
	wrapsDeg float64 // longitude of the middle where the system counts in degrees, else NaN
	values   valueRule
}

// A use is what a raster is opened for.
type use string

const (
	forElevation  use = "elevation raster"
	forCover      use = "cover raster"
	forInspection use = "raster" // heights, but a picture is let through
)

// openFile opens a raster and reads all but its cells.
func openFile(path string, purpose use) (*file, error) {
	f := &file{
		datasets: newPool(func() (gdal.Dataset, error) { return openDataset(path) }),
		info:     Info{Path: path, Warnings: []string{}},
	}
	err := f.with(func(dataset gdal.Dataset) error {
		return f.describe(dataset, purpose)
	})
	if err == nil {
		err = f.locate()
	}
	if err != nil {
		f.close()
		return nil, fmt.Errorf("%s %s: %w", purpose, path, err)
	}
	return f, nil
}

// with lends an open data set of the file.
func (f *file) with(use func(gdal.Dataset) error) error {
	return f.datasets.with(func(dataset gdal.Dataset) error {
		return call(func() error { return use(dataset) })
	})
}

// close closes the file. Nobody may be reading it any more.
func (f *file) close() { f.datasets.drain(gdal.Dataset.Close) }

// openDataset opens a raster for reading with a message that tells what is wrong with it.
func openDataset(path string) (dataset gdal.Dataset, err error) {
	err = call(func() error {
		if dataset, err = gdal.Open(path, gdal.ReadOnly); err != nil {
			return gdal.ErrFailure
		}
		return nil
	})
	if err == nil {
		return dataset, nil
	}
	if _, statErr := os.Stat(path); errors.Is(statErr, fs.ErrNotExist) && strings.Contains(err.Error(), "No such file") {
		return dataset, fs.ErrNotExist
	}
	return dataset, fmt.Errorf("GDAL cannot read it as a raster: %w", err)
}

// describe reads what the file says of itself.
func (f *file) describe(dataset gdal.Dataset, purpose use) error {
	if dataset.RasterCount() == 0 {
		return noBands(dataset)
	}
	in := &f.info
	in.Driver = driverName(dataset)
	in.Cols, in.Rows, in.Bands = dataset.RasterXSize(), dataset.RasterYSize(), dataset.RasterCount()
	in.GeoTransform = dataset.GeoTransform()
	if in.GeoTransform == [6]float64{0, 1, 0, 0, 0, 1} || in.GeoTransform == [6]float64{} { // what GDAL hands out where there is none
		return errors.New("it does not say where on Earth it lies (no geotransform): georeference it, for instance with gdal_translate -a_ullr -a_srs")
	}
	inverse, ok := affine(in.GeoTransform).inverse()
	if !ok {
		return fmt.Errorf("its geotransform %v gives its cells no area", in.GeoTransform)
	}
	f.toCell = inverse.toCentres()
	in.wkt = dataset.Projection()
	if strings.TrimSpace(in.wkt) == "" {
		return errors.New("it names no coordinate reference system: assign one, for instance with gdal_translate -a_srs EPSG:32627")
	}
	rule, err := readRule(dataset, in, purpose)
	f.values = rule
	return err
}

// noBands tells what a data set without cells of its own holds instead.
func noBands(dataset gdal.Dataset) error {
	for _, entry := range dataset.Metadata("SUBDATASETS") {
		if name, value, ok := strings.Cut(entry, "="); ok && strings.HasSuffix(name, "_NAME") {
			return fmt.Errorf("it is a container of several rasters: name one of them, such as %s", value)
		}
	}
	return errors.New("it holds no raster band")
}

// driverName is GDAL's short name of the file's format.
func driverName(dataset gdal.Dataset) string {
	driver := dataset.Driver()
	return driver.ShortName()
}

// cell turns a place in the raster's reference system into its cell-centre coordinates.
// Longitudes are taken on the raster's own turn around the Earth.
func (f *file) cell(p orb.Point) (col, row float64) {
	if !math.IsNaN(f.wrapsDeg) {
		p[0] = f.wrapsDeg + math.Remainder(p[0]-f.wrapsDeg, 360)
	}
	at := f.toCell.apply(p[0], p[1])
	return at[0], at[1]
}

// read reads a window of cells: heights in metres or classes, NaN where void.
func (f *file) read(col, row, cols, rows int) (*terrain.Grid, error) {
	grid := terrain.NewGrid(cols, rows)
	err := f.with(func(dataset gdal.Dataset) error {
		return f.values.read(dataset.RasterBand(1), col, row, grid)
	})
	if err != nil {
		return nil, fmt.Errorf("%s: reading the cells from column %d, row %d on: %w", f.info.Path, col, row, err)
	}
	return grid, nil
}
