package main

import (
	"fmt"
	"os"
	"strings"

	"github.com/spf13/cobra"

	"afterbeat/data/casefile"
	"afterbeat/data/casenote"
	"afterbeat/tree/study"
)

// newRoot builds the command tree.
func newRoot(s stream) *cobra.Command {
	root := &cobra.Command{
		Use:           "afterbeat [PATH]",
		Short:         "What is left of the pulse when a steady pump takes over",
		Long:          rootHelp,
		Args:          atMostOnePath,
		Version:       study.Version,
		SilenceUsage:  true,
		SilenceErrors: true,
	}
	root.SetVersionTemplate("afterbeat {{.Version}}\n")
	root.SetFlagErrorFunc(func(c *cobra.Command, err error) error {
		return usageError{err, "see " + c.CommandPath() + " --help"}
	})
	opts := newOptions(root)
	opts.addSaving(root)
	screen := addScreen(root)
	root.RunE = func(c *cobra.Command, args []string) error { return runRoot(c.Context(), s, opts, screen, args) }
	root.AddCommand(
		checkCommand(s), fitCommand(s), studyCommand(s), solveCommand(s), batchCommand(s), demoCommand(s),
		warningsTopic(), exitCodesTopic(),
	)
	return root
}

const rootHelp = casenote.Caution + `

afterbeat takes a recording of arterial pressure and flow (or Doppler velocity)
as CSV, isolates the beats, fits lumped compliance-resistance models to the
average beat, and compares the native pulse with that left under a pump of
steady flow. With no PATH it works on the demo case, whose data are invented.

PATH is a recording (CSV), a case (NAME.afterbeat.toml), or - for standard input.`

// atMostOnePath refuses a second argument, and a first one that is neither a
// command nor a file, naming the nearest command.
func atMostOnePath(c *cobra.Command, args []string) error {
	if len(args) > 1 {
		return usageError{fmt.Errorf("one PATH at most, got %d", len(args)), "see afterbeat --help"}
	}
	if len(args) == 0 || args[0] == "-" {
		return nil
	}
	if _, err := os.Stat(args[0]); err == nil || strings.ContainsAny(args[0], "./\\") {
		return nil
	}
	var names []string
	for _, sub := range c.Commands() {
		names = append(names, sub.Name())
	}
	e := usageError{err: fmt.Errorf("%q is neither a command nor a file here", args[0]), hint: "see afterbeat --help"}
	if nearest, ok := casefile.Nearest(args[0], names); ok {
		e.hint = "did you mean: afterbeat " + nearest
	}
	return e
}

// exactly refuses any other number of arguments.
func exactly(n int, what string) cobra.PositionalArgs {
	return func(c *cobra.Command, args []string) error {
		if len(args) != n {
			return usageError{fmt.Errorf("%s wants %s", c.CommandPath(), what), "see " + c.CommandPath() + " --help"}
		}
		return nil
	}
}
