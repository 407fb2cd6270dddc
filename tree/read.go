package tree

import (
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"afterbeat/data"
	"afterbeat/data/casefile"
)

// columns of a table of segments, in the order in which they are written.
var columns = []string{
	"id", "parent", "name", "length_cm", "radius_cm", "radius_distal_cm",
	"wave_speed_m_s", "eh_dyn_per_cm", "poisson", "r1", "c", "r2", "bed",
}

// needed are the columns that no table can do without.
var needed = []string{"id", "parent", "length_cm", "radius_cm", "r2"}

// Read reads a table of segments: a header and one row a segment, columns and
// rows in any order,
//
//	id,parent,name,length_cm,radius_cm,radius_distal_cm,wave_speed_m_s,eh_dyn_per_cm,poisson,r1,c,r2,bed
//
// The root has no parent. A segment without daughters has r2 (mmHg s/mL), r1
// (blank: matched, rho c/A) and c (mL/mmHg; blank: 0); the others leave all three
// blank. r1 and r2 may be inf. Every row has one of wave_speed_m_s and
// eh_dyn_per_cm. name, radius_distal_cm (blank: as radius_cm), poisson (blank: 0)
// and bed may be missing altogether.
//
// The network comes with [StandardBlood], an elastic wall and no outflow
// pressure. Every error is a [*data.FileError] that names the line and the
// segment.
func Read(name string, r io.Reader) (Network, error) {
	n := Network{Blood: StandardBlood()}
	table, err := data.ReadTextTable(name, r)
	if err != nil {
		return n, err
	}
	at, err := findColumns(table)
	if err != nil {
		return n, err
	}
	if len(table.Rows) == 0 {
		return n, &data.FileError{File: name, Line: table.HeaderLine, What: "has no segment below its header"}
	}
	n.Segments = make([]Segment, len(table.Rows))
	for i, fields := range table.Rows {
		row := row{table: &table, at: at, TextRow: fields}
		if n.Segments[i], err = row.segment(); err != nil {
			return n, err
		}
	}
	if err := n.Check(); err != nil {
		return n, located(table, err)
	}
	return n, nil
}

// located puts the line of the table to an error of Check.
func located(table data.TextTable, err error) error {
	var fault *SegmentError
	if !errors.As(err, &fault) || fault.Index < 0 {
		return &data.FileError{File: table.Name, What: err.Error()}
	}
	return &data.FileError{
		File: table.Name, Line: table.Rows[fault.Index].Line, Hint: fault.Hint,
		What: fmt.Sprintf("segment %q: %s", data.Clean(fault.ID), data.Clean(fault.What)),
	}
}

// findColumns gives the place of every column of the table.
func findColumns(table data.TextTable) (map[string]int, error) {
	refuse := func(hint, format string, args ...any) error {
		return &data.FileError{File: table.Name, Line: table.HeaderLine, What: fmt.Sprintf(format, args...), Hint: hint}
	}
	at := map[string]int{}
	for i, name := range table.Header {
		if !slices.Contains(columns, name) {
			what := fmt.Sprintf("unknown column %q", data.Clean(name))
			if nearest, ok := casefile.Nearest(name, columns); ok {
				what += fmt.Sprintf("; did you mean %q?", nearest)
			}
			return nil, refuse("the columns are "+strings.Join(columns, ","), "%s", what)
		}
		if _, twice := at[name]; twice {
			return nil, refuse("", "column %s stands twice", name)
		}
		at[name] = i
	}
	for _, name := range needed {
		if _, ok := at[name]; !ok {
			return nil, refuse("the columns are "+strings.Join(columns, ","), "column %s is missing", name)
		}
	}
	_, speed := at["wave_speed_m_s"]
	if _, eh := at["eh_dyn_per_cm"]; !speed && !eh {
		return nil, refuse("", "column wave_speed_m_s or eh_dyn_per_cm is missing")
	}
	return at, nil
}

// row is one row of a table of segments.
type row struct {
	data.TextRow
	table *data.TextTable
	at    map[string]int
}

func (r row) refuse(format string, args ...any) error {
	return &data.FileError{
		File: r.table.Name, Line: r.Line,
		What: fmt.Sprintf("segment %q: ", data.Clean(r.text("id"))) + fmt.Sprintf(format, args...),
	}
}

// text is the field of a column, empty where there is no such column.
func (r row) text(column string) string {
	if i, ok := r.at[column]; ok && i < len(r.Fields) {
		return strings.TrimSpace(r.Fields[i])
	}
	return ""
}

// number reads a field, given when it is not blank.
func (r row) number(column string, into *float64, shift int) (given bool, err error) {
	field := r.text(column)
	if field == "" {
		return false, nil
	}
	v, ok := parseDecimal(field, r.table.Decimal, shift)
	if !ok {
		return true, r.refuse("%s is not a number: %q", column, data.Clean(field))
	}
	*into = v
	return true, nil
}

// segment reads the row.
func (r row) segment() (Segment, error) {
	if len(r.Fields) != len(r.table.Header) {
		return Segment{}, r.refuse("has %d fields, the header %d", len(r.Fields), len(r.table.Header))
	}
	s := Segment{ID: r.text("id"), Parent: r.text("parent"), Name: r.text("name"), Bed: r.text("bed")}
	var t Terminal
	given := map[string]bool{}
	for _, f := range []struct {
		column string
		into   *float64
		shift  int
		must   bool // positive
	}{
		{"length_cm", &s.Length, 0, true},
		{"radius_cm", &s.Radius, 0, true},
		{"radius_distal_cm", &s.RadiusDistal, 0, true},
		{"wave_speed_m_s", &s.WaveSpeed, 2, true},
		{"eh_dyn_per_cm", &s.Eh, 0, true},
		{"poisson", &s.Poisson, 0, false},
		{"r1", &t.R1, 0, false},
		{"c", &t.C, 0, false},
		{"r2", &t.R2, 0, false},
	} {
		is, err := r.number(f.column, f.into, f.shift)
		switch {
		case err != nil:
			return s, err
		case is && f.must && !(*f.into > 0):
			return s, r.refuse("%s is %s, not a positive number", f.column, r.text(f.column))
		case is && *f.into < 0:
			return s, r.refuse("%s is negative: %s", f.column, r.text(f.column))
		}
		given[f.column] = is
	}
	for _, column := range []string{"length_cm", "radius_cm"} {
		if !given[column] {
			return s, r.refuse("%s is missing", column)
		}
	}
	switch {
	case given["r2"]:
		t.Matched = !given["r1"]
		s.Terminal = &t
	case given["r1"] || given["c"]:
		return s, r.refuse("has r1 or c, but no r2")
	}
	return s, nil
}
