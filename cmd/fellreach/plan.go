package main

import (
	_ "embed"
	"fmt"
	"os"

	"fellreach/link/plan"

	"github.com/spf13/cobra"
)

//go:embed starter.yaml
var starter []byte

func newPlan(t *terminal) *cobra.Command {
	cmd := &cobra.Command{
		Use:   "plan",
		Short: "Start, check or describe a plan file",
		Args:  commandOf,
		RunE: func(cmd *cobra.Command, _ []string) error {
			return &usageError{"plan needs new, check or schema\n    hint: `fellreach plan --help`"}
		},
	}
	cmd.AddCommand(newPlanNew(t), newPlanCheck(t), newPlanSchema(t))
	return cmd
}

func newPlanNew(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "new [FILE]",
		Short: "Write a commented starter, to a new file or to standard output",
		Args:  arguments(0, 1, "at most one file"),
		RunE: func(_ *cobra.Command, args []string) error {
			if len(args) == 0 {
				_, err := t.out.Write(starter)
				return err
			}
			if _, err := os.Lstat(args[0]); err == nil {
				return &usageError{fmt.Sprintf("%s exists already; name another file", args[0])}
			}
			if err := replaceFile(args[0], starter); err != nil {
				return err
			}
			t.hint("wrote %s; put in your rasters and sites, then `fellreach plan check %s`", args[0], args[0])
			return nil
		},
	}
}

func newPlanCheck(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "check FILE",
		Short: "Report everything that is wrong with a plan, without computing it",
		Args:  arguments(1, 1, "one plan file"),
		RunE: func(_ *cobra.Command, args []string) error {
			p, err := plan.Load(args[0])
			if err != nil {
				return err
			}
			fmt.Fprintf(t.out, "%s: the plan is well formed (sites: %d, links: %d)\n", args[0], len(p.Sites), len(p.Links.List))
			return nil
		},
	}
}

func newPlanSchema(t *terminal) *cobra.Command {
	return &cobra.Command{
		Use:   "schema",
		Short: "Print the JSON Schema of a plan file, for editors",
		Args:  arguments(0, 0, "no arguments"),
		RunE: func(*cobra.Command, []string) error {
			schema, err := plan.Schema()
			if err != nil {
				return err
			}
			_, err = t.out.Write(append(schema, '\n'))
			return err
		},
	}
}
