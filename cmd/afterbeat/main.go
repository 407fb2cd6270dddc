// Command afterbeat asks what is left of the pulse when a steady pump takes
// over, for one patient, from that patient's own traces. Research use only.
//
// This package is thin: flags in, exit code out. The work is in
// afterbeat/tree/study.
package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"os/signal"
	"syscall"
)

func main() {
	os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}

// run runs one command line and returns the exit code.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	root := newRoot(stream{in: stdin, out: stdout, err: stderr})
	root.SetArgs(args)
	root.SetIn(stdin)
	root.SetOut(stdout)
	root.SetErr(stderr)
	err := root.ExecuteContext(ctx)
	if err == nil {
		return exitDone
	}
	code := exitCode(err)
	if code == exitInterrupted {
		fmt.Fprintln(stderr, "afterbeat: "+interrupted(err))
		return code
	}
	fmt.Fprintln(stderr, "afterbeat: "+message(err))
	if hint := hintOf(err); hint != "" {
		fmt.Fprintln(stderr, "hint: "+hint)
	}
	return code
}

// stream is where a command reads and prints.
type stream struct {
	in       io.Reader
	out, err io.Writer
}
