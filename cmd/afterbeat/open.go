package main

import (
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
}

// openPath finds out what path is: a case, a recording, - for standard input,
// or with no path the demo case.
func openPath(path string, stdin io.Reader) (source, error) {
	switch {
	case path == "":
		return openCase(demo.CaseName, func(name string) ([]byte, error) { return fs.ReadFile(demo.Files(), name) })
	case path == "-":
		return source{
			base: casefile.Case{Recording: "-"},
			read: func(name string) ([]byte, error) {
				if name == "-" {
					return io.ReadAll(stdin)
				}
				return readFile(name)
			},
		}, nil
	case strings.HasSuffix(path, caseSuffix):
		folder := filepath.Dir(path)
		return openCase(path, func(name string) ([]byte, error) {
			if name != path && !filepath.IsAbs(name) {
				name = filepath.Join(folder, name)
			}
			return readFile(name)
		})
	}
	return source{base: casefile.Case{Recording: path}, read: readFile}, nil
}

func openCase(path string, read func(string) ([]byte, error)) (source, error) {
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
	return source{file: path, base: c, read: read}, nil
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
	in, err := study.Read(c, s.read)
	return in, s.located(err, o)
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
