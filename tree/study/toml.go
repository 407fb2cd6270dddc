package study

import (
	"errors"
	"fmt"
	"strings"

	"github.com/pelletier/go-toml/v2"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// tomlError turns an error of the TOML library into one with file and line, in
// the words of the file. known are the keys there are, for the nearest one.
func tomlError(name string, err error, known ...string) error {
	var strict *toml.StrictMissingError
	if errors.As(err, &strict) {
		key := strings.Join(strict.Errors[0].Key(), ".")
		line, _ := strict.Errors[0].Position()
		e := &data.FileError{File: name, Line: line, What: fmt.Sprintf("unknown key %q", data.Clean(key))}
		if nearest, ok := casefile.Nearest(key, known); ok {
			e.What += fmt.Sprintf("; did you mean %q?", nearest)
		}
		return e
	}
	var decode *toml.DecodeError
	if !errors.As(err, &decode) {
		return &data.FileError{File: name, What: strings.TrimPrefix(err.Error(), "toml: ")}
	}
	line, _ := decode.Position()
	what := strings.TrimPrefix(decode.Error(), "toml: ")
	if key := strings.Join(decode.Key(), "."); key != "" && strings.Contains(what, "struct field") {
		what = fmt.Sprintf("%s: a value of the wrong kind: a number stands bare, text in quotes", data.Clean(key))
	}
	return &data.FileError{File: name, Line: line, What: what}
}
