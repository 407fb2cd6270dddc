package casefile

import (
	"bytes"
	"errors"
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2"

	"afterbeat/data"
)

// largest is the size of a case file at most, in bytes. What is larger is
// something else, and the parser's time grows with the square of the entries.
const largest = 1 << 16

// Read reads the case that data holds, of a file called name. Every error is a
// [data.FileError] with the line, where there is one.
func Read(name string, content []byte) (Case, error) {
	c := Case{lines: make(map[string]int)}
	content = bytes.TrimPrefix(content, []byte("\ufeff"))
	if len(content) > largest {
		return Case{}, &data.FileError{File: name, What: "is too large for a case file"}
	}
	var tree map[string]any
	if err := toml.Unmarshal(content, &tree); err != nil {
		return Case{}, malformed(name, err)
	}
	for _, e := range entries(content) {
		if err := c.enter(tree, e); err != nil {
			return Case{}, &data.FileError{File: name, Line: e.line, What: err.Error()}
		}
		c.lines[e.path()] = e.line
	}
	if c.Recording == "" {
		return Case{}, &data.FileError{File: name, What: `the key "recording" is missing`, Hint: `add the line recording = "FILE"`}
	}
	return c, nil
}

// malformed says where the file is no TOML.
func malformed(name string, err error) error {
	fe := &data.FileError{File: name, What: clean(strings.TrimPrefix(err.Error(), "toml: "))}
	var decode *toml.DecodeError
	if errors.As(err, &decode) {
		fe.Line, _ = decode.Position()
	}
	return fe
}

// enter takes one entry of the file over into the case.
func (c *Case) enter(tree map[string]any, e entry) error {
	f, ok := named(e.key)
	if !ok {
		return unknown("key", e.key, names())
	}
	v := tree[e.key]
	err := f.read(c, v, e)
	if err != nil && !errors.As(err, new(*unknownError)) {
		return fmt.Errorf("%s: %w", clean(e.path()), err)
	}
	return err
}

// read gives the field what its entry in the file says.
func (f field) read(c *Case, v any, e entry) error {
	if f.table() {
		table, ok := v.(map[string]any)
		switch {
		case !ok && f.plain != "" && !e.inTable:
			return f.enter(c, f.plain, v)
		case !ok:
			return fmt.Errorf("want a table, [%s], not %s", f.Name, describe(v))
		case e.inTable:
			return f.enter(c, e.name, table[e.name])
		}
		return nil
	}
	if !f.list() {
		return f.set(c, v)
	}
	list, ok := v.([]any)
	if !ok {
		return fmt.Errorf("want a list in [ ], not %s", describe(v))
	}
	for _, one := range list {
		if err := f.set(c, one); err != nil {
			return err
		}
	}
	return nil
}

// names lists the keys of the file.
func names() []string {
	var list []string
	for _, k := range Keys() {
		list = append(list, k.Name)
	}
	return list
}

// unknownError says that there is no such name.
type unknownError struct{ what string }

func (e *unknownError) Error() string { return e.what }

// unknown names the nearest of the known names beside one that is not known.
func unknown(what, name string, known []string) error {
	s := fmt.Sprintf(`unknown %s "%s"`, what, clean(name))
	if near, ok := Nearest(name, known); ok {
		s += fmt.Sprintf(`; did you mean "%s"?`, near)
	}
	return &unknownError{s}
}

// clean makes text of the file fit for an error.
func clean(s string) string { return data.Clean(s).String() }
