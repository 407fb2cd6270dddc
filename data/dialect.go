package data

import "bytes"

// dialect is how a table separates its fields. One is detected from the
// header, before anything else is read; the row loop of [table] takes all its
// signs from it, so that a further dialect is a value here and a line in
// detectDialect.
type dialect struct {
	name    string // as an error calls it
	comma   byte   // between fields
	decimal byte   // in numbers
	comment byte   // begins a line that is left out
}

var (
	commaSeparated = dialect{name: "commas", comma: ',', decimal: '.', comment: '#'}
	semicolons     = dialect{name: "semicolons", comma: ';', decimal: ',', comment: '#'}
	tabs           = dialect{name: "tabs", comma: '\t', decimal: '.', comment: '#'}
	spaces         = dialect{name: "spaces", comma: ' ', decimal: '.', comment: '#'}
)

// readable tells whether the row loop is meant to read d.
func (d dialect) readable() bool { return d == commaSeparated }

// detectDialect tells the dialect from the header line and the line after it.
func detectDialect(header, next []byte) dialect {
	header = unquoted(header)
	commas, semis, tab := bytes.Count(header, []byte{','}), bytes.Count(header, []byte{';'}), bytes.Count(header, []byte{'\t'})
	switch {
	case semis > commas:
		return semicolons
	case tab > commas:
		return tabs
	case commas == 0 && numbersIn(next) > 1:
		return spaces
	}
	return commaSeparated
}

// numbersIn counts the numbers of a line that holds nothing but numbers, apart
// by spaces; it is 0 for any other line.
func numbersIn(line []byte) int {
	fields := bytes.Fields(line)
	for _, f := range fields {
		if _, what := parseNumber(f, '.'); what != isNumber {
			return 0
		}
	}
	return len(fields)
}

// unquoted is line without what stands in double quotes.
func unquoted(line []byte) []byte {
	var out []byte
	for i, part := range bytes.Split(line, []byte{'"'}) {
		if i%2 == 0 {
			out = append(out, part...)
		}
	}
	return out
}
