package cohort

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"path/filepath"

	"afterbeat/data"
	"afterbeat/data/casefile"
	"afterbeat/tree/study"
)

// Source is one recording with the choices made about it.
type Source struct {
	// Name is the file as the user gave it, a recording or a case.
	Name string
	Case casefile.Case
	// Read returns the bytes of a file by the name that the case gives it.
	Read func(name string) ([]byte, error)
	// Err says why there is no case; nil where there is one.
	Err error
}

// Key tells what a row was computed from.
type Key struct {
	SHA256   string // of the recording; empty where it could not be read
	Settings string // of the choices and of the other files, 16 hexadecimal digits
}

// complete tells whether a row of this key may be taken as it is.
func (k Key) complete() bool { return k.SHA256 != "" && k.Settings != "" }

// file is the base name of the recording: a table carries no path.
func (s Source) file() data.Text {
	if s.Case.Recording == "" {
		return data.Clean(filepath.Base(s.Name))
	}
	return data.Clean(filepath.Base(s.Case.Recording))
}

// inputs reads the files of a source, and tells their key. Where a file cannot be
// read or understood, the error says so, and the key covers what could be read.
func (s Source) inputs() (study.Inputs, Key, error) {
	if s.Err != nil {
		return study.Inputs{}, Key{}, s.Err
	}
	var key Key
	choices := s.Case
	choices.Recording = ""
	settings := sha256.New()
	fmt.Fprintf(settings, "%s\n%s", study.Version, casefile.Write(choices))
	in, err := study.Read(s.Case, func(name string) ([]byte, error) {
		content, err := s.Read(name)
		sum := sha256.Sum256(content)
		switch {
		case err != nil:
		case name == s.Case.Recording && key.SHA256 == "":
			key.SHA256 = hex.EncodeToString(sum[:])
		default:
			fmt.Fprintf(settings, "\n%x", sum)
		}
		return content, err
	})
	var unread *data.FileError
	if errors.As(err, &unread) && unread.Err != nil && key.SHA256 == "" {
		return in, key, err
	}
	key.Settings = hex.EncodeToString(settings.Sum(nil)[:8])
	return in, key, err
}
