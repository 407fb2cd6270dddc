package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/data/demo"
	"afterbeat/tree/study"
)

// caseSuffix ends the name of a case file.
const caseSuffix = ".toml"

// source is where a case comes from: its choices, and how its files are read.
type source struct {
	file string // the case file as the user gave it; empty for a recording
	base casefile.Case
	read func(name string) ([]byte, error)
	// real is the path of a file of the case; empty where it is none on disk.
	real func(name string) string
}

// openPath finds out what path is: a case, a recording, - for standard input,
// or with no path the demo case.
func openPath(path string, stdin io.Reader) (source, error) {
	switch {
	case path == "":
		read := func(name string) ([]byte, error) { return fs.ReadFile(demo.Files(), name) }
		return openCase(demo.CaseName, read, func(string) string { return "" })
	case path == "-":
		s := source{base: casefile.Case{Recording: "-"}, real: func(name string) string { return name }}
		s.read = func(name string) ([]byte, error) {
			if name == "-" {
				return io.ReadAll(stdin)
			}
			return readFile(name)
		}
		return s, nil
	case strings.HasSuffix(path, caseSuffix):
		folder := filepath.Dir(path)
		real := func(name string) string {
			if name == path || filepath.IsAbs(name) {
				return name
			}
			return filepath.Join(folder, name)
		}
		return openCase(path, func(name string) ([]byte, error) { return readFile(real(name)) }, real)
	}
	return source{base: casefile.Case{Recording: path}, read: readFile, real: func(name string) string { return name }}, nil
}

func openCase(path string, read func(string) ([]byte, error), real func(string) string) (source, error) {
	content, err := read(path)
	if err != nil {
		return source{}, err
	}
	c, err := casefile.Read(path, content)
	if err != nil {
		return source{}, err
	}
	if c.Recording == "" {
		return source{}, &data.FileError{File: path, What: "the case names no recording", Hint: `add a line: recording = "NAME.csv"`}
	}
	return source{file: path, base: c, read: read, real: real}, nil
}

// readFile reads a file; an error names it and says what is wrong, no more.
func readFile(name string) ([]byte, error) {
	content, err := os.ReadFile(name)
	if err == nil {
		return content, nil
	}
	var path *fs.PathError
	if errors.As(err, &path) {
		err = path.Err
	}
	return nil, &data.FileError{File: name, What: "cannot be read", Err: err}
}

// inputs reads the files of a case with the choices of the command line on top.
func (s source) inputs(o *options) (study.Inputs, error) {
	c, err := o.over(s.base)
	if err != nil {
		return study.Inputs{}, err
	}
	if err := s.spare(o.saveAs, c); err != nil {
		return study.Inputs{}, err
	}
	in, err := study.Read(c, s.read)
	return in, s.located(err, o)
}

// spare refuses to save over a file that the study reads, whatever --replace
// says.
func (s source) spare(target string, c casefile.Case) error {
	there, err := os.Stat(target)
	if target == "" || err != nil {
		return nil
	}
	for _, name := range []string{s.file, c.Recording, c.Exclude, c.Tree, c.Modulation["file"]} {
		if name == "" {
			continue
		}
		if own, err := os.Stat(s.real(name)); err == nil && os.SameFile(there, own) {
			return &data.FileError{File: target, What: "not saved: the study reads this file", Hint: "choose another name"}
		}
	}
	return nil
}

// interruptible is a reader that gives up when ctx ends, however long the other
// end of a pipe keeps it waiting.
type interruptible struct {
	ctx  context.Context
	from io.Reader
}

// Read reads in the background; what comes after the end of ctx is lost.
func (r interruptible) Read(p []byte) (int, error) {
	type result struct {
		n   int
		err error
	}
	done := make(chan result, 1)
	own := make([]byte, len(p))
	go func() {
		n, err := r.from.Read(own)
		done <- result{n, err}
	}()
	select {
	case <-r.ctx.Done():
		return 0, r.ctx.Err()
	case got := <-done:
		return copy(p, own[:got.n]), got.err
	}
}

// located turns an error about a choice into one with file and line, where the
// choice stands in the case file and not on the command line.
func (s source) located(err error, o *options) error {
	var choice *study.ChoiceError
	if s.file == "" || !errors.As(err, &choice) || o.given(choice.Flag()) {
		return err
	}
	line := s.base.Line(choice.Key)
	if line == 0 {
		return err
	}
	return &data.FileError{File: s.file, Line: line, What: fmt.Sprintf("%s: %s", choice.Key, choice.What), Hint: choice.Hint}
}
