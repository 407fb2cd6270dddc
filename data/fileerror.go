package data

import "fmt"

// FileError is an error in what a file says: `trace.csv:17: flow is not a
// number: "n/a"`. Every reader of the program returns it, with the line where
// there is one.
type FileError struct {
	File string // base name or path as the user gave it
	Line int    // counted from 1; 0 where the whole file is meant
	What string // what is wrong
	Hint string // what to do; may be empty; shown on a line of its own
	Err  error  // the cause, if it came from below
}

// Error gives file:line: what. The hint is not part of it.
func (e *FileError) Error() string {
	where := Clean(e.File).String()
	if e.Line > 0 {
		where = fmt.Sprintf("%s:%d", where, e.Line)
	}
	if e.Err != nil {
		return fmt.Sprintf("%s: %s: %v", where, e.What, e.Err)
	}
	return where + ": " + e.What
}

// Unwrap returns the cause.
func (e *FileError) Unwrap() error { return e.Err }
