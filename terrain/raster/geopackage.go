package raster

import (
	"errors"
	"fmt"
	"os"

	"github.com/lukeroth/gdal"
)

// A VectorLayer is a layer of a GeoPackage that is made from a GeoJSON file.
type VectorLayer struct{ Name, GeoJSON string }

// packageDate is the date that GeoPackages are stamped with, so that equal input gives equal files.
const packageDate = "2000-01-01T00:00:00.000Z"

// WriteGeoPackage writes layers into one GeoPackage. The file appears under its name when it is
// complete, by renaming a temporary one in the same folder.
func WriteGeoPackage(path string, layers []VectorLayer) (err error) {
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
	if err := os.Remove(temporary); err != nil { // GDAL makes it anew
		return err
	}
	for i, layer := range layers {
		if err := addLayer(temporary, layer, i == 0); err != nil {
			return err
		}
	}
	if err := os.Chmod(temporary, 0o644); err != nil {
		return err
	}
	return os.Rename(temporary, path)
}

func addLayer(path string, layer VectorLayer, first bool) error {
	return call(func() error {
		gdal.CPLSetConfigOption("OGR_CURRENT_DATE", packageDate)
		source, err := gdal.OpenEx(layer.GeoJSON, gdal.OFReadOnly|gdal.OFVector, nil, nil, nil)
		if err != nil {
			return gdal.ErrFailure
		}
		defer source.Close()
		options := []string{"-f", "GPKG", "-nln", layer.Name, "-nlt", "MULTIPOLYGON"}
		if !first {
			options = append(options, "-update", "-append")
		}
		written, err := gdal.VectorTranslate(path, []gdal.Dataset{source}, options)
		if err != nil {
			return errors.Join(err, gdal.CPLGetLastErrorMsg())
		}
		written.Close()
		return nil
	})
}
