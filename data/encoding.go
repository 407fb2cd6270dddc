package data

import (
	"bytes"
	"io"
	"io/fs"
	"unicode/utf8"

	"golang.org/x/text/encoding/charmap"
	"golang.org/x/text/encoding/unicode"
	"golang.org/x/text/transform"
)

// readAll reads all of r, once into one place if r tells its size.
func readAll(name string, r io.Reader) ([]byte, error) {
	var b bytes.Buffer
	switch sized := r.(type) {
	case interface{ Len() int }:
		b.Grow(sized.Len() + bytes.MinRead)
	case interface{ Stat() (fs.FileInfo, error) }:
		if info, err := sized.Stat(); err == nil && info.Mode().IsRegular() {
			b.Grow(int(info.Size()) + bytes.MinRead)
		}
	}
	if _, err := b.ReadFrom(r); err != nil {
		return nil, &FileError{File: name, What: "reading it", Err: err}
	}
	return b.Bytes(), nil
}

// decode turns the bytes of a file into UTF-8 without a byte order mark: a
// mark decides (UTF-8, UTF-16 of either order), else UTF-8 if the bytes are
// valid UTF-8, else Windows-1252. NUL bytes are refused: without a mark they
// are UTF-16, whose byte order would be a guess.
func decode(file string, raw []byte) ([]byte, error) {
	text := raw
	if marked(raw) {
		var err error
		text, _, err = transform.Bytes(unicode.BOMOverride(transform.Nop), raw)
		if err != nil {
			return nil, &FileError{File: file, What: "reading its encoding", Err: err}
		}
	}
	if bytes.IndexByte(text, 0) >= 0 {
		return nil, &FileError{
			File: file, What: "holds NUL bytes: UTF-16 without a byte order mark, or no text at all",
			Hint: "save it again as UTF-8",
		}
	}
	if utf8.Valid(text) {
		return text, nil
	}
	text, err := charmap.Windows1252.NewDecoder().Bytes(text)
	if err != nil {
		return nil, &FileError{File: file, What: "reading it as Windows-1252", Err: err}
	}
	return text, nil
}

// marked tells whether raw begins with a byte order mark.
func marked(raw []byte) bool {
	for _, mark := range []string{"\xef\xbb\xbf", "\xff\xfe", "\xfe\xff"} {
		if bytes.HasPrefix(raw, []byte(mark)) {
			return true
		}
	}
	return false
}
