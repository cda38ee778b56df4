package main

import (
	"fmt"
	"runtime"
	"runtime/debug"

	"fellreach/terrain/raster"

	"github.com/spf13/cobra"
)

func newVersion(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "version",
		Short: "Print the versions of the program and its libraries",
		Args:  arguments(0, 0, "no arguments"),
		RunE: func(*cobra.Command, []string) error {
			gdal, proj := raster.Versions()
			_, err := fmt.Fprintf(t.out, "fellreach %s\n%s %s/%s\nGDAL %s\nPROJ %s\n", version(), runtime.Version(), runtime.GOOS, runtime.GOARCH, gdal, proj)
			return err
		},
	}
}

// version is the module's version, or the revision it was built from.
func version() string {
	info, ok := debug.ReadBuildInfo()
	if !ok {
		return "unknown"
	}
	for _, s := range info.Settings {
		if s.Key == "vcs.revision" && len(s.Value) >= 12 {
			return s.Value[:12]
		}
	}
	return info.Main.Version
}
