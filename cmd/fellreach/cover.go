package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"sync"
	"text/tabwriter"

	"fellreach/link/coverage"
	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/spf13/cobra"
)

// A coverFlags is what `cover` is told besides the plan.
type coverFlags struct {
	site, dir, compress, quality, along string
	only                                []string
	step                                plan.Length
	smooth                              plan.Distance
}

func newCover(t *terminal) *cobra.Command {
	f := coverFlags{step: 100}
	cmd := &cobra.Command{
		Use:   "cover PLAN -o DIR",
		Short: "Map the coverage of the plan's sites, cell by cell",
		Args:  arguments(1, 1, "one plan file"),
		RunE: func(cmd *cobra.Command, args []string) error {
			options, err := f.options()
			if err != nil {
				return err
			}
			network, err := openPlan(args[0])
			if err != nil {
				return err
			}
			defer network.Close()
			if f.along != "" {
				return f.ride(cmd, t, network)
			}
			return f.run(cmd, t, network, options)
		},
	}
	flags := cmd.Flags()
	flags.StringVar(&f.site, "site", "", "map this site of the plan's coverage alone")
	flags.StringVarP(&f.dir, "output", "o", "", "write into this folder; finished sites in it are kept")
	flags.StringSliceVar(&f.only, "only", nil, "compute and write only these: loss, margin, field, bands, network, picture")
	flags.StringVar(&f.compress, "compress", "fast", "fast, or small for smaller files")
	flags.StringVar(&f.quality, "quality", "normal", "normal, or fine: twice the radials, 8 points of each profile on the cell's own bearing")
	flags.Var(&quantityFlag{&f.smooth, "0 m"}, "smooth", "how far the bands' outlines may leave the sides of the cells")
	flags.StringVar(&f.along, "along", "", "follow a track (GeoJSON or GPX) instead of mapping: margin by distance")
	flags.Var(&quantityFlag{&f.step, "100 m"}, "step", "distance of two stops on the track")
	_ = cmd.RegisterFlagCompletionFunc("compress", cobra.FixedCompletions([]string{"fast", "small"}, cobra.ShellCompDirectiveNoFileComp))
	_ = cmd.RegisterFlagCompletionFunc("quality", cobra.FixedCompletions([]string{"normal", "fine"}, cobra.ShellCompDirectiveNoFileComp))
	return cmd
}

func (f *coverFlags) options() (o coverage.Options, err error) {
	switch {
	case f.dir == "":
		return o, &usageError{"cover needs -o, the folder to write into"}
	case f.compress != "fast" && f.compress != "small":
		return o, &usageError{fmt.Sprintf("--compress %q is not one of fast, small", f.compress)}
	case f.quality != "normal" && f.quality != "fine":
		return o, &usageError{fmt.Sprintf("--quality %q is not one of normal, fine", f.quality)}
	}
	o.Dir, o.Small, o.SmoothM = f.dir, f.compress == "small", float64(f.smooth)
	if o.Outputs, err = coverage.ParseOutputs(f.only); err != nil {
		return o, &usageError{"--only: " + err.Error()}
	}
	return o, nil
}

func (f *coverFlags) run(cmd *cobra.Command, t *terminal, network *plan.Network, o coverage.Options) error {
	sites, err := network.CoverageSites(f.site)
	if err != nil {
		return err
	}
	for i := range sites {
		sites[i].Task.Fine = f.quality == "fine"
	}
	bars := &radialBars{terminal: t}
	o.Progress, o.Note = bars.tell, func(text string) { t.hint("%s", text) }
	report, err := coverage.Run(cmd.Context(), network.Ground, network.Title, sites, o)
	bars.end()
	if err != nil {
		if cmd.Context().Err() != nil {
			return errors.New("interrupted; sites that were finished are kept, and the same command goes on from there")
		}
		return err
	}
	return printCover(t.out, report, f.dir)
}

// printCover prints what came out.
func printCover(w io.Writer, r *coverage.Report, dir string) error {
	for _, s := range r.Sites {
		fmt.Fprintf(w, "%s, %g MHz: %d cells of %g m within %g km, %d without a profile, %.1f s\n",
			s.Site, s.FreqHz/1e6, s.Cells, s.CellM, s.RangeKm, s.VoidCells, s.Seconds)
		if err := printBands(w, s.Bands); err != nil {
			return err
		}
		fmt.Fprintf(w, "  check of %d cells: sweep within %.1g dB of the direct evaluation; sampling error against the cells' own profiles %.2f dB in the middle, %.1f dB for 95 %%, %.1f dB at most\n",
			s.Check.Samples, s.Check.SweepMaxDB, s.Check.CellMedianDB, s.Check.CellP95DB, s.Check.CellMaxDB)
	}
	if n := r.Network; n != nil {
		fmt.Fprintf(w, "All %d sites, best margin\n", len(n.Sites))
		if err := printBands(w, n.Bands); err != nil {
			return err
		}
	}
	fmt.Fprintf(w, "written to %s\n", dir)
	return nil
}

func printBands(w io.Writer, bands []coverage.Band) error {
	table := tabwriter.NewWriter(w, 0, 0, 2, ' ', tabwriter.AlignRight)
	for _, b := range bands {
		upTo := "and more"
		if b.ToDB != nil {
			upTo = fmt.Sprintf("to %g dB", *b.ToDB)
		}
		fmt.Fprintf(table, "\tfrom %g dB\t%s\t%.1f km2\t\n", b.FromDB, upTo, b.AreaKm2)
	}
	return table.Flush()
}

// radialBars show a bar for one site after the other.
type radialBars struct {
	*terminal
	mutex sync.Mutex
	site  string
	shown int
	step  func()
	done  func()
}

// tell moves the bar of a site to how many of its radials are done.
func (b *radialBars) tell(site string, done, total int) {
	b.mutex.Lock()
	defer b.mutex.Unlock()
	if b.step == nil || site != b.site || done < b.shown && done == 1 {
		b.finish()
		b.site, b.shown = site, 0
		b.step, b.done = b.progress(total, site)
	}
	for ; b.shown < done; b.shown++ {
		b.step()
	}
}

func (b *radialBars) end() {
	b.mutex.Lock()
	defer b.mutex.Unlock()
	b.finish()
}

func (b *radialBars) finish() {
	if b.done != nil {
		b.done()
	}
	b.step, b.done = nil, nil
}

// ride follows a track: a table of margins, points and a picture go into the folder.
func (f *coverFlags) ride(cmd *cobra.Command, t *terminal, network *plan.Network) error {
	sites, err := network.CoverageSites(f.site)
	if err != nil {
		return err
	}
	data, err := os.ReadFile(f.along)
	if err != nil {
		return err
	}
	track, err := coverage.ParseTrack(data)
	if err != nil {
		return fmt.Errorf("%s: %w", f.along, err)
	}
	stops, err := track.Stops(float64(f.step))
	if err != nil {
		return err
	}
	step, done := t.progress(len(stops)*len(sites), "stops")
	ride, err := coverage.Along(cmd.Context(), network.Ground, sites, stops, step)
	done()
	if err != nil {
		return err
	}
	if err := os.MkdirAll(f.dir, 0o755); err != nil {
		return err
	}
	for name, write := range map[string]func(io.Writer, *coverage.Ride) error{"along.csv": report.RideCSV, "along.geojson": report.RideGeoJSON, "along.svg": report.RideSVG} {
		file := output{file: filepath.Join(f.dir, name)}
		if err := file.write(t, func(w io.Writer) error { return write(w, ride) }); err != nil {
			return err
		}
	}
	fmt.Fprintf(t.out, "%s\nwritten to %s\n", report.RideSummary(ride), f.dir)
	return nil
}
