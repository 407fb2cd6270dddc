package data

import (
	"bytes"
	"math"
)

// need says what a column must hold.
type need int

const (
	optional need = iota // text counts as missing
	numeric              // text is remembered, see column.text
	required             // text and missing values are errors
)

// column takes the numbers of one column of a table.
type column struct {
	name   Text
	blank  bool // the header names it with nothing
	need   need
	stamps *stamps // set for times of day, which are not plain numbers
	values []float64
	// numbers and texts count the fields that held a number, and something
	// that is neither a number nor a word for a missing one; text is the first
	// of these, in line.
	numbers, texts int
	text           string
	line           int
}

// capacity is an upper bound of the rows that follow, for tables of n columns.
func (t *table) capacity(n int) int {
	rest := t.text[t.pos:]
	return min(bytes.Count(rest, []byte{'\n'})+1, len(rest)/max(n, 1)+1)
}

// rows reads all rows into the columns, and calls each with the line of every
// row once it is complete. A row without any value is left out where a column
// is required. A row may have one empty field too many, and may lack the last
// one where the header's last name is empty.
func (t *table) rows(columns []column, each func(line int) error) error {
	skipEmpty := false
	for i := range columns {
		columns[i].values = make([]float64, 0, t.capacity(len(columns)))
		skipEmpty = skipEmpty || columns[i].need == required
	}
	for t.nextRow() {
		line := t.line
		filled, err := t.readRow(columns)
		if err != nil {
			return err
		}
		if skipEmpty && !filled {
			for i := range columns {
				columns[i].values = columns[i].values[:len(columns[i].values)-1]
			}
			continue
		}
		for i := range columns {
			if c := &columns[i]; c.need == required && math.IsNaN(c.values[len(c.values)-1]) {
				return t.fail(line, "every row needs a value there", "%s is missing", c.name)
			}
		}
		if err := each(line); err != nil {
			return err
		}
	}
	return nil
}

// readRow reads one row into the columns; filled is false if all its fields
// are empty.
func (t *table) readRow(columns []column) (filled bool, err error) {
	for i := 0; ; i++ {
		if i >= len(columns) {
			return filled, t.surplus(i, len(columns))
		}
		c := &columns[i]
		v, next, ok := scanNumber(t.text, t.pos, t.decimal)
		if ok && c.stamps == nil && (t.lineEndsAt(next) || t.text[next] == t.comma) {
			t.pos, filled = next, true
			c.numbers++
		} else {
			var some bool
			if v, some, err = t.slow(c); err != nil {
				return false, err
			}
			filled = filled || some
		}
		c.values = append(c.values, v)
		if t.lineEndsAt(t.pos) {
			return filled, t.shortage(i+1, columns)
		}
		t.pos++
	}
}

// surplus judges field i, counted from 0, of a row of a table of n columns,
// with pos at its front: it may be empty and last.
func (t *table) surplus(i, n int) error {
	line := t.line
	rest, err := t.row()
	if err == nil && (len(rest) > 1 || rest[0] != "") {
		err = t.fail(line, "each row needs as many fields as the header; a decimal comma would split a number in two",
			"%d fields where the header has %d", i+len(rest), n)
	}
	return err
}

// shortage judges a row that ends after n fields.
func (t *table) shortage(n int, columns []column) error {
	last := &columns[len(columns)-1]
	switch {
	case n == len(columns):
		return nil
	case n == len(columns)-1 && last.blank:
		last.values = append(last.values, math.NaN())
		return nil
	}
	return t.fail(t.line, "each row needs as many fields as the header; is the file cut short?",
		"%d fields where the header has %d", n, len(columns))
}

// slow reads the field at pos where it is no plain number; some is false where
// it is empty.
func (t *table) slow(c *column) (v float64, some bool, err error) {
	line := t.line
	field, err := t.field()
	if err != nil {
		return 0, false, err
	}
	v, what := parseNumber(field, t.decimal)
	if c.stamps != nil && what != isMissing {
		var ok bool
		if v, ok = c.stamps.seconds(string(field)); ok {
			what = isNumber
		} else {
			what = isText
		}
	}
	switch {
	case what == isNumber:
		c.numbers++
	case what == isText && c.need == required:
		return 0, true, t.notA(c, line, string(field))
	case what == isText:
		if c.texts++; c.texts == 1 {
			c.text, c.line = string(field), line
		}
		v = math.NaN()
	}
	return v, len(field) > 0, nil
}

// notA is the error of a field that does not hold what column c must hold.
func (t *table) notA(c *column, line int, field string) error {
	kind := "number"
	if c.stamps != nil {
		kind = "time like that of the first row"
	}
	return t.fail(line, "leave a field empty where there is no value", "%s is not a %s: \"%s\"", c.name, kind, Clean(field).Cut(40))
}
