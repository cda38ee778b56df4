package coverage

import (
	"context"
	"fmt"
	"os"
	"os/exec"
	"path/filepath"
	"runtime"
	"runtime/debug"
	"strings"
	"testing"
	"time"

	"fellreach/antenna"
	"fellreach/link"
	"fellreach/link/propagation"
	"fellreach/terrain"
	"fellreach/terrain/raster"

	"github.com/paulmach/orb"
)

// benchRaster writes rough ground of 3400 x 3400 cells of 30 m, 1000 m high at most, partly sea, around
// an easting and northing of UTM 27N.
func benchRaster(b *testing.B) (path string, easting, northing float64) {
	b.Helper()
	const side, cellM = 3400, 30
	easting, northing = 500000+side/2*cellM+15, 5200000+side/2*cellM+15
	grid := terrain.NewGrid(side, side)
	for row := range side {
		for col := range side {
			grid.Set(col, row, float32(rough(float64(col-side/2)*cellM, float64(side/2-row)*cellM)))
		}
	}
	path = filepath.Join(b.TempDir(), "rough.tif")
	nodata := -9999.0
	err := raster.WriteGeoTIFF(path, raster.GeoTIFF{
		Grid: grid, GeoTransform: [6]float64{500000, cellM, 0, 5200000 + side*cellM, 0, -cellM}, EPSG: 32627,
		Type: raster.Float32, NoData: &nodata, Unit: "m",
	})
	if err != nil {
		b.Fatal(err)
	}
	return path, easting, northing
}

// benchSite is a mast of 20 m in the middle and a handheld, 450 MHz, 50 km, availability 50 %: loss
// alone.
func benchSite(at orb.Point, availabilityPct float64) Site {
	rod, _ := antenna.Isotropic(2, antenna.Port{})
	radio := link.Radio{Name: "set", PowerDBm: 37, Needs: link.Need{Stated: true, SensitivityDBm: -117, FigureDB: 7}}
	return Site{
		Name: "Bench",
		Task: Task{
			Link: &link.Link{
				From:    &link.Station{Name: "Bench", At: at, AglM: 20, ClearingM: 50, Radio: radio, Antenna: rod},
				To:      &link.Station{Name: "handheld", Order: 1, AglM: 1.5, Radio: radio, Antenna: rod},
				Channel: link.Channel{Name: "voice", OutHz: 450e6, BackHz: 450e6, BandwidthHz: 12.5e3},
				Aim:     link.Aim{AvailabilityPct: availabilityPct},
			},
			Conditions:   link.Conditions{Method: propagation.P1812, DeltaN: 45, N0: 325, Dn1: -200},
			LocationsPct: 50, RangeM: 50_000, CellM: 30, StepM: 30,
		},
		BandsDB: []float64{0, 6, 12},
	}
}

// BenchmarkViewshed sets the whole work of a map, reading and writing included, against
// gdal_viewshed for the same raster, site and range, in turn: the best of three of each. The figures
// are ratios within one run.
func BenchmarkViewshed(b *testing.B) {
	if _, err := exec.LookPath("gdal_viewshed"); err != nil {
		b.Skip("gdal_viewshed is not installed (Debian package gdal-bin)")
	}
	path, easting, northing := benchRaster(b)
	at, err := raster.Locate(terrain.Coordinates{EPSG: 32627, Easting: easting, Northing: northing})
	if err != nil {
		b.Fatal(err)
	}
	folder := b.TempDir()
	best := map[string]time.Duration{}
	timed := func(name string, f func() error) {
		started := time.Now()
		if err := f(); err != nil {
			b.Fatal(err)
		}
		if took := time.Since(started); best[name] == 0 || took < best[name] {
			best[name] = took
		}
	}
	cover := func(name string, availabilityPct float64, only ...string) {
		dir := filepath.Join(folder, fmt.Sprint(name, time.Now().UnixNano()))
		timed(name, func() error {
			ground, err := raster.Open(raster.Spec{Elevation: []string{path}})
			if err != nil {
				return err
			}
			defer ground.Close()
			outputs, err := ParseOutputs(only)
			if err != nil {
				return err
			}
			_, err = Run(context.Background(), ground, "bench", []Site{benchSite(at, availabilityPct)}, Options{Dir: dir, Outputs: outputs})
			return err
		})
		os.RemoveAll(dir)
		runtime.GC()
	}
	peakMB := 0.0
	for range 3 {
		timed("viewshed", func() error {
			return exec.Command("gdal_viewshed", "-q", "-oz", "20", "-tz", "1.5", "-md", "50000", "-ox", fmt.Sprint(easting), "-oy", fmt.Sprint(northing), path, filepath.Join(folder, "viewshed.tif")).Run()
		})
		forgetPeak()
		cover("loss", 50, "loss")
		peakMB = max(peakMB, peak())
	}
	cover("loss and margin at 99 %", 99, "loss", "margin")
	cover("everything", 99)
	for range b.N {
	}
	for _, name := range []string{"loss", "loss and margin at 99 %", "everything"} {
		b.Logf("%s: %.2f s, %.1f times gdal_viewshed (%.3f s)", name, best[name].Seconds(), float64(best[name])/float64(best["viewshed"]), best["viewshed"].Seconds())
	}
	b.Logf("loss: peak of memory %.0f MB, of which 46 MB are the raster and 44 MB the map", peakMB)
	b.ReportMetric(float64(best["loss"])/float64(best["viewshed"]), "x-viewshed")
	b.ReportMetric(0, "ns/op")
}

// forgetPeak lets the peak of memory begin anew, where the system can.
func forgetPeak() {
	debug.FreeOSMemory()
	_ = os.WriteFile("/proc/self/clear_refs", []byte("5"), 0)
}

// peak is the most memory the process held, MB; 0 where the system does not say.
func peak() float64 {
	data, _ := os.ReadFile("/proc/self/status")
	_, after, _ := strings.Cut(string(data), "VmHWM:")
	var kB float64
	_, _ = fmt.Sscan(after, &kB)
	return kB / 1024
}

// BenchmarkParts splits the work of one map of the loss into its parts.
func BenchmarkParts(b *testing.B) {
	path, easting, northing := benchRaster(b)
	at, err := raster.Locate(terrain.Coordinates{EPSG: 32627, Easting: easting, Northing: northing})
	if err != nil {
		b.Fatal(err)
	}
	site := benchSite(at, 50)
	t := &site.Task
	parts, names := map[string]time.Duration{}, []string{}
	part := func(name string, f func() error) {
		started := time.Now()
		if err := f(); err != nil {
			b.Fatal(err)
		}
		parts[name] = time.Since(started)
		names = append(names, name)
	}
	places, err := link.NewPlaces(t.Link, t.Conditions)
	if err != nil {
		b.Fatal(err)
	}
	ground, err := raster.Open(raster.Spec{Elevation: []string{path}})
	if err != nil {
		b.Fatal(err)
	}
	defer ground.Close()
	frame, err := ground.Frame(at, t.RangeM, t.CellM)
	if err != nil {
		b.Fatal(err)
	}
	var disc *terrain.Disc
	part("reading", func() (err error) {
		disc, err = ground.Disc(at, t.RangeM+2*t.CellM)
		return err
	})
	s, err := newSweep(t.spec(places), disc, frame)
	if err != nil {
		b.Fatal(err)
	}
	m := &Map{Frame: frame, LossDB: voidCells(frame.Cols * frame.Rows)}
	samples := newSampling(s)
	ctx := context.Background()
	part("cells to radials", func() error { _, err := s.divide(ctx); return err })
	part("that and walking, with the outlines of all cells", func() error {
		_, err := s.run(ctx, func() func(*Cell) { return func(*Cell) {} }, nil)
		return err
	})
	part("that and evaluating", func() error {
		_, err := s.run(ctx, func() func(*Cell) { return newReckoner(t, places, s, m, samples).visit }, nil)
		return err
	})
	part("checking", func() error { _, err := samples.check(ctx, t, places); return err })
	part("writing", func() error {
		return raster.WriteCOG(filepath.Join(b.TempDir(), "loss.tif"), raster.COG{Frame: frame, Cells: m.LossDB, Unit: "dB"})
	})
	for range b.N {
	}
	for _, name := range names {
		b.Logf("%-50s %5.2f s", name, parts[name].Seconds())
	}
	b.ReportMetric(0, "ns/op")
}
