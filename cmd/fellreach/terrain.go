package main

import (
	"io"

	"fellreach/link/report"
	"fellreach/terrain/raster"

	"github.com/spf13/cobra"
)

func newTerrain(t *terminal) *cobra.Command {
	var out output
	cmd := &cobra.Command{
		Use:   "terrain FILE...",
		Short: "Show what elevation rasters hold: extent, CRS, cell, voids, heights",
		Args:  arguments(1, -1, "at least one raster"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := out.check(args...); err != nil {
				return err
			}
			var files []raster.Info
			for _, path := range args {
				step, done := t.progress(100, path)
				shown := 0
				info, err := raster.Inspect(cmd.Context(), path, func(share float64) {
					for ; shown < int(100*share); shown++ {
						step()
					}
				})
				done()
				if err != nil {
					return err
				}
				files = append(files, info)
			}
			return out.write(t, func(w io.Writer) error {
				if out.format == "json" {
					return report.TerrainJSON(w, files)
				}
				return report.TerrainTable(w, files)
			})
		},
	}
	out.flags(cmd, "table", "json")
	return cmd
}
