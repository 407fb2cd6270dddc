package data

import "io"

// TextTable is a table of separated values whose fields are read as text, for
// tables that are no recordings. Empty lines and lines that begin with # are
// left out; fields have no spaces around them and no quotes.
type TextTable struct {
	Name       string // of the file, for errors
	HeaderLine int    // counted from 1
	Header     []string
	Rows       []TextRow
	Decimal    byte // the sign in numbers, '.' or ','
}

// TextRow is one row, as long as it was written.
type TextRow struct {
	Line   int // where it begins, counted from 1
	Fields []string
}

// ReadTextTable reads a table: a header, then rows. Encodings and separators
// are those of [ReadCSV]. Every error about the file is a [*FileError].
func ReadTextTable(name string, r io.Reader) (TextTable, error) {
	out := TextTable{Name: name}
	raw, err := readAll(name, r)
	if err != nil {
		return out, err
	}
	text, err := decode(name, raw)
	if err != nil {
		return out, err
	}
	t, header, err := openTable(name, text)
	if err != nil {
		return out, err
	}
	out.Header, out.HeaderLine, out.Decimal = header, t.line-1, t.decimal
	for t.nextRow() {
		row := TextRow{Line: t.line}
		if row.Fields, err = t.row(); err != nil {
			return out, err
		}
		out.Rows = append(out.Rows, row)
	}
	return out, nil
}
