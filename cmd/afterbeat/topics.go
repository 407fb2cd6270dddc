package main

import (
	"fmt"
	"strings"

	"github.com/spf13/cobra"

	"afterbeat/data"
)

// warningsTopic is `afterbeat help warnings`.
func warningsTopic() *cobra.Command {
	var b strings.Builder
	b.WriteString("The codes of warnings, in the order of the work:\n\n")
	for _, w := range data.WarningCodes() {
		fmt.Fprintf(&b, "  %-26s%s\n", w.Code, w.Meaning)
	}
	return &cobra.Command{Use: "warnings", Short: "The codes of warnings", Long: strings.TrimRight(b.String(), "\n")}
}

// exitCodesTopic is `afterbeat help exit-codes`.
func exitCodesTopic() *cobra.Command {
	return &cobra.Command{Use: "exit-codes", Short: "The exit codes", Long: strings.TrimSpace(fmt.Sprintf(`
The exit codes:

  %-5d done; warnings may be in the output
  %-5d the data cannot support the answer; the reason is printed, and with
        --json the object is still written, with everything that could be
        computed
  %-5d wrong usage, or a choice that only a person can make; the flag to add is
        named, and nothing stands on standard output
  %-5d a file cannot be read, parsed or written: file:line: what; nothing stands
        on standard output
  %-5d interrupted`, exitDone, exitNoAnswer, exitUsage, exitFile, exitInterrupted))}
}
