package main

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"slices"
	"strings"

	"github.com/google/renameio/v2"
	"github.com/schollz/progressbar/v3"
	"github.com/spf13/cobra"
)

// A terminal is where a command talks: results to out, all else to err.
type terminal struct {
	out, err io.Writer
	quiet    bool
}

// hint tells a person something beside the result.
func (t *terminal) hint(format string, args ...any) {
	if !t.quiet {
		fmt.Fprintf(t.err, format+"\n", args...)
	}
}

// progress shows a bar on a terminal and returns the function that advances it and the one that
// takes it away; elsewhere both do nothing.
func (t *terminal) progress(total int, what string) (step, done func()) {
	if t.quiet || total < 2 || !isTerminal(t.err) {
		return func() {}, func() {}
	}
	bar := progressbar.NewOptions(total, progressbar.OptionSetWriter(t.err), progressbar.OptionSetDescription(what),
		progressbar.OptionShowCount(), progressbar.OptionThrottle(100e6), progressbar.OptionClearOnFinish(), progressbar.OptionSetPredictTime(true))
	return func() { _ = bar.Add(1) }, func() { _ = bar.Finish() }
}

func isTerminal(w io.Writer) bool {
	f, ok := w.(*os.File)
	if !ok {
		return false
	}
	info, err := f.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0
}

// An output is where and in which format a command writes its result.
type output struct {
	format, file string
	formats      []string
}

// flags adds --format and -o; the first format is the default.
func (o *output) flags(cmd *cobra.Command, formats ...string) {
	o.formats = formats
	cmd.Flags().StringVar(&o.format, "format", formats[0], strings.Join(formats, ", "))
	cmd.Flags().StringVarP(&o.file, "output", "o", "", "write to this file instead of standard output")
	_ = cmd.RegisterFlagCompletionFunc("format", cobra.FixedCompletions(formats, cobra.ShellCompDirectiveNoFileComp))
}

// check refuses, before any work is done, a format the command does not know and an output that
// would replace what the command reads.
func (o *output) check(inputs ...string) error {
	if !slices.Contains(o.formats, o.format) {
		return &usageError{fmt.Sprintf("--format %q is not one of %s", o.format, strings.Join(o.formats, ", "))}
	}
	for _, input := range inputs {
		if sameFile(o.file, input) {
			return &usageError{fmt.Sprintf("-o %s is what the command reads\n    hint: name another file", o.file)}
		}
	}
	return nil
}

func sameFile(a, b string) bool {
	infoA, errA := os.Stat(a)
	infoB, errB := os.Stat(b)
	return errA == nil && errB == nil && os.SameFile(infoA, infoB)
}

// write puts out a result whole: a file is replaced at once, or stays as it was.
func (o *output) write(t *terminal, fill func(io.Writer) error) error {
	var b bytes.Buffer
	if err := fill(&b); err != nil {
		return err
	}
	if o.file == "" {
		_, err := t.out.Write(b.Bytes())
		return err
	}
	return replaceFile(o.file, b.Bytes())
}

// replaceFile writes a file whole, or leaves what stands under its name as it was. A pipe or a
// device is written into.
func replaceFile(name string, data []byte) error {
	put := func() error { return renameio.WriteFile(name, data, 0o644) }
	if info, err := os.Stat(name); err == nil && !info.Mode().IsRegular() {
		put = func() error { return os.WriteFile(name, data, 0o644) }
	}
	err := put()
	var inner *fs.PathError // of the file that was to take the other's place
	if errors.As(err, &inner) {
		return fmt.Errorf("%s cannot be written: %w", name, inner.Err)
	}
	return err
}
