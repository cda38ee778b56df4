package main

import (
	"context"
	"errors"
	"io"

	"fellreach/link"
	"fellreach/link/plan"
	"fellreach/link/report"

	"github.com/spf13/cobra"
)

func newLinks(t *terminal) *cobra.Command {
	var out output
	var lines bool
	cmd := &cobra.Command{
		Use:   "links PLAN",
		Short: "Compute the margin of every link of a plan",
		Long:  "Compute every link of a plan in both directions: the margin, the verdict against the plan's\naim, and the budget behind it. Exit status 3 tells that some link is thin or fails.",
		Args:  arguments(1, 1, "one plan file"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := out.check(args...); err != nil {
				return err
			}
			if lines && out.format != "table" {
				return &usageError{"--lines goes with --format table; json always holds the lines"}
			}
			result, err := runLinks(cmd.Context(), t, args[0])
			if err != nil {
				return err
			}
			err = out.write(t, func(w io.Writer) error { return writeLinks(w, result, out.format, lines) })
			if err != nil {
				return err
			}
			return verdictStatus(result)
		},
	}
	out.flags(cmd, report.LinksFormats...)
	cmd.Flags().BoolVar(&lines, "lines", false, "also show every line of every budget with its source")
	return cmd
}

// runLinks loads a plan and computes its links.
func runLinks(ctx context.Context, t *terminal, path string) (*plan.Result, error) {
	network, err := openPlan(path)
	if err != nil {
		return nil, err
	}
	defer network.Close()
	step, done := t.progress(len(network.Links), "links")
	defer done()
	return network.Run(ctx, step)
}

// openPlan loads a plan and opens its ground.
func openPlan(path string) (*plan.Network, error) {
	p, err := plan.Load(path)
	if err != nil {
		return nil, err
	}
	return p.Open()
}

func writeLinks(w io.Writer, r *plan.Result, format string, lines bool) error {
	err := report.WriteLinks(w, r, format)
	if lines {
		err = errors.Join(err, report.LinesTable(w, r))
	}
	return err
}

// verdictStatus is the exit status of the main job.
func verdictStatus(r *plan.Result) error {
	for _, l := range r.Links {
		if l.Verdict != link.Closes {
			return statusError(exitLinks)
		}
	}
	return nil
}
