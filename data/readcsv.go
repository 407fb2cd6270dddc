package data

import (
	"crypto/sha256"
	"encoding/hex"
	"io"
	"path/filepath"

	"afterbeat/data/unit"
)

// ReadOptions are what a user says about a file that its header does not. The
// zero value reads a file that says everything itself.
type ReadOptions struct {
	// Time names the column of times (or, with Rate, of sample numbers).
	// Empty: it is found by its name.
	Time string
	// Rate is the samples a second, Hz, of a file without times; 0: there are
	// times. It rules over a column of times that Time does not name.
	Rate float64
	// Units maps the name of a column, its whole header or the part before
	// the unit, to the unit that it has, whatever the header says.
	Units map[string]string
}

// ReadCSV reads a recording from a file of comma-separated values: a header of
// names with units, then one row a sample. Lines that begin with # and empty
// lines are left out. name is the path as the user gave it.
//
// Columns whose header speaks of a quantity (see [unit.Guess]) become channels
// in the internal unit; those of numbers that speak of none are channels of
// quantity other, in their own unit; those of text are left out. Missing are
// empty fields, NaN, NA, n/a, null, -, . and infinities; any other text in a
// column of a quantity is an error. Times never fall, are finite and advance
// at least once.
//
// Every error about the file is a [*FileError]; below it may lie an
// [*UnknownNameError] or an [*AmbiguousError] about a name in the options.
func ReadCSV(name string, r io.Reader, o ReadOptions) (*Recording, error) {
	raw, err := readAll(name, r)
	if err != nil {
		return nil, err
	}
	in, err := openIntake(name, raw, o)
	if err != nil {
		return nil, err
	}
	if err := in.rows(in.columns, in.inOrder); err != nil {
		return nil, err
	}
	sum := sha256.Sum256(raw)
	rec := &Recording{Name: Clean(filepath.Base(name)), SHA256: hex.EncodeToString(sum[:])}
	if rec.TimeName, rec.Time, err = in.times(); err != nil {
		return nil, err
	}
	if rec.Channels, err = in.channels(); err != nil {
		return nil, err
	}
	rec.Warnings = in.warnings(rec)
	return rec, nil
}

// intake is a table on its way to become a recording.
type intake struct {
	*table
	heads   []heading
	when    timing
	columns []column
	count   int // rows so far
}

// openIntake reads the header and settles what each column is.
func openIntake(name string, raw []byte, o ReadOptions) (*intake, error) {
	text, err := decode(name, raw)
	if err != nil {
		return nil, err
	}
	t, header, err := openTable(name, text)
	if err != nil {
		return nil, err
	}
	in := &intake{table: t, heads: headings(header)}
	if err := apply(o.Units, in.heads); err != nil {
		return nil, &FileError{File: name, What: "choosing units", Err: err}
	}
	if in.when, err = findTiming(t, in.heads, o); err != nil {
		return nil, err
	}
	in.columns = make([]column, len(in.heads))
	for i, h := range in.heads {
		in.columns[i] = column{name: h.name, blank: h.blank}
		switch {
		case i == in.when.column:
			in.columns[i].need, in.columns[i].stamps = required, in.when.stamps
		case h.quantified().Quantity != unit.Other:
			in.columns[i].need = numeric
		}
	}
	return in, nil
}

// inOrder counts a row, in line, and checks that its time does not fall.
func (in *intake) inOrder(line int) error {
	in.count++
	if in.when.column < 0 || in.count == 1 {
		return nil
	}
	c := &in.columns[in.when.column]
	before, now := c.values[in.count-2], c.values[in.count-1]
	if now < before {
		return in.fail(line, "rows must be in the order of time; two recordings in one file must become two files",
			"%s falls, from %v to %v", c.name, before, now)
	}
	return nil
}

// times gives the time of every row, in s, and the header of the column they
// come from.
func (in *intake) times() (name Text, times []float64, err error) {
	switch in.count {
	case 0:
		return Text{}, nil, in.fail(0, "", "has a header, but no rows of numbers below it")
	case 1:
		return Text{}, nil, in.fail(0, "", "has one row of numbers; a recording needs at least two")
	}
	if in.when.column < 0 {
		return Text{}, in.when.counted(in.count), nil
	}
	c := &in.columns[in.when.column]
	in.when.toSeconds(c.values)
	if !(c.values[in.count-1]-c.values[0] >= shortest) {
		return Text{}, nil, in.fail(0, "name another column with --time NAME, or give the samples a second with --rate HZ", "%s does not advance", c.name)
	}
	return c.name, c.values, nil
}

// shortest is the duration, s, below which times do not advance.
const shortest = 1e-6

// channels makes a channel of every column that holds numbers or should.
func (in *intake) channels() ([]Channel, error) {
	var out []Channel
	var wrong *column
	numbers := 0
	for i, h := range in.heads {
		c := &in.columns[i]
		if i == in.when.column || c.numbers == 0 && (c.need == optional || c.texts > 0) {
			continue
		}
		if c.need == numeric && c.texts > 0 && (wrong == nil || c.line < wrong.line) {
			wrong = c
		}
		numbers += c.numbers
		out = append(out, channelOf(h, c.values))
	}
	switch {
	case wrong != nil:
		return nil, in.notA(wrong, wrong.line, wrong.text)
	case numbers == 0:
		return nil, in.fail(0, "", "no column but that of times holds numbers")
	}
	return out, nil
}

// channelOf converts values, in place, to the internal unit.
func channelOf(h heading, values []float64) Channel {
	u := h.quantified()
	if u.Factor != 1 {
		for k := range values {
			values[k] = u.ToInternal(values[k])
		}
	}
	return Channel{Name: h.name, Quantity: u.Quantity, Unit: u, Site: GuessSite(h.name.String(), u.Quantity), Values: values}
}

// warnings are all that the reading of rec leaves doubtful.
func (in *intake) warnings(rec *Recording) []Warning {
	p := paceOf(rec.Time)
	c := clockOf(rec.Time, p)
	out := in.timeWarnings(c)
	out = append(out, rec.clockWarnings(p, c)...)
	return append(out, rec.channelWarnings(in.heads, c)...)
}
