package raster

// #cgo pkg-config: gdal
// #include <cpl_error.h>
import "C"

import (
	"errors"
	"os"
	"runtime"
	"strings"
	"sync"

	"github.com/lukeroth/gdal"
)

// gdalCacheBytes bounds GDAL's own cache of file blocks. It spares a raster stored in long
// strips, whose blocks hold many tiles, from being read once for each tile.
const gdalCacheBytes = 128 << 20

// prepareGDAL sends what GDAL would print on standard error away: every failure comes back as an
// error with GDAL's message in it.
var prepareGDAL = sync.OnceFunc(func() {
	gdal.CPLSetConfigOption("CPL_LOG", os.DevNull)
	gdal.CPLSetConfigOption("CPL_DEBUG", "OFF")
	gdal.SetCacheMax(gdalCacheBytes)
})

// call runs calls of GDAL and puts GDAL's own message in the place of the binding's error, which
// says little. GDAL keeps its last error by thread, so the goroutine stays on one meanwhile.
func call(f func() error) error {
	prepareGDAL()
	runtime.LockOSThread()
	defer runtime.UnlockOSThread()
	C.CPLErrorReset()
	err := f()
	if !errors.Is(err, gdal.ErrFailure) && !errors.Is(err, gdal.ErrFatal) {
		return err
	}
	if message := strings.TrimSpace(gdal.CPLGetLastErrorMsg().Error()); message != "" {
		return errors.New(message)
	}
	return err
}
