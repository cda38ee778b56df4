package main

import (
	"context"
	_ "embed"
	"fmt"
	"os"
	"path/filepath"

	"fellreach/link/report"
	"fellreach/terrain"
	"fellreach/terrain/island"
	"fellreach/terrain/raster"

	"github.com/spf13/cobra"
)

// demoPlan is the plan of the invented island's river gauges.
//
//go:embed hallin.yaml
var demoPlan []byte

func newDemo(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "demo [FOLDER]",
		Short: "Write a worked example on an invented island and compute its links",
		Long:  "Write a folder with an invented island's elevation and land cover and a plan of its river\ngauges, then compute the plan's links. The folder (hallin when left out) must not exist yet.",
		Args:  arguments(0, 1, "at most one folder"),
		RunE: func(cmd *cobra.Command, args []string) error {
			folder := "hallin"
			if len(args) == 1 {
				folder = args[0]
			}
			if _, err := os.Lstat(folder); err == nil {
				return &usageError{fmt.Sprintf("%s exists already; the demo writes a new folder\n    hint: name another, or remove it", folder)}
			}
			t.hint("making the island of Hallin …")
			if err := writeDemo(cmd.Context(), folder); err != nil {
				return err
			}
			result, err := runLinks(cmd.Context(), t, filepath.Join(folder, "hallin.yaml"))
			if err != nil {
				return err
			}
			if err := report.LinksTable(t.out, result); err != nil {
				return err
			}
			t.hint("\nwrote %[1]s: a plan, an elevation raster and a land-cover raster. Go on with\n  fellreach links %[1]s/hallin.yaml --lines\n  fellreach section %[1]s/hallin.yaml --link \"West head..Ormvik/coast\" --format svg -o section.svg", folder)
			return nil
		},
	}
}

// writeDemo writes the demo's files into a folder of another name first, so that the folder is
// there whole or not at all.
func writeDemo(ctx context.Context, folder string) error {
	if err := os.MkdirAll(filepath.Dir(folder), 0o755); err != nil {
		return err
	}
	work, err := os.MkdirTemp(filepath.Dir(folder), "."+filepath.Base(folder)+".*")
	if err != nil {
		return err
	}
	defer os.RemoveAll(work)
	if err := os.Chmod(work, 0o755); err != nil {
		return err
	}
	for _, write := range []func(folder string) error{writeHeights, writeCover, writeDemoPlan} {
		if err := ctx.Err(); err != nil {
			return err
		}
		if err := write(work); err != nil {
			return err
		}
	}
	return os.Rename(work, folder)
}

func writeHeights(folder string) error {
	grid := terrain.NewGrid(island.Cols, island.Rows)
	for i, dm := range island.Heights() {
		grid.Cells[i] = float32(dm) / 10
	}
	void := float64(island.NoData)
	return raster.WriteGeoTIFF(filepath.Join(folder, "hallin-dem.tif"), raster.GeoTIFF{
		Grid: grid, GeoTransform: islandPlace, EPSG: island.EPSG, Type: raster.Int16, Scale: 0.1, NoData: &void, Unit: "m",
		About: "heights of Hallin, an invented island, in decimetres",
	})
}

func writeCover(folder string) error {
	grid := terrain.NewGrid(island.Cols, island.Rows)
	for i, class := range island.Cover() {
		grid.Cells[i] = float32(class)
	}
	return raster.WriteGeoTIFF(filepath.Join(folder, "hallin-cover.tif"), raster.GeoTIFF{
		Grid: grid, GeoTransform: islandPlace, EPSG: island.EPSG, Type: raster.Uint8, NoData: new(float64),
		About: "land cover of Hallin: 1 sea, 2 open, 3 woodland, 4 village, 5 fresh water",
	})
}

// islandPlace is the geotransform of both rasters.
var islandPlace = [6]float64{island.WestM, island.CellM, 0, island.NorthM, 0, -island.CellM}

func writeDemoPlan(folder string) error {
	return os.WriteFile(filepath.Join(folder, "hallin.yaml"), demoPlan, 0o644)
}
