// Command fellreach plans VHF and UHF radio links: the antenna as installed, the ground from open
// elevation rasters, the path by published methods, and a budget in which every decibel names its
// source.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"strings"
	"syscall"

	"fellreach/link/plan"

	"github.com/spf13/cobra"
)

// Exit statuses.
const (
	exitDone  = 0 // every asked link closes, or the command did its work
	exitOther = 1
	exitUsage = 2 // wrong usage or plan
	exitLinks = 3 // some link is thin or fails
)

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	context.AfterFunc(ctx, stop) // a second interrupt ends the program at once
	os.Exit(run(ctx, os.Args[1:], os.Stdout, os.Stderr))
}

// run carries out one command line and returns its exit status. Results go to stdout; progress,
// warnings and errors to stderr.
func run(ctx context.Context, args []string, stdout, stderr io.Writer) int {
	root := newRoot(&terminal{out: stdout, err: stderr})
	root.SetArgs(args)
	root.SetOut(stdout)
	root.SetErr(stderr)
	err := root.ExecuteContext(ctx)
	if err == nil {
		return exitDone
	}
	var status statusError
	if errors.As(err, &status) {
		return int(status)
	}
	fmt.Fprintf(stderr, "fellreach: error: %v\n", plain(ctx, err))
	var usage *usageError
	var inPlan plan.Errors
	var refused *plan.Refusal
	if errors.As(err, &usage) || errors.As(err, &inPlan) || errors.As(err, &refused) {
		return exitUsage
	}
	return exitOther
}

// plain names an interruption as such.
func plain(ctx context.Context, err error) error {
	if ctx.Err() != nil && errors.Is(err, context.Canceled) {
		return errors.New("interrupted before there was a result")
	}
	return err
}

// A statusError ends a command with an exit status and nothing more to say.
type statusError int

func (s statusError) Error() string { return fmt.Sprintf("exit status %d", int(s)) }

// A usageError is a command line that cannot be carried out.
type usageError struct{ problem string }

func (u *usageError) Error() string { return u.problem }

func newRoot(t *terminal) *cobra.Command {
	root := &cobra.Command{
		Use:           "fellreach",
		Short:         "Plan VHF and UHF radio links on real ground",
		Long:          "Fellreach plans VHF and UHF radio links: the antenna as installed, the ground from open\nelevation rasters, the path by published methods, and a budget in which every decibel\nnames its source. Try `fellreach demo`.",
		SilenceErrors: true,
		SilenceUsage:  true,
		Args:          commandOf,
		Run:           func(cmd *cobra.Command, _ []string) { _ = cmd.Help() },
	}
	root.SetFlagErrorFunc(func(cmd *cobra.Command, err error) error {
		return &usageError{fmt.Sprintf("%v\n    hint: `%s --help` lists the flags", err, cmd.CommandPath())}
	})
	root.PersistentFlags().BoolVar(&t.quiet, "quiet", false, "no progress and no hints on standard error")
	root.AddCommand(newDemo(t), newLinks(t), newSection(t), newCover(t), newAntenna(t), newLoss(t), newTerrain(t), newPlan(t), newServe(t), newVersion(t))
	return root
}

// commandOf is for commands that only hold others: what follows them must be one of these.
func commandOf(cmd *cobra.Command, args []string) error {
	if len(args) == 0 {
		return nil
	}
	return &usageError{fmt.Sprintf("%s has no command %q\n    hint: `%s --help` lists the commands", cmd.CommandPath(), args[0], cmd.CommandPath())}
}

// arguments checks the count of a command's arguments; names says what they are.
func arguments(least, most int, names string) cobra.PositionalArgs {
	return func(cmd *cobra.Command, args []string) error {
		if len(args) >= least && (most < 0 || len(args) <= most) {
			return nil
		}
		if len(args) < least {
			return &usageError{fmt.Sprintf("%s takes %s\n    hint: `%s --help` shows how", cmd.CommandPath(), names, cmd.CommandPath())}
		}
		return &usageError{fmt.Sprintf("%s takes %s, not %d: %s\n    hint: quote names with spaces in them", cmd.CommandPath(), names, len(args), strings.Join(args, ", "))}
	}
}
