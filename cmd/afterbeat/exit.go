package main

import (
	"context"
	"errors"
	"io/fs"

	"afterbeat/data"
	"afterbeat/tree/study"
)

// The exit codes, as `afterbeat help exit-codes` prints them.
const (
	exitDone        = 0
	exitNoAnswer    = 1
	exitUsage       = 2
	exitFile        = 3
	exitInterrupted = 130
)

// noAnswer is a recording that cannot carry the answer; what could be computed
// has been printed.
type noAnswer struct{ reason string }

func (e noAnswer) Error() string { return e.reason }

// usageError is a wrong command line.
type usageError struct {
	err  error
	hint string
}

func (e usageError) Error() string { return e.err.Error() }
func (e usageError) Unwrap() error { return e.err }

// exitCode sorts an error into the table of exit codes.
func exitCode(err error) int {
	var (
		none    noAnswer
		unknown *data.UnknownNameError
		several *data.AmbiguousError
		file    *data.FileError
		path    *fs.PathError
	)
	switch {
	case err == nil:
		return exitDone
	case errors.Is(err, context.Canceled):
		return exitInterrupted
	case errors.As(err, &none):
		return exitNoAnswer
	case errors.As(err, &unknown), errors.As(err, &several): // a name of the command line, though a file may be named too
		return exitUsage
	case errors.As(err, &file), errors.As(err, &path):
		return exitFile
	}
	return exitUsage
}

// message is what an error says on one line, safe to print.
func message(err error) string { return data.Clean(err.Error()).String() }

// hintOf is the second line of an error: what to do about it.
func hintOf(err error) string {
	var (
		file   *data.FileError
		choice *study.ChoiceError
		usage  usageError
	)
	switch {
	case errors.As(err, &file):
		return data.Clean(file.Hint).String()
	case errors.As(err, &choice):
		return data.Clean(choice.Hint).String()
	case errors.As(err, &usage):
		return usage.hint
	}
	return ""
}
