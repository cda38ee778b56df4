package main

import (
	"io"

	"fellreach/link/report"

	"github.com/spf13/cobra"
)

func newSection(t *terminal) *cobra.Command {
	var out output
	var named string
	cmd := &cobra.Command{
		Use:   "section PLAN --link A..B",
		Short: "Show the ground under a link: profile, ray and Fresnel zone",
		Args:  arguments(1, 1, "one plan file"),
		RunE: func(cmd *cobra.Command, args []string) error {
			if err := out.check(args...); err != nil {
				return err
			}
			if named == "" {
				return &usageError{"section needs --link, a link's name or its ends as in --link \"A..B\""}
			}
			network, err := openPlan(args[0])
			if err != nil {
				return err
			}
			defer network.Close()
			l, err := network.Named(named)
			if err != nil {
				return err
			}
			s, err := network.Section(l)
			if err != nil {
				return err
			}
			return out.write(t, func(w io.Writer) error { return report.WriteSection(w, s, out.format) })
		},
	}
	out.flags(cmd, report.SectionFormats...)
	cmd.Flags().StringVar(&named, "link", "", `a link's name, or two ends as "A..B"`)
	return cmd
}
