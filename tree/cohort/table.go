package cohort

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"afterbeat/data"
)

const (
	statusDone   = "done"
	statusFailed = "failed"
)

// Row is one recording in the table.
type Row struct {
	Cells []string // in the order of Columns, as they were before [Write]
}

// Key is what the row was computed from.
func (r Row) Key() Key { return Key{r.Cells[2], r.Cells[3]} }

// Failed tells whether the recording gave no answer.
func (r Row) Failed() bool { return r.Cells[4] == statusFailed }

func names() []string {
	var all []string
	for _, c := range Columns() {
		all = append(all, c.Name)
	}
	return all
}

// Write is the table as CSV, with the names of the columns first.
func Write(rows []Row) []byte {
	var b bytes.Buffer
	w := csv.NewWriter(&b)
	write := func(cells []string) {
		if err := w.Write(cells); err != nil {
			panic("cohort: " + err.Error()) // a buffer takes everything
		}
	}
	write(names())
	for _, r := range rows {
		guarded := make([]string, len(r.Cells))
		for i, c := range r.Cells {
			guarded[i] = guard(c)
		}
		write(guarded)
	}
	w.Flush()
	return b.Bytes()
}

// formula tells a text that a spreadsheet would calculate, or that was made text
// before.
func formula(cell string) bool {
	rest := strings.TrimLeft(cell, "'")
	return rest != "" && strings.ContainsRune("=+-@", rune(rest[0]))
}

// guard makes text of what a spreadsheet would take for a formula. A number may
// begin with a minus.
func guard(cell string) string {
	if formula(cell) && !numeric(cell) {
		return "'" + cell
	}
	return cell
}

// unguard takes back what [guard] did.
func unguard(cell string) string {
	if formula(cell) {
		return strings.TrimPrefix(cell, "'")
	}
	return cell
}

// numeric tells a number as this package writes it.
func numeric(cell string) bool {
	_, err := strconv.ParseFloat(cell, 64)
	return err == nil && cell[0] != '+'
}

// Read reads a table that [Write] wrote. A file that is none is refused with a
// [data.FileError]: it must not be written over.
func Read(name string, content []byte) ([]Row, error) {
	reader := csv.NewReader(bytes.NewReader(content))
	reader.FieldsPerRecord = -1
	all, err := reader.ReadAll()
	if err != nil {
		return nil, &data.FileError{File: name, What: "no table of this program", Err: err, Hint: "name a new file"}
	}
	columns := names()
	if len(all) == 0 || !slices.Equal(all[0], columns) {
		return nil, &data.FileError{File: name, Line: 1, What: "no table with the columns of this version", Hint: "name a new file"}
	}
	var rows []Row
	for i, cells := range all[1:] {
		if len(cells) != len(columns) {
			return nil, &data.FileError{File: name, Line: i + 2, What: fmt.Sprintf("%d cells, not %d", len(cells), len(columns)), Hint: "name a new file"}
		}
		for j, c := range cells {
			cells[j] = unguard(c)
		}
		rows = append(rows, Row{cells})
	}
	return rows, nil
}
