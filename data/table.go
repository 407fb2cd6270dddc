package data

import (
	"bytes"
	"fmt"
	"slices"
)

// table is the text of a file of separated values, read from the front: the
// header, then rows of numbers.
type table struct {
	file string
	dialect
	text []byte
	pos  int
	line int // of text[pos], from 1
}

func (t *table) fail(line int, hint, format string, args ...any) error {
	return &FileError{File: t.file, Line: line, What: fmt.Sprintf(format, args...), Hint: hint}
}

// nextRow moves to the first byte of the next line that is neither empty nor a
// comment, and is false at the end of the text.
func (t *table) nextRow() bool {
	for t.pos < len(t.text) {
		c := t.text[t.pos]
		switch {
		case c == t.comma:
			return true
		case c == '\n' || c == '\r':
			t.endLine()
		case c == ' ' || c == '\t':
			t.pos++
		case c == t.comment && !bytes.HasPrefix(t.text[t.pos:], []byte("#N/A")):
			for t.pos < len(t.text) && !t.lineEndsAt(t.pos) {
				t.pos++
			}
		default:
			return true
		}
	}
	return false
}

// lineEndsAt tells whether the line ends at i.
func (t *table) lineEndsAt(i int) bool {
	return i == len(t.text) || t.text[i] == '\n' || t.text[i] == '\r'
}

// endLine steps over the line end at pos: \n, \r\n or \r.
func (t *table) endLine() {
	if t.pos == len(t.text) {
		return
	}
	if t.text[t.pos] == '\r' && t.pos+1 < len(t.text) && t.text[t.pos+1] == '\n' {
		t.pos++
	}
	t.pos++
	t.line++
}

// field returns the field at pos, without spaces around it and without quotes,
// and moves to the separator or line end behind it.
func (t *table) field() ([]byte, error) {
	for t.pos < len(t.text) && t.text[t.pos] != t.comma && (t.text[t.pos] == ' ' || t.text[t.pos] == '\t') {
		t.pos++
	}
	if t.pos < len(t.text) && t.text[t.pos] == '"' {
		return t.quoted()
	}
	start := t.pos
	for !t.lineEndsAt(t.pos) && t.text[t.pos] != t.comma {
		t.pos++
	}
	return bytes.TrimRight(t.text[start:t.pos], " \t"), nil
}

// quoted returns the quoted field at pos, in which "" is a quotation mark and
// a line may end.
func (t *table) quoted() ([]byte, error) {
	first := t.line
	var out []byte
	for {
		start := t.pos + 1
		length := bytes.IndexByte(t.text[start:], '"')
		if length < 0 {
			return nil, t.fail(first, "", "a quoted field does not end")
		}
		out = append(out, t.text[start:start+length]...)
		t.pos = start + length + 1
		if t.pos == len(t.text) || t.text[t.pos] != '"' {
			break
		}
		out = append(out, '"')
	}
	t.line += bytes.Count(out, []byte{'\n'})
	for !t.lineEndsAt(t.pos) && t.text[t.pos] != t.comma {
		if c := t.text[t.pos]; c != ' ' && c != '\t' {
			return nil, t.fail(t.line, "", "text follows a quoted field")
		}
		t.pos++
	}
	return bytes.TrimSpace(out), nil
}

// row returns the fields of the row at pos and moves behind it.
func (t *table) row() ([]string, error) {
	var fields []string
	for {
		f, err := t.field()
		if err != nil {
			return nil, err
		}
		fields = append(fields, string(f))
		if t.lineEndsAt(t.pos) {
			t.endLine()
			return fields, nil
		}
		t.pos++
	}
}

// peek returns the fields of the next row without moving, nil if there is none.
func (t *table) peek() ([]string, error) {
	ahead := *t
	if !ahead.nextRow() {
		return nil, nil
	}
	return ahead.row()
}

// openTable reads the header of a text and the dialect with it.
func openTable(file string, text []byte) (t *table, header []string, err error) {
	t = &table{file: file, dialect: commaSeparated, text: text, line: 1}
	if !t.nextRow() {
		return nil, nil, t.fail(0, "", "is empty")
	}
	line := t.line
	head, rest := cutLine(text[t.pos:])
	next, _ := cutLine(rest)
	if t.dialect = detectDialect(head, next); !t.readable() {
		return nil, nil, t.fail(line, "save it with commas between the fields and points in the numbers",
			"the fields are separated by %s", t.name)
	}
	if header, err = t.row(); err != nil {
		return nil, nil, err
	}
	if !slices.ContainsFunc(header, t.names) {
		return nil, nil, t.fail(line, "put a line of names above the numbers, such as time_s,abp_mmHg", "has no header: the first row is all numbers")
	}
	return t, header, nil
}

// names tells whether a field of the header is a name, not a value.
func (t *table) names(field string) bool {
	_, what := parseNumber([]byte(field), t.decimal)
	return what == isText && !isStamp(field)
}

// cutLine cuts the first line off text.
func cutLine(text []byte) (line, rest []byte) {
	i := bytes.IndexAny(text, "\r\n")
	if i < 0 {
		return text, nil
	}
	return text[:i], bytes.TrimLeft(text[i:], "\r\n")
}
