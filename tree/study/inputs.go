package study

import (
	"bytes"
	"fmt"
	"path/filepath"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree"
	"afterbeat/tree/support"
)

// Inputs is what a study starts from: the choices, the recording as read, and
// the stretches that a file says to leave out.
type Inputs struct {
	Case      casefile.Case
	Recording *data.Recording
	Excluded  []data.Span
	// Modulation is what the file of a modulated speed holds; nil: none is named.
	Modulation *support.Modulation
	Arteries   *tree.Network // the case's own table of arteries; nil where it names none
}

// Read reads the files that a case names. read returns the bytes of a file by
// the name that the case gives it; Case.Recording itself is given to it too.
func Read(c casefile.Case, read func(name string) ([]byte, error)) (Inputs, error) {
	in := Inputs{Case: c}
	if err := unitOf(c); err != nil {
		return in, err
	}
	rate := 0.0
	if c.Rate != nil {
		if rate = *c.Rate; !(rate > 0) {
			return in, &ChoiceError{Key: "rate", What: fmt.Sprintf("%v is not a rate above 0 Hz", rate), Hint: "the samples a second, for instance --rate 200"}
		}
	}
	content, err := read(c.Recording)
	if err != nil {
		return in, err
	}
	in.Recording, err = data.ReadCSV(c.Recording, bytes.NewReader(content), data.ReadOptions{
		Time: c.Time, Rate: rate, Units: c.Unit,
	})
	if err != nil {
		return in, err
	}
	if name := c.Modulation["file"]; name != "" {
		if content, err = read(name); err != nil {
			return in, err
		}
		m, err := ReadModulation(baseName(name), content)
		if err != nil {
			return in, err
		}
		in.Modulation = &m
	}
	if c.Exclude != "" {
		if content, err = read(c.Exclude); err != nil {
			return in, err
		}
		if in.Excluded, err = data.ReadSpans(baseName(c.Exclude), bytes.NewReader(content)); err != nil {
			return in, err
		}
	}
	if c.Tree != "" {
		if content, err = read(c.Tree); err != nil {
			return in, err
		}
		n, err := tree.Read(baseName(c.Tree), bytes.NewReader(content))
		if err != nil {
			return in, err
		}
		in.Arteries = &n
	}
	return in, nil
}

// baseName is the file name without its folder: a note carries no path.
func baseName(name string) string { return filepath.Base(name) }
